/* systematic.h - what the rates of one arm are uncertain by: the plan's own uncertainties and those
 * of the models. */
#ifndef BH_RUN_SYSTEMATIC_H
#define BH_RUN_SYSTEMATIC_H

#include "beamhours/run/cause.h"
#include "beamhours/run/hours.h"
#include "beamhours/run/yield.h"

/* What each layer, or each nuclide, gives of the rates of the whole arm. */
typedef struct {
    double signal;         /* [1] of the signal rate */
    double windows, other; /* [1] of the background rates of the named particle from windows, and
                              from other nuclides */
    double beside[2];      /* [1] of those of other particles of the beam, likewise */
} bh_share;

/* What uncertainties are collected with; one for an evaluation. */
typedef struct {
    bh_yielder *yielder;
    bh_arena *arena;
    bh_causes *causes;              /* of all settings so far */
    bh_contribution *contributions; /* room for the presences of any target */
    bh_part *parts;                 /* room for those of any arm */
    bh_part *pair_parts[2];         /* likewise, of the arms of a coincidence */
    double *signals[2];             /* [Hz] likewise */
    size_t most_parts, room;        /* of any arm; of the two below, causes */
    unsigned *cause;                /* while an arm's are collected */
    double *effect;                 /* [1] likewise, room x most_parts */
    bh_share *shares;               /* room for layers and nuclides of any target */
    double *paths[2];               /* [1] room for the layers of any target */
} bh_systematics;

/* Makes room in `arena` for the plan of `yielder`, which is prepared and must outlive it.  `causes`
 * NULL: a list of its own.  BH_ENOMEM. */
BH_CHECKED bh_code bh_systematics_prepare(bh_systematics *systematics, bh_yielder *yielder,
                                          bh_arena *arena, bh_causes *causes, bh_error *err);

/*
 * Fills `out`, the effects on the first `parts` parts of `arm` (its yield made, its hours decided);
 * they live as long as the arena.  First order in each uncertainty:
 *   current, fraction, sizes, densities, efficiency, solid angle  in proportion
 *   energy, angle, pointing       by the sensitivities of the row
 *   cuts and resolutions          by evaluating the arm again on either side
 *   thickness and tilt            also by what a limited view then sees
 * What is subtracted as computed (other nuclides; windows without an empty target) counts with its
 * sizes and form factors over the signal.  Shares of layers and nuclides are those of the whole
 * arm.  Form factors of nuclides that give less than 0.2 % of the signal are left out.
 * Overwrites what the yielder holds of its last arm.  BH_ENOMEM, and as bh_yield_make.
 */
BH_CHECKED bh_code bh_systematic_arm(bh_systematics *systematics, const bh_arm_hours *arm,
                                     size_t parts, bh_effects *out, bh_error *err);

/* Whether it needs the changes of the arm's rate with angle or momentum, of any of its parts. */
bool bh_rests_on_changes(const bh_setting *setting, const bh_setting_arm *arm);

/* Whether an uncertainty can be told of a row of this arm at `q2` [GeV2]: not where nuclear forces,
 * which are left out, rule (BH_NUCLEAR_RULES). */
bool bh_systematic_known(const bh_view *view, double q2);

#endif
