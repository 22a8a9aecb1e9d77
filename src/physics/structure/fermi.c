/* fermi.c - rho(r) = rho0 (1 + w r^2/c^2) / (1 + exp((r - c)/a)), w = 0 with two parameters.
 *
 * Closed form, with nothing left out for small c/a.  With k = 1/a, A = pi a,
 *   I(q) = int_0^inf cos(qr) / (1 + exp((r - c)/a)) dr
 *        = A sin(qc) / sinh(Aq) + sum_{m>=1} (-1)^(m+1) mk exp(-mkc) / ((mk)^2 + q^2),
 * from expanding the density in exponentials on both sides of c, and F(q) is proportional to
 * (-I' + w/c^2 I''') / q (compare Maximon & Schrack, J. Res. NBS 70B (1966) 85).  Near q = 0 it is
 * summed as a power series of moments instead.  Accuracy 1e-12 of F(0), against a quadrature. */
#include <math.h>

#include <gsl/gsl_errno.h>
#include <gsl/gsl_sf_zeta.h>

#include "beamhours/physics/form_factor.h"
#include "beamhours/units/constants.h"

enum { CORRECTIONS = 60, POWERS = 18 };

/* shape[0]: number as below; term[0] (-1)^(m+1) mk exp(-mkc), term[1] (mk)^2.
 * shape[1]: term[0] coefficients of the powers of q^2. */
enum { HALF, SKIN, BEND, FRONT, SMALL };

typedef struct {
    double c, a, w;
} fermi;

/* Order-s Fermi integral over gamma(s), s odd: -Li_s(-exp(x)).
 * Its power part comes from inversion, the rest is the polylogarithm at exp(-x). */
static double integral(int s, double x)
{
    double sum = 0.0, power = 1.0; /* x^n / n! */
    for (int n = 0; n <= s; n++) {
        gsl_sf_result eta = {.val = 0.5};
        if (n > 0)
            power *= x / n;
        if (n % 2 == 0)
            continue;
        if (n < s && gsl_sf_eta_int_e(s - n, &eta) != GSL_SUCCESS)
            return (double)NAN;
        sum += 2.0 * eta.val * power;
    }
    double sign = 1.0;
    for (int m = 1; m <= CORRECTIONS && m * x < 45.0; m++) {
        sum += sign * exp(-m * x) * pow(m, -s);
        sign = -sign;
    }
    return sum;
}

/* int r^n rho(r) dr / n! for even n, without w. */
static double moment(const fermi *of, int n)
{
    return pow(of->a, n + 1) * integral(n + 1, of->c / of->a);
}

static double rms(const fermi *of)
{
    return sqrt(12.0 * moment(of, 4) / moment(of, 2));
}

/* Half-density radius for a wanted rms radius; it rises with c. */
static double half_radius(double wanted, double skin)
{
    double low = 0.0, high = 2.0 * wanted;
    for (int i = 0; i < 60; i++) {
        const double c = 0.5 * (low + high);
        *(rms(&(fermi){c, skin, 0.0}) < wanted ? &low : &high) = c;
    }
    return 0.5 * (low + high);
}

static void make(bh_structure *structure, const fermi *of)
{
    bh_shape *shape = &structure->shape[0], *series = &structure->shape[1];
    const double bend = of->w / (of->c * of->c);
    const double norm = 2.0 * moment(of, 2) + bend * 24.0 * moment(of, 4);
    shape->number[HALF] = of->c;
    shape->number[SKIN] = of->a;
    shape->number[BEND] = bend;
    shape->number[FRONT] = 1.0 / norm;
    shape->number[SMALL] = fmin(0.75 / of->c, 0.2 / of->a);
    shape->count = 0;
    for (int m = 1; m <= CORRECTIONS && m * of->c / of->a < 45.0; m++) {
        const double mk = m / of->a, decay = mk * exp(-mk * of->c);
        shape->term[0][shape->count] = m % 2 ? decay : -decay;
        shape->term[1][shape->count++] = mk * mk;
    }
    series->count = POWERS;
    for (int i = 0; i < POWERS; i++) { /* M_n+2 / (n+1)!, n = 2i */
        const double n = 2.0 * i;
        const double plain = (n + 2.0) * moment(of, 2 * i + 2);
        const double bent = (n + 4.0) * (n + 3.0) * (n + 2.0) * moment(of, 2 * i + 4);
        series->term[0][i] = (i % 2 ? -1.0 : 1.0) * (plain + bend * bent) / norm;
    }
}

