/* test_safety.c - the user's work survives: others' changes, kills, hang-ups, a second session. */
#include "../suite.h"

#include <signal.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <time.h>
#include <unistd.h>

#include "beamhours/base/text.h"
#include "tty.h"

#define UNSAVED ".plan.yaml.unsaved"

static void run(tty *t)
{
    tty_run(t, &(tty_start){.arguments = {"plan.yaml"}});
}

static void begin(tty *t)
{
    tty_folder(t, "hydrogen-separation");
    run(t);
    tty_wait(t, "asked");
}

/* Makes beam.current another one; the focus stays on it. */
static void set_current(tty *t, const char *value)
{
    char shown[64];
    tty_type(t, value);
    tty_wait(t, "PROVISIONAL");
    tty_type(t, "<Enter>");
    snprintf(shown, sizeof shown, "> current        %s", value);
    tty_wait_gone(t, "PROVISIONAL");
    tty_wait(t, shown);
}

static void go_to_current(tty *t)
{
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

/* The program is gone, the folder stays: as another day. */
static void restart(tty *t)
{
    tty again = *t;
    close(t->master);
    vterm_free(t->vt);
    again.vt = NULL;
    again.master = -1;
    *t = again;
    run(t);
}

START_TEST(changed_on_disk)
{
    tty t;
    begin(&t);
    go_to_current(&t);
    set_current(&t, "4 uA");
    char *text = tty_read(&t, "plan.yaml");
    bh_text other = {0};
    bh_text_appendf(&other, "%s# from somewhere else\n", text);
    tty_write(&t, "plan.yaml", other.bytes);
    tty_type(&t, "s");
    tty_wait(&t, "The file changed on disk since it was read.");
    tty_type(&t, "<Escape>"); /* nothing is lost on either side */
    tty_wait_gone(&t, "The file changed");
    file_has(&t, "plan.yaml", "# from somewhere else\n");
    tty_type(&t, "s");
    tty_wait(&t, "The file changed on disk");
    tty_type(&t, "r");
    tty_wait(&t, "read again from the file; b brings yours back");
    tty_wait_row(&t, 0, "2 uA");
    tty_type(&t, "b");
    tty_wait(&t, "taken back: read again from the file");
    tty_wait_row(&t, 0, "4 uA");
    tty_wait_row(&t, 0, "1 unsaved");
    tty_type(&t, "f");
    tty_wait_row(&t, 0, "2 uA");
    tty_wait_gone(&t, "unsaved");
    go_to_current(&t);
    set_current(&t, "5 uA");
    tty_write(&t, "plan.yaml", text);
    tty_type(&t, "s");
    tty_wait(&t, "The file changed on disk");
    tty_type(&t, "o");
    tty_wait(&t, "saved in plan.yaml");
    file_has(&t, "plan.yaml", "current: 5 uA\n");
    file_has(&t, "plan.yaml", "# from somewhere else\n"); /* mine was read with it */
    tty_type(&t, "q");
    ck_assert_int_eq(tty_wait_end(&t), 0);
    bh_text_free(&other);
    free(text);
    tty_end(&t);
}
END_TEST

/* Somebody emptied the file: what was dropped for nothing comes back, with its steps. */
START_TEST(emptied)
{
    tty t;
    begin(&t);
    go_to_current(&t);
    set_current(&t, "4 uA");
    wait_for_file(&t, UNSAVED);
    tty_write(&t, "plan.yaml", "");
    tty_type(&t, "s");
    tty_wait(&t, "The file changed on disk");
    tty_type(&t, "r");
    tty_wait(&t, "the file cannot be read as a plan; b brings yours back");
    tty_type(&t, "b");
    tty_wait(&t, "what was dropped is back; s saves it");
    tty_wait_row(&t, 0, "4 uA");
    wait_for_file(&t, UNSAVED); /* and is kept again */
    tty_type(&t, "s");
    tty_wait(&t, "saved in plan.yaml");
    file_has(&t, "plan.yaml", "current: 4 uA\n");
    tty_type(&t, "b");
    tty_wait_row(&t, 0, "2 uA");
    tty_type(&t, "qw");
    ck_assert_int_eq(tty_wait_end(&t), 0);
    tty_end(&t);
}
END_TEST

START_TEST(taken_away)
{
    tty t;
    char path[256];
    begin(&t);
    go_to_current(&t);
    set_current(&t, "4 uA");
    snprintf(path, sizeof path, "%s/plan.yaml", t.folder);
    ck_assert_int_eq(unlink(path), 0);
    tty_type(&t, "s");
    tty_wait(&t, "The file is not there any more.");
    tty_type(&t, "s");
    tty_wait(&t, "saved in plan.yaml");
    file_has(&t, "plan.yaml", "current: 4 uA\n");
    tty_type(&t, "q");
    ck_assert_int_eq(tty_wait_end(&t), 0);
    tty_end(&t);
}
END_TEST

START_TEST(leaving_unsaved)
{
    tty t;
    begin(&t);
    go_to_current(&t);
    set_current(&t, "4 uA");
    wait_for_file(&t, UNSAVED);
    tty_type(&t, "q");
    tty_wait(&t, "1 change is not saved");
    tty_type(&t, "k");
    tty_wait_gone(&t, "not saved in");
    tty_type(&t, "qw");
    ck_assert_int_eq(tty_wait_end(&t), 0);
    ck_assert(!tty_exists(&t, UNSAVED)); /* it was not wanted */
    file_has(&t, "plan.yaml", "current: 2 uA");
    restart(&t);
    tty_wait(&t, "asked");
    go_to_current(&t);
    set_current(&t, "6 uA");
    tty_type(&t, "qs");
    ck_assert_int_eq(tty_wait_end(&t), 0);
    file_has(&t, "plan.yaml", "current: 6 uA\n");
    tty_end(&t);
}
END_TEST

/* Killed at some moment after a change that was written: at most what came later is lost. */
START_TEST(killed)
{
    tty t;
    begin(&t);
    go_to_current(&t);
    set_current(&t, "4 uA");
    wait_for_file(&t, UNSAVED);
    file_has(&t, UNSAVED, "current: 4 uA\n");
    set_current(&t, "7 uA");
    const long moment = (long)((unsigned)_i * 2654435761U % 1500);
    const struct timespec pause = {moment / 1000, moment % 1000 * 1000000};
    nanosleep(&pause, NULL);
    kill(t.child, SIGKILL);
    ck_assert_int_eq(tty_wait_end(&t), 128 + SIGKILL);
    char *text = tty_read(&t, "plan.yaml"); /* the file itself is whole */
    ck_assert_ptr_nonnull(strstr(text, "contingency: 10 %"));
    free(text);
    restart(&t);
    tty_wait(&t, "Unsaved work is there");
    tty_wait(&t, "1 line of it is not in the file");
    tty_type(&t, "u");
    tty_wait(&t, "the unsaved work is back");
    tty_wait_row(&t, 0, "1 unsaved");
    tty_wait_row(&t, 0, " uA on");
    ck_assert(strstr(tty_row(&t, 0), "4 uA") || strstr(tty_row(&t, 0), "7 uA"));
    tty_type(&t, "s");
    tty_wait(&t, "saved in plan.yaml");
    ck_assert(!tty_exists(&t, UNSAVED));
    tty_type(&t, "q");
    ck_assert_int_eq(tty_wait_end(&t), 0);
    tty_end(&t);
}
END_TEST

START_TEST(refused_work)
{
    tty t;
    begin(&t);
    go_to_current(&t);
    set_current(&t, "4 uA");
    wait_for_file(&t, UNSAVED);
    kill(t.child, SIGKILL);
    (void)tty_wait_end(&t);
    restart(&t);
    tty_wait(&t, "Unsaved work is there");
    tty_wait(&t, "leave both as they are, and end");
    tty_type(&t, "<Escape>");
    ck_assert_int_eq(tty_wait_end(&t), 0);
    ck_assert(tty_exists(&t, UNSAVED));
    restart(&t);
    tty_wait(&t, "Unsaved work is there");
    tty_type(&t, "f");
    tty_wait_gone(&t, "Unsaved work");
    ck_assert(!tty_exists(&t, UNSAVED));
    tty_type(&t, "q");
    ck_assert_int_eq(tty_wait_end(&t), 0);
    tty_end(&t);
}
END_TEST

/* Unsaved work is written at once, and the terminal is as it was. */
START_TEST(ended_by_signals)
{
    static const int signals[] = {SIGTERM, SIGINT, SIGHUP, SIGQUIT};
    tty t;
    begin(&t);
    go_to_current(&t);
    set_current(&t, "4 uA");
    kill(t.child, signals[_i]);
    ck_assert_int_eq(tty_wait_end(&t), 128 + signals[_i]);
    file_has(&t, UNSAVED, "current: 4 uA\n");
    ck_assert(!tty_shows(&t, "RUN TABLE")); /* the other screen is back */
    tty_end(&t);
}
END_TEST

/* A crash of the program itself. */
START_TEST(crashes)
{
    tty t;
    begin(&t);
    go_to_current(&t);
    set_current(&t, "4 uA");
    kill(t.child, SIGSEGV);
    ck_assert_int_ne(tty_wait_end(&t), 0);
    file_has(&t, UNSAVED, "current: 4 uA\n");
    ck_assert(!tty_shows(&t, "RUN TABLE"));
    tty_end(&t);
}
END_TEST

/* The window is closed. */
START_TEST(hung_up)
{
    tty t;
    begin(&t);
    go_to_current(&t);
    set_current(&t, "4 uA");
    close(t.master);
    t.master = -1;
    (void)tty_wait_end(&t);
    file_has(&t, UNSAVED, "current: 4 uA\n");
    tty_end(&t);
}
END_TEST

START_TEST(second_session)
{
    tty t, other;
    begin(&t);
    other = t;
    other.vt = NULL;
    run(&other);
    tty_wait(&other, "Someone else has this plan open");
    tty_type(&other, "<Escape>");
    ck_assert_int_eq(tty_wait_end(&other), 0);
    close(other.master);
    vterm_free(other.vt);
    tty_type(&t, "q");
    ck_assert_int_eq(tty_wait_end(&t), 0);
    restart(&t); /* nobody is left */
    tty_wait(&t, "asked");
    tty_type(&t, "q");
    ck_assert_int_eq(tty_wait_end(&t), 0);
    tty_end(&t);
}
END_TEST

/* Comments, order and spacing of all that was not edited stay. */
START_TEST(three_edits_differ_in_three_values)
{
    tty t;
    bh_text plan = {0}, wanted = {0};
    tty_folder(&t, NULL);
    for (int pass = 0; pass < 2; pass++) {
        bh_text *to = pass ? &wanted : &plan;
        for (int i = 0; i < 200; i++)
            bh_text_appendf(to, "#   comment %d  of the user's own \n", i);
        bh_text_appendf(to,
                        "plan: 1\r\nbeam:   {particle: electron,   kinetic_energy: 855 MeV, "
                        "current: %s}  # mine\r\n"
                        "target: {layers: [{material: carbon-12, thickness: \"%s\"}]}\n"
                        "arms: [{name: A, in_plane: \u00B128 mrad, out_of_plane: \u00B170 mrad}]\n"
                        "settings:\n- {name: K1,    angle: %s}   # last",
                        pass ? "30 uA" : "20 uA", pass ? "2 mm" : "1 mm",
                        pass ? "31 deg" : "30 deg");
    }
    tty_write(&t, "plan.yaml", plan.bytes);
    run(&t);
    tty_wait(&t, "K1");
    static const char *const edits[][2] = {
        {"current", "30 uA"}, {"thickness", "2 mm"}, {"angle", "31 deg"}};
    for (int i = 0; i < 3; i++) {
        char count[32];
        tty_type(&t, "<Home>l");
        tty_type(&t, edits[i][0]);
        tty_type(&t, "<Escape>");
        tty_wait_gone(&t, "look for");
        tty_type(&t, edits[i][1]);
        tty_wait(&t, "PROVISIONAL");
        tty_type(&t, "<Enter>");
        snprintf(count, sizeof count, "%d unsaved", i + 1);
        tty_wait_row(&t, 0, count);
    }
    tty_type(&t, "s");
    tty_wait(&t, "saved in plan.yaml");
    char *got = tty_read(&t, "plan.yaml");
    ck_assert_str_eq(got, wanted.bytes);
    free(got);
    bh_text_free(&plan);
    bh_text_free(&wanted);
    tty_type(&t, "q");
    ck_assert_int_eq(tty_wait_end(&t), 0);
    tty_end(&t);
}
END_TEST

/* KILLS=50 for more moments. */
static int kills(void)
{
    const char *said = getenv("KILLS");
    return said && atoi(said) > 0 ? atoi(said) : 5;
}

int main(void)
{
    TCase *tests = tcase_create("safety");
    tcase_set_timeout(tests, tty_limit());
    tcase_add_test(tests, changed_on_disk);
    tcase_add_test(tests, emptied);
    tcase_add_test(tests, taken_away);
    tcase_add_test(tests, leaving_unsaved);
    tcase_add_loop_test(tests, killed, 0, kills());
    tcase_add_test(tests, refused_work);
    tcase_add_loop_test(tests, ended_by_signals, 0, 4);
    tcase_add_test(tests, crashes);
    tcase_add_test(tests, hung_up);
    tcase_add_test(tests, second_session);
    tcase_add_test(tests, three_edits_differ_in_three_values);
    return run_suite("terminal/safety", tests);
}
