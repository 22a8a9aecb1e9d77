/* test_unit_oracle.c - every unit against the general-purpose program `units` (Debian package
 * units, test-only): its own definitions, its own arithmetic.  Skipped where it is not installed.
 */
#include "../suite.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/units/quantity.h"
#include "beamhours/units/unit.h"

/* Our unit; the same in the oracle's words; the dimension.  rad and h mean other things there. */
static const struct {
    const char *ours, *theirs;
    bh_dimension dimension;
} rows[] = {
    {"eV", "eV", BH_DIM_ENERGY},
    {"keV", "keV", BH_DIM_ENERGY},
    {"MeV", "MeV", BH_DIM_ENERGY},
    {"GeV", "GeV", BH_DIM_ENERGY},
    {"TeV", "TeV", BH_DIM_ENERGY},
    {"GeV", "GeV", BH_DIM_ENERGY_OR_PER_U},
    {"keV/u", "keV", BH_DIM_ENERGY_OR_PER_U},
    {"eV/c", "eV/c", BH_DIM_MOMENTUM},
    {"keV/c", "keV/c", BH_DIM_MOMENTUM},
    {"MeV/c", "MeV/c", BH_DIM_MOMENTUM},
    {"GeV/c", "GeV/c", BH_DIM_MOMENTUM},
    {"TeV/c", "TeV/c", BH_DIM_MOMENTUM},
    {"fm-1", "hbar/fm", BH_DIM_MOMENTUM},
    {"GeV2", "GeV^2", BH_DIM_Q2},
    {"(GeV/c)2", "GeV^2", BH_DIM_Q2},
    {"MeV2/c2", "MeV^2", BH_DIM_Q2},
    {"fm-2", "(hbar c/fm)^2", BH_DIM_Q2},
    {"A", "A", BH_DIM_CURRENT},
    {"mA", "mA", BH_DIM_CURRENT},
    {"uA", "uA", BH_DIM_CURRENT},
    {"nA", "nA", BH_DIM_CURRENT},
    {"pA", "pA", BH_DIM_CURRENT},
    {"C/s", "C/s", BH_DIM_CURRENT},
    {"/s", "1/s", BH_DIM_RATE},
    {"/d", "1/day", BH_DIM_RATE},
    {"mHz", "mHz", BH_DIM_RATE},
    {"Hz", "Hz", BH_DIM_RATE},
    {"kHz", "kHz", BH_DIM_RATE},
    {"MHz", "MHz", BH_DIM_RATE},
    {"GHz", "GHz", BH_DIM_RATE},
    {"Bq", "Bq", BH_DIM_RATE},
    {"kBq", "kBq", BH_DIM_RATE},
    {"MBq", "MBq", BH_DIM_RATE},
    {"GBq", "GBq", BH_DIM_RATE},
    {"C", "C", BH_DIM_CHARGE},
    {"mC", "mC", BH_DIM_CHARGE},
    {"uC", "uC", BH_DIM_CHARGE},
    {"nC", "nC", BH_DIM_CHARGE},
    {"uA h", "uA hour", BH_DIM_CHARGE},
    {"s", "s", BH_DIM_TIME},
    {"ms", "ms", BH_DIM_TIME},
    {"us", "us", BH_DIM_TIME},
    {"ns", "ns", BH_DIM_TIME},
    {"min", "min", BH_DIM_TIME},
    {"h", "hour", BH_DIM_TIME},
    {"d", "day", BH_DIM_TIME},
    {"wk", "week", BH_DIM_TIME},
    {"rad", "radian", BH_DIM_ANGLE},
    {"mrad", "milliradian", BH_DIM_ANGLE},
    {"urad", "microradian", BH_DIM_ANGLE},
    {"deg", "degree", BH_DIM_ANGLE},
    {"°", "arcdeg", BH_DIM_ANGLE},
    {"sr", "sr", BH_DIM_SOLID_ANGLE},
    {"msr", "millisteradian", BH_DIM_SOLID_ANGLE},
    {"usr", "microsteradian", BH_DIM_SOLID_ANGLE},
    {"mrad2", "milliradian^2 sr/radian^2", BH_DIM_SOLID_ANGLE},
    {"deg2", "squaredegree sr/radian^2", BH_DIM_SOLID_ANGLE},
    {"m", "m", BH_DIM_LENGTH},
    {"cm", "cm", BH_DIM_LENGTH},
    {"mm", "mm", BH_DIM_LENGTH},
    {"um", "um", BH_DIM_LENGTH},
    {"µm", "micron", BH_DIM_LENGTH},
    {"nm", "nm", BH_DIM_LENGTH},
    {"fm", "fm", BH_DIM_LENGTH},
    {"g/cm2", "g/cm^2", BH_DIM_AREAL_DENSITY},
    {"mg/cm^2", "mg/cm^2", BH_DIM_AREAL_DENSITY},
    {"ug/cm²", "ug/cm^2", BH_DIM_AREAL_DENSITY},
    {"kg/m2", "kg/m^2", BH_DIM_AREAL_DENSITY},
    {"/cm2", "1/cm^2", BH_DIM_AREAL_NUMBER},
    {"/m2", "1/m^2", BH_DIM_AREAL_NUMBER},
    {"/b", "1/barn", BH_DIM_AREAL_NUMBER},
    {"g/cm3", "g/cm^3", BH_DIM_DENSITY},
    {"kg/m3", "kg/m^3", BH_DIM_DENSITY},
    {"%", "percent", BH_DIM_SHARE},
    {"ppm", "ppm", BH_DIM_SHARE},
    {"ppb", "ppb", BH_DIM_SHARE},
    {"%/uA", "percent/uA", BH_DIM_SHARE_PER_CURRENT},
    {"ppm/nA", "ppm/nA", BH_DIM_SHARE_PER_CURRENT},
    {"K", "K", BH_DIM_TEMPERATURE},
    {"Pa", "Pa", BH_DIM_PRESSURE},
    {"kPa", "kPa", BH_DIM_PRESSURE},
    {"MPa", "MPa", BH_DIM_PRESSURE},
    {"bar", "bar", BH_DIM_PRESSURE},
    {"mbar", "millibar", BH_DIM_PRESSURE},
    {"atm", "atm", BH_DIM_PRESSURE},
    {"torr", "torr", BH_DIM_PRESSURE},
    {"W", "W", BH_DIM_POWER},
    {"kW", "kW", BH_DIM_POWER},
    {"MW", "MW", BH_DIM_POWER},
    {"b", "barn", BH_DIM_CROSS_SECTION},
    {"mb", "millibarn", BH_DIM_CROSS_SECTION},
    {"ub", "microbarn", BH_DIM_CROSS_SECTION},
    {"nb", "nanobarn", BH_DIM_CROSS_SECTION},
    {"pb", "picobarn", BH_DIM_CROSS_SECTION},
    {"fb", "femtobarn", BH_DIM_CROSS_SECTION},
    {"fm2", "fm^2", BH_DIM_CROSS_SECTION},
    {"cm2", "cm^2", BH_DIM_CROSS_SECTION},
    {"T", "tesla", BH_DIM_FIELD},
    {"W/m/K", "W/m K", BH_DIM_CONDUCTIVITY},
    {"W/(cm K)", "W/cm K", BH_DIM_CONDUCTIVITY},
};

