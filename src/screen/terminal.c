/* terminal.c - the only file that talks to a terminal: keys in, cells out, signals. */
#define _GNU_SOURCE 1 /* NOLINT: ppoll; wide characters of curses */
#include "beamhours/screen/terminal.h"

#include <curses.h>
#include <errno.h>
#include <poll.h>
#include <stdint.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/screen/alarm.h"
#include "beamhours/screen/clock.h"
#include "beamhours/screen/keyboard.h"
#include "beamhours/screen/pasting.h"

enum { PASTE_BEGINS = KEY_MAX + 1, PASTE_ENDS }; /* keys of our own, above those of curses */

struct terminal {
    bh_desk *desk;
    FILE *keyboard;
    SCREEN *screen;
    bh_canvas shown, wanted;
    int rows, columns;
    attr_t looks[BH_LOOK_COUNT];
    short pairs[BH_LOOK_COUNT];
    bool blank[BH_LOOK_COUNT]; /* the look does not show on a blank */
    bool drawn;
    bh_pasting pasting;
};

/* --- looks --- */

/* Hues that people who see few of them tell apart, readable on black and on white; nothing is said
 * by colour alone. */
static void set_looks(struct terminal *t)
{
    static const attr_t plain[BH_LOOK_COUNT] = {
        [BH_LOOK_TITLE] = A_BOLD,   [BH_LOOK_CURSOR] = A_UNDERLINE, [BH_LOOK_FIELD] = A_UNDERLINE,
        [BH_LOOK_TRIAL] = A_BOLD,   [BH_LOOK_CHANGED] = A_BOLD,     [BH_LOOK_STALE] = A_DIM,
        [BH_LOOK_QUIET] = A_NORMAL, [BH_LOOK_WARNING] = A_NORMAL,   [BH_LOOK_ERROR] = A_BOLD,
        [BH_LOOK_CAUTION] = A_BOLD, [BH_LOOK_KEY] = A_BOLD};
    memcpy(t->looks, plain, sizeof plain);
    t->looks[BH_LOOK_FOCUS] = termattrs() & A_REVERSE ? A_REVERSE | A_BOLD : A_STANDOUT;
    const char *refused = getenv("NO_COLOR");
    if (!has_colors() || start_color() == ERR || (refused && refused[0]))
        return;
    const bool own = use_default_colors() == OK, many = COLORS >= 256;
    const short ground = own ? -1 : COLOR_BLACK;
    const short blue = many ? 32 : COLOR_CYAN, orange = many ? 166 : COLOR_YELLOW;
    (void)init_pair(1, blue, ground);
    (void)init_pair(2, orange, ground);
    t->pairs[BH_LOOK_FIELD] = 1; /* not keys: a menu has many, and bold is enough */
    t->pairs[BH_LOOK_CAUTION] = t->pairs[BH_LOOK_WARNING] = t->pairs[BH_LOOK_ERROR] = 2;
    if (!many) { /* on a light ground these two are too pale: their attributes carry them */
        t->looks[BH_LOOK_TRIAL] |= A_UNDERLINE;
        t->looks[BH_LOOK_CAUTION] |= A_UNDERLINE;
        memset(t->pairs, 0, sizeof t->pairs);
    }
}

/* --- beginning and end --- */

/* What the terminal is sent for something; NULL where it cannot do it. */
static const char *capability(const char *name)
{
    char own[8];
    (void)snprintf(own, sizeof own, "%s", name);
    const char *text = tigetstr(own);
    return (intptr_t)text > 0 ? text : NULL; /* -1: no such capability */
}

/* How the terminal is put back, for the day the program itself cannot. */
static void keep_way_back(const struct termios *before)
{
    static const char *const names[] = {"sgr0", "rmkx", "cnorm", "BD", "rmcup"};
    bh_alarm_begin(before);
    for (size_t i = 0; i < sizeof names / sizeof names[0]; i++)
        if (capability(names[i]))
            bh_alarm_way_back(capability(names[i]));
}

