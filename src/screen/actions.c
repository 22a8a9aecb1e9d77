/* actions.c - the one list of keys: what they do, the menu line and the help follow from it. */
#include <stdio.h>
#include <string.h>

#include "beamhours/screen/model.h"

static void save(bh_model *model)
{
    model->wish = BH_WISH_SAVE;
}

static void save_as(bh_model *model)
{
    if (bh_field_set(&model->field, model->file))
        model->over = BH_OVER_NAME;
}

static void whole(bh_model *model)
{
    bh_value_begin(model, NULL);
}

static void about(bh_model *model)
{
    bh_sheet_show(model, BH_SHEET_ABOUT);
}

static void messages(bh_model *model)
{
    bh_sheet_show(model, BH_SHEET_MESSAGES);
}

static void cautions(bh_model *model)
{
    bh_sheet_show(model, BH_SHEET_CAUTIONS);
}

static void help(bh_model *model)
{
    bh_sheet_show(model, BH_SHEET_HELP);
}

static void history(bh_model *model)
{
    bh_sheet_show(model, BH_SHEET_HISTORY);
}

static void explain(bh_model *model)
{
    const bh_table_row *row = bh_table_here(model);
    if (row)
        bh_sheet_show(model, BH_SHEET_EXPLAIN);
}

static void solve(bh_model *model)
{
    bh_solving_begin(model, NULL);
}

static void other_curve(bh_model *model)
{
    static const char *const what[] = {"cross section", "signal rate", "counts", "no curve"};
    model->curve_shown = (bh_curve_shown)((model->curve_shown + 1) % BH_SHOW_COUNT);
    bh_table_refresh(model);
    bh_model_note(model, false, "below the table: %s", what[model->curve_shown]);
}

static void to_plan(bh_model *model)
{
    const bh_table_row *row = bh_table_here(model);
    if (!row || !model->edit)
        return;
    char path[160];
    const char *name = bh_table_setting(model, row)->name;
    const bh_setting *setting = bh_table_setting(model, row);
    const bh_node *root = bh_document_root(bh_edit_document(model->edit));
    const bh_node *list = bh_node_get(root, "settings");
    (void)snprintf(path, sizeof path, "settings.%.100s", name);
    for (size_t i = 0; list && i < list->count; i++) /* a step of a sweep: the sweep */
        if (list->items[i]->at.line == setting->at.line &&
            list->items[i]->at.column == setting->at.column)
            (void)snprintf(path, sizeof path, "settings.%zu", i + 1);
    model->pane = BH_PANE_PLAN;
    bh_plan_go(model, path);
}

enum { PLAN = 1, TABLE = 2, BOTH = 3, ALWAYS = 7 /* in every part, and always in sight */ };

static void turn_menu(bh_model *model);

static const bh_action actions[] = {
    {"Enter", "edit", "edit the value, or open and close what has lines below it", PLAN, NULL},
    {"Enter", "bins", "open or close the bins of the row", TABLE, NULL},
    {"a", "add", "add a key, an arm; a setting or layer like the one before", PLAN, bh_change_add},
    {"r", "remove", "take the line, or the whole item, out of the plan", PLAN, bh_change_remove},
    {"w", "what it takes", "a wanted value of this column: what input gives it", TABLE, solve},
    {"e", "explain", "where each number of the row comes from", TABLE, explain},
    {"b", "back", "take the last change back", BOTH, bh_change_back},
    {"s", "save", "save the plan", BOTH, save},
    {"o", "order", "order the rows by this column: rising, falling, as in the plan", TABLE,
     bh_table_order},
    {"p", "pin", "pin the table as it is, and see every later change against it", TABLE,
     bh_table_pin},
    {"f", "forth", "do again what was taken back", BOTH, bh_change_again},
    {"d", "duplicate", "the same setting, layer or arm again, behind it", PLAN, bh_change_double},
    {"l", "look for", "find a word in the plan or a setting in the table", BOTH, bh_find_begin},
    {"<", "earlier", "move the item towards the beginning of its list", PLAN, bh_change_earlier},
    {">", "later", "move the item towards the end of its list", PLAN, bh_change_later},
    {"i", "info", "what the key means, its units and its default", PLAN, about},
    {"=", "as text", "edit a list or a group in brackets as one text", PLAN, whole},
    {"t", "to plan", "go to the setting in the plan", TABLE, to_plan},
    {"v", "curve", "below the table: cross section, rate, counts, nothing", BOTH, other_curve},
    {"c", "cautions", "the cautions in full", BOTH, cautions},
    {"m", "messages", "all errors and warnings; Enter goes to the line", BOTH, messages},
    {"h", "history", "every change so far", BOTH, history},
    {"n", "new name", "save under another name", BOTH, save_as},
    {"q", "leave", "leave; asks when something is not saved", ALWAYS, bh_leave},
    {",", "more", "the other keys in this line", ALWAYS, turn_menu},
    {"?", "help", "all keys", ALWAYS, help},
};

