/* test_terminal.c - the real program in a pseudo-terminal: what a user sees, cell by cell. */
#include "../suite.h"

#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "tty.h"

static void begin(tty *t)
{
    tty_folder(t, "hydrogen-separation");
    tty_run(t, &(tty_start){.arguments = {"plan.yaml"}});
    tty_wait(t, "asked 3.28 d of 6.00 d");
}

START_TEST(start_edit_save_leave)
{
    tty t;
    begin(&t);
    tty_wait_row(&t, 0, "plan.yaml   electron 900 MeV, 2 uA on 9 cm liquid-hydrogen");
    tty_wait(&t, "low-1   60.18 0.5485  13.96  122.6  0.6737");
    tty_type(&t, "<Down><Down><Down><Down><Down><Down>4 uA");
    tty_wait(&t, "PROVISIONAL");
    tty_wait(&t, "0.6737"); /* what it was */
    tty_type(&t, "<Enter>");
    tty_wait_gone(&t, "PROVISIONAL");
    tty_wait_row(&t, 0, "1 unsaved");
    tty_type(&t, "s");
    tty_wait(&t, "saved in plan.yaml");
    char *text = tty_read(&t, "plan.yaml");
    ck_assert_ptr_nonnull(strstr(text, "  current: 4 uA\n"));
    free(text);
    tty_type(&t, "q");
    ck_assert_int_eq(tty_wait_end(&t), 0);
    tty_end(&t);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("terminal");
    tcase_set_timeout(tests, 300);
    tcase_add_test(tests, start_edit_save_leave);
    return run_suite("terminal", tests);
}
