/* draw_table.c - the run table. */
#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/screen/drawing_parts.h"

/* --- which columns stand where --- */

enum { WIDE = 100 }; /* there room for the old value is always kept: nothing has to be redrawn */

static void place(bh_column_places *p, int index, int width, int *at)
{
    p->index[p->count] = index;
    p->column[p->count] = *at;
    p->width[p->count] = width;
    p->count++;
    *at += width + 1;
}

static int width_of_was(const bh_table_view *v)
{
    const int width = v->widths[v->compared];
    return width > 6 ? width : 6;
}

static bool compares(const bh_model *model)
{
    for (size_t i = 0; i < model->table.count; i++)
        if (model->table.rows[i].before)
            return true;
    return false;
}

static bool stands(const bh_column_places *p, int index)
{
    for (int i = 0; i < p->count; i++)
        if (p->index[i] == index)
            return true;
    return false;
}

/* What a column was says nothing where the column itself is not to be seen: it takes the place of
 * the last ones where there is no room, but for the one in focus.  Whether it came to stand. */
static bool place_compared(const bh_table_view *v, int end, bh_column_places *p)
{
    int c = 0;
    while (c < v->column_count && v->columns[c].column != v->compared)
        c++;
    if (c == v->column_count || stands(p, c))
        return c < v->column_count;
    while (p->count > 0) {
        const int last = p->count - 1;
        int at = p->column[last] + p->width[last] + 1;
        if (at + v->columns[c].width <= end) {
            place(p, c, v->columns[c].width, &at);
            return true;
        }
        if (last == 0 || p->index[last] == v->column)
            return false;
        p->count = last;
    }
    return false;
}

/* From the view's column `first` on; whether the one in focus came to stand.  What the compared one
 * was stands at the right end, so that nothing else moves when it comes or goes. */
static bool place_from(const bh_model *model, const bh_arrangement *places, int first,
                       bh_column_places *p)
{
    const bh_table_view *v = &model->table;
    const bool compared = compares(model), wide = places->table_columns >= WIDE;
    const int was = compared || wide ? width_of_was(v) : 0;
    const int end = places->table_column + places->table_columns;
    int at = places->table_column;
    p->count = 0;
    for (int i = 0; i < v->column_count; i++) {
        const int width = v->columns[i].width;
        if ((i > 0 && i < first) || p->count >= BH_MOST_SHOWN - 2)
            continue;
        if (at + width + (was ? was + 1 : 0) > end)
            break;
        place(p, i, width, &at);
    }
    at = end - was;
    if (compared && place_compared(v, at - 1, p))
        place(p, -1, was, &at);
    return stands(p, v->column);
}

void bh_place_columns(const bh_model *model, const bh_arrangement *places, bh_column_places *out)
{
    int first = 1;
    while (!place_from(model, places, first, out) && first < model->table.column_count)
        first++;
}

int bh_table_column_at(const bh_model *model, int column)
{
    const bh_arrangement places = bh_arrange(model);
    bh_column_places p;
    bh_place_columns(model, &places, &p);
    for (int i = 0; i < p.count; i++)
        if (column >= p.column[i] && column <= p.column[i] + p.width[i])
            return p.index[i];
    return -1;
}

/* --- heads --- */

static void days(double hours, char out[32])
{
    char number[BH_NUMBER_SIZE];
    const bool long_time = fabs(hours) >= 48;
    (void)bh_number_digits(long_time ? hours / 24 : hours, 3, number, sizeof number);
    (void)snprintf(out, 32, "%.24s %s", number, long_time ? "d" : "h");
}

/* RUN TABLE   asked 2.1 d of 3.0 d   spare 0.9 d */
static void draw_totals(const bh_model *model, bh_spot spot, bh_canvas *canvas)
{
    const bh_outcome *o = bh_model_concluded(model);
    char text[160], asked[32], granted[32], spare[32];
    if (!o)
        return;
    const bh_totals *t = &o->end.totals;
    days(t->asked_hours, asked);
    days(t->available_hours, granted);
    days(t->spare_hours, spare);
    if (isnan(t->available_hours))
        (void)snprintf(text, sizeof text, "asked %s", asked);
    else
        (void)snprintf(text, sizeof text, "asked %s of %s  %s %s", asked, granted,
                       t->spare_hours < 0 ? "OVER by" : "spare", spare + (t->spare_hours < 0));
    if ((int)strlen(text) + 2 > spot.width && !isnan(t->available_hours))
        (void)snprintf(text, sizeof text, "asked %s of %s", asked, granted);
    const bool old = model->trying && o != model->now;
    (void)bh_canvas_put_right(canvas, spot,
                              old                  ? BH_LOOK_STALE
                              : t->spare_hours < 0 ? BH_LOOK_WARNING
                              : model->trying      ? BH_LOOK_TRIAL
                                                   : BH_LOOK_PLAIN,
                              text);
}

