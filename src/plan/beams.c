/* beams.c - the beam: particle, energy, current and rate, the facility's limits. */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>

#include "beamhours/base/sentences.h"
#include "beamhours/plan/making.h"
#include "beamhours/schema/reading.h"
#include "beamhours/units/constants.h"

bh_value bh_sweep_value(const bh_sweep *sweep, size_t i)
{
    bh_value v = {.value = NAN, .given = sweep->given, .at = sweep->at};
    if (sweep->count == 0)
        return v;
    const size_t k = i < sweep->count ? i : 0;
    v.value = sweep->values[k].value;
    v.uncertainty = sweep->values[k].uncertainty;
    v.at = sweep->marks[k];
    return v;
}

/* --- what flies --- */

static bool find_particle(const bh_making *making, const bh_section *section, const char *key,
                          const bh_word *word, bh_particle *out)
{
    const char *names[40] = {NULL};
    if (!word->text || bh_particle_find(word->text, out))
        return word->text != NULL;
    const char *near = bh_particle_suggest(word->text);
    for (int i = 0; i < 39 && bh_particle_name(i); i++)
        names[i] = bh_particle_name(i);
    if (near) {
        bh_tell(making, word->at, section, key, BH_SAY_UNKNOWN_WORD, word->text, near);
        return false;
    }
    char all[300];
    bh_tell(making, word->at, section, key, BH_SAY_UNKNOWN_WORD_OF, word->text,
            bh_words_text(names, all, sizeof all));
    return false;
}

static void set_charge(const bh_making *making, const bh_raw_beam *raw, bh_beam *beam)
{
    const bh_particle *p = &beam->particle;
    const bh_value *charge = &raw->charge;
    beam->charge = p->charge;
    if (!charge->given || isnan(charge->value) || charge->value == p->charge)
        return;
    char text[32];
    (void)snprintf(text, sizeof text, "%.0f", charge->value);
    if (p->z < 1)
        bh_tell(making, charge->at, &raw->section, "charge", BH_SAY_CHARGE_FIXED, p->name,
                p->charge);
    else if (!(charge->value >= 1.0 && charge->value <= p->z))
        bh_tell(making, charge->at, &raw->section, "charge", BH_SAY_CHARGE_OF, text, p->name, p->z);
    else
        beam->charge = (int)charge->value;
}

/* The others, and how much of the beam they are. */
static bh_code set_others(const bh_making *making, const bh_raw_beam *raw, bh_beam *beam)
{
    bh_beam_other *others =
        bh_arena_take(making->reading.arena, raw->others.count + 1, sizeof *others);
    double sum = 0.0;
    if (!others)
        return BH_ENOMEM;
    for (size_t i = 0; i < raw->others.count; i++) {
        const bh_pair *pair = &raw->others.items[i];
        const bh_word name = {.text = pair->name, .given = true, .at = pair->name_at};
        bh_beam_other *other = &others[beam->other_count];
        const bh_section section = {.node = raw->others.node};
        if (!find_particle(making, &section, pair->name, &name, &other->particle))
            continue;
        if (other->particle.mass == beam->particle.mass &&
            other->particle.charge == beam->particle.charge && raw->particle.text)
            bh_tell(making, pair->name_at, &section, pair->name, BH_SAY_OWN_OTHER, pair->name);
        other->share = pair->value;
        sum += pair->value.value;
        beam->other_count++;
    }
    beam->others = others;
    if (sum > 0.0 && beam->fraction.value + sum > 1.0 + 1e-9) {
        char share[BH_QUANTITY_SIZE], rest[BH_QUANTITY_SIZE], all[BH_QUANTITY_SIZE];
        bh_tell(making, raw->others.at, &raw->section, "others", BH_SAY_SHARES_ADD,
                bh_quantity_text(beam->fraction.value, BH_DIM_SHARE, share),
                bh_quantity_text(sum, BH_DIM_SHARE, rest),
                bh_quantity_text(beam->fraction.value + sum, BH_DIM_SHARE, all));
    }
    return BH_OK;
}

/* --- how fast --- */

