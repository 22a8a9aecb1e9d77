/* test_stepwise.c - a table made setting by setting is the table, bit for bit; what did not change
 * is not evaluated again. */
#include "../suite.h"

#include <math.h>
#include <pthread.h>
#include <stdatomic.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/crew.h"
#include "beamhours/base/file.h"
#include "beamhours/run/stepwise.h"

static const char *const demos[] = {"alpha-gold", "hydrogen-jet", "hydrogen-separation",
                                    "lead",       "muon-rings",   "positron-electron"};

enum { HANDS = 4 };

struct made {
    bh_material_library *library;
    bh_workspace *workspace;
    bh_results *results;
    bh_crew *crew; /* NULL: one thread */
    bh_workspace *workspaces[HANDS];
};

static struct made make(void)
{
    static const char *const folders[] = {"materials", NULL};
    struct made m = {.library = bh_material_library_new(folders),
                     .workspace = bh_workspace_new(),
                     .results = bh_results_new()};
    ck_assert(m.library && m.workspace && m.results);
    return m;
}

static struct made make_with_crew(void)
{
    struct made m = make();
    m.crew = bh_crew_new(HANDS);
    ck_assert(m.crew && bh_crew_hands(m.crew) == HANDS);
    for (size_t i = 0; i < HANDS; i++)
        ck_assert_ptr_nonnull(m.workspaces[i] = bh_workspace_new());
    return m;
}

static void unmake(struct made *m)
{
    bh_crew_free(m->crew);
    for (size_t i = 0; i < HANDS; i++)
        bh_workspace_free(m->workspaces[i]);
    bh_results_free(m->results);
    bh_workspace_free(m->workspace);
    bh_material_library_free(m->library);
}

static bh_text demo_text(const char *name)
{
    char path[128];
    bh_text text = {0};
    snprintf(path, sizeof path, "plans/%s.yaml", name);
    ck_assert(!bh_file_read(path, 1 << 20, &text, NULL));
    return text;
}

static void same_rows(const bh_row *row, const bh_table *table, bool bins, size_t i)
{
    for (int c = 0; c < BH_COLUMN_COUNT; c++) {
        const double a = row->number[c], b = bh_table_number(table, bins, i, (bh_column_id)c);
        ck_assert_msg(memcmp(&a, &b, sizeof a) == 0 || (isnan(a) && isnan(b)),
                      "row %zu, %s: %.17g, not %.17g", i, bh_column_at(c)->key, a, b);
    }
    ck_assert_uint_eq(row->setting, bh_table_place(table, bins, i).setting);
    ck_assert_uint_eq(row->arm, bh_table_place(table, bins, i).arm);
    ck_assert_int_eq(row->bin, bh_table_place(table, bins, i).bin);
}

static void same_said(const bh_diags *a, const bh_diags *b)
{
    ck_assert_uint_eq(bh_diags_count(a), bh_diags_count(b));
    for (size_t i = 0; i < bh_diags_count(a); i++) {
        ck_assert_str_eq(bh_diags_at(a, i)->text, bh_diags_at(b, i)->text);
        ck_assert_str_eq(bh_diags_at(a, i)->key, bh_diags_at(b, i)->key);
        ck_assert_int_eq(bh_diags_at(a, i)->at.line, bh_diags_at(b, i)->at.line);
        ck_assert_int_eq(bh_diags_at(a, i)->at.column, bh_diags_at(b, i)->at.column);
    }
}

/* --- by several threads --- */

struct turns {
    bh_stepwise *steps;
    size_t count;
    bool bins;
    atomic_size_t next;
    pthread_mutex_t lock;
};

