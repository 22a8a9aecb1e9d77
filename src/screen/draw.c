/* draw.c - the whole screen: title, messages, cautions, the menu line. */
#include <stdio.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/schema/reading.h"
#include "beamhours/screen/drawing_parts.h"

enum { MOST_SAID = 4 /* rows of one sentence */ };

/* --- messages --- */

/* A warning says what it is about; where there is no room, the line number stands for its key. */
static void say(bh_canvas *canvas, int row, bh_look look, const bh_diag *d)
{
    const bool error = d->severity == BH_SEVERITY_ERROR;
    char at[24] = "";
    if (d->at.line > 0)
        (void)snprintf(at, sizeof at, " line %d", d->at.line);
    const int room = canvas->columns - (int)strlen(at);
    bh_text text = {0};
    bh_text_appendf(&text, "%s%s: %s", error ? "ERROR " : "", d->key, d->text);
    const bool fits = text.bytes && bh_text_columns(text.bytes, canvas->ascii) <= room;
    if (text.bytes)
        bh_canvas_put_cut(canvas, (bh_spot){row, 0, room}, look,
                          fits || error || !at[0] ? text.bytes : d->text);
    bh_text_free(&text);
    (void)bh_canvas_put_right(canvas, (bh_spot){row, 0, canvas->columns}, BH_LOOK_QUIET, at);
}

/* Those of one severity, from `row` on; returns the row behind them. */
static int say_all(const bh_diags *said, bh_severity severity, int row, int end, bh_canvas *canvas)
{
    const bh_look look = severity == BH_SEVERITY_ERROR ? BH_LOOK_ERROR : BH_LOOK_WARNING;
    for (size_t i = 0; i < bh_diags_count(said) && row < end; i++)
        if (bh_diags_at(said, i)->severity == severity)
            say(canvas, row++, look, bh_diags_at(said, i));
    return row;
}

static void draw_said(const bh_model *model, const bh_arrangement *places, bh_canvas *canvas)
{
    const bh_outcome *o = model->now;
    if (o && o->of->plan && !o->complete && !o->failed[0] && bh_model_concluded(model))
        o = bh_model_concluded(model); /* until the new ones are known, like the rows */
    const bh_diags *said = !model->edit ? model->said : o ? bh_outcome_diags(o) : NULL;
    if (!said)
        return;
    const int end = places->message + places->message_rows;
    const int row = say_all(said, BH_SEVERITY_ERROR, places->message, end, canvas);
    (void)say_all(said, BH_SEVERITY_WARNING, row, end, canvas);
    if (bh_diags_count(said) > (size_t)places->message_rows) {
        char more[40];
        (void)snprintf(more, sizeof more, " [m: all %zu]", bh_diags_count(said));
        (void)bh_canvas_put_right(canvas, (bh_spot){places->caution - 1, 0, canvas->columns},
                                  BH_LOOK_KEY, more);
    }
}

static void draw_prompt(const bh_model *model, const bh_arrangement *places, bh_canvas *canvas,
                        const char *what)
{
    const int row = places->message >= 0 ? places->message : places->menu;
    bh_canvas_clear(canvas, (bh_spot){row, 0, canvas->columns});
    const int used = bh_canvas_put(canvas, (bh_spot){row, 0, canvas->columns}, BH_LOOK_TITLE, what);
    const bool noted = model->over == BH_OVER_FIND && model->note[0] && places->message >= 0;
    const int end = noted ? canvas->columns / 2 - 1 : canvas->columns;
    bh_draw_field(canvas, (bh_spot){row, used + 1, end - used - 1}, &model->field);
}

/* How much of `text` goes into one row: words stay whole where they can. */
static size_t row_of(const char *text, int columns)
{
    const size_t most = bh_text_fit(text, columns);
    size_t n = most;
    while (text[most] && n > 0 && text[n] != ' ')
        n--;
    return n ? n : most;
}

/* The rows that a sentence takes: at most MOST_SAID, the last one cut. */
static int rows_of(const char *text, int columns)
{
    int rows = 1;
    for (size_t n = row_of(text, columns); text[n] && n && rows < MOST_SAID; rows++) {
        text += n + (text[n] == ' ');
        n = row_of(text, columns);
    }
    return rows;
}

/* Where a sentence of so many rows begins that ends above row `end`: over what is above the rows of
 * messages where it is long, unless the cursor is there. */
static int begin_sentence(const bh_canvas *canvas, const bh_arrangement *places, int rows, int end)
{
    const int usual = places->message >= 0 ? places->message : places->menu;
    const int first = end - rows > places->body ? end - rows : places->body;
    const bool hides = canvas->cursor_row >= first && canvas->cursor_row < end;
    return first >= usual || hides ? usual : first;
}

