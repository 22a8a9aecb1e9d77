/* alarm.c - what signals do: a note for the loop, or, when the program itself fails, the last
 * things that can be done. */
#include "beamhours/screen/alarm.h"

#include <errno.h>
#include <string.h>
#include <sys/ioctl.h>
#include <unistd.h>

/* What signal handlers see: the one place of the program with writable data of its own. */
static struct {
    volatile sig_atomic_t resized, ended, stopping, resumed;
    volatile sig_atomic_t screen_on;
    bh_rescue *rescue;
    const char *mark; /* the file that says the plan is open */
    struct termios before;
    char leave[256]; /* what puts the terminal back */
    size_t leave_length;
} alarm_bell;

static void on_resize(int number)
{
    (void)number;
    alarm_bell.resized = 1;
}

static void on_end(int number)
{
    alarm_bell.ended = number;
}

static void on_stop(int number)
{
    (void)number;
    alarm_bell.stopping = 1;
}

static void on_resume(int number)
{
    (void)number;
    alarm_bell.resumed = 1;
}

/* The program itself failed: save what there is, put the terminal back, and fail as before. */
static void on_crash(int number)
{
    const int kept = errno;
    if (alarm_bell.rescue)
        (void)bh_rescue_write(alarm_bell.rescue);
    if (alarm_bell.mark)
        (void)unlink(alarm_bell.mark);
    if (alarm_bell.screen_on) {
        const ssize_t n = write(STDOUT_FILENO, alarm_bell.leave, alarm_bell.leave_length);
        (void)n;
        (void)tcsetattr(STDIN_FILENO, TCSANOW, &alarm_bell.before);
    }
    errno = kept;
    (void)signal(number, SIG_DFL);
    (void)raise(number);
}

void bh_alarm_catch(void)
{
    static const int ends[] = {SIGINT, SIGTERM, SIGHUP, SIGQUIT};
    static const int crashes[] = {SIGSEGV, SIGBUS, SIGFPE, SIGILL, SIGABRT};
    struct sigaction act = {.sa_handler = on_resize};
    (void)sigemptyset(&act.sa_mask);
    (void)sigaction(SIGWINCH, &act, NULL);
    act.sa_handler = on_stop;
    (void)sigaction(SIGTSTP, &act, NULL);
    act.sa_handler = on_resume;
    (void)sigaction(SIGCONT, &act, NULL);
    act.sa_handler = on_end;
    for (size_t i = 0; i < sizeof ends / sizeof ends[0]; i++)
        (void)sigaction(ends[i], &act, NULL);
    act.sa_handler = on_crash;
    act.sa_flags = (int)SA_RESETHAND;
    for (size_t i = 0; i < sizeof crashes / sizeof crashes[0]; i++)
        (void)sigaction(crashes[i], &act, NULL);
    (void)signal(SIGPIPE, SIG_IGN);
    (void)signal(SIGTTIN, SIG_IGN); /* stopped inside a read, it would wait there afterwards */
}

void bh_alarm_block(bool on, sigset_t *before)
{
    sigset_t set;
    (void)sigemptyset(&set);
    (void)sigaddset(&set, SIGWINCH);
    (void)sigaddset(&set, SIGTSTP);
    (void)sigaddset(&set, SIGCONT);
    (void)sigaddset(&set, SIGINT);
    (void)sigaddset(&set, SIGTERM);
    (void)sigaddset(&set, SIGHUP);
    (void)sigaddset(&set, SIGQUIT);
    (void)sigprocmask(on ? SIG_BLOCK : SIG_UNBLOCK, &set, before);
}

void bh_alarm_begin(const struct termios *before)
{
    alarm_bell.before = *before;
    alarm_bell.leave_length = 0;
}

/* Pauses, `$<5>`, are left out: only old terminals need them. */
void bh_alarm_way_back(const char *text)
{
    for (; *text && alarm_bell.leave_length + 1 < sizeof alarm_bell.leave; text++) {
        const char *end = text[0] == '$' && text[1] == '<' ? strchr(text, '>') : NULL;
        if (end)
            text = end;
        else
            alarm_bell.leave[alarm_bell.leave_length++] = *text;
    }
}

void bh_alarm_screen(bool on)
{
    alarm_bell.screen_on = on;
}

void bh_alarm_keep(bh_rescue *rescue, const char *mark)
{
    alarm_bell.rescue = rescue;
    alarm_bell.mark = mark;
}

void bh_alarm_clear(void)
{
    alarm_bell.resized = alarm_bell.ended = alarm_bell.stopping = alarm_bell.resumed = 0;
}

bool bh_alarm_resized(void)
{
    const bool yes = alarm_bell.resized;
    alarm_bell.resized = 0;
    return yes;
}

bool bh_alarm_stopping(void)
{
    const bool yes = alarm_bell.stopping;
    alarm_bell.stopping = 0;
    return yes;
}

/* The signal is held back while it is sent, so that the program stops in one place.  A job that no
 * shell looks after is not stopped by it: then no SIGCONT waits behind. */
bool bh_alarm_stop(bool whole)
{
    const struct sigaction usual = {.sa_handler = SIG_DFL};
    struct sigaction ours;
    sigset_t stop, before, waiting;
    (void)sigemptyset(&stop);
    (void)sigaddset(&stop, SIGTSTP);
    (void)sigprocmask(SIG_BLOCK, &stop, &before);
    (void)sigaction(SIGTSTP, &usual, &ours);
    (void)kill(whole ? 0 : getpid(), SIGTSTP);
    (void)sigprocmask(SIG_UNBLOCK, &stop, NULL);
    (void)sigpending(&waiting);
    (void)sigaction(SIGTSTP, &ours, NULL);
    (void)sigprocmask(SIG_SETMASK, &before, NULL);
    return sigismember(&waiting, SIGCONT) == 1;
}

bool bh_alarm_step_aside(void)
{
    const bool called = bh_alarm_stop(true);
    bh_alarm_resume();
    return called;
}

bool bh_alarm_size(int *rows, int *columns)
{
    struct winsize size;
    if (ioctl(STDOUT_FILENO, TIOCGWINSZ, &size) || size.ws_row < 1 || size.ws_col < 1) {
        size.ws_row = 24;
        size.ws_col = 80;
    }
    const bool other = *rows != size.ws_row || *columns != size.ws_col;
    *rows = size.ws_row;
    *columns = size.ws_col;
    return other;
}

bool bh_alarm_resumed(void)
{
    const bool yes = alarm_bell.resumed;
    alarm_bell.resumed = 0;
    return yes;
}

void bh_alarm_resume(void)
{
    alarm_bell.resumed = 1;
}

int bh_alarm_ended(void)
{
    return alarm_bell.ended;
}

void bh_alarm_end(int number)
{
    alarm_bell.ended = number;
}
