/* paper_grid.c - tables on pages: one that does not fit goes on with its headings on the next. */
#include "beamhours/report/paper_leaf.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/report/power.h"

enum { MOST_COLUMNS = 64 };

static const double largest_cell = 8.0, least_cell = 5.0; /* [pt] of the letters in tables */
static const double cell_gap = 7.0;                       /* [pt] between columns */
static const double caption_size = 8.5;                   /* [pt] */

struct grid {
    const bh_paper_table *t;
    double width[MOST_COLUMNS]; /* [pt] */
    double total;               /* [pt] with the gaps */
};

static double text_width(const bh_leaf *s, const char *text, bool bold)
{
    int width = 0;
    (void)bh_leaf_prepare(s, text, bold, 0.0);
    pango_layout_get_size(s->pen.text, &width, NULL);
    return (double)width / PANGO_SCALE;
}

static const char *cell_at(const bh_paper_table *t, size_t row, size_t column)
{
    return t->cells[row * t->column_count + column];
}

/* Only the cell with the most bytes is measured: letters of one font differ less than that. */
static double natural(const bh_leaf *s, const bh_paper_table *t, size_t column)
{
    double most = fmax(text_width(s, t->columns[column].heading, true),
                       text_width(s, t->columns[column].unit, false));
    size_t longest = 0;
    for (size_t r = 0; r < t->row_count; r++) {
        const size_t n = strlen(cell_at(t, r, column));
        if (n < longest || (n == longest && r > 0 && t->row_count > 100))
            continue;
        longest = n;
        most = fmax(most, text_width(s, cell_at(t, r, column), false));
    }
    return most + 0.5;
}

/* [pt] that columns of words take where none is wider than `most`. */
static double words_wide(const struct grid *g, double most)
{
    double sum = 0.0;
    for (size_t c = 0; c < g->t->column_count; c++)
        if (!g->t->columns[c].number)
            sum += fmin(g->width[c], most);
    return sum;
}

/* The widest columns of words give way until the table fits; false where they have not the room. */
static bool fit(const bh_leaf *s, struct grid *g)
{
    enum { HALVINGS = 24 };
    const size_t n = g->t->column_count;
    double left = bh_leaf_inside(s) - cell_gap * (double)(n - 1);
    for (size_t c = 0; c < n; c++) {
        g->width[c] = natural(s, g->t, c);
        left -= g->t->columns[c].number ? g->width[c] : 0.0;
    }
    double low = 0.0, most = bh_leaf_inside(s);
    for (int i = 0; i < HALVINGS && words_wide(g, bh_leaf_inside(s)) > left; i++) {
        const double middle = 0.5 * (low + most);
        if (words_wide(g, middle) > left)
            most = middle;
        else
            low = middle;
    }
    g->total = cell_gap * (double)(n - 1);
    for (size_t c = 0; c < n; c++) {
        if (!g->t->columns[c].number)
            g->width[c] = fmin(g->width[c], most);
        g->total += g->width[c];
    }
    return most > 60.0 && left > 0.0;
}

static void rule(const bh_leaf *s, double long_, double thick)
{
    bh_pen_stroke(&s->pen, &(bh_stroke){BH_LEAF_MARGIN, s->y, BH_LEAF_MARGIN + long_, s->y, thick});
}

/* What stands in a row: cells, headings or units. */
static const char *in_row(const bh_paper_table *t, long row, size_t column)
{
    if (row >= 0)
        return cell_at(t, (size_t)row, column);
    return row == -2 ? t->columns[column].heading : t->columns[column].unit;
}

static double row_height(const bh_leaf *s, const struct grid *g, long row)
{
    double most = 0.0;
    for (size_t c = 0; c < g->t->column_count; c++) {
        const bool wraps = !g->t->columns[c].number;
        const char *text = in_row(g->t, row, c);
        if (wraps || c == 0)
            most = fmax(most, bh_leaf_prepare(s, text[0] ? text : "x", row == -2,
                                              wraps ? g->width[c] + 0.1 : 0.0));
    }
    return most + 1.5;
}