/* A sentence in the rows of messages; in the last one of all where there are none. */
static void put_sentence(bh_canvas *canvas, const bh_arrangement *places, bh_look look,
                         const char *text)
{
    const bool rows = places->message >= 0;
    const int end = rows ? places->caution : places->menu + 1;
    int row = begin_sentence(canvas, places, rows ? rows_of(text, canvas->columns) : 1, end);
    for (; row < end; row++) {
        const size_t n = row + 1 == end ? strlen(text) : row_of(text, canvas->columns);
        const bh_spot spot = {row, 0, canvas->columns};
        bh_text part = {0};
        bh_text_append_bytes(&part, text, n);
        bh_text_append(&part, "");
        bh_canvas_clear(canvas, spot);
        if (!part.failed)
            (void)bh_canvas_put(canvas, spot, look, part.bytes);
        bh_text_free(&part);
        text += n + (text[n] == ' ');
    }
}

/* Of what is typed: what is wrong with it, or what it was. */
static void draw_typed(const bh_model *model, const bh_arrangement *places, bh_canvas *canvas)
{
    bh_text text = {0};
    if (model->why[0]) {
        bh_text_appendf(&text, "NOT YET  %s", model->why);
    } else {
        bh_text_append(&text, model->field_path);
        if (model->was[0])
            bh_text_appendf(&text, " was %s", model->was);
        bh_text_appendf(&text, "; Enter keeps it, Escape leaves it as it was");
    }
    if (text.bytes && model->why[0])
        put_sentence(canvas, places, BH_LOOK_ERROR, text.bytes);
    else if (text.bytes)
        bh_canvas_put_cut(canvas, (bh_spot){places->message, 0, canvas->columns}, BH_LOOK_TRIAL,
                          text.bytes);
    bh_text_free(&text);
}

/* What just happened. */
static void draw_note(const bh_model *model, const bh_arrangement *places, bh_canvas *canvas)
{
    const bh_look look = model->note_bad ? BH_LOOK_ERROR : BH_LOOK_PLAIN;
    const bh_spot half = {places->message, canvas->columns / 2, canvas->columns / 2};
    if (model->over != BH_OVER_FIND)
        put_sentence(canvas, places, look, model->note);
    else if (places->message >= 0) /* beside what is looked for */
        (void)bh_canvas_put(canvas, half, look, model->note);
}

static bool tries(const bh_model *model)
{
    if (model->over == BH_OVER_SOLVE)
        return model->trying || model->why[0];
    if (model->over == BH_OVER_CHOOSE)
        return model->chooser.kind == BH_CHOOSE_VALUE;
    return model->over == BH_OVER_FIELD;
}

/* What is typed and what happened takes the first line; the others, where there are some, stay. */
static void draw_messages(const bh_model *model, const bh_arrangement *places, bh_canvas *canvas)
{
    const bool find = model->over == BH_OVER_FIND, name = model->over == BH_OVER_NAME;
    if (places->message >= 0) {
        draw_said(model, places, canvas);
        if (find || name || tries(model) || model->note[0])
            bh_canvas_clear(canvas, (bh_spot){places->message, 0, canvas->columns});
    }
    if (find || name)
        draw_prompt(model, places, canvas, find ? "look for" : "save as");
    if (name || (places->message < 0 && !(model->note[0] && !tries(model))))
        return;
    if (model->note[0]) /* until the next key, also while something is typed */
        draw_note(model, places, canvas);
    else if (tries(model))
        draw_typed(model, places, canvas);
}

/* --- cautions --- */

/* The gist: up to the first break of the sentence, behind a name that it begins with. */
static size_t gist(const char *text)
{
    const char *colon = strchr(text, ':');
    const char *from = text;
    const char *name = strncmp(text, "Target ", 7) == 0 ? text + 7 : text;
    if (colon && memchr(name, ' ', (size_t)(colon - name)) == NULL)
        from = colon + 1;
    size_t n = strcspn(from, from == text ? ":,;" : ",;");
    const char *stop = strstr(from, ". ");
    if (stop && (size_t)(stop - from) < n)
        n = (size_t)(stop - from);
    return (size_t)(from - text) + n;
}

static void draw_caution(const bh_model *model, const bh_arrangement *places, bh_canvas *canvas)
{
    static const char defer[] = " \u00B7 the facility's rules decide", more[] = " [c: more]";
    const bh_outcome *o = bh_model_concluded(model);
    const int row = places->caution, end = bh_text_columns(more, canvas->ascii);
    const int room = canvas->columns - end - bh_text_columns(defer, canvas->ascii);
    if (row < 0)
        return;
    int at = bh_canvas_put(canvas, (bh_spot){row, 0, canvas->columns}, BH_LOOK_CAUTION, "CAUTION ");
    for (size_t i = 0; o && i < o->end.caution_count; i++) {
        bh_text text = {0};
        const char *said = o->end.cautions[i].text;
        size_t length = gist(said);
        const char *power = strstr(said, "kW"); /* the figure is enough: the text is a key away */
        if (i == 0 && power && (size_t)(power + 2 - said) < length)
            length = (size_t)(power + 2 - said);
        bh_text_appendf(&text, "%s%.*s", i ? " \u00B7 " : "", (int)length, said);
        const int width = text.bytes ? bh_text_columns(text.bytes, canvas->ascii) : 0;
        if (text.bytes && at + width <= room)
            at += bh_canvas_put(canvas, (bh_spot){row, at, width}, BH_LOOK_CAUTION, text.bytes);
        bh_text_free(&text);
    }
    bh_canvas_put_cut(canvas, (bh_spot){row, at, canvas->columns - at - end}, BH_LOOK_CAUTION,
                      at > 8 ? defer : "the facility's rules decide");
    (void)bh_canvas_put_right(canvas, (bh_spot){row, 0, canvas->columns}, BH_LOOK_KEY, more);
}

