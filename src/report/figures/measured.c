/* measured.c - a strict reader: a misspelt heading or a broken number is an error with its place.
 */
#include "beamhours/report/measured.h"

#include <math.h>
#include <stdbool.h>
#include <string.h>

#include "beamhours/base/nearest.h"
#include "beamhours/base/number.h"
#include "beamhours/document/source.h"
#include "beamhours/run/columns.h"

enum { MOST_CELLS = 64 };

enum role { PASSED_BY, IS_X, IS_Y, IS_UNCERTAINTY, IS_RELATIVE, IS_SOURCE, ROLES };

static const char *const role_names[] = {[IS_UNCERTAINTY] = "uncertainty",
                                         [IS_RELATIVE] = "relative_uncertainty",
                                         [IS_SOURCE] = "source"};

struct cell {
    const char *text; /* in the arena, quotes taken off */
    int column;       /* where it begins */
};

/* Where reading stands. */
struct reader {
    const bh_measured_request *request;
    bh_arena *arena;
    bh_error *err;
    const char *at, *end;
    int line, column; /* of `at`; columns are counted in characters */
    int row_line;     /* where the present row began */
    size_t cells;     /* of the present row */
    struct cell cell[MOST_CELLS];
    size_t heads;
    enum role role[MOST_CELLS];
    size_t where[ROLES]; /* number + 1 of the column with that role; 0: none */
    bh_measured_point *point;
    const char **source;
    bh_measured *out;
};

static bh_code at(const struct reader *r, bh_code code, bh_mark mark)
{
    mark.file = r->request->file;
    return bh_fail_at(r->err, code, mark);
}

#define REFUSE(r, line, column, ...) \
    at(r, bh_fail((r)->err, BH_EPLAN, __VA_ARGS__), (bh_mark){NULL, line, column})

