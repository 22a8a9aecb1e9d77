/* quantity.c - "20.0 ± 0.2 uA" to number, unit and uncertainty, or a sentence that says why not. */
#include "beamhours/units/quantity.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/base/sentences.h"
#include "beamhours/units/unit.h"

enum { SHOWN = 96 }; /* bytes of a text that a sentence repeats */

static const double zero_celsius = 273.15; /* [K] exact; SI definition of the degree Celsius */

static const char *const names[] = {
#define BH_DIM_NAME(id, name, unit, examples) (name),
    BH_DIMENSIONS(BH_DIM_NAME)
#undef BH_DIM_NAME
};
static const char *const examples[] = {
#define BH_DIM_EXAMPLES(id, name, unit, examples) (examples),
    BH_DIMENSIONS(BH_DIM_EXAMPLES)
#undef BH_DIM_EXAMPLES
};

typedef struct {
    const char *from, *to; /* within the plain text; NULL when absent */
} span;

/* A quantity cut into its parts. */
typedef struct {
    span value, sigma, unit, sigma_unit;
    int power; /* of the ten behind a bracket */
} parts;

/* What a reading needs to know to complain. */
typedef struct {
    bh_dimension dimension;
    bh_error *err;
    char plain[BH_PLAIN_SIZE];
    char shown[SHOWN + 8]; /* the text, cut if it is long */
} reading;

/* A text in a form that can be repeated: short, no control characters, ± as such. */
static const char *show(const char *text, char out[SHOWN + 8])
{
    size_t n = 0;
    for (; *text && n < SHOWN; text++) {
        if (*text == BH_PLUS_MINUS) {
            out[n++] = '\302';
            out[n++] = '\261';
        } else {
            out[n] = *text;
            if ((unsigned char)*text < 0x20 || *text == 0x7f)
                out[n] = '?';
            n++;
        }
    }
    if (*text) {
        while (n > 0 && ((unsigned char)out[n - 1] & 0xc0) == 0x80)
            n--; /* not within a code point */
        n -= n > 0 && (unsigned char)out[n - 1] >= 0xc0;
        memcpy(out + n, "...", 3);
        n += 3;
    }
    out[n] = '\0';
    return out;
}

static const char *name_of(const reading *r)
{
    return names[r->dimension];
}

static const char *units_of(const reading *r)
{
    return examples[r->dimension];
}

/* --- complaints --- */

static bh_code no_number(const reading *r)
{
    return bh_fail(r->err, BH_EPLAN, BH_SAY_NO_NUMBER, r->shown, name_of(r), units_of(r));
}

static bh_code no_quantity(const reading *r)
{
    return bh_fail(r->err, BH_EPLAN, BH_SAY_NO_QUANTITY, r->shown, name_of(r), units_of(r));
}

static bh_code out_of_range(const reading *r)
{
    return bh_fail(r->err, BH_EPLAN, BH_SAY_OUT_OF_RANGE, r->shown, name_of(r), units_of(r));
}

static bh_code sigma_unit(const reading *r)
{
    return bh_fail(r->err, BH_EPLAN, BH_SAY_SIGMA_UNIT, r->shown, name_of(r), units_of(r));
}

static bh_code slipped(const reading *r, const bh_slip *slip)
{
    char fix[SHOWN + 8], other[SHOWN + 8];
    (void)show(slip->fix, fix);
    switch (slip->kind) {
    case BH_SLIP_DECIMAL_COMMA:
        return bh_fail(r->err, BH_EPLAN, BH_SAY_DECIMAL_COMMA, r->shown, fix);
    case BH_SLIP_COMMA:
        (void)show(slip->other, other);
        return bh_fail(r->err, BH_EPLAN, BH_SAY_COMMA, r->shown, other, fix);
    case BH_SLIP_THOUSANDS:
        return bh_fail(r->err, BH_EPLAN, BH_SAY_THOUSANDS, r->shown, fix);
    case BH_SLIP_POWER_OF_TEN:
    case BH_SLIP_NONE:
        break;
    }
    return bh_fail(r->err, BH_EPLAN, BH_SAY_POWER_OF_TEN, r->shown, fix);
}

/* A share without %: 0.97 was meant as 97 %, 5 as 5 %, and 1 as either. */
static bh_code no_unit(const reading *r, const parts *p)
{
    const bh_unit whole = {.factor = 1}, hundredth = {.decade = 2, .factor = 1};
    double value, percent;
    const bool share = r->dimension == BH_DIM_SHARE && !p->power &&
                       bh_number_in(p->value.from, p->value.to, &whole, &value) == BH_OK &&
                       bh_number_in(p->value.from, p->value.to, &hundredth, &percent) == BH_OK &&
                       percent > 0.0 && value <= 100.0;
    if (!share)
        return bh_fail(r->err, BH_EPLAN, BH_SAY_NO_UNIT, r->shown, name_of(r), units_of(r));
    char number[BH_NUMBER_SIZE];
    (void)bh_number_print(value > 1.0 ? value : percent, number, sizeof number);
    return bh_fail(r->err, BH_EPLAN, BH_SAY_BARE_SHARE, r->shown, value == 1.0 ? "1 % or " : "",
                   number);
}

