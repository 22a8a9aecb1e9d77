/* test_rights.c - the user has no right to write the plan, its folder, or anything there: what is
 * said, and that nothing is lost.  Root may write everything: then another user runs the program.
 */
#include "../suite.h"

#include <dirent.h>
#include <signal.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <sys/stat.h>
#include <unistd.h>

#include "beamhours/base/text.h"
#include "tty.h"

#define UNSAVED ".plan.yaml.unsaved"

/* Where no ordinary user reaches the program, or none may be made, or no such disk. */
static bool skipped(const char *what, bool sealed)
{
    const bool yes = !tty_binds(sealed);
    if (yes)
        printf("terminal/rights: %s: skipped, it cannot be had here\n", what);
    return yes;
}

static void set_mode(const tty *t, const char *name, mode_t mode)
{
    char path[256];
    snprintf(path, sizeof path, "%s/%s", t->folder, name);
    ck_assert_int_eq(chmod(path, mode), 0);
}

static void run(tty *t, bool sealed)
{
    tty_run(t, &(tty_start){.ordinary = true, .sealed = sealed, .arguments = {"plan.yaml"}});
    tty_wait(t, "asked");
    tty_type(t, "<Home>lcurrent<Escape>");
    tty_wait(t, "> current");
    tty_wait_gone(t, "look for");
}

/* The plan with another current, and all the rest of it byte for byte; to be freed. */
static char *with_current(const char *plan, const char *current)
{
    static const char was[] = "  current: 2 uA\n";
    const char *at = strstr(plan, was);
    bh_text text = {0};
    ck_assert_ptr_nonnull(at);
    bh_text_appendf(&text, "%.*s  current: %s\n%s", (int)(at - plan), plan, current,
                    at + sizeof was - 1);
    return bh_text_take(&text);
}

static void is_in(const tty *t, const char *name, const char *wanted)
{
    char *all = tty_read(t, name);
    ck_assert_str_eq(all, wanted);
    free(all);
}

/* What is kept ends in a line of its own. */
static void is_kept(tty *t, const char *wanted)
{
    tty_until(t, tty_exists(t, UNSAVED));
    char *all = tty_read(t, UNSAVED);
    ck_assert_msg(strncmp(all, wanted, strlen(wanted)) == 0, "%s", all);
    free(all);
}

/* Files there, of any name. */
static int files(const tty *t)
{
    int count = 0;
    DIR *folder = opendir(t->folder);
    const struct dirent *entry;
    ck_assert_ptr_nonnull(folder);
    while ((entry = readdir(folder)))
        count += strcmp(entry->d_name, ".") != 0 && strcmp(entry->d_name, "..") != 0;
    closedir(folder);
    return count;
}

/* An s does nothing but say why, and so does one on the way out. */
static void refuses(tty *t, const char *plan, const char *why)
{
    tty_type(t, "s");
    tty_wait(t, "NOT SAVED  plan.yaml: ");
    tty_wait(t, why);
    tty_wait(t, "another name");
    tty_type(t, "<Down>");
    tty_wait_gone(t, "NOT SAVED");
    tty_type(t, "<Up>qs");
    tty_wait(t, "NOT SAVED  plan.yaml: ");
    tty_wait_row(t, 0, "1 unsaved");
    is_in(t, "plan.yaml", plan);
}

static void save_as(tty *t, const char *path)
{
    tty_type(t, "n");
    tty_wait(t, "save as");
    for (int i = 0; i < 9; i++)
        tty_type(t, "<Rubout>");
    tty_type(t, path);
    tty_type(t, "<Enter>");
    tty_wait(t, "saved in ");
    tty_wait_row(t, 0, " saved");
}

static void leave(tty *t)
{
    tty_type(t, "q");
    ck_assert_int_eq(tty_wait_end(t), 0);
}

/* Renaming would not ask for the right to write the file that it replaces: the program does. */
START_TEST(a_plan_only_to_be_read)
{
    tty t;
    struct stat file;
    char path[256];
    if (skipped("a plan only to be read", false))
        return;
    tty_folder(&t, "hydrogen-separation");
    set_mode(&t, "plan.yaml", 0444);
    run(&t, false);
    char *plan = tty_read(&t, "plan.yaml"), *wanted = with_current(plan, "4 uA");
    tty_set_current(&t, "4 uA");
    is_kept(&t, wanted);
    refuses(&t, plan, "it may not be written");
    is_kept(&t, wanted);
    if (_i) { /* rights are given back, or it goes elsewhere */
        set_mode(&t, "plan.yaml", 0640);
        tty_type(&t, "s");
        tty_wait(&t, "saved in plan.yaml");
    } else {
        save_as(&t, "my-plan.yaml");
        is_in(&t, "plan.yaml", plan);
    }
    is_in(&t, _i ? "plan.yaml" : "my-plan.yaml", wanted);
    ck_assert(!tty_exists(&t, UNSAVED));
    leave(&t);
    ck_assert_int_eq(files(&t), _i ? 1 : 2);
    snprintf(path, sizeof path, "%s/plan.yaml", t.folder);
    ck_assert_int_eq(stat(path, &file), 0);
    ck_assert_uint_eq(file.st_mode & 0777, _i ? 0640 : 0444);
    free(plan);
    free(wanted);
    tty_end(&t);
}
END_TEST

