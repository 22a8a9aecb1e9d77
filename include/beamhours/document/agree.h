/* agree.h - are two documents equal but for what was meant to change? */
#ifndef BH_DOCUMENT_AGREE_H
#define BH_DOCUMENT_AGREE_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/document/node.h"

/* Equal values: kinds, texts, keys and their order; with `style`, written in the same style too.
 * Where they stand does not matter. */
bool bh_node_equal(const bh_node *a, const bh_node *b, bool style);

/* What one list or mapping is to become. */
typedef struct {
    const bh_node *around; /* the list or mapping, of the old document */
    size_t count;          /* items or keys it is to have */
    const size_t *from;    /* [1] for each of them, which of the old ones it is */
    size_t place;          /* the one that is new, whatever `from` says; >= count: none */
    const char *key;       /* its key, or NULL for the key of the old one */
    const bh_node *value;  /* its value, or NULL for the value of the old one */
} bh_meant;

/* Is `after` the root of the document `before` changed as meant, and in nothing else? */
bool bh_as_meant(const bh_node *before, const bh_node *after, const bh_meant *meant);

#endif
