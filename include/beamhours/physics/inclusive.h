/* inclusive.h - a lepton that gives energy and momentum to a target, whatever becomes of that. */
#ifndef BH_PHYSICS_INCLUSIVE_H
#define BH_PHYSICS_INCLUSIVE_H

#include <stddef.h>

/* Pure functions of checked inputs, thread safe; one photon, lepton mass exact, lepton charge 1. */

typedef struct {
    double mass;    /* [MeV] of the lepton, 0 or more */
    double kinetic; /* [MeV] before, above 0 */
    double angle;   /* [rad] of the scattered lepton, 0 < angle <= pi */
} bh_inclusive;

/* Where a lepton of one momentum behind the target leaves the rest. */
typedef struct {
    double momentum; /* [MeV/c] of the scattered lepton */
    double energy;   /* [MeV] its total energy */
    double lost;     /* [MeV] energy given to the target */
    double q2;       /* [MeV^2] four-momentum transfer, positive */
    double q;        /* [MeV/c] three-momentum transfer */
} bh_transfer;

/* The transfer that leaves the lepton with `momentum` [MeV/c], 0 <= momentum <= that of the beam.
 */
bh_transfer bh_inclusive_transfer(const bh_inclusive *in, double momentum);

/* Returns [MeV/c] the momentum of the beam. */
double bh_inclusive_beam(const bh_inclusive *in);

/*
 * Returns [ub/sr/MeV] d2sigma / dOmega dE' for the responses `longitudinal` [1/MeV] R_L (charge)
 * and `transverse` [1/MeV] R_T (both directions across q):
 *   (alpha / Q2)^2 p'/p {K (Q2/q^2)^2 R_L + [K Q2/2q^2 + Q2 - 2 m^2] R_T},  K = (E + E')^2 - q^2,
 * which for m = 0 is Mott's cross section times v_L R_L + v_T R_T (Donnelly & Walecka, Annu. Rev.
 * Nucl. Sci. 25 (1975) 329).
 */
double bh_inclusive_cross_section(const bh_inclusive *in, const bh_transfer *at,
                                  double longitudinal, double transverse);

/* Fills momentum [MeV/c] with the (0 to 2) momenta of the scattered lepton, 0 or more, at which the
 * three-momentum transfer is `q` [MeV/c]; returns how many. */
size_t bh_inclusive_at_q(const bh_inclusive *in, double q, double momentum[2]);

/* Fills momentum [MeV/c] likewise where Q2 = a + b omega with `a` [MeV^2] and `b` [MeV]: a given Q2
 * with b = 0, a given missing mass W of a struck mass M with a = M^2 - W^2 and b = 2 M, a given
 * Bjorken x with a = 0 and b = 2 M x. */
size_t bh_inclusive_at_q2(const bh_inclusive *in, double a, double b, double momentum[2]);

#endif
