/* event_search.h - the elastic event that two known quantities fix. */
#ifndef BH_RUN_EVENT_SEARCH_H
#define BH_RUN_EVENT_SEARCH_H

#include <stdbool.h>

#include "beamhours/physics/kinematics.h"

/* Exactly two are numbers, the others NAN. */
typedef struct {
    double kinetic; /* [MeV] */
    double angle;   /* [rad] of the detected particle */
    double q2;      /* [MeV^2] */
    double epsilon; /* [1] */
    bool recoil;    /* the detected particle is the recoil */
} bh_known;

/*
 * Finds the event; `kinetic` [MeV] is the beam energy it has.  masses->kinetic is not read.  The
 * more energetic of two solutions.  BH_EDOMAIN with what would do where there is no such event.
 * Accuracy: closed forms as in physics/kinematics.h; 1e-12 in the energy where it is searched for.
 */
BH_CHECKED bh_code bh_event_search(const bh_collision *masses, const bh_known *known,
                                   double *kinetic, bh_event *out, bh_error *err);

#endif
