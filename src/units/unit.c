/* unit.c - unit expressions: symbols, products, quotients, powers. */
#include "beamhours/units/unit.h"

#include <math.h>
#include <string.h>

#include "beamhours/units/constants.h"

enum {
    MOST_POWER = 9,   /* of one symbol */
    MOST_NESTED = 4,  /* brackets in brackets */
    MOST_DECADE = 500 /* far beyond what a double holds */
};

#define ENERGY                \
    {                         \
        {                     \
            BH_AXIS_ENERGY, 1 \
        }                     \
    }
#define LENGTH                \
    {                         \
        {                     \
            BH_AXIS_LENGTH, 1 \
        }                     \
    }
#define AREA                  \
    {                         \
        {                     \
            BH_AXIS_LENGTH, 2 \
        }                     \
    }
#define TIME                \
    {                       \
        {                   \
            BH_AXIS_TIME, 1 \
        }                   \
    }
#define RATE                 \
    {                        \
        {                    \
            BH_AXIS_TIME, -1 \
        }                    \
    }
#define MASS                \
    {                       \
        {                   \
            BH_AXIS_MASS, 1 \
        }                   \
    }
#define CHARGE                \
    {                         \
        {                     \
            BH_AXIS_CHARGE, 1 \
        }                     \
    }
#define CURRENT              \
    {                        \
        {BH_AXIS_CHARGE, 1}, \
        {                    \
            BH_AXIS_TIME, -1 \
        }                    \
    }
#define ANGLE                \
    {                        \
        {                    \
            BH_AXIS_ANGLE, 1 \
        }                    \
    }
#define SOLID                      \
    {                              \
        {                          \
            BH_AXIS_SOLID_ANGLE, 1 \
        }                          \
    }
#define SHARE                \
    {                        \
        {                    \
            BH_AXIS_SHARE, 1 \
        }                    \
    }
#define PRESSURE                \
    {                           \
        {                       \
            BH_AXIS_PRESSURE, 1 \
        }                       \
    }
#define POWER                \
    {                        \
        {                    \
            BH_AXIS_POWER, 1 \
        }                    \
    }

/* Symbol, what it measures, its size as decade and factor of the internal units.  Conventional
 * atmosphere 101325 Pa and torr = atm / 760: exact by definition. */
