/* curve.c - a plan of as many settings as there are points, evaluated in one go. */
#include "beamhours/run/curve_parts.h"

#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/base/text.h"
#include "beamhours/physics/kinematics.h"
#include "beamhours/physics/structure.h"
#include "beamhours/run/arm_at.h"
#include "beamhours/run/event_search.h"
#include "beamhours/run/struck.h"
#include "beamhours/units/constants.h"
#include "beamhours/units/nuclide.h"

enum { POINTS = 61 };

const char *bh_curve_key(bh_against against)
{
    static const char *const keys[] = {"angle_deg", "beam_kinetic_MeV", "q2_GeV2", "epsilon"};
    return keys[against];
}

/* --- where it starts --- */

static const bh_setting *find_setting(const bh_plan *plan, const char *name, bh_error *err)
{
    for (size_t i = 0; i < plan->setting_count; i++)
        if (!name || strcmp(plan->settings[i].name, name) == 0)
            return &plan->settings[i];
    bh_text names = {0};
    for (size_t i = 0; i < plan->setting_count && names.length < 200; i++)
        bh_text_appendf(&names, "%s%s", i ? ", " : "", plan->settings[i].name);
    (void)bh_fail(err, BH_EDOMAIN, "no setting \"%s\"; there are %s", name,
                  names.bytes ? names.bytes : "none");
    bh_text_free(&names);
    return NULL;
}

static const bh_setting_arm *find_arm(const bh_setting *s, const char *name, bh_error *err)
{
    for (size_t i = 0; i < s->arm_count; i++)
        if (!s->arms[i].first && /* the angle of a coincidence is its arms' */
            (!name || (s->arms[i].arm.name.text && strcmp(s->arms[i].arm.name.text, name) == 0)))
            return &s->arms[i];
    (void)bh_fail(err, BH_EDOMAIN, "setting %s has no arm \"%s\"; there is %s", s->name,
                  name ? name : "", s->arm_count ? s->arms[0].arm.name.text : "none");
    return NULL;
}

/* The struck nuclide: the isotope of the scatterer with most nuclei in the samples. */
static const bh_nuclide *struck(const bh_target *t)
{
    bh_arena *arena = bh_arena_new();
    bh_struck_list list;
    const bh_nuclide *found = NULL;
    if (arena && bh_struck_from_target(t, arena, &list) && list.count > 0)
        found = bh_nuclide_find(list.nuclides[list.main].z, list.nuclides[list.main].a);
    bh_arena_free(arena);
    return found;
}

static bh_code start(const bh_plan *plan, const bh_curve_request *r, bh_curve_origin *o,
                     bh_error *err)
{
    o->setting = find_setting(plan, r->setting, err);
    o->arm = o->setting ? find_arm(o->setting, r->arm, err) : NULL;
    if (!o->arm)
        return BH_EDOMAIN;
    const bh_nuclide *nuclide = struck(o->setting->target);
    if (!nuclide)
        return bh_fail(err, BH_EDOMAIN,
                       "the scatterer of this setting has no isotope to compute with");
    o->nuclide = nuclide;
    o->against = r->against;
    o->centre = r->centre;
    o->recoil = o->arm->arm.detects == BH_DETECTS_RECOIL;
    o->collision = (bh_collision){o->setting->beam.particle.mass, nuclide->mass,
                                  o->setting->beam.kinetic_energy.value};
    const bool ring = o->arm->arm.shape == BH_SHAPE_RING;
    o->slices = ring && (r->against == BH_AGAINST_ANGLE || r->against == BH_AGAINST_Q2);
    if (ring && r->against == BH_AGAINST_EPSILON)
        return bh_fail(err, BH_EDOMAIN,
                       "a ring stands still: --against angle, q2 or energy varies it");
    bh_event e;
    const bh_known at = {o->collision.kinetic, o->arm->angle.value, NAN, NAN, o->recoil};
    double kinetic = 0.0;
    o->q2 = bh_event_search(&o->collision, &at, &kinetic, &e, NULL) ? (double)NAN : e.q2;
    if (r->against == BH_AGAINST_EPSILON && isnan(o->q2))
        return bh_fail(err, BH_EDOMAIN, "this setting has no Q2 to keep while epsilon varies");
    return BH_OK;
}

/* --- one point --- */

