/* drawing.h - what draws, apart from the program: loaded once something is to be drawn, as the
 * libraries for that take longer to load than a table to compute. */
#ifndef BH_REPORT_DRAWING_H
#define BH_REPORT_DRAWING_H

#include "beamhours/report/figure.h"
#include "beamhours/report/paper.h"

/* The functions of figure.h and paper.h that draw. */
typedef struct {
    size_t figure, paper; /* [bytes] sizes of a bh_figure and a bh_paper where it was built */
    bh_code (*write)(const bh_figure *figure, bh_figure_format format, bh_text *out, bh_error *err);
    bh_code (*inline_svg)(const bh_figure *figure, const char *id, bh_text *out, bh_error *err);
    bh_code (*pdf)(const bh_paper *paper, bh_page page, bh_text *out, bh_error *err);
} bh_drawing;

/* The one thing that the shared object offers, under this name. */
typedef const bh_drawing *bh_drawing_offer(void);
#define BH_DRAWING_OFFER "bh_drawing_offered"

#endif
