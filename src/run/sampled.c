/* sampled.c - a few lists of values, looked through from the first. */
#include "beamhours/run/sampled.h"

#include <string.h>

const double *bh_sampled_find(const bh_sampled *sampled, size_t n, const double *theta)
{
    for (size_t i = 0; i < sampled->count; i++)
        if (sampled->list[i].n == n &&
            memcmp(sampled->list[i].theta, theta, n * sizeof *theta) == 0)
            return sampled->list[i].value;
    return NULL;
}

void bh_sampled_keep(bh_sampled *sampled, size_t n, const double *theta, const double *value)
{
    if (sampled->count == BH_SAMPLED_LISTS || n > BH_SAMPLED_ROOM)
        return;
    sampled->list[sampled->count].n = n;
    memcpy(sampled->list[sampled->count].theta, theta, n * sizeof *theta);
    memcpy(sampled->list[sampled->count].value, value, n * sizeof *value);
    sampled->count++;
}
