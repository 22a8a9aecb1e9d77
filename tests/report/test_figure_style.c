/* test_figure_style.c - the eight styles are told apart on white, in grey, and by eyes that lack
 * one kind of cone. */
#include "../suite.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/report/figure_style.h"

struct colour {
    double red, green, blue; /* linear light, 0 to 1 */
};

/* sRGB to linear light: IEC 61966-2-1. */
static double linear(unsigned char c)
{
    const double v = c / 255.0;
    return v <= 0.04045 ? v / 12.92 : pow((v + 0.055) / 1.055, 2.4);
}

static struct colour colour_of(int number)
{
    const bh_figure_style *s = bh_figure_style_at(number);
    return (struct colour){linear(s->red), linear(s->green), linear(s->blue)};
}

/* Relative luminance and contrast: Web Content Accessibility Guidelines 2.1, W3C 2018. */
static double luminance(struct colour c)
{
    return 0.2126 * c.red + 0.7152 * c.green + 0.0722 * c.blue;
}

static double contrast(struct colour a, struct colour b)
{
    const double x = luminance(a) + 0.05, y = luminance(b) + 0.05;
    return x > y ? x / y : y / x;
}

/* What eyes without long-wave (0) or middle-wave cones (1) make of it: Vienot, Brettel & Mollon,
 * Color Res. Appl. 24 (1999) 243; the matrices from memory. */
static struct colour seen_by(int eye, struct colour c)
{
    if (eye == 0)
        return (struct colour){0.11238 * c.red + 0.88762 * c.green,
                               0.11238 * c.red + 0.88762 * c.green,
                               0.00401 * c.red - 0.00401 * c.green + c.blue};
    return (struct colour){0.29275 * c.red + 0.70725 * c.green, 0.29275 * c.red + 0.70725 * c.green,
                           -0.02234 * c.red + 0.02234 * c.green + c.blue};
}

/* Distance of the perceived values, roughly: cube roots of linear light, 0 to 1 each. */
static double distance(struct colour a, struct colour b)
{
    const double r = cbrt(a.red) - cbrt(b.red), g = cbrt(a.green) - cbrt(b.green),
                 u = cbrt(fmax(a.blue, 0.0)) - cbrt(fmax(b.blue, 0.0));
    return sqrt(r * r + g * g + u * u);
}

START_TEST(colours_stand_out_from_white_and_from_each_other)
{
    const struct colour white = {1.0, 1.0, 1.0};
    const struct colour mine = colour_of(_i);
    ck_assert_double_ge(contrast(mine, white), 3.0);
    for (int k = 0; k < _i; k++) {
        const struct colour other = colour_of(k);
        /* the first three, which most figures need, twice as far apart */
        ck_assert_msg(contrast(mine, other) >= (_i < 3 ? 1.5 : 1.2), "%d and %d: %.3f in grey", _i,
                      k, contrast(mine, other));
        for (int eye = 0; eye < 2; eye++)
            ck_assert_msg(distance(seen_by(eye, mine), seen_by(eye, other)) >= 0.07,
                          "%d and %d look alike to eye %d: %.3f", _i, k, eye,
                          distance(seen_by(eye, mine), seen_by(eye, other)));
    }
}
END_TEST

START_TEST(no_two_have_the_same_dashes_or_mark)
{
    const bh_figure_style *mine = bh_figure_style_at(_i);
    ck_assert_int_eq(mine->dash_count % 2, 0);
    ck_assert_int_le(mine->dash_count, BH_MOST_DASHES);
    for (int k = 0; k < _i; k++) {
        const bh_figure_style *other = bh_figure_style_at(k);
        ck_assert_int_ne(mine->mark, other->mark);
        ck_assert(mine->dash_count != other->dash_count ||
                  memcmp(mine->dash, other->dash, sizeof mine->dash) != 0);
    }
    ck_assert_ptr_eq(bh_figure_style_at(_i + BH_STYLES), mine);
    ck_assert_ptr_eq(bh_figure_style_at(_i - BH_STYLES), mine);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("style");
    tcase_add_loop_test(tests, colours_stand_out_from_white_and_from_each_other, 0, BH_STYLES);
    tcase_add_loop_test(tests, no_two_have_the_same_dashes_or_mark, 0, BH_STYLES);
    return run_suite("report/figure_style", tests);
}
