/* yield.c - what an arm counts of signal and background in one setting. */
#include "beamhours/run/yield.h"

#include <math.h>

#include "beamhours/rates/counting.h"
#include "beamhours/units/constants.h"

enum { PLACES = 3 };

bh_code bh_yielder_prepare(bh_yielder *yielder, bh_arena *arena, bh_error *err)
{
    const bh_plan *plan = yielder->plan;
    size_t nuclides = 1, layers = 1;
    yielder->lists = bh_arena_take(arena, plan->target_count, sizeof *yielder->lists);
    bool made = yielder->lists;
    for (size_t t = 0; made && t < plan->target_count; t++) {
        bh_struck_list *list = &yielder->lists[t];
        made = bh_struck_from_target(&plan->targets[t], arena, list);
        if (made && list->count > nuclides)
            nuclides = list->count;
        if (plan->targets[t].layer_count > layers)
            layers = plan->targets[t].layer_count;
    }
    yielder->seen = bh_arena_take(arena, nuclides, sizeof *yielder->seen);
    yielder->layers = bh_arena_take(arena, layers, sizeof *yielder->layers);
    made = made && yielder->seen && yielder->layers;
    for (int i = 0; i < PLACES; i++) {
        yielder->paths[i] = bh_arena_take(arena, layers, sizeof(double));
        made = made && yielder->paths[i];
    }
    return made ? BH_OK : bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
}

/* How much of each layer is seen, by the arm as it stands and (sensitivities) moved both ways. */
bh_code bh_view_paths(bh_yielder *yielder, const bh_view *view, const bh_target *target,
                      bh_error *err)
{
    const bh_extent *seen = &view->arm->arm.target_view;
    for (size_t l = 0; l < target->layer_count; l++)
        yielder->layers[l] = (bh_seen_layer){.thickness = target->layers[l].thickness.value,
                                             .sample = target->layers[l].role == BH_ROLE_SAMPLE};
    static const double by[PLACES] = {0, -BH_STEP_ANGLE, BH_STEP_ANGLE};
    bh_code code = BH_OK;
    for (int i = 0; !code && i < PLACES; i++) {
        const bh_seen_view how = {.limited = seen->given,
                                  .from = seen->from,
                                  .to = seen->to,
                                  .angle = fmin(fmax(view->axis + by[i], 0), BH_PI),
                                  .tilt = view->setting->tilt.value};
        code = bh_seen_paths(&how, target->layer_count, yielder->layers, yielder->paths[i], err);
    }
    return code;
}

/* Adds up over the layers what the arm sees of each nuclide. */
static bh_code set_seen(bh_yielder *yielder, const bh_view *view, const bh_struck_list *list,
                        bh_error *err)
{
    const bh_code code = bh_view_paths(yielder, view, list->target, err);
    if (code)
        return code;
    for (size_t n = 0; n < list->count; n++)
        yielder->seen[n] = (bh_seen_numbers){.signal = 0};
    for (size_t i = 0; i < list->presence_count; i++) {
        const bh_presence *p = &list->presences[i];
        bh_seen_numbers *s = &yielder->seen[p->nuclide];
        const double seen = p->number * yielder->paths[0][p->layer];
        if (p->origin == BH_ORIGIN_WINDOW)
            s->windows += seen;
        else if (p->origin == BH_ORIGIN_OTHER)
            s->other += seen;
        else
            s->signal += seen;
        for (int k = 0; k < 2 && p->origin == BH_ORIGIN_SIGNAL; k++)
            s->moved[k] += p->number * yielder->paths[1 + k][p->layer];
    }
    return BH_OK;
}

bh_channel_request bh_view_request(const bh_view *view, const bh_channel *channel)
{
    return (bh_channel_request){.channel = *channel,
                                .acceptance = view->spec,
                                .cut = view->cut,
                                .momentum_from = view->bite_from,
                                .momentum_to = view->bite_to,
                                .bins = view->parts > 1};
}

/* While sums are made, cross_section and kept hold nuclei times their integrals [ub/cm2], the
 * sensitivities differences of such. */
static void add_sum(bh_part *to, const bh_channel_sum *sum, const bh_seen_numbers *seen)
{
    to->windows += seen->windows * sum->kept;
    to->other += seen->other * sum->kept;
    if (!(seen->signal > 0))
        return;
    to->cross_section += seen->signal * sum->total;
    to->kept += seen->signal * sum->kept;
    to->per_radian += seen->moved[1] * sum->moved[1] - seen->moved[0] * sum->moved[0];
    to->per_momentum += seen->signal * (sum->boosted[1] - sum->boosted[0]);
}

static void add_point(const bh_yield *yield, const bh_channel *channel, double seen)
{
    for (int i = 0; i < yield->view.parts; i++) {
        double sigma = 0, momentum = 0;
        bh_channel_eval(channel, 1, &yield->part[i].angle, &sigma, &momentum);
        yield->part[i].point_cross_section += seen * sigma;
    }
}

