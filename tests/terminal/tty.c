/* tty.c - forkpty and libvterm; waits for what is to be seen, never for a time. */
#define _GNU_SOURCE 1
#include "tty.h"

#include <errno.h>
#include <fcntl.h>
#include <grp.h>
#include <poll.h>
#include <pty.h>
#include <sched.h>
#include <signal.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <sys/ioctl.h>
#include <sys/mount.h>
#include <sys/stat.h>
#include <sys/wait.h>
#include <termios.h>
#include <time.h>
#include <unistd.h>

#include "beamhours/base/text.h"

/* [s] other programs may want the processors; PATIENCE=5 where none do. */
static double patience(void)
{
    const char *said = getenv("PATIENCE");
    return said && atof(said) > 0 ? atof(said) : 60;
}

static double now(void)
{
    struct timespec t;
    clock_gettime(CLOCK_MONOTONIC, &t);
    return (double)t.tv_sec + 1e-9 * (double)t.tv_nsec;
}

/* --- the user --- */

enum { NOBODY = 65534 };

/* Of no rights but those of everybody. */
static bool become_ordinary(void)
{
    return geteuid() != 0 ||
           (setgroups(0, NULL) == 0 && setgid(NOBODY) == 0 && setuid(NOBODY) == 0);
}

/* For this process alone the folder is one that may only be read. */
static bool seal(const char *folder)
{
    const unsigned long again = MS_REMOUNT | MS_BIND | MS_RDONLY;
    return unshare(CLONE_NEWNS) == 0 && mount(NULL, "/", NULL, MS_REC | MS_PRIVATE, NULL) == 0 &&
           mount(folder, folder, NULL, MS_BIND, NULL) == 0 &&
           mount(NULL, folder, NULL, again, NULL) == 0;
}

static void find_program(char out[1200]);

bool tty_binds(bool sealed)
{
    char program[1200];
    int status = -1;
    find_program(program);
    const pid_t child = fork();
    if (child == 0)
        _exit((!sealed || (geteuid() == 0 && seal("/tmp"))) && become_ordinary() &&
                      access(program, R_OK | X_OK) == 0
                  ? 0
                  : 1);
    ck_assert_int_eq(waitpid(child, &status, 0), child);
    return status == 0;
}

/* Its folder is theirs. */
static void give(const tty *t)
{
    char command[200];
    if (geteuid() != 0)
        return;
    snprintf(command, sizeof command, "chown -R %d:%d %s", NOBODY, NOBODY, t->folder);
    ck_assert_int_eq(system(command), 0);
}

/* --- the program --- */

/* build/ of build/tests/terminal/test_x, and the folder it was called from. */
static void find_program(char out[1200])
{
    const ssize_t n = readlink("/proc/self/exe", out, 1100);
    ck_assert_int_gt(n, 0);
    out[n] = '\0';
    for (int up = 0; up < 3; up++)
        *strrchr(out, '/') = '\0';
    strcat(out, "/beamhours");
}

static void become(const tty *t, const tty_start *how)
{
    enum { MOST = 32 };
    char program[1200], *arguments[MOST] = {NULL};
    int n = 0;
    find_program(program);
    const char *under = getenv("TTY_UNDER");
    char *words = strdup(under ? under : ""), *rest = NULL;
    for (char *w = strtok_r(words, " ", &rest); w && n < MOST - 9; w = strtok_r(NULL, " ", &rest))
        arguments[n++] = w;
    arguments[n++] = program;
    arguments[n++] = (char[]){"edit"};
    for (int i = 0; i < 6 && how->arguments[i]; i++)
        arguments[n++] = strdup(how->arguments[i]);
    setenv("TERM", how->term ? how->term : "xterm-256color", 1);
    setenv("LC_ALL", how->locale ? how->locale : "C.UTF-8", 1);
    unsetenv("NO_COLOR");
    unsetenv("COLUMNS");
    unsetenv("LINES");
    char *own = how->environment ? strdup(how->environment) : NULL;
    if (own)
        putenv(own);
    for (int i = 0; i < 3 && how->further[i]; i++)
        putenv(strdup(how->further[i]));
    if ((how->sealed && !seal(t->folder)) || (how->ordinary && !become_ordinary()) ||
        chdir(t->folder) != 0)
        _exit(126);
    if (how->shell) {
        setenv("PROGRAM", program, 1);
        setenv("PS1", "ready> ", 1);
        unsetenv("ENV");
        execl("/bin/sh", "sh", "-i", (char *)NULL);
    }
    execvp(arguments[0], arguments);
    _exit(126);
}

