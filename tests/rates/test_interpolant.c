/* test_interpolant.c - polynomials in place of a cross section: how close, how many calls. */
#include "beamhours/rates/interpolant.h"

#include <math.h>
#include <string.h>

#include "../suite.h"
#include "beamhours/units/constants.h"

#define D BH_DEGREE

typedef double angular(double theta);

static void call(void *context, size_t n, const double *theta, double *value)
{
    angular *const *f = context;
    for (size_t i = 0; i < n; i++)
        value[i] = (*f)(theta[i]);
}

static double rutherford(double theta)
{
    return pow(sin(theta / 2), -4);
}

static double fall(double theta)
{
    return rutherford(theta) * exp(-40 * sin(theta / 2) * sin(theta / 2));
}

static double zeros(double theta)
{
    const double x = sin(16 * sin(theta / 2));
    return x * x;
}

static double flat(double theta)
{
    (void)theta;
    return 3;
}

static double root(double theta)
{
    return 1 / sqrt(1.0 - theta);
}

static double rough(double theta)
{
    return 2 + sin(1e9 * theta);
}

static double negative(double theta)
{
    return theta - 0.5;
}

static bh_interpolant *in;

static void open_it(void)
{
    in = bh_interpolant_new();
    ck_assert_ptr_nonnull(in);
}

static void close_it(void)
{
    bh_interpolant_free(in);
    bh_interpolant_free(NULL);
}

static bh_code fit(angular *f, double from, double to, double limit)
{
    const bh_interpolant_request request = {
        .function = call, .context = &f, .polar = {from, to}, .limit = limit, .tolerance = 1e-8};
    bh_error err;
    return bh_interpolant_fit(in, &request, &err);
}

static double at(double theta)
{
    double value;
    const double s = sin(theta / 2);
    const double versine = 2 * s * s;
    bh_interpolant_eval(in, 1, &versine, &value);
    return value;
}

static const struct {
    const char *what;
    angular *f;
    double from, to, limit; /* [deg] */
    double scale;           /* [1] error relative to this; 0: to the value itself */
    size_t calls;           /* at most */
} cases[] = {
    {"narrow", fall, 23, 27, 0, 0, 9},
    {"wide", fall, 5, 175, 0, 0, 60},
    {"point charge", rutherford, 0.01, 180, 0, 0, 9},
    {"zeros", zeros, 10, 170, 0, 1, 600},
    {"with the axis", flat, 0, 20, 0, 0, 9},
    {"root at the limit", root, 20, 70, 180 / BH_PI, 0, 90},
    {"below the limit", root, 20, 40, 180 / BH_PI, 0, 17},
};

START_TEST(close_to_the_function)
{
    const double limit = cases[_i].limit * D;
    const double from = cases[_i].from * D;
    const double to = limit > 0 ? fmin(cases[_i].to * D, limit * (1 - 1e-7)) : cases[_i].to * D;
    ck_assert_int_eq(fit(cases[_i].f, from, cases[_i].to * D, limit), BH_OK);
    ck_assert_msg(bh_interpolant_calls(in) <= cases[_i].calls, "%s: %zu calls", cases[_i].what,
                  bh_interpolant_calls(in));
    for (int i = 0; i <= 1000; i++) {
        const double theta = from + (to - from) * i / 1000;
        const double exact = cases[_i].f(theta);
        const double scale = cases[_i].scale > 0 ? cases[_i].scale : exact;
        /* ten times the tolerance: the tail is an estimate */
        ck_assert_msg(fabs(at(theta) - exact) < 1e-7 * scale, "%s at %g deg: %.10g not %.10g",
                      cases[_i].what, theta / D, at(theta), exact);
    }
    ck_assert(bh_interpolant_error(in, (bh_interval){from, to}) <= 1e-8);
    ck_assert(bh_interpolant_covers(in, (bh_interval){from, to}));
    ck_assert(!bh_interpolant_covers(in, (bh_interval){from - 0.01, to}));
}
END_TEST

