/* figure_draw.h - a figure on a cairo surface of the caller's, such as a page of a report. */
#ifndef BH_REPORT_FIGURE_DRAW_H
#define BH_REPORT_FIGURE_DRAW_H

#include <cairo.h>

#include "beamhours/report/figure.h"

/* Fills wide, high [pt]: the room that the figure takes.  It is 468 wide, inside the margins of A4
 * and of letter.  Errors of bh_figure_draw. */
BH_CHECKED bh_code bh_figure_size(const bh_figure *figure, double *wide, double *high,
                                  bh_error *err);

/* Draws it with its upper left corner at the origin of `to`, one unit of which is a point; the
 * background is left as it is.  BH_EDOMAIN for an axis that is none; BH_ENOMEM (also what cairo's
 * status says). */
BH_CHECKED bh_code bh_figure_draw(const bh_figure *figure, cairo_t *to, bh_error *err);

#endif
