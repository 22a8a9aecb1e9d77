/* test_power.c - which numbers are set with a power of ten, and how. */
#include "../suite.h"

#include <string.h>

#include "beamhours/report/power.h"

static const struct {
    const char *text, *shown;
} rows[] = {
    {"1.248e+13", "1.248\u00A0×\u00A010¹³"},
    {"-6.761e-08", "-6.761\u00A0×\u00A010⁻⁸"},
    {"1e0", "1\u00A0×\u00A010⁰"},
    {"309.5 ub/sr x 5.84e+20 /cm2, kept (1.0e-3)",
     "309.5 ub/sr x 5.84\u00A0×\u00A010²⁰ /cm2, kept (1.0\u00A0×\u00A010⁻³)"},
    {"2e5;3e6,4E7", "2\u00A0×\u00A010⁵;3e6,4E7"}, /* no blank before the others: of one word */
    {"0.9500", "0.9500"},
    {"", ""},
    {"-", "-"},
    /* no numbers: digests, names, units, what is too long or goes on */
    {"12a8e7d187af8504c291f3bc14374ac8", "12a8e7d187af8504c291f3bc14374ac8"},
    {"6245e150f", "6245e150f"},
    {"12e4567", "12e4567"},
    {"K1e5x 1e5x e5 .5e3 1e 1e+ 1.e", "K1e5x 1e5x e5 .5e3 1e 1e+ 1.e"},
    {"beam.particle_rate=1e13", "beam.particle_rate=1e13"},
    /* to be typed as it stands */
    {"beamhours report p.yaml --with 'a.b= 1e+13 /s'",
     "beamhours report p.yaml --with 'a.b= 1e+13 /s'"},
};

START_TEST(set_as_in_print)
{
    bh_text out = {0};
    bh_power found;
    bh_power_raise(rows[_i].text, &out);
    ck_assert_str_eq(out.bytes ? out.bytes : "", rows[_i].shown);
    ck_assert_int_eq(bh_power_find(rows[_i].text, &found),
                     strcmp(rows[_i].text, rows[_i].shown) != 0);
    bh_text_free(&out);
}
END_TEST

START_TEST(says_where_it_stands)
{
    static const char text[] = "by 2.50e-07 cm";
    bh_power p;
    ck_assert(bh_power_find(text, &p));
    ck_assert_ptr_eq(p.at, text + 3);
    ck_assert_uint_eq(p.factor, 4);
    ck_assert_uint_eq(p.length, 8);
    ck_assert_int_eq(p.power, -7);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("power");
    tcase_add_loop_test(tests, set_as_in_print, 0, COUNT(rows));
    tcase_add_test(tests, says_where_it_stands);
    return run_suite("report/power", tests);
}