/* What the table is while it is not that of the plan. */
static void say_state(const bh_model *model, char text[64])
{
    const bh_outcome *o = model->now;
    const bool rows = model->table.count > 0, current = bh_model_current(model);
    if (model->edit && o && !o->of->plan)
        (void)snprintf(text, 64, "%s",
                       !rows           ? " (none: errors)"
                       : model->trying ? " as it was"
                                       : " (of before: errors)");
    else if (o && o->failed[0])
        (void)snprintf(text, 64, " (%.50s)", o->failed);
    else if (!current && o && o->job == model->job && o->unknown)
        (void)snprintf(text, 64, " computing %zu of %zu", o->unknown, o->setting_count);
    else if (!current && model->edit)
        (void)snprintf(text, 64, " computing");
}

/* What is still to be computed, or what the table is. */
static int draw_state(const bh_model *model, bh_spot spot, bh_canvas *canvas)
{
    char text[64] = "";
    say_state(model, text);
    if (text[0])
        return bh_canvas_put(canvas, spot, BH_LOOK_QUIET, text);
    if (model->trying)
        return bh_canvas_put(canvas, spot, BH_LOOK_TRIAL, " PROVISIONAL");
    return bh_canvas_put(canvas, spot, BH_LOOK_CHANGED, model->pin ? " against the pin" : "");
}

/* In some row that is in view. */
static bool column_changed(const bh_model *model, const bh_arrangement *places,
                           const bh_table_column *column)
{
    const bh_table_view *v = &model->table;
    for (size_t i = v->top; i < v->count && i < v->top + (size_t)places->table_rows; i++)
        if (bh_table_changed(model, &v->rows[i], column))
            return true;
    return false;
}

/* Its name, with the mark of the order, and its unit. */
static void draw_column_head(const bh_model *model, const bh_arrangement *places,
                             const bh_table_column *c, bh_spot spot, bh_canvas *canvas)
{
    const bh_table_view *v = &model->table;
    const char *mark = v->order != c->column ? "" : v->falling ? "\u2193" : "\u2191";
    bh_look look = BH_LOOK_TITLE;
    char heading[48];
    if (column_changed(model, places, c))
        look = model->trying ? BH_LOOK_TRIAL : BH_LOOK_CHANGED;
    (void)snprintf(heading, sizeof heading, "%s%.40s", mark, bh_column_at(c->column)->heading);
    if (c->column == BH_COL_SETTING)
        (void)bh_canvas_put(canvas, spot, look, heading);
    else
        (void)bh_canvas_put_right(canvas, spot, look, heading);
    if (c == &v->columns[v->column] && model->pane == BH_PANE_TABLE)
        bh_canvas_paint(canvas, spot, BH_LOOK_CURSOR);
    spot.row++;
    (void)bh_canvas_put_right(canvas, spot, BH_LOOK_QUIET, c->unit);
}

static void draw_heads(const bh_model *model, const bh_arrangement *places,
                       const bh_column_places *p, bh_canvas *canvas)
{
    const bh_spot head = {places->body, places->table_column, places->table_columns};
    const bool focus = model->pane == BH_PANE_TABLE;
    int used = bh_canvas_put(canvas, head, focus ? BH_LOOK_TITLE : BH_LOOK_QUIET, "RUN TABLE");
    used += draw_state(model, (bh_spot){head.row, head.column + used, head.width - used}, canvas);
    used++; /* a gap */
    draw_totals(model, (bh_spot){head.row, head.column + used, head.width - used}, canvas);
    for (int i = 0; i < p->count; i++) {
        const bh_spot spot = {places->body + 1, p->column[i], p->width[i]};
        if (p->index[i] < 0)
            (void)bh_canvas_put_right(canvas, spot, BH_LOOK_CHANGED, model->pin ? "pin" : "was");
        else
            draw_column_head(model, places, &model->table.columns[p->index[i]], spot, canvas);
    }
}

