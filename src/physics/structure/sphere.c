/* sphere.c - a uniform sphere, and one with a soft surface (Helm, Phys. Rev. 104 (1956) 1466). */
#include <math.h>

#include "beamhours/physics/form_factor.h"
#include "beamhours/units/constants.h"

/* shape: number {radius, s^2 / 2} */

/* 3 j1(x) / x = 3 (sin x - x cos x) / x^3; as a series where that cancels. */
static double ball(double x)
{
    const double x2 = x * x;
    if (x2 > 1.0)
        return 3.0 * (sin(x) - x * cos(x)) / (x2 * x);
    double term = 1.0, sum = 1.0;
    for (int k = 1; k < 10; k++) {
        term *= -x2 / (2.0 * k * (2.0 * k + 3.0));
        sum += term;
    }
    return sum;
}

static void sphere(const bh_structure *structure, double q2, double value[BH_FACTORS_MOST])
{
    const double *number = structure->shape[0].number;
    const double x2 = q2 / (BH_HBARC * BH_HBARC);
    value[0] = ball(sqrt(x2) * number[0]) * exp(-number[1] * x2);
}

/* A sphere with surface thickness s [fm] that has the nucleus's rms radius. */
static bh_code prepare(bh_structure *structure, double thickness)
{
    bool measured;
    const double rms = bh_density_radius(structure->z, structure->a, &measured);
    const double s = fmin(thickness, 0.5 * rms);
    bh_density_describe(structure, NULL);
    structure->evaluate = sphere;
    structure->shape[0].number[0] = sqrt(5.0 / 3.0 * (rms * rms - 3.0 * s * s));
    structure->shape[0].number[1] = 0.5 * s * s;
    return BH_OK;
}

bh_code bh_prepare_uniform(bh_structure *structure, int set, bh_error *err)
{
    (void)set;
    (void)err;
    return prepare(structure, 0.0);
}

/* s = 0.9 fm: common practice. */
bh_code bh_prepare_helm(bh_structure *structure, int set, bh_error *err)
{
    (void)set;
    (void)err;
    return prepare(structure, 0.9);
}