static void draw_row(bh_leaf *s, const struct grid *g, long row)
{
    double x = BH_LEAF_MARGIN;
    const double high = row_height(s, g, row);
    for (size_t c = 0; c < g->t->column_count; c++) {
        const bool number = g->t->columns[c].number;
        const char *text = in_row(g->t, row, c);
        (void)bh_leaf_prepare(s, text, row == -2, number ? 0.0 : g->width[c] + 0.1);
        int width = 0;
        pango_layout_get_size(s->pen.text, &width, NULL);
        bh_leaf_show(s, number ? x + g->width[c] - (double)width / PANGO_SCALE : x, s->y);
        x += g->width[c] + cell_gap;
    }
    s->y += high;
}

static bool has_units(const bh_paper_table *t)
{
    for (size_t c = 0; c < t->column_count; c++)
        if (t->columns[c].unit[0])
            return true;
    return false;
}

static void headings(bh_leaf *s, const struct grid *g)
{
    rule(s, g->total, 1.0);
    s->y += 2.0;
    draw_row(s, g, -2);
    if (has_units(g->t))
        draw_row(s, g, -1);
    s->y += 1.0;
    rule(s, g->total, 0.5);
    s->y += 2.0;
}

static void rows(bh_leaf *s, const struct grid *g)
{
    for (size_t r = 0; r < g->t->row_count; r++) {
        if (bh_leaf_room(s) < row_height(s, g, (long)r)) {
            rule(s, g->total, 0.5);
            bh_leaf_next_page(s);
            headings(s, g);
        }
        draw_row(s, g, (long)r);
    }
    rule(s, g->total, 1.0);
}

/* [pt] at least, before a table begins on a page: all of a short one. */
static double needed(const bh_leaf *s, const struct grid *g)
{
    enum { SHORT = 16 };
    double high = 80.0; /* caption and headings */
    if (g->t->row_count > SHORT)
        return 100.0;
    for (size_t r = 0; r < g->t->row_count; r++)
        high += row_height(s, g, (long)r);
    return fmin(high, s->high - 2.0 * BH_LEAF_MARGIN);
}

/* The cells with raised digits, in one text that ends each with a 0; false without memory. */
static bool raise_powers(const bh_paper_table *t, bh_text *bytes, const char **cells)
{
    const size_t count = t->row_count * t->column_count;
    for (size_t i = 0; i < count; i++) {
        bh_power_raise(t->cells[i], bytes);
        bh_text_append_bytes(bytes, "", 1);
    }
    const char *at = bytes->bytes;
    for (size_t i = 0; i < count && !bytes->failed; i++, at += strlen(at) + 1)
        cells[i] = at;
    return !bytes->failed;
}

static void draw_table(bh_leaf *s, const bh_block *b, const bh_paper_table *shown)
{
    struct grid g = {.t = shown};
    bh_text caption = {0};
    bh_text_appendf(&caption, "Table %d. %s", b->number, b->text);
    s->size = largest_cell;
    while (!fit(s, &g) && s->size > least_cell)
        s->size -= 0.25;
    const double size = s->size;
    s->y += 4.0;
    bh_leaf_need(s, needed(s, &g));
    s->size = caption_size;
    bh_leaf_paragraph(s, caption.bytes ? caption.bytes : "", true, 0.0);
    bh_text_free(&caption);
    s->y += 3.0;
    s->size = size;
    headings(s, &g);
    rows(s, &g);
    s->y += 10.0;
}

bool bh_leaf_table(bh_leaf *s, const bh_block *b)
{
    bh_paper_table shown = *b->table;
    bh_text bytes = {0};
    const char **cells = calloc(shown.row_count * shown.column_count + 1, sizeof *cells);
    const bool raised = cells && raise_powers(b->table, &bytes, cells);
    shown.cells = cells;
    if (raised && shown.column_count <= MOST_COLUMNS)
        draw_table(s, b, &shown);
    free(cells);
    bh_text_free(&bytes);
    return raised;
}
