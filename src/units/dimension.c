/* dimension.c - which units measure what a key wants, and which symbol was probably meant. */
#include <string.h>

#include "beamhours/base/nearest.h"
#include "beamhours/units/constants.h"
#include "beamhours/units/unit.h"

/* What a set of powers measures.  `decade` and `factor` lead from MeV, cm, s ... to the internal
 * unit.  Several ways may lead to one dimension; those with `femto` want all lengths in fm. */
static const struct {
    bh_dimension dimension; /* BH_DIM_COUNT: of none, only `name` counts */
    int decade;
    const char *name;
    struct {
        bh_axis axis;
        int power;
    } axes[3];
    double factor;
    bool femto;
} measures[] = {
    {BH_DIM_ENERGY, 0, NULL, {{BH_AXIS_ENERGY, 1}}, 1, false},
    {BH_DIM_ENERGY_OR_PER_U, 0, NULL, {{BH_AXIS_ENERGY, 1}}, 1, false},
    {BH_DIM_ENERGY_OR_PER_U,
     0,
     "an energy per mass number",
     {{BH_AXIS_ENERGY, 1}, {BH_AXIS_NUCLEON, -1}},
     1,
     false},
    {BH_DIM_MOMENTUM, 0, NULL, {{BH_AXIS_ENERGY, 1}, {BH_AXIS_C, -1}}, 1, false},
    {BH_DIM_MOMENTUM, -13, NULL, {{BH_AXIS_LENGTH, -1}}, BH_HBARC, true},
    {BH_DIM_Q2, 0, NULL, {{BH_AXIS_ENERGY, 2}}, 1, false},
    {BH_DIM_Q2, 0, NULL, {{BH_AXIS_ENERGY, 2}, {BH_AXIS_C, -2}}, 1, false},
    {BH_DIM_Q2, -26, NULL, {{BH_AXIS_LENGTH, -2}}, BH_HBARC *BH_HBARC, true},
    {BH_DIM_CURRENT, 0, NULL, {{BH_AXIS_CHARGE, 1}, {BH_AXIS_TIME, -1}}, 1, false},
    {BH_DIM_RATE, 0, NULL, {{BH_AXIS_TIME, -1}}, 1, false},
    {BH_DIM_CHARGE, 0, NULL, {{BH_AXIS_CHARGE, 1}}, 1, false},
    {BH_DIM_TIME, 0, NULL, {{BH_AXIS_TIME, 1}}, 1, false},
    {BH_DIM_ANGLE, 0, NULL, {{BH_AXIS_ANGLE, 1}}, 1, false},
    {BH_DIM_SOLID_ANGLE, 0, NULL, {{BH_AXIS_SOLID_ANGLE, 1}}, 1, false},
    {BH_DIM_SOLID_ANGLE, 0, NULL, {{BH_AXIS_ANGLE, 2}}, 1, false},
    {BH_DIM_LENGTH, 0, NULL, {{BH_AXIS_LENGTH, 1}}, 1, false},
    {BH_DIM_AREAL_DENSITY, 0, NULL, {{BH_AXIS_MASS, 1}, {BH_AXIS_LENGTH, -2}}, 1, false},
    {BH_DIM_AREAL_NUMBER, 0, NULL, {{BH_AXIS_LENGTH, -2}}, 1, false},
    {BH_DIM_DENSITY, 0, NULL, {{BH_AXIS_MASS, 1}, {BH_AXIS_LENGTH, -3}}, 1, false},
    {BH_DIM_SHARE, 0, NULL, {{BH_AXIS_SHARE, 1}}, 1, false},
    {BH_DIM_SHARE_PER_CURRENT,
     0,
     NULL,
     {{BH_AXIS_SHARE, 1}, {BH_AXIS_CHARGE, -1}, {BH_AXIS_TIME, 1}},
     1,
     false},
    {BH_DIM_TEMPERATURE, 0, NULL, {{BH_AXIS_TEMPERATURE, 1}}, 1, false},
    {BH_DIM_PRESSURE, 0, NULL, {{BH_AXIS_PRESSURE, 1}}, 1, false},
    {BH_DIM_POWER, 0, NULL, {{BH_AXIS_POWER, 1}}, 1, false},
    {BH_DIM_CROSS_SECTION, 30, NULL, {{BH_AXIS_LENGTH, 2}}, 1, false},
    {BH_DIM_FIELD, 0, NULL, {{BH_AXIS_FIELD, 1}}, 1, false},
    {BH_DIM_CONDUCTIVITY,
     0,
     NULL,
     {{BH_AXIS_POWER, 1}, {BH_AXIS_LENGTH, -1}, {BH_AXIS_TEMPERATURE, -1}},
     1,
     false},
    {BH_DIM_COUNT, 0, "a mass", {{BH_AXIS_MASS, 1}}, 1, false},
    {BH_DIM_COUNT, 0, "a volume", {{BH_AXIS_LENGTH, 3}}, 1, false},
    {BH_DIM_COUNT, 0, "a number per volume", {{BH_AXIS_LENGTH, -3}}, 1, false},
    {BH_DIM_COUNT, 0, "an inverse length", {{BH_AXIS_LENGTH, -1}}, 1, false},
};
enum { MEASURES = sizeof measures / sizeof measures[0] };

