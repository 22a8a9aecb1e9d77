/* figure_ratio.h - the ratio of what is drawn to its first curve, where curves nearly coincide. */
#ifndef BH_REPORT_FIGURE_RATIO_H
#define BH_REPORT_FIGURE_RATIO_H

#include "beamhours/base/arena.h"
#include "beamhours/report/figure.h"

/*
 * Fills figure->below where there are two curves or more, the first above 0 wherever it is: every
 * curve, the band, and the points with their bars divided by the first curve, which is interpolated
 * between its points (parabolas of ln y).  Its axis shows the curves; points far outside of them
 * stay out.  The figure's own series must be scaled and its x axis chosen.  BH_ENOMEM.
 */
BH_CHECKED bh_code bh_figure_add_ratio(bh_figure *figure, bh_arena *arena, bh_error *err);

#endif
