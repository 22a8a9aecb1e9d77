/* bench.h - the clock and the lines of goals that the bench programs share. */
#ifndef TESTS_BENCH_H
#define TESTS_BENCH_H

#include <stdbool.h>
#include <stdio.h>
#include <stdlib.h>
#include <time.h>

/* Seconds of this thread's processor: other programs may be running. */
static inline double bench_now(void)
{
    struct timespec t;
    clock_gettime(CLOCK_THREAD_CPUTIME_ID, &t);
    return (double)t.tv_sec + 1e-9 * (double)t.tv_nsec;
}

/* One line of the report; whether the goal is met. */
static inline bool bench_goal(const char *what, double got, double most, const char *unit)
{
    const bool met = got > 0 && got <= most;
    printf("%s  %-64s %8.3g %s (at most %g)\n", met ? "PASS" : "FAIL", what, got, unit, most);
    return met;
}

/* What main returns: other programs make times shake, so that a miss fails only when asked to. */
static inline int bench_end(bool met)
{
    return met || !getenv("BENCH_STRICT") ? EXIT_SUCCESS : EXIT_FAILURE;
}

#endif
