/* test_table.c - the run table: what its numbers must be whatever the physics. */
#include "evaluated.h"

#include <pthread.h>

/* Three layers, four bins, a bite and an empty target: everything takes part. */
#define BEAM     "plan: 1\nbeam: {particle: electron, kinetic_energy: 855 MeV, current: 10 uA}\n"
#define LOSSLESS "models: {energy_loss: none}\n"
#define TARGET                                                       \
    "target:\n  name: cell\n  layers:\n"                             \
    "    - {material: aluminium, thickness: 0.1 mm, role: window}\n" \
    "    - {material: liquid-hydrogen, thickness: 50 mm}\n"          \
    "    - {material: aluminium, thickness: 0.2 mm, role: window}\n" \
    "  scatterer: H\n"
#define EMPTY "  empty_target: {share: 10 %}\n"
#define BEST  "  empty_target: {share: best}\n"
#define ARM                                                                      \
    "arms:\n  - name: A\n    in_plane: ±28 mrad\n    out_of_plane: ±70 mrad\n" \
    "    bins: 4\n    momentum_bite: ±5 %\n    efficiency: 95 %\n    dead_time: 5 us\n"
#define OPEN_ARM "arms:\n  - {name: A, solid_angle: 6 msr}\n"
#define SCAN     "settings:\n  - {name: K, angle: [25 deg, 40 deg, 60 deg], goal: 0.5 %}\n"

static const char *const plans[] = {
    BEAM TARGET EMPTY ARM SCAN,
    BEAM TARGET BEST ARM SCAN,
    BEAM TARGET ARM "settings:\n  - {name: K, angle: 30 deg, time: 3 h}\n",
    BEAM TARGET EMPTY "arms:\n  - {name: A, ring: {from: 20 deg, to: 70 deg}, bins: 5}\n"
                      "settings:\n  - {name: R, counts: 100000}\n",
    BEAM TARGET EMPTY
    "arms:\n  - {name: A, detects: recoil, in_plane: ±30 mrad, out_of_plane: "
    "±30 mrad, bins: 2}\nsettings:\n  - {name: P, angle: 50 deg, charge: 10 mC}\n",
    BEAM TARGET EMPTY "arms:\n  - {name: A, detects: either, in_plane: ±30 mrad, out_of_plane: "
                      "±30 mrad}\nsettings:\n  - {name: E, angle: 45 deg, time: 1 h}\n",
    BEAM TARGET EMPTY "arms:\n  - {name: A, solid_angle: 6 msr}\n"
                      "settings:\n  - {name: S, angle: 45 deg}\n",
};

static void check_product(const bh_table *table, bool bins, size_t row)
{
    double product = 1e-30 * 1e-3;
    static const bh_column_id factors[] = {
        BH_COL_BEAM,      BH_COL_SEEN, BH_COL_CROSS_SECTION, BH_COL_SOLID_ANGLE,
        BH_COL_RADIATIVE, BH_COL_KEPT, BH_COL_EFFICIENCY};
    for (int i = 0; i < COUNT(factors); i++)
        product *= bh_table_number(table, bins, row, factors[i]);
    const double signal = bh_table_number(table, bins, row, BH_COL_SIGNAL);
    ck_assert_relative(signal, product, 1e-13, "signal rate");
    ck_assert_double_gt(signal, 0);
    ck_assert_relative(bh_table_number(table, bins, row, BH_COL_LUMINOSITY),
                       bh_table_number(table, bins, row, BH_COL_BEAM) *
                           bh_table_number(table, bins, row, BH_COL_SEEN),
                       1e-15, "luminosity");
    const double hours = bh_table_number(table, bins, row, BH_COL_HOURS);
    if (!isnan(hours))
        ck_assert_relative(bh_table_number(table, bins, row, BH_COL_COUNTS),
                           signal * bh_table_number(table, bins, row, BH_COL_LIVE) * 3600 * hours,
                           1e-13, "counts");
}