/* The internal unit of each dimension in the oracle's words. */
static const char *const internal[] = {
    [BH_DIM_ENERGY] = "MeV",
    [BH_DIM_ENERGY_OR_PER_U] = "MeV",
    [BH_DIM_MOMENTUM] = "MeV/c",
    [BH_DIM_Q2] = "MeV^2",
    [BH_DIM_CURRENT] = "A",
    [BH_DIM_RATE] = "1/s",
    [BH_DIM_CHARGE] = "C",
    [BH_DIM_TIME] = "s",
    [BH_DIM_ANGLE] = "radian",
    [BH_DIM_SOLID_ANGLE] = "sr",
    [BH_DIM_LENGTH] = "cm",
    [BH_DIM_AREAL_DENSITY] = "g/cm^2",
    [BH_DIM_AREAL_NUMBER] = "1/cm^2",
    [BH_DIM_DENSITY] = "g/cm^3",
    [BH_DIM_SHARE] = "1",
    [BH_DIM_SHARE_PER_CURRENT] = "1/A",
    [BH_DIM_TEMPERATURE] = "K",
    [BH_DIM_PRESSURE] = "Pa",
    [BH_DIM_POWER] = "W",
    [BH_DIM_CROSS_SECTION] = "microbarn",
    [BH_DIM_FIELD] = "tesla",
    [BH_DIM_CONDUCTIVITY] = "W/cm K",
};

static int oracle_missing(void)
{
    return system("units --version >/dev/null 2>&1") != 0;
}

/* Asks the oracle all questions in one go, one line each for what there is and what is wanted. */
static void ask(const char *questions, double *answers, int count)
{
    char name[] = "/tmp/units-XXXXXX", command[128], line[128];
    const int fd = mkstemp(name);
    FILE *f = fd >= 0 ? fdopen(fd, "w") : NULL;
    ck_assert_ptr_nonnull(f);
    (void)fputs(questions, f);
    (void)fclose(f);
    (void)snprintf(command, sizeof command, "LC_ALL=C units -q -1 -t -o %%.17g <%s", name);
    f = popen(command, "r");
    ck_assert_ptr_nonnull(f);
    for (int i = 0; i < count; i++) {
        char *end = line;
        answers[i] = fgets(line, sizeof line, f) ? strtod(line, &end) : 0.0;
        ck_assert_msg(end > line, "the oracle does not understand question %d: %s", i + 1, line);
    }
    (void)pclose(f);
    (void)remove(name);
}

