/* keys.h - the arrays that a list or mapping keeps its nodes in. */
#ifndef BH_DOCUMENT_KEYS_H
#define BH_DOCUMENT_KEYS_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/arena.h"
#include "beamhours/document/node.h"

/* Gives `node` what was read in it: the items of a list, or keys and values of a mapping in turn.
 * Returns false, and leaves the node as it was, when there is no memory. */
bool bh_node_fill(bh_arena *arena, bh_node *node, bh_node *const *read, size_t count);

/* Sorts keys by their text, equal ones as they stand in the file. */
void bh_keys_sort(bh_node **keys, size_t count);

#endif
