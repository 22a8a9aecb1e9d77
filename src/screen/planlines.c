/* planlines.c - the plan as lines: what can be closed, where the focus stands. */
#include <stdlib.h>
#include <string.h>

#include "beamhours/document/trail.h"
#include "beamhours/screen/model.h"

void bh_plan_lines_free(bh_plan_view *view)
{
    bh_arena_free(view->arena);
    for (size_t i = 0; i < view->turned_count; i++)
        free(view->turned[i]);
    free(view->turned);
    free(view->lines);
    *view = (bh_plan_view){0};
}

/* Nodes that were opened or closed by hand, found once for all lines. */
struct making {
    bh_plan_view *view;
    const bh_node **turned;
    bool failed;
};

static bool was_turned(const struct making *m, const bh_node *node)
{
    for (size_t i = 0; i < m->view->turned_count; i++)
        if (m->turned[i] == node)
            return true;
    return false;
}

/* Short things are closed: what is written on one line, and one of several alike. */
static bool closed_at_first(const bh_node *node)
{
    const bh_node *parent = node->parent;
    if (node->style == BH_STYLE_FLOW)
        return true;
    return parent && parent->kind == BH_NODE_LIST && parent->count > 1;
}

static bh_plan_line *add_line(struct making *m)
{
    bh_plan_view *v = m->view;
    if (v->count == v->room) {
        const size_t room = v->room ? 2 * v->room : 256;
        bh_plan_line *more = realloc(v->lines, room * sizeof *more);
        if (!more) {
            m->failed = true;
            return NULL;
        }
        v->lines = more;
        v->room = room;
    }
    return &v->lines[v->count++];
}

/* NOLINTBEGIN(misc-no-recursion): as deep as a document may be, 32 levels */
static void add(struct making *m, const bh_node *node, const char *label, int depth)
{
    bh_plan_line *line = add_line(m);
    if (!line)
        return;
    const bool folds = node->kind != BH_NODE_SCALAR && node->count > 0;
    const bool folded = folds && closed_at_first(node) != was_turned(m, node);
    *line = (bh_plan_line){
        .node = node, .label = label, .depth = depth, .folds = folds, .folded = folded};
    for (size_t i = 0; folds && !folded && i < node->count; i++)
        add(m, node->items[i], node->keys ? node->keys[i]->text : NULL, depth + 1);
}
/* NOLINTEND(misc-no-recursion) */

static void find_turned(struct making *m, const bh_document *document)
{
    for (size_t i = 0; i < m->view->turned_count; i++)
        m->turned[i] = bh_document_find(document, m->view->turned[i]);
}

void bh_plan_lines_make(bh_model *model)
{
    bh_plan_view *v = &model->plan;
    v->count = 0;
    if (!model->edit)
        return;
    const bh_document *document = bh_edit_document(model->edit);
    const bh_node *root = bh_document_root(document);
    struct making m = {.view = v, .turned = calloc(v->turned_count + 1, sizeof(void *))};
    if (m.turned) {
        find_turned(&m, document);
        for (size_t i = 0; i < root->count; i++)
            add(&m, root->items[i], root->keys ? root->keys[i]->text : NULL, 0);
    }
    free(m.turned);
    v->version = bh_edit_version(model->edit);
    if (v->at >= v->count)
        v->at = v->count ? v->count - 1 : 0;
    bh_plan_keep_in_view(model);
}

const bh_plan_line *bh_plan_here(const bh_model *model)
{
    const bh_plan_view *v = &model->plan;
    return v->at < v->count ? &v->lines[v->at] : NULL;
}

/* --- values --- */

/* Appends the values of a mapping's scalars, the name first, as one line. */
static void append_values(const bh_node *node, bh_text *into)
{
    const char *gap = "";
    for (size_t i = 0; i < node->count; i++) {
        const bh_node *item = node->items[i];
        if (item->kind != BH_NODE_SCALAR)
            continue;
        bh_text_appendf(into, "%s%s", gap, item->text);
        gap = "  ";
    }
}

static void append_whole(const bh_model *model, const bh_node *node, bh_text *into)
{
    size_t length = 0;
    const char *bytes = bh_edit_bytes(model->edit, &length);
    for (size_t i = node->from; i < node->to && i < length; i++)
        if (bytes[i] != '\n' && bytes[i] != '\r')
            bh_text_append_bytes(into, bytes + i, 1);
}

