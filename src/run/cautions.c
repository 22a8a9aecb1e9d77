/* cautions.c - what a plan should make people think of before the beam is on. */
#include "beamhours/run/cautions.h"

#include <stdbool.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/base/text.h"
#include "beamhours/matter/hazard.h"
#include "beamhours/run/beam_power.h"
#include "beamhours/run/heat_cautions.h"
#include "beamhours/units/constants.h"

#define DECIDE          ", its rules and licensed practice decide."
#define DEFER_RADIATION " The facility's radiation-protection group" DECIDE
#define DEFER_TARGET    ". The facility's target group" DECIDE
#define DEFER_SAFETY    " The facility's safety and radiation-protection groups" DECIDE

/* At most: source or power, secondary beam, pressure, windows, magnets. */
enum { OTHER_CAUTIONS = 5 };

typedef struct {
    const bh_plan *plan;
    bh_arena *arena;
    bh_caution *list; /* room for one a layer and a target + OTHER_CAUTIONS */
    size_t count;
    bool failed; /* memory ran out */
} caution_list;

/* A place that layers stand in: a target's layers, its wall, an arm's exit. */
typedef struct {
    const char *before, *name, *after; /* the key in three pieces */
    const bh_layer *layers;
    size_t count;
} stack;

/* The text as a string of the arena; frees `text`. */
static const char *keep(caution_list *to, bh_text *text)
{
    char *copy = text->failed ? NULL : bh_arena_take(to->arena, text->length + 1, 1);
    if (copy && text->length > 0)
        memcpy(copy, text->bytes, text->length);
    to->failed = to->failed || !copy;
    bh_text_free(text);
    return copy;
}

/* Adds a caution; frees both texts. */
static void add(caution_list *to, bh_mark at, bh_text *key, bh_text *text)
{
    bh_caution *next = &to->list[to->count++];
    next->at = at;
    next->key = keep(to, key);
    next->text = keep(to, text);
}

/* The setting with the most powerful beam, or NULL: the plan's own. */
static const bh_setting *strongest(const bh_plan *plan)
{
    const bh_setting *best = NULL;
    for (size_t i = 0; i < plan->setting_count; i++)
        if (!best || bh_beam_power(&plan->settings[i].beam) > bh_beam_power(&best->beam))
            best = &plan->settings[i];
    return best;
}

/* Where the plan says how much beam there is. */
static bh_mark written_at(const bh_beam *beam)
{
    return beam->rate_written ? beam->particle_rate.at : beam->current.at;
}

/* "beam.current", or "settings.K4.beam.current" where a setting wrote its own. */
static bh_text beam_key(const bh_plan *plan, const bh_setting *setting, const char *member)
{
    bh_text key = {0};
    const bh_mark all = written_at(&plan->beam);
    const bh_mark own = setting ? written_at(&setting->beam) : all;
    if (own.line != all.line || own.column != all.column)
        bh_text_appendf(&key, "settings.%s.", setting->name);
    bh_text_appendf(&key, "beam.%s", member);
    return key;
}

/* Alphas or beta particles of few MeV and not many of them: hardly an accelerator's. */
static bool is_sealed_source(const bh_beam *beam)
{
    const bh_particle *p = &beam->particle;
    const double most = (p->z == 2 && p->a == 4)                    ? 10.0
                        : (p->z == 0 && p->mass < BH_MASS_MUON / 2) ? 4.0
                                                                    : 0.0; /* [MeV] */
    return beam->rate_written && beam->kinetic_energy.value <= most &&
           beam->particle_rate.value <= 1e9;
}

/* What a beam of this power does, in rising order of it. */
static const char *power_sentence(double watts)
{
    if (watts >= 1000.0)
        return ": it activates target, windows, air and dump, and melts in moments what it strikes "
               "when it strays.";
    if (watts >= 1.0)
        return ": it heats and activates what it strikes.";
    return ": little heat, but ionising radiation that may activate what it strikes.";
}

static void caution_of_beam(caution_list *to)
{
    const bh_setting *setting = strongest(to->plan);
    const bh_beam *beam = setting ? &setting->beam : &to->plan->beam;
    const double watts = bh_beam_power(beam);
    bh_text text = {0};
    if (is_sealed_source(beam)) {
        bh_text_appendf(&text,
                        "A radioactive source, as for so few %s particles of so few MeV: it "
                        "needs a licence and leak tests, and nobody may touch its thin cover.",
                        beam->particle.name);
    } else {
        bh_text_append(&text, "Beam of up to ");
        bh_power_append(&text, watts);
        bh_text_append(&text, power_sentence(watts));
    }
    bh_text_append(&text, DEFER_RADIATION);
    bh_text key = beam_key(to->plan, setting, beam->rate_written ? "particle_rate" : "current");
    add(to, written_at(beam), &key, &text);
}

/* Muons and pions are made by another beam, which the plan does not know. */
static bool is_secondary(const bh_beam *beam)
{
    return beam->particle.z == 0 && beam->particle.mass > BH_MASS_MUON / 2;
}

