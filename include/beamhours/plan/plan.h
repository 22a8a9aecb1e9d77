/* plan.h - a plan as typed values: defaults filled in, sweeps and overrides worked out, sense
 * checked. */
#ifndef BH_PLAN_PLAN_H
#define BH_PLAN_PLAN_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/diag.h"
#include "beamhours/document/node.h"
#include "beamhours/matter/material.h"
#include "beamhours/rates/acceptance.h"
#include "beamhours/schema/value.h"
#include "beamhours/units/particle.h"

typedef struct {
    bh_particle particle;
    bh_value share; /* [1] of the whole beam */
} bh_beam_other;

typedef struct {
    bh_particle particle;
    bh_mark at;               /* of the particle's name */
    int charge;               /* as it arrives, in units of e (not 0) */
    bh_value kinetic_energy;  /* [MeV] of the whole particle, whichever of the three was written */
    bh_word energy_key;       /* "kinetic_energy" | "total_energy" | "momentum": the one written */
    bh_value energy_written;  /* [MeV] or [MeV/c] as written under that key, whole particle */
    bh_value momentum_spread; /* [1] rms, relative */
    bh_value current;         /* [A] electrical, given or computed from particle_rate */
    bh_value particle_rate;   /* [1/s] all kinds together, given or computed from current; mean */
    bool rate_written;        /* particle_rate was written, not current */
    bh_value fraction;        /* [1] share that is `particle` */
    size_t other_count;
    const bh_beam_other *others;
    bh_value duty_factor;        /* [1] */
    bh_value spot_x, spot_y;     /* [cm] rms */
    bh_value raster_x, raster_y; /* [cm] full */
    bh_value polarisation;       /* [1] */
    bh_value limit_current;      /* [A] given or absent */
    bh_value limit_power;        /* [W] given or absent */
    bh_mark limits_at;
} bh_beam;

typedef enum { BH_ROLE_SAMPLE, BH_ROLE_WINDOW, BH_ROLE_BACKING } bh_role;

typedef struct {
    const bh_material *material;
    bh_role role;
    bh_value thickness;     /* [cm] given, or areal density / density; 0 for vacuum given by none */
    bh_value areal_density; /* [g/cm2] the resolved one; 0 for vacuum */
    bh_value areal_number;  /* [1/cm2] atoms of all elements together, resolved */
    bh_word size_key;       /* "thickness" | "areal_density" | "areal_number": the one written */
    bh_value density;       /* [g/cm3] the resolved one (given, of the gas, or the material's) */
    bh_value temperature;   /* [K] of a gas, given or absent */
    bh_value pressure;      /* [Pa] of a gas, given or absent */
    bh_value density_loss;  /* [1/A] relative */
    bh_mark at;
} bh_layer;

typedef enum { BH_EMPTY_NONE, BH_EMPTY_SHARE, BH_EMPTY_BEST } bh_empty_kind;

typedef struct bh_target bh_target;
struct bh_target {
    bh_word name;
    size_t layer_count;
    const bh_layer *layers; /* in the order the beam meets them */
    bool has_wall;
    bh_value wall_radius; /* [cm] */
    bh_layer wall;
    int scatterer_z;   /* of the named or only sample element */
    int scatterer_a;   /* 0: the element, its isotopes in the sample summed */
    bh_word scatterer; /* as written or by default, "H" or "208Pb" */
    bh_value tilt;     /* [rad] */
    bh_empty_kind empty;
    bh_value empty_share;       /* [1] of the full-target time; for BH_EMPTY_SHARE */
    const bh_target *empty_use; /* the dummy cell, or NULL: this target without its sample */
    bh_mark at, empty_at;
};

typedef enum { BH_SIDE_RIGHT, BH_SIDE_LEFT } bh_side;
typedef enum { BH_DETECTS_SCATTERED, BH_DETECTS_RECOIL, BH_DETECTS_EITHER } bh_detects;
typedef enum { BH_SHAPE_RECTANGLE, BH_SHAPE_RING, BH_SHAPE_POINT } bh_shape;
typedef enum { BH_DEAD_NON_PARALYSABLE, BH_DEAD_PARALYSABLE } bh_dead_time_model;

typedef struct {
    bh_word name;
    bh_side side;
    bh_detects detects;
    bh_shape shape;
    bh_extent in_plane, out_of_plane; /* [rad] rectangle: around the arm's axis */
    bh_extent ring;                   /* [rad] polar angles */
    bh_value azimuth;                 /* [rad] of a ring */
    bh_value solid_angle;             /* [sr] written: alone a point, beside a shape its size */
    int bins;                         /* >= 1 */
    const double *edges;              /* [rad] bins + 1 rising polar angles (ring) or in-plane lab
                                         angles, or NULL: equal steps */
    bh_value angle;                   /* [rad] of a fixed arm */
    bh_extent angle_range;            /* [rad] */
    bh_extent momentum_range;         /* [MeV/c] */
    bh_extent momentum_bite;          /* [1] relative to the central momentum */
    bh_extent target_view;            /* [cm] seen at 90 degrees, from the centre */
    size_t exit_count;
    const bh_layer *exit;
    bh_value energy_cut;          /* [MeV] */
    bh_value angle_resolution;    /* [rad] rms */
    bh_value momentum_resolution; /* [1] rms */
    bh_value energy_resolution;   /* [MeV] rms */
    bh_value threshold;           /* [MeV] */
    bh_value pointing;            /* [rad] its uncertainty matters */
    bh_value efficiency;          /* [1] */
    bh_value dead_time;           /* [s] per recorded event */
    bh_dead_time_model dead_time_model;
    bh_value rate_limit; /* [1/s] given or absent */
    int prescale;        /* >= 1 */
    bh_value other_rate; /* [1/s] */
    bh_mark at;
} bh_arm;

