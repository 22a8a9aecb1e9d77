/* tty.h - the real program in a pseudo-terminal, its screen read cell by cell.  It is started by
 * the words of TTY_UNDER, where that is set; PATIENCE: how long it may take to show something [s].
 */
#ifndef TESTS_TERMINAL_TTY_H
#define TESTS_TERMINAL_TTY_H

#include <check.h>
#include <stdbool.h>
#include <stddef.h>
#include <sys/types.h>
#include <vterm.h>

typedef struct {
    int master; /* -1: closed */
    pid_t child;
    VTerm *vt;
    VTermScreen *screen;
    int rows, columns;
    size_t received; /* [bytes] from the program, since the test last set it to 0 */
    bool ended;
    int status;       /* as waitpid has it, once it ended */
    bool other, mice; /* it has the other screen; it wants mouse events */
    char last[6];     /* bytes that came last */
    char folder[64];  /* where it runs: a new one, removed with the test */
} tty;

/* How to start it; NULL and 0 for what is usual: 80x24, xterm-256color, C.UTF-8. */
typedef struct {
    const char *term, *locale, *environment; /* one more NAME=VALUE */
    const char *further[3];                  /* and more of them */
    int rows, columns;
    const char *arguments[6]; /* behind `edit` */
    bool ordinary; /* by a user whom rights bind: another one where the tests are run by root */
    bool sealed;   /* its folder lies on a file system that may only be read, for root's tests */
    bool shell;    /* a shell with job control instead: its prompt is "ready> ", and
                      "$PROGRAM" is the program */
} tty_start;

/* A new folder with a copy of a plan of plans/, called plan.yaml (NULL: none). */
void tty_folder(tty *t, const char *demo);
/* Writes a file there; reads one, to be freed. */
void tty_write(const tty *t, const char *name, const char *text);
char *tty_read(const tty *t, const char *name);
bool tty_exists(const tty *t, const char *name);

/* Whether a test may start it as an ordinary user, and below a sealed folder. */
bool tty_binds(bool sealed);

void tty_run(tty *t, const tty_start *how);
/* Kills what still runs and takes the folder away. */
void tty_end(tty *t);

/* Types a script: <Enter>, <Down>, <Click 3,40>...; << is a < itself. */
void tty_type(tty *t, const char *script);
/* Sends bytes at once, as a terminal does what belongs together: apart they are keys of their own.
 */
void tty_send(tty *t, const char *bytes);
/* Pastes, as a terminal does that was asked to mark it. */
void tty_paste(tty *t, const char *text);
void tty_size(tty *t, int rows, int columns);

/* Waits until the screen has (not) `text` in it, in any row or in one; fails the test after a long
 * time, with the screen as it is. */
void tty_wait(tty *t, const char *text);
void tty_wait_row(tty *t, int row, const char *text);
void tty_wait_gone(tty *t, const char *text);
/* Takes in what comes until the condition holds; fails as the waits above do. */
#define tty_until(t, condition)               \
    do {                                      \
        double since_ = -1;                   \
        while (!(condition))                  \
            tty_more(t, &since_, #condition); \
    } while (0)
/* A step of it; `since` is -1 at first [s]. */
void tty_more(tty *t, double *since, const char *what);
/* How long one test may take: many waits [s]. */
double tty_limit(void);
/* Whether the terminal hands on whole lines and shows what is typed, as a shell leaves it. */
bool tty_cooked(const tty *t);

/* With the current of the plan in focus: another value, kept, and seen to be unsaved. */
void tty_set_current(tty *t, const char *value);

/* Waits until the program ended, and returns its exit status, or 128 + signal. */
int tty_wait_end(tty *t);

/* Takes in what the program sent within `milliseconds`; whether it was something. */
bool tty_pump(tty *t, int milliseconds);

/* One row as text, or the whole screen; static room, good until the next call. */
const char *tty_row(const tty *t, int row);
bool tty_shows(const tty *t, const char *text);
int tty_find_row(const tty *t, const char *text); /* -1: nowhere */
VTermScreenCell tty_cell(const tty *t, int row, int column);

#endif
