/* scale.c - numbers into units and out of them without losing a bit. */
#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/units/unit.h"

enum {
    EXPONENT_LIMIT = 100000, /* beyond every double, far from overflow */
    PLAIN_FROM = -3,         /* powers of ten written out: 0.001 */
    PLAIN_TO = 6             /* 1000000 */
};

static const char *find_exponent(const char *from, const char *to)
{
    while (from < to && *from != 'e' && *from != 'E')
        from++;
    return from;
}

static int read_exponent(const char *e, const char *to)
{
    if (e >= to)
        return 0;
    e++;
    const bool negative = *e == '-';
    e += *e == '-' || *e == '+';
    int n = 0;
    for (; e < to && n < EXPONENT_LIMIT; e++)
        n = 10 * n + (*e - '0');
    return negative ? -n : n;
}

bh_code bh_number_in(const char *from, const char *to, const bh_unit *unit, double *out)
{
    char text[BH_PLAIN_SIZE + 16];
    const char *e = find_exponent(from, to);
    if (e - from >= BH_PLAIN_SIZE)
        return BH_EPLAN;
    (void)snprintf(text, sizeof text, "%.*se%d", (int)(e - from), from,
                   read_exponent(e, to) + unit->decade);
    double value;
    const bh_code code = bh_number_parse(text, NULL, &value);
    if (code)
        return code;
    const double scaled = value * unit->factor + 0.0; /* -0 becomes 0 */
    if (!isfinite(scaled) || (scaled == 0.0) != (value == 0.0))
        return BH_EDOMAIN;
    *out = scaled;
    return BH_OK;
}

/* What bh_number_print or bh_number_digits wrote, taken apart. */
static bh_decimal take_apart(const char *text, int decade)
{
    bh_decimal d = {.negative = *text == '-'};
    bool fraction = false;
    const char *t = text + d.negative;
    for (; *t && *t != 'e'; t++) {
        if (*t == '.') {
            fraction = true;
            continue;
        }
        if (d.count == 0 && *t == '0') { /* a leading zero */
            d.power -= fraction;
            continue;
        }
        d.power += !fraction;
        if (d.count < (int)sizeof d.digits - 1)
            d.digits[d.count++] = *t;
    }
    d.power += read_exponent(t, t + strlen(t)) - decade - 1;
    while (d.count > 0 && d.digits[d.count - 1] == '0')
        d.count--;
    d.digits[d.count] = '\0';
    if (d.count == 0)
        d = (bh_decimal){.digits = "0", .count = 1};
    return d;
}

static bool reads_back(const bh_decimal *d, const bh_unit *unit, double value)
{
    char text[64];
    double read;
    const int n = bh_decimal_print(d, 0, text);
    return bh_number_in(text, text + n, unit, &read) == BH_OK && read == value;
}

bool bh_decimal_in(double value, const bh_unit *unit, bh_decimal *out)
{
    char text[BH_NUMBER_SIZE];
    const double quotient = value / unit->factor;
    if (!isfinite(quotient))
        return false;
    for (int digits = 15; unit->factor != 1.0 && digits <= 16; digits++) {
        (void)bh_number_digits(quotient, digits, text, sizeof text);
        *out = take_apart(text, unit->decade);
        if (reads_back(out, unit, value))
            return true;
    }
    /* The quotient was rounded: a neighbour may be the one. */
    const double tries[] = {quotient, nextafter(quotient, 0.0), nextafter(quotient, 2 * quotient)};
    for (size_t i = 0; i < sizeof tries / sizeof tries[0]; i++) {
        (void)bh_number_print(tries[i], text, sizeof text);
        *out = take_apart(text, unit->decade);
        if (reads_back(out, unit, value))
            return true;
    }
    return false;
}

/* The digits with the mark behind the first `whole` of them, zeros where there are none. */
static int lay_out(const bh_decimal *d, int whole, char *out)
{
    int n = 0;
    if (whole <= 0)
        n += sprintf(out, "0.%.*s", -whole, "000000");
    for (int i = 0; i < d->count || i < whole; i++) {
        if (i > 0 && i == whole)
            out[n++] = '.';
        if (i < d->count)
            out[n++] = d->digits[i];
        else
            out[n++] = '0';
    }
    out[n] = '\0';
    return n;
}

int bh_decimal_print(const bh_decimal *number, int shift, char out[64])
{
    const int power = number->power - shift;
    const bool zero = number->count == 1 && number->digits[0] == '0';
    int n = 0;
    if (number->negative)
        out[n++] = '-';
    if (zero || (power >= PLAIN_FROM && power <= PLAIN_TO))
        return n + lay_out(number, zero ? 1 : power + 1, out + n);
    n += lay_out(number, 1, out + n);
    return n + sprintf(out + n, "e%d", power);
}
