/* test_selection.c - which rows and columns, and in what order. */
#include "shown.h"

/* "K1/A K1/M ...": the rows of a view in their order. */
static const char *rows_of(const bh_selection *view, char *out, size_t size)
{
    size_t used = 0;
    out[0] = '\0';
    for (size_t i = 0; i < view->row_count; i++)
        used += (size_t)snprintf(out + used, size - used, "%s%s/%s", i ? " " : "",
                                 bh_selection_text(view, i, BH_COL_SETTING),
                                 bh_selection_text(view, i, BH_COL_ARM));
    return out;
}

static const struct {
    bh_selection_request request;
    const char *rows;
} choices[] = {
    {{0}, "K1/A K1/M K2.1/A K2.1/M K2.2/A K2.2/M K3/A K3/M"},
    {{.only = "K1"}, "K1/A K1/M"},
    {{.only = "K2"}, "K2.1/A K2.1/M K2.2/A K2.2/M"},
    {{.only = "K2.2,K1"}, "K1/A K1/M K2.2/A K2.2/M"},
    {{.sort = "angle_deg"}, "K1/A K1/M K2.1/M K2.2/M K3/M K3/A K2.1/A K2.2/A"},
    {{.sort = "-angle_deg"}, "K2.2/A K2.1/A K3/A K1/A K1/M K2.1/M K2.2/M K3/M"},
    {{.sort = "arm"}, "K1/A K2.1/A K2.2/A K3/A K1/M K2.1/M K2.2/M K3/M"},
    {{.sort = "-arm"}, "K1/M K2.1/M K2.2/M K3/M K1/A K2.1/A K2.2/A K3/A"},
    {{.sort = "-setting", .only = "K1,K3"}, "K3/A K3/M K1/A K1/M"},
    /* K3 asks for nothing: no hours, whichever way they are sorted */
    {{.sort = "hours", .only = "K3,K1"}, "K1/A K1/M K3/A K3/M"},
    {{.sort = "-hours", .only = "K3,K1"}, "K1/A K1/M K3/A K3/M"},
    {{.bins = true, .only = "K1"}, "K1/A K1/A K1/M"},
};

START_TEST(rows_are_chosen_and_ordered)
{
    struct evaluated e = evaluate(two_arms);
    char got[512];
    bh_selection view = view_of(&e, &choices[_i].request);
    ck_assert_str_eq(rows_of(&view, got, sizeof got), choices[_i].rows);
    ck_assert_uint_eq(view.column_count, 0);
    bh_selection_free(&view);
    done(&e);
}
END_TEST

START_TEST(columns_are_kept_in_the_order_asked_for)
{
    struct evaluated e = evaluate(two_arms);
    bh_selection view =
        view_of(&e, &(bh_selection_request){.columns = "counts,setting,q2_GeV2,counts"});
    const int wanted[] = {BH_COL_COUNTS, BH_COL_SETTING, BH_COL_Q2, BH_COL_COUNTS};
    ck_assert_uint_eq(view.column_count, COUNT(wanted));
    for (int i = 0; i < COUNT(wanted); i++)
        ck_assert_int_eq(view.columns[i], wanted[i]);
    bh_selection_free(&view);
    done(&e);
}
END_TEST

static const struct {
    bh_selection_request request;
    const char *words;
} mistakes[] = {
    {{.columns = "cuonts"}, "no column \"cuonts\"; did you mean counts?"},
    {{.columns = "counts,"}, "keys such as q2_GeV2"},
    {{.columns = ""}, "keys such as q2_GeV2"},
    {{.columns = "completely-different"}, "beamhours keys columns"},
    {{.columns = "a-key-that-is-longer-than-any-key-of-any-table-that-was-ever-printed-here"},
     "too long"},
    {{.sort = "angel_deg"}, "did you mean angle_deg?"},
    {{.sort = "-"}, "keys such as q2_GeV2"},
    {{.only = "K4"}, "no setting \"K4\"; there are K1, K2.1, K2.2, K3"},
    {{.only = "K1,,K3"}, "no setting \"\""},
    {{.only = "K"}, "no setting \"K\""},
    {{.only = "K2.x"}, "no setting \"K2.x\""},
};

START_TEST(a_name_that_is_none_is_refused_with_one_that_would_do)
{
    struct evaluated e = evaluate(two_arms);
    bh_selection view;
    bh_error err = {.code = BH_OK};
    ck_assert_int_eq(bh_selection_new(e.table, &mistakes[_i].request, &view, &err), BH_EDOMAIN);
    ck_assert_msg(strstr(err.text, mistakes[_i].words) != NULL, "%s", err.text);
    bh_selection_free(&view);
    done(&e);
}
END_TEST

START_TEST(more_columns_than_there_are_is_refused)
{
    struct evaluated e = evaluate(one_arm);
    char list[8 * (BH_COLUMN_COUNT + 2)] = "q2_GeV2";
    bh_selection view;
    bh_error err = {.code = BH_OK};
    for (int i = 0; i < BH_COLUMN_COUNT; i++)
        strcat(list, ",hours");
    ck_assert_int_eq(
        bh_selection_new(e.table, &(bh_selection_request){.columns = list}, &view, &err),
        BH_EDOMAIN);
    bh_selection_free(&view);
    done(&e);
}
END_TEST

START_TEST(many_settings_are_named_as_far_as_they_fit)
{
    char text[4096] = BEAM TARGET "arms: [{name: A, solid_angle: 5 msr}]\nsettings:\n", line[128];
    for (int i = 0; i < 40; i++) {
        snprintf(line, sizeof line, "  - {name: setting-number-%d, angle: 40 deg}\n", i);
        strcat(text, line);
    }
    struct evaluated e = evaluate(text);
    bh_selection view;
    bh_error err = {.code = BH_OK};
    ck_assert_int_eq(
        bh_selection_new(e.table, &(bh_selection_request){.only = "none"}, &view, &err),
        BH_EDOMAIN);
    ck_assert_ptr_nonnull(strstr(err.text, "setting-number-0, setting-number-1"));
    ck_assert_str_eq(err.text + strlen(err.text) - 4, " ...");
    bh_selection_free(&view);
    done(&e);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("selection");
    tcase_add_loop_test(tests, rows_are_chosen_and_ordered, 0, COUNT(choices));
    tcase_add_test(tests, columns_are_kept_in_the_order_asked_for);
    tcase_add_loop_test(tests, a_name_that_is_none_is_refused_with_one_that_would_do, 0,
                        COUNT(mistakes));
    tcase_add_test(tests, more_columns_than_there_are_is_refused);
    tcase_add_test(tests, many_settings_are_named_as_far_as_they_fit);
    return run_suite("report/selection", tests);
}
