/* figure.h - a figure as data, and as SVG, PDF or PNG: the same bytes for the same figure. */
#ifndef BH_REPORT_FIGURE_H
#define BH_REPORT_FIGURE_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/error.h"
#include "beamhours/base/text.h"
#include "beamhours/base/ticks.h"

/* Numbers of a figure are in the units written beside its axes. */

/* One point; bars from it both ways, 0 for none. */
typedef struct {
    double x, y;  /* [1] y NAN: nothing here, and a line has a gap */
    double inner; /* [1] half length of the bar with a cap: statistical, or published */
    double outer; /* [1] half length of the thin bar: systematic added in quadrature */
} bh_figure_point;

typedef enum {
    BH_SERIES_LINE,     /* joined points, in the colour and dashes of its style */
    BH_SERIES_PLANNED,  /* full marks */
    BH_SERIES_PUBLISHED /* open marks */
} bh_series_kind;

typedef struct {
    bh_series_kind kind;
    int style;        /* number in figure_style.h, taken modulo how many there are */
    const char *name; /* in the legend; NULL: not there */
    size_t count;
    const bh_figure_point *point; /* a line's by rising x */
} bh_figure_series;

/* A shade between two curves. */
typedef struct {
    const char *name; /* in the legend */
    size_t count;
    const double *x, *low, *high; /* [1] NAN: a gap */
} bh_figure_band;

/* What a setting covers along x: a bar above the frame, with its bins. */
typedef struct {
    const char *name;
    double from, to; /* [1] equal: a mark */
    size_t edge_count;
    const double *edge; /* [1] between bins, the ends not among them */
} bh_figure_span;

typedef struct {
    const char *words; /* "laboratory angle" */
    const char *unit;  /* "deg"; "" for a bare number */
    bh_axis axis;
} bh_figure_scale;

/* All of it belongs to who made it, and texts are UTF-8. */
typedef struct bh_figure {
    const char *title, *subtitle; /* "" for none */
    const char *foot;             /* small, below: what made it, per what */
    const char *description;      /* for who cannot see it */
    bh_figure_scale x, y;
    size_t band_count, series_count, span_count;
    const bh_figure_band *band;
    const bh_figure_series *series;
    const bh_figure_span *span;
    const char *span_name;         /* in the legend */
    const struct bh_figure *below; /* a lower frame on the same x: its y, bands, series and, above
                                      it, title; NULL: none */
} bh_figure;

typedef enum { BH_FIGURE_SVG, BH_FIGURE_PDF, BH_FIGURE_PNG } bh_figure_format;

/* Dots of a PNG on one point of the page, 1/72 inch: 300 an inch. */
#define BH_PNG_DOTS_PER_POINT (300.0 / 72.0) /* [1/pt] exact; common practice in print */

/*
 * Appends the figure as a file of its own.  Text is drawn with the outlines (SVG) or the embedded
 * glyphs (PDF) of DejaVu Sans: nothing outside of the file is needed to show it.  No script, no
 * link, no date.  BH_ENOMEM; BH_EDOMAIN for an axis that is none.
 */
BH_CHECKED bh_code bh_figure_write(const bh_figure *figure, bh_figure_format format, bh_text *out,
                                   bh_error *err);

/*
 * Appends an <svg> element to stand in a page of HTML: role img, its title and description named by
 * aria-labelledby, every id beginning with `id` (letters and digits, unique in the page), scaling
 * with the width it is given.  Errors as above.
 */
BH_CHECKED bh_code bh_figure_inline(const bh_figure *figure, const char *id, bh_text *out,
                                    bh_error *err);

/* "cross section [nb/sr]" into `out` of `size` bytes. */
void bh_figure_axis_words(const bh_figure_scale *scale, char *out, size_t size);

#endif
