/* bremsstrahlung.h - elastic events lost beyond a cut by what the electron does in the target. */
#ifndef BH_MATTER_BREMSSTRAHLUNG_H
#define BH_MATTER_BREMSSTRAHLUNG_H

#include "beamhours/base/error.h"
#include "beamhours/matter/medium.h"

/* One side of the vertex: what lies in the way of the incident or of the scattered particle. */
typedef struct {
    double thickness; /* [1] in radiation lengths, all layers together */
    double b;         /* [1] of radiation_length.h, mean over the layers weighted by thickness */
    double xi;        /* [MeV] of straggling.h, all layers together; 0 leaves the tail out */
} bh_passage;

typedef struct {
    double incident;  /* [MeV] E1 at the vertex, total energy */
    double scattered; /* [MeV] E3 of elastic scattering */
    double cut;       /* [MeV] Delta E: events count down to E3 - cut */
    bh_passage before, after;
} bh_external;

/*
 * Returns [1] the fraction of electrons kept inside the cut in spite of bremsstrahlung in the
 * layers before and after: (eta^2 cut / E1)^(b t) (cut / E3)^(b t') / Gamma(1 + b t + b t'), eta =
 * E1 / E3: Mo and Tsai, Rev. Mod. Phys. 41 (1969) 205; Tsai 1974.  Soft photons: 1 % of the loss
 * while the cut is below 10 % of E3 and b t below 0.1.  At most 1.  NaN unless energies and cut are
 * positive and thicknesses not negative.
 */
double bh_external_kept(const bh_external *x);

/* Returns [1] the natural logarithm of the same before it is held to at most 1; it changes by b t +
 * b t' with ln cut. */
double bh_external_logarithm(const bh_external *x);

/* Returns [1] the fraction kept in spite of the tail of single collisions: 1 - xi / (eta^2 cut) -
 * xi' / cut, for xi far below the cut; never below 0.  NaN as bh_external_kept. */
double bh_ionisation_kept(const bh_external *x);

/* Returns [MeV] xi of `thickness` [1] radiation lengths by the rule of Mo and Tsai 1969, eq. B.9,
 * (pi m / 2 alpha) t / ((Z + eta) ln(184.15 Z^-1/3)), eta = ln(1194 Z^-2/3) / ln(184.15 Z^-1/3),
 * the numbers of Tsai 1974; for comparison with older work; z >= 1. */
double bh_mo_tsai_xi(int z, double thickness);

#endif
