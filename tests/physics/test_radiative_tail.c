/* test_radiative_tail.c - the elastic tail: its soft limit, peaking against exact, edges. */
#include "../suite.h"

#include <math.h>

#include "beamhours/physics/one_photon.h"
#include "beamhours/physics/radiative_tail.h"
#include "beamhours/physics/soft_photons.h"
#include "beamhours/units/constants.h"

typedef struct {
    bh_particle beam;
    bh_structure *structure;
    bh_encounter x;
    bh_event peak;
    double angle;
    double elastic; /* [ub/sr] */
} target;

static void aim(target *t, const char *beam, double kinetic, double degrees)
{
    ck_assert(bh_particle_find(beam, &t->beam));
    t->structure = bh_structure_new("dipole", 1, 1, NULL);
    ck_assert(t->structure);
    t->x = (bh_encounter){.beam = &t->beam,
                          .charge = t->beam.charge,
                          .z = 1,
                          .a = 1,
                          .target = BH_MASS_PROTON,
                          .kinetic = kinetic,
                          .structure = t->structure};
    t->angle = degrees * BH_DEGREE;
    const bh_collision in = {t->beam.mass, BH_MASS_PROTON, kinetic};
    ck_assert(bh_kinematics_scattered(&in, t->angle, BH_BRANCH_FAST, &t->peak, NULL) == BH_OK);
    double ge2, gm2;
    bh_structure_eval(t->structure, 1, &t->peak.q2, &ge2, &gm2);
    t->elastic = bh_one_photon(&in, &t->peak, (bh_vertex){1, 1}, (bh_vertex){ge2, gm2});
}

static const struct {
    const char *beam;
    double kinetic, degrees;
} aims[] = {
    {"electron", 200.0, 60.0}, {"electron", 855.0, 25.0}, {"positron", 500.0, 90.0},
    {"electron", 5500, 19.02}, {"electron", 15.0, 150.0}, {"muon-", 50.5, 60.0},
    {"muon+", 130.0, 100.0},   {"electron", 1100.0, 2.5},
};

/* Below the peak by little: d delta / d ln cut of the soft photons, times the elastic. */
START_TEST(soft_limit)
{
    for (int i = 0; i < COUNT(aims); i++) {
        target t;
        aim(&t, aims[i].beam, aims[i].kinetic, aims[i].degrees);
        const bh_collision in = {t.beam.mass, t.x.target, t.x.kinetic};
        const bh_soft soft = bh_soft_of(&in, &t.peak, 1.0);
        double last = 1.0;
        for (double share = 1e-2; share > 1e-6; share *= 0.1) {
            const double lost = share * t.peak.scattered_kinetic;
            const double kinetic = t.peak.scattered_kinetic - lost;
            double tail;
            bh_radiative_tail_exact(&t.x, t.angle, 1, &kinetic, &tail);
            const double off = fabs(tail * lost / (t.elastic * bh_soft_rate(&soft)) - 1.0);
            ck_assert_msg(off < 30.0 * share && off < last, "%s %g MeV: %g off at %g", aims[i].beam,
                          aims[i].kinetic, off, share);
            last = off;
        }
        bh_structure_free(t.structure);
    }
}
END_TEST

/* What is said of the peaking forms, for electrons at ordinary angles. */
START_TEST(peaking_against_exact)
{
    static const struct {
        double share, low, high, low_radiator, high_radiator;
    } row[] = {{0.98, 0.999, 1.002, 0.999, 1.003},
               {0.95, 0.999, 1.005, 0.999, 1.006},
               {0.8, 0.995, 1.03, 1.0, 1.06},
               {0.5, 1.001, 1.08, 1.08, 1.25}};
    for (int i = 0; i < 3; i++) {
        target t;
        aim(&t, aims[i].beam, aims[i].kinetic, aims[i].degrees);
        for (int k = 0; k < COUNT(row); k++) {
            const double kinetic = row[k].share * t.peak.scattered_kinetic;
            double tail, peaking, radiator;
            bh_radiative_tail_exact(&t.x, t.angle, 1, &kinetic, &tail);
            bh_radiative_tail_peaking(&t.x, t.angle, 1, &kinetic, &peaking);
            bh_radiative_tail_equivalent(&t.x, t.angle, 1, &kinetic, &radiator);
            ck_assert_msg(peaking > row[k].low * tail && peaking < row[k].high * tail,
                          "%g MeV at %g: peaking %g", t.x.kinetic, row[k].share, peaking / tail);
            ck_assert_msg(radiator > row[k].low_radiator * tail &&
                              radiator < row[k].high_radiator * tail,
                          "%g MeV at %g: radiator %g", t.x.kinetic, row[k].share, radiator / tail);
        }
        bh_structure_free(t.structure);
    }
}
END_TEST

START_TEST(several_energies_are_each_alone)
{
    void (*const form[])(const bh_encounter *, double, size_t, const double *,
                         double *) = {bh_radiative_tail_exact, bh_radiative_tail_peaking,
                                      bh_radiative_tail_equivalent, bh_radiative_tail_soft};
    target t;
    aim(&t, "electron", 500.0, 90.0);
    const double top = t.peak.scattered_kinetic;
    const double kinetic[] = {100.0, 0.0, -5.0, 250.0, top * 1.0001, 2.0 * top, 320.0};
    for (int f = 0; f < COUNT(form); f++) {
        double all[COUNT(kinetic)];
        form[f](&t.x, t.angle, COUNT(kinetic), kinetic, all);
        for (int i = 0; i < COUNT(kinetic); i++) {
            double one;
            form[f](&t.x, t.angle, 1, &kinetic[i], &one);
            ck_assert_double_eq(one, all[i]);
            ck_assert(kinetic[i] > 0.0 && kinetic[i] < top ? one > 0.0 : one == 0.0);
        }
        double odd = (double)NAN;
        form[f](&t.x, t.angle, 1, &odd, &odd);
        ck_assert(isnan(odd));
    }
    bh_structure_free(t.structure);
}
END_TEST

