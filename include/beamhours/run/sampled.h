/* sampled.h - values of a function at the angles that a fit asked for, since the next fit often
 * asks for the same. */
#ifndef BH_RUN_SAMPLED_H
#define BH_RUN_SAMPLED_H

#include <stddef.h>

enum { BH_SAMPLED_LISTS = 8, BH_SAMPLED_ROOM = 17 };

/* Begin with a count of 0, whenever the function is another one. */
typedef struct {
    size_t count;
    struct {
        size_t n;
        double theta[BH_SAMPLED_ROOM], value[BH_SAMPLED_ROOM]; /* [rad] [ub/sr] */
    } list[BH_SAMPLED_LISTS];
} bh_sampled;

/* Returns [ub/sr] the n values at just these angles theta [rad]; NULL where they are not kept. */
const double *bh_sampled_find(const bh_sampled *sampled, size_t n, const double *theta);

/* Keeps value [ub/sr] at theta [rad], n of them, while there is room. */
void bh_sampled_keep(bh_sampled *sampled, size_t n, const double *theta, const double *value);

#endif
