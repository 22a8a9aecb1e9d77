/* wall_clock.c - days are counted one year and month after the other. */
#include "beamhours/report/wall_clock.h"

#include <math.h>
#include <stdbool.h>
#include <stdio.h>

enum { FIRST_YEAR = 1970, LAST_YEAR = 9999, DAY = 24 * 60 };

static bool leap(long year)
{
    return (year % 4 == 0 && year % 100 != 0) || year % 400 == 0;
}

static int days_of(long year, int month)
{
    static const int days[] = {31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31};
    return days[month - 1] + (month == 2 && leap(year));
}

/* So many digits as a number. */
static int digits(const char *text, int count)
{
    int value = 0;
    for (int i = 0; i < count; i++)
        value = 10 * value + (text[i] - '0');
    return value;
}

static bool has_form(const char *text)
{
    static const char form[] = "dddd-dd-dd dd:dd";
    for (size_t i = 0; i < sizeof form; i++)
        if (form[i] == 'd' ? text[i] < '0' || text[i] > '9' : text[i] != form[i])
            return false;
    return true;
}

struct date {
    int year, month, day;
};

static long long minutes_of(const struct date *d)
{
    long long days = d->day - 1;
    for (int y = FIRST_YEAR; y < d->year; y++)
        days += leap(y) ? 366 : 365;
    for (int m = 1; m < d->month; m++)
        days += days_of(d->year, m);
    return days * DAY;
}

bh_code bh_wall_read(const char *text, long long *minutes, bh_error *err)
{
    const bool fits = has_form(text);
    const int year = fits ? digits(text, 4) : 0, month = fits ? digits(text + 5, 2) : 0;
    const int day = fits ? digits(text + 8, 2) : 0;
    const int hour = fits ? digits(text + 11, 2) : 0, minute = fits ? digits(text + 14, 2) : 0;
    if (year < FIRST_YEAR || month < 1 || month > 12 || day < 1 || day > days_of(year, month) ||
        hour > 23 || minute > 59)
        return bh_fail(err, BH_EDOMAIN,
                       "\"%.40s\" is no date and time; write it as 2026-03-01 08:00", text);
    *minutes = minutes_of(&(struct date){year, month, day}) + hour * 60LL + minute;
    return BH_OK;
}

void bh_wall_print(long long start, double hours, char out[BH_WALL_SIZE])
{
    const long long now = start + llround(hours * 60.0);
    long long day = now / DAY;
    const int minute = (int)(now % DAY);
    long year = FIRST_YEAR;
    int month = 1;
    for (; day >= (leap(year) ? 366 : 365) && year <= LAST_YEAR; year++)
        day -= leap(year) ? 366 : 365;
    for (; month < 12 && day >= days_of(year, month); month++)
        day -= days_of(year, month);
    (void)snprintf(out, BH_WALL_SIZE, "%04ld-%02d-%02lld %02d:%02d", year, month, day + 1,
                   minute / 60, minute % 60);
}
