/* splice.h - one change of a document: proposed as bytes, read again, and checked. */
#ifndef BH_DOCUMENT_SPLICE_H
#define BH_DOCUMENT_SPLICE_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/diag.h"
#include "beamhours/document/agree.h"
#include "beamhours/document/edit.h"
#include "beamhours/document/node.h"
#include "beamhours/document/pieces.h"
#include "beamhours/document/target.h"

/* A change being made. */
typedef struct {
    const bh_document *before;
    bh_bytes text; /* of it */
    const bh_edit_change *change;
    bh_target target;
    bh_diags *diags;
    bh_piece *pieces; /* of target.around */
    bool laid_out;    /* they were found */
    size_t *from;     /* for `meant` */
    bh_meant meant;
    bh_document *after; /* NULL until a proposal was good */
    bh_diags *said;     /* what reading it said */
    bool lost;          /* memory ran out */
} bh_splice;

/* Makes the change: `after` and `said` are then the caller's, and `meant.place` says which item of
 * the list or mapping is the one that changed.  False, and said, where it cannot be made. */
bool bh_splice_make(bh_splice *splice, const bh_document *before, const bh_edit_change *change,
                    bh_diags *diags);

/* Reads a proposed text, which is used up: is it as meant?  Then `after` is set. */
bool bh_splice_settle(bh_splice *splice, bh_text *proposed);

/* BH_EDIT_SET and BH_EDIT_RENAME; false, and said, where no proposal was good. */
bool bh_splice_set(bh_splice *splice);
bool bh_splice_rename(bh_splice *splice);

/* Demands a text that can be a new key beside those there are. */
bool bh_splice_key(const bh_splice *splice, const char *key);

/* Does `node` stand within brackets, or is it in brackets itself? */
bool bh_splice_in_brackets(const bh_node *node);

#endif
