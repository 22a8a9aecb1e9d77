/* multiple_scattering.h - the many small deflections in matter. */
#ifndef BH_MATTER_MULTIPLE_SCATTERING_H
#define BH_MATTER_MULTIPLE_SCATTERING_H

#include "beamhours/base/error.h"
#include "beamhours/matter/medium.h"

/*
 * Returns [rad] the width of the projected angle (central 98 %) of `particle` with `kinetic` [MeV]
 * after `thickness` [1] in radiation lengths: Highland's formula as refitted by Lynch and Dahl,
 * Nucl. Instr. Meth. B 58 (1991) 6, 13.6 MeV / (beta c p) z sqrt(t) (1 + 0.038 ln(t z^2 / beta^2)).
 * 11 % for 0.001 < t < 100.  Sum the thickness of all layers first: widths of layers do not add in
 * quadrature.  0 for 0; NaN when an argument is negative or kinetic not positive.  Never negative.
 */
double bh_highland(const bh_particle *particle, double kinetic, double thickness);

/* Sums over the layers that a particle crosses, for Moliere's theory; begin with zeros. */
typedef struct {
    double chi_c2;    /* [rad^2] chi_c is the angle beyond which one deflection is expected */
    double log_chi_a; /* [rad^2] sum of chi_c2 ln(chi_a^2), the screening angle */
} bh_moliere;

/*
 * Adds `path` [g/cm2] of `medium`, crossed by `particle` of (mean) `kinetic` [MeV]; Moliere, Z.
 * Naturforsch. 3a (1948) 78, as written by Bethe, Phys. Rev. 89 (1953) 1256, Z (Z + 1) for the
 * electrons' part.  Nothing is added unless kinetic and path are positive.
 */
typedef struct {
    double kinetic; /* [MeV] */
    double path;    /* [g/cm2] */
} bh_crossing;
void bh_moliere_add(bh_moliere *m, const bh_particle *particle, const bh_medium *medium,
                    bh_crossing crossing);

/* Returns [1] the mean number of deflections, chi_c^2 / chi_a^2; the theory wants more than 20. */
double bh_moliere_collisions(const bh_moliere *m);

/* Returns [rad] the width of the projected angle from the central `fraction` [1] (0 .. 1, usually
 * 0.98): Lynch and Dahl 1991, eq. 7; 2 % of Moliere's distribution for 10 .. 1e8 collisions. */
double bh_moliere_width(const bh_moliere *m, double fraction);

/*
 * Returns [1] the fraction scattered by more than `angle` [rad] in space (not projected), so lost
 * from a round acceptance of that half opening: Moliere's f0 + f1/B + f2/B^2 integrated; 1 % of the
 * fraction where it is above 1e-6.  With fewer than 20 collisions their single scattering is taken
 * instead, 1 - exp(-chi_c^2 / (angle^2 + chi_a^2)).  1 at 0; NaN when the angle is negative.
 */
double bh_moliere_beyond(const bh_moliere *m, double angle);

#endif
