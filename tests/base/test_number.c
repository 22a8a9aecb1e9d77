/* test_number.c - numbers print shortest, read back exactly, and no locale has a say. */
#include "../suite.h"

#include <float.h>
#include <locale.h>
#include <math.h>
#include <stdint.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/number.h"

static const struct {
    double value;
    const char *shortest, *three; /* three significant digits */
} printed[] = {
    {855, "855", "855"},
    {0.1, "0.1", "0.100"},
    {4.2e37, "4.2e+37", "4.20e+37"},
    {-2.5e-7, "-2.5e-07", "-2.50e-07"},
    {0, "0", "0.00"},
    {-0.0, "-0", "0.00"},
    {1e-4, "0.0001", "0.000100"},
    {9.999e-5, "9.999e-05", "0.000100"},
    {1e6, "1000000", "1000000"},
    {1e7, "1e+07", "10000000"},
    {12345678, "12345678", "12300000"},
    {1.2e14, "1.2e+14", "1.20e+14"},
    {1234.5, "1234.5", "1230"},
    {99.95, "99.95", "100"}, /* the double lies above 99.95 */
    {999.9, "999.9", "1000"},
    {1.0 / 3, "0.3333333333333333", "0.333"},
    {9007199254740993.0, "9007199254740992", "9.01e+15"},
    {1.2345678901234568e17, "1.2345678901234568e+17", "1.23e+17"},
    {5e-324, "5e-324", "4.94e-324"},
    {DBL_MAX, "1.7976931348623157e+308", "1.80e+308"},
    {DBL_MIN, "2.2250738585072014e-308", "2.23e-308"},
    {(double)INFINITY, "inf", "inf"},
    {-(double)INFINITY, "-inf", "-inf"},
    {(double)NAN, "nan", "nan"},
};

static void check_printed(int i)
{
    char text[BH_NUMBER_SIZE];
    ck_assert_uint_eq(bh_number_print(printed[i].value, text, sizeof text),
                      strlen(printed[i].shortest));
    ck_assert_str_eq(text, printed[i].shortest);
    ck_assert_uint_eq(bh_number_digits(printed[i].value, 3, text, sizeof text),
                      strlen(printed[i].three));
    ck_assert_str_eq(text, printed[i].three);
}

START_TEST(prints)
{
    check_printed(_i);
}
END_TEST

START_TEST(digits_and_room_have_limits)
{
    char text[BH_NUMBER_SIZE] = "x";
    (void)bh_number_digits(1.25, 0, text, sizeof text);
    ck_assert_str_eq(text, "1");
    (void)bh_number_digits(0.1, 99, text, sizeof text);
    ck_assert_str_eq(text, "0.10000000000000001");
    ck_assert_uint_eq(bh_number_print(855, text, 3), 0);
    ck_assert_str_eq(text, "");
    ck_assert_uint_eq(bh_number_print(855, text, 4), 3);
    ck_assert_uint_eq(bh_number_print((double)NAN, text, 3), 0);
    ck_assert_str_eq(text, "");
    text[0] = 'x';
    ck_assert_uint_eq(bh_number_digits(1, 3, text, 0), 0);
    ck_assert_uint_eq(bh_number_digits((double)INFINITY, 3, text, 0), 0);
    ck_assert_int_eq(text[0], 'x');
}
END_TEST

static const struct {
    const char *text;
    bh_code code;
    double value;
    const char *rest;
} read[] = {
    {"855 MeV", BH_OK, 855, " MeV"},
    {"5eV", BH_OK, 5, "eV"},
    {"5e3V", BH_OK, 5000, "V"},
    {"1e+", BH_OK, 1, "e+"},
    {"-.5", BH_OK, -0.5, ""},
    {"+5.", BH_OK, 5, ""},
    {"1.2.3", BH_OK, 1.2, ".3"},
    {"1,5", BH_OK, 1, ",5"},
    {"0x10", BH_OK, 0, "x10"},
    {"007.50E-1", BH_OK, 0.75, ""},
    {"-0", BH_OK, -0.0, ""},
    {"0e999999999999999999", BH_OK, 0, ""},
    {"0.000e-99999999999", BH_OK, 0, ""},
    {"9007199254740993", BH_OK, 9007199254740992.0, ""},
    {"9007199254740993.00000000000000000000001", BH_OK, 9007199254740994.0, ""},
    {"5e-324", BH_OK, 5e-324, ""},
    {"1.7976931348623157e308", BH_OK, DBL_MAX, ""},
    {"1.8e308", BH_EDOMAIN, 0, ""},
    {"1e99999999999999999999", BH_EDOMAIN, 0, ""},
    {"1e-400 x", BH_EDOMAIN, 0, " x"},
    {"", BH_EPLAN, 0, NULL},
    {" 1", BH_EPLAN, 0, NULL},
    {"-", BH_EPLAN, 0, NULL},
    {"+.", BH_EPLAN, 0, NULL},
    {".e1", BH_EPLAN, 0, NULL},
    {"inf", BH_EPLAN, 0, NULL},
    {"nan", BH_EPLAN, 0, NULL},
    {"--1", BH_EPLAN, 0, NULL},
    {"\xE2\x88\x92"
     "1",
     BH_EPLAN, 0, NULL},
};

