/* slip.c - commas, thousands marks and powers of ten as people write them, and what to write. */
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/units/unit.h"

enum { GROUP = 3 }; /* digits between thousands marks */

static bool is_digit(char c)
{
    return c >= '0' && c <= '9';
}

static size_t digits(const char *text)
{
    size_t n = 0;
    while (is_digit(text[n]))
        n++;
    return n;
}

static const char *skip_blanks(const char *text)
{
    while (*text == ' ')
        text++;
    return text;
}

/* A text that is put together piece by piece; what does not fit is left out. */
typedef struct {
    char *text;
    size_t length;
} pieces;

static void add(pieces *to, const char *from, size_t length)
{
    for (size_t i = 0; i < length && to->length + 1 < BH_PLAIN_SIZE; i++)
        to->text[to->length++] = from[i];
    to->text[to->length] = '\0';
}

static void add_rest(pieces *to, const char *from)
{
    add(to, from, strlen(from));
}

/* Is there one mark and a group of three digits?  Marks: , ' _ and a blank. */
static bool group_follows(const char *at)
{
    return (*at == ',' || *at == '\'' || *at == '_' || *at == ' ') && digits(at + 1) == GROUP;
}

/* "1 000 000.5 h" -> "1000000.5 h". */
static const char *join_groups(const char *at, pieces *to)
{
    while (group_follows(at)) {
        add(to, at + 1, GROUP);
        at += 1 + GROUP;
    }
    return at;
}

static bool thousands(const char *whole, const char *from, const char *to, bh_slip *out)
{
    if (!group_follows(to))
        return false;
    pieces fix = {out->fix, 0};
    add(&fix, whole, (size_t)(to - whole));
    const char *rest = join_groups(to, &fix);
    add_rest(&fix, rest);
    out->kind = BH_SLIP_THOUSANDS;
    if (*to != ',' || rest != to + 1 + GROUP || *rest == '.')
        return true;
    /* One comma and three digits: it may be either. */
    pieces other = {out->other, 0};
    add(&other, whole, (size_t)(to - whole));
    add_rest(&other, ".");
    add_rest(&other, to + 1);
    const char *first = from + (*from == '-' || *from == '+');
    out->kind = BH_SLIP_COMMA;
    if (*first == '0' || to - first > GROUP || memchr(first, '.', (size_t)(to - first)))
        return false; /* 0,125 and 1234,567 have decimal commas */
    return true;
}

/* "1.234,5 mm" -> "1234.5 mm": a point before a decimal comma marks thousands. */
static bool decimal_comma(const char *whole, const char *from, const char *to, bh_slip *out)
{
    if (*to != ',' || !is_digit(to[1]))
        return false;
    pieces fix = {out->fix, 0};
    add(&fix, whole, (size_t)(from - whole));
    for (const char *p = from; p < to; p++)
        if (*p != '.')
            add(&fix, p, 1);
    add_rest(&fix, ".");
    for (const char *p = to + 1; *p; p++) /* an uncertainty has one as well */
        add(&fix, *p == ',' && is_digit(p[-1]) && is_digit(p[1]) ? "." : p, 1);
    out->kind = BH_SLIP_DECIMAL_COMMA;
    return true;
}

/* The exponent in "^13" or "**13", behind a ten; NULL when there is none. */
static const char *raised(const char *at)
{
    at = skip_blanks(at);
    if (*at == '^')
        at++;
    else if (at[0] == '*' && at[1] == '*')
        at += 2;
    else
        return NULL;
    at = skip_blanks(at);
    const char *number = at + (*at == '-' || *at == '+');
    return is_digit(*number) ? at : NULL;
}

/* The exponent in " x 10^13", "*10^13", " 10^13", " e13"; NULL when there is none. */
static const char *spelt_exponent(const char *to)
{
    const char *at = skip_blanks(to);
    if (at > to && (*at == 'e' || *at == 'E')) {
        const char *number = at + 1 + (at[1] == '-' || at[1] == '+');
        return is_digit(*number) ? at + 1 : NULL;
    }
    if (*at == 'x' || *at == 'X' || *at == '*')
        at = skip_blanks(at + 1);
    if (at == to || strncmp(at, "10", 2) != 0)
        return NULL;
    return raised(at + 2);
}

static bool is_ten(const char *from, const char *to)
{
    return to - from == 2 && strncmp(from, "10", 2) == 0;
}

/* In "2.0 ± 0.1 x 10^18" the power belongs to both numbers: a bare number, ±, `from`. */
static bool shares_power(const char *whole, const char *from)
{
    const char *end;
    double value;
    if (whole == from || bh_number_parse(whole, &end, &value) != BH_OK)
        return false;
    const bool plain = !memchr(whole, 'e', (size_t)(end - whole));
    return plain && *skip_blanks(end) == BH_PLUS_MINUS;
}

static bool power_of_ten(const char *whole, const char *from, const char *to, bh_slip *out)
{
    const bool ten = is_ten(from, to) && raised(to);
    const char *exponent = ten ? raised(to) : spelt_exponent(to);
    if (!exponent)
        return false;
    const bool both = !ten && shares_power(whole, from);
    pieces fix = {out->fix, 0};
    add_rest(&fix, both ? "(" : "");
    add(&fix, whole, (size_t)((ten ? from : to) - whole));
    add_rest(&fix, ten ? "1" : "");
    add_rest(&fix, both ? ")e" : "e");
    add_rest(&fix, exponent + (*exponent == '+'));
    out->kind = BH_SLIP_POWER_OF_TEN;
    return true;
}

bool bh_slip_find(const char *whole, const char *from, const char *to, bh_slip *out)
{
    out->kind = BH_SLIP_NONE;
    if (thousands(whole, from, to, out) || decimal_comma(whole, from, to, out) ||
        power_of_ten(whole, from, to, out))
        return true;
    out->kind = BH_SLIP_NONE;
    return false;
}
