/* targets.c - targets: layers, scatterer, what stands in for the empty one. */
#include <stdio.h>
#include <string.h>

#include "beamhours/base/sentences.h"
#include "beamhours/plan/making.h"
#include "beamhours/units/nuclide.h"

/* --- what the samples hold --- */

static void add_amount(bh_amount *list, size_t *n, const bh_constituent *part, double atoms)
{
    size_t i = 0;
    while (i < *n && (list[i].z != part->z || list[i].a != part->a))
        i++;
    if (i == BH_MOST_AMOUNTS)
        return;
    if (i == *n)
        list[(*n)++] = (bh_amount){.z = part->z, .a = part->a, .mass = part->mass};
    list[i].amount += atoms * part->per_atom;
}

size_t bh_sample_nuclides(const bh_target *target, bh_amount out[BH_MOST_AMOUNTS])
{
    size_t n = 0;
    for (size_t l = 0; l < target->layer_count; l++) {
        const bh_layer *layer = &target->layers[l];
        if (layer->role != BH_ROLE_SAMPLE || !layer->material)
            continue;
        for (size_t i = 0; i < layer->material->count; i++)
            add_amount(out, &n, &layer->material->parts[i], layer->areal_number.value);
    }
    return n;
}

bool bh_main_nuclide(const bh_target *target, bh_constituent *out)
{
    bh_amount held[BH_MOST_AMOUNTS];
    const size_t n = bh_sample_nuclides(target, held);
    const bh_amount *best = NULL;
    for (size_t i = 0; i < n; i++) {
        const bool counts = held[i].z == target->scatterer_z &&
                            (target->scatterer_a == 0 || held[i].a == target->scatterer_a);
        if (counts && (!best || held[i].amount > best->amount))
            best = &held[i];
    }
    if (best)
        *out = (bh_constituent){.z = best->z, .a = best->a, .mass = best->mass};
    return best != NULL;
}

/* Symbols of the elements in `held`, each once, cut to ELEMENTS_SIZE; returns how many. */
enum { ELEMENTS_SIZE = 100 };
static size_t elements(const bh_amount *held, size_t n, char out[ELEMENTS_SIZE])
{
    size_t count = 0, used = 0;
    out[0] = '\0';
    for (size_t i = 0; i < n; i++) {
        size_t j = 0;
        while (j < i && held[j].z != held[i].z)
            j++;
        if (j < i || used >= ELEMENTS_SIZE)
            continue;
        used += (size_t)snprintf(out + used, ELEMENTS_SIZE - used, "%s%s", count ? ", " : "",
                                 bh_element_symbol(held[i].z));
        count++;
    }
    return count;
}

static bool holds(const bh_amount *held, size_t n, int z, int a)
{
    for (size_t i = 0; i < n; i++)
        if (held[i].z == z && (a == 0 || held[i].a == a))
            return true;
    return false;
}

/* --- scatterer --- */

static bh_code default_scatterer(const bh_making *making, const bh_raw_target *raw,
                                 bh_target *target, const bh_amount *held)
{
    char name[8];
    const size_t size = sizeof name;
    target->scatterer_z = held[0].z;
    target->scatterer_a = 0;
    char *text = bh_arena_take(making->reading.arena, 1, size);
    if (!text)
        return BH_ENOMEM;
    memcpy(text, bh_nuclide_name(held[0].z, 0, name), size);
    target->scatterer = (bh_word){.text = text, .at = raw->section.at};
    return BH_OK;
}

static void named_scatterer(const bh_making *making, const bh_raw_target *raw, bh_target *target,
                            const bh_amount *held, size_t n)
{
    const bh_word *word = &raw->scatterer;
    char all[ELEMENTS_SIZE];
    int z, a;
    elements(held, n, all);
    target->scatterer = *word;
    if (!word->text)
        return;
    if (!bh_nuclide_parse(word->text, &z, &a)) {
        bh_tell_no_nuclide(making, word, &raw->section, "scatterer", n > 0 ? held[0].z : 0);
        return;
    }
    if (n > 0 && !holds(held, n, z, a))
        bh_tell(making, word->at, &raw->section, "scatterer", BH_SAY_NOT_IN_SAMPLE, word->text,
                target->name.text, all);
    target->scatterer_z = z;
    target->scatterer_a = a;
}

/* Whether there is a sample, and all its materials are known. */
static bool sample_known(const bh_target *target, bool *any)
{
    bool known = true;
    *any = false;
    for (size_t i = 0; i < target->layer_count; i++) {
        const bh_layer *layer = &target->layers[i];
        if (layer->role != BH_ROLE_SAMPLE)
            continue;
        known = known && layer->material;
        *any = *any || !layer->material || layer->material->count > 0;
    }
    return known;
}

