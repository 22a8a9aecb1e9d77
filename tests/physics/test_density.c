/* test_density.c - every published density: norm, radius, and its form factor against a quadrature.
 */
#include "../suite.h"

#include <math.h>
#include <stdio.h>

#include <gsl/gsl_errno.h>
#include <gsl/gsl_integration.h>

#include "beamhours/physics/form_factor.h"
#include "beamhours/units/constants.h"
#include "beamhours/units/nuclide.h"

static const char *const shape_name[] = {
    [BH_SHAPE_FERMI_2P] = "fermi-2p",
    [BH_SHAPE_FERMI_3P] = "fermi-3p",
    [BH_SHAPE_GAUSS_3P] = "gauss-3p",
    [BH_SHAPE_OSCILLATOR] = "oscillator",
    [BH_SHAPE_FOURIER_BESSEL] = "fourier-bessel",
    [BH_SHAPE_GAUSSIANS] = "sum-of-gaussians",
};

static double bessel_0(double x)
{
    return x > 1e-4 ? sin(x) / x : 1.0 - x * x / 6.0;
}

/* --- the densities themselves, written as their papers define them, not normalised --- */

static double fermi(const double *v, double w, double r)
{
    return (1.0 + w * r * r / (v[0] * v[0])) / (1.0 + exp((r - v[0]) / v[1]));
}

static double gauss(const double *v, double r)
{
    return (1.0 + v[2] * r * r / (v[0] * v[0])) /
           (1.0 + exp((r * r - v[0] * v[0]) / (v[1] * v[1])));
}

static double oscillator(const double *v, double r)
{
    const double x = r * r / (v[0] * v[0]);
    return (1.0 + v[1] * x) * exp(-x);
}

static double fourier_bessel(const double *v, int count, double r)
{
    double sum = 0.0;
    for (int n = 1; n < count && r < v[0]; n++)
        sum += v[n] * bessel_0(n * BH_PI * r / v[0]);
    return sum;
}

/* Sick 1974: A_i = Q_i / (2 pi^(3/2) gamma^3 (1 + 2 R^2/gamma^2)) */
static double gaussians(const double *v, int count, double r)
{
    const int terms = (count - 1) / 2;
    const double gamma = v[0] * sqrt(2.0 / 3.0);
    double sum = 0.0;
    for (int i = 0; i < terms; i++) {
        const double at = v[1 + i], below = (r - at) / gamma, above = (r + at) / gamma;
        sum += v[1 + terms + i] / (1.0 + 2.0 * at * at / (gamma * gamma)) *
               (exp(-below * below) + exp(-above * above));
    }
    return sum;
}

static double density_at(const bh_density *of, double r)
{
    switch (of->kind) {
    case BH_SHAPE_FERMI_2P:
        return fermi(of->value, 0.0, r);
    case BH_SHAPE_FERMI_3P:
        return fermi(of->value, of->value[2], r);
    case BH_SHAPE_GAUSS_3P:
        return gauss(of->value, r);
    case BH_SHAPE_OSCILLATOR:
        return oscillator(of->value, r);
    case BH_SHAPE_FOURIER_BESSEL:
        return fourier_bessel(of->value, of->count, r);
    case BH_SHAPE_GAUSSIANS:
        return gaussians(of->value, of->count, r);
    }
    return 0.0;
}

static double edge(const bh_density *of)
{
    switch (of->kind) {
    case BH_SHAPE_FERMI_2P:
    case BH_SHAPE_FERMI_3P:
        return of->value[0] + 45.0 * of->value[1];
    case BH_SHAPE_GAUSS_3P:
        return sqrt(of->value[0] * of->value[0] + 45.0 * of->value[1] * of->value[1]);
    case BH_SHAPE_OSCILLATOR:
        return 7.0 * of->value[0];
    case BH_SHAPE_FOURIER_BESSEL:
        return of->value[0];
    case BH_SHAPE_GAUSSIANS:
        return 20.0;
    }
    return 0.0;
}

/* --- its Fourier transform by quadrature --- */

typedef struct {
    const bh_density *density;
    double q;
} transform;

static double integrand(double r, void *of)
{
    const transform *in = of;
    return r * r * density_at(in->density, r) * bessel_0(in->q * r);
}

static double integrate(const bh_density *density, double q)
{
    gsl_integration_workspace *work = gsl_integration_workspace_alloc(400);
    transform in = {density, q};
    gsl_function f = {integrand, &in};
    double result = 0.0, error = 0.0;
    (void)gsl_integration_qag(&f, 0.0, edge(density), 0.0, 1e-12, 400, GSL_INTEG_GAUSS61, work,
                              &result, &error);
    gsl_integration_workspace_free(work);
    return result;
}

