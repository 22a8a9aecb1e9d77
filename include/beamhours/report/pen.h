/* pen.h - text and marks on a cairo surface, measured in points. */
#ifndef BH_REPORT_PEN_H
#define BH_REPORT_PEN_H

#include <stdbool.h>

#include <pango/pangocairo.h>

#include "beamhours/base/error.h"
#include "beamhours/report/figure_style.h"

typedef struct {
    cairo_t *to; /* the caller's */
    PangoLayout *text;
} bh_pen;

/* How a text looks. */
typedef struct {
    double size; /* [pt] of the font */
    bool bold;
    double grey; /* [1] 0 black, 1 white */
    double wide; /* [pt] lines are broken, and after the second cut short, at; 0: one line, never */
} bh_lettering;

/* A pen that draws on `to`, one unit of which is a point.  BH_ENOMEM. */
BH_CHECKED bh_code bh_pen_open(cairo_t *to, bh_pen *out, bh_error *err);
void bh_pen_close(bh_pen *pen);

/* Fills wide, high [pt] of a text; either may be NULL. */
void bh_pen_measure(const bh_pen *pen, const bh_lettering *how, const char *text, double *wide,
                    double *high);

/* Where a text stands: its left end, middle or right end at x. */
typedef enum { BH_ALIGN_LEFT, BH_ALIGN_MIDDLE, BH_ALIGN_RIGHT } bh_align;

typedef struct {
    double x, y; /* [pt] y: its upper edge; the middle of its height when `centred` */
    bh_align align;
    bool centred;
    bool upright; /* turned to read from below: x is then its left edge, y its middle */
} bh_text_place;

void bh_pen_write(const bh_pen *pen, const bh_lettering *how, const char *text,
                  const bh_text_place *at);

/* Makes a grey [1] (0 black, 1 white) or the colour of a style the one to draw with. */
void bh_pen_grey(const bh_pen *pen, double grey);
void bh_pen_colour(const bh_pen *pen, const bh_figure_style *style);

/* A straight stroke from x1, y1 to x2, y2 [pt], `thick` [pt]. */
typedef struct {
    double x1, y1, x2, y2; /* [pt] */
    double thick;          /* [pt] */
} bh_stroke;
void bh_pen_stroke(const bh_pen *pen, const bh_stroke *stroke);

/* Strokes of the same thickness and colour, drawn at once: fewer bytes. */
void bh_pen_strokes(const bh_pen *pen, size_t count, const bh_stroke *stroke);

/* A mark around x, y [pt], in the present colour: full, or open on white. */
void bh_pen_mark(const bh_pen *pen, bh_mark_shape shape, bool full, double x, double y);

#endif
