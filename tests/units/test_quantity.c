/* test_quantity.c - the forms a quantity may be written in, and the sentence for each that is none.
 */
#include "../suite.h"

#include <float.h>
#include <locale.h>
#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/units/constants.h"
#include "beamhours/units/quantity.h"

/* --- what is read --- */

static const struct {
    const char *text;
    bh_dimension dimension;
    double value, sigma; /* sigma < 0: none written */
} forms[] = {
    {"855 MeV", BH_DIM_ENERGY, 855, -1},
    {"855MeV", BH_DIM_ENERGY, 855, -1},
    {"  855 \t MeV  ", BH_DIM_ENERGY, 855, -1},
    {"0.855 GeV", BH_DIM_ENERGY, 855, -1},
    {"8.55e2 MeV", BH_DIM_ENERGY, 855, -1},
    {"8.55E+8eV", BH_DIM_ENERGY, 855, -1},
    {"+855. MeV", BH_DIM_ENERGY, 855, -1},
    {".5 MeV", BH_DIM_ENERGY, 0.5, -1},
    {"1.45\u00a0GeV", BH_DIM_ENERGY, 1450, -1},
    {"1.45\u2009GeV", BH_DIM_ENERGY, 1450, -1},
    {"1.45\u202fGeV", BH_DIM_ENERGY, 1450, -1},
    {"20.0 ± 0.2 uA", BH_DIM_CURRENT, 20e-6, 0.2e-6},
    {"20.0±0.2µA", BH_DIM_CURRENT, 20e-6, 0.2e-6},
    {"20.0 +- 0.2 μA", BH_DIM_CURRENT, 20e-6, 0.2e-6},
    {"20.0 +/- 0.2 uA", BH_DIM_CURRENT, 20e-6, 0.2e-6},
    {"20 uA ± 0.2 uA", BH_DIM_CURRENT, 20e-6, 0.2e-6},
    {"20 uA ± 200 nA", BH_DIM_CURRENT, 20e-6, 200e-9},
    {"20 uA ± 1 %", BH_DIM_CURRENT, 20e-6, 0.2e-6},
    {"-20 uA±1%", BH_DIM_CURRENT, -20e-6, 0.2e-6},
    {"20 uA ± 100 ppm", BH_DIM_CURRENT, 20e-6, 2e-9},
    {"20 uA ± 0 uA", BH_DIM_CURRENT, 20e-6, 0},
    {"(2.0 ± 0.1)e18 /cm2", BH_DIM_AREAL_NUMBER, 2e18, 1e17},
    {"(2.0 ± 0.1) /cm2", BH_DIM_AREAL_NUMBER, 2, 0.1},
    {"( 2.0+-0.1 )E-3 mm", BH_DIM_LENGTH, 2e-4, 1e-5},
    {"(2)e+3 mm", BH_DIM_LENGTH, 200, -1},
    {"(20.0 ± 0.2) uA", BH_DIM_CURRENT, 20e-6, 0.2e-6},
    {"\u221228 mrad", BH_DIM_ANGLE, -0.028, -1},
    {"-28 mrad", BH_DIM_ANGLE, -0.028, -1},
    {"0 ± 0.2 mrad", BH_DIM_ANGLE, 0, 2e-4},
    {"-0 mrad", BH_DIM_ANGLE, 0, -1},
    {"180°", BH_DIM_ANGLE, BH_PI, -1},
    {"180 deg", BH_DIM_ANGLE, BH_PI, -1},
    {"97 %", BH_DIM_SHARE, 0.97, -1},
    {"97%", BH_DIM_SHARE, 0.97, -1},
    {"50 % ± 1 %", BH_DIM_SHARE, 0.5, 0.01},
    {"50 ± 1 %", BH_DIM_SHARE, 0.5, 0.01},
    {"50 % ± 100 ppm", BH_DIM_SHARE, 0.5, 1e-4},
    {"0.02 %/uA", BH_DIM_SHARE_PER_CURRENT, 200, -1},
    {"0.02 %/uA ± 10 %", BH_DIM_SHARE_PER_CURRENT, 200, 20},
    {"20 degC", BH_DIM_TEMPERATURE, 293.15, -1},
    {"20 °C", BH_DIM_TEMPERATURE, 293.15, -1},
    {"-20 ± 1 degC", BH_DIM_TEMPERATURE, 253.15, 1},
    {"20 degC ± 0.5 K", BH_DIM_TEMPERATURE, 293.15, 0.5},
    {"20 K ± 1 %", BH_DIM_TEMPERATURE, 20, 0.2},
    {"2.7 g/cm3", BH_DIM_DENSITY, 2.7, -1},
    {"2700 kg/m3", BH_DIM_DENSITY, 2.7, -1},
    {"2.7 g cm-3", BH_DIM_DENSITY, 2.7, -1},
    {"2.7 g·cm⁻³", BH_DIM_DENSITY, 2.7, -1},
    {"354 mg/cm^2", BH_DIM_AREAL_DENSITY, 0.354, -1},
    {"354 mg/cm²", BH_DIM_AREAL_DENSITY, 0.354, -1},
    {"354 mg / cm2", BH_DIM_AREAL_DENSITY, 0.354, -1},
    {"354 mg/(cm cm)", BH_DIM_AREAL_DENSITY, 0.354, -1},
    {"354 mg cm^-2", BH_DIM_AREAL_DENSITY, 0.354, -1},
    {"1 kg/m2", BH_DIM_AREAL_DENSITY, 0.1, -1},
    {"0.6 GeV2", BH_DIM_Q2, 6e5, -1},
    {"0.6 (GeV/c)2", BH_DIM_Q2, 6e5, -1},
    {"0.6 (GeV/c)^2", BH_DIM_Q2, 6e5, -1},
    {"0.6 GeV2/c2", BH_DIM_Q2, 6e5, -1},
    {"0.6 (GeV/c)²", BH_DIM_Q2, 6e5, -1},
    {"1 fm-2", BH_DIM_Q2, BH_HBARC *BH_HBARC, -1},
    {"1 /fm2", BH_DIM_Q2, BH_HBARC *BH_HBARC, -1},
    {"2 fm-1", BH_DIM_MOMENTUM, 2 * BH_HBARC, -1},
    {"0.17 GeV/c", BH_DIM_MOMENTUM, 170, -1},
    {"3e5 /s", BH_DIM_RATE, 3e5, -1},
    {"3e5 1/s", BH_DIM_RATE, 3e5, -1},
    {"3e5/s", BH_DIM_RATE, 3e5, -1},
    {"4 kHz", BH_DIM_RATE, 4000, -1},
    {"37 kBq", BH_DIM_RATE, 37000, -1},
    {"600 /min", BH_DIM_RATE, 10, -1},
    {"1 uA h", BH_DIM_CHARGE, 0.0036, -1},
    {"14 d", BH_DIM_TIME, 14 * 86400., -1},
    {"5 mrad2", BH_DIM_SOLID_ANGLE, 5e-6, -1},
    {"1 fm2", BH_DIM_CROSS_SECTION, 1e4, -1},
    {"1 b", BH_DIM_CROSS_SECTION, 1e6, -1},
    {"237 W/m/K", BH_DIM_CONDUCTIVITY, 2.37, -1},
    {"237 W/(m K)", BH_DIM_CONDUCTIVITY, 2.37, -1},
    {"237 W m-1 K-1", BH_DIM_CONDUCTIVITY, 2.37, -1},
    {"1 atm", BH_DIM_PRESSURE, 101325, -1},
    {"760 torr", BH_DIM_PRESSURE, 101325, -1},
    {"1e-308 mm", BH_DIM_LENGTH, 1e-309, -1},
    {"1e309 um", BH_DIM_LENGTH, 1e305, -1},
};

