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

/* Every line of the value but the ends of line behind the last.  `above`: there is a line above
 * that has something in it. */
static void write_lines(const struct block *b, const char *value, bool above, bh_text *written)
{
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

/* --- paragraphs of a > text that stay as they are --- */

/* Where a paragraph stands in the value, and in the lines of the document. */
struct paragraph {
    size_t from, to;       /* [bytes] in the value */
    size_t written_before; /* [bytes] end of the line above its first */
    size_t written_to;     /* [bytes] end of its last line */
};

/* The paragraph of the value that begins at `from`, whose lines begin behind `line_end`, end of a
 * line.  False where lines are not simply joined: some are indented further, or there are none. */
static bool next_paragraph(const struct block *b, bh_bytes value, size_t from, size_t line_end,
                           struct paragraph *out)
{
    size_t line = bh_line_next(b->whole, line_end);
    *out = (struct paragraph){.from = from, .to = from, .written_before = line_end};
    while (line < b->end && bh_blank(b->whole, line, bh_line_end(b->whole, line), false)) {
        out->written_before = bh_line_end(b->whole, line);
        line = bh_line_next(b->whole, line);
    }
    out->written_to = out->written_before;
    while (out->to < value.length && value.bytes[out->to] != '\n')
        out->to++;
    while (line < b->end && !bh_blank(b->whole, line, bh_line_end(b->whole, line), false)) {
        if (blanks_at(b->whole, line) != b->indent || b->whole.bytes[line + b->indent] == '\t')
            return false;
        out->written_to = bh_line_end(b->whole, line);
        line = bh_line_next(b->whole, line);
    }
    return out->to > from && out->written_to > out->written_before;
}

static size_t ends_of_line(bh_bytes text, size_t at)
{
    size_t n = 0;
    while (at + n < text.length && text.bytes[at + n] == '\n')
        n++;
    return n;
}

static size_t common_head(bh_bytes a, bh_bytes b)
{
    size_t n = 0;
    while (n < a.length && n < b.length && a.bytes[n] == b.bytes[n])
        n++;
    return n;
}

static size_t common_tail(bh_bytes a, bh_bytes b)
{
    size_t n = 0;
    while (n < a.length && n < b.length && a.bytes[a.length - 1 - n] == b.bytes[b.length - 1 - n])
        n++;
    return n;
}

/* Do the last `tail` bytes begin a line? */
static bool begins_line(bh_bytes text, size_t tail)
{
    return tail == text.length || text.bytes[text.length - tail - 1] == '\n';
}

/* Narrows `block` to what has to be written between paragraphs that stay, which takes the old value
 * paragraph by paragraph; `middle` is where that is in the new one. */
static bool narrow(const struct block *b, bh_bytes old, bh_bytes new, bh_block *block,
                   size_t middle[2])
{
    const size_t head = common_head(old, new), tail = common_tail(old, new);
    struct paragraph p;
    size_t from = 0, line_end = block->from;
    middle[0] = 0;
    middle[1] = new.length;
    while (from < old.length) {
        const size_t left = old.length - from;
        if (!next_paragraph(b, old, from, line_end, &p))
            return false;
        const size_t next = p.to + ends_of_line(old, p.to);
        if (p.to < head && next <= head) { /* it stays, and stands before */
            block->from = p.written_to;
            middle[0] = p.to;
        } else if (left <= tail && begins_line(new, left) && new.length - left >= middle[0]) {
            block->to = p.written_before; /* it stays, and stands behind */
            middle[1] = new.length - left;
            return true;
        }
        line_end = p.written_to;
        from = next;
    }
    return true;
}

/* Writes only the paragraphs that changed; false where that is not so simple. */
static bool write_changed(const struct block *b, bh_bytes old, bh_block *block)
{
    const bh_bytes new = {block->value.bytes, block->value.length};
    size_t middle[2];
    bh_text part = {0};
    if (!narrow(b, old, new, block, middle))
        return false;
    size_t length = middle[1] - middle[0], breaks = 0;
    const char *from = new.bytes + middle[0];
    const bool above = middle[0] > 0;
    if (middle[1] < new.length) /* blank lines above what stands behind */
        while (length > 0 && from[length - 1] == '\n') {
            length--;
            breaks++;
        }
    if (above && length > 0 && *from == '\n') { /* ends the paragraph above */
        from++;
        length--;
    }
    bh_text_append_bytes(&part, from, length);
    bh_text_append(&part, "");
    if (!part.failed)
        write_lines(b, part.bytes, above, &block->written);
    for (; breaks > 0; breaks--)
        bh_text_append(&block->written, bh_line_break(b->whole));
    block->written.failed = block->written.failed || part.failed;
    bh_text_free(&part);
    return true;
}

bool bh_form_block(bh_bytes whole, const bh_node *node, const char *text, bool all, bh_block *block)
{
    const struct block b = block_of(whole, node);
    const char *first = text + strspn(text, "\n");
    if ((*first == ' ' || *first == '\t') && !b.given)
        return false; /* its blanks would count as indentation */
    end_value(&b, text, &block->value);
    block->from = bh_line_end(whole, node->from);
    block->to = b.end;
    if (block->value.failed)
        return true;
    const bh_bytes old = {node->text, node->length};
    if (block->value.length == old.length &&
        (!old.length || memcmp(block->value.bytes, old.bytes, old.length) == 0)) {
        block->from = block->to; /* the same: not a byte of it is to be another */
        return true;
    }
    if (!all)
        return b.folded && write_changed(&b, old, block);
    write_lines(&b, block->value.bytes, false, &block->written);
    return true;
}
