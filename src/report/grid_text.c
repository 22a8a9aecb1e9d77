/* grid_text.c - a grid as plain text: where it is too wide, what never varies is said above, words
 * are broken at blanks, and what still has no room stands below in a table of its own. */
#include "beamhours/report/grid.h"

#include <stdlib.h>
#include <string.h>

#include "beamhours/report/text_table.h"

/* Columns of words do not become narrower than the first, nor than their longest word, unless that
 * is longer than the second. */
enum { NARROWEST = 12, LONGEST_WORD = 30 };

/* Which columns are shown, and how wide. */
struct layout {
    const bh_grid *grid;
    const char **cell;
    size_t rows, names; /* so many columns at the left name a row */
    bool left_out[BH_MOST_GRID_COLUMNS];
    int width[BH_MOST_GRID_COLUMNS], least[BH_MOST_GRID_COLUMNS];
};

/* Width on a terminal: code points, since names may hold any letters. */
static int cells_wide(const char *text, size_t bytes)
{
    int n = 0;
    for (size_t i = 0; i < bytes; i++)
        n += ((unsigned char)text[i] & 0xC0) != 0x80;
    return n;
}

static int wide(const char *text)
{
    return cells_wide(text, strlen(text));
}

static int at_least(int a, int b)
{
    return a > b ? a : b;
}

static const char *cell_at(const struct layout *l, size_t row, size_t column)
{
    return l->cell[row * l->grid->column_count + column];
}

static int total(const struct layout *l, size_t from, size_t to)
{
    int sum = -1;
    for (size_t c = 0; c < to; c++)
        if (!l->left_out[c] && (c < l->names || c >= from))
            sum += l->width[c] + 1;
    return sum;
}

/* --- what never varies --- */

static bool says_nothing(const char *text)
{
    return text[0] == '\0' || strcmp(text, "-") == 0;
}

/* The one thing that all cells of a column say, or NULL. */
static const char *constant(const struct layout *l, size_t column)
{
    const char *said = NULL;
    for (size_t r = 0; r < l->rows; r++) {
        const char *text = cell_at(l, r, column);
        if (says_nothing(text))
            continue;
        if (said && strcmp(said, text) != 0)
            return NULL;
        said = text;
    }
    return said;
}

static void leave_out(struct layout *l, int width, bh_text *out)
{
    bh_text line = {0};
    for (size_t c = 1;
         c < l->grid->column_count && total(l, l->names, l->grid->column_count) > width; c++) {
        const char *said = constant(l, c);
        const bh_grid_column *column = &l->grid->columns[c];
        if (!said || l->rows < 2)
            continue;
        l->left_out[c] = true;
        bh_text_appendf(&line, "%s%s %s%s%s", line.length ? ", " : "", column->heading, said,
                        strcmp(column->unit, "1") == 0 || !column->unit[0] ? "" : " ",
                        strcmp(column->unit, "1") == 0 ? "" : column->unit);
    }
    if (line.bytes) {
        bh_report_wrapped("in every line: ", line.bytes, width, out);
        bh_text_append(out, "\n");
    }
    out->failed |= line.failed;
    bh_text_free(&line);
}

/* --- words in several lines --- */

/* The widest column of words gives way, one column of the terminal at a time. */
static void narrow(struct layout *l, int width)
{
    while (total(l, l->names, l->grid->column_count) > width) {
        size_t widest = l->grid->column_count;
        for (size_t c = 0; c < l->grid->column_count; c++)
            if (!l->left_out[c] && !l->grid->columns[c].number && !l->grid->columns[c].whole &&
                l->width[c] > l->least[c] &&
                (widest == l->grid->column_count || l->width[c] > l->width[widest]))
                widest = c;
        if (widest == l->grid->column_count)
            return;
        l->width[widest]--;
    }
}

/* Bytes of `text` that go into a line `width` wide, broken at a blank, inside a word where it has
 * none; the blank itself is passed by. */
static size_t line_of(const char *text, int width)
{
    size_t at = 0, blank = 0;
    while (text[at] && cells_wide(text, at + 1) <= width) {
        at++;
        while (((unsigned char)text[at] & 0xC0) == 0x80)
            at++;
        if (text[at] == ' ' || text[at] == '\0')
            blank = at;
    }
    return blank ? blank : at ? at : strlen(text);
}

