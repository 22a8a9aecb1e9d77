/* test_acceptance.c - weights against brute force over both angles, solid angles, odd shapes. */
#include "beamhours/rates/acceptance.h"

#include <gsl/gsl_integration.h>
#include <math.h>

#include "../suite.h"
#include "beamhours/units/constants.h"

#define D BH_DEGREE

/* arm, in-plane from and to, out-of-plane from and to, all in degrees */
static const struct {
    const char *what;
    double angle, in_from, in_to, out_from, out_to;
} shapes[] = {
    {"narrow, forward", 25, -1.6, 1.6, -4, 4},
    {"lopsided", 30, -1, 3, -2, 5},
    {"above the plane only", 40, -5, 5, 2, 9},
    {"below the plane only", 40, -5, 5, -9, -2},
    {"taller than wide", 20, -1, 1, -18, 18},
    {"at 90 degrees", 90, -3, 3, -4, 4},
    {"from 80 to 100 degrees, tall", 90, -10, 10, -60, 60},
    {"just below 90", 85, -5, 5, -5, 5},
    {"just above 90", 95, -5, 5, -5, 5},
    {"backward", 140, -6, 9, -12, 12},
    {"near 180", 174, -4, 4, -4, 4},
    {"across 180", 178, -4, 4, -3, 5},
    {"across the beam", 2, -4, 4, -3, 5},
    {"touching the beam", 4, -4, 4, -3, 3},
    {"whole right half", 90, -90, 90, -90, 90},
    {"all directions", 90, -180, 180, -90, 90},
    {"all around, a belt", 90, -180, 180, -20, 30},
    {"wide on both sides", 60, -100, 150, -35, 50},
    {"left of the beam", 10, -80, -20, -10, 10},
    {"tiny", 33, -0.001, 0.001, -0.002, 0.002},
};

static bh_acceptance_spec rectangle(int i)
{
    return (bh_acceptance_spec){.shape = BH_ACCEPTANCE_RECTANGLE,
                                .angle = shapes[i].angle * D,
                                .in_plane_from = shapes[i].in_from * D,
                                .in_plane_to = shapes[i].in_to * D,
                                .out_of_plane_from = shapes[i].out_from * D,
                                .out_of_plane_to = shapes[i].out_to * D};
}

static bh_acceptance made(const bh_acceptance_spec *spec)
{
    bh_acceptance out;
    bh_error err;
    ck_assert_msg(bh_acceptance_make(spec, &out, &err) == BH_OK, "%s", err.text);
    return out;
}

/* A smooth function of the polar angle for comparisons. */
static double shape_function(double cosine)
{
    return exp(1.5 * cosine) + 0.3 * cosine;
}

/* Brute force: an even grid of n x n midpoints, with Richardson extrapolation. */
static double grid(const bh_acceptance_part *part, int n)
{
    const double in_step = (part->in_to - part->in_from) / n;
    const double out_step = (part->out_to - part->out_from) / n;
    double sum = 0;
    for (int i = 0; i < n; i++)
        for (int j = 0; j < n; j++) {
            const double in = part->in_from + (i + 0.5) * in_step;
            const double out = part->out_from + (j + 0.5) * out_step;
            sum += shape_function(cos(out) * cos(in)) * cos(out);
        }
    return sum * in_step * out_step;
}

static double weighted(double theta, void *part)
{
    return shape_function(cos(theta)) * bh_acceptance_weight(part, theta);
}

static double bare(double theta, void *part)
{
    return bh_acceptance_weight(part, theta);
}

/* Between kinks, by GSL's adaptive rule for singular ends. */
static double over_weight(double (*f)(double, void *), bh_acceptance_part *part)
{
    gsl_integration_workspace *space = gsl_integration_workspace_alloc(200);
    double kinks[BH_KINKS];
    const int n = bh_acceptance_kinks(part, kinks);
    gsl_function function = {f, part};
    double sum = 0;
    for (int i = 0; i + 1 < n; i++) {
        double piece;
        double error;
        if (kinks[i + 1] - kinks[i] < 1e-13)
            continue;
        gsl_integration_qags(&function, kinks[i], kinks[i + 1], 1e-15, 1e-10, 200, space, &piece,
                             &error);
        sum += piece;
    }
    gsl_integration_workspace_free(space);
    return sum;
}

