/* interpolant.h - a cross section as Chebyshev polynomials on as many pieces as it takes. */
#ifndef BH_RATES_INTERPOLANT_H
#define BH_RATES_INTERPOLANT_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/error.h"
#include "beamhours/rates/acceptance.h"

/* Fills value [ub/sr], n of them, finite and >= 0, at the polar angles theta [rad] of the detected
 * particle. */
typedef void bh_average_function(void *context, size_t n, const double *theta, double *value);

/* Polynomials in the versine y = 1 - cos theta of log(f y^2), or of f y^2 near zeros of f; of f
 * itself where the beam axis is inside.  With a limit in sqrt(y_limit - y), of f times it. */
typedef struct bh_interpolant bh_interpolant;

enum { BH_INTERPOLANT_KINKS = 4 };

/* What is to be represented. */
typedef struct {
    bh_average_function *function;
    void *context;
    bh_interval polar;   /* [rad] the range, 0 .. pi; from == to is one value */
    double limit;        /* [rad] f may grow like 1/sqrt(limit - theta) towards it and is not called
                            there or beyond; 0: none */
    double tolerance;    /* [1] relative, at each theta */
    int kink_count;      /* at most BH_INTERPOLANT_KINKS */
    const double *kinks; /* [rad] rising: where the slope of f jumps; pieces end there.  Kinks that
                            are not told cost some 300 values each */
    double common; /* [ub/sr] of f y^2: the tolerance is relative to this where f is smaller, as
                      of steps that fade away; 0: to f */
} bh_interpolant_request;

/* About 100 kB, or NULL when there is no memory.  NULL may be freed. */
bh_interpolant *bh_interpolant_new(void);
void bh_interpolant_free(bh_interpolant *interpolant);

/* Fits; what was there is forgotten.  BH_EDOMAIN when the function is not finite or negative (then
 * nothing is fitted); a piece that does not reach the tolerance is no failure, see
 * bh_interpolant_error.  A step in f is followed down to 2^-36 of the range, but sums over it may
 * miss up to 1e-4 of the step: cut there instead (bh_average_request.allowed). */
BH_CHECKED bh_code bh_interpolant_fit(bh_interpolant *interpolant,
                                      const bh_interpolant_request *request, bh_error *err);

/* Fills value [ub/sr], n of them, at versine [1].  Beyond the limit 0.  Outside the fitted range
 * the nearest polynomial goes on: the caller stays inside. */
void bh_interpolant_eval(const bh_interpolant *interpolant, size_t n, const double *versine,
                         double *value);

/* True when polar angles `polar` [rad] were fitted, or lie beyond the limit. */
bool bh_interpolant_covers(const bh_interpolant *interpolant, bh_interval polar);

/* Returns [1] relative error, estimated, of the mean over the polar angles `polar`: the largest
 * tail of the polynomials, unresolved pieces by their share of the range. */
double bh_interpolant_error(const bh_interpolant *interpolant, bh_interval polar);

/* True when every value that the fit saw is 0. */
bool bh_interpolant_vanishes(const bh_interpolant *interpolant);

/* Returns [ub/sr] the largest f y^2 that the fit saw. */
double bh_interpolant_top(const bh_interpolant *interpolant);

/* How many values of the function the fit asked for. */
size_t bh_interpolant_calls(const bh_interpolant *interpolant);

#endif
