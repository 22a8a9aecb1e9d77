/* test_coincidence.c - joint acceptances against directions drawn one by one. */
#include "beamhours/rates/coincidence.h"

#include <math.h>
#include <stdbool.h>
#include <string.h>

#include "../counter_random.h"
#include "../suite.h"
#include "beamhours/units/constants.h"

#define D BH_DEGREE

/* Where an arm stands, as its shape; left: towards +x when y is up and the beam goes along z. */
struct arm {
    bh_acceptance_spec spec;
    bool left;
};

#define RECTANGLE(at, in, out)                                                     \
    {                                                                              \
        .shape = BH_ACCEPTANCE_RECTANGLE, .angle = (at)*D, .in_plane_from = -(in), \
        .in_plane_to = (in), .out_of_plane_from = -(out), .out_of_plane_to = (out) \
    }
#define RING(from, to, az)                                                                       \
    {                                                                                            \
        .shape = BH_ACCEPTANCE_RING, .ring_from = (from)*D, .ring_to = (to)*D, .azimuth = (az)*D \
    }

static const struct {
    const char *what;
    bh_collision in;
    bh_detected first; /* what the first arm detects */
    struct arm one, two;
    bool none; /* nothing is shared */
} pairs[] = {
    {"two rectangles, the second larger",
     {BH_MASS_ELECTRON, BH_MASS_PROTON, 855},
     BH_DETECTED_SCATTERED,
     {RECTANGLE(40, 0.028, 0.07), false},
     {RECTANGLE(50.27, 0.2, 0.3), true},
     false},
    {"two rectangles, the second smaller",
     {BH_MASS_ELECTRON, BH_MASS_PROTON, 855},
     BH_DETECTED_SCATTERED,
     {RECTANGLE(40, 0.1, 0.12), false},
     {RECTANGLE(54, 0.03, 0.05), true},
     false},
    {"corners that cross",
     {BH_MASS_ELECTRON, BH_MASS_PROTON, 1508},
     BH_DETECTED_SCATTERED,
     {RECTANGLE(30, 0.1, 0.12), false},
     {RECTANGLE(52, 0.1, 0.16), true},
     false},
    {"a shape that is not level",
     {BH_MASS_ELECTRON, BH_MASS_PROTON, 855},
     BH_DETECTED_SCATTERED,
     {{.shape = BH_ACCEPTANCE_RECTANGLE,
       .angle = 40 * D,
       .in_plane_from = -0.05,
       .in_plane_to = 0.08,
       .out_of_plane_from = 0.01,
       .out_of_plane_to = 0.12},
      false},
     {{.shape = BH_ACCEPTANCE_RECTANGLE,
       .angle = 48 * D,
       .in_plane_from = -0.09,
       .in_plane_to = 0.08,
       .out_of_plane_from = -0.10,
       .out_of_plane_to = 0.03},
      true},
     false},
    {"the recoil first, a ring for the electron",
     {BH_MASS_ELECTRON, BH_MASS_PROTON, 855},
     BH_DETECTED_RECOIL,
     {RECTANGLE(50, 0.06, 0.07), true},
     {RING(38, 43, 360), false},
     false},
    {"rings of part of a turn",
     {BH_MASS_MUON, BH_MASS_PROTON, 200},
     BH_DETECTED_SCATTERED,
     {RING(25, 60, 100), false},
     {RING(40, 70, 60), true},
     false},
    {"arms that overlap across the beam",
     {BH_MASS_PROTON, BH_MASS_PROTON, 200},
     BH_DETECTED_SCATTERED,
     {RECTANGLE(40, 1.2, 0.4), false},
     {RECTANGLE(45, 1.3, 0.5), false},
     false},
    {"alphas on protons, slow ones",
     {BH_MASS_ALPHA, BH_MASS_PROTON, 40},
     BH_DETECTED_SLOW,
     {RECTANGLE(12, 0.04, 0.05), false},
     {RECTANGLE(25, 0.3, 0.3), true},
     false},
    {"protons first, alphas of either speed",
     {BH_MASS_ALPHA, BH_MASS_PROTON, 40},
     BH_DETECTED_RECOIL,
     {RECTANGLE(25, 0.3, 0.3), false},
     {RECTANGLE(12, 0.04, 0.05), true},
     false},
    {"both on one side",
     {BH_MASS_ELECTRON, BH_MASS_PROTON, 855},
     BH_DETECTED_SCATTERED,
     {RECTANGLE(40, 0.028, 0.07), false},
     {RECTANGLE(50.27, 0.2, 0.3), false},
     true},
    {"at another angle",
     {BH_MASS_ELECTRON, BH_MASS_PROTON, 855},
     BH_DETECTED_SCATTERED,
     {RECTANGLE(40, 0.028, 0.07), false},
     {RECTANGLE(65, 0.05, 0.3), true},
     true},
};

