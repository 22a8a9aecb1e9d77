/* making.h - what the files of the plan room share while a plan is made. */
#ifndef BH_PLAN_MAKING_H
#define BH_PLAN_MAKING_H

#include "beamhours/matter/material.h"
#include "beamhours/physics/kinematics.h"
#include "beamhours/plan/plan.h"
#include "beamhours/plan/raw.h"
#include "beamhours/schema/reading.h"

/* Limits of the format. */
enum { BH_MOST_SETTINGS = 10000, BH_MOST_ARM_BINS = 1000, BH_MOST_BINS = 1000000 };

/* A plan with all that it was made from.  `plan` is first: freeing it frees the whole. */
typedef struct {
    bh_plan plan;
    bh_document *document;
    bh_raw_plan raw;
    bh_reading reading;
    bh_material_library *library;
    bh_target *targets; /* plan.targets while they are made */
    bh_arm *arms;
    bool *edges_missed; /* for each arm: that a setting misses its edges has been said */
} bh_making;

/* As bh_say, but not the same sentence at the same place again: what settings share is looked at
 * once for each of them. */
void bh_tell(const bh_making *making, bh_mark at, const bh_section *section, const char *key,
             const char *fmt, ...) BH_PRINTF(5, 6);

/* An angle [rad] in degrees to seven digits: messages compare angles, so all are in one unit. */
const char *bh_angle_text(double angle, char out[BH_QUANTITY_SIZE]);

/* A name that was not found among `count` `names`: sentence `near_fmt` takes it and the nearest,
 * `all_fmt` it and all of them. */
typedef struct {
    const bh_section *section;
    const char *key;
    const bh_word *word;
    const char *const *names;
    size_t count;
} bh_unfound;
void bh_tell_no_target(const bh_making *making, const bh_unfound *unfound);
void bh_tell_no_arm(const bh_making *making, const bh_unfound *unfound);

/* What should have been a nuclide or an element; one of element z would do (0: any). */
void bh_tell_no_nuclide(const bh_making *making, const bh_word *word, const bh_section *section,
                        const char *key, int z);

/* The makers, in this order; each complains and goes on.  BH_ENOMEM alone is returned. */
void bh_make_plan_beam(bh_making *making);
BH_CHECKED bh_code bh_make_targets(bh_making *making);
BH_CHECKED bh_code bh_make_arms(bh_making *making);
BH_CHECKED bh_code bh_make_models(bh_making *making);
BH_CHECKED bh_code bh_make_settings(bh_making *making);
BH_CHECKED bh_code bh_make_schedule(bh_making *making);
void bh_warn_not_built(const bh_making *making);

/* The beam that `raw` describes, with value `i` of what it sweeps; what cannot be said is NaN. */
BH_CHECKED bh_code bh_make_beam(const bh_making *making, const bh_raw_beam *raw, size_t i,
                                bh_beam *out);

/* Value `i` of a sweep, or its only one; NaN where there is none. */
bh_value bh_sweep_value(const bh_sweep *sweep, size_t i);

/* Layers from a list of bh_raw_layer. */
BH_CHECKED bh_code bh_make_layers(const bh_making *making, const bh_list *raw, bh_layer **out,
                                  size_t *count);

/* The most abundant nuclide that `target` counts as its scatterer; false when there is none. */
bool bh_main_nuclide(const bh_target *target, bh_constituent *out);

/* Atoms of a nuclide in the samples of `target`, summed. */
typedef struct {
    int z, a;
    double mass;   /* [MeV] */
    double amount; /* [1/cm2] */
} bh_amount;
enum { BH_MOST_AMOUNTS = 200 };
size_t bh_sample_nuclides(const bh_target *target, bh_amount out[BH_MOST_AMOUNTS]);

/* Sense of one arm of one setting; complains. */
typedef struct {
    const bh_making *making;
    const bh_raw_aim *aim; /* its section leads to the keys */
    const bh_setting *setting;
    bh_setting_arm *row;
} bh_sight;
void bh_check_row(const bh_sight *sight);
void bh_check_process(const bh_making *making, const bh_section *section, const bh_word *process);

/* What an aim wants, and its key; NULL where it wants nothing. */
const bh_value *bh_want_of(const bh_raw_aim *aim, bh_want *want, const char **name);
void bh_forget_wants(bh_raw_aim *aim);

/* The arms of a setting, their rows filled, about to be joined. */
typedef struct {
    const bh_making *making;
    const bh_raw_coincidence *raw;
    const bh_raw_aim *aims;  /* of each row */
    const bh_raw_aim *wants; /* of the setting */
    bh_setting *setting;
    bh_setting_arm *rows; /* those of the setting, and room for one more */
} bh_joining;

/* Turns each arm whose angle is `conjugate` to where the partner of the particle in the middle of
 * the other arm goes, and checks it; complains. */
void bh_place_conjugates(const bh_joining *joining);

/* Adds the row of the coincidence; complains.  BH_ENOMEM. */
BH_CHECKED bh_code bh_add_coincidence(const bh_joining *joining);

/* Applies change `i` (from 0) to the document. */
void bh_apply_change(bh_document *document, const bh_change *change, size_t i,
                     const bh_reading *reading);

#endif
