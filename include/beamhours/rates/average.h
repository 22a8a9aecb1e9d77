/* average.h - a cross section summed over the acceptance of an arm and over each of its bins. */
#ifndef BH_RATES_AVERAGE_H
#define BH_RATES_AVERAGE_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/error.h"
#include "beamhours/rates/acceptance.h"
#include "beamhours/rates/interpolant.h"

/*
 * How: the cross section is represented once per arm by Chebyshev polynomials in 1 - cos(theta)
 * (of the logarithm of f (1 - cos theta)^2, or of f (1 - cos theta)^2 itself near zeros of f), on
 * as many pieces as it takes; all bins share them.  Sums over directions are Gauss-Legendre rules
 * on the shape itself, refined until two rules agree; where an allowed interval cuts through a bin,
 * on its weight over theta between kinks, with a substitution that removes square-root ends.
 */

typedef struct {
    bh_average_function *function;
    void *context;
    double limit;         /* [rad] the function exists below this polar angle only and may grow
                             like 1/sqrt(limit - theta) towards it (the largest angle of a heavy
                             beam particle); 0: none.  Never called at or beyond it */
    bool cut;             /* only polar angles inside `allowed` are kept */
    size_t allowed_count; /* with cut: 0 keeps nothing */
    const bh_interval *allowed; /* [rad] rising, apart: from bh_bite_angles */
    bool
        kept_only;    /* with cut: totals are not needed and come out as what is kept.  A function
                         that   ends in a step where `allowed` does costs most of its time in totals */
    double tolerance; /* [1] relative; 0: 1e-6 */
    int kink_count;   /* [1] as in interpolant.h */
    const double *kinks; /* [rad] likewise */
    double common; /* [ub/sr] the tolerance is relative to sums of common / (1 - cos theta)^2 where
                      those of the function are smaller: bins with little are no better; 0: never.
                      From bh_average_top */
} bh_average_request;

/* Of the whole acceptance, or of a bin. */
typedef struct {
    double total;       /* [ub] integral of f over the solid angle */
    double kept;        /* [ub] the part of it at allowed angles; total where nothing is cut */
    double solid_angle; /* [sr] as in the acceptance; mean cross section = total / solid_angle */
    double error;       /* [1] relative, estimated, of total */
    bool converged;     /* error within the tolerance */
} bh_average;

/* Where the sums go. */
typedef struct {
    bh_average whole;
    bh_average *bins; /* room for acceptance->bins of them; NULL: not wanted */
} bh_averages;

/* Memory for sums: never grows, about 1 MB; one thread at a time.  Results do not depend on what
 * it was used for before.  NULL when there is no memory; NULL may be freed. */
typedef struct bh_average_workspace bh_average_workspace;
bh_average_workspace *bh_average_workspace_new(void);
void bh_average_workspace_free(bh_average_workspace *workspace);

/*
 * Sums request->function over `acceptance` into out->whole, and, where out->bins is not NULL, into
 * out->bins[0 .. acceptance->bins - 1].  The whole is the sum of the bins and of what no bin
 * covers, so splitting bins conserves it.  Relative accuracy 1e-6 where `converged`; measured 1e-8
 * for smooth cross sections.
 * BH_EDOMAIN when the function is not finite somewhere in the acceptance (an arm that covers the
 * beam axis) or negative, `out` untouched; not converging is no failure but
 * out->whole.converged == false.
 */
BH_CHECKED bh_code bh_average_over(const bh_acceptance *acceptance,
                                   const bh_average_request *request,
                                   bh_average_workspace *workspace, bh_averages *out,
                                   bh_error *err);

/* Returns [rad] the polar angles that sums are fitted over: those of the acceptance, and of a
 * rectangle so much beside that it may be turned by BH_AVERAGE_TURN either way.  Functions that are
 * fitted over the same range share the moments of all parts. */
#define BH_AVERAGE_TURN 2e-5 /* [rad] +- 0, a choice; exact */
bh_interval bh_average_range(const bh_acceptance *acceptance);

/* Bin `bin` (1 ..) of an acceptance, or the whole for 0, as sums have it; valid until the workspace
 * is used again. */
const bh_acceptance_part *bh_average_part(bh_average_workspace *workspace,
                                          const bh_acceptance *acceptance, int bin);

/*
 * The same in two steps, so that several acceptances share the calls of one function (an arm moved
 * by a milliradian for sensitivities): fit over the polar range, then sum as often as wanted.  An
 * acceptance reaching outside the fitted range is refused (BH_EDOMAIN).
 */
BH_CHECKED bh_code bh_average_fit(const bh_average_request *request, bh_interval polar,
                                  bh_average_workspace *workspace, bh_error *err);
BH_CHECKED bh_code bh_average_sum(const bh_acceptance *acceptance,
                                  const bh_average_request *request,
                                  bh_average_workspace *workspace, bh_averages *out, bh_error *err);

/* Returns [ub/sr] the fitted function at polar angle theta [rad]; NAN outside the fitted range. */
double bh_average_value(const bh_average_workspace *workspace, double theta);

/* Returns [ub/sr] the largest value times (1 - cos theta)^2 that the last fit saw. */
double bh_average_top(const bh_average_workspace *workspace);

/* How many values of the function the last fit asked for. */
size_t bh_average_calls(const bh_average_workspace *workspace);

#endif