START_TEST(a_row_multiplies_out)
{
    struct evaluated e = evaluate(plans[_i]);
    for (int bins = 0; bins < 2; bins++)
        for (size_t row = 0; row < bh_table_rows(e.table, bins); row++)
            check_product(e.table, bins, row);
    done(&e);
}
END_TEST

START_TEST(an_empty_cell_has_a_reason_and_a_full_one_none)
{
    struct evaluated e = evaluate(plans[_i]);
    for (int bins = 0; bins < 2; bins++)
        for (size_t row = 0; row < bh_table_rows(e.table, bins); row++)
            for (int c = 0; c < BH_COLUMN_COUNT; c++) {
                const bool text = bh_column_at(c)->kind == BH_CELL_TEXT;
                const bool empty = isnan(bh_table_number(e.table, bins, row, (bh_column_id)c));
                const char *why = bh_table_reason(e.table, bins, row, (bh_column_id)c);
                ck_assert_msg((why != NULL) == (empty && !text), "%s", bh_column_at(c)->key);
                ck_assert_msg((bh_table_text(e.table, bins, row, (bh_column_id)c) != NULL) == text,
                              "%s", bh_column_at(c)->key);
            }
    done(&e);
}
END_TEST

/* Sums over the bins of the first arm row of each setting. */
START_TEST(bins_add_up_to_the_arm)
{
    struct evaluated e = evaluate(plans[_i]);
    static const bh_column_id added[] = {BH_COL_SIGNAL, BH_COL_BACKGROUND, BH_COL_SOLID_ANGLE,
                                         BH_COL_COUNTS};
    size_t bin = 0;
    for (size_t row = 0; row < bh_table_rows(e.table, false); row++) {
        double sum[COUNT(added)] = {0};
        const bh_place whole = bh_table_place(e.table, false, row);
        ck_assert_int_eq(whole.bin, 0);
        const bh_arm *arm = &e.plan->settings[whole.setting].arms[whole.arm].arm;
        for (int b = 1; b <= arm->bins; b++, bin++) {
            ck_assert_int_eq(bh_table_place(e.table, true, bin).bin, b);
            ck_assert_double_eq(bin_cell(&e, bin, BH_COL_BIN), b);
            for (int i = 0; i < COUNT(added); i++)
                sum[i] += bin_cell(&e, bin, added[i]);
        }
        for (int i = 0; i < COUNT(added); i++)
            if (!isnan(sum[i]))
                ck_assert_relative(sum[i], cell(&e, row, added[i]), 1e-6,
                                   bh_column_at((int)added[i])->key);
    }
    ck_assert_uint_eq(bin, bh_table_rows(e.table, true));
    done(&e);
}
END_TEST

START_TEST(hours_to_goal_fed_back_as_time_give_the_goal)
{
    static const char *const targets[] = {TARGET EMPTY, TARGET BEST, TARGET};
    char text[4096], seconds[64];
    snprintf(text, sizeof text, "%s%s%s%s", BEAM, targets[_i], ARM,
             "settings:\n  - {name: K, angle: 40 deg, goal: 0.3 %}\n");
    struct evaluated e = evaluate(text);
    const double hours = cell(&e, 0, BH_COL_HOURS_TO_GOAL);
    ck_assert_double_eq(hours, cell(&e, 0, BH_COL_HOURS));
    ck_assert_relative(cell(&e, 0, BH_COL_STATISTICAL), 0.003, 1e-12, "goal reached");
    done(&e);
    snprintf(seconds, sizeof seconds, "%.17g", hours * 3600);
    snprintf(text, sizeof text, "%s%s%ssettings:\n  - {name: K, angle: 40 deg, time: %s s}\n", BEAM,
             targets[_i], ARM, seconds);
    e = evaluate(text);
    ck_assert_relative(cell(&e, 0, BH_COL_STATISTICAL), 0.003, 1e-9, "time gives the goal");
    ck_assert(isnan(cell(&e, 0, BH_COL_HOURS_TO_GOAL)));
    done(&e);
}
END_TEST

