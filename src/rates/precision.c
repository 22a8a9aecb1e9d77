/* precision.c - statistical uncertainty of a signal with background taken from an empty target. */
#include "beamhours/rates/precision.h"

#include <math.h>

#include "beamhours/rates/counting.h"

/* sigma^2 = (full + empty / phi) T. */
typedef struct {
    double full, empty; /* [Hz] */
} variance_rate;

static double advantage_or_one(double advantage)
{
    return advantage == 0 ? 1 : advantage;
}

/* NAN in both when a rate makes no sense. */
static variance_rate variance_of(const bh_recorded *rates, double advantage)
{
    const double k = advantage_or_one(advantage);
    if (!(rates->signal >= 0 && rates->windows >= 0 && rates->other >= 0 && k > 0))
        return (variance_rate){(double)NAN, (double)NAN};
    return (variance_rate){rates->signal + rates->windows + rates->other, rates->windows / k};
}

/* sigma^2 / T [Hz]; NAN when something makes no sense. */
static double variance_per_second(const bh_recorded *rates, const bh_empty *empty)
{
    const variance_rate v = variance_of(rates, empty->measured ? empty->advantage : 1);
    if (!empty->measured)
        return v.full;
    return empty->share > 0 ? v.full + v.empty / empty->share : (double)NAN;
}

double bh_precision_uncertainty(const bh_recorded *rates, const bh_empty *empty, double hours)
{
    const double variance = variance_per_second(rates, empty);
    if (!(variance >= 0 && hours >= 0))
        return (double)NAN;
    if (rates->signal == 0 || hours == 0)
        return HUGE_VAL;
    return sqrt(variance / (hours * BH_SECONDS_PER_HOUR)) / rates->signal;
}

double bh_precision_hours(const bh_recorded *rates, const bh_empty *empty, double goal)
{
    const double variance = variance_per_second(rates, empty);
    if (!(variance >= 0 && goal > 0))
        return (double)NAN;
    if (rates->signal == 0)
        return HUGE_VAL;
    const double wanted = goal * rates->signal;
    return variance / (wanted * wanted) / BH_SECONDS_PER_HOUR;
}

double bh_precision_best_share(const bh_recorded *rates, double advantage)
{
    const variance_rate v = variance_of(rates, advantage);
    return v.empty == 0 ? 0 : sqrt(v.empty / v.full);
}

double bh_precision_hours_each(const bh_recorded_bins *bins, const bh_empty *empty, double goal,
                               size_t *worst)
{
    double most = 0;
    size_t at = 0;
    for (size_t i = 0; i < bins->count; i++) {
        const double hours = bh_precision_hours(&bins->bins[i], empty, goal);
        if (isnan(hours))
            return (double)NAN;
        if (i == 0 || hours > most) {
            most = hours;
            at = i;
        }
    }
    if (worst)
        *worst = at;
    return most;
}

double bh_precision_best_share_each(const bh_recorded_bins *bins, double advantage)
{
    double most = -1;
    double share = 0;
    for (size_t i = 0; i < bins->count; i++) {
        const bh_recorded *rates = &bins->bins[i];
        const variance_rate v = variance_of(rates, advantage);
        if (isnan(v.full))
            return (double)NAN;
        /* full plus empty time at the best share is (sqrt full + sqrt empty)^2 / (goal s)^2 */
        const double need = rates->signal > 0 ? (sqrt(v.full) + sqrt(v.empty)) / rates->signal : 0;
        if (need > most) {
            most = need;
            share = bh_precision_best_share(rates, advantage);
        }
    }
    return share;
}
