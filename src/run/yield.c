/* yield.c - what an arm counts of signal and background in one setting. */
#include "beamhours/run/yield.h"

#include <math.h>
#include <string.h>

#include "beamhours/rates/counting.h"
#include "beamhours/run/beneath.h"
#include "beamhours/run/pair.h"
#include "beamhours/run/resolution.h"
#include "beamhours/units/constants.h"

bh_code bh_yielder_prepare(bh_yielder *yielder, bh_arena *arena, bh_error *err)
{
    const bh_plan *plan = yielder->plan;
    size_t nuclides = 1;
    yielder->lists = bh_arena_take(arena, plan->target_count, sizeof *yielder->lists);
    bool made = yielder->lists;
    for (size_t t = 0; made && t < plan->target_count; t++) {
        bh_struck_list *list = &yielder->lists[t];
        made = bh_struck_from_target(&plan->targets[t], arena, list);
        if (made && list->count > nuclides)
            nuclides = list->count;
    }
    yielder->seen = bh_arena_take(arena, nuclides, sizeof *yielder->seen);
    made = made && yielder->seen;
    if (!made)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    const bh_code code = bh_places_prepare(yielder, arena, err);
    return code ? code : bh_pair_prepare(yielder, arena, err);
}

/* Adds up over the layers what the arm sees of each nuclide. */
void bh_seen_set(bh_yielder *yielder, const bh_struck_list *list)
{
    for (size_t n = 0; n < list->count; n++)
        yielder->seen[n] = (bh_seen_numbers){.reached = 0};
    for (size_t i = 0; i < list->presence_count; i++) {
        const bh_presence *p = &list->presences[i];
        bh_seen_numbers *s = &yielder->seen[p->nuclide];
        s->of[p->origin] += p->number * yielder->paths[0][p->layer];
        for (int k = 0; k < 2 && p->origin == BH_ORIGIN_SIGNAL; k++)
            s->moved[k] += p->number * yielder->paths[1 + k][p->layer];
    }
}

static bh_code set_seen(bh_yielder *yielder, const bh_view *view, const bh_struck_list *list,
                        const bh_way *way, bh_error *err)
{
    const bh_code code = bh_view_paths(yielder, view, list->target, way, err);
    if (code)
        return code;
    bh_seen_set(yielder, list);
    return BH_OK;
}

void bh_part_add(bh_part *to, const bh_channel_sum *sum, const bh_seen_numbers *seen,
                 bh_origin origin)
{
    const double nuclei = seen->of[origin];
    if (origin == BH_ORIGIN_WINDOW)
        to->windows += nuclei * sum->radiated;
    else if (origin == BH_ORIGIN_OTHER)
        to->other += nuclei * sum->radiated;
    if (origin != BH_ORIGIN_SIGNAL)
        return;
    to->cross_section += nuclei * sum->total;
    to->kept += nuclei * sum->kept;
    to->radiative += nuclei * sum->radiated;
    to->per_radian += seen->moved[1] * sum->moved[1] - seen->moved[0] * sum->moved[0];
    to->per_momentum += nuclei * (sum->boosted[1] - sum->boosted[0]);
}

static void add_point(const bh_yield *yield, const bh_channel *channel, double seen)
{
    for (int i = 0; i < yield->view.parts; i++) {
        double sigma = 0, momentum = 0;
        bh_channel_eval(channel, 1, &yield->part[i].angle, &sigma, &momentum);
        yield->part[i].point_cross_section += seen * sigma;
    }
}

/* [1] Isotopes of the scatterer that are rarer than this, like deuterium in natural hydrogen. */
static const double trace_share = 2e-4;

static bool is_trace(const bh_yielder *yielder, const bh_nuclei *nuclei)
{
    const double main = yielder->seen[nuclei->list->main].of[BH_ORIGIN_SIGNAL];
    return nuclei->origin == BH_ORIGIN_SIGNAL &&
           yielder->seen[nuclei->nuclide].of[BH_ORIGIN_SIGNAL] < trace_share * main;
}

/* Whether so little comes from `nuclei` of them, beside what has been added, that 1e-3 of it and
 * the sensitivities do not matter: not where the arm is set to the line of a rare isotope. */
static bool stays_trace(const bh_yield *yield, const bh_channel_sum *sums, double nuclei)
{
    static const double much = 1e-3;
    for (int i = 0; i < yield->view.parts; i++)
        if (nuclei * sums[i].radiated > much * yield->part[i].radiative)
            return false;
    return true;
}

