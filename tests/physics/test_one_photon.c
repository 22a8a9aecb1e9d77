/* test_one_photon.c - cross sections of point charges against independent computations, limits and
 * crossing. */
#include "../suite.h"

#include <math.h>

#include "beamhours/physics/one_photon.h"
#include "beamhours/units/constants.h"

#define ME  BH_MASS_ELECTRON
#define MMU BH_MASS_MUON
#define MP  BH_MASS_PROTON
#define MA  BH_MASS_ALPHA
#define D   BH_DEGREE
#define NB  1e-3 /* [ub] */
#define B   1e6  /* [ub] */

static bh_event must_scatter(const bh_collision *in, double angle, bh_branch branch)
{
    bh_event e;
    bh_error err = {0};
    ck_assert_msg(bh_kinematics_scattered(in, angle, branch, &e, &err) == BH_OK, "%s", err.text);
    return e;
}

static void near(double got, double want, double tolerance, const char *source)
{
    ck_assert_msg(fabs(got / want - 1.0) <= tolerance, "%.12g, want %.12g within %.1e: %s", got,
                  want, tolerance, source);
}

#define FORM  "closed form, mpmath 30 digits"
#define SPIN  "closed form = explicit 4x4 Dirac spinor sum"
#define RATES "neutron Rosenbluth proposal (2020), rate tables: averaged over the acceptance"

static const struct {
    double mass, momentum, target, degrees;
    int charge;
    double want, tolerance; /* nb/sr */
    const char *source;
} mott[] = {
    {0.0, 1000.0, MP, 30.0, 1, 943.149039573, 1e-11, FORM},
    {0.0, 855.0, MP, 90.0, 1, 7.42034302996, 1e-11, FORM},
    {0.0, 11000.0, MP, 12.5, 1, 235.831072136, 1e-11, FORM},
    {0.0, 400.0, 11174.863, 40.0, 6, 74639.5873657, 1e-11, FORM},
    {0.0, 400.0, 1875.612945, 30.0, 1, 6549.2504803, 1e-11, FORM},
    {0.0, 1000.0, 1875.612945, 30.0, 1, 1005.9642188, 1e-11, FORM},
    {MMU, 210.0, MP, 60.0, 1, 1725.97689302, 1e-11, SPIN},
    {MMU, 210.0, MP, 20.0, 1, 156233.77198, 1e-11, SPIN},
    {MMU, 115.0, MP, 100.0, 1, 1343.19818054, 1e-11, SPIN},
    {MMU, 115.0, MP, 20.0, 1, 777808.810713, 1e-11, SPIN},
    {ME, 210.0, MP, 60.0, 1, 1268.58955978, 1e-11, SPIN},
    {ME, 4400.0, MP, 41.88, 1, 6.62, 0.02, RATES},
    {ME, 6600.0, MP, 23.23, 1, 44.2, 0.02, RATES},
};

START_TEST(mott_with_recoil)
{
    const double m = mott[_i].mass, p = mott[_i].momentum;
    const bh_collision in = {m, mott[_i].target, sqrt(p * p + m * m) - m};
    const bh_event e = must_scatter(&in, mott[_i].degrees * D, BH_BRANCH_FAST);
    near(bh_mott(&in, &e, mott[_i].charge) / NB, mott[_i].want, mott[_i].tolerance,
         mott[_i].source);
}
END_TEST

/* Own calculation in the nonrelativistic laboratory form; atomic masses, of natural elements where
 * there are several isotopes.  1e-4: the masses behind the last digits are not known. */
