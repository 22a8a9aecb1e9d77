/* radiation_length.h - radiation length and shape of bremsstrahlung of a material. */
#ifndef BH_MATTER_RADIATION_LENGTH_H
#define BH_MATTER_RADIATION_LENGTH_H

#include "beamhours/matter/material.h"

typedef struct {
    double value;     /* [g/cm2] the one to use: published where there is one; 0 for vacuum */
    double published; /* [g/cm2] of the material's file; 0 where none is */
    double computed;  /* [g/cm2] after Tsai */
    double b;         /* [1] of soft bremsstrahlung, 4/3 + (Z^2 + Z) / (9 D) */
} bh_radiation_length;

/*
 * After Tsai, Rev. Mod. Phys. 46 (1974) 815, eqs. 3.60 to 3.68, with his L, L' and f(Z); compounds
 * by additivity; isotopes of equal Z per atom.  Equals the tables of the Particle Data Group to
 * their rounding (0.06 %).  b as his eq. 3.83 implies: (Z^2 + Z) / D over 9 because the sum over
 * photon energies has 1/12 where older papers print 1/9.
 */
bh_radiation_length bh_radiation_length_of(const bh_material *material);

/* Returns [cm2/mol] atomic mass over radiation length of element z (1 .. 118), 0 for others. */
double bh_radiation_strength(int z);

#endif
