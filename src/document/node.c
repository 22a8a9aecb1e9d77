/* node.c - a document and the way around in it. */
#include "beamhours/document/node.h"

#include <stdlib.h>
#include <string.h>

#include "beamhours/base/sentences.h"
#include "beamhours/document/tree.h"

char *bh_tree_copy(bh_arena *arena, const char *bytes, size_t length)
{
    char *copy = bh_arena_take(arena, length + 1, 1);
    if (copy && length > 0)
        memcpy(copy, bytes, length);
    return copy;
}

/* Copies name and bytes; false when there is no memory. */
static bool fill(bh_document *d, const char *bytes, size_t length, const char *name)
{
    d->arena = bh_arena_new();
    if (!d->arena)
        return false;
    d->name = bh_tree_copy(d->arena, name, strlen(name));
    d->bytes = bh_tree_copy(d->arena, bytes, length);
    d->length = length;
    return d->name && d->bytes;
}

bh_document *bh_document_parse(const char *bytes, size_t length, const char *name, bh_diags *diags)
{
    if (length > BH_DOCUMENT_LIMIT) {
        const bh_mark whole = {name, 1, 1};
        bh_diags_add(diags, BH_SEVERITY_ERROR, whole, "", BH_SAY_TOO_LONG);
        return NULL;
    }
    bh_document *d = calloc(1, sizeof *d);
    if (!d || !fill(d, bytes, length, name)) {
        bh_diags_lose(diags);
        bh_document_free(d);
        return NULL;
    }
    const bh_tree_job job = {.arena = d->arena,
                             .name = d->name,
                             .bytes = d->bytes,
                             .length = length,
                             .path = "",
                             .spans = true,
                             .diags = diags};
    d->root = bh_tree_build(&job).root;
    if (d->root)
        return d;
    bh_document_free(d);
    return NULL;
}

void bh_document_free(bh_document *document)
{
    if (document)
        bh_arena_free(document->arena);
    free(document);
}

const bh_node *bh_document_root(const bh_document *document)
{
    return document->root;
}

const char *bh_document_name(const bh_document *document)
{
    return document->name;
}

const char *bh_document_bytes(const bh_document *document, size_t *length)
{
    *length = document->length;
    return document->bytes;
}

const bh_node *bh_node_get(const bh_node *mapping, const char *key)
{
    if (!mapping || mapping->kind != BH_NODE_MAPPING)
        return NULL;
    for (size_t i = 0; i < mapping->count; i++)
        if (strcmp(mapping->keys[i]->text, key) == 0)
            return mapping->items[i];
    return NULL;
}
