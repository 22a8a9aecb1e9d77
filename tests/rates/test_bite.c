/* test_bite.c - angles inside a momentum bite, against the kinematics at many angles. */
#include "beamhours/rates/bite.h"

#include <math.h>
#include <stdbool.h>

#include "../suite.h"
#include "beamhours/units/constants.h"

#define D BH_DEGREE

static const struct {
    const char *what;
    bh_collision in;
} collisions[] = {
    {"electron on proton", {BH_MASS_ELECTRON, BH_MASS_PROTON, 855}},
    {"electron on lead", {BH_MASS_ELECTRON, 193687.1, 450}},
    {"massless on proton", {0, BH_MASS_PROTON, 100}},
    {"muon on proton", {BH_MASS_MUON, BH_MASS_PROTON, 94.5}},
    {"proton on proton", {BH_MASS_PROTON, BH_MASS_PROTON, 200}},
    {"alpha on gold", {BH_MASS_ALPHA, 183432.8, 5}},
    {"alpha on proton", {BH_MASS_ALPHA, BH_MASS_PROTON, 20}},
    {"proton on electron", {BH_MASS_PROTON, BH_MASS_ELECTRON, 1000}},
};

static const bh_detected kinds[] = {BH_DETECTED_SCATTERED, BH_DETECTED_SLOW, BH_DETECTED_RECOIL};

/* Momentum [MeV/c] of the detected particle at an angle [rad]; NAN where there is none. */
static double momentum(const bh_collision *in, bh_detected detected, double angle)
{
    bh_event event;
    bh_code code = BH_EDOMAIN;
    if (detected == BH_DETECTED_RECOIL)
        code = bh_kinematics_recoil(in, angle, &event, NULL);
    else
        code = bh_kinematics_scattered(
            in, angle, detected == BH_DETECTED_SLOW ? BH_BRANCH_SLOW : BH_BRANCH_FAST, &event,
            NULL);
    if (code != BH_OK)
        return (double)NAN;
    return detected == BH_DETECTED_RECOIL ? event.recoil_momentum : event.scattered_momentum;
}

static double largest_angle(const bh_collision *in, bh_detected detected)
{
    return detected == BH_DETECTED_RECOIL ? BH_PI / 2 : bh_kinematics_largest_angle(in);
}

START_TEST(inside_is_inside)
{
    const bh_collision *in = &collisions[_i / COUNT(kinds)].in;
    const bh_detected detected = kinds[_i % COUNT(kinds)];
    if (detected == BH_DETECTED_SLOW && in->mass <= in->target)
        return;
    const double largest = largest_angle(in, detected);
    const double one = momentum(in, detected, 0.3 * largest);
    const double other = momentum(in, detected, 0.6 * largest);
    const bh_bite bite = {detected, fmin(one, other), fmax(one, other)};
    bh_interval found;
    size_t count = 7;
    bh_error err;
    ck_assert_msg(bh_bite_angles(in, &bite, &found, &count, &err) == BH_OK, "%s", err.text);
    ck_assert_uint_eq(count, 1);
    /* a small loss of energy leaves fewer digits to the momentum: 1e-16 E / loss */
    ck_assert_msg(fabs(found.from / (0.3 * largest) - 1) < 1e-7 &&
                      fabs(found.to / (0.6 * largest) - 1) < 1e-7,
                  "%s, %d: %.9g to %.9g of %.9g", collisions[_i / COUNT(kinds)].what, (int)detected,
                  found.from, found.to, largest);
    for (int i = 1; i < 200; i++) {
        const double angle = largest * i / 200;
        const double p = momentum(in, detected, angle);
        if (fabs(angle / largest - 0.3) < 1e-6 || fabs(angle / largest - 0.6) < 1e-6)
            continue;
        const bool by_momentum = p >= bite.momentum_from && p <= bite.momentum_to;
        ck_assert_int_eq(by_momentum, angle >= found.from && angle <= found.to);
    }
}
END_TEST

