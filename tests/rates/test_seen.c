/* test_seen.c - the seen part of layers: views, tilt, windows, thin layers. */
#include "beamhours/rates/seen.h"

#include <gsl/gsl_rng.h>
#include <math.h>

#include "../suite.h"
#include "beamhours/units/constants.h"

#define D BH_DEGREE

/* A 10 cm cell between windows of 0.1 cm. */
static const bh_seen_layer cell[] = {{0.1, false}, {10, true}, {0.1, false}};

/* view from and to [cm], angle and tilt [deg], path of window, sample, window */
static const struct {
    const char *what;
    bh_seen_view view;
    double path[3];
} views[] = {
    {"all of it", {false, 0, 0, 0, 0}, {1, 1, 1}},
    {"middle at 90 degrees", {true, -2, 2, 90 * D, 0}, {0, 0.4, 0}},
    {"at 30 degrees twice as much", {true, -2, 2, 30 * D, 0}, {0, 0.8, 0}},
    {"backward as forward", {true, -2, 2, 150 * D, 0}, {0, 0.8, 0}},
    {"half of both windows", {true, -5.05, 5.05, 90 * D, 0}, {0.5, 1, 0.5}},
    {"downstream only", {true, 0, 6, 90 * D, 0}, {0, 0.5, 1}},
    {"past the target", {true, 6, 9, 90 * D, 0}, {0, 0, 0}},
    {"along the beam all", {true, -1, 1, 0, 0}, {1, 1, 1}},
    {"against it all", {true, -1, 1, BH_PI, 0}, {1, 1, 1}},
    {"tilted, all", {false, 0, 0, 0, 60 * D}, {2, 2, 2}},
    {"tilted: half the share of twice the path", {true, -2, 2, 90 * D, 60 * D}, {0, 0.4, 0}},
    {"tilted the other way", {true, -2, 2, 90 * D, -60 * D}, {0, 0.4, 0}},
};

START_TEST(paths)
{
    double path[3];
    bh_error err;
    ck_assert_msg(bh_seen_paths(&views[_i].view, 3, cell, path, &err) == BH_OK, "%s", err.text);
    for (int i = 0; i < 3; i++)
        ck_assert_msg(fabs(path[i] - views[_i].path[i]) < 1e-12, "%s, layer %d: %g not %g",
                      views[_i].what, i, path[i], views[_i].path[i]);
    ck_assert_double_eq_tol(bh_seen_length(&views[_i].view, 3, cell), 10 * views[_i].path[1],
                            1e-12);
}
END_TEST

START_TEST(a_published_cell)
{
    /* polarised 3He beam-time note: a 25 cm gas cell of which a spectrometer at 45 degrees sees
     * about 13 cm: 13.0812 from its own rates.  A view of 9.25 cm, full, at 90 degrees does it. */
    const bh_seen_layer gas[] = {{25, true}};
    const bh_seen_view view = {true, -4.625, 4.625, 45 * D, 0};
    ck_assert_double_eq_tol(bh_seen_length(&view, 1, gas), 13.0812, 0.002);
}
END_TEST

START_TEST(thin_layers_are_seen_or_not)
{
    const bh_seen_layer jet[] = {{0, false}, {3, true}, {0, false}, {1, true}, {2, false}};
    const bh_seen_view view = {true, -2, 1, 90 * D, 0}; /* centre at 2: 0 .. 3 */
    double path[5];
    ck_assert_int_eq(bh_seen_paths(&view, 5, jet, path, NULL), BH_OK);
    const double wanted[] = {1, 1, 1, 0, 0};
    for (int i = 0; i < 5; i++)
        ck_assert_double_eq_tol(path[i], wanted[i], 1e-14);
    const bh_seen_layer empty[] = {{1, false}, {1, false}}; /* no sample: the middle of all */
    const bh_seen_view narrow = {true, -0.5, 0.25, 90 * D, 0};
    ck_assert_int_eq(bh_seen_paths(&narrow, 2, empty, path, NULL), BH_OK);
    ck_assert_double_eq_tol(path[0], 0.5, 1e-14);
    ck_assert_double_eq_tol(path[1], 0.25, 1e-14);
}
END_TEST

START_TEST(points_along_the_beam)
{
    /* shares as the frequency of points thrown along the beam, within five standard deviations */
    enum { THROWS = 200000 };
    const bh_seen_layer layers[] = {
        {0.7, false}, {1.3, true}, {0.4, false}, {2.1, true}, {0.9, false}};
    const bh_seen_view view = {true, -1.1, 1.6, 50 * D, 25 * D};
    double path[5];
    ck_assert_int_eq(bh_seen_paths(&view, 5, layers, path, NULL), BH_OK);
    const double slant = 1 / cos(25 * D);
    const double centre = (0.7 + (1.3 + 0.4 + 2.1) / 2) * slant;
    gsl_rng *dice = gsl_rng_alloc(gsl_rng_mt19937);
    gsl_rng_set(dice, 7);
    double start = 0;
    for (int i = 0; i < 5; i++) {
        int seen = 0;
        for (int k = 0; k < THROWS; k++) {
            const double z = start + layers[i].thickness * slant * gsl_rng_uniform(dice) - centre;
            seen += z * sin(50 * D) > -1.1 && z * sin(50 * D) < 1.6;
        }
        start += layers[i].thickness * slant;
        ck_assert_double_eq_tol(path[i] / slant, (double)seen / THROWS, 5 * 0.5 / sqrt(THROWS));
    }
    gsl_rng_free(dice);
}
END_TEST

START_TEST(odd_views_are_refused)
{
    const bh_seen_view bad[] = {{true, 1, 1, 1, 0},           {true, (double)NAN, 1, 1, 0},
                                {true, 0, 1, (double)NAN, 0}, {true, 0, 1, -0.1, 0},
                                {true, 0, 1, 3.15, 0},        {false, 0, 0, 0, 1.58},
                                {false, 0, 0, 0, (double)NAN}};
    double path[3] = {77, 77, 77};
    bh_error err;
    for (int i = 0; i < COUNT(bad); i++) {
        ck_assert_int_eq(bh_seen_paths(&bad[i], 3, cell, path, &err), BH_EDOMAIN);
        ck_assert(isnan(bh_seen_length(&bad[i], 3, cell)));
    }
    const bh_seen_layer layers[][1] = {{{-1, true}}, {{(double)NAN, true}}, {{HUGE_VAL, true}}};
    for (int i = 0; i < 3; i++) {
        ck_assert_int_eq(bh_seen_paths(&views[0].view, 1, layers[i], path, &err), BH_EDOMAIN);
        ck_assert(isnan(bh_seen_length(&views[0].view, 1, layers[i])));
    }
    ck_assert(path[0] == 77);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("seen");
    tcase_add_loop_test(tests, paths, 0, COUNT(views));
    tcase_add_test(tests, a_published_cell);
    tcase_add_test(tests, thin_layers_are_seen_or_not);
    tcase_add_test(tests, points_along_the_beam);
    tcase_add_test(tests, odd_views_are_refused);
    return run_suite("seen", tests);
}
