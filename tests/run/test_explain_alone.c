/* test_explain_alone.c - a row explained without its table: the same lines, and no more work than
 * they need. */
#include "evaluated.h"

/* Twelve settings of two arms, one of them with a coincidence. */
static const char *const many =
    "plan: 1\n"
    "beam: {particle: electron, kinetic_energy: 855 ± 1 MeV, current: 10 ± 0.1 uA}\n"
    "target:\n"
    "  name: cell\n"
    "  scatterer: H\n"
    "  empty_target: {share: 10 %}\n"
    "  layers:\n"
    "    - {material: aluminium, thickness: 0.1 mm, role: window}\n"
    "    - {material: liquid-hydrogen, thickness: 50 ± 1 mm}\n"
    "arms:\n"
    "  - {name: A, in_plane: ±28 mrad, out_of_plane: ±70 mrad, bins: 2, energy_cut: 12 MeV}\n"
    "  - {name: M, side: left, angle: 30 deg, solid_angle: 2 ± 0.01 msr}\n"
    "settings:\n"
    "  - {name: K, arm: A, angle: {from: 25 deg, to: 80 deg, count: 12}, goal: 0.5 %}\n";

/* Protons on gold, where nuclear forces leave no systematic uncertainty in some rows. */
static const char *const unrated =
    "plan: 1\n"
    "beam: {particle: proton, kinetic_energy: 5 MeV, current: 10 nA}\n"
    "target: {name: foil, scatterer: Au, layers: [{material: gold, thickness: 1 um}]}\n"
    "arms: [{name: A, in_plane: ±28 mrad, out_of_plane: ±28 mrad}]\n"
    "settings:\n"
    "  - {name: N, angle: {from: 20 deg, to: 160 deg, count: 10}, time: 1 h,\n"
    "     beam: {kinetic_energy: 60 MeV}}\n"
    "  - {name: K, angle: {from: 20 deg, to: 160 deg, count: 15}, time: 1 h}\n";

static const char *const plans[] = {many, unrated};

static void same_text(const char *a, const char *b, const char *row)
{
    ck_assert_msg((!a && !b) || (a && b && strcmp(a, b) == 0), "%s: \"%s\" alone, \"%s\"", row,
                  a ? a : "-", b ? b : "-");
}

static void same(const bh_explanation *alone, const bh_explanation *of_table, const char *row)
{
    ck_assert_uint_eq(bh_explanation_lines(alone), bh_explanation_lines(of_table));
    for (size_t i = 0; i < bh_explanation_lines(alone); i++) {
        const bh_line *a = bh_explanation_line(alone, i), *b = bh_explanation_line(of_table, i);
        ck_assert_int_eq(a->kind, b->kind);
        same_text(a->name, b->name, row);
        same_text(a->value, b->value, row);
        same_text(a->formula, b->formula, row);
        same_text(a->source, b->source, row);
        same_text(a->remark, b->remark, row);
    }
}

START_TEST(it_says_what_the_table_does)
{
    struct evaluated e = evaluate(plans[_i]);
    bh_error err = {.code = BH_OK};
    for (size_t i = 0; i < bh_table_rows(e.table, true); i += 3) {
        const bh_place place = bh_table_place(e.table, true, i);
        const bh_setting *s = &e.plan->settings[place.setting];
        const char *arm = s->arms[place.arm].arm.name.text;
        for (int bin = 0; bin <= place.bin; bin += place.bin) {
            const bh_explained_row row = {s->name, arm, bin};
            bh_explanation *x = bh_explain(e.table, s->name, arm, bin, &err);
            bh_explanation *y =
                bh_explain_alone(e.plan, &row, &(bh_evaluation){.bins = true}, &err);
            ck_assert_msg(x && y, "%s", err.text);
            same(y, x, s->name);
            bh_explanation_free(x);
            bh_explanation_free(y);
        }
    }
    done(&e);
}
END_TEST

/* Polls of the cancel flag stand for work; it is cancelled at the `most`. */
struct asker {
    long polls, most;
};

static bool count_polls(void *asker)
{
    struct asker *a = asker;
    return ++a->polls > a->most;
}

START_TEST(it_does_no_more_than_it_needs)
{
    struct evaluated e = read_text(many);
    bh_error err = {.code = BH_OK};
    struct asker table = {0, 1L << 40}, row = table, bin = table;
    bh_table_free(bh_table_new(e.plan, &(bh_evaluation){.cancelled = count_polls, .asker = &table},
                               NULL, &err));
    const bh_evaluation how = {.cancelled = count_polls, .asker = &row};
    bh_explanation_free(bh_explain_alone(e.plan, &(bh_explained_row){"K.12", "A", 0}, &how, &err));
    const bh_evaluation less = {.cancelled = count_polls, .asker = &bin};
    bh_explanation_free(bh_explain_alone(e.plan, &(bh_explained_row){"K.12", "A", 2}, &less, &err));
    ck_assert_int_gt(bin.polls, 0);
    ck_assert_int_lt(row.polls, table.polls); /* five settings of twelve, and its own */
    ck_assert_int_lt(bin.polls, table.polls / 2);
    done(&e);
}
END_TEST

/* At whichever moment: nothing comes of it, and why is said. */
START_TEST(it_can_be_cancelled)
{
    struct evaluated e = read_text(many);
    struct asker all = {0, 1L << 40};
    const bh_explained_row row = {"K.3", "M", 0};
    bh_evaluation how = {.cancelled = count_polls, .asker = &all};
    bh_error err = {.code = BH_OK};
    bh_explanation *x = bh_explain_alone(e.plan, &row, &how, &err);
    ck_assert_ptr_nonnull(x);
    bh_explanation_free(x);
    for (long most = 0; most < all.polls; most += 1 + all.polls / 20) {
        struct asker some = {0, most};
        how.asker = &some;
        err = (bh_error){.code = BH_OK};
        ck_assert_ptr_null(bh_explain_alone(e.plan, &row, &how, &err));
        ck_assert_int_ne(err.code, BH_OK);
    }
    done(&e);
}
END_TEST

START_TEST(what_is_not_there_is_refused)
{
    struct evaluated e = read_text(many);
    const bh_evaluation how = {.bins = false};
    bh_error err = {.code = BH_OK};
    ck_assert_ptr_null(bh_explain_alone(e.plan, &(bh_explained_row){"L", "A", 0}, &how, &err));
    ck_assert_ptr_nonnull(strstr(err.text, "no setting is called L"));
    ck_assert_ptr_null(bh_explain_alone(e.plan, &(bh_explained_row){"K.1", "A", 3}, &how, NULL));
    done(&e);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("explain alone");
    tcase_set_timeout(tests, 120);
    tcase_add_loop_test(tests, it_says_what_the_table_does, 0, COUNT(plans));
    tcase_add_test(tests, it_does_no_more_than_it_needs);
    tcase_add_test(tests, it_can_be_cancelled);
    tcase_add_test(tests, what_is_not_there_is_refused);
    return run_suite("run/explain alone", tests);
}
