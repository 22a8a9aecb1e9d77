/* vacuum_polarisation.h - what loops in the photon's propagator add to a cross section. */
#ifndef BH_PHYSICS_VACUUM_POLARISATION_H
#define BH_PHYSICS_VACUUM_POLARISATION_H

/* All are of spacelike momentum transfer, q2 = -t >= 0 [MeV^2], at the level of the cross section
 * (twice the real part of the loop), and thread safe. */

/*
 * Returns [1] the loop of a lepton of mass `mass` [MeV], > 0, at `q2` [MeV^2]: exact to one loop,
 * by its series below 0.1 mass^2, where it tends to 2 alpha q2 / 15 pi mass^2.
 * Accuracy 1e-11 relative.
 * Source: Berestetskii, Lifshitz & Pitaevskii, Quantum Electrodynamics, section 113, from memory;
 * checked by integration over the loop's parameter.
 */
double bh_vacuum_lepton(double mass, double q2);

/*
 * Returns [1] the hadrons' share at `q2` [MeV^2], 0 .. 1e10 MeV^2: fit to the data of e+ e- into
 * hadrons.  Uncertainty 3 %; its pieces join within 0.2 %.
 * Source: Burkhardt & Pietrzyk, Phys. Lett. B 513 (2001) 46, table 2, from memory; reproduces the
 * sums printed by Gramolin & Nikolenko, Phys. Rev. C 93 (2016) 055201, table I.
 */
double bh_vacuum_hadrons(double q2);

/* Returns [1] the sum over e, mu, tau and hadrons at `q2` [MeV^2]. */
double bh_vacuum(double q2);

#endif
