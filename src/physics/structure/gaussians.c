/* gaussians.c - charge densities as sums of Gaussians (Sick, Nucl. Phys. A 218 (1974) 509). */
#include <math.h>

#include "beamhours/physics/form_factor.h"
#include "beamhours/units/constants.h"

/* shape: number {gamma^2 / 4}; term[0] radii, term[1] Q / (1 + 2 R^2 / gamma^2); number[1 ...] no.
 */

void bh_gaussians_make(bh_shape *shape, const bh_gaussians *in)
{
    const double gamma2 = in->width * in->width / 1.5;
    double total = 0.0;
    for (int i = 0; i < in->count; i++)
        total += in->share[i];
    shape->number[0] = gamma2 / 4.0;
    shape->number[1] = 2.0 / gamma2;
    shape->count = in->count;
    for (int i = 0; i < in->count; i++) {
        shape->term[0][i] = in->at[i];
        shape->term[1][i] = in->share[i] / total / (1.0 + 2.0 * in->at[i] * in->at[i] / gamma2);
    }
}

/* F(q) = exp(-q^2 gamma^2 / 4) sum Q / (1 + 2 R^2/gamma^2) [cos qR + 2 R^2/gamma^2 sin(qR)/qR] */
double bh_gaussians_factor(const bh_shape *shape, double q)
{
    const double over_q = q > 0.0 ? 1.0 / q : 0.0;
    double sum = 0.0;
    for (int i = 0; i < shape->count; i++) {
        const double radius = shape->term[0][i], x = q * radius;
        const double sine = x > 1e-8 ? sin(x) * over_q : radius;
        sum += shape->term[1][i] * (cos(x) + shape->number[1] * radius * sine);
    }
    return exp(-q * q * shape->number[0]) * sum;
}

static void gaussians(const bh_structure *structure, double q2, double value[BH_FACTORS_MOST])
{
    value[0] = bh_gaussians_factor(&structure->shape[0], sqrt(q2) / BH_HBARC);
}

bh_code bh_prepare_gaussians(bh_structure *structure, int set, bh_error *err)
{
    (void)err;
    const bh_density *density =
        bh_density_find(BH_SHAPE_GAUSSIANS, structure->z, structure->a, set);
    const int count = (density->count - 1) / 2;
    bh_density_describe(structure, density);
    structure->evaluate = gaussians;
    bh_gaussians_make(&structure->shape[0], &(bh_gaussians){.width = density->value[0],
                                                            .count = count,
                                                            .at = density->value + 1,
                                                            .share = density->value + 1 + count});
    return BH_OK;
}
