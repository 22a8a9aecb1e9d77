/* value.h - a number that remembers whether it was written, how sure it is, and where it stands. */
#ifndef BH_SCHEMA_VALUE_H
#define BH_SCHEMA_VALUE_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/error.h"
#include "beamhours/document/node.h"
#include "beamhours/units/quantity.h"

/* What could not be read has `given` set and NaN as value (NULL as text): the complaint is already
 * in the list, and further checks pass it over. */

typedef struct {
    double value;       /* [1] in the internal unit that the member's comment names */
    double uncertainty; /* [1] standard uncertainty in the same unit; 0 where none was given */
    bool given;         /* written by the user; false: a default, or absent */
    bh_mark at;         /* where it stands; of the enclosing mapping when not given */
} bh_value;

/* "±28 mrad" or {from, to}. */
typedef struct {
    double from, to; /* [1] in the internal unit that the member's comment names */
    bool given;
    bh_mark at;
} bh_extent;

/* A word: the name of something, as written or by default. */
typedef struct {
    const char *text; /* NULL when absent and without default */
    bool given;
    bh_mark at;
} bh_word;

/* The mapping that a struct was read from: first member of every struct that has a schema. */
typedef struct {
    const bh_node *node; /* NULL when absent */
    bh_mark at;          /* of the enclosing mapping when absent */
    bool given;
} bh_section;

/* A quantity or one of a few words: "10 %" or "best". */
typedef struct {
    bh_value value; /* given when a quantity was written */
    bh_word word;   /* given when a word was written */
} bh_either;

/* One quantity, or several that take turns: a list, or {from, to, step} or {from, to, count}. */
typedef struct {
    size_t count; /* 1 where nothing is swept; 0 when absent or unreadable */
    const bh_quantity *values;
    const bh_mark *marks; /* of each */
    bool given;
    bool swept;          /* a list or a mapping was written, even one of a single value */
    const char *word;    /* the word that was written in the place of a quantity; else NULL */
    const bh_node *node; /* NULL for a default */
    bh_mark at;
} bh_sweep;

/* A list of quantities, of words, or of mappings (`items`: an array of the children's struct). */
typedef struct {
    size_t count;
    const bh_value *items;
    bool given;
    bh_mark at;
} bh_values;

typedef struct {
    size_t count;
    const bh_word *items;
    bool given;
    bh_mark at;
} bh_words;

typedef struct {
    size_t count;
    void *items;
    bool given;
    bh_mark at;
} bh_list;

/* One line of a mapping whose keys are free: "electron: 35 %". */
typedef struct {
    const char *name;
    bh_mark name_at;
    bh_value value; /* where the table wants quantities, numbers or counts */
    bh_word word;   /* where it wants words */
    const bh_node *node;
} bh_pair;

typedef struct {
    size_t count;
    const bh_pair *items;
    bh_word word; /* given where one word was written in the place of the mapping */
    bool given;
    bh_mark at;
    const bh_node *node;
} bh_pairs;

#endif
