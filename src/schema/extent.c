/* extent.c - "±28 mrad" and {from, to}. */
#include <math.h>
#include <stddef.h>
#include <string.h>

#include "beamhours/base/sentences.h"
#include "beamhours/schema/ends.h"
#include "beamhours/schema/reading.h"

struct limits {
    bh_section section;
    bh_value from, to;
};

/* Behind a leading ± (or +-) and blanks; NULL where there is none. */
static const char *skip_plus_minus(const char *text)
{
    static const char sign[] = "\xc2\xb1";
    if (strncmp(text, sign, sizeof sign - 1) != 0 && strncmp(text, "+-", 2) != 0)
        return NULL;
    text += 2;
    return text + strspn(text, " \t");
}

/* Half of an extent, behind its sign. */
static void read_half(const bh_reading *reading, bh_written written, const char *half,
                      bh_extent *out)
{
    bh_quantity q;
    bh_error err = {.code = BH_OK};
    if (bh_quantity_parse(half, written.key->dimension, &q, &err)) {
        bh_say_node(reading, written.node, "%s", err.text);
        return;
    }
    if (!(q.value > 0.0)) {
        char text[BH_QUANTITY_SIZE];
        bh_say_node(reading, written.node, BH_SAY_NOT_ABOVE, written.node->text,
                    bh_quantity_text(0.0, written.key->dimension, text));
        return;
    }
    if (bh_read_within(reading, written, q.value)) {
        out->from = -q.value;
        out->to = q.value;
    }
}

static void read_bare(const bh_reading *reading, bh_written written)
{
    const char *text = written.node->text;
    bh_quantity q;
    bh_error err = {.code = BH_OK};
    if (written.key->kind == BH_KEY_RANGE)
        bh_say_node(reading, written.node, BH_SAY_NEED_RANGE, text, written.key->example);
    else if (bh_quantity_parse(text, written.key->dimension, &q, &err))
        bh_say_node(reading, written.node, "%s", err.text);
    else
        bh_say_node(reading, written.node, BH_SAY_BARE_EXTENT, text, text, text, text);
}

static void read_limits(const bh_reading *reading, bh_written written, bh_extent *out)
{
    const bh_key keys[] = {
        bh_end_key(written.key, "from", offsetof(struct limits, from)),
        bh_end_key(written.key, "to", offsetof(struct limits, to)),
    };
    const bh_schema schema = {written.key->name, sizeof(struct limits), keys, 2, 0, 0};
    struct limits limits;
    if (bh_schema_read(reading, &schema, written.node, &limits))
        return; /* no memory is needed for this */
    const double from = limits.from.value, to = limits.to.value;
    if (!limits.from.given || !limits.to.given || isnan(from) || isnan(to))
        return;
    if (!(from < to)) {
        bh_say_node(reading, written.node, BH_SAY_EXTENT_ORDER,
                    bh_node_get(written.node, "from")->text, bh_node_get(written.node, "to")->text);
        return;
    }
    out->from = from;
    out->to = to;
}

void bh_read_extent(const bh_reading *reading, bh_written written, bh_extent *out)
{
    *out = (bh_extent){.from = NAN, .to = NAN, .given = true, .at = written.node->at};
    if (written.node->kind == BH_NODE_MAPPING) {
        read_limits(reading, written, out);
        return;
    }
    if (!bh_read_is(reading, written, BH_NODE_SCALAR))
        return;
    const char *half = skip_plus_minus(written.node->text);
    if (half && written.key->kind == BH_KEY_EXTENT)
        read_half(reading, written, half, out);
    else
        read_bare(reading, written);
}
