/* test_quasi_elastic.c - responses of nuclei, published spectra of 12C. */
#include "../suite.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/physics/one_photon.h"
#include "beamhours/physics/quasi_elastic.h"
#include "beamhours/physics/structure.h"
#include "beamhours/units/constants.h"

#define D       BH_DEGREE
#define NB_GEV  1e-6 /* [ub/MeV] */
#define SPECTRA "tests/physics/quasi_elastic_spectra.csv"
#define OWN     "independent evaluation; its nucleon mass has six digits"

static bh_quasi_nucleus nucleus(int z, int a, bh_quasi_model model)
{
    bh_quasi_nucleus out;
    ck_assert_int_eq(bh_quasi_find(z, a, model, &out, NULL), BH_OK);
    return out;
}

static bh_transfer losing(const bh_inclusive *in, double lost)
{
    const double left = in->kinetic - lost;
    return bh_inclusive_transfer(in, sqrt(left * (left + 2.0 * in->mass)));
}

static void close_to(double got, double want, double tolerance, const char *what)
{
    ck_assert_msg(fabs(got - want) <= tolerance * fabs(want), "%s: %.12g, want %.12g", what, got,
                  want);
}

/* reference values */

static const struct {
    double energy, degrees, lost;                              /* [MeV] [deg] [MeV] */
    double gas_longitudinal, gas_transverse, gas, psi, scaled; /* [1/GeV] [nb/sr/GeV] [1] */
} carbon[] = {
    {620, 60, 150, 8.14092441, 14.81864474, 3047.69648, -0.2072183755, 3080.858126},
    {560, 145, 300, 2.91261574, 8.949848809, 173.4015565, -0.04352825198, 205.7224935},
    {1300, 11.95, 60, 47.70023046, 22.79296789, 1401315.953, 0.02645758657, 911310.3586},
    {2020, 20.016, 250, 4.387868433, 11.20416243, 11604.74984, -0.03020435271, 11885.64221},
    {961, 37.5, 190, 8.102710138, 15.06657452, 7052.340379, 0.02195329963, 7031.598174},
    {3595, 16.02, 500, 0.9365583227, 4.394392779, 2456.268641, 0.03685002819, 2718.89836},
};

START_TEST(carbon_checks)
{
    const bh_inclusive in = {0.0, carbon[_i].energy, carbon[_i].degrees * D};
    const bh_transfer at = losing(&in, carbon[_i].lost);
    const bh_quasi_nucleus gas = nucleus(6, 12, BH_QUASI_FERMI_GAS);
    const bh_quasi_nucleus scaled = nucleus(6, 12, BH_QUASI_SCALING);
    double longitudinal, transverse;
    bh_quasi_responses(&gas, &at, &longitudinal, &transverse);
    close_to(1e3 * longitudinal, carbon[_i].gas_longitudinal, 1e-6, "R_L of the gas: " OWN);
    close_to(1e3 * transverse, carbon[_i].gas_transverse, 1e-6, "R_T of the gas: " OWN);
    close_to(bh_quasi_cross_section(&gas, &in, &at) / NB_GEV, carbon[_i].gas, 1e-6, "gas: " OWN);
    ck_assert_double_eq_tol(bh_quasi_psi(&scaled, &at), carbon[_i].psi, 1e-6);
    close_to(bh_quasi_cross_section(&scaled, &in, &at) / NB_GEV, carbon[_i].scaled, 1e-6,
             "scaling: " OWN);
}
END_TEST

START_TEST(heavier_checks)
{
    static const struct {
        int z, a;
        double lost, scaled;
    } rows[] = {
        {20, 40, 130, 22604.69515}, {26, 56, 130, 30241.06418}, {82, 208, 140, 97838.53777}};
    const bh_inclusive in = {0.0, 500.0, 60.0 * D};
    const bh_transfer at = losing(&in, rows[_i].lost);
    const bh_quasi_nucleus n = nucleus(rows[_i].z, rows[_i].a, BH_QUASI_SCALING);
    ck_assert(!n.interpolated);
    close_to(bh_quasi_cross_section(&n, &in, &at) / NB_GEV, rows[_i].scaled, 1e-6, OWN);
    ck_assert_double_ge(bh_quasi_uncertainty(&n, 0.0), 0.2);
}
END_TEST