START_TEST(weight_is_the_solid_angle)
{
    const bh_acceptance_spec spec = rectangle(_i);
    bh_acceptance a = made(&spec);
    const double exact = (shapes[_i].in_to - shapes[_i].in_from) * D *
                         (sin(shapes[_i].out_to * D) - sin(shapes[_i].out_from * D));
    ck_assert_msg(fabs(a.whole.solid_angle / exact - 1) < 1e-9, "%s: %g", shapes[_i].what,
                  a.whole.solid_angle);
    ck_assert_msg(fabs(over_weight(bare, &a.whole) / exact - 1) < 1e-8, "%s: %.12g not %.12g",
                  shapes[_i].what, over_weight(bare, &a.whole), exact);
}
END_TEST

START_TEST(weight_is_brute_force)
{
    const bh_acceptance_spec spec = rectangle(_i);
    bh_acceptance a = made(&spec);
    const double coarse = grid(&a.whole, 200);
    const double fine = grid(&a.whole, 400);
    const double exact = fine + (fine - coarse) / 3;
    const double ours = over_weight(weighted, &a.whole);
    ck_assert_msg(fabs(ours / exact - 1) < 1e-7, "%s: %.12g, brute force %.12g", shapes[_i].what,
                  ours, exact);
}
END_TEST

/* Whether a direction lies inside, by the definition of the two angles alone. */
static int inside(const bh_acceptance_part *part, double theta, double alpha)
{
    const double out = asin(sin(theta) * sin(alpha));
    double in = atan2(sin(theta) * cos(alpha), cos(theta));
    if (out < part->out_from || out > part->out_to)
        return 0;
    for (double turn = -2; turn <= 2; turn++)
        if (in + 2 * BH_PI * turn >= part->in_from && in + 2 * BH_PI * turn <= part->in_to)
            return 1;
    return 0;
}

START_TEST(azimuth_counts_directions)
{
    enum { STEPS = 20000, ANGLES = 23 };
    const bh_acceptance_spec spec = rectangle(_i);
    const bh_acceptance a = made(&spec);
    const bh_interval polar = a.whole.polar;
    for (int k = 0; k <= ANGLES; k++) {
        const double theta = polar.from + (polar.to - polar.from) * (k + 0.37) / (ANGLES + 1);
        int count = 0;
        for (int i = 0; i < STEPS; i++)
            count += inside(&a.whole, theta, 2 * BH_PI * (i + 0.5) / STEPS);
        const double counted = 2 * BH_PI * count / STEPS;
        /* each of at most 8 arc ends is off by at most one step */
        ck_assert_msg(fabs(bh_acceptance_azimuth(&a.whole, theta) - counted) <
                          8 * 2 * BH_PI / STEPS,
                      "%s at %g deg: %g, counted %g", shapes[_i].what, theta / D,
                      bh_acceptance_azimuth(&a.whole, theta), counted);
    }
    ck_assert(bh_acceptance_azimuth(&a.whole, polar.to + 1e-9) < 1e-12 || polar.to > 3.14159);
    ck_assert(polar.from == 0 || bh_acceptance_azimuth(&a.whole, polar.from * (1 - 1e-9)) == 0);
}
END_TEST

START_TEST(kinks_rise_from_end_to_end)
{
    const bh_acceptance_spec spec = rectangle(_i);
    const bh_acceptance a = made(&spec);
    double kinks[BH_KINKS];
    const int n = bh_acceptance_kinks(&a.whole, kinks);
    ck_assert(n >= 2);
    ck_assert(kinks[0] == a.whole.polar.from && kinks[n - 1] == a.whole.polar.to);
    for (int i = 1; i < n; i++)
        ck_assert(kinks[i] > kinks[i - 1]);
    ck_assert_int_eq(bh_acceptance_meets_beam(&a.whole), inside(&a.whole, 1e-9, 0.1) ||
                                                             inside(&a.whole, 1e-9, 3.0) ||
                                                             shapes[_i].angle == 4);
}
END_TEST

START_TEST(bins_add_to_the_whole)
{
    bh_acceptance_spec spec = rectangle(_i);
    spec.bins = 7;
    spec.solid_angle = _i % 2 ? 0.0123 : 0;
    const bh_acceptance a = made(&spec);
    double sum = 0;
    double mean = 0;
    for (int bin = 1; bin <= a.bins; bin++) {
        bh_acceptance_part part;
        bh_acceptance_part_of(&a, bin, &part);
        sum += part.solid_angle;
        mean += part.solid_angle * bh_acceptance_mean_angle(&part);
        ck_assert(part.polar.from >= a.whole.polar.from && part.polar.to <= a.whole.polar.to);
    }
    ck_assert_msg(fabs(sum / a.whole.solid_angle - 1) < 1e-12, "%s", shapes[_i].what);
    ck_assert_msg(fabs(mean / sum / bh_acceptance_mean_angle(&a.whole) - 1) < 2e-6, "%s: %.9g %.9g",
                  shapes[_i].what, mean / sum, bh_acceptance_mean_angle(&a.whole));
    if (spec.solid_angle > 0)
        ck_assert_double_eq_tol(a.whole.solid_angle, 0.0123, 1e-15);
}
END_TEST

