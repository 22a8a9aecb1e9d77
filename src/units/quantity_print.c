/* quantity_print.c - a quantity as the shortest text that reads back, in the unit that reads best.
 */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/units/unit.h"

/* Units to choose from; a reluctance is counted like that many more characters. */
static const struct {
    bh_dimension dimension;
    char unit[7];
    int reluctance;
} choices[] = {
    {BH_DIM_ENERGY, "MeV", 0},
    {BH_DIM_ENERGY, "GeV", 0},
    {BH_DIM_ENERGY, "keV", 0},
    {BH_DIM_ENERGY, "eV", 0},
    {BH_DIM_ENERGY, "TeV", 0},
    {BH_DIM_ENERGY_OR_PER_U, "MeV", 0},
    {BH_DIM_ENERGY_OR_PER_U, "GeV", 0},
    {BH_DIM_ENERGY_OR_PER_U, "keV", 0},
    {BH_DIM_ENERGY_OR_PER_U, "eV", 0},
    {BH_DIM_ENERGY_OR_PER_U, "TeV", 0},
    {BH_DIM_MOMENTUM, "MeV/c", 0},
    {BH_DIM_MOMENTUM, "GeV/c", 0},
    {BH_DIM_MOMENTUM, "keV/c", 0},
    {BH_DIM_MOMENTUM, "eV/c", 0},
    {BH_DIM_MOMENTUM, "TeV/c", 0},
    {BH_DIM_MOMENTUM, "fm-1", 4},
    {BH_DIM_Q2, "GeV2", 0},
    {BH_DIM_Q2, "MeV2", 0},
    {BH_DIM_Q2, "fm-2", 4},
    {BH_DIM_Q2, "keV2", 0},
    {BH_DIM_CURRENT, "uA", 0},
    {BH_DIM_CURRENT, "nA", 0},
    {BH_DIM_CURRENT, "mA", 0},
    {BH_DIM_CURRENT, "A", 0},
    {BH_DIM_CURRENT, "pA", 0},
    {BH_DIM_RATE, "Hz", 0},
    {BH_DIM_RATE, "kHz", 0},
    {BH_DIM_RATE, "MHz", 0},
    {BH_DIM_RATE, "GHz", 0},
    {BH_DIM_RATE, "mHz", 0},
    {BH_DIM_CHARGE, "C", 0},
    {BH_DIM_CHARGE, "mC", 0},
    {BH_DIM_CHARGE, "uC", 0},
    {BH_DIM_CHARGE, "nC", 0},
    {BH_DIM_TIME, "s", 0},
    {BH_DIM_TIME, "h", 0},
    {BH_DIM_TIME, "min", 0},
    {BH_DIM_TIME, "d", 0},
    {BH_DIM_TIME, "ms", 0},
    {BH_DIM_TIME, "us", 0},
    {BH_DIM_TIME, "ns", 0},
    {BH_DIM_ANGLE, "deg", 0},
    {BH_DIM_ANGLE, "mrad", 0},
    {BH_DIM_ANGLE, "rad", 0},
    {BH_DIM_ANGLE, "urad", 4},
    {BH_DIM_SOLID_ANGLE, "msr", 0},
    {BH_DIM_SOLID_ANGLE, "sr", 0},
    {BH_DIM_SOLID_ANGLE, "usr", 0},
    {BH_DIM_LENGTH, "mm", 0},
    {BH_DIM_LENGTH, "cm", 0},
    {BH_DIM_LENGTH, "um", 0},
    {BH_DIM_LENGTH, "m", 0},
    {BH_DIM_LENGTH, "nm", 0},
    {BH_DIM_LENGTH, "fm", 0},
    {BH_DIM_AREAL_DENSITY, "g/cm2", 0},
    {BH_DIM_AREAL_DENSITY, "mg/cm2", 0},
    {BH_DIM_AREAL_DENSITY, "ug/cm2", 0},
    {BH_DIM_AREAL_NUMBER, "/cm2", 0},
    {BH_DIM_DENSITY, "g/cm3", 0},
    {BH_DIM_SHARE, "%", 0},
    {BH_DIM_SHARE, "ppm", 8},
    {BH_DIM_SHARE, "ppb", 8},
    {BH_DIM_SHARE_PER_CURRENT, "%/uA", 0},
    {BH_DIM_TEMPERATURE, "K", 0},
    {BH_DIM_PRESSURE, "bar", 0},
    {BH_DIM_PRESSURE, "mbar", 0},
    {BH_DIM_PRESSURE, "Pa", 0},
    {BH_DIM_PRESSURE, "kPa", 0},
    {BH_DIM_PRESSURE, "MPa", 0},
    {BH_DIM_PRESSURE, "atm", 2},
    {BH_DIM_PRESSURE, "torr", 2},
    {BH_DIM_POWER, "W", 0},
    {BH_DIM_POWER, "kW", 0},
    {BH_DIM_POWER, "MW", 0},
    {BH_DIM_CROSS_SECTION, "ub", 0},
    {BH_DIM_CROSS_SECTION, "mb", 0},
    {BH_DIM_CROSS_SECTION, "nb", 0},
    {BH_DIM_CROSS_SECTION, "pb", 0},
    {BH_DIM_CROSS_SECTION, "b", 0},
    {BH_DIM_CROSS_SECTION, "fb", 0},
    {BH_DIM_FIELD, "T", 0},
    {BH_DIM_CONDUCTIVITY, "W/m/K", 0},
};
enum {
    CHOICES = sizeof choices / sizeof choices[0],
    PER_DECADE = 3, /* characters that a decade outside 1 to 999 counts for */
    TEXT = 200
};