static bh_structure *prepared(const bh_density *of)
{
    char name[40];
    bh_error err;
    int set = 1;
    while (bh_density_find(of->kind, of->z, of->a, set) != of)
        set++;
    (void)snprintf(name, sizeof name, "%s/%d", shape_name[of->kind], set);
    bh_structure *structure = bh_structure_new(name, of->z, of->a, &err);
    ck_assert_msg(structure != NULL, "%s: %s", name, err.text);
    return structure;
}

/* F at q [1/fm] */
static double factor(const bh_structure *structure, double q)
{
    const char *name;
    double value;
    const double p = q * BH_HBARC;
    ck_assert_int_eq(bh_structure_factors(structure, p * p, 1, &name, &value), 1);
    ck_assert_str_eq(name, "F");
    return value;
}

/* The radius column was computed from the same parameters with four decimals by other code. */
START_TEST(every_set_has_its_norm_and_radius)
{
    ck_assert_uint_eq(bh_density_table_size, 72);
    for (size_t i = 0; i < bh_density_table_size; i++) {
        const bh_density *of = &bh_density_table[i];
        bh_structure *structure = prepared(of);
        const double radius = bh_structure_radius(structure);
        ck_assert_double_eq_tol(factor(structure, 0.0), 1.0, 1e-15);
        ck_assert_msg(fabs(radius - of->rms) < 6e-5, "Z %d A %d %s: %.6f, wanted %.4f (%s)", of->z,
                      of->a, shape_name[of->kind], radius, of->rms, of->source);
        bh_structure_free(structure);
    }
}
END_TEST

/* Also just above and below the change of formula near q = 0, and far past the data. */
START_TEST(every_form_factor_is_the_transform_of_its_density)
{
    static const double q[] = {1e-6, 0.05, 0.37, 0.6, 0.65, 0.98, 1.7, 2.6, 3.9};
    for (size_t i = 0; i < bh_density_table_size; i++) {
        const bh_density *of = &bh_density_table[i];
        bh_structure *structure = prepared(of);
        const double norm = integrate(of, 0.0);
        for (int k = 0; k < COUNT(q); k++) {
            const double wanted = integrate(of, q[k]) / norm, got = factor(structure, q[k]);
            ck_assert_msg(fabs(got - wanted) < 3e-12,
                          "Z %d A %d %s at %g/fm: %.15g, wanted %.15g (%s)", of->z, of->a,
                          shape_name[of->kind], q[k], got, wanted, of->source);
        }
        bh_structure_free(structure);
    }
}
END_TEST

/* A term of the series is 0/0 at q = n pi / R. */
START_TEST(a_series_is_smooth_where_a_term_is_singular)
{
    bh_error err;
    bh_structure *lead = bh_structure_new("fourier-bessel", 82, 208, &err);
    for (int n = 1; n <= 19; n++) {
        const double q = n * BH_PI / 12.0, h = 1e-6;
        const double here = factor(lead, q);
        const double around = 0.5 * (factor(lead, q - h) + factor(lead, q + h));
        ck_assert_double_eq_tol(here, around, 1e-10);
    }
    bh_structure_free(lead);
}
END_TEST

/* Every nuclide known has some charge density, with the radius of Angeli & Marinova 2013 to 1 % or
 * twice its uncertainty, and exactly where it was fitted to it. */
START_TEST(every_nuclide_has_a_default_with_its_radius)
{
    bh_error err;
    for (size_t i = 0; i < bh_nuclide_table_size; i++) {
        const bh_nuclide *of = &bh_nuclide_table[i];
        if (of->a < 4)
            continue;
        bh_structure *structure = bh_structure_new(NULL, of->z, of->a, &err);
        ck_assert_msg(structure != NULL, "%s: %s", of->name, err.text);
        const double radius = bh_structure_radius(structure);
        if (of->radius > 0.0)
            ck_assert_msg(
                fabs(radius - of->radius) <= fmax(0.01 * of->radius, 2.0 * of->radius_sigma) + 1e-4,
                "%s %s: %g, wanted %g", of->name, bh_structure_name(structure), radius, of->radius);
        if (of->twice_spin > 0)
            ck_assert(bh_structure_flagged(structure));
        bh_structure_free(structure);
    }
}
END_TEST

