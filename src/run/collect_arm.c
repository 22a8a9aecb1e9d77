/* collect_arm.c - what the uncertainties of an arm make of its rates, and of what it records. */
#include <math.h>
#include <stddef.h>

#include "beamhours/run/collecting.h"

/* [rad] by which the arm is off where its place was written as a momentum transfer. */
static double angle_of_q2(bh_collecting *c)
{
    const bh_value *q2 = &c->plan->q2;
    const bh_beam *b = &c->setting->beam;
    const bh_struck_list *list = c->arm->yield->view.list;
    const bh_collision in = {.mass = b->particle.mass,
                             .target = list->nuclides[list->main].mass,
                             .kinetic = b->kinetic_energy.value};
    bh_event low, high;
    if (bh_kinematics_q2(&in, fmax(0, q2->value - q2->uncertainty), &low, NULL) ||
        bh_kinematics_q2(&in, q2->value + q2->uncertainty, &high, NULL))
        return 0;
    const bool recoil = c->plan->arm.detects == BH_DETECTS_RECOIL;
    return (recoil ? high.recoil_angle - low.recoil_angle
                   : high.scattered_angle - low.scattered_angle) /
           2;
}

static void collect_angles(bh_collecting *c)
{
    const bh_setting_arm *s = c->plan;
    char key[BH_CAUSE_KEY];
    const ptrdiff_t turn = offsetof(bh_part, per_radian);
    const double off =
        s->q2.given ? s->q2.uncertainty > 0 ? angle_of_q2(c) : 0 : s->angle.uncertainty;
    bh_cause cause = bh_collect_cause(BH_CAUSE_ANGLE, s->angle.at,
                                      bh_collect_setting_key(c, s->q2.given ? "q2" : "angle", key));
    if (s->arm.shape == BH_SHAPE_RING)
        return;
    bh_collect_sensitive(c, &cause, turn, off);
    cause = bh_collect_cause(BH_CAUSE_POINTING, s->arm.pointing.at,
                             bh_collect_arm_key(c, "pointing", key));
    bh_collect_sensitive(c, &cause, turn, s->arm.pointing.uncertainty);
}

/* Values that act through what is kept. */
static const struct {
    bh_cause_kind kind;
    const char *member;
    size_t offset; /* in bh_setting_arm */
} acting[] = {
    {BH_CAUSE_CENTRAL_MOMENTUM, "central_momentum", offsetof(bh_setting_arm, central_momentum)},
    {BH_CAUSE_ENERGY_CUT, "energy_cut", offsetof(bh_setting_arm, arm.energy_cut)},
    {BH_CAUSE_ANGLE_RESOLUTION, "angle_resolution", offsetof(bh_setting_arm, arm.angle_resolution)},
    {BH_CAUSE_MOMENTUM_RESOLUTION, "momentum_resolution",
     offsetof(bh_setting_arm, arm.momentum_resolution)},
    {BH_CAUSE_ENERGY_RESOLUTION, "energy_resolution",
     offsetof(bh_setting_arm, arm.energy_resolution)},
    {BH_CAUSE_THRESHOLD, "threshold", offsetof(bh_setting_arm, arm.threshold)}};

static bh_value *value_at(bh_setting_arm *arm, size_t offset)
{
    return (bh_value *)(void *)((unsigned char *)arm + offset);
}

static void collect_acting(bh_collecting *c)
{
    char key[BH_CAUSE_KEY];
    for (size_t i = 0; i < sizeof acting / sizeof acting[0]; i++) {
        bh_moved m = {.setting = *c->setting, .arm = *c->plan};
        m.value = value_at(&m.arm, acting[i].offset);
        if (!(m.value->uncertainty > 0))
            continue;
        const char *where = acting[i].kind == BH_CAUSE_CENTRAL_MOMENTUM
                                ? bh_collect_setting_key(c, acting[i].member, key)
                                : bh_collect_arm_key(c, acting[i].member, key);
        const bh_cause cause = bh_collect_cause(acting[i].kind, m.value->at, where);
        bh_collect_moved(c, &cause, &m, 0);
    }
}

