/* interpolant_parts.h - what an interpolant is made of; for the files that make and read it. */
#ifndef BH_RATES_INTERPOLANT_PARTS_H
#define BH_RATES_INTERPOLANT_PARTS_H

#include "beamhours/rates/interpolant.h"

enum { BH_INTERPOLANT_NODES = 17, BH_INTERPOLANT_PIECES = 512 };

typedef struct {
    double from, to;      /* [1] of the variable */
    double middle, slope; /* [1] t = (v - middle) slope runs from -1 to 1 */
    double tail;          /* [1] size of the last terms, relative to f */
    bool logarithm, resolved;
    int count;
    double c[BH_INTERPOLANT_NODES]; /* [1] of the logarithm of f in ub/sr, or of f in it */
} bh_interpolant_piece;

struct bh_interpolant {
    double cosine[2 * (BH_INTERPOLANT_NODES - 1)]; /* [1] of multiples of pi / 16 */
    bh_interval polar;                             /* [rad] */
    double limit;                                  /* [rad] 0: none */
    double limit_versine;                          /* [1] */
    bool axis; /* polar angle 0 is inside: f is represented without y^2 */
    size_t calls;
    int count, unresolved;
    double worst; /* [1] largest tail of the resolved pieces */
    double top;   /* [ub/sr] largest value times its flattening */
    bh_interpolant_piece pieces[BH_INTERPOLANT_PIECES];
};

/* Fills c [1], Chebyshev coefficients of value [1] at every `step`-th of the points cos(pi i / 16),
 * i = 0 .. 16, which stand in `value` at their i; returns how many. */
int bh_chebyshev_coefficients(const bh_interpolant *in, const double *value, int step, double *c);

#endif