START_TEST(spheres_and_fitted_shapes_have_the_measured_radius)
{
    static const struct {
        const char *name;
        int z, a;
        double radius; /* Angeli & Marinova 2013; the last from 1.2 A^(1/3) fm of a sphere */
    } rows[] = {
        {"uniform", 82, 208, 5.5012},    {"helm", 82, 208, 5.5012},
        {"fermi-2p/2", 79, 197, 5.4371}, {"fermi-2p/2", 73, 181, 5.3507},
        {"helm", 2, 4, 1.6755},          {"fermi-2p", 2, 4, 1.6755},
        {"uniform", 1, 2, 2.1421},       {"fermi-2p", 3, 6, 2.5890},
        {"helm", 118, 294, 6.1807},
    };
    bh_error err;
    for (int i = 0; i < COUNT(rows); i++) {
        bh_structure *structure = bh_structure_new(rows[i].name, rows[i].z, rows[i].a, &err);
        ck_assert_msg(structure != NULL, "%s: %s", rows[i].name, err.text);
        ck_assert_msg(fabs(bh_structure_radius(structure) - rows[i].radius) < 1e-4,
                      "%s of Z = %d: %g, wanted %g", rows[i].name, rows[i].z,
                      bh_structure_radius(structure), rows[i].radius);
        bh_structure_free(structure);
    }
}
END_TEST

/* A Fermi shape with the half-density radius that gives the measured rms radius, and a skin of 2.3
 * fm (a = 0.523 fm), thinner in proportion only where that radius is below 2.3 fm. */
START_TEST(fitted_shapes_have_the_common_skin)
{
    static const struct {
        int z, a;
        double radius, skin; /* fm */
    } rows[] = {{2, 4, 1.6755, 0.523 * 1.6755 / 2.3},
                {3, 6, 2.5890, 0.523},
                {73, 181, 5.3507, 0.523},
                {79, 197, 5.4371, 0.523}};
    for (int i = 0; i < COUNT(rows); i++) {
        bh_density shape = {.kind = BH_SHAPE_FERMI_2P};
        double value[3] = {0.0, rows[i].skin, 0.0}, low = 0.0, high = 8.0;
        shape.value = value;
        const double small = 0.01; /* 1/fm: F = 1 - (q r)^2 / 6 */
        for (int k = 0; k < 50; k++) {
            value[0] = 0.5 * (low + high);
            const double f = integrate(&shape, small) / integrate(&shape, 0.0);
            *(6.0 * (1.0 - f) / (small * small) < rows[i].radius * rows[i].radius ? &low : &high) =
                value[0];
        }
        char name[32];
        const int set = bh_density_sets(BH_SHAPE_FERMI_2P, rows[i].z, rows[i].a) + 1;
        (void)snprintf(name, sizeof name, "fermi-2p/%d", set);
        bh_error err;
        bh_structure *fitted = bh_structure_new(name, rows[i].z, rows[i].a, &err);
        ck_assert_msg(fitted != NULL, "%s", err.text);
        for (double q = 0.2; q < 1.3; q += 0.35) {
            const double wanted = integrate(&shape, q) / integrate(&shape, 0.0);
            ck_assert_msg(fabs(factor(fitted, q) - wanted) < 2e-4, "Z = %d at %g: %g, wanted %g",
                          rows[i].z, q, factor(fitted, q), wanted);
        }
        bh_structure_free(fitted);
    }
}
END_TEST

/* Closed form of a sphere and of Helm's surface, where the series gives way to it. */
START_TEST(spheres_follow_their_formulas)
{
    bh_error err;
    bh_structure *uniform = bh_structure_new("uniform", 82, 208, &err);
    bh_structure *helm = bh_structure_new("helm", 82, 208, &err);
    const double rms = 5.5012, s = 0.9;
    for (double q = 0.02; q < 2.0; q *= 1.17) {
        const double x = q * rms * sqrt(5.0 / 3.0);
        const double y = q * sqrt(5.0 / 3.0 * (rms * rms - 3.0 * s * s));
        ck_assert_double_eq_tol(factor(uniform, q), 3.0 * (sin(x) / x - cos(x)) / (x * x), 2e-13);
        ck_assert_double_eq_tol(factor(helm, q),
                                3.0 * (sin(y) / y - cos(y)) / (y * y) * exp(-0.5 * q * q * s * s),
                                2e-13);
    }
    bh_structure_free(uniform);
    bh_structure_free(helm);
}
END_TEST

int main(void)
{
    (void)gsl_set_error_handler_off();
    TCase *tests = tcase_create("density");
    tcase_add_test(tests, every_set_has_its_norm_and_radius);
    tcase_add_test(tests, every_form_factor_is_the_transform_of_its_density);
    tcase_add_test(tests, a_series_is_smooth_where_a_term_is_singular);
    tcase_add_test(tests, every_nuclide_has_a_default_with_its_radius);
    tcase_add_test(tests, spheres_and_fitted_shapes_have_the_measured_radius);
    tcase_add_test(tests, fitted_shapes_have_the_common_skin);
    tcase_add_test(tests, spheres_follow_their_formulas);
    return run_suite("physics/density", tests);
}
