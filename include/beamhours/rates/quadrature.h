/* quadrature.h - sums over the directions an acceptance covers, refined until they hold. */
#ifndef BH_RATES_QUADRATURE_H
#define BH_RATES_QUADRATURE_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/rates/acceptance.h"

enum { BH_QUADRATURE_BATCH = 32, BH_QUADRATURE_MOST = 32 };

/* Fills value [1], n of them (at most BH_QUADRATURE_BATCH), at versine [1] = 1 - cos theta, which
 * keeps its digits near the beam. */
typedef void bh_quadrature_function(void *context, size_t n, const double *versine, double *value);

typedef struct {
    bh_quadrature_function *function;
    void *context;
    double tolerance; /* [1] relative, of the sum */
    double least;     /* [1] of the function: sums are no better than those of this value */
} bh_integrand;

typedef struct {
    double sum;     /* [sr] integral over the solid angle, times the unit of the function */
    double error;   /* [sr] estimated: how far a coarser rule was off, as the sum */
    bool converged; /* every piece agreed within the tolerance */
} bh_quadrature;

/* The first points of bh_quadrature_directions over one part, which is not a ring: both rules, the
 * finer first. */
typedef struct {
    int fine, coarse;                   /* how many points; fine 0: there are none */
    double versine[BH_QUADRATURE_MOST]; /* [1] */
    double weight[BH_QUADRATURE_MOST];  /* [sr] */
} bh_quadrature_rule;

/* Fills `rule` for `part`; none for a ring, or a part without extent. */
void bh_quadrature_prepare(const bh_acceptance_part *part, bh_quadrature_rule *rule);

/* As bh_quadrature_directions, to the last digit, with a rule prepared for the part. */
bh_quadrature bh_quadrature_prepared(const bh_acceptance_part *part, const bh_quadrature_rule *rule,
                                     const bh_integrand *f);

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
