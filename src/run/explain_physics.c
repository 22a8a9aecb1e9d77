/* explain_physics.c - from the point charge to the mean cross section, with the models behind it.
 */
#include <math.h>
#include <string.h>

#include "beamhours/physics/validity.h"
#include "beamhours/run/explaining.h"
#include "beamhours/units/constants.h"
#include "beamhours/units/nuclide.h"

enum { MOST_FACTORS = 8, MOST_SETS = 16, MEV2_PER_GEV2 = 1000000 };

static double sigma_with(const bh_explaining *x, const bh_structure *structure)
{
    bh_channel c = x->channel;
    double sigma = 0, momentum = 0;
    c.encounter.structure = structure;
    bh_channel_eval(&c, 1, &x->part->angle, &sigma, &momentum);
    return sigma;
}

static void factor(bh_explaining *x, const char *name, const char *value, const char *formula)
{
    bh_explain_add(
        x, (bh_line){.kind = BH_LINE_FACTOR, .name = name, .value = value, .formula = formula});
}

static void explain_event(bh_explaining *x)
{
    const bh_event *e = &x->event;
    const bh_encounter *n = &x->channel.encounter;
    factor(x, "angle of the detected particle",
           bh_explain_number(x, x->part->angle / BH_DEGREE, "deg"),
           x->bin ? "mean over the bin" : "the arm's centre");
    bh_explain_add(x, (bh_line){.kind = BH_LINE_FACTOR,
                                .name = "mass of the struck nucleus",
                                .value = bh_explain_number(x, n->target, "MeV"),
                                .formula = "neutral atom less electrons and their binding",
                                .source = "AME2020, CODATA 2022"});
    factor(x, "Q2", bh_explain_number(x, e->q2 / MEV2_PER_GEV2, "GeV2"),
           "2 M x recoil kinetic energy, exact two-body kinematics");
    factor(x, "scattered particle",
           bh_explain_text(x, "%s at %s", bh_explain_number(x, e->scattered_momentum, "MeV/c"),
                           bh_explain_number(x, e->scattered_angle / BH_DEGREE, "deg")),
           NULL);
    factor(x, "recoil",
           bh_explain_text(x, "%s at %s", bh_explain_number(x, e->recoil_kinetic, "MeV"),
                           bh_explain_number(x, e->recoil_angle / BH_DEGREE, "deg")),
           NULL);
    if (n->beam->kind == BH_KIND_LEPTON)
        factor(x, "epsilon", bh_explain_number(x, e->epsilon, ""),
               "virtual-photon polarisation with the lepton mass");
}

static const char *why_this_fit(const bh_encounter *e)
{
    const bh_structure_model *model = bh_structure_row(e->structure);
    if (strcmp(model->name, "point") == 0 && e->kinetic < bh_validity_nuclear(e).kinetic &&
        e->beam->kind != BH_KIND_LEPTON)
        return "the beam is too slow to reach the nucleus, whose charge acts as a point";
    switch (model->use) {
    case BH_FIT_CROSS_SECTION:
        return "describes measured cross sections, two-photon exchange left inside: what counting "
               "rates need; fits corrected for it miss published cross sections by more";
    case BH_FIT_CORRECTED:
        return "corrected for two-photon exchange: made for polarisation observables, misses "
               "published cross sections by more than an effective fit";
    default:
        return NULL;
    }
}

static void explain_model(bh_explaining *x)
{
    const bh_structure *s = x->channel.encounter.structure;
    double low, high;
    bh_structure_range(s, &low, &high);
    const double q2 = x->event.q2 / MEV2_PER_GEV2;
    bh_explain_add(x, (bh_line){.kind = BH_LINE_MODEL,
                                .name = "structure model",
                                .value = bh_explain_text(x, "%s", bh_structure_name(s)),
                                .formula = bh_explain_text(
                                    x, "valid for Q2 %s to %s GeV2%s",
                                    bh_explain_number(x, low, ""), bh_explain_number(x, high, ""),
                                    q2 < low || q2 > high ? ": extrapolated here" : ""),
                                .source = bh_explain_text(x, "%s", bh_structure_source(s)),
                                .remark = why_this_fit(&x->channel.encounter)});
    if (*bh_structure_note(s))
        bh_explain_add(x, (bh_line){.kind = BH_LINE_NOTE,
                                    .remark = bh_explain_text(x, "%s", bh_structure_note(s))});
    const char *names[MOST_FACTORS];
    double values[MOST_FACTORS];
    const int count = bh_structure_factors(s, x->event.q2, MOST_FACTORS, names, values);
    for (int i = 0; i < count; i++)
        factor(x, bh_explain_text(x, "%s", names[i]), bh_explain_number(x, values[i], ""),
               "form factor at this Q2");
}

