/* comparison.c - two plans side by side: inputs, rows, time. */
#include <json-c/json.h>
#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/report/differences.h"
#include "beamhours/report/json_parts.h"
#include "beamhours/report/marked_table.h"
#include "beamhours/report/text_table.h"

/* What is compared of a row; how it is shown. */
static const struct {
    int column;
    const char *heading, *unit;
    double scale;
    int digits;
    bool moves; /* how far is said too */
} watched[] = {{BH_COL_SIGNAL, "rate", "Hz", 1.0, 4, true},
               {BH_COL_HOURS, "hours", "h", 1.0, 4, true},
               {BH_COL_STATISTICAL, "stat", "%", 100.0, 3, false},
               {BH_COL_SYSTEMATIC, "syst", "%", 100.0, 3, false}};

enum { WATCHED = sizeof watched / sizeof watched[0] };

static const size_t nowhere = (size_t)-1;

static bool same_row(const bh_table *a, size_t i, const bh_table *b, size_t k)
{
    return strcmp(bh_table_text(a, false, i, BH_COL_SETTING),
                  bh_table_text(b, false, k, BH_COL_SETTING)) == 0 &&
           strcmp(bh_table_text(a, false, i, BH_COL_ARM), bh_table_text(b, false, k, BH_COL_ARM)) ==
               0;
}

/* The row of the same setting and arm, looked for from the same place on; `nowhere` without one. */
static size_t counterpart(const bh_table *of, size_t row, const bh_table *in)
{
    const size_t count = bh_table_rows(in, false);
    for (size_t n = 0; n < count; n++) {
        const size_t k = (row + n) % count;
        if (same_row(of, row, in, k))
            return k;
    }
    return nowhere;
}

static double number(const bh_table *table, size_t row, int column)
{
    return row == nowhere ? (double)NAN : bh_table_number(table, false, row, (bh_column_id)column);
}

/* --- rows as a grid --- */

static void value_cell(bh_grid *grid, double value, int digits)
{
    char text[BH_NUMBER_SIZE] = "-";
    if (isfinite(value))
        (void)bh_number_digits(value, digits, text, sizeof text);
    bh_grid_cell(grid, fabs(value) > 0.0 || isnan(value) ? text : "0");
}

static void change_cell(bh_grid *grid, double was, double is)
{
    char text[BH_NUMBER_SIZE], signed_text[BH_NUMBER_SIZE + 1];
    const double change = 100.0 * (is / was - 1.0);
    if (!(was > 0.0) || !isfinite(change)) {
        bh_grid_cell(grid, "-");
        return;
    }
    (void)bh_number_digits(fabs(change) < 5e-4 ? 0.0 : change, 3, text, sizeof text);
    (void)snprintf(signed_text, sizeof signed_text, "%s%s", change >= 5e-4 ? "+" : "", text);
    bh_grid_cell(grid, signed_text);
}

static void row_cells(const bh_comparison *c, size_t old, size_t now, bh_grid *grid)
{
    const bh_table *named = now == nowhere ? c->before : c->after;
    const size_t row = now == nowhere ? old : now;
    bh_grid_cell(grid, bh_table_text(named, false, row, BH_COL_SETTING));
    bh_grid_cell(grid, bh_table_text(named, false, row, BH_COL_ARM));
    for (size_t w = 0; w < WATCHED; w++) {
        const double was = number(c->before, old, watched[w].column);
        const double is = number(c->after, now, watched[w].column);
        value_cell(grid, was * watched[w].scale, watched[w].digits);
        value_cell(grid, is * watched[w].scale, watched[w].digits);
        if (watched[w].moves)
            change_cell(grid, was, is);
    }
}

static void rows_grid(const bh_comparison *c, bh_grid *grid)
{
    grid->names = 2;
    bh_grid_column_add(grid, "setting", "", false);
    bh_grid_column_add(grid, "arm", "", false);
    for (size_t w = 0; w < WATCHED; w++) {
        bh_grid_column_add(grid, watched[w].heading, watched[w].unit, true);
        bh_grid_column_add(grid, "after", watched[w].unit, true);
        if (watched[w].moves)
            bh_grid_column_add(grid, "change", "%", true);
    }
    for (size_t row = 0; row < bh_table_rows(c->after, false); row++)
        row_cells(c, counterpart(c->after, row, c->before), row, grid);
    for (size_t row = 0; row < bh_table_rows(c->before, false); row++)
        if (counterpart(c->before, row, c->after) == nowhere)
            row_cells(c, row, nowhere, grid);
}

/* --- text and Markdown --- */

static void more_words(const bh_difference *d, bh_text *to)
{
    if (d->more)
        bh_text_appendf(to, " (and %zu more %s)", d->more, d->more == 1 ? "setting" : "settings");
}

static void input_words(const bh_difference *d, bh_text *to)
{
    bh_text_appendf(to, "%s: %s -> %s", d->path, d->before ? d->before : "absent",
                    d->after ? d->after : "absent");
    more_words(d, to);
}

static void totals_grid(const bh_comparison *c, bh_grid *grid)
{
    bh_totals_grid(bh_table_totals(c->before), bh_table_totals(c->after), grid);
}

