/* graft.c - one value of a document changed, in the tree only. */
#include <stdlib.h>
#include <string.h>

#include "beamhours/base/sentences.h"
#include "beamhours/base/text.h"
#include "beamhours/document/node.h"
#include "beamhours/document/scalar.h"
#include "beamhours/document/source.h"
#include "beamhours/document/trail.h"
#include "beamhours/document/tree.h"

enum { SNIPPET = 64, NAMES = 12 /* item names told, at most */ };

/* A path while it is being followed. */
struct walk {
    bh_document *document;
    bh_diags *diags;
    const char *source; /* the option's name, of the arena */
    const char *path;
    char **parts; /* what stands between the dots */
    size_t count;
    bh_node *parent; /* the node that gets the value */
    size_t done;     /* how many parts led there */
    size_t index;    /* which of its items; its count for a new key */
};

/* The path up to the parts that were followed. */
static const char *path_so_far(struct walk *w)
{
    if (w->done == 0)
        return "";
    const size_t length =
        (size_t)(w->parts[w->done - 1] - w->parts[0]) + strlen(w->parts[w->done - 1]);
    const char *copy = bh_tree_copy(w->document->arena, w->path, length);
    if (!copy)
        bh_diags_lose(w->diags);
    return copy ? copy : "";
}

/* [code points] in so many bytes. */
static int columns(const char *text, size_t bytes)
{
    int n = 0;
    for (size_t i = 0; i < bytes; i++)
        n += ((unsigned char)text[i] & 0xC0U) != 0x80;
    return n;
}

/* Where part i begins in the option's text; behind the last one, where the value does. */
static bh_mark mark_of(const struct walk *w, size_t i)
{
    if (i < w->count)
        return (bh_mark){w->source, 1, 1 + columns(w->path, (size_t)(w->parts[i] - w->parts[0]))};
    return (bh_mark){w->source, 1, 2 + columns(w->path, strlen(w->path))};
}

#define SAY(w, part, ...) \
    bh_diags_add((w)->diags, BH_SEVERITY_ERROR, mark_of(w, part), path_so_far(w), __VA_ARGS__)

/* --- following the path --- */

static bool split(struct walk *w)
{
    bh_arena *arena = w->document->arena;
    const size_t length = strlen(w->path);
    char *text = bh_tree_copy(arena, w->path, length);
    w->parts = bh_arena_take(arena, length + 1, sizeof *w->parts);
    if (!text || !w->parts) {
        bh_diags_lose(w->diags);
        return false;
    }
    for (char *dot = text; dot; w->count++) {
        w->parts[w->count] = dot;
        dot = strchr(dot, '.');
        if (dot)
            *dot++ = '\0';
    }
    if (w->count > BH_NESTING_LIMIT) {
        SAY(w, BH_NESTING_LIMIT, BH_SAY_DEPTH, BH_NESTING_LIMIT);
        return false;
    }
    for (size_t i = 0; i < w->count; i++)
        if (w->parts[i][0] == '\0') {
            SAY(w, i, BH_SAY_PATH_PART, w->path);
            return false;
        }
    return true;
}

static void say_no_item(struct walk *w, const bh_node *list, const char *part)
{
    bh_text names = {0};
    for (size_t i = 0; i < list->count && i < NAMES; i++) {
        const char *name = bh_item_name(list->items[i]);
        if (name)
            bh_text_appendf(&names, "%s%s", names.length ? ", " : "", name);
    }
    if (list->count > NAMES && names.length)
        bh_text_append(&names, ", ...");
    if (names.failed)
        bh_diags_lose(w->diags);
    else if (names.length)
        SAY(w, w->done, BH_SAY_NO_ITEM, part, list->count, names.bytes);
    else
        SAY(w, w->done, BH_SAY_NO_ITEM_NUMBER, part, list->count);
    bh_text_free(&names);
}

/* One part further into `node`.  True where there is something. */
static bool step(struct walk *w, bh_node *node)
{
    const char *part = w->parts[w->done];
    w->parent = node;
    if (node->kind == BH_NODE_SCALAR) {
        char text[SNIPPET];
        bh_scalar_short(node->text, text, sizeof text);
        SAY(w, w->done, BH_SAY_NOTHING_INSIDE, part, text);
        w->parent = NULL;
        return false;
    }
    w->index = node->kind == BH_NODE_LIST ? bh_list_find(node, part) : bh_key_find(node, part);
    if (w->index < node->count)
        return true;
    if (node->kind == BH_NODE_LIST) {
        say_no_item(w, node, part);
        w->parent = NULL;
    }
    return false;
}

/* Finds the node that gets the value; what does not exist yet is left to be made.  False, and
 * said, where the path cannot be. */
static bool follow(struct walk *w)
{
    bh_node *node = w->document->root;
    while (w->done < w->count && step(w, node)) {
        node = w->parent->items[w->index];
        w->done++;
    }
    if (w->done == w->count)
        w->done--; /* the last part is what changes */
    return w->parent != NULL;
}

static int depth_of(const bh_node *node)
{
    int depth = 0;
    for (; node; node = node->parent)
        depth++;
    return depth;
}

/* --- the value --- */

/* Demands one value and nothing else, except blanks, in a text that could be read. */
static bool alone(const struct walk *w, const bh_tree_job *job, const bh_tree *tree)
{
    const bool block = tree->root && tree->root->style == BH_STYLE_BLOCK;
    const size_t before = strspn(job->bytes, " "), after = strspn(job->bytes + tree->to, " ");
    const char *rest = job->bytes + tree->to + after;
    if (before == tree->from && *rest == '\0' && !block)
        return true;
    char text[SNIPPET];
    rest += strspn(rest, " \r\n");
    rest = *rest ? rest : job->bytes + before;
    bh_scalar_short(rest, text, sizeof text);
    const bh_mark at = {w->source, 1, 1 + columns(job->bytes, (size_t)(rest - job->bytes))};
    bh_diags_add(w->diags, BH_SEVERITY_ERROR, at, w->path, BH_SAY_MORE_THAN_VALUE, text);
    return false;
}

