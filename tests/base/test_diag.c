/* test_diag.c - complaints are copied, counted and put in file order. */
#include "../suite.h"

#include <stdio.h>
#include <string.h>

#include "beamhours/base/diag.h"

START_TEST(copies_and_counts)
{
    char file[] = "a.yaml", key[] = "beam", word[] = "x";
    bh_diags *diags = bh_diags_new();
    ck_assert_uint_eq(bh_diags_count(diags), 0);
    bh_diags_add(diags, BH_SEVERITY_ERROR, (bh_mark){file, 3, 4}, key, "%s is %d", word, 7);
    bh_diags_add(diags, BH_SEVERITY_WARNING, (bh_mark){NULL, 0, 0}, "", "w");
    bh_diags_add(diags, BH_SEVERITY_WARNING, (bh_mark){file, 1, 0}, NULL, "v");
    file[0] = key[0] = word[0] = '?';
    ck_assert_uint_eq(bh_diags_count(diags), 3);
    ck_assert_uint_eq(bh_diags_errors(diags), 1);
    const bh_diag *d = bh_diags_at(diags, 0);
    ck_assert_str_eq(d->at.file, "a.yaml");
    ck_assert_int_eq(d->at.line * 10 + d->at.column, 34);
    ck_assert_str_eq(d->key, "beam");
    ck_assert_str_eq(d->text, "x is 7");
    ck_assert_ptr_null(bh_diags_at(diags, 1)->at.file);
    ck_assert_str_eq(bh_diags_at(diags, 1)->key, "plan");
    ck_assert_str_eq(bh_diags_at(diags, 2)->key, "plan");
    bh_diags_free(diags);
    bh_diags_free(NULL);
}
END_TEST

START_TEST(sorts_by_file_line_column_and_keeps_equals)
{
    static const struct {
        const char *file;
        int line, column;
        const char *text;
    } given[] = {
        {"plan.yaml", 9, 1, "h"}, {"lead.yaml", 1, 1, "i"}, {"plan.yaml", 2, 7, "e"},
        {"plan.yaml", 2, 3, "c"}, {"plan.yaml", 2, 3, "d"}, {"plan.yaml", 0, 0, "a"},
        {"lead.yaml", 5, 1, "j"}, {"plan.yaml", 2, 7, "f"}, {"plan.yaml", 2, 0, "b"},
        {"plan.yaml", 3, 1, "g"}, {NULL, 0, 0, "k"},
    };
    bh_diags *diags = bh_diags_new();
    for (int i = 0; i < COUNT(given); i++)
        bh_diags_add(diags, BH_SEVERITY_ERROR,
                     (bh_mark){given[i].file, given[i].line, given[i].column}, "k", "%s",
                     given[i].text);
    for (int round = 0; round < 2; round++) {
        bh_diags_sort(diags);
        for (size_t i = 0; i < bh_diags_count(diags); i++)
            ck_assert_int_eq(bh_diags_at(diags, i)->text[0], (int)('a' + i));
    }
    bh_diags_free(diags);
}
END_TEST

START_TEST(pointers_stay_good_while_it_grows)
{
    bh_diags *diags = bh_diags_new();
    bh_diags_sort(diags);
    bh_diags_add(diags, BH_SEVERITY_ERROR, (bh_mark){"f0", 1, 1}, "k", "first");
    const bh_diag *first = bh_diags_at(diags, 0);
    char file[16];
    for (int i = 0; i < 1000; i++) {
        (void)snprintf(file, sizeof file, "f%d", i % 40);
        bh_diags_add(diags, BH_SEVERITY_WARNING, (bh_mark){file, 1000 - i, 1}, "k", "%0500d", i);
    }
    ck_assert_str_eq(first->text, "first");
    ck_assert_uint_eq(bh_diags_count(diags), 1001);
    ck_assert_uint_eq(bh_diags_errors(diags), 1);
    bh_diags_sort(diags);
    ck_assert_ptr_eq(bh_diags_at(diags, 0), first);
    ck_assert_str_eq(bh_diags_at(diags, 1000)->at.file, "f39");
    bh_diags_free(diags);
}
END_TEST

START_TEST(expected_files_go_first)
{
    bh_diags *diags = bh_diags_new();
    bh_diags_expect(diags, "first");
    bh_diags_expect(diags, "second");
    bh_diags_add(diags, BH_SEVERITY_ERROR, (bh_mark){"third", 1, 1}, "a", "x");
    bh_diags_add(diags, BH_SEVERITY_ERROR, (bh_mark){"second", 9, 9}, "b", "x");
    bh_diags_add(diags, BH_SEVERITY_ERROR, (bh_mark){"first", 9, 9}, "c", "x");
    bh_diags_sort(diags);
    ck_assert_uint_eq(bh_diags_count(diags), 3);
    ck_assert_str_eq(bh_diags_at(diags, 0)->key, "c");
    ck_assert_str_eq(bh_diags_at(diags, 1)->key, "b");
    ck_assert_str_eq(bh_diags_at(diags, 2)->key, "a");
    bh_diags_free(diags);
}
END_TEST

START_TEST(what_was_told_is_known)
{
    bh_diags *diags = bh_diags_new();
    char text[32];
    for (int i = 0; i < 3000; i++) { /* more than one table of chains */
        const bh_mark at = {i % 2 ? "a" : "b", 1 + i / 10, 1 + i % 10};
        (void)snprintf(text, sizeof text, "text %d", i % 7);
        ck_assert(!bh_diags_told(diags, at, text));
        bh_diags_add(diags, BH_SEVERITY_ERROR, at, "k", "%s", text);
        ck_assert(bh_diags_told(diags, at, text));
        ck_assert(!bh_diags_told(diags, at, "another text"));
        ck_assert(!bh_diags_told(diags, (bh_mark){"c", at.line, at.column}, text));
    }
    bh_diags_sort(diags);
    for (size_t i = 0; i < bh_diags_count(diags); i++)
        ck_assert(bh_diags_told(diags, bh_diags_at(diags, i)->at, bh_diags_at(diags, i)->text));
    bh_diags_free(diags);
}
END_TEST

START_TEST(a_loss_is_the_last_error)
{
    bh_diags *diags = bh_diags_new();
    bh_diags_add(diags, BH_SEVERITY_WARNING, (bh_mark){"f", 1, 1}, "k", "w");
    bh_diags_lose(diags);
    bh_diags_lose(diags);
    bh_diags_sort(diags);
    ck_assert_uint_eq(bh_diags_count(diags), 2);
    ck_assert_uint_eq(bh_diags_errors(diags), 1);
    ck_assert_str_eq(bh_diags_at(diags, 1)->text, "out of memory");
    ck_assert_int_eq(bh_diags_at(diags, 1)->severity, BH_SEVERITY_ERROR);
    bh_diags_free(diags);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("diag");
    tcase_add_test(tests, copies_and_counts);
    tcase_add_test(tests, sorts_by_file_line_column_and_keeps_equals);
    tcase_add_test(tests, pointers_stay_good_while_it_grows);
    tcase_add_test(tests, expected_files_go_first);
    tcase_add_test(tests, what_was_told_is_known);
    tcase_add_test(tests, a_loss_is_the_last_error);
    return run_suite("base/diag", tests);
}
