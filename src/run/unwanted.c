/* unwanted.c - what lies beneath the elastic lines, nuclide by nuclide, added to what arms count.
 */
#include <math.h>

#include "beamhours/run/beneath.h"

/* What a sum is made in. */
struct adding {
    const bh_view *view;
    const bh_way *way;
    bh_beneath smooth;
    int which;
    double *total; /* [ub/cm2] of all parts */
};

/* The request for the scattered particle on a nuclide; its vertices are in the yielder. */
static bh_code request_for(bh_yielder *yielder, const struct adding *a, const bh_nuclei *nuclei,
                           bh_radiated_request *request, bh_error *err)
{
    bh_channels channels;
    const size_t count = a->way ? bh_view_vertices(yielder, a->way, nuclei) : 0;
    const bh_code code = bh_view_channels(yielder, a->view,
                                          &nuclei->list->nuclides[nuclei->nuclide], &channels, err);
    if (code)
        return code;
    *request = bh_view_radiated(yielder, a->view, &channels.list[0], a->way, count);
    request->signal = nuclei->origin == BH_ORIGIN_SIGNAL && !nuclei->all && !a->view->beside;
    if (!a->way)
        return BH_OK;
    const bh_code lost = bh_gate_there(yielder, a->view, a->way, count, &request->gate);
    return lost ? bh_fail(err, lost, "%s", bh_code_text(lost)) : BH_OK;
}

static bh_code add_nuclei(bh_yielder *yielder, struct adding *a, const bh_nuclei *nuclei,
                          double number, bh_error *err)
{
    bh_radiated_request request;
    const bh_beneath_of of = {.radiated = &request,
                              .list = nuclei->list,
                              .struck = &nuclei->list->nuclides[nuclei->nuclide],
                              .nuclei = number,
                              .which = a->which};
    bh_code code = request_for(yielder, a, nuclei, &request, err);
    if (!code)
        bh_beneath_add(yielder, a->view, &of, &a->smooth);
    return code ? code : bh_beneath_atomic(yielder, a->view, &of, a->total, err);
}

bh_code bh_beneath_group_sum(bh_yielder *yielder, const bh_beneath_group *group, double *total,
                             bh_error *err)
{
    struct adding a = {
        .view = group->view, .way = group->way, .which = BH_BENEATH_ALL, .total = total};
    const bool any = group->origin == BH_ORIGINS, windows = group->origin == BH_ORIGIN_WINDOW;
    bh_code code = BH_OK;
    bh_beneath_begin(a.view, &a.smooth);
    for (int i = 0; i < a.view->parts; i++)
        total[i] = 0;
    for (size_t k = 0; !code && a.smooth.at.count && k < group->list->count * BH_ORIGINS; k++) {
        const bh_origin o = (bh_origin)(k % BH_ORIGINS);
        const double number = yielder->seen[k / BH_ORIGINS].of[o];
        const bh_nuclei nuclei = {
            .list = group->list, .nuclide = k / BH_ORIGINS, .all = any, .origin = o};
        if ((any || (o == BH_ORIGIN_WINDOW) == windows) && number > 0)
            code = add_nuclei(yielder, &a, &nuclei, number, err);
    }
    return code ? code : bh_beneath_sum(yielder, a.view, &a.smooth, total, err);
}

bh_code bh_beneath_yield(bh_yielder *yielder, bh_yield *yield, const bh_struck_list *list,
                         const bh_way *way, bh_error *err)
{
    const bool dummy = list != yield->view.list;
    double *total = bh_workspace_scratch(yielder->workspace)->totals;
    bh_beneath_group group = {.view = &yield->view,
                              .list = list,
                              .way = way,
                              .origin = dummy ? BH_ORIGINS : BH_ORIGIN_OTHER};
    bh_code code = bh_beneath_group_sum(yielder, &group, total, err);
    for (int i = 0; !code && i < yield->view.parts; i++)
        *(dummy ? &yield->part[i].dummy : &yield->part[i].other) += total[i];
    if (code || dummy)
        return code;
    group.origin = BH_ORIGIN_WINDOW;
    code = bh_beneath_group_sum(yielder, &group, total, err);
    for (int i = 0; !code && i < yield->view.parts; i++)
        yield->part[i].windows += total[i];
    return code;
}

bh_code bh_beneath_presence(bh_yielder *yielder, const bh_view *view,
                            const bh_beneath_wanted *wanted, double *total, bh_error *err)
{
    const bh_presence *presence = wanted->presence;
    struct adding a = {.view = view,
                       .way = view->beside ? NULL : &view->way,
                       .which = wanted->which,
                       .total = total};
    const bh_nuclei nuclei = {.list = view->list,
                              .nuclide = presence->nuclide,
                              .origin = presence->origin,
                              .only = presence};
    for (int i = 0; i < view->parts; i++)
        total[i] = 0;
    bh_beneath_begin(view, &a.smooth);
    if (!a.smooth.at.count)
        return BH_OK;
    const bh_code code = add_nuclei(yielder, &a, &nuclei, 1, err);
    return code ? code : bh_beneath_sum(yielder, view, &a.smooth, total, err);
}
