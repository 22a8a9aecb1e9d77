/* shown.h - what a curve or a figure can show: the columns with numbers, and what follows from
 * them. */
#ifndef BH_REPORT_SHOWN_H
#define BH_REPORT_SHOWN_H

#include <stdbool.h>

#include "beamhours/run/curve.h"
#include "beamhours/run/table.h"

/* A bh_column_id, or one of these. */
enum {
    BH_SHOWN_MERIT = BH_COLUMN_COUNT, /* 1 / (statistical uncertainty^2 x hours, full and empty):
                                         what an hour does for the precision */
    BH_SHOWN_COUNT
};

/* The quantity with `key`, or -1 (also for a column of texts); the nearest key, or NULL; the key
 * of one. */
int bh_shown_find(const char *key);
const char *bh_shown_suggest(const char *key);
const char *bh_shown_key(int shown);

/* A few words for an axis: "cross section at the angle, per nucleus". */
const char *bh_shown_words(int shown);

/* Returns [1] its number in a row of the table, in the unit of its key; NAN where it is empty. */
double bh_shown_number(const bh_table *table, bool bins, size_t row, int shown);

/* Returns [1] the same at point i of a curve. */
double bh_shown_on_curve(const bh_curve *curve, size_t i, int shown);

/* Whether a measurement of it has the relative uncertainty of the signal: cross sections, rates,
 * counts. */
bool bh_shown_measured(int shown);

/* How numbers of an axis are shown: number in the key's unit times `scale` [1], in `unit`. */
typedef struct {
    double scale;  /* [1] */
    char unit[40]; /* UTF-8: "nb/sr", "10³⁶ /cm²/s"; "" for a bare number */
} bh_shown_unit;

/* The prefix in which numbers from lo [1] to hi [1] (in the key's unit) read well: the larger of
 * them on a linear axis, their middle on a logarithmic one. */
bh_shown_unit bh_shown_prefix(int shown, double lo, double hi, bool logarithmic);

#endif
