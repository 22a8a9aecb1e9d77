/* value.h - a number that remembers whether it was written, how sure it is, and where it stands. */
#ifndef BH_SCHEMA_VALUE_H
#define BH_SCHEMA_VALUE_H

#include <stdbool.h>

#include "beamhours/base/error.h"

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

#endif
