/* figure_layout.h - where everything of a figure stands; for the files that draw it. */
#ifndef BH_REPORT_FIGURE_LAYOUT_H
#define BH_REPORT_FIGURE_LAYOUT_H

#include "beamhours/report/figure.h"
#include "beamhours/report/pen.h"

/* A rectangle of the page, y downwards. */
typedef struct {
    double x, y, wide, high; /* [pt] */
} bh_box;

/* Where the bar of a span stands, and its name. */
typedef struct {
    int lane;        /* from 0, upwards from the frame */
    double from, to; /* [pt] of the bar */
    double name_x;   /* [pt] */
    bh_align name_align;
} bh_span_place;

typedef enum { BH_ENTRY_BAND, BH_ENTRY_SERIES, BH_ENTRY_SPAN } bh_entry_kind;

/* One entry of the legend. */
typedef struct {
    bh_entry_kind kind;
    size_t number; /* of the band or series */
    const char *name;
    double x, y; /* [pt] left, middle of its height */
    double wide; /* [pt] its name is broken at */
} bh_legend_entry;

typedef struct {
    double wide, high;                             /* [pt] the page */
    bh_box frame;                                  /* of the two axes */
    bh_box below;                                  /* likewise of figure.below; no height: none */
    double title_y, subtitle_y, x_words_y, foot_y; /* [pt] upper edges */
    bh_ticks x, y, below_y;
    double below_title_y; /* [pt] upper edge */
    double lane_high;     /* [pt] */
    int lanes;
    bool names;           /* of spans are shown */
    bh_span_place *spans; /* one for each of the figure */
    size_t entry_count;
    bh_legend_entry *entries;
} bh_figure_layout;

/* The letterings of a figure. */
typedef enum {
    BH_LETTERS_TITLE,
    BH_LETTERS_SUBTITLE,
    BH_LETTERS_AXIS,
    BH_LETTERS_TICK,
    BH_LETTERS_LEGEND,
    BH_LETTERS_SPAN,
    BH_LETTERS_FOOT
} bh_letters;
bh_lettering bh_figure_letters(bh_letters which);

/* How long the sample in front of a name of the legend is, and the room behind it. */
#define BH_LEGEND_SAMPLE 24.0 /* [pt] exact; fits two periods of the longest dashes */
#define BH_LEGEND_GAP    5.0  /* [pt] exact; looks right */

/* Measures and places.  BH_EDOMAIN (an axis that is none), BH_ENOMEM.  Free with
 * bh_figure_layout_free, also after a failure. */
BH_CHECKED bh_code bh_figure_layout_make(const bh_figure *figure, const bh_pen *pen,
                                         bh_figure_layout *out, bh_error *err);
void bh_figure_layout_free(bh_figure_layout *layout);

/* Returns [pt] where a value x [1] of the axis stands on the page. */
double bh_figure_x(const bh_figure *figure, const bh_figure_layout *layout, double x);

/* Returns [pt] where a value y [1] of the axis stands, downwards. */
double bh_figure_y(const bh_figure *figure, const bh_figure_layout *layout, double y);

#endif
