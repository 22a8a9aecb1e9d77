/* sight.c - whether an arm can do what a setting asks of it. */
#include <math.h>

#include "beamhours/base/sentences.h"
#include "beamhours/plan/making.h"
#include "beamhours/schema/reading.h"
#include "beamhours/units/constants.h"
#include "beamhours/units/nuclide.h"

/* Where the angle of the row was written. */
struct place {
    const bh_section *section;
    const char *key;
    bh_mark at;
};

static const char *name_of(const bh_arm *arm)
{
    return arm->name.text ? arm->name.text : "?";
}

/* Beam and scatterer of the row; false where one of them is not known. */
static bool collision_of(const bh_sight *sight, bh_collision *out, char nuclide[8])
{
    const bh_beam *beam = &sight->setting->beam;
    bh_constituent main;
    if (!(beam->kinetic_energy.value > 0.0) || !(beam->particle.mass > 0.0))
        return false;
    if (!sight->setting->target || !bh_main_nuclide(sight->setting->target, &main))
        return false;
    *out = (bh_collision){
        .mass = beam->particle.mass, .target = main.mass, .kinetic = beam->kinetic_energy.value};
    bh_nuclide_name(main.z, main.a, nuclide);
    return true;
}

/* --- q2 to angle --- */

static void angle_from_q2(const bh_sight *sight)
{
    bh_setting_arm *row = sight->row;
    bh_collision collision;
    bh_event event;
    char nuclide[8];
    row->angle = (bh_value){.value = NAN, .at = row->q2.at};
    if (isnan(row->q2.value) || !collision_of(sight, &collision, nuclide))
        return;
    const double largest = bh_kinematics_largest_q2(&collision);
    if (bh_kinematics_q2(&collision, row->q2.value, &event, NULL) == BH_OK) {
        const bool recoil = row->arm.detects == BH_DETECTS_RECOIL;
        row->angle.value = recoil ? event.recoil_angle : event.scattered_angle;
        return;
    }
    char q2[BH_QUANTITY_SIZE], energy[BH_QUANTITY_SIZE], most[BH_QUANTITY_SIZE];
    bh_tell(sight->making, row->q2.at, &sight->aim->section, "q2", BH_SAY_Q2_BEYOND,
            bh_quantity_text(row->q2.value, BH_DIM_Q2, q2), sight->setting->beam.particle.name,
            bh_quantity_text(collision.kinetic, BH_DIM_ENERGY, energy), nuclide,
            bh_quantity_text(largest, BH_DIM_Q2, most));
}

/* --- reach --- */

static bool reachable(const bh_sight *sight, const struct place *place, double angle,
                      bh_event *event)
{
    const bh_setting_arm *row = sight->row;
    bh_collision collision;
    char nuclide[8], here[BH_QUANTITY_SIZE], most[BH_QUANTITY_SIZE];
    if (!collision_of(sight, &collision, nuclide))
        return false;
    if (row->arm.detects == BH_DETECTS_RECOIL) {
        if (bh_kinematics_recoil(&collision, angle, event, NULL) == BH_OK && angle < BH_PI / 2.0)
            return true;
        bh_tell(sight->making, place->at, place->section, place->key, BH_SAY_RECOIL_BEYOND,
                bh_angle_text(angle, here));
        return false;
    }
    if (bh_kinematics_scattered(&collision, angle, BH_BRANCH_FAST, event, NULL) == BH_OK)
        return true;
    /* A recoil may still arrive there. */
    if (row->arm.detects == BH_DETECTS_EITHER && angle < BH_PI / 2.0)
        return bh_kinematics_recoil(&collision, angle, event, NULL) == BH_OK;
    bh_tell(sight->making, place->at, place->section, place->key, BH_SAY_ANGLE_BEYOND,
            bh_angle_text(angle, here), sight->setting->beam.particle.name, nuclide,
            bh_angle_text(bh_kinematics_largest_angle(&collision), most));
    return false;
}

static void check_momentum(const bh_sight *sight, const struct place *place, const bh_event *event)
{
    const bh_setting_arm *row = sight->row;
    const bh_extent *range = &row->arm.momentum_range;
    const bool written = row->central_momentum.given;
    const bool recoil = row->arm.detects == BH_DETECTS_RECOIL;
    char here[BH_QUANTITY_SIZE], from[BH_QUANTITY_SIZE], to[BH_QUANTITY_SIZE];
    if (!range->given || (!written && !event))
        return;
    const double arriving = written  ? 0.0
                            : recoil ? event->recoil_momentum
                                     : event->scattered_momentum;
    const double p = written ? row->central_momentum.value : arriving;
    if (!(p < range->from || p > range->to))
        return;
    bh_quantity_text(p, BH_DIM_MOMENTUM, here);
    bh_quantity_text(range->from, BH_DIM_MOMENTUM, from);
    bh_quantity_text(range->to, BH_DIM_MOMENTUM, to);
    if (written)
        bh_tell(sight->making, row->central_momentum.at, &sight->aim->section, "central_momentum",
                BH_SAY_OUTSIDE_MOMENTA, here, name_of(&row->arm), from, to);
    else
        bh_tell(sight->making, place->at, place->section, place->key, BH_SAY_MOMENTUM_AWAY, here,
                name_of(&row->arm), from, to);
}

/* --- room --- */

static void check_range(const bh_sight *sight, const struct place *place)
{
    const bh_setting_arm *row = sight->row;
    const bh_extent *range = &row->arm.angle_range;
    const double angle = row->angle.value, slack = 1e-9; /* of unit conversion */
    if (!range->given || !(angle < range->from - slack || angle > range->to + slack))
        return;
    char here[BH_QUANTITY_SIZE], from[BH_QUANTITY_SIZE], to[BH_QUANTITY_SIZE];
    bh_tell(sight->making, place->at, place->section, place->key, BH_SAY_OUTSIDE_ANGLES,
            bh_angle_text(angle, here), name_of(&row->arm), bh_angle_text(range->from, from),
            bh_angle_text(range->to, to));
}