void bh_collect_arm(bh_collecting *c)
{
    const bh_arm *a = &c->plan->arm;
    char key[BH_CAUSE_KEY];
    collect_angles(c);
    collect_acting(c);
    bh_cause cause = bh_collect_cause(BH_CAUSE_SOLID_ANGLE, a->solid_angle.at,
                                      bh_collect_arm_key(c, "solid_angle", key));
    if (a->solid_angle.given)
        bh_collect_same(c, &cause, bh_collect_relative(&a->solid_angle));
    cause =
        bh_collect_cause(BH_CAUSE_AZIMUTH, a->azimuth.at, bh_collect_arm_key(c, "azimuth", key));
    if (a->shape == BH_SHAPE_RING && !a->solid_angle.given)
        bh_collect_same(c, &cause, bh_collect_relative(&a->azimuth));
    cause = bh_collect_cause(BH_CAUSE_EFFICIENCY, a->efficiency.at,
                             bh_collect_arm_key(c, "efficiency", key));
    bh_collect_same(c, &cause, bh_collect_relative(&a->efficiency));
}

/* --- readout: counts, not rates --- */

/* The live fraction with other values; NAN where there is none. */
static double live_with(const bh_collecting *c, const bh_setting_arm *plan, const bh_beam *beam)
{
    bh_yield yield = *c->arm->yield;
    yield.view.arm = plan;
    yield.view.parts = 0; /* nothing recorded is wanted */
    bh_arm_hours hours = {.yield = &yield};
    return bh_hours_record(&hours, beam, NULL) ? (double)NAN : hours.live.live_fraction;
}

static void collect_live(bh_collecting *c, const bh_cause *cause, bh_moved *m, double most)
{
    const double at = m->value->value, sigma = m->value->uncertainty;
    const double low = fmax(at - sigma, at * 1e-3), high = fmin(at + sigma, most);
    if (!(sigma > 0 && high > low))
        return;
    m->value->value = low;
    const double from = live_with(c, &m->arm, &m->setting.beam);
    m->value->value = high;
    const double to = live_with(c, &m->arm, &m->setting.beam);
    const double usual = c->arm->live.live_fraction;
    bh_collect_same(c, cause, usual > 0 ? (to - from) / usual * sigma / (high - low) : 0);
}

void bh_collect_readout(bh_collecting *c)
{
    static const struct {
        bh_cause_kind kind;
        const char *member;
        size_t offset;
    } values[] = {{BH_CAUSE_DEAD_TIME, "dead_time", offsetof(bh_setting_arm, arm.dead_time)},
                  {BH_CAUSE_RATE_LIMIT, "rate_limit", offsetof(bh_setting_arm, arm.rate_limit)},
                  {BH_CAUSE_OTHER_RATE, "other_rate", offsetof(bh_setting_arm, arm.other_rate)}};
    char key[BH_CAUSE_KEY];
    bh_moved m = {.setting = *c->setting, .arm = *c->plan};
    for (size_t i = 0; i < sizeof values / sizeof values[0]; i++) {
        m.arm = *c->plan;
        m.value = value_at(&m.arm, values[i].offset);
        const bh_cause cause = bh_collect_cause(values[i].kind, m.value->at,
                                                bh_collect_arm_key(c, values[i].member, key));
        if (m.value->uncertainty > 0)
            collect_live(c, &cause, &m, HUGE_VAL);
    }
    m.arm = *c->plan;
    m.value = &m.setting.beam.duty_factor;
    const bh_cause cause = bh_collect_cause(
        BH_CAUSE_DUTY_FACTOR, m.value->at, bh_collect_beam_key(c, m.value->at, "duty_factor", key));
    if (m.value->uncertainty > 0)
        collect_live(c, &cause, &m, 1);
}