/* A share a little beside the best one needs more time in all. */
START_TEST(the_best_share_is_the_best)
{
    char text[4096];
    struct evaluated e = evaluate(BEAM TARGET BEST OPEN_ARM SCAN);
    const double full = cell(&e, 1, BH_COL_HOURS), empty = cell(&e, 1, BH_COL_EMPTY_HOURS);
    const double best = empty / full;
    ck_assert_double_gt(best, 0);
    done(&e);
    for (int i = 0; i < 2; i++) {
        snprintf(text, sizeof text, "%s%s  empty_target: {share: %.9f %%}\n%s%s", BEAM, TARGET,
                 100 * best * (i ? 1.05 : 0.95), OPEN_ARM, SCAN);
        e = evaluate(text);
        ck_assert_double_gt(cell(&e, 1, BH_COL_HOURS) + cell(&e, 1, BH_COL_EMPTY_HOURS),
                            full + empty);
        done(&e);
    }
}
END_TEST

START_TEST(the_worst_bin_decides_when_each_must_reach_the_goal)
{
    struct evaluated e =
        evaluate(BEAM TARGET EMPTY ARM
                 "settings:\n  - {name: K, angle: 30 deg, goal: 1 %, goal_for: each-bin}\n");
    double worst = 0;
    for (size_t b = 0; b < 4; b++) {
        worst = fmax(worst, bin_cell(&e, b, BH_COL_STATISTICAL));
        ck_assert_double_eq(bin_cell(&e, b, BH_COL_HOURS), cell(&e, 0, BH_COL_HOURS));
    }
    ck_assert_relative(worst, 0.01, 1e-12, "worst bin");
    ck_assert_double_lt(cell(&e, 0, BH_COL_STATISTICAL), 0.01);
    done(&e);
}
END_TEST

START_TEST(the_slowest_arm_decides)
{
    struct evaluated e =
        evaluate(BEAM TARGET EMPTY "arms:\n  - {name: A, solid_angle: 5 msr}\n"
                                   "  - {name: B, side: left, solid_angle: 5 msr}\n"
                                   "  - {name: M, side: left, angle: 20 deg, solid_angle: 1 msr}\n"
                                   "settings:\n  - name: K\n    arms:\n"
                                   "      - {arm: A, angle: 30 deg, goal: 1 %}\n"
                                   "      - {arm: B, angle: 70 deg, goal: 1 %}\n");
    ck_assert_uint_eq(bh_table_rows(e.table, false), 3);
    const double hours = cell(&e, 0, BH_COL_HOURS);
    ck_assert_double_eq(hours, cell(&e, 1, BH_COL_HOURS_TO_GOAL));
    ck_assert_double_gt(hours, cell(&e, 0, BH_COL_HOURS_TO_GOAL));
    for (size_t row = 0; row < 3; row++)
        ck_assert_double_eq(cell(&e, row, BH_COL_HOURS), hours);
    ck_assert_double_lt(cell(&e, 0, BH_COL_STATISTICAL), 0.01);
    ck_assert_str_eq(bh_table_reason(e.table, false, 2, BH_COL_HOURS_TO_GOAL),
                     "this arm has no goal");
    ck_assert_double_eq(bh_table_totals(e.table)->data_hours, hours);
    done(&e);
}
END_TEST

/* The same events, counted by the scattered or by the recoiling particle. */
START_TEST(scattered_and_recoil_count_the_same_events)
{
    static const char form[] =
        BEAM "target: {name: t, layers: [{material: liquid-deuterium, thickness: 1 cm}], "
             "scatterer: 2H}\narms:\n  - {name: A, detects: %s, ring: {from: %.15g deg, to: %.15g "
             "deg}}\nsettings:\n  - {name: K, time: 1 h}\n";
    char text[1024];
    struct evaluated e =
        evaluate(BEAM "target: {name: t, layers: [{material: liquid-deuterium, thickness: 1 cm}], "
                      "scatterer: 2H}\narms:\n  - {name: A, solid_angle: 1 msr}\n"
                      "settings:\n  - {name: K, angle: [30 deg, 50 deg], time: 1 h}\n");
    const double far = cell(&e, 0, BH_COL_RECOIL_ANGLE), near = cell(&e, 1, BH_COL_RECOIL_ANGLE);
    done(&e);
    snprintf(text, sizeof text, form, "scattered", 30.0, 50.0);
    e = evaluate(text);
    const double scattered = cell(&e, 0, BH_COL_SIGNAL);
    done(&e);
    snprintf(text, sizeof text, form, "recoil", near, far);
    e = evaluate(text);
    ck_assert_relative(cell(&e, 0, BH_COL_SIGNAL), scattered, 1e-6, "recoil counts");
    ck_assert_double_gt(cell(&e, 0, BH_COL_SCATTERED_ANGLE), 30);
    done(&e);
}
END_TEST

