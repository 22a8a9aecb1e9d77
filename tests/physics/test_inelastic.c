/* test_inelastic.c - fits of F2 and R, what they are worth against data, where they are used. */
#include "../suite.h"

#include <math.h>
#include <stdbool.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/physics/inelastic.h"
#include "beamhours/physics/structure_functions.h"
#include "beamhours/units/constants.h"

#define D      BH_DEGREE
#define M      BH_MASS_PROTON
#define CHECKS "tests/physics/inelastic_checks.csv"
#define POINTS "tests/physics/inelastic_points.csv"
#define BODEK2 0.880324 /* [GeV2] proton mass squared of the fit of 1979 */

static double final_mass(double x, double q2)
{
    return sqrt(BODEK2 + q2 * (1.0 / x - 1.0));
}

/* A fit of the table by its name; x is W where the name says so. */
static double by_name(const char *fit, double x, double q2)
{
    if (strcmp(fit, "ALLM97_F2p") == 0)
        return bh_f2_allm97(x, q2);
    if (strcmp(fit, "NMC95_F2p") == 0)
        return bh_f2_nmc95_proton(x, q2);
    if (strcmp(fit, "NMC95_F2d") == 0)
        return bh_f2_nmc95_deuteron(x, q2);
    if (strcmp(fit, "R1990") == 0)
        return bh_r_1990(x, q2);
    if (strcmp(fit, "R1998") == 0)
        return bh_r_1998(x, q2);
    if (strcmp(fit, "Bodek79_F2p at W") == 0)
        return bh_f2_bodek79_proton(x, q2);
    ck_assert_msg(strncmp(fit, "Bodek79_F2", 10) == 0, "no fit %s", fit);
    const double w = final_mass(x, q2);
    return fit[10] == 'p' ? bh_f2_bodek79_proton(w, q2) : bh_f2_bodek79_neutron(w, q2);
}

START_TEST(fits_agree_with_an_independent_evaluation)
{
    FILE *file = fopen(CHECKS, "r");
    ck_assert_msg(file != NULL, "run from the top of the tree: " CHECKS);
    char line[200], fit[40];
    int rows = 0;
    while (fgets(line, sizeof line, file)) {
        double x, q2, want;
        if (sscanf(line, "%39[^,],%lf,%lf,%lf", fit, &x, &q2, &want) != 4)
            continue;
        const double got = by_name(fit, x, q2);
        ck_assert_msg(fabs(got / want - 1.0) < 1e-9, "%s(%g, %g): %.10g, want %.10g (independent)",
                      fit, x, q2, got, want);
        rows++;
    }
    (void)fclose(file);
    ck_assert_int_eq(rows, 70);
}
END_TEST

typedef struct {
    char set[60], fits[60], source[60];
    double energy, degrees, x, q2, measured, error; /* [GeV] [deg] [1] [GeV2] */
} point;

/* Whether it is the next point of `set`. */
static bool next_point(FILE *file, const char *set, point *p)
{
    char line[256];
    while (fgets(line, sizeof line, file))
        if (sscanf(line, "%59[^,],%lf,%lf,%lf,%lf,%59[^,],%lf,%lf,%59[^\n]", p->set, &p->energy,
                   &p->degrees, &p->x, &p->q2, p->fits, &p->measured, &p->error, p->source) == 9 &&
            strcmp(p->set, set) == 0)
            return true;
    return false;
}

static FILE *points(void)
{
    FILE *file = fopen(POINTS, "r");
    ck_assert_msg(file != NULL, "run from the top of the tree: " POINTS);
    return file;
}

static const struct {
    const char *set, *fit; /* F2d of Bodek: half of proton and neutron */
    int column, count;     /* of the fit in the file's own values */
    double bias, rms;      /* [1] the mean of fit / data - 1 and the scatter: at most */
} sets[] = {
    {"F2p SLAC", "ALLM97_F2p", 0, 11, 0.02, 0.04},
    {"F2p SLAC", "NMC95_F2p", 1, 11, 0.02, 0.04},
    {"F2p SLAC", "Bodek79_F2p", 2, 11, 0.03, 0.06},
    {"F2d/nucleon SLAC", "NMC95_F2d", 0, 9, 0.03, 0.05},
    {"F2p BCDMS", "ALLM97_F2p", 0, 9, 0.02, 0.03},
    {"F2p BCDMS", "NMC95_F2p", 1, 9, 0.03, 0.03},
    {"F2p NMC", "ALLM97_F2p", 0, 10, 0.03, 0.06},
    {"F2d NMC", "NMC95_F2d", 0, 9, 0.03, 0.06},
    {"R SLAC p", "R1990", 0, 9, 0.35, 0.40},
    {"R SLAC p", "R1998", 1, 9, 0.35, 0.40},
};

static double column(const char *fits, int i)
{
    while (i-- > 0 && strchr(fits, ';'))
        fits = strchr(fits, ';') + 1;
    return strtod(fits, NULL);
}

