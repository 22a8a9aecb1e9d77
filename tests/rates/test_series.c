/* test_series.c - sums through moments are the sums over the points themselves. */
#include "beamhours/rates/series.h"

#include <math.h>

#include "../suite.h"
#include "beamhours/rates/average.h"
#include "beamhours/units/constants.h"

#define D BH_DEGREE

typedef double angular(double theta);

static double rutherford(double theta)
{
    return pow(sin(theta / 2), -4);
}

static double fall(double theta)
{
    return rutherford(theta) * exp(-60 * sin(theta / 2) * sin(theta / 2));
}

static double bent(double theta)
{
    return rutherford(theta) * (theta < 30 * D ? 1 : 1 + 3 * (theta - 30 * D));
}

static double dip(double theta)
{
    const double x = theta - 30.2 * D;
    return x * x;
}

static double nothing(double theta)
{
    return 0 * theta;
}

static void call(void *context, size_t n, const double *theta, double *value)
{
    angular *const *f = context;
    for (size_t i = 0; i < n; i++)
        value[i] = (*f)(theta[i]);
}

static void read_interpolant(void *context, size_t n, const double *versine, double *value)
{
    bh_interpolant_eval(context, n, versine, value);
}

static const struct {
    const char *what;
    angular *f;
    double limit; /* [deg] */
    int series;   /* how many of the two pieces are one */
} cases[] = {{"point charge", rutherford, 0, 2},
             {"form factor", fall, 0, 2},
             {"a kink", bent, 0, 2},
             {"a zero in one piece", dip, 0, 1},
             {"nothing at all", nothing, 0, 0},
             {"a largest angle", fall, 40, 0}};

/* Of a bin that lies within a piece, with the tolerances of sums. */
START_TEST(as_point_by_point)
{
    static const double kink[] = {30 * D};
    angular *f = cases[_i].f;
    bh_interpolant *in = bh_interpolant_new();
    bh_series series[BH_SERIES_MOST];
    bh_acceptance a;
    const bh_acceptance_spec spec = {.angle = 30 * D,
                                     .in_plane_from = -0.03,
                                     .in_plane_to = 0.03,
                                     .out_of_plane_from = -0.07,
                                     .out_of_plane_to = 0.07,
                                     .bins = 20};
    ck_assert(in && !bh_acceptance_make(&spec, &a, NULL));
    const bh_interpolant_request request = {.function = call,
                                            .context = &f,
                                            .polar = a.whole.polar,
                                            .limit = cases[_i].limit * D,
                                            .tolerance = 1e-8,
                                            .kink_count = 1,
                                            .kinks = kink};
    ck_assert(!bh_interpolant_fit(in, &request, NULL));
    const int count = bh_series_of(in, series);
    ck_assert_msg(count == cases[_i].series, "%s: %d", cases[_i].what, count);
    for (int s = 0; s < count; s++)
        for (int bin = 1; bin <= 20; bin++) {
            bh_acceptance_part part;
            bh_quadrature_rule rule;
            bh_moments moments = {.count = 0};
            bh_acceptance_part_of(&a, bin, &part);
            const double low = 1 - cos(part.polar.from), high = 1 - cos(part.polar.to);
            if (!(low >= series[s].from && high <= series[s].to))
                continue;
            bh_quadrature_prepare(&part, &rule);
            bh_moments_of(&rule, &series[s], &moments);
            const bh_integrand integrand = {
                .function = read_interpolant, .context = in, .tolerance = 5e-7};
            const bh_quadrature by = bh_series_sum(&series[s], &moments, &part, &integrand);
            const bh_quadrature direct = bh_quadrature_prepared(&part, &rule, &integrand);
            ck_assert(by.converged && direct.converged);
            ck_assert_msg(fabs(by.sum / direct.sum - 1) < 1e-9, "%s, bin %d: %.12g %.12g",
                          cases[_i].what, bin, by.sum, direct.sum);
        }
    bh_interpolant_free(in);
}
END_TEST

/* More terms are computed when a series asks for them, and others when its range is another one. */
START_TEST(moments_follow_the_series)
{
    bh_acceptance a;
    bh_quadrature_rule rule;
    bh_moments few = {.count = 0}, many = {.count = 0};
    const bh_acceptance_spec spec = {.angle = 1,
                                     .in_plane_from = -0.03,
                                     .in_plane_to = 0.03,
                                     .out_of_plane_from = -0.07,
                                     .out_of_plane_to = 0.07};
    ck_assert(!bh_acceptance_make(&spec, &a, NULL));
    bh_quadrature_prepare(&a.whole, &rule);
    const double low = 1 - cos(a.whole.polar.from), high = 1 - cos(a.whole.polar.to);
    bh_series s = {.middle = (low + high) / 2, .slope = 2 / (high - low), .count = 2};
    bh_moments_of(&rule, &s, &few);
    s.count = BH_SERIES_TERMS;
    bh_moments_of(&rule, &s, &many);
    ck_assert_int_ge(many.count, BH_SERIES_TERMS);
    bh_moments_of(&rule, &s, &few);
    for (int k = 0; k < BH_SERIES_TERMS; k++)
        ck_assert(fabs(few.fine[k] - many.fine[k]) <= 0 &&
                  fabs(few.coarse[k] - many.coarse[k]) <= 0);
    s.middle += 1e-3;
    bh_moments_of(&rule, &s, &few);
    ck_assert(fabs(few.fine[0] - many.fine[0]) <= 0); /* T_0 is 1 */
    ck_assert(fabs(few.fine[1] - many.fine[1]) > 0);
    s.axis = true; /* T_0 alone: the solid angle */
    bh_moments_of(&rule, &s, &few);
    ck_assert_double_eq_tol(few.fine[0] / a.whole.solid_angle, 1, 1e-12);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("series");
    tcase_add_loop_test(tests, as_point_by_point, 0, COUNT(cases));
    tcase_add_test(tests, moments_follow_the_series);
    return run_suite("series", tests);
}