void bh_plan_value(const bh_model *model, const bh_plan_line *line, bh_text *into)
{
    const bh_node *node = line->node;
    if (node->kind == BH_NODE_SCALAR) {
        for (const char *c = node->text; *c; c++)
            bh_text_append_bytes(into, *c == '\n' ? " " : c, 1);
        return;
    }
    if (!line->folded && node->count > 0)
        return;
    const bool item = node->parent && node->parent->kind == BH_NODE_LIST;
    if (node->style == BH_STYLE_FLOW && !item)
        append_whole(model, node, into);
    else if (node->kind == BH_NODE_MAPPING)
        append_values(node, into);
    else
        bh_text_appendf(into, "%zu", node->count);
}

/* --- opening and closing --- */

/* Scrolls so that lines `first` to `last` are in view, as far as there is room. */
static void show_lines(bh_model *model, size_t first, size_t last)
{
    bh_plan_view *v = &model->plan;
    const bh_arrangement places = bh_arrange(model);
    const size_t rows = places.body_rows > 1 ? (size_t)places.body_rows - 1 : 1;
    if (last >= v->top + rows)
        v->top = last - rows + 1;
    if (v->top > first)
        v->top = first;
    bh_plan_keep_in_view(model);
}

static bool forget_turned(bh_plan_view *v, const char *path)
{
    for (size_t i = 0; i < v->turned_count; i++)
        if (strcmp(v->turned[i], path) == 0) {
            free(v->turned[i]);
            v->turned[i] = v->turned[--v->turned_count];
            return true;
        }
    return false;
}

static void turn(bh_plan_view *v, const bh_node *node)
{
    bh_text path = {0};
    bh_trail_of(node, &path);
    if (!path.bytes || forget_turned(v, path.bytes)) {
        bh_text_free(&path);
        return;
    }
    char **more = realloc(v->turned, (v->turned_count + 1) * sizeof *more);
    char *own = bh_text_take(&path);
    if (more)
        v->turned = more;
    if (more && own)
        v->turned[v->turned_count++] = own;
    else
        free(own);
}

void bh_plan_turn(bh_model *model, size_t line)
{
    bh_plan_view *v = &model->plan;
    if (line >= v->count || !v->lines[line].folds)
        return;
    turn(v, v->lines[line].node);
    bh_plan_lines_make(model);
    size_t last = line + 1;
    while (last < v->count && v->lines[last].depth > v->lines[line].depth)
        last++;
    show_lines(model, line, last - 1);
}

static size_t line_of(const bh_plan_view *v, const bh_node *node)
{
    for (size_t i = 0; i < v->count; i++)
        if (v->lines[i].node == node)
            return i;
    return v->count;
}

void bh_plan_go(bh_model *model, const char *path)
{
    bh_plan_view *v = &model->plan;
    if (!model->edit)
        return;
    const bh_node *node = bh_document_find(bh_edit_document(model->edit), path);
    if (!node || !node->parent)
        return;
    for (int depth = 0; depth < BH_NESTING_LIMIT && line_of(v, node) == v->count; depth++) {
        const bh_node *hides = node->parent; /* the innermost that is shown */
        while (hides && line_of(v, hides) == v->count)
            hides = hides->parent;
        if (!hides || !hides->parent)
            break;
        bh_plan_turn(model, line_of(v, hides));
    }
    const size_t line = line_of(v, node);
    if (line < v->count)
        v->at = line;
    bh_plan_keep_in_view(model);
}

/* The outermost node that begins in a line of the file; else the last one before it. */
struct sought {
    int line;
    const bh_node *exact, *before;
};

/* NOLINTBEGIN(misc-no-recursion): as deep as a document may be */
static void seek(struct sought *s, const bh_node *node)
{
    if (node->parent && node->at.line == s->line && !s->exact)
        s->exact = node;
    if (node->parent && node->at.line < s->line)
        s->before = node;
    for (size_t i = 0; i < node->count && !s->exact; i++)
        seek(s, node->items[i]);
}
/* NOLINTEND(misc-no-recursion) */

