/* json_systematic.c - what signal rates are uncertain by, as JSON. */
#include "beamhours/report/json_systematic.h"

#include <json-c/json.h>
#include <math.h>
#include <stdlib.h>

#include "beamhours/base/number.h"
#include "beamhours/units/nuclide.h"

static json_object *number(double value)
{
    char text[BH_NUMBER_SIZE];
    (void)bh_number_print(value, text, sizeof text);
    return json_object_new_double_s(value, text);
}

static void put(json_object *to, const char *key, json_object *value)
{
    (void)json_object_object_add(to, key, value);
}

static json_object *text_or_null(const char *text)
{
    return text ? json_object_new_string(text) : NULL;
}

json_object *bh_json_sources(const bh_selection *view, size_t i)
{
    const bh_causes *causes = bh_table_causes(view->table);
    const bh_effects effects = bh_table_effects(view->table, view->bins, view->rows[i]);
    json_object *object = json_object_new_object();
    for (int k = 0; k < BH_CAUSE_KINDS; k++) {
        const bh_cause_kind kind = (bh_cause_kind)k;
        const double size = bh_effects_of(causes, &effects, kind);
        if (!bh_cause_on_counts(kind) && size > 0)
            put(object, bh_cause_source(kind), number(size));
    }
    return object;
}

/* One cause on the rows shown, while the rows are gone through. */
struct acting {
    json_object *rows, *effects; /* NULL before the first */
};

static json_object *cause_object(const bh_cause *c, const struct acting *acting)
{
    json_object *object = json_object_new_object();
    put(object, "cause", json_object_new_string(bh_cause_source(c->kind)));
    put(object, "key", text_or_null(c->key));
    put(object, "file", c->at.line > 0 ? text_or_null(c->at.file) : NULL);
    put(object, "line", json_object_new_int(c->at.line));
    put(object, "column", json_object_new_int(c->at.column));
    if (c->a > 0) {
        char nuclide[8];
        put(object, "nuclide", json_object_new_string(bh_nuclide_name(c->z, c->a, nuclide)));
    } else if (c->z > 0) {
        put(object, "element", json_object_new_string(bh_element_symbol(c->z)));
    }
    if (c->model)
        put(object, "model", json_object_new_string(c->model));
    put(object, "acts_on",
        json_object_new_string(bh_cause_on_counts(c->kind) ? "counts" : "signal_rate_Hz"));
    put(object, "rows", acting->rows);
    put(object, "effects", acting->effects);
    return object;
}

static void add_row(const bh_selection *view, size_t i, struct acting *acting)
{
    const bh_effects effects = bh_table_effects(view->table, view->bins, view->rows[i]);
    for (size_t k = 0; k < effects.count; k++) {
        struct acting *a = &acting[effects.cause[k]];
        const double effect = effects.effect[k];
        if (isnan(effect))
            continue;
        if (!a->rows) {
            a->rows = json_object_new_array();
            a->effects = json_object_new_array();
        }
        (void)json_object_array_add(a->rows, json_object_new_int64((int64_t)i));
        (void)json_object_array_add(a->effects, number(effect));
    }
}

json_object *bh_json_causes(const bh_selection *view)
{
    const bh_causes *causes = bh_table_causes(view->table);
    const size_t count = bh_causes_count(causes);
    struct acting *acting = calloc(count + 1, sizeof *acting);
    if (!acting)
        return NULL; /* null: the list is not known */
    json_object *list = json_object_new_array();
    for (size_t i = 0; i < view->row_count; i++)
        add_row(view, i, acting);
    for (size_t i = 0; i < count; i++)
        if (acting[i].rows)
            (void)json_object_array_add(list, cause_object(bh_causes_at(causes, i), &acting[i]));
    free(acting);
    return list;
}
