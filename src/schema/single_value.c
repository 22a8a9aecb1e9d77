/* single_value.c - one value: quantities with their bounds, bare numbers, whole numbers. */
#include <ctype.h>
#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/base/sentences.h"
#include "beamhours/schema/reading.h"

static const char *what_is(const bh_node *node)
{
    if (node->kind == BH_NODE_SCALAR)
        return node->length ? node->text : "nothing";
    return node->kind == BH_NODE_LIST ? "a list" : "keys with values";
}

bool bh_read_is(const bh_reading *reading, bh_written written, bh_node_kind kind)
{
    const bh_node *node = written.node;
    const char *example = written.key->example;
    if (node->kind == BH_NODE_SCALAR && node->length == 0) {
        bh_say_node(reading, node, BH_SAY_NOTHING_WRITTEN, example);
        return false;
    }
    if (node->kind == kind) {
        const bool hollow = kind != BH_NODE_SCALAR && node->count == 0;
        if (hollow && (written.key->flags & BH_KEY_NOT_EMPTY))
            bh_say_node(reading, node, BH_SAY_EMPTY_LIST, example);
        return true;
    }
    if (kind == BH_NODE_SCALAR)
        bh_say_node(reading, node, BH_SAY_NEED_VALUE, what_is(node), example);
    else if (kind == BH_NODE_LIST)
        bh_say_node(reading, node, BH_SAY_NEED_LIST, what_is(node), example);
    else
        bh_say_node(reading, node, BH_SAY_NEED_KEYS, what_is(node), example);
    return false;
}

const char *bh_quantity_text(double value, bh_dimension dimension, char out[BH_QUANTITY_SIZE])
{
    char whole[BH_QUANTITY_SIZE], number[BH_NUMBER_SIZE];
    const bh_quantity q = {.value = value};
    const char *unit = whole;
    double printed;
    (void)bh_quantity_print(&q, dimension, whole, sizeof whole);
    if (bh_number_parse(whole, &unit, &printed)) {
        (void)snprintf(out, BH_QUANTITY_SIZE, "%s", whole);
        return out;
    }
    /* Nobody wants to read more digits of a computed value; closing zeros go. */
    (void)bh_number_digits(printed, 7, number, sizeof number);
    if (bh_number_parse(number, NULL, &printed) == BH_OK)
        (void)bh_number_print(printed, number, sizeof number);
    (void)snprintf(out, BH_QUANTITY_SIZE, "%s%s", number, unit);
    return out;
}

void bh_read_fallback(const bh_key *key, const char *text, bh_quantity *out)
{
    bh_quantity q;
    if (!text)
        return;
    if (key->kind == BH_KEY_COUNT || key->kind == BH_KEY_NUMBER) {
        if (bh_number_parse(text, NULL, &q.value) == BH_OK)
            *out = (bh_quantity){.value = q.value};
    } else if (bh_quantity_parse(text, key->dimension, &q, NULL) == BH_OK) {
        *out = q;
    }
}

/* A bound of the key's table in internal units, `otherwise` where there is none. */
static double bound(const bh_key *key, const char *text, double otherwise)
{
    bh_quantity q = {.value = otherwise};
    bh_read_fallback(key, text, &q);
    return q.value;
}

bool bh_read_within(const bh_reading *reading, bh_written written, double value)
{
    const bh_key *key = written.key;
    const char *text = written.node->text;
    if (!(value >= bound(key, key->least, -INFINITY)))
        bh_say_node(reading, written.node, BH_SAY_TOO_SMALL, text, key->least);
    else if (!(value > bound(key, key->above, -INFINITY)))
        bh_say_node(reading, written.node, BH_SAY_NOT_ABOVE, text, key->above);
    else if (!(value <= bound(key, key->most, INFINITY)))
        bh_say_node(reading, written.node, BH_SAY_TOO_LARGE, text, key->most);
    else
        return true;
    return false;
}

bool bh_read_quantity(const bh_reading *reading, bh_written written, bh_quantity *out)
{
    bh_quantity q;
    bh_error err = {.code = BH_OK};
    if (!bh_read_is(reading, written, BH_NODE_SCALAR))
        return false;
    if (bh_quantity_parse(written.node->text, written.key->dimension, &q, &err)) {
        bh_say_node(reading, written.node, "%s", err.text);
        return false;
    }
    if (!bh_read_within(reading, written, q.value))
        return false;
    *out = q;
    return true;
}

/* Behind a minus sign of either kind. */
static const char *skip_minus(const char *text, bool *minus)
{
    static const char sign[] = "\xe2\x88\x92"; /* U+2212 */
    *minus = text[0] == '-' || strncmp(text, sign, sizeof sign - 1) == 0;
    if (!*minus)
        return text;
    return text + (text[0] == '-' ? 1 : sizeof sign - 1);
}

static bool read_number(const bh_reading *reading, bh_written written, double *out)
{
    bool minus;
    const char *digits = skip_minus(written.node->text, &minus), *end = digits;
    double value;
    const bool starts = isdigit((unsigned char)digits[0]) || digits[0] == '.';
    if (!starts || bh_number_parse(digits, &end, &value) || *end) {
        bh_say_node(reading, written.node, BH_SAY_NOT_A_NUMBER, written.node->text,
                    written.key->example);
        return false;
    }
    *out = minus ? -value : value;
    return true;
}

static bool read_count(const bh_reading *reading, bh_written written, double *out)
{
    bool minus;
    const char *digits = skip_minus(written.node->text, &minus);
    double value = 0.0;
    const size_t length = strspn(digits, "0123456789");
    if (length == 0 || digits[length]) {
        bh_say_node(reading, written.node, BH_SAY_NO_COUNT, written.node->text,
                    written.key->example);
        return false;
    }
    static const char most[] = "9007199254740992"; /* beyond, a double skips whole numbers */
    if (bh_number_parse(digits, NULL, &value) || value > 9007199254740992.0) {
        bh_say_node(reading, written.node, BH_SAY_TOO_LARGE, written.node->text, most);
        return false;
    }
    *out = minus ? -value : value;
    return true;
}

void bh_read_value(const bh_reading *reading, bh_written written, bh_value *out)
{
    *out = (bh_value){.value = NAN, .given = true, .at = written.node->at};
    bh_quantity q = {.value = NAN};
    if (written.key->kind != BH_KEY_NUMBER && written.key->kind != BH_KEY_COUNT) {
        if (bh_read_quantity(reading, written, &q)) {
            out->value = q.value;
            out->uncertainty = q.uncertainty;
        }
        return;
    }
    if (!bh_read_is(reading, written, BH_NODE_SCALAR))
        return;
    const bool good = written.key->kind == BH_KEY_COUNT ? read_count(reading, written, &q.value)
                                                        : read_number(reading, written, &q.value);
    if (good && bh_read_within(reading, written, q.value))
        out->value = q.value;
}

bh_code bh_read_values(const bh_reading *reading, bh_written written, bh_values *out)
{
    *out = (bh_values){.given = true, .at = written.node->at};
    if (!bh_read_is(reading, written, BH_NODE_LIST))
        return BH_OK;
    const size_t n = written.node->count;
    bh_value *items = bh_arena_take(reading->arena, n + 1, sizeof *items);
    if (!items)
        return BH_ENOMEM;
    for (size_t i = 0; i < n; i++)
        bh_read_value(reading, (bh_written){written.key, written.node->items[i]}, &items[i]);
    out->items = items;
    out->count = n;
    return BH_OK;
}
