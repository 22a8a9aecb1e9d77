/* test_structure.c - structure models by name: values, limits, defaults, refusals. */
#include "../suite.h"

#include <math.h>
#include <string.h>

#include "beamhours/physics/form_factor.h"
#include "beamhours/units/constants.h"

static const double fm2 = BH_HBARC * BH_HBARC; /* MeV^2 for each 1/fm^2 */

static bh_structure *model(const char *name, int z, int a)
{
    bh_error err = {.text = ""};
    bh_structure *structure = bh_structure_new(name, z, a, &err);
    ck_assert_msg(structure != NULL, "%s: %s", name ? name : "default", err.text);
    return structure;
}

static double factor(const bh_structure *structure, double q2, const char *wanted)
{
    const char *name[BH_FACTORS_MOST];
    double value[BH_FACTORS_MOST];
    const int n = bh_structure_factors(structure, q2, BH_FACTORS_MOST, name, value);
    for (int i = 0; i < n; i++)
        if (strcmp(name[i], wanted) == 0)
            return value[i];
    ck_abort_msg("%s has no %s", bh_structure_name(structure), wanted);
    return 0.0;
}

#define EXTENDED "closed form at 30 digits from the published coefficients"
#define KELLY    "Kelly, Phys. Rev. C 70 (2004) 068202: " EXTENDED
#define YE       "Ye et al., Phys. Lett. B 777 (2018) 8: " EXTENDED
#define ABBOTT   "Abbott et al., Eur. Phys. J. A 7 (2000) 421: " EXTENDED
#define AMROUN   "Amroun et al., Nucl. Phys. A 579 (1994) 596: " EXTENDED
#define A1       "Bernauer et al., Phys. Rev. C 90 (2014) 015206, table"

/* q2 in GeV2, or in 1/fm^2 where `fm` is set.  Values have 12 digits; sums of Gaussians are
 * renormalised here (1e-6 to 1e-5) but not there; the A1 table has 9. */
static const struct {
    const char *model;
    int z, a;
    double q2;
    bool fm;
    const char *factor;
    double value, tolerance;
    const char *source;
} values[] = {
    {"dipole", 1, 1, 0.502207036946, false, "GE", 0.343054480506, 1e-11, "definition: " EXTENDED},
    {"dipole", 1, 1, 0.502207036946, false, "GM", 0.958098794944, 1e-11, "definition: " EXTENDED},
    {"kelly-2004", 1, 1, 0.502207036946, false, "GE", 0.334132615387, 1e-11, KELLY},
    {"kelly-2004", 1, 1, 0.502207036946, false, "GM", 0.957386889939, 1e-11, KELLY},
    {"kelly-2004", 1, 1, 0.0252447286994, false, "GE", 0.924862415585, 1e-11, KELLY},
    {"kelly-2004", 1, 1, 4.81994964675, false, "GE", 0.00696681692447, 1e-11, KELLY},
    {"kelly-2004", 1, 1, 4.81994964675, false, "GM", 0.0477151562794, 1e-11, KELLY},
    {"ye-2018", 1, 1, 0.502207036946, false, "GE", 0.327905434415, 1e-11, YE},
    {"ye-2018", 1, 1, 0.502207036946, false, "GM", 0.979084189597, 1e-11, YE},
    {"ye-2018", 1, 1, 1.75000238916, false, "GE", 0.0701021479356, 1e-10, YE},
    {"ye-2018", 1, 1, 1.75000238916, false, "GM", 0.253213941645, 1e-11, YE},
    {"abbott-2000-i", 1, 2, 0.041680966105, false, "GC", 0.534202178198, 1e-11, ABBOTT},
    {"abbott-2000-i", 1, 2, 0.041680966105, false, "GM", 0.978584647825, 1e-11, ABBOTT},
    {"abbott-2000-i", 1, 2, 0.041680966105, false, "GQ", 13.3757949554, 1e-11, ABBOTT},
    {"abbott-2000-ii", 1, 2, 0.041680966105, false, "GC", 0.533777208083, 1e-11, ABBOTT},
    {"abbott-2000-ii", 1, 2, 0.041680966105, false, "GM", 0.952460297188, 1e-11, ABBOTT},
    {"abbott-2000-ii", 1, 2, 0.041680966105, false, "GQ", 14.1347806483, 1e-11, ABBOTT},
    {"abbott-2000-ii", 1, 2, 0.250085633802, false, "GC", 0.0780936510483, 1e-10, ABBOTT},
    {"abbott-2000-ii", 1, 2, 0.250085633802, false, "GQ", 2.53818650772, 1e-11, ABBOTT},
    {"amroun-1994", 2, 3, 1.0, true, "F_ch", 0.55307498343, 2e-6, AMROUN},
    {"amroun-1994", 2, 3, 1.0, true, "F_m", 0.552110037506, 2e-6, AMROUN},
    {"amroun-1994", 2, 3, 6.25, true, "F_ch", 0.0454408418374, 2e-6, AMROUN},
    {"amroun-1994", 2, 3, 6.25, true, "F_m", 0.0570677488523, 2e-6, AMROUN},
    {"sum-of-gaussians", 2, 4, 1.0, true, "F", 0.630074608156, 1.2e-5,
     "de Vries et al. 1987: " EXTENDED},
    {"sum-of-gaussians", 2, 4, 6.25, true, "F", 0.0523697126312, 1.2e-5,
     "de Vries et al. 1987: " EXTENDED},
    {"a1-2014", 1, 1, 0.25, false, "GE", 0.530553492, 2e-9, A1},
    {"a1-2014", 1, 1, 0.64, false, "GE", 0.258204026, 4e-9, A1},
    {"a1-2014", 1, 1, 0.64, false, "GM", 0.286589816 * BH_MOMENT_PROTON, 4e-9, A1},
    {"galster-1971", 0, 1, 3.5311326082, false, "GE", 0.0081233, 1e-4,
     "Galster et al., Nucl. Phys. B 32 (1971) 221: tau = 1 by hand, 1.91304 / 6.6 x 0.0280257"},
};