/* The value behind as many blanks as stand before it in the option: so its marks are right. */
static char *lined_up(const struct walk *w, const char *yaml)
{
    const size_t blanks = (size_t)mark_of(w, w->count).column - 1, length = strlen(yaml);
    char *text = bh_arena_take(w->document->arena, 1, blanks + length + 1);
    if (text) {
        memset(text, ' ', blanks);
        memcpy(text + blanks, yaml, length + 1);
    }
    return text;
}

/* The value as nodes of the document, or NULL and said. */
static bh_node *read_value(const struct walk *w, const char *yaml)
{
    const int depth = depth_of(w->parent) + (int)(w->count - w->done) - 1;
    char *text = lined_up(w, yaml);
    const bh_tree_job job = {.arena = w->document->arena,
                             .name = w->source,
                             .bytes = text,
                             .length = text ? strlen(text) : 0,
                             .path = w->path,
                             .depth = depth,
                             .diags = w->diags};
    if (!text) {
        bh_diags_lose(w->diags);
        return NULL;
    }
    if (strspn(yaml, " \t\r\n") == strlen(yaml) || yaml[strspn(yaml, " ")] == '#') {
        bh_diags_add(w->diags, BH_SEVERITY_ERROR, mark_of(w, w->count), w->path,
                     BH_SAY_NOTHING_GIVEN, w->path);
        return NULL;
    }
    const char *end = strpbrk(text, "\r\n");
    if (end) {
        const bh_tree first = {.to = (size_t)(end - text)};
        (void)alone(w, &job, &first);
        return NULL;
    }
    const bh_tree tree = bh_tree_build(&job);
    return tree.root && alone(w, &job, &tree) ? tree.root : NULL;
}

/* --- putting it in --- */

static bh_node *new_key(const struct walk *w, size_t part)
{
    bh_node *key = bh_arena_take(w->document->arena, 1, sizeof *key);
    if (key) {
        key->at = mark_of(w, part);
        key->text = w->parts[part];
        key->length = strlen(key->text);
    }
    return key;
}

/* Adds a pair at the end of a mapping, its key a part of the path; false, and nothing changed, when
 * memory ran out. */
static bool add_pair(const struct walk *w, bh_node *mapping, size_t part, bh_node *value)
{
    bh_node **keys = bh_arena_take(w->document->arena, mapping->count + 1, sizeof(bh_node *));
    bh_node **items = bh_arena_take(w->document->arena, mapping->count + 1, sizeof(bh_node *));
    bh_node *key = new_key(w, part);
    if (!keys || !items || !key)
        return false;
    for (size_t i = 0; i < mapping->count; i++) {
        keys[i] = mapping->keys[i];
        items[i] = mapping->items[i];
    }
    keys[mapping->count] = key;
    items[mapping->count] = value;
    key->parent = value->parent = mapping;
    mapping->keys = keys;
    mapping->items = items;
    mapping->count++;
    return true;
}

/* Puts mappings around `value` for the parts of the path that do not exist; NULL without memory. */
static bh_node *wrap(const struct walk *w, bh_node *value)
{
    for (size_t i = w->count - 1; i > w->done && value; i--) {
        bh_node *mapping = bh_arena_take(w->document->arena, 1, sizeof *mapping);
        if (!mapping)
            return NULL;
        mapping->kind = BH_NODE_MAPPING;
        mapping->style = BH_STYLE_FLOW;
        mapping->at = mark_of(w, i - 1);
        value = add_pair(w, mapping, i, value) ? mapping : NULL;
    }
    return value;
}

static bool attach(struct walk *w, bh_node *value)
{
    bh_node *outer = wrap(w, value);
    if (!outer)
        return false;
    if (w->index == w->parent->count)
        return add_pair(w, w->parent, w->done, outer);
    outer->parent = w->parent;
    w->parent->items[w->index] = outer;
    return true;
}

/* Three names that say what they are.  NOLINTNEXTLINE(bugprone-easily-swappable-parameters) */
const bh_node *bh_document_graft(bh_document *document, const char *path, const char *yaml,
                                 const char *source, bh_diags *diags)
{
    struct walk w = {.document = document, .diags = diags, .path = path};
    w.source = bh_tree_copy(document->arena, source, strlen(source));
    if (!w.source) {
        bh_diags_lose(diags);
        return NULL;
    }
    if (!split(&w) || !follow(&w))
        return NULL;
    bh_node *value = read_value(&w, yaml);
    if (value && !attach(&w, value)) {
        bh_diags_lose(diags);
        return NULL;
    }
    return value;
}

void bh_document_drop(bh_document *document, const bh_node *mapping, const char *key)
{
    if (!mapping || mapping->kind != BH_NODE_MAPPING)
        return;
    const size_t found = bh_key_find(mapping, key);
    if (found == mapping->count)
        return;
    bh_node *own = document->root; /* the same node, ours to change */
    if (mapping->parent) {
        size_t i = 0;
        while (mapping->parent->items[i] != mapping)
            i++;
        own = mapping->parent->items[i];
    }
    own->count--;
    for (size_t i = found; i < own->count; i++) {
        own->keys[i] = own->keys[i + 1];
        own->items[i] = own->items[i + 1];
    }
}
