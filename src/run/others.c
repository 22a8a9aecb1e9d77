/* others.c - what else is in the beam, scattered elastically into an arm. */
#include <math.h>
#include <stdlib.h>

#include "beamhours/run/beneath.h"

/* The kinetic energy of another particle of the same momentum: one beam line brings them all. */
static double kinetic_beside(const bh_beam *beam, const bh_particle *other)
{
    const double mass = beam->particle.mass, kinetic = beam->kinetic_energy.value;
    const double momentum2 = kinetic * (kinetic + 2 * mass);
    return momentum2 / (sqrt(momentum2 + other->mass * other->mass) + other->mass);
}

/* The same arm in a beam of another particle. */
struct beside {
    bh_setting setting;
    bh_view view;
    double share; /* [1] of it for each particle of the named kind */
};

static bh_code set_beside(bh_yielder *yielder, const bh_view *view, const bh_beam_other *other,
                          struct beside *out, bh_error *err)
{
    out->setting = *view->setting;
    bh_beam *beam = &out->setting.beam;
    beam->kinetic_energy.value = kinetic_beside(beam, &other->particle);
    beam->particle = other->particle;
    beam->charge = other->particle.charge;
    out->share = other->share.value / beam->fraction.value;
    out->view = *view;
    out->view.setting = &out->setting;
    out->view.vertex_kinetic = beam->kinetic_energy.value;
    bh_channels channels;
    const bh_code code = bh_view_channels(yielder, &out->view,
                                          &view->list->nuclides[view->list->main], &channels, err);
    if (!code && view->arm->arm.detects != BH_DETECTS_RECOIL)
        out->view.line = channels.list[0];
    return code;
}

/* Where its formula does not hold. */
static void note_caveat(bh_yielder *yielder, const bh_view *view, const bh_channel *channel)
{
    char text[512];
    if (yielder->remarks && channel->process->caveat &&
        channel->process->caveat(&channel->encounter, text, sizeof text) > 0)
        bh_remarks_note(yielder->remarks, &(bh_remark){.kind = BH_REMARK_OTHERS,
                                                       .at = view->setting->beam.at,
                                                       .key = "beam.others",
                                                       .who = channel->encounter.beam->name,
                                                       .what = text,
                                                       .setting = view->setting->name});
}

static void add_part(bh_part *to, bool window, bool dummy, double ub)
{
    double *const where = window ? &to->windows : &to->other;
    *(dummy ? &to->dummy : where) += ub;
}

/* One nuclide, one origin; losses in the target are left out. */
static bh_code add_nuclei(bh_yielder *yielder, bh_yield *yield, struct beside *b,
                          const bh_nuclei *nuclei, bh_error *err)
{
    const double number = yielder->seen[nuclei->nuclide].of[nuclei->origin];
    const bool dummy = nuclei->list != yield->view.list;
    bh_channels channels;
    bh_code code = bh_view_channels(yielder, &b->view, &nuclei->list->nuclides[nuclei->nuclide],
                                    &channels, err);
    for (size_t c = 0; !code && c < channels.count; c++) {
        const bh_elastic_of of = {.channel = &channels.list[c]};
        const bh_channel_sum *sums = bh_elastic_sums(yielder, &b->view, &of, err);
        if (!sums)
            return err->code;
        for (int i = 0; i < yield->view.parts; i++)
            add_part(&yield->part[i], nuclei->origin == BH_ORIGIN_WINDOW, dummy,
                     number * b->share * sums[i].radiated);
        if (nuclei->nuclide == nuclei->list->main)
            note_caveat(yielder, &b->view, &channels.list[c]);
    }
    return code;
}

bh_code bh_others_yield(bh_yielder *yielder, bh_yield *yield, const bh_struck_list *list,
                        bh_error *err)
{
    const bh_beam *beam = &yield->view.setting->beam;
    bh_code code = BH_OK;
    for (size_t i = 0; !code && beam->fraction.value > 0 && i < beam->other_count; i++) {
        struct beside b;
        code = set_beside(yielder, &yield->view, &beam->others[i], &b, err);
        for (size_t k = 0; !code && k < list->count * BH_ORIGINS; k++) {
            const bh_nuclei nuclei = {
                .list = list, .nuclide = k / BH_ORIGINS, .origin = (bh_origin)(k % BH_ORIGINS)};
            if (yielder->seen[nuclei.nuclide].of[nuclei.origin] > 0)
                code = add_nuclei(yielder, yield, &b, &nuclei, err);
        }
    }
    return code;
}
