/* wall_clock.h - dates for a schedule: the Gregorian calendar, a clock that is never put forward or
 * back. */
#ifndef BH_REPORT_WALL_CLOCK_H
#define BH_REPORT_WALL_CLOCK_H

#include "beamhours/base/error.h"

enum { BH_WALL_SIZE = 64 };

/* Reads "2026-03-01 08:00", years 1970 to 9999, into minutes since 1970 began; BH_EDOMAIN, with
 * what would do, for anything else. */
BH_CHECKED bh_code bh_wall_read(const char *text, long long *minutes, bh_error *err);

/* Writes the time `hours` [h] after `start`, to the nearest minute, in the same form. */
void bh_wall_print(long long start, double hours, char out[BH_WALL_SIZE]);

#endif
