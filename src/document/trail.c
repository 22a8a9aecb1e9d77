/* trail.c - from a dotted path to the node it means, and back. */
#include "beamhours/document/trail.h"

#include <stdlib.h>
#include <string.h>

enum { DIGITS = 9 /* of a number of an item, fewer than these */ };

size_t bh_key_find(const bh_node *mapping, const char *key)
{
    size_t i = 0;
    while (i < mapping->count && strcmp(mapping->keys[i]->text, key) != 0)
        i++;
    return i;
}

const char *bh_item_name(const bh_node *item)
{
    const bh_node *name = bh_node_get(item, "name");
    return name && name->kind == BH_NODE_SCALAR ? name->text : NULL;
}

size_t bh_list_find(const bh_node *list, const char *part)
{
    for (size_t i = 0; i < list->count; i++) {
        const char *name = bh_item_name(list->items[i]);
        if (name && strcmp(name, part) == 0)
            return i;
    }
    const bool digits = strspn(part, "0123456789") == strlen(part) && strlen(part) < DIGITS;
    const unsigned long number = digits ? strtoul(part, NULL, 10) : 0;
    return number >= 1 && number <= list->count ? (size_t)number - 1 : list->count;
}

size_t bh_node_place(const bh_node *node)
{
    const bh_node *around = node->parent;
    size_t i = 0;
    while (i < around->count && around->items[i] != node &&
           !(around->keys && around->keys[i] == node))
        i++;
    return i;
}

/* One part further, a text of `length` bytes; NULL where there is nothing. */
static const bh_node *follow(const bh_node *node, const char *part, size_t length)
{
    char *copy = malloc(length + 1);
    if (!copy)
        return NULL;
    memcpy(copy, part, length);
    copy[length] = '\0';
    size_t i = 0;
    if (node->kind == BH_NODE_LIST)
        i = bh_list_find(node, copy);
    else if (node->kind == BH_NODE_MAPPING)
        i = bh_key_find(node, copy);
    free(copy);
    return i < node->count ? node->items[i] : NULL;
}

const bh_node *bh_document_find(const bh_document *document, const char *path)
{
    const bh_node *node = bh_document_root(document);
    const char *part = *path ? path : NULL;
    while (node && part) {
        const size_t length = strcspn(part, ".");
        node = follow(node, part, length);
        part = part[length] ? part + length + 1 : NULL;
    }
    return node;
}

static void append_part(const bh_node *node, bh_text *into)
{
    const bh_node *around = node->parent;
    const size_t place = bh_node_place(node);
    if (around->kind == BH_NODE_MAPPING) {
        bh_text_append(into, around->keys[place]->text);
        return;
    }
    const char *name = bh_item_name(node);
    const bool certain = name && *name && !strchr(name, '.') && bh_list_find(around, name) == place;
    if (certain)
        bh_text_append(into, name);
    else
        bh_text_appendf(into, "%zu", place + 1);
}

void bh_trail_of(const bh_node *node, bh_text *into)
{
    const bh_node *chain[BH_NESTING_LIMIT + 1];
    size_t depth = 0;
    for (; node->parent && depth <= BH_NESTING_LIMIT; node = node->parent)
        chain[depth++] = node;
    bh_text_append(into, "");
    for (size_t i = depth; i > 0; i--) {
        if (i < depth)
            bh_text_append(into, ".");
        append_part(chain[i - 1], into);
    }
}
