/* test_kinematics.c - elastic events against a table in extended precision, laws, inverse problems,
 * refusals. */
#include "../suite.h"

#include <math.h>
#include <stddef.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/physics/kinematics.h"
#include "beamhours/units/constants.h"

#define ME  BH_MASS_ELECTRON
#define MMU BH_MASS_MUON
#define MP  BH_MASS_PROTON
#define MA  BH_MASS_ALPHA
#define D   BH_DEGREE

static const size_t column[] = {
    offsetof(bh_event, scattered_kinetic),
    offsetof(bh_event, scattered_momentum),
    offsetof(bh_event, recoil_angle),
    offsetof(bh_event, recoil_kinetic),
    offsetof(bh_event, recoil_momentum),
    offsetof(bh_event, s),
    offsetof(bh_event, u),
    offsetof(bh_event, q2),
    offsetof(bh_event, transverse2),
    offsetof(bh_event, epsilon),
    offsetof(bh_event, cm_per_lab),
    offsetof(bh_event, scattered_per_recoil),
};

static double get(const bh_event *e, size_t offset)
{
    double value;
    memcpy(&value, (const char *)e + offset, sizeof value);
    return value;
}

static bh_event must_scatter(const bh_collision *in, double angle, bh_branch branch)
{
    bh_event e;
    bh_error err = {0};
    ck_assert_msg(bh_kinematics_scattered(in, angle, branch, &e, &err) == BH_OK, "%s", err.text);
    return e;
}

/* A row of the table: its event, then each number within 1e-12 times its condition number. */
static void compare_row(int line, char *text, double *worst)
{
    char *at = text;
    double in[4];
    for (int i = 0; i < 4; i++, at++)
        in[i] = strtod(at, &at);
    const bh_branch branch = strncmp(at, "slow", 4) == 0 ? BH_BRANCH_SLOW : BH_BRANCH_FAST;
    at += 4;
    const bh_collision c = {in[0], in[1], in[2]};
    const bh_event e = must_scatter(&c, in[3], branch);
    for (int i = 0; i < COUNT(column); i++) {
        const double want = strtod(at + 1, &at), condition = strtod(at + 1, &at);
        const double miss = fabs(get(&e, column[i]) / want - 1.0) / fmax(condition, 1.0);
        *worst = fmax(*worst, miss);
        ck_assert_msg(miss <= 1e-14,
                      "line %d, column %d: %.17g, want %.17g, off by %.1e times the condition "
                      "number %.3g; source: four-momentum conservation solved by mpmath",
                      line, i, get(&e, column[i]), want, miss, condition);
    }
    ck_assert_int_eq(*at, '\n');
}

START_TEST(reproduces_table)
{
    FILE *file = fopen("tests/physics/kinematics_rows.csv", "r");
    ck_assert_ptr_nonnull(file);
    char text[2048];
    double worst = 0.0;
    int line = 0, rows = 0;
    while (fgets(text, sizeof text, file)) {
        if (++line <= 2) /* source and heading */
            continue;
        compare_row(line, text, &worst);
        rows++;
    }
    ck_assert_int_eq(fclose(file), 0);
    ck_assert_int_ge(rows, 90);
    ck_assert_msg(worst > 0.0, "%d rows and no rounding at all: is anything compared?", rows);
}
END_TEST

#define FORM "closed form, mpmath 30 digits"
#define SPIN "closed form = explicit 4x4 Dirac spinor sum"

