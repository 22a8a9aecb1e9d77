/* test_soft_photons.c - closed forms against integrals done by brute force, and their limits. */
#include "../suite.h"

#include <gsl/gsl_errno.h>
#include <gsl/gsl_integration.h>
#include <math.h>

#include "beamhours/physics/soft_photons.h"
#include "beamhours/units/constants.h"

#define ME BH_MASS_ELECTRON
#define MU BH_MASS_MUON
#define MP BH_MASS_PROTON

/* Two momenta in the rest frame of the recoil, by mass, energy and invariant product. */
typedef struct {
    double m, e;
} ray;

typedef struct {
    ray a, b;
    double product;
    double photon; /* ln(2 epsilon / lambda) with lambda = 1 MeV */
    int what;      /* 0 soft photons, 1 K */
} pair;

/* Along the chord the rapidity measured from b: the integrand is smooth in it. */
static double integrand(double phi, void *context)
{
    const pair *x = context;
    const double chi = acosh(x->product / (x->a.m * x->b.m));
    const double sa = sinh(phi) / sinh(chi), sb = sinh(chi - phi) / sinh(chi);
    const double along = sinh(phi) * x->b.m + sinh(chi - phi) * x->a.m;
    const double length = x->a.m * x->b.m * sinh(chi) / along;
    if (x->what)
        return 2.0 * log(length);
    const double e = sa * x->a.e / x->a.m + sb * x->b.e / x->b.m, w2 = e * e - 1.0;
    return x->photon - (w2 > 1e-12 ? e * log(e + sqrt(w2)) / sqrt(w2) : 1.0);
}

static double integral(pair x)
{
    const double chi = acosh(x.product / (x.a.m * x.b.m));
    const double root = x.a.m * x.b.m * sinh(chi);
    if (chi < 1e-7)
        return integrand(0.0, &x);
    gsl_integration_workspace *space = gsl_integration_workspace_alloc(200);
    gsl_function f = {integrand, &x};
    double out, error;
    const int status = gsl_integration_qag(&f, 0.0, chi, 0.0, 1e-12, 200, 6, space, &out, &error);
    ck_assert_msg(status == 0 || error < 1e-9, "%s", gsl_strerror(status));
    gsl_integration_workspace_free(space);
    return x.product / root * out;
}

static const struct {
    double mass, target, kinetic, degrees, cut;
} events[] = {
    {ME, MP, 180.0, 60.0, 5.0},    {ME, MP, 854.5, 2.5, 10.0},   {ME, MP, 5500.0, 25.0, 50.0},
    {MU, MP, 50.5, 60.0, 10.0},    {MU, MP, 130.0, 100.0, 10.0}, {MU, 1875.6, 900.0, 20.0, 10.0},
    {ME, 11175.0, 400.0, 60.0, 2}, {ME, MP, 0.5, 90.0, 0.01},    {MU, MP, 1.0, 120.0, 0.05},
};

static bh_soft soft(int i, bh_event *e)
{
    const bh_collision in = {events[i].mass, events[i].target, events[i].kinetic};
    ck_assert(bh_kinematics_scattered(&in, events[i].degrees * BH_DEGREE, BH_BRANCH_FAST, e,
                                      NULL) == BH_OK);
    return bh_soft_of(&in, e, events[i].cut);
}

/* The momenta before and after of lepton and target, and the energies there. */
typedef struct {
    ray in, out, struck, recoil;
    double photon;
} scene;

static scene scene_of(const bh_soft *x)
{
    const double M = x->target;
    return (scene){.in = {x->mass, x->scattered_energy},
                   .out = {x->mass, x->beam_energy},
                   .struck = {M, M + 0.5 * x->q2 / M},
                   .recoil = {M, M},
                   .photon = log(2.0 * x->slope * x->cut)};
}

static double own(ray a, ray b, double q2, double photon)
{
    const pair ab = {a, b, a.m * a.m + 0.5 * q2, photon, 0};
    const double ea = a.e / a.m, eb = b.e / b.m;
    const double ga = ea > 1.0 ? ea * acosh(ea) / sqrt(ea * ea - 1.0) : 1.0;
    const double gb = eb > 1.0 ? eb * acosh(eb) / sqrt(eb * eb - 1.0) : 1.0;
    return photon - ga + photon - gb - 2.0 * integral(ab);
}

static double k_own(double m, double q2)
{
    const pair x = {{m, m}, {m, m}, m * m + 0.5 * q2, 0.0, 1};
    return integral(x) - 2.0 * log(m);
}