static const struct {
    char symbol[5];
    struct {
        bh_axis axis;
        int power;
    } axes[2];
    int decade;
    double factor;
} symbols[] = {
    {"eV", ENERGY, -6, 1},
    {"keV", ENERGY, -3, 1},
    {"MeV", ENERGY, 0, 1},
    {"GeV", ENERGY, 3, 1},
    {"TeV", ENERGY, 6, 1},
    {"c", {{BH_AXIS_C, 1}}, 0, 1},
    {"u", {{BH_AXIS_NUCLEON, 1}}, 0, 1},
    {"m", LENGTH, 2, 1},
    {"cm", LENGTH, 0, 1},
    {"mm", LENGTH, -1, 1},
    {"um", LENGTH, -4, 1},
    {"nm", LENGTH, -7, 1},
    {"fm", LENGTH, -13, 1},
    {"kg", MASS, 3, 1},
    {"g", MASS, 0, 1},
    {"mg", MASS, -3, 1},
    {"ug", MASS, -6, 1},
    {"A", CURRENT, 0, 1},
    {"mA", CURRENT, -3, 1},
    {"uA", CURRENT, -6, 1},
    {"nA", CURRENT, -9, 1},
    {"pA", CURRENT, -12, 1},
    {"C", CHARGE, 0, 1},
    {"mC", CHARGE, -3, 1},
    {"uC", CHARGE, -6, 1},
    {"nC", CHARGE, -9, 1},
    {"Hz", RATE, 0, 1},
    {"mHz", RATE, -3, 1},
    {"kHz", RATE, 3, 1},
    {"MHz", RATE, 6, 1},
    {"GHz", RATE, 9, 1},
    {"Bq", RATE, 0, 1},
    {"kBq", RATE, 3, 1},
    {"MBq", RATE, 6, 1},
    {"GBq", RATE, 9, 1},
    {"s", TIME, 0, 1},
    {"ms", TIME, -3, 1},
    {"us", TIME, -6, 1},
    {"ns", TIME, -9, 1},
    {"min", TIME, 0, 60},
    {"h", TIME, 0, 3600},
    {"d", TIME, 0, 86400},
    {"wk", TIME, 0, 604800},
    {"rad", ANGLE, 0, 1},
    {"mrad", ANGLE, -3, 1},
    {"urad", ANGLE, -6, 1},
    {"deg", ANGLE, 0, BH_DEGREE},
    {"sr", SOLID, 0, 1},
    {"msr", SOLID, -3, 1},
    {"usr", SOLID, -6, 1},
    {"b", AREA, -24, 1},
    {"mb", AREA, -27, 1},
    {"ub", AREA, -30, 1},
    {"nb", AREA, -33, 1},
    {"pb", AREA, -36, 1},
    {"fb", AREA, -39, 1},
    {"%", SHARE, -2, 1},
    {"ppm", SHARE, -6, 1},
    {"ppb", SHARE, -9, 1},
    {"K", {{BH_AXIS_TEMPERATURE, 1}}, 0, 1},
    {"degC", {{BH_AXIS_TEMPERATURE, 1}}, 0, 1},
    {"Pa", PRESSURE, 0, 1},
    {"kPa", PRESSURE, 3, 1},
    {"MPa", PRESSURE, 6, 1},
    {"bar", PRESSURE, 5, 1},
    {"mbar", PRESSURE, 2, 1},
    {"atm", PRESSURE, 0, 101325},
    {"torr", PRESSURE, 0, 101325.0 / 760},
    {"W", POWER, 0, 1},
    {"kW", POWER, 3, 1},
    {"MW", POWER, 6, 1},
    {"T", {{BH_AXIS_FIELD, 1}}, 0, 1},
};
enum { SYMBOLS = sizeof symbols / sizeof symbols[0] };

/* --- reading --- */

typedef struct {
    const char *at, *end;
    bh_unit unit;
    char *odd;   /* the symbol that stopped the reading */
    int symbols; /* read so far */
    bool other_length;
} reader;

static bool is_digit(char c)
{
    return c >= '0' && c <= '9';
}

static bool is_symbol_char(char c)
{
    return ((c | 0x20) >= 'a' && (c | 0x20) <= 'z') || c == '%' || c == '_' || (c & 0x80) != 0;
}

static void skip_blanks(reader *r)
{
    while (r->at < r->end && *r->at == ' ')
        r->at++;
}

/* A power behind a symbol or a bracket, 1 where there is none; 0 when it is no sensible one. */
static int read_power(reader *r)
{
    const bool marked = r->at < r->end && *r->at == '^';
    const char *p = r->at + marked;
    const bool negative = p < r->end && *p == '-';
    p += negative || (marked && p < r->end && *p == '+');
    if (p >= r->end || !is_digit(*p))
        return marked || negative ? 0 : 1;
    int power = *p - '0';
    r->at = p + 1;
    if (power > MOST_POWER || (r->at < r->end && is_digit(*r->at)))
        return 0;
    return negative ? -power : power;
}

static void multiply(bh_unit *into, const bh_unit *by, int power)
{
    for (int axis = 0; axis < BH_AXES; axis++)
        into->power[axis] += by->power[axis] * power;
    into->decade += by->decade * power;
    for (int i = power < 0 ? -power : power; i > 0; i--)
        into->factor = power < 0 ? into->factor / by->factor : into->factor * by->factor;
}

static bool sane(const bh_unit *unit)
{
    return isfinite(unit->factor) && unit->factor > 0 && unit->decade > -MOST_DECADE &&
           unit->decade < MOST_DECADE;
}

