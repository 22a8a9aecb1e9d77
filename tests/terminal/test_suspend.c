/* test_suspend.c - out of the way and back again, below a real shell: the terminal is given back as
 * it was, the screen comes back in the right size, and nothing is lost. */
#include "../suite.h"

#include <signal.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <unistd.h>

#include "tty.h"

#define UNSAVED ".plan.yaml.unsaved"

/* Waits until the terminal is as the screen needs it, or as a shell does. */
static void wait_modes(tty *t, bool screen)
{
    tty_until(t, t->other == screen);
    tty_until(t, t->mice == screen);
    tty_until(t, tty_cooked(t) != screen);
}

/* The shell says which process the program is before it becomes it. */
static pid_t begin(tty *t)
{
    long process = 0;
    tty_folder(t, "hydrogen-separation");
    tty_write(t, "begin", "echo $$ >process\nexec $TTY_UNDER \"$PROGRAM\" edit plan.yaml\n");
    tty_run(t, &(tty_start){.shell = true});
    tty_wait(t, "ready>");
    tty_type(t, "sh begin\r");
    tty_wait(t, "asked");
    tty_wait_gone(t, "computing");
    wait_modes(t, true);
    char *text = tty_read(t, "process");
    ck_assert_int_eq(sscanf(text, "%ld", &process), 1);
    free(text);
    return (pid_t)process;
}

static void go_to_current(tty *t)
{
    tty_type(t, "<Home>lcurrent<Escape>");
    tty_wait(t, "> current");
    tty_wait_gone(t, "look for");
}

/* The prompt is back, below what was there before. */
static void wait_for_shell(tty *t)
{
    tty_wait_gone(t, "RUN TABLE");
    tty_wait(t, "ready>");
    wait_modes(t, false);
}

static void wait_for_screen(tty *t)
{
    tty_wait(t, "RUN TABLE");
    tty_wait(t, "? help");
    wait_modes(t, true);
}

/* Leaves the program, and then the shell. */
static void leave(tty *t)
{
    tty_type(t, "q");
    wait_for_shell(t);
    tty_type(t, "exit\r");
    (void)tty_wait_end(t);
    tty_end(t);
}

/* By the key, and by a signal from elsewhere. */
START_TEST(gives_the_terminal_back)
{
    tty t;
    const pid_t process = begin(&t);
    for (int i = 0; i < 3; i++) {
        if (_i == 0)
            tty_type(&t, "<Suspend>");
        else
            ck_assert_int_eq(kill(process, SIGTSTP), 0);
        wait_for_shell(&t);
        tty_type(&t, "echo is-\"here\"\r");
        tty_wait(&t, "is-here");
        tty_type(&t, "fg\r");
        wait_for_screen(&t);
    }
    tty_type(&t, "<Click 8,20>"); /* keys and mouse are at work again */
    tty_wait(&t, "> current");
    tty_type(&t, "3 uA");
    tty_wait(&t, "PROVISIONAL");
    tty_type(&t, "<Escape>");
    tty_wait_gone(&t, "PROVISIONAL");
    leave(&t);
}
END_TEST

/* What is being typed is still there, what was changed is beside the plan; the window became
 * another one. */
START_TEST(keeps_what_is_typed)
{
    tty t;
    (void)begin(&t);
    go_to_current(&t);
    tty_type(&t, "4 uA<Enter><Suspend>");
    wait_for_shell(&t);
    char *kept = tty_read(&t, UNSAVED);
    ck_assert_ptr_nonnull(strstr(kept, "current: 4 uA\n"));
    free(kept);
    tty_type(&t, "fg\r");
    wait_for_screen(&t);
    tty_wait_row(&t, 0, "1 unsaved");
    tty_type(&t, "5 u<Suspend>");
    wait_for_shell(&t);
    tty_size(&t, 40, 120);
    tty_type(&t, "fg\r");
    tty_wait_row(&t, 39, "Enter keep");
    tty_type(&t, "A<Enter>");
    tty_wait_row(&t, 0, "2 unsaved");
    tty_type(&t, "s");
    tty_wait(&t, "saved in plan.yaml");
    char *text = tty_read(&t, "plan.yaml");
    ck_assert_ptr_nonnull(strstr(text, "current: 5 uA\n"));
    free(text);
    leave(&t);
}
END_TEST

