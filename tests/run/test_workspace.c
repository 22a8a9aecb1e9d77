/* test_workspace.c - what is kept between evaluations: found again by value, dropped, capped. */
#include "../suite.h"

#include <string.h>

#include "beamhours/run/row.h"
#include "beamhours/run/workspace.h"
#include "beamhours/units/nuclide.h"

START_TEST(kept_by_value)
{
    bh_workspace *w = bh_workspace_new();
    const double a[2] = {1, 2}, b[2] = {1, 3}, same[2] = {1, 2};
    ck_assert_ptr_null(bh_workspace_recall(w, a, sizeof a));
    double *kept = bh_workspace_keep(w, a, sizeof a, sizeof *kept);
    ck_assert_ptr_nonnull(kept);
    ck_assert_double_eq(*kept, 0);
    *kept = 42;
    ck_assert_ptr_eq(bh_workspace_recall(w, same, sizeof same), kept);
    ck_assert_ptr_null(bh_workspace_recall(w, b, sizeof b));
    ck_assert_ptr_null(bh_workspace_recall(w, a, sizeof a[0]));
    bh_workspace_drop(w, b, sizeof b); /* is not there: nothing happens */
    ck_assert_ptr_eq(bh_workspace_recall(w, a, sizeof a), kept);
    bh_workspace_drop(w, a, sizeof a);
    ck_assert_ptr_null(bh_workspace_recall(w, a, sizeof a));
    bh_workspace_free(w);
    bh_workspace_free(NULL);
}
END_TEST

START_TEST(structures_are_made_once)
{
    bh_workspace *w = bh_workspace_new();
    bh_error err = {.code = BH_OK};
    const bh_structure *carbon = bh_workspace_structure(w, "default", 6, 12, &err);
    ck_assert_ptr_nonnull(carbon);
    ck_assert_ptr_eq(bh_workspace_structure(w, "default", 6, 12, &err), carbon);
    ck_assert_ptr_ne(bh_workspace_structure(w, "point", 6, 12, &err), carbon);
    ck_assert_ptr_ne(bh_workspace_structure(w, "default", 6, 13, &err), carbon);
    ck_assert_ptr_null(bh_workspace_structure(w, "kelly-2004", 6, 12, &err));
    ck_assert_int_ne(err.code, BH_OK);
    bh_workspace_trim(w); /* little is kept: nothing is forgotten */
    ck_assert_ptr_eq(bh_workspace_structure(w, "default", 6, 12, &err), carbon);
    bh_workspace_free(w);
}
END_TEST

START_TEST(too_much_is_forgotten)
{
    bh_workspace *w = bh_workspace_new();
    bh_error err = {.code = BH_OK};
    const int key = 7;
    ck_assert_ptr_nonnull(bh_workspace_structure(w, "point", 1, 1, &err));
    ck_assert_ptr_nonnull(bh_workspace_keep(w, &key, sizeof key, (size_t)16 << 20));
    ck_assert_ptr_nonnull(bh_workspace_recall(w, &key, sizeof key));
    bh_workspace_trim(w);
    ck_assert_ptr_null(bh_workspace_recall(w, &key, sizeof key));
    ck_assert_ptr_nonnull(bh_workspace_structure(w, "point", 1, 1, &err)); /* and works on */
    ck_assert_ptr_nonnull(bh_workspace_averages(w));
    bh_workspace_free(w);
}
END_TEST

START_TEST(reasons_are_sentences)
{
    ck_assert_ptr_null(bh_why_text(BH_WHY_NOTHING));
    for (int i = 1; i < BH_WHY_COUNT; i++)
        ck_assert_uint_gt(strlen(bh_why_text((bh_why)i)), 10);
    bh_row row;
    bh_row_put(&row, BH_COL_HOURS, 2, BH_WHY_NO_WANT);
    ck_assert_double_eq(row.number[BH_COL_HOURS], 2);
    ck_assert_int_eq(row.why[BH_COL_HOURS], BH_WHY_NOTHING);
}
END_TEST

/* More structures than a workspace holds, one after the other: it starts anew in time. */
START_TEST(it_never_runs_out_of_structures)
{
    static const char *const names[] = {"point", "uniform", "helm", "fermi-2p"};
    bh_workspace *workspace = bh_workspace_new();
    int made = 0;
    for (int n = 0; n < COUNT(names); n++)
        for (int z = 1; z < 100; z++)
            for (int a = z; a < 3 * z + 2; a++) {
                bh_error err = {.text = ""};
                if (!bh_nuclide_find(z, a) || (n && a < 4))
                    continue;
                bh_workspace_trim(workspace);
                ck_assert_msg(bh_workspace_structure(workspace, names[n], z, a, &err) != NULL,
                              "%s of %d, %d: %s", names[n], z, a, err.text);
                made++;
            }
    ck_assert_int_gt(made, 1100);
    bh_workspace_free(workspace);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("workspace");
    tcase_add_test(tests, kept_by_value);
    tcase_add_test(tests, structures_are_made_once);
    tcase_add_test(tests, too_much_is_forgotten);
    tcase_add_test(tests, reasons_are_sentences);
    tcase_add_test(tests, it_never_runs_out_of_structures);
    return run_suite("workspace", tests);
}