#define OWN     "Rutherford, laboratory, own nonrelativistic calculation with atomic masses"
#define PRINTED "Rutherford, as printed in tables of backscattering, from memory"
static const struct {
    int z1, z2;
    double mass, target, kinetic, degrees; /* [u] [u] [MeV] */
    double want, tolerance;                /* b/sr */
    const char *source;
} rutherford[] = {
    {2, 6, 4.002602, 12.0, 2.0, 170, 0.03754286706, 1e-5, OWN},
    {2, 8, 4.002602, 15.99491462, 2.0, 170, 0.07413798889, 1e-5, OWN},
    {2, 13, 4.002602, 26.9815384, 2.0, 170, 0.2128406897, 1e-5, OWN},
    {2, 14, 4.002602, 28.0855, 2.0, 170, 0.2476889952, 1e-5, OWN},
    {2, 29, 4.002602, 63.546, 2.0, 170, 1.097998913, 1e-5, OWN},
    {2, 47, 4.002602, 107.8682, 2.0, 170, 2.898836464, 1e-5, OWN},
    {2, 79, 4.002602, 196.96657, 2.0, 170, 8.205546731, 1e-5, OWN},
    {2, 79, 4.002602, 196.96657, 1.0, 170, 32.82218692, 1e-5, OWN},
    {1, 14, 1.00782503, 28.0855, 1.0, 165, 0.2622309751, 1e-5, OWN},
    {1, 79, 1.00782503, 196.96657, 1.0, 165, 8.37030959, 1e-5, OWN},
    {1, 6, 1.00782503, 12.0, 1.0, 165, 0.04762889337, 1e-5, OWN},
    {2, 82, 4.002602, 207.2, 3.0, 165, 4.005357244, 1e-5, OWN},
    {2, 14, 4.002602, 28.0855, 1.0, 30, 226.3789556, 1e-5, OWN},
    {2, 79, 4.002602, 196.96657, 2.0, 15, 27864.22573, 1e-5, OWN},
    {2, 14, 4.002602, 28.0855, 2.0, 170, 0.248, 2e-3, PRINTED},
    {2, 79, 4.002602, 196.96657, 2.0, 170, 8.2057, 1e-4, PRINTED},
    {2, 79, 4.002602, 196.96657, 1.0, 170, 32.81, 1e-3, PRINTED},
};

START_TEST(rutherford_in_the_laboratory)
{
    const bh_collision in = {rutherford[_i].mass * BH_MASS_U, rutherford[_i].target * BH_MASS_U,
                             rutherford[_i].kinetic};
    const bh_event e = must_scatter(&in, rutherford[_i].degrees * D, BH_BRANCH_FAST);
    const int charges = rutherford[_i].z1 * rutherford[_i].z2;
    near(bh_rutherford(&in, &e, charges) / B, rutherford[_i].want, rutherford[_i].tolerance,
         rutherford[_i].source);
    /* the exact form differs by a few times v^2/c^2 */
    const double v2 = 2.0 * in.kinetic / in.mass;
    near(bh_spinless(&in, &e, charges) / B, rutherford[_i].want, rutherford[_i].tolerance + v2,
         "slow limit of the relativistic form");
}
END_TEST

START_TEST(slow_limit_is_rutherford)
{
    static const double masses[][2] = {{MA, 183432.9}, {MA, 11174.9}, {MP, MA},
                                       {MP, MP},       {MA, MP},      {11174.9, MP}};
    for (int i = 0; i < COUNT(masses); i++) {
        const bh_collision in = {masses[i][0], masses[i][1], 1e-3};
        const double largest = bh_kinematics_largest_angle(&in);
        for (int j = 1; j < 20; j++)
            for (int slow = 0; slow <= (in.mass > in.target); slow++) {
                const bh_branch branch = slow ? BH_BRANCH_SLOW : BH_BRANCH_FAST;
                const bh_event e = must_scatter(&in, largest * j / 20.0, branch);
                near(bh_spinless(&in, &e, 4), bh_rutherford(&in, &e, -4), 1e-4, "law");
                near(bh_mott(&in, &e, 4), bh_rutherford(&in, &e, -4), 1e-4, "law");
            }
    }
}
END_TEST

