/* key_list.c - the keys of a plan, one after the other. */
#include "beamhours/plan/key_list.h"

#include <stdio.h>
#include <string.h>

#include "beamhours/base/nearest.h"
#include "beamhours/plan/raw.h"

enum { DEEPEST = 8 };

/* The way to a row: one step for each mapping on it. */
struct walk {
    const bh_schema *schema[DEEPEST];
    size_t row[DEEPEST];
    size_t depth; /* of the current row, from 0 */
};

/* What is documented where it stands first: a setting's beam is the plan's, and so on. */
static bool expands(const struct walk *walk)
{
    const bh_key *key = &walk->schema[walk->depth]->keys[walk->row[walk->depth]];
    if (!key->children || walk->depth + 1 == DEEPEST)
        return false;
    const bool one = key->kind == BH_KEY_MAPPING;
    const bool again = (key->flags & BH_KEY_OVERRIDE) ||
                       (one && key->children == &bh_schema_target) ||
                       (one && key->children == &bh_schema_setting) ||
                       (walk->depth == 1 && key->children == &bh_schema_layer &&
                        walk->schema[1] == &bh_schema_arm);
    return !again;
}

/* To the next row; false at the end. */
static bool step(struct walk *walk)
{
    if (expands(walk)) {
        const bh_key *key = &walk->schema[walk->depth]->keys[walk->row[walk->depth]];
        walk->depth++;
        walk->schema[walk->depth] = key->children;
        walk->row[walk->depth] = 0;
        return true;
    }
    while (++walk->row[walk->depth] == walk->schema[walk->depth]->count) {
        if (walk->depth == 0)
            return false;
        walk->depth--;
    }
    return true;
}

static const char *dimension_name(bh_dimension dimension)
{
    static const char *const name[] = {
#define NAME_OF(id, name, unit, examples) [id] = (name),
        BH_DIMENSIONS(NAME_OF)
#undef NAME_OF
    };
    return name[dimension];
}

static const char *dimension_units(bh_dimension dimension)
{
    static const char *const units[] = {
#define UNITS_OF(id, name, unit, examples) [id] = (examples),
        BH_DIMENSIONS(UNITS_OF)
#undef UNITS_OF
    };
    return units[dimension];
}

static const char *kind_name(const bh_key *key)
{
    switch (key->kind) {
    case BH_KEY_NUMBER:
        return "a number";
    case BH_KEY_COUNT:
        return "a whole number";
    case BH_KEY_WORD:
        return "one word";
    case BH_KEY_NAME:
        return "a name";
    case BH_KEY_TEXT:
        return "a text";
    case BH_KEY_TABLE:
        return (key->flags & BH_KEY_OR_WORD) ? "a name, or names by nuclide" : "names with values";
    case BH_KEY_WORDS:
        return "a list of words";
    case BH_KEY_MAPPING:
        return "keys with values";
    case BH_KEY_LIST:
        return "a list of keys with values";
    default:
        return dimension_name(key->dimension);
    }
}

static void write_units(const bh_key *key, char *out, size_t size)
{
    static const char *const form[] = {
        [BH_KEY_EXTENT] = ", as ± or {from, to}",
        [BH_KEY_RANGE] = ", as {from, to}",
        [BH_KEY_SWEEP] = "; in a setting also several",
        [BH_KEY_VALUES] = ", a list",
        [BH_KEY_LIST] = "",
    };
    const bool measured = key->kind == BH_KEY_QUANTITY || key->kind == BH_KEY_EXTENT ||
                          key->kind == BH_KEY_RANGE || key->kind == BH_KEY_EITHER ||
                          key->kind == BH_KEY_SWEEP || key->kind == BH_KEY_VALUES ||
                          (key->kind == BH_KEY_TABLE && key->item == BH_KEY_QUANTITY);
    size_t used = 0;
    out[0] = '\0';
    if (measured) {
        const char *more = form[key->kind] ? form[key->kind] : "";
        used = (size_t)snprintf(out, size, "%s%s", dimension_units(key->dimension), more);
    }
    for (size_t i = 0; key->words && key->words[i] && used < size; i++)
        used += (size_t)snprintf(out + used, size - used, "%s%s", used ? " | " : "", key->words[i]);
}