static bh_code add_nuclide(bh_yielder *yielder, bh_yield *yield, const bh_struck *struck,
                           bh_seen_numbers *seen, bh_error *err)
{
    bh_channels channels;
    if (yielder->cancelled && yielder->cancelled(yielder->asker))
        return bh_fail(err, BH_ENOCONV, "the evaluation was cancelled");
    bh_code code = bh_view_channels(yielder, &yield->view, struck, &channels, err);
    for (size_t c = 0; !code && c < channels.count; c++) {
        bh_channel_request request = bh_view_request(&yield->view, &channels.list[c]);
        request.sensitivities = seen->signal > 0;
        const bh_channel_sum *sums = bh_channel_sums(yielder->workspace, &request, err);
        if (!sums)
            return err->code;
        for (int i = 0; i < yield->view.parts; i++)
            add_sum(&yield->part[i], &sums[i], seen);
        seen->reached += (seen->signal + seen->windows + seen->other) * sums[0].kept;
        yield->converged = yield->converged && sums[0].converged;
        if (seen->signal > 0)
            add_point(yield, &channels.list[c], seen->signal);
    }
    return code;
}

static bh_code set_geometry(bh_yield *yield, bh_error *err)
{
    bh_acceptance acceptance;
    const bh_code code = bh_acceptance_make(&yield->view.spec, &acceptance, err);
    for (int i = 0; !code && i < yield->view.parts; i++) {
        bh_acceptance_part part;
        bh_acceptance_part_of(&acceptance, i, &part);
        yield->part[i] = (bh_part){.solid_angle = part.solid_angle,
                                   .polar = part.polar,
                                   .angle = i ? bh_acceptance_mean_angle(&part) : yield->view.axis};
    }
    return code;
}

/* From sums to means and rates. */
static void finish(const bh_yield *yield, bh_part *part)
{
    const bh_view *view = &yield->view;
    const double efficiency = view->arm->arm.efficiency.value;
    const double per_ub = view->beam * 1e-30 * efficiency;
    const double kept = part->kept;
    part->kept = part->cross_section > 0 ? kept / part->cross_section : (double)NAN;
    part->per_radian = part->per_radian / (2 * BH_STEP_ANGLE * kept);
    part->per_momentum = part->per_momentum / (2 * BH_STEP_MOMENTUM * kept);
    part->cross_section /= yield->seen * part->solid_angle;
    part->point_cross_section /= yield->seen;
    part->signal = 0;
    if (kept > 0)
        part->signal = bh_counting_rate(&(bh_rate_factors){.beam = view->beam,
                                                           .seen = yield->seen,
                                                           .cross_section = part->cross_section,
                                                           .solid_angle = part->solid_angle,
                                                           .radiative = 1,
                                                           .kept = part->kept,
                                                           .efficiency = efficiency});
    part->windows *= per_ub;
    part->other *= per_ub;
    part->dummy *= per_ub;
}

/* What the dummy cell gives, all of it, in the same arm. */
static bh_code add_dummy(bh_yielder *yielder, bh_yield *yield, const bh_target *dummy,
                         bh_error *err)
{
    const bh_struck_list *list = &yielder->lists[dummy - yielder->plan->targets];
    bh_code code = set_seen(yielder, &yield->view, list, err);
    for (size_t n = 0; !code && n < list->count; n++) {
        const bh_seen_numbers *seen = &yielder->seen[n];
        bh_channels channels;
        code = bh_view_channels(yielder, &yield->view, &list->nuclides[n], &channels, err);
        for (size_t c = 0; !code && c < channels.count; c++) {
            const bh_channel_request request = bh_view_request(&yield->view, &channels.list[c]);
            const bh_channel_sum *sums = bh_channel_sums(yielder->workspace, &request, err);
            if (!sums)
                return err->code;
            for (int i = 0; i < yield->view.parts; i++)
                yield->part[i].dummy += (seen->signal + seen->windows + seen->other) * sums[i].kept;
        }
    }
    return code;
}

bh_code bh_yield_make(bh_yielder *yielder, bh_yield *yield, bh_error *err)
{
    const bh_target *target = yield->view.setting->target;
    const bh_struck_list *list = yield->view.list;
    yield->converged = true;
    yield->seen = 0;
    bh_code code = set_geometry(yield, err);
    if (!code)
        code = set_seen(yielder, &yield->view, list, err);
    for (size_t n = 0; !code && n < list->count; n++)
        code = add_nuclide(yielder, yield, &list->nuclides[n], &yielder->seen[n], err);
    for (size_t n = 0; n < list->count; n++)
        yield->seen += yielder->seen[n].signal;
    if (!code)
        code = bh_findings(yielder, yield, err);
    if (!code && target->empty != BH_EMPTY_NONE && target->empty_use)
        code = add_dummy(yielder, yield, target->empty_use, err);
    for (int i = 0; !code && i < yield->view.parts; i++)
        finish(yield, &yield->part[i]);
    return code;
}
