/* draw_over.c - what lies over plan and table: sheets, choosers, questions. */
#include <stdio.h>
#include <string.h>

#include "beamhours/screen/choices.h"
#include "beamhours/screen/drawing_parts.h"

static void clear_rows(bh_canvas *canvas, int from, int rows, int columns)
{
    for (int r = from; r < from + rows; r++)
        bh_canvas_clear(canvas, (bh_spot){r, 0, columns});
}

/* A text of several lines, the row of the cursor in view. */
static void draw_lines(const bh_model *model, const bh_arrangement *places, bh_canvas *canvas)
{
    const bh_field *f = &model->field;
    const size_t at = bh_field_at(f);
    const int most = places->body_rows > 2 ? places->body_rows - 1 : 1;
    size_t length = 0, from = 0, top = 0;
    int above = 0; /* rows from the first in view to that of the cursor */
    while (from < at) {
        from = bh_field_row(f, from, &length);
        if (++above == most) {
            top = bh_field_row(f, top, &length);
            above--;
        }
    }
    const int columns = places->over_columns;
    clear_rows(canvas, places->body, places->body_rows, columns);
    const int used =
        bh_canvas_put(canvas, (bh_spot){places->body, 0, columns}, BH_LOOK_TITLE, "TEXT ");
    (void)bh_canvas_put(canvas, (bh_spot){places->body, used, columns - used}, BH_LOOK_TITLE,
                        model->field_path);
    from = top;
    for (int r = 0; r < most && from < BH_FIELD_SIZE; r++) {
        char row[BH_FIELD_SIZE];
        const size_t next = bh_field_row(f, from, &length);
        (void)snprintf(row, sizeof row, "%.*s", (int)length, f->bytes + from);
        const bh_spot spot = {places->body + 1 + r, 1, columns - 1};
        bh_canvas_paint(canvas, spot, BH_LOOK_FIELD);
        (void)bh_canvas_put(canvas, spot, BH_LOOK_FIELD, row);
        from = next;
    }
    char before[BH_FIELD_SIZE];
    (void)snprintf(before, sizeof before, "%.*s", (int)(f->cursor - at), f->bytes + at);
    canvas->cursor_row = places->body + 1 + above;
    canvas->cursor_column = 1 + bh_text_columns(before, canvas->ascii);
}

static void draw_sheet(const bh_model *model, const bh_arrangement *places, bh_canvas *canvas)
{
    const bh_sheet *s = &model->sheet;
    const int columns = places->over_columns;
    clear_rows(canvas, places->body, places->body_rows, columns);
    const bh_spot head = {places->body, 0, columns};
    (void)bh_canvas_put(canvas, head, BH_LOOK_TITLE, s->title);
    const size_t rows = places->body_rows > 1 ? (size_t)places->body_rows - 1 : 0;
    for (size_t r = 0; r < rows && s->top + r < s->count; r++) {
        const bh_sheet_line *line = &s->lines[s->top + r];
        (void)bh_canvas_put(canvas, (bh_spot){places->body + 1 + (int)r, 1, columns - 1},
                            line->look, line->text);
    }
    char where[48];
    const size_t last = s->top + rows < s->count ? s->top + rows : s->count;
    (void)snprintf(where, sizeof where, "%zu to %zu of %zu", s->count ? s->top + 1 : 0, last,
                   s->count);
    if (s->count > rows)
        (void)bh_canvas_put_right(canvas, head, BH_LOOK_QUIET, where);
    canvas->cursor_row = places->body;
    canvas->cursor_column = 0;
}

/* What is known of the choice in focus, on the last rows. */
static void draw_more(const bh_model *model, int row, bh_canvas *canvas)
{
    const bh_chooser *c = &model->chooser;
    bh_text more = {0};
    if (c->at < c->shown_count)
        bh_choices_more(model, &c->choices[c->shown[c->at]], &more);
    const char *text = more.bytes ? more.bytes : "";
    for (int r = 0; r < 3 && *text; r++) {
        const int columns = canvas->columns - 2;
        size_t n = bh_text_fit(text, columns), cut = n;
        while (text[n] && cut > 0 && text[cut] != ' ')
            cut--;
        n = text[n] && cut ? cut : n;
        char line[1024];
        (void)snprintf(line, sizeof line, "%.*s", (int)n, text);
        (void)bh_canvas_put(canvas, (bh_spot){row + r, 1, columns}, BH_LOOK_QUIET, line);
        text += n;
        text += strspn(text, " ");
    }
    bh_text_free(&more);
}

