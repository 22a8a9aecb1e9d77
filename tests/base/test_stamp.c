/* test_stamp.c - a file on disk changes, or not, and is saved into. */
#define _XOPEN_SOURCE 700 /* for symlink and nanosecond times */
#include "../suite.h"

#include <fcntl.h>
#include <signal.h>
#include <stdbool.h>
#include <sys/resource.h>
#include <time.h>

#include "../folder.h"

#include "beamhours/base/stamp.h"

enum { LIMIT = 100000 };

static bh_stamp stamp_of(const char *path)
{
    bh_text text = {0};
    bh_stamp stamp = {0};
    bh_error err;
    ck_assert_int_eq(bh_stamp_read(path, LIMIT, &text, &stamp, &err), BH_OK);
    ck_assert_str_eq(text.bytes, folder_get(path));
    ck_assert(stamp.there);
    bh_text_free(&text);
    return stamp;
}

/* Puts the file's time a minute into the past, as if it had long been there. */
static void age(const char *path)
{
    const struct timespec times[2] = {{time(NULL) - 60, 0}, {time(NULL) - 60, 0}};
    ck_assert_int_eq(utimensat(AT_FDCWD, path, times, 0), 0);
}

/* FNV-1a 64: Fowler, Noll & Vo; values of the authors' published test vectors (from memory: "",
 * "a", "foobar"). */
START_TEST(hash_is_the_published_one)
{
    ck_assert(bh_stamp_hash("", 0) == 0xcbf29ce484222325U);
    ck_assert(bh_stamp_hash("a", 1) == 0xaf63dc4c8601ec8cU);
    ck_assert(bh_stamp_hash("foobar", 6) == 0x85944171f73967e8U);
}
END_TEST

START_TEST(changes_are_noticed)
{
    folder_put("p", "one");
    age("p");
    bh_stamp stamp = stamp_of("p");
    ck_assert(stamp.settled);
    ck_assert_int_eq(bh_stamp_check("p", &stamp), BH_FILE_SAME);
    folder_put("p", "two"); /* the same length */
    ck_assert_int_eq(bh_stamp_check("p", &stamp), BH_FILE_CHANGED);
    folder_put("p", "one"); /* only another time */
    ck_assert_int_eq(bh_stamp_check("p", &stamp), BH_FILE_SAME);
    ck_assert(!stamp.settled);
    folder_put("p", "longer");
    ck_assert_int_eq(bh_stamp_check("p", &stamp), BH_FILE_CHANGED);
    ck_assert_int_eq(remove("p"), 0);
    ck_assert_int_eq(bh_stamp_check("p", &stamp), BH_FILE_GONE);
    ck_assert_int_eq(mkdir("p", 0777), 0);
    ck_assert_int_ne(bh_stamp_check("p", &stamp), BH_FILE_SAME);
    ck_assert_int_eq(rmdir("p"), 0);
    bh_stamp none = {0};
    ck_assert_int_eq(bh_stamp_check("p", &none), BH_FILE_SAME);
    folder_put("p", "x");
    ck_assert_int_eq(bh_stamp_check("p", &none), BH_FILE_CHANGED);
    ck_assert_int_eq(bh_stamp_check("p/q", &stamp), BH_FILE_UNREADABLE);
}
END_TEST

/* Written so soon after that the file system's clock cannot tell. */
START_TEST(changes_within_one_tick_are_noticed)
{
    folder_put("p", "one");
    bh_stamp stamp = stamp_of("p");
    struct stat s;
    ck_assert_int_eq(stat("p", &s), 0);
    const struct timespec times[2] = {s.st_atim, s.st_mtim};
    folder_put("p", "two");
    ck_assert_int_eq(utimensat(AT_FDCWD, "p", times, 0), 0);
    ck_assert_int_eq(bh_stamp_check("p", &stamp), BH_FILE_CHANGED);
}
END_TEST

START_TEST(reading_fails_in_words)
{
    bh_text text = {0};
    bh_stamp stamp = {0};
    bh_error err;
    ck_assert_int_eq(bh_stamp_read("none", LIMIT, &text, &stamp, &err), BH_EABSENT);
    ck_assert_str_eq(err.text, "cannot be opened: No such file or directory");
    ck_assert_int_eq(bh_stamp_read(".", LIMIT, &text, &stamp, &err), BH_EIO);
    folder_put("p", "12345");
    ck_assert_int_eq(bh_stamp_read("p", 3, &text, &stamp, &err), BH_OK);
    ck_assert_uint_eq(text.length, 4);
    bh_text_free(&text);
}
END_TEST

