/* test_bremsstrahlung.c - what a cut keeps in spite of bremsstrahlung and ionisation. */
#include "passing.h"

#include "beamhours/matter/bremsstrahlung.h"
#include "beamhours/units/constants.h"

/* A massless electron on a proton. */
static bh_external elastic(double energy, double degrees, double cut)
{
    const double angle = degrees * BH_DEGREE;
    const double scattered =
        energy / (1.0 + energy / BH_MASS_PROTON * 2.0 * pow(sin(0.5 * angle), 2));
    return (bh_external){.incident = energy, .scattered = scattered, .cut = cut};
}

/* ---- published ---- */

static void row(char *f[])
{
    bh_external x = elastic(atof(f[1]), atof(f[2]), atof(f[3]));
    const double before = atof(f[4]);
    const double after = atof(f[5]);
    x.before = (bh_passage){before, 1.352734718, bh_mo_tsai_xi(1, before)};
    x.after = (bh_passage){after, 1.352734718, bh_mo_tsai_xi(1, after)};
    const double external = log(bh_external_kept(&x));
    const double ionisation = bh_ionisation_kept(&x);
    ck_assert_msg(fabs(external - atof(f[7])) < 4e-3, "%s: %.5f, not %s; published", f[0], external,
                  f[7]);
    /* t is printed to 1e-4 of a radiation length */
    ck_assert_msg(fabs(external - atof(f[6])) < 4e-4, "%s: %.6f, not %s; computed", f[0], external,
                  f[6]);
    ck_assert_msg(fabs(ionisation - atof(f[9])) < 7e-4,
                  "%s: %.5f, not %s; Gramolin and Nikolenko, Phys. Rev. C 93 (2016) 055201", f[0],
                  ionisation, f[9]);
    ck_assert_msg(fabs(ionisation - atof(f[8])) < 3e-5, "%s: %.6f, not %s; computed", f[0],
                  ionisation, f[8]);
}

START_TEST(published)
{
    ck_assert_int_eq(each_row("tests/matter/external_factors.csv", row, 10), 32);
}
END_TEST

/* Against a numerical convolution of both sides, computed independently; b = 4/3. */
START_TEST(convolution)
{
    const struct {
        double energy, degrees, cut, thin, thick;
    } rows[] = {
        {180, 60, 5, 0.9623304189, 0.8909769106},    {315, 90, 5, 0.9589643293, 0.8828239007},
        {500, 90, 10, 0.9645764192, 0.8992393088},   {855, 30, 10, 0.9517443127, 0.8620312046},
        {855, 50, 10, 0.9549209873, 0.871659392},    {855, 105, 10, 0.9641771149, 0.900142809},
        {1000, 30, 10, 0.9501058246, 0.8576912785},  {1100, 2.5, 25, 0.9580238327, 0.8785384656},
        {2200, 1.5, 50, 0.9580178537, 0.8785201891}, {2000, 45, 20, 0.956810911, 0.8780342482},
        {4000, 45, 40, 0.9630550151, 0.8972801275},  {5500, 25, 50, 0.9546912852, 0.871936558}};
    for (int i = 0; i < COUNT(rows); i++) {
        bh_external x = elastic(rows[i].energy, rows[i].degrees, rows[i].cut);
        x.before = (bh_passage){0.005, 4.0 / 3.0, 0.0};
        x.after = (bh_passage){0.005, 4.0 / 3.0, 0.0};
        NEAR(bh_external_kept(&x), rows[i].thin, 1e-6, "%g MeV, thin", rows[i].energy);
        x.before.thickness = 0.02;
        x.after.thickness = 0.01;
        NEAR(bh_external_kept(&x), rows[i].thick, 1e-6, "%g MeV, thick", rows[i].energy);
    }
}
END_TEST

/* ---- laws ---- */

START_TEST(rises_with_the_cut)
{
    double before = 0.0;
    double tail = 0.0;
    for (double cut = 0.01; cut < 300.0; cut *= 1.5) {
        bh_external x = elastic(1000.0, 60.0, cut);
        x.before = (bh_passage){0.01, 1.36, 0.001};
        x.after = (bh_passage){0.03, 1.36, 0.003};
        const double kept = bh_external_kept(&x);
        ck_assert_msg(kept > before && kept <= 1.0, "%g: %g", cut, kept);
        ck_assert_double_ge(bh_ionisation_kept(&x), tail);
        before = kept;
        tail = bh_ionisation_kept(&x);
    }
}
END_TEST

START_TEST(nothing_in_the_way)
{
    bh_external x = elastic(1000.0, 60.0, 10.0);
    ck_assert_double_eq(bh_external_kept(&x), 1.0);
    ck_assert_double_eq(bh_ionisation_kept(&x), 1.0);
    x.after = (bh_passage){0.0, (double)NAN, 0.0}; /* no layer has no b */
    ck_assert_double_eq(bh_external_kept(&x), 1.0);
    x.after.xi = 50.0; /* far more than the formula is for */
    ck_assert_double_eq(bh_ionisation_kept(&x), 0.0);
}
END_TEST

START_TEST(what_is_refused)
{
    for (int i = 0; i < 6; i++) {
        bh_external x = elastic(1000.0, 60.0, 10.0);
        double *const members[] = {&x.incident,         &x.scattered,       &x.cut,
                                   &x.before.thickness, &x.after.thickness, &x.after.xi};
        *members[i] = i < 3 ? 0.0 : -0.01;
        ck_assert(isnan(bh_external_kept(&x)) && isnan(bh_ionisation_kept(&x)));
        *members[i] = (double)NAN;
        ck_assert(isnan(bh_external_kept(&x)) && isnan(bh_ionisation_kept(&x)));
    }
}
END_TEST

int main(void)
{
    TCase *t = tcase_create("bremsstrahlung");
    tcase_add_test(t, published);
    tcase_add_test(t, convolution);
    tcase_add_test(t, rises_with_the_cut);
    tcase_add_test(t, nothing_in_the_way);
    tcase_add_test(t, what_is_refused);
    return run_suite("bremsstrahlung", t);
}