static bh_code no_memory(const struct reader *r)
{
    return bh_fail(r->err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
}

/* --- cells --- */

static void step(struct reader *r)
{
    const unsigned char c = (unsigned char)*r->at++;
    if (c == '\n') {
        r->line++;
        r->column = 1;
    } else if ((c & 0xC0) != 0x80) {
        r->column++;
    }
}

static bool line_ends(const struct reader *r)
{
    return r->at == r->end || *r->at == '\n' ||
           (*r->at == '\r' && r->at + 1 < r->end && r->at[1] == '\n');
}

static bh_code quoted(struct reader *r, char *to)
{
    const int line = r->line, column = r->column;
    step(r);
    for (;;) {
        if (r->at == r->end)
            return REFUSE(r, line, column,
                          "the text in quotes that begins here has no end; close it with a quote");
        if (*r->at == '"') {
            step(r);
            if (r->at == r->end || *r->at != '"')
                break;
        }
        *to++ = *r->at;
        step(r);
    }
    if (!line_ends(r) && *r->at != ',')
        return REFUSE(r, r->line, r->column,
                      "something follows the closing quote; write a comma there, or double the "
                      "quotes inside the text");
    return BH_OK;
}

/* Takes blanks at both ends away. */
static char *trimmed(char *text)
{
    while (*text == ' ' || *text == '\t')
        text++;
    size_t n = strlen(text);
    while (n > 0 && (text[n - 1] == ' ' || text[n - 1] == '\t'))
        text[--n] = '\0';
    return text;
}

/* Behind the last character of the cell that begins here. */
static const char *cell_end(const struct reader *r)
{
    const char *stop = r->at;
    if (*stop != '"') {
        while (stop < r->end && *stop != ',' && *stop != '\n')
            stop++;
        return stop;
    }
    for (stop++; stop < r->end; stop++)
        if (*stop == '"' && (stop + 1 == r->end || *++stop != '"'))
            break;
    return stop;
}

static bh_code read_cell(struct reader *r)
{
    if (r->cells == MOST_CELLS)
        return REFUSE(r, r->line, r->column, "a row has more than %d cells; take columns away",
                      MOST_CELLS);
    const bool in_quotes = *r->at == '"';
    char *text = bh_arena_take(r->arena, (size_t)(cell_end(r) - r->at) + 1, 1);
    if (!text)
        return no_memory(r);
    struct cell *c = &r->cell[r->cells++];
    c->column = r->column;
    bh_code bad = BH_OK;
    if (in_quotes)
        bad = quoted(r, text);
    for (char *to = text; !in_quotes && !line_ends(r) && *r->at != ','; step(r))
        *to++ = *r->at;
    c->text = trimmed(text);
    return bad;
}

/* Reads the cells of the next line that is not blank; none at the end of the file. */
static bh_code read_row(struct reader *r)
{
    static const char empty[] = "";
    r->cells = 0;
    while (r->at < r->end && line_ends(r))
        step(r);
    r->row_line = r->line;
    while (r->at < r->end) {
        const bh_code bad = read_cell(r);
        if (bad)
            return bad;
        if (line_ends(r))
            return BH_OK;
        step(r); /* the comma */
        if (line_ends(r) && r->cells < MOST_CELLS)
            r->cell[r->cells++] = (struct cell){.text = empty, .column = r->column};
        if (line_ends(r))
            return BH_OK;
    }
    return BH_OK;
}

/* --- the header --- */

static enum role role_of(const struct reader *r, const char *name)
{
    if (strcmp(name, r->request->x_key) == 0)
        return IS_X;
    if (strcmp(name, r->request->y_key) == 0)
        return IS_Y;
    for (int i = IS_UNCERTAINTY; i < ROLES; i++)
        if (strcmp(name, role_names[i]) == 0)
            return (enum role)i;
    return bh_column_find(name) >= 0 ? PASSED_BY : ROLES;
}

static bh_code unknown_head(struct reader *r, const struct cell *c)
{
    const char *names[] = {r->request->x_key, r->request->y_key, role_names[IS_UNCERTAINTY],
                           role_names[IS_RELATIVE], role_names[IS_SOURCE]};
    if (r->cells == 1 && strchr(c->text, ';'))
        return REFUSE(r, r->row_line, c->column,
                      "semicolons stand between the headings; write commas");
    const char *near = bh_nearest(c->text, names, 5);
    return REFUSE(r, r->row_line, c->column,
                  "no heading \"%.60s\" is known; %s%s%s%s, %s, uncertainty or "
                  "relative_uncertainty, and source would do",
                  c->text, near ? "did you mean " : "", near ? near : "", near ? "? " : "",
                  r->request->x_key, r->request->y_key);
}

static bh_code missing(struct reader *r, const char *key)
{
    return REFUSE(r, r->row_line, 1, "no column has the heading %s; write one", key);
}

static bh_code read_header(struct reader *r)
{
    bh_code bad = read_row(r);
    if (bad)
        return bad;
    if (r->cells == 0)
        return REFUSE(r, 0, 0,
                      "the file is empty; its first line names the columns: %s,%s,"
                      "uncertainty,source",
                      r->request->x_key, r->request->y_key);
    r->heads = r->cells;
    for (size_t i = 0; i < r->cells; i++) {
        const struct cell *c = &r->cell[i];
        const enum role role = role_of(r, c->text);
        if (role == ROLES)
            return unknown_head(r, c);
        if (role != PASSED_BY && r->where[role])
            return REFUSE(r, r->row_line, c->column,
                          "a second column has the heading %s; take one away", c->text);
        r->role[i] = role;
        r->where[role] = i + 1;
    }
    if (!r->where[IS_X])
        return missing(r, r->request->x_key);
    if (!r->where[IS_Y])
        return missing(r, r->request->y_key);
    if (r->where[IS_UNCERTAINTY] && r->where[IS_RELATIVE])
        return REFUSE(r, r->row_line, r->cell[r->where[IS_RELATIVE] - 1].column,
                      "both uncertainty and relative_uncertainty are given; take one away");
    return BH_OK;
}

/* --- rows --- */

/* The number in the column with `role`; untouched where there is no such column. */
static bh_code number(struct reader *r, enum role role, double *out)
{
    if (!r->where[role])
        return BH_OK;
    const struct cell *c = &r->cell[r->where[role] - 1];
    const char *end = NULL;
    if (!bh_number_parse(c->text, &end, out) && *end == '\0')
        return BH_OK;
    const char *name = role == IS_X   ? r->request->x_key
                       : role == IS_Y ? r->request->y_key
                                      : role_names[role];
    if (!c->text[0])
        return REFUSE(r, r->row_line, c->column, "%s is empty; write a number", name);
    return REFUSE(r, r->row_line, c->column,
                  "%s: \"%.40s\" is no number; write one with a decimal point, such as 1.5e-3",
                  name, c->text);
}

static bh_code source(struct reader *r, size_t *out)
{
    const struct cell *c = r->where[IS_SOURCE] ? &r->cell[r->where[IS_SOURCE] - 1] : NULL;
    const char *name = c ? c->text : "";
    for (*out = 0; *out < r->out->source_count; ++*out)
        if (strcmp(r->source[*out], name) == 0)
            return BH_OK;
    if (r->out->source_count == BH_MOST_SOURCES)
        return REFUSE(r, r->row_line, c ? c->column : 1,
                      "\"%.60s\" is source number %d; only %d can be told apart, so name fewer",
                      name, BH_MOST_SOURCES + 1, BH_MOST_SOURCES);
    r->source[r->out->source_count++] = name;
    return BH_OK;
}

static bh_code read_point(struct reader *r)
{
    bh_measured_point p = {.uncertainty = 0.0};
    double relative = 0.0;
    if (r->cells != r->heads)
        return REFUSE(r, r->row_line, r->cell[r->cells - 1].column,
                      "the row has %zu cells, the header %zu; write as many, with nothing between "
                      "two commas for an empty one",
                      r->cells, r->heads);
    bh_code bad = number(r, IS_X, &p.x);
    bad = bad ? bad : number(r, IS_Y, &p.y);
    bad = bad ? bad : number(r, IS_UNCERTAINTY, &p.uncertainty);
    bad = bad ? bad : number(r, IS_RELATIVE, &relative);
    bad = bad ? bad : source(r, &p.source);
    if (bad)
        return bad;
    if (!(p.uncertainty >= 0.0) || !(relative >= 0.0)) {
        const enum role role = relative < 0.0 ? IS_RELATIVE : IS_UNCERTAINTY;
        return REFUSE(r, r->row_line, r->cell[r->where[role] - 1].column,
                      "%s is below 0; write its size without a sign", role_names[role]);
    }
    if (r->where[IS_RELATIVE])
        p.uncertainty = relative * fabs(p.y);
    if (r->out->count == BH_MOST_MEASURED)
        return REFUSE(r, r->row_line, 1, "the table has more than %d rows; draw fewer",
                      BH_MOST_MEASURED);
    r->point[r->out->count++] = p;
    return BH_OK;
}

static bh_code check_text(struct reader *r, const char *text, size_t length)
{
    const char *bad = text, *const end = text + length;
    uint32_t point;
    size_t n = 1;
    while (bad < end && *bad && (n = bh_utf8_read(bad, (size_t)(end - bad), &point)) > 0)
        bad += n;
    if (bad == end)
        return BH_OK;
    while (r->at < bad)
        step(r);
    return REFUSE(r, r->line, r->column,
                  "the byte 0x%02X is not UTF-8 text; save the file as UTF-8", (unsigned char)*bad);
}

static bh_code make_room(struct reader *r)
{
    size_t lines = 1;
    for (const char *c = r->at; c < r->end; c++)
        lines += *c == '\n';
    r->point = bh_arena_take(r->arena, lines < BH_MOST_MEASURED ? lines : BH_MOST_MEASURED,
                             sizeof *r->point);
    r->source = bh_arena_take(r->arena, BH_MOST_SOURCES, sizeof *r->source);
    r->out->point = r->point;
    r->out->source = r->source;
    return r->point && r->source ? BH_OK : no_memory(r);
}

static bh_code read_points(struct reader *r)
{
    for (;;) {
        bh_code bad = read_row(r);
        if (bad || r->cells == 0)
            return bad;
        bad = read_point(r);
        if (bad)
            return bad;
    }
}

static bh_code read_all(struct reader *r)
{
    bh_code bad = check_text(r, r->at, (size_t)(r->end - r->at));
    bad = bad ? bad : make_room(r);
    bad = bad ? bad : read_header(r);
    bad = bad ? bad : read_points(r);
    if (!bad && r->out->count == 0)
        bad = REFUSE(r, r->row_line, 0, "there is no row below the header; write a point a line");
    return bad;
}

bh_code bh_measured_read(const bh_measured_request *request, bh_arena *arena, bh_measured *out,
                         bh_error *err)
{
    static const char mark[] = "\xEF\xBB\xBF"; /* some programs begin a file with it */
    const size_t skip = request->length >= 3 && memcmp(request->text, mark, 3) == 0 ? 3 : 0;
    struct reader r = {.request = request,
                       .arena = arena,
                       .err = err,
                       .at = request->text + skip,
                       .end = request->text + request->length,
                       .line = 1,
                       .column = 1,
                       .out = out};
    *out = (bh_measured){.count = 0};
    const bh_code bad = read_all(&r);
    if (bad)
        *out = (bh_measured){.count = 0};
    return bad;
}
