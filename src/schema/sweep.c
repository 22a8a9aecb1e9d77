/* sweep.c - one quantity or several that take turns. */
#include <math.h>
#include <stddef.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/base/sentences.h"
#include "beamhours/schema/ends.h"
#include "beamhours/schema/reading.h"
#include "beamhours/units/unit.h"

/* A sweep longer than the settings of a whole plan is refused before memory is taken. */
enum { MOST_VALUES = 10000 };

struct steps {
    bh_section section;
    bh_value from, to, step, count;
};

/* Room for `n` values that all stand at the sweep's place. */
static bh_code make_room(const bh_reading *reading, size_t n, bh_sweep *out, bh_quantity **values)
{
    bh_mark *marks = bh_arena_take(reading->arena, n + 1, sizeof *marks);
    *values = bh_arena_take(reading->arena, n + 1, sizeof **values);
    if (!marks || !*values)
        return BH_ENOMEM;
    for (size_t i = 0; i < n; i++)
        marks[i] = out->at;
    out->marks = marks;
    out->values = *values;
    return BH_OK;
}

static bh_code read_list(const bh_reading *reading, bh_written written, bh_sweep *out)
{
    const size_t n = written.node->count;
    bh_quantity *values;
    bh_mark *marks = bh_arena_take(reading->arena, n + 1, sizeof *marks);
    const bh_code code = make_room(reading, n, out, &values);
    if (code || !marks)
        return BH_ENOMEM;
    for (size_t i = 0; i < n; i++) {
        const bh_node *item = written.node->items[i];
        if (!bh_read_quantity(reading, (bh_written){written.key, item}, &values[out->count]))
            continue;
        marks[out->count++] = item->at;
    }
    out->marks = marks;
    return BH_OK;
}

/* How many values there are, or 0 after a complaint. */
static size_t count_steps(const bh_reading *reading, bh_written written, const struct steps *s)
{
    const double from = s->from.value, to = s->to.value, step = s->step.value;
    const char *from_text = bh_node_get(written.node, "from")->text;
    const char *to_text = bh_node_get(written.node, "to")->text;
    if (s->count.given)
        return (size_t)s->count.value;
    const char *step_text = bh_node_get(written.node, "step")->text;
    const double n = (to - from) / step;
    if (!(n >= 1.0 - 1e-9) || isinf(n)) {
        bh_say_node(reading, bh_node_get(written.node, "step"), BH_SAY_SWEEP_WAY, step_text,
                    from_text, to_text);
        return 0;
    }
    if (!(n < MOST_VALUES)) {
        bh_say_node(reading, written.node, BH_SAY_SWEEP_LONG, MOST_VALUES);
        return 0;
    }
    /* Ends written in decimals rarely divide exactly in binary. */
    if (fabs(n - round(n)) > 1e-6) {
        char below[BH_QUANTITY_SIZE], beyond[BH_QUANTITY_SIZE];
        const bh_dimension dimension = written.key->dimension;
        bh_say_node(reading, bh_node_get(written.node, "step"), BH_SAY_SWEEP_STEP, step_text,
                    from_text, bh_quantity_text(from + floor(n) * step, dimension, below),
                    bh_quantity_text(from + ceil(n) * step, dimension, beyond), to_text);
        return 0;
    }
    return (size_t)round(n) + 1;
}

/* Whether both ends (and the step) are of the whole ion, or all per mass number. */
static bool same_kind(const bh_reading *reading, bh_written written, bool *per_u)
{
    static const char *const name[] = {"from", "to", "step"};
    const char *first = NULL;
    for (size_t i = 0; i < sizeof name / sizeof name[0]; i++) {
        const bh_node *node = bh_node_get(written.node, name[i]);
        bh_quantity q;
        if (!node || bh_quantity_parse(node->text, written.key->dimension, &q, NULL))
            continue;
        if (first && q.per_u != *per_u) {
            bh_say_node(reading, node, BH_SAY_SWEEP_UNITS, first, node->text);
            return false;
        }
        *per_u = q.per_u;
        first = first ? first : node->text;
    }
    return true;
}

static bool complete(const struct steps *s)
{
    const bool ends = s->from.given && s->to.given && !isnan(s->from.value) && !isnan(s->to.value);
    return ends && s->step.given != s->count.given &&
           !isnan(s->step.given ? s->step.value : s->count.value);
}

/* The unit behind a plain number; false where it is not that simple. */
static bool unit_of(const char *text, bh_dimension dimension, bh_unit *unit)
{
    char plain[BH_PLAIN_SIZE], odd[BH_PLAIN_SIZE];
    const char *end = plain;
    double number;
    if (!bh_plain_text(text, plain) || bh_number_parse(plain, &end, &number))
        return false;
    end += *end == ' ';
    return bh_unit_parse(end, end + strlen(end), unit, odd) && bh_unit_convert(unit, dimension) &&
           !unit->celsius;
}

/* Digits that a step written as a decimal may have, and how near a sum of steps comes to it. */
enum { STEP_DIGITS = 7 };
static const double step_near = 1e-13;

