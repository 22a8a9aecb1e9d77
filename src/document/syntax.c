/* syntax.c - what the YAML parser complains of, in words that help whoever wrote the file.
 *
 * The parser's own sentence tells the rule that was broken; what was probably meant follows from
 * the text around the place. */
#include "beamhours/document/syntax.h"

#include <string.h>

#include "beamhours/base/sentences.h"

enum { EXCERPT = 48, SNIPPET = 24 };

/* A fault while it is being told. */
struct fault {
    bh_cursor problem, context; /* where the parser stopped; where what it was reading began */
    bh_mark open;               /* as in bh_syntax_say */
    const char *key;
    bh_diags *diags;
};

#define SAY(fault, place, ...) \
    bh_diags_add((fault)->diags, BH_SEVERITY_ERROR, (place)->at, (fault)->key, __VA_ARGS__)

/* --- looking around --- */

static size_t line_start(const bh_cursor *c, size_t byte)
{
    while (byte > 0 && c->bytes[byte - 1] != '\n')
        byte--;
    return byte;
}

static size_t skip_blanks(const bh_cursor *c, size_t byte)
{
    while (byte < c->length && (c->bytes[byte] == ' ' || c->bytes[byte] == '\t'))
        byte++;
    return byte;
}

static bool tab_indented(const bh_cursor *c)
{
    const size_t start = line_start(c, c->byte);
    return memchr(c->bytes + start, '\t', skip_blanks(c, start) - start) != NULL;
}

static bool is_line_end(char c)
{
    return c == '\n' || c == '\r';
}

/* Is there a colon with a blank behind it between `from` and `to`? */
static bool has_colon(const bh_cursor *c, size_t from, size_t to)
{
    for (size_t i = from; i + 1 < to; i++)
        if (c->bytes[i] == ':' && (c->bytes[i + 1] == ' ' || c->bytes[i + 1] == '\t'))
            return true;
    return false;
}

/* The last character before the place that is not blank, on the same line; NUL when it begins the
 * line. */
static char before(const bh_cursor *c)
{
    size_t i = c->byte;
    while (i > 0 && (c->bytes[i - 1] == ' ' || c->bytes[i - 1] == '\t'))
        i--;
    if (i == 0 || c->bytes[i - 1] == '\n')
        return '\0';
    return c->bytes[i - 1];
}

/* The first text of the last line above that is not empty; the place itself when there is none. */
static bh_cursor line_above(const bh_cursor *c)
{
    bh_cursor above = *c;
    for (size_t line = (size_t)c->at.line - 1; line-- > 0;) {
        bh_cursor_go(&above, line, 0);
        const size_t text = skip_blanks(&above, above.byte);
        if (text < above.length && !is_line_end(above.bytes[text])) {
            bh_cursor_go(&above, line, text - above.byte);
            return above;
        }
    }
    return *c;
}

static size_t indentation(const bh_cursor *c)
{
    const size_t start = line_start(c, c->byte);
    return skip_blanks(c, start) - start;
}

/* Up to a line from `from` on; the end of the file has words of its own. */
static void excerpt(const bh_cursor *c, size_t from, char *out, size_t size)
{
    bh_source_excerpt(c, from, c->length, out, size);
    if (from == c->length)
        memcpy(out, "the end", sizeof "the end");
    else if (out[0] == '\0')
        memcpy(out, "the line's end", sizeof "the line's end");
}

/* The character at the place alone. */
static void character(const bh_cursor *c, char *out, size_t size)
{
    uint32_t point = 0;
    const size_t width = bh_utf8_read(c->bytes + c->byte, c->length - c->byte, &point);
    bh_source_excerpt(c, c->byte, c->byte + width, out, size);
}

/* --- one function for each kind of fault --- */

static void say_no_colon(const struct fault *f, const bh_cursor *where)
{
    char text[EXCERPT];
    excerpt(where, where->byte, text, sizeof text);
    SAY(f, where, BH_SAY_NO_COLON, text);
}

static void key_without_colon(const struct fault *f)
{
    say_no_colon(f, &f->context);
}

