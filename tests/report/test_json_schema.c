/* test_json_schema.c - docs/table.schema.json describes what `table --format json` writes: a
 * checker of the keywords that it uses, in which an unknown keyword is a failure. */
#include "shown.h"

#include <json-c/json.h>
#include <stdlib.h>

#include "beamhours/report/json.h"

/* The first complaint, or nothing. */
struct checker {
    json_object *root;
    char said[400];
};

static json_object *get(json_object *in, const char *key)
{
    json_object *value = NULL;
    return json_object_object_get_ex(in, key, &value) ? value : NULL;
}

static bool refuse(struct checker *c, const char *path, const char *why)
{
    if (!c->said[0])
        snprintf(c->said, sizeof c->said, "%.200s: %.180s", path, why);
    return false;
}

static bool is_type(json_object *value, const char *name)
{
    const json_type type = json_object_get_type(value);
    if (strcmp(name, "number") == 0)
        return type == json_type_double || type == json_type_int;
    if (strcmp(name, "integer") == 0)
        return type == json_type_int;
    return strcmp(name, json_type_to_name(type)) == 0;
}

static bool check(struct checker *c, json_object *schema, json_object *value, const char *path);

static bool check_type(struct checker *c, json_object *wanted, json_object *value, const char *path)
{
    if (!json_object_is_type(wanted, json_type_array))
        return is_type(value, json_object_get_string(wanted)) || refuse(c, path, "wrong type");
    for (size_t i = 0; i < json_object_array_length(wanted); i++)
        if (is_type(value, json_object_get_string(json_object_array_get_idx(wanted, i))))
            return true;
    return refuse(c, path, "wrong type");
}

/* "#/$defs/row" */
static bool check_ref(struct checker *c, json_object *ref, json_object *value, const char *path)
{
    const char *name = json_object_get_string(ref);
    ck_assert_int_eq(strncmp(name, "#/$defs/", 8), 0);
    json_object *schema = get(get(c->root, "$defs"), name + 8);
    ck_assert_msg(schema != NULL, "no %s", name);
    return check(c, schema, value, path);
}

static bool check_required(struct checker *c, json_object *keys, json_object *value,
                           const char *path)
{
    for (size_t i = 0; i < json_object_array_length(keys); i++) {
        const char *key = json_object_get_string(json_object_array_get_idx(keys, i));
        if (json_object_is_type(value, json_type_object) &&
            !json_object_object_get_ex(value, key, NULL))
            return refuse(c, path, key);
    }
    return true;
}

static bool check_members(struct checker *c, json_object *schema, json_object *value,
                          const char *path)
{
    json_object *properties = get(schema, "properties"),
                *others = get(schema, "additionalProperties");
    bool good = true;
    if (!json_object_is_type(value, json_type_object))
        return true;
    json_object_object_foreach(value, key, member)
    {
        char below[300];
        json_object *own = properties ? get(properties, key) : NULL;
        snprintf(below, sizeof below, "%.200s.%.80s", path, key);
        if (own)
            good = check(c, own, member, below) && good;
        else if (json_object_is_type(others, json_type_object))
            good = check(c, others, member, below) && good;
        else if (others)
            good = refuse(c, below, "not in the schema");
    }
    return good;
}

static bool check_items(struct checker *c, json_object *items, json_object *value, const char *path)
{
    bool good = true;
    if (!json_object_is_type(value, json_type_array))
        return true;
    for (size_t i = 0; i < json_object_array_length(value); i++)
        good = check(c, items, json_object_array_get_idx(value, i), path) && good;
    return good;
}

static bool check_any(struct checker *c, json_object *any, json_object *value, const char *path)
{
    for (size_t i = 0; i < json_object_array_length(any); i++) {
        struct checker fresh = {.root = c->root};
        if (check(&fresh, json_object_array_get_idx(any, i), value, path))
            return true;
        refuse(c, path, fresh.said);
    }
    return false;
}

static bool check_enum(struct checker *c, json_object *words, json_object *value, const char *path)
{
    for (size_t i = 0; i < json_object_array_length(words); i++)
        if (json_object_equal(json_object_array_get_idx(words, i), value))
            return true;
    return refuse(c, path, "not one of the words");
}

static bool keyword(struct checker *c, const char *key, json_object *rule, json_object *value,
                    const char *path)
{
    if (strcmp(key, "type") == 0)
        return check_type(c, rule, value, path);
    if (strcmp(key, "$ref") == 0)
        return check_ref(c, rule, value, path);
    if (strcmp(key, "required") == 0)
        return check_required(c, rule, value, path);
    if (strcmp(key, "items") == 0)
        return check_items(c, rule, value, path);
    if (strcmp(key, "anyOf") == 0)
        return check_any(c, rule, value, path);
    if (strcmp(key, "enum") == 0)
        return check_enum(c, rule, value, path);
    if (strcmp(key, "minimum") == 0)
        return json_object_get_double(value) >= json_object_get_double(rule) ||
               refuse(c, path, "too small");
    static const char *const silent[] = {
        "properties", "additionalProperties", "description", "title", "$schema", "$defs"};
    for (int i = 0; i < COUNT(silent); i++)
        if (strcmp(key, silent[i]) == 0)
            return true;
    return refuse(c, path, key);
}

