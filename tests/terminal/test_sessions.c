/* test_sessions.c - several sessions have one plan open: each keeps its own unsaved work. */
#include "../suite.h"

#include <signal.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <unistd.h>

#include "tty.h"

#define FIRST  ".plan.yaml.unsaved"
#define SECOND ".plan.yaml.unsaved-2"
#define OTHERS "Someone else has this plan open"

static void run(tty *t)
{
    tty_run(t, &(tty_start){.arguments = {"plan.yaml"}});
}

/* Another session in the same folder. */
static void run_beside(tty *t, const tty *first)
{
    *t = *first;
    t->vt = NULL;
    run(t);
}

/* The same after it ended. */
static void close_session(tty *t)
{
    close(t->master);
    vterm_free(t->vt);
    t->vt = NULL;
    t->master = -1;
}

static bool holds(const tty *t, const char *name, const char *text)
{
    char *all = tty_exists(t, name) ? tty_read(t, name) : NULL;
    const bool yes = all && strstr(all, text);
    free(all);
    return yes;
}

static void file_has(const tty *t, const char *name, const char *text)
{
    char *all = tty_read(t, name);
    ck_assert_msg(strstr(all, text) != NULL, "no \"%s\" in %s:\n%s", text, name, all);
    free(all);
}

/* Makes beam.current another one, and waits until it is kept in `name`. */
static void set_current(tty *t, const char *value, const char *name)
{
    char shown[64];
    tty_type(t, "<Home>lcurrent<Escape>");
    tty_wait(t, "> current");
    tty_wait_gone(t, "look for");
    tty_type(t, value);
    tty_wait(t, "PROVISIONAL");
    tty_type(t, "<Enter>");
    snprintf(shown, sizeof shown, "> current        %s", value);
    tty_wait_gone(t, "PROVISIONAL");
    tty_wait(t, shown);
    snprintf(shown, sizeof shown, "current: %s\n", value);
    tty_until(t, holds(t, name, shown));
}

static void killed(tty *t)
{
    kill(t->child, SIGKILL);
    ck_assert_int_eq(tty_wait_end(t), 128 + SIGKILL);
    close_session(t);
}

/* Two with unsaved work each, the second having gone on all the same. */
static void begin_two(tty *first, tty *second)
{
    tty_folder(first, "hydrogen-separation");
    run(first);
    tty_wait(first, "asked");
    set_current(first, "4 uA", FIRST);
    run_beside(second, first);
    tty_wait(second, OTHERS);
    tty_type(second, "g");
    tty_wait_gone(second, OTHERS);
    tty_wait(second, "asked"); /* and is not offered what the first is at */
    ck_assert(!tty_shows(second, "Unsaved work"));
    set_current(second, "6 uA", SECOND);
    file_has(first, FIRST, "current: 4 uA\n");
}

START_TEST(one_of_two_is_killed)
{
    tty pair[2], next;
    static const char *const names[] = {FIRST, SECOND}, *const values[] = {"4 uA", "6 uA"};
    begin_two(&pair[0], &pair[1]);
    tty *dead = &pair[_i], *alive = &pair[1 - _i];
    killed(dead);
    run_beside(&next, alive);
    tty_wait(&next, OTHERS); /* whichever of the two it is */
    tty_type(&next, "g");
    tty_wait(&next, "Unsaved work is there");
    tty_type(&next, "u");
    tty_wait(&next, "the unsaved work is back; s saves it");
    ck_assert(!tty_shows(&next, "more is offered"));
    tty_wait_row(&next, 0, values[_i]);
    file_has(&next, names[1 - _i], values[1 - _i]); /* untouched */
    tty_type(&next, "s");
    tty_wait(&next, "saved in plan.yaml");
    ck_assert(!tty_exists(&next, names[_i]));
    file_has(&next, names[1 - _i], values[1 - _i]);
    tty_type(&next, "q");
    ck_assert_int_eq(tty_wait_end(&next), 0);
    close_session(&next);
    tty_type(alive, "q");
    tty_wait(alive, "The file changed on disk");
    tty_type(alive, "kqw");
    ck_assert_int_eq(tty_wait_end(alive), 0);
    ck_assert(!tty_exists(alive, FIRST) && !tty_exists(alive, SECOND));
    ck_assert(!tty_exists(alive, ".plan.yaml.open-3"));
    tty_end(alive);
}
END_TEST

