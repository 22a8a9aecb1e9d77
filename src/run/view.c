/* view.c - one arm of one setting: where it stands, what it lets through, who can reach it. */
#include <math.h>
#include <string.h>

#include "beamhours/physics/validity.h"
#include "beamhours/run/resolution.h"
#include "beamhours/run/systematic.h"
#include "beamhours/run/taking.h"
#include "beamhours/run/yield.h"

/* A hadron or ion too slow to reach the nucleus meets all of its charge from outside, where it acts
 * as a point (Gauss); the form factor of a plane wave would be wrong by orders of magnitude. */
static const char *model_for(const bh_yielder *yielder, const bh_encounter *e)
{
    const char *name = bh_plan_structure(yielder->plan, e->z, e->a);
    const bool choose = !name || strcmp(name, "default") == 0;
    const bool outside =
        e->beam->kind != BH_KIND_LEPTON && e->kinetic < bh_validity_nuclear(e).kinetic;
    return choose && outside ? "point" : name;
}

static void add_channel(bh_channels *channels, const bh_channel *base, bh_branch branch,
                        bool recoil)
{
    bh_channel *c = &channels->list[channels->count++];
    *c = *base;
    c->branch = branch;
    c->recoil = recoil;
}

bh_code bh_view_channels(bh_yielder *yielder, const bh_view *view, const bh_struck *struck,
                         bh_channels *channels, bh_error *err)
{
    const bh_beam *beam = &view->setting->beam;
    const bh_detects detects = view->arm->arm.detects;
    bh_channel base = {.process = view->process,
                       .encounter = {.beam = &beam->particle,
                                     .charge = beam->charge,
                                     .z = struck->z,
                                     .a = struck->a,
                                     .target = struck->mass,
                                     .kinetic = view->vertex_kinetic}};
    bh_encounter *e = &base.encounter;
    e->structure =
        bh_workspace_structure(yielder->workspace, model_for(yielder, e), e->z, e->a, err);
    if (!e->structure)
        return err->code;
    channels->count = 0;
    if (detects != BH_DETECTS_RECOIL)
        add_channel(channels, &base, BH_BRANCH_FAST, false);
    if (detects != BH_DETECTS_RECOIL && beam->particle.mass > struck->mass)
        add_channel(channels, &base, BH_BRANCH_SLOW, false);
    if (detects != BH_DETECTS_SCATTERED)
        add_channel(channels, &base, BH_BRANCH_FAST, true);
    return BH_OK;
}

static double momentum_of(double mass, double kinetic)
{
    return sqrt(kinetic * (kinetic + 2 * mass));
}

bh_channel_request bh_view_request(const bh_yielder *yielder, const bh_view *view,
                                   const bh_channel *channel, const bh_way *way, size_t count)
{
    const bh_value *threshold = &view->arm->arm.threshold;
    const double mass = channel->recoil ? channel->encounter.target : channel->encounter.beam->mass;
    const double least = threshold->given ? momentum_of(mass, threshold->value) : 0;
    return (bh_channel_request){.channel = *channel,
                                .acceptance = view->acceptance.spec,
                                .cut = view->cut || least > 0,
                                .momentum_from = fmax(view->bite_from, least),
                                .momentum_to = fmax(view->bite_to, least),
                                .rms = bh_taking_rms(&view->arm->arm, &view->setting->beam),
                                .bins = view->parts > 1,
                                .way = way,
                                .vertices = yielder->vertices,
                                .vertex_count = count,
                                .ranges = yielder->ranges};
}

/* Momentum of the detected particle on the arm's axis when it arrives, mean over the depths that it
 * comes out of; NAN where there is none.  The vertices are in the yielder. */
static bh_code arriving(bh_yielder *yielder, const bh_view *view, const bh_channel *channel,
                        size_t count, double *momentum)
{
    bh_leaver leaver = {.ranges = yielder->ranges};
    const bh_particle particle = bh_channel_detected(channel);
    const bh_code code = bh_leaver_make(yielder->workspace, &view->way, &particle,
                                        view->setting->beam.kinetic_energy.value, &leaver);
    double sum = 0, weight = 0;
    for (size_t i = 0; !code && i < count; i++) {
        const bh_vertex *v = &yielder->vertices[i];
        bh_channel there = *channel;
        bh_event event;
        there.encounter.kinetic = v->kinetic[BH_AS_IT_IS];
        if (!bh_channel_has(&there, view->axis, &event))
            continue;
        const double kinetic = channel->recoil ? event.recoil_kinetic : event.scattered_kinetic;
        const double left = bh_leaver_left(&leaver, v, view->axis, kinetic);
        if (!(left > 0))
            continue;
        sum += v->weight * momentum_of(particle.mass, left);
        weight += v->weight;
    }
    *momentum = weight > 0 ? sum / weight : (double)NAN;
    return code;
}