START_TEST(every_unit_is_as_large_as_the_oracle_says)
{
    char questions[8192], wrong[4096] = "";
    double want[COUNT(rows)];
    size_t n = 0;
    if (oracle_missing())
        return;
    for (int i = 0; i < COUNT(rows); i++)
        n += (size_t)snprintf(questions + n, sizeof questions - n, "%s\n%s\n", rows[i].theirs,
                              internal[rows[i].dimension]);
    ck_assert_uint_lt(n, sizeof questions);
    ask(questions, want, COUNT(rows));
    n = 0;
    for (int i = 0; i < COUNT(rows); i++) {
        const double got = bh_unit_size(rows[i].ours, rows[i].dimension);
        if (!(fabs(got - want[i]) <= 1e-12 * want[i]) && n < sizeof wrong)
            n += (size_t)snprintf(wrong + n, sizeof wrong - n, "\n%s: %.15g, oracle %.15g %s",
                                  rows[i].ours, got, want[i], internal[rows[i].dimension]);
    }
    ck_assert_msg(n == 0, "the program units 2.22 disagrees:%s", wrong);
}
END_TEST

START_TEST(degrees_celsius_are_as_the_oracle_says)
{
    bh_quantity q;
    if (oracle_missing())
        return;
    ck_assert_int_eq(bh_quantity_parse("-12.5 degC", BH_DIM_TEMPERATURE, &q, NULL), BH_OK);
    double want;
    ask("tempC(-12.5)\nK\n", &want, 1);
    ck_assert_double_eq_tol(q.value, want, 1e-12);
}
END_TEST

/* Does a row use this symbol, as a word of its own? */
static int is_used(const char *symbol)
{
    const size_t n = strlen(symbol);
    for (int i = 0; i < COUNT(rows); i++)
        for (const char *p = rows[i].ours; (p = strstr(p, symbol)) != NULL; p++) {
            const char before = p > rows[i].ours ? p[-1] : ' ', after = p[n];
            if (!strchr("abcdefghijklmnopqrstuvwxyzABCDEFGHIJKLMNOPQRSTUVWXYZ", before) &&
                (!after || strchr("/ )2-0123^", after) || (unsigned char)after >= 0x80))
                return 1;
        }
    return 0;
}

START_TEST(no_unit_is_left_out)
{
    int n = 0;
    for (const char *symbol; (symbol = bh_unit_symbol(n)) != NULL; n++)
        ck_assert_msg(strcmp(symbol, "degC") == 0 || is_used(symbol), "%s is not compared", symbol);
    ck_assert_int_gt(n, 70);
    for (int d = 0; d < BH_DIM_COUNT; d++)
        ck_assert_ptr_nonnull(internal[d]);
}
END_TEST

/* The internal units and the examples that messages offer are units of their dimension. */
START_TEST(messages_offer_units_that_would_do)
{
    static const char *const units[] = {
#define UNIT(id, name, unit, examples) unit,
        BH_DIMENSIONS(UNIT)
#undef UNIT
    };
    static const char *const examples[] = {
#define EXAMPLES(id, name, unit, examples) examples,
        BH_DIMENSIONS(EXAMPLES)
#undef EXAMPLES
    };
    for (int d = 0; d < BH_DIM_COUNT; d++) {
        char text[64], *save;
        if (d != BH_DIM_SHARE && d != BH_DIM_SHARE_PER_CURRENT) /* there a unit must be written */
            ck_assert_msg(bh_unit_size(units[d], (bh_dimension)d) == 1, "%s", units[d]);
        (void)snprintf(text, sizeof text, "%s", examples[d]);
        for (char *word = strtok_r(text, " ", &save); word; word = strtok_r(NULL, " ", &save))
            ck_assert_msg(strcmp(word, "or") == 0 || strcmp(word, "degC") == 0 ||
                              bh_unit_size(word, (bh_dimension)d) > 0,
                          "%s", word);
    }
}
END_TEST

int main(void)
{
    if (oracle_missing())
        (void)puts("units/unit_oracle: comparison skipped: the program units is not installed");
    TCase *tests = tcase_create("unit_oracle");
    tcase_add_test(tests, every_unit_is_as_large_as_the_oracle_says);
    tcase_add_test(tests, degrees_celsius_are_as_the_oracle_says);
    tcase_add_test(tests, no_unit_is_left_out);
    tcase_add_test(tests, messages_offer_units_that_would_do);
    return run_suite("units/unit_oracle", tests);
}
