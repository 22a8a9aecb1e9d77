/* findings.c - what the numbers of an arm rest on, as warnings. */
#include <math.h>
#include <stdio.h>

#include "beamhours/base/sentences.h"
#include "beamhours/physics/validity.h"
#include "beamhours/run/yield.h"
#include "beamhours/units/constants.h"
#include "beamhours/units/nuclide.h"

enum { HEAVY = 20 }; /* plane waves on more protons are worth a warning */

/* A nuclide counts from this share of what the arm gets, and a form factor from this deviation. */
static const double worth_saying = 0.02, worth_having = 0.03;

struct finding {
    bh_yielder *yielder;
    const bh_yield *yield;
    const bh_channel *channel;
    char nuclide[8];
};

static void note(const struct finding *f, bh_remark remark)
{
    remark.setting = f->yield->view.setting->name;
    if (!remark.who)
        remark.who = f->nuclide;
    bh_remarks_note(f->yielder->remarks, &remark);
}

/* The momentum transfers squared between the edges of the arm [GeV2]. */
static bool reached(const struct finding *f, double *low, double *high)
{
    const bh_interval polar = f->yield->view.acceptance.whole.polar;
    const double largest = bh_channel_largest_angle(f->channel);
    const double ends[] = {polar.from, polar.to};
    *low = (double)INFINITY;
    *high = 0;
    for (int i = 0; i < 2; i++) {
        bh_event event;
        if (!bh_channel_has(f->channel, fmin(ends[i], largest), &event))
            return false;
        *low = fmin(*low, event.q2 * 1e-6);
        *high = fmax(*high, event.q2 * 1e-6);
    }
    return true;
}

/* At small momentum transfer every model gives Z: there its range does not matter. */
static bool matters(const bh_encounter *e, double q2)
{
    double ge2, gm2;
    const double mev2 = q2 * 1e6;
    bh_structure_eval(e->structure, 1, &mev2, &ge2, &gm2);
    return fabs(ge2 / ((double)e->z * e->z) - 1) > worth_having;
}

static void find_range(const struct finding *f)
{
    const bh_encounter *e = &f->channel->encounter;
    double from, to, low, high;
    bh_structure_range(e->structure, &from, &to);
    if (!reached(f, &low, &high))
        return;
    if (high > to || (low < from && matters(e, low)))
        note(f, (bh_remark){.kind = BH_REMARK_RANGE,
                            .at = f->yielder->plan->models.structure.at,
                            .key = "models.structure",
                            .what = bh_structure_name(e->structure),
                            .low = low,
                            .high = high,
                            .from = from,
                            .to = to});
}

static void find_structure(const struct finding *f)
{
    const bh_encounter *e = &f->channel->encounter;
    const bh_plan *plan = f->yielder->plan;
    find_range(f);
    if (bh_structure_flagged(e->structure))
        note(f, (bh_remark){.kind = BH_REMARK_FLAGGED,
                            .at = plan->models.structure.at,
                            .key = "models.structure",
                            .what = bh_structure_note(e->structure)});
    if (e->beam->kind == BH_KIND_LEPTON && e->z > HEAVY)
        note(f, (bh_remark){.kind = BH_REMARK_COULOMB,
                            .at = plan->models.coulomb.at,
                            .key = "models.coulomb",
                            .who = bh_element_symbol(e->z),
                            .high = e->z * BH_ALPHA});
}

static void find_caveat(const struct finding *f)
{
    char text[512];
    if (f->channel->process->caveat &&
        f->channel->process->caveat(&f->channel->encounter, text, sizeof text) > 0)
        note(f, (bh_remark){.kind = BH_REMARK_CAVEAT,
                            .at = f->yield->view.setting->process.at,
                            .key = "models.process",
                            .what = text});
}

static void find_reactions(const struct finding *f)
{
    if (bh_validity_reacts(&f->channel->encounter))
        note(f, (bh_remark){.kind = BH_REMARK_NOT_COMPUTED,
                            .at = f->yield->view.setting->process.at,
                            .key = "models.process",
                            .what = BH_WARN_REACTIONS});
}