static void answer(const char *bytes, size_t length, void *user)
{
    const ssize_t n = write(*(int *)user, bytes, length);
    (void)n;
}

static int set_property(VTermProp property, VTermValue *value, void *user)
{
    tty *t = user;
    if (property == VTERM_PROP_ALTSCREEN)
        t->other = value->boolean;
    return 1;
}

/* Of several modes that are set at once this libvterm minds the first only. */
static void mind_mouse(tty *t, const char *bytes, size_t length)
{
    for (size_t i = 0; i < length; i++) {
        memmove(t->last, t->last + 1, 4);
        t->last[4] = bytes[i];
        if (strcmp(t->last, "1000h") == 0 || strcmp(t->last, "1000l") == 0)
            t->mice = bytes[i] == 'h';
    }
}

void tty_run(tty *t, const tty_start *how)
{
    t->rows = how->rows ? how->rows : 24;
    t->columns = how->columns ? how->columns : 80;
    t->ended = false;
    t->received = 0;
    t->vt = vterm_new(t->rows, t->columns);
    ck_assert_ptr_nonnull(t->vt);
    vterm_set_utf8(t->vt, 1);
    vterm_output_set_callback(t->vt, answer, &t->master);
    static const VTermScreenCallbacks callbacks = {.settermprop = set_property};
    t->other = t->mice = false;
    memcpy(t->last, "-----", sizeof t->last);
    t->screen = vterm_obtain_screen(t->vt);
    vterm_screen_set_callbacks(t->screen, &callbacks, t);
    vterm_screen_enable_altscreen(t->screen, 1);
    vterm_screen_reset(t->screen, 1);
    const struct winsize size = {.ws_row = (unsigned short)t->rows,
                                 .ws_col = (unsigned short)t->columns};
    if (how->ordinary)
        give(t);
    t->child = forkpty(&t->master, NULL, NULL, &size);
    ck_assert_int_ge(t->child, 0);
    if (t->child == 0)
        become(t, how);
}

static void stop(tty *t)
{
    if (t->child > 0 && !t->ended) {
        kill(t->child, SIGKILL);
        waitpid(t->child, &t->status, 0);
        t->ended = true;
    }
    if (t->master >= 0)
        close(t->master);
    t->master = -1;
    if (t->vt)
        vterm_free(t->vt);
    t->vt = NULL;
}

void tty_end(tty *t)
{
    char command[200];
    stop(t);
    snprintf(command, sizeof command, "chmod -R u+w %s; rm -rf %s", t->folder, t->folder);
    ck_assert_int_eq(system(command), 0);
}

/* --- the screen --- */

void tty_size(tty *t, int rows, int columns)
{
    const struct winsize size = {.ws_row = (unsigned short)rows, .ws_col = (unsigned short)columns};
    t->rows = rows;
    t->columns = columns;
    vterm_set_size(t->vt, rows, columns);
    ck_assert_int_eq(ioctl(t->master, TIOCSWINSZ, &size), 0);
}

