/* stopping.h - mean energy that a charged particle loses on its way through a material. */
#ifndef BH_MATTER_STOPPING_H
#define BH_MATTER_STOPPING_H

#include <stddef.h>

#include "beamhours/base/error.h"
#include "beamhours/matter/medium.h"

/*
 * A particle in a material, made ready.  Read-only once made: any number of threads may ask it.
 *
 * Collision loss
 *   electrons, positrons: Berger and Seltzer (Moeller, Bhabha; ICRU Report 37, 1984).  Against
 *     ESTAR within 0.15 % from 10 MeV, 0.4 % at 1 MeV, 0.6 % in compounds: where the density effect
 *     sets in, its fit is less good.  Below 10 keV increasingly too large; below 1 keV as the
 * speed. others, above 8 MeV per nucleon mass: Bethe with density effect, shell correction of each
 *     element (Barkas and Berger, NASA SP-3013, 1964), Barkas (Lindhard, Nucl. Instr. Meth. 132
 *     (1976) 1, leading logarithm) and Bloch terms; for spin 1/2 the magnetic term, for muons that
 *     of radiating atomic electrons (Groom, Mokhov and Striganov, At. Data Nucl. Data Tables 78
 *     (2001) 183).  Up to 400 MeV it is brought onto the published tables by their ratio to the
 *     same formula for protons, for elements without a table that of their neighbours in Z.
 *     With a table 0.2 % of it to 100 MeV; 0.4 % above.  Without one (each table left out in turn):
 *     0.5 % to Z = 54, 2.5 % beyond below 50 MeV.
 *   others, below: ICRU Report 49 (1993) interpolated in log-log at equal velocity, for charge 2
 *     the table of alphas up to 2.5 MeV per nucleon; elements without a table by ICRU's fit up to
 *     0.5 MeV and the shape of their neighbours above (each table left out in turn: 3.5 %; alphas
 *     5 % from 2 MeV, 15 % at 0.5 MeV, 30 % at 0.1 MeV).  Compounds without a table by additivity:
 *     3 % from 2 MeV per nucleon; at the maximum 20 % too large for those rich in hydrogen (water).
 *     Below the tables as the velocity.  Antiparticles differ by the Barkas term, held constant
 *     below 2 MeV per nucleon mass: 5 % there.  Ions from Z = 3 with the effective charge of Barkas
 *     (1963): 10 % below 10 MeV per nucleon, 30 % below 0.5; 1 % above 100 for Z < 10.  These for
 *     antiparticles and ions are estimates, not measured here.
 * Nuclear stopping is left out: below 0.1 % above 1 MeV per nucleon, 1 % at 10 keV.
 *
 * Radiative loss
 *   electrons: Seltzer and Berger's table, interpolated in Z and energy, 0.1 MeV to 1 GeV; above,
 *     its approach to complete screening (Tsai 1974).  0.5 % of the table.  Positrons by the ratio
 * of Kim, Pratt, Seltzer and Berger, Phys. Rev. A 33 (1986) 3002, its fit from memory. muons:
 * bremsstrahlung, pairs and nuclear interaction: see muon_loss.h. others: 0 (less than 0.1 % of the
 * collision loss below 1 TeV).
 */
typedef struct bh_stopping bh_stopping;

typedef struct {
    double collision; /* [MeV cm2/g] */
    double radiative; /* [MeV cm2/g] */
} bh_loss;

/*
 * Makes `particle` in `material` at `density` [g/cm3] (0: the nominal one) ready; *out is the
 * caller's.  BH_EDOMAIN as bh_medium_of, or for a particle without charge; BH_ENOMEM.
 */
BH_CHECKED bh_code bh_stopping_new(const bh_particle *particle, const bh_material *material,
                                   double density, bh_stopping **out, bh_error *err);

/* NULL may be freed. */
void bh_stopping_free(bh_stopping *stopping);

/* At `kinetic` [MeV] of the whole particle; NaN in both unless it is positive.  Meant for 1 keV to
 * 1 TeV; continuous. */
bh_loss bh_stopping_at(const bh_stopping *stopping, double kinetic);

const bh_particle *bh_stopping_particle(const bh_stopping *stopping);
const bh_medium *bh_stopping_medium(const bh_stopping *stopping);

enum { BH_STOPPING_BREAKS = 8 };

/* Fills `kinetic` [MeV], rising, with the energies where the slope of the loss jumps, and returns
 * how many there are: tables built on it keep their accuracy by having them as knots. */
size_t bh_stopping_breaks(const bh_stopping *stopping, double kinetic[BH_STOPPING_BREAKS]);

#endif
