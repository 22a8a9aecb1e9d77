/* sum_places.h - where an arm is while it is summed over, and where it is moved to. */
#ifndef BH_RUN_SUM_PLACES_H
#define BH_RUN_SUM_PLACES_H

#include "beamhours/run/channelsum.h"

typedef struct {
    bh_acceptance at, moved[2]; /* as it stands; BH_STEP_ANGLE back and on */
    bool turns;                 /* the arm has an axis that can be moved both ways */
    bh_interval polar;          /* all polar angles of these */
} bh_sum_places;

/* Fills `p`; `edges` [rad]: room for those of both moved arms, 2 (BH_MOST_BINS + 1).  BH_EDOMAIN
 * as bh_acceptance_make. */
BH_CHECKED bh_code bh_sum_places_of(const bh_channel_request *r, bh_sum_places *p, double *edges,
                                    bh_error *err);

#endif