/* --- the menu line --- */

static const char *hint(const bh_model *model)
{
    switch (model->over) {
    case BH_OVER_FIELD:
        if (model->field.width)
            return "Enter keep   Escape leave   Tab new line";
        return "Enter keep   Escape leave   Up Down step the digit";
    case BH_OVER_SHEET:
        return "arrows, Page Up, Page Down read on   any other key closes";
    case BH_OVER_CHOOSE:
        return model->chooser.kind == BH_CHOOSE_VALUE
                   ? "type to narrow   Enter take   Escape leave   Tab type it"
                   : "type to narrow   Enter take   Escape leave";
    case BH_OVER_SOLVE:
        return "Up Down lines   Left Right choose   Enter take   Escape leave";
    case BH_OVER_ASK:
        return "Up Down, Enter, or the letter";
    case BH_OVER_FIND:
        return "type a word   Enter next   Escape done";
    case BH_OVER_NAME:
        return "type a file name   Enter save   Escape leave";
    case BH_OVER_NOTHING:
        break;
    }
    return NULL;
}

static void draw_menu(const bh_model *model, const bh_arrangement *places, bh_canvas *canvas)
{
    const char *only = hint(model);
    bh_menu_place menu[BH_MOST_MENU];
    int turn = 0;
    if (only) {
        bh_canvas_put_cut(canvas, (bh_spot){places->menu, 0, canvas->columns}, BH_LOOK_KEY, only);
        return;
    }
    const int count = bh_menu_places(model, menu, &turn);
    for (int i = 0; i < count; i++) {
        const bh_action *a = menu[i].action;
        bh_spot spot = {places->menu, menu[i].column, canvas->columns - menu[i].column};
        const int key = bh_canvas_put(canvas, spot, BH_LOOK_KEY, a->key) + 1;
        spot.column += key;
        spot.width -= key;
        (void)bh_canvas_put(canvas, spot, BH_LOOK_PLAIN, a->word);
    }
}

void bh_draw_field(bh_canvas *canvas, bh_spot spot, const bh_field *field)
{
    char before[BH_FIELD_SIZE];
    const int room = spot.width - 1;
    (void)snprintf(before, sizeof before, "%.*s", (int)field->cursor, field->bytes);
    int cursor = bh_text_columns(before, canvas->ascii);
    const char *text = field->bytes;
    while (cursor > room && *text) { /* the end is what is typed */
        const size_t one = bh_text_fit(text, 1), first = one ? one : bh_text_fit(text, 2);
        (void)snprintf(before, sizeof before, "%.*s", (int)first, text);
        cursor -= bh_text_columns(before, canvas->ascii);
        text += first;
    }
    bh_canvas_clear(canvas, spot);
    bh_canvas_paint(canvas, spot, BH_LOOK_FIELD);
    (void)bh_canvas_put(canvas, spot, BH_LOOK_FIELD, text);
    canvas->cursor_row = spot.row;
    canvas->cursor_column = spot.column + cursor;
}

void bh_draw(const bh_model *model, bh_canvas *canvas)
{
    canvas->ascii = model->ascii;
    if (!bh_canvas_size(canvas, model->rows, model->columns))
        return;
    const bh_arrangement places = bh_arrange(model);
    canvas->cursor_row = places.menu;
    if (places.title >= 0)
        bh_draw_title(model, &places, canvas);
    if (places.plan_columns)
        bh_draw_plan(model, &places, canvas);
    for (int r = 0; places.plan_columns && places.table_columns && r < places.body_rows; r++)
        (void)bh_canvas_put(canvas, (bh_spot){places.body + r, places.plan_columns, 1},
                            BH_LOOK_QUIET, "\u2502");
    if (places.table_columns)
        bh_draw_table(model, &places, canvas);
    if (places.curve >= 0)
        bh_draw_curve(model, &places, canvas);
    draw_caution(model, &places, canvas);
    draw_menu(model, &places, canvas);
    bh_draw_over(model, &places, canvas);
    draw_messages(model, &places, canvas);
}
