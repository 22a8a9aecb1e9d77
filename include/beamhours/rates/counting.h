/* counting.h - from beam current and cross section to recorded events. */
#ifndef BH_RATES_COUNTING_H
#define BH_RATES_COUNTING_H

#include <stdbool.h>

#include "beamhours/base/error.h"

#define BH_SECONDS_PER_HOUR 3600.0 /* [s/h] exact; SI */

/* Returns [1/s] particles per second of electrical current [A] > 0 carried by particles of charge
 * `charge` (units of e, not 0): I / (|z| e), CODATA 2022.  Times the beam's `fraction` for the
 * named kind. */
double bh_counting_beam(double current, int charge);

/* Returns [C] the beam charge of current [A] in hours [h]: I t. */
double bh_counting_charge(double current, double hours);

/* Returns [h] the time that charge [C] takes at current [A] > 0. */
double bh_counting_hours_of_charge(double charge, double current);

/* The factors of a rate: a row of the run table multiplies out. */
typedef struct {
    double beam;          /* [1/s] beam particles of the named kind */
    double seen;          /* [1/cm2] scatterer nuclei seen */
    double cross_section; /* [ub/sr] mean over the acceptance, per nucleus */
    double solid_angle;   /* [sr] */
    double radiative;     /* [1] */
    double kept;          /* [1] */
    double efficiency;    /* [1] */
} bh_rate_factors;

/* Returns [Hz] beam x seen x 1e-30 cm2/ub x cross_section x solid_angle x radiative x kept x
 * efficiency. */
double bh_counting_rate(const bh_rate_factors *factors);

/* The readout of an arm. */
typedef struct {
    double dead_time;   /* [s] per recorded event, >= 0 */
    bool paralysable;   /* false: non-paralysable */
    int prescale;       /* >= 1: one event of so many is passed to the readout */
    double rate_limit;  /* [Hz] what the readout records at most; 0: no limit */
    double duty_factor; /* [1] above 0, at most 1 */
} bh_readout;

/* What the readout makes of a rate of triggers. */
typedef struct {
    double live_fraction; /* [1] dead_part x prescale_part x limit_part: recorded / offered */
    double dead_part;     /* [1] */
    double prescale_part; /* [1] 1 / prescale */
    double limit_part;    /* [1] min(1, rate_limit / recorded) */
    double recorded;      /* [Hz] while there is beam, before the rate limit takes its part */
    bool over_limit;      /* recorded > rate_limit */
} bh_live;

/*
 * Fills `out` for triggers [Hz] = signal + background + other rate of the arm, mean in time, >= 0.
 * While there is beam they come at n = triggers / duty_factor, of which n1 = n / prescale reach the
 * readout and cost dead time (which is per recorded event: one prescaled away costs none):
 *   non-paralysable  dead_part = 1 / (1 + n1 tau),  paralysable  exp(-n1 tau)
 *   recorded = n1 dead_part,  limit_part = min(1, rate_limit / recorded)
 * Source: Knoll, Radiation Detection and Measurement, chapter 4 (dead-time models).
 * BH_EDOMAIN for NaN or a member out of its range.
 */
BH_CHECKED bh_code bh_counting_live(const bh_readout *readout, double triggers, bh_live *out,
                                    bh_error *err);

/* Returns [1] counts in hours [h]: rate [Hz] x live [1] x 3600 x hours. */
double bh_counting_counts(double rate, double live, double hours);

/* Returns [h] the time that counts [1] take at rate [Hz] and live [1]; INFINITY when nothing is
 * recorded. */
double bh_counting_hours_of_counts(double counts, double rate, double live);

/* Two arms that count unrelated events. */
typedef struct {
    double window;        /* [s] by which they may differ, from the earliest to the latest; two
                             pulses of width tau overlap in a window of 2 tau */
    double first, second; /* [Hz] mean in time */
    double duty_factor;   /* [1] above 0, at most 1 */
} bh_coincident_rates;

/* Returns [Hz] accidental coincidences, mean in time: with the beam on for a share duty_factor of
 * it, window x first x second / duty_factor.
 * Source: Knoll, Radiation Detection and Measurement, chapter 17. */
double bh_counting_accidentals(const bh_coincident_rates *rates);

#endif
