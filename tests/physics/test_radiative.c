/* test_radiative.c - the registry of radiative corrections: laws, limits, caveats. */
#include "../suite.h"

#include <math.h>
#include <stdbool.h>
#include <string.h>

#include "beamhours/physics/radiative.h"
#include "beamhours/physics/soft_photons.h"
#include "beamhours/physics/vacuum_polarisation.h"
#include "beamhours/units/constants.h"

static const char *const radiating[] = {"schwinger", "mo-tsai", "maximon-tjon"};
static const char *const leptons[] = {"electron", "positron", "muon-", "muon+"};

typedef struct {
    bh_particle beam;
    bh_encounter x;
    bh_event e;
} meeting;

static void meet(meeting *m, const char *beam, double momentum, double degrees)
{
    ck_assert(bh_particle_find(beam, &m->beam));
    const double mass = m->beam.mass, p = momentum;
    m->x = (bh_encounter){.beam = &m->beam,
                          .charge = m->beam.charge,
                          .z = 1,
                          .a = 1,
                          .target = BH_MASS_PROTON,
                          .kinetic = p * p / (sqrt(p * p + mass * mass) + mass)};
    const bh_collision in = {mass, BH_MASS_PROTON, m->x.kinetic};
    ck_assert(bh_kinematics_scattered(&in, degrees * BH_DEGREE, BH_BRANCH_FAST, &m->e, NULL) ==
              BH_OK);
}

static double factor(const char *name, const meeting *m, double cut)
{
    double out = -1.0;
    bh_radiative_find(name)->factor(&m->x, cut, 1, &m->e, &out);
    return out;
}

START_TEST(grows_with_the_cut)
{
    for (int k = 0; k < COUNT(radiating); k++)
        for (int b = 0; b < COUNT(leptons); b++)
            for (int angle = 5; angle < 180; angle += 25) {
                meeting m;
                meet(&m, leptons[b], 210.0 + 10.0 * angle, angle);
                double last = 0.0;
                ck_assert_double_eq(factor(radiating[k], &m, 0.0), 0.0);
                for (double cut = 1e-6; cut < 2.0 * m.x.kinetic; cut *= 1.5) {
                    const double now = factor(radiating[k], &m, cut);
                    const bool more = now > last || cut > m.e.scattered_kinetic;
                    ck_assert_msg(more && now >= last, "%s %s %d deg: %g after %g at %g MeV",
                                  radiating[k], leptons[b], angle, now, last, cut);
                    last = now;
                }
            }
}
END_TEST

START_TEST(charge_conjugation)
{
    for (int k = 0; k < COUNT(radiating); k++)
        for (int b = 0; b < COUNT(leptons); b += 2) {
            meeting minus, plus;
            meet(&minus, leptons[b], 500.0, 70.0);
            meet(&plus, leptons[b + 1], 500.0, 70.0);
            const bh_radiative *row = bh_radiative_find(radiating[k]);
            const bh_radiative_parts a = row->parts(&minus.x, 5.0, &minus.e);
            const bh_radiative_parts c = row->parts(&plus.x, 5.0, &plus.e);
            ck_assert_double_eq(a.z0, c.z0);
            ck_assert_double_eq(a.z1, -c.z1);
            ck_assert_double_eq(a.z2, c.z2);
            ck_assert_double_eq(a.vacuum, c.vacuum);
            ck_assert(k == 0 ? a.z1 == 0.0 : a.z1 < 0.0); /* fewer electrons, more positrons */
            const double ratio =
                factor(radiating[k], &plus, 5.0) / factor(radiating[k], &minus, 5.0);
            ck_assert_double_eq_tol(log(ratio), 2.0 * c.z1, 1e-14);
        }
}
END_TEST

