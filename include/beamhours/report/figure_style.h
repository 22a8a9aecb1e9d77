/* figure_style.h - colours, dashes and marks that are told apart on paper, in grey, and by eyes
 * that see fewer colours. */
#ifndef BH_REPORT_FIGURE_STYLE_H
#define BH_REPORT_FIGURE_STYLE_H

enum { BH_STYLES = 8, BH_MOST_DASHES = 6 };

typedef enum {
    BH_MARK_CIRCLE,
    BH_MARK_SQUARE,
    BH_MARK_TRIANGLE,
    BH_MARK_DIAMOND,
    BH_MARK_DOWN,
    BH_MARK_CROSS,
    BH_MARK_PLUS,
    BH_MARK_HEXAGON
} bh_mark_shape;

typedef struct {
    unsigned char red, green, blue; /* sRGB */
    int dash_count;                 /* 0: a full line */
    double dash[BH_MOST_DASHES];    /* [pt] on, off, ... */
    bh_mark_shape mark;
} bh_figure_style;

/* The style with that number, modulo BH_STYLES.  Constant data.  Every colour has a contrast of at
 * least 3 to white (Web Content Accessibility Guidelines 2.1, 1.4.11), every two differ in
 * luminance, and so do their pictures in eyes without one kind of cone. */
const bh_figure_style *bh_figure_style_at(int number);

#endif