static double angle_weight(double theta, void *part)
{
    return theta * bh_acceptance_weight(part, theta);
}

START_TEST(mean_angle_is_that_of_the_weight)
{
    const bh_acceptance_spec spec = rectangle(_i);
    bh_acceptance a = made(&spec);
    const double exact = over_weight(angle_weight, &a.whole) / over_weight(bare, &a.whole);
    ck_assert_msg(fabs(bh_acceptance_mean_angle(&a.whole) / exact - 1) < 1e-6, "%s: %.9g %.9g",
                  shapes[_i].what, bh_acceptance_mean_angle(&a.whole), exact);
}
END_TEST

START_TEST(ring_in_closed_form)
{
    const double edges[] = {25 * D, 30 * D, 40 * D, 300 * D};
    bh_acceptance_spec spec = {.shape = BH_ACCEPTANCE_RING,
                               .ring_from = 20 * D,
                               .ring_to = 100 * D,
                               .azimuth = 90 * D,
                               .bins = 3,
                               .edges = edges};
    const bh_acceptance a = made(&spec);
    ck_assert_double_eq_tol(a.whole.solid_angle, 90 * D * (cos(20 * D) - cos(100 * D)), 1e-14);
    bh_acceptance_part part;
    bh_acceptance_part_of(&a, 2, &part);
    ck_assert_double_eq_tol(part.solid_angle, 90 * D * (cos(30 * D) - cos(40 * D)), 1e-15);
    const double f = 30 * D;
    const double t = 40 * D;
    const double mean = (sin(t) - t * cos(t) - sin(f) + f * cos(f)) / (cos(f) - cos(t));
    ck_assert_double_eq_tol(bh_acceptance_mean_angle(&part), mean, 1e-9);
    ck_assert_double_eq_tol(bh_acceptance_weight(&part, 35 * D), 90 * D * sin(35 * D), 1e-15);
    ck_assert(bh_acceptance_weight(&part, 29 * D) == 0 && bh_acceptance_weight(&part, 41 * D) == 0);
    double kinks[BH_KINKS];
    ck_assert_int_eq(bh_acceptance_kinks(&part, kinks), 2);
    bh_acceptance_part_of(&a, 3, &part); /* cut off at the ring's own end */
    ck_assert_double_eq_tol(part.solid_angle, 90 * D * (cos(40 * D) - cos(100 * D)), 1e-14);
    ck_assert(bh_acceptance_edge(&a, 3) == edges[3] && bh_acceptance_edge(&a, 0) == edges[0]);
    spec.azimuth = 2 * BH_PI;
    spec.solid_angle = 12; /* just below 4 pi */
    ck_assert_double_eq_tol(made(&spec).whole.solid_angle, 12, 1e-14);
    spec.solid_angle = 13;
    ck_assert_int_eq(bh_acceptance_make(&spec, &(bh_acceptance){0}, NULL), BH_EDOMAIN);
    spec.solid_angle = 0;
    spec.azimuth = 0;
    ck_assert_double_eq_tol(made(&spec).whole.solid_angle, 2 * BH_PI * (cos(20 * D) - cos(100 * D)),
                            1e-14);
}
END_TEST

START_TEST(edges_of_a_rectangle)
{
    const double edges[] = {20 * D, 24 * D, 26 * D, 40 * D, 50 * D};
    bh_acceptance_spec spec = rectangle(0);
    spec.in_plane_from = -3 * D;
    spec.in_plane_to = 3 * D;
    spec.bins = 4;
    spec.edges = edges;
    const bh_acceptance a = made(&spec);
    const double height = 2 * sin(4 * D);
    const double widths[] = {2 * D, 2 * D, 2 * D, 0};
    for (int i = 0; i < 4; i++) {
        bh_acceptance_part part;
        bh_acceptance_part_of(&a, i + 1, &part);
        ck_assert_double_eq_tol(part.solid_angle, widths[i] * height, 1e-15);
        ck_assert_int_eq(bh_acceptance_mean_angle(&part) > 0, 1);
    }
    const double mean = bh_acceptance_mean_angle(&a.whole);
    ck_assert(mean > 25 * D && mean < 25.3 * D);
    spec.edges = NULL;
    const bh_acceptance even = made(&spec);
    ck_assert_double_eq_tol(bh_acceptance_edge(&even, 1), 23.5 * D, 1e-14);
    ck_assert(bh_acceptance_edge(&even, 4) == even.whole.in_to);
}
END_TEST