/* What both left is offered one after the other, the newer first. */
START_TEST(both_are_killed)
{
    tty first, second, next;
    begin_two(&first, &second);
    killed(&second);
    next = first;
    killed(&first);
    next.vt = NULL;
    run(&next);
    tty_wait(&next, SECOND);
    tty_type(&next, _i ? "f" : "u");
    if (_i) {
        tty_wait(&next, "Kept in");
        tty_wait_gone(&next, SECOND);
        ck_assert(!tty_exists(&next, SECOND));
        tty_type(&next, "u");
        tty_wait(&next, "s saves it");
        tty_wait_row(&next, 0, "4 uA");
    } else {
        tty_wait(&next, "s saves it; more is offered at the next start");
        tty_wait_row(&next, 0, "6 uA");
        set_current(&next, "7 uA", SECOND);
    }
    file_has(&next, FIRST, "current: 4 uA\n");
    killed(&next);
    run(&next);
    tty_wait(&next, _i ? FIRST : SECOND);
    tty_type(&next, "f");
    if (!_i) {
        tty_wait_gone(&next, SECOND);
        tty_wait(&next, "Kept in");
        tty_type(&next, "f");
    }
    tty_wait_gone(&next, "Kept in");
    ck_assert(!tty_exists(&next, FIRST) && !tty_exists(&next, SECOND));
    tty_type(&next, "q");
    ck_assert_int_eq(tty_wait_end(&next), 0);
    ck_assert(!tty_exists(&next, ".plan.yaml.open"));
    tty_end(&next);
}
END_TEST

/* Whether it still runs cannot be known here: it is left alone until its mark is taken away. */
START_TEST(on_another_machine)
{
    tty t;
    char mark[128];
    tty_folder(&t, "hydrogen-separation");
    tty_write(&t, FIRST, "plan: 1\n");
    tty_write(&t, ".plan.yaml.open", "17 1700000000 another-host\n");
    run(&t);
    tty_wait(&t, OTHERS ": on another-host.");
    tty_wait(&t, "If it failed: remove the hidden file ending in .open beside the plan.");
    tty_type(&t, "g");
    tty_wait(&t, "asked");
    ck_assert(!tty_shows(&t, "Unsaved work"));
    set_current(&t, "4 uA", SECOND);
    tty_type(&t, "qw");
    ck_assert_int_eq(tty_wait_end(&t), 0);
    close_session(&t);
    file_has(&t, FIRST, "plan: 1\n");
    file_has(&t, ".plan.yaml.open", "another-host");
    ck_assert(!tty_exists(&t, SECOND) && !tty_exists(&t, ".plan.yaml.open-2"));
    snprintf(mark, sizeof mark, "%s/.plan.yaml.open", t.folder);
    ck_assert_int_eq(unlink(mark), 0);
    run(&t);
    tty_wait(&t, "Unsaved work is there");
    tty_type(&t, "<Escape>");
    ck_assert_int_eq(tty_wait_end(&t), 0);
    file_has(&t, FIRST, "plan: 1\n");
    tty_end(&t);
}
END_TEST

/* A signal while it is asked about the other leaves the other's mark. */
START_TEST(ended_at_the_question)
{
    tty first, second;
    tty_folder(&first, "hydrogen-separation");
    run(&first);
    tty_wait(&first, "asked");
    run_beside(&second, &first);
    tty_wait(&second, OTHERS);
    kill(second.child, _i ? SIGSEGV : SIGTERM);
    ck_assert_int_ne(tty_wait_end(&second), 0);
    close_session(&second);
    ck_assert(tty_exists(&first, ".plan.yaml.open"));
    tty_type(&first, "q");
    ck_assert_int_eq(tty_wait_end(&first), 0);
    tty_end(&first);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("sessions");
    tcase_set_timeout(tests, tty_limit());
    tcase_add_loop_test(tests, one_of_two_is_killed, 0, 2);
    tcase_add_loop_test(tests, both_are_killed, 0, 2);
    tcase_add_test(tests, on_another_machine);
    tcase_add_loop_test(tests, ended_at_the_question, 0, 2);
    return run_suite("terminal/sessions", tests);
}