START_TEST(published_fits_have_their_published_values)
{
    for (int i = 0; i < COUNT(values); i++) {
        bh_structure *structure = model(values[i].model, values[i].z, values[i].a);
        const double got =
            factor(structure, values[i].q2 * (values[i].fm ? fm2 : 1e6), values[i].factor);
        ck_assert_msg(fabs(got / values[i].value - 1.0) < values[i].tolerance,
                      "%s %s at %g: %.13g, wanted %.13g (%s)", values[i].model, values[i].factor,
                      values[i].q2, got, values[i].value, values[i].source);
        bh_structure_free(structure);
    }
}
END_TEST

START_TEST(deuteron_a_and_b_follow_from_the_two_numbers)
{
    static const struct {
        const char *model;
        double q2, a, b; /* Abbott et al. 2000, closed form at 30 digits */
    } rows[] = {
        {"abbott-2000-i", 0.041680966105, 0.288658296189, 0.00379324918284},
        {"abbott-2000-ii", 0.041680966105, 0.288267659707, 0.00359342296762},
        {"abbott-2000-i", 0.250085633802, 0.00831124747902, 0.000879827618735},
        {"abbott-2000-ii", 0.250085633802, 0.00835740549456, 0.000916065440883},
    };
    for (int i = 0; i < COUNT(rows); i++) {
        bh_structure *structure = model(rows[i].model, 1, 2);
        const double q2 = rows[i].q2 * 1e6;
        const double tau = q2 / (4.0 * BH_MASS_DEUTERON * BH_MASS_DEUTERON);
        double ge2, gm2;
        bh_structure_eval(structure, 1, &q2, &ge2, &gm2);
        ck_assert_double_eq_tol((ge2 + tau * gm2) / (1.0 + tau) / rows[i].a, 1.0, 1e-10);
        ck_assert_double_eq_tol(2.0 * tau * gm2 / rows[i].b, 1.0, 1e-10);
        bh_structure_free(structure);
    }
}
END_TEST

