/* pair.c - two arms in coincidence. */
#include "beamhours/run/pair.h"

#include <math.h>

#include "beamhours/rates/counting.h"
#include "beamhours/run/joint.h"
#include "beamhours/run/resolution.h"

bh_code bh_pair_prepare(bh_yielder *yielder, bh_arena *arena, bh_error *err)
{
    size_t layers = 1;
    for (size_t t = 0; t < yielder->plan->target_count; t++)
        layers = yielder->plan->targets[t].layer_count > layers
                     ? yielder->plan->targets[t].layer_count
                     : layers;
    yielder->pair_spans = bh_arena_take(arena, layers, sizeof *yielder->pair_spans);
    yielder->pair_paths = bh_arena_take(arena, layers, sizeof *yielder->pair_paths);
    yielder->pair_ranges = bh_arena_take(arena, yielder->most_sheets, sizeof(const bh_range *));
    return yielder->pair_spans && yielder->pair_paths && yielder->pair_ranges
               ? BH_OK
               : bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
}

/* --- what both see --- */

/* Into the yielder's paths and spans: the part of each layer that both arms see. */
static bh_code set_paths(bh_yielder *yielder, const bh_arm_pair *pair, bh_error *err)
{
    const bh_view *one = &pair->one->view, *other = &pair->other->view;
    const bh_target *target = one->setting->target;
    bh_code code = bh_view_paths(yielder, other, target, &other->way, err);
    for (size_t l = 0; !code && l < target->layer_count; l++) {
        yielder->pair_spans[l] = yielder->spans[l];
        yielder->pair_paths[l] = yielder->paths[0][l];
    }
    if (!code)
        code = bh_view_paths(yielder, one, target, &one->way, err);
    for (size_t l = 0; !code && l < target->layer_count; l++) {
        bh_seen_span *span = &yielder->spans[l];
        const double width = span->to - span->from;
        span->from = fmax(span->from, yielder->pair_spans[l].from);
        span->to = fmax(span->from, fmin(span->to, yielder->pair_spans[l].to));
        if (width > 0)
            yielder->paths[0][l] *= (span->to - span->from) / width;
        for (int i = 0; i < 3; i++)
            yielder->paths[i][l] = fmin(yielder->paths[i][l], yielder->pair_paths[l]);
    }
    return code;
}

/* --- nuclides --- */

struct pairing {
    bh_yielder *yielder;
    const bh_arm_pair *pair;
    bh_yield *yield;
    const bh_standing *standing;
};

static bh_taking taking_of(const bh_view *view, const bh_channel *channel)
{
    const bh_particle particle = bh_channel_detected(channel);
    bh_taking t = {.cut = view->cut,
                   .bite = {.momentum_from = view->cut ? view->bite_from : 0,
                            .momentum_to = view->cut ? view->bite_to : (double)INFINITY},
                   .rms = bh_taking_rms(&view->arm->arm, &view->setting->beam),
                   .mass = particle.mass};
    const double threshold = view->arm->arm.threshold.value;
    t.cut = t.cut || threshold > 0;
    if (threshold > 0)
        bh_bite_from_threshold(&t.bite, t.mass, threshold);
    return t;
}

static bh_code set_joint(const struct pairing *p, const bh_channel *channel, bh_joint *j,
                         bh_error *err)
{
    const bh_view *views[BH_ARMS] = {&p->pair->one->view, &p->pair->other->view};
    const bh_range **ranges[BH_ARMS] = {p->yielder->ranges, p->yielder->pair_ranges};
    *j = (bh_joint){.channel = {*channel, *channel},
                    .losing = views[0]->way.losing,
                    .opposite = views[0]->arm->arm.side != views[1]->arm->arm.side};
    j->channel[1].recoil = !channel->recoil;
    for (int k = 0; k < BH_ARMS; k++) {
        j->taking[k] = taking_of(views[k], &j->channel[k]);
        if (!j->losing)
            continue;
        const bh_particle particle = bh_channel_detected(&j->channel[k]);
        j->leaver[k].ranges = ranges[k];
        const bh_code code = bh_leaver_make(p->yielder->workspace, &views[k]->way, &particle,
                                            channel->encounter.kinetic, &j->leaver[k]);
        if (code)
            return bh_fail(err, code, "%s", bh_code_text(code));
    }
    return BH_OK;
}

/* Radiation of the channel from `count` vertices in the yielder, as either arm sees it. */
static void set_radiated(const struct pairing *p, bh_joint *j, size_t count)
{
    const bh_view *views[BH_ARMS] = {&p->pair->one->view, &p->pair->other->view};
    for (int k = 0; k < BH_ARMS; k++) {
        bh_radiated_request request =
            bh_view_radiated(p->yielder, views[k], &j->channel[k], &views[k]->way, count);
        request.signal = true; /* the bites say what is kept */
        j->polar[k] = request.polar;
        bh_radiated_make(&request, &j->radiated[k]);
    }
}

static bh_code add_channel(struct pairing *p, bh_joint *j, const bh_nuclei *nuclei, size_t count,
                           bh_error *err)
{
    bh_yield *yield = p->yield;
    bh_seen_numbers *seen = &p->yielder->seen[nuclei->nuclide];
    const bool signal = nuclei->origin == BH_ORIGIN_SIGNAL;
    const bool main = signal && nuclei->nuclide == nuclei->list->main;
    bh_code code = BH_OK;
    for (int i = 0; !code && i < yield->view.parts; i++) {
        const bh_joint_request request = {p->standing, i, signal && !yield->view.without_changes};
        bh_joint_sum sum = {.events = {.converged = true}};
        for (size_t v = 0; !code && v < count; v++) {
            j->vertex = &p->yielder->vertices[v];
            code = bh_joint_add(j, &request, &sum, err);
        }
        bh_part_add(&yield->part[i], &sum.events, seen, nuclei->origin);
        if (main) /* fast and slow particles share one solid angle */
            yield->part[i].solid_angle = fmax(yield->part[i].solid_angle, sum.solid_angle);
        if (i == 0)
            seen->reached += seen->of[nuclei->origin] * sum.events.radiated;
        yield->converged = yield->converged && sum.events.converged;
    }
    return code;
}