static int close_to(double got, double want)
{
    return fabs(got - want) <= 4 * DBL_EPSILON * fabs(want);
}

START_TEST(a_form_is_read)
{
    bh_quantity q;
    bh_error err = {.text = ""};
    const bh_code code = bh_quantity_parse(forms[_i].text, forms[_i].dimension, &q, &err);
    ck_assert_msg(code == BH_OK, "%s: %s", forms[_i].text, err.text);
    ck_assert_msg(close_to(q.value, forms[_i].value), "%s: %.17g", forms[_i].text, q.value);
    ck_assert_msg(q.uncertain == (forms[_i].sigma >= 0), "%s", forms[_i].text);
    const double sigma = forms[_i].sigma < 0 ? 0 : forms[_i].sigma;
    ck_assert_msg(close_to(q.uncertainty, sigma), "%s: ± %.17g", forms[_i].text, q.uncertainty);
    ck_assert(!q.per_u && (q.value != 0 || !signbit(q.value)));
}
END_TEST

START_TEST(equal_lengths_are_equal_doubles)
{
    static const char *const same[] = {"0.127 mm", "0.0127 cm", "127 um", "1.27e-4 m", "127000 nm"};
    for (int i = 0; i < COUNT(same); i++) {
        bh_quantity q;
        ck_assert_int_eq(bh_quantity_parse(same[i], BH_DIM_LENGTH, &q, NULL), BH_OK);
        ck_assert_msg(q.value == 0.0127, "%s: %.17g", same[i], q.value);
    }
}
END_TEST

