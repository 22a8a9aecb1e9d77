/* test_log_spline.c - curves through tables, and the rule of sixteen points. */
#include "passing.h"

#include "beamhours/matter/gauss.h"
#include "beamhours/matter/log_spline.h"

START_TEST(powers_are_exact)
{
    bh_log_spline s = {.count = 0};
    for (double x = 0.001; x < 100.0; x *= 2.7)
        bh_log_spline_add(&s, x, 5.0 * pow(x, -0.8));
    bh_log_spline_close(&s);
    for (double x = 1e-5; x < 1e4; x *= 1.3) /* beyond the ends as well */
        NEAR(bh_log_spline_at(&s, x), 5.0 * pow(x, -0.8), 1e-12, "at %g", x);
}
END_TEST

/* y = x^(ln x) is a parabola in logarithms: cubic but for the ends, where its curvature is not 0.
 */
START_TEST(passes_through_and_is_smooth)
{
    bh_log_spline s = {.count = 0};
    for (int i = -10; i <= 10; i++) {
        const double x = exp(0.3 * i);
        bh_log_spline_add(&s, x, pow(x, log(x)));
    }
    bh_log_spline_close(&s);
    for (int i = -10; i <= 10; i++) {
        const double x = exp(0.3 * i);
        NEAR(bh_log_spline_at(&s, x), pow(x, log(x)), 1e-11, "at knot %d", i);
        const double h = 1e-5;
        const double left = log(bh_log_spline_at(&s, x) / bh_log_spline_at(&s, x * (1 - h)));
        const double right = log(bh_log_spline_at(&s, x * (1 + h)) / bh_log_spline_at(&s, x));
        ck_assert_msg(fabs(left - right) < 1e-8, "slope at knot %d: %g, %g", i, left, right);
    }
    for (double x = 0.3; x < 3.0; x *= 1.05)
        NEAR(bh_log_spline_at(&s, x), pow(x, log(x)), 1e-3, "at %g", x);
}
END_TEST

START_TEST(few_and_many_knots)
{
    bh_log_spline s = {.count = 0};
    ck_assert_double_eq(bh_log_spline_at(&s, 3.0), 1.0);
    bh_log_spline_add(&s, 1.0, 4.0);
    bh_log_spline_close(&s);
    NEAR(bh_log_spline_at(&s, 3.0), 4.0, 1e-14, "a constant");
    bh_log_spline_add(&s, 2.0, 8.0);
    bh_log_spline_close(&s);
    NEAR(bh_log_spline_at(&s, 3.0), 12.0, 1e-12, "a line");
    for (int i = 3; i < 200; i++)
        bh_log_spline_add(&s, i, 4.0 * i);
    ck_assert_uint_eq(s.count, BH_LOG_SPLINE_KNOTS);
}
END_TEST

static double power(const void *context, double x)
{
    return pow(x, *(const int *)context);
}

START_TEST(sixteen_points)
{
    for (int n = 0; n <= 31; n++)
        NEAR(bh_gauss(power, &n, (bh_gauss_limits){0.0, 2.0}), pow(2.0, n + 1) / (n + 1), 1e-13,
             "x^%d", n);
}
END_TEST

int main(void)
{
    TCase *t = tcase_create("log spline");
    tcase_add_test(t, powers_are_exact);
    tcase_add_test(t, passes_through_and_is_smooth);
    tcase_add_test(t, few_and_many_knots);
    tcase_add_test(t, sixteen_points);
    return run_suite("log spline", t);
}