START_TEST(heavy_target_limits)
{
    for (int i = 1; i < 18; i++) {
        const double angle = 10.0 * i * D;
        const bh_collision electron = {ME, 1e6, 0.1 * i}, alpha = {1.0, 1e6, 1e-3};
        bh_event e = must_scatter(&electron, angle, BH_BRANCH_FAST);
        near(bh_mott(&electron, &e, 7), bh_mott_static(&electron, angle, 7), 1e-5, "law");
        e = must_scatter(&alpha, angle, BH_BRANCH_FAST);
        near(bh_rutherford(&alpha, &e, 7), bh_rutherford_heavy(1e-3, angle, 7), 1e-5, "law");
        /* slow: Mott without recoil is Rutherford */
        near(bh_mott_static(&alpha, angle, 7), bh_rutherford_heavy(1e-3, angle, 7), 3e-3, "law");
    }
}
END_TEST

START_TEST(massless_textbook_forms)
{
    for (int i = 1; i < 18; i++) {
        const double E = 50.0 * i * i, angle = 10.0 * i * D, half = 0.5 * angle;
        const bh_collision in = {0.0, MP, E};
        const bh_event e = must_scatter(&in, angle, BH_BRANCH_FAST);
        const double length = BH_ALPHA * cos(half) / (2.0 * E * sin(half) * sin(half));
        const double mott0 = BH_HBARC2_UB * length * length;
        near(bh_mott_static(&in, angle, 1), mott0, 1e-13, "textbook");
        near(bh_mott(&in, &e, 1), mott0 * e.scattered_kinetic / E, 1e-12, "textbook");
        /* Rosenbluth's own form */
        const double tau = e.q2 / (4.0 * MP * MP), t = tan(half), ge2 = 0.61, gm2 = 3.7;
        const double sum = (ge2 + tau * gm2) / (1.0 + tau) + 2.0 * tau * gm2 * t * t;
        near(bh_one_photon(&in, &e, (bh_vertex){1.0, 1.0}, (bh_vertex){ge2, gm2}),
             mott0 * e.scattered_kinetic / E * sum, 1e-12, "textbook");
        /* a light lepton is nearly one without mass: (m/E)^2, and m^2/Q^2 where that is less */
        const bh_collision light = {ME, MP, E};
        const bh_event l = must_scatter(&light, angle, BH_BRANCH_FAST);
        near(bh_mott(&light, &l, 1), bh_mott(&in, &e, 1), 0.03 / i, "massless limit");
    }
}
END_TEST

/* <|M|^2> as written in s, t, u against the sum of positive terms. */
START_TEST(mandelstam_form_agrees)
{
    for (int i = 0; i < 60; i++) {
        const bh_collision in = {i % 3 ? MMU : MA, i % 2 ? MP : 3.0 * MP, 20.0 + 30.0 * i};
        const double angle = bh_kinematics_largest_angle(&in) * (i + 0.5) / 60.0;
        const bh_event e = must_scatter(&in, angle, BH_BRANCH_FAST);
        const double m = in.mass, M = in.target, ge2 = 0.83, gm2 = 5.9;
        const double tau = e.q2 / (4.0 * M * M), su = e.s - e.u;
        const double A = su * su - 4.0 * M * M * e.q2 * (1.0 + tau);
        const double sum =
            e.q2 * gm2 * (2.0 * e.q2 - 4.0 * m * m) + (ge2 + tau * gm2) / (1.0 + tau) * A;
        const double e2 = 4.0 * BH_PI * BH_ALPHA;
        const double amplitude2 = e2 * e2 * sum / (e.q2 * e.q2);
        const double want = amplitude2 * e.cm_per_lab / (64.0 * BH_PI * BH_PI * e.s) * BH_HBARC2_UB;
        near(bh_one_photon(&in, &e, (bh_vertex){1.0, 1.0}, (bh_vertex){ge2, gm2}), want, 1e-8,
             "one-photon exchange in s, t, u");
        const bh_invariants x = {e.s, e.t, e.u};
        near(bh_one_photon(&in, &e, (bh_vertex){1.0, 1.0}, (bh_vertex){1.0, 1.0}),
             bh_dirac_amplitude2(&x, m, M) * e.cm_per_lab * BH_HBARC2_UB /
                 (64.0 * BH_PI * BH_PI * e.s),
             1e-8, "Dirac on Dirac");
    }
}
END_TEST

