/* collection.c - mappings with free keys, and lists of mappings with unique names. */
#include <stdlib.h>
#include <string.h>

#include "beamhours/base/sentences.h"
#include "beamhours/schema/reading.h"

/* --- free keys --- */

static void read_pair(const bh_reading *reading, const bh_key *row, const bh_node *key_node,
                      bh_pair *pair)
{
    const bh_written item = {row, pair->node};
    pair->name = key_node->text;
    pair->name_at = key_node->at;
    if (row->kind == BH_KEY_TEXT || row->kind == BH_KEY_WORD)
        bh_read_word(reading, item, &pair->word);
    else
        bh_read_value(reading, item, &pair->value);
}

bh_code bh_read_table(const bh_reading *reading, bh_written written, bh_pairs *out)
{
    const bh_node *node = written.node;
    *out = (bh_pairs){.given = true, .at = node->at, .node = node};
    if ((written.key->flags & BH_KEY_OR_WORD) && node->kind == BH_NODE_SCALAR) {
        bh_read_word(reading, written, &out->word);
        return BH_OK;
    }
    if (!bh_read_is(reading, written, BH_NODE_MAPPING))
        return BH_OK;
    bh_pair *items = bh_arena_take(reading->arena, node->count + 1, sizeof *items);
    if (!items)
        return BH_ENOMEM;
    bh_key row = *written.key;
    row.kind = written.key->item;
    for (size_t i = 0; i < node->count; i++) {
        items[i].node = node->items[i];
        read_pair(reading, &row, node->keys[i], &items[i]);
    }
    out->items = items;
    out->count = node->count;
    return BH_OK;
}

/* --- lists --- */

static int by_name(const void *a, const void *b)
{
    const bh_node *const *x = a, *const *y = b;
    const int order = strcmp((*x)->text, (*y)->text);
    if (order != 0)
        return order;
    if ((*x)->at.line != (*y)->at.line)
        return (*x)->at.line < (*y)->at.line ? -1 : 1;
    return (*x)->at.column < (*y)->at.column ? -1 : (*x)->at.column > (*y)->at.column;
}

static bh_code check_names(const bh_reading *reading, const bh_node *list)
{
    const bh_node **names = bh_arena_take(reading->arena, list->count + 1, sizeof(const bh_node *));
    size_t n = 0;
    if (!names)
        return BH_ENOMEM;
    for (size_t i = 0; i < list->count; i++) {
        const bh_node *name = bh_node_get(list->items[i], "name");
        if (name && name->kind == BH_NODE_SCALAR && name->length > 0)
            names[n++] = name;
    }
    qsort(names, n, sizeof(const bh_node *), by_name);
    for (size_t i = 1; i < n; i++)
        if (strcmp(names[i - 1]->text, names[i]->text) == 0)
            bh_say_node(reading, names[i], BH_SAY_NAME_TWICE, names[i]->text,
                        names[i - 1]->at.line);
    return BH_OK;
}

static bh_code read_item(const bh_reading *reading, bh_written written, void *out)
{
    if (bh_read_is(reading, written, BH_NODE_MAPPING))
        return bh_schema_read(reading, written.key->children, written.node, out);
    ((bh_section *)out)->at = written.node->at;
    const bh_code code = bh_schema_read(reading, written.key->children, NULL, out);
    ((bh_section *)out)->given = true; /* unreadable, but there */
    return code;
}

bh_code bh_read_list(const bh_reading *reading, bh_written written, bh_list *out)
{
    const bh_node *node = written.node;
    *out = (bh_list){.given = true, .at = node->at};
    if (!bh_read_is(reading, written, BH_NODE_LIST))
        return BH_OK;
    const size_t size = written.key->children->size;
    unsigned char *items = bh_arena_take(reading->arena, node->count + 1, size);
    if (!items)
        return BH_ENOMEM;
    bh_code code = BH_OK;
    for (size_t i = 0; i < node->count && !code; i++)
        code = read_item(reading, (bh_written){written.key, node->items[i]}, items + i * size);
    out->items = items;
    out->count = node->count;
    if (!code && (written.key->flags & BH_KEY_UNIQUE))
        code = check_names(reading, node);
    return code;
}