enum { GAP = 2, LEAST_MENU = 10 /* columns */ };
enum { ACTIONS = (int)(sizeof actions / sizeof actions[0]) };

const bh_action *bh_action_at(size_t i)
{
    return i < ACTIONS ? &actions[i] : NULL;
}

bool bh_action_means(const bh_model *model, const bh_action *action)
{
    return action->where & (model->pane == BH_PANE_PLAN ? PLAN : TABLE);
}

static bool is_key(const bh_action *a, uint32_t point)
{
    return a->run && !a->key[1] && (uint32_t)(unsigned char)a->key[0] == point;
}

/* A key that means nothing here is answered, too. */
static void say_no_key(bh_model *model, uint32_t point)
{
    for (size_t i = 0; i < ACTIONS; i++)
        if (is_key(&actions[i], point)) {
            bh_model_note(model, true, "%s, %s, is a key of the %s: Tab goes there", actions[i].key,
                          actions[i].word, actions[i].where == PLAN ? "plan" : "run table");
            return;
        }
    if (point > ' ' && point < 0x7F)
        bh_model_note(model, true, "%c is no key here; ? shows all keys", (int)point);
    else
        bh_model_note(model, true, "this is no key here; ? shows all keys");
}

bool bh_action_press(bh_model *model, const bh_press *press)
{
    if (press->kind == BH_PRESS_RUBOUT || press->kind == BH_PRESS_DELETE)
        bh_model_note(model, true,
                      model->pane == BH_PANE_PLAN
                          ? "r takes this line out of the plan"
                          : "in the plan r takes a setting out: t goes there");
    if (press->kind != BH_PRESS_POINT)
        return false;
    for (size_t i = 0; i < ACTIONS; i++) {
        const bh_action *a = &actions[i];
        if (!is_key(a, press->point) || !bh_action_means(model, a))
            continue;
        if (!model->edit && (a->where == PLAN || a->run == save))
            bh_model_note(model, true, "this text cannot be read as a plan, so it is only shown");
        else
            a->run(model);
        return true;
    }
    say_no_key(model, press->point);
    return true;
}

/* --- the menu line --- */

static int width_of(const bh_action *a)
{
    return (int)(strlen(a->key) + strlen(a->word)) + 1;
}

static bool is_always(const bh_action *a)
{
    return a->where == ALWAYS;
}

/* From the right, as far as there is room; returns the column that they begin in. */
static int place_always(int columns, bh_menu_place *out, int *count)
{
    int at = columns + GAP;
    for (size_t i = ACTIONS; i-- > 0;) {
        const bh_action *a = &actions[i];
        if (!is_always(a) || at - GAP - width_of(a) < (*count ? LEAST_MENU : 0))
            continue;
        at -= GAP + width_of(a);
        out[(*count)++] = (bh_menu_place){a, at};
    }
    return at;
}

int bh_menu_places(const bh_model *model, bh_menu_place out[BH_MOST_MENU], int *turn)
{
    int count = 0, at = 0, skipped = 0;
    const int end = place_always(model->columns, out, &count);
    const int fixed = count;
    for (size_t i = 0; i < ACTIONS; i++) {
        const bh_action *a = &actions[i];
        if (is_always(a) || !bh_action_means(model, a) || skipped++ < model->menu_from)
            continue;
        if (at + width_of(a) + GAP > end || count >= BH_MOST_MENU)
            break;
        out[count++] = (bh_menu_place){a, at};
        at += width_of(a) + GAP;
    }
    *turn = count - fixed;
    return count;
}

static void turn_menu(bh_model *model)
{
    bh_menu_place places[BH_MOST_MENU];
    int turn = 0, all = 0;
    (void)bh_menu_places(model, places, &turn);
    for (size_t i = 0; i < ACTIONS; i++)
        all += !is_always(&actions[i]) && bh_action_means(model, &actions[i]);
    model->menu_from += turn;
    if (turn == 0 || model->menu_from >= all)
        model->menu_from = 0;
}

void bh_menu_click(bh_model *model, int column)
{
    bh_menu_place places[BH_MOST_MENU];
    int turn = 0;
    const int count = bh_menu_places(model, places, &turn);
    for (int i = 0; i < count; i++) {
        const bh_action *a = places[i].action;
        if (column < places[i].column || column >= places[i].column + width_of(a))
            continue;
        const bool letter = a->run != NULL;
        const bh_press press = {.kind = letter ? BH_PRESS_POINT : BH_PRESS_ENTER,
                                .point = letter ? (uint32_t)(unsigned char)a->key[0] : 0};
        bh_model_press(model, &press);
        return;
    }
}
