/* test_slow.c - a structure model that takes its time, in this program only: no key waits for it,
 * and what a newer value overtakes is given up. */
#include "../suite.h"

#include <gsl/gsl_errno.h>
#include <math.h>
#include <pthread.h>
#include <stdatomic.h>
#include <stdlib.h>
#include <unistd.h>

#include "beamhours/base/file.h"
#include "beamhours/physics/structure.h"
#include "driven.h"

/* Linked in the place of bh_structure_eval (--wrap). */
void __real_bh_structure_eval(const bh_structure *structure, size_t n, const double *q2,
                              double *ge2, double *gm2);
void __wrap_bh_structure_eval(const bh_structure *structure, size_t n, const double *q2,
                              double *ge2, double *gm2);

static atomic_bool slow;
static atomic_size_t calls, curve_calls;
static _Atomic(pthread_t) last_thread, curve_thread;

void __wrap_bh_structure_eval(const bh_structure *structure, size_t n, const double *q2,
                              double *ge2, double *gm2)
{
    (void)atomic_fetch_add(&calls, 1U);
    atomic_store(&last_thread, pthread_self());
    if (pthread_equal(pthread_self(), atomic_load(&curve_thread)))
        (void)atomic_fetch_add(&curve_calls, 1U);
    if (atomic_load(&slow)) {
        const struct timespec pause = {0, 3000000};
        nanosleep(&pause, NULL);
    }
    __real_bh_structure_eval(structure, n, q2, ge2, gm2);
}

static const char plan[] =
    "plan: 1\n"
    "beam: {particle: electron, kinetic_energy: 855 MeV, current: 20 uA}\n"
    "target: {name: cell, scatterer: H, layers: [{material: liquid-hydrogen, thickness: 50 mm}]}\n"
    "arms: [{name: A, in_plane: \u00B128 mrad, out_of_plane: \u00B170 mrad, energy_cut: 9 MeV}]\n"
    "settings: [{name: K, angle: {from: 20 deg, to: 90 deg, count: 36}, goal: 1 %}]\n";

static bh_desk *open_desk(const char *path)
{
    static const char *const folders[] = {"materials", NULL};
    bh_error err = {.code = BH_OK};
    gsl_set_error_handler_off();
    ck_assert(!bh_file_write(path, plan, strlen(plan), &err));
    bh_desk *desk = bh_desk_open(&(bh_desk_start){.path = path, .folders = folders}, &err);
    ck_assert_msg(desk != NULL, "%s", err.text);
    bh_desk_resize(desk, 24, 80);
    return desk;
}

/* Presses a key and draws at once, as the terminal does; returns the seconds of this thread. */
static double press(bh_desk *desk, const char *key, bh_text *screen)
{
    struct timespec from, to;
    bh_press p;
    clock_gettime(CLOCK_THREAD_CPUTIME_ID, &from);
    const double start = driven_now();
    (void)driven_key(key, &p);
    bh_desk_press(desk, &p, start);
    (void)bh_desk_tend(desk, start);
    (void)bh_desk_news(desk);
    screen->length = 0;
    driven_draw(desk, screen);
    clock_gettime(CLOCK_THREAD_CPUTIME_ID, &to);
    ck_assert_double_lt(driven_now() - start, 5); /* it waited for nothing */
    return (double)(to.tv_sec - from.tv_sec) + 1e-9 * (double)(to.tv_nsec - from.tv_nsec);
}

static bool wait_for(bh_desk *desk, const char *text, bh_text *screen)
{
    const double start = driven_now();
    while (driven_now() - start < 60) {
        (void)bh_desk_tend(desk, driven_now());
        (void)bh_desk_news(desk);
        screen->length = 0;
        driven_draw(desk, screen);
        if (strstr(screen->bytes, text))
            return true;
        struct pollfd from = {bh_desk_wake(desk), POLLIN, 0};
        (void)poll(&from, 1, 20);
    }
    return false;
}

