/* test_counting.c - rates, dead time, counts: against published and independently computed rows. */
#include "beamhours/rates/counting.h"

#include <gsl/gsl_randist.h>
#include <gsl/gsl_rng.h>
#include <math.h>

#include "../suite.h"
#include "beamhours/rates/precision.h"
#include "beamhours/units/constants.h"

/* --- dead time --- */

static const struct {
    double rate, dead_time, recorded_non, recorded_par;
    const char *source;
} dead[] = {
    {1e4, 1e-6, 9900.990099, 9900.498337, "Knoll, Radiation Detection and Measurement, ch. 4.VII"},
    {1e5, 1e-6, 90909.09091, 90483.7418, "Knoll, Radiation Detection and Measurement, ch. 4.VII"},
    {5e5, 1e-6, 333333.3333, 303265.3299, "Knoll, Radiation Detection and Measurement, ch. 4.VII"},
    {1e6, 1e-6, 5e5, 367879.4412, "paralysable maximum 1/(e tau) at 1/tau; derived"},
    {259171.1018, 1e-6, (double)NAN, 2e5, "inverse of the paralysable model, low branch; derived"},
    {2542641.358, 1e-6, (double)NAN, 2e5, "inverse of the paralysable model, high branch; derived"},
};

static bh_readout plain(double dead_time, bool paralysable)
{
    return (bh_readout){
        .dead_time = dead_time, .paralysable = paralysable, .prescale = 1, .duty_factor = 1};
}

static bh_live live_of(const bh_readout *readout, double triggers)
{
    bh_live out;
    bh_error err;
    ck_assert_msg(bh_counting_live(readout, triggers, &out, &err) == BH_OK, "%s", err.text);
    return out;
}

START_TEST(dead_time)
{
    const bh_readout non = plain(dead[_i].dead_time, false);
    const bh_readout par = plain(dead[_i].dead_time, true);
    const double n = dead[_i].rate;
    /* references have 10 digits */
    ck_assert_msg(isnan(dead[_i].recorded_non) ||
                      fabs(live_of(&non, n).recorded / dead[_i].recorded_non - 1) < 2e-9,
                  "%s: %.10g", dead[_i].source, live_of(&non, n).recorded);
    ck_assert_msg(fabs(live_of(&par, n).recorded / dead[_i].recorded_par - 1) < 2e-9, "%s: %.10g",
                  dead[_i].source, live_of(&par, n).recorded);
    ck_assert_double_eq_tol(live_of(&non, n).live_fraction * n, live_of(&non, n).recorded, 1e-6);
}
END_TEST

START_TEST(published_dead_time)
{
    /* 300 kHz x 200 ns = 0.06: Rosenbluth-separation proposal of 2001, systematics page.  That is
     * n tau, the first order of both models. */
    const bh_readout readout = plain(200e-9, false);
    ck_assert_double_eq_tol(1 / live_of(&readout, 3e5).live_fraction - 1, 0.06, 1e-12);
}
END_TEST

START_TEST(dead_time_by_monte_carlo)
{
    enum { EVENTS = 400000 };
    const double rate = 5e5;
    const double tau = 1e-6;
    gsl_rng *dice = gsl_rng_alloc(gsl_rng_mt19937);
    gsl_rng_set(dice, 12345);
    double now = 0;
    double free_again = 0; /* non-paralysable */
    double quiet_from = 0; /* paralysable */
    int non = 0;
    int par = 0;
    for (int i = 0; i < EVENTS; i++) {
        now += gsl_ran_exponential(dice, 1 / rate);
        if (now >= free_again) {
            non++;
            free_again = now + tau;
        }
        par += now >= quiet_from;
        quiet_from = now + tau;
    }
    gsl_rng_free(dice);
    const bh_readout one = plain(tau, false);
    const bh_readout other = plain(tau, true);
    /* five standard deviations of the count, which dead time makes smaller than Poisson */
    ck_assert_double_eq_tol(non / now, live_of(&one, rate).recorded, 5 * sqrt(non) / now);
    ck_assert_double_eq_tol(par / now, live_of(&other, rate).recorded, 5 * sqrt(par) / now);
}
END_TEST

START_TEST(the_factors_of_live)
{
    bh_readout r = plain(5e-6, false);
    r.rate_limit = 4000;
    /* 5.4 kHz recorded over a limit of 4 kHz: 0.973 x 4 / 5.4 */
    bh_live live = live_of(&r, 5400 / (1 - 5400 * 5e-6));
    ck_assert_double_eq_tol(live.recorded, 5400, 1e-9);
    ck_assert(live.over_limit);
    ck_assert_double_eq_tol(live.live_fraction, 0.973 * 4 / 5.4, 1e-12);
    /* prescaled events cost no dead time */
    r.prescale = 10;
    live = live_of(&r, 50000);
    ck_assert_double_eq_tol(live.dead_part, 1 / (1 + 5000 * 5e-6), 1e-14);
    ck_assert_double_eq_tol(live.prescale_part, 0.1, 1e-15);
    ck_assert_double_eq_tol(live.limit_part, 4000 / (5000 / 1.025), 1e-12);
    ck_assert_double_eq_tol(live.live_fraction, 0.1 / 1.025 * 4000 / (5000 / 1.025), 1e-14);
    /* the rates while there is beam */
    r = (bh_readout){.dead_time = 1e-6, .prescale = 1, .rate_limit = 0, .duty_factor = 0.01};
    live = live_of(&r, 1e4);
    ck_assert_double_eq_tol(live.live_fraction, 0.5, 1e-14);
    ck_assert(!live.over_limit && live.limit_part == 1);
    live = live_of(&r, 0);
    ck_assert(live.live_fraction == 1 && live.recorded == 0);
}
END_TEST