static void caution_of_secondary_beam(caution_list *to)
{
    const bh_beam *beam = is_secondary(&to->plan->beam) ? &to->plan->beam : NULL;
    for (size_t i = 0; i < to->plan->setting_count && !beam; i++)
        if (is_secondary(&to->plan->settings[i].beam))
            beam = &to->plan->settings[i].beam;
    if (!beam)
        return;
    bh_text text = {0};
    bh_text_appendf(&text,
                    "A beam of %s is a secondary one: the primary beam and its production target "
                    "are not in this plan, nor in its power." DEFER_RADIATION,
                    beam->particle.name);
    bh_text key = {0};
    bh_text_append(&key, "beam.particle");
    add(to, beam->at, &key, &text);
}

/* Whether the plan has `target:` rather than a list of them. */
static bool is_only_target(const bh_plan *plan)
{
    return plan->document && bh_node_get(bh_document_root(plan->document), "target");
}

/* The stacks of a plan one after the other; false past the last. */
static bool stack_at(const bh_plan *plan, size_t i, stack *out)
{
    if (i < 2 * plan->target_count) {
        const bh_target *target = &plan->targets[i / 2];
        const bool wall = i % 2 == 1;
        const bool only = is_only_target(plan);
        *out = (stack){only ? "target" : "targets.", only ? "" : target->name.text,
                       wall ? ".wall" : ".layers", wall ? &target->wall : target->layers,
                       wall ? (target->has_wall ? 1 : 0) : target->layer_count};
        return true;
    }
    i -= 2 * plan->target_count;
    if (i >= plan->arm_count)
        return false;
    *out = (stack){"arms.", plan->arms[i].name.text, ".exit", plan->arms[i].exit,
                   plan->arms[i].exit_count};
    return true;
}

static bh_text stack_key(const stack *from)
{
    bh_text key = {0};
    bh_text_appendf(&key, "%s%s%s", from->before, from->name ? from->name : "", from->after);
    return key;
}

/* A caution for each set of hazards: the materials that have it, and where the first stands. */
typedef struct {
    unsigned hazards;
    bh_text names, key;
    const bh_layer *first;
} mention;

/* Whether the list "aluminium, lead-208" has exactly this name in it. */
static bool is_in_list(const bh_text *list, const char *name)
{
    const size_t length = strlen(name);
    for (const char *p = list->bytes; p; p = strchr(p, ',')) {
        p += strspn(p, ", ");
        if (strncmp(p, name, length) == 0 && (p[length] == '\0' || p[length] == ','))
            return true;
    }
    return false;
}

static void mention_layer(mention *m, const stack *from, const bh_layer *layer)
{
    const bh_material *material = layer->material;
    if (!material || bh_material_hazards(material) != m->hazards ||
        is_in_list(&m->names, material->name))
        return;
    if (m->names.length == 0) {
        m->key = stack_key(from);
        m->first = layer;
    } else {
        bh_text_append(&m->names, ", ");
    }
    bh_text_append(&m->names, material->name);
}

/* All of one set of hazards in one caution, "lead, lead-208: toxic; radioactive.", where `layer` is
 * the first that has them. */
static void caution_of_hazards(caution_list *to, const bh_layer *layer)
{
    mention m = {.hazards = layer->material ? bh_material_hazards(layer->material) : 0};
    stack from;
    for (size_t i = 0; m.hazards && stack_at(to->plan, i, &from); i++)
        for (size_t l = 0; l < from.count; l++)
            mention_layer(&m, &from, &from.layers[l]);
    if (m.first != layer) {
        bh_text_free(&m.names);
        bh_text_free(&m.key);
        return;
    }
    const char *lead = ": ";
    for (unsigned h = 0; h < BH_HAZARD_COUNT; h++)
        if (m.hazards & (1U << h)) {
            bh_text_appendf(&m.names, "%s%s", lead, bh_hazard_meaning((bh_hazard)h));
            lead = "; ";
        }
    bh_text_append(&m.names, "." DEFER_SAFETY);
    add(to, layer->at, &m.key, &m.names);
}

static void caution_of_materials(caution_list *to)
{
    stack from;
    for (size_t i = 0; stack_at(to->plan, i, &from); i++)
        for (size_t l = 0; l < from.count; l++)
            caution_of_hazards(to, &from.layers[l]);
}

static size_t count_layers(const bh_plan *plan)
{
    size_t count = 0;
    stack from;
    for (size_t i = 0; stack_at(plan, i, &from); i++)
        count += from.count;
    return count;
}

static const double atmosphere = 101325.0; /* [Pa] */
static const double thin_window = 0.1;     /* [cm] thinner ones can burst */

/* [Pa] of the gas in a layer, stated or the material's; 0 when it is no gas. */
static double gas_pressure(const bh_layer *layer)
{
    if (!layer->material || layer->material->state != BH_STATE_GAS)
        return 0;
    return layer->pressure.given ? layer->pressure.value : layer->material->pressure;
}

