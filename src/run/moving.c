/* moving.c - the input of a plan that moves while a wanted output is looked for. */
#include "beamhours/run/moving.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/document/trail.h"
#include "beamhours/units/quantity.h"

/* How far it moves where the plan does not say. */
static const double reach = 100;

/* What is known of an input by its name. */
struct known {
    const bh_node *around; /* where its key is to stand */
    const char *key;
    const bh_node *present; /* its present value, maybe elsewhere; NULL: none */
    double value;           /* [1] its present value in the internal unit of the dimension */
    bh_dimension dimension;
    const char *unit; /* where none is written */
};

static const bh_node *root_of(const bh_moving_row *row)
{
    return bh_document_root(row->plan->document);
}

/* --- where settings, arms and targets stand --- */

/* The item of a list that is called so. */
static const bh_node *named(const bh_node *list, const char *key, const char *name)
{
    for (size_t i = 0; list && list->kind == BH_NODE_LIST && name && i < list->count; i++) {
        const bh_node *is = bh_node_get(list->items[i], key);
        if (is && is->kind == BH_NODE_SCALAR && strcmp(is->text, name) == 0)
            return list->items[i];
    }
    return NULL;
}

/* The setting as it is written: "K3" for K3.2 of a sweep. */
static const bh_node *setting_node(const bh_moving_row *row)
{
    const bh_node *list = bh_node_get(root_of(row), "settings");
    const bh_node *found = named(list, "name", row->setting->name);
    const char *dot = strrchr(row->setting->name, '.');
    char base[BH_SOLVE_ROOM];
    if (found || !dot || (size_t)(dot - row->setting->name) >= sizeof base)
        return found;
    (void)snprintf(base, sizeof base, "%.*s", (int)(dot - row->setting->name), row->setting->name);
    return named(list, "name", base);
}

static const bh_node *arm_node(const bh_moving_row *row)
{
    return named(bh_node_get(root_of(row), "arms"), "name", row->arm->arm.name.text);
}

/* The first of three mappings that has the key. */
static const bh_node *first_of(const bh_node *a, const bh_node *b, const bh_node *c,
                               const char *key)
{
    const bh_node *found = bh_node_get(a, key);
    if (!found)
        found = bh_node_get(b, key);
    return found ? found : bh_node_get(c, key);
}

static bh_code find_angle(const bh_moving_row *row, struct known *k, bh_error *err)
{
    const bh_node *setting = setting_node(row), *every = bh_node_get(root_of(row), "every_setting");
    const bh_node *arms = bh_node_get(setting, "arms");
    if (row->arm->first)
        return bh_fail(err, BH_EDOMAIN,
                       "a coincidence has the angles of its two arms; ask for one of them by its "
                       "path, such as settings.1.arms.1.angle");
    k->around = row->arm->arm.angle.given ? arm_node(row) : setting;
    if (arms && !row->arm->arm.angle.given)
        k->around = named(arms, "arm", row->arm->arm.name.text);
    k->key = "angle";
    k->present = first_of(k->around, every, NULL, "angle");
    if (row->arm->q2.given)
        k->present = NULL;
    k->value = row->arm->angle.value;
    k->dimension = BH_DIM_ANGLE;
    k->unit = "deg";
    return BH_OK;
}

static void find_beam(const bh_moving_row *row, const char *key, struct known *k)
{
    const bh_node *every = bh_node_get(root_of(row), "every_setting");
    k->around = setting_node(row);
    k->key = key;
    k->present = first_of(bh_node_get(k->around, "beam"), bh_node_get(every, "beam"),
                          bh_node_get(root_of(row), "beam"), key);
}

static bh_code find_current(const bh_moving_row *row, struct known *k, bh_error *err)
{
    (void)err;
    find_beam(row, "current", k);
    if (row->setting->beam.rate_written)
        k->present = NULL;
    k->value = row->setting->beam.current.value;
    k->dimension = BH_DIM_CURRENT;
    k->unit = "uA";
    return BH_OK;
}

static bh_code find_energy(const bh_moving_row *row, struct known *k, bh_error *err)
{
    const bh_beam *beam = &row->setting->beam;
    const bool momentum = strcmp(beam->energy_key.text, "momentum") == 0;
    (void)err;
    find_beam(row, beam->energy_key.text, k);
    k->value = beam->energy_written.value;
    k->dimension = momentum ? BH_DIM_MOMENTUM : BH_DIM_ENERGY;
    k->unit = momentum ? "MeV/c" : "MeV";
    return BH_OK;
}

/* The only sample among the layers, or -1. */
static int sample_of(const bh_target *target)
{
    int sample = -1, count = 0;
    for (size_t i = 0; i < target->layer_count; i++)
        if (target->layers[i].role == BH_ROLE_SAMPLE) {
            sample = (int)i;
            count++;
        }
    return count == 1 ? sample : -1;
}

