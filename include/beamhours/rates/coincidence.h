/* coincidence.h - both particles of one elastic event in two arms at once. */
#ifndef BH_RATES_COINCIDENCE_H
#define BH_RATES_COINCIDENCE_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/error.h"
#include "beamhours/physics/kinematics.h"
#include "beamhours/rates/acceptance.h"
#include "beamhours/rates/bite.h"

/*
 * The two particles of an elastic event leave in one plane with the beam, on opposite sides of it:
 * azimuths differ by half a turn, and either polar angle follows from the other.  So the joint
 * acceptance is, like that of one arm, a weight over the polar angle of the first particle: sin
 * theta x the azimuth at which it is in the first arm and its partner in the second.
 * Both arms stand in the horizontal plane, in-plane angles grow away from the beam, out-of-plane
 * angles upwards.  A ring with less than a full turn of azimuth is centred on its arm's side.
 */
typedef struct {
    const bh_acceptance_part *first, *second; /* neither of a point */
    bool opposite;                            /* the arms stand on opposite sides of the beam */
} bh_pair_shape;

/* Returns [rad] the azimuth of the first particle, at polar angle theta [rad], for which both are
 * inside, its partner at polar angle partner [rad]; unscaled.  0 for NAN.  Accuracy 1e-12. */
double bh_pair_azimuth(const bh_pair_shape *pair, double theta, double partner);

/* Returns [rad] the polar angle of the partner of a particle `detected` at polar angle theta [rad]
 * (what bh_bite calls the detected one; of a recoil the partner is the scattered particle); NAN
 * where there is no such event. */
double bh_pair_partner(const bh_collision *in, bh_detected detected, double theta);

enum { BH_PAIR_BREAKS = 2 * BH_KINKS };

/* Fills breaks [rad] (room for BH_PAIR_BREAKS) with the polar angles of a first particle `detected`
 * whose partner is at a kink of the second shape, and returns how many there are. */
int bh_pair_breaks(const bh_collision *in, bh_detected detected, const bh_acceptance_part *second,
                   double *breaks);

/* Fills, for n polar angles theta [rad] of the first particle, total and kept [ub/sr], per solid
 * angle of the first particle, and partner [rad], NAN where there is no event. */
typedef struct {
    double total, kept; /* [ub/sr] */
    double partner;     /* [rad] */
} bh_pair_value;

/* Fills n values [1] at polar angles theta [rad]. */
typedef void bh_pair_function(void *context, size_t n, const double *theta, bh_pair_value *value);

enum { BH_PAIR_MOST_BREAKS = BH_PAIR_BREAKS + 64 };

typedef struct {
    bh_pair_shape shape;
    bh_pair_function *function;
    void *context;
    double limit;         /* [rad] no event beyond this polar angle; 0: none */
    int break_count;      /* at most BH_PAIR_MOST_BREAKS */
    const double *breaks; /* [rad] polar angles where the function or the partner's place in the
                             second arm is not smooth, in any order */
    double tolerance;     /* [1] relative; 0: 1e-6 */
} bh_pair_request;

typedef struct {
    double total, kept; /* [ub] integrals over the joint solid angle */
    double solid_angle; /* [sr] of the first particle, joint; scales of both shapes in it */
    bool converged;     /* within the tolerance, of the total */
} bh_pair_sum;

/*
 * Sums over the joint acceptance: Gauss and Kronrod's rule of 15 points between the kinks of both
 * shapes, with the substitution of quadrature.h for square-root ends, halved until 7 points agree.
 * BH_EDOMAIN for a point, or a function that is not finite.
 */
BH_CHECKED bh_code bh_pair_add_up(const bh_pair_request *request, bh_pair_sum *out, bh_error *err);

#endif