START_TEST(no_key_waits)
{
    char path[] = "/tmp/beamhours-slow-XXXXXX";
    const int file = mkstemp(path);
    ck_assert_int_ge(file, 0);
    close(file);
    bh_text screen = {0};
    bh_desk *desk = open_desk(path);
    ck_assert(driven_settle(desk));
    ck_assert_uint_eq(bh_desk_evaluated(desk), 36);
    atomic_store(&slow, true);
    const char *keys[] = {"l", "e", "n", "e", "r", "g", "y",    "<Escape>", "8",
                          "6", "0", " ", "M", "e", "V", "<Up>", "<Up>",     "<Up>"};
    double most = 0;
    for (size_t i = 0; i < sizeof keys / sizeof *keys; i++) {
        const double took = press(desk, keys[i], &screen);
        most = took > most ? took : most;
    }
    ck_assert_double_lt(most, 0.1); /* s of the processor */
    ck_assert_msg(wait_for(desk, "computing", &screen), "%s", screen.bytes);
    /* it says how much is left, and goes on saying it */
    ck_assert_msg(wait_for(desk, " of 36", &screen), "%s", screen.bytes);
    /* the value is dropped in the middle: the old table is there at once */
    (void)press(desk, "<Escape>", &screen);
    ck_assert_ptr_null(strstr(screen.bytes, "PROVISIONAL"));
    ck_assert_ptr_nonnull(strstr(screen.bytes, "855 MeV"));
    atomic_store(&slow, false);
    ck_assert(driven_settle(desk));
    ck_assert_uint_lt(bh_desk_evaluated(desk), 36 + 36); /* overtaken values were given up */
    bh_desk_close(desk);
    bh_text_free(&screen);
    unlink(path);
}
END_TEST

/* What was computed while the value was typed is the table once it is kept: at once, no key waits.
 */
START_TEST(kept_as_shown)
{
    char path[] = "/tmp/beamhours-slow-XXXXXX";
    const int file = mkstemp(path);
    ck_assert_int_ge(file, 0);
    close(file);
    bh_text screen = {0};
    atomic_store(&slow, false);
    bh_desk *desk = open_desk(path);
    ck_assert(driven_settle(desk) && driven_press(desk, "lenergy<Escape>860 MeV"));
    ck_assert(driven_settle(desk));
    driven_draw(desk, &screen);
    ck_assert_ptr_nonnull(strstr(screen.bytes, "PROVISIONAL"));
    const size_t evaluated = bh_desk_evaluated(desk);
    atomic_store(&slow, true);
    (void)press(desk, "<Enter>", &screen);
    ck_assert_ptr_null(strstr(screen.bytes, "PROVISIONAL"));
    ck_assert_ptr_null(strstr(screen.bytes, "computing"));
    ck_assert_ptr_nonnull(strstr(screen.bytes, "1 unsaved"));
    ck_assert(bh_desk_settled(desk));
    atomic_store(&slow, false);
    ck_assert(driven_settle(desk));
    ck_assert_uint_eq(bh_desk_evaluated(desk), evaluated);
    bh_desk_close(desk);
    bh_text_free(&screen);
    unlink(path);
}
END_TEST

/* Closing does not wait for a long computation either. */
START_TEST(leaves_at_once)
{
    char path[] = "/tmp/beamhours-slow-XXXXXX";
    const int file = mkstemp(path);
    ck_assert_int_ge(file, 0);
    close(file);
    atomic_store(&slow, true);
    const size_t before = atomic_load(&calls);
    bh_desk *desk = open_desk(path);
    bh_text screen = {0};
    ck_assert(wait_for(desk, "computing", &screen));
    while (atomic_load(&calls) == before)
        (void)bh_desk_tend(desk, driven_now());
    bh_desk_close(desk);
    const size_t after = atomic_load(&calls);
    ck_assert_uint_lt(after - before, 400); /* the whole table takes some thousands */
    bh_text_free(&screen);
    unlink(path);
}
END_TEST

/* Until some more calls were made than there were; `at`: the time at which the desk stands still,
 * so that no pause in typing ends, or NAN. */