static void put(const struct layout *l, size_t column, const char *text, size_t bytes, bh_text *out)
{
    const int blanks = at_least(l->width[column] - cells_wide(text, bytes), 0);
    const bool number = l->grid->columns[column].number;
    bh_text_appendf(out, "%*s%.*s%*s", number ? blanks : 0, "", (int)bytes, text,
                    number ? 0 : blanks, "");
}

static void end_line(bh_text *out)
{
    while (out->length && out->bytes[out->length - 1] == ' ')
        out->bytes[--out->length] = '\0';
    bh_text_append(out, "\n");
}

/* One row, in as many lines as its longest cell takes. */
static void row_of(const struct layout *l, const char *const *texts, size_t from, size_t to,
                   bh_text *out)
{
    const char *left[BH_MOST_GRID_COLUMNS];
    bool more = true;
    for (size_t c = 0; c < to; c++)
        left[c] = texts[c];
    while (more) {
        const char *gap = "";
        more = false;
        for (size_t c = 0; c < to; c++) {
            if (l->left_out[c] || (c >= l->names && c < from))
                continue;
            const size_t bytes =
                l->grid->columns[c].number ? strlen(left[c]) : line_of(left[c], l->width[c]);
            bh_text_append(out, gap);
            put(l, c, left[c], bytes, out);
            left[c] += bytes;
            left[c] += *left[c] == ' ';
            more |= *left[c] != '\0';
            gap = " ";
        }
        end_line(out);
    }
}

/* --- tables --- */

static void table_of(const struct layout *l, size_t from, size_t to, bh_text *out)
{
    const char *heads[BH_MOST_GRID_COLUMNS], *units[BH_MOST_GRID_COLUMNS];
    for (size_t c = 0; c < to; c++) {
        heads[c] = l->grid->columns[c].heading;
        units[c] = l->grid->columns[c].unit;
    }
    row_of(l, heads, from, to, out);
    row_of(l, units, from, to, out);
    for (size_t r = 0; r < l->rows; r++)
        row_of(l, &l->cell[r * l->grid->column_count], from, to, out);
}

/* Behind the last column from `from` on that still has room, at least one. */
static size_t behind(const struct layout *l, size_t from, int width)
{
    size_t to = from + 1;
    while (to < l->grid->column_count && total(l, from, to + 1) <= width)
        to++;
    return to;
}

static int longest_word(const char *text)
{
    int most = NARROWEST;
    while (*text) {
        const size_t bytes = strcspn(text, " ");
        most = at_least(most, cells_wide(text, bytes));
        text += bytes + (text[bytes] == ' ');
    }
    return most < LONGEST_WORD ? most : LONGEST_WORD;
}

static void measure(struct layout *l)
{
    const bh_grid *g = l->grid;
    for (size_t c = 0; c < g->column_count; c++) {
        l->width[c] = at_least(wide(g->columns[c].heading), wide(g->columns[c].unit));
        for (size_t r = 0; r < l->rows; r++)
            l->width[c] = at_least(l->width[c], wide(cell_at(l, r, c)));
        for (size_t r = 0; r < l->rows; r++)
            l->least[c] = at_least(l->least[c], longest_word(cell_at(l, r, c)));
    }
}

static void lay_out(struct layout *l, int width, bh_text *out)
{
    const bh_grid *g = l->grid;
    const char *text = g->cells.bytes;
    for (size_t i = 0; i < g->cell_count; i++) {
        l->cell[i] = text;
        text += strlen(text) + 1;
    }
    measure(l);
    leave_out(l, width, out);
    narrow(l, width);
    for (size_t from = l->names; from < g->column_count;) {
        const size_t to = behind(l, from, width);
        bh_text_append(out, from > l->names ? "\n" : "");
        table_of(l, from, to, out);
        from = to;
    }
}

void bh_grid_text(const bh_grid *grid, int width, bh_text *out)
{
    out->failed |= grid->cells.failed;
    if (out->failed || grid->column_count == 0)
        return;
    struct layout *l = calloc(1, sizeof *l);
    const char **cells = calloc(grid->cell_count + 1, sizeof *cells);
    out->failed |= !l || !cells;
    if (!out->failed) {
        l->grid = grid;
        l->cell = cells;
        l->rows = grid->cell_count / grid->column_count;
        l->names = grid->names ? grid->names : 1;
        lay_out(l, at_least(width, BH_LEAST_WIDTH), out);
    }
    free(cells);
    free(l);
}