static void misplaced_colon(const struct fault *f)
{
    const bh_cursor *c = &f->problem;
    const size_t start = line_start(c, c->byte), text = skip_blanks(c, start);
    char line[EXCERPT];
    if (tab_indented(c)) {
        SAY(f, c, BH_SAY_TAB);
    } else if (has_colon(c, text, c->byte)) {
        excerpt(c, text, line, sizeof line);
        SAY(f, c, BH_SAY_SECOND_COLON, line);
    } else {
        const bh_cursor above = line_above(c);
        bh_cursor here = *c;
        bh_cursor_go(&here, (size_t)c->at.line - 1, text - start);
        if (indentation(&above) < indentation(c))
            SAY(f, &here, BH_SAY_DEEPER);
        else
            say_no_colon(f, &above);
    }
}

static void open_quote(const struct fault *f)
{
    SAY(f, &f->context, BH_SAY_QUOTE_OPEN);
}

/* Shows `length` bytes from the backslash on, which stands `back` before the place. */
static void escape(const struct fault *f, size_t back, size_t length)
{
    char text[SNIPPET];
    const size_t from = f->problem.byte - back;
    bh_source_excerpt(&f->problem, from, from + length, text, sizeof text);
    SAY(f, &f->problem, BH_SAY_ESCAPE, text);
}

static void bad_escape(const struct fault *f)
{
    uint32_t point = 0;
    const char *behind = f->problem.bytes + f->problem.byte + 1;
    escape(f, 0, 1 + bh_utf8_read(behind, f->problem.length - f->problem.byte - 1, &point));
}

static void bad_hexadecimal(const struct fault *f) /* behind \x, \u or \U */
{
    escape(f, 2, 2);
}

static void tab(const struct fault *f)
{
    SAY(f, &f->problem, BH_SAY_TAB);
}

static void bad_first(const struct fault *f, const bh_cursor *c)
{
    char text[SNIPPET];
    if (c->byte < c->length && c->bytes[c->byte] == '\t') {
        SAY(f, c, BH_SAY_TAB);
        return;
    }
    character(c, text, sizeof text);
    SAY(f, c, BH_SAY_CHARACTER, text);
}

static void bad_character(const struct fault *f)
{
    bad_first(f, &f->problem);
}

static void bad_name(const struct fault *f) /* behind & or * */
{
    bad_first(f, &f->context);
}

static void misplaced_dash(const struct fault *f)
{
    SAY(f, &f->problem, BH_SAY_DASH);
}

/* Do the bytes at the place begin with `sign` and a blank? */
static bool stands(const bh_cursor *c, char sign)
{
    const char *text = c->bytes + c->byte;
    return text[0] == sign && (text[1] == ' ' || text[1] == '\t' || is_line_end(text[1]));
}

/* Is it a list item among keys, or a key among list items? */
static bool mixed(const bh_cursor *c)
{
    const bh_cursor above = line_above(c);
    return above.byte < c->byte && indentation(&above) == indentation(c) &&
           stands(&above, '-') != stands(c, '-');
}

/* What stands where the parser waited for the next key or item. */
static void not_lined_up(const struct fault *f)
{
    const bh_cursor *c = &f->problem, above = line_above(c);
    const char last = before(c);
    char text[EXCERPT];
    excerpt(c, c->byte, text, sizeof text);
    if (stands(c, ':'))
        SAY(f, c, BH_SAY_KEY_EMPTY);
    else if (last && strchr("\"']}", last))
        SAY(f, c, BH_SAY_AFTER_VALUE, text);
    else if (tab_indented(c))
        SAY(f, c, BH_SAY_TAB);
    else if (above.bytes[line_start(&above, above.byte)] == '%')
        SAY(f, &above, BH_SAY_DIRECTIVE);
    else if (strncmp(above.bytes + above.byte, "...", 3) == 0)
        SAY(f, c, BH_SAY_SECOND_DOCUMENT);
    else if (mixed(c))
        SAY(f, c, BH_SAY_MIXED, text);
    else
        SAY(f, c, BH_SAY_LINED_UP);
}