START_TEST(soft_factor_falls_towards_the_peak)
{
    target t;
    aim(&t, "electron", 500.0, 90.0);
    double last = 1.0;
    for (double share = 0.05; share < 0.9999; share += 0.02) {
        const double kinetic = share * t.peak.scattered_kinetic;
        double factor;
        bh_radiative_tail_soft(&t.x, t.angle, 1, &kinetic, &factor);
        ck_assert(factor > 0.5 && factor < 1.0);
        if (share > 0.3)
            ck_assert_double_lt(factor, last);
        last = factor;
    }
    bh_structure_free(t.structure);
}
END_TEST

/* Far below the peak at small angles the nucleus takes least along u: 1/q2^2 has a third peak. */
START_TEST(three_peaks)
{
    const char *source = "the same integral over panels a seventh as long";
    const struct {
        const char *model;
        int z, a;
        double M, energy, degrees, kinetic, want; /* [ub/sr/MeV] */
    } row[] = {{"default", 82, 208, 193687.7, 1000.0, 10.0, 200.0, 178.402975772},
               {"default", 82, 208, 193687.7, 500.0, 60.0, 150.0, 0.00221992162089},
               {"default", 6, 12, 11174.86, 400.0, 60.0, 80.0, 0.00897464662093},
               {"default", 1, 1, 938.272, 15000.0, 5.0, 2100.0, 0.000401764949076}};
    for (int i = 0; i < COUNT(row); i++) {
        bh_particle beam;
        ck_assert(bh_particle_find("electron", &beam));
        bh_structure *structure = bh_structure_new(row[i].model, row[i].z, row[i].a, NULL);
        ck_assert(structure);
        const bh_encounter x = {&beam,         -1,        row[i].z, row[i].a, row[i].M,
                                row[i].energy, structure, 0.0};
        double tail;
        bh_radiative_tail_exact(&x, row[i].degrees * BH_DEGREE, 1, &row[i].kinetic, &tail);
        ck_assert_msg(fabs(tail / row[i].want - 1.0) < 1e-9, "%d: %.12g, not %.12g (%s)", i, tail,
                      row[i].want, source);
        bh_structure_free(structure);
    }
}
END_TEST

/* Hard photons vanish with the cut in proportion, and are the tail less its soft form. */
START_TEST(hard_photons)
{
    target t;
    aim(&t, "electron", 855.0, 50.0);
    const double at = t.peak.scattered_kinetic;
    const double wide = bh_radiative_tail_hard(&t.x, t.angle, 0.03 * at);
    const double thin = bh_radiative_tail_hard(&t.x, t.angle, 0.003 * at);
    ck_assert_msg(wide > 0.002 && wide < 0.012, "%g", wide);
    ck_assert_double_eq_tol(wide / thin, 10.0, 1.0);
    /* each MeV of the cut adds the tail less its soft form */
    const double cut = 0.02 * at, h = 0.2, here = at - cut;
    double tail, ge2, gm2;
    bh_radiative_tail_exact(&t.x, t.angle, 1, &here, &tail);
    bh_structure_eval(t.structure, 1, &t.peak.q2, &ge2, &gm2);
    const bh_collision in = {t.x.beam->mass, t.x.target, t.x.kinetic};
    const double sigma = bh_one_photon(&in, &t.peak, (bh_vertex){1.0, 1.0}, (bh_vertex){ge2, gm2});
    const bh_soft soft = bh_soft_of(&in, &t.peak, cut);
    const double added = (bh_radiative_tail_hard(&t.x, t.angle, cut + h) -
                          bh_radiative_tail_hard(&t.x, t.angle, cut - h)) /
                         (2.0 * h);
    const double wanted = tail / sigma - bh_soft_rate(&soft) / cut;
    ck_assert_double_eq_tol(added / wanted, 1.0, 1e-3);
    ck_assert(isnan(bh_radiative_tail_hard(&t.x, t.angle, 0.0)));
    ck_assert(isnan(bh_radiative_tail_hard(&t.x, t.angle, 2.0 * at)));
    ck_assert(isnan(bh_radiative_tail_hard(&t.x, t.angle, (double)NAN)));
    bh_structure_free(t.structure);
}
END_TEST

START_TEST(others_have_no_tail)
{
    target t;
    aim(&t, "proton", 50.0, 30.0);
    const double kinetic = 20.0;
    double tail = 1.0;
    bh_radiative_tail_exact(&t.x, t.angle, 1, &kinetic, &tail);
    ck_assert_double_eq(tail, 0.0);
    bh_radiative_tail_peaking(&t.x, t.angle, 1, &kinetic, &tail);
    ck_assert_double_eq(tail, 0.0);
    bh_radiative_tail_soft(&t.x, t.angle, 1, &kinetic, &tail);
    ck_assert_double_eq(tail, 0.0);
    ck_assert_double_eq(bh_radiative_tail_hard(&t.x, t.angle, 1.0), 0.0);
    bh_structure_free(t.structure);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("tail");
    tcase_add_test(tests, soft_limit);
    tcase_add_test(tests, peaking_against_exact);
    tcase_add_test(tests, several_energies_are_each_alone);
    tcase_add_test(tests, soft_factor_falls_towards_the_peak);
    tcase_add_test(tests, three_peaks);
    tcase_add_test(tests, hard_photons);
    tcase_add_test(tests, others_have_no_tail);
    return run_suite("radiative_tail", tests);
}
