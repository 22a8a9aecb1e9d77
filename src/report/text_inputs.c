/* text_inputs.c - what stands above the table, so that a reader can redo the sum. */
#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/report/input_words.h"
#include "beamhours/report/text_table.h"
#include "beamhours/units/nuclide.h"
#include "beamhours/units/quantity.h"

enum { WORD = 96 };

/* Appends `lead` and the quantity. */
static void say(bh_text *to, const char *lead, const bh_value *v, bh_dimension dimension)
{
    char word[WORD];
    const bh_quantity q = {v->value, v->uncertainty, v->uncertainty > 0.0, false};
    if (bh_quantity_print(&q, dimension, word, sizeof word) > 0)
        bh_text_appendf(to, "%s%s", lead, word);
}

static void say_number(bh_text *to, const char *lead, double value, bh_dimension dimension)
{
    say(to, lead, &(bh_value){.value = value}, dimension);
}

static void add(bh_text *to, const char *key, const bh_value *v, bh_dimension dimension)
{
    bh_text_appendf(to, ", %s", key);
    say(to, " ", v, dimension);
}

static void add_given(bh_text *to, const char *key, const bh_value *v, bh_dimension dimension)
{
    if (v->given)
        add(to, key, v, dimension);
}

static void add_extent(bh_text *to, const char *key, const bh_extent *e, bh_dimension dimension)
{
    if (!e->given)
        return;
    bh_text_appendf(to, ", %s", key);
    const bool symmetric = fabs(e->from + e->to) <= 1e-12 * fabs(e->to);
    if (!symmetric)
        say_number(to, " ", e->from, dimension);
    say_number(to, symmetric ? " ±" : " to ", e->to, dimension);
}

/* --- the beam: what all rows share, and what varies as a range --- */

/* What was computed from another key has digits that nobody wrote: seven are kept. */
static double rounded(double value)
{
    char digits[BH_NUMBER_SIZE];
    double out = value;
    if (bh_number_digits(value, 7, digits, sizeof digits) == 0 ||
        bh_number_parse(digits, NULL, &out))
        return value;
    return out;
}

typedef double (*beam_number)(const bh_beam *);

static double energy_of(const bh_beam *b)
{
    return b->kinetic_energy.value;
}

static double written_of(const bh_beam *b)
{
    return b->energy_written.value;
}

static double current_of(const bh_beam *b)
{
    return b->current.value;
}

static void add_range(bh_text *to, const bh_plan *plan, beam_number get, bh_dimension dimension,
                      const char *behind)
{
    double low = INFINITY, high = -INFINITY;
    for (size_t i = 0; i < plan->setting_count; i++) {
        const double value = rounded(get(&plan->settings[i].beam));
        low = fmin(low, value);
        high = fmax(high, value);
    }
    say_number(to, ", ", low, dimension);
    if (high > low)
        say_number(to, " to ", high, dimension);
    bh_text_append(to, behind);
}

static bool is_key(const bh_beam *beam, const char *key)
{
    return beam->energy_key.text && strcmp(beam->energy_key.text, key) == 0;
}

/* The energy under the key it was written with, where all settings use the same. */
static void add_energy(bh_text *to, const bh_plan *plan)
{
    const char *key = plan->settings[0].beam.energy_key.text;
    for (size_t i = 0; key && i < plan->setting_count; i++)
        if (!is_key(&plan->settings[i].beam, key))
            key = NULL;
    if (key && strcmp(key, "momentum") == 0) {
        add_range(to, plan, written_of, BH_DIM_MOMENTUM, "");
        add_range(to, plan, energy_of, BH_DIM_ENERGY, " kinetic");
    } else if (key && strcmp(key, "total_energy") == 0) {
        add_range(to, plan, written_of, BH_DIM_ENERGY, " total");
    } else {
        add_range(to, plan, energy_of, BH_DIM_ENERGY, " kinetic");
    }
}

/* A rate of beam particles reads better per second than in hertz. */
static void add_particles(bh_text *to, const bh_plan *plan)
{
    double low = INFINITY, high = 0.0;
    for (size_t i = 0; i < plan->setting_count; i++) {
        low = fmin(low, rounded(plan->settings[i].beam.particle_rate.value));
        high = fmax(high, rounded(plan->settings[i].beam.particle_rate.value));
    }
    bh_text_append(to, ", ");
    bh_text_append_number(to, low);
    if (high > low) {
        bh_text_append(to, " to ");
        bh_text_append_number(to, high);
    }
    bh_text_append(to, " particles per second in all");
}

void bh_say_beam(const bh_plan *plan, bh_text *to)
{
    const bh_beam *first = &plan->settings[0].beam;
    bh_text_append(to, first->particle.name);
    for (size_t i = 1; i < plan->setting_count; i++)
        if (strcmp(plan->settings[i].beam.particle.name, first->particle.name) != 0) {
            bh_text_appendf(to, " and %s", plan->settings[i].beam.particle.name);
            break;
        }
    add_energy(to, plan);
    if (first->rate_written)
        add_particles(to, plan);
    else
        add_range(to, plan, current_of, BH_DIM_CURRENT, "");
    if (first->fraction.value < 1.0)
        add(to, "fraction", &first->fraction, BH_DIM_SHARE);
    add_given(to, "duty_factor", &first->duty_factor, BH_DIM_SHARE);
}

