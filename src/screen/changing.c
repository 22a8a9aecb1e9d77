/* changing.c - changes of what the plan holds: add, duplicate, remove, move, and back again. */
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/document/trail.h"
#include "beamhours/screen/model.h"

void bh_change_done(bh_model *model)
{
    bh_plan_lines_make(model);
    const size_t done = bh_edit_done(model->edit);
    const bh_edit_step *step = done ? bh_edit_step_at(model->edit, done - 1) : NULL;
    if (step && step->path[0])
        bh_plan_go(model, step->path);
    model->curve_due = true;
    bh_table_refresh(model);
}

/* Makes a change; says why where it cannot be made. */
static bool apply(bh_model *model, const bh_edit_change *change)
{
    bh_diags *diags = bh_diags_new();
    const bool done = diags && bh_edit_apply(model->edit, change, 1, diags);
    if (!done)
        bh_model_note(model, true, "%s",
                      diags && bh_diags_count(diags) ? bh_diags_at(diags, 0)->text
                                                     : "no memory is left for this change");
    bh_diags_free(diags);
    if (done) {
        model->job_due = true;
        bh_change_done(model);
    }
    return done;
}

/* --- names --- */

static bool taken(const bh_node *list, const char *name)
{
    for (size_t i = 0; i < list->count; i++) {
        const char *other = bh_item_name(list->items[i]);
        if (other && strcmp(other, name) == 0)
            return true;
    }
    return false;
}

/* A name like `like` that no item of the list has: K3 after K1 and K2. */
static void new_name(const bh_node *list, const char *like, char out[64])
{
    size_t stem = strlen(like);
    while (stem > 0 && like[stem - 1] >= '0' && like[stem - 1] <= '9')
        stem--;
    if (stem > 48)
        stem = 48;
    const char *gap = like[stem] || stem < 2 ? "" : "-";
    for (size_t n = like[stem] ? (size_t)strtoul(like + stem, NULL, 10) + 1 : 2; n < 1000000; n++) {
        (void)snprintf(out, 64, "%.*s%s%zu", (int)stem, like, gap, n);
        if (!taken(list, out))
            return;
    }
}

/* --- which item is meant --- */

/* The innermost item of a list that the line is, or belongs to; NULL where there is none. */
static const bh_node *item_of(const bh_plan_line *line)
{
    const bh_node *node = line ? line->node : NULL;
    while (node && !(node->parent && node->parent->kind == BH_NODE_LIST))
        node = node->parent;
    return node;
}

static void no_item(bh_model *model)
{
    bh_model_note(model, true, "only what stands in a list: a setting, a layer, an arm, a target");
}

/* The item again, just behind it, by another name if it has one. */
static bool copy_item(bh_model *model, const bh_node *item)
{
    char name[64];
    const char *old = bh_item_name(item);
    if (old)
        new_name(item->parent, old, name);
    return apply(model, &(bh_edit_change){
                            .kind = BH_EDIT_DUPLICATE, .node = item, .text = old ? name : NULL});
}

void bh_change_double(bh_model *model)
{
    const bh_node *item = item_of(bh_plan_here(model));
    if (!item)
        no_item(model);
    else
        (void)copy_item(model, item);
}

void bh_change_remove(bh_model *model)
{
    const bh_plan_line *line = bh_plan_here(model);
    const size_t at = model->plan.at;
    if (!line || !apply(model, &(bh_edit_change){.kind = BH_EDIT_REMOVE, .node = line->node}))
        return;
    if (at < model->plan.count)
        model->plan.at = at;
    bh_plan_keep_in_view(model);
    bh_model_note(model, false, "removed; b takes it back");
}

static void move(bh_model *model, int by)
{
    const bh_node *item = item_of(bh_plan_here(model));
    if (!item) {
        no_item(model);
        return;
    }
    const size_t place = bh_node_place(item);
    if ((by < 0 && place == 0) || (by > 0 && place + 1 == item->parent->count)) {
        bh_model_note(model, false, by < 0 ? "it is the first" : "it is the last");
        return;
    }
    (void)apply(
        model,
        &(bh_edit_change){.kind = BH_EDIT_MOVE, .node = item, .place = by < 0 ? place : place + 2});
}

void bh_change_earlier(bh_model *model)
{
    move(model, -1);
}

void bh_change_later(bh_model *model)
{
    move(model, 1);
}

/* --- adding --- */

/* What a new item of a list looks like, %s its name. */
static const struct {
    const char *list, *inside, *text, *name;
} new_items[] = {
    {"layers", "", "{material: aluminium, thickness: 1 mm}", NULL},
    {"exit", "", "{material: air, thickness: 10 cm}", NULL},
    {"settings", "", "{name: %s, angle: 30 deg, goal: 1 %%}", "S1"},
    {"arms", "settings", "{arm: %s, angle: 40 deg}", "A"},
    {"arms", "", "{name: %s, in_plane: \u00B128 mrad, out_of_plane: \u00B170 mrad}", "B"},
    {"targets", "", "{name: %s, layers: [{material: carbon-12, thickness: 1 mm}]}", "T1"},
    {"tasks", "", "{name: %s, time: 1 h}", "task"},
};

static bool inside_of(const bh_node *list, const char *root)
{
    bh_text path = {0};
    bh_trail_of(list, &path);
    const bool yes = path.bytes && strncmp(path.bytes, root, strlen(root)) == 0;
    bh_text_free(&path);
    return yes;
}