START_TEST(per_mass_number_is_remembered)
{
    bh_quantity q;
    ck_assert_int_eq(bh_quantity_parse("5.5 MeV/u", BH_DIM_ENERGY_OR_PER_U, &q, NULL), BH_OK);
    ck_assert(q.per_u && q.value == 5.5 && !q.uncertain);
    ck_assert_int_eq(bh_quantity_parse("1 ± 0.1 GeV/u", BH_DIM_ENERGY_OR_PER_U, &q, NULL), BH_OK);
    ck_assert(q.per_u && q.value == 1000 && q.uncertainty == 100);
    ck_assert_int_eq(bh_quantity_parse("9 MeV/u ± 2 %", BH_DIM_ENERGY_OR_PER_U, &q, NULL), BH_OK);
    ck_assert(q.per_u && close_to(q.uncertainty, 0.18));
    ck_assert_int_eq(bh_quantity_parse("5.5 MeV", BH_DIM_ENERGY_OR_PER_U, &q, NULL), BH_OK);
    ck_assert(!q.per_u && q.value == 5.5);
}
END_TEST

START_TEST(a_unit_has_a_size)
{
    ck_assert_double_eq(bh_unit_size("mg/cm2", BH_DIM_AREAL_DENSITY), 1e-3);
    ck_assert_double_eq(bh_unit_size("µm", BH_DIM_LENGTH), 1e-4);
    ck_assert_double_eq(bh_unit_size("h", BH_DIM_TIME), 3600);
    ck_assert_double_eq(bh_unit_size("MeV/u", BH_DIM_ENERGY_OR_PER_U), 1);
    ck_assert_double_eq(bh_unit_size("degC", BH_DIM_TEMPERATURE), 0);
    ck_assert_double_eq(bh_unit_size("mm", BH_DIM_ANGLE), 0);
    ck_assert_double_eq(bh_unit_size("ell", BH_DIM_LENGTH), 0);
    ck_assert_double_eq(bh_unit_size("\xff", BH_DIM_LENGTH), 0);
    ck_assert_double_eq(bh_unit_size("", BH_DIM_LENGTH), 0);
}
END_TEST

/* --- what is refused, and in which words --- */

#define E      BH_DIM_ENERGY
#define L      BH_DIM_LENGTH
#define NEED_E "an energy is needed, in MeV or GeV"
#define NEED_L "a length is needed, in mm or cm"