/* Other published descriptions of the same nucleus, valid at this momentum transfer. */
struct spread {
    double own, low, high; /* [ub/sr], relative to own */
    int count;
};

static void compare(bh_explaining *x, struct spread *spread, const char *name)
{
    const bh_encounter *e = &x->channel.encounter;
    bh_error ignored;
    const bh_structure *s =
        bh_workspace_structure(x->evaluator.yielder.workspace, name, e->z, e->a, &ignored);
    double from, to;
    if (!s || strcmp(bh_structure_name(s), bh_structure_name(e->structure)) == 0)
        return;
    bh_structure_range(s, &from, &to);
    const double q2 = x->event.q2 / MEV2_PER_GEV2;
    if (q2 < from || q2 > to)
        return;
    const double off = sigma_with(x, s) / spread->own - 1;
    spread->low = fmin(spread->low, off);
    spread->high = fmax(spread->high, off);
    spread->count++;
    bh_explain_add(x, (bh_line){.kind = BH_LINE_MODEL,
                                .name = bh_explain_text(x, "with %s instead", bh_structure_name(s)),
                                .value = bh_explain_text(x, "%s%s", off > 0 ? "+" : "",
                                                         bh_explain_percent(x, off)),
                                .source = bh_explain_text(x, "%s", bh_structure_source(s))});
}

/* What the measurements behind the model are uncertain by; where its fit says more, that. */
static void explain_data(bh_explaining *x)
{
    const bh_structure *s = x->channel.encounter.structure;
    const bh_structure_data data = bh_structure_measured(s);
    const double fit = bh_structure_uncertainty(s, x->event.q2);
    if (fit >= 0)
        factor(x, "uncertainty of the fit", bh_explain_percent(x, fit),
               "as published with it, of the cross section");
    else if (data.uncertainty > 0)
        bh_explain_add(
            x, (bh_line){
                   .kind = BH_LINE_FACTOR,
                   .name = "uncertainty of the data",
                   .value = bh_explain_percent(x, bh_structure_data_uncertainty(s, x->event.q2)),
                   .formula = bh_explain_text(x, "%s of measured cross sections x (1 - GE^2 / Z^2)",
                                              bh_explain_percent(x, data.uncertainty)),
                   .source = data.source});
}

static void explain_spread(bh_explaining *x)
{
    const bh_encounter *e = &x->channel.encounter;
    struct spread spread = {.own = sigma_with(x, e->structure)};
    const bh_structure_model *m;
    for (int i = 0; spread.own > 0 && (m = bh_structure_model_at(i)); i++) {
        for (int k = 1; k < MOST_SETS; k++)
            if (bh_structure_compares(m, k, e->z, e->a))
                compare(x, &spread, bh_explain_text(x, k > 1 ? "%s/%d" : "%s", m->name, k));
    }
    const double half = (spread.high - spread.low) / 2;
    if (spread.count)
        factor(x, "spread over the models", bh_explain_percent(x, half),
               "half the range of the cross section, the model in use among them");
}

static void explain_point_charge(bh_explaining *x, double sigma)
{
    const bh_encounter *e = &x->channel.encounter;
    bh_error ignored;
    const bh_structure *point =
        bh_workspace_structure(x->evaluator.yielder.workspace, "point", e->z, e->a, &ignored);
    if (!point)
        return;
    bh_channel c = x->channel;
    c.encounter.structure = point;
    const double bare = sigma_with(x, point);
    factor(x, "cross section of the point charge", bh_explain_number(x, bare, "ub/sr"),
           c.process->formula(&c.encounter));
    factor(x, "form factors leave", bh_explain_number(x, sigma / bare, ""),
           "cross section with form factors / that of the point charge");
}

void bh_explain_cross_section(bh_explaining *x)
{
    const bh_encounter *e = &x->channel.encounter;
    char nuclide[8];
    const double sigma = sigma_with(x, e->structure);
    bh_explain_section(
        x, bh_explain_text(x, "Collision with %s", bh_nuclide_name(e->z, e->a, nuclide)));
    explain_event(x);
    explain_point_charge(x, sigma);
    explain_model(x);
    explain_spread(x);
    explain_data(x);
    bh_explain_add(x, (bh_line){.kind = BH_LINE_FACTOR,
                                .name = "cross section",
                                .value = bh_explain_number(x, sigma, "ub/sr"),
                                .formula = x->channel.process->formula(e),
                                .source = x->channel.process->source});
    if (x->channel.recoil)
        factor(x, "solid angle of scattered per that of recoil",
               bh_explain_number(x, x->event.scattered_per_recoil, ""),
               "Jacobian, already in the cross section above");
    factor(x, "average over the acceptance",
           bh_explain_number(x, x->part->cross_section / x->part->point_cross_section, ""),
           "mean over the shape / value at the angle, isotopes weighted by their nuclei");
}
