/* precision.h - statistical uncertainty of a signal with background taken from an empty target. */
#ifndef BH_RATES_PRECISION_H
#define BH_RATES_PRECISION_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/error.h"

/* Recorded rates (rate x live fraction) of an arm or of one bin. */
typedef struct {
    double signal;  /* [Hz] s, >= 0 */
    double windows; /* [Hz] w: what stays when the sample is out, >= 0 */
    double other;   /* [Hz] o: other nuclides of the sample and other sources that leave with it */
} bh_recorded;

/* How the windows are measured. */
typedef struct {
    bool measured;    /* false: no empty target; w and o are subtracted as computed */
    double share;     /* [1] phi: time without sample / full-target time, above 0 */
    double advantage; /* [1] rate of the windows in the dummy cell / w; 1 (or 0) for the target's
                         own windows, more where the dummy's are thicker */
} bh_empty;

/*
 * Returns [1] relative standard uncertainty of the background-subtracted signal after hours [h] of
 * full target, T in seconds:
 *   sigma^2 = (s + w + o) T + w T / (phi k),   uncertainty = sigma / (s T)
 * k = advantage: N' counts in phi T at k w are scaled by 1 / (k phi), variance N' / (k phi)^2.
 * Without empty target the second term is absent.  INFINITY for no signal or no time, NAN when an
 * argument is NaN or negative, or share not above 0.
 * Source: Poisson statistics; Knoll, Radiation Detection and Measurement, chapter 3.
 */
double bh_precision_uncertainty(const bh_recorded *rates, const bh_empty *empty, double hours);

/* Returns [h] the full-target time after which the uncertainty is goal [1]: its inverse in T.
 * INFINITY when there is no signal, NAN as above or when goal is not above 0. */
double bh_precision_hours(const bh_recorded *rates, const bh_empty *empty, double goal);

/* Returns [1] the share that needs the least full plus empty time for any goal:
 * phi = sqrt(w / k / (s + w + o)), advantage [1] = k (0 means 1); 0 when w is 0 (nothing to
 * measure: use measured = false then). */
double bh_precision_best_share(const bh_recorded *rates, double advantage);

/* Bins that shall all reach the goal. */
typedef struct {
    size_t count;            /* >= 1 */
    const bh_recorded *bins; /* rates of each */
} bh_recorded_bins;

/* Returns [h] the full-target time after which the worst bin has goal [1]; fills `worst` (may be
 * NULL) with its index from 0. */
double bh_precision_hours_each(const bh_recorded_bins *bins, const bh_empty *empty, double goal,
                               size_t *worst);

/* Returns [1] the best share of the bin that needs most full plus empty time when each has its own
 * best share, advantage [1] as above. */
double bh_precision_best_share_each(const bh_recorded_bins *bins, double advantage);

#endif
