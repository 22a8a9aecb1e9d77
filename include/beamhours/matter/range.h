/* range.h - how far a particle comes, and what energy it has left on the way. */
#ifndef BH_MATTER_RANGE_H
#define BH_MATTER_RANGE_H

#include <stddef.h>

#include "beamhours/base/error.h"
#include "beamhours/matter/stopping.h"

/* Which loss slows the particle: the peak of elastic scattering moves by collisions alone, as the
 * radiation belongs to its tail. */
typedef enum { BH_LOSE_COLLISION, BH_LOSE_ALL } bh_losing;

/* A table of range against energy, made ready once; read-only then, for any number of threads. */
typedef struct bh_range bh_range;

/*
 * Integrates the inverse of the loss from rest (continuous slowing down) up to `kinetic` [MeV] of
 * the whole particle.  `stopping` must outlive the table.  Range and the energy after a path are
 * those of the loss of stopping.h to 1e-5 of the energy lost.  Below 1 keV (per nucleon mass for
 * heavy particles) the loss is taken as the square root of the energy.
 * BH_EDOMAIN when the energy is not above 1 keV or above 10 TeV; BH_ENOMEM.
 */
BH_CHECKED bh_code bh_range_new(const bh_stopping *stopping, bh_losing losing, double kinetic,
                                bh_range **out, bh_error *err);

/* NULL may be freed. */
void bh_range_free(bh_range *range);

const bh_stopping *bh_range_stopping(const bh_range *range);

/* Returns [MeV] the highest energy of the table. */
double bh_range_top(const bh_range *range);

/* Returns [g/cm2] the path to rest from `kinetic` [MeV], 0 .. top; NaN outside. */
double bh_range_of(const bh_range *range, double kinetic);

/* Returns [MeV] the energy of a particle that can still go `path` [g/cm2]: the inverse of
 * bh_range_of.  0 for 0 and below; NaN beyond the range of the top energy. */
double bh_range_energy(const bh_range *range, double path);

/*
 * Returns [MeV] the energy left of `kinetic` [MeV] after `path` [g/cm2]; 0 when it stops before.  A
 * negative path gives the energy it had that much earlier.  NaN when kinetic or the result is
 * outside the table.  Two paths one after the other do what their sum does (1e-9).
 */
double bh_range_after(const bh_range *range, double kinetic, double path);

/* Returns [MeV] the energy lost on `path` [g/cm2], not negative, by `kinetic` [MeV]: all of it when
 * it stops.  Keeps its digits for thin layers.  NaN as bh_range_after. */
double bh_range_lost(const bh_range *range, double kinetic, double path);

#endif
