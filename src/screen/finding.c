/* finding.c - the next line of the plan, or row of the table, that has a word in it. */
#include <string.h>

#include "beamhours/document/trail.h"
#include "beamhours/screen/model.h"

void bh_find_begin(bh_model *model)
{
    model->over = BH_OVER_FIND;
    (void)bh_field_set(&model->field, "");
}

static char lower(char c)
{
    return (char)(c >= 'A' && c <= 'Z' ? c + 32 : c);
}

/* Is `word` in `text`, small and capital letters alike? */
static bool holds(const char *text, const char *word)
{
    for (; text && *text; text++) {
        size_t n = 0;
        while (word[n] && lower(text[n]) == lower(word[n]))
            n++;
        if (!word[n])
            return true;
    }
    return false;
}

/* Nodes of the plan in the order of its lines, hidden ones too. */
struct search {
    const char *word;
    const bh_node *from; /* the search begins behind it */
    bool passed;
    const bh_node *first, *next; /* the first of all; the first behind `from` */
};

/* NOLINTBEGIN(misc-no-recursion): as deep as a document may be */
static void search(struct search *s, const bh_node *node, const char *label)
{
    const bool hit =
        holds(label, s->word) || (node->kind == BH_NODE_SCALAR && holds(node->text, s->word));
    if (hit && node->parent) {
        s->first = s->first ? s->first : node;
        if (s->passed && !s->next)
            s->next = node;
    }
    s->passed = s->passed || node == s->from;
    for (size_t i = 0; i < node->count; i++)
        search(s, node->items[i], node->keys ? node->keys[i]->text : NULL);
}
/* NOLINTEND(misc-no-recursion) */

static bool find_in_plan(bh_model *model, bool next)
{
    const bh_plan_line *line = bh_plan_here(model);
    struct search s = {.word = model->field.bytes, .from = line ? line->node : NULL};
    if (!model->edit)
        return false;
    if (!next && line) { /* while typing: this line counts too */
        const size_t at = model->plan.at;
        s.from = at > 0 ? model->plan.lines[at - 1].node : NULL;
    }
    s.passed = s.from == NULL;
    search(&s, bh_document_root(bh_edit_document(model->edit)), NULL);
    const bh_node *found = s.next ? s.next : s.first;
    bh_text path = {0};
    if (found)
        bh_trail_of(found, &path);
    if (path.bytes)
        bh_plan_go(model, path.bytes);
    bh_text_free(&path);
    return found != NULL;
}

static bool find_in_table(bh_model *model, bool next)
{
    const bh_table_view *v = &model->table;
    for (size_t n = next ? 1 : 0; n < v->count + (next ? 1 : 0); n++) {
        const size_t i = (v->at + n) % v->count;
        if (holds(bh_table_setting(model, &v->rows[i])->name, model->field.bytes)) {
            bh_table_go(model, (long)i - (long)v->at);
            return true;
        }
    }
    return false;
}

static void find(bh_model *model, bool next)
{
    if (!model->field.length)
        return;
    const bool found =
        model->pane == BH_PANE_PLAN ? find_in_plan(model, next) : find_in_table(model, next);
    if (!found)
        bh_model_note(model, true, "nothing with \"%.100s\" in it", model->field.bytes);
}

bool bh_find_press(bh_model *model, const bh_press *press)
{
    switch (press->kind) {
    case BH_PRESS_ESCAPE:
    case BH_PRESS_INTERRUPT:
        model->over = BH_OVER_NOTHING;
        return true;
    case BH_PRESS_ENTER:
    case BH_PRESS_DOWN:
        find(model, true);
        return true;
    default:
        if (bh_field_press(&model->field, press))
            find(model, false);
        return true;
    }
}