START_TEST(target_against_integrals)
{
    for (int i = 0; i < COUNT(events); i++) {
        bh_event e;
        const bh_soft x = soft(i, &e);
        const scene s = scene_of(&x);
        const double want =
            -BH_ALPHA / BH_PI * (own(s.struck, s.recoil, x.q2, s.photon) + k_own(x.target, x.q2));
        ck_assert_msg(fabs(bh_soft_target(&x) - want) < 2e-10, "%d: %.14g, not %.14g", i,
                      bh_soft_target(&x), want);
    }
}
END_TEST

/* F1 with a photon of 1 MeV, by K: its remaining terms are elementary. */
START_TEST(lepton_against_integrals)
{
    for (int i = 0; i < COUNT(events); i++) {
        bh_event e;
        const bh_soft x = soft(i, &e);
        const scene s = scene_of(&x);
        const double v = sqrt(1.0 + 4.0 * x.mass * x.mass / x.q2);
        const double f1 = (2.0 * v * v + 1.0) / (2.0 * v) * log((v + 1.0) / (v - 1.0)) - 2.0 -
                          k_own(x.mass, x.q2);
        const double want = BH_ALPHA / BH_PI * (f1 - own(s.in, s.out, x.q2, s.photon));
        ck_assert_msg(fabs(bh_soft_lepton(&x) - want) < 2e-10, "%d: %.14g, not %.14g", i,
                      bh_soft_lepton(&x), want);
    }
}
END_TEST

static double crossed(const bh_soft *x, const scene *s, int what)
{
    const double st = x->target * x->beam_energy, ut = x->target * x->scattered_energy;
    const pair p[] = {{s->in, s->struck, st, s->photon, what},
                      {s->out, s->recoil, st, s->photon, what},
                      {s->in, s->recoil, ut, s->photon, what},
                      {s->out, s->struck, ut, s->photon, what}};
    return integral(p[0]) + integral(p[1]) - integral(p[2]) - integral(p[3]);
}

START_TEST(interference_against_integrals)
{
    for (int i = 0; i < COUNT(events); i++) {
        bh_event e;
        const bh_soft x = soft(i, &e);
        scene s = scene_of(&x);
        const double soft_part = -2.0 * crossed(&x, &s, 0), box = crossed(&x, &s, 1);
        s.photon = 0.5 * log(x.q2); /* a soft integral of 1, to scale the infrared part */
        const double q = crossed(&x, &s, 0);
        s.photon = 0.0;
        const double infrared = 2.0 * (q - crossed(&x, &s, 0));
        const double tsai = BH_ALPHA / BH_PI * (soft_part + box);
        const double tjon = BH_ALPHA / BH_PI * (soft_part + infrared);
        ck_assert_msg(fabs(bh_soft_interference_tsai(&x) - tsai) < 3e-10, "%d: %.14g, not %.14g", i,
                      bh_soft_interference_tsai(&x), tsai);
        ck_assert_msg(fabs(bh_soft_interference(&x) - tjon) < 3e-10, "%d: %.14g, not %.14g", i,
                      bh_soft_interference(&x), tjon);
    }
}
END_TEST

/* The exact forms tend to the published ones as (m/E)^2, the lepton of 1 keV to 0.1 MeV. */
START_TEST(light_leptons)
{
    double last_lepton = 1.0, last_between = 1.0;
    for (double m = 1.0; m > 0.01; m *= 0.25) {
        const bh_collision in = {m, MP, 500.0};
        bh_event e;
        ck_assert(bh_kinematics_scattered(&in, 1.0, BH_BRANCH_FAST, &e, NULL) == BH_OK);
        const bh_soft x = bh_soft_of(&in, &e, 5.0);
        const double lepton = fabs(bh_soft_lepton(&x) - bh_soft_lepton_light(&x));
        const double between = fabs(bh_soft_interference(&x) - bh_soft_interference_light(&x));
        ck_assert_double_lt(lepton, 0.2 * last_lepton);
        ck_assert_double_lt(between, 0.2 * last_between);
        last_lepton = lepton;
        last_between = between;
    }
    ck_assert_double_lt(last_lepton, 1e-8);
    ck_assert_double_lt(last_between, 1e-8);
}
END_TEST

/* Across the rapidity 0.5 where the sum over 16 points takes over from dilogarithms. */
START_TEST(quadrature_joins_the_closed_form)
{
    for (int i = 0; i < 2; i++) {
        const double m = i ? MP : MU, q2 = 4.0 * m * m * sinh(0.25) * sinh(0.25);
        const bh_collision in = {MU, MP, 800.0};
        double both[2][2];
        for (int side = 0; side < 2; side++) {
            bh_event e;
            ck_assert(bh_kinematics_q2(&in, q2 * (1.0 + (side ? 1e-9 : -1e-9)), &e, NULL) == BH_OK);
            const bh_soft x = bh_soft_of(&in, &e, 10.0);
            both[side][0] = bh_soft_lepton(&x);
            both[side][1] = bh_soft_target(&x);
        }
        ck_assert_double_eq_tol(both[0][0], both[1][0], 1e-10);
        ck_assert_double_eq_tol(both[0][1], both[1][1], 1e-10);
    }
}
END_TEST