/* A nuclide where it is signal, or one kind of background. */
static bh_code add_origin(bh_yielder *yielder, bh_yield *yield, const bh_nuclei *nuclei,
                          const bh_channels *channels, bh_error *err)
{
    bh_seen_numbers *seen = &yielder->seen[nuclei->nuclide];
    const bool signal = nuclei->origin == BH_ORIGIN_SIGNAL;
    const size_t count = bh_view_vertices(yielder, &yield->view.way, nuclei);
    for (size_t c = 0; c < channels->count; c++) {
        bh_elastic_of of = {.channel = &channels->list[c],
                            .way = &yield->view.way,
                            .count = count,
                            .signal = signal,
                            .trace = is_trace(yielder, nuclei)};
        const bh_channel_sum *sums = bh_elastic_sums(yielder, &yield->view, &of, err);
        if (sums && of.trace && !stays_trace(yield, sums, seen->of[BH_ORIGIN_SIGNAL])) {
            of.trace = false;
            sums = bh_elastic_sums(yielder, &yield->view, &of, err);
        }
        if (!sums)
            return err->code;
        for (int i = 0; i < yield->view.parts; i++)
            bh_part_add(&yield->part[i], &sums[i], seen, nuclei->origin);
        seen->reached += seen->of[nuclei->origin] * sums[0].radiated;
        yield->converged = yield->converged && sums[0].converged;
        if (signal)
            add_point(yield, &channels->list[c], seen->of[BH_ORIGIN_SIGNAL]);
    }
    return BH_OK;
}

static bh_code add_nuclide(bh_yielder *yielder, bh_yield *yield, size_t nuclide, bh_error *err)
{
    const bh_struck_list *list = yield->view.list;
    bh_channels channels;
    if (yielder->cancelled && yielder->cancelled(yielder->asker))
        return bh_fail(err, BH_ENOCONV, "the evaluation was cancelled");
    bh_code code =
        bh_view_channels(yielder, &yield->view, &list->nuclides[nuclide], &channels, err);
    for (int o = 0; !code && o < BH_ORIGINS; o++) {
        const bh_nuclei nuclei = {.list = list, .nuclide = nuclide, .origin = (bh_origin)o};
        if (yielder->seen[nuclide].of[o] > 0)
            code = add_origin(yielder, yield, &nuclei, &channels, err);
    }
    return code;
}

static void polar_angle(void *context, size_t n, const double *theta, double *value)
{
    (void)context;
    memcpy(value, theta, n * sizeof *value);
}

/* Fills means with the mean angle of each bin, as of any function of the angle; false near the
 * beam, where that is no smooth function. */
static bool mean_angles(bh_yielder *yielder, const bh_acceptance *acceptance, bh_averages *means)
{
    const bh_average_request request = {.function = polar_angle};
    return acceptance->whole.polar.from > 0 &&
           !bh_average_over(acceptance, &request, bh_workspace_averages(yielder->workspace), means,
                            NULL);
}

static void set_geometry(bh_yielder *yielder, bh_yield *yield)
{
    const bh_acceptance *acceptance = &yield->view.acceptance;
    bh_average_workspace *averages = bh_workspace_averages(yielder->workspace);
    bh_averages means = {.bins = bh_workspace_scratch(yielder->workspace)->bins};
    const bool smooth = yield->view.parts > 1 && mean_angles(yielder, acceptance, &means);
    for (int i = 0; i < yield->view.parts; i++) {
        const bh_acceptance_part *part = bh_average_part(averages, acceptance, i);
        const bh_average *mean = smooth && i && i <= acceptance->bins ? &means.bins[i - 1] : NULL;
        const bool known = mean && mean->converged && mean->solid_angle > 0;
        const double angle = known ? mean->total / mean->solid_angle : 0;
        yield->part[i] = (bh_part){.solid_angle = part->solid_angle, .polar = part->polar};
        yield->part[i].angle = !i      ? yield->view.axis
                               : known ? angle
                                       : bh_acceptance_mean_angle(part);
    }
}

