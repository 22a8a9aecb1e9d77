/* path.c - dotted paths of nodes, and complaints that bear them. */
#include <stdarg.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/schema/reading.h"
#include "beamhours/schema/schema.h"

/* Nesting is limited by the document's reader; what is deeper loses its outer parts. */
enum { DEEPEST = 32, PART = 64 };

/* The name of item i: that of a mapping with a name, else its number. */
static void item_name(const bh_node *item, size_t i, char out[PART])
{
    const bh_node *name = bh_node_get(item, "name");
    if (name && name->kind == BH_NODE_SCALAR && name->length > 0 && name->length < PART)
        (void)snprintf(out, PART, "%s", name->text);
    else
        (void)snprintf(out, PART, "%zu", i + 1);
}

static void part_of(const bh_node *node, char out[PART])
{
    const bh_node *parent = node->parent;
    size_t i = 0;
    while (i < parent->count && parent->items[i] != node)
        i++;
    if (parent->kind == BH_NODE_LIST)
        item_name(node, i, out);
    else if (i < parent->count)
        (void)snprintf(out, PART, "%s", parent->keys[i]->text);
    else
        out[0] = '\0'; /* a key of the mapping, not a value */
}

static void append(char out[BH_PATH_SIZE], const char *part)
{
    const size_t used = strlen(out);
    if (part[0])
        (void)snprintf(out + used, BH_PATH_SIZE - used, "%s%s", used ? "." : "", part);
}

const char *bh_node_path(const bh_node *node, const char *key, char out[BH_PATH_SIZE])
{
    const bh_node *chain[DEEPEST];
    size_t depth = 0;
    for (const bh_node *n = node; n && n->parent && depth < DEEPEST; n = n->parent)
        chain[depth++] = n;
    out[0] = '\0';
    while (depth > 0) {
        char part[PART];
        part_of(chain[--depth], part);
        append(out, part);
    }
    append(out, key ? key : "");
    if (!out[0])
        (void)snprintf(out, BH_PATH_SIZE, "plan"); /* the root: the list's word for it */
    return out;
}

static void add(const bh_reading *reading, bh_severity severity, bh_mark at, bh_said said)
{
    bh_diags_addv(reading->diags, severity, at, said);
}

void bh_say(const bh_reading *reading, bh_mark at, const bh_section *section, const char *key,
            const char *fmt, ...)
{
    char path[BH_PATH_SIZE];
    va_list args;
    va_start(args, fmt);
    add(reading, BH_SEVERITY_ERROR, at,
        (bh_said){.key = bh_node_path(section->node, key, path), .fmt = fmt, .args = &args});
    va_end(args);
}

void bh_warn(const bh_reading *reading, bh_mark at, const bh_section *section, const char *key,
             const char *fmt, ...)
{
    char path[BH_PATH_SIZE];
    va_list args;
    va_start(args, fmt);
    add(reading, BH_SEVERITY_WARNING, at,
        (bh_said){.key = bh_node_path(section->node, key, path), .fmt = fmt, .args = &args});
    va_end(args);
}

void bh_say_node(const bh_reading *reading, const bh_node *node, const char *fmt, ...)
{
    char path[BH_PATH_SIZE];
    va_list args;
    va_start(args, fmt);
    add(reading, BH_SEVERITY_ERROR, node->at,
        (bh_said){.key = bh_node_path(node, NULL, path), .fmt = fmt, .args = &args});
    va_end(args);
}
