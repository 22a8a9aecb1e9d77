/* collect_beam.c - what the uncertainties of the beam make of the rates of an arm. */
#include <math.h>
#include <stddef.h>
#include <stdio.h>
#include <stdlib.h>

#include "beamhours/run/collecting.h"
#include "beamhours/run/passage.h"
#include "beamhours/units/constants.h"

/* A kind of particle with another charge changes how many a current brings. */
static void collect_others(bh_collecting *c)
{
    const bh_beam *b = &c->setting->beam;
    char key[BH_CAUSE_KEY], member[32];
    const double per_particle = b->current.value / b->particle_rate.value / BH_ELEMENTARY;
    for (size_t i = 0; !b->rate_written && i < b->other_count; i++) {
        const bh_beam_other *other = &b->others[i];
        snprintf(member, sizeof member, "others.%s", other->particle.name);
        const bh_cause cause = bh_collect_cause(
            BH_CAUSE_OTHERS, other->share.at, bh_collect_beam_key(c, other->share.at, member, key));
        const double more = abs(other->particle.charge) - abs(b->charge);
        bh_collect_same(c, &cause, -more / per_particle * other->share.uncertainty);
    }
}

static void collect_energy(bh_collecting *c)
{
    const bh_beam *b = &c->setting->beam;
    char key[BH_CAUSE_KEY];
    const double mass = b->particle.mass, kinetic = b->kinetic_energy.value;
    const double by = b->kinetic_energy.uncertainty * (kinetic + mass) /
                      (kinetic * (kinetic + 2 * mass)); /* dp/p = E dT / p^2 */
    const char *member = b->energy_key.text ? b->energy_key.text : "kinetic_energy";
    const bh_cause cause =
        bh_collect_cause(BH_CAUSE_ENERGY, b->energy_written.at,
                         bh_collect_beam_key(c, b->energy_written.at, member, key));
    bh_collect_sensitive(c, &cause, offsetof(bh_part, per_momentum), by);
}

/* The share by which the signal falls, from less density, for a share more of current. */
static double thinned(const bh_collecting *c)
{
    const bh_target *target = c->setting->target;
    double sum = 0;
    for (size_t l = 0; l < target->layer_count; l++) {
        const double left = bh_density_left(&target->layers[l], &c->setting->beam);
        sum += left > 0 ? c->layers[l].signal * (1 - left) / left : 0;
    }
    return sum;
}

void bh_collect_beam(bh_collecting *c)
{
    const bh_beam *b = &c->setting->beam;
    char key[BH_CAUSE_KEY];
    const bh_value *many = b->rate_written ? &b->particle_rate : &b->current;
    bh_cause cause = bh_collect_cause(
        b->rate_written ? BH_CAUSE_PARTICLE_RATE : BH_CAUSE_CURRENT, many->at,
        bh_collect_beam_key(c, many->at, b->rate_written ? "particle_rate" : "current", key));
    bh_collect_same(c, &cause, bh_collect_relative(many) * (1 - thinned(c)));
    cause = bh_collect_cause(BH_CAUSE_FRACTION, b->fraction.at,
                             bh_collect_beam_key(c, b->fraction.at, "fraction", key));
    bh_collect_same(c, &cause, bh_collect_relative(&b->fraction));
    collect_others(c);
    collect_energy(c);
    if (b->momentum_spread.uncertainty > 0) {
        bh_moved m = {.setting = *c->setting, .arm = *c->plan};
        m.value = &m.setting.beam.momentum_spread;
        cause =
            bh_collect_cause(BH_CAUSE_SPREAD, b->momentum_spread.at,
                             bh_collect_beam_key(c, b->momentum_spread.at, "momentum_spread", key));
        bh_collect_moved(c, &cause, &m, 0);
    }
}