START_TEST(factor_of_its_parts)
{
    const bh_radiative_parts p = {-0.1, -0.01, -0.001, 0.02};
    ck_assert_double_eq_tol(bh_radiative_combine(&p, 1), exp(-0.111) / (0.99 * 0.99), 1e-15);
    ck_assert_double_eq_tol(bh_radiative_combine(&p, 6), exp(-0.196) / (0.99 * 0.99), 1e-15);
    ck_assert_double_eq_tol(bh_radiative_uncertainty(&p, 6, 0.0), 0.00196, 1e-15);
    ck_assert_double_eq_tol(bh_radiative_uncertainty(&p, 6, 0.03), hypot(0.00196, 0.009), 1e-15);
    ck_assert_double_eq(bh_radiative_uncertainty(&(bh_radiative_parts){0}, 6, 0.03), 0.0);
    meeting m;
    meet(&m, "electron", 855.0, 50.0);
    for (int k = 0; k < COUNT(radiating); k++) {
        const bh_radiative_parts made = bh_radiative_find(radiating[k])->parts(&m.x, 10.0, &m.e);
        ck_assert_double_eq(bh_radiative_combine(&made, 1), factor(radiating[k], &m, 10.0));
        ck_assert_double_eq(made.vacuum, bh_vacuum(m.e.q2));
    }
}
END_TEST

/* Models must agree where they should: on the leading logarithm, and so within 1 % here. */
START_TEST(models_agree)
{
    for (int b = 0; b < COUNT(leptons); b++)
        for (int angle = 10; angle < 90; angle += 20) {
            meeting m;
            meet(&m, leptons[b], 800.0, angle);
            const double tjon = factor("maximon-tjon", &m, 8.0), tsai = factor("mo-tsai", &m, 8.0);
            ck_assert_msg(fabs(tjon / tsai - 1.0) < 0.01, "%s %d deg: %g, %g", leptons[b], angle,
                          tjon, tsai);
        }
}
END_TEST

/* The parts are linear in ln(cut), as soft photons have it, with the slope that the row tells. */
START_TEST(rates_are_slopes)
{
    for (int k = 0; bh_radiative_at(k); k++)
        for (int b = 0; b < COUNT(leptons); b++)
            for (int angle = 2; angle < 180; angle += 22) {
                meeting m;
                meet(&m, leptons[b], 210.0 + 10.0 * angle, angle);
                const bh_radiative *row = bh_radiative_at(k);
                const double cut = 0.8 * m.e.scattered_kinetic, per = 1.0 / log(100.0);
                const bh_radiative_parts high = row->parts(&m.x, cut, &m.e),
                                         low = row->parts(&m.x, cut / 100.0, &m.e),
                                         rate = row->rate(&m.x, cut / 7.0, &m.e);
                const double slope[3] = {(high.z0 - low.z0) * per, (high.z1 - low.z1) * per,
                                         (high.z2 - low.z2) * per};
                const double told[3] = {rate.z0, rate.z1, rate.z2};
                for (int i = 0; i < 3; i++)
                    ck_assert_msg(fabs(told[i] - slope[i]) < 1e-9, "%s %s %d deg, part %d: %g, %g",
                                  row->name, leptons[b], angle, i, told[i], slope[i]);
                ck_assert_double_eq(rate.vacuum, 0.0);
            }
}
END_TEST

START_TEST(batch_is_the_same_event_by_event)
{
    enum { N = 70 };
    meeting m;
    bh_event e[N];
    double angle[N], out[N], single;
    meet(&m, "electron", 855.0, 50.0);
    for (int i = 0; i < N; i++)
        angle[i] = 0.04 * i;
    bh_kinematics_batch(&(bh_collision){m.beam.mass, m.x.target, m.x.kinetic}, N, angle,
                        BH_BRANCH_FAST, e);
    for (int k = 0; bh_radiative_at(k); k++) {
        const bh_radiative *row = bh_radiative_at(k);
        row->factor(&m.x, 10.0, N, e, out);
        ck_assert_double_eq(out[0], 1.0); /* no momentum transfer at angle 0 */
        for (int i = 0; i < N; i++) {
            row->factor(&m.x, 10.0, 1, &e[i], &single);
            ck_assert_double_eq(single, out[i]);
        }
    }
}
END_TEST

