/* text_table.c - lays the table out: which columns fit, how wide each is. */
#include "beamhours/report/text_table.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/report/prefix.h"

enum { NARROWEST = 80, BASE = 15, FEWEST = 3 };

/* What 80 columns hold; a column whose rows all agree is left to the title. */
static const int base[BASE] = {
    BH_COL_SETTING,      BH_COL_ARM,   BH_COL_BIN,   BH_COL_PARTICLE,      BH_COL_TARGET,
    BH_COL_BEAM_KINETIC, BH_COL_ANGLE, BH_COL_Q2,    BH_COL_CROSS_SECTION, BH_COL_SIGNAL,
    BH_COL_BACKGROUND,   BH_COL_LIVE,  BH_COL_HOURS, BH_COL_COUNTS,        BH_COL_STATISTICAL};

/* What more width adds, in this order. */
static const int extra[] = {
    BH_COL_EPSILON,      BH_COL_SCATTERED_MOMENTUM,  BH_COL_HOURS_TO_GOAL, BH_COL_KEPT,
    BH_COL_RADIATIVE,    BH_COL_POINT_CROSS_SECTION, BH_COL_LUMINOSITY,    BH_COL_PER_MRAD,
    BH_COL_PER_PERMILLE, BH_COL_RECOIL_KINETIC,      BH_COL_RECOIL_ANGLE,  BH_COL_SYSTEMATIC};

struct layout {
    size_t count;
    bh_shown_column shown[BH_COLUMN_COUNT];
    int width[BH_COLUMN_COUNT]; /* [columns] of the terminal */
};

/* Width on a terminal: code points, since names may hold any letters. */
static int cells_wide(const char *text)
{
    int n = 0;
    for (; *text; text++)
        n += ((unsigned char)*text & 0xC0) != 0x80;
    return n;
}

static int at_least(int a, int b)
{
    return a > b ? a : b;
}

static int column_width(const bh_selection *view, const bh_selection *other,
                        const bh_shown_column *column)
{
    char text[BH_CELL_SIZE];
    int width =
        at_least(cells_wide(bh_column_at(column->column)->heading), cells_wide(column->unit));
    for (size_t i = 0; i < view->row_count; i++) {
        bh_prefix_print(view, i, column, text);
        width = at_least(width, cells_wide(text));
    }
    for (size_t i = 0; other && i < other->row_count; i++) {
        bh_prefix_print(other, i, column, text);
        width = at_least(width, cells_wide(text));
    }
    return width;
}

static int total_width(const struct layout *l)
{
    int total = 0;
    for (size_t i = 0; i < l->count; i++)
        total += l->width[i] + (i ? 1 : 0);
    return total;
}

static void add(struct layout *l, const bh_selection *view, const bh_selection *other, int column)
{
    l->shown[l->count] = bh_prefix_scale(view, other, column);
    l->width[l->count] = column_width(view, other, &l->shown[l->count]);
    l->count++;
}

/* Names and energies that never change are said once, above. */
static bool said_above(const bh_selection *view, int column)
{
    return column == BH_COL_BIN ? !view->bins
                                : (column == BH_COL_ARM || column == BH_COL_PARTICLE ||
                                   column == BH_COL_TARGET || column == BH_COL_BEAM_KINETIC) &&
                                      bh_prefix_constant(view, column);
}

static bool is_empty(const bh_selection *view, int column)
{
    for (size_t i = 0; i < view->row_count; i++)
        if (!isnan(bh_selection_number(view, i, column)))
            return false;
    return true;
}

/* One digit less wherever that leaves three: the last means of keeping to the width. */
static void tighten(struct layout *l, const bh_selection *view, const bh_selection *other)
{
    for (size_t i = 0; i < l->count; i++)
        if (l->shown[i].digits > FEWEST && l->shown[i].column != BH_COL_ANGLE &&
            l->shown[i].column != BH_COL_BEAM_KINETIC) {
            l->shown[i].digits = FEWEST;
            l->width[i] = column_width(view, other, &l->shown[i]);
        }
}

static void choose(struct layout *l, const bh_selection *view, const bh_selection *other, int width)
{
    if (view->column_count) {
        for (size_t i = 0; i < view->column_count; i++)
            add(l, view, other, view->columns[i]);
        return;
    }
    for (size_t i = 0; i < BASE; i++)
        if (!said_above(view, base[i]))
            add(l, view, other, base[i]);
    if (total_width(l) > width) {
        tighten(l, view, other);
        return;
    }
    for (size_t i = 0; i < sizeof extra / sizeof extra[0]; i++) {
        if (is_empty(view, extra[i]) && (!other || is_empty(other, extra[i])))
            continue;
        add(l, view, other, extra[i]);
        if (total_width(l) > width) {
            l->count--;
            break;
        }
    }
}

size_t bh_report_text_columns(const bh_selection *before, const bh_selection *view, int width,
                              bh_shown_column *out)
{
    struct layout l = {0};
    choose(&l, view, before, width);
    memcpy(out, l.shown, l.count * sizeof *out);
    return l.count;
}

static bool is_name(int column)
{
    return bh_column_at(column)->kind == BH_CELL_TEXT;
}

