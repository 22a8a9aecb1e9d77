/* arms.c - arms: shape, bins, where they can stand. */
#include <math.h>

#include "beamhours/base/sentences.h"
#include "beamhours/plan/making.h"
#include "beamhours/schema/reading.h"

/* Two ways at once, half of one, or none. */
static void check_shape(const bh_making *making, const bh_raw_arm *raw)
{
    const bool in = raw->in_plane.given, out = raw->out_of_plane.given;
    const bh_extent *flat = in ? &raw->in_plane : &raw->out_of_plane;
    const char *name = in ? "in_plane" : "out_of_plane";
    if (raw->ring.given && (in || out))
        bh_tell(making, raw->ring.at, &raw->section, "ring", BH_SAY_TWO_OF_GROUP, name, "ring");
    else if (in != out)
        bh_tell(making, flat->at, &raw->section, name, BH_SAY_HALF_SHAPE, name,
                in ? "out_of_plane" : "in_plane");
    else if (!in && !raw->ring.given && !raw->solid_angle.given && raw->section.node)
        bh_tell(making, raw->section.at, &raw->section, "in_plane", BH_SAY_MISSING_GROUP,
                bh_schema_arm.name, "in_plane with out_of_plane, ring or solid_angle");
    if (raw->azimuth.given && !raw->ring.given)
        bh_tell(making, raw->azimuth.at, &raw->section, "azimuth", BH_SAY_NO_RING);
}

static bh_shape shape_of(const bh_raw_arm *raw)
{
    if (raw->ring.given)
        return BH_SHAPE_RING;
    return raw->in_plane.given || raw->out_of_plane.given ? BH_SHAPE_RECTANGLE : BH_SHAPE_POINT;
}

/* --- bins --- */

static void check_edges(const bh_making *making, const bh_raw_arm *raw)
{
    const bh_values *edges = &raw->edges;
    char here[BH_QUANTITY_SIZE], before[BH_QUANTITY_SIZE];
    if (edges->count == 1)
        bh_tell(making, edges->at, &raw->section, "edges", BH_SAY_ONE_EDGE);
    if (edges->count > BH_MOST_ARM_BINS + 1)
        bh_tell(making, edges->at, &raw->section, "edges", BH_SAY_ARM_BINS, edges->count - 1,
                BH_MOST_ARM_BINS);
    /* Of too many edges none is looked at. */
    for (size_t i = 1; i < edges->count && edges->count <= BH_MOST_ARM_BINS + 1; i++)
        if (edges->items[i].value <= edges->items[i - 1].value)
            bh_tell(making, edges->items[i].at, &raw->section, "edges", BH_SAY_EDGES_RISE,
                    bh_angle_text(edges->items[i].value, here),
                    bh_angle_text(edges->items[i - 1].value, before));
}

static bh_code set_bins(const bh_making *making, const bh_raw_arm *raw, bh_arm *arm)
{
    const bh_values *edges = &raw->edges;
    arm->bins = raw->bins.value >= 1.0 ? (int)raw->bins.value : 1;
    const bool many = arm->bins > 1 || edges->given;
    if (many && arm->shape == BH_SHAPE_POINT && raw->solid_angle.given)
        bh_tell(making, edges->given ? edges->at : raw->bins.at, &raw->section,
                edges->given ? "edges" : "bins", BH_SAY_POINT_BINS);
    if (edges->count == 0)
        return BH_OK;
    check_edges(making, raw);
    double *copy = bh_arena_take(making->reading.arena, edges->count, sizeof *copy);
    if (!copy)
        return BH_ENOMEM;
    for (size_t i = 0; i < edges->count; i++)
        copy[i] = edges->items[i].value;
    arm->edges = copy;
    arm->bins =
        edges->count > 1 && edges->count <= BH_MOST_ARM_BINS + 1 ? (int)edges->count - 1 : 1;
    return BH_OK;
}

/* --- where it stands --- */

static void check_ring(const bh_making *making, const bh_raw_arm *raw, const bh_arm *arm)
{
    char text[BH_QUANTITY_SIZE], from[BH_QUANTITY_SIZE], to[BH_QUANTITY_SIZE];
    if (raw->angle.given)
        bh_tell(making, raw->angle.at, &raw->section, "angle", BH_SAY_RING_ANGLE,
                raw->name.text ? raw->name.text : "?", "angle");
    if (raw->ring.from <= 0.0)
        bh_tell(making, raw->ring.at, &raw->section, "ring", BH_SAY_RING_BEAM,
                bh_angle_text(raw->ring.from, text));
    for (size_t i = 0; i < raw->edges.count && raw->edges.count <= BH_MOST_ARM_BINS + 1; i++) {
        const bh_value *edge = &raw->edges.items[i];
        if (edge->value < arm->ring.from - 1e-9 || edge->value > arm->ring.to + 1e-9)
            bh_tell(making, edge->at, &raw->section, "edges", BH_SAY_EDGE_OUTSIDE,
                    bh_angle_text(edge->value, text), bh_angle_text(arm->ring.from, from),
                    bh_angle_text(arm->ring.to, to));
    }
}

static bh_code make_arm(const bh_making *making, const bh_raw_arm *raw, bh_arm *arm)
{
    bh_layer *exit;
    *arm = (bh_arm){
        .name = raw->name,
        .side = (bh_side)bh_schema_choice(raw->side.text, bh_words_side),
        .detects = (bh_detects)bh_schema_choice(raw->detects.text, bh_words_detects),
        .in_plane = raw->in_plane,
        .out_of_plane = raw->out_of_plane,
        .ring = raw->ring,
        .azimuth = raw->azimuth,
        .solid_angle = raw->solid_angle,
        .angle = raw->angle,
        .angle_range = raw->angle_range,
        .momentum_range = raw->momentum_range,
        .momentum_bite = raw->momentum_bite,
        .target_view = raw->target_view,
        .energy_cut = raw->energy_cut,
        .angle_resolution = raw->angle_resolution,
        .momentum_resolution = raw->momentum_resolution,
        .energy_resolution = raw->energy_resolution,
        .threshold = raw->threshold,
        .pointing = raw->pointing,
        .efficiency = raw->efficiency,
        .dead_time = raw->dead_time,
        .dead_time_model = (bh_dead_time_model)bh_schema_choice(raw->dead_time_model.text,
                                                                bh_words_dead_time_model),
        .rate_limit = raw->rate_limit,
        .prescale = raw->prescale.value >= 1.0 ? (int)raw->prescale.value : 1,
        .other_rate = raw->other_rate,
        .at = raw->section.at,
    };
    arm->shape = shape_of(raw);
    check_shape(making, raw);
    if (arm->shape == BH_SHAPE_RING)
        check_ring(making, raw, arm);
    if (set_bins(making, raw, arm) || bh_make_layers(making, &raw->exit, &exit, &arm->exit_count))
        return BH_ENOMEM;
    arm->exit = exit;
    return BH_OK;
}

bh_code bh_make_arms(bh_making *making)
{
    const bh_raw_arm *raw = making->raw.arms.items;
    const size_t n = making->raw.arms.count;
    making->arms = bh_arena_take(making->reading.arena, n + 1, sizeof *making->arms);
    making->edges_missed = bh_arena_take(making->reading.arena, n + 1, sizeof(bool));
    if (!making->arms || !making->edges_missed)
        return BH_ENOMEM;
    making->plan.arms = making->arms;
    making->plan.arm_count = n;
    for (size_t i = 0; i < n; i++)
        if (make_arm(making, &raw[i], &making->arms[i]))
            return BH_ENOMEM;
    return BH_OK;
}
