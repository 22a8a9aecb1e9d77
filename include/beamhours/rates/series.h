/* series.h - an interpolant as one sum of polynomials, and what of each lies in a part. */
#ifndef BH_RATES_SERIES_H
#define BH_RATES_SERIES_H

#include "beamhours/rates/interpolant.h"
#include "beamhours/rates/quadrature.h"

enum { BH_SERIES_TERMS = 17 };

/* f = sum of c[k] T_k(t) / y^2 in the versine y, t = (y - middle) slope; without y^2 where the beam
 * axis is inside.  A sum of f over a part is then a sum of moments of the part: far cheaper than
 * values of f where several functions are summed over the same parts. */
typedef struct {
    double from, to; /* [1] versines between which it holds; infinite where that is everywhere */
    double middle, slope; /* [1] */
    bool axis;
    int count;
    double c[BH_SERIES_TERMS]; /* [ub/sr] */
} bh_series;

enum { BH_SERIES_MOST = 4 };

/* Fills `series`, room for BH_SERIES_MOST, from those of the first pieces that are well described
 * by one: no limit, and 1e-9 of the smallest value reached.  Returns how many. */
int bh_series_of(const bh_interpolant *interpolant, bh_series *series);

/* What a rule makes of each T_k(t) / y^2 [sr]: of the finer and of the coarser points. */
typedef struct {
    double middle, slope; /* [1] of t */
    bool axis;
    int count;
    double fine[BH_SERIES_TERMS], coarse[BH_SERIES_TERMS]; /* [sr] */
} bh_moments;

/* Fills `moments` with at least as many terms as `series` has, over the points of `rule`; nothing
 * is done where they are there. */
void bh_moments_of(const bh_quadrature_rule *rule, const bh_series *series, bh_moments *moments);

/* Returns what bh_quadrature_prepared does before it refines, `converged` whether both rules agree
 * for integrand `f`, of which tolerance and least are read. */
bh_quadrature bh_series_sum(const bh_series *series, const bh_moments *moments,
                            const bh_acceptance_part *part, const bh_integrand *f);

#endif
