/* test_rescue.c - unsaved work is written, found, compared and thrown away. */
#define _XOPEN_SOURCE 700 /* for symlink; NOLINT */
#include "../suite.h"

#include <signal.h>
#include <stdbool.h>
#include <sys/resource.h>

#include "../folder.h"

#include "beamhours/base/rescue.h"
#include "beamhours/base/stamp.h"

static bh_text text_of(const char *string)
{
    bh_text text = {0};
    bh_text_append(&text, string);
    return text;
}

static bh_rescue_found find(const bh_rescue *rescue, const char *now, const char *wanted)
{
    bh_rescue_found found;
    bh_text file = text_of(now), work = {0};
    ck_assert_int_eq(bh_rescue_find(rescue, &file, &work, &found, NULL), BH_OK);
    ck_assert_str_eq(work.bytes ? work.bytes : "", wanted);
    ck_assert_uint_eq(found.length, strlen(wanted));
    bh_text_free(&file);
    bh_text_free(&work);
    return found;
}

static bool prepare(bh_rescue *rescue, const char *work, const char *base)
{
    return bh_rescue_prepare(rescue, work, strlen(work), bh_stamp_hash(base, strlen(base)));
}

START_TEST(work_is_found_again)
{
    static const struct {
        const char *base, *work, *now;
        int lines;
    } rows[] = {
        {"a: 1\nb: 2\n", "a: 1\nb: 3\n", "a: 1\nb: 2\n", 1},
        {"a: 1", "a: 1", "a: 1", 0},
        {"a: 1\n", "", "a: 1\n", 0},
        {"", "a: 1\nb: 2\nc: 3", "", 3},
        {"a: 1\n", "a: 1\n# beamhours: unsaved work, 3 bytes\n", "a: 2\n", 2},
        {"a: 1\n", "a: 2\n\n\n", "a: 1\n", 3},
        {"a: 1\n", "a: 1\nx\nb: 2\n", "a: 1\nb: 2\n", 1},
        {"a: 1\n", "a: 1\nab: 2\n", "a: 1\nb: 2\n", 1},
        {"a: 1\n", "a: 1\nb: 2\n", "a: 1\nx\nb: 2\n", 0},
    };
    struct stat s;
    for (int i = 0; i < COUNT(rows); i++) {
        bh_rescue *r = bh_rescue_new("p.yaml", 1);
        ck_assert(!bh_rescue_pending(r) && bh_rescue_write(r));
        ck_assert_int_eq(folder_files(false), 0);
        ck_assert(prepare(r, rows[i].work, rows[i].base) && bh_rescue_pending(r));
        ck_assert(bh_rescue_write(r) && !bh_rescue_pending(r));
        ck_assert_int_eq(folder_files(false), 1);
        ck_assert(stat(".p.yaml.unsaved", &s) == 0 && (s.st_mode & 0777) == 0600);
        bh_rescue_free(r);
        r = bh_rescue_new("p.yaml", 1);
        const bh_rescue_found found = find(r, rows[i].now, rows[i].work);
        ck_assert(found.there && found.whole && found.age >= 0 && found.age < 60);
        ck_assert_int_eq(found.differs, strcmp(rows[i].now, rows[i].work) != 0);
        ck_assert_int_eq(found.same_base, strcmp(rows[i].now, rows[i].base) == 0);
        ck_assert_int_eq(found.lines, rows[i].lines);
        ck_assert_int_eq(bh_rescue_discard(r, NULL), BH_OK);
        ck_assert_int_eq(bh_rescue_discard(r, NULL), BH_OK);
        ck_assert(!find(r, rows[i].now, "").there);
        bh_rescue_free(r);
    }
}
END_TEST

START_TEST(the_latest_is_written)
{
    bh_rescue *r = bh_rescue_new("p.yaml", 1);
    for (int i = 0; i < 100; i++) {
        char work[16];
        (void)snprintf(work, sizeof work, "a: %d\n", i);
        ck_assert(prepare(r, work, ""));
        if (i % 3 == 0)
            ck_assert(bh_rescue_write(r));
    }
    (void)find(r, "", "a: 99\n");
    ck_assert(prepare(r, "b: 1\n", ""));
    bh_rescue_clear(r);
    ck_assert(!bh_rescue_pending(r) && bh_rescue_write(r));
    (void)find(r, "", "a: 99\n");
    bh_rescue_free(r);
    bh_rescue_free(NULL);
}
END_TEST

START_TEST(it_lies_beside_the_file_itself)
{
    ck_assert_int_eq(mkdir("there", 0777), 0);
    folder_put("there/p.yaml", "a: 1\n");
    ck_assert_int_eq(symlink("there/p.yaml", "link"), 0);
    bh_rescue *r = bh_rescue_new("link", 1);
    ck_assert_ptr_nonnull(strstr(bh_rescue_path(r), "/there/.p.yaml.unsaved"));
    ck_assert(prepare(r, "b: 1\n", "") && bh_rescue_write(r));
    ck_assert_str_ne(folder_get("there/.p.yaml.unsaved"), "");
    ck_assert_int_eq(bh_rescue_discard(r, NULL), BH_OK);
    bh_rescue_free(r);
    ck_assert_int_eq(remove("there/p.yaml"), 0);
    ck_assert_int_eq(rmdir("there"), 0);
}
END_TEST