/* Widest reach of the acceptance towards the beam [rad]: an arm does not look into the beam. */
static double inner_reach(const bh_arm *arm)
{
    if (arm->shape == BH_SHAPE_RECTANGLE)
        return fmax(fabs(arm->in_plane.from), fabs(arm->in_plane.to));
    return 0.0;
}

static void angle_limits(const bh_curve_origin *o, double *lo, double *hi)
{
    const bh_arm *arm = &o->arm->arm;
    const double reach = inner_reach(arm) + 1e-3;
    const double most = o->recoil ? BH_PI / 2.0 : bh_kinematics_largest_angle(&o->collision);
    *lo = arm->angle_range.given ? arm->angle_range.from : 5.0 * BH_DEGREE;
    *hi = arm->angle_range.given ? arm->angle_range.to : 175.0 * BH_DEGREE;
    if (o->slices) {
        *lo = arm->ring.from;
        *hi = arm->ring.to;
    }
    *lo = fmax(*lo, reach);
    *hi = fmin(*hi, fmin(most, BH_PI) - (most < BH_PI ? reach : 0.0));
}

static void limits(const bh_curve_origin *o, double *lo, double *hi)
{
    double a = 0.0, b = 0.0;
    switch (o->against) {
    case BH_AGAINST_ANGLE:
        angle_limits(o, lo, hi);
        return;
    case BH_AGAINST_ENERGY:
        *lo = log(o->collision.kinetic / 4.0);
        *hi = log(o->collision.kinetic * 4.0);
        return;
    case BH_AGAINST_Q2:
        angle_limits(o, &a, &b);
        *hi = bh_kinematics_largest_q2(&o->collision) * 0.999;
        *lo = *hi / 1000.0;
        return;
    case BH_AGAINST_EPSILON:
        *lo = 0.02;
        *hi = 0.98;
        return;
    }
}

/* What is known at x; the beam's angle or energy follows. */
static bh_known known_at(const bh_curve_origin *o, double x)
{
    bh_known k = {NAN, NAN, NAN, NAN, o->recoil};
    if (o->against == BH_AGAINST_ANGLE || o->against == BH_AGAINST_Q2)
        k.kinetic = o->collision.kinetic;
    if (o->against == BH_AGAINST_ANGLE)
        k.angle = x;
    if (o->against == BH_AGAINST_Q2)
        k.q2 = x;
    if (o->against == BH_AGAINST_EPSILON) {
        k.q2 = o->q2;
        k.epsilon = x;
    }
    return k;
}

static double shown(bh_against against, double x)
{
    return against == BH_AGAINST_ANGLE ? x / BH_DEGREE : against == BH_AGAINST_Q2 ? x * 1e-6 : x;
}

static void set_energy(bh_setting *s, double kinetic)
{
    s->beam.kinetic_energy.value = kinetic;
    s->beam.kinetic_energy.uncertainty = 0.0;
}

/* Adds the point at x where there is an event and the arm can stand there. */
static void add_point(bh_curve *c, const bh_curve_origin *o, double x)
{
    bh_setting s = *o->setting;
    bh_setting_arm a = *o->arm;
    if (o->against == BH_AGAINST_ENERGY) {
        x = exp(x);
        bh_collision in = o->collision;
        in.kinetic = x;
        if (!o->recoil && a.arm.shape != BH_SHAPE_RING &&
            a.angle.value > bh_kinematics_largest_angle(&in))
            return;
        set_energy(&s, x);
    } else {
        const bh_known known = known_at(o, x);
        bh_event e;
        double kinetic = 0.0, lo = 0.0, hi = 0.0;
        if (bh_event_search(&o->collision, &known, &kinetic, &e, NULL))
            return;
        set_energy(&s, kinetic);
        a.angle.value = o->recoil ? e.recoil_angle : e.scattered_angle;
        angle_limits(o, &lo, &hi);
        if (a.angle.value < lo || a.angle.value > hi)
            return;
        if (o->centre)
            bh_arm_centre(&a);
        else if (o->slices)
            bh_arm_slice(&a);
    }
    c->x[c->count] = shown(o->against, x);
    c->settings[c->count] = s;
    c->arms[c->count] = a;
    c->settings[c->count].arms = &c->arms[c->count];
    c->settings[c->count].arm_count = 1;
    c->count++;
}