/* published spectra */

enum { SPECTRA_MOST = 64 };
typedef struct {
    double energy, degrees; /* [GeV] [deg] */
    double scaled, gas;     /* sums of model over data near the peak */
    double q;               /* [MeV/c] there */
    double beside, beside2; /* sums of scaled / data - 1 where it claims 15 % */
    int near, wide;
} spectrum;

static spectrum *entry(spectrum *all, int *count, double energy, double degrees)
{
    for (int i = 0; i < *count; i++)
        if (all[i].energy == energy && all[i].degrees == degrees)
            return &all[i];
    ck_assert_int_lt(*count, SPECTRA_MOST);
    all[*count] = (spectrum){.energy = energy, .degrees = degrees};
    return &all[(*count)++];
}

/* The peak is |psi'| < 0.3; counted are 200 < q < 1400 MeV/c. */
static void add_point(spectrum *s, double lost, double measured)
{
    const bh_quasi_nucleus scaled = nucleus(6, 12, BH_QUASI_SCALING);
    const bh_quasi_nucleus gas = nucleus(6, 12, BH_QUASI_FERMI_GAS);
    const bh_inclusive in = {0.0, 1e3 * s->energy, s->degrees * D};
    const bh_transfer at = losing(&in, lost);
    const double ratio = bh_quasi_cross_section(&scaled, &in, &at) / NB_GEV / measured;
    const double psi = bh_quasi_psi(&scaled, &at);
    if (bh_quasi_outside(&scaled, &at))
        return;
    if (psi > -1.0) {
        s->beside += ratio - 1.0;
        s->beside2 += (ratio - 1.0) * (ratio - 1.0);
        s->wide++;
    }
    if (fabs(psi) > 0.3)
        return;
    s->scaled += ratio;
    s->gas += bh_quasi_cross_section(&gas, &in, &at) / NB_GEV / measured;
    s->q += at.q;
    s->near++;
}

static int read_spectra(spectrum *all)
{
    FILE *file = fopen(SPECTRA, "r");
    ck_assert_msg(file != NULL, "run from the top of the tree: " SPECTRA);
    char line[256];
    int count = 0, points = 0;
    while (fgets(line, sizeof line, file)) {
        double energy, degrees, lost, measured;
        if (sscanf(line, "%lf,%lf,%lf,%lf", &energy, &degrees, &lost, &measured) != 4)
            continue;
        add_point(entry(all, &count, energy, degrees), 1e3 * lost, measured);
        points++;
    }
    (void)fclose(file);
    ck_assert_int_eq(points, 1548);
    return count;
}

START_TEST(scaling_meets_published_spectra)
{
    spectrum all[SPECTRA_MOST];
    const int count = read_spectra(all);
    double sum = 0.0, sum2 = 0.0;
    int used = 0;
    for (int i = 0; i < count; i++) {
        if (all[i].near < 3)
            continue;
        const double ratio = all[i].scaled / all[i].near;
        ck_assert_msg(ratio > 0.88 && ratio < 1.10, "E = %g GeV, %g deg: %.3f of the data",
                      all[i].energy, all[i].degrees, ratio);
        sum += ratio;
        sum2 += ratio * ratio;
        used++;
    }
    const double mean = sum / used, rms = sqrt(sum2 / used - mean * mean);
    ck_assert_int_ge(used, 28);
    ck_assert_msg(fabs(mean - 0.98) < 0.02 && rms < 0.045, "%d spectra: %.4f, rms %.4f", used, mean,
                  rms);
}
END_TEST

START_TEST(fermi_gas_meets_published_spectra)
{
    spectrum all[SPECTRA_MOST];
    const int count = read_spectra(all);
    double low = 0.0, high = 0.0;
    int lows = 0, highs = 0;
    for (int i = 0; i < count; i++) {
        if (all[i].near < 3)
            continue;
        const double q = all[i].q / all[i].near, ratio = all[i].gas / all[i].near;
        *(q < 400.0 ? &low : &high) += q < 1000.0 ? ratio : 0.0;
        *(q < 400.0 ? &lows : &highs) += q < 1000.0;
    }
    ck_assert_msg(low / lows > 1.08 && low / lows < 1.28, "below 400 MeV/c: %.3f", low / lows);
    ck_assert_msg(high / highs > 0.88 && high / highs < 1.0, "above: %.3f", high / highs);
}
END_TEST