static const struct {
    const char *text;
    bh_dimension dimension;
    const char *sentence;
} refused[] = {
    {"", E, "'' does not begin with a number: " NEED_E},
    {"fast", E, "'fast' does not begin with a number: " NEED_E},
    {"inf MeV", E, "'inf MeV' does not begin with a number: " NEED_E},
    {"nan", E, "'nan' does not begin with a number: " NEED_E},
    {"±28 mrad", BH_DIM_ANGLE,
     "'±28 mrad' does not begin with a number: an angle is needed, in deg or mrad"},
    {"855", E, "'855' has no unit: " NEED_E},
    {"0", L, "'0' has no unit: " NEED_L},
    {"20 ± 0.2", BH_DIM_CURRENT, "'20 ± 0.2' has no unit: a current is needed, in uA or nA"},
    {"(2 ± 1)e3", L, "'(2 ± 1)e3' has no unit: " NEED_L},
    {"0.97", BH_DIM_SHARE, "'0.97' has no unit: for a share write 97 %"},
    {"1", BH_DIM_SHARE, "'1' has no unit: for a share write 1 % or 100 %"},
    {"97", BH_DIM_SHARE, "'97' has no unit: for a share write 97 %"},
    {"1.5", BH_DIM_SHARE, "'1.5' has no unit: for a share write 1.5 %"},
    {"101", BH_DIM_SHARE, "'101' has no unit: a share is needed, in % or ppm"},
    {"3 mg/cm2", BH_DIM_LENGTH,
     "'3 mg/cm2' is a mass per area, which the key areal_density takes: a length is needed, in mm "
     "or cm"},
    {"0.07", BH_DIM_SHARE, "'0.07' has no unit: for a share write 7 %"},
    {"0", BH_DIM_SHARE, "'0' has no unit: a share is needed, in % or ppm"},
    {"855 Mev", E, "'855 Mev' has the unknown unit 'Mev' ('MeV'?): " NEED_E},
    {"855 mev", E, "'855 mev' has the unknown unit 'mev' ('MeV'?): " NEED_E},
    {"5 inch", L, "'5 inch' has the unknown unit 'inch': " NEED_L},
    {"5 lightyears", L, "'5 lightyears' has the unknown unit 'lightyears': " NEED_L},
    {"2 Mev/c", BH_DIM_MOMENTUM,
     "'2 Mev/c' has the unknown unit 'Mev' ('MeV'?): a momentum is needed, in MeV/c or GeV/c"},
    {"5 m", BH_DIM_ANGLE, "'5 m' is a length: an angle is needed, in deg or mrad"},
    {"855 MeV", BH_DIM_MOMENTUM, "'855 MeV' is an energy: a momentum is needed, in MeV/c or GeV/c"},
    {"5 MeV/u", E, "'5 MeV/u' is an energy per mass number: " NEED_E},
    {"5 %", E, "'5 %' is a share: " NEED_E},
    {"5 kg", L, "'5 kg' is a mass: " NEED_L},
    {"5 cm3", L, "'5 cm3' is a volume: " NEED_L},
    {"5 /cm2", BH_DIM_Q2,
     "'5 /cm2' is a number per area: a momentum transfer squared is needed, in GeV2 or fm-2"},
    {"5 cm-1 fm-1", BH_DIM_Q2,
     "'5 cm-1 fm-1' is a number per area: a momentum transfer squared is needed, in GeV2 or fm-2"},
    {"20 mm K", L, "'20 mm K' has the unit 'mm K': " NEED_L},
    {"20 mm/", L, "'20 mm/' has the unit 'mm/': " NEED_L},
    {"20 (mm", L, "'20 (mm' has the unit '(mm': " NEED_L},
    {"20 mm)", L, "'20 mm)' has the unit 'mm)': " NEED_L},
    {"20 ((((((mm))))))", L, "'20 ((((((mm))))))' has the unit '((((((mm))))))': " NEED_L},
    {"5 mm0", L, "'5 mm0' has the unit 'mm0': " NEED_L},
    {"5 mm^", L, "'5 mm^' has the unit 'mm^': " NEED_L},
    {"5 mm12", L, "'5 mm12' has the unit 'mm12': " NEED_L},
    {"5 (eV9)9/MeV", E, "'5 (eV9)9/MeV' has the unit '(eV9)9/MeV': " NEED_E},
    {"5 W/m/degC", BH_DIM_CONDUCTIVITY,
     "'5 W/m/degC' has the unit 'W/m/degC': a thermal conductivity is needed, in W/m/K or W/cm/K"},
    {"20 C", BH_DIM_TEMPERATURE,
     "'20 C' is a charge, as C is the coulomb: a temperature is needed, in K or degC"},
    {"1e999 MeV", E, "'1e999 MeV' is too large or too small to compute with: " NEED_E},
    {"1e308 GeV", E, "'1e308 GeV' is too large or too small to compute with: " NEED_E},
    {"1e-400 MeV", E, "'1e-400 MeV' is too large or too small to compute with: " NEED_E},
    {"(1 ± 1)e9999 MeV", E,
     "'(1 ± 1)e9999 MeV' is too large or too small to compute with: " NEED_E},
    {"1 ± 1e400 MeV", E, "'1 ± 1e400 MeV' is too large or too small to compute with: " NEED_E},
    {"1 MeV ± 1e400 MeV", E,
     "'1 MeV ± 1e400 MeV' is too large or too small to compute with: " NEED_E},
    {"1 MeV ± 1e400 %", E, "'1 MeV ± 1e400 %' is too large or too small to compute with: " NEED_E},
    {"1e300 MeV ± 1e300 %", E,
     "'1e300 MeV ± 1e300 %' is too large or too small to compute with: " NEED_E},
    {"5 - 10 mm", L, "'5 - 10 mm' is not one number with one unit: " NEED_L},
    {"5 mm ± 1 mm ± 2 mm", L, "'5 mm ± 1 mm ± 2 mm' is not one number with one unit: " NEED_L},
    {"5 10 mm", L, "'5 10 mm' is not one number with one unit: " NEED_L},
    {"5 mm ±", L, "'5 mm ±' is not one number with one unit: " NEED_L},
    {"5 ± MeV", E, "'5 ± MeV' is not one number with one unit: " NEED_E},
    {"(5 ± 1 mm", L, "'(5 ± 1 mm' is not one number with one unit: " NEED_L},
    {"(5 ± x) mm", L, "'(5 ± x) mm' is not one number with one unit: " NEED_L},
    {"(mm)", L, "'(mm)' is not one number with one unit: " NEED_L},
    {"(5 ± 1)e mm", L, "'(5 ± 1)e mm' is not one number with one unit: " NEED_L},
    {"(5 ± 1)e99999 mm", L, "'(5 ± 1)e99999 mm' is not one number with one unit: " NEED_L},
    {"(5 ± 1) mm ± 2", L, "'(5 ± 1) mm ± 2' is not one number with one unit: " NEED_L},
    {"5 mm\nx", L, "'5 mm?x' is not one number with one unit: " NEED_L},
    {"5 \xff\xfemm", L, "'5 ?\?mm' is not one number with one unit: " NEED_L},
    {"0,5 mm", L, "'0,5 mm' has a decimal comma: write '0.5 mm'"},
    {"-0,125 mm", L, "'-0,125 mm' has a decimal comma: write '-0.125 mm'"},
    {"1.234,5 mm", L, "'1.234,5 mm' has a decimal comma: write '1234.5 mm'"},
    {"1234,567 mm", L, "'1234,567 mm' has a decimal comma: write '1234.567 mm'"},
    {"20 ± 0,2 uA", BH_DIM_CURRENT, "'20 ± 0,2 uA' has a decimal comma: write '20 ± 0.2 uA'"},
    {"0,97", BH_DIM_SHARE, "'0,97' has a decimal comma: write '0.97'"},
    {"1,000 h", BH_DIM_TIME,
     "'1,000 h' has a comma in its number: write '1.000 h', or '1000 h' if it marks thousands"},
    {"1,000,000 h", BH_DIM_TIME,
     "'1,000,000 h' has a mark between its thousands: write '1000000 h'"},
    {"1,000.5 h", BH_DIM_TIME, "'1,000.5 h' has a mark between its thousands: write '1000.5 h'"},
    {"1 000 h", BH_DIM_TIME, "'1 000 h' has a mark between its thousands: write '1000 h'"},
    {"1\u202f000 h", BH_DIM_TIME,
     "'1\u202f000 h' has a mark between its thousands: write '1000 h'"},
    {"1'000'000 h", BH_DIM_TIME,
     "'1'000'000 h' has a mark between its thousands: write '1000000 h'"},
    {"1_000 h", BH_DIM_TIME, "'1_000 h' has a mark between its thousands: write '1000 h'"},
    {"7·10^13 /s", BH_DIM_RATE, "'7·10^13 /s' spells out its power of ten: write '7e13 /s'"},
    {"7×10¹³ /s", BH_DIM_RATE, "'7×10¹³ /s' spells out its power of ten: write '7e13 /s'"},
    {"7x10^13 /s", BH_DIM_RATE, "'7x10^13 /s' spells out its power of ten: write '7e13 /s'"},
    {"7 X 10^+13 /s", BH_DIM_RATE, "'7 X 10^+13 /s' spells out its power of ten: write '7e13 /s'"},
    {"7 10^13/s", BH_DIM_RATE, "'7 10^13/s' spells out its power of ten: write '7e13/s'"},
    {"7*10**-3 mm", L, "'7*10**-3 mm' spells out its power of ten: write '7e-3 mm'"},
    {"7 e13 /s", BH_DIM_RATE, "'7 e13 /s' spells out its power of ten: write '7e13 /s'"},
    {"10^13 /s", BH_DIM_RATE, "'10^13 /s' spells out its power of ten: write '1e13 /s'"},
    {"10⁻³ mm", L, "'10⁻³ mm' spells out its power of ten: write '1e-3 mm'"},
    {"(2 ± 1)·10^18 /cm2", BH_DIM_AREAL_NUMBER,
     "'(2 ± 1)·10^18 /cm2' spells out its power of ten: write '(2 ± 1)e18 /cm2'"},
    {"2 ± 1 x 10^18 /cm2", BH_DIM_AREAL_NUMBER,
     "'2 ± 1 x 10^18 /cm2' spells out its power of ten: write '(2 ± 1)e18 /cm2'"},
    {"2e18 ± 1·10^17 /cm2", BH_DIM_AREAL_NUMBER,
     "'2e18 ± 1·10^17 /cm2' spells out its power of ten: write '2e18 ± 1e17 /cm2'"},
    {"5 ± -1 mm", L, "'5 ± -1 mm' has a negative uncertainty: what follows ± must be 0 or more"},
    {"20 uA ± 0.2", BH_DIM_CURRENT,
     "'20 uA ± 0.2' has an uncertainty that is not a current: give it in uA or nA, or in % of the "
     "value"},
    {"20 mm ± 3 uA", L,
     "'20 mm ± 3 uA' has an uncertainty that is not a length: give it in mm or cm, or in % of the "
     "value"},
    {"20 MeV/u ± 3 MeV", BH_DIM_ENERGY_OR_PER_U,
     "'20 MeV/u ± 3 MeV' has an uncertainty that is not an energy: give it in MeV or MeV/u, or in "
     "% of the value"},
    {"20 mm ± 3 furlong", L, "'20 mm ± 3 furlong' has the unknown unit 'furlong': " NEED_L},
    {"20 degC ± 1 %", BH_DIM_TEMPERATURE,
     "'20 degC ± 1 %' has an uncertainty in % of a temperature in degC: give it in degC or K"},
};

