/* quadrature.h - sums over the directions an acceptance covers, refined until they hold. */
#ifndef BH_RATES_QUADRATURE_H
#define BH_RATES_QUADRATURE_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/rates/acceptance.h"

enum { BH_QUADRATURE_BATCH = 32 };

/* Fills value [1], n of them (at most BH_QUADRATURE_BATCH), at versine [1] = 1 - cos theta, which
 * keeps its digits near the beam. */
typedef void bh_quadrature_function(void *context, size_t n, const double *versine, double *value);

typedef struct {
    bh_quadrature_function *function;
    void *context;
    double tolerance; /* [1] relative, of the sum */
} bh_integrand;

typedef struct {
    double sum;     /* [sr] integral over the solid angle, times the unit of the function */
    double error;   /* [sr] estimated: how far a coarser rule was off, as the sum */
    bool converged; /* every piece agreed within the tolerance */
} bh_quadrature;

/*
 * The integral over a part, its `scale` in it.  Rectangle: Gauss-Legendre in both angles of the
 * shape, where a function of cos theta is smooth everywhere; 5 x 4 points against 4 x 3, panels
 * halved until they agree.  Ring: as bh_quadrature_polar.  A part without extent gives 0.
 */
bh_quadrature bh_quadrature_directions(const bh_acceptance_part *part, const bh_integrand *f);

/*
 * The integral over what of a part lies at the polar angles `polar`: the function times the weight,
 * between its kinks; theta = middle + half (3 u - u^3) / 2 makes square-root ends (also 1 / square
 * root of the function) smooth; 16 Gauss-Legendre points against 10, halved until they agree.
 */
bh_quadrature bh_quadrature_polar(const bh_acceptance_part *part, bh_interval polar,
                                  const bh_integrand *f);

#endif
