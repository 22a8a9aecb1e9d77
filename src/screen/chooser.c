/* chooser.c - lists to choose from; what is typed narrows them, what is in focus is tried out. */
#include <stdio.h>
#include <string.h>

#include "beamhours/base/text.h"
#include "beamhours/document/trail.h"
#include "beamhours/screen/choices.h"

void bh_choose_close(bh_chooser *chooser)
{
    bh_arena_free(chooser->arena);
    *chooser = (bh_chooser){.at = 0};
}

static bool begin(bh_model *model, bh_choose_kind kind, const char *title)
{
    bh_choose_close(&model->chooser);
    model->chooser.arena = bh_arena_new();
    if (!model->chooser.arena)
        return false;
    model->chooser.kind = kind;
    model->chooser.title = title;
    return true;
}

static bool contains(const char *text, const char *word)
{
    const size_t n = strlen(word);
    for (; n && *text; text++) {
        size_t i = 0;
        while (i < n && (text[i] | 32) == (word[i] | 32))
            i++;
        if (i == n)
            return true;
    }
    return n == 0;
}

/* Those whose name has what was typed in it; if none has, those about which it is said. */
static void narrow(bh_chooser *c)
{
    c->shown_count = 0;
    for (size_t i = 0; i < c->count; i++)
        if (contains(c->choices[i].name, c->typed.bytes))
            c->shown[c->shown_count++] = i;
    for (size_t i = 0; c->shown_count == 0 && i < c->count; i++)
        if (contains(c->choices[i].about, c->typed.bytes))
            c->shown[c->shown_count++] = i;
    c->at = c->top = 0;
}

static bool open_list(bh_model *model, const char *now)
{
    bh_chooser *c = &model->chooser;
    c->shown = bh_arena_take(c->arena, c->count + 1, sizeof *c->shown);
    if (!c->shown || c->count == 0)
        return false;
    (void)bh_field_set(&c->typed, "");
    narrow(c);
    for (size_t i = 0; i < c->shown_count; i++)
        if (now && strcmp(c->choices[c->shown[i]].name, now) == 0)
            c->at = i;
    model->over = BH_OVER_CHOOSE;
    bh_choose_keep_in_view(model);
    return true;
}

static const bh_choice *here(const bh_chooser *c)
{
    return c->at < c->shown_count ? &c->choices[c->shown[c->at]] : NULL;
}

bool bh_choose_value(bh_model *model)
{
    const bh_plan_line *line = bh_plan_here(model);
    if (!line || line->node->kind != BH_NODE_SCALAR || !begin(model, BH_CHOOSE_VALUE, "CHOOSE"))
        return false;
    bh_text path = {0};
    bh_trail_of(line->node, &path);
    const bool some = path.bytes && bh_choices_for(model, path.bytes);
    if (some) {
        (void)snprintf(model->field_path, sizeof model->field_path, "%s", path.bytes);
        (void)snprintf(model->was, sizeof model->was, "%.150s", line->node->text);
        model->field_node = line->node;
        model->why[0] = '\0';
    }
    bh_text_free(&path);
    return some && open_list(model, line->node->text);
}

void bh_choose_key(bh_model *model, const char *mapping)
{
    if (!begin(model, BH_CHOOSE_KEY, "ADD A KEY"))
        return;
    (void)snprintf(model->field_path, sizeof model->field_path, "%s", mapping);
    bh_choices_of_keys(model, mapping);
    if (!open_list(model, NULL))
        bh_model_note(model, false, "every key that could stand here is there");
}

void bh_choose_plan(bh_model *model)
{
    if (!begin(model, BH_CHOOSE_PLAN, "BEGIN WITH A PLAN"))
        return;
    for (size_t i = 0; i < model->beginning_count; i++)
        bh_choices_add(model, model->beginnings[i].name, model->beginnings[i].title, NULL);
    (void)open_list(model, NULL);
}

/* --- keys --- */

void bh_choose_keep_in_view(bh_model *model)
{
    bh_chooser *c = &model->chooser;
    const int room = bh_arrange(model).body_rows - 6;
    const size_t rows = room > 1 ? (size_t)room : 1;
    if (c->at < c->top)
        c->top = c->at;
    if (c->at >= c->top + rows)
        c->top = c->at - rows + 1;
}

