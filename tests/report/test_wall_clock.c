/* test_wall_clock.c - dates against the calendar of the C library, and what is no date. */
#define _DEFAULT_SOURCE /* timegm */
#include "../suite.h"

#include <string.h>
#include <time.h>

#include "beamhours/report/wall_clock.h"

static const struct {
    const char *start;
    double hours;
    const char *end;
} moments[] = {
    {"2026-03-01 08:00", 0, "2026-03-01 08:00"},
    {"2026-02-28 23:59", 1 / 60.0, "2026-03-01 00:00"},
    {"2028-02-28 12:00", 24, "2028-02-29 12:00"},
    {"2100-02-28 12:00", 24, "2100-03-01 12:00"},
    {"2000-02-28 12:00", 24, "2000-02-29 12:00"},
    {"2026-12-31 20:00", 8.5, "2027-01-01 04:30"},
    {"1970-01-01 00:00", 0.0083, "1970-01-01 00:00"},
    {"2026-03-01 08:00", 0.0084, "2026-03-01 08:01"},
};

START_TEST(time_goes_on)
{
    long long start = -1;
    char end[BH_WALL_SIZE];
    bh_error err;
    ck_assert_int_eq(bh_wall_read(moments[_i].start, &start, &err), BH_OK);
    bh_wall_print(start, moments[_i].hours, end);
    ck_assert_str_eq(end, moments[_i].end);
}
END_TEST

/* One date in each of many months, as the C library has it. */
START_TEST(dates_are_those_of_the_library)
{
    for (long long t = 0; t < 8000000000; t += 2345678 * 60LL) {
        const time_t seconds = (time_t)t;
        struct tm tm;
        char wanted[64], got[BH_WALL_SIZE];
        long long minutes = -1;
        bh_error err;
        gmtime_r(&seconds, &tm);
        strftime(wanted, sizeof wanted, "%Y-%m-%d %H:%M", &tm);
        ck_assert_int_eq(bh_wall_read(wanted, &minutes, &err), BH_OK);
        ck_assert_int_eq(minutes, t / 60);
        bh_wall_print(0, (double)t / 3600.0, got);
        ck_assert_str_eq(got, wanted);
    }
}
END_TEST

static const char *const wrong[] = {"",
                                    "2026-03-01",
                                    "2026-03-01 8:00",
                                    "2026-13-01 08:00",
                                    "2026-02-29 08:00",
                                    "2026-00-10 08:00",
                                    "2026-04-31 08:00",
                                    "2026-03-01 24:00",
                                    "2026-03-01 08:60",
                                    "1969-03-01 08:00",
                                    "2026-03-01T08:00",
                                    "2026-03-01 08:00 ",
                                    "tomorrow",
                                    "2026-03-00 08:00"};

START_TEST(what_is_no_date_is_refused)
{
    long long minutes = -1;
    bh_error err = {.text = ""};
    ck_assert_int_eq(bh_wall_read(wrong[_i], &minutes, &err), BH_EDOMAIN);
    ck_assert_int_eq(minutes, -1);
    ck_assert_ptr_nonnull(strstr(err.text, "2026-03-01 08:00"));
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("wall clock");
    tcase_add_loop_test(tests, time_goes_on, 0, COUNT(moments));
    tcase_add_test(tests, dates_are_those_of_the_library);
    tcase_add_loop_test(tests, what_is_no_date_is_refused, 0, COUNT(wrong));
    return run_suite("report/wall_clock", tests);
}
