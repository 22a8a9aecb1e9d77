/* target.h - what a change of a document is about. */
#ifndef BH_DOCUMENT_TARGET_H
#define BH_DOCUMENT_TARGET_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/diag.h"
#include "beamhours/document/edit.h"
#include "beamhours/document/node.h"

typedef struct {
    const bh_node *around; /* the list or mapping that changes */
    size_t index;          /* which of its items; its count: a new one */
    const bh_node *node;   /* that item, NULL for a new one */
    const char *rest;      /* what of the path is not in the document, or is to go inside an empty
                              `node`; "" for nothing */
} bh_target;

/* Finds it; false, and said in `diags`, where it cannot be. */
bool bh_target_find(const bh_document *document, const bh_edit_change *change, bh_target *target,
                    bh_diags *diags);

/* The path of a node for a message, its end cut off where it is long; "plan" for the root. */
typedef struct {
    char text[160];
} bh_target_name;
bh_target_name bh_target_call(const bh_node *node);

/* Says at `node` why something is refused, in a sentence with one %s for what it is called. */
#define BH_TARGET_REFUSE(diags, node, sentence)                                                 \
    bh_diags_add((diags), BH_SEVERITY_ERROR, (node)->at, bh_target_call(node).text, (sentence), \
                 bh_target_call(node).text)

#endif