static void take_turns(void *of, size_t hand)
{
    struct turns *t = of;
    size_t s;
    while ((s = atomic_fetch_add(&t->next, 1U)) < t->count) {
        bh_result *result = NULL;
        (void)pthread_mutex_lock(&t->lock);
        const bool known = bh_stepwise_recall(t->steps, s, t->bins);
        (void)pthread_mutex_unlock(&t->lock);
        const bh_step step = {.setting = s, .hand = hand, .bins = t->bins};
        if (known || bh_stepwise_compute(t->steps, &step, &result, NULL))
            continue;
        (void)pthread_mutex_lock(&t->lock);
        bh_stepwise_take(t->steps, s, result);
        (void)pthread_mutex_unlock(&t->lock);
    }
}

static void by_all_hands(struct made *m, bh_stepwise *steps, size_t count, bool bins)
{
    struct turns t = {.steps = steps, .count = count, .bins = bins};
    ck_assert(!bh_stepwise_hands(steps, m->workspaces, HANDS, NULL));
    ck_assert_int_eq(pthread_mutex_init(&t.lock, NULL), 0);
    bh_crew_work(m->crew, take_turns, &t);
    (void)pthread_mutex_destroy(&t.lock);
}

/* Evaluates the text step by step, the last setting first, and compares it with the table; how many
 * settings had to be evaluated. */
static size_t compare(struct made *m, const char *text, bool bins)
{
    const size_t before = bh_results_evaluated(m->results);
    bh_diags *said = bh_diags_new();
    bh_plan *plan = bh_plan_read(text, strlen(text), "plan", NULL, 0, m->library, said);
    ck_assert_ptr_nonnull(plan);
    const bh_evaluation how = {.workspace = m->workspace, .bins = bins};
    bh_table *table = bh_table_new(plan, &(bh_evaluation){.bins = bins}, said, NULL);
    bh_stepwise *steps = bh_stepwise_new(plan, &how, m->results, NULL);
    bh_arena *arena = bh_arena_new();
    bh_conclusion end = {.warnings = bh_diags_new()};
    ck_assert(table && steps && arena && end.warnings);
    if (m->crew)
        by_all_hands(m, steps, plan->setting_count, bins);
    for (size_t s = plan->setting_count; s-- > 0;)
        if (!bh_stepwise_recall(steps, s, bins))
            ck_assert(!bh_stepwise_evaluate(steps, s, bins, NULL));
    size_t row = 0, bin = 0;
    for (size_t s = 0; s < plan->setting_count; s++) {
        const bh_setting_rows rows = bh_stepwise_rows(steps, s);
        size_t bins_here = 0;
        for (size_t a = 0; a < plan->settings[s].arm_count; a++, row++) {
            same_rows(&rows.whole[a], table, false, row);
            bins_here += (size_t)plan->settings[s].arms[a].arm.bins;
        }
        for (size_t b = 0; bins && b < bins_here; b++, bin++)
            same_rows(&rows.bins[b], table, true, bin);
    }
    ck_assert(!bh_stepwise_conclude(steps, said, arena, &end, NULL));
    ck_assert_mem_eq(&end.totals.asked_hours, &bh_table_totals(table)->asked_hours, sizeof(double));
    same_said(end.warnings, bh_table_warnings(table));
    ck_assert_uint_eq(end.caution_count, bh_table_cautions(table));
    bh_diags_free(end.warnings);
    bh_arena_free(arena);
    bh_stepwise_free(steps);
    bh_table_free(table);
    bh_plan_free(plan);
    bh_diags_free(said);
    return bh_results_evaluated(m->results) - before;
}

static bool is_of_changes(int column)
{
    return column == BH_COL_PER_MRAD || column == BH_COL_PER_PERMILLE;
}

/* A cell that was not asked for is empty and says so; where the systematic uncertainty rests on it,
 * and in every other column, it is the same to the last bit. */