START_TEST(what_is_refused_is_told_why)
{
    bh_quantity q = {.value = 77};
    bh_error err = {.text = ""};
    const bh_code code = bh_quantity_parse(refused[_i].text, refused[_i].dimension, &q, &err);
    ck_assert_msg(code == BH_EPLAN, "%s", refused[_i].text);
    ck_assert_msg(strcmp(err.text, refused[_i].sentence) == 0, "said   %s\nwanted %s", err.text,
                  refused[_i].sentence);
    ck_assert(q.value == 77);
    ck_assert_int_eq(bh_quantity_parse(refused[_i].text, refused[_i].dimension, &q, NULL),
                     BH_EPLAN);
}
END_TEST

static const struct {
    const char *wrote, *meant;
    bh_dimension dimension;
} near_units[] = {
    {"uAmp", "uA", BH_DIM_CURRENT},
    {"hr", "h", BH_DIM_TIME},
    {"hours", "h", BH_DIM_TIME},
    {"Hours", "h", BH_DIM_TIME},
    {"sec", "s", BH_DIM_TIME},
    {"degrees", "deg", BH_DIM_ANGLE},
    {"percent", "%", BH_DIM_SHARE},
    {"kelvin", "K", BH_DIM_TEMPERATURE},
    {"Celsius", "degC", BH_DIM_TEMPERATURE},
    {"Torr", "torr", BH_DIM_PRESSURE},
    {"khz", "kHz", BH_DIM_RATE},
    {"barn", "b", BH_DIM_CROSS_SECTION},
    {"micron", "um", BH_DIM_LENGTH},
    {"MM", "mm", BH_DIM_LENGTH},
    {"Gev", "GeV", BH_DIM_ENERGY},
    {"ma", "mA", BH_DIM_CURRENT},
};

