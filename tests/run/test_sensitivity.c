/* test_sensitivity.c - what a rate changes by with the arm's angle and the beam's momentum, against
 * rates with the arm turned and the beam changed. */
#include "evaluated.h"

#include "beamhours/run/passage.h"
#include "beamhours/units/constants.h"

enum { MOST_ARMS = 8 };

static const char *const demos[] = {"hydrogen-separation", "hydrogen-jet", "positron-electron",
                                    "muon-rings",          "alpha-gold",   "lead"};

/* What differs from the plan as it is. */
struct step {
    double turned;  /* [rad] of every arm */
    double boosted; /* [1] of the beam's momentum */
};

static void read_demo(const char *name, char *text, size_t size)
{
    char path[128];
    snprintf(path, sizeof path, "plans/%s.yaml", name);
    FILE *file = fopen(path, "rb");
    ck_assert_ptr_nonnull(file);
    text[fread(text, 1, size - 1, file)] = '\0';
    fclose(file);
    ck_assert_uint_gt(strlen(text), 100);
}

/* The table of the same plan after a step; every arm's magnets stay at what row by row they are set
 * to now. */
static bh_table *stepped(const struct evaluated *e, const struct step *by, bh_setting *settings,
                         bh_setting_arm (*arms)[MOST_ARMS])
{
    bh_plan plan = *e->plan;
    bh_error err = {.code = BH_OK};
    size_t row = 0;
    for (size_t s = 0; s < plan.setting_count; s++) {
        settings[s] = plan.settings[s];
        bh_beam *beam = &settings[s].beam;
        beam->kinetic_energy.value =
            bh_boosted_kinetic(&beam->particle, beam->kinetic_energy.value, by->boosted);
        ck_assert_uint_le(settings[s].arm_count, MOST_ARMS);
        for (size_t a = 0; a < settings[s].arm_count; a++, row++) {
            bh_setting_arm *arm = &arms[s][a];
            const double central = cell(e, row, BH_COL_CENTRAL_MOMENTUM);
            *arm = plan.settings[s].arms[a];
            arm->angle.value += by->turned;
            arm->central_momentum.given = central > 0; /* a ring has none */
            arm->central_momentum.value = central;
        }
        settings[s].arms = arms[s];
    }
    plan.settings = settings;
    bh_table *table = bh_table_new(&plan, &(bh_evaluation){.bins = false}, e->diags, &err);
    ck_assert_msg(table != NULL, "%s", err.text);
    return table;
}

/* [1] What radiation leaves inside a cut follows the angle over an opening, the momentum in one
 * angle for all: arms that are a solid angle alone and wide rings are good to 1 %. */
static double tolerance_of(const struct evaluated *e, size_t row)
{
    for (size_t s = 0; s < e->plan->setting_count; s++) {
        const bh_setting *setting = &e->plan->settings[s];
        if (row < setting->arm_count)
            return setting->arms[row].arm.in_plane.given ? 6e-4 : 1e-2;
        row -= setting->arm_count;
    }
    return 0;
}

/* Relative change of each row's rate from one step to the opposite one, for `per` of it. */
static int check(const struct evaluated *e, struct step by, double per, bh_column_id column)
{
    int compared = 0;
    const size_t rows = bh_table_rows(e->table, false), count = e->plan->setting_count;
    bh_setting *settings = calloc(count, sizeof *settings);
    bh_setting_arm(*arms)[MOST_ARMS] = calloc(count, sizeof *arms);
    ck_assert(settings && arms);
    bh_table *on = stepped(e, &by, settings, arms);
    by.turned *= -1;
    by.boosted *= -1;
    bh_table *back = stepped(e, &by, settings, arms);
    for (size_t row = 0; row < rows; row++) {
        const double got = cell(e, row, column);
        const double more = bh_table_number(on, false, row, BH_COL_SIGNAL);
        const double less = bh_table_number(back, false, row, BH_COL_SIGNAL);
        const double wanted = (more - less) / cell(e, row, BH_COL_SIGNAL) / per;
        if (isnan(got)) /* a ring does not turn */
            continue;
        ck_assert_relative(got, wanted, tolerance_of(e, row), e->plan->title.text);
        compared++;
    }
    bh_table_free(on);
    bh_table_free(back);
    free(settings);
    free(arms);
    return compared;
}

START_TEST(sensitivities_are_changes_of_rates)
{
    char text[65536];
    read_demo(demos[_i], text, sizeof text);
    struct evaluated e = evaluate(text);
    const int turned = check(&e, (struct step){.turned = 0.2e-3}, 0.4, BH_COL_PER_MRAD);
    const int boosted = check(&e, (struct step){.boosted = 2e-4}, 0.4, BH_COL_PER_PERMILLE);
    ck_assert_uint_eq((size_t)boosted, bh_table_rows(e.table, false));
    ck_assert_int_eq(turned, e.plan->arms[0].ring.given ? 0 : boosted);
    done(&e);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("sensitivity");
    tcase_set_timeout(tests, 60);
    tcase_add_loop_test(tests, sensitivities_are_changes_of_rates, 0, COUNT(demos));
    return run_suite("sensitivity", tests);
}
