/* medium.h - what of a material matters to a charged particle passing through. */
#ifndef BH_MATTER_MEDIUM_H
#define BH_MATTER_MEDIUM_H

#include "beamhours/base/error.h"
#include "beamhours/matter/material.h"
#include "beamhours/units/particle.h"

enum { BH_MEDIUM_ELEMENTS = 24 };

typedef struct {
    int z;
    double per_atom; /* [1] share of all atoms; all shares add to 1 */
} bh_medium_element;

typedef struct {
    size_t count; /* elements */
    bh_medium_element elements[BH_MEDIUM_ELEMENTS];
    double mean_atomic_mass;  /* [g/mol] per atom */
    double z_over_a;          /* [mol/g] electrons */
    double density;           /* [g/cm3] */
    double mean_excitation;   /* [MeV] I */
    bh_density_effect effect; /* set of that density */
    bool set_published;       /* false: the set follows from the rule of Sternheimer and Peierls */
} bh_medium;

/*
 * Fills `out` for a material at `density` [g/cm3], 0 for its nominal one.  I and the set of the
 * density effect are the material's own where it has them (compounds then include the binding);
 * otherwise I by additivity (Bragg) and the set by the general rule of Sternheimer and Peierls,
 * Phys. Rev. B 3 (1971) 3681.  At another density than the set's, C += ln r, x0, x1 += lg(r)/2 with
 * r = set density / density.
 * BH_EDOMAIN: vacuum, a density that is not positive, an element beyond uranium or more than
 * BH_MEDIUM_ELEMENTS of them.
 */
BH_CHECKED bh_code bh_medium_of(const bh_material *material, double density, bh_medium *out,
                                bh_error *err);

/* Returns [1] the density effect delta at `beta_gamma` [1] = p / m c: Sternheimer, Berger and
 * Seltzer, At. Data Nucl. Data Tables 30 (1984) 261, eq. 10. */
double bh_medium_density_effect(const bh_medium *medium, double beta_gamma);

/* Returns [MeV] the mean excitation energy of element z, 1 .. 92, as gas where it is one: ICRU
 * Report 37 (1984), from memory, those of materials/ compared; 0 for others. */
double bh_element_excitation(int z);

/* A particle in flight. */
typedef struct {
    double beta, gamma; /* [1] [1] v / c and total energy / m c2 */
    double beta_gamma;  /* [1] p / m c */
    double momentum;    /* [MeV/c] */
    double transfer;    /* [MeV] largest energy given to an electron at rest in one collision;
                           electrons half their kinetic energy, the faster of the two going on */
} bh_flight;

/* `kinetic` [MeV] of the whole particle, positive. */
bh_flight bh_flight_of(const bh_particle *particle, double kinetic);

/* Whether the particle is an electron or a positron. */
bool bh_particle_is_electron(const bh_particle *particle);

#endif