static void same_but_changes(const bh_plan *plan, const bh_row *row, const bh_row *full)
{
    const bh_setting *s = &plan->settings[row->setting];
    const bool rests = bh_rests_on_changes(s, &s->arms[row->arm]);
    for (int c = 0; c < BH_COLUMN_COUNT; c++) {
        if (!is_of_changes(c) || rests) {
            ck_assert_msg(memcmp(&row->number[c], &full->number[c], sizeof(double)) == 0, "%s",
                          bh_column_at(c)->key);
            ck_assert_int_eq(row->why[c], full->why[c]);
            continue;
        }
        ck_assert(isnan(row->number[c]));
        ck_assert(row->why[c] == BH_WHY_NOT_ASKED ||
                  (row->why[c] == full->why[c] && isnan(full->number[c])));
    }
}

START_TEST(changes_are_left_out_alone)
{
    struct made m = make();
    bh_text text = demo_text(demos[_i]);
    bh_diags *said = bh_diags_new();
    bh_plan *plan = bh_plan_read(text.bytes, text.length, "plan", NULL, 0, m.library, said);
    bh_stepwise *steps[2];
    for (int k = 0; k < 2; k++) {
        const bh_evaluation how = {
            .workspace = m.workspace, .bins = true, .without_changes = k == 0};
        steps[k] = bh_stepwise_new(plan, &how, m.results, NULL);
        ck_assert_ptr_nonnull(steps[k]);
        for (size_t s = 0; s < plan->setting_count; s++) {
            ck_assert(!bh_stepwise_recall(steps[k], s, true)); /* the others are not these */
            ck_assert(!bh_stepwise_evaluate(steps[k], s, true, NULL));
        }
    }
    for (size_t s = 0; s < plan->setting_count; s++) {
        const bh_setting_rows rows = bh_stepwise_rows(steps[0], s);
        const bh_setting_rows full = bh_stepwise_rows(steps[1], s);
        size_t bins = 0;
        for (size_t a = 0; a < plan->settings[s].arm_count; a++) {
            same_but_changes(plan, &rows.whole[a], &full.whole[a]);
            bins += (size_t)plan->settings[s].arms[a].arm.bins;
        }
        for (size_t b = 0; b < bins; b++)
            same_but_changes(plan, &rows.bins[b], &full.bins[b]);
        ck_assert(fabs(rows.full - full.full) <= 0);
    }
    for (int k = 0; k < 2; k++)
        bh_stepwise_free(steps[k]);
    bh_plan_free(plan);
    bh_diags_free(said);
    bh_text_free(&text);
    unmake(&m);
}
END_TEST

START_TEST(is_the_table)
{
    struct made m = make();
    bh_text text = demo_text(demos[_i]);
    ck_assert_uint_gt(compare(&m, text.bytes, false), 0);
    ck_assert_uint_eq(compare(&m, text.bytes, false), 0); /* nothing changed */
    ck_assert_uint_gt(compare(&m, text.bytes, true), 0);  /* bins were not asked for before */
    ck_assert_uint_eq(compare(&m, text.bytes, true), 0);
    bh_text moved = {0}; /* three lines further down, and the marks with it */
    bh_text_appendf(&moved, "# one\n# more\n\n%s", text.bytes);
    ck_assert_uint_eq(compare(&m, moved.bytes, false), 0);
    ck_assert_uint_eq(compare(&m, text.bytes, false), 0);
    bh_text_free(&moved);
    bh_text_free(&text);
    unmake(&m);
}
END_TEST

/* Whoever evaluates a setting, and in whatever order. */
START_TEST(is_the_table_by_all_hands)
{
    struct made m = make_with_crew();
    bh_text text = demo_text(demos[_i]);
    ck_assert_uint_gt(compare(&m, text.bytes, true), 0);
    ck_assert_uint_eq(compare(&m, text.bytes, true), 0);
    bh_text_free(&text);
    unmake(&m);
}
END_TEST

