/* test_form_factor_rows.c - published fits, each coefficient at work: form_factor_rows.csv holds
 * the values that an independent program computes from form_factor_fits.csv at 30 digits. */
#include "../suite.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/physics/form_factor.h"
#include "beamhours/units/constants.h"

#define ROWS "tests/physics/form_factor_rows.csv"

static double value_of(const bh_structure *structure, double q2, const char *factor)
{
    const char *name[BH_FACTORS_MOST];
    double value[BH_FACTORS_MOST], sigma[BH_FACTORS_MOST] = {0};
    const bool spread = strncmp(factor, "sigma ", 6) == 0;
    const char *wanted = spread ? factor + 6 : factor;
    const int n = bh_structure_factors(structure, q2, BH_FACTORS_MOST, name, value);
    if (spread)
        structure->spread(structure, q2, sigma);
    for (int i = 0; i < n; i++)
        if (strcmp(name[i], wanted) == 0)
            return spread ? sigma[i] : value[i];
    return (double)NAN;
}

/* Sums of a dozen coefficients of either sign cancel where a fit is small: 1e-9 of the value; the
 * conformal series far beyond its data cancels more. */
START_TEST(every_row)
{
    FILE *file = fopen(ROWS, "r");
    ck_assert_msg(file != NULL, "run from the top of the tree: " ROWS);
    char line[256], model[48], factor[16];
    int rows = 0, z, a;
    double gev2, wanted;
    while (fgets(line, sizeof line, file)) {
        if (sscanf(line, "%47[^,],%d,%d,%15[^,],%lf,%lf", model, &z, &a, factor, &gev2, &wanted) !=
            6)
            continue;
        bh_error err;
        bh_structure *structure = bh_structure_new(model, z, a, &err);
        ck_assert_msg(structure != NULL, "%s: %s", model, err.text);
        const double got = value_of(structure, gev2 * 1e6, factor);
        bh_structure_free(structure);
        ck_assert_msg(fabs(got / wanted - 1.0) < 1e-9,
                      "%sgot %.12g (coefficients: "
                      "form_factor_fits.csv)",
                      line, got);
        rows++;
    }
    (void)fclose(file);
    ck_assert_int_eq(rows, 191);
}
END_TEST

/* [fm] from three values, so that terms of q^4 drop out; relative to that at 0, which is 0.99999
 * for one fit. */
static double radius_from_slope(const bh_structure *structure)
{
    const char *name[BH_FACTORS_MOST];
    double at[3][BH_FACTORS_MOST];
    const double step = 4.0; /* MeV^2 */
    for (int j = 0; j < 3; j++)
        (void)bh_structure_factors(structure, j * step, BH_FACTORS_MOST, name, at[j]);
    const double slope = (-3.0 * at[0][0] + 4.0 * at[1][0] - at[2][0]) / (2.0 * step);
    return BH_HBARC * sqrt(-6.0 * slope / at[0][0]);
}

/* Q2 -> 0, for every model of some nuclei of every kind. */
START_TEST(slope_at_zero_is_the_radius)
{
    static const int nuclei[][2] = {{1, 1},    {1, 2},    {1, 3},   {2, 3},   {2, 4},
                                    {6, 12},   {8, 16},   {13, 27}, {20, 40}, {26, 56},
                                    {50, 120}, {79, 197}, {82, 208}};
    int seen = 0;
    const bh_structure_model *model;
    for (int i = 0; (model = bh_structure_model_at(i)) != NULL; i++)
        for (int k = 0; k < COUNT(nuclei); k++) {
            const int z = nuclei[k][0], a = nuclei[k][1];
            if (bh_structure_sets(model, z, a) == 0 || strcmp(model->name, "point") == 0)
                continue;
            bh_error err;
            bh_structure *structure = bh_structure_new(model->name, z, a, &err);
            ck_assert_msg(structure != NULL, "%s: %s", model->name, err.text);
            const double radius = radius_from_slope(structure);
            ck_assert_msg(fabs(radius / bh_structure_radius(structure) - 1.0) < 2e-4,
                          "%s %d %d: slope %.7g fm, radius %.7g fm", model->name, z, a, radius,
                          bh_structure_radius(structure));
            seen++;
            bh_structure_free(structure);
        }
    ck_assert_int_gt(seen, 30);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("form factor rows");
    tcase_add_test(tests, every_row);
    tcase_add_test(tests, slope_at_zero_is_the_radius);
    return run_suite("physics/form_factor_rows", tests);
}