/* What the plan would be with the choice in focus. */
static void attempt(bh_model *model)
{
    const bh_choice *choice = here(&model->chooser);
    if (model->chooser.kind == BH_CHOOSE_VALUE && choice)
        bh_value_attempt(model, choice->name);
}

static void go_by(bh_model *model, long by)
{
    bh_chooser *c = &model->chooser;
    const long last = c->shown_count ? (long)c->shown_count - 1 : 0;
    const long at = (long)c->at + by;
    c->at = (size_t)(at < 0 ? 0 : at > last ? last : at);
    bh_choose_keep_in_view(model);
    attempt(model);
}

static void take_key(bh_model *model, const bh_choice *choice)
{
    char path[600], example[256] = "";
    (void)snprintf(path, sizeof path, "%s%s%s", model->field_path, model->field_path[0] ? "." : "",
                   choice->name);
    if (choice->more)
        (void)snprintf(example, sizeof example, "%s", choice->more);
    model->over = BH_OVER_NOTHING;
    bh_value_begin_key(model, path, example);
}

static void take(bh_model *model)
{
    const bh_choice *choice = here(&model->chooser);
    if (!choice)
        return;
    switch (model->chooser.kind) {
    case BH_CHOOSE_VALUE:
        if (!bh_value_keep(model, choice->name))
            return; /* why is said */
        break;
    case BH_CHOOSE_KEY:
        take_key(model, choice);
        break;
    case BH_CHOOSE_PLAN:
        model->chosen = model->chooser.shown[model->chooser.at];
        model->wish = BH_WISH_OPEN;
        model->over = BH_OVER_NOTHING;
        break;
    }
    bh_choose_close(&model->chooser);
}

static void drop(bh_model *model)
{
    const bh_choose_kind kind = model->chooser.kind;
    bh_choose_close(&model->chooser);
    if (kind == BH_CHOOSE_PLAN)
        model->wish = BH_WISH_LEAVE;
    if (kind == BH_CHOOSE_VALUE)
        bh_value_leave(model);
    model->over = BH_OVER_NOTHING;
}

static void click(bh_model *model, const bh_press *press)
{
    bh_chooser *c = &model->chooser;
    const long row = press->row - bh_arrange(model).body - 2;
    if (row < 0 || c->top + (size_t)row >= c->shown_count)
        return;
    const bool again = c->at == c->top + (size_t)row;
    go_by(model, (long)c->top + row - (long)c->at);
    if (again || press->kind == BH_PRESS_DOUBLE_CLICK)
        take(model);
}

/* The value as a text instead of a choice. */
static void type_it(bh_model *model)
{
    bh_choose_close(&model->chooser);
    bh_value_leave(model);
    bh_value_begin(model, NULL);
}

static bool move(bh_model *model, const bh_press *press)
{
    const long page = bh_arrange(model).body_rows - 7;
    switch (press->kind) {
    case BH_PRESS_UP:
    case BH_PRESS_WHEEL_UP:
        go_by(model, -1);
        return true;
    case BH_PRESS_DOWN:
    case BH_PRESS_WHEEL_DOWN:
        go_by(model, 1);
        return true;
    case BH_PRESS_PAGE_UP:
        go_by(model, -page);
        return true;
    case BH_PRESS_PAGE_DOWN:
        go_by(model, page);
        return true;
    default:
        return false;
    }
}

bool bh_choose_press(bh_model *model, const bh_press *press)
{
    if (move(model, press))
        return true;
    switch (press->kind) {
    case BH_PRESS_ENTER:
        take(model);
        return true;
    case BH_PRESS_ESCAPE:
    case BH_PRESS_INTERRUPT:
        drop(model);
        return true;
    case BH_PRESS_TAB:
        if (model->chooser.kind == BH_CHOOSE_VALUE)
            type_it(model);
        return true;
    case BH_PRESS_CLICK:
    case BH_PRESS_DOUBLE_CLICK:
        click(model, press);
        return true;
    default:
        if (bh_field_press(&model->chooser.typed, press)) {
            narrow(&model->chooser);
            attempt(model);
        }
        return true;
    }
}