/* Independent computations to 12 digits: energies in MeV, epsilon as printed. */
static const struct {
    double mass, momentum, degrees;
    double energy_out, q2, epsilon;
    double recoil_degrees; /* 0: not given */
    const char *source;
} checks[] = {
    {0.0, 1000.0, 30.0, 875.052450141, 0.23446959735, 0.867186448657, 61.0343109472, FORM},
    {0.0, 855.0, 90.0, 447.351320076, 0.764970757331, 0.291165956654, 27.6193703943, FORM},
    {0.0, 11000.0, 12.5, 8607.88587316, 4.48890783989, 0.948256258678, 35.6644802291, FORM},
    {MMU, 210.0, 60.0, 214.168403715, 0.039245868451, 0.82575577254, 0.0, SPIN},
    {MMU, 210.0, 20.0, 232.288987704, 0.0052417920486, 1.19122279426, 0.0, SPIN},
    {MMU, 115.0, 100.0, 142.344572761, 0.0259417624566, 0.896355332008, 0.0, SPIN},
    {MMU, 115.0, 20.0, 155.326906298, 0.00157984003018, 1.76969428506, 0.0, SPIN},
    {ME, 210.0, 60.0, 188.865201348, 0.0396615500537, 0.597314282463, 0.0, SPIN},
    {MMU, 1e5, 0.3, 99854.1175698, 0.273754825147, 0.999986431627, 0.0, SPIN},
    {MMU, 1.6e5, 0.2, 159833.947917, 0.311604070386, 0.999993843742, 0.0, SPIN},
};

START_TEST(reproduces_independent_computations)
{
    const double m = checks[_i].mass, p = checks[_i].momentum;
    /* The two last rows give the total energy. */
    const double total = p >= 1e5 ? p : sqrt(p * p + m * m);
    const bh_collision in = {m, MP, total - m};
    const bh_event e = must_scatter(&in, checks[_i].degrees * D, BH_BRANCH_FAST);
    const char *source = checks[_i].source;
    ck_assert_msg(fabs((e.scattered_kinetic + m) / checks[_i].energy_out - 1.0) < 1e-11, "%s",
                  source);
    ck_assert_msg(fabs(e.q2 * 1e-6 / checks[_i].q2 - 1.0) < 1e-11, "%s", source);
    ck_assert_msg(fabs(e.epsilon / checks[_i].epsilon - 1.0) < 1e-11, "epsilon %.12g: %s",
                  e.epsilon, source);
    if (checks[_i].recoil_degrees > 0.0)
        ck_assert_msg(fabs(e.recoil_angle / D / checks[_i].recoil_degrees - 1.0) < 1e-11, "%s",
                      source);
}
END_TEST

/* Kinematic factors of backscattering, E'/E at 170 degrees; atomic masses in u as tabulated for
 * the calculation (C N O Al principal isotope), nonrelativistic: hence the tolerance. */
#define KFACTOR "K = E'/E at 170 deg, own nonrelativistic calculation with atomic masses"
#define PRINTED "K = E'/E at 170 deg, as printed in tables of backscattering (from memory)"
static const struct {
    double mass, target, want, tolerance;
    const char *source;
} factors[] = {
    {1.00782503, 12.0, 0.7159228234, 1e-6, KFACTOR},
    {1.00782503, 14.00307400, 0.7511134934, 1e-6, KFACTOR},
    {1.00782503, 15.99491462, 0.7784456187, 1e-6, KFACTOR},
    {1.00782503, 26.9815384, 0.8621343431, 1e-6, KFACTOR},
    {1.00782503, 28.0855, 0.8671805919, 2e-6, KFACTOR},
    {1.00782503, 47.867, 0.9198069342, 2e-6, KFACTOR},
    {1.00782503, 55.845, 0.9308596177, 2e-6, KFACTOR},
    {1.00782503, 63.546, 0.9389786724, 2e-6, KFACTOR},
    {1.00782503, 107.8682, 0.9635897334, 2e-6, KFACTOR},
    {1.00782503, 196.966570, 0.9798932567, 2e-6, KFACTOR},
    {4.002602, 12.0, 0.2523022849, 1e-5, KFACTOR},
    {4.002602, 14.00307400, 0.3111688800, 1e-5, KFACTOR},
    {4.002602, 15.99491462, 0.3623742424, 1e-5, KFACTOR},
    {4.002602, 26.9815384, 0.5525082075, 1e-5, KFACTOR},
    {4.002602, 28.0855, 0.5657313484, 1e-5, KFACTOR},
    {4.002602, 47.867, 0.7169715995, 1e-5, KFACTOR},
    {4.002602, 55.845, 0.7520079708, 1e-5, KFACTOR},
    {4.002602, 63.546, 0.7785126290, 1e-5, KFACTOR},
    {4.002602, 28.0855, 0.5657, 1e-4, PRINTED},
    {4.002602, 107.8682, 0.8629777196, 1e-5, KFACTOR},
    {4.002602, 196.966570, 0.9224900716, 1e-5, KFACTOR},
    {4.002602, 12.0, 0.2526, 2e-3, PRINTED},
    {4.002602, 14.00307400, 0.3112, 2e-3, PRINTED},
    {4.002602, 15.99491462, 0.3625, 1e-3, PRINTED},
    {4.002602, 26.9815384, 0.5525, 1e-4, PRINTED},
    {4.002602, 196.966570, 0.9225, 1e-4, PRINTED},
};

