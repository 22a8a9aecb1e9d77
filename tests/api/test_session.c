/* test_session.c - the public interface, called well and badly. */
#include "../suite.h"

#include <math.h>
#include <stdbool.h>
#include <string.h>

#include "beamhours.h"

static const char *const folders[] = {"materials", NULL};
static const char good[] = "plan: 1\n"
                           "beam: {particle: electron, kinetic_energy: 400 MeV, current: 10 uA}\n"
                           "target: {layers: [{material: carbon-12, thickness: 1 mm}]}\n"
                           "arms: [{name: A, solid_angle: 5 msr}]\n"
                           "settings: [{name: K, angle: [40 deg, 50 deg], counts: 10000}]\n";

static bh_session *loaded(void)
{
    bh_session *s = bh_session_new(folders);
    ck_assert_ptr_nonnull(s);
    ck_assert_int_eq(bh_session_load_text(s, good, strlen(good), "good.yaml"), BH_DONE);
    return s;
}

static bh_session *evaluated(void)
{
    bh_session *s = loaded();
    ck_assert_int_eq(bh_session_evaluate(s), BH_DONE);
    return s;
}

START_TEST(rows_are_read_by_column)
{
    bh_session *s = evaluated();
    ck_assert_uint_eq(bh_session_rows(s), 2);
    ck_assert_str_eq(bh_session_text(s, 0, "setting"), "K.1");
    ck_assert_str_eq(bh_session_text(s, 1, "setting"), "K.2");
    ck_assert_str_eq(bh_session_text(s, 1, "scatterer"), "C");
    ck_assert_double_eq_tol(bh_session_number(s, 1, "angle_deg"), 50, 1e-12);
    ck_assert_double_eq_tol(bh_session_number(s, 0, "counts"), 1e4, 1e-6);
    ck_assert_ptr_null(bh_session_reason(s, 0, "counts"));
    bh_session_free(s);
}
END_TEST

START_TEST(empty_cells_have_reasons)
{
    bh_session *s = evaluated();
    ck_assert(isnan(bh_session_number(s, 0, "hours_to_goal")));
    ck_assert_str_eq(bh_session_reason(s, 0, "hours_to_goal"), "this arm has no goal");
    ck_assert(isnan(bh_session_number(s, 0, "setting")));
    ck_assert_ptr_null(bh_session_text(s, 0, "counts"));
    bh_session_free(s);
}
END_TEST

START_TEST(a_change_stays_until_the_next_load)
{
    bh_session *s = evaluated();
    const double one = bh_session_number(s, 0, "signal_rate_Hz");
    ck_assert_int_eq(bh_session_change(s, "beam.current", "20 uA"), BH_DONE);
    ck_assert_uint_eq(bh_session_rows(s), 0); /* no longer what the plan says */
    ck_assert_int_eq(bh_session_evaluate(s), BH_DONE);
    ck_assert_double_eq_tol(bh_session_number(s, 0, "signal_rate_Hz"), 2 * one, 1e-9 * one);
    ck_assert_int_eq(bh_session_change(s, "beam.current", "30 uA"), BH_DONE);
    ck_assert_int_eq(bh_session_change(s, "arms.A.efficiency", "50 %"), BH_DONE);
    ck_assert_int_eq(bh_session_evaluate(s), BH_DONE);
    ck_assert_double_eq_tol(bh_session_number(s, 0, "signal_rate_Hz"), 1.5 * one, 1e-9 * one);
    ck_assert_int_eq(bh_session_load_text(s, good, strlen(good), "good.yaml"), BH_DONE);
    ck_assert_int_eq(bh_session_evaluate(s), BH_DONE);
    ck_assert_double_eq(bh_session_number(s, 0, "signal_rate_Hz"), one);
    bh_session_free(s);
}
END_TEST

