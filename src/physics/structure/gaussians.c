/* gaussians.c - charge densities as sums of Gaussians (Sick, Nucl. Phys. A 218 (1974) 509). */
#include <math.h>

#include "beamhours/physics/form_factor.h"
#include "beamhours/units/constants.h"

static const double grid = 0.1; /* [fm] all published radii are multiples of it */

/* shape: number {gamma^2 / 4, 2 / gamma^2}; term[0] radii, term[1] Q / (1 + 2 R^2 / gamma^2);
 * step: from one radius to the next, in grids. */

void bh_gaussians_make(bh_shape *shape, const bh_gaussians *in)
{
    const double gamma2 = in->width * in->width / 1.5;
    double total = 0.0, before = 0.0;
    for (int i = 0; i < in->count; i++)
        total += in->share[i];
    shape->number[0] = gamma2 / 4.0;
    shape->number[1] = 2.0 / gamma2;
    shape->count = in->count;
    for (int i = 0; i < in->count; i++) {
        shape->step[i] = (int)lround((in->at[i] - before) / grid);
        shape->term[0][i] = before = in->at[i];
        shape->term[1][i] = in->share[i] / total / (1.0 + 2.0 * in->at[i] * in->at[i] / gamma2);
    }
}

/* F(q) = exp(-q^2 gamma^2 / 4) sum Q / (1 + 2 R^2/gamma^2) [cos qR + 2 R^2/gamma^2 sin(qR)/qR].
 * One sine and one cosine are turned from radius to radius: 1e-14 of F(0), four times faster. */
double bh_gaussians_factor(const bh_shape *shape, double q)
{
    double c[BH_STEPS_MOST], s[BH_STEPS_MOST];
    c[0] = 1.0;
    s[0] = 0.0;
    c[1] = cos(q * grid);
    s[1] = sin(q * grid);
    for (int k = 2; k < BH_STEPS_MOST; k++) { /* halves keep the chain short */
        const int low = k / 2, high = k - low;
        c[k] = c[low] * c[high] - s[low] * s[high];
        s[k] = s[low] * c[high] + c[low] * s[high];
    }
    const double over_q = q > 0.0 ? 1.0 / q : 0.0;
    double cosine = 1.0, sine = 0.0, sum = 0.0;
    for (int i = 0; i < shape->count; i++) {
        const int k = shape->step[i];
        const double radius = shape->term[0][i], turned = cosine * c[k] - sine * s[k];
        sine = sine * c[k] + cosine * s[k];
        cosine = turned;
        const double ratio = q > 0.0 ? sine * over_q : radius;
        sum += shape->term[1][i] * (cosine + shape->number[1] * radius * ratio);
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
