/* slow_loss.h - published stopping powers of protons and alphas, made up for any material. */
#ifndef BH_MATTER_SLOW_LOSS_H
#define BH_MATTER_SLOW_LOSS_H

#include "beamhours/matter/log_spline.h"
#include "beamhours/matter/medium.h"

/* Where the formula takes over from the tables, and where it needs them no more. */
#define BH_SLOW_TOP   8.0   /* [MeV] exact; proton energy, eta = 0.13 of the shell corrections */
#define BH_SLOW_CALIB 400.0 /* [MeV] exact; proton energy from which nothing is corrected */

typedef struct {
    bh_log_spline proton; /* [MeV] -> [MeV cm2/g], to BH_SLOW_TOP */
    bh_log_spline alpha;  /* [MeV] of a proton of equal speed -> [MeV cm2/g] */
    bh_log_spline factor; /* [MeV] -> [1], from BH_SLOW_TOP: onto the formula of bh_bethe */
    double alpha_top;     /* [MeV] of a proton of equal speed: where the table of alphas ends */
} bh_slow_loss;

/* Fills `out` for `material`, whose `medium` is at the density wanted. */
void bh_slow_loss_make(const bh_material *material, const bh_medium *medium, bh_slow_loss *out);

/* Returns [MeV cm2/g] of protons of `kinetic` [MeV], up to BH_SLOW_TOP; below 1 keV as the speed.
 */
double bh_slow_proton(const bh_slow_loss *slow, double kinetic);

/* Returns [MeV cm2/g] of charge 2 at the speed of protons of `kinetic` [MeV], up to alpha_top. */
double bh_slow_alpha(const bh_slow_loss *slow, double kinetic);

#endif
