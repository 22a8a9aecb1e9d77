/* test_ticks.c - which ticks are chosen, row by row; and for many axes that labels keep apart and
 * say what they stand at. */
#include "../suite.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/base/ticks.h"

/* Every character of a label is five long, so that rows can be checked by hand. */
static double extent(void *asker, const char *label)
{
    double n = 0.0;
    (void)asker;
    for (const char *c = label; *c; c++)
        n += ((unsigned char)*c & 0xC0) != 0x80;
    return 5.0 * n;
}

static const struct {
    double from, to;
    bool logarithmic;
    double length;
    const char *labels;
    int minor;
} rows[] = {
    {0.0, 10.0, false, 400.0, "0 1 2 3 4 5 6 7 8 9 10", 40},
    {0.0, 10.0, false, 200.0, "0 2 4 6 8 10", 15},
    {0.0, 10.0, false, 100.0, "0 5 10", 8},
    {0.0, 1.0, false, 200.0, "0.0 0.2 0.4 0.6 0.8 1.0", 15},
    {-1.0, 1.0, false, 150.0, "−1.0 −0.5 0.0 0.5 1.0", 16},
    {12.0, 127.5, false, 200.0, "20 40 60 80 100 120", 17},
    {0.123, 0.127, false, 200.0, "0.123 0.124 0.125 0.126 0.127", 16},
    {99999.0, 100001.0, false, 100.0, "99999 100000 100001", 8},
    {1e-4, 5e-4, false, 200.0, "0.0001 0.0002 0.0003 0.0004 0.0005", 16},
    {1.0, 1000.0, true, 400.0, "1 2 5 10 20 50 100 200 500 1000", 18},
    {1.0, 1000.0, true, 120.0, "1 10 100 1000", 24},
    {0.05, 300.0, true, 230.0, "0.1 1 10 100", 31},
    {1e-9, 1e3, true, 240.0, "10⁻⁸ 10⁻⁶ 10⁻⁴ 10⁻² 10⁰ 10²", 7},
    {1e-9, 1e3, true, 120.0, "10⁻⁵ 10⁰", 11},
    {2e5, 7e7, true, 240.0, "2·10⁵ 5·10⁵ 10⁶ 2·10⁶ 5·10⁶ 10⁷ 2·10⁷ 5·10⁷", 16},
    {20.0, 35.0, true, 200.0, "20 22 24 26 28 30 32 34", 23},
    {300.0, 310.0, true, 200.0, "300 302 304 306 308 310", 15},
    {225.0, 3600.0, true, 400.0, "500 1000 2000", 7},
    {10.0, 10.0, false, 200.0, "", 0},
    {10.0, 5.0, false, 200.0, "", 0},
    {0.0, 5.0, true, 200.0, "", 0},
    {NAN, 5.0, false, 200.0, "", 0},
    {0.0, INFINITY, false, 200.0, "", 0},
    {-1e308, 1e308, false, 200.0, "", 0},
};

START_TEST(ticks_are_these)
{
    const bh_axis axis = {rows[_i].from, rows[_i].to, rows[_i].logarithmic};
    const bh_tick_room room = {rows[_i].length, 6.0, 20.0, extent, NULL};
    bh_ticks ticks;
    char got[1000] = "";
    bh_ticks_choose(&axis, &room, &ticks);
    for (int i = 0; i < ticks.count; i++) {
        strcat(got, i ? " " : "");
        strcat(got, ticks.tick[i].label);
    }
    ck_assert_str_eq(got, rows[_i].labels);
    ck_assert_int_eq(ticks.minor_count, rows[_i].minor);
}
END_TEST

/* What a label says: plain numbers by our reader, powers of ten by their raised digits. */
static double said(const char *label)
{
    static const char *const raised[] = {"⁰", "¹", "²", "³", "⁴", "⁵", "⁶", "⁷", "⁸", "⁹"};
    const bool negative = strncmp(label, "−", strlen("−")) == 0;
    const char *at = negative ? label + strlen("−") : label;
    double value = 0.0, times = 1.0;
    int power = 0;
    if (bh_number_parse(at, &at, &value))
        ck_abort_msg("no number: %s", label);
    if (strncmp(at, "·10", strlen("·10")) == 0) {
        times = value;
        value = 10.0;
        at += strlen("·10");
    }
    if (*at) {
        const bool below = strncmp(at, "⁻", strlen("⁻")) == 0;
        at += below ? strlen("⁻") : 0;
        while (*at) {
            int digit = 0;
            while (strncmp(at, raised[digit], strlen(raised[digit])) != 0)
                digit++;
            power = 10 * power + digit;
            at += strlen(raised[digit]);
        }
        value = times * pow(10.0, below ? -power : power);
    }
    return negative ? -value : value;
}