START_TEST(odd_readouts_are_refused)
{
    const bh_readout bad[] = {
        {-1, false, 1, 0, 1}, {(double)NAN, false, 1, 0, 1}, {0, false, 0, 0, 1},
        {0, false, 1, -1, 1}, {0, false, 1, (double)NAN, 1}, {0, false, 1, 0, 0},
        {0, false, 1, 0, 2},  {0, true, 1, 0, (double)NAN},
    };
    bh_live out = {.recorded = 77};
    bh_error err;
    for (int i = 0; i < COUNT(bad); i++)
        ck_assert_int_eq(bh_counting_live(&bad[i], 1, &out, &err), BH_EDOMAIN);
    const bh_readout good = plain(0, false);
    const double rates[] = {-1, (double)NAN, HUGE_VAL};
    for (int i = 0; i < 3; i++)
        ck_assert_int_eq(bh_counting_live(&good, rates[i], &out, &err), BH_EDOMAIN);
    ck_assert(out.recorded == 77);
}
END_TEST

/* --- rates --- */

START_TEST(beam_particles)
{
    /* 10 uA for 1 h: 2.246943267e17 electrons; derived from e */
    ck_assert_double_eq_tol(bh_counting_beam(10e-6, -1) * 3600 / 2.246943267e17, 1, 1e-9);
    ck_assert_double_eq_tol(bh_counting_beam(10e-6, 2) * 2 / bh_counting_beam(10e-6, 1), 1, 1e-15);
    ck_assert_double_eq_tol(bh_counting_charge(20e-6, 10), 0.72, 1e-15);
    ck_assert_double_eq_tol(bh_counting_hours_of_charge(bh_counting_charge(3e-6, 7), 3e-6), 7,
                            1e-14);
}
END_TEST

/* Nuclei per cm2 of a density [g/cm3], length [cm] and molar mass [g/mol]. */
static double nuclei(double density, double length, double molar)
{
    return density * length * BH_AVOGADRO / molar;
}

START_TEST(luminosities)
{
    /* 10 uA on 10 cm of liquid hydrogen of 0.0723 g/cm3; derived, with 1.008 g/mol */
    const double hydrogen = bh_counting_beam(10e-6, -1) * nuclei(0.0723, 10, 1.008);
    ck_assert_double_eq_tol(hydrogen / 2.695989981e37, 1, 1e-5);
    /* neutron Rosenbluth proposal (2020), rate tables: 2.86e38 per nucleon for 30 uA on 15 cm of
     * 0.169 g/cm3 deuterium; per nucleus it is half of that.  Tolerance: the table's rounding */
    const double deuterium = bh_counting_beam(30e-6, -1) * nuclei(0.169, 15, 2.0141);
    ck_assert_double_eq_tol(2 * deuterium / 2.86e38, 1, 0.01);
    ck_assert_double_eq_tol(2 * deuterium / 2.838e38, 1, 1e-3);
}
END_TEST

static const struct {
    double sigma, wanted, recomputed; /* fm2/sr, Hz, Hz */
} helium[] = {{0.00785, 344000, 342153}, {0.00135, 59100, 58842}, {0.00046, 20100, 20050}};

START_TEST(published_rates)
{
    /* 3He elastic commissioning run plan, 845 MeV: 1 uA on 5.8 cm of 0.090 g/cm3, 6.7 msr, mean
     * cross sections as printed (rounded to two or three digits) */
    const bh_rate_factors factors = {.beam = bh_counting_beam(1e-6, -1),
                                     .seen = nuclei(0.090, 5.8, 3.0160),
                                     .cross_section = helium[_i].sigma * 1e4,
                                     .solid_angle = 6.7e-3,
                                     .radiative = 1,
                                     .kept = 1,
                                     .efficiency = 1};
    ck_assert_double_eq_tol(bh_counting_rate(&factors) / helium[_i].wanted, 1, 0.008);
    ck_assert_double_eq_tol(bh_counting_rate(&factors) / helium[_i].recomputed, 1, 1e-4);
    bh_rate_factors less = factors;
    less.radiative = 0.9;
    less.kept = 0.8;
    less.efficiency = 0.95;
    ck_assert_double_eq_tol(bh_counting_rate(&less) / bh_counting_rate(&factors), 0.9 * 0.8 * 0.95,
                            1e-14);
}
END_TEST

