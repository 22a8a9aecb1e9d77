/* counted.h - events that are counted under a resolution, from all depths, angle by angle. */
#ifndef BH_RUN_COUNTED_H
#define BH_RUN_COUNTED_H

#include "beamhours/run/arriving.h"
#include "beamhours/run/channelsum.h"
#include "beamhours/run/taking.h"

enum { BH_COUNTED_KEPT = 1024, BH_COUNTED_PIECES = 16 };

/* A value that may be asked for again. */
typedef struct {
    double angle, value; /* [rad] [ub/sr] */
} bh_counted_value;

/* Who comes from where, and with what probability it is counted. */
typedef struct {
    bh_channel channel;
    bh_taking taking;
    const bh_leaver *leaver; /* NULL: nothing is lost */
    bh_smearing smearing;
    double tolerance; /* [1] of sums */
    size_t count;
    bh_vertex vertices[BH_MOST_REFINED];
    int boost; /* of the values kept */
    bh_counted_value kept[BH_COUNTED_KEPT];
} bh_counted;

/* Fills `out` for the polar angles `polar` [rad]; depths stand as close as the resolution asks for.
 * `leaver` must outlive it. */
void bh_counted_make(const bh_channel_request *request, const bh_leaver *leaver, bh_interval polar,
                     bh_counted *out);

/* The beam's momentum for what follows: BH_AS_IT_IS ... */
void bh_counted_boost(bh_counted *counted, int boost);

/* Fills value [ub/sr], n of them, at polar angles theta [rad], with the mean over the depths of the
 * cross section times the probability to be counted; where there are events, never quite 0: at
 * least BH_COUNTED_LEAST of them all, for logarithms are fitted. */
void bh_counted_eval(bh_counted *counted, size_t n, const double *theta, double *value);

#define BH_COUNTED_LEAST 1e-9 /* [1] +- 0, a choice; exact */

/* Fills `pieces` [rad], rising and without gaps, between which the function changes smoothly or
 * over no less than a standard deviation, and returns how many. */
size_t bh_counted_pieces(const bh_counted *counted, bh_interval polar,
                         bh_interval pieces[BH_COUNTED_PIECES]);

#endif