/* The layer of the highest pressure above `least` [Pa], or NULL; sets the stack it is in. */
static const bh_layer *highest_pressure(const bh_plan *plan, double least, stack *of)
{
    const bh_layer *highest = NULL;
    stack from;
    for (size_t i = 0; stack_at(plan, i, &from); i++)
        for (size_t l = 0; l < from.count; l++) {
            if (!(gas_pressure(&from.layers[l]) > least))
                continue;
            least = gas_pressure(&from.layers[l]);
            highest = &from.layers[l];
            *of = from;
        }
    return highest;
}

static void caution_of_pressure(caution_list *to)
{
    stack of;
    const bh_layer *layer = highest_pressure(to->plan, 1.2 * atmosphere, &of);
    if (!layer)
        return;
    char bar[BH_NUMBER_SIZE];
    bh_number_digits(gas_pressure(layer) / 1e5, 3, bar, sizeof bar);
    bh_text text = {0};
    bh_text_appendf(
        &text, "%s at %s bar is a pressure vessel: if it bursts it throws fragments." DEFER_SAFETY,
        layer->material->name, bar);
    bh_text key = stack_key(&of);
    add(to, layer->pressure.given ? layer->pressure.at : layer->at, &key, &text);
}

/* A thin solid layer that holds a gas or liquid, or ends a vacuum before air. */
static bool is_thin_window(const stack *of, size_t l)
{
    const bh_layer *layer = &of->layers[l];
    if (!layer->material || layer->material->state != BH_STATE_SOLID ||
        !(layer->thickness.value < thin_window))
        return false;
    for (size_t k = l == 0 ? 0 : l - 1; k <= l + 1 && k < of->count; k++)
        if (of->layers[k].material && (of->layers[k].material->state == BH_STATE_GAS ||
                                       of->layers[k].material->state == BH_STATE_LIQUID))
            return true;
    return false;
}

static void caution_of_windows(caution_list *to)
{
    stack from;
    for (size_t i = 0; stack_at(to->plan, i, &from); i++)
        for (size_t l = 0; l < from.count; l++) {
            if (!is_thin_window(&from, l))
                continue;
            bh_text text = {0};
            bh_text_appendf(&text,
                            "Thin windows such as this one of %s break without warning: the bang "
                            "harms ears, the fragments eyes." DEFER_SAFETY,
                            from.layers[l].material->name);
            bh_text key = stack_key(&from);
            add(to, from.layers[l].at, &key, &text);
            return;
        }
}

/* What shows that an arm measures momentum, or NULL. */
static const bh_mark *magnet_of(const bh_arm *arm)
{
    if (arm->momentum_bite.given)
        return &arm->momentum_bite.at;
    if (arm->momentum_range.given)
        return &arm->momentum_range.at;
    return arm->momentum_resolution.given ? &arm->momentum_resolution.at : NULL;
}

static void caution_of_magnets(caution_list *to)
{
    for (size_t i = 0; i < to->plan->arm_count; i++) {
        const bh_arm *arm = &to->plan->arms[i];
        const bh_mark *at = magnet_of(arm);
        if (!at)
            continue;
        const char *name = arm->name.text ? arm->name.text : "";
        bh_text text = {0};
        bh_text_appendf(&text,
                        "Arm %s has magnets: stray fields pull tools and disturb pacemakers, and "
                        "coils carry large currents." DEFER_SAFETY,
                        name);
        bh_text key = {0};
        bh_text_appendf(&key, "arms.%s", name);
        add(to, *at, &key, &text);
        return; /* one is enough */
    }
}

static void caution_of_heat(caution_list *to)
{
    stack from;
    for (size_t i = 0; i < to->plan->target_count && stack_at(to->plan, 2 * i, &from); i++) {
        const bh_setting *setting = bh_heat_setting(to->plan, &to->plan->targets[i]);
        bh_text text = {0};
        if (setting && bh_heat_say(setting, &text)) {
            bh_text key = stack_key(&from);
            bh_text_append(&text, DEFER_TARGET);
            add(to, from.layers[0].at, &key, &text);
        }
    }
}

const bh_caution *bh_cautions_from_plan(const bh_plan *plan, bh_arena *arena, size_t *count)
{
    *count = 0;
    caution_list to = {.plan = plan, .arena = arena};
    to.list = bh_arena_take(arena, count_layers(plan) + plan->target_count + OTHER_CAUTIONS,
                            sizeof *to.list);
    if (!to.list)
        return NULL;
    caution_of_beam(&to);
    caution_of_heat(&to);
    caution_of_secondary_beam(&to);
    caution_of_materials(&to);
    caution_of_pressure(&to);
    caution_of_windows(&to);
    caution_of_magnets(&to);
    if (to.failed)
        return NULL;
    *count = to.count;
    return to.list;
}