/* Whether a direction is in a shape, from its vector. */
static bool within(const struct arm *arm, const double v[3])
{
    const bh_acceptance_spec *s = &arm->spec;
    const double side = arm->left ? v[0] : -v[0];
    if (s->shape == BH_ACCEPTANCE_RING) {
        const double polar = acos(v[2]);
        return polar >= s->ring_from && polar <= s->ring_to &&
               fabs(atan2(v[1], side)) <= s->azimuth / 2;
    }
    const double in = atan2(side, v[2]) - s->angle, out = asin(v[1]);
    return in >= s->in_plane_from && in <= s->in_plane_to && out >= s->out_of_plane_from &&
           out <= s->out_of_plane_to;
}

static void direction(double polar, double azimuth, double v[3])
{
    v[0] = sin(polar) * cos(azimuth);
    v[1] = sin(polar) * sin(azimuth);
    v[2] = cos(polar);
}

struct tested {
    const bh_collision *in;
    bh_detected first;
};

/* A cross section that is smooth, and kept above some angle only in part. */
static void smooth(void *context, size_t n, const double *theta, bh_pair_value *value)
{
    const struct tested *t = context;
    for (size_t i = 0; i < n; i++) {
        const double total = exp(-3 * theta[i]);
        value[i] = (bh_pair_value){.total = total,
                                   .kept = total * theta[i],
                                   .partner = bh_pair_partner(t->in, t->first, theta[i])};
    }
}

static bh_pair_sum joint(int i, double tolerance)
{
    struct tested tested = {&pairs[i].in, pairs[i].first};
    bh_acceptance one, two;
    ck_assert_int_eq(bh_acceptance_make(&pairs[i].one.spec, &one, NULL), BH_OK);
    ck_assert_int_eq(bh_acceptance_make(&pairs[i].two.spec, &two, NULL), BH_OK);
    double breaks[BH_PAIR_BREAKS];
    const double largest = bh_kinematics_largest_angle(&pairs[i].in);
    const bh_pair_request request = {
        .shape = {&one.whole, &two.whole, pairs[i].one.left != pairs[i].two.left},
        .function = smooth,
        .context = &tested,
        .limit = pairs[i].first == BH_DETECTED_RECOIL ? 0 : largest,
        .break_count = bh_pair_breaks(&pairs[i].in, pairs[i].first, &two.whole, breaks),
        .breaks = breaks,
        .tolerance = tolerance};
    bh_pair_sum sum;
    bh_error err;
    ck_assert_msg(bh_pair_add_up(&request, &sum, &err) == BH_OK, "%s", err.text);
    ck_assert_msg(sum.converged, "%s", pairs[i].what);
    return sum;
}

START_TEST(as_directions_drawn)
{
    enum { EVENTS = 300000 };
    static const uint64_t seeds[] = {7, 77, 777};
    const int k = _i / COUNT(seeds);
    const uint64_t seed = seeds[_i % COUNT(seeds)];
    const bh_pair_sum sum = joint(k, 0);
    if (pairs[k].none) {
        ck_assert(sum.solid_angle == 0 && sum.total == 0 && sum.kept == 0);
        return;
    }
    bh_acceptance one;
    ck_assert_int_eq(bh_acceptance_make(&pairs[k].one.spec, &one, NULL), BH_OK);
    const bh_interval polar = one.whole.polar;
    const double span = cos(polar.from) - cos(polar.to);
    double got[3] = {0}, squares[3] = {0};
    for (uint64_t n = 0; n < EVENTS; n++) {
        double u[2], v[3], w[3];
        even_pair(seed, n, 0, u);
        const double theta = acos(cos(polar.to) + u[0] * span), azimuth = 2 * BH_PI * u[1];
        const double partner = bh_pair_partner(&pairs[k].in, pairs[k].first, theta);
        if (isnan(partner))
            continue;
        direction(theta, azimuth, v);
        direction(partner, azimuth + BH_PI, w);
        if (!within(&pairs[k].one, v) || !within(&pairs[k].two, w))
            continue;
        const double values[] = {1, exp(-3 * theta), theta * exp(-3 * theta)};
        for (int s = 0; s < 3; s++) {
            got[s] += values[s];
            squares[s] += values[s] * values[s];
        }
    }
    const double all = 2 * BH_PI * span / EVENTS,
                 expected[] = {sum.solid_angle, sum.total, sum.kept};
    for (int s = 0; s < 3; s++) {
        const double sigma = all * sqrt(squares[s] - got[s] * got[s] / EVENTS);
        ck_assert_msg(fabs(all * got[s] - expected[s]) < 3.9 * sigma,
                      "%s, sum %d: %.6g, drawn %.6g +- %.2g", pairs[k].what, s, expected[s],
                      all * got[s], sigma);
        ck_assert_msg(got[0] > 50, "%s: only %g events", pairs[k].what, got[0]);
    }
}
END_TEST

/* Halving steps further changes nothing. */
START_TEST(sums_have_settled)
{
    const bh_pair_sum usual = joint(_i, 0), fine = joint(_i, 1e-10);
    ck_assert_double_le(fabs(usual.total - fine.total), 1e-6 * fine.total);
    ck_assert_double_le(fabs(usual.kept - fine.kept), 1e-6 * fine.kept);
    ck_assert_double_le(fabs(usual.solid_angle - fine.solid_angle), 1e-6 * fine.solid_angle);
}
END_TEST