/* Squares at no momentum transfer: charge and magnetic moment. */
START_TEST(limits_are_charge_and_moment)
{
    static const struct {
        int z, a;
        double charge, moment, tolerance;
        const char *source;
    } rows[] = {
        {1, 1, 1.0, 2.79284734463, 1e-12, "CODATA 2022"},
        {0, 1, 0.0, -1.91304276, 1e-12, "CODATA 2022"},
        {1, 2, 1.0, 1.714, 1e-4, "Abbott et al. 2000: GM(0) = 1.7140"},
        {1, 3, 1.0, 2.9789624650 * 2808.92113668 / 938.27208943, 1e-9, "CODATA 2022"},
        {2, 3, 2.0, -2.1276253498 * 2808.39161112 / 938.27208943, 1e-9, "CODATA 2022"},
        {6, 12, 6.0, 0.0, 1e-12, "charge"},
        {13, 27, 13.0, 0.0, 1e-12, "charge alone"},
        {79, 197, 79.0, 0.0, 1e-9, "charge alone"},
    };
    for (int i = 0; i < COUNT(rows); i++) {
        bh_structure *structure = model("default", rows[i].z, rows[i].a);
        const double q2[2] = {0.0, 1e-12};
        const double spin1 = rows[i].a == 2 ? 2.0 / 3.0 : 1.0;
        double ge2[2], gm2[2];
        bh_structure_eval(structure, 2, q2, ge2, gm2);
        for (int k = 0; k < 2; k++) {
            ck_assert_msg(fabs(ge2[k] - rows[i].charge * rows[i].charge) <= 3e3 * rows[i].tolerance,
                          "Z %d A %d: %.15g (%s)", rows[i].z, rows[i].a, ge2[k], rows[i].source);
            ck_assert_msg(fabs(gm2[k] - spin1 * rows[i].moment * rows[i].moment) <=
                              50.0 * rows[i].tolerance,
                          "Z %d A %d: %.15g (%s)", rows[i].z, rows[i].a, gm2[k], rows[i].source);
        }
        bh_structure_free(structure);
    }
}
END_TEST

START_TEST(spinless_nuclei_have_charge_times_recoil)
{
    bh_structure *lead = model("point", 82, 208);
    const double q2 = 1e6, tau = 1e6 / (4.0 * 193687.09 * 193687.09);
    double ge2, gm2;
    bh_structure_eval(lead, 1, &q2, &ge2, &gm2);
    ck_assert_double_eq_tol(ge2 / (82.0 * 82.0), 1.0 + tau, 1e-10);
    ck_assert_double_eq(gm2, 0.0);
    ck_assert_double_eq(bh_structure_radius(lead), 0.0);
    bh_structure_free(lead);
    bh_structure *proton = model("point", 1, 1);
    bh_structure_eval(proton, 1, &q2, &ge2, &gm2);
    ck_assert_double_eq(ge2, 1.0);
    ck_assert_double_eq(gm2, 1.0);
    bh_structure_free(proton);
}
END_TEST

/* Radii of the fits, printed with the publication or in later reviews of them. */
START_TEST(radii_are_those_of_the_fits)
{
    static const struct {
        const char *model;
        int z, a;
        double radius, tolerance;
        const char *source;
    } rows[] = {
        {"dipole", 1, 1, 0.81124, 1e-5, "sqrt(12 / 0.71) hbar c"},
        {"kelly-2004", 1, 1, 0.863, 1e-3, "Kelly 2004: 0.863(4) fm"},
        {"ye-2018", 1, 1, 0.879, 1e-3, "Ye et al. 2018: 0.879 fm imposed"},
        {"prad-2019", 1, 1, 0.831, 1e-3, "Xiong et al. 2019: 0.831 fm"},
        {"a1-2014", 1, 1, 0.875, 2e-3, "Bernauer et al. 2014: spline 0.875 fm"},
        {"amroun-1994", 2, 3, 1.959, 1e-3, "Amroun et al. 1994: 1.959 fm"},
        {"amroun-1994", 1, 3, 1.755, 1e-3, "Amroun et al. 1994: 1.755 fm"},
        {"abbott-2000-ii", 1, 2, 2.088, 1e-3, "slope of the published fit"},
        {"kelly-2004", 0, 1, 0.0, 0.0, "none for a neutral particle"},
    };
    for (int i = 0; i < COUNT(rows); i++) {
        bh_structure *structure = model(rows[i].model, rows[i].z, rows[i].a);
        ck_assert_msg(fabs(bh_structure_radius(structure) - rows[i].radius) <= rows[i].tolerance,
                      "%s: %g, wanted %g (%s)", rows[i].model, bh_structure_radius(structure),
                      rows[i].radius, rows[i].source);
        bh_structure_free(structure);
    }
}
END_TEST

