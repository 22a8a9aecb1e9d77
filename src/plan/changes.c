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

void bh_apply_change(bh_document *document, const bh_change *change, size_t i,
                     const bh_reading *reading)
{
    char *source = bh_arena_take(reading->arena, 1, 32); /* marks keep it */
    if (!source) {
        bh_diags_lose(reading->diags);
        return;
    }
    (void)snprintf(source, 32, "--with %zu", i + 1);
    const bh_node *grafted =
        bh_document_graft(document, change->path, change->yaml, source, reading->diags);
    if (grafted && grafted->parent)
        drop_others(document, change, grafted);
}
