/* setting_key.h - what the rows of one setting depend on, as a number. */
#ifndef BH_RUN_SETTING_KEY_H
#define BH_RUN_SETTING_KEY_H

#include <stdbool.h>
#include <stdint.h>

#include "beamhours/base/arena.h"
#include "beamhours/plan/plan.h"

/* 128 bits: two settings of the same key depend on the same. */
typedef struct {
    uint64_t word[2];
} bh_setting_key;

/* Where a part of that text stands: its first and last line. */
typedef struct {
    int from, to;
} bh_lines;

/* What a setting follows from, and where in the file that stands, in an order that belongs to the
 * key: what moved as a whole is still the same. */
typedef struct {
    bh_setting_key key;
    size_t count;
    bh_lines *lines; /* of the arena */
} bh_setting_source;

/*
 * Fills sources[s] for each setting s of `plan`: from the bytes of the plan of the setting, its
 * beam, target, arms, models and whatever else its rows and the warnings on them follow from.  Of a
 * setting whose text cannot be told (a plan with changes of its own) both words are 0: it has no
 * key.  Materials count by their names: a library is read once. False when there is no memory.
 */
bool bh_setting_sources(const bh_plan *plan, bh_arena *arena, bh_setting_source *sources);

#endif
