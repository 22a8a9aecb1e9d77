/* test_error.c - every code has a sentence, the innermost place wins, nothing overruns. */
#include "../suite.h"

#include <string.h>

#include "beamhours/base/error.h"

START_TEST(every_code_has_a_sentence)
{
    ck_assert_str_eq(bh_code_text(BH_OK), "no error");
    ck_assert_str_ne(bh_code_text(BH_EIO), "unknown error");
    ck_assert_str_eq(bh_code_text((bh_code)99), "unknown error");
}
END_TEST

START_TEST(innermost_place_wins)
{
    bh_error err;
    bh_code code = bh_fail(&err, BH_EDOMAIN, "angle %g rad: need 0 to pi", 3.37);
    code = bh_fail_at(&err, code, (bh_mark){"lead.yaml", 14, 9});
    code = bh_fail_at(&err, code, (bh_mark){"plan.yaml", 3, 1});
    ck_assert_int_eq(code, BH_EDOMAIN);
    ck_assert_str_eq(err.file, "lead.yaml");
    ck_assert_int_eq(err.line, 14);
    ck_assert_int_eq(err.column, 9);
    ck_assert_str_eq(err.text, "angle 3.37 rad: need 0 to pi");
}
END_TEST

START_TEST(a_place_may_be_a_whole_file_or_none)
{
    bh_error err;
    bh_code code = bh_fail(&err, BH_EIO, "cannot be read");
    code = bh_fail_at(&err, code, (bh_mark){NULL, 0, 0});
    code = bh_fail_at(&err, code, (bh_mark){"plan.yaml", 0, 0});
    code = bh_fail_at(&err, code, (bh_mark){"other.yaml", 5, 2});
    ck_assert_int_eq(bh_fail_at(NULL, code, (bh_mark){"plan.yaml", 1, 1}), BH_EIO);
    ck_assert_str_eq(err.file, "plan.yaml");
    ck_assert_int_eq(err.line, 0);
}
END_TEST

START_TEST(a_long_file_name_keeps_its_end)
{
    char name[700];
    memset(name, 'd', sizeof name);
    memcpy(name + sizeof name - 11, "/plan.yaml", 11);
    bh_error err;
    const bh_code code = bh_fail(&err, BH_EPLAN, "no beam");
    ck_assert_int_eq(bh_fail_at(&err, code, (bh_mark){name, 7, 3}), BH_EPLAN);
    memset(name, 'x', sizeof name); /* the error keeps its own copy */
    ck_assert_uint_eq(strlen(err.file), sizeof err.file - 1);
    ck_assert_str_eq(err.file + strlen(err.file) - 11, "d/plan.yaml");
}
END_TEST

START_TEST(long_text_is_cut_not_overrun)
{
    char longer[900];
    memset(longer, 'x', sizeof longer - 1);
    longer[sizeof longer - 1] = '\0';
    bh_error err;
    ck_assert_int_eq(bh_fail(&err, BH_EPLAN, "%s", longer), BH_EPLAN);
    ck_assert_uint_eq(strlen(err.text), sizeof err.text - 1);
    ck_assert_int_eq(bh_fail(NULL, BH_EPLAN, "%s", longer), BH_EPLAN);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("error");
    tcase_add_test(tests, every_code_has_a_sentence);
    tcase_add_test(tests, innermost_place_wins);
    tcase_add_test(tests, a_place_may_be_a_whole_file_or_none);
    tcase_add_test(tests, a_long_file_name_keeps_its_end);
    tcase_add_test(tests, long_text_is_cut_not_overrun);
    return run_suite("base/error", tests);
}