/* Every model of every nucleus it offers: finite, not negative, from the smallest momentum transfer
 * to far past its range, and continuous. */
START_TEST(every_model_gives_a_number_everywhere)
{
    static const int nucleus[][2] = {{0, 1},  {1, 1},   {1, 2},   {1, 3},    {2, 3},   {2, 4},
                                     {6, 12}, {13, 27}, {40, 90}, {79, 197}, {82, 208}};
    const bh_structure_model *row;
    int i;
    for (i = 0; (row = bh_structure_model_at(i)) != NULL; i++)
        for (int k = 0; k < COUNT(nucleus); k++) {
            if (bh_structure_sets(row, nucleus[k][0], nucleus[k][1]) == 0)
                continue;
            bh_structure *structure = model(row->name, nucleus[k][0], nucleus[k][1]);
            for (double q2 = 1e-18; q2 < 1e12; q2 *= 3.7) {
                double ge2, gm2;
                bh_structure_eval(structure, 1, &q2, &ge2, &gm2);
                ck_assert_msg(ge2 >= 0.0 && gm2 >= 0.0 && isfinite(ge2) && isfinite(gm2),
                              "%s Z %d at %g: %g %g", row->name, nucleus[k][0], q2, ge2, gm2);
            }
            bh_structure_free(structure);
        }
    ck_assert_ptr_null(bh_structure_model_at(-1));
    ck_assert_int_eq(i, 23);
}
END_TEST

START_TEST(defaults_are_the_best_founded)
{
    static const struct {
        int z, a;
        const char *name;
        bool flagged;
        const char *note; /* part of it */
    } rows[] = {
        {1, 1, "amt-2007-effective", false, ""},
        {0, 1, "kelly-2004", false, ""},
        {1, 2, "abbott-2000-ii", false, ""},
        {1, 3, "amroun-1994", false, ""},
        {2, 3, "amroun-1994", false, ""},
        {2, 4, "sum-of-gaussians", false, ""},
        {6, 12, "sum-of-gaussians", false, ""},
        {13, 27, "fourier-bessel", true, "charge alone"},
        {18, 40, "fourier-bessel", false, ""},
        {22, 48, "fourier-bessel", false, ""},
        {74, 184, "fermi-2p/2", false, "does not state the isotope"},
        {79, 197, "fermi-2p/2", true, "no published density agrees with it"},
        {54, 132, "fermi-2p", true, "no published density"},
        {3, 7, "oscillator", true, "charge alone"},
        {118, 294, "fermi-2p", true, "1.2 A^(1/3)"},
    };
    for (int i = 0; i < COUNT(rows); i++) {
        bh_structure *structure = model(i % 2 ? "default" : NULL, rows[i].z, rows[i].a);
        ck_assert_str_eq(bh_structure_name(structure), rows[i].name);
        ck_assert_msg(bh_structure_flagged(structure) == rows[i].flagged, "Z %d", rows[i].z);
        ck_assert_msg(strstr(bh_structure_note(structure), rows[i].note) != NULL, "Z %d: %s",
                      rows[i].z, bh_structure_note(structure));
        ck_assert(strlen(bh_structure_source(structure)) > 10);
        bh_structure_free(structure);
    }
    bh_structure *proton = model(NULL, 1, 1);
    ck_assert_int_eq(bh_structure_row(proton)->use, BH_FIT_CROSS_SECTION);
    bh_structure_free(proton);
}
END_TEST

