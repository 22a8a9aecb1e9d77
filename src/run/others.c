/* others.c - what else is in the beam, scattered into an arm. */
#include <math.h>
#include <stdio.h>

#include "beamhours/base/sentences.h"
#include "beamhours/physics/validity.h"
#include "beamhours/run/beneath.h"
#include "beamhours/units/nuclide.h"

/* The kinetic energy of another particle of the same momentum: one beam line brings them all. */
static double kinetic_beside(const bh_beam *beam, const bh_particle *other)
{
    const double mass = beam->particle.mass, kinetic = beam->kinetic_energy.value;
    const double momentum2 = kinetic * (kinetic + 2 * mass);
    return momentum2 / (sqrt(momentum2 + other->mass * other->mass) + other->mass);
}

bh_code bh_beside_make(bh_yielder *yielder, const bh_view *view, size_t other, bh_beside *out,
                       bh_error *err)
{
    const bh_beam_other *of = &view->setting->beam.others[other];
    out->setting = *view->setting;
    bh_beam *beam = &out->setting.beam;
    beam->kinetic_energy.value = kinetic_beside(beam, &of->particle);
    beam->particle = of->particle;
    beam->charge = of->particle.charge;
    out->share = of->share.value / beam->fraction.value;
    out->view = *view;
    out->view.setting = &out->setting;
    out->view.beside = of->particle.name;
    out->view.way.losing = false;
    out->view.way.kinetic = out->view.vertex_kinetic = beam->kinetic_energy.value;
    bh_channels channels;
    bh_code code = bh_view_channels(yielder, &out->view, &view->list->nuclides[view->list->main],
                                    &channels, err);
    if (code || view->arm->arm.detects == BH_DETECTS_RECOIL)
        return code;
    out->view.line = channels.list[0];
    code = bh_view_gate(yielder, &out->view, 0); /* the same momenta are other energies */
    return code ? bh_fail(err, code, "%s", bh_code_text(code)) : BH_OK;
}

bh_code bh_beside_elastic(bh_yielder *yielder, const bh_beside *beside, const bh_struck *struck,
                          double *total, bh_error *err)
{
    bh_channels channels;
    const bh_code code = bh_view_channels(yielder, &beside->view, struck, &channels, err);
    for (int i = 0; i < beside->view.parts; i++)
        total[i] = 0;
    for (size_t c = 0; !code && c < channels.count; c++) {
        const bh_elastic_of of = {.channel = &channels.list[c]};
        const bh_channel_sum *sums = bh_elastic_sums(yielder, &beside->view, &of, err);
        if (!sums)
            return err->code;
        for (int i = 0; i < beside->view.parts; i++)
            total[i] += sums[i].radiated;
    }
    return code;
}

static void note(bh_yielder *yielder, const bh_beside *b, bh_remark remark)
{
    remark.at = b->setting.beam.at;
    remark.key = "beam.others";
    remark.setting = b->setting.name;
    bh_remarks_note(yielder->remarks, &remark);
}

/* Where its formula does not hold, and what hadrons do beside. */
static bh_code note_caveat(bh_yielder *yielder, const bh_beside *b, const bh_struck_list *list,
                           bh_error *err)
{
    char text[512];
    bh_channels channels;
    if (!yielder->remarks)
        return BH_OK;
    const bh_code code =
        bh_view_channels(yielder, &b->view, &list->nuclides[list->main], &channels, err);
    if (code)
        return code;
    const bh_encounter *e = &channels.list[0].encounter;
    const bh_process *process = channels.list[0].process;
    if (process->caveat && process->caveat(e, text, sizeof text) > 0)
        note(yielder, b,
             (bh_remark){.kind = BH_REMARK_OTHERS, .who = b->view.beside, .what = text});
    if (bh_validity_reacts(e)) {
        char nuclide[8];
        snprintf(text, sizeof text, BH_WARN_BESIDE, b->view.beside, BH_WARN_REACTIONS);
        note(yielder, b,
             (bh_remark){.kind = BH_REMARK_NOT_COMPUTED,
                         .who = bh_nuclide_name(e->z, e->a, nuclide),
                         .what = text});
    }
    return BH_OK;
}

static void add_part(bh_part *to, bool dummy, bool window, double ub)
{
    if (dummy) {
        to->dummy += ub;
        return;
    }
    *(window ? &to->windows : &to->other) += ub;
    to->beside[window ? 0 : 1] += ub;
}

static void add_parts(bh_yield *yield, bool dummy, bool window, const double *total, double by)
{
    for (int i = 0; i < yield->view.parts; i++)
        add_part(&yield->part[i], dummy, window, by * total[i]);
}

/* Elastic events on one nuclide. */
static bh_code add_elastic(bh_yielder *yielder, bh_yield *yield, const bh_beside *b,
                           const bh_nuclei *nuclei, bh_error *err)
{
    double *total = bh_workspace_scratch(yielder->workspace)->totals;
    const double *of = yielder->seen[nuclei->nuclide].of;
    const bool dummy = nuclei->list != yield->view.list;
    double number = 0;
    for (int o = 0; o < BH_ORIGINS; o++)
        number += of[o];
    if (!(number > 0))
        return BH_OK;
    const bh_code code =
        bh_beside_elastic(yielder, b, &nuclei->list->nuclides[nuclei->nuclide], total, err);
    for (int o = 0; !code && o < BH_ORIGINS; o++)
        add_parts(yield, dummy, o == BH_ORIGIN_WINDOW, total, b->share * of[o]);
    return code;
}

/* What lies beneath those lines. */
static bh_code add_beneath(bh_yielder *yielder, bh_yield *yield, const bh_beside *b,
                           const bh_struck_list *list, bh_error *err)
{
    double *total = bh_workspace_scratch(yielder->workspace)->totals;
    const bool dummy = list != yield->view.list;
    bh_beneath_group group = {
        .view = &b->view, .list = list, .origin = dummy ? BH_ORIGINS : BH_ORIGIN_OTHER};
    bh_code code = bh_beneath_group_sum(yielder, &group, total, err);
    if (!code)
        add_parts(yield, dummy, false, total, b->share);
    if (code || dummy)
        return code;
    group.origin = BH_ORIGIN_WINDOW;
    code = bh_beneath_group_sum(yielder, &group, total, err);
    if (!code)
        add_parts(yield, dummy, true, total, b->share);
    return code;
}

bh_code bh_others_yield(bh_yielder *yielder, bh_yield *yield, const bh_struck_list *list,
                        bh_error *err)
{
    const bh_beam *beam = &yield->view.setting->beam;
    bh_code code = BH_OK;
    for (size_t i = 0; !code && beam->fraction.value > 0 && i < beam->other_count; i++) {
        bh_beside b;
        code = bh_beside_make(yielder, &yield->view, i, &b, err);
        for (size_t n = 0; !code && n < list->count; n++) {
            const bh_nuclei nuclei = {.list = list, .nuclide = n};
            code = add_elastic(yielder, yield, &b, &nuclei, err);
        }
        if (!code)
            code = add_beneath(yielder, yield, &b, list, err);
        if (!code && list == yield->view.list)
            code = note_caveat(yielder, &b, list, err);
    }
    return code;
}
