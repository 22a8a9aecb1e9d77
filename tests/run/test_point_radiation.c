/* test_point_radiation.c - radiation of one point: what is said, wanted and refused. */
#include "../suite.h"

#include <math.h>
#include <string.h>

#include "beamhours/run/one_point.h"
#include "beamhours/units/constants.h"

static bh_single_request electron_on(int z, int a)
{
    bh_single_request r = {.z = z, .a = a, .q2 = NAN, .epsilon = NAN};
    ck_assert(bh_particle_find("electron", &r.beam));
    r.kinetic = 854.48900104931;
    r.angle = 50.0 * BH_DEGREE;
    return r;
}

static double value(const bh_single *s, const char *key)
{
    for (size_t i = 0; i < s->count; i++)
        if (strcmp(s->values[i].key, key) == 0)
            return s->values[i].value;
    return NAN;
}

static bh_single point(const bh_single_request *r)
{
    bh_single s;
    bh_error err = {0};
    ck_assert_msg(bh_single_compute(r, &s, &err) == BH_OK, "%s", err.text);
    return s;
}

START_TEST(published_event)
{
    const char *source = "eq. 5.2 of Maximon & Tjon 2000, K05 of radiative_rows.csv";
    bh_single_request r = electron_on(1, 1);
    r.energy_cut = 10.0;
    const bh_single s = point(&r);
    const double total = value(&s, "delta_z0") + value(&s, "delta_z1") + value(&s, "delta_z2");
    ck_assert_msg(fabs(total + 0.2178498206) < 2e-6, "%.10g (%s)", total, source);
    const double vacuum = 0.01945011512 + 0.003171370148 + 3.814293071e-05 + 0.004364892552;
    ck_assert_msg(fabs(value(&s, "vacuum_polarisation") - vacuum) < 1e-7, "%s", source);
    ck_assert_double_eq_tol(value(&s, "radiative_factor_internal"),
                            exp(total) / pow(1.0 - 0.5 * vacuum, 2.0), 1e-7);
    ck_assert_str_eq(s.warning[3], "");
}
END_TEST

START_TEST(charges_and_nuclei)
{
    bh_single_request r = electron_on(6, 12);
    r.energy_cut = 5.0;
    const bh_single minus = point(&r);
    ck_assert(bh_particle_find("positron", &r.beam));
    const bh_single plus = point(&r);
    ck_assert_double_eq(value(&minus, "delta_z1"), -value(&plus, "delta_z1"));
    const double ratio =
        value(&plus, "radiative_factor_internal") / value(&minus, "radiative_factor_internal");
    ck_assert_double_eq_tol(log(ratio), 12.0 * value(&plus, "delta_z1"), 1e-14);
    ck_assert(bh_particle_find("proton", &r.beam));
    const bh_single proton = point(&r);
    ck_assert_double_eq(value(&proton, "radiative_factor_internal"), 1.0);
}
END_TEST

START_TEST(only_where_asked)
{
    bh_single_request r = electron_on(1, 1);
    bh_single s = point(&r);
    ck_assert(isnan(value(&s, "radiative_factor_internal")));
    r.radiative = "none";
    s = point(&r);
    ck_assert_double_eq(value(&s, "radiative_factor_internal"), 1.0);
    ck_assert_double_eq(value(&s, "delta_z0"), 0.0);
}
END_TEST

START_TEST(warnings)
{
    bh_single_request r = electron_on(1, 1);
    r.energy_cut = 30.0;
    bh_single s = point(&r);
    ck_assert_ptr_nonnull(strstr(s.warning[3], "4.7 %"));
    ck_assert_str_eq(s.warning[4], "");
    r.recoil = true;
    s = point(&r);
    ck_assert_ptr_nonnull(strstr(s.warning[4], "losing up to 30 MeV"));
}
END_TEST

START_TEST(refused)
{
    const struct {
        const char *radiative;
        double cut;
        const char *says;
    } row[] = {{"maximon", 10.0, "no radiative correction \"maximon\""},
               {"mo-tsai", 0.0, "mo-tsai needs an energy cut"},
               {"default", 0.0, "maximon-tjon needs an energy cut"},
               {NULL, -1.0, "an energy cut of -1 MeV; it must be above 0"},
               {NULL, (double)NAN, "it must be above 0"}};
    for (int i = 0; i < COUNT(row); i++) {
        bh_single_request r = electron_on(1, 1);
        bh_single s;
        bh_error err = {0};
        r.radiative = row[i].radiative;
        r.energy_cut = row[i].cut;
        ck_assert_int_eq(bh_single_compute(&r, &s, &err), BH_EDOMAIN);
        ck_assert_msg(strstr(err.text, row[i].says), "%s, not %s", err.text, row[i].says);
    }
    bh_single_request r = electron_on(1, 1);
    r.process = "inelastic ";
    bh_single s;
    bh_error err = {0};
    ck_assert_int_eq(bh_single_compute(&r, &s, &err), BH_EDOMAIN);
    ck_assert_ptr_nonnull(strstr(err.text, "no process"));
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("point");
    tcase_add_test(tests, published_event);
    tcase_add_test(tests, charges_and_nuclei);
    tcase_add_test(tests, only_where_asked);
    tcase_add_test(tests, warnings);
    tcase_add_test(tests, refused);
    return run_suite("point_radiation", tests);
}
