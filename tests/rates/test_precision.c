/* test_precision.c - uncertainties, best shares, hours to a goal: references, Monte Carlo, laws. */
#include "beamhours/rates/precision.h"

#include <gsl/gsl_randist.h>
#include <gsl/gsl_rng.h>
#include <math.h>

#include "../suite.h"

static const bh_empty computed = {.measured = false};

static bh_empty with_share(double share, double advantage)
{
    return (bh_empty){true, share, advantage};
}

START_TEST(optimal_split)
{
    /* gross 1920 /min, background 120 /min, 15 min in all: 12 min + 3 min.  An examination problem;
     * rule t_gross / t_bkg = sqrt(R_gross / R_bkg), Knoll ch. 3 */
    const bh_recorded rates = {1800 / 60.0, 120 / 60.0, 0};
    const double share = bh_precision_best_share(&rates, 1);
    ck_assert_double_eq_tol(1 / share, 4, 1e-12);
    ck_assert_double_eq_tol(15 / (1 + share), 12, 1e-12);
}
END_TEST

START_TEST(time_to_precision)
{
    /* net 2 /s over a background of 0.5 /s, 1 %: (sqrt(S+B) + sqrt(B))^2 / (eps S)^2 = 13090.16994
     * s in all; 6250 s with the background known exactly.  Knoll ch. 3, figure of merit */
    const bh_recorded rates = {2, 0.5, 0};
    const double share = bh_precision_best_share(&rates, 1);
    const bh_empty best = with_share(share, 1);
    const double all = bh_precision_hours(&rates, &best, 0.01) * (1 + share) * 3600;
    ck_assert_double_eq_tol(all, 13090.16994, 1e-5);
    ck_assert_double_eq_tol(bh_precision_hours(&rates, &computed, 0.01) * 3600, 6250, 1e-9);
}
END_TEST

static gsl_rng *dice;

static void open_dice(void)
{
    dice = gsl_rng_alloc(gsl_rng_mt19937);
    gsl_rng_set(dice, 20240817);
}

static void close_dice(void)
{
    gsl_rng_free(dice);
}

static bh_recorded some_rates(void)
{
    bh_recorded rates;
    rates.signal = gsl_ran_flat(dice, 0.1, 50);
    rates.windows = gsl_ran_flat(dice, 0.01, 20);
    rates.other = gsl_ran_flat(dice, 0, 10);
    return rates;
}

START_TEST(spread_of_thrown_experiments)
{
    enum { RUNS = 20000 };
    const bh_recorded rates = {3, 1.2, 0.7};
    const double hours = 0.2;
    const double seconds = hours * 3600;
    const bh_empty kinds[] = {computed, with_share(0.3, 0), with_share(0.3, 5)};
    const bh_empty empty = kinds[_i];
    const double k = empty.advantage > 0 ? empty.advantage : 1;
    double sum = 0;
    double squares = 0;
    for (int i = 0; i < RUNS; i++) {
        double net = gsl_ran_poisson(dice, (rates.signal + rates.windows + rates.other) * seconds) -
                     rates.other * seconds;
        if (empty.measured)
            net -= gsl_ran_poisson(dice, k * rates.windows * seconds * empty.share) /
                   (k * empty.share);
        else
            net -= rates.windows * seconds;
        sum += net;
        squares += net * net;
    }
    const double mean = sum / RUNS;
    const double spread = sqrt(squares / RUNS - mean * mean);
    /* a spread from 20000 throws is known to 1 / sqrt(40000) = 0.5 %: five times that */
    ck_assert_double_eq_tol(mean / (rates.signal * seconds), 1, 0.002);
    ck_assert_double_eq_tol(spread / (rates.signal * seconds) /
                                bh_precision_uncertainty(&rates, &empty, hours),
                            1, 0.025);
}
END_TEST

START_TEST(goal_fed_back)
{
    for (int i = 0; i < 1000; i++) {
        const bh_recorded rates = some_rates();
        const bh_empty empty =
            i % 3 ? with_share(gsl_ran_flat(dice, 0.01, 2), i % 2 ? 0 : 3) : computed;
        const double goal = gsl_ran_flat(dice, 1e-4, 0.2);
        const double hours = bh_precision_hours(&rates, &empty, goal);
        ck_assert_double_eq_tol(bh_precision_uncertainty(&rates, &empty, hours) / goal, 1, 1e-12);
        /* four times the time, half the uncertainty */
        ck_assert_double_eq_tol(bh_precision_uncertainty(&rates, &empty, 4 * hours) / goal, 0.5,
                                1e-12);
    }
}
END_TEST

