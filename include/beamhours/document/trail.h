/* trail.h - from a dotted path to the node it means, and back. */
#ifndef BH_DOCUMENT_TRAIL_H
#define BH_DOCUMENT_TRAIL_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/text.h"
#include "beamhours/document/node.h"

/* The item of `list` that is called `part` (its `name`), or else stands at the number `part`, from
 * 1; list->count where there is none. */
size_t bh_list_find(const bh_node *list, const char *part);

/* The `name` of a list's item, or NULL where it has none. */
const char *bh_item_name(const bh_node *item);

/* The number from 0 of the key `key` in `mapping`; mapping->count where there is none. */
size_t bh_key_find(const bh_node *mapping, const char *key);

/* Where `node`, which is not the root, stands among the items of its parent, from 0. */
size_t bh_node_place(const bh_node *node);

/* The node at the dotted `path` ("settings.K1.angle", "targets.hydrogen.layers.2.thickness"), the
 * root for "", or NULL where there is none. */
const bh_node *bh_document_find(const bh_document *document, const char *path);

/* Appends the path of a node of a document (of a key: that of its value) so that the function above
 * finds it again, as long as no key has a dot in it: items by name where that is certain, else by
 * number.  Nothing for the root. */
void bh_trail_of(const bh_node *node, bh_text *into);

#endif
