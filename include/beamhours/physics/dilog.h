/* dilog.h - the dilogarithm of a real number, and one Gauss rule: tools of the radiative formulas.
 */
#ifndef BH_PHYSICS_DILOG_H
#define BH_PHYSICS_DILOG_H

/*
 * Returns [1] the real part of Li2(x) = -int_0^x ln|1 - t| dt/t for any real `x` [1]; NaN for NaN.
 * Accuracy 4e-16 absolute for |x| < 2, 4e-16 relative beyond.  Thread safe.
 * Source: series in Bernoulli numbers after 't Hooft & Veltman, Nucl. Phys. B 153 (1979) 365,
 * appendix A.
 */
double bh_dilog(double x);

/* Gauss-Legendre rule of 16 points on -1 .. 1: nodes at + and - each of these.  Source: Abramowitz
 * & Stegun, Handbook of Mathematical Functions, 1964, table 25.4. */
extern const double bh_gauss16_node[8];   /* [1] */
extern const double bh_gauss16_weight[8]; /* [1] of either of the two */

#endif
