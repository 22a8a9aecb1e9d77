/* differences.c - lays both plans out as lists of paths and values, then looks each up in the
 * other. */
#include "beamhours/report/differences.h"

#include <json-c/json.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/report/json_parts.h"

/* One value, or one item of a list (`value` "present"). */
struct entry {
    const char *path, *value;
    long within; /* the item it belongs to; -1: none */
    bool item, lone;
};

struct place {
    const struct entry *entry;
};

struct entries {
    bh_arena *arena;
    struct entry *all;
    struct place *sorted; /* by path */
    size_t count, room;
    bool failed;
};

static const char *keep(bh_arena *arena, bh_text *text)
{
    char *copy = text->failed ? NULL : bh_arena_take(arena, text->length + 1, 1);
    if (copy && text->length)
        memcpy(copy, text->bytes, text->length);
    bh_text_free(text);
    return copy;
}

/* "beam.current" from "beam" and "current"; the key alone at the root. */
static const char *path_of(struct entries *e, const char *parent, const char *key)
{
    bh_text text = {0};
    bh_text_appendf(&text, "%s%s%s", parent, parent[0] ? "." : "", key);
    const char *path = keep(e->arena, &text);
    e->failed |= !path;
    return path ? path : "";
}

/* --- laying out --- */

static long add(struct entries *e, const struct entry *entry)
{
    if (e->count == e->room) {
        const size_t room = 2 * e->room + 64;
        struct entry *more = realloc(e->all, room * sizeof *more);
        if (!more) {
            e->failed = true;
            return -1;
        }
        e->all = more;
        e->room = room;
    }
    e->all[e->count] = *entry;
    return (long)e->count++;
}

/* What an item of a list is called: its name, its arm, or its number from 1. */
static const char *label_of(json_object *item, size_t number, char *out, size_t size)
{
    json_object *name = NULL;
    if (json_object_is_type(item, json_type_object) &&
        (json_object_object_get_ex(item, "name", &name) ||
         json_object_object_get_ex(item, "arm", &name)))
        return json_object_get_string(name);
    (void)snprintf(out, size, "%zu", number + 1);
    return out;
}

/* NOLINTBEGIN(misc-no-recursion): as deep as a plan is, some ten levels */

static void lay_out(struct entries *e, json_object *value, const char *path, long within);

static void lay_out_list(struct entries *e, json_object *list, const char *path, long within)
{
    char number[24];
    for (size_t i = 0; i < json_object_array_length(list); i++) {
        json_object *item = json_object_array_get_idx(list, i);
        const char *below = path_of(e, path, label_of(item, i, number, sizeof number));
        if (json_object_is_type(item, json_type_object))
            lay_out(e, item, below, add(e, &(struct entry){below, "present", within, true, false}));
        else
            lay_out(e, item, below, within);
    }
}

static void lay_out(struct entries *e, json_object *value, const char *path, long within)
{
    if (json_object_is_type(value, json_type_array)) {
        lay_out_list(e, value, path, within);
        return;
    }
    if (!json_object_is_type(value, json_type_object)) {
        bh_text text = {0};
        bh_text_append(&text, json_object_get_string(value));
        const char *copy = keep(e->arena, &text);
        e->failed |= !copy;
        (void)add(e, &(struct entry){path, copy ? copy : "", within, false, false});
        return;
    }
    const bool aimed = json_object_object_get_ex(value, "q2", NULL);
    json_object_object_foreach(value, key, member)
    {
        if (!aimed || strcmp(key, "angle") != 0)
            lay_out(e, member, path_of(e, path, key), within);
    }
}

/* NOLINTEND(misc-no-recursion) */

static int by_path(const void *a, const void *b)
{
    const struct place *left = a, *right = b;
    return strcmp(left->entry->path, right->entry->path);
}

static const struct entry *find(const struct entries *e, const char *path)
{
    const struct entry key = {.path = path};
    const struct place wanted = {&key};
    if (!e->count)
        return NULL;
    const struct place *found = bsearch(&wanted, e->sorted, e->count, sizeof *e->sorted, by_path);
    return found ? found->entry : NULL;
}

