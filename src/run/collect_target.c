/* collect_target.c - what the uncertainties of the target make of the rates of an arm. */
#include <math.h>
#include <stddef.h>
#include <stdio.h>

#include "beamhours/run/collecting.h"
#include "beamhours/run/passage.h"

static const char *text_of(const bh_word *name)
{
    return name->text ? name->text : "";
}

static const char *layer_key(const bh_collecting *c, size_t layer, const char *member,
                             char key[BH_CAUSE_KEY])
{
    const bh_target *target = c->setting->target;
    const bh_document *document = c->yielder->plan->document;
    const bool only = document && bh_node_get(bh_document_root(document), "target");
    snprintf(key, BH_CAUSE_KEY, "%s%s.layers.%zu.%s", only ? "target" : "targets.",
             only ? "" : text_of(&target->name), layer + 1, member);
    return key;
}

/* More nuclei of a layer by the share `by`: more signal where they are scatterers; where they are
 * subtracted as computed, more of them are left in the signal. */
static void collect_nuclei(bh_collecting *c, const bh_cause *cause, size_t layer, double by)
{
    const bh_share *share = &c->layers[layer];
    const bool measured = c->arm->empty.measured;
    double *to = by != 0 && isfinite(by) ? bh_collect(c, cause, 0) : NULL;
    for (size_t i = 0; to && i < c->parts; i++) {
        const bh_part *p = &c->arm->yield->part[i];
        const double wrong =
            (p->other - p->beside[1]) * share->other + p->beside[1] * share->beside[1] +
            (measured
                 ? 0
                 : (p->windows - p->beside[0]) * share->windows + p->beside[0] * share->beside[0]);
        to[i] += by * share->signal + (p->signal > 0 ? by * wrong / p->signal : 0);
    }
}

/* [MeV] that the beam loses in a layer before the average collision. */
static double lost_in(const bh_collecting *c, size_t layer)
{
    const bh_view *view = &c->arm->yield->view;
    const size_t last = view->way.layer_count - 1;
    double behind = 1;                                      /* share of the signal */
    double rest = view->way.kinetic - view->vertex_kinetic; /* what the layers before do not take */
    for (size_t l = 0; l < layer; l++) {
        const double crossed = behind - c->layers[l].signal / 2;
        rest -= crossed * (view->way.sheets[l].entering[0] - view->way.sheets[l + 1].entering[0]);
        behind -= c->layers[l].signal;
    }
    if (layer == last)
        return rest;
    return (behind - c->layers[layer].signal / 2) *
           (view->way.sheets[layer].entering[0] - view->way.sheets[layer + 1].entering[0]);
}

/* Thicker by the share `by`, a layer also slows the beam down more. */
static void collect_slowing(bh_collecting *c, const bh_cause *cause, size_t layer, double by)
{
    const bh_beam *b = &c->setting->beam;
    const double mass = b->particle.mass, kinetic = b->kinetic_energy.value;
    const bh_way *way = &c->arm->yield->view.way;
    if (!way->losing || way->stops < way->layer_count || by == 0)
        return;
    const double lost = by * lost_in(c, layer);
    if (lost != 0)
        bh_collect_sensitive(c, cause, offsetof(bh_part, per_momentum),
                             -lost * (kinetic + mass) / (kinetic * (kinetic + 2 * mass)));
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
    char key[BH_CAUSE_KEY];
    if (!(v->value->uncertainty > 0))
        return;
    const bh_cause cause =
        bh_collect_cause(v->kind, v->value->at, layer_key(c, layer, v->member, key));
    collect_nuclei(c, &cause, layer, v->by);
    collect_slowing(c, &cause, layer, v->by);
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
    const double dense = bh_collect_relative(&l->density),
                 hot = bh_collect_relative(&l->temperature),
                 press = bh_collect_relative(&l->pressure);
    const double warm = l->density_loss.uncertainty * c->setting->beam.current.value;
    const double left = bh_density_left(l, &c->setting->beam);
    const bh_value written = {.uncertainty = l->areal_number.uncertainty, .at = l->size_key.at};
    const struct layer_value values[] = {
        {BH_CAUSE_THICKNESS, size, &written, bh_collect_relative(&l->areal_number),
         l->thickness.uncertainty},
        {BH_CAUSE_DENSITY, "density", &l->density, number * dense, length * thick * dense},
        {BH_CAUSE_TEMPERATURE, "temperature", &l->temperature, -number * hot,
         -length * thick * hot},
        {BH_CAUSE_PRESSURE, "pressure", &l->pressure, number * press, length * thick * press},
        {BH_CAUSE_DENSITY_LOSS, "density_loss", &l->density_loss, left > 0 ? -warm / left : 0, 0}};
    for (size_t k = 0; k < sizeof values / sizeof values[0]; k++)
        collect_layer_value(c, i, &values[k]);
}

void bh_collect_target(bh_collecting *c)
{
    const bh_target *target = c->setting->target;
    const bh_value *tilt = &c->setting->tilt;
    for (size_t i = 0; i < target->layer_count; i++)
        collect_layer(c, i);
    char key[BH_CAUSE_KEY];
    const bh_cause cause =
        bh_collect_cause(BH_CAUSE_TILT, tilt->at, bh_collect_setting_key(c, "tilt", key));
    if (tilt->uncertainty > 0)
        collect_paths(c, &cause, target->layer_count, 0, tilt->uncertainty);
}