START_TEST(wide_bites_reach_the_ends)
{
    const bh_collision *in = &collisions[_i / COUNT(kinds)].in;
    const bh_detected detected = kinds[_i % COUNT(kinds)];
    const bh_bite all = {detected, 0, HUGE_VAL};
    const bh_bite above = {detected, 1e9, HUGE_VAL};
    const bh_bite still = {detected, 0, 1e-9};
    bh_interval found = {0, 0};
    size_t count = 7;
    if (detected == BH_DETECTED_SLOW && in->mass <= in->target) {
        ck_assert_int_eq(bh_bite_angles(in, &all, &found, &count, NULL), BH_EDOMAIN);
        ck_assert_uint_eq(count, 7);
        return;
    }
    ck_assert_int_eq(bh_bite_angles(in, &all, &found, &count, NULL), BH_OK);
    ck_assert(count == 1 && found.from == 0 && found.to == largest_angle(in, detected));
    ck_assert_int_eq(bh_bite_angles(in, &above, &found, &count, NULL), BH_OK);
    ck_assert_uint_eq(count, 0);
    ck_assert_int_eq(bh_bite_angles(in, &still, &found, &count, NULL), BH_OK);
    /* only a recoil, and a beam that a like mass stops, can stand still */
    ck_assert_uint_eq(count, detected == BH_DETECTED_RECOIL || in->mass == in->target);
}
END_TEST

START_TEST(up_to_where_fast_and_slow_meet)
{
    const bh_collision *in = &collisions[_i].in;
    if (in->mass <= in->target)
        return;
    const double near = 0.999 * bh_kinematics_largest_angle(in);
    const bh_bite bites[] = {
        {BH_DETECTED_SCATTERED, momentum(in, BH_DETECTED_SCATTERED, near), HUGE_VAL},
        {BH_DETECTED_SLOW, 0, momentum(in, BH_DETECTED_SLOW, near)}};
    for (int i = 0; i < 2; i++) {
        bh_interval found;
        size_t count;
        ck_assert_int_eq(bh_bite_angles(in, &bites[i], &found, &count, NULL), BH_OK);
        ck_assert_uint_eq(count, 1);
        ck_assert_msg(fabs(found.to / near - 1) < 1e-7 && found.from == 0, "%s: %.9g not %.9g",
                      collisions[_i].what, found.to, near);
    }
}
END_TEST

START_TEST(odd_bites_are_refused)
{
    const bh_bite bad[] = {{BH_DETECTED_SCATTERED, 5, 5},
                           {BH_DETECTED_SCATTERED, (double)NAN, 5},
                           {BH_DETECTED_SCATTERED, -1, 5},
                           {BH_DETECTED_RECOIL, 5, (double)NAN}};
    bh_interval out;
    size_t count = 7;
    bh_error err;
    for (int i = 0; i < COUNT(bad); i++)
        ck_assert_int_eq(bh_bite_angles(&collisions[0].in, &bad[i], &out, &count, &err),
                         BH_EDOMAIN);
    const bh_bite good = {BH_DETECTED_SCATTERED, 5, 50};
    const bh_collision none = {0.5, 0, 100};
    ck_assert_int_eq(bh_bite_angles(&none, &good, &out, &count, &err), BH_EDOMAIN);
    ck_assert_uint_eq(count, 7);
}
END_TEST

START_TEST(share_under_resolution)
{
    const bh_bite bite = {BH_DETECTED_SCATTERED, 95, 105};
    ck_assert(bh_bite_share(&bite, 100, 0) == 1 && bh_bite_share(&bite, 106, 0) == 0);
    /* normal distribution: 68.268949 % within one standard deviation, half beyond an edge */
    ck_assert_double_eq_tol(bh_bite_share(&bite, 100, 5), 0.682689492137, 1e-11);
    ck_assert_double_eq_tol(bh_bite_share(&bite, 95, 0.1), 0.5, 1e-12);
    const bh_bite open = {BH_DETECTED_SCATTERED, 0, HUGE_VAL};
    ck_assert_double_eq_tol(bh_bite_share(&open, 100, 5), 1, 1e-15);
    ck_assert_double_eq_tol(bh_bite_share(&open, 1, 5), 1, 1e-15);
}
END_TEST

