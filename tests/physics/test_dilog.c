/* test_dilog.c - the dilogarithm against its special values, identities and GSL's; the Gauss rule.
 */
#include "../suite.h"

#include <gsl/gsl_sf_dilog.h>
#include <math.h>

#include "beamhours/physics/dilog.h"
#include "beamhours/units/constants.h"

#define ABRAMOWITZ "Abramowitz & Stegun 1964, section 27.7"
#define LEWIN      "Lewin, Polylogarithms and Associated Functions, 1981"
#define GOLDEN     1.6180339887498948482

static void same(double got, double want, double tolerance, const char *source)
{
    ck_assert_msg(fabs(got - want) <= tolerance * fmax(1.0, fabs(want)), "%.17g, not %.17g (%s)",
                  got, want, source);
}

START_TEST(special_values)
{
    const double pi2 = BH_PI * BH_PI, l2 = log(2.0), lg = log(GOLDEN);
    const struct {
        double x, want;
        const char *source;
    } row[] = {
        {0.0, 0.0, "definition"},
        {1.0, pi2 / 6.0, ABRAMOWITZ},
        {-1.0, -pi2 / 12.0, ABRAMOWITZ},
        {0.5, pi2 / 12.0 - 0.5 * l2 * l2, ABRAMOWITZ},
        {2.0, pi2 / 4.0, LEWIN},
        {1.0 / GOLDEN, pi2 / 10.0 - lg * lg, LEWIN},
        {-GOLDEN, -pi2 / 10.0 - lg * lg, LEWIN},
        {1.0 / GOLDEN / GOLDEN, pi2 / 15.0 - lg * lg, LEWIN},
        {-1.0 / GOLDEN, -pi2 / 15.0 + 0.5 * lg * lg, LEWIN},
    };
    for (int i = 0; i < COUNT(row); i++)
        same(bh_dilog(row[i].x), row[i].want, 1e-15, row[i].source);
    ck_assert(isnan(bh_dilog((double)NAN)));
}
END_TEST

START_TEST(against_another_implementation)
{
    for (int i = -4000; i <= 4000; i++) {
        const double x = sinh(0.004 * i); /* -4e6 .. 4e6 */
        gsl_sf_result want;
        ck_assert_int_eq(gsl_sf_dilog_e(x, &want), 0);
        same(bh_dilog(x), want.val, 2e-15, "gsl_sf_dilog");
    }
}
END_TEST

START_TEST(reflection)
{
    for (int i = 1; i < 200; i++) {
        const double x = 0.005 * i;
        same(bh_dilog(x) + bh_dilog(1.0 - x) + log(x) * log1p(-x), BH_PI * BH_PI / 6.0, 1e-15,
             "Euler");
        same(bh_dilog(x) + bh_dilog(-x), 0.5 * bh_dilog(x * x), 1e-15, "duplication");
    }
}
END_TEST

START_TEST(rule_of_degree_31)
{
    for (int power = 0; power <= 32; power += 2) {
        double sum = 0.0;
        for (int i = 0; i < 8; i++)
            sum += 2.0 * bh_gauss16_weight[i] * pow(bh_gauss16_node[i], power);
        const double error = fabs(sum * (power + 1) / 2.0 - 1.0);
        ck_assert_msg(power == 32 ? error > 1e-10 : error < 1e-14, "x^%d: %g", power, error);
    }
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("dilog");
    tcase_add_test(tests, special_values);
    tcase_add_test(tests, against_another_implementation);
    tcase_add_test(tests, reflection);
    tcase_add_test(tests, rule_of_degree_31);
    return run_suite("dilog", tests);
}