static void bracket_at(const struct fault *f, const bh_cursor *bracket)
{
    const bool here = bracket->at.line == f->problem.at.line;
    const char opening = bracket->bytes[bracket->byte];
    char text[EXCERPT];
    excerpt(&f->problem, f->problem.byte, text, sizeof text);
    SAY(f, here ? &f->problem : bracket, BH_SAY_BRACKET_OPEN, opening, bracket->at.line, text,
        opening == '[' ? ']' : '}');
}

static void open_bracket(const struct fault *f)
{
    bracket_at(f, &f->context);
}

static void no_value(const struct fault *f)
{
    char text[SNIPPET];
    bh_cursor bracket = f->problem;
    if (f->open.line > 0)
        bh_cursor_go(&bracket, (size_t)f->open.line - 1, (size_t)f->open.column - 1);
    if (f->problem.byte == f->problem.length && strchr("[{", bracket.bytes[bracket.byte])) {
        bracket_at(f, &bracket);
        return;
    }
    excerpt(&f->problem, f->problem.byte, text, sizeof text);
    if (stands(&f->problem, ':'))
        SAY(f, &f->problem, BH_SAY_KEY_EMPTY);
    else
        SAY(f, &f->problem, BH_SAY_NO_VALUE_HERE, text);
}

static void tight_colon(const struct fault *f)
{
    SAY(f, &f->problem, BH_SAY_COLON_TIGHT);
}

static void tag(const struct fault *f)
{
    char text[SNIPPET];
    excerpt(&f->context, f->context.byte, text, sizeof text);
    SAY(f, &f->context, BH_SAY_TAG, text);
}

static void directive(const struct fault *f)
{
    SAY(f, &f->context, BH_SAY_DIRECTIVE);
}

static void block_header(const struct fault *f)
{
    char text[SNIPPET];
    excerpt(&f->problem, f->problem.byte, text, sizeof text);
    SAY(f, &f->problem, BH_SAY_BLOCK_HEADER, text);
}

/* The first row whose words begin both of the parser's sentences; the last row fits all. */
static const struct {
    const char *problem, *context;
    void (*say)(const struct fault *);
} rows[] = {
    {"", "while scanning a directive", directive},
    {"", "while scanning a %", directive},
    {"", "while parsing a %", directive},
    {"", "while scanning a tag directive", directive},
    {"", "while parsing a tag directive", directive},
    {"found duplicate %", "", directive},
    {"found incompatible YAML", "", directive},
    {"", "while scanning a tag", tag},
    {"", "while parsing a tag", tag},
    {"found undefined tag", "", tag},
    {"found unexpected end of stream", "", open_quote},
    {"found unexpected document indicator", "", open_quote},
    {"found unknown escape", "", bad_escape},
    {"", "while parsing a quoted scalar", bad_hexadecimal},
    {"found a tab character", "", tab},
    {"found character that cannot start", "", bad_character},
    {"mapping keys are not allowed", "", bad_character},
    {"", "while scanning an anchor", bad_name},
    {"", "while scanning an alias", bad_name},
    {"mapping values are not allowed", "", misplaced_colon},
    {"block sequence entries are not allowed", "", misplaced_dash},
    {"could not find expected ':'", "", key_without_colon},
    {"found unexpected ':'", "", tight_colon},
    {"", "while scanning a block scalar", block_header},
    {"", "while parsing a flow sequence", open_bracket},
    {"", "while parsing a flow mapping", open_bracket},
    {"did not find expected node content", "", no_value},
    {"", "", not_lined_up},
};

static bool begins(const char *text, const char *with)
{
    return strncmp(text ? text : "", with, strlen(with)) == 0;
}

void bh_syntax_say(const yaml_parser_t *parser, bh_cursor cursor, bh_mark open, const char *key,
                   bh_diags *diags)
{
    if (parser->error == YAML_MEMORY_ERROR) {
        bh_diags_lose(diags);
        return;
    }
    struct fault f = {cursor, cursor, open, key, diags};
    const yaml_mark_t *context = parser->context ? &parser->context_mark : &parser->problem_mark;
    bh_cursor_go(&f.context, context->line, context->column);
    bh_cursor_go(&f.problem, parser->problem_mark.line, parser->problem_mark.column);
    size_t i = 0;
    while (!begins(parser->problem, rows[i].problem) || !begins(parser->context, rows[i].context))
        i++;
    rows[i].say(&f);
}
