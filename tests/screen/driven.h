/* driven.h - keys in, a screen as text out, without a terminal. */
#ifndef TESTS_SCREEN_DRIVEN_H
#define TESTS_SCREEN_DRIVEN_H

#include <poll.h>
#include <stdio.h>
#include <string.h>
#include <time.h>

#include "beamhours/document/source.h"
#include "beamhours/screen/desk.h"

/* Names of keys in a script: <Enter>; anything else is typed as it is; << is a < itself. */
static const struct {
    const char *name;
    bh_press_kind kind;
} driven_keys[] = {{"Up", BH_PRESS_UP},
                   {"Down", BH_PRESS_DOWN},
                   {"Left", BH_PRESS_LEFT},
                   {"Right", BH_PRESS_RIGHT},
                   {"PageUp", BH_PRESS_PAGE_UP},
                   {"PageDown", BH_PRESS_PAGE_DOWN},
                   {"Home", BH_PRESS_HOME},
                   {"End", BH_PRESS_END},
                   {"Tab", BH_PRESS_TAB},
                   {"BackTab", BH_PRESS_BACK_TAB},
                   {"Enter", BH_PRESS_ENTER},
                   {"Escape", BH_PRESS_ESCAPE},
                   {"Rubout", BH_PRESS_RUBOUT},
                   {"Delete", BH_PRESS_DELETE},
                   {"Interrupt", BH_PRESS_INTERRUPT}};

static inline double driven_now(void)
{
    struct timespec t;
    clock_gettime(CLOCK_MONOTONIC, &t);
    return (double)t.tv_sec + 1e-9 * (double)t.tv_nsec;
}

/* Lets the worker finish; the time that pauses are measured in is not waited for. */
static inline bool driven_settle(bh_desk *desk)
{
    const double start = driven_now();
    double ahead = 0;
    while (driven_now() - start < 60) {
        const double wait = bh_desk_tend(desk, driven_now() + ahead);
        if (wait >= 0)
            ahead += wait + 1e-3;
        if (!bh_desk_news(desk) && wait < 0 && bh_desk_quiet(desk)) {
            bh_desk_news(desk);
            return true;
        }
        struct pollfd from = {bh_desk_wake(desk), POLLIN, 0};
        (void)poll(&from, 1, 20);
    }
    return false;
}

static inline size_t driven_key(const char *at, bh_press *press)
{
    *press = (bh_press){.kind = BH_PRESS_POINT};
    if (at[0] == '<' && at[1] == '<') {
        press->point = '<';
        return 2;
    }
    for (size_t i = 0; at[0] == '<' && i < sizeof driven_keys / sizeof *driven_keys; i++) {
        const size_t n = strlen(driven_keys[i].name);
        if (strncmp(at + 1, driven_keys[i].name, n) == 0 && at[n + 1] == '>') {
            press->kind = driven_keys[i].kind;
            return n + 2;
        }
    }
    if (sscanf(at, "<Click %d,%d>", &press->row, &press->column) == 2) {
        press->kind = BH_PRESS_CLICK;
        return (size_t)(strchr(at, '>') - at) + 1;
    }
    if (sscanf(at, "<Again %d,%d>", &press->row, &press->column) == 2) {
        press->kind = BH_PRESS_DOUBLE_CLICK;
        return (size_t)(strchr(at, '>') - at) + 1;
    }
    if (sscanf(at, "<Wheel %d,%d>", &press->row, &press->column) == 2) {
        press->kind = BH_PRESS_WHEEL_DOWN;
        return (size_t)(strchr(at, '>') - at) + 1;
    }
    const size_t n = bh_utf8_read(at, strnlen(at, 4), &press->point);
    return n ? n : 1;
}

/* Presses the keys of a script, each after what came of the one before. */
static inline bool driven_press(bh_desk *desk, const char *script)
{
    for (const char *at = script; *at;) {
        bh_press press;
        int rows = 0, columns = 0, used = 0;
        if (sscanf(at, "<Size %dx%d>%n", &columns, &rows, &used) == 2 && used) {
            bh_desk_resize(desk, rows, columns);
            at += used;
        } else {
            at += driven_key(at, &press);
            bh_desk_press(desk, &press, driven_now());
        }
        if (!driven_settle(desk))
            return false;
    }
    return true;
}

static inline void driven_draw(bh_desk *desk, bh_text *into)
{
    bh_canvas canvas = {.rows = 0};
    bh_desk_draw(desk, &canvas);
    bh_canvas_print(&canvas, into);
    bh_canvas_free(&canvas);
}

#endif
