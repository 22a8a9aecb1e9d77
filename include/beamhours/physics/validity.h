/* validity.h - where elastic scattering by one photon on a bare nucleus stops being all there is.
 */
#ifndef BH_PHYSICS_VALIDITY_H
#define BH_PHYSICS_VALIDITY_H

#include <stdbool.h>

#include "beamhours/physics/process.h"

/* From where nuclear forces change the scattering of a hadron or ion. */
typedef struct {
    double kinetic; /* [MeV] beam kinetic energy of the whole particle, backward angles; infinite
                       for leptons, 0 where nothing keeps the two apart */
    const char *source; /* of that number; NULL for leptons */
} bh_nuclear_limit;

/*
 * 4 % departure at 160 to 180 deg (Bozoian, Hubbard & Nastasi, Nucl. Instrum. Methods B 51 (1990)
 * 311): He 0.25 Z + 0.4 MeV (measured limits of O F Mg Al Si Cl are 2 to 6 % lower), protons on
 * Z >= 8 0.12 Z - 0.5 MeV (unconfirmed), Li 0.33 Z + 1.4 MeV.  All others: the energy that brings
 * the nuclear surfaces within 5 fm of each other (Cline, Annu. Rev. Nucl. Part. Sci. 36 (1986) 683,
 * from memory), an estimate.
 */
bh_nuclear_limit bh_validity_nuclear(const bh_encounter *encounter);

/* From this excess on nuclear forces rule: a cross section without them is no guide. */
#define BH_NUCLEAR_RULES 3.0 /* [1] exact; by convention */

/*
 * Returns [1] how far a hadron or ion is above the energy at which nuclear forces begin to matter
 * when it transfers `q2` [MeV^2] (0: at backward angles, where they matter most): kinetic energy
 * over that of bh_validity_nuclear times (1 + 1/sin(theta/2)) / 2, by which a Coulomb orbit to a
 * smaller c.m. angle theta stays farther away.  Attracted, with 1/sin(theta/2) - 1 and Cline's
 * distance.  0 for leptons, infinite where no orbit stays away.
 */
double bh_validity_excess(const bh_encounter *encounter, double q2);

/*
 * Whether the beam may do more to the nucleus by nuclear forces than scatter: it is above that
 * energy, and excites or breaks one of the two, or has the energy for a pion.
 */
bool bh_validity_reacts(const bh_encounter *encounter);

/*
 * Returns [rad] the angle below which atomic electrons lower the cross section by more than 1 %:
 * 0 for none, pi for all.  Slow heavy charges by Andersen et al., Phys. Rev. A 21 (1980) 1891; else
 * by a Thomas-Fermi form factor, q = 14.1 hbar/a with a = 0.885 a_Bohr Z^(-1/3).  Good to a factor
 * two in angle.
 */
double bh_validity_screening(const bh_encounter *encounter);

/* The caveat of the process "elastic" (process.h): one or more of the above in words. */
int bh_validity_elastic(const bh_encounter *encounter, char *out, size_t size);

#endif
