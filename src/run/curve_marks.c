/* curve_marks.c - which settings of the plan lie on a curve, and where. */
#include <math.h>
#include <string.h>

#include "beamhours/base/text.h"
#include "beamhours/run/curve_parts.h"
#include "beamhours/run/event_search.h"
#include "beamhours/units/constants.h"

static const double mev2_per_gev2 = 1e6;

static bool near(double a, double b)
{
    return fabs(a - b) <= 1e-6 * fabs(b);
}

/* The point closest to `x`, in the curve's own variable; count where that is outside the curve. */
static size_t closest(const bh_curve *c, double x)
{
    size_t best = 0;
    for (size_t i = 1; i < c->count; i++)
        if (fabs(c->x[i] - x) < fabs(c->x[best] - x))
            best = i;
    /* energies stand wider apart the higher they are */
    const size_t beside = best ? best - 1 : 1;
    const double step = c->count > 1 ? fabs(c->x[best] - c->x[beside]) : 0.0;
    return fabs(c->x[best] - x) <= step ? best : c->count;
}

/* Whether the acceptance of `a` covers the angle at which the arm stands at point `at`. */
static bool covers(const bh_curve *c, const bh_setting_arm *a, size_t at)
{
    const double angle = c->arms[at].angle.value, off = angle - a->angle.value;
    if (a->arm.shape == BH_SHAPE_RING)
        return angle >= a->arm.ring.from && angle <= a->arm.ring.to;
    return a->arm.shape == BH_SHAPE_RECTANGLE && off >= a->arm.in_plane.from &&
           off <= a->arm.in_plane.to;
}

/* Whether arm `a` of setting `s` lies on the curve, and there at point `at`: it must agree in what
 * the curve keeps (energy, angle or Q2); where the angle moves its acceptance is marked too. */
static bool arm_stands_at(const bh_curve *c, const bh_curve_origin *o, const bh_setting *s,
                          const bh_setting_arm *a, size_t at)
{
    const double energy = s->beam.kinetic_energy.value;
    const bh_known known = {energy, a->angle.value, NAN, NAN, o->recoil};
    bh_event e;
    double kinetic = 0.0;
    if (o->against == BH_AGAINST_ENERGY)
        return near(a->angle.value, o->arm->angle.value) && closest(c, energy) == at;
    if (bh_event_search(&o->collision, &known, &kinetic, &e, NULL))
        return false;
    if (o->against == BH_AGAINST_EPSILON)
        return near(e.q2, o->q2) && closest(c, e.epsilon) == at;
    if (!near(energy, o->collision.kinetic))
        return false;
    const double x =
        o->against == BH_AGAINST_ANGLE ? a->angle.value / BH_DEGREE : e.q2 / mev2_per_gev2;
    return covers(c, a, at) || closest(c, x) == at;
}

static bool stands_at(const bh_curve *c, const bh_curve_origin *o, const bh_setting *s, size_t at)
{
    if (s->beam.particle.mass < o->collision.mass || s->beam.particle.mass > o->collision.mass)
        return false;
    for (size_t k = 0; k < s->arm_count; k++)
        if (strcmp(s->arms[k].arm.name.text, o->arm->arm.name.text) == 0 &&
            arm_stands_at(c, o, s, &s->arms[k], at))
            return true;
    return false;
}

bool bh_curve_mark(bh_curve *c, const bh_plan *plan, const bh_curve_origin *o)
{
    for (size_t i = 0; i < c->count; i++) {
        bh_text names = {0};
        for (size_t s = 0; s < plan->setting_count; s++)
            if (stands_at(c, o, &plan->settings[s], i))
                bh_text_appendf(&names, "%s%s", names.length ? " " : "", plan->settings[s].name);
        bh_text_append(&names, "");
        c->marks[i] = bh_text_take(&names);
        if (!c->marks[i])
            return false;
    }
    return true;
}
