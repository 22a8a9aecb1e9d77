/* test_quadrature.c - both ways of summing over directions, against each other and closed forms. */
#include "beamhours/rates/quadrature.h"

#include <math.h>

#include "../suite.h"
#include "beamhours/units/constants.h"

#define D BH_DEGREE

static bh_acceptance_part rectangle(double angle, double in, double out_from, double out_to)
{
    const bh_acceptance_spec spec = {.shape = BH_ACCEPTANCE_RECTANGLE,
                                     .angle = angle * D,
                                     .in_plane_from = -in * D,
                                     .in_plane_to = in * D,
                                     .out_of_plane_from = out_from * D,
                                     .out_of_plane_to = out_to * D};
    bh_acceptance a;
    ck_assert_int_eq(bh_acceptance_make(&spec, &a, NULL), BH_OK);
    return a.whole;
}

static void one(void *context, size_t n, const double *versine, double *value)
{
    (void)context;
    (void)versine;
    ck_assert_uint_le(n, BH_QUADRATURE_BATCH);
    for (size_t i = 0; i < n; i++)
        value[i] = 1;
}

static void cosine(void *context, size_t n, const double *versine, double *value)
{
    (void)context;
    for (size_t i = 0; i < n; i++)
        value[i] = 1 - versine[i];
}

static void steep(void *context, size_t n, const double *versine, double *value)
{
    (void)context;
    for (size_t i = 0; i < n; i++)
        value[i] = 1 / (versine[i] * versine[i]);
}

static void broken(void *context, size_t n, const double *versine, double *value)
{
    (void)context;
    (void)versine;
    for (size_t i = 0; i < n; i++)
        value[i] = (double)NAN;
}

/* Differs from call to call: no rule ever agrees with another. */
static void restless(void *context, size_t n, const double *versine, double *value)
{
    unsigned *state = context;
    (void)versine;
    for (size_t i = 0; i < n; i++) {
        *state = *state * 1664525U + 1013904223U;
        value[i] = *state / 4294967296.0;
    }
}

static const struct {
    double angle, in, out_from, out_to;
} shapes[] = {{25, 1.6, -4, 4},   {25, 1.6, -3, 4}, {70, 30, -40, 40}, {90, 5, 10, 20},
              {150, 25, -80, 80}, {6, 3, -20, 20},  {90, 90, -90, 90}, {175, 10, -10, 8}};

START_TEST(solid_angle_both_ways)
{
    const bh_integrand f = {one, NULL, 1e-8, 0};
    const bh_acceptance_part part =
        rectangle(shapes[_i].angle, shapes[_i].in, shapes[_i].out_from, shapes[_i].out_to);
    const bh_quadrature d = bh_quadrature_directions(&part, &f);
    const bh_quadrature p = bh_quadrature_polar(&part, (bh_interval){0, 4}, &f);
    ck_assert(d.converged && p.converged);
    ck_assert_double_eq_tol(d.sum / part.solid_angle, 1, 1e-9);
    ck_assert_double_eq_tol(p.sum / part.solid_angle, 1, 1e-9);
}
END_TEST

START_TEST(mean_direction_in_closed_form)
{
    /* cos theta over the shape: (sin b - sin a) in the plane, (psi/2 + sin(2 psi)/4) out of it */
    const bh_integrand f = {cosine, NULL, 1e-8, 0};
    const bh_acceptance_part part =
        rectangle(shapes[_i].angle, shapes[_i].in, shapes[_i].out_from, shapes[_i].out_to);
    const double top = part.out_to / 2 + sin(2 * part.out_to) / 4;
    const double bottom = part.out_from / 2 + sin(2 * part.out_from) / 4;
    const double exact = (sin(part.in_to) - sin(part.in_from)) * (top - bottom);
    const double tolerance = 1e-8 * part.solid_angle;
    ck_assert_double_eq_tol(bh_quadrature_directions(&part, &f).sum, exact, tolerance);
    ck_assert_double_eq_tol(bh_quadrature_polar(&part, part.polar, &f).sum, exact, tolerance);
}
END_TEST

