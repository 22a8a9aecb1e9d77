/* findings.c - what the numbers of an arm rest on, as warnings. */
#include <math.h>

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
    bh_acceptance acceptance;
    if (bh_acceptance_make(&f->yield->view.spec, &acceptance, NULL))
        return false;
    const double largest = bh_channel_largest_angle(f->channel);
    const double ends[] = {acceptance.whole.polar.from, acceptance.whole.polar.to};
    *low = (double)INFINITY;
    *high = 0;
    for (int i = 0; i < 2; i++) {
        bh_event event;
        if (bh_channel_event(f->channel, fmin(ends[i], largest), &event, NULL))
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
    said.kind = BH_REMARK_NO_SIGNAL;
    if (!(signal > 0))
        bh_remarks_note(yielder->remarks, &said);
}

bh_code bh_findings(bh_yielder *yielder, const bh_yield *yield, bh_error *err)
{
    if (!yielder->remarks)
        return BH_OK;
    const bh_struck_list *list = yield->view.list;
    double all = 0, signal = 0;
    for (size_t n = 0; n < list->count; n++) {
        all += yielder->seen[n].reached;
        signal += yielder->seen[n].signal > 0 ? yielder->seen[n].reached : 0;
    }
    find_in_arm(yielder, yield, signal);
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
    }
    return code;
}
