/* test_json.c - the run table as JSON, parsed back: structure, numbers bit for bit, reasons. */
#include "shown.h"

#include <json-c/json.h>

#include "beamhours/report/json.h"

static json_object *get(json_object *o, const char *key)
{
    json_object *value = NULL;
    ck_assert_msg(json_object_object_get_ex(o, key, &value), "no key %s", key);
    return value;
}

static json_object *parse(const bh_text *text)
{
    enum json_tokener_error error;
    json_object *o = json_tokener_parse_verbose(text->bytes, &error);
    ck_assert_msg(o != NULL, "%s", json_tokener_error_desc(error));
    return o;
}

static json_object *table_of(const struct evaluated *e, const bh_selection_request *request)
{
    bh_selection view = view_of(e, request);
    bh_text out = {0};
    ck_assert_int_eq(bh_report_json(&view, "9.8.7", &out), BH_OK);
    json_object *o = parse(&out);
    bh_text_free(&out);
    bh_selection_free(&view);
    return o;
}

/* Keys of an object in their order, with blanks between. */
static const char *keys_of(json_object *o, char *out, size_t size)
{
    size_t used = 0;
    out[0] = '\0';
    json_object_object_foreach(o, key, value)
    {
        (void)value;
        used += (size_t)snprintf(out + used, size - used, "%s%s", used ? " " : "", key);
    }
    return out;
}

START_TEST(it_has_the_parts_that_are_promised)
{
    struct evaluated e = evaluate(two_arms);
    json_object *o = table_of(&e, &(bh_selection_request){0});
    char keys[1024];
    ck_assert_str_eq(keys_of(o, keys, sizeof keys),
                     "plan rows systematic_causes totals cautions warnings version");
    ck_assert_str_eq(json_object_get_string(get(o, "version")), "9.8.7");
    json_object *totals = get(o, "totals");
    ck_assert_ptr_nonnull(
        strstr(keys_of(totals, keys, sizeof keys),
               "data_hours empty_hours task_hours change_hours beam_hours scheduled_hours "
               "contingency_hours asked_hours available_hours spare_hours shifts weeks"));
    const bh_totals *t = bh_table_totals(e.table);
    ck_assert_double_eq(json_object_get_double(get(totals, "asked_hours")), t->asked_hours);
    ck_assert_double_eq(json_object_get_double(get(totals, "weeks")), t->weeks);
    ck_assert_double_eq(json_object_get_double(get(totals, "spare_hours")), t->spare_hours);
    json_object_put(o);
    done(&e);
}
END_TEST

/* One cell of one row. */
static void check_cell(json_object *row, const bh_selection *view, size_t i, int id)
{
    const char *key = bh_column_at(id)->key, *text = bh_selection_text(view, i, id);
    json_object *value = get(row, key), *reason = NULL;
    const double number = bh_selection_number(view, i, id);
    const bool reasoned = json_object_object_get_ex(get(row, "reasons"), key, &reason);
    if (text) {
        ck_assert_str_eq(json_object_get_string(value), text);
    } else if (isnan(number)) {
        ck_assert_msg(value == NULL && reasoned, "%s", key);
        ck_assert_str_eq(json_object_get_string(reason), bh_selection_reason(view, i, id));
    } else {
        ck_assert_msg(json_object_get_double(value) == number, "%s", key);
        ck_assert_msg(!reasoned, "%s", key);
    }
}

START_TEST(rows_hold_every_number_bit_for_bit)
{
    struct evaluated e = evaluate(two_arms);
    const bh_selection_request request = {.bins = _i > 0};
    bh_selection view = view_of(&e, &request);
    json_object *o = table_of(&e, &request), *rows = get(o, "rows");
    ck_assert_uint_eq(json_object_array_length(rows), view.row_count);
    for (size_t i = 0; i < view.row_count; i++) {
        json_object *row = json_object_array_get_idx(rows, i);
        ck_assert_int_eq(json_object_object_length(row), BH_COLUMN_COUNT + 2 - (_i ? 0 : 1));
        for (int id = 0; id < BH_COLUMN_COUNT; id++)
            if (id != BH_COL_BIN || _i)
                check_cell(row, &view, i, id);
    }
    if (_i)
        ck_assert_int_eq(json_object_get_type(get(json_object_array_get_idx(rows, 0), "bin")),
                         json_type_int);
    json_object_put(o);
    bh_selection_free(&view);
    done(&e);
}
END_TEST