/* Appends `form` with `name` in the place of its %s; %% is a %. */
static void fill_form(const char *form, const char *name, bh_text *into)
{
    for (; *form; form++) {
        if (form[0] == '%' && form[1] == 's')
            bh_text_append(into, name);
        else
            bh_text_append_bytes(into, form, 1);
        form += form[0] == '%';
    }
}

static bool item_text(const bh_node *list, const char *key, bh_text *into)
{
    for (size_t i = 0; i < sizeof new_items / sizeof new_items[0]; i++) {
        char name[64] = "";
        if (strcmp(key, new_items[i].list) != 0 || !inside_of(list, new_items[i].inside))
            continue;
        if (new_items[i].name)
            (void)snprintf(name, sizeof name, "%s", new_items[i].name);
        if (name[0] && taken(list, name))
            new_name(list, new_items[i].name, name);
        fill_form(new_items[i].text, name, into);
        return true;
    }
    const bh_node *last = list->count ? list->items[list->count - 1] : NULL;
    if (last && last->kind == BH_NODE_SCALAR)
        bh_text_append(into, last->text);
    return into->length > 0;
}

static const char *key_of(const bh_node *node)
{
    const bh_node *parent = node->parent;
    return parent && parent->keys ? parent->keys[bh_node_place(node)]->text : "";
}

/* A new setting or layer is like the one before it: only so it is sure to have what a valid one
 * needs in this plan (arm, beam, ring), and to leave no doubt what scatters. */
static const bh_node *like_of(const bh_node *list, size_t place)
{
    const char *key = key_of(list);
    if (list->count == 0 || (strcmp(key, "settings") != 0 && strcmp(key, "layers") != 0))
        return NULL;
    return list->items[place > 1 ? place - 2 : list->count - 1];
}

static bool insert_item(bh_model *model, const bh_node *list, size_t place)
{
    bh_text text = {0};
    bool done = false;
    if (item_text(list, key_of(list), &text))
        done = apply(model,
                     &(bh_edit_change){
                         .kind = BH_EDIT_INSERT, .node = list, .place = place, .text = text.bytes});
    else
        bh_model_note(model, true, "nothing is known that could be added here");
    bh_text_free(&text);
    return done;
}

/* `place`: from 1; 0 is the end. */
static void add_item(bh_model *model, const bh_node *list, size_t place)
{
    const bh_node *like = like_of(list, place);
    if (!(like ? copy_item(model, like) : insert_item(model, list, place)))
        return;
    const bh_plan_line *line = bh_plan_here(model);
    if (line && line->folded)
        bh_plan_turn(model, model->plan.at);
}

static void add_key(bh_model *model, const bh_node *mapping)
{
    bh_text path = {0};
    bh_text_append(&path, "");
    bh_trail_of(mapping, &path);
    if (path.bytes)
        bh_choose_key(model, path.bytes);
    bh_text_free(&path);
}

void bh_change_add(bh_model *model)
{
    const bh_plan_line *line = bh_plan_here(model);
    if (!line) {
        if (model->edit)
            add_key(model, bh_document_root(bh_edit_document(model->edit)));
        return;
    }
    const bh_node *node = line->node;
    const bool mapping = node->kind == BH_NODE_MAPPING, open = !(line->folds && line->folded);
    if (node->kind == BH_NODE_LIST)
        add_item(model, node, 0);
    else if (node->parent->kind == BH_NODE_LIST && !(mapping && open))
        add_item(model, node->parent, bh_node_place(node) + 2);
    else
        add_key(model, mapping ? node : node->parent);
}

/* --- back and again --- */

static void step_by(bh_model *model, bool back)
{
    const size_t done = bh_edit_done(model->edit);
    const bh_edit_step *step = bh_edit_step_at(model->edit, back ? done - 1 : done);
    char text[160];
    if ((back && done == 0) || !step) {
        bh_model_note(model, false, back ? "nothing is left to take back" : "nothing to do again");
        return;
    }
    (void)snprintf(text, sizeof text, "%s", step->text);
    bh_diags *diags = bh_diags_new();
    const bool moved =
        diags && (back ? bh_edit_undo(model->edit, diags) : bh_edit_redo(model->edit, diags));
    bh_diags_free(diags);
    if (!moved) {
        bh_model_note(model, true, "no memory is left for this step");
        return;
    }
    step = bh_edit_step_at(model->edit, back ? done - 1 : done);
    char path[512];
    (void)snprintf(path, sizeof path, "%s", step ? step->path : "");
    model->job_due = true;
    bh_change_done(model);
    bh_plan_go(model, path);
    bh_model_note(model, false, "%s %s", back ? "taken back:" : "done again:", text);
}

/* What was dropped for a file that cannot be read as a plan, with all its history. */
static void bring_back(bh_model *model)
{
    bh_diags *said = bh_diags_new();
    if (said) {
        bh_diags_free(model->said);
        model->said = said;
    }
    model->edit = model->dropped;
    model->dropped = NULL;
    bh_text_free(&model->unread);
    model->rescued = model->job_due = true;
    bh_change_done(model);
    bh_model_note(model, false, "what was dropped is back; s saves it");
}

void bh_change_back(bh_model *model)
{
    if (model->edit)
        step_by(model, true);
    else if (model->dropped)
        bring_back(model);
}

void bh_change_again(bh_model *model)
{
    if (model->edit)
        step_by(model, false);
}
