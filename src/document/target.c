/* target.c - what a change of a document is about. */
#include "beamhours/document/target.h"

#include <stdlib.h>
#include <string.h>

#include "beamhours/base/sentences.h"
#include "beamhours/document/scalar.h"
#include "beamhours/document/trail.h"
#include "beamhours/document/tree.h"

enum { SNIPPET = 64 };

struct search {
    const bh_document *document;
    const bh_edit_change *change;
    bh_diags *diags;
    const char *at; /* what of the path is not followed yet */
};

#define REFUSE(s, node, ...)                                                \
    (bh_diags_add((s)->diags, BH_SEVERITY_ERROR, (node)->at,                \
                  (s)->change->path ? (s)->change->path : "", __VA_ARGS__), \
     false)

bh_target_name bh_target_call(const bh_node *node)
{
    bh_target_name name = {"plan"};
    bh_text path = {0};
    bh_trail_of(node, &path);
    if (!path.failed && path.length > 0)
        bh_scalar_short(path.bytes, name.text, sizeof name.text);
    bh_text_free(&path);
    return name;
}

static bool no_item(const struct search *s, const bh_node *list, const char *part)
{
    return REFUSE(s, list, BH_SAY_NO_ITEM_NUMBER, part, list->count);
}

/* One part of the path into `node`; the part is NUL-terminated, `more` is behind it. */
static bool step(struct search *s, const bh_node *node, const char *part, bh_target *t)
{
    if (node->kind == BH_NODE_SCALAR) {
        char text[SNIPPET];
        if (bh_node_empty(node) && node->parent)
            return true; /* s->at stays: to go inside */
        bh_scalar_short(node->text, text, sizeof text);
        return REFUSE(s, node, BH_SAY_NOTHING_INSIDE, part, text);
    }
    t->around = node;
    t->index = node->kind == BH_NODE_LIST ? bh_list_find(node, part) : bh_key_find(node, part);
    if (t->index == node->count && node->kind == BH_NODE_LIST)
        return no_item(s, node, part);
    t->node = t->index < node->count ? node->items[t->index] : NULL;
    if (t->node) {
        s->at += strlen(part);
        s->at += *s->at == '.';
    }
    return true;
}

static bool well_formed(const struct search *s)
{
    const char *p = s->at;
    const size_t length = strlen(p);
    if (length > 0 && (p[0] == '.' || p[length - 1] == '.' || strstr(p, "..")))
        return REFUSE(s, bh_document_root(s->document), BH_SAY_PATH_PART, p);
    return true;
}

/* Follows the path as far as it goes. */
static bool follow(struct search *s, bh_target *t)
{
    bool good = well_formed(s);
    t->node = bh_document_root(s->document);
    while (good && *s->at && t->node) {
        const char *before = s->at;
        char *part = malloc(strlen(s->at) + 1);
        if (!part) {
            bh_diags_lose(s->diags);
            return false;
        }
        const size_t length = strcspn(s->at, ".");
        memcpy(part, s->at, length);
        part[length] = '\0';
        good = step(s, t->node, part, t);
        free(part);
        if (s->at == before)
            break;
    }
    t->rest = s->at;
    return good;
}

static bool find_node(struct search *s, bh_target *t)
{
    if (s->change->node) {
        t->node = s->change->node;
        t->rest = "";
        return true;
    }
    return follow(s, t);
}

/* The change adds to the node itself. */
static bool aim_inside(const struct search *s, bh_target *t)
{
    const bh_node *node = t->node;
    if (node->kind == BH_NODE_SCALAR) {
        BH_TARGET_REFUSE(s->diags, node, BH_REFUSE_NO_LIST);
        return false;
    }
    *t = (bh_target){node, node->count, NULL, ""};
    return true;
}

bool bh_target_find(const bh_document *document, const bh_edit_change *change, bh_target *target,
                    bh_diags *diags)
{
    struct search s = {document, change, diags, change->path ? change->path : ""};
    bh_target t = {.rest = ""};
    if (!find_node(&s, &t))
        return false;
    if (*t.rest && change->kind != BH_EDIT_SET)
        return REFUSE(&s, t.around ? t.around : bh_document_root(document), BH_REFUSE_NOTHING_THERE,
                      change->path);
    if (change->kind == BH_EDIT_INSERT && !aim_inside(&s, &t))
        return false;
    if (change->kind != BH_EDIT_INSERT && t.node && !t.node->parent)
        return REFUSE(&s, t.node, BH_REFUSE_ROOT);
    if (t.node) {
        t.around = t.node->parent;
        t.index = bh_node_place(t.node);
    }
    *target = t;
    return true;
}