static void check_overlap(const bh_sight *sight, const struct place *place)
{
    const bh_setting_arm *row = sight->row;
    const bh_extent *in = &row->arm.in_plane, *out = &row->arm.out_of_plane;
    const double angle = row->angle.value;
    const bool flat = row->arm.shape == BH_SHAPE_RECTANGLE;
    const double inwards = flat ? -in->from : 0.0;
    const bool level = !flat || (out->from <= 0.0 && out->to >= 0.0);
    const bool across = !flat || angle + in->to >= 0.0;
    if (!(level && across && angle - inwards <= 0.0))
        return;
    char here[BH_QUANTITY_SIZE], half[BH_QUANTITY_SIZE], least[BH_QUANTITY_SIZE];
    bh_tell(sight->making, place->at, place->section, place->key, BH_SAY_OVERLAPS_BEAM,
            bh_angle_text(angle, here), bh_angle_text(inwards, half),
            bh_angle_text(inwards, least));
}

/* Unequal bins of a flat acceptance are given in angles from the beam. */
static void check_edges(const bh_sight *sight)
{
    const bh_arm *arm = &sight->row->arm;
    const double angle = sight->row->angle.value, slack = 1e-9;
    const double from = angle + arm->in_plane.from, to = angle + arm->in_plane.to;
    char here[BH_QUANTITY_SIZE], low[BH_QUANTITY_SIZE], high[BH_QUANTITY_SIZE];
    const bh_raw_arm *raw = sight->making->raw.arms.items;
    for (size_t i = 0; i < sight->making->plan.arm_count; i++) {
        bool *missed = &sight->making->edges_missed[i];
        const size_t count = raw[i].edges.count;
        if (sight->making->arms[i].edges != arm->edges || *missed || count > BH_MOST_ARM_BINS + 1)
            continue;
        for (size_t k = 0; k < count; k++) {
            const bh_value *edge = &raw[i].edges.items[k];
            const bool outside = edge->value < from - slack || edge->value > to + slack;
            *missed = *missed || outside;
            if (outside)
                bh_tell(sight->making, edge->at, &raw[i].section, "edges", BH_SAY_EDGE_OUTSIDE,
                        bh_angle_text(edge->value, here), bh_angle_text(from, low),
                        bh_angle_text(to, high));
        }
    }
}

static struct place place_of(const bh_sight *sight)
{
    const bh_setting_arm *row = sight->row;
    struct place place = {&sight->aim->section, row->q2.given ? "q2" : "angle", row->angle.at};
    const bh_raw_arm *raw = sight->making->raw.arms.items;
    for (size_t i = 0; row->arm.angle.given && i < sight->making->plan.arm_count; i++)
        if (sight->making->arms[i].angle.given && raw[i].name.text == row->arm.name.text)
            place.section = &raw[i].section; /* fixed: it was written with the arm */
    return place;
}

/* All of the scattered energy below the line is no cut. */
static void check_cut(const bh_sight *sight, const bh_event *event, double angle)
{
    const bh_setting_arm *row = sight->row;
    const bh_value *cut = &row->arm.energy_cut;
    const bool recoil = row->arm.detects == BH_DETECTS_RECOIL;
    const double kinetic = recoil ? event->recoil_kinetic : event->scattered_kinetic;
    const bh_raw_arm *raw = sight->making->raw.arms.items;
    char here[BH_QUANTITY_SIZE], all[BH_QUANTITY_SIZE], at[BH_QUANTITY_SIZE];
    if (!cut->given || cut->value < kinetic)
        return;
    for (size_t i = 0; i < sight->making->plan.arm_count; i++)
        if (raw[i].name.text == row->arm.name.text)
            bh_tell(sight->making, cut->at, &raw[i].section, "energy_cut", BH_SAY_CUT_BEYOND,
                    bh_quantity_text(cut->value, BH_DIM_ENERGY, here),
                    bh_quantity_text(kinetic, BH_DIM_ENERGY, all), bh_angle_text(angle, at));
}

/* Nothing arrives where even the smallest angle of a ring is too large. */
static void check_ring(const bh_sight *sight)
{
    const bh_arm *arm = &sight->row->arm;
    const bh_raw_arm *raw = sight->making->raw.arms.items;
    bh_event event;
    for (size_t i = 0; i < sight->making->plan.arm_count; i++) {
        const struct place place = {&raw[i].section, "ring", arm->ring.at};
        if (sight->making->arms[i].name.text == arm->name.text && arm->ring.from > 0.0 &&
            reachable(sight, &place, arm->ring.from, &event))
            check_cut(sight, &event, arm->ring.from);
    }
}

void bh_check_row(const bh_sight *sight)
{
    bh_setting_arm *row = sight->row;
    bh_event event;
    if (row->arm.shape == BH_SHAPE_RING) {
        check_ring(sight);
        return;
    }
    if (row->q2.given)
        angle_from_q2(sight);
    if (isnan(row->angle.value))
        return;
    const struct place place = place_of(sight);
    check_range(sight, &place);
    check_overlap(sight, &place);
    if (row->arm.edges && row->arm.shape == BH_SHAPE_RECTANGLE)
        check_edges(sight);
    const bool reached = reachable(sight, &place, row->angle.value, &event);
    check_momentum(sight, &place, reached ? &event : NULL);
    if (reached)
        check_cut(sight, &event, row->angle.value);
}
