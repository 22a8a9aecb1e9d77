/* layout.h - items and keys put in, taken out and moved in the bytes of a document. */
#ifndef BH_DOCUMENT_LAYOUT_H
#define BH_DOCUMENT_LAYOUT_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/text.h"
#include "beamhours/document/pieces.h"

/* A list or mapping in a text, with its pieces (as many as it has items). */
typedef struct {
    bh_bytes text;
    const bh_node *around;
    const bh_piece *pieces;
} bh_layout;

/* What is put in: an item or `key: value` without comma or dash, or such a piece with them. */
typedef struct {
    const char *bytes;
    size_t length;      /* [bytes] */
    const char *tail;   /* within brackets: the comment behind its comma; may be NULL */
    size_t tail_length; /* [bytes] */
    bool dashed;        /* begins with its own dash or comments already */
} bh_unit;

/* Each appends the whole new text to `into`; false where it cannot be done without losing a comment
 * or understanding the layout.  `place` and `to` count from 0; `place` may be the count. */
bool bh_layout_insert(const bh_layout *layout, size_t place, const bh_unit *unit, bh_text *into);
bool bh_layout_remove(const bh_layout *layout, size_t place, bh_text *into);
bool bh_layout_move(const bh_layout *layout, size_t place, size_t to, bh_text *into);

#endif
