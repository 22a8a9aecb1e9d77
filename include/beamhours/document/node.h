/* node.h - a YAML document as a tree of nodes that remember where in the file they stand. */
#ifndef BH_DOCUMENT_NODE_H
#define BH_DOCUMENT_NODE_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/diag.h"
#include "beamhours/base/error.h"

typedef enum { BH_NODE_SCALAR, BH_NODE_LIST, BH_NODE_MAPPING } bh_node_kind;
typedef enum {
    BH_STYLE_PLAIN,  /* 855 MeV */
    BH_STYLE_QUOTED, /* "855 MeV", '855 MeV' */
    BH_STYLE_BLOCK,  /* | or > text, or a list or mapping by indentation */
    BH_STYLE_FLOW    /* [a, b] or {a: b} */
} bh_node_style;

typedef struct bh_node bh_node;
struct bh_node {
    bh_node_kind kind;
    bh_node_style style;
    bh_mark at;       /* its first character: line and column in code points from 1 */
    size_t from, to;  /* bytes of the document it spans, end excluded; 0, 0 for a grafted node */
    const char *text; /* scalar: the value as text, UTF-8, NUL-terminated; else NULL */
    size_t length;    /* [bytes] of text */
    size_t count;     /* items of a list, pairs of a mapping */
    bh_node **keys;   /* mapping: count scalars; else NULL */
    bh_node **items;  /* list: items; mapping: values */
    bh_node *parent;  /* NULL for the root */
};

typedef struct bh_document bh_document;

/* The longest document [bytes], and the deepest nesting of lists and mappings in it. */
enum { BH_DOCUMENT_LIMIT = 1024 * 1024, BH_NESTING_LIMIT = 32 };

/*
 * Reads the one YAML document in `bytes` (need not end with NUL) called `name` in messages.
 * Every fault goes to `diags` in the words of a physicist: syntax (which ends the list), anchors,
 * aliases, tags, merge keys, several documents, a second equal key, nesting over 32, over 1 MiB,
 * line ends that no editor shows, bytes that are not UTF-8; a warning where ` #` cuts a plain text.
 * Returns NULL when there was an error.  The document keeps its own copy of bytes and name.
 */
bh_document *bh_document_parse(const char *bytes, size_t length, const char *name, bh_diags *diags);
void bh_document_free(bh_document *document);

/* The root; its name; the bytes it was read from and their number (for `from` and `to`). */
const bh_node *bh_document_root(const bh_document *document);
const char *bh_document_name(const bh_document *document);
const char *bh_document_bytes(const bh_document *document, size_t *length);

/* The value under `key` of a mapping, or NULL (also when `mapping` is NULL or no mapping). */
const bh_node *bh_node_get(const bh_node *mapping, const char *key);

/*
 * Changes one value in the tree only: `path` is dotted; list items by their `name` or number from 1
 * ("settings.K1.angle", "targets.hydrogen.layers.2.thickness"); `yaml` is one scalar or flow node,
 * parsed alone.  New mapping keys are added, missing list items are an error.  Marks of what is
 * grafted, and of every complaint, bear the file name `source` ("--with 1"), line 1 and the column
 * in the text PATH=VALUE.
 * Returns the grafted node, or NULL with the reason in `diags`.
 */
const bh_node *bh_document_graft(bh_document *document, const char *path, const char *yaml,
                                 const char *source, bh_diags *diags);

/* Takes `key` out of `mapping`, a node of this document; nothing happens where there is none. */
void bh_document_drop(bh_document *document, const bh_node *mapping, const char *key);

#endif