START_TEST(charge_counts_and_time_are_met)
{
    struct evaluated e =
        evaluate(BEAM TARGET EMPTY "arms:\n  - {name: A, solid_angle: 1 msr, dead_time: 10 us}\n"
                                   "settings:\n  - {name: C, angle: 40 deg, charge: 36 mC}\n"
                                   "  - {name: N, angle: 40 deg, counts: 5000}\n"
                                   "  - {name: T, angle: 40 deg, time: 90 min}\n"
                                   "  - {name: W, angle: 40 deg}\n");
    ck_assert_relative(cell(&e, 0, BH_COL_CHARGE), 36, 1e-12, "charge");
    ck_assert_relative(cell(&e, 0, BH_COL_HOURS), 1, 1e-12, "36 mC at 10 uA");
    ck_assert_relative(cell(&e, 1, BH_COL_COUNTS), 5000, 1e-12, "counts");
    ck_assert_relative(cell(&e, 2, BH_COL_HOURS), 1.5, 1e-12, "time");
    ck_assert_relative(cell(&e, 2, BH_COL_EMPTY_HOURS), 0.15, 1e-12, "10 % of it");
    ck_assert(isnan(cell(&e, 3, BH_COL_HOURS)));
    ck_assert_ptr_nonnull(strstr(bh_table_reason(e.table, false, 3, BH_COL_HOURS), "no goal"));
    const bh_totals *t = bh_table_totals(e.table);
    ck_assert_relative(t->data_hours, 2.5 + cell(&e, 1, BH_COL_HOURS), 1e-12, "data");
    ck_assert_relative(t->empty_hours, 0.1 * t->data_hours, 1e-12, "empty");
    ck_assert(isnan(t->available_hours));
    done(&e);
}
END_TEST

static bool same_cell(double a, double b)
{
    return memcmp(&a, &b, sizeof a) == 0 || (isnan(a) && isnan(b));
}

static void same_numbers(const bh_table *a, const bh_table *b)
{
    for (int bins = 0; bins < 2; bins++) {
        ck_assert_uint_eq(bh_table_rows(a, bins), bh_table_rows(b, bins));
        for (size_t row = 0; row < bh_table_rows(a, bins); row++)
            for (int c = 0; c < BH_COLUMN_COUNT; c++)
                ck_assert_msg(same_cell(bh_table_number(a, bins, row, (bh_column_id)c),
                                        bh_table_number(b, bins, row, (bh_column_id)c)),
                              "row %zu %s", row, bh_column_at(c)->key);
    }
}

START_TEST(a_used_workspace_changes_no_bit)
{
    bh_workspace *workspace = bh_workspace_new();
    const bh_evaluation with = {.bins = true, .workspace = workspace};
    for (int i = 0; i < COUNT(plans); i++) {
        struct evaluated fresh = evaluate(plans[i]);
        for (int again = 0; again < 2; again++) {
            struct evaluated used = evaluate_with(plans[i], &with);
            same_numbers(fresh.table, used.table);
            done(&used);
        }
        done(&fresh);
    }
    bh_workspace_free(workspace);
}
END_TEST

START_TEST(rows_of_arms_do_not_depend_on_rows_of_bins)
{
    struct evaluated with = evaluate(plans[_i]);
    struct evaluated without = evaluate_with(plans[_i], &(bh_evaluation){.bins = false});
    ck_assert_uint_eq(bh_table_rows(without.table, true), 0);
    for (size_t row = 0; row < bh_table_rows(with.table, false); row++)
        for (int c = 0; c < BH_COLUMN_COUNT; c++)
            ck_assert_msg(
                same_cell(cell(&with, row, (bh_column_id)c), cell(&without, row, (bh_column_id)c)),
                "%s", bh_column_at(c)->key);
    done(&with);
    done(&without);
}
END_TEST