bool tty_pump(tty *t, int milliseconds)
{
    char bytes[16384];
    struct pollfd from = {t->master, POLLIN, 0};
    if (t->master < 0 || poll(&from, 1, milliseconds) <= 0)
        return false;
    const ssize_t n = read(t->master, bytes, sizeof bytes);
    if (n <= 0) {
        if (!t->ended && waitpid(t->child, &t->status, 0) == t->child)
            t->ended = true;
        return false;
    }
    t->received += (size_t)n;
    mind_mouse(t, bytes, (size_t)n);
    vterm_input_write(t->vt, bytes, (size_t)n);
    return true;
}

VTermScreenCell tty_cell(const tty *t, int row, int column)
{
    VTermScreenCell cell;
    memset(&cell, 0, sizeof cell);
    vterm_screen_get_cell(t->screen, (VTermPos){row, column}, &cell);
    return cell;
}

const char *tty_row(const tty *t, int row)
{
    static char text[4096];
    const VTermRect whole = {row, row + 1, 0, t->columns};
    const size_t n = vterm_screen_get_text(t->screen, text, sizeof text - 1, whole);
    text[n < sizeof text ? n : sizeof text - 1] = '\0';
    return text;
}

int tty_find_row(const tty *t, const char *text)
{
    for (int r = 0; t->vt && r < t->rows; r++)
        if (strstr(tty_row(t, r), text))
            return r;
    return -1;
}

bool tty_shows(const tty *t, const char *text)
{
    return tty_find_row(t, text) >= 0;
}

static void give_up(const tty *t, const char *what, const char *text)
{
    bh_text all = {0};
    for (int r = 0; r < t->rows; r++)
        bh_text_appendf(&all, "%s\n", tty_row(t, r));
    ck_abort_msg("%s \"%s\"%s:\n%s", what, text, t->ended ? " (the program ended)" : "", all.bytes);
}

void tty_more(tty *t, double *since, const char *what)
{
    *since = *since < 0 ? now() : *since;
    if (now() - *since > patience() || t->ended)
        give_up(t, "this never held:", what);
    tty_pump(t, 100);
}

double tty_limit(void)
{
    return 10 * patience();
}

void tty_wait(tty *t, const char *text)
{
    const double start = now();
    while (!tty_shows(t, text)) {
        if (now() - start > patience() || t->ended)
            give_up(t, "never saw", text);
        tty_pump(t, 100);
    }
}

void tty_wait_row(tty *t, int row, const char *text)
{
    const double start = now();
    while (!strstr(tty_row(t, row), text)) {
        if (now() - start > patience() || t->ended)
            give_up(t, "never saw in its row", text);
        tty_pump(t, 100);
    }
}

void tty_wait_gone(tty *t, const char *text)
{
    const double start = now();
    while (tty_shows(t, text)) {
        if (now() - start > patience() || t->ended)
            give_up(t, "it did not go away:", text);
        tty_pump(t, 100);
    }
}

void tty_set_current(tty *t, const char *value)
{
    char shown[64];
    snprintf(shown, sizeof shown, "> current        %s", value);
    tty_type(t, value);
    tty_type(t, "<Enter>");
    tty_wait(t, shown);
    tty_wait(t, "unsaved");
}

bool tty_cooked(const tty *t)
{
    struct termios modes;
    ck_assert_int_eq(tcgetattr(t->master, &modes), 0);
    const tcflag_t local = ICANON | ECHO | ISIG;
    return (modes.c_lflag & local) == local && (modes.c_iflag & ICRNL) && (modes.c_oflag & OPOST);
}

int tty_wait_end(tty *t)
{
    const double start = now();
    while (!t->ended) {
        if (now() - start > patience())
            give_up(t, "the program did not end", "");
        tty_pump(t, 50);
        if (!t->ended && waitpid(t->child, &t->status, WNOHANG) == t->child)
            t->ended = true;
    }
    while (tty_pump(t, 0))
        ;
    return WIFEXITED(t->status) ? WEXITSTATUS(t->status) : 128 + WTERMSIG(t->status);
}
