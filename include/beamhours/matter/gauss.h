/* gauss.h - Gauss and Legendre's rule of sixteen points. */
#ifndef BH_MATTER_GAUSS_H
#define BH_MATTER_GAUSS_H

/* Returns [1] in any unit the value at `x` [1]. */
typedef double bh_gauss_function(const void *context, double x);

typedef struct {
    double from, to; /* [1] both, in any unit */
} bh_gauss_limits;

/* Returns [1], in the unit of the function times that of the limits, the integral: exact for
 * polynomials to the 31st degree. */
double bh_gauss(bh_gauss_function *function, const void *context, bh_gauss_limits over);

#endif
