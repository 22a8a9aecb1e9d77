/* structure_functions.h - published fits of F2 and R = sigma_L / sigma_T of proton and deuteron. */
#ifndef BH_PHYSICS_STRUCTURE_FUNCTIONS_H
#define BH_PHYSICS_STRUCTURE_FUNCTIONS_H

/*
 * Pure functions; coefficients from memory, confirmed by published data.  Outside the ranges named
 * they extrapolate.
 */

/* At Bjorken x [1], between 0 and 1, and q2 [GeV2] above 0: returns [1] F2 of the proton,
 * Abramowicz & Levy, hep-ph/9712415: W2 > 3 GeV2, any q2.  Against SLAC, BCDMS and NMC points 2 to
 * 5 %. */
double bh_f2_allm97(double x, double q2);

/* At x [1] and q2 [GeV2]: returns [1] F2 of the proton, NMC, Phys. Lett.
 * B 364 (1995) 107: 0.006 < x < 0.9, 0.5 < q2 < 260.  2 to 5 %. */
double bh_f2_nmc95_proton(double x, double q2);

/* The same at x [1] and q2 [GeV2] of the deuteron: returns [1], per nucleon. */
double bh_f2_nmc95_deuteron(double x, double q2);

/* At `w` [GeV], the final mass, above 1.08, and q2 [GeV2]: returns [1] F2 of a free proton, Bodek
 * et al., Phys. Rev. D 20 (1979) 1471, resonances included: 5 to 10 % for q2 < 20. */
double bh_f2_bodek79_proton(double w, double q2);

/* The same at `w` [GeV] and q2 [GeV2] of a free neutron: returns [1]. */
double bh_f2_bodek79_neutron(double w, double q2);

/* At x [1] and q2 [GeV2]: returns [1] R of E143, Phys. Lett. B 452 (1999) 194, 0.005 < x < 0.86,
 * 0.5 < q2 < 130; */
double bh_r_1998(double x, double q2);

/* and its forerunner at x [1] and q2 [GeV2]: returns [1] R of Whitlow et al., Phys. Lett. B 250
 * (1990) 193, 0.1 < x < 0.9, 0.6 < q2 < 20; the difference tells how well it is known. */
double bh_r_1990(double x, double q2);

#endif
