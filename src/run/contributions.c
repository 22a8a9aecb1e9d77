/* contributions.c - which nuclide in which layer gives what part of a rate, for explain. */
#include "beamhours/rates/counting.h"
#include "beamhours/run/yield.h"

/* The integrals of one nuclide over one part of the arm, its channels summed: of the signal in its
 * own layer, of background the mean over all layers that it has the same origin in. */
static bh_code integrals(bh_yielder *yielder, const bh_view *view, int part, bh_contribution *c,
                         bh_error *err)
{
    const bool signal = c->presence->origin == BH_ORIGIN_SIGNAL;
    const bh_nuclei nuclei = {.list = view->list,
                              .nuclide = c->presence->nuclide,
                              .origin = c->presence->origin,
                              .only = signal ? c->presence : NULL};
    const size_t count = bh_view_vertices(yielder, &view->way, &nuclei);
    bh_channels channels;
    const bh_code code = bh_view_channels(yielder, view, c->struck, &channels, err);
    if (code)
        return code;
    double total = 0, kept = 0, radiated = 0;
    c->structure = channels.list[0].encounter.structure;
    for (size_t k = 0; count > 0 && k < channels.count; k++) {
        const bh_elastic_of of = {.channel = &channels.list[k],
                                  .way = &view->way,
                                  .count = count,
                                  .signal = signal,
                                  .whole = yielder->explaining,
                                  .binless = part == 0 && !signal};
        const bh_channel_sum *sums = bh_elastic_sums(yielder, view, &of, err);
        if (!sums)
            return err->code;
        total += sums[part].total;
        kept += signal ? sums[part].kept : sums[part].radiated;
        radiated += sums[part].radiated;
    }
    c->cross_section = total;
    c->kept = total > 0 ? kept / total : 0;
    c->radiative = kept > 0 ? radiated / kept : 1;
    return BH_OK;
}

bh_code bh_yield_contributions(bh_yielder *yielder, const bh_yield *yield, int part,
                               bh_contribution *contributions, bh_error *err)
{
    const bh_view *view = &yield->view;
    const bh_struck_list *list = view->list;
    bh_code code = bh_view_paths(yielder, view, list->target, &view->way, err);
    for (size_t i = 0; !code && i < list->presence_count; i++) {
        const bh_presence *p = &list->presences[i];
        bh_contribution *c = &contributions[i];
        *c = (bh_contribution){.presence = p,
                               .struck = &list->nuclides[p->nuclide],
                               .seen = p->number * yielder->paths[0][p->layer]};
        code = integrals(yielder, view, part, c, err);
        const double solid_angle = yield->part[part].solid_angle;
        c->cross_section /= solid_angle;
        c->rate =
            bh_counting_rate(&(bh_rate_factors){.beam = view->beam,
                                                .seen = c->seen,
                                                .cross_section = c->cross_section,
                                                .solid_angle = solid_angle,
                                                .radiative = c->radiative,
                                                .kept = c->kept,
                                                .efficiency = view->arm->arm.efficiency.value});
    }
    return code;
}
