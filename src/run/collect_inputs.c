/* collect_inputs.c - what the uncertainties written in a plan make of the rates of an arm. */
#include <math.h>
#include <stddef.h>
#include <stdio.h>
#include <stdlib.h>

#include "beamhours/run/collecting.h"
#include "beamhours/units/constants.h"

enum { KEY = 256 };

static double relative(const bh_value *v)
{
    return v->value != 0 ? v->uncertainty / fabs(v->value) : 0;
}

static bool uncertain(const bh_value *v)
{
    return v->uncertainty > 0;
}

static const char *text_of(const bh_word *name)
{
    return name->text ? name->text : "";
}

static const char *beam_key(const bh_collecting *c, bh_mark at, const char *member, char key[KEY])
{
    const bh_beam *all = &c->yielder->plan->beam;
    const bh_mark marks[] = {all->current.at,  all->particle_rate.at,   all->energy_written.at,
                             all->fraction.at, all->momentum_spread.at, all->duty_factor.at};
    bool common = false;
    for (size_t i = 0; i < sizeof marks / sizeof marks[0]; i++)
        common = common || (marks[i].line == at.line && marks[i].column == at.column);
    if (common)
        snprintf(key, KEY, "beam.%s", member);
    else
        snprintf(key, KEY, "settings.%s.beam.%s", c->setting->name, member);
    return key;
}

static const char *arm_key(const bh_collecting *c, const char *member, char key[KEY])
{
    snprintf(key, KEY, "arms.%s.%s", text_of(&c->plan->arm.name), member);
    return key;
}

static const char *setting_key(const bh_collecting *c, const char *member, char key[KEY])
{
    snprintf(key, KEY, "settings.%s.%s", c->setting->name, member);
    return key;
}

static bh_cause cause_at(bh_cause_kind kind, bh_mark at, const char *key)
{
    return (bh_cause){.kind = kind, .at = at, .key = key};
}

/* A cause whose effect is a sensitivity of each part times `by`. */
static void collect_sensitive(bh_collecting *c, const bh_cause *cause, ptrdiff_t sensitivity,
                              double by)
{
    const bh_part *part = c->arm->yield->part;
    double *to = by != 0 && isfinite(by) ? bh_collect(c, cause, 0) : NULL;
    for (size_t i = 0; to && i < c->parts; i++) {
        const double slope =
            *(const double *)(const void *)((const unsigned char *)&part[i] + sensitivity);
        to[i] += isfinite(slope) ? slope * by : 0;
    }
}

/* --- what only evaluating again tells --- */

/* A copy of a setting and its arm, in which one value is moved. */
struct moved {
    bh_setting setting;
    bh_setting_arm arm;
    bh_value *value; /* in one of them */
};

/* Both sides of the value, but not below `least`. */
static void collect_moved(bh_collecting *c, const bh_cause *cause, struct moved *m, double least)
{
    const double at = m->value->value, sigma = m->value->uncertainty;
    const double low = fmax(at - sigma, least), high = at + sigma;
    double *const *signal = c->with->signals;
    m->value->value = low;
    bh_collect_signals(c, &m->setting, &m->arm, signal[0]);
    m->value->value = high;
    bh_collect_signals(c, &m->setting, &m->arm, signal[1]);
    double *to = bh_collect(c, cause, 0);
    for (size_t i = 0; to && i < c->parts; i++) {
        const double usual = c->arm->yield->part[i].signal;
        to[i] += usual > 0 ? (signal[1][i] - signal[0][i]) / usual * sigma / (high - low) : 0;
    }
}

/* --- beam --- */

/* A kind of particle with another charge changes how many a current brings. */
static void collect_others(bh_collecting *c)
{
    const bh_beam *b = &c->setting->beam;
    char key[KEY];
    const double per_particle = b->current.value / b->particle_rate.value / BH_ELEMENTARY;
    for (size_t i = 0; !b->rate_written && i < b->other_count; i++) {
        const bh_beam_other *other = &b->others[i];
        const bh_cause cause =
            cause_at(BH_CAUSE_OTHERS, other->share.at, beam_key(c, other->share.at, "others", key));
        const double more = abs(other->particle.charge) - abs(b->charge);
        bh_collect_same(c, &cause, -more / per_particle * other->share.uncertainty);
    }
}

static void collect_energy(bh_collecting *c)
{
    const bh_beam *b = &c->setting->beam;
    char key[KEY];
    const double mass = b->particle.mass, kinetic = b->kinetic_energy.value;
    const double by = b->kinetic_energy.uncertainty * (kinetic + mass) /
                      (kinetic * (kinetic + 2 * mass)); /* dp/p = E dT / p^2 */
    const char *member = b->energy_key.text ? b->energy_key.text : "kinetic_energy";
    const bh_cause cause = cause_at(BH_CAUSE_ENERGY, b->energy_written.at,
                                    beam_key(c, b->energy_written.at, member, key));
    collect_sensitive(c, &cause, offsetof(bh_part, per_momentum), by);
}

