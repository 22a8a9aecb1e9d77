/* draw_plan.c - the lines of the plan, and the value that is being typed. */
#include <stdio.h>
#include <string.h>

#include "beamhours/document/trail.h"
#include "beamhours/screen/drawing_parts.h"

enum { KEY_COLUMNS = 16 };

static void label_of(const bh_plan_line *line, char out[80])
{
    const char *name = line->label ? line->label : bh_item_name(line->node);
    const char *sign = !line->folds ? "" : line->folded ? "\u25B8" : "\u25BE";
    if (line->label)
        (void)snprintf(out, 80, "%.60s%s", line->label, sign);
    else if (name && !line->folded)
        (void)snprintf(out, 80, "%zu %.60s%s", bh_node_place(line->node) + 1, name, sign);
    else
        (void)snprintf(out, 80, "%zu%s", bh_node_place(line->node) + 1, sign);
}

static void draw_value(const bh_model *model, const bh_plan_line *line, bh_spot spot,
                       bh_canvas *canvas)
{
    bh_text value = {0};
    bh_plan_value(model, line, &value);
    if (value.bytes)
        bh_canvas_put_cut(canvas, spot, BH_LOOK_PLAIN, value.bytes);
    bh_text_free(&value);
}

/* The field stands in the place of the value, the old one before it where there is room. */
static void draw_edited(const bh_model *model, bh_spot spot, bh_canvas *canvas)
{
    const int was = bh_text_columns(model->was, canvas->ascii);
    const int typed = bh_text_columns(model->field.bytes, canvas->ascii) + 1;
    if (was && was + typed + 3 <= spot.width) {
        (void)bh_canvas_put(canvas, spot, BH_LOOK_QUIET, model->was);
        spot.column += was + 1;
        spot.width -= was + 1;
    }
    if (spot.width < 3)
        return;
    (void)bh_canvas_put(canvas, spot, BH_LOOK_TRIAL, "[");
    (void)bh_canvas_put(canvas, (bh_spot){spot.row, spot.column + spot.width - 1, 1}, BH_LOOK_TRIAL,
                        "]");
    bh_draw_field(canvas, (bh_spot){spot.row, spot.column + 1, spot.width - 2}, &model->field);
}

static void draw_line(const bh_model *model, size_t i, bh_spot spot, bh_canvas *canvas)
{
    const bh_plan_line *line = &model->plan.lines[i];
    const bool here = i == model->plan.at;
    const bool focus = here && model->pane == BH_PANE_PLAN;
    char label[80];
    const int indent = 1 + line->depth;
    label_of(line, label);
    if (here)
        (void)bh_canvas_put(canvas, spot, BH_LOOK_PLAIN, ">");
    bh_spot at = {spot.row, spot.column + indent, spot.width - indent};
    int used = bh_canvas_put(canvas, at, line->folds ? BH_LOOK_TITLE : BH_LOOK_PLAIN, label) + 1;
    if (line->label && used < KEY_COLUMNS - line->depth)
        used = KEY_COLUMNS - line->depth;
    at.column += used;
    at.width -= used;
    if (focus && model->over == BH_OVER_FIELD && model->field_node) {
        draw_edited(model, at, canvas);
        return;
    }
    draw_value(model, line, at, canvas);
    if (here)
        bh_canvas_paint(canvas, spot, focus ? BH_LOOK_FOCUS : BH_LOOK_CURSOR);
    if (focus) {
        canvas->cursor_row = spot.row;
        canvas->cursor_column = spot.column;
    }
}

/* A text that cannot be read as a document, as it is. */
static void draw_unread(const bh_model *model, const bh_arrangement *places, bh_canvas *canvas)
{
    const char *text = model->unread.bytes ? model->unread.bytes : "";
    for (int row = 1; row < places->body_rows && *text; row++) {
        char line[512];
        const size_t n = strcspn(text, "\n");
        (void)snprintf(line, sizeof line, "%.*s", (int)(n < 500 ? n : 500), text);
        (void)bh_canvas_put(canvas, (bh_spot){places->body + row, 1, places->plan_columns - 1},
                            BH_LOOK_PLAIN, line);
        text += n + (text[n] == '\n');
    }
}

void bh_draw_plan(const bh_model *model, const bh_arrangement *places, bh_canvas *canvas)
{
    const bh_plan_view *v = &model->plan;
    const bh_spot head = {places->body, 0, places->plan_columns};
    (void)bh_canvas_put(canvas, head, model->pane == BH_PANE_PLAN ? BH_LOOK_TITLE : BH_LOOK_QUIET,
                        "PLAN");
    char where[32];
    (void)snprintf(where, sizeof where, "%zu/%zu ", v->count ? v->at + 1 : 0, v->count);
    if (places->body_rows > 0 && v->count > (size_t)places->body_rows - 1)
        (void)bh_canvas_put_right(canvas, head, BH_LOOK_QUIET, where);
    if (!model->edit)
        draw_unread(model, places, canvas);
    for (int row = 1; row < places->body_rows && v->top + (size_t)row - 1 < v->count; row++)
        draw_line(model, v->top + (size_t)row - 1,
                  (bh_spot){places->body + row, 0, places->plan_columns}, canvas);
    if (model->over == BH_OVER_FIELD && !model->field_node) { /* a key that is not there yet */
        const int row = places->body + places->body_rows - 1;
        const char *dot = strrchr(model->field_path, '.');
        const bh_spot spot = {row, 0, places->plan_columns};
        bh_canvas_clear(canvas, spot);
        const int used =
            bh_canvas_put(canvas, spot, BH_LOOK_TRIAL, dot ? dot + 1 : model->field_path) + 1;
        draw_edited(model, (bh_spot){row, used, places->plan_columns - used}, canvas);
    }
}
