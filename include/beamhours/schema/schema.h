/* schema.h - a strict reader of documents, driven by a table of keys. */
#ifndef BH_SCHEMA_SCHEMA_H
#define BH_SCHEMA_SCHEMA_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/arena.h"
#include "beamhours/base/diag.h"
#include "beamhours/document/node.h"
#include "beamhours/schema/value.h"
#include "beamhours/units/quantity.h"

/* What stands under a key, and the type of the member at its offset. */
typedef enum {
    BH_KEY_QUANTITY, /* bh_value: "855 MeV" in the key's dimension */
    BH_KEY_NUMBER,   /* bh_value: "0.1708", no unit */
    BH_KEY_COUNT,    /* bh_value: "4", a whole number without unit */
    BH_KEY_EXTENT,   /* bh_extent: "±28 mrad" or {from: -28 mrad, to: 31 mrad} */
    BH_KEY_RANGE,    /* bh_extent: {from: 10 deg, to: 110 deg} alone */
    BH_KEY_WORD,     /* bh_word: one of `words` */
    BH_KEY_NAME,     /* bh_word: letters, digits, _ - + */
    BH_KEY_TEXT,     /* bh_word: any text */
    BH_KEY_EITHER,   /* bh_either: a quantity, or one of `words` */
    BH_KEY_SWEEP,    /* bh_sweep: a quantity, or several, or one of `words` */
    BH_KEY_TABLE,    /* bh_pairs: a mapping with free keys; of what: `item` */
    BH_KEY_VALUES,   /* bh_values: a list of quantities */
    BH_KEY_WORDS,    /* bh_words: a list of `words` (of any texts where there are none) */
    BH_KEY_MAPPING,  /* a struct with the schema `children`, embedded; begins with bh_section */
    BH_KEY_LIST      /* bh_list of such structs */
} bh_key_kind;

enum {
    BH_KEY_REQUIRED = 1,
    BH_KEY_UNIQUE = 2,    /* list: the items' `name`s must differ */
    BH_KEY_OR_WORD = 4,   /* table: one word may stand in the place of the mapping */
    BH_KEY_NOT_EMPTY = 8, /* list, table, values, words: at least one item */
    BH_KEY_OVERRIDE = 32, /* mapping: a part that overrides: no defaults, nothing is required */
    BH_KEY_NOT_BUILT = 16 /* read and checked, but no number depends on it yet */
};

typedef struct bh_schema bh_schema;

/* One key.  Constant data.  Bounds and defaults are texts in the key's own notation, so that
 * messages and documentation say them as a user would write them. */
typedef struct {
    const char *name;
    bh_key_kind kind;
    bh_key_kind item;       /* table: BH_KEY_QUANTITY, BH_KEY_NUMBER, BH_KEY_COUNT or BH_KEY_TEXT */
    bh_dimension dimension; /* of quantities */
    unsigned flags;
    int group;                     /* keys of one schema with the same number exclude each other */
    const char *least, *above;     /* at least; more than; NULL: no bound */
    const char *most;              /* at most */
    const char *fallback;          /* default; NULL: none */
    const char *const *words;      /* NULL-terminated; words that are allowed */
    const bh_schema *children;     /* of a mapping, of a list's items */
    size_t offset;                 /* [bytes] of the member in the schema's struct */
    const char *meaning, *example; /* for documentation and messages */
} bh_key;

struct bh_schema {
    const char *name; /* in messages: "a target" */
    size_t size;      /* [bytes] of the struct, which begins with a bh_section */
    const bh_key *keys;
    size_t count;
    unsigned exactly; /* bit g: exactly one of group g is required; else at most one */
    unsigned claimed; /* bit g: required too, but the owner of the table checks it */
};

/* Where the reader puts things. */
typedef struct {
    bh_arena *arena; /* everything read that is not in the document itself */
    bh_diags *diags;
    bool partial; /* a part that overrides: no defaults, and nothing is required */
} bh_reading;

/*
 * Reads the mapping `node` into the struct `out` (of schema->size bytes, zeroed here), complaining
 * about everything that is wrong: unknown keys (with the nearest known one), missing ones, two of a
 * group, wrong kinds, words, quantities, ranges.  Texts point into the document.  A `node` that is
 * NULL counts as an absent mapping at out's section.at: defaults are filled in, nothing is
 * required.
 * Returns BH_OK also after complaints; BH_ENOMEM when there is no memory (also noted in diags).
 */
BH_CHECKED bh_code bh_schema_read(const bh_reading *reading, const bh_schema *schema,
                                  const bh_node *node, void *out);

/* Lays what is given in `over` on `base`, both of `schema`, into `out` (may be `base`): one of a
 * group replaces the others; mappings are merged key by key; lists and tables replaced. */
void bh_schema_merge(const bh_schema *schema, const void *base, const void *over, void *out);

/* The key's row by its name (American spellings too), or NULL. */
const bh_key *bh_schema_find(const bh_schema *schema, const char *name);

/* Whether the member of `key` in the struct `in` was written. */
bool bh_schema_given(const bh_key *key, const void *in);

/* Where the member of `key` in `in` stands. */
bh_mark bh_schema_mark(const bh_key *key, const void *in);

/* Which of the NULL-terminated `words` `text` is, from 0; 0 also for NULL and none of them. */
int bh_schema_choice(const char *text, const char *const *words);

/* Room that a path fits into [bytes]; a longer one is cut. */
enum { BH_PATH_SIZE = 200 };

/* Writes the dotted path of `node`, and of `key` inside it (NULL: of itself), as --with takes it:
 * "settings.K1.angle"; list items by name, else by number.  Returns `out`. */
const char *bh_node_path(const bh_node *node, const char *key, char out[BH_PATH_SIZE]);

/* Adds an error (a warning) about `key` of `section` (NULL: about the section) at `at`. */
void bh_say(const bh_reading *reading, bh_mark at, const bh_section *section, const char *key,
            const char *fmt, ...) BH_PRINTF(5, 6);
void bh_warn(const bh_reading *reading, bh_mark at, const bh_section *section, const char *key,
             const char *fmt, ...) BH_PRINTF(5, 6);

#endif
