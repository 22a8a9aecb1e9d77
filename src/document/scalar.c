/* scalar.c - the small print of YAML texts. */
#include "beamhours/document/scalar.h"

#include <string.h>

#include "beamhours/document/source.h"

static bh_node_style scalar_style(yaml_scalar_style_t style)
{
    if (style == YAML_SINGLE_QUOTED_SCALAR_STYLE || style == YAML_DOUBLE_QUOTED_SCALAR_STYLE)
        return BH_STYLE_QUOTED;
    const bool block = style == YAML_LITERAL_SCALAR_STYLE || style == YAML_FOLDED_SCALAR_STYLE;
    return block ? BH_STYLE_BLOCK : BH_STYLE_PLAIN;
}

bh_node_style bh_event_style(const yaml_event_t *event)
{
    if (event->type == YAML_SCALAR_EVENT)
        return scalar_style(event->data.scalar.style);
    const bool flow = event->type == YAML_SEQUENCE_START_EVENT
                          ? event->data.sequence_start.style == YAML_FLOW_SEQUENCE_STYLE
                          : event->data.mapping_start.style == YAML_FLOW_MAPPING_STYLE;
    return flow ? BH_STYLE_FLOW : BH_STYLE_BLOCK;
}

bool bh_event_directives(const yaml_event_t *event)
{
    return event->data.document_start.version_directive ||
           event->data.document_start.tag_directives.start !=
               event->data.document_start.tag_directives.end;
}

bool bh_node_empty(const bh_node *node)
{
    return !node ||
           (node->kind == BH_NODE_SCALAR && node->style == BH_STYLE_PLAIN && node->length == 0);
}

static bool is_digit(char c)
{
    return c >= '0' && c <= '9';
}

static bool is_letter(char c)
{
    return (c >= 'a' && c <= 'z') || (c >= 'A' && c <= 'Z');
}

bool bh_scalar_looks_cut(const char *bytes, size_t from, size_t to)
{
    const char *rest = bytes + to;
    if (rest[0] != ' ' || rest[1] != '#')
        return false;
    const char first = bytes[from];
    const bool quantity = to > from && (is_digit(first) || strchr("+-.(", first));
    return is_digit(rest[2]) || (is_letter(rest[2]) && !quantity);
}

size_t bh_scalar_trimmed(const char *bytes, size_t from, size_t to)
{
    while (to > from + 1 && strchr(" \t\r\n", bytes[to - 1]))
        to--;
    return to;
}

bool bh_scalar_hidden(const char *text, size_t length, uint32_t *point)
{
    for (size_t i = 0, width = 0; i < length; i += width) {
        width = bh_utf8_read(text + i, length - i, point);
        if (width == 0 || bh_utf8_hidden(*point) || bh_utf8_line_end(*point))
            return true;
    }
    return false;
}

bool bh_scalar_comma_parts(const bh_node *value, const bh_node *key)
{
    if (value->kind != BH_NODE_SCALAR || value->style != BH_STYLE_PLAIN || value->length == 0 ||
        key->length == 0 || key->style != BH_STYLE_PLAIN || !strchr("0123456789", key->text[0]) ||
        !strchr("0123456789", value->text[value->length - 1]))
        return false;
    int column = value->at.column + 1; /* behind the comma */
    for (size_t i = 0; i < value->length; i++)
        column += ((unsigned char)value->text[i] & 0xC0U) != 0x80;
    return value->at.line == key->at.line && column == key->at.column;
}

void bh_scalar_short(const char *text, char *out, size_t size)
{
    const bh_cursor cursor = {.bytes = text, .length = strlen(text)};
    bh_source_excerpt(&cursor, 0, cursor.length, out, size);
}