void bh_collect_beam(bh_collecting *c)
{
    const bh_beam *b = &c->setting->beam;
    char key[KEY];
    const bh_value *many = b->rate_written ? &b->particle_rate : &b->current;
    bh_cause cause =
        cause_at(b->rate_written ? BH_CAUSE_PARTICLE_RATE : BH_CAUSE_CURRENT, many->at,
                 beam_key(c, many->at, b->rate_written ? "particle_rate" : "current", key));
    bh_collect_same(c, &cause, relative(many));
    cause =
        cause_at(BH_CAUSE_FRACTION, b->fraction.at, beam_key(c, b->fraction.at, "fraction", key));
    bh_collect_same(c, &cause, relative(&b->fraction));
    collect_others(c);
    collect_energy(c);
    if (uncertain(&b->momentum_spread)) {
        struct moved m = {.setting = *c->setting, .arm = *c->plan};
        m.value = &m.setting.beam.momentum_spread;
        cause = cause_at(BH_CAUSE_SPREAD, b->momentum_spread.at,
                         beam_key(c, b->momentum_spread.at, "momentum_spread", key));
        collect_moved(c, &cause, &m, 0);
    }
}

/* --- target --- */

static const char *layer_key(const bh_collecting *c, size_t layer, const char *member,
                             char key[KEY])
{
    const bh_target *target = c->setting->target;
    const bh_document *document = c->yielder->plan->document;
    const bool only = document && bh_node_get(bh_document_root(document), "target");
    snprintf(key, KEY, "%s%s.layers.%zu.%s", only ? "target" : "targets.",
             only ? "" : text_of(&target->name), layer + 1, member);
    return key;
}

/* More nuclei of a layer by the share `by`: more signal where they are scatterers; where they are
 * subtracted as computed, the signal is wrong by as much. */
static void collect_nuclei(bh_collecting *c, const bh_cause *cause, size_t layer, double by)
{
    const bh_share *share = &c->layers[layer];
    const bool measured = c->arm->empty.measured;
    double *to = by != 0 && isfinite(by) ? bh_collect(c, cause, 0) : NULL;
    for (size_t i = 0; to && i < c->parts; i++) {
        const bh_part *p = &c->arm->yield->part[i];
        const double wrong = p->other * share->other + (measured ? 0 : p->windows * share->windows);
        to[i] += by * share->signal - (p->signal > 0 ? by * wrong / p->signal : 0);
    }
}

/* Where the arm sees a part of the target: the paths with layer `layer` (none: past the last)
 * thicker by `thicker` [cm], all tilted by `tilted` [rad] more. */
static bh_code paths_with(bh_collecting *c, size_t layer, double thicker, double tilted,
                          double *path)
{
    const bh_target *target = c->setting->target;
    const bh_view *view = &c->arm->yield->view;
    const bh_extent *seen = &c->plan->arm.target_view;
    bh_seen_layer *layers = c->yielder->layers;
    for (size_t l = 0; l < target->layer_count; l++)
        layers[l] = (bh_seen_layer){.thickness = target->layers[l].thickness.value +
                                                 (l == layer ? thicker : 0),
                                    .sample = target->layers[l].role == BH_ROLE_SAMPLE};
    const bh_seen_view how = {.limited = seen->given,
                              .from = seen->from,
                              .to = seen->to,
                              .angle = view->axis,
                              .tilt = c->setting->tilt.value + tilted};
    return bh_seen_paths(&how, target->layer_count, layers, path, c->err);
}

/* The relative change of the signal when the paths change from low to high. */
static double path_change(const bh_collecting *c)
{
    double change = 0;
    for (size_t l = 0; l < c->setting->target->layer_count; l++) {
        const double low = c->with->paths[0][l], high = c->with->paths[1][l];
        change += low + high > 0 ? c->layers[l].signal * (high - low) / (high + low) : 0;
    }
    return change;
}

/* What moving the layers, or turning them, changes in what is seen. */
static void collect_paths(bh_collecting *c, const bh_cause *cause, size_t layer, double thicker,
                          double tilted)
{
    if (c->code)
        return;
    bh_collect_fail(c, paths_with(c, layer, -thicker, -tilted, c->with->paths[0]));
    if (!c->code)
        bh_collect_fail(c, paths_with(c, layer, thicker, tilted, c->with->paths[1]));
    if (!c->code)
        bh_collect_same(c, cause, path_change(c));
}

/* One value of a layer: `by` more nuclei, and a layer thicker by `thicker` [cm], for one standard
 * uncertainty of it. */
struct layer_value {
    bh_cause_kind kind;
    const char *member;
    const bh_value *value;
    double by, thicker;
};

static void collect_layer_value(bh_collecting *c, size_t layer, const struct layer_value *v)
{
    char key[KEY];
    if (!uncertain(v->value))
        return;
    const bh_cause cause = cause_at(v->kind, v->value->at, layer_key(c, layer, v->member, key));
    collect_nuclei(c, &cause, layer, v->by);
    if (c->plan->arm.target_view.given && v->thicker != 0)
        collect_paths(c, &cause, layer, v->thicker, 0);
}