/* Stopped without a chance to put anything back; others used the terminal meanwhile. */
START_TEST(survives_a_stop_without_warning)
{
    tty t;
    const pid_t process = begin(&t);
    go_to_current(&t);
    tty_type(&t, "4 uA<Enter>");
    tty_wait_row(&t, 0, "1 unsaved");
    ck_assert_int_eq(kill(process, SIGSTOP), 0);
    tty_wait(&t, "ready>");
    tty_type(&t, "printf '\\033[?1049l\\033[?1000l\\033[2Jwiped\\n'\n"); /* a raw terminal */
    tty_wait(&t, "wiped");
    tty_size(&t, 30, 100);
    ck_assert_int_eq(kill(process, SIGCONT), 0); /* in the background: it waits to be called */
    tty_type(&t, "echo still-\"here\"\n");
    tty_wait(&t, "still-here");
    ck_assert(!t.other && !tty_shows(&t, "RUN TABLE"));
    tty_type(&t, "fg\n");
    wait_for_screen(&t);
    tty_wait_row(&t, 29, "? help");
    tty_wait_row(&t, 0, "1 unsaved");
    tty_type(&t, "b");
    tty_wait_row(&t, 0, "saved");
    leave(&t);
}
END_TEST

/* What is typed while it is in the background is the shell's, also what comes before the shell has
 * time for it: a program that reads it waits for the next key, and shows nothing.  It is stopped
 * amid keys that mean nothing to it, and are a comment to the shell. */
START_TEST(leaves_to_the_shell_what_is_typed_there)
{
    tty t;
    const pid_t process = begin(&t);
    char keys[2001];
    memset(keys, '#', sizeof keys - 1);
    keys[sizeof keys - 1] = '\0';
    for (int i = 0; i < 3; i++) {
        tty_send(&t, keys);
        ck_assert_int_eq(kill(process, SIGSTOP), 0);
        tty_wait(&t, "ready>");
        tty_type(&t, "\nprintf '\\033[?1049l\\033[?1000l\\033[2Jwiped\\n'\n");
        tty_wait(&t, "wiped");
        tty_type(&t, "sleep 0.3; kill -CONT %1; sleep 0.3\necho still-\"here\"\n");
        tty_wait(&t, "still-here");
        ck_assert(!t.other && !tty_shows(&t, "RUN TABLE"));
        tty_type(&t, "fg\n");
        wait_for_screen(&t);
    }
    leave(&t);
}
END_TEST

/* The file was changed in the shell: that is asked about at once. */
START_TEST(looks_at_the_file_again)
{
    tty t;
    (void)begin(&t);
    tty_type(&t, "<Suspend>");
    wait_for_shell(&t);
    tty_type(&t, "echo '# mine' >>plan.yaml\rfg\r");
    tty_wait(&t, "The file changed on disk since it was read.");
    tty_type(&t, "r");
    tty_wait(&t, "read again from the file");
    leave(&t);
}
END_TEST

/* The program stops while it is out of the way, by a signal that ends it: its work is kept. */
START_TEST(ends_while_it_is_stopped)
{
    tty t;
    const pid_t process = begin(&t);
    go_to_current(&t);
    tty_type(&t, "4 uA<Enter>");
    tty_wait_row(&t, 0, "1 unsaved");
    tty_type(&t, "<Suspend>");
    wait_for_shell(&t);
    ck_assert_int_eq(kill(process, _i ? SIGKILL : SIGTERM), 0);
    tty_type(&t, "fg; echo is-\"here\"\r");
    tty_wait(&t, "is-here");
    wait_modes(&t, false);
    char *kept = tty_read(&t, UNSAVED);
    ck_assert_ptr_nonnull(strstr(kept, "current: 4 uA\n"));
    free(kept);
    tty_type(&t, "exit\r");
    (void)tty_wait_end(&t);
    tty_end(&t);
}
END_TEST

/* Nobody could ever resume it. */
START_TEST(stays_without_a_shell)
{
    tty t;
    tty_folder(&t, "hydrogen-separation");
    tty_run(&t, &(tty_start){.arguments = {"plan.yaml"}});
    tty_wait(&t, "asked");
    tty_type(&t, "<Suspend>");
    tty_wait(&t, "no shell runs it");
    wait_for_screen(&t);
    tty_type(&t, "q");
    ck_assert_int_eq(tty_wait_end(&t), 0);
    tty_end(&t);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("suspend");
    tcase_set_timeout(tests, tty_limit());
    tcase_add_loop_test(tests, gives_the_terminal_back, 0, 2);
    tcase_add_test(tests, keeps_what_is_typed);
    tcase_add_test(tests, survives_a_stop_without_warning);
    tcase_add_test(tests, leaves_to_the_shell_what_is_typed_there);
    tcase_add_test(tests, looks_at_the_file_again);
    tcase_add_loop_test(tests, ends_while_it_is_stopped, 0, 2);
    tcase_add_test(tests, stays_without_a_shell);
    return run_suite("terminal/suspend", tests);
}