static const bh_sweep *energy_of(const bh_raw_beam *raw, const char **name)
{
    if (raw->total_energy.given) {
        *name = "total_energy";
        return &raw->total_energy;
    }
    *name = raw->momentum.given ? "momentum" : "kinetic_energy";
    return raw->momentum.given ? &raw->momentum : &raw->kinetic_energy;
}

/* Sets kinetic from what was written, both of the whole particle. */
static void set_kinetic(bh_beam *beam, const bh_raw_beam *raw)
{
    const double m = beam->particle.mass, w = beam->energy_written.value;
    const double sigma = beam->energy_written.uncertainty;
    beam->kinetic_energy = beam->energy_written;
    if (raw->total_energy.given) {
        beam->kinetic_energy.value = w - m;
    } else if (raw->momentum.given) {
        const double energy = hypot(w, m); /* w^2 / (E + m): nothing cancels for slow particles */
        beam->kinetic_energy.value = w * (w / (energy + m));
        beam->kinetic_energy.uncertainty = sigma * w / energy;
    }
}

static void check_kinetic(const bh_making *making, const bh_raw_beam *raw, const char *key,
                          bh_beam *beam)
{
    const bh_value *kinetic = &beam->kinetic_energy;
    const bh_dimension dimension = raw->momentum.given ? BH_DIM_MOMENTUM : BH_DIM_ENERGY;
    const double nucleons = beam->particle.a > 0 ? beam->particle.a : 1.0;
    char written[BH_QUANTITY_SIZE], other[BH_QUANTITY_SIZE];
    if (isnan(kinetic->value))
        return;
    bh_quantity_text(beam->energy_written.value, dimension, written);
    if (!(kinetic->value > 0.0))
        bh_tell(making, kinetic->at, &raw->section, key, BH_SAY_BELOW_REST, written,
                beam->particle.name, bh_quantity_text(beam->particle.mass, BH_DIM_ENERGY, other));
    else if (!(kinetic->value >= 1e-3 * nucleons && kinetic->value <= 1e6 * nucleons))
        bh_tell(making, kinetic->at, &raw->section, key, BH_SAY_ENERGY_RANGE,
                bh_quantity_text(kinetic->value, BH_DIM_ENERGY, other));
    else
        return;
    beam->kinetic_energy.value = NAN;
}

static void set_energy(const bh_making *making, const bh_raw_beam *raw, size_t i, bh_beam *beam)
{
    const char *key;
    const bh_sweep *sweep = energy_of(raw, &key);
    beam->energy_key = (bh_word){.text = key, .given = sweep->given, .at = sweep->at};
    beam->energy_written = bh_sweep_value(sweep, i);
    if (sweep->count > 0 && sweep->values[i < sweep->count ? i : 0].per_u) {
        const int a = beam->particle.a;
        beam->energy_written.value *= a;
        beam->energy_written.uncertainty *= a;
        if (a == 0 && raw->particle.text && beam->particle.mass > 0.0) {
            char text[BH_QUANTITY_SIZE];
            const bh_quantity q = {.value = sweep->values[0].value, .per_u = true};
            (void)bh_quantity_print(&q, BH_DIM_ENERGY_OR_PER_U, text, sizeof text);
            bh_tell(making, beam->energy_written.at, &raw->section, key, BH_SAY_NO_NUCLEONS, text,
                    beam->particle.name);
        }
    }
    const bool per_nothing = !(beam->energy_written.value > 0.0); /* no nucleons, or unreadable */
    if (!(beam->particle.mass > 0.0) || per_nothing)
        beam->energy_written.value = NAN;
    set_kinetic(beam, raw);
    check_kinetic(making, raw, key, beam);
}

/* --- how many --- */

/* Charge of a beam particle of any kind on average, in units of e; what the plan does not name
 * counts as the beam's own. */
static double mean_charge(const bh_beam *beam)
{
    double sum = 0.0, share = 0.0;
    for (size_t i = 0; i < beam->other_count; i++) {
        share += beam->others[i].share.value;
        sum += beam->others[i].share.value * abs(beam->others[i].particle.charge);
    }
    return sum + (1.0 - share) * abs(beam->charge);
}