static bh_save_state save(const char *path, const char *text, bh_stamp *stamp, bh_error *err)
{
    return bh_stamp_save(path, text, strlen(text), stamp, err);
}

START_TEST(saving_keeps_what_the_file_is)
{
    bh_error err;
    struct stat s;
    folder_put("real", "one");
    ck_assert_int_eq(chmod("real", 0640), 0);
    if (geteuid() == 0)
        ck_assert_int_eq(chown("real", 1234, 4321), 0);
    ck_assert_int_eq(symlink("real", "link"), 0);
    bh_stamp stamp = stamp_of("link");
    ck_assert_int_eq(bh_stamp_may_save("link", &err), BH_SAVE_DONE);
    ck_assert_int_eq(save("link", "two", &stamp, &err), BH_SAVE_DONE);
    ck_assert_str_eq(folder_get("real"), "two");
    ck_assert(lstat("link", &s) == 0 && S_ISLNK(s.st_mode));
    ck_assert_int_eq(stat("real", &s), 0);
    ck_assert_uint_eq(s.st_mode & 07777, 0640);
    if (geteuid() == 0)
        ck_assert(s.st_uid == 1234 && s.st_gid == 4321);
    ck_assert_int_eq(folder_files(false), 2);
    ck_assert_int_eq(bh_stamp_check("real", &stamp), BH_FILE_SAME);
    ck_assert_int_eq(save("link", "three", &stamp, &err), BH_SAVE_DONE);
    ck_assert_int_eq(save("link", "", &stamp, &err), BH_SAVE_DONE);
    ck_assert_str_eq(folder_get("real"), "");
}
END_TEST

START_TEST(saving_loses_nothing_of_others)
{
    bh_error err;
    folder_put("p", "one");
    bh_stamp stamp = stamp_of("p");
    folder_put("p", "theirs");
    ck_assert_int_eq(save("p", "mine", &stamp, &err), BH_SAVE_CHANGED);
    ck_assert_ptr_nonnull(strstr(err.text, "was changed on disk since it was read"));
    ck_assert_str_eq(err.file, "p");
    ck_assert_str_eq(folder_get("p"), "theirs");
    ck_assert_int_eq(bh_stamp_accept("p", &stamp, &err), BH_OK);
    ck_assert_int_eq(save("p", "mine", &stamp, &err), BH_SAVE_DONE);
    ck_assert_int_eq(remove("p"), 0);
    ck_assert_int_eq(save("p", "mine", &stamp, &err), BH_SAVE_GONE);
    ck_assert_int_eq(folder_files(false), 0);
    ck_assert_int_eq(bh_stamp_accept("p", &stamp, &err), BH_OK);
    ck_assert_int_eq(save("p", "mine", &stamp, &err), BH_SAVE_DONE);
    bh_stamp none = {0};
    ck_assert_int_eq(save("p", "new", &none, &err), BH_SAVE_CHANGED);
    ck_assert_str_eq(folder_get("p"), "mine");
    ck_assert_int_eq(bh_stamp_accept(".", &stamp, &err), BH_EIO);
}
END_TEST

START_TEST(what_does_not_fit_is_refused)
{
    bh_error err;
    bh_stamp none = {0};
    ck_assert_int_eq(save(".", "x", &none, &err), BH_SAVE_UNFIT);
    ck_assert_int_eq(mkfifo("pipe", 0666), 0);
    ck_assert_int_eq(bh_stamp_may_save("pipe", &err), BH_SAVE_UNFIT);
    ck_assert_int_eq(symlink("nowhere", "loose"), 0);
    ck_assert_int_eq(save("loose", "x", &none, &err), BH_SAVE_UNFIT);
    folder_put("p", "x");
    bh_stamp stamp = stamp_of("p");
    ck_assert_int_eq(link("p", "q"), 0);
    ck_assert_int_eq(save("p", "y", &stamp, &err), BH_SAVE_UNFIT);
    ck_assert_ptr_nonnull(strstr(err.text, "hard link"));
    ck_assert_int_eq(save("", "y", &none, &err), BH_SAVE_FAILED);
    ck_assert_int_eq(save("no/such", "y", &none, &err), BH_SAVE_FAILED);
    ck_assert_int_eq(save("p/q", "y", &none, &err), BH_SAVE_FAILED);
}
END_TEST

static int save_read_only(void)
{
    bh_error err;
    bh_text text = {0};
    bh_stamp stamp = {0};
    if (bh_stamp_read("p", LIMIT, &text, &stamp, &err) != BH_OK)
        return 50;
    bh_text_free(&text);
    const bh_save_state may = bh_stamp_may_save("p", &err);
    return save("p", "two", &stamp, &err) == may ? (int)may : 51;
}