/* Whether the second arm detects the partner of what the first does. */
static bool partner_is_seen(const bh_arm_pair *pair, const bh_channel *channel)
{
    const bh_detects detects = pair->other->view.arm->arm.detects;
    return detects != (channel->recoil ? BH_DETECTS_RECOIL : BH_DETECTS_SCATTERED);
}

static bh_code add_nuclide(struct pairing *p, size_t nuclide, bh_error *err)
{
    const bh_view *view = &p->pair->one->view;
    bh_channels channels;
    if (p->yielder->cancelled && p->yielder->cancelled(p->yielder->asker))
        return bh_fail(err, BH_ENOCONV, "the evaluation was cancelled");
    bh_code code =
        bh_view_channels(p->yielder, view, &view->list->nuclides[nuclide], &channels, err);
    for (size_t c = 0; !code && c < channels.count; c++) {
        bh_joint joint;
        if (!partner_is_seen(p->pair, &channels.list[c]))
            continue;
        code = set_joint(p, &channels.list[c], &joint, err);
        for (int o = 0; !code && o < BH_ORIGINS; o++) {
            const bh_nuclei nuclei = {
                .list = view->list, .nuclide = nuclide, .origin = (bh_origin)o};
            if (!(p->yielder->seen[nuclide].of[o] > 0))
                continue;
            const size_t count = bh_view_vertices(p->yielder, &view->way, &nuclei);
            set_radiated(p, &joint, count);
            code = add_channel(p, &joint, &nuclei, count, err);
        }
    }
    return code;
}

/* --- background --- */

static double rate_of(const bh_part *part)
{
    return part->signal + part->windows + part->other;
}

static double triggers_of(const bh_yield *yield)
{
    return rate_of(&yield->part[0]) + yield->view.arm->arm.other_rate.value;
}

/* Unrelated particles within the window; those of the first arm's other_rate are spread over its
 * bins as its events are. */
static void add_accidentals(const bh_arm_pair *pair, bh_yield *yield)
{
    const double all = rate_of(&pair->one->part[0]);
    for (int i = 0; i < yield->view.parts; i++) {
        const double share = all > 0 ? rate_of(&pair->one->part[i]) / all : i == 0;
        const bh_coincident_rates rates = {.window = pair->arm->window.value,
                                           .first = share * triggers_of(pair->one),
                                           .second = triggers_of(pair->other),
                                           .duty_factor =
                                               yield->view.setting->beam.duty_factor.value};
        yield->part[i].accidental = bh_counting_accidentals(&rates);
        yield->part[i].other += yield->part[i].accidental;
    }
}

static void finish(const bh_arm_pair *pair, bh_yield *yield)
{
    for (int i = 0; i < yield->view.parts; i++) {
        const bh_part *one = &pair->one->part[i];
        bh_part *part = &yield->part[i];
        bh_yield_finish(yield, part);
        part->point_cross_section = one->point_cross_section;
        part->dummy = one->windows > 0 ? part->windows * one->dummy / one->windows : 0;
    }
    add_accidentals(pair, yield);
}

bh_code bh_pair_make(bh_yielder *yielder, const bh_arm_pair *pair, bh_yield *yield, bh_error *err)
{
    bh_standing standing;
    struct pairing p = {.yielder = yielder, .pair = pair, .yield = yield, .standing = &standing};
    yield->view = pair->one->view;
    yield->view.arm = pair->arm;
    yield->converged = true;
    yield->seen = 0;
    for (int i = 0; i < yield->view.parts; i++)
        yield->part[i] = (bh_part){.angle = pair->one->part[i].angle};
    const bh_struck_list *list = yield->view.list;
    bh_code code = bh_stand(&pair->one->view.acceptance.spec, &pair->other->view.acceptance.spec,
                            &standing, err);
    if (!code)
        code = set_paths(yielder, pair, err);
    if (code)
        return code;
    bh_seen_set(yielder, list);
    for (size_t n = 0; !code && !yield->view.blocked && n < list->count; n++)
        code = add_nuclide(&p, n, err);
    for (size_t n = 0; n < list->count; n++)
        yield->seen += yielder->seen[n].of[BH_ORIGIN_SIGNAL];
    if (!code)
        code = bh_findings(yielder, yield, err);
    if (code)
        return code;
    bh_resolve_bins(yield);
    finish(pair, yield);
    return BH_OK;
}

void bh_pair_record(bh_arm_hours *arm, const bh_arm_hours *one, const bh_arm_hours *other)
{
    const bh_part *part = arm->yield->part;
    const double duty = arm->yield->view.setting->beam.duty_factor.value;
    bh_live *live = &arm->live;
    *live = (bh_live){.live_fraction = one->live.live_fraction * other->live.live_fraction,
                      .dead_part = one->live.dead_part * other->live.dead_part,
                      .prescale_part = one->live.prescale_part * other->live.prescale_part,
                      .limit_part = one->live.limit_part * other->live.limit_part};
    live->recorded = rate_of(&part[0]) / duty * live->live_fraction;
    for (int i = 0; i < arm->yield->view.parts; i++)
        arm->recorded[i] = (bh_recorded){.signal = part[i].signal * live->live_fraction,
                                         .windows = part[i].windows * live->live_fraction,
                                         .other = part[i].other * live->live_fraction};
}
