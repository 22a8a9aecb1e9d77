/* straggling.h - how unequal the energy losses in one layer are. */
#ifndef BH_MATTER_STRAGGLING_H
#define BH_MATTER_STRAGGLING_H

#include "beamhours/base/error.h"
#include "beamhours/matter/medium.h"

/* Which distribution describes the losses by kappa = xi / largest transfer: up to 0.01 Landau's,
 * to 10 Vavilov's, then a normal one. */
typedef enum {
    BH_STRAGGLING_LANDAU,
    BH_STRAGGLING_VAVILOV,
    BH_STRAGGLING_NORMAL
} bh_straggling_law;

/* Losses by collisions in a layer, radiation left out. */
typedef struct {
    bh_straggling_law law;
    double xi;            /* [MeV] (K/2) (Z/A) z^2 x / beta^2 */
    double kappa;         /* [1] xi over the largest transfer */
    double beta2;         /* [1] */
    double mean;          /* [MeV] by Bethe without shell correction: only its distance to
                             most_probable matters, add it to the mean of stopping.h */
    double most_probable; /* [MeV] */
    double fwhm;          /* [MeV] full width at half maximum */
    double sigma;         /* [MeV] root of Bohr's variance; of little meaning for Landau's law */
} bh_straggling;

/*
 * The losses of `particle` of `kinetic` [MeV] on `path` [g/cm2] of `medium`, the energy taken as
 * constant (the caller halves thick layers or takes the mean energy).
 * Most probable loss: Landau, J. Phys. USSR 8 (1944) 201, constant j = 0.200 of Bichsel, Rev. Mod.
 * Phys. 60 (1988) 663; Vavilov, Sov. Phys. JETP 5 (1957) 749 by the inversion of its characteristic
 * function, 1e-6; variance xi transfer (1 - beta^2 / 2).  Where xi is below 10 mean excitation
 * energies (micrometres) binding widens the distribution beyond these laws.
 * Electrons: Landau's law up to their largest transfer, half the energy.
 * BH_EDOMAIN unless kinetic and path are positive.
 */
BH_CHECKED bh_code bh_straggling_of(const bh_particle *particle, const bh_medium *medium,
                                    double kinetic, double path, bh_straggling *out);

/*
 * Returns [1] the fraction of particles that lose more than `loss` [MeV] (counted on the scale of
 * s->mean): the tail beyond a cut.  Absolute accuracy 1e-7; 0 beyond what can be lost only for
 * Vavilov's and the normal law.
 */
double bh_straggling_beyond(const bh_straggling *s, double loss);

/* Returns [1] Landau's distribution above `lambda` [1]; 1e-9. */
double bh_landau_beyond(double lambda);

/* Returns [1] Landau's density at `lambda` [1]; maximum 0.18065563 at -0.22278298. */
double bh_landau_density(double lambda);

/* Vavilov's law in his variable lambda [1] = (loss - mean) / xi - 1 + 0.577216 - beta2 - ln kappa.
 */
typedef struct {
    double kappa; /* [1] 0.01 .. 12 */
    double beta2; /* [1] 0 .. 1 */
} bh_vavilov;

/* Returns [1] the distribution above `lambda` [1]; absolute 1e-7. */
double bh_vavilov_beyond(bh_vavilov v, double lambda);

/* Returns [1] the density at `lambda` [1]; absolute 1e-7. */
double bh_vavilov_density(bh_vavilov v, double lambda);

#endif
