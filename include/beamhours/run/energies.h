/* energies.h - the few beam energies that stand for all depths at which collisions happen. */
#ifndef BH_RUN_ENERGIES_H
#define BH_RUN_ENERGIES_H

#include "beamhours/run/passage.h"

enum { BH_MOST_ENERGIES = 64 };

typedef struct {
    int count;
    double kinetic[BH_MOST_ENERGIES]; /* [MeV] */
    double weight[BH_MOST_ENERGIES];  /* [1] all add to 1 */
} bh_energies;

/*
 * Fills `out` for `count` vertices and one of the boosts (BH_AS_IT_IS ...).  At a given angle a
 * cross section knows the depth only by the energy: so the energies of all vertices give way to
 * Gauss's points of their distribution, one where they lie within 1e-4, two within 1 %; wider ones
 * stand as they are, or, where there are too many, as two points in each of 32 intervals.  One
 * energy alone has weight 1 exactly.  Relative error of the mean of E^-12: 2e-7.
 */
void bh_energies_of(const bh_vertex *vertices, size_t count, int boost, bh_energies *out);

#endif