typedef struct {
    int z, a;
    bh_word model;
} bh_structure_choice;

typedef struct {
    bh_word process;   /* "elastic" */
    bh_word structure; /* for all nuclides not in `by_nuclide`; "default" */
    size_t choice_count;
    const bh_structure_choice *by_nuclide;
    bh_word coulomb;     /* "default" */
    bh_word radiative;   /* "default" */
    bh_word energy_loss; /* "full" */
} bh_models;

typedef enum {
    BH_WANT_NOTHING,
    BH_WANT_GOAL,
    BH_WANT_TIME,
    BH_WANT_CHARGE,
    BH_WANT_COUNTS
} bh_want;

/* One arm of one setting, or two in coincidence: a row of the run table. */
typedef struct bh_setting_arm bh_setting_arm;
struct bh_setting_arm {
    bh_arm arm;     /* with what this setting overrides (prescale) already in it */
    bh_value angle; /* [rad] of its axis, resolved from q2 where that was written; ring: 0 */
    bh_value q2;    /* [MeV^2] as written, else absent */
    bh_value central_momentum; /* [MeV/c] as written, else absent: the run computes it */
    bh_want want;              /* of this arm; goal and counts may differ between arms */
    bh_value wanted;           /* [1] goal; [s] time; [C] charge; [1] counts */
    bool each_bin;             /* the worst bin must reach the goal */
    /* Of a coincidence: its arms, of the same setting, and its window; NULL for an arm alone. `arm`
     * is then the first, with the name "A+B", both efficiencies, and no readout of its own. */
    const bh_setting_arm *first, *second;
    bh_value window; /* [s] */
    bh_mark at;
};

/* One setting after sweeps: everything it is measured with. */
typedef struct {
    const char *name; /* "K3.2" after a sweep */
    bh_beam beam;
    const bh_target *target;
    bh_value tilt; /* [rad] the setting's own, else the target's */
    bh_word process;
    size_t arm_count;
    const bh_setting_arm *arms; /* a coincidence is the last of them */
    bh_mark at;
} bh_setting;

typedef enum {
    BH_EVERY_ONCE,
    BH_EVERY_ENERGY,
    BH_EVERY_PARTICLE,
    BH_EVERY_TARGET,
    BH_EVERY_SETTING,
    BH_EVERY_SHIFT,
    BH_EVERY_TIME
} bh_every;

typedef struct {
    bh_word name;
    bh_value time; /* [s] each time */
    bh_every every;
    bh_value period; /* [s] for BH_EVERY_TIME */
    bool needs_beam;
    bh_mark at;
} bh_task;

typedef struct {
    bool given;
    bh_value available;     /* [s] given or absent */
    bool available_is_beam; /* compared with beam hours */
    bh_value availability;  /* [1] */
    bh_value shift, week;   /* [s] */
    bh_value start_up;      /* [s] */
    bh_value change_energy, change_particle, change_target, change_angle; /* [s] */
    size_t task_count;
    const bh_task *tasks;
    bh_value contingency; /* [1] */
    bh_mark at;
} bh_schedule;

/* Read-only once made.  Owns everything it points to but the materials. */
typedef struct {
    const char *file;
    bh_word title, notes;
    size_t target_count, arm_count, setting_count;
    const bh_target *targets;
    const bh_arm *arms;
    const bh_setting *settings; /* after sweeps, in file order */
    bh_beam beam;               /* of the plan, before settings change it */
    bh_models models;
    bh_schedule schedule;
    const bh_document *document; /* the tree it was read from (with grafts), for marks and dumps */
} bh_plan;

/* A change for this run only: `path` dotted, `yaml` one scalar or flow node. */
typedef struct {
    const char *path;
    const char *yaml;
} bh_change;

/*
 * Reads, completes and checks a plan.  `bytes` (of `length`) is the text, `name` its name in
 * messages; `changes` (of `change_count`) are applied first, in order, complaints about the i-th
 * bear the file name "--with i" (from 1).  Materials are looked up in `library`, which must outlive
 * the plan.  All errors and warnings go to `diags`, sorted.
 * Returns NULL when there was an error.
 */
bh_plan *bh_plan_read(const char *bytes, size_t length, const char *name, const bh_change *changes,
                      size_t change_count, bh_material_library *library, bh_diags *diags);
void bh_plan_free(bh_plan *plan);

/* The acceptance of an arm where it stands, as the rates room wants it; edges stay the arm's. */
bh_acceptance_spec bh_arm_acceptance(const bh_setting_arm *arm);

/* The structure model chosen for nucleus z, a: "default" unless the plan says otherwise. */
const char *bh_plan_structure(const bh_plan *plan, int z, int a);

#endif
