/* totals.h - the sum of time of a plan, from the hours of its settings. */
#ifndef BH_RUN_TOTALS_H
#define BH_RUN_TOTALS_H

#include "beamhours/base/arena.h"
#include "beamhours/rates/schedule.h"
#include "beamhours/run/table.h"

/* Of one setting. */
typedef struct {
    double full, empty; /* [h] on the full and on the empty target */
} bh_stretch;

/* Adds up: hours holds as many as the plan has settings; texts and scratch belong to `arena`.
 * BH_ENOMEM; BH_EDOMAIN when tasks by shift or period never end. */
BH_CHECKED bh_code bh_totals_from_plan(const bh_plan *plan, const bh_stretch *hours,
                                       bh_arena *arena, bh_totals *out, bh_error *err);

/* Where the hours come from. */
typedef struct {
    bh_time_sum sum;
    double *times; /* [1] how often each task of the plan takes place */
} bh_time_detail;

/* The same in detail; belongs to `arena`.  Errors as above. */
BH_CHECKED bh_code bh_time_of_plan(const bh_plan *plan, const bh_stretch *hours, bh_arena *arena,
                                   bh_time_detail *out, bh_error *err);

/* The same in the order of running; belongs to `arena`.  Errors as above. */
BH_CHECKED bh_code bh_time_layout_of_plan(const bh_plan *plan, const bh_stretch *hours,
                                          bh_arena *arena, bh_time_layout *out, bh_error *err);

/* Fills hours, one for each setting of the plan, with those of its rows; 0 where there are none. */
void bh_stretches_of(const bh_table *table, bh_stretch *hours);

#endif