typedef void make_grid(const bh_comparison *c, bh_grid *grid);
typedef void write_grid(const bh_grid *grid, bh_text *out);

static void show(const bh_comparison *c, make_grid *make, write_grid *write, bh_text *out)
{
    bh_grid grid = {0};
    make(c, &grid);
    write(&grid, out);
    bh_grid_free(&grid);
}

static void show_text(const bh_comparison *c, make_grid *make, int width, bh_text *out)
{
    bh_grid grid = {0};
    make(c, &grid);
    bh_grid_text(&grid, width, out);
    bh_grid_free(&grid);
}

void bh_comparison_text(const bh_comparison *c, int width, bh_text *out)
{
    if (c->inputs->count == 0)
        bh_text_append(out, "inputs: no difference\n");
    for (size_t i = 0; i < c->inputs->count; i++) {
        bh_text line = {0};
        input_words(&c->inputs->items[i], &line);
        bh_report_wrapped("input   ", line.bytes ? line.bytes : "", width, out);
        out->failed |= line.failed;
        bh_text_free(&line);
    }
    bh_text_append(out, "\n");
    show_text(c, rows_grid, width, out);
    bh_text_append(out, "\n");
    show_text(c, totals_grid, width, out);
    bh_report_text_cautions(c->after, width, out);
}

static void inputs_grid(const bh_comparison *c, bh_grid *grid)
{
    bh_grid_column_add(grid, "input", "", false);
    bh_grid_column_add(grid, "before", "", false);
    bh_grid_column_add(grid, "after", "", false);
    for (size_t i = 0; i < c->inputs->count; i++) {
        const bh_difference *d = &c->inputs->items[i];
        bh_text path = {0};
        bh_text_append(&path, d->path);
        more_words(d, &path);
        bh_grid_cell(grid, path.bytes ? path.bytes : "");
        bh_grid_cell(grid, d->before ? d->before : "absent");
        bh_grid_cell(grid, d->after ? d->after : "absent");
        grid->cells.failed |= path.failed;
        bh_text_free(&path);
    }
}

void bh_comparison_markdown(const bh_comparison *c, bh_text *out)
{
    if (c->inputs->count == 0)
        bh_text_append(out, "Inputs: no difference.\n\n");
    else
        show(c, inputs_grid, bh_grid_markdown, out);
    show(c, rows_grid, bh_grid_markdown, out);
    show(c, totals_grid, bh_grid_markdown, out);
    bh_report_markdown_below(c->after, out);
}

/* --- JSON --- */

static void put(json_object *to, const char *key, json_object *value)
{
    (void)json_object_object_add(to, key, value);
}

static json_object *text_or_null(const char *text)
{
    return text ? json_object_new_string(text) : NULL;
}

static json_object *values(const bh_table *table, size_t row)
{
    json_object *object = row == nowhere ? NULL : json_object_new_object();
    for (size_t w = 0; object && w < WATCHED; w++)
        put(object, bh_column_at(watched[w].column)->key,
            bh_json_number(number(table, row, watched[w].column)));
    return object;
}

static json_object *row_object(const bh_comparison *c, size_t old, size_t now)
{
    const bh_table *named = now == nowhere ? c->before : c->after;
    const size_t row = now == nowhere ? old : now;
    json_object *object = json_object_new_object();
    put(object, "setting", text_or_null(bh_table_text(named, false, row, BH_COL_SETTING)));
    put(object, "arm", text_or_null(bh_table_text(named, false, row, BH_COL_ARM)));
    put(object, "before", values(c->before, old));
    put(object, "after", values(c->after, now));
    return object;
}

bh_code bh_comparison_json(const bh_comparison *c, bh_text *out)
{
    json_object *object = json_object_new_object(), *inputs = json_object_new_array();
    json_object *rows = json_object_new_array(), *totals = json_object_new_object();
    for (size_t i = 0; i < c->inputs->count; i++) {
        const bh_difference *d = &c->inputs->items[i];
        json_object *input = json_object_new_object();
        put(input, "path", text_or_null(d->path));
        put(input, "before", text_or_null(d->before));
        put(input, "after", text_or_null(d->after));
        put(input, "more_settings", json_object_new_int64((int64_t)d->more));
        (void)json_object_array_add(inputs, input);
    }
    for (size_t row = 0; row < bh_table_rows(c->after, false); row++)
        (void)json_object_array_add(rows,
                                    row_object(c, counterpart(c->after, row, c->before), row));
    for (size_t row = 0; row < bh_table_rows(c->before, false); row++)
        if (counterpart(c->before, row, c->after) == nowhere)
            (void)json_object_array_add(rows, row_object(c, row, nowhere));
    put(totals, "before", bh_json_totals(bh_table_totals(c->before)));
    put(totals, "after", bh_json_totals(bh_table_totals(c->after)));
    put(object, "inputs", inputs);
    put(object, "rows", rows);
    put(object, "totals", totals);
    bh_json_said(object, c->after, c->version);
    return bh_json_finish(object, out);
}
