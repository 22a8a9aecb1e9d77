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

/* So many digits as a number; -1 when there are others. */
static int digits(const char *text, int count)
{
    int value = 0;
    for (int i = 0; i < count; i++) {
        if (text[i] < '0' || text[i] > '9')
            return -1;
        value = 10 * value + (text[i] - '0');
    }
    return value;
}

bh_code bh_wall_read(const char *text, long long *minutes, bh_error *err)
{
    static const char form[] = "dddd-dd-dd dd:dd";
    bool fits = true;
    for (int i = 0; fits && i < (int)sizeof form; i++)
        fits = form[i] == 'd' ? text[i] >= '0' && text[i] <= '9' : text[i] == form[i];
    const int year = fits ? digits(text, 4) : 0, month = fits ? digits(text + 5, 2) : 0;
    const int day = fits ? digits(text + 8, 2) : 0;
    const int hour = fits ? digits(text + 11, 2) : 0, minute = fits ? digits(text + 14, 2) : 0;
    if (year < FIRST_YEAR || month < 1 || month > 12 || day < 1 || day > days_of(year, month) ||
        hour > 23 || minute > 59)
        return bh_fail(err, BH_EDOMAIN,
                       "\"%.40s\" is no date and time; write it as 2026-03-01 08:00", text);
    long long count = day - 1;
    for (int y = FIRST_YEAR; y < year; y++)
        count += leap(y) ? 366 : 365;
    for (int m = 1; m < month; m++)
        count += days_of(year, m);
    *minutes = count * DAY + hour * 60 + minute;
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
