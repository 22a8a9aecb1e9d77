/* grid.c - keeps cells one behind the other; as plain text each column is as wide as its widest. */
#include "beamhours/report/grid.h"

#include <math.h>
#include <string.h>

#include "beamhours/base/number.h"

void bh_grid_column_add(bh_grid *grid, const char *heading, const char *unit, bool number)
{
    if (grid->column_count < BH_MOST_GRID_COLUMNS)
        grid->columns[grid->column_count++] = (bh_grid_column){heading, unit, number};
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

static void put(const bh_grid *grid, size_t column, int width, const char *text, bh_text *out)
{
    const int blanks = at_least(width - cells_wide(text), 0);
    bh_text_append(out, column ? " " : "");
    if (grid->columns[column].number)
        bh_text_appendf(out, "%*s%s", blanks, "", text);
    else
        bh_text_appendf(out, "%s%*s", text, blanks, "");
}

static void end_line(bh_text *out)
{
    while (out->length && out->bytes[out->length - 1] == ' ')
        out->bytes[--out->length] = '\0';
    bh_text_append(out, "\n");
}

static void widths(const bh_grid *grid, int width[BH_MOST_GRID_COLUMNS])
{
    const char *cell = grid->cells.bytes;
    for (size_t c = 0; c < grid->column_count; c++)
        width[c] =
            at_least(cells_wide(grid->columns[c].heading), cells_wide(grid->columns[c].unit));
    for (size_t i = 0; i < grid->cell_count; i++) {
        const size_t c = i % grid->column_count;
        width[c] = at_least(width[c], cells_wide(cell));
        cell += strlen(cell) + 1;
    }
}

void bh_grid_text(const bh_grid *grid, bh_text *out)
{
    int width[BH_MOST_GRID_COLUMNS];
    out->failed |= grid->cells.failed;
    if (out->failed || grid->column_count == 0)
        return;
    widths(grid, width);
    for (size_t c = 0; c < grid->column_count; c++)
        put(grid, c, width[c], grid->columns[c].heading, out);
    end_line(out);
    for (size_t c = 0; c < grid->column_count; c++)
        put(grid, c, width[c], grid->columns[c].unit, out);
    end_line(out);
    const char *cell = grid->cells.bytes;
    for (size_t i = 0; i < grid->cell_count; i++) {
        const size_t c = i % grid->column_count;
        put(grid, c, width[c], cell, out);
        if (c + 1 == grid->column_count)
            end_line(out);
        cell += strlen(cell) + 1;
    }
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
