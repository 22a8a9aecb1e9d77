/* validity.h - where elastic scattering by one photon on a bare nucleus stops being all there is.
 */
#ifndef BH_PHYSICS_VALIDITY_H
#define BH_PHYSICS_VALIDITY_H

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
