/* clock.c - seconds as numbers. */
#include "beamhours/screen/clock.h"

double bh_clock_now(void)
{
    struct timespec t;
    (void)clock_gettime(CLOCK_MONOTONIC, &t);
    return (double)t.tv_sec + 1e-9 * (double)t.tv_nsec;
}

struct timespec bh_clock_span(double seconds)
{
    struct timespec t = {.tv_sec = (time_t)seconds};
    t.tv_nsec = (long)((seconds - (double)t.tv_sec) * 1e9);
    return t;
}