START_TEST(reproduces_kinematic_factors)
{
    const bh_collision in = {factors[_i].mass * BH_MASS_U, factors[_i].target * BH_MASS_U, 1e-3};
    const bh_event e = must_scatter(&in, 170.0 * D, BH_BRANCH_FAST);
    const double got = e.scattered_kinetic / in.kinetic;
    ck_assert_msg(fabs(got / factors[_i].want - 1.0) < factors[_i].tolerance,
                  "row %d: %.10g, want %.10g: %s", _i, got, factors[_i].want, factors[_i].source);
}
END_TEST

START_TEST(symmetric_angle_of_equal_masses)
{
    /* tan^2 = 2 m / (E + m); 1.29 deg published for 2.01 GeV: arXiv:1312.1730, abstract. */
    const bh_collision in = {ME, ME, 2010.0 - ME};
    const double angle = atan(sqrt(2.0 * ME / (2010.0 + ME)));
    const bh_event e = must_scatter(&in, angle, BH_BRANCH_FAST);
    ck_assert_double_eq_tol(angle / D, 1.29, 0.005);
    ck_assert_double_eq_tol(e.recoil_angle, angle, 1e-14);
    ck_assert_double_eq_tol(e.recoil_kinetic, e.scattered_kinetic, 1e-10);
}
END_TEST

/* A small generator, so that every run sees the same inputs. */
static double uniform(unsigned long long *state)
{
    *state = *state * 6364136223846793005ULL + 1442695040888963407ULL;
    return (double)(*state >> 11) * 0x1p-53;
}

static bh_collision random_collision(unsigned long long *state)
{
    static const double masses[] = {0.0, ME, MMU, 139.57, MP, 1875.6, MA, 11174.9, 193687.0};
    const double m = masses[(int)(9.0 * uniform(state))];
    const double M = masses[1 + (int)(8.0 * uniform(state))];
    return (bh_collision){m, M, pow(10.0, -3.0 + 9.0 * uniform(state))};
}

START_TEST(laws_over_random_inputs)
{
    unsigned long long state = 20240611;
    for (int i = 0; i < 20000; i++) {
        const bh_collision in = random_collision(&state);
        const double largest = bh_kinematics_largest_angle(&in), angle = largest * uniform(&state);
        const bh_branch branch = in.mass > in.target && i % 2 ? BH_BRANCH_SLOW : BH_BRANCH_FAST;
        const bh_event e = must_scatter(&in, angle, branch);
        const double m2 = in.mass * in.mass, M2 = in.target * in.target;
        ck_assert_double_eq_tol(e.s + e.t + e.u, 2.0 * (m2 + M2), 1e-14 * (e.s + m2 + M2));
        ck_assert_double_eq_tol(e.scattered_kinetic + e.recoil_kinetic, in.kinetic,
                                1e-14 * (in.kinetic + in.mass));
        ck_assert_double_eq_tol(e.scattered_momentum * sin(angle),
                                e.recoil_momentum * sin(e.recoil_angle), 1e-13 * e.beam_momentum);
        ck_assert_double_eq_tol(e.scattered_momentum * cos(angle) +
                                    e.recoil_momentum * cos(e.recoil_angle),
                                e.beam_momentum, 1e-13 * e.beam_momentum);
        /* (s - u)^2 and epsilon as their definitions have them */
        const double P2 = 4.0 * M2 + e.q2, su2 = (e.s - e.u) * (e.s - e.u);
        ck_assert_double_eq_tol(4.0 * P2 * (e.transverse2 + m2 + 0.25 * e.q2), su2,
                                1e-13 * (su2 + e.s * fabs(e.s - e.u)));
        const double A = su2 - e.q2 * P2, all = A + 2.0 * P2 * (e.q2 - 2.0 * m2);
        ck_assert_double_eq_tol(e.epsilon * all, A,
                                1e-13 * (1.0 + e.epsilon) *
                                    (e.s * fabs(e.s - e.u) + su2 + P2 * m2));
    }
}
END_TEST

