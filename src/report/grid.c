/* grid.c - keeps cells one behind the other. */
#include "beamhours/report/grid.h"

#include <math.h>
#include <string.h>

#include "beamhours/base/number.h"

void bh_grid_column_add(bh_grid *grid, const char *heading, const char *unit, bool number)
{
    if (grid->column_count < BH_MOST_GRID_COLUMNS)
        grid->columns[grid->column_count++] = (bh_grid_column){heading, unit, number, false};
}

void bh_grid_cell(bh_grid *grid, const char *text)
{
    bh_text_append_bytes(&grid->cells, text, strlen(text) + 1);
    grid->cell_count++;
}

void bh_grid_free(bh_grid *grid)
{
    bh_text_free(&grid->cells);
    *grid = (bh_grid){0};
}

void bh_hours_words(bh_text *out, double hours)
{
    char number[BH_NUMBER_SIZE];
    const double size = round(fabs(hours) * 100.0) / 100.0;
    if (!isfinite(hours)) {
        bh_text_append(out, "-");
        return;
    }
    if (size < 1.0)
        (void)bh_number_digits(hours, 3, number, sizeof number);
    else
        (void)bh_number_digits(copysign(size, hours), 3 + (int)floor(log10(size)), number,
                               sizeof number);
    bh_text_append(out, number);
}
