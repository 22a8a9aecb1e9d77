/* totals.h - the sum of time of a plan, from the hours of its settings. */
#ifndef BH_RUN_TOTALS_H
#define BH_RUN_TOTALS_H

#include "beamhours/base/arena.h"
#include "beamhours/run/table.h"

/* Of one setting. */
typedef struct {
    double full, empty; /* [h] on the full and on the empty target */
} bh_stretch;

/* Adds up: hours holds as many as the plan has settings; texts and scratch belong to `arena`.
 * BH_ENOMEM; BH_EDOMAIN when tasks by shift or period never end. */
BH_CHECKED bh_code bh_totals_from_plan(const bh_plan *plan, const bh_stretch *hours,
                                       bh_arena *arena, bh_totals *out, bh_error *err);

#endif