/* Twice the solid angle of either arm is twice the sum. */
START_TEST(both_scales_count)
{
    struct tested tested = {&pairs[0].in, pairs[0].first};
    double sums[3];
    for (int k = 0; k < 3; k++) {
        bh_acceptance one, two;
        ck_assert_int_eq(bh_acceptance_make(&pairs[0].one.spec, &one, NULL), BH_OK);
        ck_assert_int_eq(bh_acceptance_make(&pairs[0].two.spec, &two, NULL), BH_OK);
        one.whole.scale *= k == 1 ? 2 : 1;
        two.whole.scale *= k == 2 ? 2 : 1;
        const bh_pair_request request = {
            .shape = {&one.whole, &two.whole, pairs[0].one.left != pairs[0].two.left},
            .function = smooth,
            .context = &tested};
        bh_pair_sum sum;
        bh_error err;
        ck_assert_msg(bh_pair_add_up(&request, &sum, &err) == BH_OK, "%s", err.text);
        sums[k] = sum.total;
    }
    ck_assert(sums[0] > 0);
    ck_assert_double_eq_tol(sums[1] / sums[0], 2, 1e-12);
    ck_assert_double_eq_tol(sums[2] / sums[0], 2, 1e-12);
}
END_TEST

/* With everything around it open, the first arm is alone. */
START_TEST(an_open_second_arm)
{
    bh_acceptance one, all;
    const bh_acceptance_spec open = RING(0, 180, 360);
    ck_assert_int_eq(bh_acceptance_make(&pairs[_i].one.spec, &one, NULL), BH_OK);
    ck_assert_int_eq(bh_acceptance_make(&open, &all, NULL), BH_OK);
    const bh_pair_shape shape = {&one.whole, &all.whole, true};
    const bh_interval polar = one.whole.polar;
    for (int k = 1; k < 20; k++) {
        const double theta = polar.from + (polar.to - polar.from) * k / 20;
        ck_assert_double_eq_tol(bh_pair_azimuth(&shape, theta, 1),
                                bh_acceptance_azimuth(&one.whole, theta), 1e-9);
    }
    ck_assert(bh_pair_azimuth(&shape, polar.from - 0.01, 1) == 0);
    ck_assert(bh_pair_azimuth(&shape, (polar.from + polar.to) / 2, (double)NAN) == 0);
}
END_TEST

START_TEST(there_and_back)
{
    const bh_collision in = {BH_MASS_ELECTRON, BH_MASS_PROTON, 855};
    for (double theta = 5 * D; theta < 175 * D; theta += 10 * D) {
        const double partner = bh_pair_partner(&in, BH_DETECTED_SCATTERED, theta);
        ck_assert_double_eq_tol(bh_pair_partner(&in, BH_DETECTED_RECOIL, partner), theta, 1e-9);
    }
    ck_assert(isnan(bh_pair_partner(&in, BH_DETECTED_RECOIL, 2)));
}
END_TEST

static void broken(void *context, size_t n, const double *theta, bh_pair_value *value)
{
    smooth(context, n, theta, value);
    value[n / 2].total = (double)NAN;
}

START_TEST(odd_ones_are_refused)
{
    struct tested tested = {&pairs[0].in, pairs[0].first};
    const bh_acceptance_spec point = {
        .shape = BH_ACCEPTANCE_POINT, .angle = 40 * D, .solid_angle = 1e-3};
    bh_acceptance one, two, none;
    ck_assert_int_eq(bh_acceptance_make(&pairs[0].one.spec, &one, NULL), BH_OK);
    ck_assert_int_eq(bh_acceptance_make(&pairs[0].two.spec, &two, NULL), BH_OK);
    ck_assert_int_eq(bh_acceptance_make(&point, &none, NULL), BH_OK);
    bh_pair_request request = {
        .shape = {&none.whole, &two.whole, true}, .function = smooth, .context = &tested};
    bh_pair_sum sum;
    bh_error err = {.code = BH_OK};
    ck_assert_int_eq(bh_pair_add_up(&request, &sum, &err), BH_EDOMAIN);
    ck_assert_ptr_nonnull(strstr(err.text, "without extents"));
    request.shape.first = &one.whole;
    request.function = broken;
    ck_assert_int_eq(bh_pair_add_up(&request, &sum, &err), BH_EDOMAIN);
    ck_assert_ptr_nonnull(strstr(err.text, "not finite"));
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("coincidence");
    tcase_set_timeout(tests, 60);
    tcase_add_loop_test(tests, as_directions_drawn, 0, 3 * COUNT(pairs));
    tcase_add_loop_test(tests, sums_have_settled, 0, COUNT(pairs));
    tcase_add_loop_test(tests, an_open_second_arm, 0, COUNT(pairs));
    tcase_add_test(tests, there_and_back);
    tcase_add_test(tests, odd_ones_are_refused);
    tcase_add_test(tests, both_scales_count);
    return run_suite("coincidence", tests);
}
