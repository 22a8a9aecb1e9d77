/* vavilov.c - Landau's and Vavilov's distributions of the energy loss. */
#include <math.h>

#include <gsl/gsl_sf_expint.h>

#include "beamhours/matter/gauss.h"
#include "beamhours/matter/straggling.h"
#include "beamhours/units/constants.h"

static const double euler = 0.57721566490153286061;

/* ---- Landau: integrals along the negative real axis, which do not oscillate for lambda > 0 ----
 */

/* u = v^2, so that u ln u is smooth at 0. */
static double landau_tail(const void *context, double v)
{
    const double lambda = *(const double *)context;
    const double u = v * v;
    return 2.0 * exp(-lambda * u - u * log(u)) * sin(BH_PI * u) / v;
}

static double landau_density(const void *context, double v)
{
    return landau_tail(context, v) * v * v;
}

/* Over one period of the sine after another until nothing is left. */
static double landau_sum(bh_gauss_function *f, double lambda)
{
    const double end = lambda > 20.0 ? 40.0 / lambda : 16.0 + 3.0 * exp(1.0 - lambda);
    const double step = fmin(1.0, 0.25 * end);
    double sum = 0.0;
    for (int i = 0; i < 400 && i * step < end; i++)
        sum += bh_gauss(f, &lambda, (bh_gauss_limits){sqrt(i * step), sqrt((i + 1) * step)});
    return sum / BH_PI;
}

/* Below, fewer than one in 1e9 lose so little. */
static const double landau_lowest = -3.9;

double bh_landau_beyond(double lambda)
{
    if (!(lambda > landau_lowest))
        return isnan(lambda) ? lambda : 1.0;
    return fmin(fmax(landau_sum(landau_tail, lambda), 0.0), 1.0);
}

double bh_landau_density(double lambda)
{
    if (!(lambda > landau_lowest))
        return isnan(lambda) ? lambda : 0.0;
    return fmax(landau_sum(landau_density, lambda), 0.0);
}

/* ---- Vavilov: the characteristic function, s = i kappa y ---- */

typedef struct {
    bh_vavilov v;
    double shift; /* lambda + ln kappa */
} place;

typedef struct {
    double log_size, phase;
} wave;

/* Sine and cosine integrals; far out by their asymptotic series, which is faster. */
typedef struct {
    double si, ci;
} integrals;

static integrals integrals_at(double y, double sine, double cosine)
{
    if (y < 30.0)
        return (integrals){gsl_sf_Si(y), gsl_sf_Ci(y)};
    const double w = 1.0 / (y * y);
    const double f = (1.0 - w * (2.0 - w * (24.0 - w * (720.0 - w * 40320.0)))) / y;
    const double g = (1.0 - w * (6.0 - w * (120.0 - w * (5040.0 - w * 362880.0)))) * w;
    return (integrals){0.5 * BH_PI - f * cosine - g * sine, f * sine - g * cosine};
}

static wave wave_at(const place *p, double y)
{
    const double b2 = p->v.beta2;
    const double sine = sin(y);
    const double cosine = cos(y);
    const integrals in = integrals_at(y, sine, cosine);
    const double logarithm = log(y) - in.ci;
    const double f1 = b2 * logarithm - cosine - y * in.si;
    const double f2 = y * logarithm + sine + b2 * in.si;
    return (wave){p->v.kappa * (1.0 + b2 * euler + f1), p->v.kappa * (y * p->shift + f2)};
}

static double vavilov_density(const void *context, double y)
{
    const wave w = wave_at(context, y);
    return exp(w.log_size) * cos(w.phase);
}

static double vavilov_below(const void *context, double y)
{
    const wave w = wave_at(context, y);
    return exp(w.log_size) * sin(w.phase) / y;
}

/* Panels within which neither the phase nor Ci and Si turn more than about once. */
static double vavilov_sum(bh_gauss_function *f, const place *p)
{
    double sum = 0.0;
    double y = 0.0;
    double width = 0.05;
    for (int i = 0; i < 20000; i++) {
        sum += bh_gauss(f, p, (bh_gauss_limits){y, y + width});
        y += width;
        if (wave_at(p, y).log_size < -36.0)
            break;
        const double turn = p->v.kappa * (fabs(p->shift + log(y)) + 2.0);
        width = fmin(y < 40.0 ? fmin(0.5 * y, 3.0) : 0.08 * y, 6.0 / turn);
    }
    return sum / BH_PI;
}

double bh_vavilov_beyond(bh_vavilov v, double lambda)
{
    if (isnan(lambda))
        return lambda;
    const place p = {v, lambda + log(v.kappa)};
    return fmin(fmax(0.5 - vavilov_sum(vavilov_below, &p), 0.0), 1.0);
}

double bh_vavilov_density(bh_vavilov v, double lambda)
{
    if (isnan(lambda))
        return lambda;
    const place p = {v, lambda + log(v.kappa)};
    return v.kappa * vavilov_sum(vavilov_density, &p);
}
