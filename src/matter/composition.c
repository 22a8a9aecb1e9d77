/* composition.c - what is written of elements and isotopes, worked out to nuclides. */
#include "beamhours/matter/composition.h"

#include <math.h>
#include <stdlib.h>

#include "beamhours/base/number.h"
#include "beamhours/base/sentences.h"
#include "beamhours/units/nuclide.h"

static const double slack = 5e-4; /* [1] that shares may miss 1 by: they are rounded */

/* One line of the shares. */
typedef struct {
    int z, a;      /* a = 0: the natural element */
    double amount; /* [1] relative number of atoms */
} entry;

/* One nuclide on its way into the list. */
typedef struct {
    bh_constituent part;
    double of_element; /* [1] share of atoms of all isotopes of its element */
} weighed;

typedef struct {
    const bh_reading *reading;
    const bh_section *section;
    const bh_shares *shares;
} task;

static void say_unknown(const task *t, const bh_pair *pair)
{
    const bh_nuclide *meant = bh_nuclide_suggest(pair->name);
    if (meant)
        bh_say(t->reading, pair->name_at, t->section, t->shares->key, BH_SAY_COMPOSED_OF_NEAR,
               pair->name, meant->name);
    else
        bh_say(t->reading, pair->name_at, t->section, t->shares->key, BH_SAY_COMPOSED_OF,
               pair->name);
}

/* The element or nuclide of a line; false after a complaint. */
static bool read_name(const task *t, const bh_pair *pair, entry *out)
{
    if (!bh_nuclide_parse(pair->name, &out->z, &out->a) || out->z < 1) {
        say_unknown(t, pair);
        return false;
    }
    size_t count;
    const bh_nuclide *isotopes = bh_element_isotopes(out->z, &count);
    if (out->a != 0 ? bh_nuclide_find(out->z, out->a) != NULL : bh_element_mass(out->z) > 0.0)
        return true;
    if (count == 0)
        bh_say(t->reading, pair->name_at, t->section, t->shares->key, BH_SAY_NUCLIDE_LACKS,
               pair->name);
    else if (out->a != 0)
        bh_say(t->reading, pair->name_at, t->section, t->shares->key, BH_SAY_ISOTOPE_LACKS,
               pair->name, isotopes[count - 1].name);
    else
        bh_say(t->reading, pair->name_at, t->section, t->shares->key, BH_SAY_NOT_NATURAL,
               pair->name, isotopes[count - 1].name);
    return false;
}

/* [u] of a neutral atom of the line's element or nuclide. */
static double atom_mass(const entry *e)
{
    const bh_nuclide *nuclide = e->a ? bh_nuclide_find(e->z, e->a) : NULL;
    return nuclide ? nuclide->atomic_mass : bh_element_mass(e->z);
}

/* Complains unless the shares add up to 100 %. */
static bool adds_up(const task *t, double sum)
{
    if (t->shares->kind == BH_SHARES_FORMULA || fabs(sum - 1.0) <= slack)
        return true;
    char number[BH_NUMBER_SIZE];
    bh_number_digits(100.0 * sum, 6, number, sizeof number);
    bh_say(t->reading, t->shares->pairs->at, t->section, t->shares->key, BH_SAY_SHARE_SUM, number);
    return false;
}

/* Reads all lines; false after a complaint, whoever made it. */
static bool read_entries(const task *t, entry *entries)
{
    bool good = true;
    double sum = 0.0;
    const bh_pairs *pairs = t->shares->pairs;
    for (size_t i = 0; i < pairs->count; i++) {
        const double value = pairs->items[i].value.value;
        sum += value;
        entries[i].amount = value;
        good = read_name(t, &pairs->items[i], &entries[i]) && value > 0.0 && good;
        if (good && t->shares->kind == BH_SHARES_WEIGHTS)
            entries[i].amount /= atom_mass(&entries[i]);
    }
    return good && sum > 0.0 && adds_up(t, sum);
}

/* Adds `atoms` [1] of a nuclide to the list. */
static size_t put(weighed *list, size_t count, const bh_constituent *part)
{
    for (size_t i = 0; i < count; i++) {
        if (list[i].part.z != part->z || list[i].part.a != part->a)
            continue;
        list[i].part.per_atom += part->per_atom;
        list[i].part.natural = list[i].part.natural && part->natural;
        return count;
    }
    list[count].part = *part;
    return count + 1;
}

/* Writes one line out in nuclides. */
static size_t write_out(weighed *list, size_t count, const entry *e)
{
    size_t n;
    const bh_nuclide *isotopes = bh_element_isotopes(e->z, &n);
    double all = 0.0;
    for (size_t i = 0; i < n; i++)
        all += isotopes[i].abundance;
    for (size_t i = 0; i < n; i++) {
        const bool named = isotopes[i].a == e->a;
        if (!named && (e->a != 0 || !(isotopes[i].abundance > 0.0)))
            continue;
        count = put(
            list, count,
            &(bh_constituent){.z = e->z,
                              .a = isotopes[i].a,
                              .mass = isotopes[i].mass,
                              .per_atom = e->amount * (named ? 1.0 : isotopes[i].abundance / all),
                              .natural = !named});
    }
    return count;
}

static int by_share(const void *one, const void *two)
{
    const weighed *a = one;
    const weighed *b = two;
    if (a->of_element != b->of_element)
        return a->of_element > b->of_element ? -1 : 1;
    if (a->part.z != b->part.z)
        return a->part.z < b->part.z ? -1 : 1;
    return (a->part.a > b->part.a) - (a->part.a < b->part.a);
}

/* Makes the shares add up to 1, sorts, and sums the mean mass. */
static void finish(weighed *list, size_t count, bh_composition *out)
{
    double sum = 0.0;
    for (size_t i = 0; i < count; i++)
        sum += list[i].part.per_atom;
    for (size_t i = 0; i < count; i++) {
        list[i].part.per_atom /= sum;
        for (size_t k = 0; k < count; k++)
            if (list[k].part.z == list[i].part.z)
                list[k].of_element += list[i].part.per_atom;
    }
    qsort(list, count, sizeof *list, by_share);
    for (size_t i = 0; i < count; i++) {
        const bh_nuclide *nuclide = bh_nuclide_find(list[i].part.z, list[i].part.a);
        out->parts[i] = list[i].part;
        out->mean_atomic_mass += list[i].part.per_atom * nuclide->atomic_mass;
    }
    out->count = count;
}

bh_code bh_composition_read(const bh_reading *reading, const bh_section *section,
                            const bh_shares *shares, bh_composition *out)
{
    const task t = {reading, section, shares};
    const size_t lines = shares->pairs->count;
    *out = (bh_composition){0};
    entry *entries = bh_arena_take(reading->arena, lines + 1, sizeof *entries);
    if (!entries)
        return BH_ENOMEM;
    if (lines == 0 || !read_entries(&t, entries))
        return BH_OK;
    size_t room = 0;
    for (size_t i = 0; i < lines; i++) {
        size_t n;
        (void)bh_element_isotopes(entries[i].z, &n);
        room += n;
    }
    weighed *list = bh_arena_take(reading->arena, room, sizeof *list);
    out->parts = bh_arena_take(reading->arena, room, sizeof *out->parts);
    if (!list || !out->parts)
        return BH_ENOMEM;
    size_t count = 0;
    for (size_t i = 0; i < lines; i++)
        count = write_out(list, count, &entries[i]);
    finish(list, count, out);
    return BH_OK;
}
