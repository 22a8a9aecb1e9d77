/* explain_inputs.c - what the plan says about a row, and what nobody wrote. */
#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/run/explaining.h"
#include "beamhours/units/constants.h"

static const char *print(bh_explaining *x, const bh_value *v, bh_dimension dimension)
{
    char text[128];
    const bh_quantity q = {
        .value = v->value, .uncertainty = v->uncertainty, .uncertain = v->uncertainty > 0};
    bh_quantity_print(&q, dimension, text, sizeof text);
    return bh_explain_text(x, "%s", text);
}

static void value(bh_explaining *x, const char *name, const bh_value *v, bh_dimension dimension)
{
    bh_explain_add(x, (bh_line){.kind = v->given ? BH_LINE_INPUT : BH_LINE_DEFAULT,
                                .name = name,
                                .value = print(x, v, dimension),
                                .source = v->given ? bh_explain_mark(x, v->at) : "default"});
}

static void given(bh_explaining *x, const char *name, const bh_value *v, bh_dimension dimension)
{
    if (v->given)
        value(x, name, v, dimension);
}

static void word(bh_explaining *x, const char *name, const bh_word *w)
{
    if (w->text)
        bh_explain_add(x, (bh_line){.kind = w->given ? BH_LINE_INPUT : BH_LINE_DEFAULT,
                                    .name = name,
                                    .value = w->text,
                                    .source = w->given ? bh_explain_mark(x, w->at) : "default"});
}

static void extent(bh_explaining *x, const char *name, const bh_extent *e, bh_dimension dimension)
{
    if (!e->given)
        return;
    const char *from = print(x, &(bh_value){.value = e->from}, dimension);
    const char *to = print(x, &(bh_value){.value = e->to}, dimension);
    const bool symmetric = fabs(e->from + e->to) <= 1e-12 * fabs(e->to);
    bh_explain_add(x, (bh_line){.kind = BH_LINE_INPUT,
                                .name = name,
                                .value = symmetric ? bh_explain_text(x, "±%s", to)
                                                   : bh_explain_text(x, "%s to %s", from, to),
                                .source = bh_explain_mark(x, e->at)});
}

static void explain_beam(bh_explaining *x)
{
    const bh_beam *b = &x->setting->beam;
    bh_explain_add(x, (bh_line){.kind = BH_LINE_INPUT,
                                .name = "beam.particle",
                                .value = b->particle.name,
                                .source = bh_explain_mark(x, b->at)});
    const bool momentum = b->energy_key.text && strcmp(b->energy_key.text, "momentum") == 0;
    value(x, bh_explain_text(x, "beam.%s", b->energy_key.text ? b->energy_key.text : "energy"),
          &b->energy_written, momentum ? BH_DIM_MOMENTUM : BH_DIM_ENERGY);
    if (b->rate_written)
        value(x, "beam.particle_rate", &b->particle_rate, BH_DIM_RATE);
    else
        value(x, "beam.current", &b->current, BH_DIM_CURRENT);
    value(x, "beam.fraction", &b->fraction, BH_DIM_SHARE);
    value(x, "beam.duty_factor", &b->duty_factor, BH_DIM_SHARE);
}

static const char *role_name(bh_role role)
{
    static const char *const names[] = {
        [BH_ROLE_SAMPLE] = "sample", [BH_ROLE_WINDOW] = "window", [BH_ROLE_BACKING] = "backing"};
    return names[role];
}

/* The thickness of a layer under the key that it was written with. */
static const char *written_size(bh_explaining *x, const bh_layer *l)
{
    const char *key = l->size_key.text ? l->size_key.text : "";
    if (strcmp(key, "areal_density") == 0)
        return print(x, &l->areal_density, BH_DIM_AREAL_DENSITY);
    if (strcmp(key, "areal_number") == 0)
        return print(x, &l->areal_number, BH_DIM_AREAL_NUMBER);
    return print(x, &l->thickness, BH_DIM_LENGTH);
}

static void explain_layer(bh_explaining *x, const bh_layer *l)
{
    bh_explain_add(
        x, (bh_line){.kind = BH_LINE_INPUT,
                     .name = bh_explain_text(x, "%s of %s", role_name(l->role), l->material->name),
                     .value = written_size(x, l),
                     .formula = bh_explain_text(
                         x, "%s of %s (%s): %s, %s", bh_explain_number(x, l->thickness.value, "cm"),
                         bh_explain_number(x, l->density.value, "g/cm3"),
                         l->density.given ? "as written" : "density of the material",
                         bh_explain_number(x, l->areal_density.value, "g/cm2"),
                         bh_explain_number(x, l->areal_number.value, "atoms/cm2")),
                     .source = bh_explain_mark(x, l->at)});
}