static void *evaluate_apart(void *plan)
{
    return bh_table_new(plan, &(bh_evaluation){.bins = true}, NULL, NULL);
}

START_TEST(two_threads_give_the_same)
{
    struct evaluated e = evaluate(plans[0]);
    pthread_t threads[2];
    void *tables[2];
    for (int i = 0; i < 2; i++)
        ck_assert_int_eq(pthread_create(&threads[i], NULL, evaluate_apart, e.plan), 0);
    for (int i = 0; i < 2; i++) {
        pthread_join(threads[i], &tables[i]);
        ck_assert_ptr_nonnull(tables[i]);
        same_numbers(e.table, tables[i]);
        bh_table_free(tables[i]);
    }
    done(&e);
}
END_TEST

static bool after(void *asker)
{
    int *left = asker;
    return --*left < 0;
}

START_TEST(it_can_be_cancelled)
{
    struct evaluated e = read_text(plans[0]);
    bh_error err = {.code = BH_OK};
    int left = 2;
    ck_assert_ptr_null(
        bh_table_new(e.plan, &(bh_evaluation){.cancelled = after, .asker = &left}, NULL, &err));
    ck_assert_int_eq(err.code, BH_ENOCONV);
    left = 1000;
    e.table =
        bh_table_new(e.plan, &(bh_evaluation){.cancelled = after, .asker = &left}, NULL, NULL);
    ck_assert_ptr_nonnull(e.table);
    ck_assert_int_le(left, 997);
    done(&e);
}
END_TEST

START_TEST(texts_and_notes)
{
    struct evaluated e = evaluate(plans[0]);
    ck_assert_ptr_eq(bh_table_plan(e.table), e.plan);
    ck_assert_str_eq(bh_table_text(e.table, false, 1, BH_COL_SETTING), "K.2");
    ck_assert_str_eq(bh_table_text(e.table, true, 5, BH_COL_ARM), "A");
    ck_assert_str_eq(bh_table_text(e.table, false, 0, BH_COL_PARTICLE), "electron");
    ck_assert_str_eq(bh_table_text(e.table, false, 0, BH_COL_TARGET), "cell");
    ck_assert_str_eq(bh_table_text(e.table, false, 0, BH_COL_SCATTERER), "H");
    ck_assert_ptr_null(bh_table_note(e.table, 0));
    ck_assert_ptr_null(bh_table_note(e.table, 100));
    ck_assert_uint_ge(bh_table_cautions(e.table), 1);
    ck_assert_ptr_nonnull(bh_table_caution(e.table, 0)->text);
    ck_assert_ptr_nonnull(strstr(bh_table_totals(e.table)->note, "start-up, change of angle"));
    done(&e);
}
END_TEST

/* What is switched off is said. */
START_TEST(what_is_left_out_is_noted)
{
    char text[2048];
    snprintf(text, sizeof text, "%smodels: {radiative: none, energy_loss: none}\n", plans[0]);
    struct evaluated e = evaluate(strstr(plans[0], "models:") ? plans[0] : text);
    ck_assert_ptr_nonnull(strstr(bh_table_note(e.table, 0), "adiation"));
    done(&e);
}
END_TEST