START_TEST(further_sets_have_numbers)
{
    bh_structure *first = model("fourier-bessel", 6, 12), *again = model("fourier-bessel/1", 6, 12);
    bh_structure *second = model("fourier-bessel/2", 6, 12);
    ck_assert_str_eq(bh_structure_name(first), "fourier-bessel");
    ck_assert_str_eq(bh_structure_name(again), "fourier-bessel");
    ck_assert_str_eq(bh_structure_name(second), "fourier-bessel/2");
    ck_assert_int_eq(bh_structure_sets(bh_structure_row(first), 6, 12), 2);
    ck_assert_int_eq(bh_structure_sets(bh_structure_row(first), 92, 238), 0);
    ck_assert_double_eq(bh_structure_radius(first), bh_structure_radius(again));
    ck_assert_double_ne(bh_structure_radius(first), bh_structure_radius(second));
    bh_structure_free(first);
    bh_structure_free(again);
    bh_structure_free(second);
}
END_TEST

START_TEST(what_cannot_be_is_refused_with_a_way_out)
{
    static const struct {
        const char *name;
        int z, a;
        bh_code code;
        const char *text; /* part of it */
    } rows[] = {
        {"kely-2004", 1, 1, BH_EPLAN, "kelly-2004"},
        {"kelly_2004", 1, 1, BH_EPLAN, "kelly-2004"},
        {"zzz", 1, 1, BH_EPLAN, "default"},
        {"kelly-2004", 6, 12, BH_EPLAN, "12C"},
        {"kelly-2004", 6, 12, BH_EPLAN, "fourier-bessel"},
        {"helm", 1, 1, BH_EPLAN, "amt-2007-effective"},
        {"galster-1971", 1, 1, BH_EPLAN, "does not describe 1H"},
        {"fourier-bessel/3", 6, 12, BH_EPLAN, "end at 2"},
        {"fourier-bessel/0", 6, 12, BH_EPLAN, "end at 2"},
        {"fourier-bessel/", 6, 12, BH_EPLAN, "end at 2"},
        {"fourier-bessel/x", 6, 12, BH_EPLAN, "fourier-bessel"},
        {"fourier-bessel/1234", 6, 12, BH_EPLAN, "fourier-bessel"},
        {"", 6, 12, BH_EPLAN, "default"},
        {"default", 7, 6, BH_EDOMAIN, "no nucleus"},
        {"default", 0, 2, BH_EDOMAIN, "no nucleus"},
        {"default", -1, 2, BH_EDOMAIN, "no nucleus"},
        {"default", 0, 0, BH_EDOMAIN, "no nucleus"},
    };
    for (int i = 0; i < COUNT(rows); i++) {
        bh_error err = {.code = BH_OK};
        ck_assert_ptr_null(bh_structure_new(rows[i].name, rows[i].z, rows[i].a, &err));
        ck_assert_int_eq(err.code, rows[i].code);
        ck_assert_msg(strstr(err.text, rows[i].text) != NULL, "%s: %s", rows[i].name, err.text);
    }
    ck_assert_ptr_null(bh_structure_new("zzz", 1, 1, NULL));
    ck_assert_str_eq(bh_structure_suggest("amroun1994"), "amroun-1994");
    bh_structure_free(NULL);
}
END_TEST

