/* test_measured.c - tables of published points: what is read, and the place of each mistake. */
#include "../suite.h"

#include <stdio.h>
#include <string.h>

#include "beamhours/report/measured.h"

static bh_code read(const char *text, size_t length, bh_arena *arena, bh_measured *out,
                    bh_error *err)
{
    *err = (bh_error){.code = BH_OK};
    const bh_measured_request request = {text, length, "p.csv", "angle_deg", "counts"};
    return bh_measured_read(&request, arena, out, err);
}

static const struct {
    const char *text;
    size_t count, sources;
    double x, y, uncertainty; /* of the last point */
    const char *source;       /* of the last point */
} good[] = {
    {"angle_deg,counts\n1,2\n", 1, 1, 1, 2, 0, ""},
    {"angle_deg,counts\r\n1,2\r\n3,-4\r\n", 2, 1, 3, -4, 0, ""},
    {"counts,angle_deg,uncertainty\n2.5e3,10,7", 1, 1, 10, 2500, 7, ""},
    {"\xEF\xBB\xBF"
     "angle_deg,counts,relative_uncertainty\n10,-200,0.02\n",
     1, 1, 10, -200, 4, ""},
    {"source,angle_deg,counts\nA,1,1\n\"B, 1988\",2,2\nA,3,3\n", 3, 2, 3, 3, 0, "A"},
    {"source,angle_deg,counts\n\"say \"\"so\"\"\",2,2\n\n", 1, 1, 2, 2, 0, "say \"so\""},
    {"setting,angle_deg,hours,counts\nK, 1 ,,\t2\n", 1, 1, 1, 2, 0, ""},
    {"\n\nangle_deg,counts,source\n1,2,\n", 1, 1, 1, 2, 0, ""},
    {"\"angle_deg\",\"counts\"\n\"1\",\"2\"\n", 1, 1, 1, 2, 0, ""},
    {"source,angle_deg,counts\n\"two\nlines\",2,2\nZ,1,5\n", 2, 2, 1, 5, 0, "Z"},
};

START_TEST(points_are_read)
{
    bh_arena *arena = bh_arena_new();
    bh_measured m;
    bh_error err;
    ck_assert_msg(!read(good[_i].text, strlen(good[_i].text), arena, &m, &err), "%s", err.text);
    ck_assert_uint_eq(m.count, good[_i].count);
    ck_assert_uint_eq(m.source_count, good[_i].sources);
    const bh_measured_point *last = &m.point[m.count - 1];
    ck_assert_double_eq(last->x, good[_i].x);
    ck_assert_double_eq(last->y, good[_i].y);
    ck_assert_double_eq_tol(last->uncertainty, good[_i].uncertainty, 1e-12);
    ck_assert_str_eq(m.source[last->source], good[_i].source);
    bh_arena_free(arena);
}
END_TEST

