/* systematic.c - what the rates of one arm are uncertain by. */
#include "beamhours/run/systematic.h"

#include <math.h>
#include <string.h>

#include "beamhours/physics/validity.h"
#include "beamhours/run/collecting.h"
#include "beamhours/run/pair.h"

enum { FIRST_ROOM = 32 };

/* What is subtracted over the signal. */
static const double worth_subtracting = 1e-4;

static bh_code out_of_memory(bh_error *err)
{
    return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
}

/* Most parts of an arm, layers of a target, nuclides and presences of a target. */
struct most {
    size_t parts, layers, nuclides, presences;
};

static size_t larger(size_t a, size_t b)
{
    return a > b ? a : b;
}

static struct most most_of(const bh_yielder *yielder)
{
    const bh_plan *plan = yielder->plan;
    struct most most = {.parts = 1};
    for (size_t s = 0; s < plan->setting_count; s++)
        for (size_t a = 0; a < plan->settings[s].arm_count; a++)
            most.parts = larger(most.parts, 1 + (size_t)plan->settings[s].arms[a].arm.bins);
    for (size_t t = 0; t < plan->target_count; t++) {
        most.layers = larger(most.layers, plan->targets[t].layer_count);
        most.nuclides = larger(most.nuclides, yielder->lists[t].count);
        most.presences = larger(most.presences, yielder->lists[t].presence_count);
    }
    return most;
}

bh_code bh_systematics_prepare(bh_systematics *systematics, bh_yielder *yielder, bh_arena *arena,
                               bh_causes *causes, bh_error *err)
{
    const struct most most = most_of(yielder);
    *systematics = (bh_systematics){
        .yielder = yielder,
        .most_parts = most.parts,
        .arena = arena,
        .causes = causes ? causes : bh_causes_new(arena),
        .contributions = bh_arena_take(arena, most.presences + 1, sizeof(bh_contribution)),
        .parts = bh_arena_take(arena, most.parts, sizeof(bh_part)),
        .shares = bh_arena_take(arena, most.layers + most.nuclides + 1, sizeof(bh_share))};
    bool made = systematics->causes && systematics->contributions && systematics->parts &&
                systematics->shares;
    for (int i = 0; i < 2; i++) {
        systematics->signals[i] = bh_arena_take(arena, most.parts, sizeof(double));
        systematics->paths[i] = bh_arena_take(arena, most.layers + 1, sizeof(double));
        systematics->pair_parts[i] = bh_arena_take(arena, most.parts, sizeof(bh_part));
        made =
            made && systematics->signals[i] && systematics->paths[i] && systematics->pair_parts[i];
    }
    return made ? BH_OK : out_of_memory(err);
}

/* --- collecting --- */

void bh_collect_fail(bh_collecting *c, bh_code code)
{
    if (!c->code)
        c->code = code;
}

/* Room for one more; kept for the next arm. */
static bool grow(const bh_collecting *c)
{
    bh_systematics *with = c->with;
    if (c->count < with->room)
        return true;
    const size_t room = with->room ? 2 * with->room : FIRST_ROOM;
    unsigned *cause = bh_arena_take(with->arena, room, sizeof *cause);
    double *effect = bh_arena_take(with->arena, room * with->most_parts, sizeof *effect);
    if (!cause || !effect)
        return false;
    if (c->count) {
        memcpy(cause, with->cause, c->count * sizeof *cause);
        memcpy(effect, with->effect, c->count * c->parts * sizeof *effect);
    }
    with->cause = cause;
    with->effect = effect;
    with->room = room;
    return true;
}

double *bh_collect(bh_collecting *c, const bh_cause *cause, double missing)
{
    unsigned number;
    if (c->code)
        return NULL;
    c->code = bh_causes_number(c->with->causes, cause, &number, c->err);
    if (c->code)
        return NULL;
    for (size_t i = 0; i < c->count; i++)
        if (c->with->cause[i] == number)
            return c->with->effect + i * c->parts;
    if (!grow(c)) {
        c->code = out_of_memory(c->err);
        return NULL;
    }
    double *effect = c->with->effect + c->count * c->parts;
    for (size_t i = 0; i < c->parts; i++)
        effect[i] = missing;
    c->with->cause[c->count++] = number;
    return effect;
}

void bh_collect_same(bh_collecting *c, const bh_cause *cause, double effect)
{
    if (!isfinite(effect) || !(fabs(effect) > 0))
        return;
    double *to = bh_collect(c, cause, 0);
    for (size_t i = 0; to && i < c->parts; i++)
        to[i] += effect;
}

static bh_code make_yield(bh_collecting *c, const bh_setting *setting, const bh_setting_arm *arm,
                          bh_yield *yield)
{
    bh_code code = bh_view_make(c->yielder, setting, arm, &yield->view, c->err);
    yield->view.parts = 1 + arm->arm.bins;
    return code ? code : bh_yield_make(c->yielder, yield, c->err);
}

/* A coincidence whose first arm is as `arm` has it. */
static bh_code make_pair(bh_collecting *c, const bh_setting *setting, const bh_setting_arm *arm,
                         bh_yield *yield)
{
    bh_setting_arm first = *arm;
    first.first = first.second = NULL;
    bh_yield one = {.part = c->with->pair_parts[0]}, other = {.part = c->with->pair_parts[1]};
    const bh_arm_pair pair = {.arm = arm, .one = &one, .other = &other};
    bh_code code = make_yield(c, setting, &first, &one);
    if (!code)
        code = make_yield(c, setting, arm->second, &other);
    one.view.parts = (int)c->parts;
    return code ? code : bh_pair_make(c->yielder, &pair, yield, c->err);
}

