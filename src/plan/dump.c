/* dump.c - every value of a plan after defaults, in the order of the key table. */
#include "beamhours/plan/dump.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/plan/making.h"
#include "beamhours/schema/reading.h"

struct out {
    const bh_dump_sink *sink;
    void *to;
};

static void begin(const struct out *out, const char *key)
{
    out->sink->begin_mapping(out->to, key);
}

static void begin_list(const struct out *out, const char *key)
{
    out->sink->begin_list(out->to, key);
}

static void end(const struct out *out)
{
    out->sink->end(out->to);
}

static void text(const struct out *out, const char *key, const char *value)
{
    if (value)
        out->sink->text(out->to, key, value);
}

/* --- single values --- */

static void measured(const struct out *out, const char *key, const bh_value *value,
                     bh_dimension dimension)
{
    char written[BH_QUANTITY_SIZE];
    const bh_quantity q = {.value = value->value,
                           .uncertainty = value->uncertainty,
                           .uncertain = value->uncertainty > 0.0};
    if (isnan(value->value))
        return;
    (void)bh_quantity_print(&q, dimension, written, sizeof written);
    text(out, key, written);
}

static void extent(const struct out *out, const bh_key *key, const bh_extent *value)
{
    const bh_value from = {.value = value->from}, to = {.value = value->to};
    if (!value->given)
        return;
    begin(out, key->name);
    measured(out, "from", &from, key->dimension);
    measured(out, "to", &to, key->dimension);
    end(out);
}

static void count_or_number(const struct out *out, const bh_key *key, const bh_value *value)
{
    char written[BH_NUMBER_SIZE];
    if (key->kind == BH_KEY_COUNT) {
        out->sink->integer(out->to, key->name, (long)value->value);
        return;
    }
    (void)bh_number_print(value->value, written, sizeof written);
    text(out, key->name, written);
}

/* Written, or with a default. */
static bool known(const bh_key *key, const bh_value *value)
{
    return value->given || key->fallback;
}

/* --- collections of values --- */

static void sweep(const struct out *out, const bh_key *key, const bh_sweep *value)
{
    char written[BH_QUANTITY_SIZE];
    if (value->swept)
        begin_list(out, key->name);
    for (size_t i = 0; i < value->count; i++) {
        (void)bh_quantity_print(&value->values[i], key->dimension, written, sizeof written);
        text(out, value->swept ? NULL : key->name, written);
    }
    if (value->swept)
        end(out);
}

static void table(const struct out *out, const bh_key *key, const bh_pairs *pairs)
{
    if (!pairs->given || pairs->word.given) {
        text(out, key->name, pairs->word.text);
        return;
    }
    begin(out, key->name);
    for (size_t i = 0; i < pairs->count; i++) {
        const bh_pair *pair = &pairs->items[i];
        if (key->item == BH_KEY_TEXT)
            text(out, pair->name, pair->word.text);
        else
            measured(out, pair->name, &pair->value, key->dimension);
    }
    end(out);
}

static void values(const struct out *out, const bh_key *key, const bh_values *list)
{
    if (!list->given)
        return;
    begin_list(out, key->name);
    for (size_t i = 0; i < list->count; i++)
        measured(out, NULL, &list->items[i], key->dimension);
    end(out);
}

/* --- structs by their tables --- */

/* NOLINTBEGIN(misc-no-recursion): as deep as the tables of keys are, five levels */

static void members(const struct out *out, const bh_schema *schema, const void *in);

static void list_of(const struct out *out, const bh_key *key, const bh_list *list)
{
    const unsigned char *items = list->items;
    if (!list->given)
        return;
    begin_list(out, key->name);
    for (size_t i = 0; i < list->count; i++) {
        begin(out, NULL);
        members(out, key->children, items + i * key->children->size);
        end(out);
    }
    end(out);
}

static void mapping(const struct out *out, const bh_key *key, const void *member)
{
    const bh_section *section = member;
    /* An optional part with required keys is not there when it was not written. */
    bool optional = false;
    for (size_t i = 0; i < key->children->count; i++)
        optional = optional || (key->children->keys[i].flags & BH_KEY_REQUIRED) ||
                   !key->children->keys[i].fallback;
    if (!section->given && optional && !(key->flags & BH_KEY_REQUIRED) &&
        key->children != &bh_schema_schedule)
        return;
    begin(out, key->name);
    members(out, key->children, member);
    end(out);
}

