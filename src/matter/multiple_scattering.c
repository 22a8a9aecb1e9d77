/* multiple_scattering.c - Highland's width and Moliere's tails. */
#include "beamhours/matter/multiple_scattering.h"

#include <math.h>
#include <stdlib.h>

#include <gsl/gsl_sf_bessel.h>

#include "beamhours/matter/gauss.h"
#include "beamhours/matter/heavy_loss.h"
#include "beamhours/units/constants.h"

/* Fewer deflections than this are taken as at most one. */
#define FEW 20.0

double bh_highland(const bh_particle *particle, double kinetic, double thickness)
{
    if (!(kinetic > 0.0) || !(thickness >= 0.0))
        return (double)NAN;
    if (thickness == 0.0)
        return 0.0;
    const bh_flight f = bh_flight_of(particle, kinetic);
    const double charge = abs(particle->charge);
    const double strength = thickness * charge * charge / (f.beta * f.beta);
    const double bracket = 1.0 + 0.038 * log(strength);
    return fmax(13.6 / (f.beta * f.momentum) * charge * sqrt(thickness) * bracket, 0.0);
}

void bh_moliere_add(bh_moliere *m, const bh_particle *particle, const bh_medium *medium,
                    bh_crossing crossing)
{
    if (!(crossing.kinetic > 0.0) || !(crossing.path > 0.0))
        return;
    const bh_flight f = bh_flight_of(particle, crossing.kinetic);
    const double charge = particle->charge;
    const double scale = bh_bethe_constant() * BH_MASS_ELECTRON * charge * charge * crossing.path /
                         (f.beta * f.beta * f.momentum * f.momentum * medium->mean_atomic_mass);
    /* Thomas and Fermi's radius 0.885 a0 Z^-1/3; 1.13 + 3.76 a^2: Bethe 1953, eq. 21. */
    const double angle = BH_ALPHA * BH_MASS_ELECTRON / (0.885 * f.momentum);
    for (size_t i = 0; i < medium->count; i++) {
        const double z = medium->elements[i].z;
        const double born = BH_ALPHA * z * charge / f.beta;
        const double screening = angle * angle * pow(z, 2.0 / 3.0) * (1.13 + 3.76 * born * born);
        const double part = scale * medium->elements[i].per_atom * z * (z + 1.0);
        m->chi_c2 += part;
        m->log_chi_a += part * log(screening);
    }
}

static double screening_of(const bh_moliere *m)
{
    return exp(m->log_chi_a / m->chi_c2);
}

double bh_moliere_collisions(const bh_moliere *m)
{
    return m->chi_c2 > 0.0 ? m->chi_c2 / screening_of(m) : 0.0;
}

double bh_moliere_width(const bh_moliere *m, double fraction)
{
    if (!(fraction > 0.0) || !(fraction < 1.0))
        return (double)NAN;
    const double omega = bh_moliere_collisions(m);
    if (!(omega > 0.0))
        return 0.0;
    const double v = 0.5 * omega / (1.0 - fraction);
    return sqrt(m->chi_c2 / (1.0 + fraction * fraction) * ((1.0 + v) / v * log1p(v) - 1.0));
}

/* B - ln B = b = ln(omega / 1.167), the larger solution: Bethe 1953, eqs. 22 and 23. */
static double moliere_b(double omega)
{
    const double b = log(omega / 1.167);
    double big = b + log1p(b) + 0.5;
    for (int i = 0; i < 30; i++)
        big -= (big - log(big) - b) / (1.0 - 1.0 / big);
    return big;
}

typedef struct {
    double angle; /* in units of chi_c sqrt(B) */
    int order;
} term;

/* Of f1 or f2, summed from the angle outwards. */
static double term_integrand(const void *context, double u)
{
    const term *t = context;
    const double q = 0.25 * u * u;
    const double factor = q * log(q);
    const double power = t->order == 1 ? factor : 0.5 * factor * factor;
    return -t->angle * gsl_sf_bessel_J1(t->angle * u) * exp(-q) * power;
}

/* Beyond this the leading terms of the tail are better than the sum, which cancels. */
#define FAR 12.0

/* Integral of f1 = 2 a^-4 (1 - 5 a^-2)^-4/5 and f2 = 16 a^-6 (ln a + ln 0.4), Bethe 1953, eqs. 29
 * and 30, to the first correction. */
static double far_term(term t)
{
    const double w = 1.0 / (t.angle * t.angle);
    if (t.order == 1)
        return w * (1.0 + w * (2.0 + 6.0 * w));
    return 4.0 * w * w * (log(0.4 * t.angle) + 0.25);
}

static double beyond_term(term t)
{
    if (t.angle > FAR)
        return far_term(t);
    const double step = fmin(0.5, 3.0 / fmax(t.angle, 1e-3));
    double sum = bh_gauss(term_integrand, &t, (bh_gauss_limits){1e-12, 0.1 * step}) +
                 bh_gauss(term_integrand, &t, (bh_gauss_limits){0.1 * step, step});
    const int panels = (int)(13.0 / step); /* e^-u^2/4 leaves 1e-18 */
    for (int i = 1; i <= panels; i++)
        sum += bh_gauss(term_integrand, &t, (bh_gauss_limits){i * step, (i + 1) * step});
    return sum;
}

double bh_moliere_beyond(const bh_moliere *m, double angle)
{
    if (!(angle >= 0.0))
        return (double)NAN;
    const double omega = bh_moliere_collisions(m);
    if (!(omega > 0.0))
        return angle > 0.0 ? 0.0 : 1.0;
    if (angle == 0.0)
        return 1.0;
    if (omega < FEW)
        return -expm1(-m->chi_c2 / (angle * angle + screening_of(m)));
    const double b = moliere_b(omega);
    const double reduced = angle / sqrt(m->chi_c2 * b);
    const double beyond = exp(-reduced * reduced) + beyond_term((term){reduced, 1}) / b +
                          beyond_term((term){reduced, 2}) / (b * b);
    return fmin(fmax(beyond, 0.0), 1.0);
}