static bh_code find_thickness(const bh_moving_row *row, struct known *k, bh_error *err)
{
    const bh_target *target = row->setting->target;
    const int sample = sample_of(target);
    const bh_node *node = named(bh_node_get(root_of(row), "targets"), "name", target->name.text);
    if (!node)
        node = bh_node_get(root_of(row), "target");
    const bh_node *layers = bh_node_get(node, "layers");
    if (sample < 0 || !layers || (size_t)sample >= layers->count)
        return bh_fail(err, BH_EDOMAIN,
                       "target %s has several samples; say which with a path, such as "
                       "targets.%s.layers.2.thickness",
                       target->name.text, target->name.text);
    const bh_layer *layer = &target->layers[sample];
    k->around = layers->items[sample];
    k->key = layer->size_key.text;
    k->present = bh_node_get(k->around, k->key);
    k->value = layer->thickness.value;
    k->dimension = BH_DIM_LENGTH;
    k->unit = "mm";
    if (strcmp(k->key, "areal_density") == 0) {
        k->value = layer->areal_density.value;
        k->dimension = BH_DIM_AREAL_DENSITY;
        k->unit = "mg/cm2";
    } else if (strcmp(k->key, "areal_number") == 0) {
        k->value = layer->areal_number.value;
        k->dimension = BH_DIM_AREAL_NUMBER;
        k->unit = "/cm2";
    }
    return BH_OK;
}

static bh_code find_solid_angle(const bh_moving_row *row, struct known *k, bh_error *err)
{
    if (row->arm->first)
        return bh_fail(err, BH_EDOMAIN,
                       "a coincidence has the solid angles of its two arms; ask for one of them "
                       "by its path, such as arms.1.solid_angle");
    k->around = arm_node(row);
    k->key = "solid_angle";
    k->present = bh_node_get(k->around, k->key);
    k->value = row->arm->arm.solid_angle.given ? row->arm->arm.solid_angle.value : row->solid_angle;
    k->dimension = BH_DIM_SOLID_ANGLE;
    k->unit = "msr";
    return BH_OK;
}

/* --- how it is written --- */

/* Splits "20 ± 0.2 uA" into 20 and " ± 0.2 uA"; false where the text is not one number first. */
static bool split(const bh_node *node, double *number, char rest[BH_MOVING_REST])
{
    const char *end = NULL;
    double value = 0;
    if (!node || node->kind != BH_NODE_SCALAR || node->length >= BH_MOVING_REST ||
        bh_number_parse(node->text, &end, &value) != BH_OK)
        return false;
    (void)snprintf(rest, BH_MOVING_REST, "%s", end);
    *number = value;
    return true;
}

/* The unit in what follows a number; blanks and an uncertainty are left out. */
static void unit_in(const char *rest, char unit[BH_SOLVE_ROOM])
{
    const char *sign = strstr(rest, "±");
    size_t length = strlen(rest);
    if (!sign)
        sign = strstr(rest, "+-");
    if (sign && strspn(rest, " ") == (size_t)(sign - rest)) { /* "± 0.2 uA": the unit is behind */
        rest = sign + 2;
        rest += strspn(rest, " 0123456789.");
        length = strlen(rest);
    } else if (sign) {
        length = (size_t)(sign - rest);
    }
    const size_t skip = strspn(rest, " ");
    rest += skip < length ? skip : length;
    length -= skip < length ? skip : length;
    while (length > 0 && rest[length - 1] == ' ')
        length--;
    (void)snprintf(unit, BH_SOLVE_ROOM, "%.*s", (int)length, rest);
}

/* [1] how many of unit `to` are one `from`; 0 where they measure different things. */
static double ratio(const char *from, const char *to)
{
    if (strcmp(from, to) == 0)
        return 1;
    for (int d = 0; d < BH_DIM_COUNT; d++) {
        const double a = bh_unit_size(from, (bh_dimension)d), b = bh_unit_size(to, (bh_dimension)d);
        if (a > 0 && b > 0)
            return a / b;
    }
    return 0;
}

/* Reads an end of the range. */
static bh_code read_end(const bh_moving *m, const char *text, double *end, bh_error *err)
{
    const char *behind = NULL;
    char unit[BH_SOLVE_ROOM], own[BH_SOLVE_ROOM];
    double number = 0;
    unit_in(m->rest, own);
    if (bh_number_parse(text, &behind, &number) == BH_OK && strlen(behind) < sizeof unit) {
        unit_in(behind, unit);
        const double size = ratio(unit, own);
        if (size > 0) {
            *end = number * size;
            return BH_OK;
        }
    }
    return bh_fail(err, BH_EDOMAIN, "\"%s\" is no value that %s could have; write one such as %s",
                   text, m->path, m->present[0] ? m->present : m->rest);
}

