/* radiative.h - the registry of internal radiative corrections to elastic lepton scattering. */
#ifndef BH_PHYSICS_RADIATIVE_H
#define BH_PHYSICS_RADIATIVE_H

#include <stddef.h>

#include "beamhours/physics/process.h"

/*
 * What a cut on lost energy keeps of the events, and what photons add or take away otherwise:
 *     factor = exp(z0 + Z z1 + Z^2 z2) / (1 - vacuum / 2)^2,
 * soft photons exponentiated, loops summed.  The cut is meant below the elastic line of the
 * scattered particle at its angle; where the recoil is what is seen, the same factor is used with
 * the energy that the scattered particle may have lost (BH_WARN_RADIATIVE_RECOIL says so).
 *
 * Soft photons alone: good to 1 % of the deltas while the cut is under 3 % of the scattered energy;
 * hard photons inside a cut of that size add 0.2 to 1.2 % (radiative_tail.h counts them).
 * Hadrons and ions do not radiate enough to matter: their factor is 1.
 */

/* What goes into the factor. */
typedef struct {
    double z0; /* [1] the lepton's own, without any vacuum polarisation */
    double z1; /* [1] interference with the target, for target charge 1 and this beam's charge */
    double z2; /* [1] the target's own, as a point of charge 1 */
    double vacuum; /* [1] vacuum polarisation by e, mu, tau and hadrons, of the cross section */
} bh_radiative_parts;

/* One registry row.  Constant data. */
typedef struct {
    const char *name;    /* as in a plan: "maximon-tjon" */
    const char *summary; /* one line */
    const char *source;
    const char *range; /* where it holds, in words */
    /* Fills factor [1], n values, kept of each event of `encounter` by a cut `cut` [MeV] below the
     * elastic line: 1 without momentum transfer, 0 for no cut at all (NaN for a negative or NaN);
     * a cut beyond the scattered kinetic energy keeps what that energy would.  No allocation. */
    void (*factor)(const bh_encounter *encounter, double cut, size_t n, const bh_event *event,
                   double *factor);
    /* What one factor is made of, for the same `encounter`, `cut` [MeV] and event. */
    bh_radiative_parts (*parts)(const bh_encounter *encounter, double cut, const bh_event *event);
    /* Their derivatives with the logarithm of `cut` [MeV], in which they are linear up to the
     * scattered kinetic energy; vacuum 0. */
    bh_radiative_parts (*rate)(const bh_encounter *encounter, double cut, const bh_event *event);
    /* A sentence where the cut [MeV] or the event is outside what holds, into `out`; returns its
     * length, 0 when all is well. */
    int (*caveat)(const bh_encounter *encounter, double cut, const bh_event *event, char *out,
                  size_t size);
} bh_radiative;

/* By name; NULL when it is not in the registry.  "default" or a NULL name: "maximon-tjon".  The
 * i-th; NULL past the end. */
const bh_radiative *bh_radiative_find(const char *name);
const bh_radiative *bh_radiative_at(int i);

/* Returns [1] the factor of parts `x` on target charge `z`. */
double bh_radiative_combine(const bh_radiative_parts *x, int z);

/* Returns [1] the relative standard uncertainty of that factor for a cut that is `share` [1] of the
 * scattered particle's total energy: 1 % of the deltas and, for the hard photons left out, 0.3
 * share, in quadrature.  0 where all parts are 0. */
double bh_radiative_uncertainty(const bh_radiative_parts *x, int z, double share);

#endif