START_TEST(an_unknown_unit_suggests_a_known_one)
{
    char text[32], want[64];
    bh_quantity q;
    bh_error err = {.text = ""};
    (void)snprintf(text, sizeof text, "5 %s", near_units[_i].wrote);
    (void)snprintf(want, sizeof want, "unknown unit '%s' ('%s'?):", near_units[_i].wrote,
                   near_units[_i].meant);
    ck_assert_int_eq(bh_quantity_parse(text, near_units[_i].dimension, &q, &err), BH_EPLAN);
    ck_assert_msg(strstr(err.text, want) != NULL, "%s\nwanted %s", err.text, want);
}
END_TEST

START_TEST(long_texts_are_refused_and_cut)
{
    char text[600];
    bh_error err;
    bh_quantity q;
    memset(text, '1', sizeof text);
    memcpy(text + 300, " mm", 4);
    ck_assert_int_eq(bh_quantity_parse(text, BH_DIM_LENGTH, &q, &err), BH_EPLAN);
    ck_assert_ptr_nonnull(strstr(err.text, "111...' is not one number"));
    for (int i = 0; i < 598; i += 2)
        memcpy(text + i, "\u00e4", 3);
    ck_assert_int_eq(bh_quantity_parse(text, BH_DIM_LENGTH, &q, &err), BH_EPLAN);
    (void)strcpy(text, "5 x");
    for (int i = 3; i < 201; i += 2)
        memcpy(text + i, "\u00e4", 3);
    ck_assert_int_eq(bh_quantity_parse(text, BH_DIM_LENGTH, &q, &err), BH_EPLAN);
    ck_assert_ptr_nonnull(strstr(err.text, "\u00e4...'"));
}
END_TEST

