/* fourier_bessel.c - charge densities as Fourier-Bessel series (Dreher et al., Nucl. Phys. A 235
 * (1974) 219): rho(r) = sum a_n j0(n pi r / R) for r < R. */
#include <math.h>

#include "beamhours/physics/form_factor.h"
#include "beamhours/units/constants.h"

/* shape: number {R}; term[0] (-1)^(n+1) a_n / norm, term[1] (n pi)^2. */

void bh_fourier_bessel_make(bh_shape *shape, double edge, int count, const double *coefficient)
{
    double norm = 0.0;
    shape->number[0] = edge;
    shape->count = count;
    for (int i = 0; i < count; i++) {
        const double root = (i + 1) * BH_PI;
        shape->term[0][i] = i % 2 ? -coefficient[i] : coefficient[i];
        shape->term[1][i] = root * root;
        norm += shape->term[0][i] / shape->term[1][i];
    }
    for (int i = 0; i < count; i++)
        shape->term[0][i] /= norm;
}

/* F(q) = sin(x)/x sum (-1)^(n+1) a_n / ((n pi)^2 - x^2) / norm, x = qR.  The nearest zero of
 * sin(x) is taken out, so that its term keeps all digits: sin(x) = (-1)^m sin(x - m pi). */
double bh_fourier_bessel_factor(const bh_shape *shape, double q)
{
    const double x = q * shape->number[0], x2 = x * x;
    const double turns = round(x / BH_PI);
    const double off = (x - turns * BH_PI) - turns * 1.2246467991473532e-16; /* pi - BH_PI */
    const double sine = fmod(turns, 2.0) != 0.0 ? -sin(off) : sin(off);
    const int near = turns >= 1.0 && turns <= shape->count ? (int)turns - 1 : -1;
    double sum = 0.0;
    for (int i = 0; i < near; i++)
        sum += shape->term[0][i] / (shape->term[1][i] - x2);
    for (int i = near + 1; i < shape->count; i++)
        sum += shape->term[0][i] / (shape->term[1][i] - x2);
    if (near < 0)
        return x > 1e-8 ? sine / x * sum : sum;
    const double ratio = fabs(off) > 1e-8 ? sine / off : (near % 2 ? 1.0 : -1.0);
    return (sine * sum - ratio * shape->term[0][near] / (x + turns * BH_PI)) / x;
}

static void fourier_bessel(const bh_structure *structure, double q2, double value[BH_FACTORS_MOST])
{
    value[0] = bh_fourier_bessel_factor(&structure->shape[0], sqrt(q2) / BH_HBARC);
}

bh_code bh_prepare_fourier_bessel(bh_structure *structure, int set, bh_error *err)
{
    (void)err;
    const bh_density *density =
        bh_density_find(BH_SHAPE_FOURIER_BESSEL, structure->z, structure->a, set);
    const double resolved =
        (density->count - 1) * BH_PI / density->value[0] * BH_HBARC * 1e-3; /* [GeV] */
    bh_density_describe(structure, density);
    structure->evaluate = fourier_bessel;
    structure->highest = fmin(structure->highest, resolved * resolved);
    bh_fourier_bessel_make(&structure->shape[0], density->value[0], density->count - 1,
                           density->value + 1);
    return BH_OK;
}
