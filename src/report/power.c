/* power.c - numbers with a power of ten are found by their letters: the values stay as they are. */
#include "beamhours/report/power.h"

#include <stdlib.h>
#include <string.h>

static const char decimal[] = "0123456789";

enum { MOST_POWER = 3 /* digits */ };

static bool ends(char c)
{
    return c == '\0' || strchr(" )],;", c) != NULL;
}

/* Of a number that begins at `at`. */
static bool read_power(const char *at, bh_power *out)
{
    const char *c = at + (*at == '-');
    const size_t before = strspn(c, decimal);
    c += before;
    c += before > 0 && *c == '.' ? 1 + strspn(c + 1, decimal) : 0;
    const size_t factor = (size_t)(c - at);
    if (before == 0 || (*c != 'e' && *c != 'E'))
        return false;
    c++;
    const char *power = c;
    c += *c == '-' || *c == '+';
    const size_t digits = strspn(c, decimal);
    if (digits == 0 || digits > MOST_POWER || !ends(c[digits]))
        return false;
    *out = (bh_power){at, factor, (size_t)(c + digits - at), (int)strtol(power, NULL, 10)};
    return true;
}

static bool find_from(const char *text, const char *from, bh_power *out)
{
    for (const char *c = from; *c; c++)
        if ((c == text || strchr(" ([", c[-1])) && read_power(c, out))
            return true;
    return false;
}

static bool is_command(const char *text)
{
    static const char name[] = "beamhours ";
    return strncmp(text, name, sizeof name - 1) == 0;
}

bool bh_power_find(const char *text, bh_power *out)
{
    return !is_command(text) && find_from(text, text, out);
}

void bh_power_set(const char *text, const bh_power_style *style, bh_text *out)
{
    bh_power p;
    const char *from = text;
    while (!is_command(text) && find_from(text, from, &p)) {
        style->words(from, (size_t)(p.at - from), out);
        style->power(p.at, p.factor, p.power, out);
        from = p.at + p.length;
    }
    style->words(from, strlen(from), out);
}

static void as_it_is(const char *text, size_t length, bh_text *out)
{
    bh_text_append_bytes(out, text, length);
}

static void raised(const char *factor, size_t length, int power, bh_text *out)
{
    static const char *const digits[] = {"⁰", "¹", "²", "³", "⁴", "⁵", "⁶", "⁷", "⁸", "⁹"};
    bh_text plain = {0};
    bh_text_append_bytes(out, factor, length);
    bh_text_append(out, "\u00A0×\u00A010"); /* in one line */
    bh_text_appendf(&plain, "%d", power);
    for (const char *c = plain.bytes; c && *c; c++)
        bh_text_append(out, *c == '-' ? "⁻" : digits[*c - '0']);
    out->failed |= plain.failed;
    bh_text_free(&plain);
}

void bh_power_raise(const char *text, bh_text *out)
{
    static const bh_power_style style = {as_it_is, raised};
    bh_power_set(text, &style, out);
}
