/* form.c - a text written as YAML: plain, in quotes, or under | and >. */
#include "beamhours/document/form.h"

#include <string.h>

enum { STEP = 2, /* blanks of indentation where the old text shows none */ LEAST_WIDTH = 60 };

/* --- plain and in quotes --- */

static bool starts_plain(const char *text)
{
    if (strchr("-?:", text[0]))
        return text[1] != '\0' && text[1] != ' ' && !strchr(",[]{}", text[1]) &&
               strncmp(text, "---", 3) != 0;
    return !strchr(",[]{}#&*!|>'\"%@`", text[0]) && strncmp(text, "...", 3) != 0 &&
           strcmp(text, "<<") != 0;
}

static bool fits_plain(const char *text, bool flow)
{
    const size_t length = strlen(text);
    if (length == 0 || text[0] == ' ' || text[length - 1] == ' ' || text[length - 1] == ':')
        return false;
    if (strpbrk(text, "\t\n\r") || strstr(text, ": ") || strstr(text, " #"))
        return false;
    if (flow && (strpbrk(text, ",[]{}") || strchr(text, '?')))
        return false;
    return starts_plain(text);
}

bool bh_form_fits(bh_form form, const char *text, bool flow)
{
    if (form == BH_FORM_PLAIN)
        return fits_plain(text, flow);
    return form != BH_FORM_SINGLE || !strpbrk(text, "\t\n\r");
}

bh_form bh_form_choose(const char *text, bool flow)
{
    if (bh_form_fits(BH_FORM_PLAIN, text, flow))
        return BH_FORM_PLAIN;
    const bool escapes = strpbrk(text, "\"\\") != NULL;
    return escapes && bh_form_fits(BH_FORM_SINGLE, text, flow) ? BH_FORM_SINGLE : BH_FORM_DOUBLE;
}

static void append_double(char c, bh_text *into)
{
    if (c == '"' || c == '\\')
        bh_text_append(into, "\\");
    if (c == '\n')
        bh_text_append(into, "\\n");
    else if (c == '\t')
        bh_text_append(into, "\\t");
    else
        bh_text_append_bytes(into, &c, 1);
}

void bh_form_append(bh_form form, const char *text, bh_text *into)
{
    if (form == BH_FORM_PLAIN || form == BH_FORM_AS_IT_IS) {
        bh_text_append(into, text);
        return;
    }
    const char *quote = form == BH_FORM_SINGLE ? "'" : "\"";
    bh_text_append(into, quote);
    for (; *text; text++) {
        if (form == BH_FORM_DOUBLE)
            append_double(*text, into);
        else
            bh_text_appendf(into, "%s%c", *text == '\'' ? "'" : "", *text);
    }
    bh_text_append(into, quote);
}

/* --- under | and > --- */

/* A | or > text as it stands. */
struct block {
    bh_bytes whole;
    size_t end;    /* behind its last line, the line's end not included */
    size_t indent; /* [1] blanks before each line */
    char chomp;    /* '-', '+', or 0 */
    size_t given;  /* [1] blanks more than what is around it, as its heading says; or 0 */
    bool folded;
    bool unended; /* the text ends with it, and has no end of line */
};

static void read_heading(struct block *b, const bh_node *node)
{
    const char *c = b->whole.bytes + node->from;
    b->folded = *c == '>';
    for (c++; *c && strchr("+-123456789", *c); c++) {
        if (*c == '+' || *c == '-')
            b->chomp = *c;
        else
            b->given = (size_t)(*c - '0');
    }
}

/* The indentation of the line in which the parent of `node` begins. */
static size_t around_column(bh_bytes whole, const bh_node *node)
{
    return node->parent ? bh_column(whole, node->parent->from) : 0;
}

static size_t blanks_at(bh_bytes whole, size_t at)
{
    size_t n = 0;
    while (at + n < whole.length && whole.bytes[at + n] == ' ')
        n++;
    return n;
}

/* With +, the blank lines below are part of the text. */
static void take_blank_lines(struct block *b)
{
    size_t line = bh_line_next(b->whole, b->end);
    while (line < b->whole.length && bh_blank(b->whole, line, bh_line_end(b->whole, line), false)) {
        b->end = bh_line_end(b->whole, line);
        line = bh_line_next(b->whole, line);
    }
}

static struct block block_of(bh_bytes whole, const bh_node *node)
{
    struct block b = {.whole = whole};
    read_heading(&b, node);
    const size_t heading = bh_line_end(whole, node->from);
    b.end = node->to > heading ? node->to : heading;
    b.indent = around_column(whole, node) + (b.given ? b.given : STEP);
    size_t line = bh_line_next(whole, heading);
    while (line < b.end && bh_blank(whole, line, bh_line_end(whole, line), false))
        line = bh_line_next(whole, line);
    if (line < b.end && !b.given)
        b.indent = blanks_at(whole, line);
    if (b.chomp == '+')
        take_blank_lines(&b);
    b.unended = b.end == whole.length;
    return b;
}

/* The value: the text with as many ends of line as the heading leaves. */
static void end_value(const struct block *b, const char *text, bh_text *value)
{
    size_t length = strlen(text);
    const bool keep = b->chomp == '+' && !b->unended;
    while (!keep && length > 0 && text[length - 1] == '\n')
        length--;
    bh_text_append_bytes(value, text, length);
    const bool one = b->chomp != '-' && !b->unended && length > 0 && text[length - 1] != '\n';
    bh_text_append(value, one ? "\n" : "");
}

static void begin_line(const struct block *b, bh_text *written)
{
    bh_text_append(written, bh_line_break(b->whole));
    for (size_t i = 0; i < b->indent; i++)
        bh_text_append(written, " ");
}

/* A line of a > text on lines of at most `width` bytes, broken at single blanks. */
static void fold(const struct block *b, const char *line, size_t length, bh_text *written)
{
    const size_t width = LEAST_WIDTH + b->indent;
    size_t start = 0, last = 0;
    for (size_t i = 1; i + 1 < length; i++) {
        if (line[i] != ' ' || line[i - 1] == ' ' || line[i + 1] == ' ')
            continue;
        if (i - start > width && last > start) {
            begin_line(b, written);
            bh_text_append_bytes(written, line + start, last - start);
            start = last + 1;
        }
        last = i;
    }
    begin_line(b, written);
    bh_text_append_bytes(written, line + start, length - start);
}

/* Every line of the value but the ends of line behind the last. */
static void write_lines(const struct block *b, const char *value, bh_text *written)
{
    bool above = false; /* is there a line above that has something in it? */
    while (*value) {
        const size_t length = strcspn(value, "\n");
        if (length > 0 && b->folded) {
            if (above) /* a single end of line would become a blank */
                bh_text_append(written, bh_line_break(b->whole));
            fold(b, value, length, written);
        } else if (length > 0) {
            begin_line(b, written);
            bh_text_append_bytes(written, value, length);
        } else {
            bh_text_append(written, bh_line_break(b->whole));
        }
        above = above || length > 0;
        value += length;
        value += *value == '\n';
    }
}

bool bh_form_block(bh_bytes whole, const bh_node *node, const char *text, bh_block *block)
{
    const struct block b = block_of(whole, node);
    const char *first = text + strspn(text, "\n");
    if ((*first == ' ' || *first == '\t') && !b.given)
        return false; /* its blanks would count as indentation */
    end_value(&b, text, &block->value);
    block->from = bh_line_end(whole, node->from);
    block->to = b.end;
    if (!block->value.failed)
        write_lines(&b, block->value.bytes, &block->written);
    return true;
}
