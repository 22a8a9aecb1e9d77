/* soft_photons.h - soft real and virtual photons of elastic lepton scattering, the mass kept. */
#ifndef BH_PHYSICS_SOFT_PHOTONS_H
#define BH_PHYSICS_SOFT_PHOTONS_H

#include "beamhours/physics/kinematics.h"

/* One elastic event and how much energy unseen photons may take. */
typedef struct {
    double mass;               /* [MeV] of the lepton, > 0 */
    double target;             /* [MeV] mass of the struck particle, > mass */
    double beam_energy;        /* [MeV] total */
    double scattered_energy;   /* [MeV] total, elastic */
    double beam_momentum;      /* [MeV/c] */
    double scattered_momentum; /* [MeV/c] elastic */
    double angle;              /* [rad] of the scattered lepton */
    double q2;                 /* [MeV^2] >= 0; at 0 nothing radiates */
    double slope; /* [1] eta: how fast the missing mass squared grows with lost energy, over twice
                     the target mass; beam_energy / scattered_energy for a light lepton */
    double cut;   /* [MeV] > 0, below the elastic line of the scattered particle at its angle */
} bh_soft;

/* What `in` and its event `e` say; the cut `cut` [MeV] is kept as it is. */
bh_soft bh_soft_of(const bh_collision *in, const bh_event *e, double cut);

/*
 * All return a delta of the cross section, delta = d sigma / sigma - 1 to first order in alpha,
 * with soft photons up to energy slope x cut in the rest frame of recoil and photon.  Thread safe.
 * Accuracy 2e-10 absolute of the integrals; as physics see radiative.h.
 *
 * Source: the soft integrals by 't Hooft & Veltman, Nucl. Phys. B 153 (1979) 365, section 7; their
 * use by Maximon & Tjon, Phys. Rev. C 62 (2000) 054320.
 */

/* Returns [1] the lepton's own: soft photons with the exact Dirac form factor F1 to one loop; no
 * vacuum polarisation.  Left out: the Pauli form factor, at most 2.3e-3 of a muon's and 1e-4 of an
 * electron's cross section above 10 MeV. */
double bh_soft_lepton(const bh_soft *in);

/* Returns [1] the interference of lepton and target, for charges +1 and +1, with two-photon
 * exchange as Maximon & Tjon take it (the infrared part with ln q2). */
double bh_soft_interference(const bh_soft *in);

/* Returns [1] the same with two-photon exchange as Tsai, Phys. Rev. 122 (1961) 1898, takes it
 * (functions K of both masses). */
double bh_soft_interference_tsai(const bh_soft *in);

/* Returns [1] the target's own, as a point of charge 1: soft photons and the K functions of its
 * vertex. */
double bh_soft_target(const bh_soft *in);

/* Returns [1] d(delta) / d(ln cut) of bh_soft_lepton: (2 alpha / pi)(ln(q2/m^2) - 1) for a light
 * lepton. */
double bh_soft_rate(const bh_soft *in);

/* Returns [1] the same of bh_soft_interference and bh_soft_interference_tsai:
 * every delta is linear in the logarithm of the cut. */
double bh_soft_interference_rate(const bh_soft *in);

/* Returns [1] the same of bh_soft_target. */
double bh_soft_target_rate(const bh_soft *in);

/* Returns [1] what bh_soft_lepton tends to where q2 >> mass^2: Schwinger's (Phys. Rev. 76 (1949)
 * 790) with recoil, of eq. 5.2 of Maximon & Tjon.  For comparison: a muon below 0.3 GeV2 gets even
 * the sign wrong.  The mass enters ln(q2/m^2) alone. */
double bh_soft_lepton_light(const bh_soft *in);

/* Returns [1] what bh_soft_interference tends to, of the same equation. */
double bh_soft_interference_light(const bh_soft *in);

/* The three parts of eq. II.6 of Mo & Tsai, Rev. Mod. Phys. 41 (1969) 205, without vacuum
 * polarisation, for a light lepton (q2 >> mass^2). */
typedef struct {
    double lepton;       /* [1] */
    double interference; /* [1] for charges +1 and +1 */
    double target;       /* [1] for charge 1 */
} bh_soft_parts;
bh_soft_parts bh_soft_mo_tsai(const bh_soft *in);

#endif
