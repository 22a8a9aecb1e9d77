/* log_spline.h - a smooth curve through the few points of a printed table, in logarithms. */
#ifndef BH_MATTER_LOG_SPLINE_H
#define BH_MATTER_LOG_SPLINE_H

#include <stddef.h>

enum { BH_LOG_SPLINE_KNOTS = 48 };

/* Cubic, without curvature at the ends, straight on beyond them. */
typedef struct {
    size_t count;                       /* knots: 0 makes every value 1 */
    double x[BH_LOG_SPLINE_KNOTS];      /* [1] logarithms of the arguments, rising */
    double y[BH_LOG_SPLINE_KNOTS];      /* [1] logarithms of the values */
    double second[BH_LOG_SPLINE_KNOTS]; /* [1] second derivatives */
} bh_log_spline;

/* Adds a point behind the others; `x`, `y` [1] the values themselves, positive.  Ignored when the
 * spline is full. */
void bh_log_spline_add(bh_log_spline *spline, double x, double y);

/* Works the curvature out; call it after the last point. */
void bh_log_spline_close(bh_log_spline *spline);

/* Returns [1] the value at `x` [1]. */
double bh_log_spline_at(const bh_log_spline *spline, double x);

#endif