START_TEST(a_point_is_one)
{
    const bh_acceptance_spec spec = {
        .shape = BH_ACCEPTANCE_POINT, .angle = 30 * D, .solid_angle = 0.006, .bins = 4};
    const bh_acceptance a = made(&spec);
    ck_assert_int_eq(a.bins, 1);
    bh_acceptance_part part;
    bh_acceptance_part_of(&a, 1, &part);
    ck_assert(part.solid_angle == 0.006 && part.polar.from == 30 * D && part.polar.to == 30 * D);
    ck_assert(bh_acceptance_mean_angle(&part) == 30 * D);
    ck_assert(bh_acceptance_edge(&a, 1) == 30 * D);
    ck_assert(bh_acceptance_azimuth(&part, 30 * D) == 0);
    double kinks[BH_KINKS];
    ck_assert_int_eq(bh_acceptance_kinks(&part, kinks), 0);
    ck_assert(!bh_acceptance_meets_beam(&part));
}
END_TEST

/* One member of a good shape made wrong at a time. */
static void spoil(bh_acceptance_spec *s, int how)
{
    static const double falling[] = {0.5, 0.4};
    switch (how) {
    case 0:
        s->angle = (double)NAN;
        break;
    case 1:
        s->angle = -0.1;
        break;
    case 2:
        s->angle = 3.2;
        break;
    case 3:
        s->in_plane_to = s->in_plane_from;
        break;
    case 4:
        s->in_plane_from = -3.2; /* more than a turn */
        s->in_plane_to = 3.2;
        break;
    case 5:
        s->in_plane_from = -8;
        s->in_plane_to = -7;
        break;
    case 6:
        s->out_of_plane_to = 2;
        break;
    case 7:
        s->out_of_plane_from = (double)NAN;
        break;
    case 8:
        s->solid_angle = -1;
        break;
    case 9:
        s->bins = -1;
        break;
    case 10:
        s->edges = falling;
        s->bins = 1;
        break;
    case 11:
        *s = (bh_acceptance_spec){.shape = BH_ACCEPTANCE_POINT, .angle = 1};
        break;
    case 12:
        *s = (bh_acceptance_spec){.shape = BH_ACCEPTANCE_RING, .ring_from = 1, .ring_to = 1};
        break;
    case 13:
        *s = (bh_acceptance_spec){.shape = BH_ACCEPTANCE_RING, .ring_to = (double)NAN};
        break;
    case 14:
        *s = (bh_acceptance_spec){.shape = BH_ACCEPTANCE_RING, .ring_to = 1, .azimuth = 7};
        break;
    case 15:
        s->in_plane_from = 6;
        s->in_plane_to = 7;
        break;
    default:
        s->in_plane_from = (double)NAN;
        break;
    }
}

START_TEST(odd_shapes_are_refused)
{
    bh_acceptance_spec spec = rectangle(0);
    bh_acceptance out = {.bins = 77};
    bh_error err;
    ck_assert_int_eq(bh_acceptance_make(&spec, &out, &err), BH_OK);
    out.bins = 77;
    spoil(&spec, _i);
    ck_assert_msg(bh_acceptance_make(&spec, &out, &err) == BH_EDOMAIN, "case %d", _i);
    ck_assert_int_eq(out.bins, 77);
    ck_assert(err.text[0] != '\0');
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("acceptance");
    tcase_set_timeout(tests, 60);
    tcase_add_loop_test(tests, weight_is_the_solid_angle, 0, COUNT(shapes));
    tcase_add_loop_test(tests, weight_is_brute_force, 0, COUNT(shapes));
    tcase_add_loop_test(tests, azimuth_counts_directions, 0, COUNT(shapes));
    tcase_add_loop_test(tests, kinks_rise_from_end_to_end, 0, COUNT(shapes));
    tcase_add_loop_test(tests, bins_add_to_the_whole, 0, COUNT(shapes));
    tcase_add_loop_test(tests, mean_angle_is_that_of_the_weight, 0, COUNT(shapes));
    tcase_add_test(tests, ring_in_closed_form);
    tcase_add_test(tests, edges_of_a_rectangle);
    tcase_add_test(tests, a_point_is_one);
    tcase_add_loop_test(tests, odd_shapes_are_refused, 0, 17);
    return run_suite("acceptance", tests);
}