static void set_modes(void)
{
    (void)raw();
    (void)noecho();
    (void)nonl();
    (void)keypad(stdscr, TRUE);
    (void)nodelay(stdscr, TRUE);
    (void)set_escdelay(8); /* a terminal sends what belongs together at once */
    /* Behind an event that is not asked for curses waits for the next key: all are. */
    (void)mousemask(ALL_MOUSE_EVENTS & ~(mmask_t)BUTTON1_TRIPLE_CLICKED, NULL);
    (void)mouseinterval(0);
}

/* Where the terminal can mark what is pasted: asks it to, or not to any more. */
static void mark_pastes(bool on)
{
    const char *begins = capability("PS"), *ends = capability("PE");
    const char *mode = capability(on ? "BE" : "BD");
    if (!begins || !ends || !mode)
        return;
    (void)define_key(begins, on ? PASTE_BEGINS : 0);
    (void)define_key(ends, on ? PASTE_ENDS : 0);
    (void)putp(mode);
    (void)fflush(stdout);
}

/* Below what stays where there is no other screen to leave for. */
static void leave_screen(void)
{
    mark_pastes(false);
    (void)endwin();
    (void)fputs(capability("rmcup") ? "" : "\n", stdout);
    (void)fflush(stdout);
}

static void find_blank(struct terminal *t)
{
    for (int i = 0; i < BH_LOOK_COUNT; i++)
        t->blank[i] = (t->looks[i] & (A_REVERSE | A_STANDOUT | A_UNDERLINE)) == 0;
}

static bool begin(struct terminal *t)
{
    struct termios before;
    if (!(t->keyboard = bh_keyboard_open(&before)))
        return false;
    bh_alarm_catch();
    const char *name = getenv("TERM");
    t->screen = name && strcmp(name, "dumb") != 0 ? newterm(NULL, stdout, t->keyboard) : NULL;
    if (!t->screen || !capability("cup") || !(termattrs() & (A_REVERSE | A_STANDOUT)))
        return false;
    keep_way_back(&before);
    set_modes();
    mark_pastes(true);
    set_looks(t);
    find_blank(t);
    bh_alarm_screen(true);
    return true;
}

static void end(struct terminal *t)
{
    bh_alarm_screen(false);
    if (t->screen) {
        leave_screen();
        delscreen(t->screen);
    }
    bh_keyboard_close(t->keyboard);
    bh_canvas_free(&t->shown);
    bh_canvas_free(&t->wanted);
    bh_alarm_keep(NULL, NULL);
}

static void set_size(struct terminal *t)
{
    if (!bh_alarm_size(&t->rows, &t->columns))
        return;
    (void)resizeterm(t->rows, t->columns);
    (void)clearok(stdscr, TRUE);
    t->drawn = false;
    bh_desk_resize(t->desk, t->rows, t->columns);
}

/* `whole`: as the terminal itself would do it when the key is pressed, with the whole job. */
static void suspend(struct terminal *t, bool whole)
{
    (void)bh_desk_secure(t->desk, bh_clock_now()); /* nobody knows whether it is ever resumed */
    bh_alarm_screen(false);
    leave_screen();
    if (!bh_alarm_stop(whole))
        bh_desk_say(t->desk, "nothing is there that this could be left to: no shell runs it");
    bh_alarm_screen(true);
    bh_alarm_resume();
}

/* Whatever the terminal was made to do meanwhile.  In the background setting its modes stops the
 * program before anything is written to it. */
static void resume(struct terminal *t)
{
    (void)reset_prog_mode();
    if (!isendwin()) /* it was stopped without a warning: all is set up anew */
        (void)endwin();
    (void)reset_prog_mode();
    set_modes();
    mark_pastes(true);
    (void)clearok(stdscr, TRUE);
    t->drawn = false;
    set_size(t);
    bh_desk_awake(t->desk, bh_clock_now());
}

/* --- cells out --- */

static void put_cell(const struct terminal *t, int row, int column, const bh_cell *cell)
{
    const wchar_t text[3] = {(wchar_t)cell->point, (wchar_t)cell->mark, L'\0'};
    cchar_t made;
    (void)setcchar(&made, text, t->looks[cell->look], t->pairs[cell->look], NULL);
    (void)mvadd_wch(row, column, &made);
}