/* From sums to means and rates. */
void bh_yield_finish(const bh_yield *yield, bh_part *part)
{
    const bh_view *view = &yield->view;
    const double efficiency = view->arm->arm.efficiency.value;
    const double per_ub = view->beam * 1e-30 * efficiency;
    const double kept = part->kept, radiated = part->radiative;
    part->belonging /= part->cross_section;
    part->kept = part->cross_section > 0 ? kept / part->cross_section : (double)NAN;
    part->radiative = kept > 0 ? radiated / kept : (double)NAN;
    part->per_radian = part->per_radian / (2 * BH_STEP_ANGLE * radiated);
    part->per_momentum = part->per_momentum / (2 * BH_STEP_MOMENTUM * radiated);
    if (view->without_changes)
        part->per_radian = part->per_momentum = (double)NAN;
    part->cross_section /= yield->seen * part->solid_angle;
    part->point_cross_section /= yield->seen;
    part->signal = 0;
    if (kept > 0)
        part->signal = bh_counting_rate(&(bh_rate_factors){.beam = view->beam,
                                                           .seen = yield->seen,
                                                           .cross_section = part->cross_section,
                                                           .solid_angle = part->solid_angle,
                                                           .radiative = part->radiative,
                                                           .kept = part->kept,
                                                           .efficiency = efficiency});
    part->windows *= per_ub;
    part->other *= per_ub;
    part->dummy *= per_ub;
    part->beside[0] *= per_ub;
    part->beside[1] *= per_ub;
}

/* What one nuclide of the dummy cell gives. */
static bh_code add_dummy_nuclide(bh_yielder *yielder, bh_yield *yield, const bh_nuclei *nuclei,
                                 const bh_way *way, bh_error *err)
{
    const bh_seen_numbers *seen = &yielder->seen[nuclei->nuclide];
    const double number =
        seen->of[BH_ORIGIN_SIGNAL] + seen->of[BH_ORIGIN_OTHER] + seen->of[BH_ORIGIN_WINDOW];
    bh_channels channels;
    const bh_code code = bh_view_channels(yielder, &yield->view,
                                          &nuclei->list->nuclides[nuclei->nuclide], &channels, err);
    if (code || !(number > 0))
        return code;
    const size_t count = bh_view_vertices(yielder, way, nuclei);
    for (size_t c = 0; c < channels.count; c++) {
        const bh_elastic_of of = {.channel = &channels.list[c], .way = way, .count = count};
        const bh_channel_sum *sums = bh_elastic_sums(yielder, &yield->view, &of, err);
        if (!sums)
            return err->code;
        for (int i = 0; i < yield->view.parts; i++)
            yield->part[i].dummy += number * sums[i].radiated;
    }
    return BH_OK;
}

/* What the dummy cell gives, all of it, in the same arm. */
static bh_code add_dummy(bh_yielder *yielder, bh_yield *yield, const bh_target *dummy,
                         bh_error *err)
{
    const bh_struck_list *list = &yielder->lists[dummy - yielder->plan->targets];
    bh_way way;
    bh_code code = bh_view_way(yielder, &yield->view, dummy, &way, err);
    if (!code)
        code = set_seen(yielder, &yield->view, list, &way, err);
    for (size_t n = 0; !code && n < list->count; n++) {
        const bh_nuclei nuclei = {.list = list, .nuclide = n, .all = true};
        code = add_dummy_nuclide(yielder, yield, &nuclei, &way, err);
    }
    if (!code)
        code = bh_beneath_yield(yielder, yield, list, &way, err);
    return code ? code : bh_others_yield(yielder, yield, list, err);
}

/* Everything of the setting's own target; nothing where the beam does not come through. */
static bh_code add_target(bh_yielder *yielder, bh_yield *yield, bh_error *err)
{
    const bh_struck_list *list = yield->view.list;
    bh_code code = set_seen(yielder, &yield->view, list, &yield->view.way, err);
    for (size_t n = 0; !code && !yield->view.blocked && n < list->count; n++)
        code = add_nuclide(yielder, yield, n, err);
    if (!code && !yield->view.blocked)
        code = bh_beneath_yield(yielder, yield, list, &yield->view.way, err);
    if (!code && !yield->view.blocked)
        code = bh_others_yield(yielder, yield, list, err);
    for (size_t n = 0; n < list->count; n++)
        yield->seen += yielder->seen[n].of[BH_ORIGIN_SIGNAL];
    return code;
}

bh_code bh_yield_make(bh_yielder *yielder, bh_yield *yield, bh_error *err)
{
    const bh_target *target = yield->view.setting->target;
    yield->converged = true;
    yield->seen = 0;
    set_geometry(yielder, yield);
    bh_code code = add_target(yielder, yield, err);
    if (!code)
        code = bh_findings(yielder, yield, err);
    if (!code && target->empty != BH_EMPTY_NONE && target->empty_use)
        code = add_dummy(yielder, yield, target->empty_use, err);
    if (code)
        return code;
    bh_resolve_bins(yield);
    for (int i = 0; i < yield->view.parts; i++)
        bh_yield_finish(yield, &yield->part[i]);
    return BH_OK;
}