static void write_group(const bh_schema *schema, const bh_key *key, char *out, size_t size)
{
    out[0] = '\0';
    if (key->group == 0)
        return;
    const bool needed = ((schema->exactly | schema->claimed) >> key->group) & 1U;
    size_t used = (size_t)snprintf(out, size, "%s one of", needed ? "exactly" : "at most");
    const char *link = " ";
    for (size_t i = 0; i < schema->count && used < size; i++)
        if (schema->keys[i].group == key->group) {
            used += (size_t)snprintf(out + used, size - used, "%s%s", link, schema->keys[i].name);
            link = " | ";
        }
}

static void describe(const struct walk *walk, bh_plan_key *out)
{
    const bh_schema *schema = walk->schema[walk->depth];
    const bh_key *key = &schema->keys[walk->row[walk->depth]];
    size_t used = 0;
    *out = (bh_plan_key){.depth = (int)walk->depth,
                         .kind = kind_name(key),
                         .required = key->flags & BH_KEY_REQUIRED,
                         .preset = key->fallback,
                         .meaning = key->meaning,
                         .example = key->example,
                         .built = !(key->flags & BH_KEY_NOT_BUILT)};
    for (size_t d = 0; d <= walk->depth && used < sizeof out->path; d++)
        used += (size_t)snprintf(out->path + used, sizeof out->path - used, "%s%s", d ? "." : "",
                                 walk->schema[d]->keys[walk->row[d]].name);
    write_units(key, out->units, sizeof out->units);
    write_group(schema, key, out->group, sizeof out->group);
}

bool bh_plan_key_at(size_t i, bh_plan_key *out)
{
    struct walk walk = {.schema = {&bh_schema_plan}};
    for (; i > 0; i--)
        if (!step(&walk))
            return false;
    describe(&walk, out);
    return true;
}

size_t bh_plan_key_count(void)
{
    struct walk walk = {.schema = {&bh_schema_plan}};
    size_t n = 1;
    while (step(&walk))
        n++;
    return n;
}

/* Whether `path` leads to the row, list items in it passed over. */
static bool leads(const struct walk *walk, const char *path)
{
    for (size_t d = 0; d <= walk->depth; d++) {
        const bh_key *key = &walk->schema[d]->keys[walk->row[d]];
        const size_t length = strlen(key->name);
        if (strncmp(path, key->name, length) != 0)
            return false;
        path += length;
        if (d == walk->depth)
            return *path == '\0';
        if (*path++ != '.')
            return false;
        const bh_key *next = &walk->schema[d + 1]->keys[walk->row[d + 1]];
        const bool direct = strncmp(path, next->name, strlen(next->name)) == 0;
        const char *dot = strchr(path, '.');
        if (key->kind == BH_KEY_LIST && !direct && dot)
            path = dot + 1;
    }
    return false;
}

/* The row whose last part, or whole path, is nearest to the last part of `path`. */
static void find_near(const char *path, bh_plan_key *near)
{
    const char *last = strrchr(path, '.') ? strrchr(path, '.') + 1 : path;
    struct walk walk = {.schema = {&bh_schema_plan}};
    const char *best = NULL;
    *near = (bh_plan_key){.path = ""};
    do {
        const char *name = walk.schema[walk.depth]->keys[walk.row[walk.depth]].name;
        const char *const pair[] = {best, name};
        if (bh_nearest(last, pair, 2) == name && name != best) {
            best = name;
            describe(&walk, near);
        }
    } while (step(&walk));
}

/* To the row of `path`: as documentation writes it, or (loose) with list items in it. */
static bool find(struct walk *walk, const char *path, bool loose)
{
    bh_plan_key row;
    *walk = (struct walk){.schema = {&bh_schema_plan}};
    do {
        describe(walk, &row);
        if (strcmp(row.path, path) == 0 || (loose && leads(walk, path)))
            return true;
    } while (step(walk));
    return false;
}

bool bh_plan_key_find(const char *path, bh_plan_key *out, bh_plan_key *near)
{
    struct walk walk;
    const bool found = find(&walk, path, false) || find(&walk, path, true);
    if (found)
        describe(&walk, out);
    else if (near)
        find_near(path, near);
    return found;
}