START_TEST(recoil_and_q2_give_the_same_event)
{
    unsigned long long state = 77;
    for (int i = 0; i < 20000; i++) {
        const bh_collision in = random_collision(&state);
        const double angle = bh_kinematics_largest_angle(&in) * (0.001 + 0.99 * uniform(&state));
        const bh_branch branch = in.mass > in.target && i % 2 ? BH_BRANCH_SLOW : BH_BRANCH_FAST;
        const bh_event e = must_scatter(&in, angle, branch);
        bh_event r, q;
        bh_error err = {0};
        ck_assert_msg(bh_kinematics_recoil(&in, e.recoil_angle, &r, &err) == BH_OK, "%s", err.text);
        const double q2 = fmin(e.q2, bh_kinematics_largest_q2(&in));
        ck_assert_msg(bh_kinematics_q2(&in, q2, &q, &err) == BH_OK, "%s", err.text);
        /* near head-on and near forward the other variable fixes the event only to its square */
        const double loose = 1e-13 / fmin(fabs(cos(e.recoil_angle)), 1.0);
        ck_assert_double_eq_tol(r.q2, e.q2, 4.0 * loose * e.q2);
        ck_assert_double_eq_tol(q.q2, e.q2, 1e-14 * e.q2);
        ck_assert_double_eq_tol(r.scattered_momentum, e.scattered_momentum,
                                4.0 * loose * e.beam_momentum);
        ck_assert_double_eq_tol(q.scattered_momentum, e.scattered_momentum,
                                1e-13 * e.beam_momentum);
        ck_assert_double_eq_tol(r.s + r.t + r.u, e.s + e.t + e.u, 1e-13 * e.s);
    }
}
END_TEST

START_TEST(equal_masses_exchange_roles)
{
    unsigned long long state = 4;
    for (int i = 0; i < 2000; i++) {
        const bh_collision in = {MP, MP, pow(10.0, -3.0 + 9.0 * uniform(&state))};
        const bh_event e = must_scatter(&in, 1.5 * uniform(&state) + 0.01, BH_BRANCH_FAST);
        const bh_event x = must_scatter(&in, e.recoil_angle, BH_BRANCH_FAST);
        ck_assert_double_eq_tol(x.recoil_angle, e.scattered_angle, 1e-11 * e.scattered_angle);
        ck_assert_double_eq_tol(x.scattered_kinetic, e.recoil_kinetic, 1e-10 * e.recoil_kinetic);
        ck_assert_double_eq_tol(x.t, e.u, 1e-10 * e.s);
        ck_assert_double_eq_tol(x.scattered_per_recoil * e.scattered_per_recoil, 1.0, 1e-9);
    }
}
END_TEST

/* cos(a) - cos(b), to all digits */
static double fall(double a, double b)
{
    return 2.0 * sin(0.5 * (a + b)) * sin(0.5 * (b - a));
}

START_TEST(jacobians_are_derivatives)
{
    unsigned long long state = 9;
    for (int i = 0; i < 3000; i++) {
        const bh_collision in = random_collision(&state);
        const double angle = bh_kinematics_largest_angle(&in) * (0.05 + 0.85 * uniform(&state));
        const double h = 1e-5 * angle;
        const bh_event e = must_scatter(&in, angle, BH_BRANCH_FAST);
        const bh_event a = must_scatter(&in, angle - h, BH_BRANCH_FAST);
        const bh_event b = must_scatter(&in, angle + h, BH_BRANCH_FAST);
        const double p = e.beam_momentum, M = in.target;
        const double solid = fall(a.scattered_angle, b.scattered_angle);
        const double star = (b.q2 - a.q2) * e.s / (2.0 * p * p * M * M); /* of cos(theta*) */
        const double recoil = fall(b.recoil_angle, a.recoil_angle);
        const double rounding = 1e-15 * (e.q2 / (b.q2 - a.q2) + angle / h +
                                         e.recoil_angle / (a.recoil_angle - b.recoil_angle));
        ck_assert_double_eq_tol(star / solid / e.cm_per_lab, 1.0, 1e-6 + rounding);
        ck_assert_double_eq_tol(solid / recoil / e.scattered_per_recoil, 1.0, 1e-6 + rounding);
    }
}
END_TEST