START_TEST(ranges_are_those_of_the_data)
{
    static const struct {
        const char *name;
        int z, a;
        double highest; /* GeV2 */
    } rows[] = {
        {"a1-2014", 1, 1, 0.977},      {"prad-2019", 1, 1, 0.06},
        {"abbott-2000-i", 1, 2, 2.0},  {"fermi-2p", 82, 208, 0.24},
        {"kelly-2004", 1, 1, 31.2},    {"arrington-2004", 1, 1, 31.2},
        {"amt-2007", 1, 1, 31.2},      {"amt-2007-effective", 1, 1, 31.2},
        {"venkat-2011", 1, 1, 31.2},   {"ye-2018", 1, 1, 30.0},
        {"dipole", 1, 1, 1.0},         {"galster-1971", 0, 1, 0.6},
        {"riordan-2010", 0, 1, 3.4},   {"abbott-2000-ii", 1, 2, 6.0},
        {"amroun-1994", 2, 3, 1.2},    {"amroun-1994", 1, 3, 1.2},
        {"fermi-2p/2", 82, 208, 0.09}, {"fourier-bessel", 7, 15, 0.501946}, /* (8 pi / 7 fm)^2 */
    };
    for (int i = 0; i < COUNT(rows); i++) {
        bh_structure *structure = model(rows[i].name, rows[i].z, rows[i].a);
        double lowest, highest;
        bh_structure_range(structure, &lowest, &highest);
        ck_assert_double_eq(lowest, 0.0);
        ck_assert_double_eq_tol(highest, rows[i].highest, 1e-5);
        bh_structure_free(structure);
    }
}
END_TEST

/* Ye et al. 2018: the pieces of the band meet; a per cent or two of the cross section at 1 GeV2. */
START_TEST(uncertainties_are_those_published)
{
    bh_structure *ye = model("ye-2018", 1, 1), *neutron = model("ye-2018", 0, 1);
    bh_structure *a1 = model("a1-2014", 1, 1), *kelly = model("kelly-2004", 1, 1);
    const double seam[] = {1e3, 1e8};
    for (int i = 0; i < COUNT(seam); i++) {
        const double below = bh_structure_uncertainty(ye, seam[i] * (1.0 - 1e-9));
        const double above = bh_structure_uncertainty(ye, seam[i] * (1.0 + 1e-9));
        ck_assert_msg(fabs(below / above - 1.0) < 0.02, "%g: %g %g", seam[i], below, above);
    }
    ck_assert_double_eq(bh_structure_uncertainty(ye, 0.0), 0.0);
    ck_assert(bh_structure_uncertainty(ye, 1e6) > 0.005 &&
              bh_structure_uncertainty(ye, 1e6) < 0.05);
    ck_assert(bh_structure_uncertainty(neutron, 1e6) > 0.005);
    /* first error columns of the table at 0.25 GeV2: 6.873e-4 of GE 0.5306, 5.387e-4 of GM 0.5442
     */
    ck_assert_double_eq_tol(bh_structure_uncertainty(a1, 0.25e6), 2.0 * 0.0006873 / 0.530553492,
                            7e-4);
    ck_assert_double_eq(bh_structure_uncertainty(kelly, 1e6), -1.0);
    bh_structure_free(ye);
    bh_structure_free(neutron);
    bh_structure_free(a1);
    bh_structure_free(kelly);
}
END_TEST

START_TEST(a_short_list_of_factors_is_not_overrun)
{
    const char *name[2] = {"", "untouched"};
    double value[2] = {0.0, -7.0};
    bh_structure *deuteron = model(NULL, 1, 2);
    ck_assert_int_eq(bh_structure_factors(deuteron, 1e4, 1, name, value), 1);
    ck_assert_str_eq(name[0], "GC");
    ck_assert_str_eq(name[1], "untouched");
    ck_assert_double_eq(value[1], -7.0);
    ck_assert_int_eq(bh_structure_factors(deuteron, 1e4, 0, name, value), 0);
    bh_structure_free(deuteron);
}
END_TEST

