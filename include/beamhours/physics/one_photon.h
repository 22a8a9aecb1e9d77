/* one_photon.h - elastic cross sections by exchange of one photon, both masses exact. */
#ifndef BH_PHYSICS_ONE_PHOTON_H
#define BH_PHYSICS_ONE_PHOTON_H

#include "beamhours/physics/kinematics.h"

/*
 * Pure functions of checked inputs, thread safe.  Cross sections are in the laboratory,
 * unpolarised, per solid angle of the scattered particle; infinite at q2 = 0.  `charges` is the
 * product of both charges in units of e, of either sign.
 */

/* How a particle of any spin couples to the photon, unpolarised: GE^2 and GM^2 of spin 1/2 with its
 * charge inside, or what stands in their place (structure.h): (1 + tau) Z^2 F^2 and 0 for spin 0.
 * A lepton has 1 and 1. */
typedef struct {
    double ge2; /* [1] */
    double gm2; /* [1] */
} bh_vertex;

/*
 * Returns [ub/sr] the cross section of any two particles with couplings `beam` and `target`.  For a
 * lepton it is Rosenbluth's (Phys. Rev. 79 (1950) 615) with the lepton mass exact (Preedom & Tegen,
 * Phys. Rev. C 36 (1987) 2466, from memory); exchanging beam and target changes nothing in the
 * centre of mass.  Accuracy 1e-11 where compared with sums over spinors.
 */
double bh_one_photon(const bh_collision *in, const bh_event *e, bh_vertex beam, bh_vertex target);

/* Returns [ub/sr] Mott: spin 1/2 on a point charge without spin, both masses exact.  For a massless
 * particle (alpha hbar c cos(angle/2) / 2 E sin^2(angle/2))^2 E'/E. */
double bh_mott(const bh_collision *in, const bh_event *e, int charges);

/* Returns [ub/sr] Mott without recoil, the target infinitely heavy: of `in` the target mass is not
 * read; `angle` [rad] above 0. */
double bh_mott_static(const bh_collision *in, double angle, int charges);

/* Returns [ub/sr] two point charges without spin, both masses exact: relativistic Rutherford. */
double bh_spinless(const bh_collision *in, const bh_event *e, int charges);

/* Returns [ub/sr] Rutherford's formula in the laboratory, finite target mass, nonrelativistic (the
 * kinetic energy stands for p^2/2m): of `e` the angle and the branch are read.  Source: Chu, Mayer
 * & Nicolet, Backscattering Spectrometry, 1978, from memory. */
double bh_rutherford(const bh_collision *in, const bh_event *e, int charges);

/* Returns [ub/sr] the same for an infinitely heavy target: (charges alpha hbar c / 4 T)^2 /
 * sin^4(angle/2) for `kinetic` [MeV] T and `angle` [rad]. */
double bh_rutherford_heavy(double kinetic, double angle, int charges);

/* Mandelstam variables of any channel. */
typedef struct {
    double s; /* [MeV^2] */
    double t; /* [MeV^2] */
    double u; /* [MeV^2] */
} bh_invariants;

/*
 * Returns [1] the squared amplitude of unit charge m on unit charge M, both Dirac particles of mass
 * m [MeV] and M [MeV], averaged over the spins that come in: 2 (4 pi alpha)^2 [(s - m^2 - M^2)^2 +
 * (u - m^2 - M^2)^2 + 2 t (m^2 + M^2)] / t^2.  With s and t exchanged it is m+ m- -> M+ M-.
 * Source: Berestetskii, Lifshitz & Pitaevskii, Quantum Electrodynamics, section 81, from memory.
 */
double bh_dirac_amplitude2(const bh_invariants *x, double m, double M);

#endif
