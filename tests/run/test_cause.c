/* test_cause.c - how causes combine to the uncertainty of a rate and of a ratio. */
#include "../suite.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/run/cause.h"

/* Causes that rows draw on, by number. */
static const bh_cause known[] = {
    {BH_CAUSE_CURRENT, {"p", 2, 5}, "beam.current", 0, 0, NULL},
    {BH_CAUSE_ANGLE, {"p", 9, 5}, "settings.K.angle", 0, 0, NULL},
    {BH_CAUSE_ANGLE, {"p", 10, 5}, "settings.L.angle", 0, 0, NULL},
    {BH_CAUSE_STRUCTURE, {"p", 1, 1}, "models.structure", 1, 1, "one"},
    {BH_CAUSE_STRUCTURE, {"p", 1, 1}, "models.structure", 1, 1, "two"},
    {BH_CAUSE_STRUCTURE, {"p", 1, 1}, "models.structure", 1, 1, NULL},
    {BH_CAUSE_STRUCTURE, {"p", 1, 1}, "models.structure", 1, 2, "one"},
    {BH_CAUSE_STRUCTURE, {"p", 1, 1}, "models.structure", 6, 12, "one"},
    {BH_CAUSE_DEAD_TIME, {"p", 7, 5}, "arms.A.dead_time", 0, 0, NULL}};

enum { CURRENT, ANGLE_K, ANGLE_L, ONE, TWO, FIT, DEUTERON, CARBON, DEAD, MOST = 4 };

struct row {
    unsigned cause[MOST];
    double effect[MOST]; /* 0 ends them */
};

/* Two rows, what each is uncertain by, and their ratio; by hand. */
static const struct {
    const char *what;
    struct row row, other;
    double total, of_other, ratio;
} cases[] = {
    {"in quadrature; one current cancels",
     {{CURRENT, ANGLE_K}, {0.03, 0.04}},
     {{CURRENT, ANGLE_L}, {0.03, -0.03}},
     0.05,
     0.0424264068711928515,
     0.05},
    {"counts are no rate", {{CURRENT, DEAD}, {0.03, 0.5}}, {{DEAD}, {0.1}}, 0.03, 0, 0.03},
    {"half the range, 0 in it",
     {{ONE, TWO}, {0.02, 0.06}},
     {{ONE, TWO}, {0.01, 0.06}},
     0.03,
     0.03,
     0.005},
    {"both sides of 0", {{ONE, TWO}, {-0.02, 0.06}}, {{ONE, TWO}, {0.02, -0.02}}, 0.04, 0.02, 0.06},
    {"only models with data in both",
     {{ONE, TWO}, {0.02, 0.06}},
     {{ONE, TWO}, {0.02, NAN}},
     0.03,
     0.01,
     0},
    {"a fit of one, models of the other",
     {{FIT}, {0.03}},
     {{ONE, TWO}, {0.02, 0.08}},
     0.03,
     0.04,
     0.05},
    {"one fit for both", {{FIT}, {0.03}}, {{FIT}, {0.01}}, 0.03, 0.01, 0.02},
    {"isotopes linearly", {{ONE, DEUTERON}, {0.02, 0.04}}, {{ONE}, {0.02}}, 0.03, 0.01, 0.02},
    {"another element is independent", {{ONE}, {0.06}}, {{CARBON}, {0.08}}, 0.03, 0.04, 0.05},
    {"nothing", {{0}, {0}}, {{0}, {0}}, 0, 0, 0}};

/* `row` with its causes entered in the list. */
static bh_effects enter(bh_causes *causes, const struct row *row, unsigned numbers[MOST])
{
    size_t n = 0;
    while (n < MOST && (row->effect[n] < 0 || row->effect[n] > 0 || isnan(row->effect[n]))) {
        ck_assert_int_eq(bh_causes_number(causes, &known[row->cause[n]], &numbers[n], NULL), BH_OK);
        n++;
    }
    return (bh_effects){n, numbers, row->effect};
}

static void is_near(double got, double wanted, const char *what)
{
    ck_assert_msg(fabs(got - wanted) < 1e-12, "%s: %g, wanted %g", what, got, wanted);
}

START_TEST(causes_combine)
{
    bh_arena *arena = bh_arena_new();
    bh_causes *causes = bh_causes_new(arena);
    unsigned numbers[2][MOST];
    const bh_effects row = enter(causes, &cases[_i].row, numbers[0]);
    const bh_effects other = enter(causes, &cases[_i].other, numbers[1]);
    is_near(bh_effects_total(causes, &row), cases[_i].total, cases[_i].what);
    is_near(bh_effects_total(causes, &other), cases[_i].of_other, cases[_i].what);
    is_near(bh_effects_of_ratio(causes, &row, &other), cases[_i].ratio, cases[_i].what);
    is_near(bh_effects_of_ratio(causes, &other, &row), cases[_i].ratio, cases[_i].what);
    is_near(bh_effects_of_ratio(causes, &row, &row), 0, cases[_i].what);
    bh_arena_free(arena);
}
END_TEST

/* Each cause once, however many there are; the same after copying. */
START_TEST(a_cause_is_known_again)
{
    enum { MANY = 500 };
    bh_arena *arena = bh_arena_new();
    bh_causes *causes = bh_causes_new(arena);
    for (int round = 0; round < 2; round++)
        for (int i = 0; i < MANY; i++) {
            char key[32];
            unsigned number = 0;
            snprintf(key, sizeof key, "settings.K%d.angle", i);
            const bh_cause cause = {BH_CAUSE_ANGLE, {"p", i / 2, i % 2}, key, 0, 0, NULL};
            ck_assert_int_eq(bh_causes_number(causes, &cause, &number, NULL), BH_OK);
            ck_assert_uint_eq(number, (unsigned)i);
        }
    ck_assert_uint_eq(bh_causes_count(causes), MANY);
    const bh_causes *copy = bh_causes_copy(causes, arena);
    ck_assert_uint_eq(bh_causes_count(copy), MANY);
    ck_assert_str_eq(bh_causes_at(copy, MANY - 1)->key, "settings.K499.angle");
    ck_assert_ptr_null(bh_causes_at(copy, MANY));
    unsigned number = 0;
    const bh_cause elsewhere = {BH_CAUSE_ANGLE, {"q", 0, 0}, "settings.K0.angle", 0, 0, NULL};
    ck_assert_int_eq(bh_causes_number(causes, &elsewhere, &number, NULL), BH_OK);
    ck_assert_uint_eq(number, MANY);
    bh_arena_free(arena);
}
END_TEST

START_TEST(kinds_have_a_source_and_words)
{
    for (int k = 0; k < BH_CAUSE_KINDS; k++) {
        ck_assert_int_gt((int)strlen(bh_cause_source((bh_cause_kind)k)), 3);
        ck_assert_int_gt((int)strlen(bh_cause_words((bh_cause_kind)k)), 3);
    }
    ck_assert_str_eq(bh_cause_source(BH_CAUSE_KINDS), "");
    ck_assert_str_eq(bh_cause_words(BH_CAUSE_KINDS), "");
    ck_assert(!bh_cause_on_counts(BH_CAUSE_BACKGROUND) && bh_cause_on_counts(BH_CAUSE_OTHER_RATE));
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("cause");
    tcase_add_loop_test(tests, causes_combine, 0, COUNT(cases));
    tcase_add_test(tests, a_cause_is_known_again);
    tcase_add_test(tests, kinds_have_a_source_and_words);
    return run_suite("cause", tests);
}
