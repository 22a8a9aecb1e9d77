/* hours.h - how long a setting takes: the slowest of its arms decides. */
#ifndef BH_RUN_HOURS_H
#define BH_RUN_HOURS_H

#include <stdbool.h>

#include "beamhours/rates/counting.h"
#include "beamhours/rates/precision.h"
#include "beamhours/run/yield.h"

/* One arm: what it records, and how long it wants. */
typedef struct {
    const bh_yield *yield;
    bh_live live;
    bh_recorded *recorded; /* of the whole arm and of each bin: as many as the view has parts */
    bh_empty empty;        /* how its windows are measured in this setting */
    double wanted;         /* [h] full target for what this arm wants; NAN where it wants nothing,
                              INFINITY where it never gets it */
} bh_arm_hours;

/* All arms of one setting. */
typedef struct {
    const bh_setting *setting;
    bh_arm_hours *arms; /* as many as the setting has */
    bool wanted;        /* some arm wants something that can be had */
    double full;        /* [h] with full target; NAN where nothing is wanted or it never ends */
    double share;       /* [1] of that, added without sample */
} bh_setting_hours;

/* Fills live and recorded of an arm whose yield is made.  BH_EDOMAIN as bh_counting_live. */
BH_CHECKED bh_code bh_hours_record(bh_arm_hours *arm, const bh_beam *beam, bh_error *err);

/* Works out the hours of a setting whose arms are recorded. */
void bh_hours_decide(bh_setting_hours *hours);

/* Returns [h] the full-target time in which part `part` of `arm` reaches its goal; of the whole arm
 * with goal_for: each-bin, its worst bin.  NAN where it has no goal, INFINITY where it never does.
 */
double bh_hours_to_goal(const bh_arm_hours *arm, int part);

#endif
