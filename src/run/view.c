/* view.c - one arm of one setting: where it stands, what it lets through, who can reach it. */
#include <math.h>
#include <string.h>

#include "beamhours/physics/validity.h"
#include "beamhours/run/yield.h"

static bh_acceptance_spec spec_of(const bh_setting_arm *arm)
{
    const bh_arm *a = &arm->arm;
    static const bh_acceptance_shape shapes[] = {[BH_SHAPE_RECTANGLE] = BH_ACCEPTANCE_RECTANGLE,
                                                 [BH_SHAPE_RING] = BH_ACCEPTANCE_RING,
                                                 [BH_SHAPE_POINT] = BH_ACCEPTANCE_POINT};
    bh_acceptance_spec spec = {.shape = shapes[a->shape],
                               .angle = arm->angle.value,
                               .solid_angle = a->solid_angle.given ? a->solid_angle.value : 0,
                               .bins = a->bins,
                               .edges = a->edges};
    if (a->shape == BH_SHAPE_RING) {
        spec.angle = 0;
        spec.ring_from = a->ring.from;
        spec.ring_to = a->ring.to;
        spec.azimuth = a->azimuth.value;
    } else if (a->shape == BH_SHAPE_RECTANGLE) {
        spec.in_plane_from = a->in_plane.from;
        spec.in_plane_to = a->in_plane.to;
        spec.out_of_plane_from = a->out_of_plane.from;
        spec.out_of_plane_to = a->out_of_plane.to;
    }
    return spec;
}

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
                                     .kinetic = beam->kinetic_energy.value}};
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

/* The momentum the arm is set to, and its bite. */
static bh_code set_momentum(bh_yielder *yielder, bh_view *view, bh_error *err)
{
    const bh_arm *arm = &view->arm->arm;
    const bh_struck *struck = &view->list->nuclides[view->list->main];
    bh_channels channels = {.count = 0};
    const bh_code code = bh_view_channels(yielder, view, struck, &channels, err);
    if (code)
        return code;
    const bh_channel *first = &channels.list[0];
    bh_event event;
    view->central_momentum = (double)NAN;
    if (view->arm->central_momentum.given)
        view->central_momentum = view->arm->central_momentum.value;
    else if (view->axis <= bh_channel_largest_angle(first) &&
             !bh_channel_event(first, view->axis, &event, NULL))
        view->central_momentum = first->recoil ? event.recoil_momentum : event.scattered_momentum;
    view->cut = arm->momentum_bite.given && view->central_momentum > 0;
    if (!view->cut)
        return BH_OK;
    view->bite_from = fmax(0, view->central_momentum * (1 + arm->momentum_bite.from));
    view->bite_to = view->central_momentum * (1 + arm->momentum_bite.to);
    return BH_OK;
}

bh_code bh_view_make(bh_yielder *yielder, const bh_setting *setting, const bh_setting_arm *arm,
                     bh_view *view, bh_error *err)
{
    *view = (bh_view){.setting = setting,
                      .arm = arm,
                      .list = &yielder->lists[setting->target - yielder->plan->targets],
                      .process = bh_process_find(setting->process.text),
                      .spec = spec_of(arm),
                      .beam = setting->beam.particle_rate.value * setting->beam.fraction.value,
                      .parts = 1};
    if (!view->process)
        return bh_fail(err, BH_EPLAN, "no process %s", setting->process.text);
    view->axis = arm->arm.shape == BH_SHAPE_RING ? (arm->arm.ring.from + arm->arm.ring.to) / 2
                                                 : arm->angle.value;
    return set_momentum(yielder, view, err);
}
