/* test_base_faults.c - each request for memory and each call to the disk fails once, and is told.
 */
#include "../suite.h"

#include <dirent.h>
#include <stdio.h>
#include <string.h>
#include <sys/stat.h>

#include "../faults.h"

#include "beamhours/base/diag.h"
#include "beamhours/base/file.h"
#include "beamhours/base/text.h"

/* (Check itself asks for memory: nothing is asserted while calls may fail.) */
START_TEST(diagnostics_tell)
{
    bool hit = true;
    for (long call = 1; hit; call++) {
        size_t count = 0, errors = 0;
        fail_at(call, false);
        bh_diags *diags = bh_diags_new();
        const bool made = diags != NULL;
        for (int i = 0; made && i < 40; i++)
            bh_diags_add(diags, BH_SEVERITY_WARNING, (bh_mark){i % 2 ? "a" : NULL, i, 1}, "k",
                         "%05000d", i);
        if (made) {
            bh_diags_sort(diags);
            count = bh_diags_count(diags);
            errors = bh_diags_errors(diags);
        }
        bh_diags_free(diags);
        hit = fault_hit;
        fail_at(0, false);
        ck_assert_msg(!made || errors == hit, "call %ld", call);
        ck_assert(!made || hit || count == 40);
        ck_assert(made || hit);
    }
}
END_TEST

START_TEST(texts_tell)
{
    bool hit = true;
    for (long call = 1; hit; call++) {
        bh_text text = {0};
        fail_at(call, false);
        for (int i = 0; i < 100; i++) {
            bh_text_append(&text, "some words");
            bh_text_appendf(&text, "%d", i);
            bh_text_append_number(&text, i);
        }
        char *taken = bh_text_take(&text);
        hit = fault_hit;
        fail_at(0, false);
        ck_assert((taken == NULL) == hit);
        free(taken);
    }
}
END_TEST

static char folder[] = "/tmp/test_base_faults.XXXXXX";

static void enter(void)
{
    ck_assert_ptr_nonnull(mkdtemp(folder));
    ck_assert_int_eq(chdir(folder), 0);
}

static void leave(void)
{
    (void)remove("file");
    ck_assert_int_eq(chdir("/"), 0);
    ck_assert_int_eq(rmdir(folder), 0); /* nothing may have been left behind */
    strcpy(folder, "/tmp/test_base_faults.XXXXXX");
}

/* Writes "new text" where "old" is, or nothing, with one call failing. */
static bool write_once(long call, bool disk, bool replaces)
{
    char content[16] = "";
    (void)remove("file");
    if (replaces) {
        FILE *f = fopen("file", "w");
        (void)fputs("old", f);
        (void)fclose(f);
    }
    bh_error err = {.code = BH_OK};
    fail_at(call, disk);
    const bh_code code = bh_file_write("file", "new text", 8, &err);
    const bool hit = fault_hit;
    fail_at(0, false);
    FILE *f = fopen("file", "r");
    if (f) {
        content[fread(content, 1, sizeof content - 1, f)] = '\0';
        (void)fclose(f);
    }
    ck_assert_int_eq(err.code, code);
    if (code == BH_OK)
        ck_assert_str_eq(content, "new text");
    else
        ck_assert_str_eq(content, replaces ? "old" : "");
    ck_assert_int_eq(f != NULL, replaces || code == BH_OK);
    if (code != BH_OK)
        ck_assert_int_eq(code, disk ? BH_EIO : BH_ENOMEM);
    ck_assert(hit || code == BH_OK);
    return hit;
}

START_TEST(files_appear_whole_or_not_at_all)
{
    for (int kind = 0; kind < 4; kind++) {
        long call = 1, told = 0;
        while (write_once(call, kind % 2, kind / 2))
            call++;
        told = call - 1;
        ck_assert_int_ge(told, kind % 2 ? 5 : 1); /* write, fsync, close, rename ... */
    }
}
END_TEST

START_TEST(reading_tells)
{
    bool hit = true;
    char *long_text = calloc(200001, 1);
    memset(long_text, 'x', 200000);
    ck_assert_int_eq(bh_file_write("file", long_text, 200000, NULL), BH_OK);
    free(long_text);
    for (long call = 1; hit; call++) {
        bh_text text = {0};
        bh_error err;
        fail_at(call, false);
        const bh_code code = bh_file_read("file", 1000000, &text, &err);
        hit = fault_hit;
        fail_at(0, false);
        ck_assert_int_eq(code, hit ? BH_ENOMEM : BH_OK);
        ck_assert_uint_eq(hit ? 0 : text.length, hit ? 0 : 200000);
        bh_text_free(&text);
    }
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("base faults");
    tcase_add_checked_fixture(tests, enter, leave);
    tcase_add_test(tests, diagnostics_tell);
    tcase_add_test(tests, texts_tell);
    tcase_add_test(tests, files_appear_whole_or_not_at_all);
    tcase_add_test(tests, reading_tells);
    return run_suite("base/faults", tests);
}
