/* test_columns.c - the list of columns: keys, order, look-up. */
#include <string.h>

#include "../suite.h"
#include "beamhours/run/columns.h"

/* What other programs read: a change here breaks them. */
static const char *const keys[] = {"setting",
                                   "arm",
                                   "bin",
                                   "particle",
                                   "target",
                                   "scatterer",
                                   "beam_kinetic_MeV",
                                   "vertex_kinetic_MeV",
                                   "angle_deg",
                                   "scattered_angle_deg",
                                   "scattered_kinetic_MeV",
                                   "scattered_momentum_MeV_per_c",
                                   "recoil_kinetic_MeV",
                                   "recoil_angle_deg",
                                   "central_momentum_MeV_per_c",
                                   "q2_GeV2",
                                   "q_per_fm",
                                   "epsilon",
                                   "point_cross_section_ub_per_sr",
                                   "cross_section_ub_per_sr",
                                   "solid_angle_msr",
                                   "beam_per_s",
                                   "seen_per_cm2",
                                   "luminosity_per_cm2_s",
                                   "radiative_factor",
                                   "kept_fraction",
                                   "efficiency",
                                   "signal_rate_Hz",
                                   "background_rate_Hz",
                                   "live_fraction",
                                   "hours",
                                   "empty_hours",
                                   "charge_mC",
                                   "counts",
                                   "statistical_uncertainty",
                                   "systematic_uncertainty",
                                   "hours_to_goal",
                                   "rate_change_per_mrad",
                                   "rate_change_per_permille_momentum"};

START_TEST(keys_are_a_contract)
{
    ck_assert_int_eq(BH_COLUMN_COUNT, COUNT(keys));
    for (int i = 0; i < COUNT(keys); i++) {
        ck_assert_str_eq(bh_column_at(i)->key, keys[i]);
        ck_assert_int_eq(bh_column_find(keys[i]), i);
    }
}
END_TEST

START_TEST(every_column_is_described)
{
    for (int i = 0; i < BH_COLUMN_COUNT; i++) {
        const bh_column *c = bh_column_at(i);
        ck_assert_msg(*c->heading && *c->meaning, "%s has no heading or meaning", c->key);
        ck_assert_msg((c->kind == BH_CELL_NUMBER) == (c->digits > 0), "digits of %s", c->key);
        ck_assert_msg((c->kind == BH_CELL_NUMBER) == (*c->unit != 0), "unit of %s", c->key);
    }
}
END_TEST

START_TEST(no_column)
{
    ck_assert_ptr_null(bh_column_at(-1));
    ck_assert_ptr_null(bh_column_at(BH_COLUMN_COUNT));
    ck_assert_int_eq(bh_column_find("angle"), -1);
    ck_assert_int_eq(bh_column_find(""), -1);
}
END_TEST

static const struct {
    const char *read, *meant;
} slips[] = {{"angle", "angle_deg"},
             {"cross_section", "cross_section_ub_per_sr"},
             {"signal_rate_hz", "signal_rate_Hz"},
             {"hour", "hours"},
             {"q2_Gev2", "q2_GeV2"},
             {"hours_for_goal", "hours_to_goal"},
             {"statistical_uncertanty", "statistical_uncertainty"},
             {"luminosity_per_nucleon", "luminosity_per_cm2_s"},
             {"", NULL},
             {"xx", NULL},
             {"a_key_that_is_longer_than_any_column_could_ever_be_and_means_nothing", NULL}};

START_TEST(nearest_key)
{
    for (int i = 0; i < COUNT(slips); i++) {
        const char *got = bh_column_suggest(slips[i].read);
        if (slips[i].meant)
            ck_assert_msg(got && strcmp(got, slips[i].meant) == 0, "%s gave %s", slips[i].read,
                          got ? got : "nothing");
        else
            ck_assert_msg(!got, "%s gave %s", slips[i].read, got ? got : "");
    }
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("columns");
    tcase_add_test(tests, keys_are_a_contract);
    tcase_add_test(tests, every_column_is_described);
    tcase_add_test(tests, no_column);
    tcase_add_test(tests, nearest_key);
    return run_suite("columns", tests);
}