static void put(const char *text, int width, bool left, bool last, bh_text *out)
{
    const int blanks = width - cells_wide(text);
    if (left)
        bh_text_appendf(out, "%s%*s", text, last ? 0 : blanks, "");
    else
        bh_text_appendf(out, "%*s%s", blanks, "", text);
}

static void line(const struct layout *l, const bh_selection *view, size_t row, bh_text *out)
{
    char text[BH_CELL_SIZE];
    for (size_t i = 0; i < l->count; i++) {
        bh_prefix_print(view, row, &l->shown[i], text);
        bh_text_append(out, i ? " " : "");
        put(text, l->width[i], is_name(l->shown[i].column), i + 1 == l->count, out);
    }
    bh_text_append(out, "\n");
}

static void headings(const struct layout *l, const char *lead, bh_text *out)
{
    for (int row = 0; row < 2; row++) {
        bh_text_append(out, lead);
        for (size_t i = 0; i < l->count; i++) {
            const bh_column *column = bh_column_at(l->shown[i].column);
            bh_text_append(out, i ? " " : "");
            put(row ? l->shown[i].unit : column->heading, l->width[i], is_name(l->shown[i].column),
                i + 1 == l->count, out);
        }
        while (out->length && out->bytes[out->length - 1] == ' ')
            out->bytes[--out->length] = '\0';
        bh_text_append(out, "\n");
    }
}

void bh_report_text(const bh_selection *view, int width, bh_text *out)
{
    struct layout l = {0};
    const int wide = at_least(width, NARROWEST);
    choose(&l, view, NULL, wide);
    bh_report_text_inputs(view, wide, out);
    headings(&l, "", out);
    for (size_t row = 0; row < view->row_count; row++)
        line(&l, view, row, out);
    bh_text_append(out, "\n");
    bh_report_text_totals(view->table, wide, out);
    bh_report_text_cautions(view->table, wide, out);
}

/* The row of `in` for the same arm, bin and setting as the i-th of `of`; its count when there is
 * none: a change may add settings or put rows in another order. */
static size_t counterpart(const bh_selection *of, size_t i, const bh_selection *in)
{
    static const int names[] = {BH_COL_SETTING, BH_COL_ARM};
    const int bin = bh_table_place(of->table, of->bins, of->rows[i]).bin;
    for (size_t k = 0; k < in->row_count; k++) {
        bool same = bh_table_place(in->table, in->bins, in->rows[k]).bin == bin;
        for (size_t n = 0; same && n < sizeof names / sizeof names[0]; n++)
            same =
                strcmp(bh_selection_text(of, i, names[n]), bh_selection_text(in, k, names[n])) == 0;
        if (same)
            return k;
    }
    return in->row_count;
}

/* "signal +50.0 %, hours -33.3 %": how far a row moved from the i-th before to the k-th after. */
static void moved(const bh_selection *before, size_t i, const bh_selection *after, size_t k,
                  bh_text *out)
{
    static const struct {
        int column;
        const char *name;
    } watched[] = {
        {BH_COL_SIGNAL, "signal"}, {BH_COL_HOURS, "hours"}, {BH_COL_STATISTICAL, "stat"}};
    const char *lead = "       ";
    for (size_t w = 0; w < sizeof watched / sizeof watched[0]; w++) {
        const double a = bh_selection_number(before, i, watched[w].column);
        const double b = bh_selection_number(after, k, watched[w].column);
        if (!(a > 0.0) || !isfinite(b))
            continue;
        char number[BH_NUMBER_SIZE];
        const double change = 100.0 * (b / a - 1.0);
        (void)bh_number_digits(change, 3, number, sizeof number);
        if (fabs(change) < 5e-4)
            bh_text_appendf(out, "%s%s as before", lead, watched[w].name);
        else
            bh_text_appendf(out, "%s%s %s%s %%", lead, watched[w].name, change > 0.0 ? "+" : "",
                            number);
        lead = ", ";
    }
    if (lead[0] == ',')
        bh_text_append(out, "\n");
}

static void pairs(const struct layout *l, const bh_selection *before, const bh_selection *after,
                  bh_text *out)
{
    for (size_t row = 0; row < after->row_count; row++) {
        const size_t old = counterpart(after, row, before);
        if (old < before->row_count) {
            bh_text_append(out, "before ");
            line(l, before, old, out);
        }
        bh_text_append(out, "after  ");
        line(l, after, row, out);
        if (old < before->row_count)
            moved(before, old, after, row, out);
    }
    for (size_t row = 0; row < before->row_count; row++)
        if (counterpart(before, row, after) == after->row_count) {
            bh_text_append(out, "before ");
            line(l, before, row, out);
        }
}

void bh_report_text_against(const bh_selection *before, const bh_selection *after, int width,
                            bh_text *out)
{
    struct layout l = {0};
    const int wide = at_least(width, NARROWEST);
    choose(&l, before, after, wide - 7);
    bh_report_text_inputs(after, wide, out);
    headings(&l, "       ", out);
    pairs(&l, before, after, out);
    bh_text_append(out, "\nbefore\n");
    bh_report_text_totals(before->table, wide, out);
    bh_text_append(out, "after\n");
    bh_report_text_totals(after->table, wide, out);
    bh_report_text_cautions(after->table, wide, out);
}