START_TEST(beam_and_target_change_places)
{
    /* same s and t with the masses exchanged: in the centre of mass the same cross section */
    for (int i = 1; i < 30; i++) {
        const bh_collision in = {MMU, MP, 40.0 * i}, out = {MP, MMU, 40.0 * i * MP / MMU};
        const bh_event e = must_scatter(&in, 0.1 * i, BH_BRANCH_FAST);
        bh_event x;
        bh_error err = {0};
        ck_assert_msg(bh_kinematics_q2(&out, e.q2, &x, &err) == BH_OK, "%s", err.text);
        near(x.s, e.s, 1e-12, "same invariants");
        const bh_vertex a = {1.7, 0.4}, b = {0.83, 5.9};
        near(bh_one_photon(&in, &e, a, b) / e.cm_per_lab,
             bh_one_photon(&out, &x, b, a) / x.cm_per_lab, 1e-9, "law");
    }
}
END_TEST

/* e+ e- -> mu+ mu-: s and t exchanged, integrated over the angle (a polynomial of the second degree
 * in its cosine, for which Simpson's rule is exact). */
static double pair_total(double s, double m, double M)
{
    const double b = sqrt(1.0 - 4.0 * m * m / s), B2 = 1.0 - 4.0 * M * M / s, sum = m * m + M * M;
    double total = 0.0;
    for (int i = -1; i <= 1; i++) {
        const double c = i * b * sqrt(B2);
        const double t = sum - 0.5 * s * (1.0 - c), u = sum - 0.5 * s * (1.0 + c);
        const bh_invariants crossed = {t, s, u};
        total += (i ? 1.0 : 4.0) / 3.0 * bh_dirac_amplitude2(&crossed, m, M);
    }
    return 2.0 * BH_PI * total * sqrt(B2) / b * BH_HBARC2_UB / (64.0 * BH_PI * BH_PI * s);
}

START_TEST(crossing_gives_muon_pairs)
{
    static const struct {
        double energy, want; /* [MeV] positron, 0: s given; [nb] */
        double s;
    } rows[] = {
        {45000.0, 478.096014936, 0.0},  {60995.55464, 1007.86883733, 0.0},
        {200000.0, 416.686968922, 0.0}, {0.0, 86.7886286496, 1e6},
        {0.0, 0.868544711853, 1e8},
    };
    for (int i = 0; i < COUNT(rows); i++) {
        const double s = rows[i].s > 0.0 ? rows[i].s : 2.0 * ME * (rows[i].energy + ME);
        near(pair_total(s, ME, MMU) / NB, rows[i].want, 1e-10,
             "trace integrated over angle = explicit 4x4 Dirac spinor sum");
    }
}
END_TEST

START_TEST(forward_is_infinite_not_nan)
{
    const bh_collision in[] = {{0.0, MP, 100.0}, {ME, MP, 100.0}, {MA, MP, 100.0}};
    for (int i = 0; i < COUNT(in); i++) {
        const bh_event e = must_scatter(&in[i], 0.0, BH_BRANCH_FAST);
        ck_assert(isinf(bh_mott(&in[i], &e, 1)));
        ck_assert(isinf(bh_spinless(&in[i], &e, 1)));
    }
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("one photon");
    tcase_add_loop_test(tests, mott_with_recoil, 0, COUNT(mott));
    tcase_add_loop_test(tests, rutherford_in_the_laboratory, 0, COUNT(rutherford));
    tcase_add_test(tests, slow_limit_is_rutherford);
    tcase_add_test(tests, heavy_target_limits);
    tcase_add_test(tests, massless_textbook_forms);
    tcase_add_test(tests, mandelstam_form_agrees);
    tcase_add_test(tests, beam_and_target_change_places);
    tcase_add_test(tests, crossing_gives_muon_pairs);
    tcase_add_test(tests, forward_is_infinite_not_nan);
    return run_suite("physics/one_photon", tests);
}