START_TEST(fits_meet_published_points)
{
    FILE *file = points();
    point p;
    double sum = 0.0, sum2 = 0.0;
    int n = 0;
    while (next_point(file, sets[_i].set, &p)) {
        const double got = by_name(sets[_i].fit, p.x, p.q2), off = got / p.measured - 1.0;
        const double own = column(p.fits, sets[_i].column);
        ck_assert_msg(fabs(got / own - 1.0) < 2e-3, "%s(%g, %g): %g, independent %g", sets[_i].fit,
                      p.x, p.q2, got, own);
        sum += off;
        sum2 += off * off;
        n++;
    }
    (void)fclose(file);
    ck_assert_int_ge(n, sets[_i].count - 9 > 0 ? 2 : 9);
    ck_assert_msg(fabs(sum / n) < sets[_i].bias && sqrt(sum2 / n) < sets[_i].rms,
                  "%s of %s: %d points, mean %.4f, rms %.4f", sets[_i].fit, sets[_i].set, n,
                  sum / n, sqrt(sum2 / n));
}
END_TEST

/* Of the sixteen points six have W below 1.18 GeV or so little F2 that a ratio says nothing. */
START_TEST(resonances_meet_published_points)
{
    FILE *file = points();
    point p;
    double sum2 = 0.0, other2 = 0.0;
    int n = 0;
    while (next_point(file, "F2p E94-110 resonance region", &p)) {
        const double w = final_mass(p.x, p.q2);
        if (w < 1.18)
            continue;
        const double off = bh_f2_bodek79_proton(w, p.q2) / p.measured - 1.0;
        sum2 += off * off;
        other2 += pow(bh_f2_allm97(p.x, p.q2) / p.measured - 1.0, 2);
        n++;
    }
    (void)fclose(file);
    ck_assert_int_ge(n, 12);
    ck_assert_msg(sqrt(sum2 / n) < 0.12, "%d points: rms %.3f", n, sqrt(sum2 / n));
    ck_assert_msg(other2 > 4.0 * sum2, "smooth curve rms %.3f", sqrt(other2 / n));
}
END_TEST

/* Energy of the scattered electron from Q2 of three or four digits. */
START_TEST(cross_sections_meet_published_points)
{
    FILE *file = points();
    point p;
    int n = 0;
    while (next_point(file, "d2sigma p SLAC", &p)) {
        const double s = sin(0.5 * p.degrees * D);
        const bh_inclusive in = {0.0, 1e3 * p.energy, p.degrees * D};
        const bh_transfer at = bh_inclusive_transfer(&in, 1e3 * p.q2 / (4.0 * p.energy * s * s));
        const double got = bh_inelastic_cross_section(1, &in, &at) / 1e-6;
        ck_assert_ptr_null(bh_inelastic_outside(1, &at));
        if (bh_inelastic_w2(&at) > 4e6) /* below, not the fits of that evaluation */
            ck_assert_msg(fabs(got / column(p.fits, 0) - 1.0) < 0.01, "%g GeV: %g, independent %s",
                          p.energy, got, p.fits);
        ck_assert_msg(fabs(got / p.measured - 1.0) < 0.10, "%g GeV, %g deg: %g, measured %g, %s",
                      p.energy, p.degrees, got, p.measured, p.source);
        n++;
    }
    (void)fclose(file);
    ck_assert_int_eq(n, 8);
}
END_TEST

/* The scattered momentum that gives W2 [GeV2]. */
static bh_transfer at_w2(const bh_inclusive *in, double w2)
{
    double momentum[2];
    ck_assert_uint_ge(bh_inclusive_at_q2(in, M * M - 1e6 * w2, 2.0 * M, momentum), 1);
    return bh_inclusive_transfer(in, momentum[0]);
}

START_TEST(no_jump_where_fits_join)
{
    const bh_inclusive in = {BH_MASS_ELECTRON, 5000.0, 25.0 * D};
    static const double joins[] = {3.2, 4.0};
    for (int nucleons = 1; nucleons <= 2; nucleons++) {
        const bh_transfer lo = at_w2(&in, joins[_i] - 1e-7), hi = at_w2(&in, joins[_i] + 1e-7);
        const double below = bh_inelastic_cross_section(nucleons, &in, &lo);
        const double above = bh_inelastic_cross_section(nucleons, &in, &hi);
        ck_assert_msg(below > 0.0 && fabs(above / below - 1.0) < 1e-5, "%g, %g", below, above);
    }
}
END_TEST

START_TEST(deuteron_lies_between_one_and_two_protons)
{
    const bh_inclusive in = {BH_MASS_ELECTRON, 5000.0, 25.0 * D};
    const bh_transfer at = at_w2(&in, 1.5 + 0.5 * _i);
    const double p = bh_inelastic_cross_section(1, &in, &at);
    const double d = bh_inelastic_cross_section(2, &in, &at);
    ck_assert_msg(p > 0.0 && d > p && d < 2.0 * p, "%g and %g", p, d);
    ck_assert_double_ge(bh_inelastic_uncertainty(2, &at), bh_inelastic_uncertainty(1, &at));
}
END_TEST