START_TEST(a_bad_change_leaves_the_plan_as_it_was)
{
    bh_session *s = evaluated();
    const double one = bh_session_number(s, 0, "signal_rate_Hz");
    ck_assert_int_eq(bh_session_change(s, "beam.current", "lots"), BH_BAD_PLAN);
    ck_assert_uint_eq(bh_session_messages(s), 1);
    ck_assert_ptr_nonnull(strstr(bh_session_message(s, 0), "--with 1:1:14: beam.current: 'lots'"));
    ck_assert_int_eq(bh_session_change(s, "beam.current", "20 uA"), BH_DONE);
    ck_assert_int_eq(bh_session_change(s, "beam.current", "30"), BH_BAD_PLAN);
    ck_assert_int_eq(bh_session_change(s, "settings.L.angle", "30 deg"), BH_BAD_PLAN);
    ck_assert_int_eq(bh_session_evaluate(s), BH_DONE);
    ck_assert_double_eq_tol(bh_session_number(s, 0, "signal_rate_Hz"), 2 * one, 1e-9 * one);
    bh_session_free(s);
}
END_TEST

START_TEST(files_are_loaded)
{
    bh_session *s = bh_session_new(folders);
    ck_assert_int_eq(bh_session_load(s, "plans/lead.yaml"), BH_DONE);
    ck_assert_int_eq(bh_session_evaluate(s), BH_DONE);
    ck_assert_uint_eq(bh_session_rows(s), 6);
    int cautions = 0, warnings = 0;
    for (size_t i = 0; i < bh_session_messages(s); i++) {
        const char *m = bh_session_message(s, i);
        ck_assert_int_eq(strncmp(m, "plans/lead.yaml:", 16), 0);
        cautions += strstr(m, ": caution: ") != NULL;
        warnings += strstr(m, ": warning: ") != NULL;
    }
    ck_assert_int_gt(cautions, 0);
    ck_assert_int_gt(warnings, 0);
    ck_assert_ptr_null(bh_session_message(s, bh_session_messages(s)));
    ck_assert_int_eq(bh_session_load(s, "plans/no-such-plan.yaml"), BH_NO_FILE);
    ck_assert_uint_eq(bh_session_messages(s), 1);
    ck_assert_str_eq(bh_session_message(s, 0),
                     "plans/no-such-plan.yaml: cannot be opened: No such file or directory");
    ck_assert_int_eq(bh_session_evaluate(s), BH_BAD_CALL); /* no plan after a failure */
    ck_assert_uint_eq(bh_session_rows(s), 0);
    ck_assert_int_eq(bh_session_load(s, "plans"), BH_NO_FILE);
    bh_session_free(s);
}
END_TEST

START_TEST(all_errors_of_a_plan_are_kept)
{
    static const char bad[] = "plan: 1\nbeam: {particle: electron, kinetic_energy: 400}\n";
    bh_session *s = loaded();
    ck_assert_int_eq(bh_session_load_text(s, bad, strlen(bad), "bad.yaml"), BH_BAD_PLAN);
    ck_assert_uint_ge(bh_session_messages(s), 4);
    ck_assert_int_eq(strncmp(bh_session_message(s, 0), "bad.yaml:1:1: ", 14), 0);
    ck_assert_int_eq(bh_session_evaluate(s), BH_BAD_CALL);
    ck_assert_int_eq(bh_session_load_text(s, "", 0, "empty.yaml"), BH_BAD_PLAN);
    ck_assert_int_eq(bh_session_load_text(s, NULL, 0, "empty.yaml"), BH_BAD_PLAN);
    bh_session_free(s);
}
END_TEST