static void find_in_arm(bh_yielder *yielder, const bh_yield *yield, double signal)
{
    const bh_setting *setting = yield->view.setting;
    const bh_setting_arm *arm = yield->view.arm;
    const bh_remark here = {.at = arm->at,
                            .key = "settings",
                            .setting = setting->name,
                            .who = arm->arm.name.text,
                            .what = setting->target->scatterer.text};
    bh_remark said = here;
    said.kind = BH_REMARK_NOT_CONVERGED;
    if (!yield->converged)
        bh_remarks_note(yielder->remarks, &said);
    said.kind = yield->view.stuck ? BH_REMARK_STAYS_INSIDE : BH_REMARK_NO_SIGNAL;
    if (yield->view.stuck || !(signal > 0))
        bh_remarks_note(yielder->remarks, &said);
}

static const char *layer_name(const bh_target *target, size_t layer, char *out, size_t size)
{
    const bh_layer *l = &target->layers[layer];
    snprintf(out, size, "layer %zu (%s)", layer + 1, l->material->name);
    return out;
}

static void find_stop(bh_yielder *yielder, const bh_view *view)
{
    const bh_target *target = view->setting->target;
    const size_t layer = view->way.stops;
    char what[96];
    bh_remark r = {.kind = view->blocked ? BH_REMARK_BEAM_STOPS : BH_REMARK_STOPS_BEHIND,
                   .key = "layers",
                   .who = target->name.text,
                   .setting = view->setting->name};
    if (layer == target->layer_count)
        return;
    r.at = target->layers[layer].at;
    r.what = layer_name(target, layer, what, sizeof what);
    bh_remarks_note(yielder->remarks, &r);
}

/* Where energy loss cannot be computed. */
static void find_unslowed(bh_yielder *yielder, const bh_view *view)
{
    const bh_way *way = &view->way;
    if (way->unslowed == way->sheet_count)
        return;
    const bh_target *target = view->setting->target;
    bh_remarks_note(yielder->remarks, &(bh_remark){.kind = BH_REMARK_NOT_SLOWED,
                                                   .at = target->layers[way->unslowed].at,
                                                   .key = "layers",
                                                   .who = target->name.text,
                                                   .what = way->why.text,
                                                   .setting = view->setting->name});
}

/* From this current a liquid's density is worth a thought. */
static void find_liquid(bh_yielder *yielder, const bh_view *view)
{
    static const double some = 5e-6; /* [A] */
    const bh_setting *setting = view->setting;
    const double current = setting->beam.current.value;
    for (size_t l = 0; l < setting->target->layer_count; l++) {
        const bh_layer *layer = &setting->target->layers[l];
        if (layer->material->state != BH_STATE_LIQUID || layer->density_loss.given ||
            !(current > some))
            continue;
        bh_remarks_note(yielder->remarks, &(bh_remark){.kind = BH_REMARK_LIQUID,
                                                       .at = layer->at,
                                                       .key = "layers",
                                                       .who = setting->target->name.text,
                                                       .what = layer->material->name,
                                                       .setting = setting->name,
                                                       .low = current * 1e6,
                                                       .high = current * 1e6});
    }
}

static void find_passage(bh_yielder *yielder, const bh_view *view)
{
    find_liquid(yielder, view);
    if (!view->way.losing)
        return;
    find_stop(yielder, view);
    find_unslowed(yielder, view);
}

bh_code bh_findings(bh_yielder *yielder, const bh_yield *yield, bh_error *err)
{
    if (!yielder->remarks)
        return BH_OK;
    const bh_struck_list *list = yield->view.list;
    double all = 0, signal = 0;
    find_passage(yielder, &yield->view);
    if (yield->view.blocked)
        return BH_OK;
    for (size_t n = 0; n < list->count; n++) {
        all += yielder->seen[n].reached;
        signal += yielder->seen[n].of[BH_ORIGIN_SIGNAL] > 0 ? yielder->seen[n].reached : 0;
    }
    find_in_arm(yielder, yield, signal);
    bh_find_radiation(yielder, yield);
    bh_code code = BH_OK;
    for (size_t n = 0; !code && n < list->count; n++) {
        if (!(yielder->seen[n].reached > worth_saying * all))
            continue;
        const bh_struck *struck = &list->nuclides[n];
        bh_channels channels;
        code = bh_view_channels(yielder, &yield->view, struck, &channels, err);
        if (code)
            break;
        struct finding f = {.yielder = yielder, .yield = yield, .channel = &channels.list[0]};
        bh_nuclide_name(struck->z, struck->a, f.nuclide);
        find_structure(&f);
        find_caveat(&f);
        find_reactions(&f);
    }
    return code;
}