static int set_comma_locale(const char *name)
{
    return setlocale(LC_ALL, name) != NULL && localeconv()->decimal_point[0] == ',';
}

/* Compiles a German locale into a folder of its own, where the sources of locales are installed. */
static int make_comma_locale(void)
{
    char folder[] = "/tmp/locale-XXXXXX", command[128];
    if (!mkdtemp(folder))
        return 0;
    (void)snprintf(command, sizeof command,
                   "localedef -i de_DE -f UTF-8 %s/de_DE.UTF-8 2>/dev/null", folder);
    (void)setenv("LOCPATH", folder, 1);
    const int made = system(command) == 0 && set_comma_locale("de_DE.UTF-8");
    (void)snprintf(command, sizeof command, "rm -r %s", folder);
    return system(command) == 0 && made;
}

START_TEST(a_decimal_comma_locale_changes_nothing)
{
    static const char *const names[] = {"de_DE.UTF-8", "de_DE.utf8",  "fr_FR.UTF-8",
                                        "de_DE",       "pl_PL.UTF-8", "ru_RU.UTF-8"};
    int found = 0;
    for (int i = 0; i < COUNT(names) && !found; i++)
        found = set_comma_locale(names[i]);
    if (!found && !make_comma_locale()) {
        (void)puts("units/quantity: skipped: no locale with a decimal comma is installed");
        return;
    }
    char out[64];
    bh_quantity q;
    (void)snprintf(out, sizeof out, "%.1f", 1.5);
    ck_assert_str_eq(out, "1,5"); /* the locale is at work */
    ck_assert_int_eq(bh_quantity_parse("1.5 ± 0.25 GeV", BH_DIM_ENERGY, &q, NULL), BH_OK);
    ck_assert(q.value == 1500 && q.uncertainty == 250);
    (void)bh_quantity_print(&q, BH_DIM_ENERGY, out, sizeof out);
    ck_assert_str_eq(out, "1.5 ± 0.25 GeV");
    (void)setlocale(LC_ALL, "C");
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("quantity");
    tcase_set_timeout(tests, 60); /* compiling a locale takes seconds on a busy machine */
    tcase_add_loop_test(tests, a_form_is_read, 0, COUNT(forms));
    tcase_add_test(tests, equal_lengths_are_equal_doubles);
    tcase_add_test(tests, per_mass_number_is_remembered);
    tcase_add_test(tests, a_unit_has_a_size);
    tcase_add_loop_test(tests, what_is_refused_is_told_why, 0, COUNT(refused));
    tcase_add_loop_test(tests, an_unknown_unit_suggests_a_known_one, 0, COUNT(near_units));
    tcase_add_test(tests, long_texts_are_refused_and_cut);
    tcase_add_test(tests, a_decimal_comma_locale_changes_nothing);
    return run_suite("units/quantity", tests);
}