static const char *const names[] = {
#define BH_DIM_NAME(id, name, unit, examples) (name),
    BH_DIMENSIONS(BH_DIM_NAME)
#undef BH_DIM_NAME
};

/* Words and short forms seen in place of a symbol. */
static const struct {
    char written[11];
    char meant[5];
} words[] = {
    {"hr", "h"},       {"hrs", "h"},        {"hour", "h"},      {"hours", "h"},
    {"sec", "s"},      {"secs", "s"},       {"second", "s"},    {"seconds", "s"},
    {"msec", "ms"},    {"usec", "us"},      {"nsec", "ns"},     {"mins", "min"},
    {"minute", "min"}, {"minutes", "min"},  {"day", "d"},       {"days", "d"},
    {"week", "wk"},    {"weeks", "wk"},     {"degree", "deg"},  {"degrees", "deg"},
    {"percent", "%"},  {"pct", "%"},        {"kelvin", "K"},    {"celsius", "degC"},
    {"degc", "degC"},  {"barn", "b"},       {"barns", "b"},     {"mbarn", "mb"},
    {"ubarn", "ub"},   {"nbarn", "nb"},     {"pbarn", "pb"},    {"fbarn", "fb"},
    {"micron", "um"},  {"microns", "um"},   {"amp", "A"},       {"amps", "A"},
    {"ampere", "A"},   {"mamp", "mA"},      {"uamp", "uA"},     {"namp", "nA"},
    {"coulomb", "C"},  {"hertz", "Hz"},     {"tesla", "T"},     {"watt", "W"},
    {"watts", "W"},    {"gram", "g"},       {"grams", "g"},     {"steradian", "sr"},
    {"ster", "sr"},    {"radian", "rad"},   {"radians", "rad"}, {"meter", "m"},
    {"metre", "m"},    {"meters", "m"},     {"metres", "m"},    {"fermi", "fm"},
    {"pascal", "Pa"},  {"becquerel", "Bq"}, {"nucleon", "u"},   {"amu", "u"},
};

static bool fits(int i, const bh_unit *unit)
{
    int power[BH_AXES] = {0};
    for (int k = 0; k < 3; k++)
        power[measures[i].axes[k].axis] += measures[i].axes[k].power;
    return memcmp(power, unit->power, sizeof power) == 0 && (unit->femto || !measures[i].femto);
}

bool bh_unit_convert(bh_unit *unit, bh_dimension dimension)
{
    for (int i = 0; i < MEASURES; i++)
        if (measures[i].dimension == dimension && fits(i, unit)) {
            unit->decade += measures[i].decade;
            unit->factor *= measures[i].factor;
            return true;
        }
    return false;
}

const char *bh_unit_measures(const bh_unit *unit)
{
    for (int i = 0; i < MEASURES; i++)
        if (!measures[i].femto && fits(i, unit))
            return measures[i].name ? measures[i].name : names[measures[i].dimension];
    return NULL;
}

static bool same_word(const char *odd, const char *word)
{
    size_t i = 0;
    for (; odd[i] && word[i]; i++)
        if ((odd[i] >= 'A' && odd[i] <= 'Z' ? odd[i] | 0x20 : odd[i]) != word[i])
            return false;
    return odd[i] == word[i];
}

const char *bh_unit_suggest(const char *odd, bh_dimension dimension)
{
    for (size_t i = 0; i < sizeof words / sizeof words[0]; i++)
        if (same_word(odd, words[i].written))
            return words[i].meant;
    enum { MOST = 100 };
    const char *right[MOST], *all[MOST];
    size_t of_dimension = 0, count = 0;
    char rest[BH_PLAIN_SIZE];
    for (const char *symbol; count < MOST && (symbol = bh_unit_symbol((int)count)); count++) {
        bh_unit unit;
        all[count] = symbol;
        if (bh_unit_parse(symbol, symbol + strlen(symbol), &unit, rest) &&
            bh_unit_convert(&unit, dimension))
            right[of_dimension++] = symbol;
    }
    const char *found = bh_nearest(odd, right, of_dimension);
    return found ? found : bh_nearest(odd, all, count);
}

double bh_unit_size(const char *unit, bh_dimension dimension)
{
    char plain[BH_PLAIN_SIZE], odd[BH_PLAIN_SIZE];
    bh_unit u;
    double size = 0.0;
    if (!bh_plain_text(unit, plain) || !bh_unit_parse(plain, plain + strlen(plain), &u, odd) ||
        u.celsius || !bh_unit_convert(&u, dimension))
        return 0.0;
    const char one[] = "1";
    return bh_number_in(one, one + 1, &u, &size) == BH_OK ? size : 0.0;
}