static int find_symbol(const char *from, size_t length)
{
    for (int i = 0; i < SYMBOLS; i++)
        if (strlen(symbols[i].symbol) == length && strncmp(symbols[i].symbol, from, length) == 0)
            return i;
    return -1;
}

static bool read_symbol(reader *r, bh_unit *out)
{
    const char *from = r->at;
    while (r->at < r->end && is_symbol_char(*r->at))
        r->at++;
    const size_t length = (size_t)(r->at - from);
    const int i = find_symbol(from, length);
    if (i < 0) {
        memcpy(r->odd, from, length);
        r->odd[length] = '\0';
        return false;
    }
    *out = (bh_unit){.decade = symbols[i].decade, .factor = symbols[i].factor};
    for (int k = 0; k < 2; k++)
        out->power[symbols[i].axes[k].axis] += symbols[i].axes[k].power;
    out->celsius = strcmp(symbols[i].symbol, "degC") == 0;
    const bool femto = strcmp(symbols[i].symbol, "fm") == 0;
    r->unit.femto |= femto;
    r->unit.celsius |= out->celsius;
    r->other_length |= out->power[BH_AXIS_LENGTH] != 0 && !femto;
    r->symbols++;
    return true;
}

static bool read_product(reader *r, bh_unit *out, int nested);

/* A symbol or a bracket, with its power. */
static bool read_term(reader *r, bh_unit *out, int nested) // NOLINT(misc-no-recursion): bounded
{
    bh_unit term;
    skip_blanks(r);
    if (r->at >= r->end)
        return false;
    if (*r->at == '(') {
        r->at++;
        if (nested >= MOST_NESTED || !read_product(r, &term, nested + 1))
            return false;
        if (r->at >= r->end || *r->at++ != ')')
            return false;
    } else if (!read_symbol(r, &term)) {
        return false;
    }
    const int power = read_power(r);
    *out = (bh_unit){.factor = 1};
    multiply(out, &term, power);
    return power != 0 && sane(out);
}

/* "/s", "1/s": begins with what divides. */
static bool begins_with_division(reader *r)
{
    skip_blanks(r);
    const char *p = r->at;
    if (p < r->end && *p == '1')
        p++;
    while (p < r->end && *p == ' ')
        p++;
    if (p >= r->end || *p != '/')
        return false;
    r->at = p + 1;
    return true;
}

/* Terms with * or / or a blank between them, up to the end or a closing bracket. */
static bool read_product(reader *r, bh_unit *out, int nested) // NOLINT(misc-no-recursion): bounded
{
    *out = (bh_unit){.factor = 1};
    bool divide = begins_with_division(r);
    for (;;) {
        bh_unit term;
        if (!read_term(r, &term, nested))
            return false;
        multiply(out, &term, divide ? -1 : 1);
        if (!sane(out))
            return false;
        skip_blanks(r);
        if (r->at >= r->end || *r->at == ')')
            return true;
        divide = *r->at == '/';
        r->at += divide || *r->at == '*';
    }
}

const char *bh_unit_symbol(int i)
{
    return i >= 0 && i < SYMBOLS ? symbols[i].symbol : NULL;
}

bool bh_unit_parse(const char *from, const char *to, bh_unit *out, char odd[BH_PLAIN_SIZE])
{
    reader r = {.at = from, .end = to, .odd = odd};
    bh_unit whole;
    odd[0] = '\0';
    const bool read = read_product(&r, &whole, 0);
    const bool compound = r.symbols > 1 || whole.power[BH_AXIS_TEMPERATURE] != 1;
    if (read && r.at == r.end && !(r.unit.celsius && compound)) {
        whole.celsius = r.unit.celsius;
        whole.femto = r.unit.femto && !r.other_length;
        *out = whole;
        return true;
    }
    if (odd[0] == '\0') {
        const size_t length = (size_t)(to - from);
        memcpy(odd, from, length);
        odd[length] = '\0';
    }
    return false;
}
