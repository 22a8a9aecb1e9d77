/* test_atomic_electron.c - Moller, Bhabha and muons on electrons against sums over spinors, and
 * what crossing and symmetry demand. */
#include "../suite.h"

#include <math.h>

#include "beamhours/physics/atomic_electron.h"
#include "beamhours/physics/one_photon.h"
#include "beamhours/units/constants.h"

#define D      BH_DEGREE
#define ME     BH_MASS_ELECTRON
#define B      1e6  /* [ub] */
#define NB     1e-3 /* [ub] */
#define SPINOR "closed form = explicit 4x4 Dirac trace, more than 25 digits"

static bh_particle particle(const char *name)
{
    bh_particle out;
    ck_assert(bh_particle_find(name, &out));
    return out;
}

static bh_atomic_event at(const char *name, double kinetic, bh_atomic_seen seen, double angle)
{
    const bh_particle beam = particle(name);
    bh_atomic_event out;
    ck_assert_int_eq(bh_atomic_electron(&beam, kinetic, seen, angle, &out), BH_OK);
    return out;
}

static void close_to(double got, double want, double tolerance, const char *source)
{
    ck_assert_msg(fabs(got / want - 1.0) <= tolerance, "%.13g, want %.13g: %s", got, want, source);
}

/* The event with the scattered one of equal masses at `degrees` in the centre of mass. */
static bh_event centre(double kinetic, double degrees)
{
    const bh_collision in = {ME, ME, kinetic};
    const double half = sin(0.5 * degrees * D), q2 = 2.0 * ME * kinetic * half * half;
    bh_event e;
    ck_assert_int_eq(bh_kinematics_q2(&in, q2, &e, NULL), BH_OK);
    return e;
}

START_TEST(moller_rows)
{
    static const struct {
        double energy, degrees, centre, lab_degrees, out, lab; /* [MeV] [nb/sr] [b/sr] */
    } rows[] = {
        {1000, 60, 381039.673714, 1.0571260851, 750.127749738, 0.839742920136},
        {2200, 90, 82996.9721749, 1.23457830809, 1100.25549948, 0.17882913338},
        {2200, 60, 173184.083699, 0.712857667695, 1650.12774974, 0.839198844576},
        {11000, 60, 34634.7193144, 0.318842418133, 8250.12774974, 0.838836307351},
    };
    const bh_particle electron = particle("electron");
    const double kinetic = rows[_i].energy - ME;
    const bh_event e = centre(kinetic, rows[_i].degrees);
    close_to(bh_atomic_centre_of_mass(&electron, &e) / NB, rows[_i].centre, 1e-10, SPINOR);
    close_to(e.scattered_angle / D, rows[_i].lab_degrees, 1e-10, SPINOR);
    const bh_atomic_event lab = at("electron", kinetic, BH_ATOMIC_SCATTERED, e.scattered_angle);
    close_to(lab.kinetic + ME, rows[_i].out, 1e-10, SPINOR);
    close_to(lab.cross_section / B, rows[_i].lab, 1e-9, SPINOR);
}
END_TEST

START_TEST(bhabha_rows)
{
    static const struct {
        double energy, degrees, centre; /* [MeV] [deg] [nb/sr] */
    } rows[] = {{500, 90, 91288.8314091},
                {500, 60, 428876.701474},
                {2200, 90, 20749.2435418},
                {2200, 60, 97423.0140709}};
    const bh_particle positron = particle("positron");
    const bh_event e = centre(rows[_i].energy - ME, rows[_i].degrees);
    close_to(bh_atomic_centre_of_mass(&positron, &e) / NB, rows[_i].centre, 1e-10, SPINOR);
}
END_TEST

