/* oscillator.c - rho(r) = rho0 (1 + alpha (r/a)^2) exp(-(r/a)^2), the harmonic-oscillator shape. */
#include <math.h>

#include "beamhours/physics/form_factor.h"
#include "beamhours/units/constants.h"

/* shape: number {a^2 / 4, alpha a^2 / (2 (2 + 3 alpha))} */
static void oscillator(const bh_structure *structure, double q2, double value[BH_FACTORS_MOST])
{
    const double *number = structure->shape[0].number;
    const double x = q2 / (BH_HBARC * BH_HBARC);
    value[0] = (1.0 - number[1] * x) * exp(-number[0] * x);
}

bh_code bh_prepare_oscillator(bh_structure *structure, int set, bh_error *err)
{
    (void)err;
    const bh_density *density =
        bh_density_find(BH_SHAPE_OSCILLATOR, structure->z, structure->a, set);
    const double a2 = density->value[0] * density->value[0], alpha = density->value[1];
    bh_density_describe(structure, density);
    structure->evaluate = oscillator;
    structure->shape[0].number[0] = a2 / 4.0;
    structure->shape[0].number[1] = alpha * a2 / (2.0 * (2.0 + 3.0 * alpha));
    return BH_OK;
}