void bh_plan_go_line(bh_model *model, int line)
{
    bh_text path = {0};
    struct sought s = {.line = line};
    if (!model->edit || line < 1)
        return;
    seek(&s, bh_document_root(bh_edit_document(model->edit)));
    if (s.exact || s.before)
        bh_trail_of(s.exact ? s.exact : s.before, &path);
    if (path.bytes) {
        model->pane = BH_PANE_PLAN;
        bh_plan_go(model, path.bytes);
    }
    bh_text_free(&path);
}

/* --- keys --- */

void bh_plan_keep_in_view(bh_model *model)
{
    bh_plan_view *v = &model->plan;
    const bh_arrangement places = bh_arrange(model);
    const size_t rows = places.body_rows > 1 ? (size_t)places.body_rows - 1 : 1;
    if (v->at < v->top)
        v->top = v->at;
    if (v->at >= v->top + rows)
        v->top = v->at - rows + 1;
    if (v->top + rows > v->count)
        v->top = v->count > rows ? v->count - rows : 0;
}

static void go_by(bh_model *model, long by)
{
    bh_plan_view *v = &model->plan;
    const long last = v->count ? (long)v->count - 1 : 0;
    long at = (long)v->at + by;
    at = at < 0 ? 0 : at > last ? last : at;
    v->at = (size_t)at;
    bh_plan_keep_in_view(model);
}

/* To the line that this one hangs on; closes an open one first. */
static void outwards(bh_model *model)
{
    bh_plan_view *v = &model->plan;
    const bh_plan_line *line = bh_plan_here(model);
    if (!line)
        return;
    if (line->folds && !line->folded) {
        bh_plan_turn(model, v->at);
        return;
    }
    const size_t parent = line_of(v, line->node->parent);
    if (parent < v->count)
        v->at = parent;
    bh_plan_keep_in_view(model);
}

static void inwards(bh_model *model)
{
    const bh_plan_line *line = bh_plan_here(model);
    if (line && line->folds && line->folded)
        bh_plan_turn(model, model->plan.at);
    else
        go_by(model, 1);
}

/* Where a click or the wheel meant the plan. */
static bool mouse(bh_model *model, const bh_press *press)
{
    const bh_arrangement places = bh_arrange(model);
    if (press->kind == BH_PRESS_WHEEL_UP || press->kind == BH_PRESS_WHEEL_DOWN) {
        go_by(model, press->kind == BH_PRESS_WHEEL_UP ? -3 : 3);
        return true;
    }
    const long row = press->row - places.body - 1;
    if (row < 0 || model->plan.top + (size_t)row >= model->plan.count)
        return true;
    model->plan.at = model->plan.top + (size_t)row;
    const bh_plan_line *line = bh_plan_here(model);
    if (press->kind != BH_PRESS_DOUBLE_CLICK)
        return true;
    if (line->folds)
        bh_plan_turn(model, model->plan.at);
    else if (!bh_choose_value(model))
        bh_value_begin(model, NULL);
    return true;
}

static void enter(bh_model *model)
{
    const bh_plan_line *line = bh_plan_here(model);
    if (!line)
        return;
    if (line->folds)
        bh_plan_turn(model, model->plan.at);
    else if (!bh_choose_value(model))
        bh_value_begin(model, NULL);
}

bool bh_plan_press(bh_model *model, const bh_press *press)
{
    const bh_arrangement places = bh_arrange(model);
    const long page = places.body_rows > 2 ? places.body_rows - 2 : 1;
    switch (press->kind) {
    case BH_PRESS_UP:
        go_by(model, -1);
        return true;
    case BH_PRESS_DOWN:
        go_by(model, 1);
        return true;
    case BH_PRESS_PAGE_UP:
        go_by(model, -page);
        return true;
    case BH_PRESS_PAGE_DOWN:
        go_by(model, page);
        return true;
    case BH_PRESS_HOME:
        go_by(model, -(long)model->plan.count);
        return true;
    case BH_PRESS_END:
        go_by(model, (long)model->plan.count);
        return true;
    case BH_PRESS_LEFT:
        outwards(model);
        return true;
    case BH_PRESS_RIGHT:
        inwards(model);
        return true;
    case BH_PRESS_ENTER:
        enter(model);
        return true;
    case BH_PRESS_CLICK:
    case BH_PRESS_DOUBLE_CLICK:
    case BH_PRESS_WHEEL_UP:
    case BH_PRESS_WHEEL_DOWN:
        return mouse(model, press);
    default:
        return false;
    }
}