static void one_member(const struct out *out, const bh_key *key, const void *member)
{
    const bh_value *value = member; /* for the kinds that begin with one */
    switch (key->kind) {
    case BH_KEY_QUANTITY:
        if (known(key, value))
            measured(out, key->name, value, key->dimension);
        break;
    case BH_KEY_NUMBER:
    case BH_KEY_COUNT:
        if (known(key, value))
            count_or_number(out, key, value);
        break;
    case BH_KEY_EXTENT:
    case BH_KEY_RANGE:
        extent(out, key, member);
        break;
    case BH_KEY_WORD:
    case BH_KEY_NAME:
    case BH_KEY_TEXT:
        text(out, key->name, ((const bh_word *)member)->text);
        break;
    case BH_KEY_EITHER:
        if (value->given)
            measured(out, key->name, value, key->dimension);
        else
            text(out, key->name, ((const bh_either *)member)->word.text);
        break;
    case BH_KEY_SWEEP:
        sweep(out, key, member);
        break;
    case BH_KEY_TABLE:
        table(out, key, member);
        break;
    case BH_KEY_VALUES:
        values(out, key, member);
        break;
    case BH_KEY_WORDS:
        break; /* no plan has one */
    case BH_KEY_MAPPING:
        mapping(out, key, member);
        break;
    case BH_KEY_LIST:
        list_of(out, key, member);
        break;
    }
}

/* One key of a group speaks for it: the one written, else the first with a default. */
static bool silent(const bh_schema *schema, const bh_key *key, const void *in)
{
    const bh_key *speaks = NULL;
    if (key->group == 0 || bh_schema_given(key, in))
        return schema == &bh_schema_arm && strcmp(key->name, "azimuth") == 0 &&
               !((const bh_raw_arm *)in)->ring.given; /* its default is a ring's */
    for (size_t i = schema->count; i-- > 0;) {
        const bh_key *other = &schema->keys[i];
        if (other->group != key->group)
            continue;
        if (bh_schema_given(other, in))
            return true;
        if (other->fallback)
            speaks = other;
    }
    return speaks != key;
}

static void members(const struct out *out, const bh_schema *schema, const void *in)
{
    for (size_t i = 0; i < schema->count; i++) {
        const bh_key *key = &schema->keys[i];
        if (!silent(schema, key, in))
            one_member(out, key, (const unsigned char *)in + key->offset);
    }
}

/* NOLINTEND(misc-no-recursion) */

/* --- settings, as they are after sweeps --- */

static void quantity(const struct out *out, const char *key, const bh_value *value)
{
    const bh_key *row = bh_schema_find(&bh_schema_beam, key);
    measured(out, key, value, row->dimension);
}

static void beam_of(const struct out *out, const bh_beam *beam)
{
    const bool momentum = strcmp(beam->energy_key.text, "momentum") == 0;
    begin(out, "beam");
    text(out, "particle", beam->particle.name);
    if (beam->charge != beam->particle.charge)
        out->sink->integer(out->to, "charge", beam->charge);
    measured(out, beam->energy_key.text, &beam->energy_written,
             momentum ? BH_DIM_MOMENTUM : BH_DIM_ENERGY);
    quantity(out, "momentum_spread", &beam->momentum_spread);
    if (beam->rate_written)
        quantity(out, "particle_rate", &beam->particle_rate);
    else
        quantity(out, "current", &beam->current);
    quantity(out, "fraction", &beam->fraction);
    if (beam->other_count > 0) {
        begin(out, "others");
        for (size_t i = 0; i < beam->other_count; i++)
            measured(out, beam->others[i].particle.name, &beam->others[i].share, BH_DIM_SHARE);
        end(out);
    }
    quantity(out, "duty_factor", &beam->duty_factor);
    quantity(out, "polarisation", &beam->polarisation);
    end(out);
}

