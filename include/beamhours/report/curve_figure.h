/* curve_figure.h - the figure of curves: models over each other, what is planned, what was
 * published. */
#ifndef BH_REPORT_CURVE_FIGURE_H
#define BH_REPORT_CURVE_FIGURE_H

#include "beamhours/base/arena.h"
#include "beamhours/report/curves.h"
#include "beamhours/report/figure.h"
#include "beamhours/report/measured.h"

typedef struct {
    const bh_table *table; /* of the curves' plan, with bins */
    const bh_curves *curves;
    int shown;                   /* bh_shown_find */
    const bh_measured *measured; /* in the keys of the two axes; NULL: none */
    const char *measured_name;   /* for points without a source: the file's name; may be NULL */
    const char *version;         /* of the program, for the foot; NULL: no foot */
    const char *const *names;    /* of the curves, in the legend; NULL: their models with sources */
} bh_curve_picture;

/*
 * Makes the figure in `arena`; it points into the texts of what it is made from, which must outlive
 * it.  Drawn are: the curves; where there are several, the band from the lowest to the highest, and
 * below it all of this divided by the first;
 * settings that lie on the curve (same particle, target, arm and energy; angle; or Q2, whichever
 * the curve keeps) by their acceptance with its bins, and as points with error bars where the row
 * says what is shown - statistical with caps, with the systematic uncertainty in quadrature thin;
 * of a ring each bin is a point; the published points.  The axis of
 * what is shown is logarithmic where nothing is below 0 and what is above it spans more than a
 * factor of 20, down to 1e-14 of the largest; that of an energy always.
 * BH_EDOMAIN where there is nothing to draw, with the reason; BH_ENOMEM.
 */
BH_CHECKED bh_code bh_curve_figure(const bh_curve_picture *picture, bh_arena *arena, bh_figure *out,
                                   bh_error *err);

#endif