START_TEST(inverse_problems_come_back)
{
    unsigned long long state = 31;
    for (int i = 0; i < 5000; i++) {
        bh_collision in = random_collision(&state);
        const double angle = bh_kinematics_largest_angle(&in) * (0.01 + 0.95 * uniform(&state));
        const bh_event e = must_scatter(&in, angle, BH_BRANCH_FAST);
        const double T = in.kinetic;
        double got = 0.0;
        bh_error err = {0};
        if (T > 2e-3 && T < 9e5) {
            ck_assert_msg(bh_kinematics_energy(&in, e.q2, angle, &got, &err) == BH_OK, "%s",
                          err.text);
            /* close to the largest angle the energy hardly matters */
            ck_assert_double_eq_tol(got, T, (in.mass > in.target ? 1e-9 : 1e-12) * T);
        }
        if (T < 2e-3 || T > 9e5 || in.mass >= in.target)
            continue;
        const double spread = fabs(1.0 - e.epsilon); /* at epsilon 1 any energy would do */
        if (spread > 1e-3) {
            ck_assert_msg(bh_kinematics_energy_epsilon(&in, e.q2, e.epsilon, &got, &err) == BH_OK,
                          "%s", err.text);
            ck_assert_double_eq_tol(got, T, 1e-9 * T);
        }
        bh_event back;
        ck_assert_msg(bh_kinematics_epsilon(&in, e.epsilon, &back, &err) == BH_OK, "%s", err.text);
        ck_assert_double_eq_tol(back.epsilon, e.epsilon, 1e-12 * fmax(e.epsilon, 0.1));
        const double m = in.mass, forward = 1.0 + m * m / (e.beam_momentum * e.beam_momentum);
        if (fabs(forward - e.epsilon) > 1e-3 * e.epsilon)
            ck_assert_double_eq_tol(back.q2, e.q2, 1e-9 * e.q2);
    }
}
END_TEST

START_TEST(energy_from_angle_and_epsilon)
{
    unsigned long long state = 5;
    for (int i = 0; i < 300; i++) {
        const bh_collision in = {i % 2 ? MMU : ME, MP, pow(10.0, 1.0 + 3.0 * uniform(&state))};
        const double angle = (20.0 + 150.0 * uniform(&state)) * D;
        const bh_event e = must_scatter(&in, angle, BH_BRANCH_FAST);
        double got = 0.0;
        bh_error err = {0};
        ck_assert_msg(bh_kinematics_energy_angle_epsilon(&in, angle, e.epsilon, &got, &err) ==
                          BH_OK,
                      "%s", err.text);
        /* slow massive and fast massless ends are flat: judge by epsilon */
        const bh_collision again = {in.mass, in.target, got};
        const bh_event back = must_scatter(&again, angle, BH_BRANCH_FAST);
        ck_assert_double_eq_tol(back.epsilon, e.epsilon, 1e-13 * e.epsilon);
    }
}
END_TEST