/* Tells curses only of cells that changed: it need not compare the rest. */
static void show(struct terminal *t)
{
    bh_desk_draw(t->desk, &t->wanted);
    bh_canvas_join_words(&t->wanted, t->blank);
    const bh_canvas *w = &t->wanted, *s = &t->shown;
    const bool all = !t->drawn || s->rows != w->rows || s->columns != w->columns;
    if (all)
        (void)erase();
    for (int r = 0; r < w->rows; r++)
        for (int c = 0; c < w->columns; c++) {
            const bh_cell *cell = bh_canvas_at(w, r, c);
            if (cell->point && (all || !bh_cell_same(cell, bh_canvas_at(s, r, c))))
                put_cell(t, r, c, cell);
        }
    (void)move(w->cursor_row, w->cursor_column);
    (void)refresh();
    const bh_canvas old = t->shown;
    t->shown = t->wanted;
    t->wanted = old;
    t->drawn = true;
}

/* --- keys in --- */

static bh_press mouse_press(void)
{
    MEVENT event;
    bh_press p = {.kind = BH_PRESS_NOTHING};
    if (getmouse(&event) != OK)
        return p;
    p.row = event.y;
    p.column = event.x;
    if (event.bstate & BUTTON4_PRESSED)
        p.kind = BH_PRESS_WHEEL_UP;
    else if (event.bstate & BUTTON5_PRESSED)
        p.kind = BH_PRESS_WHEEL_DOWN;
    else if (event.bstate & BUTTON1_DOUBLE_CLICKED)
        p.kind = BH_PRESS_DOUBLE_CLICK;
    else if (event.bstate & (BUTTON1_PRESSED | BUTTON1_CLICKED))
        p.kind = BH_PRESS_CLICK;
    return p;
}

static bh_press key_press(wint_t code)
{
    static const struct {
        wint_t code;
        bh_press_kind kind;
    } keys[] = {{KEY_UP, BH_PRESS_UP},         {KEY_DOWN, BH_PRESS_DOWN},
                {KEY_LEFT, BH_PRESS_LEFT},     {KEY_RIGHT, BH_PRESS_RIGHT},
                {KEY_PPAGE, BH_PRESS_PAGE_UP}, {KEY_NPAGE, BH_PRESS_PAGE_DOWN},
                {KEY_HOME, BH_PRESS_HOME},     {KEY_END, BH_PRESS_END},
                {KEY_BTAB, BH_PRESS_BACK_TAB}, {KEY_ENTER, BH_PRESS_ENTER},
                {KEY_DC, BH_PRESS_DELETE},     {KEY_BACKSPACE, BH_PRESS_RUBOUT},
                {KEY_IC, BH_PRESS_FUNCTION}};
    if (code == KEY_MOUSE)
        return mouse_press();
    if (code > KEY_F0 && code <= KEY_F(63))
        return (bh_press){.kind = BH_PRESS_FUNCTION, .point = (uint32_t)(code - KEY_F0)};
    for (size_t i = 0; i < sizeof keys / sizeof keys[0]; i++)
        if (keys[i].code == code)
            return (bh_press){.kind = keys[i].kind};
    return (bh_press){.kind = BH_PRESS_NOTHING};
}

static bh_press press_of(struct terminal *t, int kind, wint_t code)
{
    if (kind != KEY_CODE_YES)
        return bh_pasting_take(&t->pasting, (uint32_t)code, bh_clock_now());
    if (code == PASTE_BEGINS || code == PASTE_ENDS)
        return bh_pasting_mark(&t->pasting, code == PASTE_BEGINS, bh_clock_now());
    return key_press(t->pasting.on ? 0 : code);
}

