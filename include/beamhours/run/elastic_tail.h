/* elastic_tail.h - leptons that lost much energy to radiation on a nucleus, in it or beside it. */
#ifndef BH_RUN_ELASTIC_TAIL_H
#define BH_RUN_ELASTIC_TAIL_H

#include "beamhours/run/radiated.h"

/*
 * Returns [ub/sr] the elastic events of request->channel at polar `angle` [rad] whose lepton lost
 * more than `from` [MeV], above 0, and less than `to` [MeV] below the elastic line; 0 for hadrons,
 * for the model "none" and where the recoil is what is seen.
 *
 * Electrons: photons along the beam or the scattered electron (radiative_tail.h, peaking), external
 * bremsstrahlung of shape 1 - v + 3 v^2 / 4 and single collisions xi / loss^2 before and after with
 * the cross section at the lowered energy, all lowered by the soft photons of all of these; matter
 * is the mean over the vertices.  5 % down to half the energy, 15 % down to a fifth.  Muons: the
 * lowest order exactly.  Source: Mo & Tsai, Rev. Mod. Phys. 41 (1969) 205; Tsai, SLAC-PUB-848
 * (1971), from memory.
 */
double bh_elastic_tail(const bh_radiated_request *request, double angle, double from, double to);

#endif
