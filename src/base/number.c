/* number.c - numbers to text and back, the same in every locale.
 *
 * The C library is only asked for digits: what it prints is taken apart, and what it reads has no
 * decimal mark left in it, so that no locale can have a say. */
#include "beamhours/base/number.h"

#include <errno.h>
#include <float.h>
#include <limits.h>
#include <math.h>
#include <stdbool.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

enum {
    MOST_DIGITS = 17,      /* always enough to read back */
    SURE_DIGITS = DBL_DIG, /* a normal double keeps this many */
    PLAIN_FROM = -4,       /* powers of ten written without an exponent */
    PLAIN_TO = 15,
    PLAIN_ZEROS = 6,         /* that may be filled in before the decimal mark */
    SIGNIFICANT = 800,       /* digits beyond these matter only by not being zero */
    EXPONENT_LIMIT = 1000000 /* beyond every double, far from overflow */
};

/* A decimal number: the digits of d.ddd and the power of ten of the first. */
struct decimal {
    char digits[MOST_DIGITS + 1];
    int count, power;
    bool negative;
};

static int limit(int x, int least, int most)
{
    return x < least ? least : x > most ? most : x;
}

/* `value` rounded to `count` digits. */
static struct decimal rounded(double value, int count)
{
    struct decimal d = {.negative = signbit(value) != 0};
    char text[BH_NUMBER_SIZE];
    (void)snprintf(text, sizeof text, "%.*e", count - 1, fabs(value));
    const char *t = text;
    for (; *t && *t != 'e'; t++)
        if (*t >= '0' && *t <= '9' && d.count < MOST_DIGITS)
            d.digits[d.count++] = *t;
    d.power = *t ? (int)strtol(t + 1, NULL, 10) : 0;
    return d;
}

static bool reads_back(const struct decimal *d, double value)
{
    char text[BH_NUMBER_SIZE];
    (void)snprintf(text, sizeof text, "%se%d", d->digits, d->power - (d->count - 1));
    return strtod(text, NULL) == fabs(value);
}

static struct decimal shortest(double value)
{
    int count = fabs(value) < DBL_MIN ? 1 : SURE_DIGITS;
    struct decimal d = rounded(value, count);
    while (count < MOST_DIGITS && !reads_back(&d, value))
        d = rounded(value, ++count);
    while (d.count > 1 && d.digits[d.count - 1] == '0')
        d.digits[--d.count] = '\0';
    return d;
}

/* The digits with the mark after the first `whole` of them; zeros fill what is not there. */
static size_t point_at(const struct decimal *d, int whole, char *out)
{
    size_t n = 0;
    if (whole <= 0) {
        out[n++] = '0';
        out[n++] = '.';
    }
    for (int i = whole; i < 0; i++)
        out[n++] = '0';
    for (int i = 0; i < d->count; i++) {
        if (i == whole && i > 0)
            out[n++] = '.';
        out[n++] = d->digits[i];
    }
    for (int i = d->count; i < whole; i++)
        out[n++] = '0';
    return n;
}

static size_t lay_out(const struct decimal *d, char *out, size_t size)
{
    char text[BH_NUMBER_SIZE];
    size_t n = 0;
    if (d->negative)
        text[n++] = '-';
    if (d->power >= PLAIN_FROM && d->power <= PLAIN_TO && d->power + 1 - d->count <= PLAIN_ZEROS) {
        n += point_at(d, d->power + 1, text + n);
        text[n] = '\0';
    } else {
        n += point_at(d, 1, text + n);
        n += (size_t)snprintf(text + n, sizeof text - n, "e%+03d", d->power);
    }
    if (n >= size) {
        if (size > 0)
            out[0] = '\0';
        return 0;
    }
    memcpy(out, text, n + 1);
    return n;
}

static size_t no_number(double value, char *out, size_t size)
{
    const char *word = isnan(value) ? "nan" : value > 0 ? "inf" : "-inf";
    const size_t n = strlen(word);
    if (n >= size) {
        if (size > 0)
            out[0] = '\0';
        return 0;
    }
    memcpy(out, word, n + 1);
    return n;
}

size_t bh_number_print(double value, char *out, size_t size)
{
    if (!isfinite(value))
        return no_number(value, out, size);
    const struct decimal d = shortest(value);
    return lay_out(&d, out, size);
}

size_t bh_number_digits(double value, int digits, char *out, size_t size)
{
    if (!isfinite(value))
        return no_number(value, out, size);
    struct decimal d = rounded(value, limit(digits, 1, MOST_DIGITS));
    if (value == 0)
        d.negative = false;
    return lay_out(&d, out, size);
}

/* --- reading --- */

/* A number as it is read: significant digits without a mark, and where the mark would be. */
struct reading {
    char digits[SIGNIFICANT + 32]; /* room for the exponent too */
    size_t count;
    int power;  /* of the last digit kept */
    bool found; /* at least one digit, be it 0 */
};

static bool is_digit(char c)
{
    return c >= '0' && c <= '9';
}

static void keep(struct reading *r, char digit, bool fraction)
{
    r->found = true;
    if (r->count == 0 && digit == '0') { /* a leading zero */
        r->power -= fraction && r->power > -EXPONENT_LIMIT;
    } else if (r->count < SIGNIFICANT) {
        r->digits[r->count++] = digit;
        r->power -= fraction && r->power > -EXPONENT_LIMIT;
    } else { /* too far down to count, but it may break a tie */
        if (digit != '0')
            r->digits[SIGNIFICANT - 1] = r->digits[SIGNIFICANT - 1] == '0' ? '1' : '9';
        r->power += !fraction && r->power < EXPONENT_LIMIT;
    }
}

static const char *read_digits(const char *t, struct reading *r)
{
    bool fraction = false;
    for (; is_digit(*t) || (*t == '.' && !fraction); t++) {
        if (*t == '.')
            fraction = true;
        else
            keep(r, *t, fraction);
    }
    return t;
}

static const char *read_exponent(const char *t, struct reading *r)
{
    const char *e = t;
    if (*e != 'e' && *e != 'E')
        return t;
    e++;
    const bool negative = *e == '-';
    e += *e == '-' || *e == '+';
    if (!is_digit(*e))
        return t;
    int power = 0;
    for (; is_digit(*e); e++)
        power = power < EXPONENT_LIMIT ? power * 10 + (*e - '0') : power;
    r->power += negative ? -power : power;
    return e;
}

bh_code bh_number_parse(const char *text, const char **end, double *out)
{
    struct reading r = {.count = 0};
    const bool negative = *text == '-';
    const char *t = read_digits(text + (*text == '-' || *text == '+'), &r);
    if (!r.found)
        return BH_EPLAN;
    t = read_exponent(t, &r);
    if (end)
        *end = t;
    double value = 0;
    if (r.count > 0) {
        (void)snprintf(r.digits + r.count, sizeof r.digits - r.count, "e%d", r.power);
        const int before = errno;
        value = strtod(r.digits, NULL);
        errno = before; /* the value says it all */
        if (!isfinite(value) || value == 0)
            return BH_EDOMAIN;
    }
    *out = negative ? -value : value;
    return BH_OK;
}