static void draw_choices(const bh_model *model, const bh_arrangement *places, int columns,
                         bh_canvas *canvas)
{
    const bh_chooser *c = &model->chooser;
    const int rows = places->body_rows - 6;
    int names = 12;
    for (size_t i = 0; i < c->count; i++) {
        const int width = bh_text_columns(c->choices[i].name, canvas->ascii);
        names = width > names && width <= 28 ? width : names;
    }
    for (int r = 0; r < rows && c->top + (size_t)r < c->shown_count; r++) {
        const size_t i = c->top + (size_t)r;
        const bh_choice *choice = &c->choices[c->shown[i]];
        const bh_spot spot = {places->body + 2 + r, 0, columns};
        (void)bh_canvas_put(canvas, (bh_spot){spot.row, 2, columns - 2}, BH_LOOK_PLAIN,
                            choice->name);
        (void)bh_canvas_put(canvas, (bh_spot){spot.row, names + 4, columns - names - 4},
                            BH_LOOK_QUIET, choice->about);
        if (i != c->at)
            continue;
        (void)bh_canvas_put(canvas, spot, BH_LOOK_FOCUS, ">");
        bh_canvas_paint(canvas, spot, BH_LOOK_FOCUS);
        canvas->cursor_row = spot.row;
        canvas->cursor_column = 0;
    }
    if (c->shown_count == 0)
        (void)bh_canvas_put(canvas, (bh_spot){places->body + 2, 2, columns - 2}, BH_LOOK_ERROR,
                            "nothing has this in its name");
}

static void draw_chooser(const bh_model *model, const bh_arrangement *places, bh_canvas *canvas)
{
    const bh_chooser *c = &model->chooser;
    /* a value that is tried out shows in the table: it stays in sight */
    const bool beside = c->kind == BH_CHOOSE_VALUE && places->table_columns && places->plan_columns;
    const int columns = beside                      ? places->plan_columns
                        : c->kind == BH_CHOOSE_PLAN ? canvas->columns
                                                    : places->over_columns;
    clear_rows(canvas, places->body, places->body_rows, columns);
    const int used =
        bh_canvas_put(canvas, (bh_spot){places->body, 0, columns}, BH_LOOK_TITLE, c->title);
    const char *dot = strrchr(model->field_path, '.');
    if (c->kind == BH_CHOOSE_VALUE)
        (void)bh_canvas_put(canvas, (bh_spot){places->body, used + 1, columns - used - 1},
                            BH_LOOK_PLAIN, dot ? dot + 1 : model->field_path);
    (void)bh_canvas_put(canvas, (bh_spot){places->body + 1, 1, 7}, BH_LOOK_QUIET, "narrow");
    bh_draw_field(canvas, (bh_spot){places->body + 1, 8, columns - 9}, &c->typed);
    draw_choices(model, places, columns, canvas);
    const int row = places->body + places->body_rows - 3;
    clear_rows(canvas, row - 1, 4, canvas->columns);
    draw_more(model, row, canvas);
}

int bh_ask_row(const bh_model *model)
{
    const bh_arrangement places = bh_arrange(model);
    int lines = 0;
    for (int i = 0; i < 3; i++)
        lines += model->question_text[i][0] != '\0';
    return places.body + lines + 2;
}

static void draw_ask(const bh_model *model, const bh_arrangement *places, bh_canvas *canvas)
{
    const int first = bh_ask_row(model), n = bh_ask_answers(model->question);
    clear_rows(canvas, places->body, first + n + 1 - places->body, canvas->columns);
    int row = places->body;
    for (int i = 0; i < 3; i++)
        if (model->question_text[i][0])
            (void)bh_canvas_put(canvas, (bh_spot){row++, 1, canvas->columns - 2},
                                i ? BH_LOOK_PLAIN : BH_LOOK_TITLE, model->question_text[i]);
    for (int i = 0; i < n; i++) {
        char key = 0, line[80];
        const char *words = bh_ask_answer(model->question, i, &key);
        const bh_spot spot = {first + i, 2, 40};
        (void)snprintf(line, sizeof line, "%s %c  %s", i == model->answer ? ">" : " ", key, words);
        (void)bh_canvas_put(canvas, spot, BH_LOOK_PLAIN, line);
        if (i == model->answer) {
            bh_canvas_paint(canvas, spot, BH_LOOK_FOCUS);
            canvas->cursor_row = spot.row;
            canvas->cursor_column = spot.column;
        }
    }
}

void bh_draw_over(const bh_model *model, const bh_arrangement *places, bh_canvas *canvas)
{
    if (model->over == BH_OVER_FIELD && model->field.width)
        draw_lines(model, places, canvas);
    if (model->over == BH_OVER_SHEET)
        draw_sheet(model, places, canvas);
    if (model->over == BH_OVER_CHOOSE)
        draw_chooser(model, places, canvas);
    if (model->over == BH_OVER_SOLVE)
        bh_draw_solving(model, places, canvas);
    if (model->over == BH_OVER_ASK)
        draw_ask(model, places, canvas);
}