/* At high energy 9/4 r_e^2 straight across, in the laboratory. */
START_TEST(ultrarelativistic_limits)
{
    const double kinetic = 1e5;
    const bh_event e = centre(kinetic, 90.0);
    const double got =
        at("electron", kinetic, BH_ATOMIC_SCATTERED, e.scattered_angle).cross_section;
    close_to(got / B, 2.25 * BH_CLASSICAL_R * BH_CLASSICAL_R * 0.01, 1e-4, "9/4 r_e^2");
    const bh_particle positron = particle("positron");
    const double s = e.s, ur = 9.0 * BH_ALPHA * BH_ALPHA / (16.0 * s) * BH_HBARC2_UB * 4.0;
    close_to(bh_atomic_centre_of_mass(&positron, &e), ur, 1e-4, "9 alpha^2 / 4 s");
}
END_TEST

START_TEST(either_electron_is_the_same)
{
    const double kinetic = 300.0, theta = (0.5 + 3.0 * _i) * D;
    const bh_atomic_event a = at("electron", kinetic, BH_ATOMIC_SCATTERED, theta);
    const bh_atomic_event b = at("electron", kinetic, BH_ATOMIC_STRUCK, theta);
    ck_assert_double_eq(a.cross_section, b.cross_section);
    ck_assert_double_eq(a.momentum, b.momentum);
    close_to(a.kinetic + a.other_kinetic, kinetic, 1e-12, "energy");
    /* as many at the angle of the partner, per interval of energy: dN/dT symmetric */
    const bh_collision in = {ME, ME, kinetic};
    bh_event e;
    ck_assert_int_eq(bh_kinematics_scattered(&in, theta, BH_BRANCH_FAST, &e, NULL), BH_OK);
    const bh_atomic_event c = at("electron", kinetic, BH_ATOMIC_SCATTERED, e.recoil_angle);
    close_to(c.kinetic, a.other_kinetic, 1e-9, "partner");
    close_to(c.cross_section / a.cross_section, e.scattered_per_recoil, 1e-9, "solid angles");
}
END_TEST

START_TEST(struck_and_scattered_count_the_same_events)
{
    static const struct {
        const char *beam;
        double kinetic, degrees;
    } rows[] = {{"positron", 50.0, 5.0}, {"positron", 50.0, 30.0}, {"muon-", 2000.0, 4.0},
                {"muon+", 2000.0, 60.0}, {"muon-", 150.0, 20.0},   {"positron", 3.0, 50.0}};
    const bh_particle beam = particle(rows[_i].beam);
    const bh_collision in = {beam.mass, ME, rows[_i].kinetic};
    bh_event e;
    ck_assert_int_eq(bh_kinematics_recoil(&in, rows[_i].degrees * D, &e, NULL), BH_OK);
    const bh_atomic_event s =
        at(rows[_i].beam, rows[_i].kinetic, BH_ATOMIC_STRUCK, rows[_i].degrees * D);
    const double scattered = bh_atomic_centre_of_mass(&beam, &e) * e.cm_per_lab;
    close_to(s.cross_section, scattered * e.scattered_per_recoil, 1e-9, "jacobians");
    close_to(s.kinetic + s.other_kinetic, rows[_i].kinetic, 1e-12, "energy");
}
END_TEST

/* A muon on an electron is Rosenbluth with two points. */
START_TEST(muons_agree_with_one_photon)
{
    const bh_particle muon = particle(_i ? "muon+" : "muon-");
    const bh_collision in = {muon.mass, ME, 5000.0};
    const double theta = 0.6 * bh_kinematics_largest_angle(&in);
    for (int slow = 0; slow < 2; slow++) {
        bh_event e;
        ck_assert_int_eq(bh_kinematics_scattered(&in, theta, (bh_branch)slow, &e, NULL), BH_OK);
        const bh_atomic_event got =
            at(muon.name, 5000.0, slow ? BH_ATOMIC_SCATTERED_SLOW : BH_ATOMIC_SCATTERED, theta);
        close_to(got.cross_section,
                 bh_one_photon(&in, &e, (bh_vertex){1.0, 1.0}, (bh_vertex){1.0, 1.0}), 1e-8,
                 "one photon");
    }
}
END_TEST