static void check_read(int i)
{
    double value = -7;
    const char *end = NULL;
    ck_assert_int_eq(bh_number_parse(read[i].text, &end, &value), read[i].code);
    if (read[i].code == BH_OK) {
        ck_assert(value == read[i].value && !signbit(value) == !signbit(read[i].value));
    } else {
        ck_assert(value == -7);
    }
    if (read[i].rest)
        ck_assert_str_eq(end, read[i].rest);
    else
        ck_assert_ptr_null(end);
    ck_assert_int_eq(bh_number_parse(read[i].text, NULL, &value), read[i].code);
}

START_TEST(reads)
{
    check_read(_i);
}
END_TEST

/* A locale with a comma need not be installed; then this shows what the C locale shows. */
START_TEST(no_locale_has_a_say)
{
    static const char *const names[] = {"de_DE.UTF-8", "fr_FR.UTF-8", "ps_AF.UTF-8", "C"};
    for (int n = 0; n < COUNT(names); n++)
        if (setlocale(LC_ALL, names[n])) {
            for (int i = 0; i < COUNT(printed); i++)
                check_printed(i);
            for (int i = 0; i < COUNT(read); i++)
                check_read(i);
        }
}
END_TEST

/* Any double, and decimals as people write them.  (xorshift; seed fixed.) */
START_TEST(reads_back_exactly)
{
    uint64_t x = 88172645463325252U;
    for (int i = 0; i < 100000; i++) {
        x ^= x << 13;
        x ^= x >> 7;
        x ^= x << 17;
        double value = 0, again = 0;
        memcpy(&value, &x, sizeof value);
        if (i % 2)
            value = (double)(x % 10000000) / 1000;
        if (!isfinite(value))
            continue;
        char text[BH_NUMBER_SIZE], plain[BH_NUMBER_SIZE];
        const char *end = NULL;
        const size_t length = bh_number_print(value, text, sizeof text);
        ck_assert_int_eq(bh_number_parse(text, &end, &again), BH_OK);
        ck_assert_msg(*end == '\0' && again == value, "%s is not %.17g", text, value);
        if (i % 2) { /* and nothing shorter would do */
            (void)snprintf(plain, sizeof plain, "%.15g", value);
            ck_assert_uint_eq(length, strlen(plain));
        }
    }
}
END_TEST

/* The C library as the judge: many digits, exactly between two doubles and just beside. */
START_TEST(rounds_like_the_library)
{
    char text[1400];
    const char *end = NULL;
    double value = 0;
    for (int e = -1074; e < 1000; e += 7) {
        const double low = ldexp(1, e), high = nextafter(low, (double)INFINITY);
        (void)snprintf(text, sizeof text, "%.1100Le", ((long double)low + (long double)high) / 2);
        ck_assert_int_eq(bh_number_parse(text, &end, &value), BH_OK);
        ck_assert(value == strtod(text, NULL));
        ck_assert_int_eq(*end, '\0');
    }
    memset(text, '0', sizeof text);
    memcpy(text, "9007199254740993.", 17);
    text[1300] = '1';
    text[1301] = '\0';
    ck_assert_int_eq(bh_number_parse(text, &end, &value), BH_OK);
    ck_assert(value == 9007199254740994.0);
    memset(text, '7', 1301);
    ck_assert_int_eq(bh_number_parse(text, &end, &value), BH_EDOMAIN);
    text[300] = '\0';
    ck_assert_int_eq(bh_number_parse(text, &end, &value), BH_OK);
    ck_assert(value == strtod(text, NULL));
    memset(text, '3', 1200);
    strcpy(text + 1200, "e-1000");
    ck_assert_int_eq(bh_number_parse(text, &end, &value), BH_OK);
    ck_assert(value == strtod(text, NULL));
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("number");
    tcase_set_timeout(tests, 60);
    tcase_add_loop_test(tests, prints, 0, COUNT(printed));
    tcase_add_test(tests, digits_and_room_have_limits);
    tcase_add_loop_test(tests, reads, 0, COUNT(read));
    tcase_add_test(tests, no_locale_has_a_say);
    tcase_add_test(tests, reads_back_exactly);
    tcase_add_test(tests, rounds_like_the_library);
    return run_suite("base/number", tests);
}
