/* atomic_electron.h - a lepton meets an electron of an atom: Moller, Bhabha, muon-electron. */
#ifndef BH_PHYSICS_ATOMIC_ELECTRON_H
#define BH_PHYSICS_ATOMIC_ELECTRON_H

#include <stdbool.h>

#include "beamhours/base/error.h"
#include "beamhours/physics/kinematics.h"
#include "beamhours/units/particle.h"

/* Which of the two particles behind the target is meant. */
typedef enum {
    BH_ATOMIC_SCATTERED,      /* the beam particle; for electrons either of the two */
    BH_ATOMIC_SCATTERED_SLOW, /* a muon's second, slower solution at the same angle */
    BH_ATOMIC_STRUCK          /* the electron of the atom; for electrons either of the two */
} bh_atomic_seen;

typedef struct {
    double momentum;      /* [MeV/c] of the particle meant */
    double kinetic;       /* [MeV] of the particle meant */
    double other_kinetic; /* [MeV] of the other one */
    double cross_section; /* [ub/sr] per electron, lab, per solid angle of the particle meant;
                             without bound at angle 0 of a scattered particle and towards 90 deg,
                             where electrons hardly move */
} bh_atomic_event;

/*
 * Fills `out` for a lepton `beam` of `kinetic` [MeV] (1e-3 .. 1e6) and the particle `seen` at
 * `angle` [rad], electron at rest, masses exact, one photon, unpolarised.  Electron: Moller, with
 * exchange, such that the rate of electrons of either kind at `angle` comes out; positron: Bhabha,
 * with annihilation; muon: one-photon exchange of two Dirac particles (Berestetskii, Lifshitz &
 * Pitaevskii, Quantum Electrodynamics, section 81).  1e-10 against sums over spinors.
 * BH_EDOMAIN for a beam that is no lepton, an energy or angle out of range or beyond the largest.
 */
BH_CHECKED bh_code bh_atomic_electron(const bh_particle *beam, double kinetic, bh_atomic_seen seen,
                                      double angle, bh_atomic_event *out);

/* Returns [ub/sr] the cross section of `beam` on an electron in the centre of mass at the event
 * `e`, per solid angle of the scattered particle. */
double bh_atomic_centre_of_mass(const bh_particle *beam, const bh_event *e);

#endif