static bool wait_for_calls(bh_desk *desk, double at, size_t before, size_t more)
{
    const double start = driven_now();
    while (atomic_load(&calls) < before + more && driven_now() - start < 60) {
        (void)bh_desk_tend(desk, isnan(at) ? driven_now() : at);
        (void)bh_desk_news(desk);
        const struct timespec pause = {0, 1000000};
        nanosleep(&pause, NULL);
    }
    return atomic_load(&calls) >= before + more;
}

/* A table that is there, quickly made, and a curve that waits for a pause. */
static bh_desk *open_before_curve(const char *path, bh_text *screen)
{
    atomic_store(&slow, false);
    bh_desk *desk = open_desk(path);
    bh_desk_resize(desk, 60, 120);
    const double start = driven_now();
    bh_press key = {.kind = BH_PRESS_HOME};
    bh_desk_press(desk, &key, start); /* the curve waits for a pause after it */
    do {
        ck_assert_double_lt(driven_now() - start, 60);
        (void)bh_desk_tend(desk, start);
        (void)bh_desk_news(desk);
        screen->length = 0;
        driven_draw(desk, screen);
    } while (bh_desk_evaluated(desk) < 36 || strstr(screen->bytes, " of 36"));
    ck_assert_ptr_nonnull(strstr(screen->bytes, "being computed"));
    return desk;
}

/* How many calls a curve takes that is not given up. */
static size_t calls_of_curve(const char *path, bh_text *screen)
{
    bh_desk *desk = open_before_curve(path, screen);
    const size_t before = atomic_load(&calls);
    ck_assert(driven_settle(desk));
    bh_desk_close(desk);
    return atomic_load(&calls) - before;
}

/* And a curve on its way that is slow. */
static bh_desk *open_with_slow_curve(const char *path, bh_text *screen)
{
    bh_desk *desk = open_before_curve(path, screen);
    atomic_store(&slow, true);
    ck_assert(wait_for_calls(desk, NAN, atomic_load(&calls), 4));
    atomic_store(&curve_thread, atomic_load(&last_thread));
    return desk;
}

/* A curve is given up when the plan changes, when something is asked that the user waits for, and
 * when the program ends: of its thousands of calls not many more are made, those of one of its 61
 * points at most. */
START_TEST(curves_give_way)
{
    enum { ANOTHER_PLAN, EXPLANATION, THE_END };
    char path[] = "/tmp/beamhours-slow-XXXXXX";
    const int file = mkstemp(path);
    ck_assert_int_ge(file, 0);
    close(file);
    bh_text screen = {0};
    const size_t whole = calls_of_curve(path, &screen);
    ck_assert_uint_gt(whole, 1000);
    bh_desk *desk = open_with_slow_curve(path, &screen);
    const char *const typed[] = {"l", "e", "n", "e", "r", "g", "y", "<Escape>",
                                 "8", "6", "0", " ", "M", "e", NULL};
    const size_t of_curve = atomic_load(&curve_calls);
    for (int i = 0; _i == ANOTHER_PLAN && typed[i]; i++)
        (void)press(desk, typed[i], &screen);
    const size_t before = atomic_load(&calls);
    if (_i == ANOTHER_PLAN) {
        /* the table takes many calls; the curve of the new plan waits for a pause */
        const double now = driven_now();
        (void)press(desk, "V", &screen);
        ck_assert(wait_for_calls(desk, now, before, whole / 3));
    } else if (_i == EXPLANATION) {
        (void)press(desk, "<Tab>", &screen);
        (void)press(desk, "e", &screen);
        ck_assert(wait_for(desk, "Inputs", &screen));
        ck_assert_uint_lt(atomic_load(&calls) - before, 1500);
    }
    bh_desk_close(desk);
    if (_i != EXPLANATION)
        ck_assert_uint_lt(atomic_load(&curve_calls) - of_curve, whole / 16);
    ck_assert_uint_lt(atomic_load(&calls) - before, whole / 2);
    bh_text_free(&screen);
    unlink(path);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("slow");
    tcase_set_timeout(tests, 300);
    tcase_add_test(tests, no_key_waits);
    tcase_add_test(tests, kept_as_shown);
    tcase_add_test(tests, leaves_at_once);
    tcase_add_loop_test(tests, curves_give_way, 0, 3);
    return run_suite("screen/slow", tests);
}