/* --- all of it --- */

static void add_points(bh_curve *c, const bh_curve_origin *o, int wanted)
{
    double lo = 0.0, hi = 0.0;
    const int points = wanted < 2 ? POINTS : wanted > BH_CURVE_MOST ? BH_CURVE_MOST : wanted;
    limits(o, &lo, &hi);
    for (int i = 0; i < points && hi > lo; i++)
        add_point(c, o, i == points - 1 ? hi : lo + (hi - lo) * i / (points - 1));
}

/* The model of the struck nuclide, and how far it is known. */
static bh_code name_model(bh_curve *c, const bh_plan *plan, const bh_curve_request *r,
                          const bh_curve_origin *o, bh_error *err)
{
    if (!o->nuclide)
        return BH_OK;
    const int z = o->nuclide->z, a = o->nuclide->a;
    const char *name = r->structure ? r->structure : bh_plan_structure(plan, z, a);
    bh_structure *made = bh_structure_new(name, z, a, r->structure ? err : NULL);
    if (!made) /* one of the plan complains where it is used */
        return r->structure ? err->code = BH_EDOMAIN : BH_OK;
    if (o->setting->beam.particle.kind == BH_KIND_LEPTON) /* others meet all the charge */
        (void)snprintf(c->model, sizeof c->model, "%s", bh_structure_name(made));
    bh_structure_range(made, &c->known[0], &c->known[1]);
    bh_structure_free(made);
    return BH_OK;
}

static bh_code evaluate(bh_curve *c, const bh_plan *plan, const bh_curve_request *r,
                        const bh_curve_origin *o, bh_error *err)
{
    if (name_model(c, plan, r, o, err))
        return err->code;
    add_points(c, o, r->points);
    if (c->count == 0)
        return bh_fail(err, BH_EDOMAIN, "this arm can stand at no point of the curve");
    c->plan = *plan;
    c->plan.settings = c->settings;
    c->plan.setting_count = c->count;
    c->slices = o->slices || o->centre;
    if (r->structure && o->nuclide) {
        c->choice = (bh_structure_choice){o->nuclide->z, o->nuclide->a, {.text = r->structure}};
        c->plan.models.by_nuclide = &c->choice;
        c->plan.models.choice_count = 1;
    }
    const bh_evaluation how = {.cancelled = r->cancelled, .asker = r->asker};
    c->table = bh_table_new(&c->plan, &how, NULL, err);
    if (!c->table)
        return err->code;
    return bh_curve_mark(c, plan, o) ? BH_OK
                                     : bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
}

bh_curve *bh_curve_new(const bh_plan *plan, const bh_curve_request *request, bh_error *err)
{
    bh_curve_origin o = {0};
    bh_error unseen = {.code = BH_OK};
    err = err ? err : &unseen;
    if (start(plan, request, &o, err))
        return NULL;
    bh_curve *c = calloc(1, sizeof *c);
    if (!c) {
        (void)bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
        return NULL;
    }
    if (evaluate(c, plan, request, &o, err) == BH_OK)
        return c;
    bh_curve_free(c);
    return NULL;
}

void bh_curve_free(bh_curve *curve)
{
    if (!curve)
        return;
    bh_table_free(curve->table);
    for (size_t i = 0; i < curve->count; i++)
        free(curve->marks[i]);
    free(curve);
}

size_t bh_curve_count(const bh_curve *curve)
{
    return curve->count;
}

double bh_curve_x(const bh_curve *curve, size_t i)
{
    return curve->x[i];
}

double bh_curve_y(const bh_curve *curve, size_t i, bh_column_id column)
{
    if (curve->slices && column == BH_COL_LIVE)
        return (double)NAN;
    return bh_table_number(curve->table, false, i, column);
}

bh_curve_model bh_curve_structure(const bh_curve *curve)
{
    return (bh_curve_model){curve->model, curve->known[0], curve->known[1]};
}

bool bh_curve_inside(const bh_curve *curve, size_t i)
{
    const double q2 = bh_table_number(curve->table, false, i, BH_COL_Q2);
    return !curve->model[0] || !(q2 < curve->known[0] || q2 > curve->known[1]);
}

const char *bh_curve_marks(const bh_curve *curve, size_t i)
{
    return curve->marks[i];
}