START_TEST(ends_of_the_range)
{
    const bh_collision ep = {ME, MP, 855.0}, pp = {MP, MP, 100.0}, ap = {MA, MP, 20.0};
    bh_event e = must_scatter(&ep, 0.0, BH_BRANCH_FAST);
    ck_assert(e.q2 == 0.0 && e.recoil_kinetic == 0.0 && e.recoil_momentum == 0.0);
    ck_assert(e.scattered_per_recoil == 0.0);
    ck_assert_double_eq_tol(e.recoil_angle, BH_PI / 2.0, 1e-15);
    ck_assert_double_eq_tol(e.scattered_kinetic, 855.0, 1e-12);
    ck_assert_double_eq_tol(e.epsilon, pow(e.beam_energy / e.beam_momentum, 2.0), 1e-15);
    e = must_scatter(&ep, BH_PI, BH_BRANCH_FAST);
    ck_assert_double_eq_tol(e.q2, bh_kinematics_largest_q2(&ep), 1e-9);
    ck_assert_double_eq_tol(e.recoil_angle, 0.0, 1e-15);
    bh_error err = {0};
    ck_assert_int_eq(bh_kinematics_q2(&ep, bh_kinematics_largest_q2(&ep), &e, &err), BH_OK);
    ck_assert_double_eq_tol(e.scattered_angle, BH_PI, 1e-7);
    ck_assert_int_eq(bh_kinematics_q2(&ep, 0.0, &e, &err), BH_OK);
    ck_assert(e.scattered_angle == 0.0 && e.scattered_per_recoil == 0.0);
    /* equal masses, head on: the struck one takes all, the other is left at rest */
    ck_assert_int_eq(bh_kinematics_recoil(&pp, 0.0, &e, &err), BH_OK);
    ck_assert_double_eq_tol(e.recoil_kinetic, 100.0, 1e-12);
    ck_assert(e.scattered_kinetic == 0.0 && isinf(e.scattered_per_recoil) && e.cm_per_lab == 0.0);
    ck_assert_double_eq_tol(e.scattered_angle, BH_PI / 2.0, 1e-15);
    e = must_scatter(&pp, bh_kinematics_largest_angle(&pp), BH_BRANCH_FAST);
    ck_assert_double_eq_tol(e.scattered_kinetic, 0.0, 1e-25);
    /* heavier beam: the two solutions meet at the largest angle, and are apart before */
    const double largest = bh_kinematics_largest_angle(&ap);
    e = must_scatter(&ap, largest, BH_BRANCH_FAST);
    bh_event slow = must_scatter(&ap, largest, BH_BRANCH_SLOW);
    ck_assert_double_eq_tol(e.q2, slow.q2, 1e-6 * e.q2);
    ck_assert_int_eq(bh_kinematics_recoil(&ap, 0.0, &e, &err), BH_OK);
    slow = must_scatter(&ap, 0.0, BH_BRANCH_SLOW);
    ck_assert_double_eq_tol(e.q2, slow.q2, 1e-13 * e.q2);
    ck_assert_int_eq(bh_kinematics_branches(&ap, largest), 1);
    ck_assert_int_eq(bh_kinematics_branches(&ap, 0.1), 2);
    ck_assert_int_eq(bh_kinematics_branches(&ap, 0.3), 0);
    ck_assert_int_eq(bh_kinematics_branches(&ep, 3.0), 1);
    ck_assert_int_eq(bh_kinematics_branches(&pp, 1.58), 0);
    ck_assert_int_eq(bh_kinematics_branches(&ep, (double)NAN), 0);
}
END_TEST

START_TEST(batch_is_the_same)
{
    const bh_collision in = {MMU, MP, 94.5};
    double angle[50];
    bh_event got[50];
    for (int i = 0; i < 50; i++)
        angle[i] = i * BH_PI / 49.0;
    angle[49] = BH_PI;
    bh_kinematics_batch(&in, 50, angle, BH_BRANCH_FAST, got);
    for (int i = 0; i < 50; i++) {
        const bh_event one = must_scatter(&in, angle[i], BH_BRANCH_FAST);
        ck_assert(isnan(got[i].recoil_angle)); /* left out */
        got[i].recoil_angle = one.recoil_angle;
        ck_assert_mem_eq(&one, &got[i], sizeof one);
    }
}
END_TEST

typedef enum { SCATTERED, SLOW, RECOIL, Q2, EPSILON, ENERGY, ENERGY_EPSILON, BOTH } question;

