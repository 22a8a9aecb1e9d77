/* curve_words.h - what is written around curves; for curve_figure.c. */
#ifndef BH_REPORT_CURVE_WORDS_H
#define BH_REPORT_CURVE_WORDS_H

#include "beamhours/report/curve_figure.h"

/* What printf would print, in the arena; "" where there is no memory. */
const char *bh_curve_say(bh_arena *arena, const char *fmt, ...) BH_PRINTF(2, 3);

/* What varies, as a column. */
int bh_curve_variable(bh_against against);

/* The name of the structure model that the plan's own choice comes down to. */
const char *bh_curve_own_model(const bh_curve_picture *picture, bh_arena *arena);

/* "kelly-2004: Kelly, Phys. Rev. C 70 (2004) 068202": the models of curve k and their sources. */
const char *bh_curve_legend(const bh_curve_picture *picture, size_t k, bh_arena *arena);

/* Fills title, subtitle, foot and description of a figure whose series and axes are there. */
void bh_curve_words(const bh_curve_picture *picture, size_t planned, bh_arena *arena,
                    bh_figure *out);

#endif