/* --- targets and arms --- */

static void layer(const bh_layer *l, const char *lead, bh_text *to)
{
    static const char *const roles[] = {"", " (window)", " (backing)"};
    bh_text_appendf(to, "%s%s", lead, l->material->name);
    const char *key = l->size_key.text ? l->size_key.text : "";
    if (strcmp(key, "thickness") == 0)
        say(to, " ", &l->thickness, BH_DIM_LENGTH);
    else if (strcmp(key, "areal_density") == 0)
        say(to, " ", &l->areal_density, BH_DIM_AREAL_DENSITY);
    else if (strcmp(key, "areal_number") == 0)
        say(to, " ", &l->areal_number, BH_DIM_AREAL_NUMBER);
    if (l->density.given)
        say(to, " at ", &l->density, BH_DIM_DENSITY);
    bh_text_append(to, roles[l->role]);
}

/* The mass number of the one isotope of a scatterer named as an element, where nature has others
 * too; else 0. */
static int only_isotope(const bh_target *t)
{
    int only = 0;
    size_t natural = 0, occurring = 0;
    const bh_nuclide *all = bh_element_isotopes(t->scatterer_z, &natural);
    for (size_t i = 0; i < natural; i++)
        occurring += all[i].abundance > 0;
    for (size_t l = 0; l < t->layer_count && t->scatterer_a == 0; l++)
        for (size_t i = 0; t->layers[l].role == BH_ROLE_SAMPLE && i < t->layers[l].material->count;
             i++) {
            const bh_constituent *part = &t->layers[l].material->parts[i];
            if (part->z != t->scatterer_z)
                continue;
            if (only && only != part->a)
                return 0;
            only = part->a;
        }
    return occurring > 1 ? only : 0;
}

void bh_say_target(const bh_target *t, bh_text *to)
{
    char name[8];
    if (t->name.text)
        bh_text_appendf(to, "%s: ", t->name.text);
    for (size_t i = 0; i < t->layer_count; i++)
        layer(&t->layers[i], i ? ", " : "", to);
    bh_text_appendf(to, "; scatterer %s", bh_nuclide_name(t->scatterer_z, t->scatterer_a, name));
    const int only = only_isotope(t);
    if (only)
        bh_text_appendf(to, " (%s)", bh_nuclide_name(t->scatterer_z, only, name));
    add_given(to, "tilt", &t->tilt, BH_DIM_ANGLE);
    if (t->empty == BH_EMPTY_BEST)
        bh_text_append(to, ", empty target: best share");
    if (t->empty == BH_EMPTY_SHARE) {
        say(to, ", empty target: ", &t->empty_share, BH_DIM_SHARE);
        bh_text_append(to, " of the full-target time");
    }
}

void bh_say_arm(const bh_arm *a, bh_text *to)
{
    static const char *const sides[] = {"right", "left"};
    static const char *const detected[] = {"scattered", "recoil", "either"};
    bh_text_appendf(to, "%s: %s, detects %s", a->name.text ? a->name.text : "", sides[a->side],
                    detected[a->detects]);
    add_given(to, "angle", &a->angle, BH_DIM_ANGLE);
    add_extent(to, "in_plane", &a->in_plane, BH_DIM_ANGLE);
    add_extent(to, "out_of_plane", &a->out_of_plane, BH_DIM_ANGLE);
    add_extent(to, "ring", &a->ring, BH_DIM_ANGLE);
    if (a->shape == BH_SHAPE_RING)
        add(to, "azimuth", &a->azimuth, BH_DIM_ANGLE);
    add_given(to, "solid_angle", &a->solid_angle, BH_DIM_SOLID_ANGLE);
    add_extent(to, "momentum_bite", &a->momentum_bite, BH_DIM_SHARE);
    add_given(to, "energy_cut", &a->energy_cut, BH_DIM_ENERGY);
    add_extent(to, "target_view", &a->target_view, BH_DIM_LENGTH);
    add(to, "efficiency", &a->efficiency, BH_DIM_SHARE);
    add(to, "dead_time", &a->dead_time, BH_DIM_TIME);
    add_given(to, "rate_limit", &a->rate_limit, BH_DIM_RATE);
    add_given(to, "other_rate", &a->other_rate, BH_DIM_RATE);
    if (a->prescale > 1)
        bh_text_appendf(to, ", prescale %d", a->prescale);
}

static void wrapped(const char *lead, bh_text *from, int width, bh_text *out)
{
    if (from->bytes)
        bh_report_wrapped(lead, from->bytes, width, out);
    out->failed |= from->failed;
    bh_text_free(from);
}

void bh_report_text_inputs(const bh_selection *view, int width, bh_text *out)
{
    const bh_plan *plan = bh_table_plan(view->table);
    bh_text piece = {0};
    if (plan->title.text)
        bh_report_wrapped("", plan->title.text, width, out);
    bh_say_beam(plan, &piece);
    wrapped("beam    ", &piece, width, out);
    for (size_t i = 0; i < plan->target_count; i++) {
        bh_say_target(&plan->targets[i], &piece);
        wrapped("target  ", &piece, width, out);
    }
    for (size_t i = 0; i < plan->arm_count; i++) {
        bh_say_arm(&plan->arms[i], &piece);
        wrapped("arm     ", &piece, width, out);
    }
    bh_text_append(out, "\n");
}
