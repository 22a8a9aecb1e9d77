/* drafting.h - a setting as it is written, on the way to those that its sweep makes of it. */
#ifndef BH_PLAN_DRAFTING_H
#define BH_PLAN_DRAFTING_H

#include "beamhours/plan/making.h"

/* A setting with all that it inherits, before its sweep is written out. */
typedef struct {
    bh_raw_setting raw; /* every_setting beneath it */
    bh_raw_beam beam;   /* the plan's beneath the setting's */
    const bh_target *target;
    const char *name;
    size_t aim_count;
    bh_raw_aim wants;    /* of the setting: with a coincidence, its alone */
    bh_raw_aim *aims;    /* one for each arm that takes part */
    const bh_arm **arms; /* of each aim */
    const bh_sweep *swept;
    size_t steps; /* [1] 1 where nothing is swept */
} bh_setting_draft;

/* Fills draft->target; complains.  BH_ENOMEM. */
BH_CHECKED bh_code bh_draft_target(const bh_making *making, bh_setting_draft *draft);

/* Fills the draft's aims and arms, `own` without what every setting has; complains.  BH_ENOMEM. */
BH_CHECKED bh_code bh_draft_aims(const bh_making *making, const bh_raw_setting *own,
                                 bh_setting_draft *draft);

#endif
