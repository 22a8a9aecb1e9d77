/* test_text.c - a text grows by strings, bytes, formats and numbers, and can be taken. */
#include "../suite.h"

#include <stdint.h>
#include <string.h>

#include "beamhours/base/text.h"

START_TEST(grows_and_is_taken)
{
    bh_text text = {0};
    bh_text_append(&text, "rate ");
    bh_text_append_bytes(&text, "a\0b", 3);
    bh_text_appendf(&text, " %d%%", 5);
    bh_text_append(&text, "");
    bh_text_append_bytes(&text, NULL, 0);
    bh_text_append_number(&text, 0.1);
    ck_assert_uint_eq(text.length, 14);
    ck_assert_mem_eq(text.bytes, "rate a\0b 5%0.1", 15);
    char *taken = bh_text_take(&text);
    ck_assert_mem_eq(taken, "rate a\0b 5%0.1", 15);
    ck_assert_uint_eq(text.length + text.room, 0);
    free(taken);
    taken = bh_text_take(&text); /* an empty text is a text */
    ck_assert_str_eq(taken, "");
    free(taken);
    bh_text_free(&text);
}
END_TEST

START_TEST(long_texts)
{
    bh_text text = {0};
    for (int i = 0; i < 10000; i++)
        bh_text_appendf(&text, "%04d%0100d", i, 0);
    ck_assert_uint_eq(text.length, 1040000);
    ck_assert_int_eq(strncmp(text.bytes + 104 * 9999, "99990", 5), 0);
    char *to = bh_text_reserve(&text, 3);
    memcpy(to, "end", 3);
    text.length += 3;
    bh_text_append(&text, "");
    ck_assert_str_eq(text.bytes + 1040000, "end");
    bh_text_free(&text);
    ck_assert_ptr_null(text.bytes);
}
END_TEST

START_TEST(an_impossible_length_is_a_failure)
{
    bh_text text = {0};
    bh_text_append(&text, "x");
    ck_assert_ptr_null(bh_text_reserve(&text, SIZE_MAX / 2));
    ck_assert(text.failed);
    bh_text_append(&text, "y");
    ck_assert_str_eq(text.bytes, "x");
    ck_assert_ptr_null(bh_text_take(&text));
    ck_assert(!text.failed);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("text");
    tcase_add_test(tests, grows_and_is_taken);
    tcase_add_test(tests, long_texts);
    tcase_add_test(tests, an_impossible_length_is_a_failure);
    return run_suite("base/text", tests);
}
