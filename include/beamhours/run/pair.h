/* pair.h - two arms in coincidence: both particles of one elastic event. */
#ifndef BH_RUN_PAIR_H
#define BH_RUN_PAIR_H

#include "beamhours/run/hours.h"
#include "beamhours/run/yield.h"

/*
 * The pair counts an event when both particles are in their arms, within both bites and above both
 * thresholds, from nuclei that both arms see.  Its bins are the first arm's.  Losses, resolutions
 * and views are those of each arm; the beam's spread is taken for each arm alone, though it moves
 * both momenta together, and deflections in matter do not open the joint acceptance.  Radiation
 * leaves of each event what it leaves in the arm that allows less of it.
 * Accidentals are window x the rates of both arms alone / duty_factor, their other_rate in it, in
 * the background that leaves with the sample; of true coincidences only elastic ones are in it.  An
 * event is recorded when both arms' readouts record it: live fractions multiply.  A dummy cell
 * gives as much more than the windows as it does in the first arm.
 */
typedef struct {
    const bh_setting_arm *arm;   /* the row of the coincidence */
    const bh_yield *one, *other; /* of its arms, made */
} bh_arm_pair;

/* Fills `yield`, whose `part` has room for as many parts as the first arm's view has.  Errors as
 * bh_yield_make. */
BH_CHECKED bh_code bh_pair_make(bh_yielder *yielder, const bh_arm_pair *pair, bh_yield *yield,
                                bh_error *err);

/* Fills live and recorded of `arm`, whose yield bh_pair_make has made, from those of its arms. */
void bh_pair_record(bh_arm_hours *arm, const bh_arm_hours *one, const bh_arm_hours *other);

/* Makes room, in `arena`, for what the second arm sees.  BH_ENOMEM. */
BH_CHECKED bh_code bh_pair_prepare(bh_yielder *yielder, bh_arena *arena, bh_error *err);

#endif