/* Value and uncertainty in one unit, without the unit's name. */
static void print_numbers(const bh_quantity *q, const bh_decimal *value, const bh_decimal *sigma,
                          char out[TEXT])
{
    char first[64], second[64];
    if (!q->uncertain) {
        (void)bh_decimal_print(value, 0, first);
        (void)snprintf(out, TEXT, "%s", first);
        return;
    }
    const int power = q->value != 0.0 ? value->power : sigma->power;
    const int shift = power < -3 || power > 6 ? power : 0;
    (void)bh_decimal_print(value, shift, first);
    (void)bh_decimal_print(sigma, shift, second);
    if (shift)
        (void)snprintf(out, TEXT, "(%s ± %s)e%d", first, second, shift);
    else
        (void)snprintf(out, TEXT, "%s ± %s", first, second);
}

/* How badly the numbers read, or -1 when they do not read back in this unit. */
static int try_unit(const bh_quantity *q, const char *name, bh_dimension dimension, char out[TEXT])
{
    bh_unit unit;
    bh_decimal value, sigma = {.count = 0};
    char odd[BH_PLAIN_SIZE];
    if (!bh_unit_parse(name, name + strlen(name), &unit, odd) || !bh_unit_convert(&unit, dimension))
        return -1;
    if (!bh_decimal_in(q->value, &unit, &value))
        return -1;
    if (q->uncertain && !bh_decimal_in(q->uncertainty, &unit, &sigma))
        return -1;
    print_numbers(q, &value, &sigma, out);
    const int power = q->value != 0.0 || !q->uncertain ? value.power : sigma.power;
    const int outside = power < 0 ? -power : power > 2 ? power - 2 : 0;
    return (int)strlen(out) + PER_DECADE * outside;
}

int bh_quantity_print(const bh_quantity *quantity, bh_dimension dimension, char *out, size_t size)
{
    char best[TEXT] = "", text[TEXT];
    const char *unit = "";
    int least = -1;
    for (int i = 0; i < CHOICES && isfinite(quantity->value); i++) {
        if (choices[i].dimension != dimension)
            continue;
        const int cost = try_unit(quantity, choices[i].unit, dimension, text);
        if (cost >= 0 && (least < 0 || cost + choices[i].reluctance < least)) {
            least = cost + choices[i].reluctance;
            unit = choices[i].unit;
            (void)snprintf(best, sizeof best, "%s", text);
        }
    }
    if (least < 0) /* no number: there is nothing to read back */
        (void)bh_number_print(quantity->value, best, sizeof best);
    const char *per = quantity->per_u && dimension == BH_DIM_ENERGY_OR_PER_U ? "/u" : "";
    return snprintf(out, size, "%s%s%s%s", best, least < 0 ? "" : " ", unit, per);
}
