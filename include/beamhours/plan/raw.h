/* raw.h - a plan as it is written: one struct for each mapping of the key table. */
#ifndef BH_PLAN_RAW_H
#define BH_PLAN_RAW_H

#include "beamhours/schema/schema.h"
#include "beamhours/schema/value.h"

/* Units: those of the keys' dimensions (units/quantity.h); meanings: src/plan/tables.c. */

typedef struct {
    bh_section section;
    bh_value x, y;
} bh_raw_spot;

typedef struct {
    bh_section section;
    bh_value current, power;
} bh_raw_limits;

typedef struct {
    bh_section section;
    bh_word particle;
    bh_value charge;
    bh_sweep kinetic_energy, total_energy, momentum;
    bh_value momentum_spread;
    bh_sweep current;
    bh_value particle_rate, fraction;
    bh_pairs others;
    bh_value duty_factor;
    bh_raw_spot spot, raster;
    bh_value polarisation;
    bh_raw_limits limits;
} bh_raw_beam;

typedef struct {
    bh_section section;
    bh_word material;
    bh_value thickness, areal_density, areal_number;
    bh_word role;
    bh_value density, temperature, pressure, density_loss;
} bh_raw_layer;

typedef struct {
    bh_section section;
    bh_value radius;
    bh_word material;
    bh_value thickness;
} bh_raw_wall;

typedef struct {
    bh_section section;
    bh_either share;
    bh_word use;
} bh_raw_empty;

typedef struct {
    bh_section section;
    bh_word name;
    bh_list layers; /* of bh_raw_layer */
    bh_raw_wall wall;
    bh_word scatterer;
    bh_value tilt;
    bh_raw_empty empty_target;
} bh_raw_target;

typedef struct {
    bh_section section;
    bh_word name, side, detects;
    bh_extent in_plane, out_of_plane, ring;
    bh_value azimuth, solid_angle, bins;
    bh_values edges;
    bh_value angle;
    bh_extent angle_range, momentum_range, momentum_bite, target_view;
    bh_list exit; /* of bh_raw_layer */
    bh_value energy_cut, angle_resolution, momentum_resolution, energy_resolution, threshold;
    bh_value pointing, efficiency, dead_time;
    bh_word dead_time_model;
    bh_value rate_limit, prescale, other_rate;
} bh_raw_arm;

typedef struct {
    bh_section section;
    bh_word process;
    bh_pairs structure;
    bh_word coulomb, radiative, energy_loss;
} bh_raw_models;

/* What one arm is set to and asked for. */
typedef struct {
    bh_section section;
    bh_word arm;
    bh_sweep angle, q2;
    bh_value central_momentum, goal, time, charge, counts;
    bh_word goal_for;
    bh_value prescale;
} bh_raw_aim;

typedef struct {
    bh_section section;
    bh_words arms;
    bh_value window;
} bh_raw_coincidence;

typedef struct {
    bh_section section;
    bh_word name;
    bh_raw_aim aim; /* its keys stand in the setting itself */
    bh_list arms;   /* of bh_raw_aim */
    bh_raw_coincidence coincidence;
    bh_word target;
    bh_value tilt;
    bh_raw_beam beam;
    bh_word process;
} bh_raw_setting;

typedef struct {
    bh_section section;
    bh_value energy, particle, target, angle;
} bh_raw_changes;

typedef struct {
    bh_section section;
    bh_word name;
    bh_value time;
    bh_either every;
    bh_word beam;
} bh_raw_task;

typedef struct {
    bh_section section;
    bh_value available;
    bh_word available_as;
    bh_value availability, shift, week, start_up;
    bh_raw_changes changes;
    bh_list tasks; /* of bh_raw_task */
    bh_value contingency;
} bh_raw_schedule;

typedef struct {
    bh_section section;
    bh_value plan;
    bh_word title, notes;
    bh_raw_beam beam;
    bh_raw_target target;
    bh_list targets; /* of bh_raw_target */
    bh_list arms;    /* of bh_raw_arm */
    bh_raw_models models;
    bh_raw_setting every_setting;
    bh_list settings; /* of bh_raw_setting */
    bh_raw_schedule schedule;
} bh_raw_plan;

/* The one table of keys: of the whole plan, and of the parts that are read or merged alone. */
extern const bh_schema bh_schema_plan, bh_schema_beam, bh_schema_layer, bh_schema_target,
    bh_schema_arm, bh_schema_models, bh_schema_aim, bh_schema_coincidence, bh_schema_setting,
    bh_schema_schedule, bh_schema_task;

/* Words that are told apart by their place in these lists (enums of plan.h). */
extern const char *const bh_words_angle[],
    *const bh_words_role[], *const bh_words_side[], *const bh_words_detects[],
                                                        *const bh_words_dead_time_model[],
                                                            *const bh_words_every[];

#endif