/* What may doubt another description, and what measurements leave of it. */
START_TEST(doubts_are_founded)
{
    static const struct {
        const char *model;
        int set, z, a;
        bool compares;
    } rows[] = {
        {"point", 1, 6, 12, false},       {"dipole", 1, 1, 1, false},
        {"kelly-2004", 1, 1, 1, true},    {"kelly-2004", 2, 1, 1, false},
        {"uniform", 1, 1, 2, false},      {"helm", 1, 2, 4, false},
        {"fermi-2p", 1, 1, 3, false},     {"fermi-2p", 1, 2, 4, false},
        {"fermi-3p", 2, 2, 4, true},      {"sum-of-gaussians", 1, 2, 3, true},
        {"amroun-1994", 1, 1, 3, true},   {"helm", 1, 6, 12, true},
        {"fermi-2p", 3, 13, 27, true},    {"fermi-2p", 4, 13, 27, false},
        {"abbott-2000-i", 1, 1, 2, true}, {"abbott-2000-i", 0, 1, 2, false},
        {"fermi-2p", 1, 3, 6, true},
    };
    for (int i = 0; i < COUNT(rows); i++) {
        const bh_structure_model *m = NULL;
        for (int k = 0; (m = bh_structure_model_at(k)) && strcmp(m->name, rows[i].model) != 0; k++)
            ;
        ck_assert_ptr_nonnull(m);
        ck_assert_msg(bh_structure_compares(m, rows[i].set, rows[i].z, rows[i].a) ==
                          rows[i].compares,
                      "%s/%d of %d, %d", rows[i].model, rows[i].set, rows[i].z, rows[i].a);
    }
}
END_TEST

START_TEST(data_are_uncertain_where_form_factors_matter)
{
    static const struct {
        const char *name;
        int z, a;
        double known;
        const char *source;
    } rows[] = {{NULL, 1, 1, 0.01, "Walker"},      {"prad-2019", 1, 1, 0.005, "Xiong"},
                {NULL, 1, 2, 0.03, "Platchkov"},   {NULL, 1, 3, 0.03, "Amroun"},
                {NULL, 2, 3, 0.03, "Amroun"},      {NULL, 2, 4, 0.02, "McCarthy"},
                {NULL, 6, 12, 0.01, "Reuter"},     {NULL, 6, 13, 0.02, "de Vries"},
                {NULL, 82, 208, 0.02, "de Vries"}, {NULL, 0, 1, 0, ""}};
    for (int i = 0; i < COUNT(rows); i++) {
        bh_structure *s = model(rows[i].name, rows[i].z, rows[i].a);
        const bh_structure_data data = bh_structure_measured(s);
        const double q2 = 1e4, none = 0;
        double ge2, gm2, charge2;
        ck_assert_double_eq(data.uncertainty, rows[i].known);
        ck_assert_ptr_nonnull(strstr(data.source, rows[i].source));
        bh_structure_eval(s, 1, &q2, &ge2, &gm2);
        bh_structure_eval(s, 1, &none, &charge2, &gm2);
        if (rows[i].z > 0) {
            ck_assert_double_eq_tol(bh_structure_data_uncertainty(s, q2),
                                    rows[i].known * (1 - ge2 / charge2), 1e-12);
            ck_assert_double_eq_tol(bh_structure_data_uncertainty(s, 0), 0, 1e-12);
        }
        ck_assert_double_le(bh_structure_data_uncertainty(s, 1e7), rows[i].known);
        bh_structure_free(s);
    }
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("structure");
    tcase_add_test(tests, published_fits_have_their_published_values);
    tcase_add_test(tests, deuteron_a_and_b_follow_from_the_two_numbers);
    tcase_add_test(tests, limits_are_charge_and_moment);
    tcase_add_test(tests, spinless_nuclei_have_charge_times_recoil);
    tcase_add_test(tests, radii_are_those_of_the_fits);
    tcase_add_test(tests, every_model_gives_a_number_everywhere);
    tcase_add_test(tests, defaults_are_the_best_founded);
    tcase_add_test(tests, further_sets_have_numbers);
    tcase_add_test(tests, what_cannot_be_is_refused_with_a_way_out);
    tcase_add_test(tests, ranges_are_those_of_the_data);
    tcase_add_test(tests, uncertainties_are_those_published);
    tcase_add_test(tests, doubts_are_founded);
    tcase_add_test(tests, data_are_uncertain_where_form_factors_matter);
    tcase_add_test(tests, a_short_list_of_factors_is_not_overrun);
    return run_suite("physics/structure", tests);
}