/* Windows twice as thick give twice the background and the same signal. */
START_TEST(background_follows_the_windows)
{
    static const char form[] =
        BEAM LOSSLESS "target:\n  name: cell\n  layers:\n"
                      "    - {material: aluminium, thickness: %s mm, role: window}\n"
                      "    - {material: liquid-hydrogen, thickness: 50 mm}\n"
                      "  scatterer: 1H\n  empty_target: {share: 5 %%}\n"
                      "arms:\n  - {name: A, solid_angle: 6 msr}\n"
                      "settings:\n  - {name: K, angle: 30 deg, time: 1 h}\n";
    char text[2][1024];
    snprintf(text[0], sizeof text[0], form, "0.1");
    snprintf(text[1], sizeof text[1], form, "0.2");
    struct evaluated thin = evaluate(text[0]), thick = evaluate(text[1]);
    ck_assert_double_eq(cell(&thin, 0, BH_COL_SIGNAL), cell(&thick, 0, BH_COL_SIGNAL));
    /* the deuterium of natural hydrogen stays what it was */
    const double deuterium =
        2 * cell(&thin, 0, BH_COL_BACKGROUND) - cell(&thick, 0, BH_COL_BACKGROUND);
    ck_assert_double_gt(deuterium, 0);
    ck_assert_double_lt(deuterium, 1e-3 * cell(&thin, 0, BH_COL_SIGNAL));
    done(&thin);
    done(&thick);
}
END_TEST

/* A dummy cell with windows ten times as thick needs less empty time for the same goal. */
START_TEST(a_dummy_cell_helps)
{
    static const char form[] =
        BEAM LOSSLESS "targets:\n  - name: cell\n    layers:\n"
                      "      - {material: aluminium, thickness: 0.3 mm, role: window}\n"
                      "      - {material: liquid-hydrogen, thickness: 50 mm}\n"
                      "    scatterer: H\n    empty_target: {share: best%s}\n"
                      "  - name: dummy\n    layers:\n"
                      "      - {material: aluminium, thickness: 3 mm}\n    scatterer: Al\n"
                      "arms:\n  - {name: A, solid_angle: 6 msr}\n"
                      "every_setting: {target: cell}\n"
                      "settings:\n  - {name: K, angle: 30 deg, goal: 1 %%}\n";
    char text[2][2048];
    snprintf(text[0], sizeof text[0], form, "");
    snprintf(text[1], sizeof text[1], form, ", use: dummy");
    struct evaluated own = evaluate(text[0]), dummy = evaluate(text[1]);
    ck_assert_double_lt(cell(&dummy, 0, BH_COL_EMPTY_HOURS), cell(&own, 0, BH_COL_EMPTY_HOURS));
    ck_assert_double_lt(cell(&dummy, 0, BH_COL_HOURS), cell(&own, 0, BH_COL_HOURS));
    ck_assert_relative(cell(&dummy, 0, BH_COL_EMPTY_HOURS) / cell(&dummy, 0, BH_COL_HOURS),
                       cell(&own, 0, BH_COL_EMPTY_HOURS) / cell(&own, 0, BH_COL_HOURS) / sqrt(10.0),
                       1e-9, "best share falls with the root of the thickness");
    done(&own);
    done(&dummy);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("table");
    tcase_add_loop_test(tests, a_row_multiplies_out, 0, COUNT(plans));
    tcase_add_loop_test(tests, an_empty_cell_has_a_reason_and_a_full_one_none, 0, COUNT(plans));
    tcase_add_loop_test(tests, bins_add_up_to_the_arm, 0, COUNT(plans));
    tcase_add_loop_test(tests, rows_of_arms_do_not_depend_on_rows_of_bins, 0, COUNT(plans));
    tcase_add_loop_test(tests, hours_to_goal_fed_back_as_time_give_the_goal, 0, 3);
    tcase_add_test(tests, the_best_share_is_the_best);
    tcase_add_test(tests, the_worst_bin_decides_when_each_must_reach_the_goal);
    tcase_add_test(tests, the_slowest_arm_decides);
    tcase_add_test(tests, scattered_and_recoil_count_the_same_events);
    tcase_add_test(tests, charge_counts_and_time_are_met);
    tcase_add_test(tests, a_used_workspace_changes_no_bit);
    tcase_add_test(tests, two_threads_give_the_same);
    tcase_add_test(tests, it_can_be_cancelled);
    tcase_add_test(tests, texts_and_notes);
    tcase_add_test(tests, what_is_left_out_is_noted);
    tcase_add_test(tests, background_follows_the_windows);
    tcase_add_test(tests, a_dummy_cell_helps);
    return run_suite("table", tests);
}
