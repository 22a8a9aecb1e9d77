/* test_term.c - what TERM says of a terminal: it shows the screen, or is refused in a sentence. */
#include "../suite.h"

#include <stdio.h>
#include <stdlib.h>
#include <sysexits.h>

#include "tty.h"

static bool reversed(const tty *t, const char *text)
{
    const int row = tty_find_row(t, text);
    for (int c = 0; row >= 0 && c < t->columns; c++)
        if (tty_cell(t, row, c).attrs.reverse)
            return true;
    return false;
}

/* Those that can do it, and those that cannot: the vt52 sets nothing off. */
static const struct {
    const char *name, *says; /* NULL: the screen is there */
} terminals[] = {{"xterm", NULL},          {"screen", NULL},
                 {"tmux", NULL},           {"linux", NULL},
                 {"vt100", NULL},          {"vt220", NULL},
                 {"ansi", NULL},           {"vt52", "TERM is vt52"},
                 {"dumb", "TERM is dumb"}, {"no-such-name", "TERM is no-such-name"},
                 {"", "TERM is not set"},  {NULL, "TERM is not set"}};

START_TEST(any_terminal)
{
    tty t;
    const char *name = terminals[_i].name, *says = terminals[_i].says;
    char command[64];
    snprintf(command, sizeof command, "infocmp %s >/dev/null 2>&1", name ? name : "");
    if (!says && system(command) != 0) {
        printf("terminal: %s: skipped, nothing is known of it here\n", name);
        return;
    }
    tty_folder(&t, "hydrogen-separation");
    tty_run(&t, &(tty_start){.term = name,
                             /* without the library for the mouse of a console, which leaks */
                             .environment = name ? "NCURSES_GPM_TERMS=none" : "TERM",
                             .columns = 160,
                             .arguments = {"plan.yaml"}});
    if (says) {
        ck_assert_int_eq(tty_wait_end(&t), EX_UNAVAILABLE);
        ck_assert(tty_shows(&t, "needs a terminal that can place its cursor"));
        ck_assert(tty_shows(&t, says) && tty_shows(&t, "`beamhours table` works without"));
        tty_end(&t);
        return;
    }
    tty_wait(&t, "asked");
    tty_until(&t, reversed(&t, ">plan"));
    tty_wait_row(&t, 23, "? help");
    tty_type(&t, "q");
    ck_assert_int_eq(tty_wait_end(&t), 0);
    tty_end(&t);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("term");
    tcase_set_timeout(tests, tty_limit());
    tcase_add_loop_test(tests, any_terminal, 0, COUNT(terminals));
    return run_suite("terminal/term", tests);
}
