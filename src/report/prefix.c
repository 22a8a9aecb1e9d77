/* prefix.c - the prefix follows the largest value of the column, so that a column can be compared.
 */
#include "beamhours/report/prefix.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/number.h"

struct prefix {
    double scale; /* unit of the key in units of `unit` */
    const char *unit;
};

/* Falling size of the unit; the first in which the largest value is at least 1 is taken. */
static const struct prefix cross_sections[] = {{1e-6, "b/sr"}, {1e-3, "mb/sr"}, {1.0, "ub/sr"},
                                               {1e3, "nb/sr"}, {1e6, "pb/sr"},  {1e9, "fb/sr"}};
static const struct prefix relative[] = {{100.0, "%"}};

static const struct {
    int column;
    const struct prefix *prefixes;
    size_t count;
} families[] = {
    {BH_COL_POINT_CROSS_SECTION, cross_sections, 6},
    {BH_COL_CROSS_SECTION, cross_sections, 6},
    {BH_COL_STATISTICAL, relative, 1},
    {BH_COL_SYSTEMATIC, relative, 1},
    {BH_COL_PER_MRAD, relative, 1},
    {BH_COL_PER_PERMILLE, relative, 1},
};

static double largest(const bh_selection *view, int column)
{
    double most = 0.0;
    for (size_t i = 0; view && i < view->row_count; i++) {
        const double value = fabs(bh_selection_number(view, i, column));
        if (isfinite(value) && value > most)
            most = value;
    }
    return most;
}

bh_shown_column bh_prefix_scale(const bh_selection *view, const bh_selection *other, int column)
{
    const bh_column *row = bh_column_at(column);
    for (size_t f = 0; f < sizeof families / sizeof families[0]; f++) {
        if (families[f].column != column)
            continue;
        const double most = fmax(largest(view, column), largest(other, column));
        size_t p = 0;
        while (p + 1 < families[f].count && most > 0.0 &&
               most * families[f].prefixes[p].scale < 1.0)
            p++;
        return (bh_shown_column){column, row->digits, families[f].prefixes[p].scale,
                                 families[f].prefixes[p].unit};
    }
    return (bh_shown_column){column, row->digits, 1.0, row->unit};
}

/* Energies of the beam are mostly written as round numbers: their closing zeros say nothing. */
static void round_number(double value, int digits, char *out)
{
    double rounded = value;
    (void)bh_number_digits(value, digits, out, BH_CELL_SIZE);
    if (!bh_number_parse(out, NULL, &rounded))
        (void)bh_number_print(rounded, out, BH_CELL_SIZE);
}

void bh_prefix_print(const bh_selection *view, size_t i, const bh_shown_column *column, char *out)
{
    const bh_column *row = bh_column_at(column->column);
    const char *text = bh_selection_text(view, i, column->column);
    const double value = bh_selection_number(view, i, column->column);
    if (text)
        (void)snprintf(out, BH_CELL_SIZE, "%.*s", BH_CELL_SIZE - 1, text);
    else if (!isfinite(value))
        (void)snprintf(out, BH_CELL_SIZE, "-");
    else if (row->kind == BH_CELL_COUNT || !(fabs(value) > 0.0))
        (void)snprintf(out, BH_CELL_SIZE, "%.0f", value);
    else if (column->column == BH_COL_BEAM_KINETIC)
        round_number(value, column->digits, out);
    else
        (void)bh_number_digits(value * column->scale, column->digits, out, BH_CELL_SIZE);
}

bool bh_prefix_constant(const bh_selection *view, int column)
{
    for (size_t i = 1; i < view->row_count; i++) {
        const char *first = bh_selection_text(view, 0, column),
                   *text = bh_selection_text(view, i, column);
        if (first && text ? strcmp(first, text) != 0 : first != text)
            return false;
        const double a = bh_selection_number(view, 0, column),
                     b = bh_selection_number(view, i, column);
        if (isnan(a) != isnan(b) || (!isnan(a) && (a < b || a > b)))
            return false;
    }
    return true;
}
