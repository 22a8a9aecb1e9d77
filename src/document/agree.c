/* agree.c - are two documents equal but for what was meant to change? */
#include "beamhours/document/agree.h"

#include <string.h>

static bool same_text(const bh_node *a, const bh_node *b)
{
    return a->length == b->length && memcmp(a->text, b->text, a->length) == 0;
}

/* Equal but for what is inside. */
static bool same_outside(const bh_node *a, const bh_node *b, bool style)
{
    return a->kind == b->kind && (!style || a->style == b->style) &&
           (a->kind != BH_NODE_SCALAR || same_text(a, b));
}

/* NOLINTNEXTLINE(misc-no-recursion): nesting is limited */
bool bh_node_equal(const bh_node *a, const bh_node *b, bool style)
{
    if (!same_outside(a, b, style) || a->count != b->count)
        return false;
    for (size_t i = 0; i < a->count; i++)
        if ((a->keys && !bh_node_equal(a->keys[i], b->keys[i], style)) ||
            !bh_node_equal(a->items[i], b->items[i], style))
            return false;
    return true;
}

static bool key_as_meant(const bh_node *after, size_t i, const bh_meant *m)
{
    if (!after->keys)
        return true;
    if (i == m->place && m->key)
        return strcmp(after->keys[i]->text, m->key) == 0;
    return bh_node_equal(m->around->keys[m->from[i]], after->keys[i], true);
}

static bool child_as_meant(const bh_node *after, size_t i, const bh_meant *m)
{
    if (!key_as_meant(after, i, m))
        return false;
    if (i == m->place && m->value)
        return bh_node_equal(m->value, after->items[i], false);
    return bh_node_equal(m->around->items[m->from[i]], after->items[i], true);
}

static bool around_as_meant(const bh_node *after, const bh_meant *m)
{
    /* What loses its last item goes on in brackets. */
    const bool style = m->count > 0 && m->around->count > 0;
    if (!same_outside(m->around, after, style) || after->count != m->count)
        return false;
    for (size_t i = 0; i < m->count; i++)
        if (!child_as_meant(after, i, m))
            return false;
    return true;
}

/* NOLINTNEXTLINE(misc-no-recursion): nesting is limited */
bool bh_as_meant(const bh_node *before, const bh_node *after, const bh_meant *meant)
{
    if (before == meant->around)
        return around_as_meant(after, meant);
    if (!same_outside(before, after, true) || before->count != after->count)
        return false;
    for (size_t i = 0; i < before->count; i++)
        if ((before->keys && !bh_node_equal(before->keys[i], after->keys[i], true)) ||
            !bh_as_meant(before->items[i], after->items[i], meant))
            return false;
    return true;
}
