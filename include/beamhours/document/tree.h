/* tree.h - what a document is made of, for the files of this room only. */
#ifndef BH_DOCUMENT_TREE_H
#define BH_DOCUMENT_TREE_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/arena.h"
#include "beamhours/base/diag.h"
#include "beamhours/document/node.h"

struct bh_document {
    bh_arena *arena;
    const char *name, *bytes;
    size_t length; /* [bytes] */
    bh_node *root;
};

/* A text to be made nodes of, and where they go. */
typedef struct {
    bh_arena *arena;
    const char *name, *bytes; /* of the arena; bytes end with NUL */
    size_t length;            /* [bytes] */
    const char *path;         /* dotted path of the root; "" for a whole document */
    int depth;                /* [1] how many lists and mappings stand around it */
    bool spans;               /* do the nodes keep their bytes? */
    bh_diags *diags;
} bh_tree_job;

/* What came of it. */
typedef struct {
    bh_node *root;   /* NULL when there was an error, which then is in the job's diags */
    size_t from, to; /* the bytes of the root */
} bh_tree;

/* Makes nodes of a text, which has one document in it. */
bh_tree bh_tree_build(const bh_tree_job *job);

/* A copy of `length` bytes with a NUL behind it, or NULL. */
char *bh_tree_copy(bh_arena *arena, const char *bytes, size_t length);

#endif