static bh_code ask(question q, const bh_collision *in, const double x[2], bh_event *e,
                   double *kinetic, bh_error *err)
{
    switch (q) {
    case SCATTERED:
        return bh_kinematics_scattered(in, x[0], BH_BRANCH_FAST, e, err);
    case SLOW:
        return bh_kinematics_scattered(in, x[0], BH_BRANCH_SLOW, e, err);
    case RECOIL:
        return bh_kinematics_recoil(in, x[0], e, err);
    case Q2:
        return bh_kinematics_q2(in, x[0], e, err);
    case EPSILON:
        return bh_kinematics_epsilon(in, x[0], e, err);
    case ENERGY:
        return bh_kinematics_energy(in, x[0], x[1], kinetic, err);
    case ENERGY_EPSILON:
        return bh_kinematics_energy_epsilon(in, x[0], x[1], kinetic, err);
    default:
        return bh_kinematics_energy_angle_epsilon(in, x[0], x[1], kinetic, err);
    }
}

#define NOT_A_NUMBER ((double)NAN)
static const struct {
    question q;
    bh_collision in;
    double x[2];
    const char *words; /* that the sentence must hold */
} refused[] = {
    {SCATTERED, {-1.0, MP, 855.0}, {0.5, 0}, "masses -1 and 938.272 MeV: need beam 0 to 1e6"},
    {SCATTERED, {ME, 0.0, 855.0}, {0.5, 0}, "target 0.1 to 1e6"},
    {SCATTERED, {ME, 2e6, 855.0}, {0.5, 0}, "target 0.1 to 1e6"},
    {SCATTERED, {NOT_A_NUMBER, MP, 855.0}, {0.5, 0}, "masses"},
    {SCATTERED, {ME, MP, 0.0}, {0.5, 0}, "0 MeV: 0.001 to 1e+06 MeV would do"},
    {SCATTERED, {ME, MP, 1.1e6}, {0.5, 0}, "1.1e+06 MeV: 0.001 to 1e+06 MeV would do"},
    {SCATTERED, {193687.0, MP, 3e8}, {0.001, 0}, "0.001 to 2.0793"},
    {SCATTERED, {ME, MP, NOT_A_NUMBER}, {0.5, 0}, "would do"},
    {SCATTERED, {ME, MP, 855.0}, {-0.1, 0}, "0 to 180 deg would do"},
    {SCATTERED, {ME, MP, 855.0}, {3.15, 0}, "angle 180.482 deg: 0 to 180 deg would do"},
    {SCATTERED, {ME, MP, 855.0}, {NOT_A_NUMBER, 0}, "0 to 180 deg would do"},
    {SCATTERED, {MMU, ME, 1626.0}, {0.1, 0}, "at most 0.2771"},
    {SCATTERED, {MMU, ME, 1626.0}, {0.1, 0}, "angle 5.72958 deg cannot"},
    {SCATTERED, {MP, MP, 100.0}, {1.58, 0}, "at most 90 deg would do"},
    {SLOW, {ME, MP, 855.0}, {0.5, 0}, "needs a beam particle (0.510999 MeV) heavier"},
    {SLOW, {MP, MP, 855.0}, {0.5, 0}, "second, slower solution"},
    {RECOIL, {ME, MP, 855.0}, {1.58, 0}, "recoil angle 90.5273 deg: 0 to 90 deg would do"},
    {RECOIL, {ME, MP, 855.0}, {-0.01, 0}, "0 to 90 deg would do"},
    {RECOIL, {ME, MP, NOT_A_NUMBER}, {0.1, 0}, "would do"},
    {Q2, {ME, MP, 855.0}, {2e6, 0}, "Q2 of 2 GeV2: 0 to 1.036834914 GeV2"},
    {Q2, {ME, MP, 855.0}, {-1.0, 0}, "can be reached"},
    {Q2, {ME, MP, 1e9}, {1.0, 0}, "would do"},
    {EPSILON, {ME, MP, 855.0}, {1.5, 0}, "can be reached"},
    {EPSILON, {ME, MP, 855.0}, {NOT_A_NUMBER, 0}, "can be reached"},
    {EPSILON, {ME, 0.0, 855.0}, {0.5, 0}, "masses"},
    {EPSILON, {MMU, MP, 0.0}, {0.5, 0}, "would do"},
    {EPSILON, {MMU, MP, 50.0}, {0.1, 0}, "epsilon 0.1: 0.5"},
    {ENERGY, {ME, MP, 0.0}, {0.0, 0.5}, "no beam energy"},
    {ENERGY, {ME, MP, 0.0}, {1e5, 0.0}, "Q2 of 0.1 GeV2 at 0 deg"},
    {ENERGY, {ME, MP, 0.0}, {1e5, 4.0}, "0 to 180 deg"},
    {ENERGY, {ME, MP, 0.0}, {1e17, 1.0}, "0.001 to 1e+06 MeV would do"},
    {ENERGY, {ME, -MP, 0.0}, {1e5, 1.0}, "masses"},
    {ENERGY_EPSILON, {ME, MP, 0.0}, {0.0, 0.5}, "no beam energy"},
    {ENERGY_EPSILON, {ME, MP, 0.0}, {1e5, 1.1}, "can be reached"},
    {ENERGY_EPSILON, {ME, MP, 0.0}, {1e5, 1.0}, "can be reached"},
    {ENERGY_EPSILON, {MMU, MP, 0.0}, {1e3, 0.9}, "epsilon 0.9: 1 to 22.327"},
    {ENERGY_EPSILON, {MMU, MP, 0.0}, {1e5, 0.1}, "epsilon 0.1: 0.2232"},
    {ENERGY_EPSILON, {MMU, MP, 0.0}, {NOT_A_NUMBER, 0.5}, "no beam energy"},
    {ENERGY_EPSILON, {MMU, NOT_A_NUMBER, 0.0}, {1e5, 0.5}, "masses"},
    {BOTH, {ME, MP, 0.0}, {0.5, -1.0}, "can be reached"},
    {BOTH, {0.0, MP, 0.0}, {BH_PI / 2, 0.9}, "epsilon 0.9: 0.000"},
    {BOTH, {MA, MP, 0.0}, {0.1, 0.5}, "give an angle or Q2"},
    {BOTH, {ME, MP, 0.0}, {-0.5, 0.5}, "0 to 180 deg"},
    {BOTH, {ME, MP * 1e6, 0.0}, {0.5, 0.5}, "masses"},
};