/* Without losses, at the mean energy. */
static void set_central(bh_view *view, const bh_channel *first)
{
    bh_event event;
    if (bh_channel_has(first, view->axis, &event))
        view->central_momentum = first->recoil ? event.recoil_momentum : event.scattered_momentum;
}

/* The momentum the arm is set to, and its bite; `count` vertices of the scatterer. */
static bh_code set_momentum(bh_yielder *yielder, bh_view *view, size_t count, bh_error *err)
{
    const bh_arm *arm = &view->arm->arm;
    const bh_struck *struck = &view->list->nuclides[view->list->main];
    bh_channels channels = {.count = 0};
    bh_code code = bh_view_channels(yielder, view, struck, &channels, err);
    if (code)
        return code;
    view->central_momentum = (double)NAN;
    set_central(view, &channels.list[0]);
    if (view->way.losing && view->central_momentum > 0) {
        code = arriving(yielder, view, &channels.list[0], count, &view->central_momentum);
        view->stuck = !(view->central_momentum > 0) && !view->blocked;
    }
    if (view->arm->central_momentum.given)
        view->central_momentum = view->arm->central_momentum.value;
    view->angle_rms = bh_view_angle_rms(yielder, view, &channels.list[0], count);
    view->bite_to = (double)INFINITY;
    view->cut = arm->momentum_bite.given && view->central_momentum > 0;
    if (!view->cut || code)
        return code ? bh_fail(err, code, "%s", bh_code_text(code)) : BH_OK;
    view->bite_from = fmax(0, view->central_momentum * (1 + arm->momentum_bite.from));
    view->bite_to = view->central_momentum * (1 + arm->momentum_bite.to);
    return BH_OK;
}

/* Some of the sample that is to be seen is not reached. */
static bool is_blocked(const bh_yielder *yielder, const bh_view *view)
{
    const bh_way *way = &view->way;
    bool blocked = false;
    for (size_t l = way->stops; l < way->layer_count; l++)
        blocked = blocked || (view->setting->target->layers[l].role == BH_ROLE_SAMPLE &&
                              yielder->spans[l].to > yielder->spans[l].from);
    return blocked;
}

/* The beam's way, where on it the scatterer is, and the momentum that then arrives. */
static bh_code set_way(bh_yielder *yielder, bh_view *view, bh_error *err)
{
    const bh_target *target = view->setting->target;
    bh_code code = bh_view_way(yielder, view, target, &view->way, err);
    if (!code)
        code = bh_view_paths(yielder, view, target, &view->way, err);
    if (code)
        return code;
    view->blocked = is_blocked(yielder, view);
    const bh_nuclei scatterer = {
        .list = view->list, .nuclide = view->list->main, .origin = BH_ORIGIN_SIGNAL};
    bh_channels channels;
    const size_t count = bh_view_vertices(yielder, &view->way, &scatterer);
    view->vertex_kinetic = view->way.losing && count > 0
                               ? bh_vertices_mean(yielder->vertices, count)
                               : view->way.kinetic;
    code = set_momentum(yielder, view, count, err);
    if (!code)
        code = bh_view_channels(yielder, view, &view->list->nuclides[view->list->main], &channels,
                                err);
    if (code)
        return code;
    view->line = channels.list[0];
    view->radiative = bh_radiative_find(yielder->plan->models.radiative.text);
    code = bh_view_gate(yielder, view, count);
    return code ? bh_fail(err, code, "%s", bh_code_text(code)) : BH_OK;
}

bh_code bh_view_make(bh_yielder *yielder, const bh_setting *setting, const bh_setting_arm *arm,
                     bh_view *view, bh_error *err)
{
    *view =
        (bh_view){.setting = setting,
                  .arm = arm,
                  .list = &yielder->lists[setting->target - yielder->plan->targets],
                  .process = bh_process_find(setting->process.text),
                  .without_changes = yielder->without_changes && !bh_rests_on_changes(setting, arm),
                  .beam = setting->beam.particle_rate.value * setting->beam.fraction.value,
                  .parts = 1};
    if (!view->process)
        return bh_fail(err, BH_EPLAN, "no process %s", setting->process.text);
    const bh_acceptance_spec spec = bh_arm_acceptance(arm);
    const bh_code code = bh_acceptance_make(&spec, &view->acceptance, err);
    if (code)
        return code;
    view->axis = arm->arm.shape == BH_SHAPE_RING ? (arm->arm.ring.from + arm->arm.ring.to) / 2
                                                 : arm->angle.value;
    return set_way(yielder, view, err);
}