static bh_code set_scatterer(const bh_making *making, const bh_raw_target *raw, bh_target *target)
{
    bh_amount held[BH_MOST_AMOUNTS];
    bool any;
    const bool known = sample_known(target, &any);
    const size_t n = known ? bh_sample_nuclides(target, held) : 0;
    if (!any && target->layer_count > 0) {
        bh_tell(making, raw->layers.at, &raw->section, "layers", BH_SAY_NO_SAMPLE,
                target->name.text);
        return BH_OK;
    }
    if (raw->scatterer.given) {
        named_scatterer(making, raw, target, held, n);
        return BH_OK;
    }
    if (n == 0)
        return BH_OK;
    char all[ELEMENTS_SIZE];
    if (elements(held, n, all) == 1)
        return default_scatterer(making, raw, target, held);
    bh_tell(making, raw->section.at, &raw->section, "scatterer", BH_SAY_WHICH_SCATTERER,
            target->name.text, all);
    return BH_OK;
}

/* --- the empty target --- */

static void set_empty(bh_making *making, const bh_raw_target *raw, bh_target *target)
{
    const bh_raw_empty *empty = &raw->empty_target;
    target->empty_at = empty->section.at;
    if (!empty->section.given)
        return;
    target->empty = empty->share.word.given ? BH_EMPTY_BEST : BH_EMPTY_SHARE;
    target->empty_share = empty->share.value;
    if (!empty->use.text)
        return;
    const size_t n = making->plan.target_count;
    const char **names = bh_arena_take(making->reading.arena, n + 1, sizeof *names);
    if (!names) {
        bh_diags_lose(making->reading.diags);
        return;
    }
    for (size_t i = 0; i < n; i++) {
        names[i] = making->targets[i].name.text;
        if (names[i] && strcmp(names[i], empty->use.text) == 0)
            target->empty_use = &making->targets[i];
    }
    const bh_unfound unfound = {&empty->section, "use", &empty->use, names, n};
    if (!target->empty_use)
        bh_tell_no_target(making, &unfound);
    else if (target->empty_use == target)
        bh_tell(making, empty->use.at, &empty->section, "use", BH_SAY_DUMMY_ITSELF,
                empty->use.text);
}

/* --- one target --- */

static bh_code set_wall(const bh_making *making, const bh_raw_wall *raw, bh_target *target)
{
    if (!raw->section.given)
        return BH_OK;
    bh_raw_layer layer = {
        .section = raw->section, .material = raw->material, .thickness = raw->thickness};
    const bh_list list = {.count = 1, .items = &layer};
    bh_layer *made;
    size_t count;
    /* The wall complains itself about what it lacks. */
    layer.thickness.given = true;
    if (bh_make_layers(making, &list, &made, &count))
        return BH_ENOMEM;
    target->has_wall = true;
    target->wall_radius = raw->radius;
    target->wall = made[0];
    target->wall.role = BH_ROLE_WINDOW;
    return BH_OK;
}

/* Where there is one target its sample's material names it. */
static void set_name(const bh_making *making, const bh_raw_target *raw, bh_target *target)
{
    target->name = raw->name;
    if (raw->name.given)
        return;
    if (making->plan.target_count > 1)
        bh_tell(making, raw->section.at, &raw->section, "name", BH_SAY_MISSING_KEY,
                bh_schema_target.name, "name", "hydrogen");
    target->name.text = NULL;
    for (size_t i = 0; i < target->layer_count && !target->name.text; i++)
        if (target->layers[i].material && target->layers[i].role == BH_ROLE_SAMPLE)
            target->name.text = target->layers[i].material->name;
    if (!target->name.text && target->layer_count && target->layers[0].material)
        target->name.text = target->layers[0].material->name; /* no sample: an error of its own */
}

static bh_code make_target(bh_making *making, const bh_raw_target *raw, bh_target *target)
{
    bh_layer *layers;
    *target = (bh_target){.tilt = raw->tilt, .at = raw->section.at};
    if (bh_make_layers(making, &raw->layers, &layers, &target->layer_count))
        return BH_ENOMEM;
    target->layers = layers;
    set_name(making, raw, target);
    if (!target->name.text)
        target->name.text = "target"; /* unreadable: the reader has said so */
    const bh_code code = set_wall(making, &raw->wall, target);
    return code ? code : set_scatterer(making, raw, target);
}

bh_code bh_make_targets(bh_making *making)
{
    const bool alone = making->raw.target.section.given;
    const bh_raw_target *raw = alone ? &making->raw.target : making->raw.targets.items;
    const size_t n = alone ? 1 : making->raw.targets.count;
    making->targets = bh_arena_take(making->reading.arena, n + 1, sizeof *making->targets);
    if (!making->targets)
        return BH_ENOMEM;
    making->plan.targets = making->targets;
    making->plan.target_count = n;
    for (size_t i = 0; i < n; i++)
        if (make_target(making, &raw[i], &making->targets[i]))
            return BH_ENOMEM;
    for (size_t i = 0; i < n; i++)
        set_empty(making, &raw[i], &making->targets[i]);
    return BH_OK;
}