/* Neither the plan nor unsaved work can be written there: both are told, and go elsewhere. */
static void goes_elsewhere(bool sealed, const char *why)
{
    tty t, other;
    char path[256];
    tty_folder(&t, "hydrogen-separation");
    tty_folder(&other, NULL);
    ck_assert_int_eq(chmod(other.folder, 0777), 0);
    snprintf(path, sizeof path, "%s/plan.yaml", other.folder);
    if (!sealed)
        set_mode(&t, ".", 0555);
    run(&t, sealed);
    char *plan = tty_read(&t, "plan.yaml"), *wanted = with_current(plan, "4 uA");
    char *further = with_current(plan, "5 uA");
    tty_set_current(&t, "4 uA");
    tty_wait(&t, "unsaved work cannot be kept beside the plan");
    tty_wait(&t, why);
    refuses(&t, plan, "may not be written");
    save_as(&t, path);
    is_in(&other, "plan.yaml", wanted);
    tty_set_current(&t, "5 uA");
    is_kept(&other, further);
    tty_type(&t, "s");
    tty_wait_row(&t, 0, " saved");
    is_in(&other, "plan.yaml", further);
    leave(&t);
    is_in(&t, "plan.yaml", plan);
    ck_assert_int_eq(files(&t), 1);
    ck_assert_int_eq(files(&other), 1);
    free(plan);
    free(wanted);
    free(further);
    tty_end(&t);
    tty_end(&other);
}

START_TEST(a_folder_only_to_be_read)
{
    if (skipped("a folder only to be read", false))
        return;
    goes_elsewhere(false, "Permission denied");
}
END_TEST

START_TEST(a_disk_only_to_be_read)
{
    if (skipped("a disk only to be read", true))
        return;
    goes_elsewhere(true, "Read-only file system");
}
END_TEST

/* Rights are taken while work is under way, and given back. */
START_TEST(rights_come_and_go)
{
    tty t;
    if (skipped("rights come and go", false))
        return;
    tty_folder(&t, "hydrogen-separation");
    run(&t, false);
    char *plan = tty_read(&t, "plan.yaml"), *first = with_current(plan, "4 uA");
    char *second = with_current(plan, "5 uA");
    tty_set_current(&t, "4 uA");
    is_kept(&t, first);
    set_mode(&t, ".", 0555);
    tty_set_current(&t, "5 uA");
    tty_wait(&t, "unsaved work cannot be kept beside the plan");
    is_kept(&t, first); /* what could be kept still is */
    tty_type(&t, "s");
    tty_wait(&t, "NOT SAVED  plan.yaml: its folder may not be written");
    is_in(&t, "plan.yaml", plan);
    set_mode(&t, ".", 0755);
    tty_type(&t, "<Down>");
    tty_wait(&t, "unsaved work can be kept beside the plan again");
    is_kept(&t, second);
    tty_type(&t, "s");
    tty_wait(&t, "saved in plan.yaml");
    is_in(&t, "plan.yaml", second);
    leave(&t);
    ck_assert_int_eq(files(&t), 1);
    free(plan);
    free(first);
    free(second);
    tty_end(&t);
}
END_TEST

/* Ended where nothing can be kept: that is said behind the screen. */
START_TEST(the_end_is_told)
{
    tty t;
    if (skipped("the end is told", false))
        return;
    tty_folder(&t, "hydrogen-separation");
    set_mode(&t, ".", 0555);
    run(&t, false);
    char *plan = tty_read(&t, "plan.yaml");
    tty_set_current(&t, "4 uA");
    tty_wait(&t, "unsaved work cannot be kept");
    kill(t.child, SIGTERM);
    ck_assert_int_eq(tty_wait_end(&t), 128 + SIGTERM);
    ck_assert(tty_shows(&t, "unsaved work is LOST"));
    ck_assert(tty_shows(&t, "Permission denied"));
    is_in(&t, "plan.yaml", plan);
    free(plan);
    tty_end(&t);
}
END_TEST

START_TEST(a_plan_not_to_be_read)
{
    tty t;
    if (skipped("a plan not to be read", false))
        return;
    tty_folder(&t, "hydrogen-separation");
    set_mode(&t, "plan.yaml", 0);
    tty_run(&t, &(tty_start){.ordinary = true, .arguments = {"plan.yaml"}});
    ck_assert_int_eq(tty_wait_end(&t), 66);
    ck_assert(tty_shows(&t, "plan.yaml: cannot be opened: Permission denied"));
    ck_assert_int_eq(files(&t), 1);
    tty_end(&t);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("rights");
    tcase_set_timeout(tests, tty_limit());
    tcase_add_loop_test(tests, a_plan_only_to_be_read, 0, 2);
    tcase_add_test(tests, a_folder_only_to_be_read);
    tcase_add_test(tests, a_disk_only_to_be_read);
    tcase_add_test(tests, rights_come_and_go);
    tcase_add_test(tests, the_end_is_told);
    tcase_add_test(tests, a_plan_not_to_be_read);
    return run_suite("terminal/rights", tests);
}