/* Least kinetic energy: momenta of a proton of 1 MeV and of 10 MeV from E^2 - M^2. */
START_TEST(thresholds_cut_bites)
{
    const double low = sqrt(2 * BH_MASS_PROTON + 1), high = sqrt(20 * BH_MASS_PROTON + 100);
    bh_bite open = {BH_DETECTED_RECOIL, 0, HUGE_VAL}, narrow = {BH_DETECTED_RECOIL, 100, 120};
    bh_bite_from_threshold(&open, BH_MASS_PROTON, 1);
    ck_assert_double_eq_tol(open.momentum_from, low, 1e-9);
    ck_assert(isinf(open.momentum_to));
    bh_bite_from_threshold(&narrow, BH_MASS_PROTON, 1);
    ck_assert(narrow.momentum_from == 100 && narrow.momentum_to == 120);
    bh_bite_from_threshold(&narrow, BH_MASS_PROTON, 10);
    ck_assert_double_eq_tol(narrow.momentum_from, high, 1e-9);
    ck_assert(bh_bite_share(&narrow, 110, 0) == 0 && bh_bite_share(&narrow, 150, 1) < 1e-12);
    /* through the angles: recoils below the threshold are those near 90 degrees */
    const bh_collision in = {BH_MASS_ELECTRON, BH_MASS_PROTON, 855};
    bh_interval kept;
    size_t count;
    bh_event event;
    ck_assert_int_eq(bh_bite_angles(&in, &open, &kept, &count, NULL), BH_OK);
    ck_assert_uint_eq(count, 1);
    ck_assert(kept.from == 0);
    ck_assert_int_eq(bh_kinematics_recoil(&in, kept.to, &event, NULL), BH_OK);
    ck_assert_double_eq_tol(event.recoil_kinetic, 1, 1e-9);
}
END_TEST

/* 855 MeV/c of an electron: 0.1 % is 0.855, 300 keV is 0.3, 0.05 % of the beam 0.4; in quadrature.
 * A proton of 100 MeV/c has beta = 0.1059788: 1 MeV is 9.435854 MeV/c. */
START_TEST(resolutions_add_in_quadrature)
{
    const bh_momentum_rms rms = {1e-3, 0.3, 5e-4};
    ck_assert_double_eq_tol(bh_bite_sigma(&rms, BH_MASS_ELECTRON, 855, 800),
                            sqrt(0.855 * 0.855 + 0.09 + 0.16), 1e-6);
    const bh_momentum_rms energy = {0, 1, 0};
    ck_assert_double_eq_tol(bh_bite_sigma(&energy, BH_MASS_PROTON, 100, 800),
                            sqrt(1e4 + BH_MASS_PROTON * BH_MASS_PROTON) / 100, 1e-9);
    ck_assert(bh_bite_sigma(&energy, BH_MASS_PROTON, 0, 800) == 0);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("bite");
    tcase_add_loop_test(tests, inside_is_inside, 0, COUNT(collisions) * COUNT(kinds));
    tcase_add_loop_test(tests, wide_bites_reach_the_ends, 0, COUNT(collisions) * COUNT(kinds));
    tcase_add_loop_test(tests, up_to_where_fast_and_slow_meet, 0, COUNT(collisions));
    tcase_add_test(tests, odd_bites_are_refused);
    tcase_add_test(tests, share_under_resolution);
    tcase_add_test(tests, thresholds_cut_bites);
    tcase_add_test(tests, resolutions_add_in_quadrature);
    return run_suite("bite", tests);
}