void bh_collect_signals(bh_collecting *c, const bh_setting *setting, const bh_setting_arm *arm,
                        double *signal)
{
    bh_remarks *remarks = c->yielder->remarks;
    const bool without_changes = c->yielder->without_changes;
    bh_yield yield = {.part = c->with->parts};
    c->yielder->remarks = NULL;
    c->yielder->without_changes = true;
    bh_code code = BH_OK;
    if (arm->first) {
        code = make_pair(c, setting, arm, &yield);
    } else {
        code = bh_view_make(c->yielder, setting, arm, &yield.view, c->err);
        yield.view.parts = (int)c->parts;
        if (!code)
            code = bh_yield_make(c->yielder, &yield, c->err);
    }
    c->yielder->remarks = remarks;
    c->yielder->without_changes = without_changes;
    bh_collect_fail(c, code);
    for (size_t i = 0; i < c->parts; i++)
        signal[i] = code ? (double)NAN : yield.part[i].signal;
}

/* Turns rates into shares of their sum. */
static void normalise(bh_share *list, size_t count)
{
    bh_share sum = {.signal = 0};
    for (size_t i = 0; i < count; i++) {
        sum.signal += list[i].signal;
        sum.windows += list[i].windows;
        sum.other += list[i].other;
        sum.beside[0] += list[i].beside[0];
        sum.beside[1] += list[i].beside[1];
    }
    for (size_t i = 0; i < count; i++) {
        list[i].signal = sum.signal > 0 ? list[i].signal / sum.signal : 0;
        list[i].windows = sum.windows > 0 ? list[i].windows / sum.windows : 0;
        list[i].other = sum.other > 0 ? list[i].other / sum.other : 0;
        for (int k = 0; k < 2; k++)
            list[i].beside[k] = sum.beside[k] > 0 ? list[i].beside[k] / sum.beside[k] : 0;
    }
}

static void add_rate(bh_share *to, bh_origin origin, double rate)
{
    if (origin == BH_ORIGIN_SIGNAL)
        to->signal += rate;
    else if (origin == BH_ORIGIN_WINDOW)
        to->windows += rate;
    else
        to->other += rate;
}

/* Whether the shares follow from numbers of nuclei: one layer of scatterers, of one element, and
 * nothing to speak of that is subtracted as computed. */
static bool is_simple(const bh_collecting *c)
{
    const bh_part *whole = c->arm->yield->part;
    const bh_struck_list *list = c->arm->yield->view.list;
    const double windows = c->arm->empty.measured ? 0 : whole->windows;
    const bh_presence *first = NULL;
    for (size_t i = 0; i < list->presence_count; i++) {
        const bh_presence *p = &list->presences[i];
        if (p->origin != BH_ORIGIN_SIGNAL)
            continue;
        if (first && first->layer != p->layer)
            return false;
        first = p;
    }
    return !(windows + whole->other > worth_subtracting * whole->signal);
}

static void set_shares(bh_collecting *c)
{
    const bh_struck_list *list = c->arm->yield->view.list;
    const size_t layers = c->setting->target->layer_count;
    const bh_contribution *all = c->with->contributions;
    const bool simple = is_simple(c);
    c->layers = c->with->shares;
    c->nuclides = c->layers + layers;
    memset(c->layers, 0, (layers + list->count) * sizeof *c->layers);
    if (!simple) /* sums over each layer alone take their time */
        bh_collect_fail(c, bh_yield_contributions(c->yielder, c->arm->yield, 0,
                                                  c->with->contributions, c->err));
    for (size_t i = 0; !c->code && i < list->presence_count; i++) {
        const bh_presence *p = &list->presences[i];
        add_rate(&c->layers[p->layer], p->origin, simple ? p->number : all[i].rate);
        add_rate(&c->nuclides[p->nuclide], p->origin, simple ? p->number : all[i].rate);
    }
    if (!simple)
        bh_collect_beside(c);
    normalise(c->layers, layers);
    normalise(c->nuclides, list->count);
}

/* From cause by cause to part by part. */
static bh_code hand_over(const bh_collecting *c, bh_effects *out)
{
    unsigned *cause = bh_arena_take(c->with->arena, c->count + 1, sizeof *cause);
    double *effect = bh_arena_take(c->with->arena, c->count * c->parts + 1, sizeof *effect);
    if (!cause || !effect)
        return out_of_memory(c->err);
    for (size_t i = 0; i < c->count; i++) {
        cause[i] = c->with->cause[i];
        for (size_t p = 0; p < c->parts; p++)
            effect[p * c->count + i] = c->with->effect[i * c->parts + p];
    }
    for (size_t p = 0; p < c->parts; p++)
        out[p] = (bh_effects){.count = c->count, .cause = cause, .effect = effect + p * c->count};
    return BH_OK;
}

bool bh_systematic_known(const bh_view *view, double q2)
{
    return !(bh_validity_excess(&view->line.encounter, q2 * 1e6) > BH_NUCLEAR_RULES);
}

bh_code bh_systematic_arm(bh_systematics *systematics, const bh_arm_hours *arm, size_t parts,
                          bh_effects *out, bh_error *err)
{
    bh_collecting c = {.with = systematics,
                       .yielder = systematics->yielder,
                       .arm = arm,
                       .setting = arm->yield->view.setting,
                       .plan = arm->yield->view.arm,
                       .parts = parts,
                       .err = err};
    set_shares(&c);
    bh_collect_beam(&c);
    bh_collect_target(&c);
    bh_collect_arm(&c);
    bh_collect_readout(&c);
    bh_collect_models(&c);
    bh_collect_beside_models(&c);
    return c.code ? c.code : hand_over(&c, out);
}
