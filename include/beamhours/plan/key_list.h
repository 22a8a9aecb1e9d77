/* key_list.h - the keys of a plan, for documentation: the same table that reads it. */
#ifndef BH_PLAN_KEY_LIST_H
#define BH_PLAN_KEY_LIST_H

#include <stdbool.h>
#include <stddef.h>

/* One key.  Texts are constant, or the struct's own. */
typedef struct {
    char path[80];       /* "arms.in_plane": list items have no part of their own */
    int depth;           /* parts of the path before the last */
    const char *kind;    /* "an energy", "one word", "a list of keys with values" */
    char units[160];     /* "MeV or MeV/u"; the words that would do; "" where there is neither */
    bool required;       /* the key itself */
    char group[120];     /* "exactly one of kinetic_energy, total_energy or momentum", or "" */
    const char *preset;  /* the default in the key's own notation, or NULL */
    const char *meaning; /* one line */
    const char *example; /* a value as written behind "key: " */
    bool built;          /* false: read and checked, but no number depends on it yet */
} bh_plan_key;

/* The i-th key in the order of the format, each key before those inside it.  False past the end. */
bool bh_plan_key_at(size_t i, bh_plan_key *out);

/* How many there are. */
size_t bh_plan_key_count(void);

/* The key with this path; list numbers and names in it are passed over ("settings.K1.angle").
 * False when there is none; `near` (may be NULL) is then filled with the nearest path (false also
 * then), or its path is empty. */
bool bh_plan_key_find(const char *path, bh_plan_key *out, bh_plan_key *near);

#endif
