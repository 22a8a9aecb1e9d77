/* paper_leaf.h - the page of a PDF that is being filled; for the files that fill it. */
#ifndef BH_REPORT_PAPER_LEAF_H
#define BH_REPORT_PAPER_LEAF_H

#include "beamhours/report/paper.h"
#include "beamhours/report/pen.h"

#define BH_LEAF_MARGIN 54.0 /* [pt] exact; looks right */

typedef struct {
    const bh_paper *paper;
    cairo_surface_t *surface;
    bh_pen pen;
    double wide, high;             /* [pt] of the page */
    double y;                      /* [pt] where the next thing stands */
    int number;                    /* of the page */
    double size;                   /* [pt] of the letters now */
    PangoFontDescription *font[2]; /* plain, bold */
} bh_leaf;

/* Returns [pt] how wide the page is between its margins. */
double bh_leaf_inside(const bh_leaf *s);

/* Returns [pt] how much of its height is left. */
double bh_leaf_room(const bh_leaf *s);

/* Makes the pen's text ready, its lines broken at `width` [pt] (0: never).  Returns [pt] how high
 * it is. */
double bh_leaf_prepare(const bh_leaf *s, const char *text, bool bold, double width);

/* Draws the text that was made ready with its upper left corner at x [pt], y [pt]. */
void bh_leaf_show(const bh_leaf *s, double x, double y);

/* Begins a page. */
void bh_leaf_next_page(bh_leaf *s);

/* Begins a page where less than `needed` [pt] is left of the present one. */
void bh_leaf_need(bh_leaf *s, double needed);

/* Writes a text `indent` [pt] from the margin, over as many pages as it takes. */
void bh_leaf_paragraph(bh_leaf *s, const char *text, bool bold, double indent);

/* Draws a table with its caption; columns of words are broken into lines where it is too wide, and
 * letters become smaller where that is not enough.  False without memory. */
bool bh_leaf_table(bh_leaf *s, const bh_block *b);

#endif
