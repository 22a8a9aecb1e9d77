/* radiated_factor.c - the factor of radiation read at an angle. */
#include <math.h>

#include "beamhours/run/radiated.h"

static const double least_log = -7; /* a cut of 1/1000 of the reference: resolutions are wider */

double bh_gate_blurred(double cut, double blur)
{
    return blur > 0 && cut < 30 * blur ? blur * log1p(exp(cut / blur)) : cut;
}

/* Share of a line `cut` above an edge that is measured above it. */
static double measured_above(double cut, double blur)
{
    return blur > 0 ? erfc(-cut / (blur * sqrt(2.0))) / 2 : 1;
}

/* What is kept inside `cut` [MeV]. */
static double kept_inside(const bh_radiated *x, const double *share, double cut)
{
    if (!(cut > 0))
        return 0;
    const double l = fmax(log(cut / x->reference), least_log);
    const double tail = bh_angle_between(&x->at, share, x->tail);
    double sum = 0;
    for (int k = 2; k >= 0; k--)
        sum = sum * l + bh_angle_between(&x->at, share, x->level[k]);
    return exp(sum) * fmax(0, 1 - tail / cut);
}

/* [MeV] that the line lies above the lower edge of the bite. */
static double line_over(const bh_radiated *x, int boost, const double *share)
{
    return bh_angle_between(&x->at, share, x->cut) +
           (boost ? bh_angle_between(&x->at, share, x->shift[boost]) : 0);
}

static const double far_off = 1e29; /* [MeV] further than this is no edge */

/* By how much the bite is wider than the energy cut. */
static double wider(const bh_radiated *x, int boost, double angle)
{
    double share[BH_ANGLE_NODES];
    bh_angle_shares(&x->at, angle, share);
    return bh_gate_blurred(line_over(x, boost, share), x->blur) -
           bh_angle_between(&x->at, share, x->limit);
}

int bh_radiated_kinks(const bh_radiated *radiated, int boost, bh_interval polar, double *kinks)
{
    const bh_radiated *x = radiated;
    enum { STRETCHES = BH_RADIATED_KINKS };
    int count = 0;
    if (x->idle || !(x->cut[0] < far_off && x->limit[0] < far_off))
        return 0;
    polar.to = fmin(polar.to, x->largest);
    double from = polar.from, before = wider(x, boost, from);
    for (int i = 1; i <= STRETCHES && polar.from < polar.to; i++) {
        const double to = polar.from + (polar.to - polar.from) * i / STRETCHES;
        const double behind = wider(x, boost, to);
        double low = from, high = to;
        for (int k = 0; before * behind < 0 && k < 50; k++) {
            const double middle = (low + high) / 2;
            *(wider(x, boost, middle) * before > 0 ? &low : &high) = middle;
        }
        if (before * behind < 0)
            kinks[count++] = (low + high) / 2;
        from = to;
        before = behind;
    }
    return count;
}

static double factor_at(const bh_radiated *x, int boost, double angle)
{
    const double far = far_off;
    double share[BH_ANGLE_NODES], down = far;
    if (angle > x->largest)
        return 0;
    bh_angle_shares(&x->at, angle, share);
    const double soft = bh_angle_between(&x->at, share, x->soft);
    double inside = 1;
    if (x->cut[0] < far) {
        const double line = line_over(x, boost, share);
        inside = x->signal ? 1 : measured_above(line, x->blur);
        down = bh_gate_blurred(line, x->blur);
    }
    if (x->limit[0] < far)
        down = fmin(down, bh_angle_between(&x->at, share, x->limit));
    const double kept = kept_inside(x, share, fmin(down, soft));
    if (x->signal)
        return kept;
    if (x->above[0] < -far)
        return kept * inside;
    const double above = bh_angle_between(&x->at, share, x->above);
    const double beyond = kept_inside(x, share, fmin(bh_gate_blurred(above, x->blur), soft));
    return fmax(0, kept * inside - beyond * measured_above(above, x->blur));
}

void bh_radiated_apply(const bh_radiated *radiated, int boost, size_t n, const double *theta,
                       double *value)
{
    for (size_t i = 0; !radiated->idle && i < n; i++)
        value[i] *= radiated->boosted[boost] * factor_at(radiated, boost, theta[i]);
}
