/* clock.h - a clock that nobody sets. */
#ifndef BH_SCREEN_CLOCK_H
#define BH_SCREEN_CLOCK_H

#include <time.h>

/* Returns [s] since some moment; for differences. */
double bh_clock_now(void);

/* So many seconds [s], not below 0, for calls of the system. */
struct timespec bh_clock_span(double seconds);

#endif
