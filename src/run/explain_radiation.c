/* explain_radiation.c - the radiative factor of a row. */
#include <math.h>

#include "beamhours/run/explaining.h"
#include "beamhours/units/constants.h"

static void factor(bh_explaining *x, const char *name, const char *value, const char *formula)
{
    bh_explain_add(
        x, (bh_line){.kind = BH_LINE_FACTOR, .name = name, .value = value, .formula = formula});
}

static const char *number(bh_explaining *x, double value, const char *unit)
{
    return bh_explain_number(x, value, unit);
}

static void explain_cut(bh_explaining *x, const bh_radiated_detail *at)
{
    const char *from = at->by_bite
                           ? "from the elastic line at the row's angle to the lower edge of the "
                             "momentum bite, which is the tighter limit there"
                           : "energy_cut below the elastic line, the tighter limit there";
    const double share = at->cut / (at->event.scattered_kinetic + BH_MASS_ELECTRON);
    bh_explain_add(x, (bh_line){.kind = BH_LINE_FACTOR,
                                .name = "energy that may be lost",
                                .value = number(x, at->cut, "MeV"),
                                .formula = from,
                                .remark = bh_explain_text(x, "%s of the scattered energy",
                                                          number(x, 100 * share, "%"))});
}

static void explain_internal(bh_explaining *x, const bh_radiated_detail *at)
{
    const bh_radiative *model = x->arm->yield->view.radiative;
    const bh_encounter *e = &x->channel.encounter;
    const bh_radiative_parts *p = &at->internal;
    const double share = at->cut / (at->event.scattered_kinetic + e->beam->mass);
    const double doubt = bh_radiative_uncertainty(p, e->z, share);
    bh_explain_add(x, (bh_line){.kind = BH_LINE_MODEL,
                                .name = "internal radiation",
                                .value = model->name,
                                .formula = model->range,
                                .source = model->source,
                                .remark = bh_explain_text(x, "uncertain by %s of the rate",
                                                          number(x, 100 * doubt, "%"))});
    factor(x, "delta z0", number(x, p->z0, ""), "the lepton's own photons and vertex");
    factor(x, "delta z1", number(x, p->z1, ""),
           "lepton and target interfere: changes sign with the charge of the beam");
    factor(x, "delta z2", number(x, p->z2, ""), "the target's own");
    factor(x, "vacuum polarisation", number(x, p->vacuum, ""), "by e, mu, tau and hadrons");
    factor(x, "internal factor", number(x, at->internal_factor, ""),
           "exp(z0 + Z z1 + Z^2 z2) / (1 - vacuum polarisation / 2)^2");
}

static void explain_external(bh_explaining *x, const bh_radiated_detail *at)
{
    bh_explain_add(x, (bh_line){.kind = BH_LINE_FACTOR,
                                .name = "external bremsstrahlung",
                                .value = number(x, at->external, ""),
                                .formula = bh_explain_text(
                                    x, "%s radiation lengths before and %s after the vertex, mean",
                                    number(x, at->before, ""), number(x, at->after, "")),
                                .source = "Mo & Tsai, Rev. Mod. Phys. 41 (1969) 205; Tsai, Rev. "
                                          "Mod. Phys. 46 (1974) 815",
                                .remark = "mean over the depths"});
    factor(x, "single hard collisions", number(x, at->ionisation, ""),
           "1 - xi before / (eta^2 cut) - xi after / cut, eta = E / E'");
}

static const char *why_one(const bh_view *v)
{
    if (v->line.encounter.beam->kind != BH_KIND_LEPTON)
        return "hadrons and ions radiate too little to matter";
    if (v->radiative == bh_radiative_find("none"))
        return "models.radiative: none";
    return "neither energy_cut nor momentum_bite says how much may be lost";
}

void bh_explain_radiation(bh_explaining *x)
{
    const bh_view *v = &x->arm->yield->view;
    bh_yielder *yielder = &x->evaluator.yielder;
    const bh_nuclei scatterer = {
        .list = v->list, .nuclide = v->list->main, .origin = BH_ORIGIN_SIGNAL};
    const size_t count = bh_view_vertices(yielder, &v->way, &scatterer);
    bh_radiated_request request = bh_view_radiated(yielder, v, &x->channel, &v->way, count);
    bh_radiated_detail at;
    request.signal = true;
    const bool idle = !v->gate.given || v->line.encounter.beam->kind != BH_KIND_LEPTON ||
                      v->radiative == bh_radiative_find("none");
    if (!idle && x->reached && bh_radiated_at(&request, x->part->angle, &at) && at.cut > 0) {
        explain_cut(x, &at);
        explain_internal(x, &at);
        explain_external(x, &at);
    }
    factor(x, "radiative factor", number(x, x->part->radiative, ""),
           idle ? why_one(v)
                : "internal x external x single collisions, mean over what is kept of the row");
}