START_TEST(chosen_columns_are_all_there_is)
{
    struct evaluated e = evaluate(two_arms);
    json_object *o = table_of(&e, &(bh_selection_request){.columns = "hours,setting"});
    char keys[256];
    ck_assert_str_eq(keys_of(json_object_array_get_idx(get(o, "rows"), 0), keys, sizeof keys),
                     "setting hours reasons");
    json_object_put(o);
    done(&e);
}
END_TEST

/* Messages have places, keys and texts; cautions are those of the table, in its order. */
START_TEST(messages_say_where_they_come_from)
{
    struct evaluated e =
        evaluate(BEAM TARGET "arms: [{name: A, solid_angle: 5 msr, rate_limit: 1 Hz}]\n"
                             "settings: [{name: K, angle: 40 deg, counts: 10000}]\n");
    json_object *o = table_of(&e, &(bh_selection_request){0});
    char keys[256];
    json_object *cautions = get(o, "cautions"), *warnings = get(o, "warnings");
    ck_assert_uint_eq(json_object_array_length(cautions), bh_table_cautions(e.table));
    json_object *first = json_object_array_get_idx(cautions, 0);
    ck_assert_str_eq(keys_of(first, keys, sizeof keys), "file line column key text");
    const bh_caution *caution = bh_table_caution(e.table, 0);
    ck_assert_str_eq(json_object_get_string(get(first, "text")), caution->text);
    ck_assert_int_eq(json_object_get_int(get(first, "line")), caution->at.line);
    ck_assert_uint_gt(json_object_array_length(warnings), 0);
    json_object *warning = json_object_array_get_idx(warnings, 0);
    const bh_diag *said = bh_diags_at(bh_table_warnings(e.table), 0);
    ck_assert_str_eq(json_object_get_string(get(warning, "file")), "plan.yaml");
    ck_assert_int_eq(json_object_get_int(get(warning, "column")), said->at.column);
    ck_assert_str_eq(json_object_get_string(get(warning, "key")), said->key);
    ck_assert_str_eq(json_object_get_string(get(warning, "text")), said->text);
    json_object_put(o);
    done(&e);
}
END_TEST

START_TEST(the_plan_is_there_after_defaults)
{
    struct evaluated e = evaluate(two_arms);
    json_object *o = table_of(&e, &(bh_selection_request){0}), *plan = get(o, "plan");
    ck_assert_str_eq(json_object_get_string(get(plan, "title")), "Two arms, \"both\" on carbon");
    ck_assert_int_eq(json_object_get_int(get(plan, "plan")), 1);
    json_object *beam = get(plan, "beam");
    ck_assert_str_eq(json_object_get_string(get(beam, "particle")), "electron");
    ck_assert_str_eq(json_object_get_string(get(beam, "current")), "10 uA");
    ck_assert_str_eq(json_object_get_string(get(beam, "fraction")), "100 %");
    ck_assert_uint_eq(json_object_array_length(get(plan, "arms")), 2);
    ck_assert_uint_eq(json_object_array_length(get(plan, "settings")), 4);
    json_object_put(o);
    done(&e);
}
END_TEST

START_TEST(before_and_after_are_two_such_objects)
{
    struct evaluated e = evaluate(two_arms), f = evaluate(one_arm);
    bh_selection before = view_of(&e, &(bh_selection_request){0});
    bh_selection after = view_of(&f, &(bh_selection_request){0});
    bh_text out = {0};
    char keys[64];
    ck_assert_int_eq(bh_report_json_against(&before, &after, "1", &out), BH_OK);
    json_object *o = parse(&out);
    ck_assert_str_eq(keys_of(o, keys, sizeof keys), "before after");
    ck_assert_uint_eq(json_object_array_length(get(get(o, "before"), "rows")), before.row_count);
    ck_assert_uint_eq(json_object_array_length(get(get(o, "after"), "rows")), after.row_count);
    json_object_put(o);
    bh_text_free(&out);
    bh_selection_free(&before);
    bh_selection_free(&after);
    done(&e);
    done(&f);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("json");
    tcase_add_test(tests, it_has_the_parts_that_are_promised);
    tcase_add_loop_test(tests, rows_hold_every_number_bit_for_bit, 0, 2);
    tcase_add_test(tests, chosen_columns_are_all_there_is);
    tcase_add_test(tests, messages_say_where_they_come_from);
    tcase_add_test(tests, the_plan_is_there_after_defaults);
    tcase_add_test(tests, before_and_after_are_two_such_objects);
    return run_suite("report/json", tests);
}