static const struct {
    const char *text;
    int line, column;
    const char *words;
} bad[] = {
    {"", 0, 0, "the file is empty; its first line names the columns: angle_deg,counts"},
    {"\n \n", 2, 1, "no heading \"\" is known"},
    {"angle_deg,counts\n", 2, 0, "no row below the header"},
    {"angle,counts\n1,2\n", 1, 1, "no heading \"angle\" is known; did you mean angle_deg?"},
    {"angle_deg,count\n1,2\n", 1, 11, "did you mean counts?"},
    {"angle_deg,counts,uncertianty\n1,2,3\n", 1, 18, "did you mean uncertainty?"},
    {"angle_deg;counts\n1;2\n", 1, 1, "semicolons"},
    {"angle_deg,hours\n1,2\n", 1, 1, "no column has the heading counts"},
    {"hours,counts\n1,2\n", 1, 1, "no column has the heading angle_deg"},
    {"angle_deg,counts,counts\n1,2,3\n", 1, 18, "a second column has the heading counts"},
    {"angle_deg,counts,uncertainty,relative_uncertainty\n", 1, 30, "take one away"},
    {"angle_deg,counts\n1,2\n3,\n", 3, 3, "counts is empty; write a number"},
    {"angle_deg,counts\n1,2\n3,4 Hz\n", 3, 3, "counts: \"4 Hz\" is no number"},
    {"angle_deg,counts\n\"0,5\",2\n", 2, 1, "angle_deg: \"0,5\" is no number"},
    {"angle_deg,counts\n1,nan\n", 2, 3, "is no number"},
    {"angle_deg,counts\n1,1e999\n", 2, 3, "is no number"},
    {"angle_deg,counts\n1,2,3\n", 2, 5, "the row has 3 cells, the header 2"},
    {"angle_deg,counts,source\n1,2\n", 2, 3, "the row has 2 cells, the header 3"},
    {"angle_deg,counts,uncertainty\n1,2,-3\n", 2, 5, "uncertainty is below 0"},
    {"angle_deg,counts,relative_uncertainty\n1,2,-3\n", 2, 5, "relative_uncertainty is below 0"},
    {"source,angle_deg,counts\nµµ,1,x\n", 2, 6, "is no number"},
    {"source,angle_deg,counts\n\"A,1,2\n", 2, 1, "has no end"},
    {"source,angle_deg,counts\n\"A\"B,1,2\n", 2, 4, "follows the closing quote"},
    {"angle_deg,counts\n1,\xFF\n", 2, 3, "0xFF is not UTF-8"},
    {"source,angle_deg,counts\na,1,1\nb,1,1\nc,1,1\nd,1,1\ne,1,1\nf,1,1\ng,1,1\nh,1,1\ni,1,1\n", 10,
     1, "\"i\" is source number 9"},
};

START_TEST(mistakes_are_shown_where_they_are)
{
    bh_arena *arena = bh_arena_new();
    bh_measured m;
    bh_error err;
    ck_assert_int_eq(read(bad[_i].text, strlen(bad[_i].text), arena, &m, &err), BH_EPLAN);
    ck_assert_msg(strstr(err.text, bad[_i].words) != NULL, "%s", err.text);
    ck_assert_str_eq(err.file, "p.csv");
    ck_assert_msg(err.line == bad[_i].line && err.column == bad[_i].column, "%d:%d: %s", err.line,
                  err.column, err.text);
    ck_assert_uint_eq(m.count, 0);
    bh_arena_free(arena);
}
END_TEST

START_TEST(too_much_is_refused)
{
    enum { ROWS = BH_MOST_MEASURED + 1 };
    bh_arena *arena = bh_arena_new();
    bh_measured m;
    bh_error err;
    char *text = malloc(32 + 4 * (size_t)ROWS), *to = text + sprintf(text, "angle_deg,counts\n");
    for (int i = 0; i < ROWS; i++)
        to += sprintf(to, "1,2\n");
    ck_assert_int_eq(read(text, (size_t)(to - text), arena, &m, &err), BH_EPLAN);
    ck_assert_int_eq(err.line, ROWS + 1);
    ck_assert(!read(text, (size_t)(to - text) - 4, arena, &m, &err));
    ck_assert_uint_eq(m.count, BH_MOST_MEASURED);
    memset(text, ',', 100);
    ck_assert_int_eq(read(text, 100, arena, &m, &err), BH_EPLAN);
    ck_assert_msg(strstr(err.text, "more than 64 cells"), "%s", err.text);
    ck_assert_int_eq(read("a\0b", 3, arena, &m, &err), BH_EPLAN);
    free(text);
    bh_arena_free(arena);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("measured");
    tcase_add_loop_test(tests, points_are_read, 0, COUNT(good));
    tcase_add_loop_test(tests, mistakes_are_shown_where_they_are, 0, COUNT(bad));
    tcase_add_test(tests, too_much_is_refused);
    return run_suite("report/measured", tests);
}
