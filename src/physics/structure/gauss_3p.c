/* gauss_3p.c - rho(r) = rho0 (1 + w r^2/c^2) / (1 + exp((r^2 - c^2)/a^2)).
 *
 * No closed form is known.  The shape is even in r and falls like a Gaussian, so that beyond
 * R^2 = c^2 + 40 a^2 nothing is left of it and its Fourier-Bessel series converges geometrically:
 * it is made once, by a trapezoidal rule that is exact to rounding, and then summed in closed form.
 * Accuracy 1e-12 of F(0), against a quadrature. */
#include <math.h>

#include "beamhours/physics/form_factor.h"
#include "beamhours/units/constants.h"

enum { TERMS = 120, STEPS = 240 };

/* The density, rho(0) about 1, at r [fm]; `value` is {c, a, w}. */
static double density_at(const double *value, double r)
{
    const double c2 = value[0] * value[0], a2 = value[1] * value[1], r2 = r * r;
    return (1.0 + value[2] * r2 / c2) / (1.0 + exp((r2 - c2) / a2));
}

static void gauss(const bh_structure *structure, double q2, double value[BH_FACTORS_MOST])
{
    value[0] = bh_fourier_bessel_factor(&structure->shape[0], sqrt(q2) / BH_HBARC);
}

bh_code bh_prepare_gauss_3p(bh_structure *structure, int set, bh_error *err)
{
    (void)err;
    const bh_density *density = bh_density_find(BH_SHAPE_GAUSS_3P, structure->z, structure->a, set);
    const double *value = density->value;
    const double edge = sqrt(value[0] * value[0] + 40.0 * value[1] * value[1]);
    const double step = edge / STEPS;
    double moment[STEPS], coefficient[TERMS];
    for (int i = 1; i < STEPS; i++)
        moment[i] = i * step * density_at(value, i * step);
    for (int n = 1; n <= TERMS; n++) {
        double sum = 0.0; /* of r rho sin(n pi r / R): proportional to a_n / n */
        for (int i = 1; i < STEPS; i++)
            sum += moment[i] * sin(BH_PI * (n * i % (2 * STEPS)) / STEPS);
        coefficient[n - 1] = n * sum;
    }
    bh_density_describe(structure, density);
    structure->evaluate = gauss;
    int count = TERMS; /* without those lost in rounding: less to sum */
    while (count > 1 && fabs(coefficient[count - 1]) < 1e-15 * fabs(coefficient[0]))
        count--;
    bh_fourier_bessel_make(&structure->shape[0], edge, count, coefficient);
    return BH_OK;
}
