/* test_vacuum_polarisation.c - the loops: against their integral, their limits, where pieces join.
 */
#include "../suite.h"

#include <math.h>

#include "beamhours/physics/dilog.h"
#include "beamhours/physics/vacuum_polarisation.h"
#include "beamhours/units/constants.h"

static const double masses[] = {BH_MASS_ELECTRON, BH_MASS_MUON, BH_MASS_TAU};

/* (4 alpha / pi) int_0^1 x (1 - x) ln(1 + x (1 - x) q2/m^2) dx, by panels that shrink to x = 0. */
static double integral(double mass, double q2)
{
    const double y = q2 / (mass * mass);
    double sum = 0.0;
    for (double top = 0.5; top > 1e-12; top *= 0.25)
        for (int i = 0; i < 16; i++) {
            const double node = i < 8 ? bh_gauss16_node[i] : -bh_gauss16_node[i - 8];
            const double x = top * (0.625 + 0.375 * node), weight = x * (1.0 - x);
            sum += 2.0 * 0.375 * top * bh_gauss16_weight[i % 8] * weight * log1p(weight * y);
        }
    return 4.0 * BH_ALPHA / BH_PI * sum;
}

START_TEST(leptons_against_the_integral)
{
    for (int k = 0; k < COUNT(masses); k++)
        for (double y = 1e-9; y < 1e9; y *= 1.7) {
            const double q2 = y * masses[k] * masses[k];
            const double got = bh_vacuum_lepton(masses[k], q2), want = integral(masses[k], q2);
            ck_assert_msg(fabs(got / want - 1.0) < 2e-11, "q2/m2 = %g: %.15g, not %.15g", y, got,
                          want);
        }
}
END_TEST

START_TEST(limits)
{
    const double m = BH_MASS_MUON, m2 = m * m;
    ck_assert_double_eq(bh_vacuum(0.0), 0.0);
    ck_assert_double_eq_tol(bh_vacuum_lepton(m, 1e-6 * m2) / (2.0 * BH_ALPHA / (15.0 * BH_PI)),
                            1e-6, 1e-12); /* Uehling 1935 */
    const double l = log(1e8);
    ck_assert_double_eq_tol(bh_vacuum_lepton(m, 1e8 * m2),
                            2.0 * BH_ALPHA / (3.0 * BH_PI) * (l - 5.0 / 3.0), 1e-9);
    ck_assert(isnan(bh_vacuum((double)NAN)));
}
END_TEST

START_TEST(series_joins_the_closed_form)
{
    const double m = BH_MASS_ELECTRON, q2 = 0.1 * m * m;
    const double below = bh_vacuum_lepton(m, q2 * (1.0 - 1e-13));
    const double above = bh_vacuum_lepton(m, q2 * (1.0 + 1e-13));
    ck_assert_msg(fabs(above / below - 1.0) < 2e-11, "%.15g and %.15g", below, above);
}
END_TEST

START_TEST(hadrons_join_and_grow)
{
    static const double edge[] = {0.7, 2.0, 4.0, 10.0, 91.2}; /* [GeV] */
    for (int i = 0; i < COUNT(edge); i++) {
        const double q2 = 1e6 * edge[i] * edge[i];
        const double below = bh_vacuum_hadrons(q2 * (1.0 - 1e-12));
        const double above = bh_vacuum_hadrons(q2 * (1.0 + 1e-12));
        ck_assert_msg(fabs(above / below - 1.0) < 2e-3, "at %g GeV: %g and %g", edge[i], below,
                      above);
    }
    ck_assert_double_eq_tol(0.5 * bh_vacuum_hadrons(91.2 * 91.2 * 1e6), 0.0276, 2e-4);
    double last = -1.0;
    for (double q2 = 1.0; q2 < 1e9; q2 *= 1.5) {
        ck_assert_double_gt(bh_vacuum(q2), last);
        last = bh_vacuum(q2);
    }
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("vacuum");
    tcase_add_test(tests, leptons_against_the_integral);
    tcase_add_test(tests, limits);
    tcase_add_test(tests, series_joins_the_closed_form);
    tcase_add_test(tests, hadrons_join_and_grow);
    return run_suite("vacuum_polarisation", tests);
}