static bh_code unknown_unit(const reading *r, const char *odd)
{
    char shown[SHOWN + 8];
    (void)show(odd, shown);
    const char *meant = bh_unit_suggest(odd, r->dimension);
    if (strchr("-+.,0123456789", odd[0])) /* a second number: "5 - 10 mm" */
        return no_quantity(r);
    if (strpbrk(odd, "/*^() 0123456789.,+-")) /* known symbols in an order that makes no sense */
        return bh_fail(r->err, BH_EPLAN, BH_SAY_WRONG_UNIT, r->shown, shown, name_of(r),
                       units_of(r));
    if (!meant)
        return bh_fail(r->err, BH_EPLAN, BH_SAY_UNKNOWN_UNIT, r->shown, shown, name_of(r),
                       units_of(r));
    return bh_fail(r->err, BH_EPLAN, BH_SAY_MISSPELT_UNIT, r->shown, shown, meant, name_of(r),
                   units_of(r));
}

static bh_code wrong_dimension(const reading *r, const span *unit, const bh_unit *known)
{
    char text[BH_PLAIN_SIZE], shown[SHOWN + 8];
    (void)snprintf(text, sizeof text, "%.*s", (int)(unit->to - unit->from), unit->from);
    if (r->dimension == BH_DIM_TEMPERATURE && strcmp(text, "C") == 0)
        return bh_fail(r->err, BH_EPLAN, BH_SAY_COULOMB, r->shown, name_of(r), units_of(r));
    const char *measured = bh_unit_measures(known);
    bh_unit areal = *known;
    if (r->dimension == BH_DIM_LENGTH && bh_unit_convert(&areal, BH_DIM_AREAL_DENSITY))
        return bh_fail(r->err, BH_EPLAN, BH_SAY_AREAL_DENSITY, r->shown, units_of(r));
    if (measured)
        return bh_fail(r->err, BH_EPLAN, BH_SAY_WRONG_DIMENSION, r->shown, measured, name_of(r),
                       units_of(r));
    return bh_fail(r->err, BH_EPLAN, BH_SAY_WRONG_UNIT, r->shown, show(text, shown), name_of(r),
                   units_of(r));
}

/* --- cutting --- */

static const char *skip_blanks(const char *text)
{
    while (*text == ' ')
        text++;
    return text;
}

/* Takes a number off the text; complains when there is none or what follows shows a slip. */
static bh_code take_number(const reading *r, const char **at, span *out)
{
    double ignored;
    bh_slip slip;
    out->from = *at;
    const bh_code code = bh_number_parse(*at, &out->to, &ignored);
    if (code != BH_OK && code != BH_EDOMAIN)
        return *at == r->plain ? no_number(r) : no_quantity(r);
    if (bh_slip_find(r->plain, out->from, out->to, &slip))
        return slipped(r, &slip);
    *at = skip_blanks(out->to);
    return BH_OK;
}

/* A unit: all up to ± or the end, without the blanks before that. */
static void take_unit(const char **at, span *out)
{
    const char *end = *at + strcspn(*at, (const char[]){BH_PLUS_MINUS, '\0'});
    const char *to = end;
    while (to > *at && to[-1] == ' ')
        to--;
    if (to > *at)
        *out = (span){*at, to};
    *at = end;
}

/* The e18 behind a bracket, if there is one. */
static bool take_power(const char **at, int *power)
{
    const char *p = *at;
    if (*p != 'e' && *p != 'E')
        return true;
    const bool negative = p[1] == '-';
    p += 1 + (negative || p[1] == '+');
    const size_t digits = strspn(p, "0123456789");
    if (digits < 1 || digits > 4)
        return false;
    for (*at = p + digits; p < *at; p++)
        *power = 10 * *power + (*p - '0');
    *power = negative ? -*power : *power;
    return true;
}

/* "2.0 ± 0.1" within brackets. */
static bh_code take_pair(const reading *r, const char **at, parts *out)
{
    const bh_code code = take_number(r, at, &out->value);
    if (code || **at != BH_PLUS_MINUS)
        return code;
    *at = skip_blanks(*at + 1);
    return take_number(r, at, &out->sigma);
}

/* "(2.0 ± 0.1)e18 /cm2": what stands behind the opening bracket. */
static bh_code take_bracket(const reading *r, const char *at, parts *out)
{
    bh_slip slip;
    at = skip_blanks(at);
    const bh_code code = take_pair(r, &at, out);
    if (code)
        return code;
    if (*at++ != ')')
        return no_quantity(r);
    if (bh_slip_find(r->plain, r->plain, at, &slip))
        return slipped(r, &slip);
    if (!take_power(&at, &out->power))
        return no_quantity(r);
    at = skip_blanks(at);
    take_unit(&at, &out->unit);
    return *at ? no_quantity(r) : BH_OK;
}

