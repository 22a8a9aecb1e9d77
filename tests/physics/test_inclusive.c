/* test_inclusive.c - inclusive kinematics and the lepton's part of the cross section. */
#include "../suite.h"

#include <math.h>

#include "beamhours/physics/inclusive.h"
#include "beamhours/physics/one_photon.h"
#include "beamhours/units/constants.h"

#define D BH_DEGREE

static void close_to(double got, double want, double tolerance, const char *what)
{
    ck_assert_msg(fabs(got - want) <= tolerance * fabs(want), "%s: %.12g, want %.12g", what, got,
                  want);
}

START_TEST(transfers_agree_with_four_vectors)
{
    static const struct {
        double mass, kinetic, degrees, momentum;
    } rows[] = {{0.0, 620.0, 60.0, 470.0},
                {BH_MASS_MUON, 300.0, 35.0, 210.0},
                {BH_MASS_MUON, 50.0, 170.0, 10.0},
                {BH_MASS_ELECTRON, 5.0, 90.0, 2.0}};
    const bh_inclusive in = {rows[_i].mass, rows[_i].kinetic, rows[_i].degrees * D};
    const bh_transfer at = bh_inclusive_transfer(&in, rows[_i].momentum);
    const double E = in.kinetic + in.mass, p = bh_inclusive_beam(&in), c = cos(in.angle);
    const double k = rows[_i].momentum, e = sqrt(k * k + in.mass * in.mass);
    close_to(at.energy, e, 1e-14, "energy");
    close_to(at.lost, E - e, 1e-12, "lost");
    close_to(at.q, sqrt(p * p + k * k - 2.0 * p * k * c), 1e-12, "q");
    close_to(at.q2, 2.0 * (E * e - p * k * c - in.mass * in.mass), 1e-11, "Q2");
}
END_TEST

START_TEST(momenta_are_found_again)
{
    static const double masses[] = {0.0, BH_MASS_ELECTRON, BH_MASS_MUON};
    const bh_inclusive in = {masses[_i % 3], 900.0, (_i < 3 ? 25.0 : 130.0) * D};
    const bh_transfer at = bh_inclusive_transfer(&in, 333.0);
    const double M = BH_MASS_PROTON, w2 = M * M + 2.0 * M * at.lost - at.q2;
    const double wanted[][2] = {{at.q2, 0.0}, {M * M - w2, 2.0 * M}, {0.0, at.q2 / at.lost}};
    for (int i = 0; i < COUNT(wanted) + 1; i++) {
        double found[2] = {-1.0, -1.0};
        const size_t n = i == COUNT(wanted)
                             ? bh_inclusive_at_q(&in, at.q, found)
                             : bh_inclusive_at_q2(&in, wanted[i][0], wanted[i][1], found);
        ck_assert_uint_ge(n, 1);
        ck_assert_uint_le(n, 2);
        const double off = fmin(fabs(found[0] - 333.0), n > 1 ? fabs(found[1] - 333.0) : 1e9);
        ck_assert_msg(off < 1e-8, "condition %d: %.12g and %.12g", i, found[0], found[1]);
    }
}
END_TEST

START_TEST(what_cannot_be_has_no_momenta)
{
    const bh_inclusive in = {0.0, 500.0, 40.0 * D};
    double out[2];
    ck_assert_uint_eq(bh_inclusive_at_q(&in, 100.0, out), 0); /* q >= E sin(angle) */
    ck_assert_uint_eq(bh_inclusive_at_q2(&in, -1e6, 0.0, out), 0);
    const bh_inclusive muon = {BH_MASS_MUON, 500.0, 40.0 * D};
    ck_assert_uint_eq(bh_inclusive_at_q2(&muon, 1.0, 0.0, out), 0);
}
END_TEST

START_TEST(massless_lepton_gives_mott_with_vl_and_vt)
{
    const bh_inclusive in = {0.0, 730.0, 37.1 * D};
    const bh_transfer at = bh_inclusive_transfer(&in, 610.0);
    const double half = 0.5 * in.angle, share = at.q2 / (at.q * at.q);
    const double mott =
        BH_HBARC2_UB * pow(BH_ALPHA * cos(half) / (2.0 * in.kinetic * sin(half) * sin(half)), 2);
    close_to(bh_inclusive_cross_section(&in, &at, 1.0, 0.0), mott * share * share, 1e-12, "v_L");
    close_to(bh_inclusive_cross_section(&in, &at, 0.0, 1.0),
             mott * (0.5 * share + tan(half) * tan(half)), 1e-12, "v_T");
}
END_TEST

/* A nucleon at rest: R_L and R_T under the integral over its delta function give Rosenbluth. */
START_TEST(muon_tensor_agrees_with_rosenbluth)
{
    static const struct {
        double mass, kinetic, degrees;
    } rows[] = {{BH_MASS_MUON, 130.0, 60.0}, {BH_MASS_MUON, 30.0, 120.0}, {0.0, 855.0, 40.0}};
    const bh_collision in = {rows[_i].mass, BH_MASS_PROTON, rows[_i].kinetic};
    bh_event e;
    ck_assert_int_eq(bh_kinematics_scattered(&in, rows[_i].degrees * D, BH_BRANCH_FAST, &e, NULL),
                     BH_OK);
    const bh_inclusive way = {in.mass, in.kinetic, rows[_i].degrees * D};
    const bh_transfer at = bh_inclusive_transfer(&way, e.scattered_momentum);
    const double M = BH_MASS_PROTON, tau = e.q2 / (4.0 * M * M), ge2 = 0.31, gm2 = 2.2;
    const double longitudinal = ge2 * at.q * at.q / at.q2 * 2.0 * M, /* times delta(Q2 - 2 M w) */
        transverse = 2.0 * tau * gm2 * 2.0 * M;
    /* d(2 M w - Q2) / dE' at fixed angle */
    const double E = in.kinetic + in.mass, p = e.beam_momentum;
    const double slope = 2.0 * M + 2.0 * E - 2.0 * p * cos(way.angle) * at.energy / at.momentum;
    close_to(bh_inclusive_cross_section(&way, &at, longitudinal, transverse) / slope,
             bh_one_photon(&in, &e, (bh_vertex){1.0, 1.0}, (bh_vertex){ge2, gm2}), 1e-10,
             "Rosenbluth");
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("inclusive");
    tcase_add_loop_test(tests, transfers_agree_with_four_vectors, 0, 4);
    tcase_add_loop_test(tests, momenta_are_found_again, 0, 6);
    tcase_add_test(tests, what_cannot_be_has_no_momenta);
    tcase_add_test(tests, massless_lepton_gives_mott_with_vl_and_vt);
    tcase_add_loop_test(tests, muon_tensor_agrees_with_rosenbluth, 0, 3);
    return run_suite("inclusive", tests);
}