START_TEST(refuses_and_says_what_would_do)
{
    bh_event e, untouched;
    memset(&e, 0x5a, sizeof e);
    untouched = e;
    double kinetic = -7.0;
    bh_error err = {0};
    const bh_code code = ask(refused[_i].q, &refused[_i].in, refused[_i].x, &e, &kinetic, &err);
    ck_assert_msg(code == BH_EDOMAIN && err.code == BH_EDOMAIN, "row %d let by", _i);
    ck_assert_msg(strstr(err.text, refused[_i].words), "row %d: \"%s\" lacks \"%s\"", _i, err.text,
                  refused[_i].words);
    ck_assert_mem_eq(&e, &untouched, sizeof e);
    ck_assert(kinetic == -7.0);
    ck_assert_int_eq(ask(refused[_i].q, &refused[_i].in, refused[_i].x, &e, &kinetic, NULL),
                     BH_EDOMAIN);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("kinematics");
    tcase_add_test(tests, reproduces_table);
    tcase_add_loop_test(tests, reproduces_independent_computations, 0, COUNT(checks));
    tcase_add_loop_test(tests, reproduces_kinematic_factors, 0, COUNT(factors));
    tcase_add_test(tests, symmetric_angle_of_equal_masses);
    tcase_add_test(tests, laws_over_random_inputs);
    tcase_add_test(tests, recoil_and_q2_give_the_same_event);
    tcase_add_test(tests, equal_masses_exchange_roles);
    tcase_add_test(tests, jacobians_are_derivatives);
    tcase_add_test(tests, inverse_problems_come_back);
    tcase_add_test(tests, energy_from_angle_and_epsilon);
    tcase_add_test(tests, ends_of_the_range);
    tcase_add_test(tests, batch_is_the_same);
    tcase_add_loop_test(tests, refuses_and_says_what_would_do, 0, COUNT(refused));
    return run_suite("physics/kinematics", tests);
}
