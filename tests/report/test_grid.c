/* test_grid.c - small tables in three formats: laid out, escaped, with units. */
#include "../suite.h"

#include "beamhours/report/grid.h"
#include "beamhours/report/latex.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

static void as_text(const bh_grid *grid, bh_text *out)
{
    bh_grid_text(grid, 80, out);
}

static bh_grid sample(void)
{
    bh_grid grid = {0};
    bh_grid_column_add(&grid, "name", "", false);
    bh_grid_column_add(&grid, "sigma", "nb/sr", true);
    bh_grid_column_add(&grid, "luminosity", "1/cm2/s", true);
    static const char *const cells[] = {"A_1", "12.5", "1.20e+36", "müon|x", "-", "7"};
    for (int i = 0; i < COUNT(cells); i++)
        bh_grid_cell(&grid, cells[i]);
    return grid;
}

START_TEST(each_format_lays_it_out)
{
    static const struct {
        void (*write)(const bh_grid *grid, bh_text *out);
        const char *wanted;
    } rows[] = {{as_text, "name   sigma luminosity\n"
                          "       nb/sr    1/cm2/s\n"
                          "A_1     12.5   1.20e+36\n"
                          "müon|x     -          7\n"},
                {bh_grid_markdown, "| name | sigma, nb/sr | luminosity, 1/cm2/s |\n"
                                   "| --- | ---: | ---: |\n"
                                   "| A\\_1 | 12.5 | 1.20e+36 |\n"
                                   "| müon\\|x | - | 7 |\n\n"},
                {bh_grid_latex, "{\\footnotesize\\setlength{\\tabcolsep}{3pt}\n\\begin{longtable}{"
                                "lS[table-format=2.1]S[table-format=1.2e2]}\n\\toprule\n"
                                "{name} & {sigma} & {luminosity} \\\\\n"
                                "{} & {\\si{\\nano\\bhbarn\\per\\steradian}} & "
                                "{\\si{\\per\\centi\\metre\\squared\\per\\second}} \\\\\n"
                                "\\midrule\n\\endhead\n\\bottomrule\n\\endfoot\n"
                                "A\\_1 & 12.5 & 1.20e+36 \\\\\n"
                                "müon\\textbar{}x & {-} & 7 \\\\\n"
                                "\\end{longtable}}\n"}};
    bh_grid grid = sample();
    bh_text out = {0};
    rows[_i].write(&grid, &out);
    ck_assert_str_eq(out.bytes, rows[_i].wanted);
    bh_text_free(&out);
    bh_grid_free(&grid);
}
END_TEST

/* A grid that lost a cell writes nothing and says so; one without columns is nothing. */
START_TEST(what_is_incomplete_is_not_shown)
{
    static void (*const write[])(const bh_grid *grid, bh_text *out) = {as_text, bh_grid_markdown,
                                                                       bh_grid_latex};
    bh_grid grid = sample(), empty = {0};
    bh_text out = {0};
    write[_i](&empty, &out);
    ck_assert_uint_eq(out.length, 0);
    ck_assert(!out.failed);
    grid.cells.failed = true;
    write[_i](&grid, &out);
    ck_assert_uint_eq(out.length, 0);
    ck_assert(out.failed);
    bh_text_free(&out);
    bh_grid_free(&grid);
}
END_TEST

/* What never varies is said above, words are broken, the rest stands below with its names. */
START_TEST(what_is_too_wide_finds_room)
{
    static const char *const cells[] = {
        "a setting with a name", "east", "1", "x", "2", "and so on", "east", "4", "y", "5"};
    static const char wanted[] =
        "in every line: arm east\n\n"
        "name         a heading that takes some room another heading, still wider\n"
        "                                         Hz                           Hz\n"
        "a setting                                 1                            x\n"
        "with a name\n"
        "and so on                                 4                            y\n"
        "\n"
        "name         the third heading has none left\n"
        "                                          Hz\n"
        "a setting                                  2\n"
        "with a name\n"
        "and so on                                  5\n";
    bh_grid grid = {0};
    bh_text out = {0};
    bh_grid_column_add(&grid, "name", "", false);
    bh_grid_column_add(&grid, "arm", "", false);
    bh_grid_column_add(&grid, "a heading that takes some room", "Hz", true);
    bh_grid_column_add(&grid, "another heading, still wider", "Hz", true);
    bh_grid_column_add(&grid, "the third heading has none left", "Hz", true);
    for (int i = 0; i < COUNT(cells); i++)
        bh_grid_cell(&grid, cells[i]);
    as_text(&grid, &out);
    ck_assert_str_eq(out.bytes, wanted);
    bh_text_free(&out);
    bh_grid_text(&grid, 200, &out);
    ck_assert_ptr_nonnull(strstr(out.bytes, "a setting with a name east"));
    ck_assert_ptr_null(strstr(out.bytes, "in every line"));
    bh_text_free(&out);
    bh_grid_free(&grid);
}
END_TEST