static double near_zero(const bh_shape *series, double q)
{
    double sum = 0.0;
    for (int i = series->count - 1; i >= 0; i--)
        sum = sum * q * q + series->term[0][i];
    return sum;
}

/* -I' + w/c^2 I''' of the part with the hyperbolic sine: u = 1/sinh(Aq), v = coth(Aq). */
static double wave(const bh_shape *shape, double q)
{
    const double c = shape->number[HALF], big = BH_PI * shape->number[SKIN];
    const double decay = exp(-big * q), gap = 1.0 - decay * decay;
    const double u = 2.0 * decay / gap, v = (1.0 + decay * decay) / gap;
    const double sine = sin(q * c), cosine = cos(q * c), aa = big * big;
    const double first = -big * u * v;
    const double slope = big * (c * cosine * u + sine * first);
    if (shape->number[BEND] == 0.0)
        return -slope;
    const double second = aa * u * (v * v + u * u);
    const double third = -aa * big * u * v * (v * v + 5.0 * u * u);
    const double bent = -c * c * c * cosine * u - 3.0 * c * c * sine * first +
                        3.0 * c * cosine * second + sine * third;
    return -slope + shape->number[BEND] * big * bent;
}

static double corrections(const bh_shape *shape, double q)
{
    const double q2 = q * q;
    double sum = 0.0;
    for (int i = 0; i < shape->count; i++) {
        const double mk2 = shape->term[1][i], g = 1.0 / (mk2 + q2), g2 = g * g;
        sum +=
            shape->term[0][i] * 2.0 * q * g2 * (1.0 + shape->number[BEND] * 12.0 * (mk2 - q2) * g2);
    }
    return sum;
}

static void evaluate(const bh_structure *structure, double q2, double value[BH_FACTORS_MOST])
{
    const bh_shape *shape = &structure->shape[0];
    const double q = sqrt(q2) / BH_HBARC;
    value[0] = q < shape->number[SMALL]
                   ? near_zero(&structure->shape[1], q)
                   : (wave(shape, q) + corrections(shape, q)) * shape->number[FRONT] / q;
}

static bh_code prepare(bh_structure *structure, const fermi *of, bh_error *err)
{
    structure->evaluate = evaluate;
    make(structure, of);
    if (!(structure->shape[0].number[FRONT] > 0.0))
        return bh_fail(err, BH_ENOCONV, "the moments of the Fermi shape did not converge");
    return BH_OK;
}

/* A skin of 2.3 fm from 90 % to 10 % (a = 0.523 fm), as most nuclei have (common practice); in
 * proportion for those with a radius below 2.3 fm. */
static bh_code fitted(bh_structure *structure, bh_error *err)
{
    bool measured;
    const double radius = bh_density_radius(structure->z, structure->a, &measured);
    const double skin = 0.523 * fmin(1.0, radius / 2.3);
    const int sets = bh_density_sets(BH_SHAPE_FERMI_2P, structure->z, structure->a);
    bh_density_describe(structure, NULL);
    bh_structure_remark(structure,
                        sets ? "no published density agrees with it" : "no published density");
    structure->flagged = true;
    structure->highest = fmin(structure->highest, 0.09);
    return prepare(structure, &(fermi){half_radius(radius, skin), skin, 0.0}, err);
}

bh_code bh_prepare_fermi_2p(bh_structure *structure, int set, bh_error *err)
{
    const bh_density *density = bh_density_find(BH_SHAPE_FERMI_2P, structure->z, structure->a, set);
    if (!density)
        return fitted(structure, err);
    bh_density_describe(structure, density);
    return prepare(structure, &(fermi){density->value[0], density->value[1], 0.0}, err);
}

bh_code bh_prepare_fermi_3p(bh_structure *structure, int set, bh_error *err)
{
    const bh_density *density = bh_density_find(BH_SHAPE_FERMI_3P, structure->z, structure->a, set);
    const double *value = density->value;
    bh_density_describe(structure, density);
    return prepare(structure, &(fermi){value[0], value[1], value[2]}, err);
}