static const char base[] =
    "plan: 1\n"
    "beam: {particle: electron, kinetic_energy: 855 MeV, current: 20 uA}\n"
    "targets:\n"
    "  - {name: one, scatterer: H, layers: [{material: liquid-hydrogen, thickness: 50 mm}]}\n"
    "  - {name: two, layers: [{material: carbon-12, thickness: 1 mm}]}\n"
    "arms:\n"
    "  - {name: A, in_plane: \u00B128 mrad, out_of_plane: \u00B170 mrad, energy_cut: 10 MeV}\n"
    "  - {name: B, in_plane: \u00B120 mrad, out_of_plane: \u00B140 mrad, energy_cut: 10 MeV}\n"
    "every_setting: {goal: 1 %}\n"
    "settings:\n"
    "  - {name: K1, arm: A, target: one, angle: [40 deg, 50 deg]}\n"
    "  - {name: K2, arm: B, target: one, angle: 60 deg}\n"
    "  - {name: K3, arm: A, target: two, angle: 30 deg}\n"
    "schedule: {available: 9 d}\n";

static const struct {
    const char *from, *to;
    size_t touched; /* of four settings */
} changes[] = {
    {"60 deg", "61 deg", 1},
    {"50 deg]", "51 deg]", 2},
    {"50 mm", "51 mm", 3},
    {"1 mm", "2 mm", 1},
    {"\u00B120 mrad", "\u00B121 mrad", 1},
    {"\u00B128 mrad", "\u00B127 mrad", 3},
    {"20 uA", "30 uA", 4},
    {"goal: 1 %", "goal: 2 %", 4},
    {"plan: 1", "title: x\nplan: 1", 0},
    {"available: 9 d}", "available: 9 d, contingency: 10 %}", 0},
    {"name: K2,", "name: K2b,", 1},
    {"settings:\n", "settings: # in order\n", 0},
    {"  - {name: K3", "  - {name: K0, arm: B, target: two, angle: 20 deg}\n  - {name: K3", 1}};

START_TEST(touches_no_more)
{
    struct made m = make();
    const char *at = strstr(base, changes[_i].from);
    bh_text text = {0};
    ck_assert_ptr_nonnull(at);
    bh_text_append_bytes(&text, base, (size_t)(at - base));
    bh_text_appendf(&text, "%s%s", changes[_i].to, at + strlen(changes[_i].from));
    ck_assert_uint_eq(compare(&m, base, false), 4);
    ck_assert_uint_eq(compare(&m, text.bytes, false), changes[_i].touched);
    ck_assert_uint_eq(compare(&m, base, false), 0); /* and back again */
    bh_text_free(&text);
    unmake(&m);
}
END_TEST

static bool stop(void *asker)
{
    return ++*(int *)asker > 1;
}

START_TEST(can_be_cancelled)
{
    struct made m = make();
    int asked = 0;
    bh_error err = {.code = BH_OK};
    bh_diags *said = bh_diags_new();
    bh_plan *plan = bh_plan_read(base, strlen(base), "plan", NULL, 0, m.library, said);
    const bh_evaluation how = {.workspace = m.workspace, .cancelled = stop, .asker = &asked};
    bh_stepwise *steps = bh_stepwise_new(plan, &how, m.results, &err);
    bh_code code = BH_OK;
    for (size_t s = 0; !code && s < plan->setting_count; s++)
        code = bh_stepwise_evaluate(steps, s, false, &err);
    ck_assert_int_eq(code, BH_ENOCONV);
    ck_assert_ptr_null(bh_stepwise_rows(steps, plan->setting_count - 1).whole);
    bh_stepwise_free(steps);
    bh_plan_free(plan);
    bh_diags_free(said);
    ck_assert_uint_ge(compare(&m, base, false), 3); /* what was left half done is done again */
    unmake(&m);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("stepwise");
    tcase_set_timeout(tests, 120);
    tcase_add_loop_test(tests, is_the_table, 0, COUNT(demos));
    tcase_add_loop_test(tests, is_the_table_by_all_hands, 0, COUNT(demos));
    tcase_add_loop_test(tests, changes_are_left_out_alone, 0, COUNT(demos));
    tcase_add_loop_test(tests, touches_no_more, 0, COUNT(changes));
    tcase_add_test(tests, can_be_cancelled);
    return run_suite("run/stepwise", tests);
}
