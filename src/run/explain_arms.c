/* explain_arms.c - how well an arm measures, and what two of them count together. */
#include <math.h>

#include "beamhours/run/explaining.h"
#include "beamhours/run/taking.h"

static void factor(bh_explaining *x, const char *name, const char *value, const char *formula)
{
    bh_explain_add(
        x, (bh_line){.kind = BH_LINE_FACTOR, .name = name, .value = value, .formula = formula});
}

static const char *percent(bh_explaining *x, double share)
{
    return bh_explain_number(x, 100 * share, "%");
}

static const char *rate(bh_explaining *x, double value)
{
    return bh_explain_number(x, value, "Hz");
}

/* The width of the measured momentum of the detected particle at the row's angle. */
static void explain_momentum(bh_explaining *x)
{
    const bh_view *v = &x->arm->yield->view;
    const bh_momentum_rms rms = bh_taking_rms(&v->arm->arm, &v->setting->beam);
    const char *none = "0 %";
    if (!(rms.momentum > 0 || rms.energy > 0 || rms.beam > 0))
        return;
    factor(x, "momentum resolution",
           rms.energy > 0     ? bh_explain_number(x, rms.energy * 1e3, "keV")
           : rms.momentum > 0 ? percent(x, rms.momentum)
                              : none,
           "rms of the arm");
    factor(x, "momentum spread of the beam", rms.beam > 0 ? percent(x, rms.beam) : none,
           "rms; carried to the detected particle at a fixed angle, in quadrature with the arm's");
}

void bh_explain_resolution(bh_explaining *x)
{
    const bh_view *v = &x->arm->yield->view;
    const bh_part *p = x->part;
    explain_momentum(x);
    if (v->parts < 2 || !(v->angle_rms > 0))
        return;
    bh_explain_add(x, (bh_line){.kind = BH_LINE_FACTOR,
                                .name = "measured - true angle",
                                .value = bh_explain_number(x, v->angle_rms * 1e3, "mrad"),
                                .formula = "rms: angle_resolution and multiple scattering before "
                                           "and behind the collision, in quadrature",
                                .source = "Lynch and Dahl, Nucl. Instr. Meth. B 58 (1991) 6",
                                .remark = "the aperture admits true angles, bins sort measured "
                                          "ones; what is measured outside all of them counts in "
                                          "the outermost"});
    if (x->bin)
        factor(x, "kept before bins exchange events", bh_explain_number(x, p->belonging, ""),
               bh_explain_text(x,
                               "kept after it: %s; a bin that wins more than it loses may have "
                               "more than 1",
                               bh_explain_number(x, p->kept, "")));
}

/* --- coincidences --- */

static void explain_yield(bh_explaining *x)
{
    const bh_yield *y = x->arm->yield;
    const bh_part *p = x->part;
    bh_explain_section(x, "Signal");
    factor(x, "beam particles per second", bh_explain_number(x, y->view.beam, "/s"), NULL);
    factor(x, "scatterer nuclei seen", bh_explain_number(x, y->seen, "/cm2"),
           "by both arms: in each layer the part that both views share");
    factor(x, "solid angle", bh_explain_number(x, p->solid_angle * 1e3, "msr"),
           "joint, of the first arm's particle: its partner, opposite in azimuth and at the angle "
           "that follows, is in the second arm");
    factor(x, "mean cross section", bh_explain_number(x, p->cross_section, "ub/sr"),
           "over the joint solid angle, per scatterer nucleus");
    factor(x, "kept", bh_explain_number(x, p->kept, ""),
           "share of these events with both momenta inside their bites and above the thresholds");
    factor(x, "radiative factor", bh_explain_number(x, p->radiative, ""),
           "event by event of the arm that allows less to be radiated; mean over what is kept");
    bh_explain_resolution(x);
    factor(x, "efficiency of both arms",
           bh_explain_number(x, y->view.arm->arm.efficiency.value, ""),
           bh_explain_text(x, "%s x %s",
                           bh_explain_number(x, y->view.arm->first->arm.efficiency.value, ""),
                           bh_explain_number(x, y->view.arm->second->arm.efficiency.value, "")));
    factor(x, "signal rate", rate(x, p->signal),
           "beam x nuclei x 1e-30 cm2/ub x mean cross section x solid angle x radiative factor x "
           "kept x efficiency");
}

/* Rate of the triggers of an arm of the setting. */
static double triggers(const bh_explaining *x, const bh_setting_arm *arm)
{
    const bh_part *p = x->hours.arms[arm - x->setting->arms].yield->part;
    return p->signal + p->windows + p->other + arm->arm.other_rate.value;
}

static void explain_background(bh_explaining *x)
{
    const bh_setting_arm *row = x->arm->yield->view.arm;
    const bh_part *p = x->part;
    bh_explain_section(x, "Background");
    factor(x, "both particles from windows and other nuclides",
           rate(x, p->windows + p->other - p->accidental),
           "elastic events in both arms; other reactions with a particle in each are left out");
    bh_explain_add(
        x, (bh_line){.kind = BH_LINE_FACTOR,
                     .name = "accidentals",
                     .value = rate(x, p->accidental),
                     .formula = bh_explain_text(
                         x, "%s x %s x %s / duty factor %s%s",
                         bh_explain_number(x, row->window.value * 1e9, "ns"),
                         rate(x, triggers(x, row->first)), rate(x, triggers(x, row->second)),
                         bh_explain_number(x, x->setting->beam.duty_factor.value, ""),
                         x->bin ? "; the first arm's by the bin's share of its events" : ""),
                     .source = "Knoll, Radiation Detection and Measurement, chapter 17",
                     .remark = "unrelated particles within the window; all rates of both arms"});
    factor(x, "background rate", rate(x, p->windows + p->other), "sum of the two");
}

void bh_explain_pair(bh_explaining *x)
{
    const bh_live *l = &x->arm->live;
    const bh_part *p = x->part;
    explain_yield(x);
    explain_background(x);
    bh_explain_section(x, "Readout");
    factor(x, "live fraction", bh_explain_number(x, l->live_fraction, ""),
           "of both arms, multiplied: an event counts when both readouts record it");
    factor(x, "recorded while there is beam", rate(x, l->recorded), NULL);
    bh_explain_section(x, "Sensitivities");
    factor(x, "change of rate for 1 mrad of angle", percent(x, p->per_radian * 1e-3),
           "symmetric difference; the first arm turned, the second fixed");
    factor(x, "change of rate for 0.1 % of beam momentum", percent(x, p->per_momentum * 1e-3),
           "symmetric difference, both arms fixed");
}