START_TEST(best_share_is_the_minimum)
{
    for (int i = 0; i < 200; i++) {
        const bh_recorded rates = some_rates();
        const double advantage = i % 2 ? 1 : gsl_ran_flat(dice, 0.5, 20);
        const double best = bh_precision_best_share(&rates, advantage);
        const bh_empty at = with_share(best, advantage);
        const double least = bh_precision_hours(&rates, &at, 0.01) * (1 + best);
        for (int k = -40; k <= 40; k++) {
            const double share = best * pow(1.05, k);
            const bh_empty other = with_share(share, advantage);
            ck_assert(bh_precision_hours(&rates, &other, 0.01) * (1 + share) >=
                      least * (1 - 1e-12));
        }
    }
}
END_TEST

START_TEST(the_worst_bin_decides)
{
    const bh_recorded rates[] = {{10, 1, 0}, {1, 0.5, 0.1}, {2, 4, 0}, {3, 0, 0}};
    const bh_recorded_bins bins = {4, rates};
    const bh_empty empty = with_share(0.2, 1);
    size_t worst = 9;
    const double hours = bh_precision_hours_each(&bins, &empty, 0.01, &worst);
    ck_assert_uint_eq(worst, 2);
    for (int i = 0; i < 4; i++)
        ck_assert(bh_precision_uncertainty(&rates[i], &empty, hours) <= 0.01 * (1 + 1e-12));
    ck_assert(bh_precision_best_share_each(&bins, 1) == bh_precision_best_share(&rates[2], 1));
    ck_assert(bh_precision_hours_each(&bins, &empty, 0.01, NULL) == hours);
    const bh_recorded dark[] = {{10, 1, 0}, {0, 1, 0}};
    const bh_recorded_bins with_dark = {2, dark};
    ck_assert(isinf(bh_precision_hours_each(&with_dark, &empty, 0.01, &worst)) && worst == 1);
    ck_assert(bh_precision_best_share_each(&with_dark, 1) == bh_precision_best_share(&dark[0], 1));
}
END_TEST

START_TEST(odd_inputs)
{
    const bh_recorded good = {1, 1, 1};
    const bh_recorded bad[] = {{(double)NAN, 1, 1}, {1, (double)NAN, 1}, {1, 1, (double)NAN},
                               {-1, 1, 1},          {1, -1, 1},          {1, 1, -1}};
    const bh_empty some = with_share(0.1, 1);
    for (int i = 0; i < COUNT(bad); i++) {
        const bh_recorded_bins bins = {1, &bad[i]};
        ck_assert(isnan(bh_precision_uncertainty(&bad[i], &some, 1)));
        ck_assert(isnan(bh_precision_hours(&bad[i], &computed, 0.1)));
        ck_assert(isnan(bh_precision_best_share(&bad[i], 1)));
        ck_assert(isnan(bh_precision_hours_each(&bins, &some, 0.1, NULL)));
        ck_assert(isnan(bh_precision_best_share_each(&bins, 1)));
    }
    const bh_empty odd[] = {{true, 0, 1},
                            {true, -1, 1},
                            {true, (double)NAN, 1},
                            {true, 0.1, -1},
                            {true, 0.1, (double)NAN}};
    for (int i = 0; i < COUNT(odd); i++) {
        ck_assert(isnan(bh_precision_uncertainty(&good, &odd[i], 1)));
        ck_assert(isnan(bh_precision_hours(&good, &odd[i], 0.1)));
    }
    ck_assert(isnan(bh_precision_uncertainty(&good, &some, (double)NAN)));
    ck_assert(isnan(bh_precision_uncertainty(&good, &some, -1)));
    ck_assert(isnan(bh_precision_hours(&good, &some, 0)));
    ck_assert(isnan(bh_precision_hours(&good, &some, (double)NAN)));
    const bh_recorded dark = {0, 1, 0};
    ck_assert(isinf(bh_precision_hours(&dark, &some, 0.1)));
    ck_assert(isinf(bh_precision_uncertainty(&dark, &some, 1)));
    ck_assert(isinf(bh_precision_uncertainty(&good, &some, 0)));
    const bh_recorded clean = {1, 0, 0};
    ck_assert(bh_precision_best_share(&clean, 1) == 0);
    ck_assert_double_eq_tol(bh_precision_uncertainty(&clean, &some, 1), 1 / 60.0, 1e-14);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("precision");
    tcase_add_checked_fixture(tests, open_dice, close_dice);
    tcase_add_test(tests, optimal_split);
    tcase_add_test(tests, time_to_precision);
    tcase_add_loop_test(tests, spread_of_thrown_experiments, 0, 3);
    tcase_add_test(tests, goal_fed_back);
    tcase_add_test(tests, best_share_is_the_minimum);
    tcase_add_test(tests, the_worst_bin_decides);
    tcase_add_test(tests, odd_inputs);
    return run_suite("precision", tests);
}
