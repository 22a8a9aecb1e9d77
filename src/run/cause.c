/* cause.c - the causes of a plan's uncertainties, and how their effects combine. */
#include "beamhours/run/cause.h"

#include <math.h>
#include <stdint.h>
#include <string.h>

enum { FIRST_ROOM = 32, FIRST_BUCKETS = 64 };

/* Causes in the order they were met, and chains of those with the same hash. */
struct bh_causes {
    bh_arena *arena;
    size_t count, room, buckets;
    bh_cause *list;
    unsigned *next;  /* number + 1 of the next of the chain; 0 ends it */
    unsigned *first; /* likewise, one for each bucket */
};

static const struct {
    const char *source, *words;
} kinds[] = {
#define KIND(id, source, words) [id] = {source, words},
    BH_CAUSES(KIND)
#undef KIND
};

const char *bh_cause_source(bh_cause_kind kind)
{
    return (unsigned)kind < BH_CAUSE_KINDS ? kinds[kind].source : "";
}

const char *bh_cause_words(bh_cause_kind kind)
{
    return (unsigned)kind < BH_CAUSE_KINDS ? kinds[kind].words : "";
}

bool bh_cause_on_counts(bh_cause_kind kind)
{
    return kind >= BH_CAUSE_DEAD_TIME;
}

/* --- the list --- */

bh_causes *bh_causes_new(bh_arena *arena)
{
    bh_causes *made = bh_arena_take(arena, 1, sizeof *made);
    if (made)
        made->arena = arena;
    return made;
}

bh_causes *bh_causes_copy(const bh_causes *from, bh_arena *arena)
{
    bh_causes *made = bh_causes_new(arena);
    unsigned number;
    for (size_t i = 0; made && i < from->count; i++)
        if (bh_causes_number(made, &from->list[i], &number, NULL))
            return NULL;
    return made;
}

size_t bh_causes_count(const bh_causes *causes)
{
    return causes->count;
}

const bh_cause *bh_causes_at(const bh_causes *causes, size_t i)
{
    return i < causes->count ? &causes->list[i] : NULL;
}

/* FNV-1a, Fowler, Noll and Vo, over whole numbers. */
static size_t hash_of(const bh_cause *c)
{
    const unsigned parts[] = {(unsigned)c->kind, (unsigned)c->at.line, (unsigned)c->at.column,
                              (unsigned)c->z, (unsigned)c->a};
    uint64_t hash = 14695981039346656037u;
    for (size_t i = 0; i < sizeof parts / sizeof parts[0]; i++)
        hash = (hash ^ parts[i]) * 1099511628211u;
    for (const char *p = c->model; p && *p; p++)
        hash = (hash ^ (unsigned char)*p) * 1099511628211u;
    return (size_t)(hash >> 16);
}

static bool same_text(const char *a, const char *b)
{
    return a == b || (a && b && strcmp(a, b) == 0);
}

static bool same(const bh_cause *a, const bh_cause *b)
{
    return a->kind == b->kind && a->at.line == b->at.line && a->at.column == b->at.column &&
           a->z == b->z && a->a == b->a && same_text(a->model, b->model) &&
           same_text(a->at.file, b->at.file);
}

static void enter(bh_causes *causes, size_t number)
{
    if (causes->buckets == 0) /* never: there is room */
        return;
    unsigned *first = &causes->first[hash_of(&causes->list[number]) % causes->buckets];
    causes->next[number] = *first;
    *first = (unsigned)number + 1;
}

/* Room for one more, and as many buckets as there is room. */
static bool grow(bh_causes *causes)
{
    if (causes->count < causes->room)
        return true;
    const size_t room = causes->room ? 2 * causes->room : FIRST_ROOM;
    bh_cause *list = bh_arena_take(causes->arena, room, sizeof *list);
    unsigned *next = bh_arena_take(causes->arena, room, sizeof *next);
    unsigned *first = bh_arena_take(causes->arena, 2 * room, sizeof *first);
    if (!list || !next || !first)
        return false;
    if (causes->count)
        memcpy(list, causes->list, causes->count * sizeof *list);
    causes->list = list;
    causes->next = next;
    causes->first = first;
    causes->room = room;
    causes->buckets = 2 * room;
    for (size_t i = 0; i < causes->count; i++)
        enter(causes, i);
    return true;
}

static bool copy_text(bh_arena *arena, const char **text)
{
    if (!*text)
        return true;
    const size_t size = strlen(*text) + 1;
    char *copy = bh_arena_take(arena, size, 1);
    if (copy)
        memcpy(copy, *text, size);
    *text = copy;
    return copy;
}

bh_code bh_causes_number(bh_causes *causes, const bh_cause *cause, unsigned *number, bh_error *err)
{
    unsigned i = causes->buckets ? causes->first[hash_of(cause) % causes->buckets] : 0;
    while (i && !same(&causes->list[i - 1], cause))
        i = causes->next[i - 1];
    if (i) {
        *number = i - 1;
        return BH_OK;
    }
    bh_cause copy = *cause;
    if (!grow(causes) || !copy_text(causes->arena, &copy.key) ||
        !copy_text(causes->arena, &copy.model))
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    *number = (unsigned)causes->count;
    causes->list[causes->count] = copy;
    enter(causes, causes->count++);
    return BH_OK;
}

