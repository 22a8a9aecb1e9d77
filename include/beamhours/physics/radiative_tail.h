/* radiative_tail.h - the elastic radiative tail: scattered leptons that lost energy to one photon.
 */
#ifndef BH_PHYSICS_RADIATIVE_TAIL_H
#define BH_PHYSICS_RADIATIVE_TAIL_H

#include <stddef.h>

#include "beamhours/physics/process.h"

/*
 * Spectra d2sigma / dOmega dE' of a lepton scattered to a fixed angle by a nucleus that stays in
 * its ground state, to lowest order in alpha, the photon from the lepton.  One photon, no target
 * radiation, no vacuum polarisation: near the peak multiply by bh_radiative_tail_soft.
 *
 * All take `angle` [rad], 0 < angle <= pi, of the scattered lepton and n kinetic energies `kinetic`
 * [MeV] of it, and fill n values `tail` [ub/sr/MeV] per nucleus: 0 where an energy is not above 0
 * or not below the elastic peak, and for a beam that is no lepton; NaN for NaN.  No allocation;
 * thread safe.
 */

/* `tail` [ub/sr/MeV] for `kinetic` [MeV] at `angle` [rad]: lowest order exactly, with the lepton
 * mass, integrated over the photon's direction with the form factors at the momentum transfer of
 * each.  Accuracy 1e-8 of the integral. Source: Mo & Tsai, Rev. Mod. Phys. 41 (1969) 205, eq. B.5
 * (also Tsai, SLAC-PUB-848 (1971)). */
void bh_radiative_tail_exact(const bh_encounter *encounter, double angle, size_t n,
                             const double *kinetic, double *tail);

/* `tail` [ub/sr/MeV] for `kinetic` [MeV] at `angle` [rad] by angle peaking: photons along the beam
 * or along the scattered lepton only, for a light lepton (electrons; muons need the exact form).
 * Against the exact tail 0.1 % high at 95 % of the peak energy, 0.2 to 7 % at 50 %, 15 % at 20 %;
 * some 200 times as fast. Source: Mo & Tsai 1969, eqs. C.10 and C.11. */
void bh_radiative_tail_peaking(const bh_encounter *encounter, double angle, size_t n,
                               const double *kinetic, double *tail);

/* `tail` [ub/sr/MeV] for `kinetic` [MeV] at `angle` [rad] in the shape of a radiator of equal
 * strength before and after, 1 - v + 3 v^2 / 4: what joins with external bremsstrahlung.  0.1 %
 * high at 95 %, 10 to 20 % at 50 %, 40 % at 20 %. Source: Tsai, SLAC-PUB-848 (1971), eq. 2.8, from
 * memory. */
void bh_radiative_tail_equivalent(const bh_encounter *encounter, double angle, size_t n,
                                  const double *kinetic, double *tail);

/* Fills factor [1], 0 .. 1, n values for `kinetic` [MeV] at `angle` [rad], by which further soft
 * photons lower a tail: (v before x v after)^((alpha/pi)(ln(q2/m^2) - 1)), the v the shares of its
 * energy that the lepton loses there.  Source: Tsai, SLAC-PUB-848 (1971), from memory. */
void bh_radiative_tail_soft(const bh_encounter *encounter, double angle, size_t n,
                            const double *kinetic, double *factor);

/*
 * Returns [1] what hard photons add to the events inside a cut `cut` [MeV], relative to the elastic
 * cross section at `angle` [rad]: the integral of the exact tail less its soft-photon form.  To be
 * added to a factor of radiative.h; +0.002 .. +0.012 for electrons at 3 % of the scattered energy.
 * 0 for no lepton; NaN unless 0 < cut <= the elastic kinetic energy.
 */
double bh_radiative_tail_hard(const bh_encounter *encounter, double angle, double cut);

#endif