static void want_of(const struct out *out, const bh_setting_arm *row)
{
    switch (row->want) {
    case BH_WANT_NOTHING:
        return;
    case BH_WANT_GOAL:
        measured(out, "goal", &row->wanted, BH_DIM_SHARE);
        text(out, "goal_for", row->each_bin ? "each-bin" : "acceptance");
        return;
    case BH_WANT_TIME:
        measured(out, "time", &row->wanted, BH_DIM_TIME);
        return;
    case BH_WANT_CHARGE:
        measured(out, "charge", &row->wanted, BH_DIM_CHARGE);
        return;
    case BH_WANT_COUNTS:
        out->sink->integer(out->to, "counts", (long)row->wanted.value);
        return;
    }
}

static void row_of(const struct out *out, const bh_setting_arm *row)
{
    begin(out, NULL);
    text(out, "arm", row->arm.name.text);
    if (row->arm.shape != BH_SHAPE_RING)
        measured(out, "angle", &row->angle, BH_DIM_ANGLE);
    if (row->q2.given)
        measured(out, "q2", &row->q2, BH_DIM_Q2);
    if (row->central_momentum.given)
        measured(out, "central_momentum", &row->central_momentum, BH_DIM_MOMENTUM);
    want_of(out, row);
    out->sink->integer(out->to, "prescale", row->arm.prescale);
    end(out);
}

/* The row of a coincidence is written as the key that made it, and what the setting wants of it. */
static void coincidence_of(const struct out *out, const bh_setting_arm *row)
{
    begin(out, "coincidence");
    begin_list(out, "arms");
    text(out, NULL, row->first->arm.name.text);
    text(out, NULL, row->second->arm.name.text);
    end(out);
    measured(out, "window", &row->window, BH_DIM_TIME);
    end(out);
    want_of(out, row);
}

static void settings(const struct out *out, const bh_plan *plan)
{
    begin_list(out, "settings");
    for (size_t i = 0; i < plan->setting_count; i++) {
        const bh_setting *setting = &plan->settings[i];
        begin(out, NULL);
        text(out, "name", setting->name);
        begin_list(out, "arms");
        const bh_setting_arm *pair = NULL;
        for (size_t k = 0; k < setting->arm_count; k++) {
            if (setting->arms[k].first)
                pair = &setting->arms[k];
            else
                row_of(out, &setting->arms[k]);
        }
        end(out);
        if (pair)
            coincidence_of(out, pair);
        text(out, "target", setting->target ? setting->target->name.text : NULL);
        measured(out, "tilt", &setting->tilt, BH_DIM_ANGLE);
        beam_of(out, &setting->beam);
        text(out, "process", setting->process.text);
        end(out);
    }
    end(out);
}

/* --- the plan --- */

/* Defaults that depend on other values than the key's own. */
static void target_of(const struct out *out, const bh_raw_target *raw, const bh_target *target)
{
    bh_raw_target full = *raw;
    full.name = target->name;
    full.scatterer = target->scatterer;
    begin(out, NULL);
    members(out, &bh_schema_target, &full);
    end(out);
}

static void targets(const struct out *out, const bh_making *making)
{
    const bool alone = making->raw.target.section.given;
    const bh_raw_target *raw = alone ? &making->raw.target : making->raw.targets.items;
    begin_list(out, "targets");
    for (size_t i = 0; i < making->plan.target_count; i++)
        target_of(out, &raw[i], &making->plan.targets[i]);
    end(out);
}

void bh_plan_dump(const bh_plan *plan, const bh_dump_sink *sink, void *to)
{
    const bh_making *making = (const void *)plan; /* its first member */
    const struct out out = {sink, to};
    begin(&out, NULL);
    for (size_t i = 0; i < bh_schema_plan.count; i++) {
        const bh_key *key = &bh_schema_plan.keys[i];
        const void *member = (const unsigned char *)(const void *)&making->raw + key->offset;
        if (key->children == &bh_schema_target) {
            if (key->kind == BH_KEY_LIST)
                targets(&out, making);
        } else if (key->children == &bh_schema_setting) {
            if (key->kind == BH_KEY_LIST)
                settings(&out, plan);
        } else if (key->children == &bh_schema_models) {
            begin(&out, key->name);
            members(&out, key->children, member);
            end(&out);
        } else {
            one_member(&out, key, member);
        }
    }
    end(&out);
}