static bh_code cut(const reading *r, parts *out)
{
    const char *at = r->plain;
    if (*at == '(')
        return take_bracket(r, at + 1, out);
    bh_code code = take_number(r, &at, &out->value);
    if (code)
        return code;
    take_unit(&at, &out->unit);
    if (*at != BH_PLUS_MINUS)
        return BH_OK;
    at = skip_blanks(at + 1);
    code = take_number(r, &at, &out->sigma);
    if (code)
        return code;
    take_unit(&at, out->unit.from ? &out->sigma_unit : &out->unit);
    return *at ? no_quantity(r) : BH_OK;
}

/* --- reading --- */

static bh_code read_unit(const reading *r, const span *from, bh_unit *out)
{
    char odd[BH_PLAIN_SIZE];
    if (!bh_unit_parse(from->from, from->to, out, odd))
        return unknown_unit(r, odd);
    return BH_OK;
}

/* 1 % of 20 uA, computed on the 20 so that few digits stay few: 0.2 uA, not 0.20000000000000001. */
static bh_code read_relative(const parts *p, const bh_unit *share, const bh_unit *of_value,
                             double *out)
{
    const bh_unit one = {.factor = 1};
    bh_unit percent = *share;
    char text[BH_NUMBER_SIZE];
    double value, part;
    percent.decade += 2;
    if (bh_number_in(p->value.from, p->value.to, &one, &value) ||
        bh_number_in(p->sigma.from, p->sigma.to, &percent, &part))
        return BH_EDOMAIN;
    const size_t n = bh_number_print(fabs(value) * part / 100.0, text, sizeof text);
    return bh_number_in(text, text + n, of_value, out);
}

/* The uncertainty has a unit of its own: that of the value, another of its kind, or %. */
static bh_code read_own_sigma(const reading *r, const parts *p, const bh_unit *of_value,
                              bh_quantity *out)
{
    bh_unit unit;
    if (!p->sigma_unit.from)
        return sigma_unit(r);
    bh_code code = read_unit(r, &p->sigma_unit, &unit);
    if (code)
        return code;
    const bool per_u = unit.power[BH_AXIS_NUCLEON] != 0;
    bh_unit share = unit;
    const bool same = bh_unit_convert(&unit, r->dimension);
    if (same && per_u == out->per_u) {
        code = bh_number_in(p->sigma.from, p->sigma.to, &unit, &out->uncertainty);
        return code ? out_of_range(r) : BH_OK;
    }
    if (same || !bh_unit_convert(&share, BH_DIM_SHARE))
        return sigma_unit(r);
    if (of_value->celsius)
        return bh_fail(r->err, BH_EPLAN, BH_SAY_SHARE_OF_DEGC, r->shown);
    code = read_relative(p, &share, of_value, &out->uncertainty);
    return code ? out_of_range(r) : BH_OK;
}

static bh_code read_sigma(const reading *r, const parts *p, const bh_unit *unit, bh_quantity *out)
{
    bh_code code = BH_OK;
    out->uncertain = true;
    if (p->sigma.to > p->sigma.from && *p->sigma.from == '-')
        return bh_fail(r->err, BH_EPLAN, BH_SAY_NEGATIVE_SIGMA, r->shown);
    const bool shared = p->unit.from > p->sigma.from;
    if (!shared)
        code = read_own_sigma(r, p, unit, out);
    else if (bh_number_in(p->sigma.from, p->sigma.to, unit, &out->uncertainty))
        code = out_of_range(r);
    return code;
}

static bh_code read_parts(const reading *r, const parts *p, bh_quantity *out)
{
    bh_unit unit;
    if (!p->unit.from)
        return no_unit(r, p);
    bh_code code = read_unit(r, &p->unit, &unit);
    if (code)
        return code;
    const bh_unit written = unit;
    if (!bh_unit_convert(&unit, r->dimension))
        return wrong_dimension(r, &p->unit, &written);
    unit.decade += p->power;
    if (bh_number_in(p->value.from, p->value.to, &unit, &out->value))
        return out_of_range(r);
    if (unit.celsius)
        out->value += zero_celsius;
    out->per_u = written.power[BH_AXIS_NUCLEON] != 0;
    return p->sigma.from ? read_sigma(r, p, &unit, out) : BH_OK;
}

bh_code bh_quantity_parse(const char *text, bh_dimension dimension, bh_quantity *out, bh_error *err)
{
    reading r = {.dimension = dimension, .err = err};
    parts p = {.power = 0};
    bh_quantity q = {.value = 0.0};
    (void)show(text, r.shown);
    if (!bh_plain_text(text, r.plain)) {
        for (char *c = r.shown; *c; c++) /* it may be no UTF-8 */
            if ((unsigned char)*c >= 0x80)
                *c = '?';
        return no_quantity(&r);
    }
    bh_code code = cut(&r, &p);
    if (code == BH_OK)
        code = read_parts(&r, &p, &q);
    if (code == BH_OK)
        *out = q;
    return code;
}
