/* json.c - a run table as JSON; json-c keeps the order in which keys are added. */
#include "beamhours/report/json.h"

#include <json-c/json.h>
#include <math.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/plan/dump.h"
#include "beamhours/report/json_parts.h"
#include "beamhours/report/json_systematic.h"

/* NaN does not exist in JSON: null. */
json_object *bh_json_number(double value)
{
    char text[BH_NUMBER_SIZE];
    if (!isfinite(value))
        return NULL;
    (void)bh_number_print(value, text, sizeof text);
    return json_object_new_double_s(value, text);
}

static json_object *text_or_null(const char *text)
{
    return text ? json_object_new_string(text) : NULL;
}

static void put(json_object *to, const char *key, json_object *value)
{
    (void)json_object_object_add(to, key, value);
}

/* --- the plan after defaults --- */

enum { DEEPEST = 40 };

struct tree {
    json_object *open[DEEPEST];
    int depth; /* of the innermost open one; -1 before the root */
};

static void attach(struct tree *tree, const char *key, json_object *value)
{
    if (tree->depth < 0)
        return;
    json_object *parent = tree->open[tree->depth];
    if (json_object_is_type(parent, json_type_array))
        (void)json_object_array_add(parent, value);
    else
        put(parent, key ? key : "", value);
}

static void begin(struct tree *tree, const char *key, json_object *value)
{
    if (tree->depth + 1 >= DEEPEST) {
        json_object_put(value);
        return;
    }
    attach(tree, key, value);
    tree->open[++tree->depth] = value;
}

static void begin_mapping(void *to, const char *key)
{
    begin(to, key, json_object_new_object());
}

static void begin_list(void *to, const char *key)
{
    begin(to, key, json_object_new_array());
}

static void end(void *to)
{
    struct tree *tree = to;
    if (tree->depth > 0)
        tree->depth--;
}

static void words(void *to, const char *key, const char *value)
{
    attach(to, key, text_or_null(value));
}

static void integer(void *to, const char *key, long value)
{
    attach(to, key, json_object_new_int64(value));
}

json_object *bh_json_plan(const bh_plan *plan)
{
    static const bh_dump_sink sink = {begin_mapping, begin_list, end, words, integer};
    struct tree tree = {.depth = -1};
    bh_plan_dump(plan, &sink, &tree);
    return tree.depth >= 0 ? tree.open[0] : json_object_new_object();
}

/* --- rows --- */

static json_object *cell(const bh_selection *view, size_t row, int id)
{
    const double value = bh_selection_number(view, row, id);
    if (bh_column_at(id)->kind == BH_CELL_TEXT)
        return text_or_null(bh_selection_text(view, row, id));
    if (bh_column_at(id)->kind == BH_CELL_COUNT && isfinite(value))
        return json_object_new_int64((int64_t)value);
    return bh_json_number(value);
}

static bool shown(const bh_selection *view, int id)
{
    for (size_t i = 0; i < view->column_count; i++)
        if (view->columns[i] == id)
            return true;
    return view->column_count == 0 && (id != BH_COL_BIN || view->bins);
}

static json_object *row_object(const bh_selection *view, size_t row)
{
    json_object *object = json_object_new_object();
    json_object *reasons = json_object_new_object();
    for (int id = 0; id < BH_COLUMN_COUNT; id++) {
        if (!shown(view, id))
            continue;
        put(object, bh_column_at(id)->key, cell(view, row, id));
        const char *reason = bh_selection_reason(view, row, id);
        if (reason)
            put(reasons, bh_column_at(id)->key, json_object_new_string(reason));
    }
    put(object, "reasons", reasons);
    if (shown(view, BH_COL_SYSTEMATIC))
        put(object, "systematic_sources", bh_json_sources(view, row));
    return object;
}

json_object *bh_json_totals(const bh_totals *t)
{
    const struct {
        const char *key;
        double value;
    } rows[] = {
        {"data_hours", t->data_hours},
        {"empty_hours", t->empty_hours},
        {"task_hours", t->task_hours},
        {"change_hours", t->change_hours},
        {"beam_hours", t->beam_hours},
        {"scheduled_hours", t->scheduled_hours},
        {"contingency_hours", t->contingency_hours},
        {"asked_hours", t->asked_hours},
        {"available_hours", t->available_hours},
        {"spare_hours", t->spare_hours},
        {"shifts", t->shifts},
        {"weeks", t->weeks},
    };
    json_object *object = json_object_new_object();
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++)
        put(object, rows[i].key, bh_json_number(rows[i].value));
    if (t->note)
        put(object, "note", json_object_new_string(t->note));
    return object;
}

static json_object *message(bh_mark at, const char *key, const char *sentence)
{
    json_object *object = json_object_new_object();
    put(object, "file", text_or_null(at.file));
    put(object, "line", json_object_new_int(at.line));
    put(object, "column", json_object_new_int(at.column));
    put(object, "key", text_or_null(key));
    put(object, "text", text_or_null(sentence));
    return object;
}

void bh_json_said(json_object *to, const bh_table *table, const char *version)
{
    json_object *cautions = json_object_new_array(), *warnings = json_object_new_array();
    for (size_t i = 0; i < bh_table_cautions(table); i++) {
        const bh_caution *c = bh_table_caution(table, i);
        (void)json_object_array_add(cautions, message(c->at, c->key, c->text));
    }
    put(to, "cautions", cautions);
    const bh_diags *said = bh_table_warnings(table);
    for (size_t i = 0; i < bh_diags_count(said); i++) {
        const bh_diag *d = bh_diags_at(said, i);
        (void)json_object_array_add(warnings, message(d->at, d->key, d->text));
    }
    put(to, "warnings", warnings);
    put(to, "version", json_object_new_string(version));
}

static json_object *table_object(const bh_selection *view, const char *version)
{
    const bh_table *table = view->table;
    json_object *object = json_object_new_object(), *rows = json_object_new_array();
    put(object, "plan", bh_json_plan(bh_table_plan(table)));
    for (size_t i = 0; i < view->row_count; i++)
        (void)json_object_array_add(rows, row_object(view, i));
    put(object, "rows", rows);
    if (shown(view, BH_COL_SYSTEMATIC))
        put(object, "systematic_causes", bh_json_causes(view));
    put(object, "totals", bh_json_totals(bh_table_totals(table)));
    bh_json_said(object, table, version);
    return object;
}

bh_code bh_json_finish(json_object *object, bh_text *out)
{
    const char *string = json_object_to_json_string_ext(object, JSON_C_TO_STRING_PRETTY |
                                                                    JSON_C_TO_STRING_NOSLASHESCAPE);
    if (string) {
        bh_text_append(out, string);
        bh_text_append(out, "\n");
    }
    json_object_put(object);
    return string && !out->failed ? BH_OK : BH_ENOMEM;
}

bh_code bh_report_json(const bh_selection *view, const char *version, bh_text *out)
{
    return bh_json_finish(table_object(view, version), out);
}

bh_code bh_report_json_against(const bh_selection *before, const bh_selection *after,
                               const char *version, bh_text *out)
{
    json_object *both = json_object_new_object();
    put(both, "before", table_object(before, version));
    put(both, "after", table_object(after, version));
    return bh_json_finish(both, out);
}
