/* series.c - polynomials summed through their moments. */
#include "beamhours/rates/series.h"

#include <math.h>

#include "beamhours/rates/interpolant_parts.h"

enum { NODES = BH_INTERPOLANT_NODES };

/* --- from an interpolant --- */

/* With value at 0 and 16 halved, as ever in sums over these points. */
int bh_chebyshev_coefficients(const bh_interpolant *in, const double *value, int step, double *c)
{
    const int last = NODES - 1, m = last / step, turn = 2 * last;
    for (int k = 0; k <= m; k++) {
        double sum = (value[0] + (k % 2 ? -value[last] : value[last])) / 2;
        for (int at = step, angle = k * step; at < last; at += step, angle += k * step)
            sum += value[at] * in->cosine[angle % turn];
        c[k] = 2 * sum / m;
    }
    c[0] /= 2;
    c[m] /= 2;
    return m + 1;
}

/* Of f y^2 at the points of a piece whose polynomial is that of its logarithm. */
static void values_of(const bh_interpolant *in, const bh_interpolant_piece *p, double *value)
{
    for (int i = 0; i < NODES; i++) {
        double sum = 0;
        for (int k = 0; k < p->count; k++)
            sum += p->c[k] * in->cosine[i * k % (2 * (NODES - 1))];
        value[i] = p->logarithm ? exp(sum) : sum;
    }
}

static bool series_of(const bh_interpolant *in, const bh_interpolant_piece *p, bh_series *series)
{
    static const double close = 1e-9, low = 1e-3; /* [1] of the smallest value; of the largest */
    double value[NODES], least = HUGE_VAL, most = 0;
    if (!(p->to > p->from))
        return false;
    values_of(in, p, value);
    for (int i = 0; i < NODES; i++) {
        least = fmin(least, value[i]);
        most = fmax(most, value[i]);
    }
    if (!(least > low * most))
        return false;
    *series = (bh_series){.from = p->from,
                          .to = p->to,
                          .middle = p->middle,
                          .slope = p->slope,
                          .axis = in->axis,
                          .count = p->count};
    if (p->logarithm)
        series->count = bh_chebyshev_coefficients(in, value, 1, series->c);
    for (int k = 0; !p->logarithm && k < p->count; k++)
        series->c[k] = p->c[k];
    if (p->logarithm && fabs(series->c[NODES - 1]) + fabs(series->c[NODES - 2]) > close * least)
        return false;
    while (series->count > 1 && fabs(series->c[series->count - 1]) < close / NODES * least)
        series->count--;
    return true;
}

int bh_series_of(const bh_interpolant *in, bh_series *series)
{
    int count = 0;
    for (int i = 0; i < in->count && !(in->limit > 0) && count < BH_SERIES_MOST; i++)
        count += series_of(in, &in->pieces[i], &series[count]);
    if (in->count == 1 && count == 1) {
        series->from = -HUGE_VAL;
        series->to = HUGE_VAL;
    }
    return count;
}

/* --- moments --- */

static bool are_there(const bh_moments *m, const bh_series *s)
{
    return m->count >= s->count && m->middle == s->middle && m->slope == s->slope &&
           m->axis == s->axis;
}

void bh_moments_of(const bh_quadrature_rule *rule, const bh_series *series, bh_moments *moments)
{
    enum { MOST = BH_QUADRATURE_MOST, USUAL = 9 }; /* terms, so that few series want more */
    double t[MOST], one[MOST] = {0}, two[MOST];
    const int n = rule->fine, all = rule->fine + rule->coarse;
    if (are_there(moments, series))
        return;
    *moments = (bh_moments){.middle = series->middle,
                            .slope = series->slope,
                            .axis = series->axis,
                            .count = series->count > USUAL ? series->count : USUAL};
    for (int i = 0; i < all; i++) {
        const double y = rule->versine[i];
        t[i] = (y - series->middle) * series->slope;
        one[i] = rule->weight[i] / (series->axis ? 1 : y * y);
        two[i] = t[i] * one[i]; /* T_-1 = T_1 */
    }
    for (int k = 0; k < moments->count; k++) {
        double fine = 0, coarse = 0;
#pragma omp simd reduction(+ : fine)
        for (int i = 0; i < n; i++)
            fine += one[i];
#pragma omp simd reduction(+ : coarse)
        for (int i = n; i < all; i++)
            coarse += one[i];
        moments->fine[k] = fine;
        moments->coarse[k] = coarse;
#pragma omp simd
        for (int i = 0; i < all; i++) {
            const double next = 2 * t[i] * one[i] - two[i];
            two[i] = one[i];
            one[i] = next;
        }
    }
}

bh_quadrature bh_series_sum(const bh_series *series, const bh_moments *moments,
                            const bh_acceptance_part *part, const bh_integrand *f)
{
    double fine = 0, coarse = 0;
    for (int k = 0; k < series->count; k++) {
        fine += series->c[k] * moments->fine[k];
        coarse += series->c[k] * moments->coarse[k];
    }
    const double off = fabs(fine - coarse);
    const double scale = fmax(fabs(fine), f->least * part->solid_angle / part->scale);
    return (bh_quadrature){fine * part->scale, off * part->scale, off <= f->tolerance * scale};
}
