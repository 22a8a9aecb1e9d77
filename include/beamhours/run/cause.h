/* cause.h - what signal rates are uncertain by, cause by cause, and what common causes leave of a
 * ratio. */
#ifndef BH_RUN_CAUSE_H
#define BH_RUN_CAUSE_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/arena.h"
#include "beamhours/base/error.h"

/* X(id, source, in words).  `source` names a column of uncertainties in JSON; causes of one source
 * are told apart by where they stand in the plan, or by the nuclide. */
#define BH_CAUSES(X)                                                                           \
    X(BH_CAUSE_CURRENT, "current", "beam current")                                             \
    X(BH_CAUSE_PARTICLE_RATE, "particle_rate", "particle rate of the beam")                    \
    X(BH_CAUSE_FRACTION, "fraction", "share of the beam that is the named particle")           \
    X(BH_CAUSE_OTHERS, "others", "share of another particle in the beam")                      \
    X(BH_CAUSE_ENERGY, "energy", "beam energy")                                                \
    X(BH_CAUSE_SPREAD, "momentum_spread", "momentum spread of the beam")                       \
    X(BH_CAUSE_THICKNESS, "thickness", "size of a layer")                                      \
    X(BH_CAUSE_DENSITY, "density", "density of a layer")                                       \
    X(BH_CAUSE_TEMPERATURE, "temperature", "temperature of a gas")                             \
    X(BH_CAUSE_PRESSURE, "pressure", "pressure of a gas")                                      \
    X(BH_CAUSE_DENSITY_LOSS, "density_loss", "density that a liquid loses to the beam")        \
    X(BH_CAUSE_TILT, "tilt", "tilt of the target")                                             \
    X(BH_CAUSE_ANGLE, "angle", "angle of the arm")                                             \
    X(BH_CAUSE_POINTING, "pointing", "pointing of the arm")                                    \
    X(BH_CAUSE_CENTRAL_MOMENTUM, "central_momentum", "momentum the arm is set to")             \
    X(BH_CAUSE_ENERGY_CUT, "energy_cut", "energy cut")                                         \
    X(BH_CAUSE_ANGLE_RESOLUTION, "angle_resolution", "resolution in angle")                    \
    X(BH_CAUSE_MOMENTUM_RESOLUTION, "momentum_resolution", "resolution in momentum")           \
    X(BH_CAUSE_ENERGY_RESOLUTION, "energy_resolution", "resolution in energy")                 \
    X(BH_CAUSE_THRESHOLD, "threshold", "threshold of the detector")                            \
    X(BH_CAUSE_SOLID_ANGLE, "solid_angle", "solid angle")                                      \
    X(BH_CAUSE_AZIMUTH, "azimuth", "azimuth of a ring")                                        \
    X(BH_CAUSE_EFFICIENCY, "efficiency", "efficiency")                                         \
    X(BH_CAUSE_STRUCTURE, "structure", "form factors")                                         \
    X(BH_CAUSE_COULOMB, "coulomb", "plane waves instead of waves in the field of the nucleus") \
    X(BH_CAUSE_SCREENING, "screening", "atomic electrons left out")                            \
    X(BH_CAUSE_BACKGROUND, "background", "cross section of what is subtracted as computed")    \
    X(BH_CAUSE_DEAD_TIME, "dead_time", "dead time")                                            \
    X(BH_CAUSE_DUTY_FACTOR, "duty_factor", "duty factor of the beam")                          \
    X(BH_CAUSE_RATE_LIMIT, "rate_limit", "what the readout records at most")                   \
    X(BH_CAUSE_OTHER_RATE, "other_rate", "triggers from what is not computed")

typedef enum {
#define BH_CAUSE_ID(id, source, words) id,
    BH_CAUSES(BH_CAUSE_ID)
#undef BH_CAUSE_ID
        BH_CAUSE_KINDS
} bh_cause_kind;

/* Its source in JSON and in words; "" for no kind. */
const char *bh_cause_source(bh_cause_kind kind);
const char *bh_cause_words(bh_cause_kind kind);

/* Whether it acts on the live fraction, so on counts and not on the signal rate. */
bool bh_cause_on_counts(bh_cause_kind kind);

/*
 * One cause.  Two rows that share it move together.  A form factor is a case of its own: where its
 * publication gives an uncertainty, that is one cause (`model` NULL); elsewhere the data behind it
 * are one, likewise, and each other published description of the nuclide is a cause, its effect the
 * whole difference: all of those together count as half the range they span with the model in use.
 */
typedef struct {
    bh_cause_kind kind;
    bh_mark at;        /* of the value with the uncertainty; of the model's key */
    const char *key;   /* dotted: "beam.current", "targets.cell.layers.2.thickness" */
    int z, a;          /* nuclide of a model; 0, 0 otherwise */
    const char *model; /* another description of it; NULL */
} bh_cause;

/* The causes of a plan, each once.  Growing; one thread at a time.  Belongs to its arena. */
typedef struct bh_causes bh_causes;

/* An empty list, or a copy of `from`, in `arena`; NULL when there is no memory. */
bh_causes *bh_causes_new(bh_arena *arena);
bh_causes *bh_causes_copy(const bh_causes *from, bh_arena *arena);

/* The number of that cause, which is added (texts copied) when it is new.  BH_ENOMEM. */
BH_CHECKED bh_code bh_causes_number(bh_causes *causes, const bh_cause *cause, unsigned *number,
                                    bh_error *err);

size_t bh_causes_count(const bh_causes *causes);
const bh_cause *bh_causes_at(const bh_causes *causes, size_t i);

/* What they do to one row.  Plain view of data of the arena. */
typedef struct {
    size_t count;
    const unsigned *cause; /* numbers of causes; those of one nuclide follow each other */
    const double *effect;  /* [1] relative change of the signal rate (of the counts for what acts
                              on the live fraction) when the cause is one standard uncertainty up,
                              or the other model is right; NAN where that model has no data */
} bh_effects;

/* Returns [1] the relative standard uncertainty of the signal rate from all causes: in quadrature,
 * form factors of the isotopes of one scatterer linearly. */
double bh_effects_total(const bh_causes *causes, const bh_effects *row);

/* Returns [1] that from the causes of one kind; of a kind that acts on counts, of the counts. */
double bh_effects_of(const bh_causes *causes, const bh_effects *row, bh_cause_kind kind);

/* Returns [1] the relative standard uncertainty of the ratio of the signal rates of two rows: what
 * both share cancels as far as it does the same to both. */
double bh_effects_of_ratio(const bh_causes *causes, const bh_effects *row, const bh_effects *other);

#endif
