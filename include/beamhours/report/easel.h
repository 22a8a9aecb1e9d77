/* easel.h - a figure, its layout and a pen: what the files that draw work with. */
#ifndef BH_REPORT_EASEL_H
#define BH_REPORT_EASEL_H

#include "beamhours/report/figure_layout.h"

typedef struct {
    const bh_figure *figure;
    const bh_figure_layout *l;
    const bh_pen *pen;
} bh_easel;

/* Makes colour, width and dashes those of a curve with that style; dashes are the caller's to end.
 */
void bh_easel_dashes(const bh_easel *easel, const bh_figure_style *style);

/* Makes the colour that of the points of a series. */
void bh_easel_points(const bh_easel *easel, const bh_figure_series *series);

/* Draws what stands around the frame and its axes. */
void bh_easel_around(const bh_easel *easel);

#endif