START_TEST(read_only_files_and_folders_are_told)
{
    folder_put("p", "one");
    ck_assert_int_eq(chmod("p", 0444), 0);
    ck_assert_int_eq(folder_as_nobody(save_read_only), BH_SAVE_READ_ONLY);
    ck_assert_int_eq(chmod("p", 0666), 0);
    ck_assert_int_eq(chmod(".", 0555), 0);
    ck_assert_int_eq(folder_as_nobody(save_read_only), BH_SAVE_READ_ONLY);
    ck_assert_str_eq(folder_get("p"), "one");
}
END_TEST

/* Somebody else's file that we may write: nobody gets more rights than before. */
START_TEST(rights_are_never_widened)
{
    struct stat s;
    if (geteuid() != 0)
        return;
    folder_put("p", "one");
    ck_assert_int_eq(chmod("p", 0676), 0);
    ck_assert_int_eq(folder_as_nobody(save_read_only), BH_SAVE_DONE);
    ck_assert_int_eq(stat("p", &s), 0);
    ck_assert_uint_eq(s.st_mode & 07777, 0666);
    ck_assert_str_eq(folder_get("p"), "two");
}
END_TEST

static int save_too_much(void)
{
    static char much[20000];
    bh_error err;
    bh_text text = {0};
    bh_stamp stamp = {0};
    const struct rlimit limit = {5000, 5000};
    (void)signal(SIGXFSZ, SIG_IGN);
    memset(much, 'x', sizeof much - 1);
    if (setrlimit(RLIMIT_FSIZE, &limit) != 0 ||
        bh_stamp_read("p", LIMIT, &text, &stamp, &err) != BH_OK)
        return 50;
    bh_text_free(&text);
    return (int)save("p", much, &stamp, &err);
}

START_TEST(a_full_disk_is_told)
{
    folder_put("p", "one");
    ck_assert_int_eq(chmod("p", 0666), 0);
    ck_assert_int_eq(folder_as_nobody(save_too_much), BH_SAVE_FULL);
    ck_assert_str_eq(folder_get("p"), "one");
    ck_assert_int_eq(folder_files(false), 1);
}
END_TEST

static int nothing(void)
{
    return 0;
}

/* Of a save that was killed: our own, old, of a process that has ended. */
START_TEST(what_was_left_behind_goes)
{
    char stale[64], ours[64];
    bh_error err;
    const pid_t child = fork();
    if (child == 0)
        _exit(nothing());
    ck_assert_int_eq(waitpid(child, NULL, 0), child);
    (void)snprintf(stale, sizeof stale, ".p.%ld-0~", (long)child);
    (void)snprintf(ours, sizeof ours, ".p.%ld-7~", (long)getpid());
    folder_put("p", "one");
    bh_stamp stamp = stamp_of("p");
    folder_put(stale, "half");
    ck_assert_int_eq(save("p", "two", &stamp, &err), BH_SAVE_DONE);
    ck_assert_int_eq(folder_files(false), 2); /* too young to tell */
    const struct timespec times[2] = {{time(NULL) - 7200, 0}, {time(NULL) - 7200, 0}};
    folder_put(ours, "at work");
    folder_put(".p.1-0~x", "another's");
    ck_assert_int_eq(utimensat(AT_FDCWD, stale, times, 0), 0);
    ck_assert_int_eq(utimensat(AT_FDCWD, ours, times, 0), 0);
    ck_assert_int_eq(save("p", "three", &stamp, &err), BH_SAVE_DONE);
    ck_assert_int_eq(folder_files(false), 3);
    ck_assert_str_eq(folder_get(ours), "at work");
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("stamp");
    tcase_add_checked_fixture(tests, folder_enter, folder_leave);
    tcase_add_test(tests, hash_is_the_published_one);
    tcase_add_test(tests, changes_are_noticed);
    tcase_add_test(tests, changes_within_one_tick_are_noticed);
    tcase_add_test(tests, reading_fails_in_words);
    tcase_add_test(tests, saving_keeps_what_the_file_is);
    tcase_add_test(tests, saving_loses_nothing_of_others);
    tcase_add_test(tests, what_does_not_fit_is_refused);
    tcase_add_test(tests, read_only_files_and_folders_are_told);
    tcase_add_test(tests, rights_are_never_widened);
    tcase_add_test(tests, a_full_disk_is_told);
    tcase_add_test(tests, what_was_left_behind_goes);
    return run_suite("base/stamp", tests);
}
