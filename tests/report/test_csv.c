/* test_csv.c - comma-separated values as RFC 4180 has them, read back to the very same numbers. */
#include "shown.h"

#include "beamhours/base/number.h"
#include "beamhours/report/csv.h"

enum { MOST_FIELDS = 4096 };

/* Fields in the order of the file, and where lines end. */
struct csv {
    char *field[MOST_FIELDS];
    size_t fields, columns, lines;
};

/* A reader by the grammar of RFC 4180, section 2, and nothing more lenient. */
static void parse(const char *s, struct csv *csv)
{
    *csv = (struct csv){.fields = 0};
    while (*s) {
        char *out = calloc(1, strlen(s) + 1);
        size_t n = 0;
        if (*s == '"') {
            for (s++; *s != '"' || s[1] == '"'; s += *s == '"' ? 2 : 1) {
                ck_assert_msg(*s, "a quoted field does not end");
                out[n++] = *s;
            }
            s++;
        } else {
            for (; *s && !strchr(",\r\n", *s); s++) {
                ck_assert_msg(*s != '"', "a quote inside an unquoted field");
                out[n++] = *s;
            }
        }
        csv->field[csv->fields++] = out;
        if (*s == ',') {
            s++;
            continue;
        }
        ck_assert_msg(s[0] == '\r' && s[1] == '\n', "a line does not end in CR LF: %.20s", s);
        s += 2;
        csv->lines++;
        if (csv->lines == 1)
            csv->columns = csv->fields;
        ck_assert_uint_eq(csv->fields, csv->lines * csv->columns);
    }
}

static void forget(struct csv *csv)
{
    for (size_t i = 0; i < csv->fields; i++)
        free(csv->field[i]);
}

static const char *at(const struct csv *csv, size_t line, size_t column)
{
    return csv->field[line * csv->columns + column];
}

/* The cells of one line against the view's row; returns how many were empty. */
static int compare(const struct csv *csv, size_t line, size_t from, const bh_selection *view,
                   size_t row)
{
    int empty = 0;
    for (size_t c = from; c < csv->columns; c++) {
        const char *got = at(csv, line, c), *end = NULL;
        const int id = bh_column_find(at(csv, 0, c));
        ck_assert_int_ge(id, 0);
        const char *text = bh_selection_text(view, row, id);
        double number = NAN;
        if (text) {
            ck_assert_str_eq(got, text);
        } else if (isnan(bh_selection_number(view, row, id))) {
            ck_assert_str_eq(got, "");
            empty++;
        } else {
            ck_assert_int_eq(bh_number_parse(got, &end, &number), BH_OK);
            ck_assert_msg(*end == '\0' && number == bh_selection_number(view, row, id), "%s: %s",
                          at(csv, 0, c), got);
        }
    }
    return empty;
}

START_TEST(numbers_read_back_bit_for_bit)
{
    struct evaluated e = evaluate(two_arms);
    bh_selection view = view_of(&e, &(bh_selection_request){.bins = _i > 0});
    bh_text out = {0};
    struct csv csv;
    bh_report_csv(&view, &out);
    parse(out.bytes, &csv);
    ck_assert_uint_eq(csv.lines, view.row_count + 1);
    ck_assert_uint_eq(csv.columns, BH_COLUMN_COUNT - (_i ? 0 : 1)); /* bin only with bins */
    int empty = 0;
    for (size_t row = 0; row < view.row_count; row++)
        empty += compare(&csv, row + 1, 0, &view, row);
    ck_assert_int_gt(empty, 0);
    forget(&csv);
    bh_text_free(&out);
    bh_selection_free(&view);
    done(&e);
}
END_TEST

START_TEST(the_header_is_the_list_of_columns)
{
    struct evaluated e = evaluate(one_arm);
    bh_selection view = view_of(&e, &(bh_selection_request){.bins = true});
    bh_text out = {0};
    struct csv csv;
    bh_report_csv(&view, &out);
    parse(out.bytes, &csv);
    for (int id = 0; id < BH_COLUMN_COUNT; id++)
        ck_assert_str_eq(at(&csv, 0, (size_t)id), bh_column_at(id)->key);
    forget(&csv);
    bh_text_free(&out);
    bh_selection_free(&view);
    done(&e);
}
END_TEST

START_TEST(before_and_after_stand_in_a_first_column)
{
    struct evaluated e = evaluate(two_arms), f = evaluate(one_arm);
    const bh_selection_request request = {.columns = "setting,counts"};
    bh_selection before = view_of(&e, &request), after = view_of(&f, &request);
    bh_text out = {0};
    struct csv csv;
    bh_report_csv_against(&before, &after, &out);
    parse(out.bytes, &csv);
    ck_assert_str_eq(at(&csv, 0, 0), "state");
    ck_assert_uint_eq(csv.lines, 1 + before.row_count + after.row_count);
    for (size_t line = 1; line < csv.lines; line++) {
        const bool old = line <= before.row_count;
        ck_assert_str_eq(at(&csv, line, 0), old ? "before" : "after");
        compare(&csv, line, 1, old ? &before : &after, line - 1 - (old ? 0 : before.row_count));
    }
    forget(&csv);
    bh_text_free(&out);
    bh_selection_free(&before);
    bh_selection_free(&after);
    done(&e);
    done(&f);
}
END_TEST

START_TEST(fields_are_quoted_where_they_must_be)
{
    static const char *const rows[][2] = {{"plain", "plain"},
                                          {"", ""},
                                          {"a,b", "\"a,b\""},
                                          {"a \"b\"", "\"a \"\"b\"\"\""},
                                          {"two\nlines", "\"two\nlines\""},
                                          {"cr\r", "\"cr\r\""},
                                          {" blanks ", " blanks "},
                                          {"µ;'", "µ;'"}};
    for (int i = 0; i < COUNT(rows); i++) {
        bh_text out = {0};
        bh_csv_field(&out, rows[i][0]);
        ck_assert_str_eq(out.bytes, rows[i][1]);
        bh_text_free(&out);
    }
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("csv");
    tcase_add_loop_test(tests, numbers_read_back_bit_for_bit, 0, 2);
    tcase_add_test(tests, the_header_is_the_list_of_columns);
    tcase_add_test(tests, before_and_after_stand_in_a_first_column);
    tcase_add_test(tests, fields_are_quoted_where_they_must_be);
    return run_suite("report/csv", tests);
}