START_TEST(steep_functions_are_refined)
{
    /* around and near the beam the two ways share nothing but the function */
    const bh_integrand f = {steep, NULL, 1e-8, 0};
    const int s = _i == 6 ? 5 : _i; /* the whole half sphere touches the axis: infinite */
    const bh_acceptance_part part =
        rectangle(shapes[s].angle, shapes[s].in, shapes[s].out_from, shapes[s].out_to);
    const bh_quadrature d = bh_quadrature_directions(&part, &f);
    const bh_quadrature p = bh_quadrature_polar(&part, part.polar, &f);
    ck_assert(d.converged && p.converged);
    ck_assert_msg(fabs(d.sum / p.sum - 1) < 2e-8, "%d: %.12g %.12g", s, d.sum, p.sum);
    ck_assert(d.error < 1e-7 * d.sum && p.error < 1e-7 * p.sum);
}
END_TEST

static void gentle(void *context, size_t n, const double *versine, double *value)
{
    (void)context;
    for (size_t i = 0; i < n; i++)
        value[i] = exp(-0.7 * versine[i]);
}

/* Each rule taken alone, nothing refined: a node or a weight that is off could hide behind
 * refinement.  5 x 4 points over 10 degrees: 1e-9. */
START_TEST(the_first_estimate_is_good)
{
    static const double edges[][2] = {{-5, 5}, {-4, 5}};
    const bh_integrand first = {gentle, NULL, 1, 0}, settled = {gentle, NULL, 1e-13, 0};
    for (int i = 0; i < COUNT(edges); i++) {
        const bh_acceptance_part part = rectangle(60, 5, edges[i][0], edges[i][1]);
        const double wanted = bh_quadrature_directions(&part, &settled).sum;
        const bh_quadrature d = bh_quadrature_directions(&part, &first);
        ck_assert_double_eq_tol(d.sum / wanted, 1, 1e-9);
        ck_assert(d.error < 1e-6 * d.sum);
        const bh_quadrature p = bh_quadrature_polar(&part, part.polar, &first);
        ck_assert_double_eq_tol(p.sum / wanted, 1, 1e-7);
        ck_assert(p.error < 1e-4 * p.sum);
    }
}
END_TEST

START_TEST(parts_of_a_range_add)
{
    const bh_integrand f = {steep, NULL, 1e-9, 0};
    const bh_acceptance_part part = rectangle(25, 1.6, -4, 3);
    const double whole = bh_quadrature_polar(&part, (bh_interval){0, 4}, &f).sum;
    double sum = 0;
    for (int i = 0; i < 50; i++)
        sum +=
            bh_quadrature_polar(&part, (bh_interval){(20 + 0.2 * i) * D, (20.2 + 0.2 * i) * D}, &f)
                .sum;
    ck_assert_double_eq_tol(sum / whole, 1, 1e-9);
    ck_assert(bh_quadrature_polar(&part, (bh_interval){1, 2}, &f).sum == 0);
    ck_assert(bh_quadrature_polar(&part, (bh_interval){0.5, 0.4}, &f).sum == 0);
}
END_TEST

START_TEST(hopeless_functions_end)
{
    const bh_acceptance_part part = rectangle(25, 1.6, -4, 4);
    unsigned state = 1;
    const bh_integrand noise = {restless, &state, 1e-9, 0};
    const bh_quadrature q = bh_quadrature_directions(&part, &noise);
    ck_assert(!q.converged && q.error > 0);
    ck_assert(!bh_quadrature_polar(&part, part.polar, &noise).converged);
    const bh_integrand nan = {broken, NULL, 1e-6, 0};
    const bh_quadrature b = bh_quadrature_directions(&part, &nan);
    ck_assert(isnan(b.sum) && !b.converged);
}
END_TEST

START_TEST(empty_parts_are_nothing)
{
    const bh_acceptance_part none = {.scale = 1};
    const bh_integrand f = {one, NULL, 1e-6, 0};
    ck_assert(bh_quadrature_directions(&none, &f).sum == 0);
    ck_assert(bh_quadrature_polar(&none, (bh_interval){0, 4}, &f).sum == 0);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("quadrature");
    tcase_add_loop_test(tests, solid_angle_both_ways, 0, COUNT(shapes));
    tcase_add_loop_test(tests, mean_direction_in_closed_form, 0, COUNT(shapes));
    tcase_add_loop_test(tests, steep_functions_are_refined, 0, COUNT(shapes));
    tcase_add_test(tests, the_first_estimate_is_good);
    tcase_add_test(tests, parts_of_a_range_add);
    tcase_add_test(tests, hopeless_functions_end);
    tcase_add_test(tests, empty_parts_are_nothing);
    return run_suite("quadrature", tests);
}