/* --- how effects combine --- */

/* What cause number `cause` does to a row; `missing` where it is not among its causes. */
static double effect_of(const bh_effects *row, unsigned cause, double missing)
{
    for (size_t i = 0; i < row->count; i++)
        if (row->cause[i] == cause)
            return row->effect[i];
    return missing;
}

static bool same_nuclide(const bh_cause *a, const bh_cause *b)
{
    return a->kind == b->kind && a->z == b->z && a->a == b->a;
}

static bool has_nuclide(const bh_causes *causes, const bh_effects *row, const bh_cause *nuclide)
{
    for (size_t i = 0; row && i < row->count; i++)
        if (same_nuclide(&causes->list[row->cause[i]], nuclide))
            return true;
    return false;
}

/* Half the range over the models of a nuclide, or what its fit's publication gives, of one row or
 * (other not NULL) of its ratio to another that has the nuclide too.  NAN where the two rows have
 * no model in common. */
static double spread(const bh_causes *causes, const bh_effects *row, const bh_effects *other,
                     const bh_cause *nuclide)
{
    double low = 0, high = 0, fit = 0;
    bool any = false;
    for (size_t i = 0; i < row->count; i++) {
        const bh_cause *c = &causes->list[row->cause[i]];
        if (!same_nuclide(c, nuclide))
            continue;
        const double its = other ? effect_of(other, row->cause[i], (double)NAN) : 0;
        const double off = row->effect[i] - its;
        if (isnan(off))
            continue;
        any = true;
        if (!c->model)
            fit = off;
        low = fmin(low, c->model ? off : 0);
        high = fmax(high, c->model ? off : 0);
    }
    return any ? hypot((high - low) / 2, fit) : (double)NAN;
}

/* The same, with two rows that have no model in common taken as independent. */
static double nuclide_size(const bh_causes *causes, const bh_effects *row, const bh_effects *other,
                           const bh_cause *nuclide)
{
    const bool both = other && has_nuclide(causes, other, nuclide);
    const double common = spread(causes, row, both ? other : NULL, nuclide);
    if (!isnan(common))
        return common;
    const double own = spread(causes, row, NULL, nuclide);
    const double its = both ? spread(causes, other, NULL, nuclide) : 0;
    return hypot(isnan(own) ? 0 : own, isnan(its) ? 0 : its);
}

/* Form factors of the nuclides of a row, added up; with `only_own` those alone that the other row
 * has not.  Sets the element. */
static double structure_size(const bh_causes *causes, const bh_effects *row,
                             const bh_effects *other, bool only_own)
{
    const bh_cause *last = NULL;
    double sum = 0;
    for (size_t i = 0; i < row->count; i++) {
        const bh_cause *c = &causes->list[row->cause[i]];
        if (c->kind != BH_CAUSE_STRUCTURE || (last && same_nuclide(last, c)))
            continue;
        last = c;
        if (!only_own || !has_nuclide(causes, other, c))
            sum += nuclide_size(causes, row, only_own ? NULL : other, c);
    }
    return sum;
}

static bool in_total(const bh_cause *c)
{
    return c->kind != BH_CAUSE_STRUCTURE && !bh_cause_on_counts(c->kind);
}

double bh_effects_total(const bh_causes *causes, const bh_effects *row)
{
    const double structure = structure_size(causes, row, NULL, false);
    double sum = structure * structure;
    for (size_t i = 0; i < row->count; i++)
        if (in_total(&causes->list[row->cause[i]]))
            sum += row->effect[i] * row->effect[i];
    return sqrt(sum);
}

double bh_effects_of(const bh_causes *causes, const bh_effects *row, bh_cause_kind kind)
{
    if (kind == BH_CAUSE_STRUCTURE)
        return structure_size(causes, row, NULL, false);
    double sum = 0;
    for (size_t i = 0; i < row->count; i++)
        if (causes->list[row->cause[i]].kind == kind)
            sum += row->effect[i] * row->effect[i];
    return sqrt(sum);
}

/* The atomic number of the scatterer, where form factors are in the row; else 0. */
static int element(const bh_causes *causes, const bh_effects *row)
{
    for (size_t i = 0; i < row->count; i++)
        if (causes->list[row->cause[i]].kind == BH_CAUSE_STRUCTURE)
            return causes->list[row->cause[i]].z;
    return 0;
}

double bh_effects_of_ratio(const bh_causes *causes, const bh_effects *row, const bh_effects *other)
{
    const double own = structure_size(causes, row, other, false);
    const double its = structure_size(causes, other, row, true);
    const bool same_element = element(causes, row) == element(causes, other);
    double sum = same_element ? (own + its) * (own + its) : own * own + its * its;
    for (size_t i = 0; i < row->count; i++) {
        const double off = row->effect[i] - effect_of(other, row->cause[i], 0);
        if (in_total(&causes->list[row->cause[i]]))
            sum += off * off;
    }
    for (size_t i = 0; i < other->count; i++) {
        bool shared = false;
        for (size_t k = 0; k < row->count && !shared; k++)
            shared = row->cause[k] == other->cause[i];
        if (!shared && in_total(&causes->list[other->cause[i]]))
            sum += other->effect[i] * other->effect[i];
    }
    return sqrt(sum);
}
