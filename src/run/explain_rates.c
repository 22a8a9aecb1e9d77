/* explain_rates.c - luminosity, signal, background and what the readout makes of them. */
#include <math.h>

#include "beamhours/run/explaining.h"
#include "beamhours/units/constants.h"
#include "beamhours/units/nuclide.h"

static void factor(bh_explaining *x, const char *name, const char *value, const char *formula)
{
    bh_explain_add(
        x, (bh_line){.kind = BH_LINE_FACTOR, .name = name, .value = value, .formula = formula});
}

static const char *percent(bh_explaining *x, double share)
{
    return bh_explain_number(x, 100 * share, "%");
}

static void explain_luminosity(bh_explaining *x, const bh_contribution *all, size_t count)
{
    const bh_yield *y = x->arm->yield;
    const bh_beam *beam = &x->setting->beam;
    bh_explain_section(x, "Luminosity");
    bh_explain_add(x, (bh_line){.kind = BH_LINE_FACTOR,
                                .name = "beam particles per second",
                                .value = bh_explain_number(x, y->view.beam, "/s"),
                                .formula = beam->rate_written ? "particle rate x fraction"
                                                              : "current / (charge x e) x fraction",
                                .source = "e exact, SI 2019"});
    for (size_t i = 0; i < count; i++)
        if (all[i].presence->origin == BH_ORIGIN_SIGNAL)
            factor(x, bh_explain_place(x, &all[i]), bh_explain_number(x, all[i].seen, "/cm2"),
                   "nuclei along the beam in the part of the layer that is seen");
    factor(x, "scatterer nuclei seen", bh_explain_number(x, y->seen, "/cm2"),
           "sum over sample layers and isotopes");
    factor(x, "luminosity", bh_explain_number(x, y->view.beam * y->seen, "/cm2/s"),
           "beam particles per second x nuclei per cm2: per nucleus, not per nucleon");
}

static void explain_signal(bh_explaining *x)
{
    const bh_part *p = x->part;
    const bh_view *v = &x->arm->yield->view;
    bh_explain_section(x, "Signal");
    factor(x, "mean cross section", bh_explain_number(x, p->cross_section, "ub/sr"),
           "over the shape of the acceptance, per scatterer nucleus");
    factor(x, "solid angle", bh_explain_number(x, p->solid_angle * 1e3, "msr"),
           x->arm->yield->view.arm->arm.solid_angle.given ? "as written"
                                                          : "of the shape, in closed form");
    if (v->cut)
        factor(x, "central momentum", bh_explain_number(x, v->central_momentum, "MeV/c"),
               v->arm->central_momentum.given ? "as written"
                                              : "of the detected particle at the arm's centre");
    factor(x, "kept", bh_explain_number(x, p->kept, ""),
           v->cut ? "share of the events whose momentum is inside the bite" : "no momentum bite");
    bh_explain_resolution(x);
    bh_explain_add(x, (bh_line){.kind = BH_LINE_FACTOR,
                                .name = "efficiency of the arm",
                                .value = bh_explain_number(x, v->arm->arm.efficiency.value, "")});
    bh_explain_radiation(x);
    factor(x, "signal rate", bh_explain_number(x, p->signal, "Hz"),
           "luminosity x 1e-30 cm2/ub x mean cross section x solid angle x radiative factor x kept "
           "x efficiency");
}

static void explain_live(bh_explaining *x)
{
    const bh_live *l = &x->arm->live;
    const bh_arm *a = &x->arm->yield->view.arm->arm;
    bh_explain_section(x, "Readout");
    bh_explain_add(x, (bh_line){.kind = BH_LINE_FACTOR,
                                .name = "dead time leaves",
                                .value = bh_explain_number(x, l->dead_part, ""),
                                .formula = a->dead_time_model == BH_DEAD_PARALYSABLE
                                               ? "exp(-n tau), n the rate while there is beam"
                                               : "1 / (1 + n tau), n the rate while there is beam",
                                .source = "Knoll, Radiation Detection and Measurement, chapter 4",
                                .remark = "from the whole arm: signal, background and other rate"});
    factor(x, "prescale leaves", bh_explain_number(x, l->prescale_part, ""), "1 / prescale");
    factor(x, "rate limit leaves", bh_explain_number(x, l->limit_part, ""),
           a->rate_limit.given ? "min(1, limit / recorded rate)" : "no limit");
    factor(x, "recorded while there is beam", bh_explain_number(x, l->recorded, "Hz"), NULL);
    factor(x, "live fraction", bh_explain_number(x, l->live_fraction, ""), "product of the three");
}

static void explain_sensitivities(bh_explaining *x)
{
    const bh_part *p = x->part;
    bh_explain_section(x, "Sensitivities");
    factor(x, "change of rate for 1 mrad of angle", percent(x, p->per_radian * 1e-3),
           "symmetric difference, central momentum fixed");
    factor(x, "change of rate for 0.1 % of beam momentum", percent(x, p->per_momentum * 1e-3),
           "symmetric difference, arm fixed");
}

void bh_explain_rates(bh_explaining *x)
{
    const bh_yield *y = x->arm->yield;
    if (y->view.arm->first) {
        bh_explain_pair(x);
        return;
    }
    const size_t count = y->view.list->presence_count;
    bh_contribution *all = bh_arena_take(x->arena, count + 1, sizeof *all);
    bh_error ignored;
    if (!all || bh_yield_contributions(&x->evaluator.yielder, y, x->bin, all, &ignored)) {
        x->failed = true; /* it worked when the row was made */
        return;
    }
    explain_luminosity(x, all, count);
    explain_signal(x);
    bh_explain_background(x, all, count);
    explain_live(x);
    explain_sensitivities(x);
}
