/* keys.c - the arrays that a list or mapping keeps its nodes in. */
#include "beamhours/document/keys.h"

#include <stdlib.h>
#include <string.h>

bool bh_node_fill(bh_arena *arena, bh_node *node, bh_node *const *read, size_t count)
{
    const bool mapping = node->kind == BH_NODE_MAPPING;
    const size_t step = mapping ? 2 : 1, pieces = count / step;
    bh_node **keys = mapping ? bh_arena_take(arena, pieces, sizeof(bh_node *)) : NULL;
    bh_node **items = bh_arena_take(arena, pieces, sizeof(bh_node *));
    if (!items || (mapping && !keys))
        return false;
    for (size_t i = 0; i < pieces; i++) {
        if (mapping)
            keys[i] = read[step * i];
        items[i] = read[step * i + step - 1];
    }
    node->keys = keys;
    node->items = items;
    node->count = pieces;
    return true;
}

static int by_text(const void *left, const void *right)
{
    const bh_node *a = *(bh_node *const *)left, *b = *(bh_node *const *)right;
    int way = strcmp(a->text, b->text);
    if (way == 0)
        way = (a->at.line > b->at.line) - (a->at.line < b->at.line);
    return way ? way : (a->at.column > b->at.column) - (a->at.column < b->at.column);
}

void bh_keys_sort(bh_node **keys, size_t count)
{
    if (count > 1)
        qsort(keys, count, sizeof(bh_node *), by_text);
}