static void check_one(const bh_axis *axis, double length)
{
    const bh_tick_room room = {length, 6.0, 20.0, extent, NULL};
    bh_ticks t;
    double edge = -INFINITY;
    int labels = 0;
    bh_ticks_choose(axis, &room, &t);
    for (int i = 0; i < t.count; i++) {
        const double at = length * bh_axis_place(axis, t.tick[i].at),
                     half = extent(NULL, t.tick[i].label) / 2.0;
        if (!(at >= -1e-6 * length && at <= (1.0 + 1e-6) * length) ||
            (i > 0 && t.tick[i].at <= t.tick[i - 1].at))
            ck_abort_msg("outside, or out of order: %g", at);
        if (!t.tick[i].label[0])
            continue;
        labels++;
        if (!(at - half >= edge + 6.0 - 1e-9))
            ck_abort_msg("%s of %g to %g touches the one before", t.tick[i].label, axis->from,
                         axis->to);
        edge = at + half;
        if (!(fabs(said(t.tick[i].label) - t.tick[i].at) <= 1e-9 * fabs(t.tick[i].at)))
            ck_abort_msg("%s stands at %g", t.tick[i].label, t.tick[i].at);
    }
    if (labels < 1 || (length >= 200.0 && labels < 2))
        ck_abort_msg("%d labels from %g to %g", labels, axis->from, axis->to);
    for (int k = 0; k < t.minor_count; k++)
        for (int i = 0; i < t.count; i++)
            if (!(fabs(t.minor[k] - t.tick[i].at) > 1e-7 * fabs(t.minor[k])))
                ck_abort_msg("a short tick on a long one at %g", t.minor[k]);
}

START_TEST(labels_keep_apart_and_say_where_they_stand)
{
    unsigned state = 12345;
    for (int n = 0; n < 3000; n++) {
        double u[3];
        for (int i = 0; i < 3; i++) {
            state = state * 1664525u + 1013904223u;
            u[i] = (state >> 8) / 16777216.0;
        }
        const double middle = pow(10.0, 16.0 * u[0] - 8.0);
        const bh_axis linear = {middle * (u[1] - 0.5), middle * (u[1] + 0.02 + u[2]), false};
        const bh_axis logarithmic = {middle, middle * pow(10.0, 0.02 + 12.0 * u[2] * u[2]), true};
        check_one(&linear, 60.0 + 400.0 * u[2]);
        check_one(&logarithmic, 60.0 + 400.0 * u[1]);
    }
}
END_TEST

START_TEST(places_are_where_they_should_be)
{
    const bh_axis linear = {10.0, 30.0, false}, logarithmic = {1.0, 100.0, true};
    ck_assert_double_eq_tol(bh_axis_place(&linear, 15.0), 0.25, 1e-15);
    ck_assert_double_eq_tol(bh_axis_place(&linear, 40.0), 1.5, 1e-15);
    ck_assert_double_eq_tol(bh_axis_place(&logarithmic, 10.0), 0.5, 1e-15);
    ck_assert_double_nan(bh_axis_place(&logarithmic, 0.0));
    ck_assert_double_nan(bh_axis_place(&logarithmic, -1.0));
}
END_TEST

START_TEST(axes_have_room_around_what_they_show)
{
    static const struct {
        double lo, hi;
        bool logarithmic;
        double from, to;
    } around[] = {
        {1.0, 10.0, false, 0.0, 10.45},    {5.0, 10.0, false, 4.75, 10.25},
        {-10.0, -1.0, false, -10.45, 0.0}, {-1.0, 1.0, false, -1.1, 1.1},
        {5.0, 5.0, false, 4.0, 6.0},       {0.0, 0.0, false, 0.0, 1.0},
        {1.0, 1.0, true, 1.0 / 1.5, 1.5},  {1.0, 1e4, true, 0.630957344, 15848.9319},
        {-2.0, -2.0, false, -2.4, -1.6},
    };
    for (int i = 0; i < COUNT(around); i++) {
        const bh_axis a = bh_axis_around(around[i].lo, around[i].hi, around[i].logarithmic);
        ck_assert_double_eq_tol(a.from, around[i].from, 1e-6 * fabs(around[i].from) + 1e-12);
        ck_assert_double_eq_tol(a.to, around[i].to, 1e-6 * fabs(around[i].to) + 1e-12);
        ck_assert_int_eq(a.logarithmic, around[i].logarithmic);
    }
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("ticks");
    tcase_add_loop_test(tests, ticks_are_these, 0, COUNT(rows));
    tcase_add_test(tests, labels_keep_apart_and_say_where_they_stand);
    tcase_add_test(tests, places_are_where_they_should_be);
    tcase_add_test(tests, axes_have_room_around_what_they_show);
    return run_suite("report/ticks", tests);
}
