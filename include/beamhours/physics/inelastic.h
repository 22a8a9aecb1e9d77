/* inelastic.h - a lepton makes mesons on a proton or deuteron: resonances and deep scattering. */
#ifndef BH_PHYSICS_INELASTIC_H
#define BH_PHYSICS_INELASTIC_H

#include <stddef.h>

#include "beamhours/physics/inclusive.h"

/*
 * W is the final mass on a proton at rest.  W2 above 4 GeV2: F2 of ALLM97 (proton) or NMC95
 * (deuteron) with R1998, 2 to 5 %.  W = 1.18 GeV to W2 = 3.2 GeV2: F2 of Bodek 1979 with the R =
 * 0.18 it was extracted with, 5 to 10 %; the deuteron is then a free proton and a free neutron,
 * whose motion is left out, so that its resonances are too sharp.  Between 3.2 and 4 GeV2 one goes
 * over into the other.  Nuclei beyond the deuteron are not computed.
 */

/* Returns [ub/sr/MeV] d2sigma / dOmega dE' per nucleus of `nucleons` 1 (proton) or 2 (deuteron);
 * 0 below the threshold of mesons.  Only where bh_inelastic_outside finds no fault. */
double bh_inelastic_cross_section(int nucleons, const bh_inclusive *in, const bh_transfer *at);

/* Returns [MeV^2] W2. */
double bh_inelastic_w2(const bh_transfer *at);

/* Returns [1] its relative standard uncertainty: W2 above 4 GeV2 5 %, below 10 % (proton) or 20 %
 * (deuteron). */
double bh_inelastic_uncertainty(int nucleons, const bh_transfer *at);

/* NULL where it holds; else why it is not to be used at that transfer.  What the proton cannot do
 * (below the threshold of mesons) or the deuteron (below break-up) is computed: nothing. */
const char *bh_inelastic_outside(int nucleons, const bh_transfer *at);

enum { BH_INELASTIC_EDGES = 20 };

/* Fills edge [MeV/c], at most BH_INELASTIC_EDGES of them in any order, with the momenta of the
 * scattered lepton where the answer of the above or the formula changes; returns how many. */
size_t bh_inelastic_edges(int nucleons, const bh_inclusive *in, double edge[BH_INELASTIC_EDGES]);

#endif