START_TEST(what_does_not_radiate)
{
    static const char *const heavy[] = {"proton", "pion+", "alpha", "12C"};
    for (int b = 0; b < COUNT(heavy); b++)
        for (int k = 0; bh_radiative_at(k); k++) {
            meeting m;
            meet(&m, heavy[b], 300.0, 1.0);
            char text[200] = "x";
            const bh_radiative *row = bh_radiative_at(k);
            const bh_radiative_parts p = row->parts(&m.x, 1.0, &m.e);
            ck_assert_double_eq(factor(row->name, &m, 1.0), 1.0);
            ck_assert(p.z0 == 0.0 && p.z1 == 0.0 && p.z2 == 0.0 && p.vacuum == 0.0);
            ck_assert_int_eq(row->caveat(&m.x, 1e9, &m.e, text, sizeof text), 0);
            ck_assert_str_eq(text, "");
        }
}
END_TEST

START_TEST(odd_cuts)
{
    meeting m;
    meet(&m, "electron", 855.0, 50.0);
    for (int k = 0; k < COUNT(radiating); k++) {
        const double all = factor(radiating[k], &m, m.e.scattered_kinetic);
        ck_assert_double_eq(factor(radiating[k], &m, 1e9), all);
        ck_assert_double_eq(factor(radiating[k], &m, (double)INFINITY), all);
        ck_assert(isnan(factor(radiating[k], &m, -1.0)));
        ck_assert(isnan(factor(radiating[k], &m, (double)NAN)));
    }
    ck_assert_double_eq(factor("none", &m, -1.0), 1.0);
}
END_TEST

static const char *caveat(const char *name, const meeting *m, double cut, char text[300])
{
    const int n = bh_radiative_find(name)->caveat(&m->x, cut, &m->e, text, 300);
    ck_assert_int_eq(n, (int)strlen(text));
    return text;
}

START_TEST(caveats)
{
    char text[300];
    meeting m;
    meet(&m, "electron", 855.0, 50.0); /* scattered at 645 MeV */
    for (int k = 0; k < COUNT(radiating); k++) {
        ck_assert_str_eq(caveat(radiating[k], &m, 19.0, text), "");
        ck_assert_ptr_nonnull(strstr(caveat(radiating[k], &m, 20.0, text), "3.1 %"));
        ck_assert_ptr_nonnull(strstr(caveat(radiating[k], &m, 700.0, text), "takes in all"));
        ck_assert_ptr_nonnull(strstr(caveat(radiating[k], &m, (double)NAN, text), "takes in all"));
    }
    ck_assert_str_eq(caveat("none", &m, 700.0, text), "");
    meet(&m, "electron", 10.0, 20.0);
    ck_assert_ptr_nonnull(strstr(caveat("mo-tsai", &m, 0.1, text), "maximon-tjon would do"));
    ck_assert_str_eq(caveat("maximon-tjon", &m, 0.1, text), "");
    meet(&m, "muon-", 115.0, 20.0);
    ck_assert_str_eq(caveat("mo-tsai", &m, 0.1, text), "");
}
END_TEST

START_TEST(registry)
{
    for (int k = 0; bh_radiative_at(k); k++) {
        const bh_radiative *row = bh_radiative_at(k);
        ck_assert_ptr_eq(bh_radiative_find(row->name), row);
        ck_assert(row->summary[0] && row->source[0] && row->range[0]);
    }
    ck_assert_ptr_null(bh_radiative_at(-1));
    ck_assert_ptr_null(bh_radiative_find("maximon"));
    ck_assert_ptr_nonnull(bh_radiative_find(NULL));
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("radiative");
    tcase_add_test(tests, grows_with_the_cut);
    tcase_add_test(tests, charge_conjugation);
    tcase_add_test(tests, factor_of_its_parts);
    tcase_add_test(tests, models_agree);
    tcase_add_test(tests, rates_are_slopes);
    tcase_add_test(tests, batch_is_the_same_event_by_event);
    tcase_add_test(tests, what_does_not_radiate);
    tcase_add_test(tests, odd_cuts);
    tcase_add_test(tests, caveats);
    tcase_add_test(tests, registry);
    return run_suite("radiative", tests);
}
