/* test_keeping_faults.c - each step of saving and of rescuing fails once: nothing is lost. */
#include "../suite.h"

#include <stdbool.h>

#include "../faults.h"
#include "../folder.h"

#include "beamhours/base/presence.h"
#include "beamhours/base/rescue.h"
#include "beamhours/base/stamp.h"

/* Saves "new" over "old" with one call failing; false when there are not so many. */
static bool save_once(long call, bool disk, bh_save_state wanted)
{
    bh_text text = {0};
    bh_stamp stamp = {0};
    bh_error err = {.text = ""};
    folder_put("p", "old");
    ck_assert_int_eq(bh_stamp_read("p", 100, &text, &stamp, &err), BH_OK);
    bh_text_free(&text);
    fail_at(call, disk);
    const bh_save_state state = bh_stamp_save("p", "new text", 8, &stamp, &err);
    const bool hit = fault_hit;
    fail_at(0, false);
    ck_assert_int_eq(folder_files(false), 1); /* nothing is left behind */
    ck_assert_str_eq(folder_get("p"), state == BH_SAVE_DONE ? "new text" : "old");
    ck_assert_int_eq(bh_stamp_check("p", &stamp), BH_FILE_SAME);
    if (state != BH_SAVE_DONE) {
        ck_assert(hit && err.text[0]);
        ck_assert_int_eq(state, wanted);
    }
    return hit;
}

START_TEST(saving_is_whole_or_not_at_all)
{
    static const struct {
        int number;
        bh_save_state state;
    } rows[] = {{EIO, BH_SAVE_FAILED},
                {ENOSPC, BH_SAVE_FULL},
                {EDQUOT, BH_SAVE_FULL},
                {EROFS, BH_SAVE_READ_ONLY},
                {EACCES, BH_SAVE_READ_ONLY}};
    for (int i = 0; i < COUNT(rows); i++) {
        long call = 1;
        fault_number = rows[i].number;
        while (save_once(call, true, rows[i].state))
            call++;
        ck_assert_int_ge(call, 6); /* writes, fchmod, fsync, close, rename, fsync of the folder */
    }
    fault_number = 0;
}
END_TEST

START_TEST(saving_without_memory)
{
    long call = 1;
    while (save_once(call, false, BH_SAVE_FAILED))
        call++;
    ck_assert_int_ge(call, 4);
}
END_TEST

START_TEST(reading_without_memory)
{
    bool hit = true;
    folder_put("p", "old");
    for (long call = 1; hit; call++) {
        bh_text text = {0};
        bh_stamp stamp = {0};
        bh_error err;
        fail_at(call, false);
        const bh_code code = bh_stamp_read("p", 100, &text, &stamp, &err);
        hit = fault_hit;
        fail_at(0, false);
        ck_assert(code == BH_OK || hit);
        if (code == BH_OK)
            ck_assert_str_eq(text.bytes, "old");
        bh_text_free(&text);
    }
}
END_TEST

/* With an older recovery file there. */
static bool rescue_once(long call, bool disk)
{
    bh_rescue_found found = {0};
    bh_text work = {0};
    const bh_text now = {0};
    bh_rescue *old = bh_rescue_new("p", 1);
    ck_assert(bh_rescue_prepare(old, "old", 3, 0) && bh_rescue_write(old));
    fail_at(call, disk);
    bh_rescue *r = bh_rescue_new("p", 1);
    const bool ready = r && bh_rescue_prepare(r, "old", 3, 0) && bh_rescue_prepare(r, "new", 3, 0);
    const bool done = ready && bh_rescue_write(r);
    const bool hit = fault_hit;
    fail_at(0, false);
    ck_assert(done || hit);
    ck_assert_int_eq(folder_files(false), 1);
    ck_assert_int_eq(bh_rescue_find(old, &now, &work, &found, NULL), BH_OK);
    ck_assert(found.whole);
    ck_assert_str_eq(work.bytes, done ? "new" : "old");
    if (ready)
        ck_assert_int_eq(bh_rescue_pending(r), !done);
    if (ready && !done) /* the next time it goes well */
        ck_assert(bh_rescue_write(r) && strncmp(folder_get(".p.unsaved"), "new", 3) == 0);
    bh_text_free(&work);
    bh_rescue_free(r);
    bh_rescue_free(old);
    return hit;
}

START_TEST(rescuing_is_whole_or_not_at_all)
{
    for (int disk = 0; disk < 2; disk++) {
        long call = 1;
        while (rescue_once(call, disk))
            call++;
        ck_assert_int_ge(call, 6);
    }
}
END_TEST

START_TEST(finding_without_memory)
{
    bool hit = true;
    bh_rescue *r = bh_rescue_new("p", 1);
    ck_assert(bh_rescue_prepare(r, "old", 3, 0) && bh_rescue_write(r));
    for (long call = 1; hit; call++) {
        bh_rescue_found found;
        bh_text work = {0};
        const bh_text now = {0};
        fail_at(call, false);
        const bh_code code = bh_rescue_find(r, &now, &work, &found, NULL);
        hit = fault_hit;
        fail_at(0, false);
        ck_assert(hit || code == BH_OK);
        if (code == BH_OK)
            ck_assert_str_eq(work.bytes, "old");
        bh_text_free(&work);
    }
    bh_rescue_free(r);
}
END_TEST

START_TEST(marking_fails_in_words)
{
    for (int disk = 0; disk < 2; disk++) {
        bool hit = true;
        for (long call = 1; hit; call++) {
            bh_presence *mark = NULL;
            bh_other other;
            bh_error err = {.text = ""};
            fail_at(call, disk);
            const bh_presence_state state = bh_presence_open("p", false, &mark, &other, &err);
            hit = fault_hit;
            fail_at(0, false);
            ck_assert(hit || state == BH_PRESENCE_ALONE);
            ck_assert(state != BH_PRESENCE_UNKNOWN || err.text[0]);
            bh_presence_close(mark);
            ck_assert_int_eq(folder_files(false), 0);
        }
    }
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("keeping faults");
    tcase_set_timeout(tests, 60);
    tcase_add_checked_fixture(tests, folder_enter, folder_leave);
    tcase_add_test(tests, saving_is_whole_or_not_at_all);
    tcase_add_test(tests, saving_without_memory);
    tcase_add_test(tests, reading_without_memory);
    tcase_add_test(tests, rescuing_is_whole_or_not_at_all);
    tcase_add_test(tests, finding_without_memory);
    tcase_add_test(tests, marking_fails_in_words);
    return run_suite("base/keeping faults", tests);
}
