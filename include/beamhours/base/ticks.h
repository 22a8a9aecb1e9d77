/* ticks.h - where an axis has its ticks, and what stands beside them. */
#ifndef BH_BASE_TICKS_H
#define BH_BASE_TICKS_H

#include <stdbool.h>

/* What an axis runs over, in the numbers shown beside it. */
typedef struct {
    double from, to;  /* [1] from < to; both above 0 on a logarithmic axis */
    bool logarithmic; /* equal ratios are equally long */
} bh_axis;

enum { BH_MOST_TICKS = 40, BH_MOST_MINOR_TICKS = 400, BH_TICK_LABEL = 40 };

/* One tick with a label; the label may be empty. */
typedef struct {
    double at;                 /* [1] */
    char label[BH_TICK_LABEL]; /* UTF-8: "0.25", "10⁻³", "2·10⁻³"; a true minus sign */
} bh_tick;

/* Rising.  Plain value. */
typedef struct {
    int count, minor_count;
    bh_tick tick[BH_MOST_TICKS];
    double minor[BH_MOST_MINOR_TICKS]; /* [1] shorter ones between, without labels */
} bh_ticks;

/* How long labels are along the axis, in the same length as `length`: points, cells. */
typedef struct {
    double length; /* [1] of the axis, > 0 */
    double apart;  /* [1] least room between two labels, > 0 */
    double space;  /* [1] least distance of two ticks with labels, > 0 */
    /* Returns [1] the extent of `label` along the axis. */
    double (*extent)(void *asker, const char *label);
    void *asker;
} bh_tick_room;

/* Returns [1] how far along the axis `value` [1] stands: 0 at `from`, 1 at `to`; outside of these
 * beyond them; NAN where a logarithm has no value. */
double bh_axis_place(const bh_axis *axis, double value);

/*
 * Chooses ticks inside `axis` (ends included).  Linear axes have steps of 1, 2 or 5 times a power
 * of ten, the shortest whose labels keep apart; logarithmic ones label 1, 2 and 5 of each decade
 * while there are few, then each decade, then each second, fifth ... one; less than a decade is
 * stepped linearly.  All labels of a linear axis have the same number of decimals; on a
 * logarithmic one all are written out, or all are powers of ten.  No two labels come closer than
 * `apart`.  An axis that is not one (NaN, reversed, an end that is not above 0 on a logarithmic
 * one) gets no ticks.
 */
void bh_ticks_choose(const bh_axis *axis, const bh_tick_room *room, bh_ticks *out);

/* Makes an axis that shows lo [1] to hi [1] with a little room beside them, lo <= hi, both finite.
 * Equal ones get room around them.  A linear one begins (or ends) at 0 where the values come close
 * to it. */
bh_axis bh_axis_around(double lo, double hi, bool logarithmic);

#endif
