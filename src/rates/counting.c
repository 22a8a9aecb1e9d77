/* counting.c - from beam current and cross section to recorded events. */
#include "beamhours/rates/counting.h"

#include <math.h>
#include <stdlib.h>

#include "beamhours/units/constants.h"

#define CM2_PER_UB 1e-30

double bh_counting_beam(double current, int charge)
{
    return current / (abs(charge) * BH_ELEMENTARY);
}

double bh_counting_charge(double current, double hours)
{
    return current * BH_SECONDS_PER_HOUR * hours;
}

double bh_counting_hours_of_charge(double charge, double current)
{
    return charge / current / BH_SECONDS_PER_HOUR;
}

double bh_counting_rate(const bh_rate_factors *factors)
{
    const double luminosity = factors->beam * factors->seen * CM2_PER_UB;
    const double yield = luminosity * factors->cross_section * factors->solid_angle;
    return yield * factors->radiative * factors->kept * factors->efficiency;
}

static bool readout_makes_sense(const bh_readout *readout)
{
    return readout->dead_time >= 0 && isfinite(readout->dead_time) && readout->prescale >= 1 &&
           readout->rate_limit >= 0 && readout->duty_factor > 0 && readout->duty_factor <= 1;
}

bh_code bh_counting_live(const bh_readout *readout, double triggers, bh_live *out, bh_error *err)
{
    if (!(triggers >= 0 && isfinite(triggers)))
        return bh_fail(err, BH_EDOMAIN, "a trigger rate of %g Hz: it must be 0 or more", triggers);
    if (!readout_makes_sense(readout))
        return bh_fail(err, BH_EDOMAIN,
                       "dead time %g s, prescale %d, rate limit %g Hz, duty factor %g: one of them "
                       "is out of range",
                       readout->dead_time, readout->prescale, readout->rate_limit,
                       readout->duty_factor);
    const double reaching = triggers / readout->duty_factor / readout->prescale;
    const double busy = reaching * readout->dead_time;
    bh_live live;
    live.dead_part = readout->paralysable ? exp(-busy) : 1 / (1 + busy);
    live.prescale_part = 1.0 / readout->prescale;
    live.recorded = reaching * live.dead_part;
    live.over_limit = readout->rate_limit > 0 && live.recorded > readout->rate_limit;
    live.limit_part = live.over_limit ? readout->rate_limit / live.recorded : 1;
    live.live_fraction = live.dead_part * live.prescale_part * live.limit_part;
    *out = live;
    return BH_OK;
}

double bh_counting_counts(double rate, double live, double hours)
{
    return rate * live * BH_SECONDS_PER_HOUR * hours;
}

double bh_counting_hours_of_counts(double counts, double rate, double live)
{
    const double per_hour = rate * live * BH_SECONDS_PER_HOUR;
    return per_hour > 0 ? counts / per_hour : HUGE_VAL;
}

double bh_counting_accidentals(const bh_coincident_rates *rates)
{
    return rates->window * rates->first * rates->second / rates->duty_factor;
}
