/* test_disk.c - each step of a save fails once, below the real program: what a user sees, and that
 * nothing is lost. */
#include "../suite.h"

#include <dirent.h>
#include <errno.h>
#include <signal.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <sys/stat.h>
#include <unistd.h>

#include "tty.h"

#define UNSAVED ".plan.yaml.unsaved"
#define SAVING  "-0~"       /* in the name of what is written beside the plan */
#define KEEPING ".unsaved~" /* likewise, of unsaved work */

static char variables[3][1400];

/* What makes calls fail stands beside this program; sanitizers want to be told of it. */
static void load_failing(const tty *t)
{
    char own[1200];
    const ssize_t n = readlink("/proc/self/exe", own, sizeof own - 1);
    ck_assert_int_gt(n, 0);
    own[n] = '\0';
    *strrchr(own, '/') = '\0';
    const char *said = getenv("ASAN_OPTIONS");
    snprintf(variables[0], sizeof *variables, "LD_PRELOAD=%s/failing.so", own);
    snprintf(variables[1], sizeof *variables, "FAILING=%s/failing", t->folder);
    snprintf(variables[2], sizeof *variables, "ASAN_OPTIONS=%.1000s:verify_asan_link_order=0",
             said ? said : "");
}

static void break_call(const tty *t, const char *call, int number, const char *part)
{
    char line[192], path[256];
    snprintf(line, sizeof line, "%s %d %s\n", call, number, part);
    tty_write(t, "failing~", line);
    snprintf(line, sizeof line, "%s/failing~", t->folder);
    snprintf(path, sizeof path, "%s/failing", t->folder);
    ck_assert_int_eq(rename(line, path), 0); /* all of it at once */
}

static void mend(const tty *t)
{
    char path[256];
    snprintf(path, sizeof path, "%s/failing", t->folder);
    ck_assert_int_eq(unlink(path), 0);
}

static void begin(tty *t)
{
    tty_folder(t, "hydrogen-separation");
    load_failing(t);
    tty_run(t, &(tty_start){.arguments = {"plan.yaml"},
                            .environment = variables[0],
                            .further = {variables[1], variables[2]}});
    tty_wait(t, "asked");
    tty_type(t, "<Home>lcurrent<Escape>");
    tty_wait(t, "> current");
    tty_wait_gone(t, "look for");
}

static void file_has(const tty *t, const char *name, const char *text)
{
    char *all = tty_read(t, name);
    ck_assert_msg(strstr(all, text) != NULL, "no \"%s\" in %s:\n%s", text, name, all);
    free(all);
}

static void wait_for_file(tty *t, const char *name)
{
    tty_until(t, tty_exists(t, name));
}

/* Nothing is left behind of a save that failed: no file whose name ends in ~. */
static void no_remains(const tty *t)
{
    DIR *folder = opendir(t->folder);
    const struct dirent *entry;
    ck_assert_ptr_nonnull(folder);
    while ((entry = readdir(folder)))
        ck_assert_msg(entry->d_name[strlen(entry->d_name) - 1] != '~', "%s is left", entry->d_name);
    closedir(folder);
}

static void leave(tty *t)
{
    tty_type(t, "q");
    ck_assert_int_eq(tty_wait_end(t), 0);
    tty_end(t);
}

/* The steps of a save in their order, and what is said. */
static const struct {
    const char *call;
    int number;
    const char *part, *says, *goes_on;
} steps[] = {
    {"open", EACCES, SAVING, "its folder may not be written", "another name"},
    {"open", EROFS, SAVING, "its folder may not be written", "another name"},
    {"open", ENOSPC, SAVING, "is full", "make room"},
    {"open", EMFILE, SAVING, "Too many open files", "save again"},
    {"write", ENOSPC, SAVING, "is full", "make room"},
    {"write", EDQUOT, SAVING, "your share of it, is full", "make room"},
    {"write", EFBIG, SAVING, "is full", "make room"},
    {"write", EIO, SAVING, "Input/output error", "save again"},
    {"half", ENOSPC, SAVING, "is full", "make room"},
    {"fchmod", EPERM, SAVING, "another name", "rights"},
    {"fsync", EIO, SAVING, "Input/output error", "save again"},
    {"fsync", ENOSPC, SAVING, "is full", "make room"},
    {"close", EIO, SAVING, "Input/output error", "save again"},
    {"close", EDQUOT, SAVING, "is full", "make room"},
    {"rename", EACCES, "/plan.yaml", "another name", "rights"},
    {"rename", EIO, "/plan.yaml", "Input/output error", "save again"},
};

