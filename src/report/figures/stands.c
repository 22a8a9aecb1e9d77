/* stands.c - acceptances in the variable of a curve, by the kinematics of the setting. */
#include "beamhours/report/stands.h"

#include <math.h>
#include <string.h>

#include "beamhours/run/event_search.h"
#include "beamhours/units/constants.h"
#include "beamhours/units/nuclide.h"

static const double mev2_per_gev2 = 1e6;

static bool near(double a, double b)
{
    return fabs(a - b) <= 1e-6 * fabs(b);
}

/* The most abundant isotope of the scatterer, as the table's kinematics has it. */
static const bh_nuclide *struck(const bh_target *t)
{
    if (t->scatterer_a)
        return bh_nuclide_find(t->scatterer_z, t->scatterer_a);
    size_t count = 0;
    const bh_nuclide *all = bh_element_isotopes(t->scatterer_z, &count), *most = all;
    for (size_t i = 1; i < count; i++)
        if (all[i].abundance > most->abundance)
            most = &all[i];
    return most;
}

/* The event of `setting` whose detected particle is at `angle`. */
static bool event_at(const bh_setting *setting, bool recoil, double angle, bh_event *out)
{
    const bh_nuclide *nuclide = struck(setting->target);
    if (!nuclide)
        return false;
    const double kinetic = setting->beam.kinetic_energy.value;
    const bh_collision masses = {setting->beam.particle.mass, nuclide->mass, kinetic};
    const bh_known known = {kinetic, angle, NAN, NAN, recoil};
    double found = 0.0;
    return !bh_event_search(&masses, &known, &found, out, NULL);
}

/* What stands at a polar angle, in the unit of the curve; NAN where there is no event. */
static double along(bh_against against, const bh_setting *setting, bool recoil, double angle)
{
    bh_event e;
    if (against == BH_AGAINST_ANGLE)
        return angle / BH_DEGREE;
    if (against == BH_AGAINST_ENERGY)
        return setting->beam.kinetic_energy.value;
    if (!event_at(setting, recoil, angle, &e))
        return NAN;
    return against == BH_AGAINST_Q2 ? e.q2 / mev2_per_gev2 : e.epsilon;
}

static bool same_text(const char *a, const char *b)
{
    return a && b ? strcmp(a, b) == 0 : a == b;
}

static bool kept_alike(const bh_stand_origin *o, const bh_setting *setting,
                       const bh_setting_arm *arm)
{
    const double energy = setting->beam.kinetic_energy.value,
                 kept = o->setting->beam.kinetic_energy.value;
    bh_event e, f;
    if (o->against == BH_AGAINST_ENERGY)
        return arm->arm.shape == BH_SHAPE_RING || near(arm->angle.value, o->arm->angle.value);
    if (o->against != BH_AGAINST_EPSILON)
        return near(energy, kept);
    const bool recoil = arm->arm.detects == BH_DETECTS_RECOIL;
    return event_at(setting, recoil, arm->angle.value, &e) &&
           event_at(o->setting, recoil, o->arm->angle.value, &f) && near(e.q2, f.q2);
}

/* Extent and edges of the acceptance; its angles stay in the plane of beam and arm, where the edges
 * are lab angles too. */
static void cover(const bh_stand_origin *o, const bh_setting *setting, const bh_setting_arm *arm,
                  bh_stand *out)
{
    bh_acceptance acceptance;
    const bool recoil = arm->arm.detects == BH_DETECTS_RECOIL;
    const bh_acceptance_spec spec = bh_arm_acceptance(arm);
    if (arm->arm.shape == BH_SHAPE_POINT || bh_acceptance_make(&spec, &acceptance, NULL))
        return;
    const bh_acceptance_part *whole = &acceptance.whole;
    const double a = along(o->against, setting, recoil, fabs(whole->in_from)),
                 b = along(o->against, setting, recoil, fmin(whole->in_to, BH_PI));
    if (isnan(a) || isnan(b))
        return;
    out->from = fmin(a, b);
    out->to = fmax(a, b);
    for (int i = 1; i < acceptance.bins && out->edges < BH_MOST_EDGES; i++) {
        const double edge =
            along(o->against, setting, recoil, fabs(bh_acceptance_edge(&acceptance, i)));
        if (edge > out->from && edge < out->to)
            out->edge[out->edges++] = edge;
    }
}

bool bh_stand_on(const bh_stand_origin *o, const bh_setting *setting, const bh_setting_arm *arm,
                 bh_stand *out)
{
    if (strcmp(setting->beam.particle.name, o->setting->beam.particle.name) != 0 ||
        setting->target != o->setting->target ||
        !same_text(arm->arm.name.text, o->arm->arm.name.text) || !kept_alike(o, setting, arm))
        return false;
    const bool ring = arm->arm.shape == BH_SHAPE_RING, turns = o->against != BH_AGAINST_ENERGY;
    const double at =
        ring && turns
            ? NAN
            : along(o->against, setting, arm->arm.detects == BH_DETECTS_RECOIL, arm->angle.value);
    *out = (bh_stand){.at = at, .from = at, .to = at};
    if (o->against == BH_AGAINST_ANGLE || o->against == BH_AGAINST_Q2)
        cover(o, setting, arm, out);
    return !isnan(out->from);
}