START_TEST(no_momentum_transfer)
{
    const bh_collision in = {MU, MP, 100.0};
    bh_event e;
    ck_assert(bh_kinematics_scattered(&in, 0.0, BH_BRANCH_FAST, &e, NULL) == BH_OK);
    bh_soft x = bh_soft_of(&in, &e, 1.0);
    ck_assert_double_eq(bh_soft_lepton(&x), 0.0);
    ck_assert_double_eq(bh_soft_interference(&x), 0.0);
    ck_assert_double_eq(bh_soft_interference_tsai(&x), 0.0);
    ck_assert_double_eq(bh_soft_target(&x), 0.0);
    ck_assert_double_eq(bh_soft_rate(&x), 0.0);
    for (double angle = 1e-6; angle < 1e-2; angle *= 10.0) {
        ck_assert(bh_kinematics_scattered(&in, angle, BH_BRANCH_FAST, &e, NULL) == BH_OK);
        x = bh_soft_of(&in, &e, 1.0);
        ck_assert_double_lt(fabs(bh_soft_lepton(&x)), 1e-2 * x.q2 / MU / MU + 1e-12);
        ck_assert_double_lt(fabs(bh_soft_interference(&x)), 1e-2 * x.q2 / MU / MU + 1e-12);
        ck_assert_double_lt(fabs(bh_soft_target(&x)), 1e-2 * x.q2 / MU / MU + 1e-12);
    }
}
END_TEST

START_TEST(slope_of_the_logarithm)
{
    for (int i = 0; i < COUNT(events); i++) {
        bh_event e;
        bh_soft x = soft(i, &e);
        const double low = bh_soft_lepton(&x);
        x.cut *= exp(1.0);
        ck_assert_double_eq_tol(bh_soft_lepton(&x) - low, bh_soft_rate(&x), 1e-11);
    }
}
END_TEST

/* Where II.6 divides by what vanishes (a scattered energy of M/2, a beam of M/2). */
START_TEST(mo_tsai_is_smooth)
{
    const double beam[] = {MP, 0.5 * MP, 2.0 * MP};
    for (int i = 0; i < COUNT(beam); i++)
        for (int k = 1; k < 18; k++) {
            bh_soft_parts p[3];
            for (int side = 0; side < 3; side++) {
                const bh_collision in = {0.0, MP, beam[i] * (1.0 + 1e-7 * (side - 1))};
                bh_event e;
                ck_assert(bh_kinematics_scattered(&in, 10.0 * k * BH_DEGREE, BH_BRANCH_FAST, &e,
                                                  NULL) == BH_OK);
                bh_soft x = bh_soft_of(&in, &e, 5.0);
                x.mass = ME;
                p[side] = bh_soft_mo_tsai(&x);
            }
            ck_assert_double_eq_tol(p[1].interference, p[0].interference, 1e-7);
            ck_assert_double_eq_tol(p[1].interference, p[2].interference, 1e-7);
            ck_assert_double_eq_tol(p[1].target, p[2].target, 1e-7);
        }
    bh_soft x = {.mass = ME,
                 .target = MP,
                 .beam_energy = 0.5 * MP,
                 .scattered_energy = 0.25 * MP,
                 .q2 = 0.5 * MP * MP,
                 .slope = 2.0,
                 .cut = 5.0};
    ck_assert(isfinite(bh_soft_mo_tsai(&x).interference)); /* 2 E1 E4 = M E3 nowhere; M = 2 E1 */
    x.scattered_energy = x.beam_energy;
    x.q2 = 0.0;
    ck_assert_double_eq(bh_soft_mo_tsai(&x).target, 0.0);
}
END_TEST

int main(void)
{
    (void)gsl_set_error_handler_off();
    TCase *tests = tcase_create("soft");
    tcase_add_test(tests, target_against_integrals);
    tcase_add_test(tests, lepton_against_integrals);
    tcase_add_test(tests, interference_against_integrals);
    tcase_add_test(tests, light_leptons);
    tcase_add_test(tests, quadrature_joins_the_closed_form);
    tcase_add_test(tests, no_momentum_transfer);
    tcase_add_test(tests, slope_of_the_logarithm);
    tcase_add_test(tests, mo_tsai_is_smooth);
    return run_suite("soft_photons", tests);
}