static void collect_layer(bh_collecting *c, size_t i)
{
    const bh_layer *l = &c->setting->target->layers[i];
    const char *size = text_of(&l->size_key);
    /* A size in g/cm2 or nuclei asks for the density only to know how long the layer is. */
    const double number = size[0] == 't' ? 1 : 0, length = number - 1;
    const double thick = l->thickness.value;
    const double dense = relative(&l->density), hot = relative(&l->temperature),
                 press = relative(&l->pressure);
    const bh_value written = {.uncertainty = l->areal_number.uncertainty, .at = l->size_key.at};
    const struct layer_value values[] = {
        {BH_CAUSE_THICKNESS, size, &written, relative(&l->areal_number), l->thickness.uncertainty},
        {BH_CAUSE_DENSITY, "density", &l->density, number * dense, length * thick * dense},
        {BH_CAUSE_TEMPERATURE, "temperature", &l->temperature, -number * hot,
         -length * thick * hot},
        {BH_CAUSE_PRESSURE, "pressure", &l->pressure, number * press, length * thick * press}};
    for (size_t k = 0; k < sizeof values / sizeof values[0]; k++)
        collect_layer_value(c, i, &values[k]);
}

void bh_collect_target(bh_collecting *c)
{
    const bh_target *target = c->setting->target;
    const bh_value *tilt = &c->setting->tilt;
    for (size_t i = 0; i < target->layer_count; i++)
        collect_layer(c, i);
    char key[KEY];
    const bh_cause cause = cause_at(BH_CAUSE_TILT, tilt->at, setting_key(c, "tilt", key));
    if (uncertain(tilt))
        collect_paths(c, &cause, target->layer_count, 0, tilt->uncertainty);
}

/* --- arm --- */

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
    char key[KEY];
    const ptrdiff_t turn = offsetof(bh_part, per_radian);
    const double off = s->q2.given ? uncertain(&s->q2) ? angle_of_q2(c) : 0 : s->angle.uncertainty;
    bh_cause cause =
        cause_at(BH_CAUSE_ANGLE, s->angle.at, setting_key(c, s->q2.given ? "q2" : "angle", key));
    if (s->arm.shape == BH_SHAPE_RING)
        return;
    collect_sensitive(c, &cause, turn, off);
    cause = cause_at(BH_CAUSE_POINTING, s->arm.pointing.at, arm_key(c, "pointing", key));
    collect_sensitive(c, &cause, turn, s->arm.pointing.uncertainty);
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
    char key[KEY];
    for (size_t i = 0; i < sizeof acting / sizeof acting[0]; i++) {
        struct moved m = {.setting = *c->setting, .arm = *c->plan};
        m.value = value_at(&m.arm, acting[i].offset);
        if (!uncertain(m.value))
            continue;
        const char *where = acting[i].kind == BH_CAUSE_CENTRAL_MOMENTUM
                                ? setting_key(c, acting[i].member, key)
                                : arm_key(c, acting[i].member, key);
        const bh_cause cause = cause_at(acting[i].kind, m.value->at, where);
        collect_moved(c, &cause, &m, 0);
    }
}

void bh_collect_arm(bh_collecting *c)
{
    const bh_arm *a = &c->plan->arm;
    char key[KEY];
    collect_angles(c);
    collect_acting(c);
    bh_cause cause =
        cause_at(BH_CAUSE_SOLID_ANGLE, a->solid_angle.at, arm_key(c, "solid_angle", key));
    if (a->solid_angle.given)
        bh_collect_same(c, &cause, relative(&a->solid_angle));
    cause = cause_at(BH_CAUSE_AZIMUTH, a->azimuth.at, arm_key(c, "azimuth", key));
    if (a->shape == BH_SHAPE_RING && !a->solid_angle.given)
        bh_collect_same(c, &cause, relative(&a->azimuth));
    cause = cause_at(BH_CAUSE_EFFICIENCY, a->efficiency.at, arm_key(c, "efficiency", key));
    bh_collect_same(c, &cause, relative(&a->efficiency));
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

static void collect_live(bh_collecting *c, const bh_cause *cause, struct moved *m, double most)
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
    char key[KEY];
    struct moved m = {.setting = *c->setting, .arm = *c->plan};
    for (size_t i = 0; i < sizeof values / sizeof values[0]; i++) {
        m.arm = *c->plan;
        m.value = value_at(&m.arm, values[i].offset);
        const bh_cause cause =
            cause_at(values[i].kind, m.value->at, arm_key(c, values[i].member, key));
        if (uncertain(m.value))
            collect_live(c, &cause, &m, HUGE_VAL);
    }
    m.arm = *c->plan;
    m.value = &m.setting.beam.duty_factor;
    const bh_cause cause =
        cause_at(BH_CAUSE_DUTY_FACTOR, m.value->at, beam_key(c, m.value->at, "duty_factor", key));
    if (uncertain(m.value))
        collect_live(c, &cause, &m, 1);
}