static void entries_of(const bh_plan *plan, struct entries *e)
{
    json_object *object = bh_json_plan(plan);
    lay_out(e, object, "", -1);
    json_object_put(object);
    e->sorted = bh_arena_take(e->arena, e->count + 1, sizeof *e->sorted);
    if (!e->sorted) {
        e->failed = true;
        return;
    }
    for (size_t i = 0; i < e->count; i++)
        e->sorted[i].entry = &e->all[i];
    qsort(e->sorted, e->count, sizeof *e->sorted, by_path);
}

/* --- comparing --- */

/* Items that the other has not; what belongs to them counts as told. */
static void mark_lone(struct entries *e, const struct entries *other)
{
    for (size_t i = 0; i < e->count; i++) {
        const struct entry *in = e->all[i].within < 0 ? NULL : &e->all[e->all[i].within];
        e->all[i].lone = (in && in->lone) || (e->all[i].item && !find(other, e->all[i].path));
    }
}

static bool told_with_its_item(const struct entries *e, const struct entry *entry)
{
    return entry->within >= 0 && e->all[entry->within].lone;
}

/* "beam.current" of "settings.K1.beam.current", also where a sweep's name has a dot: the part
 * behind the item's path; NULL for what is no setting's. */
static const char *own_part(const struct entries *e, const struct entry *entry)
{
    long at = entry->within;
    if (strncmp(entry->path, "settings.", strlen("settings.")) != 0 || at < 0)
        return NULL;
    while (e->all[at].within >= 0)
        at = e->all[at].within;
    return entry->path + strlen(e->all[at].path) + 1;
}

static bool same(const char *a, const char *b)
{
    return a && b ? strcmp(a, b) == 0 : a == b;
}

struct comparing {
    struct entries old, new;
    bh_differences *out;
    const char **parts; /* own_part of each difference, or NULL */
};

static bool taken_over(const struct comparing *c, const char *part, const bh_difference *d)
{
    const struct entry *was = find(&c->old, part), *is = find(&c->new, part);
    return was && is && same(was->value, d->before) && same(is->value, d->after);
}

static void tell(struct comparing *c, const char *part, const bh_difference *d)
{
    bh_differences *out = c->out;
    if (part && taken_over(c, part, d))
        return;
    for (size_t i = 0; part && i < out->count; i++)
        if (c->parts[i] && same(c->parts[i], part) && same(out->items[i].before, d->before) &&
            same(out->items[i].after, d->after)) {
            out->items[i].more++;
            return;
        }
    c->parts[out->count] = part;
    out->items[out->count++] = *d;
}

static void compare(struct comparing *c)
{
    for (size_t i = 0; i < c->old.count; i++) {
        const struct entry *was = &c->old.all[i], *is = find(&c->new, was->path);
        const bh_difference d = {was->path, was->value, is ? is->value : NULL, 0};
        if (!told_with_its_item(&c->old, was) && !same(d.before, d.after))
            tell(c, own_part(&c->old, was), &d);
    }
    for (size_t i = 0; i < c->new.count; i++) {
        const struct entry *is = &c->new.all[i];
        const bh_difference d = {is->path, NULL, is->value, 0};
        if (!told_with_its_item(&c->new, is) && !find(&c->old, is->path))
            tell(c, own_part(&c->new, is), &d);
    }
}

bh_code bh_differences_find(const bh_plan *before, const bh_plan *after, bh_arena *arena,
                            bh_differences *out, bh_error *err)
{
    struct comparing c = {.old = {.arena = arena}, .new = {.arena = arena}, .out = out};
    *out = (bh_differences){0};
    entries_of(before, &c.old);
    entries_of(after, &c.new);
    const size_t most = c.old.count + c.new.count + 1;
    out->items = bh_arena_take(arena, most, sizeof *out->items);
    c.parts = bh_arena_take(arena, most, sizeof *c.parts);
    const bool done = !c.old.failed && !c.new.failed && out->items &&c.parts;
    if (done) {
        mark_lone(&c.old, &c.new);
        mark_lone(&c.new, &c.old);
        compare(&c);
    }
    free(c.old.all);
    free(c.new.all);
    return done ? BH_OK : bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
}
