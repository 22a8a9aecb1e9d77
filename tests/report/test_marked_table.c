/* test_marked_table.c - the run table as Markdown and LaTeX: every number is that of the table. */
#include "shown.h"

#include "beamhours/base/number.h"
#include "beamhours/report/marked_table.h"
#include "beamhours/report/prefix.h"

typedef void writer(const bh_selection *before, const bh_selection *view, bh_text *out);

static const struct {
    writer *write;
    const char *divide, *row; /* between cells; before a row */
} formats[] = {{bh_report_markdown, " | ", "\n| "}, {bh_report_latex, " & ", "\n"}};

/* The row that begins with `first`, as numbers and words between dividers. */
static const char *find_row(const char *from, int format, const char *first)
{
    char begin[100];
    snprintf(begin, sizeof begin, "%s%s%s", formats[format].row, first, formats[format].divide);
    const char *at = strstr(from, begin);
    ck_assert_msg(at != NULL, "no row %s in\n%s", first, from);
    return at + strlen(formats[format].row);
}

/* Parsed back, a cell is the table's value but for its digits. */
START_TEST(numbers_read_back)
{
    static const bh_column_id ids[] = {BH_COL_ANGLE, BH_COL_Q2, BH_COL_SIGNAL, BH_COL_HOURS};
    struct evaluated e = evaluate(two_arms);
    bh_selection view = view_of(
        &e, &(bh_selection_request){.columns = "setting,angle_deg,q2_GeV2,signal_rate_Hz,hours"});
    bh_text out = {0};
    formats[_i].write(NULL, &view, &out);
    const char *end = NULL, *at = out.bytes;
    for (size_t row = 0; row < view.row_count; row++) {
        at = find_row(at, _i, bh_selection_text(&view, row, BH_COL_SETTING));
        for (int c = 0; c < COUNT(ids); c++) {
            const double wanted = bh_selection_number(&view, row, (int)ids[c]);
            double got = NAN;
            at = strstr(at, formats[_i].divide) + strlen(formats[_i].divide);
            if (isnan(wanted)) {
                ck_assert(at[0] == '-' || strncmp(at, "{-}", 3) == 0);
                continue;
            }
            ck_assert_int_eq(bh_number_parse(at, &end, &got), BH_OK);
            ck_assert_relative(got, wanted, 6e-4, bh_column_at((int)ids[c])->key);
        }
    }
    bh_text_free(&out);
    bh_selection_free(&view);
    done(&e);
}
END_TEST

START_TEST(inputs_totals_and_cautions_stand_around)
{
    static const char *const wanted[] = {"beam",  "target",      "arm",
                                         "asked", "per nucleus", "decide."};
    struct evaluated e = evaluate(two_arms);
    bh_selection view = view_of(&e, &(bh_selection_request){0});
    bh_text out = {0};
    formats[_i].write(NULL, &view, &out);
    for (int i = 0; i < COUNT(wanted); i++)
        ck_assert_msg(strstr(out.bytes, wanted[i]) != NULL, "no %s in\n%s", wanted[i], out.bytes);
    ck_assert_ptr_nonnull(strstr(out.bytes, "scheduled = beam hours / 50"));
    for (size_t i = 0; i < bh_table_cautions(e.table); i++) {
        char head[30];
        snprintf(head, sizeof head, "%.20s", bh_table_caution(e.table, i)->text);
        ck_assert_ptr_nonnull(strstr(out.bytes, head));
    }
    bh_text_free(&out);
    bh_selection_free(&view);
    done(&e);
}
END_TEST

/* What a title holds is no mark, also where it has several lines, or looks like an input. */
START_TEST(a_title_is_only_a_title)
{
    struct evaluated e =
        evaluate("plan: 1\ntitle: \"beam    50 % _off_\\nbeam    \\\\end{x}\"\n"
                 "beam: {particle: electron, kinetic_energy: 400 MeV, current: 10 uA}\n" TARGET
                 "arms: [{name: A_1, solid_angle: 5 msr}]\nsettings: [{name: K, angle: 40 deg, "
                 "time: 1 h}]\n");
    bh_selection view = view_of(&e, &(bh_selection_request){0});
    bh_text out = {0};
    formats[_i].write(NULL, &view, &out);
    ck_assert_msg(strstr(out.bytes, _i ? "50 \\% \\_off\\_" : "50 % \\_off\\_") != NULL, "%s",
                  out.bytes);
    ck_assert_ptr_null(strstr(out.bytes, " \\end{x}"));
    ck_assert_ptr_nonnull(strstr(out.bytes, "A\\_1: right"));
    const char *lead = _i ? "\\item[beam]" : "- **beam**";
    const char *first = strstr(out.bytes, lead);
    ck_assert_ptr_nonnull(first);
    ck_assert_ptr_null(strstr(first + 1, lead));
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
    formats[_i].write(&before, &after, &out);
    find_row(out.bytes, _i, "before");
    find_row(out.bytes, _i, "after");
    const char *header = strstr(out.bytes, "state");
    ck_assert_ptr_nonnull(header);
    ck_assert_ptr_nonnull(strstr(out.bytes, _i ? "{before} & {after}" : "before, h | after, h"));
    bh_text_free(&out);
    bh_selection_free(&before);
    bh_selection_free(&after);
    done(&e);
    done(&f);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("marked table");
    tcase_add_loop_test(tests, numbers_read_back, 0, 2);
    tcase_add_loop_test(tests, inputs_totals_and_cautions_stand_around, 0, 2);
    tcase_add_loop_test(tests, a_title_is_only_a_title, 0, 2);
    tcase_add_loop_test(tests, before_and_after_stand_in_a_first_column, 0, 2);
    return run_suite("report/marked_table", tests);
}
