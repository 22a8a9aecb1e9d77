/* outcome.h - what the worker hands back: a plan evaluated, or what is known of it so far. */
#ifndef BH_SCREEN_OUTCOME_H
#define BH_SCREEN_OUTCOME_H

#include <stdatomic.h>
#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/arena.h"
#include "beamhours/run/conclude.h"
#include "beamhours/run/row.h"

/* A text that was read as a plan.  Shared by all outcomes of it. */
typedef struct {
    atomic_uint users;
    char *bytes;
    size_t length; /* [bytes] */
    bh_plan *plan; /* NULL: it has errors */
    bh_diags *said;
} bh_reading_of;

/* Read-only for those who got it. */
typedef struct {
    atomic_uint users;
    size_t job; /* of the worker */
    bh_reading_of *of;
    bh_arena *arena;
    size_t setting_count, row_count, bin_count;
    size_t *first_row, *first_bin; /* of each setting, and behind the last */
    bh_row *rows, *bins;           /* effects are not kept */
    bool *known, *bins_known;      /* of each setting */
    size_t unknown;                /* settings still to be evaluated */
    bool complete;                 /* all of it, with `end` */
    bh_conclusion end;
    char failed[160]; /* why there is none although the plan has no error; else empty */
} bh_outcome;

/* Each user gives it back once; the last one frees it.  NULL is allowed. */
bh_outcome *bh_outcome_share(bh_outcome *outcome);
void bh_outcome_leave(bh_outcome *outcome);

/* The messages on the plan: errors, or all warnings when complete, or those of reading. */
const bh_diags *bh_outcome_diags(const bh_outcome *outcome);

/* For the worker.  A reading with one user; NULL without memory. */
bh_reading_of *bh_reading_of_new(const char *bytes, size_t length);
bh_reading_of *bh_reading_of_share(bh_reading_of *reading);
void bh_reading_of_leave(bh_reading_of *reading);

/* An outcome with one user, laid out for the plan of `reading` (shared): nothing in it is known.
 * NULL without memory. */
bh_outcome *bh_outcome_new(bh_reading_of *reading, size_t job);

#endif