/* --- rows --- */

/* The column that is compared stands out; which others changed is marked in their heads, and a row
 * that is still of before by its name: else every cell of a large table would be sent twice. */
static bh_look look_of(const bh_model *model, const bh_table_row *row,
                       const bh_table_column *column)
{
    if (row->stale)
        return column->column == BH_COL_SETTING ? BH_LOOK_STALE : BH_LOOK_PLAIN;
    if (column->column == model->table.compared && bh_table_changed(model, row, column))
        return model->trying ? BH_LOOK_TRIAL : BH_LOOK_CHANGED;
    return BH_LOOK_PLAIN;
}

static const bh_table_column *compared_column(const bh_model *model)
{
    const bh_table_view *v = &model->table;
    const int column = model->table.compared;
    for (int i = 0; i < v->column_count; i++)
        if (v->columns[i].column == column)
            return &v->columns[i];
    return NULL;
}

/* The old value, where it changed by more than a little of what changed most. */
static void draw_was(const bh_model *model, const bh_table_row *row, bh_spot spot,
                     bh_canvas *canvas)
{
    char cell[BH_CELL_ROOM];
    const bh_table_column *c = compared_column(model);
    if (!c || !row->before || !(row->change > 0) || row->change < 0.2 * model->table.most_change ||
        !bh_table_changed(model, row, c))
        return;
    bh_table_cell(model, row, c, true, cell);
    (void)bh_canvas_put_right(canvas, spot, BH_LOOK_QUIET, cell);
}

static void draw_cell(const bh_model *model, const bh_table_row *row, const bh_table_column *c,
                      bh_spot spot, bh_canvas *canvas)
{
    char cell[BH_CELL_ROOM];
    const bh_look look = row->bin ? BH_LOOK_QUIET : look_of(model, row, c);
    bh_table_cell(model, row, c, false, cell);
    if (c->column == BH_COL_SETTING)
        (void)bh_canvas_put(canvas, spot, look, cell);
    else
        (void)bh_canvas_put_right(canvas, spot, look, cell);
}

static void draw_row(const bh_model *model, size_t i, int at, const bh_column_places *p,
                     bh_canvas *canvas)
{
    const bh_table_view *v = &model->table;
    const bool focus = model->pane == BH_PANE_TABLE;
    for (int k = 0; k < p->count; k++) {
        const bh_spot spot = {at, p->column[k], p->width[k]};
        if (p->index[k] < 0) {
            draw_was(model, &v->rows[i], spot, canvas);
            continue;
        }
        draw_cell(model, &v->rows[i], &v->columns[p->index[k]], spot, canvas);
        if (i != v->at || p->index[k] != v->column)
            continue;
        bh_canvas_paint(canvas, spot, focus ? BH_LOOK_FOCUS : BH_LOOK_CURSOR);
        canvas->cursor_row = focus ? at : canvas->cursor_row;
        canvas->cursor_column = focus ? spot.column : canvas->cursor_column;
    }
}

void bh_draw_table(const bh_model *model, const bh_arrangement *places, bh_canvas *canvas)
{
    const bh_table_view *v = &model->table;
    bh_column_places p;
    bh_place_columns(model, places, &p);
    draw_heads(model, places, &p, canvas);
    for (int r = 0; r < places->table_rows && v->top + (size_t)r < v->count; r++) {
        const size_t i = v->top + (size_t)r;
        draw_row(model, i, places->body + 3 + r, &p, canvas);
        if (i == v->at)
            (void)bh_canvas_put(canvas,
                                (bh_spot){places->body + 3 + r, places->table_column - 1, 1},
                                BH_LOOK_PLAIN, ">");
    }
    if (v->count == 0)
        (void)bh_canvas_put(
            canvas, (bh_spot){places->body + 3, places->table_column, places->table_columns},
            BH_LOOK_QUIET,
            bh_model_current(model) || !model->edit ? "no table: the plan has errors"
                                                    : "the table is being computed \u2026");
}