static void set_rate(const bh_raw_beam *raw, size_t i, bh_beam *beam)
{
    const double coulomb = BH_ELEMENTARY * mean_charge(beam); /* for each particle */
    beam->rate_written = raw->particle_rate.given;
    beam->current = bh_sweep_value(&raw->current, i);
    beam->particle_rate = raw->particle_rate;
    if (beam->rate_written) {
        beam->current = raw->particle_rate;
        beam->current.given = false;
        beam->current.value *= coulomb;
        beam->current.uncertainty *= coulomb;
    } else {
        beam->particle_rate = beam->current;
        beam->particle_rate.given = false;
        beam->particle_rate.value /= coulomb;
        beam->particle_rate.uncertainty /= coulomb;
    }
}

static void check_limits(const bh_making *making, const bh_raw_beam *raw, const bh_beam *beam)
{
    const char *key = beam->rate_written ? "particle_rate" : "current";
    const bh_value *written = beam->rate_written ? &beam->particle_rate : &beam->current;
    const bh_value *most = &raw->limits.current, *most_power = &raw->limits.power;
    char current[BH_QUANTITY_SIZE], limit[BH_QUANTITY_SIZE];
    bh_quantity_text(beam->current.value, BH_DIM_CURRENT, current);
    if (most->given && beam->current.value > most->value * (1.0 + 1e-12))
        bh_tell(making, written->at, &raw->section, key, BH_SAY_PAST_CURRENT, current,
                bh_quantity_text(most->value, BH_DIM_CURRENT, limit));
    const double joule = beam->kinetic_energy.value * 1e6 * BH_ELEMENTARY;
    const double power = joule * beam->particle_rate.value;
    if (most_power->given && power > most_power->value * (1.0 + 1e-12)) {
        char energy[BH_QUANTITY_SIZE], watt[BH_QUANTITY_SIZE], less[BH_QUANTITY_SIZE];
        const double would_do = beam->current.value * most_power->value / power;
        bh_tell(making, written->at, &raw->section, key, BH_SAY_PAST_POWER,
                bh_quantity_text(power, BH_DIM_POWER, watt), current,
                bh_quantity_text(beam->kinetic_energy.value, BH_DIM_ENERGY, energy),
                bh_quantity_text(most_power->value, BH_DIM_POWER, limit),
                bh_quantity_text(would_do, BH_DIM_CURRENT, less));
    }
}

bh_code bh_make_beam(const bh_making *making, const bh_raw_beam *raw, size_t i, bh_beam *out)
{
    *out = (bh_beam){
        .at = raw->particle.at,
        .momentum_spread = raw->momentum_spread,
        .fraction = raw->fraction,
        .duty_factor = raw->duty_factor,
        .spot_x = raw->spot.x,
        .spot_y = raw->spot.y,
        .raster_x = raw->raster.x,
        .raster_y = raw->raster.y,
        .polarisation = raw->polarisation,
        .limit_current = raw->limits.current,
        .limit_power = raw->limits.power,
        .limits_at = raw->limits.section.at,
    };
    const bool known =
        find_particle(making, &raw->section, "particle", &raw->particle, &out->particle);
    if (known)
        set_charge(making, raw, out);
    if (set_others(making, raw, out))
        return BH_ENOMEM;
    set_energy(making, raw, i, out);
    set_rate(raw, i, out);
    if (known)
        check_limits(making, raw, out);
    return BH_OK;
}

void bh_make_plan_beam(bh_making *making)
{
    const bh_raw_beam *raw = &making->raw.beam;
    const bh_sweep *const swept[] = {&raw->kinetic_energy, &raw->total_energy, &raw->momentum,
                                     &raw->current};
    static const char *const name[] = {"kinetic_energy", "total_energy", "momentum", "current"};
    for (size_t i = 0; i < sizeof swept / sizeof swept[0]; i++)
        if (swept[i]->given && swept[i]->swept)
            bh_tell(making, swept[i]->at, &raw->section, name[i], BH_SAY_BEAM_SWEEP);
    if (bh_make_beam(making, raw, 0, &making->plan.beam))
        bh_diags_lose(making->reading.diags);
}