START_TEST(beside_the_peak_the_uncertainty_covers_the_scatter)
{
    spectrum all[SPECTRA_MOST];
    const int count = read_spectra(all);
    double sum2 = 0.0;
    int points = 0;
    for (int i = 0; i < count; i++) {
        sum2 += all[i].beside2;
        points += all[i].wide;
    }
    ck_assert_int_gt(points, 500);
    ck_assert_msg(sqrt(sum2 / points) < 0.15, "rms %.3f", sqrt(sum2 / points));
}
END_TEST

/* laws */

static double elastic_sum(const bh_inclusive *in, const bh_quasi_nucleus *n)
{
    double total = 0.0;
    for (int z = 0; z < 2; z++) {
        const bh_collision c = {in->mass, z ? BH_MASS_PROTON : BH_MASS_NEUTRON, in->kinetic};
        bh_event e;
        double ge2, gm2;
        bh_structure *kelly = bh_structure_new("kelly-2004", z, 1, NULL);
        ck_assert_ptr_nonnull(kelly);
        ck_assert_int_eq(bh_kinematics_scattered(&c, in->angle, BH_BRANCH_FAST, &e, NULL), BH_OK);
        bh_structure_eval(kelly, 1, &e.q2, &ge2, &gm2);
        total +=
            (z ? n->z : n->n) * bh_one_photon(&c, &e, (bh_vertex){1.0, 1.0}, (bh_vertex){ge2, gm2});
        bh_structure_free(kelly);
    }
    return total;
}

static double quasi_sum(const bh_inclusive *in, const bh_quasi_nucleus *n)
{
    enum { STEPS = 20000 };
    double total = 0.0;
    for (int i = 0; i < STEPS; i++) {
        const bh_transfer at = losing(in, in->kinetic * (i + 0.5) / STEPS);
        total += bh_quasi_cross_section(n, in, &at) * in->kinetic / STEPS;
    }
    return total;
}

/* The slower the nucleons and the larger q, the nearer free ones. */
START_TEST(fermi_gas_sums_to_free_nucleons)
{
    static const struct {
        double fermi, tolerance;
    } rows[] = {{100.0, 0.01}, {50.0, 0.003}};
    static const double masses[] = {0.0, BH_MASS_MUON};
    const bh_inclusive in = {masses[_i % 2], 1200.0, 45.0 * D};
    bh_quasi_nucleus n = nucleus(6, 13, BH_QUASI_FERMI_GAS);
    n.fermi = rows[_i / 2].fermi;
    n.shift = 0.0;
    close_to(quasi_sum(&in, &n), elastic_sum(&in, &n), rows[_i / 2].tolerance, "sum rule");
}
END_TEST

START_TEST(scaling_sums_to_its_calibration)
{
    const bh_inclusive in = {0.0, 1200.0, 45.0 * D};
    const bh_quasi_nucleus n = nucleus(6, 12, BH_QUASI_SCALING);
    const double ratio = quasi_sum(&in, &n) / elastic_sum(&in, &n);
    ck_assert_msg(ratio > 1.0 && ratio < 1.65 * 1.0657, "%.3f", ratio);
}
END_TEST

START_TEST(never_negative_and_nothing_below_the_shift)
{
    static const int nuclei[][2] = {{3, 6}, {6, 12}, {13, 27}, {82, 208}, {92, 238}};
    for (int model = 0; model < 2; model++)
        for (double theta = 5.0; theta < 180.0; theta += 25.0)
            for (double lost = 1.0; lost < 1000.0; lost *= 1.3) {
                const bh_quasi_nucleus n =
                    nucleus(nuclei[_i][0], nuclei[_i][1], (bh_quasi_model)model);
                const bh_inclusive in = {BH_MASS_ELECTRON, 1000.0, theta * D};
                const bh_transfer at = losing(&in, lost);
                const double got = bh_quasi_cross_section(&n, &in, &at);
                ck_assert_msg(got >= 0.0 && isfinite(got), "%g at %g MeV", got, lost);
                ck_assert(lost > n.shift || got == 0.0);
            }
}
END_TEST