START_TEST(muons_tend_to_electrons_at_high_energy)
{
    const bh_inclusive e = {BH_MASS_ELECTRON, 20000.0, 12.0 * D};
    const bh_inclusive mu = {BH_MASS_MUON, 20000.0 + BH_MASS_ELECTRON - BH_MASS_MUON, 12.0 * D};
    const bh_transfer a = at_w2(&e, 6.0), b = at_w2(&mu, 6.0);
    const double ratio =
        bh_inelastic_cross_section(1, &mu, &b) / bh_inelastic_cross_section(1, &e, &a);
    ck_assert_msg(fabs(ratio - 1.0) < 0.02 && ratio != 1.0, "%.6f", ratio);
}
END_TEST

START_TEST(outside_has_reasons)
{
    static const struct {
        int nucleons;
        double energy, degrees, w2; /* [MeV] [deg] [GeV2] */
        const char *word;           /* NULL: computed */
    } rows[] = {
        {1, 5000.0, 25.0, 0.9, NULL},       {1, 5000.0, 25.0, 1.3, "threshold"},
        {1, 5000.0, 25.0, 1.5, NULL},       {1, 5000.0, 25.0, 6.0, NULL},
        {2, 5000.0, 25.0, 0.9, "deuteron"}, {2, 5000.0, 25.0, 1.3, "deuteron"},
        {2, 5000.0, 25.0, -1.0, NULL},      {1, 2000.0, 10.0, 1.5, "0.3 GeV2"},
        {1, 4000.0, 10.0, 5.0, "0.5 GeV2"}, {1, 19000.0, 120.0, 2.0, "20 GeV2"},
        {1, 60000.0, 60.0, 5.0, "Bjorken"}, {1, 400000.0, 0.13, 150.0, "Bjorken"},
    };
    const bh_inclusive in = {BH_MASS_ELECTRON, rows[_i].energy, rows[_i].degrees * D};
    const bh_transfer at = at_w2(&in, rows[_i].w2);
    const char *why = bh_inelastic_outside(rows[_i].nucleons, &at);
    ck_assert_msg(rows[_i].word ? why && strstr(why, rows[_i].word) : !why, "row %d: %s (Q2 %g)",
                  _i, why ? why : "computed", at.q2 / 1e6);
}
END_TEST

START_TEST(nothing_below_threshold_and_never_negative)
{
    for (double theta = 3.0; theta < 180.0; theta += 12.0)
        for (double share = 0.02; share < 1.0; share += 0.02) {
            const bh_inclusive in = {BH_MASS_ELECTRON, 6000.0, theta * D};
            const bh_transfer at = bh_inclusive_transfer(&in, share * 6000.0);
            for (int nucleons = 1; nucleons <= 2; nucleons++) {
                const double got = bh_inelastic_cross_section(nucleons, &in, &at);
                if (!bh_inelastic_outside(nucleons, &at))
                    ck_assert_msg(got >= 0.0 && isfinite(got), "%g at %g deg, %g", got, theta,
                                  share);
                if (bh_inelastic_w2(&at) < 1.15e6)
                    ck_assert_double_eq(got, 0.0);
            }
        }
}
END_TEST

/* The answer changes at edges alone. */
START_TEST(edges_are_all)
{
    static const double energies[] = {1200.0, 3000.0, 8000.0, 25000.0};
    const int nucleons = 1 + _i % 2;
    const bh_inclusive in = {BH_MASS_ELECTRON, energies[_i / 2], 30.0 * D};
    double edge[BH_INELASTIC_EDGES];
    const size_t n = bh_inelastic_edges(nucleons, &in, edge);
    ck_assert_uint_le(n, BH_INELASTIC_EDGES);
    const char *before = NULL;
    for (int i = 1; i < 20000; i++) {
        const double p = i * in.kinetic / 20000.0, step = in.kinetic / 20000.0;
        const bh_transfer at = bh_inclusive_transfer(&in, p);
        const char *now = bh_inelastic_outside(nucleons, &at);
        bool edged = i == 1 || now == before;
        for (size_t k = 0; k < n && !edged; k++)
            edged = edge[k] >= p - step * 1.001 && edge[k] <= p * 1.000001;
        ck_assert_msg(edged, "from %s to %s at %g MeV/c", before ? before : "computed",
                      now ? now : "computed", p);
        before = now;
    }
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("inelastic");
    tcase_add_test(tests, fits_agree_with_an_independent_evaluation);
    tcase_add_loop_test(tests, fits_meet_published_points, 0, COUNT(sets));
    tcase_add_test(tests, resonances_meet_published_points);
    tcase_add_test(tests, cross_sections_meet_published_points);
    tcase_add_loop_test(tests, no_jump_where_fits_join, 0, 2);
    tcase_add_loop_test(tests, deuteron_lies_between_one_and_two_protons, 0, 10);
    tcase_add_test(tests, muons_tend_to_electrons_at_high_energy);
    tcase_add_loop_test(tests, outside_has_reasons, 0, 12);
    tcase_add_test(tests, nothing_below_threshold_and_never_negative);
    tcase_add_loop_test(tests, edges_are_all, 0, 8);
    return run_suite("inelastic", tests);
}
