/* heating.h - heat that a beam leaves in a layer, and how hot a foil may get: screening estimates.
 */
#ifndef BH_MATTER_HEATING_H
#define BH_MATTER_HEATING_H

#include "beamhours/matter/material.h"
#include "beamhours/units/particle.h"

/* Returns [W] the heat of `rate` [1/s] particles that each lose `lost` [MeV]. */
double bh_heating_power(double rate, double lost);

/*
 * Returns [MeV] what a `particle` of `kinetic` [MeV] loses by collisions on `path` [g/cm2] of
 * `material` of `density` [g/cm3], its loss taken as where it enters, all of its energy at most; 0
 * where that cannot be computed.  All of it counts as heat: fast electrons take some of it away,
 * showers bring some; published cells agree within 15 %.
 */
double bh_heating_lost(const bh_particle *particle, const bh_material *material, double density,
                       double kinetic, double path);

/* A foil that is heated evenly in a round spot and held cold at a round edge. */
typedef struct {
    double power;        /* [W] */
    double spot, edge;   /* [cm] radii, the edge's the larger */
    double thickness;    /* [cm] */
    double conductivity; /* [W/cm/K] 0: not known */
    double emissivity;   /* [1] of both faces */
    double cold;         /* [K] of the edge and all around */
} bh_heated_foil;

/* Returns [K] by how much the centre is warmer than the edge when all heat is conducted there:
 * P / (4 pi k t) (1 + 2 ln(R / r)), the solution of the heat equation in a disc.  INFINITY where
 * the conductivity is not known. */
double bh_heating_conduction(const bh_heated_foil *foil);

/* Returns [K] the temperature of the spot when both its faces radiate all heat (Stefan and
 * Boltzmann). */
double bh_heating_radiation(const bh_heated_foil *foil);

/* Returns [K] the lower of the temperatures by conduction and by radiation: either way alone is
 * hotter than both together. */
double bh_heating_temperature(const bh_heated_foil *foil);

#endif