START_TEST(nuclei_in_between)
{
    const bh_quasi_nucleus al = nucleus(13, 27, BH_QUASI_SCALING);
    const bh_quasi_nucleus si = nucleus(14, 28, BH_QUASI_SCALING);
    const bh_quasi_nucleus u = nucleus(92, 238, BH_QUASI_SCALING);
    const bh_quasi_nucleus ta = nucleus(73, 181, BH_QUASI_FERMI_GAS);
    ck_assert_double_eq(al.fermi, 236.0);
    ck_assert_double_eq(al.shift, 18.0);
    ck_assert(!al.interpolated && si.interpolated && u.interpolated && !ta.interpolated);
    ck_assert_double_eq_tol(si.fermi, 236.0 + 5.0 / 13.0, 1e-12);
    ck_assert_double_eq(u.fermi, 248.0);
    ck_assert_double_eq(ta.shift, 42.0);
}
END_TEST

START_TEST(outside_has_reasons)
{
    const bh_quasi_nucleus c = nucleus(6, 12, BH_QUASI_SCALING);
    const struct {
        double energy, degrees, lost;
        const char *word;
    } rows[] = {{600.0, 60.0, 160.0, NULL},
                {600.0, 60.0, 10.0, NULL},
                {200.0, 20.0, 40.0, "200 MeV/c"},
                {3000.0, 90.0, 1500.0, "1400"},
                {600.0, 60.0, 400.0, "psi'"}};
    const bh_inclusive in = {0.0, rows[_i].energy, rows[_i].degrees * D};
    const bh_transfer at = losing(&in, rows[_i].lost);
    const char *why = bh_quasi_outside(&c, &at);
    ck_assert_msg(rows[_i].word ? why && strstr(why, rows[_i].word) : !why, "%s", why);
}
END_TEST

START_TEST(light_nuclei_are_refused)
{
    bh_quasi_nucleus out = {.z = 77};
    bh_error err = {0};
    ck_assert_int_eq(bh_quasi_find(2, 4, BH_QUASI_SCALING, &out, &err), BH_EDOMAIN);
    ck_assert_ptr_nonnull(strstr(err.text, "4He"));
    ck_assert_int_eq(bh_quasi_find(0, 12, BH_QUASI_SCALING, &out, NULL), BH_EDOMAIN);
    ck_assert_int_eq(bh_quasi_find(13, 12, BH_QUASI_SCALING, &out, NULL), BH_EDOMAIN);
    ck_assert_int_eq(out.z, 77);
}
END_TEST

START_TEST(uncertainties)
{
    const bh_quasi_nucleus c = nucleus(6, 12, BH_QUASI_SCALING);
    ck_assert_double_eq(bh_quasi_uncertainty(&c, 0.1), 0.05);
    ck_assert_double_eq(bh_quasi_uncertainty(&c, 0.7), 0.15);
    ck_assert_double_eq(bh_quasi_uncertainty(&c, -0.9), 0.15);
    ck_assert_double_eq(bh_quasi_uncertainty(&c, -1.5), 0.50);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("quasi-elastic");
    tcase_add_loop_test(tests, carbon_checks, 0, COUNT(carbon));
    tcase_add_loop_test(tests, heavier_checks, 0, 3);
    tcase_add_test(tests, scaling_meets_published_spectra);
    tcase_add_test(tests, fermi_gas_meets_published_spectra);
    tcase_add_test(tests, beside_the_peak_the_uncertainty_covers_the_scatter);
    tcase_add_loop_test(tests, fermi_gas_sums_to_free_nucleons, 0, 4);
    tcase_add_test(tests, scaling_sums_to_its_calibration);
    tcase_add_loop_test(tests, never_negative_and_nothing_below_the_shift, 0, 5);
    tcase_add_test(tests, nuclei_in_between);
    tcase_add_loop_test(tests, outside_has_reasons, 0, 5);
    tcase_add_test(tests, light_nuclei_are_refused);
    tcase_add_test(tests, uncertainties);
    return run_suite("quasi-elastic", tests);
}