static void explain_target(bh_explaining *x)
{
    const bh_target *t = x->setting->target;
    for (size_t i = 0; i < t->layer_count; i++)
        explain_layer(x, &t->layers[i]);
    word(x, "scatterer", &t->scatterer);
    value(x, "tilt", &x->setting->tilt, BH_DIM_ANGLE);
    if (t->empty == BH_EMPTY_SHARE)
        value(x, "empty_target.share", &t->empty_share, BH_DIM_SHARE);
    else
        bh_explain_add(x,
                       (bh_line){.kind = t->empty ? BH_LINE_INPUT : BH_LINE_DEFAULT,
                                 .name = "empty_target",
                                 .value = t->empty ? "best" : "none",
                                 .source = t->empty ? bh_explain_mark(x, t->empty_at) : "default"});
}

static void explain_shape(bh_explaining *x, const bh_arm *a)
{
    extent(x, "in_plane", &a->in_plane, BH_DIM_ANGLE);
    extent(x, "out_of_plane", &a->out_of_plane, BH_DIM_ANGLE);
    extent(x, "ring", &a->ring, BH_DIM_ANGLE);
    if (a->shape == BH_SHAPE_RING)
        value(x, "azimuth", &a->azimuth, BH_DIM_ANGLE);
    given(x, "solid_angle", &a->solid_angle, BH_DIM_SOLID_ANGLE);
    extent(x, "momentum_bite", &a->momentum_bite, BH_DIM_SHARE);
    extent(x, "target_view", &a->target_view, BH_DIM_LENGTH);
}

static void explain_arm(bh_explaining *x)
{
    const bh_setting_arm *s = x->arm->yield->view.arm;
    const bh_arm *a = &s->arm;
    if (s->q2.given)
        value(x, "q2", &s->q2, BH_DIM_Q2);
    if (a->shape != BH_SHAPE_RING)
        bh_explain_add(x, (bh_line){.kind = BH_LINE_INPUT,
                                    .name = "angle",
                                    .value = s->q2.given ? bh_explain_number(
                                                               x, s->angle.value / BH_DEGREE, "deg")
                                                         : print(x, &s->angle, BH_DIM_ANGLE),
                                    .formula = s->q2.given ? "the angle that gives the q2" : NULL,
                                    .source = bh_explain_mark(x, s->angle.at)});
    given(x, "central_momentum", &s->central_momentum, BH_DIM_MOMENTUM);
    explain_shape(x, a);
    value(x, "efficiency", &a->efficiency, BH_DIM_SHARE);
    value(x, "dead_time", &a->dead_time, BH_DIM_TIME);
    given(x, "rate_limit", &a->rate_limit, BH_DIM_RATE);
    bh_explain_add(x, (bh_line){.kind = a->prescale > 1 ? BH_LINE_INPUT : BH_LINE_DEFAULT,
                                .name = "prescale",
                                .value = bh_explain_text(x, "%d", a->prescale),
                                .source = a->prescale > 1 ? NULL : "default"});
    value(x, "other_rate", &a->other_rate, BH_DIM_RATE);
}

static void explain_want(bh_explaining *x)
{
    const bh_setting_arm *s = x->arm->yield->view.arm;
    switch (s->want) {
    case BH_WANT_GOAL:
        value(x, s->each_bin ? "goal (each bin)" : "goal", &s->wanted, BH_DIM_SHARE);
        break;
    case BH_WANT_TIME:
        value(x, "time", &s->wanted, BH_DIM_TIME);
        break;
    case BH_WANT_CHARGE:
        value(x, "charge", &s->wanted, BH_DIM_CHARGE);
        break;
    case BH_WANT_COUNTS:
        bh_explain_add(x, (bh_line){.kind = BH_LINE_INPUT,
                                    .name = "counts",
                                    .value = bh_explain_number(x, s->wanted.value, ""),
                                    .source = bh_explain_mark(x, s->wanted.at)});
        break;
    default:
        bh_explain_add(x, (bh_line){.kind = BH_LINE_NOTE, .remark = bh_why_text(BH_WHY_NO_WANT)});
    }
}

/* What the plan says of the nucleus that is struck. */
static bh_word structure_word(const bh_explaining *x)
{
    const bh_models *m = &bh_table_plan(x->table)->models;
    const bh_encounter *e = &x->channel.encounter;
    for (size_t i = 0; i < m->choice_count; i++)
        if (m->by_nuclide[i].z == e->z && m->by_nuclide[i].a == e->a)
            return m->by_nuclide[i].model;
    return m->structure;
}

void bh_explain_inputs(bh_explaining *x)
{
    const bh_models *m = &bh_table_plan(x->table)->models;
    const bh_word structure = structure_word(x);
    bh_explain_section(x, "Inputs");
    explain_beam(x);
    explain_target(x);
    explain_arm(x);
    explain_want(x);
    word(x, "process", &x->setting->process);
    word(x, "models.structure", &structure);
    word(x, "models.coulomb", &m->coulomb);
    word(x, "models.radiative", &m->radiative);
    word(x, "models.energy_loss", &m->energy_loss);
}
