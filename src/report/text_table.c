/* text_table.c - lays the table out: which columns fit, how wide each is. */
#include "beamhours/report/text_table.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/report/prefix.h"

enum { NARROWEST = 80, BASE = 15 };

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
    for (size_t i = 0; i < sizeof extra / sizeof extra[0]; i++) {
        add(l, view, other, extra[i]);
        if (total_width(l) > width) {
            l->count--;
            break;
        }
    }
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

/* " signal x1.5, hours x0.667": how far a row moved. */
static void moved(const bh_selection *before, const bh_selection *after, size_t row, bh_text *out)
{
    static const struct {
        int column;
        const char *name;
    } watched[] = {
        {BH_COL_SIGNAL, "signal"}, {BH_COL_HOURS, "hours"}, {BH_COL_STATISTICAL, "stat"}};
    const char *lead = "         ";
    for (size_t i = 0; i < sizeof watched / sizeof watched[0]; i++) {
        const double a = bh_selection_number(before, row, watched[i].column);
        const double b = bh_selection_number(after, row, watched[i].column);
        if (!(a > 0.0) || !isfinite(b))
            continue;
        bh_text_appendf(out, "%s%s %+.2f %%", lead, watched[i].name, 100.0 * (b / a - 1.0));
        lead = ", ";
    }
    bh_text_append(out, "\n");
}

void bh_report_text_against(const bh_selection *before, const bh_selection *after, int width,
                            bh_text *out)
{
    struct layout l = {0};
    const int wide = at_least(width, NARROWEST);
    choose(&l, before, after, wide - 7);
    bh_report_text_inputs(after, wide, out);
    headings(&l, "       ", out);
    const size_t rows = before->row_count > after->row_count ? before->row_count : after->row_count;
    for (size_t row = 0; row < rows; row++) {
        if (row < before->row_count) {
            bh_text_append(out, "before ");
            line(&l, before, row, out);
        }
        if (row < after->row_count) {
            bh_text_append(out, "after  ");
            line(&l, after, row, out);
        }
        if (row < before->row_count && row < after->row_count)
            moved(before, after, row, out);
    }
    bh_text_append(out, "\nbefore\n");
    bh_report_text_totals(before->table, wide, out);
    bh_text_append(out, "after\n");
    bh_report_text_totals(after->table, wide, out);
    bh_report_text_cautions(after->table, wide, out);
}