START_TEST(damage_is_told)
{
    static const char *const contents[] = {
        "a: 1\n",
        "",
        "a: 1\n# beamhours: unsaved work, 9 bytes, 0, begun from 0\n",
        "a: 1\n\n# beamhours: unsaved work, 5 bytes, 1, begun from 0\n",
        "# beamhours: unsaved work, 0 bytes, 1, begun from 0\n",
        "a: 1\n\n# beamhours: unsaved"};
    for (int i = 0; i < COUNT(contents); i++) {
        bh_rescue *r = bh_rescue_new("p.yaml", 1);
        bh_rescue_found found;
        bh_text now = text_of("a: 0\n"), work = {0};
        folder_put(".p.yaml.unsaved", contents[i]);
        ck_assert_int_eq(bh_rescue_find(r, &now, &work, &found, NULL), BH_OK);
        ck_assert(found.there && !found.whole && !found.same_base && found.differs);
        if (i == 0 || i == 3)
            ck_assert_int_eq(strncmp(work.bytes, "a: 1\n", work.length), 0);
        bh_text_free(&now);
        bh_text_free(&work);
        bh_rescue_free(r);
    }
}
END_TEST

START_TEST(failures_are_told)
{
    bh_error err;
    bh_rescue_found found;
    const bh_text now = {0};
    bh_rescue *r = bh_rescue_new("no/such/p.yaml", 1);
    ck_assert(prepare(r, "a: 1\n", ""));
    ck_assert(!bh_rescue_write(r) && bh_rescue_pending(r));
    ck_assert_int_eq(bh_rescue_find(r, &now, NULL, &found, NULL), BH_OK);
    ck_assert(!found.there);
    bh_rescue_free(r);
    ck_assert_int_eq(mkdir(".p.yaml.unsaved", 0777), 0);
    r = bh_rescue_new("p.yaml", 1);
    ck_assert(prepare(r, "a: 1\n", "") && !bh_rescue_write(r));
    ck_assert_int_eq(folder_files(false), 1);
    ck_assert_int_eq(bh_rescue_find(r, &now, NULL, &found, &err), BH_EIO);
    ck_assert_int_eq(bh_rescue_discard(r, &err), BH_EIO);
    ck_assert_int_eq(strncmp(err.text, "cannot be taken away: ", 22), 0);
    bh_rescue_free(r);
    ck_assert_int_eq(rmdir(".p.yaml.unsaved"), 0);
}
END_TEST

static int write_too_much(void)
{
    static char much[20000];
    const struct rlimit limit = {5000, 5000};
    (void)signal(SIGXFSZ, SIG_IGN);
    memset(much, 'x', sizeof much - 1);
    bh_rescue *r = bh_rescue_new("p.yaml", 1);
    const bool before = prepare(r, "a: 1\n", "") && bh_rescue_write(r);
    const bool now =
        setrlimit(RLIMIT_FSIZE, &limit) == 0 && prepare(r, much, "") && bh_rescue_write(r);
    bh_rescue_free(r);
    return before && !now ? 0 : 1;
}

START_TEST(on_a_full_disk_the_older_stays)
{
    ck_assert_int_eq(folder_as_nobody(write_too_much), 0);
    ck_assert_int_eq(folder_files(false), 1);
    bh_rescue *r = bh_rescue_new("p.yaml", 1);
    ck_assert(find(r, "", "a: 1\n").whole);
    bh_rescue_free(r);
}
END_TEST

static bh_rescue *of_the_handler;

static void on_signal(int number)
{
    (void)number;
    _exit(bh_rescue_write(of_the_handler) ? 0 : 1);
}

/* Killed in all phases of preparing and writing: one of the two latest texts is there, whole. */
START_TEST(a_signal_at_any_moment)
{
    for (int delay = 0; delay < 40; delay++) {
        int status = 0, ready[2];
        char byte = 0;
        ck_assert_int_eq(pipe(ready), 0);
        const pid_t child = fork();
        if (child == 0) {
            of_the_handler = bh_rescue_new("p.yaml", 1);
            (void)signal(SIGTERM, on_signal);
            for (int i = 0;; i++) {
                char work[4000];
                (void)snprintf(work, sizeof work, "%d\n%*d\n", i, 3000, i);
                if (!prepare(of_the_handler, work, "") || !bh_rescue_write(of_the_handler))
                    _exit(2);
                if (i == 0 && write(ready[1], "x", 1) != 1)
                    _exit(3);
            }
        }
        ck_assert_int_eq(read(ready[0], &byte, 1), 1);
        const struct timespec wait = {0, 50000L * delay};
        (void)nanosleep(&wait, NULL);
        ck_assert_int_eq(kill(child, SIGTERM), 0);
        ck_assert_int_eq(waitpid(child, &status, 0), child);
        ck_assert(WIFEXITED(status) && WEXITSTATUS(status) == 0);
        bh_rescue *r = bh_rescue_new("p.yaml", 1);
        bh_rescue_found found;
        const bh_text now = {0};
        bh_text work = {0};
        int first = -1, second = -2;
        ck_assert_int_eq(bh_rescue_find(r, &now, &work, &found, NULL), BH_OK);
        ck_assert(found.there && found.whole);
        ck_assert_int_eq(sscanf(work.bytes, "%d %d", &first, &second), 2);
        ck_assert_int_eq(first, second);
        bh_text_free(&work);
        bh_rescue_free(r);
        (void)close(ready[0]);
        (void)close(ready[1]);
    }
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("rescue");
    tcase_set_timeout(tests, 60);
    tcase_add_checked_fixture(tests, folder_enter, folder_leave);
    tcase_add_test(tests, work_is_found_again);
    tcase_add_test(tests, the_latest_is_written);
    tcase_add_test(tests, it_lies_beside_the_file_itself);
    tcase_add_test(tests, damage_is_told);
    tcase_add_test(tests, failures_are_told);
    tcase_add_test(tests, on_a_full_disk_the_older_stays);
    tcase_add_test(tests, a_signal_at_any_moment);
    return run_suite("base/rescue", tests);
}