START_TEST(muon_lifetime_proposal)
{
    /* muon-lifetime proposal, beam-time estimate: 12 muons per 12 us cycle, 75 % accepted, 80 % up
     * time: 2.1e9 per hour; 1e12 events in 475 h; 3.8 facility weeks of 125 h */
    const double rate = 12 / 12e-6 * 0.75 * 0.80;
    ck_assert_double_eq_tol(bh_counting_counts(rate, 1, 1) / 2.1e9, 1, 0.03);
    ck_assert_double_eq_tol(bh_counting_counts(rate, 1, 1), 2.16e9, 1);
    const double hours = bh_counting_hours_of_counts(1e12, 2.1e9 / 3600, 1);
    ck_assert_double_eq_tol(hours, 476.19, 0.01);
    ck_assert_double_eq_tol(hours / 125, 3.8, 0.03 * 3.8);
}
END_TEST

START_TEST(what_is_left_of_counts)
{
    /* electronics 0.98, computer 0.93, tracking 0.96 leave 0.874944; derived */
    bh_rate_factors all = {1, 1, 1, 1, 1, 1, 1}, tracked = all;
    tracked.efficiency = 0.96;
    ck_assert_double_eq_tol(bh_counting_counts(bh_counting_rate(&tracked), 0.98 * 0.93, 1) /
                                bh_counting_counts(bh_counting_rate(&all), 1, 1),
                            0.874944, 1e-12);
    /* 2500 recorded of every tenth are 25000 +- 500, 2 %; derived */
    bh_readout r = plain(0, false);
    r.prescale = 10;
    const bh_live live = live_of(&r, 25000 / 3600.0);
    ck_assert_double_eq_tol(live.recorded * 3600, 2500, 1e-9);
    const bh_recorded rates = {.signal = live.recorded};
    const double relative = bh_precision_uncertainty(&rates, &(bh_empty){.measured = false}, 1);
    ck_assert_double_eq_tol(relative, 0.02, 1e-12);
    ck_assert_double_eq_tol(relative * 25000, 500, 1e-9);
    /* 1e4 /s on average in pulses of 2 us, 50 of them a second: 1e8 /s while there is beam; derived
     */
    r = (bh_readout){.dead_time = 1e-9, .prescale = 1, .duty_factor = 50 * 2e-6};
    ck_assert_double_eq_tol((1 / live_of(&r, 1e4).live_fraction - 1) / 1e-9, 1e8, 1e-3);
}
END_TEST

START_TEST(counts_and_back)
{
    ck_assert_double_eq_tol(bh_counting_counts(100, 0.9, 2), 648000, 1e-6);
    ck_assert_double_eq_tol(bh_counting_hours_of_counts(648000, 100, 0.9), 2, 1e-14);
    ck_assert(isinf(bh_counting_hours_of_counts(10, 0, 1)));
    ck_assert(isinf(bh_counting_hours_of_counts(10, 100, 0)));
}
END_TEST

/* rates [Hz], window [s] */
static const struct {
    const char *source;
    bh_coincident_rates rates;
    double expected, tolerance;
} accidentals[] = {
    {"2 tau R1 R2 of 10 ns pulses; Knoll chapter 17, Leo chapter 16",
     {2 * 10e-9, 1e5, 2e4, 1},
     40,
     1e-12},
    {"the same with a duty factor of 1 %: d (2 tau R1 R2 / d^2)",
     {2 * 10e-9, 1e5, 2e4, 0.01},
     4000,
     1e-12},
    {"neutron Rosenbluth proposal (2020), rate tables: 1390 Hz printed",
     {30e-9, 1.37e4, 3.39e6, 1},
     1393.29,
     1e-5},
    {"the same, as printed", {30e-9, 1.37e4, 3.39e6, 1}, 1390, 0.005},
};

START_TEST(accidental_coincidences)
{
    const double found = bh_counting_accidentals(&accidentals[_i].rates);
    ck_assert_msg(fabs(found / accidentals[_i].expected - 1) < accidentals[_i].tolerance,
                  "%s: %.9g", accidentals[_i].source, found);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("counting");
    tcase_add_loop_test(tests, dead_time, 0, COUNT(dead));
    tcase_add_test(tests, published_dead_time);
    tcase_add_test(tests, dead_time_by_monte_carlo);
    tcase_add_test(tests, the_factors_of_live);
    tcase_add_test(tests, odd_readouts_are_refused);
    tcase_add_test(tests, beam_particles);
    tcase_add_test(tests, luminosities);
    tcase_add_loop_test(tests, published_rates, 0, COUNT(helium));
    tcase_add_test(tests, muon_lifetime_proposal);
    tcase_add_test(tests, what_is_left_of_counts);
    tcase_add_test(tests, counts_and_back);
    tcase_add_loop_test(tests, accidental_coincidences, 0, COUNT(accidentals));
    return run_suite("counting", tests);
}