START_TEST(bad_calls_are_harmless)
{
    bh_session *s = bh_session_new(NULL);
    ck_assert_ptr_nonnull(s);
    ck_assert_int_eq(bh_session_evaluate(s), BH_BAD_CALL);
    ck_assert_int_eq(bh_session_change(s, "beam.current", "1 uA"), BH_BAD_CALL);
    ck_assert_int_eq(bh_session_load(s, NULL), BH_BAD_CALL);
    ck_assert_int_eq(bh_session_load_text(s, NULL, 3, "x"), BH_BAD_CALL);
    ck_assert_int_eq(bh_session_load_text(s, good, strlen(good), NULL), BH_BAD_CALL);
    ck_assert_uint_eq(bh_session_rows(s), 0);
    ck_assert(isnan(bh_session_number(s, 0, "hours")));
    bh_session_free(s);

    s = evaluated();
    ck_assert_int_eq(bh_session_change(s, NULL, "1 uA"), BH_BAD_CALL);
    ck_assert_int_eq(bh_session_change(s, "beam.current", NULL), BH_BAD_CALL);
    ck_assert(isnan(bh_session_number(s, 2, "hours")));
    ck_assert(isnan(bh_session_number(s, (size_t)-1, "hours")));
    ck_assert(isnan(bh_session_number(s, 0, "huors")));
    ck_assert(isnan(bh_session_number(s, 0, NULL)));
    ck_assert_ptr_null(bh_session_text(s, 0, "settings"));
    ck_assert_ptr_null(bh_session_text(s, 2, "setting"));
    ck_assert_ptr_null(bh_session_reason(s, 0, "huors"));
    bh_session_free(s);

    ck_assert_int_eq(bh_session_load(NULL, "plans/lead.yaml"), BH_BAD_CALL);
    ck_assert_int_eq(bh_session_load_text(NULL, good, 1, "x"), BH_BAD_CALL);
    ck_assert_int_eq(bh_session_change(NULL, "beam.current", "1 uA"), BH_BAD_CALL);
    ck_assert_int_eq(bh_session_evaluate(NULL), BH_BAD_CALL);
    ck_assert_uint_eq(bh_session_rows(NULL), 0);
    ck_assert_uint_eq(bh_session_messages(NULL), 0);
    ck_assert_ptr_null(bh_session_message(NULL, 0));
    ck_assert(isnan(bh_session_number(NULL, 0, "hours")));
    bh_session_free(NULL);
}
END_TEST

START_TEST(columns_can_be_listed)
{
    size_t n = 0;
    bh_session *s = evaluated();
    for (; bh_column_key(n); n++) {
        ck_assert_ptr_nonnull(bh_column_meaning(n));
        const char *key = bh_column_key(n);
        const bool any = !isnan(bh_session_number(s, 0, key)) || bh_session_text(s, 0, key) ||
                         bh_session_reason(s, 0, key);
        ck_assert_msg(any, "%s says nothing", key);
    }
    ck_assert_uint_gt(n, 30);
    ck_assert_ptr_null(bh_column_meaning(n));
    ck_assert_ptr_null(bh_column_key((size_t)-1));
    bh_session_free(s);
}
END_TEST

START_TEST(sessions_do_not_know_each_other)
{
    bh_session *a = evaluated(), *b = evaluated();
    ck_assert_int_eq(bh_session_change(a, "beam.current", "20 uA"), BH_DONE);
    ck_assert_int_eq(bh_session_evaluate(a), BH_DONE);
    ck_assert_double_eq_tol(
        bh_session_number(a, 0, "beam_per_s") / bh_session_number(b, 0, "beam_per_s"), 2, 1e-12);
    bh_session_free(a);
    ck_assert_str_eq(bh_session_text(b, 0, "setting"), "K.1");
    bh_session_free(b);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("session");
    tcase_add_test(tests, rows_are_read_by_column);
    tcase_add_test(tests, empty_cells_have_reasons);
    tcase_add_test(tests, a_change_stays_until_the_next_load);
    tcase_add_test(tests, a_bad_change_leaves_the_plan_as_it_was);
    tcase_add_test(tests, files_are_loaded);
    tcase_add_test(tests, all_errors_of_a_plan_are_kept);
    tcase_add_test(tests, bad_calls_are_harmless);
    tcase_add_test(tests, columns_can_be_listed);
    tcase_add_test(tests, sessions_do_not_know_each_other);
    return run_suite("api/session", tests);
}
