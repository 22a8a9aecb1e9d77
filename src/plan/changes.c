/* changes.c - changes for one run: values grafted into the document before it is read. */
#include <stdio.h>
#include <string.h>

#include "beamhours/plan/making.h"

/* The schema of the mapping that holds the last key of `path`, and that key. */
static const bh_key *key_at(const char *path, const bh_schema **schema)
{
    *schema = &bh_schema_plan;
    for (;;) {
        char part[64];
        const size_t length = strcspn(path, ".");
        if (length >= sizeof part)
            return NULL;
        (void)snprintf(part, sizeof part, "%.*s", (int)length, path);
        const bh_key *key = bh_schema_find(*schema, part);
        path += length;
        if (!key || *path == '\0' || !key->children)
            return key && *path == '\0' ? key : NULL;
        path++;
        if (key->kind == BH_KEY_LIST) { /* which item does not matter */
            path += strcspn(path, ".");
            if (*path++ == '\0')
                return NULL;
        }
        *schema = key->children;
    }
}

/* One of a group replaces the others. */
static void drop_others(bh_document *document, const bh_change *change, const bh_node *grafted)
{
    const bh_schema *schema;
    const bh_key *key = key_at(change->path, &schema);
    if (!key || key->group == 0)
        return;
    for (size_t i = 0; i < schema->count; i++) {
        const bh_key *other = &schema->keys[i];
        if (other != key && other->group == key->group)
            bh_document_drop(document, grafted->parent, other->name);
    }
}

/* "targets.hydrogen.tilt" is "target.tilt" where the plan has that one target and no list.  The
 * path to use, `change`'s own or one of the arena; NULL when there is no memory. */
static const char *path_of(const bh_document *document, const bh_change *change,
                           const bh_reading *reading)
{
    static const char lead[] = "targets.";
    const bh_node *root = bh_document_root(document);
    const bh_node *only = root ? bh_node_get(root, "target") : NULL;
    if (strncmp(change->path, lead, sizeof lead - 1) != 0 || !only || bh_node_get(root, "targets"))
        return change->path;
    const char *item = change->path + sizeof lead - 1, *rest = strchr(item, '.');
    const bh_node *name = bh_node_get(only, "name");
    if (!rest)
        return change->path;
    const size_t length = (size_t)(rest - item);
    const bool first = length == 1 && item[0] == '1';
    const bool named = name && name->text && length == strlen(name->text) &&
                       strncmp(item, name->text, length) == 0;
    if (!first && !named)
        return change->path;
    const size_t size = strlen(rest) + sizeof "target";
    char *path = bh_arena_take(reading->arena, 1, size);
    if (path)
        (void)snprintf(path, size, "target%s", rest);
    return path;
}

void bh_apply_change(bh_document *document, const bh_change *change, size_t i,
                     const bh_reading *reading)
{
    char *source = bh_arena_take(reading->arena, 1, 32); /* marks keep it */
    const bh_change made = {path_of(document, change, reading), change->yaml};
    if (!source || !made.path) {
        bh_diags_lose(reading->diags);
        return;
    }
    (void)snprintf(source, 32, "--with %zu", i + 1);
    bh_diags_expect(reading->diags, source);
    const bh_node *grafted =
        bh_document_graft(document, made.path, made.yaml, source, reading->diags);
    if (grafted && grafted->parent)
        drop_others(document, &made, grafted);
}
