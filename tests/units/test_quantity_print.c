/* test_quantity_print.c - printed quantities read well, and read back to the last bit. */
#include "../suite.h"

#include <math.h>
#include <stdint.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/units/constants.h"
#include "beamhours/units/quantity.h"

/* What was written, and how it is printed. */
static const struct {
    const char *text;
    bh_dimension dimension;
    const char *printed;
} rows[] = {
    {"855 MeV", BH_DIM_ENERGY, "855 MeV"},
    {"0.855 GeV", BH_DIM_ENERGY, "855 MeV"},
    {"1450 MeV", BH_DIM_ENERGY, "1.45 GeV"},
    {"20 keV", BH_DIM_ENERGY, "20 keV"},
    {"0 MeV", BH_DIM_ENERGY, "0 MeV"},
    {"-5 MeV", BH_DIM_ENERGY, "-5 MeV"},
    {"5.5 MeV/u", BH_DIM_ENERGY_OR_PER_U, "5.5 MeV/u"},
    {"1000 MeV/u", BH_DIM_ENERGY_OR_PER_U, "1 GeV/u"},
    {"5.5 MeV", BH_DIM_ENERGY_OR_PER_U, "5.5 MeV"},
    {"170 MeV/c", BH_DIM_MOMENTUM, "170 MeV/c"},
    {"2 fm-1", BH_DIM_MOMENTUM, "2 fm-1"},
    {"0.6 GeV2", BH_DIM_Q2, "0.6 GeV2"},
    {"2.5 fm-2", BH_DIM_Q2, "2.5 fm-2"},
    {"20.0 ± 0.2 uA", BH_DIM_CURRENT, "20 ± 0.2 uA"},
    {"20 uA ± 1 %", BH_DIM_CURRENT, "20 ± 0.2 uA"},
    {"0.025 uA", BH_DIM_CURRENT, "25 nA"},
    {"0.7 mA", BH_DIM_CURRENT, "700 uA"},
    {"3e5 /s", BH_DIM_RATE, "300 kHz"},
    {"4 kHz", BH_DIM_RATE, "4 kHz"},
    {"0 Hz", BH_DIM_RATE, "0 Hz"},
    {"20 mC", BH_DIM_CHARGE, "20 mC"},
    {"14 d", BH_DIM_TIME, "14 d"},
    {"168 h", BH_DIM_TIME, "7 d"},
    {"125 h", BH_DIM_TIME, "125 h"},
    {"16 h", BH_DIM_TIME, "16 h"},
    {"20 min", BH_DIM_TIME, "20 min"},
    {"5 us", BH_DIM_TIME, "5 us"},
    {"1 h", BH_DIM_TIME, "1 h"},
    {"25 deg", BH_DIM_ANGLE, "25 deg"},
    {"12.7 deg", BH_DIM_ANGLE, "12.7 deg"},
    {"-28 mrad", BH_DIM_ANGLE, "-28 mrad"},
    {"0 ± 0.2 mrad", BH_DIM_ANGLE, "0 ± 0.2 mrad"},
    {"6 msr", BH_DIM_SOLID_ANGLE, "6 msr"},
    {"0.2 mm", BH_DIM_LENGTH, "200 um"},
    {"50 mm", BH_DIM_LENGTH, "5 cm"},
    {"0.8 um", BH_DIM_LENGTH, "800 nm"},
    {"2.7 g/cm2", BH_DIM_AREAL_DENSITY, "2.7 g/cm2"},
    {"0.0354 g/cm2", BH_DIM_AREAL_DENSITY, "35.4 mg/cm2"},
    {"(2.0 ± 0.1)e18 /cm2", BH_DIM_AREAL_NUMBER, "(2 ± 0.1)e18 /cm2"},
    {"1.6e18 /cm2", BH_DIM_AREAL_NUMBER, "1.6e18 /cm2"},
    {"0.0723 g/cm3", BH_DIM_DENSITY, "0.0723 g/cm3"},
    {"0.00009 g/cm3", BH_DIM_DENSITY, "9e-5 g/cm3"},
    {"97 %", BH_DIM_SHARE, "97 %"},
    {"0.02 %", BH_DIM_SHARE, "0.02 %"},
    {"100 %", BH_DIM_SHARE, "100 %"},
    {"3 ppm", BH_DIM_SHARE, "3 ppm"},
    {"50 ± 1 %", BH_DIM_SHARE, "50 ± 1 %"},
    {"0.02 %/uA", BH_DIM_SHARE_PER_CURRENT, "0.02 %/uA"},
    {"20 degC", BH_DIM_TEMPERATURE, "293.15 K"},
    {"1013.25 mbar", BH_DIM_PRESSURE, "1 atm"},
    {"1 bar", BH_DIM_PRESSURE, "1 bar"},
    {"3 mbar", BH_DIM_PRESSURE, "3 mbar"},
    {"50 kW", BH_DIM_POWER, "50 kW"},
    {"0.3 ub", BH_DIM_CROSS_SECTION, "300 nb"},
    {"1.5 T", BH_DIM_FIELD, "1.5 T"},
    {"237 W/m/K", BH_DIM_CONDUCTIVITY, "237 W/m/K"},
    {"1e300 MeV", BH_DIM_ENERGY, "1e294 TeV"},
};