START_TEST(more_columns_than_room_are_left_out)
{
    bh_grid grid = {0};
    for (int i = 0; i < BH_MOST_GRID_COLUMNS + 3; i++)
        bh_grid_column_add(&grid, "x", "", true);
    ck_assert_uint_eq(grid.column_count, BH_MOST_GRID_COLUMNS);
    bh_grid_free(&grid);
}
END_TEST

static const struct {
    const char *words, *latex, *markdown;
} escapes[] = {
    {"plain words, 3.5 h", "plain words, 3.5 h", "plain words, 3.5 h"},
    {"in_plane ±20", "in\\_plane \\ensuremath{\\pm}20", "in\\_plane ±20"},
    {"\\input{x}", "\\textbackslash{}input\\{x\\}", "\\\\input{x}"},
    {"$x^2$ & 5 % #1 ~", "\\$x\\textasciicircum{}2\\$ \\& 5 \\% \\#1 \\textasciitilde{}",
     "$x^2$ \\& 5 % \\#1 \\~"},
    {"<b>|`c`*", "\\textless{}b\\textgreater{}\\textbar{}\\textasciigrave{}c\\textasciigrave{}{*}",
     "\\<b\\>\\|\\`c\\`\\*"},
    {"[5cm] \"a\" ''", "{[}5cm{]} \\textquotedbl{}a\\textquotedbl{} '{}'{}", "\\[5cm\\] \"a\" ''"},
    {"a--b---", "a-{}-{}b-{}-{}-", "a--b---"},
    {"two\nlines", "two lines", "two lines"},
    {"Größe", "Größe", "Größe"},
};

START_TEST(names_are_shown_not_obeyed)
{
    bh_text latex = {0}, markdown = {0};
    bh_latex_words(&latex, escapes[_i].words);
    bh_markdown_words(&markdown, escapes[_i].words);
    ck_assert_str_eq(latex.bytes, escapes[_i].latex);
    ck_assert_str_eq(markdown.bytes, escapes[_i].markdown);
    bh_text_free(&latex);
    bh_text_free(&markdown);
}
END_TEST

static const struct {
    const char *unit, *latex;
} units[] = {
    {"MeV/c", "\\si{\\mega\\electronvolt\\per\\bhlight}"},
    {"GeV2", "\\si{\\giga\\electronvolt\\squared}"},
    {"1/fm", "\\si{\\per\\femto\\metre}"},
    {"1/cm2", "\\si{\\per\\centi\\metre\\squared}"},
    {"1", "1"},
    {"%", "\\si{\\percent}"},
    {"shifts_x", "shifts\\_x"},
    {"MeV/x", "MeV/x"},
};

START_TEST(units_are_those_of_siunitx)
{
    bh_grid grid = {0};
    bh_text out = {0};
    char wanted[200];
    bh_grid_column_add(&grid, "x", units[_i].unit, true);
    bh_grid_latex(&grid, &out);
    snprintf(wanted, sizeof wanted, "\n{%s} \\\\\n", units[_i].latex);
    ck_assert_msg(strstr(out.bytes, wanted) != NULL, "%s: %s", units[_i].unit, out.bytes);
    bh_text_free(&out);
    bh_grid_free(&grid);
}
END_TEST

/* Each unit that is declared in the preamble, and none but these, is one of ours. */
START_TEST(units_of_our_own_are_declared)
{
    static const char *const ours[] = {"bhbarn", "bhlight", "bhhour"};
    bh_text needs = {0};
    char wanted[60];
    bh_latex_needs(&needs);
    for (int i = 0; i < COUNT(ours); i++) {
        snprintf(wanted, sizeof wanted, "%% \\DeclareSIUnit\\%s{", ours[i]);
        ck_assert_ptr_nonnull(strstr(needs.bytes, wanted));
    }
    bh_text_free(&needs);
}
END_TEST

static const struct {
    double hours;
    const char *wanted;
} times[] = {{4.0312, "4.03"}, {0.4031, "0.403"}, {144, "144.00"},    {9.999, "10.00"},
             {-2.5, "-2.50"},  {1.0, "1.00"},     {1234.5, "1234.50"}};

START_TEST(hours_have_two_decimals)
{
    bh_text out = {0};
    bh_hours_words(&out, times[_i].hours);
    ck_assert_str_eq(out.bytes, times[_i].wanted);
    bh_text_free(&out);
    bh_hours_words(&out, NAN);
    ck_assert_str_eq(out.bytes, "-");
    bh_text_free(&out);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("grid");
    tcase_add_loop_test(tests, each_format_lays_it_out, 0, 3);
    tcase_add_loop_test(tests, what_is_incomplete_is_not_shown, 0, 3);
    tcase_add_test(tests, more_columns_than_room_are_left_out);
    tcase_add_test(tests, what_is_too_wide_finds_room);
    tcase_add_loop_test(tests, names_are_shown_not_obeyed, 0, COUNT(escapes));
    tcase_add_loop_test(tests, units_are_those_of_siunitx, 0, COUNT(units));
    tcase_add_test(tests, units_of_our_own_are_declared);
    tcase_add_loop_test(tests, hours_have_two_decimals, 0, COUNT(times));
    return run_suite("report/grid", tests);
}