static bool check(struct checker *c, json_object *schema, json_object *value, const char *path)
{
    bool good = true;
    json_object_object_foreach(schema, key, rule)
    {
        good = keyword(c, key, rule, value, path) && good;
    }
    return check_members(c, schema, value, path) && good;
}

static json_object *schema_file(void)
{
    json_object *schema = json_object_from_file("docs/table.schema.json");
    ck_assert_ptr_nonnull(schema);
    return schema;
}

static json_object *json_of(const struct evaluated *e, const bh_selection_request *request,
                            bool against)
{
    bh_selection view = view_of(e, request);
    bh_text out = {0};
    ck_assert_int_eq(against ? bh_report_json_against(&view, &view, "1", &out)
                             : bh_report_json(&view, "1", &out),
                     BH_OK);
    json_object *object = json_tokener_parse(out.bytes);
    ck_assert_ptr_nonnull(object);
    bh_text_free(&out);
    bh_selection_free(&view);
    return object;
}

static const struct {
    bh_selection_request request;
    bool against;
} views[] = {{{0}, false},
             {{.bins = true}, false},
             {{.columns = "setting,counts"}, false},
             {{.only = "K1"}, true}};

START_TEST(what_is_written_fits)
{
    struct evaluated e = evaluate(two_arms);
    struct checker c = {.root = schema_file()};
    json_object *value = json_of(&e, &views[_i].request, views[_i].against);
    ck_assert_msg(check(&c, c.root, value, "table"), "%s", c.said);
    json_object_put(value);
    json_object_put(c.root);
    done(&e);
}
END_TEST

/* Every column is in it, with its meaning, and no other. */
START_TEST(the_columns_are_those_of_the_list)
{
    json_object *schema = schema_file();
    json_object *row = get(get(get(schema, "$defs"), "row"), "properties");
    static const char *const types[] = {"string", "integer", "number"}; /* by bh_cell_kind */
    for (int id = 0; id < BH_COLUMN_COUNT; id++) {
        const bh_column *column = bh_column_at(id);
        json_object *own = get(row, column->key);
        ck_assert_msg(own != NULL, "%s is not in the schema", column->key);
        ck_assert_str_eq(json_object_get_string(get(own, "description")), column->meaning);
        ck_assert_str_eq(json_object_get_string(json_object_array_get_idx(get(own, "type"), 0)),
                         types[column->kind]);
    }
    ck_assert_int_eq(json_object_object_length(row), BH_COLUMN_COUNT + 2); /* reasons, sources */
    json_object_put(schema);
}
END_TEST

/* A schema that takes anything would say nothing. */
START_TEST(what_is_wrong_does_not_fit)
{
    static const struct {
        const char *at, *key, *json;
    } faults[] = {{NULL, "more", "1"},
                  {NULL, "version", "1"},
                  {NULL, "rows", "{}"},
                  {"totals", "weeks", "\"1\""},
                  {"totals", "more", "1"},
                  {"plan", "beam", "1.5"},
                  {"row", "counts", "\"many\""},
                  {"row", "q2", "1"},
                  {"row", "bin", "1.5"},
                  {"row", "reasons", "[]"},
                  {"row", "reasons", "{\"bin\": 1}"}};
    struct evaluated e = evaluate(two_arms);
    struct checker c = {.root = schema_file()};
    json_object *value = json_of(&e, &(bh_selection_request){0}, false), *in = value;
    if (faults[_i].at)
        in = strcmp(faults[_i].at, "row") == 0 ? json_object_array_get_idx(get(value, "rows"), 0)
                                               : get(value, faults[_i].at);
    json_object_object_add(in, faults[_i].key, json_tokener_parse(faults[_i].json));
    ck_assert_msg(!check(&c, c.root, value, "table"), "taken: %s", faults[_i].key);
    json_object_put(value);
    json_object_put(c.root);
    done(&e);
}
END_TEST

/* A checker of others agrees that it is a schema of its draft, where there is one. */
START_TEST(it_is_a_schema)
{
    if (system("python3 -c 'import jsonschema' 2>/dev/null") != 0) {
        printf("test_json_schema: skipped: no python3 with jsonschema here\n");
        return;
    }
    ck_assert_int_eq(system("python3 -c 'import json, jsonschema; "
                            "jsonschema.Draft202012Validator.check_schema("
                            "json.load(open(\"docs/table.schema.json\")))'"),
                     0);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("json schema");
    tcase_set_timeout(tests, 60);
    tcase_add_loop_test(tests, what_is_written_fits, 0, COUNT(views));
    tcase_add_test(tests, the_columns_are_those_of_the_list);
    tcase_add_loop_test(tests, what_is_wrong_does_not_fit, 0, 11);
    tcase_add_test(tests, it_is_a_schema);
    return run_suite("report/json_schema", tests);
}
