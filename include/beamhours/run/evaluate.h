/* evaluate.h - one setting of a plan, computed into its rows. */
#ifndef BH_RUN_EVALUATE_H
#define BH_RUN_EVALUATE_H

#include "beamhours/base/arena.h"
#include "beamhours/run/hours.h"
#include "beamhours/run/row.h"
#include "beamhours/run/systematic.h"
#include "beamhours/run/table.h"

/* What one evaluation works with. */
typedef struct {
    bh_yielder yielder;
    bh_part *parts; /* room for those of any setting */
    bh_recorded *recorded;
    bh_yield *yields; /* room for the arms of any setting */
    bh_arm_hours *arms;
    bh_systematics systematics;
    bh_effects *effects; /* room for those of any setting */
} bh_evaluator;

/* Makes room, in `arena`, for evaluating `plan`.  The workspace and the list of remarks are the
 * caller's, and the list of causes where there is one in systematics already.  BH_ENOMEM. */
BH_CHECKED bh_code bh_evaluator_prepare(bh_evaluator *evaluator, const bh_plan *plan,
                                        bh_arena *arena, bh_error *err);

/* Fills `hours`: yields, recorded rates and hours of setting number `setting`, with its bins when
 * wanted; valid until the next call.  BH_ENOMEM, BH_EPLAN (a name that the plan room should have
 * refused), or BH_ENOCONV when cancelled. */
BH_CHECKED bh_code bh_setting_measure(bh_evaluator *evaluator, size_t setting, bool bins,
                                      bh_setting_hours *hours, bh_error *err);

/* The rows of one setting: `whole`, one for each of its arms, and `bins`, one for each bin of each
 * arm in the same order, or NULL.  Where they stand in the plan is in them already. */
typedef struct {
    bh_row *whole, *bins;
    double full, empty; /* [h] on the full and on the empty target; 0 where nothing is asked for */
} bh_setting_rows;

/* Fills the rows and hours of setting number `setting`; errors as above. */
BH_CHECKED bh_code bh_setting_evaluate(bh_evaluator *evaluator, size_t setting,
                                       bh_setting_rows *out, bh_error *err);

/* Fills the cells of the row that stands for row->bin of `arm`, one of the arms of `hours`. */
void bh_row_fill(bh_yielder *yielder, const bh_setting_hours *hours, const bh_arm_hours *arm,
                 bh_row *row);

#endif
