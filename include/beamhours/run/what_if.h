/* what_if.h - what a plan becomes where things go worse than planned. */
#ifndef BH_RUN_WHAT_IF_H
#define BH_RUN_WHAT_IF_H

#include "beamhours/base/arena.h"
#include "beamhours/run/table.h"
#include "beamhours/run/totals.h"

typedef enum {
    BH_IF_AS_PLANNED,
    BH_IF_HALF_CURRENT,      /* evaluated anew: dead time and density change with the current */
    BH_IF_DOUBLE_BACKGROUND, /* of every row, and what else an arm triggers on; through dead time */
    BH_IF_LESS_BEAM,         /* beam in 40 % of the calendar time */
    BH_IF_LOST_DAY,          /* 24 h of the calendar less */
    BH_IF_COUNT
} bh_if;

/* One of them.  Belongs to the arena. */
typedef struct {
    const double *uncertainty; /* [1] statistical, relative, of each row (arms, in the order of the
                                  table): what the hours that are left give; NAN where the row has
                                  none, or no time is left */
    double data_left;          /* [1] share of the planned hours on full and empty target that fits
                                  into the calendar; 0: none */
    double asked_hours;        /* [h] of the calendar that keep what the plan wants, contingency
                                  among them */
    double missing_hours;      /* [h] of the calendar to be saved by dropping settings once the
                                  contingency is used up; 0: none */
    size_t drop_count;         /* settings that save them: the longest first, but none that need
                                  not go */
    const size_t *drop;        /* numbers of settings */
} bh_what_if;

/* Fills `out` for each case, from the hours granted: those asked, or those available where they are
 * less (hours of beam with their availability and the changes beside them).  BH_ENOMEM, and as
 * bh_table_new. */
BH_CHECKED bh_code bh_what_if_make(const bh_table *table, bh_arena *arena,
                                   bh_what_if out[BH_IF_COUNT], bh_error *err);

/* Returns [h] of the calendar that are granted: as above. */
double bh_what_if_granted(const bh_plan *plan, const bh_totals *totals);

/* "half the beam current". */
const char *bh_what_if_words(bh_if which);

#endif