START_TEST(charges_differ_and_agree_forward)
{
    const double forward = at("positron", 500.0, BH_ATOMIC_SCATTERED, 0.05 * D).cross_section /
                           at("electron", 500.0, BH_ATOMIC_SCATTERED, 0.05 * D).cross_section;
    ck_assert_double_eq_tol(forward, 1.0, 0.01);
    const double wide = at("positron", 500.0, BH_ATOMIC_SCATTERED, 3.0 * D).cross_section /
                        at("electron", 500.0, BH_ATOMIC_SCATTERED, 3.0 * D).cross_section;
    ck_assert_double_lt(wide, 0.5);
}
END_TEST

START_TEST(ends)
{
    ck_assert(isinf(at("positron", 100.0, BH_ATOMIC_SCATTERED, 0.0).cross_section));
    ck_assert_double_lt(at("electron", 100.0, BH_ATOMIC_SCATTERED, 0.5 * BH_PI).kinetic, 1e-9);
    for (int i = 0; i < 2; i++) { /* soft electrons: as 1 / cos^3 */
        const char *beam = i ? "muon-" : "electron";
        const double far = at(beam, 100.0, BH_ATOMIC_STRUCK, 89.8 * D).cross_section;
        const double near = at(beam, 100.0, BH_ATOMIC_STRUCK, 89.9 * D).cross_section;
        ck_assert_double_eq_tol(near / far, 8.0, 0.01);
        ck_assert_double_gt(at(beam, 100.0, BH_ATOMIC_STRUCK, 0.5 * BH_PI).cross_section, near);
    }
    for (double t = 1.0; t < 90.0; t += 1.0) {
        ck_assert(at("electron", 100.0, BH_ATOMIC_SCATTERED, t * D).cross_section > 0.0);
        ck_assert(at("positron", 100.0, BH_ATOMIC_STRUCK, t * D).cross_section > 0.0);
    }
}
END_TEST

START_TEST(refusals)
{
    static const struct {
        const char *beam;
        double kinetic, degrees;
        bh_atomic_seen seen;
    } rows[] = {
        {"proton", 100.0, 10.0, BH_ATOMIC_STRUCK},
        {"electron", -1.0, 10.0, BH_ATOMIC_SCATTERED},
        {"electron", (double)NAN, 10.0, BH_ATOMIC_SCATTERED},
        {"electron", 100.0, (double)NAN, BH_ATOMIC_SCATTERED},
        {"electron", 100.0, 91.0, BH_ATOMIC_SCATTERED},
        {"positron", 100.0, 91.0, BH_ATOMIC_STRUCK},
        {"positron", 100.0, 10.0, BH_ATOMIC_SCATTERED_SLOW},
        {"muon-", 100.0, 1.0, BH_ATOMIC_SCATTERED},
    };
    const bh_particle beam = particle(rows[_i].beam);
    bh_atomic_event out = {.momentum = 77.0};
    ck_assert_int_eq(
        bh_atomic_electron(&beam, rows[_i].kinetic, rows[_i].seen, rows[_i].degrees * D, &out),
        BH_EDOMAIN);
    ck_assert_double_eq(out.momentum, 77.0);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("atomic electrons");
    tcase_add_loop_test(tests, moller_rows, 0, 4);
    tcase_add_loop_test(tests, bhabha_rows, 0, 4);
    tcase_add_test(tests, ultrarelativistic_limits);
    tcase_add_loop_test(tests, either_electron_is_the_same, 0, 20);
    tcase_add_loop_test(tests, struck_and_scattered_count_the_same_events, 0, 6);
    tcase_add_loop_test(tests, muons_agree_with_one_photon, 0, 2);
    tcase_add_test(tests, charges_differ_and_agree_forward);
    tcase_add_test(tests, ends);
    tcase_add_loop_test(tests, refusals, 0, 8);
    return run_suite("atomic electrons", tests);
}