/* The range that the question, the arm or the present value gives. */
static bh_code set_range(const bh_question *q, const bh_arm *arm, bh_moving *m, bh_error *err)
{
    char unit[BH_SOLVE_ROOM];
    unit_in(m->rest, unit);
    m->from = m->number / reach;
    m->to = m->number * reach;
    if (arm) {
        const double size = bh_unit_size(unit, BH_DIM_ANGLE), half = 2 * acos(0.0);
        m->from = arm->angle_range.given ? arm->angle_range.from / size : 0;
        m->to = arm->angle_range.given ? arm->angle_range.to / size : half / size;
    }
    bh_code code = q->from ? read_end(m, q->from, &m->from, err) : BH_OK;
    if (!code && q->to)
        code = read_end(m, q->to, &m->to, err);
    if (code)
        return code;
    if (!(m->from < m->to) || !isfinite(m->from) || !isfinite(m->to))
        return bh_fail(err, BH_EDOMAIN,
                       "the range of %s needs a least value below a largest one; give both with "
                       "their units",
                       m->path);
    m->logarithmic = !arm && m->from > 0 && m->to / m->from > 4;
    return BH_OK;
}

static bool write_path(const bh_node *around, const char *beam, const char *key,
                       char path[BH_SOLVE_ROOM])
{
    bh_text text = {0};
    bh_trail_of(around, &text);
    bh_text_appendf(&text, "%s%s.%s", text.length && *beam ? "." : "", beam, key);
    const char *from = text.failed ? "" : text.bytes + (text.bytes[0] == '.');
    const bool fits = !text.failed && strlen(from) < BH_SOLVE_ROOM;
    (void)snprintf(path, BH_SOLVE_ROOM, "%s", fits ? from : "");
    bh_text_free(&text);
    return fits;
}

static bh_code find_known(const bh_question *q, bh_solve_input input, const bh_moving_row *row,
                          bh_moving *m, bh_error *err)
{
    static bh_code (*const finders[BH_BY_COUNT])(
        const bh_moving_row *, struct known *, bh_error *) = {find_angle, find_current, find_energy,
                                                              find_thickness, find_solid_angle};
    struct known k = {0};
    const bool in_beam = input == BH_BY_CURRENT || input == BH_BY_ENERGY;
    const bh_code code = finders[input](row, &k, err);
    if (code)
        return code;
    if (!k.around || !write_path(k.around, in_beam ? "beam" : "", k.key, m->path))
        return bh_fail(err, BH_EDOMAIN,
                       "setting %s does not show where its %s is written; give the path",
                       row->setting->name, bh_solve_input_name(input));
    if (split(k.present, &m->number, m->rest)) {
        (void)snprintf(m->present, sizeof m->present, "%s", k.present->text);
    } else {
        (void)snprintf(m->rest, sizeof m->rest, " %s", k.unit);
        m->number = k.value / bh_unit_size(k.unit, k.dimension);
    }
    return set_range(q, input == BH_BY_ANGLE ? &row->arm->arm : NULL, m, err);
}

static bh_code find_path(const bh_question *q, const bh_moving_row *row, bh_moving *m,
                         bh_error *err)
{
    const bh_node *node = bh_document_find(row->plan->document, q->by);
    if (!node || node->kind != BH_NODE_SCALAR || strlen(q->by) >= sizeof m->path ||
        !split(node, &m->number, m->rest))
        return bh_fail(err, BH_EDOMAIN,
                       "\"%s\" is no single quantity in the plan; name angle, current, energy, "
                       "thickness or solid-angle, or a path such as beam.current",
                       q->by);
    (void)snprintf(m->path, sizeof m->path, "%s", q->by);
    (void)snprintf(m->present, sizeof m->present, "%s", node->text);
    return set_range(q, NULL, m, err);
}

bh_code bh_moving_find(const bh_question *question, const bh_moving_row *row, bh_moving *moving,
                       bh_error *err)
{
    bh_moving m = {.number = NAN};
    int input = 0;
    while (input < BH_BY_COUNT &&
           strcmp(question->by, bh_solve_input_name((bh_solve_input)input)) != 0)
        input++;
    const bh_code code = input < BH_BY_COUNT
                             ? find_known(question, (bh_solve_input)input, row, &m, err)
                             : find_path(question, row, &m, err);
    if (!code)
        *moving = m;
    return code;
}

void bh_moving_write(const bh_moving *moving, double number, int digits, char out[BH_SOLVE_ROOM])
{
    char text[BH_NUMBER_SIZE];
    double rounded = number;
    bh_number_digits(number, digits, text, sizeof text);
    if (bh_number_parse(text, NULL, &rounded) == BH_OK) /* without closing zeros */
        bh_number_print(rounded, text, sizeof text);
    (void)snprintf(out, BH_SOLVE_ROOM, "%s%s", text, moving->rest);
}
