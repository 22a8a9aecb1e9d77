/* muon_loss.h - what muons lose to photons, pairs and nuclei. */
#ifndef BH_MATTER_MUON_LOSS_H
#define BH_MATTER_MUON_LOSS_H

#include "beamhours/base/error.h"
#include "beamhours/matter/log_spline.h"
#include "beamhours/matter/medium.h"

/* Returns [cm2 MeV/mol] per mole of atoms of element z the loss of a muon of total `energy` [MeV]
 * to bremsstrahlung, on the nucleus (Kelner, Kokoulin and Petrukhin 1995, as in Groom, Mokhov and
 * Striganov, At. Data Nucl. Data Tables 78 (2001) 183, sect. 4.1) and on its electrons.
 * 0 for energies not above the mass. */
double bh_muon_photons(int z, double energy);

/* Returns [cm2 MeV/mol] the same for pairs of electrons, at total `energy` [MeV] (Kokoulin and
 * Petrukhin 1971, Groom et al. sect. 4.2). */
double bh_muon_pairs(int z, double energy);

/* Fills `out` with the radiative loss [MeV cm2/g] against kinetic energy [MeV], 10 MeV to 10 TeV:
 * the two above and 0.4e-6 cm2/g of the energy above 0.3 GeV for nuclear interaction (15 % of that
 * part, Groom et al. sect. 4.3).  The energies at which radiation equals ionisation come out as
 * published (values from memory) to 2.5 % for carbon, iron, copper; hydrogen and lead radiate 12
 * and 8 % too much. */
void bh_muon_radiation_make(const bh_medium *medium, bh_log_spline *out);

#endif