START_TEST(many_at_once_as_one_by_one)
{
    enum { N = 29 };
    double versine[N];
    double value[N];
    ck_assert_int_eq(fit(zeros, 10 * D, 170 * D, 0), BH_OK);
    for (int i = 0; i < N; i++) /* to and fro over the pieces */
        versine[i] = 0.1 + 1.7 * fmod(i * 0.37, 1);
    bh_interpolant_eval(in, N, versine, value);
    for (int i = 0; i < N; i++) {
        double alone;
        bh_interpolant_eval(in, 1, &versine[i], &alone);
        ck_assert(value[i] == alone);
    }
}
END_TEST

START_TEST(beyond_the_limit_is_nothing)
{
    ck_assert_int_eq(fit(root, 0.2, 2, 1), BH_OK);
    ck_assert(at(1.0) == 0 && at(1.2) == 0 && at(0.9) > 3);
    ck_assert(bh_interpolant_covers(in, (bh_interval){0.5, 3}));
    ck_assert(bh_interpolant_covers(in, (bh_interval){1.5, 3}));
    ck_assert_int_eq(fit(root, 1.2, 2, 1), BH_OK);
    ck_assert_uint_eq(bh_interpolant_calls(in), 0);
    ck_assert(at(1.5) == 0);
}
END_TEST

START_TEST(unresolved_says_so)
{
    ck_assert_int_eq(fit(rough, 0.4, 0.6, 0), BH_OK);
    ck_assert(bh_interpolant_error(in, (bh_interval){0.4, 0.6}) > 1e-3);
    ck_assert(bh_interpolant_error(in, (bh_interval){0.5, 0.5}) > 1e-3);
    ck_assert(bh_interpolant_calls(in) < 40000);
}
END_TEST

static double bent(double theta)
{
    return rutherford(theta) * (theta < 0.5 ? 1 : 1 + 3 * (theta - 0.5));
}

/* A kink costs hundreds of values, unless it is told; told in vain, it costs little. */
START_TEST(kinks_that_are_told)
{
    static const double kinks[] = {0.2, 0.5, 0.55};
    angular *f = bent;
    bh_interpolant_request request = {
        .function = call, .context = &f, .polar = {0.4, 0.6}, .tolerance = 1e-8};
    ck_assert(!bh_interpolant_fit(in, &request, NULL));
    ck_assert_uint_gt(bh_interpolant_calls(in), 200);
    request.kinks = kinks;
    request.kink_count = COUNT(kinks);
    ck_assert(!bh_interpolant_fit(in, &request, NULL));
    ck_assert_uint_le(bh_interpolant_calls(in), 3 * 17);
    for (int i = 0; i <= 500; i++) {
        const double theta = 0.4 + 0.2 * i / 500;
        ck_assert_double_eq_tol(at(theta) / bent(theta), 1, 1e-8);
    }
}
END_TEST

START_TEST(refused)
{
    const bh_interpolant_request bad = {.function = call,
                                        .context = &(angular *){negative},
                                        .polar = {0.4, 0.6},
                                        .tolerance = 1e-8};
    bh_error err;
    ck_assert_int_eq(bh_interpolant_fit(in, &bad, &err), BH_EDOMAIN);
    ck_assert_msg(strstr(err.text, " deg is not"), "%s", err.text);
    ck_assert(!bh_interpolant_covers(in, (bh_interval){0.4, 0.6}));
    ck_assert_int_eq(fit(rutherford, 0, 0.6, 0), BH_EDOMAIN);
    ck_assert_int_eq(fit(root, 0.4, 1.2, 0), BH_EDOMAIN);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("interpolant");
    tcase_add_checked_fixture(tests, open_it, close_it);
    tcase_add_loop_test(tests, close_to_the_function, 0, COUNT(cases));
    tcase_add_test(tests, many_at_once_as_one_by_one);
    tcase_add_test(tests, beyond_the_limit_is_nothing);
    tcase_add_test(tests, unresolved_says_so);
    tcase_add_test(tests, kinks_that_are_told);
    tcase_add_test(tests, refused);
    return run_suite("interpolant", tests);
}