/* The decimal of few digits that `value` is but for rounding, in the unit of the sweep's ends. */
static double snap_in(double value, const bh_unit *unit)
{
    char text[BH_NUMBER_SIZE];
    bh_unit plain = *unit;
    double near;
    plain.decade = 0; /* digits are the same in every power of ten */
    const double quotient = value / unit->factor;
    if (!(fabs(quotient) > 0))
        return value;
    const double digits = quotient * pow(10, STEP_DIGITS - 1 - floor(log10(fabs(quotient))));
    if (!(fabs(digits - nearbyint(digits)) < 1e-5)) /* far from step_near of 10^7 */
        return value;
    const size_t n = bh_number_digits(quotient, STEP_DIGITS, text, sizeof text);
    if (bh_number_in(text, text + n, &plain, &near))
        return value;
    return fabs(near - value) <= step_near * fabs(value) ? near : value;
}

/* The same where the ends say no plain unit: in the one that reads best. */
static double snap(double value, bh_dimension dimension)
{
    char text[BH_QUANTITY_SIZE];
    bh_quantity near;
    if (bh_quantity_parse(bh_quantity_text(value, dimension, text), dimension, &near, NULL))
        return value;
    return fabs(near.value - value) <= step_near * fabs(value) ? near.value : value;
}

/* Steps written in decimals should stay decimals: 40 deg, not 39.99999999999999 deg. */
static void place_steps(bh_written written, const struct steps *s, size_t n, bh_quantity *values)
{
    const bh_dimension dimension = written.key->dimension;
    bh_unit unit;
    const bool plain = unit_of(bh_node_get(written.node, "from")->text, dimension, &unit);
    for (size_t i = 0; i + 1 < n; i++) {
        const double part = (double)i / (double)(n - 1);
        const double value = s->from.value + (s->to.value - s->from.value) * part;
        values[i].value = plain ? snap_in(value, &unit) : snap(value, dimension);
    }
    values[n - 1].value = s->to.value;
}

static bh_code fill(const bh_reading *reading, bh_written written, const struct steps *s,
                    bh_sweep *out)
{
    bool per_u = false;
    if (!same_kind(reading, written, &per_u))
        return BH_OK;
    const size_t n = count_steps(reading, written, s);
    bh_quantity *values;
    if (n == 0)
        return BH_OK;
    if (make_room(reading, n, out, &values))
        return BH_ENOMEM;
    out->count = n;
    place_steps(written, s, n, values);
    for (size_t i = 0; i < n; i++) {
        const double part = (double)i / (double)(n - 1);
        values[i] = (bh_quantity){
            .value = values[i].value,
            .uncertainty = s->from.uncertainty * (1.0 - part) + s->to.uncertainty * part,
            .uncertain = s->from.uncertainty > 0.0 || s->to.uncertainty > 0.0,
            .per_u = per_u,
        };
    }
    return BH_OK;
}

static bh_code read_steps(const bh_reading *reading, bh_written written, bh_sweep *out)
{
    bh_key step = bh_end_key(written.key, "step", offsetof(struct steps, step));
    step.flags = 0;
    step.group = 1;
    step.least = step.above = step.most = NULL;
    const bh_key keys[] = {
        bh_end_key(written.key, "from", offsetof(struct steps, from)),
        bh_end_key(written.key, "to", offsetof(struct steps, to)),
        step,
        {.name = "count",
         .kind = BH_KEY_COUNT,
         .group = 1,
         .least = "2",
         .most = "10000",
         .offset = offsetof(struct steps, count),
         .example = "9"},
    };
    const bh_schema schema = {"a sweep", sizeof(struct steps), keys, 4, 1U << 1, 0};
    const bh_reading whole = {.arena = reading->arena, .diags = reading->diags};
    struct steps steps;
    const bh_code code = bh_schema_read(&whole, &schema, written.node, &steps);
    if (code || !complete(&steps))
        return code;
    return fill(reading, written, &steps, out);
}

static bh_code read_one(const bh_reading *reading, bh_written written, bh_sweep *out)
{
    bh_quantity q;
    bh_quantity *values;
    for (size_t i = 0; written.key->words && written.key->words[i]; i++)
        if (strcmp(written.node->text, written.key->words[i]) == 0)
            out->word = written.key->words[i];
    if (out->word)
        return BH_OK;
    if (!bh_read_quantity(reading, written, &q))
        return BH_OK;
    if (make_room(reading, 1, out, &values))
        return BH_ENOMEM;
    values[0] = q;
    out->count = 1;
    return BH_OK;
}

bh_code bh_read_sweep(const bh_reading *reading, bh_written written, bh_sweep *out)
{
    const bh_node *node = written.node;
    *out = (bh_sweep){.given = true, .node = node, .at = node->at};
    out->swept = node->kind != BH_NODE_SCALAR;
    if (node->kind == BH_NODE_SCALAR)
        return read_one(reading, written, out);
    if (node->kind == BH_NODE_MAPPING)
        return read_steps(reading, written, out);
    bh_written list = written;
    bh_key row = *written.key;
    row.flags |= BH_KEY_NOT_EMPTY;
    list.key = &row;
    return bh_read_is(reading, list, BH_NODE_LIST) ? read_list(reading, list, out) : BH_OK;
}