START_TEST(a_quantity_is_printed)
{
    bh_quantity q;
    char out[64];
    ck_assert_int_eq(bh_quantity_parse(rows[_i].text, rows[_i].dimension, &q, NULL), BH_OK);
    const int n = bh_quantity_print(&q, rows[_i].dimension, out, sizeof out);
    ck_assert_msg(strcmp(out, rows[_i].printed) == 0, "%s -> %s, not %s", rows[_i].text, out,
                  rows[_i].printed);
    ck_assert_int_eq(n, (int)strlen(out));
    ck_assert_int_eq(bh_quantity_print(&q, rows[_i].dimension, out, 3), n);
    ck_assert_uint_eq(strlen(out), 2);
}
END_TEST

static uint64_t next_random(uint64_t *state) /* splitmix64, Steele et al. 2014 */
{
    uint64_t z = (*state += 0x9e3779b97f4a7c15u);
    z = (z ^ (z >> 30)) * 0xbf58476d1ce4e5b9u;
    z = (z ^ (z >> 27)) * 0x94d049bb133111ebu;
    return z ^ (z >> 31);
}

/* Between 10^-`decades` and 10^`decades`, all digits in use or only a few. */
static double random_value(uint64_t *state, double decades)
{
    const double share = (double)(next_random(state) >> 11) * 0x1p-53;
    const double value = pow(10.0, decades * (2 * share - 1));
    const uint64_t kind = next_random(state) % 4;
    if (kind == 0)
        return -value;
    return kind == 1 ? round(value * 100) / 100 : value;
}

static void must_read_back(const bh_quantity *q, bh_dimension dimension)
{
    char out[200], again[200];
    bh_quantity read;
    bh_error err = {.text = ""};
    (void)bh_quantity_print(q, dimension, out, sizeof out);
    ck_assert_msg(bh_quantity_parse(out, dimension, &read, &err) == BH_OK, "%s", err.text);
    ck_assert_msg(read.value == q->value, "%s: %.17g read as %.17g", out, q->value, read.value);
    ck_assert_msg(read.uncertainty == q->uncertainty, "%s: ± %.17g", out, q->uncertainty);
    ck_assert(read.uncertain == q->uncertain && read.per_u == q->per_u);
    (void)bh_quantity_print(&read, dimension, again, sizeof again);
    ck_assert_str_eq(again, out);
}

START_TEST(what_is_printed_reads_back)
{
    uint64_t state = 20241 + (uint64_t)_i;
    for (int round = 0; round < 400; round++) {
        bh_quantity q = {.value = random_value(&state, round % 5 ? 6 : 290)};
        q.uncertain = next_random(&state) % 3 == 0;
        q.per_u = _i == BH_DIM_ENERGY_OR_PER_U && next_random(&state) % 2;
        if (q.uncertain)
            q.uncertainty = fabs(q.value) * fabs(random_value(&state, 3));
        must_read_back(&q, (bh_dimension)_i);
    }
}
END_TEST

/* Few digits in, the same few digits out: nothing grows a tail of nines. */
START_TEST(few_digits_stay_few)
{
    static const struct {
        const char *unit;
        bh_dimension dimension;
    } units[] = {{"deg", BH_DIM_ANGLE},    {"h", BH_DIM_TIME},        {"min", BH_DIM_TIME},
                 {"d", BH_DIM_TIME},       {"MeV", BH_DIM_ENERGY},    {"mm", BH_DIM_LENGTH},
                 {"%", BH_DIM_SHARE},      {"uA", BH_DIM_CURRENT},    {"fm-2", BH_DIM_Q2},
                 {"atm", BH_DIM_PRESSURE}, {"torr", BH_DIM_PRESSURE}, {"mrad", BH_DIM_ANGLE}};
    for (int hundredths = 1; hundredths < 5000; hundredths += 7) {
        char text[64], out[64];
        bh_quantity q;
        (void)snprintf(text, sizeof text, "%d.%02d %s", hundredths / 100, hundredths % 100,
                       units[_i].unit);
        ck_assert_int_eq(bh_quantity_parse(text, units[_i].dimension, &q, NULL), BH_OK);
        (void)bh_quantity_print(&q, units[_i].dimension, out, sizeof out);
        ck_assert_msg(strcspn(out, " ") <= 8, "%s -> %s", text, out);
        must_read_back(&q, units[_i].dimension);
    }
}
END_TEST

START_TEST(extreme_values_read_back)
{
    static const double values[] = {
        5e-324, 2.2250738585072014e-308, 1e-300, 1.7976931348623157e308, BH_PI, 0.1, 1.0 / 3.0};
    for (int d = 0; d < BH_DIM_COUNT; d++) {
        const bh_quantity q = {.value = values[_i]};
        must_read_back(&q, (bh_dimension)d);
    }
}
END_TEST

START_TEST(no_number_is_printed_as_such)
{
    char out[64];
    const bh_quantity q = {.value = (double)NAN}, inf = {.value = (double)INFINITY};
    ck_assert_int_eq(bh_quantity_print(&q, BH_DIM_ENERGY, out, sizeof out), 3);
    ck_assert_str_eq(out, "nan");
    (void)bh_quantity_print(&inf, BH_DIM_ENERGY, out, sizeof out);
    ck_assert_str_eq(out, "inf");
    ck_assert_int_eq(bh_quantity_print(&q, BH_DIM_ENERGY, NULL, 0), 3);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("quantity_print");
    tcase_add_loop_test(tests, a_quantity_is_printed, 0, COUNT(rows));
    tcase_add_loop_test(tests, what_is_printed_reads_back, 0, BH_DIM_COUNT);
    tcase_add_loop_test(tests, few_digits_stay_few, 0, 12);
    tcase_add_loop_test(tests, extreme_values_read_back, 0, 7);
    tcase_add_test(tests, no_number_is_printed_as_such);
    return run_suite("units/quantity_print", tests);
}
