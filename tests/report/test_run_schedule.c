/* test_run_schedule.c - a schedule says the numbers of the run table, each where it belongs. */
#include "shown.h"

#include <json-c/json.h>

#include "beamhours/report/run_schedule.h"

#define SHIFTS                                                                              \
    "schedule: {availability: 50 %, start_up: 1 h, shift: 8 h, contingency: 10 %, tasks: [" \
    "{name: check, time: 15 min, every: shift}, {name: survey, time: 2 h, beam: none}]}\n"

static const char *const with_tasks =
    BEAM TARGET ARMS "settings:\n"
                     "  - {name: K1, arm: A, angle: 30 deg, time: 20 h}\n"
                     "  - {name: K2, arm: A, angle: 40 deg, time: 2 h}\n" SHIFTS;

static const char *const plans[] = {two_arms, one_arm, with_tasks};

static double of(json_object *in, const char *key)
{
    json_object *value = NULL;
    return json_object_object_get_ex(in, key, &value) && value ? json_object_get_double(value)
                                                               : (double)NAN;
}

static const char *words(json_object *in, const char *key)
{
    json_object *value = NULL;
    return json_object_object_get_ex(in, key, &value) ? json_object_get_string(value) : NULL;
}

/* The last piece of a setting's data asks for its charge and counts, whole; hours add up. */
static void compare(const struct evaluated *e, json_object *spans, size_t row)
{
    const char *setting = bh_table_text(e->table, false, row, BH_COL_SETTING);
    const char *arm_name = bh_table_text(e->table, false, row, BH_COL_ARM);
    double hours = 0.0, charge = NAN, counts = NAN;
    for (size_t i = 0; i < json_object_array_length(spans); i++) {
        json_object *span = json_object_array_get_idx(spans, i), *arms = NULL;
        if (strcmp(words(span, "kind"), "data") != 0 ||
            strcmp(words(span, "setting"), setting) != 0)
            continue;
        hours += of(span, "hours");
        json_object_object_get_ex(span, "arms", &arms);
        for (size_t a = 0; a < json_object_array_length(arms); a++) {
            json_object *arm = json_object_array_get_idx(arms, a);
            if (strcmp(words(arm, "arm"), arm_name) != 0)
                continue;
            charge = of(arm, "charge_mC");
            counts = of(arm, "counts");
            ck_assert_double_eq(of(arm, "angle_deg"), cell(e, row, BH_COL_ANGLE));
            ck_assert_double_eq(of(arm, "central_momentum_MeV_per_c"),
                                cell(e, row, BH_COL_CENTRAL_MOMENTUM));
        }
    }
    if (isnan(cell(e, row, BH_COL_HOURS))) {
        ck_assert(isnan(charge) && isnan(counts));
        return;
    }
    ck_assert_relative(hours, cell(e, row, BH_COL_HOURS), 1e-12, setting);
    ck_assert_relative(charge, cell(e, row, BH_COL_CHARGE), 1e-12, setting);
    ck_assert_relative(counts, cell(e, row, BH_COL_COUNTS), 1e-12, setting);
}

START_TEST(numbers_are_those_of_the_table)
{
    struct evaluated e = evaluate(plans[_i]);
    bh_run_schedule s = {.has_start = false, .version = "1"};
    bh_arena *arena = bh_arena_new();
    bh_error err;
    bh_text out = {0};
    ck_assert_int_eq(bh_run_schedule_make(e.table, arena, &s, &err), BH_OK);
    ck_assert_int_eq(bh_run_schedule_json(&s, &out), BH_OK);
    json_object *whole = json_tokener_parse(out.bytes), *spans = NULL;
    ck_assert(json_object_object_get_ex(whole, "schedule", &spans));
    for (size_t row = 0; row < bh_table_rows(e.table, false); row++)
        compare(&e, spans, row);
    json_object *last = json_object_array_get_idx(spans, json_object_array_length(spans) - 1);
    ck_assert_relative(of(last, "begin_h") + of(last, "clock_hours"),
                       bh_table_totals(e.table)->asked_hours, 1e-12, "end");
    json_object_put(whole);
    bh_text_free(&out);
    bh_arena_free(arena);
    done(&e);
}
END_TEST

/* All formats have the same lines: one for each stretch, or for each of its arms. */
START_TEST(formats_have_the_same_lines)
{
    struct evaluated e = evaluate(plans[_i]);
    bh_run_schedule s = {.has_start = true, .start = 0, .version = "1"};
    bh_arena *arena = bh_arena_new();
    bh_error err;
    bh_text csv = {0}, markdown = {0}, text = {0};
    ck_assert_int_eq(bh_run_schedule_make(e.table, arena, &s, &err), BH_OK);
    bh_run_schedule_csv(&s, &csv);
    bh_run_schedule_markdown(&s, &markdown);
    bh_run_schedule_text(&s, 80, &text);
    size_t lines = 0, begun = 0;
    for (const char *at = csv.bytes; (at = strchr(at, '\n')); at++)
        lines++;
    for (const char *at = markdown.bytes; (at = strstr(at, "\n| 1970-01-")); at++)
        begun++;
    ck_assert_uint_eq(begun, s.layout.count + 1); /* and the end */
    ck_assert_uint_ge(lines, s.layout.count + 1); /* and the header */
    ck_assert_ptr_nonnull(strstr(csv.bytes, "\r\n1970-01-01 00:00,0,"));
    ck_assert_ptr_nonnull(strstr(text.bytes, "\n1970-01-01 00:00 "));
    ck_assert_ptr_nonnull(strstr(text.bytes, "CAUTION"));
    ck_assert_ptr_nonnull(strstr(markdown.bytes, "Caution"));
    bh_text_free(&csv);
    bh_text_free(&markdown);
    bh_text_free(&text);
    bh_arena_free(arena);
    done(&e);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("run schedule");
    tcase_add_loop_test(tests, numbers_are_those_of_the_table, 0, COUNT(plans));
    tcase_add_loop_test(tests, formats_have_the_same_lines, 0, COUNT(plans));
    return run_suite("report/run_schedule", tests);
}
