/* heavy_loss.h - Bethe's formula with its corrections, for everything heavier than the electron. */
#ifndef BH_MATTER_HEAVY_LOSS_H
#define BH_MATTER_HEAVY_LOSS_H

#include "beamhours/matter/medium.h"

/*
 * Returns [MeV cm2/g] the collision loss of a bare `particle` of `kinetic` [MeV] in `medium`, as
 * stopping.h says but without tables; good from 8 MeV per nucleon mass.
 */
double bh_bethe(const bh_particle *particle, const bh_medium *medium, double kinetic);

/* Returns [cm2 MeV/mol] the same of protons of `kinetic` [MeV] for one element, without density
 * effect: per mole of atoms. */
double bh_bethe_element(int z, double kinetic);

/* Returns [1] the share of the charge that an ion of `charge` at `beta` [1] keeps: 1 - exp(-125
 * beta charge^-2/3), Barkas, Nuclear Research Emulsions (1963); 1 up to helium, whose tables hold
 * it. */
double bh_effective_charge(int charge, double beta);

/* Returns [MeV cm2/mol] K = 4 pi N r_e^2 m c^2, 0.307075. */
double bh_bethe_constant(void);

/* The proton, to which the tables belong. */
bh_particle bh_proton(void);

#endif
