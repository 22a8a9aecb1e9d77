/* explain_target.c - what beam and detected particle lose on their way, and the heat that makes. */
#include <math.h>

#include "beamhours/run/explaining.h"
#include "beamhours/run/heat.h"

static void factor(bh_explaining *x, const char *name, const char *value, const char *formula)
{
    bh_explain_add(
        x, (bh_line){.kind = BH_LINE_FACTOR, .name = name, .value = value, .formula = formula});
}

static const char *in_words(bh_explaining *x, const bh_layer_heat *heat, const bh_layer *layer)
{
    const char *power = bh_explain_number(x, heat->power, "W");
    if (!(heat->temperature > 0))
        return bh_explain_text(x, "lost by each beam particle; about %s of heat", power);
    const double melting = layer->material->melting;
    const char *of =
        melting > 0 ? bh_explain_text(x, " (melts at %s)", bh_explain_number(x, melting, "K")) : "";
    return bh_explain_text(x, "lost by each beam particle; about %s of heat, at most %s%s", power,
                           bh_explain_number(x, round(heat->temperature), "K"), of);
}

static void explain_layers(bh_explaining *x)
{
    const bh_way *way = &x->arm->yield->view.way;
    const bh_target *target = x->setting->target;
    for (size_t l = 0; l < target->layer_count && l <= way->stops; l++) {
        const double lost = way->sheets[l].entering[BH_AS_IT_IS] - bh_way_leaving(way, l);
        const bh_layer_heat heat = bh_layer_heat_of(x->setting, l, lost);
        factor(x, bh_explain_text(x, "layer %zu (%s)", l + 1, target->layers[l].material->name),
               bh_explain_number(x, lost, "MeV"), in_words(x, &heat, &target->layers[l]));
    }
    bh_explain_add(
        x, (bh_line){.kind = BH_LINE_NOTE,
                     .remark = bh_explain_text(
                         x,
                         "heat and temperatures are screening estimates (mean losses, 15 %%; a "
                         "spot of %s radius%s, edge at 1 cm and 300 K, emissivity 0.1): the "
                         "facility's target group decides",
                         bh_explain_number(x, bh_spot_of(&x->setting->beam).radius * 10, "mm"),
                         bh_spot_of(&x->setting->beam).assumed ? ", assumed" : "")});
}

/* The cross section as if everything happened at the energy that enters. */
static void explain_vertex(bh_explaining *x)
{
    const bh_view *v = &x->arm->yield->view;
    bh_channel entering = x->channel;
    double before = 0, after = 0, ignored;
    entering.encounter.kinetic = v->way.kinetic;
    bh_channel_eval(&entering, 1, &x->part->angle, &before, &ignored);
    bh_channel_eval(&x->channel, 1, &x->part->angle, &after, &ignored);
    factor(x, "beam entering", bh_explain_number(x, v->way.kinetic, "MeV"), "kinetic energy");
    factor(x, "beam at the collision", bh_explain_number(x, v->vertex_kinetic, "MeV"),
           "mean over the scatterer nuclei that are seen");
    if (before > 0)
        factor(x, "changes the cross section",
               bh_explain_number(x, 100 * (after / before - 1), "%"),
               "at the angle of the row, against the energy that enters");
    if (!x->reached || v->stuck || v->arm->central_momentum.given)
        return;
    factor(x, "detected particle on arrival", bh_explain_number(x, v->central_momentum, "MeV/c"),
           "on the arm's axis, behind target, wall and exit layers, mean over the depth");
}

void bh_explain_target(bh_explaining *x)
{
    const bh_view *v = &x->arm->yield->view;
    bh_explain_section(x, "In the target");
    if (!v->way.losing) {
        bh_explain_add(x, (bh_line){.kind = BH_LINE_NOTE,
                                    .remark = "energy loss is switched off: models.energy_loss"});
        return;
    }
    if (!v->blocked)
        explain_vertex(x);
    explain_layers(x);
}