START_TEST(a_step_of_a_save_fails)
{
    tty t;
    begin(&t);
    char *before = tty_read(&t, "plan.yaml");
    tty_set_current(&t, "4 uA");
    wait_for_file(&t, UNSAVED);
    break_call(&t, steps[_i].call, steps[_i].number, steps[_i].part);
    tty_type(&t, "s");
    tty_wait(&t, "NOT SAVED  plan.yaml: ");
    tty_wait(&t, steps[_i].says);
    tty_wait(&t, steps[_i].goes_on);
    tty_wait_row(&t, 0, "1 unsaved");
    char *after = tty_read(&t, "plan.yaml");
    ck_assert_str_eq(before, after);
    file_has(&t, UNSAVED, "current: 4 uA\n");
    no_remains(&t);
    tty_type(&t, "<Down>");
    tty_wait_gone(&t, "NOT SAVED");
    tty_type(&t, "qs"); /* nor does it leave without having saved */
    tty_wait(&t, "NOT SAVED  plan.yaml: ");
    tty_wait_row(&t, 0, "1 unsaved");
    mend(&t);
    tty_type(&t, "s");
    tty_wait(&t, "saved in plan.yaml");
    tty_wait_row(&t, 0, " saved");
    file_has(&t, "plan.yaml", "current: 4 uA\n");
    no_remains(&t);
    ck_assert(!tty_exists(&t, UNSAVED));
    free(before);
    free(after);
    leave(&t);
}
END_TEST

/* A file system that cannot make a renaming durable is no reason to complain. */
START_TEST(the_folder_cannot_be_synced)
{
    tty t;
    begin(&t);
    tty_set_current(&t, "4 uA");
    char part[80];
    snprintf(part, sizeof part, "=%s", t.folder);
    break_call(&t, "fsync", EINVAL, part);
    tty_type(&t, "s");
    tty_wait(&t, "saved in plan.yaml");
    file_has(&t, "plan.yaml", "current: 4 uA\n");
    leave(&t);
}
END_TEST

/* Unsaved work cannot be kept: said once, tried again, said when it can be; and the plan itself can
 * be saved all the while. */
START_TEST(unsaved_work_cannot_be_kept)
{
    static const char *const calls[] = {"open", "write", "half", "fsync", "close"};
    tty t;
    begin(&t);
    break_call(&t, calls[_i], ENOSPC, KEEPING);
    tty_set_current(&t, "4 uA");
    tty_wait(&t, "unsaved work cannot be kept beside the plan (No space left on device)");
    ck_assert(!tty_exists(&t, UNSAVED));
    tty_type(&t, "<Down>");
    tty_wait_gone(&t, "cannot be kept");
    mend(&t);
    tty_wait(&t, "unsaved work can be kept beside the plan again"); /* though nothing was typed */
    file_has(&t, UNSAVED, "current: 4 uA\n");
    break_call(&t, calls[_i], ENOSPC, KEEPING);
    tty_type(&t, "<Up>");
    tty_set_current(&t, "5 uA");
    tty_wait(&t, "cannot be kept");
    file_has(&t, UNSAVED, "current: 4 uA\n"); /* what could be kept still is */
    tty_type(&t, "s");
    tty_wait(&t, "saved in plan.yaml");
    file_has(&t, "plan.yaml", "current: 5 uA\n");
    ck_assert(!tty_exists(&t, UNSAVED));
    leave(&t);
}
END_TEST

/* The program is ended: behind the screen it is said where the work is, or that it is lost. */
START_TEST(the_end_is_told)
{
    tty t;
    begin(&t);
    if (_i)
        break_call(&t, "write", ENOSPC, KEEPING);
    tty_set_current(&t, "4 uA");
    if (_i)
        tty_wait(&t, "cannot be kept");
    kill(t.child, SIGTERM);
    ck_assert_int_eq(tty_wait_end(&t), 128 + SIGTERM);
    ck_assert(tty_shows(&t, _i ? "unsaved work is LOST" : "unsaved work is kept in"));
    ck_assert_int_eq(tty_exists(&t, UNSAVED), !_i);
    tty_end(&t);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("disk");
    tcase_set_timeout(tests, tty_limit());
    tcase_add_loop_test(tests, a_step_of_a_save_fails, 0, COUNT(steps));
    tcase_add_test(tests, the_folder_cannot_be_synced);
    tcase_add_loop_test(tests, unsaved_work_cannot_be_kept, 0, 5);
    tcase_add_loop_test(tests, the_end_is_told, 0, 2);
    return run_suite("terminal/disk", tests);
}