/* All keys that are there; false when the terminal is gone. */
static bool read_keys(struct terminal *t, bool *some)
{
    wint_t code = 0;
    int kind = ERR;
    bool any = false;
    while (!bh_desk_over(t->desk) && bh_keyboard_ours() && (kind = get_wch(&code)) != ERR) {
        const bh_press press = press_of(t, kind, code);
        bh_desk_press(t->desk, &press, bh_clock_now());
        any = true;
        if (bh_alarm_resized())
            set_size(t);
    }
    *some = *some || any;
    return any;
}

/* --- the loop --- */

/* A frame waits this long for what is in view to be computed: then it is drawn once, not twice. */
static const double patience = 0.012; /* s */

struct loop {
    struct terminal *t;
    sigset_t during; /* signals let through while waiting */
    bool dirty;
    double since; /* [s] when it became so */
};

/* Waits for keys, news, signals or the time; false when the terminal is gone. */
static bool wait_for_more(struct loop *l, double most)
{
    struct pollfd from[] = {{fileno(l->t->keyboard), POLLIN, 0},
                            {bh_desk_wake(l->t->desk), POLLIN, 0}};
    most = bh_pasting_wait(&l->t->pasting, most);
    const struct timespec limit = bh_clock_span(most < 0 ? 0 : most);
    const int n = ppoll(from, 2, most < 0 ? NULL : &limit, &l->during);
    if (n < 0)
        return errno == EINTR;
    const int input = n > 0 ? from[0].revents & (POLLIN | POLLHUP | POLLERR) : 0;
    if (input && !bh_keyboard_ours())
        return bh_alarm_step_aside();
    bool some = n > 0 && (from[1].revents & POLLIN) && bh_desk_news(l->t->desk);
    if (input && !read_keys(l->t, &some) && (input & ~POLLIN))
        return false;
    if (n == 0) {
        const bh_press press = bh_pasting_rest(&l->t->pasting, bh_clock_now());
        some = press.kind != BH_PRESS_NOTHING;
        if (some)
            bh_desk_press(l->t->desk, &press, bh_clock_now());
    }
    if (some && !l->dirty) {
        l->dirty = true;
        l->since = bh_clock_now();
    }
    return true;
}

static void mind_signals(struct loop *l)
{
    if (bh_alarm_resized()) {
        set_size(l->t);
        l->dirty = true;
    }
    const bool key = bh_desk_suspends(l->t->desk), signal = bh_alarm_stopping();
    if (key || signal)
        suspend(l->t, key);
    if (bh_alarm_resumed()) {
        resume(l->t);
        l->dirty = true;
    }
}

/* Draws when what is in view is there, or when that takes too long; else shortens the wait. */
static void draw_when_due(struct loop *l, double *wait)
{
    const double left = l->since + patience - bh_clock_now();
    if (!l->dirty)
        return;
    if (left <= 0 || bh_desk_settled(l->t->desk)) {
        show(l->t);
        l->dirty = false;
    } else if (*wait < 0 || left < *wait) {
        *wait = left;
    }
}

static void run(struct loop *l)
{
    bh_desk *desk = l->t->desk;
    bool there = true;
    while (there && !bh_desk_over(desk) && !bh_alarm_ended()) {
        mind_signals(l);
        bh_alarm_keep(bh_desk_rescue(desk), bh_desk_mark(desk));
        double wait = bh_desk_tend(desk, bh_clock_now());
        l->dirty = bh_desk_spoke(desk) || l->dirty;
        draw_when_due(l, &wait);
        there = wait_for_more(l, wait);
    }
    if (!there && !bh_alarm_ended())
        bh_alarm_end(SIGHUP);
}

bh_terminal_end bh_terminal_run(bh_desk *desk, int *signal)
{
    struct terminal t = {.desk = desk};
    struct loop l = {.t = &t, .dirty = true};
    bh_alarm_clear();
    *signal = 0;
    if (!begin(&t)) {
        end(&t);
        return BH_TERMINAL_NONE;
    }
    bh_alarm_block(true, &l.during);
    set_size(&t);
    run(&l);
    end(&t);
    bh_alarm_block(false, NULL);
    *signal = bh_alarm_ended();
    return *signal ? BH_TERMINAL_SIGNAL : BH_TERMINAL_DONE;
}
