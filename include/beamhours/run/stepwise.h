/* stepwise.h - a run table made setting by setting, in any order; what did not change is taken from
 * the last one. */
#ifndef BH_RUN_STEPWISE_H
#define BH_RUN_STEPWISE_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/run/conclude.h"
#include "beamhours/run/evaluate.h"
#include "beamhours/run/row.h"
#include "beamhours/run/table.h"

/* Rows of settings that were evaluated, under all that they depend on: the text of the setting and
 * of everything it refers to.  One thread at a time. */
typedef struct bh_results bh_results;

/* An empty store, or NULL when there is no memory.  The caller owns it; NULL may be freed. */
bh_results *bh_results_new(void);
void bh_results_free(bh_results *results);

/* How many settings were evaluated (not taken from the store) since it was made. */
size_t bh_results_evaluated(const bh_results *results);

typedef struct bh_stepwise bh_stepwise;

/* Begins a table of `plan`, which must outlive it, as `how` says (its workspace is needed, its
 * `bins` is not looked at).  `results` is kept by the caller, and forgets what no table used of
 * late.  NULL with the reason in err. */
bh_stepwise *bh_stepwise_new(const bh_plan *plan, const bh_evaluation *how, bh_results *results,
                             bh_error *err);
void bh_stepwise_free(bh_stepwise *steps);

/* Takes the rows of setting number `setting` from the store; false when they are not in it, or not
 * with the rows of bins that are wanted. */
bool bh_stepwise_recall(bh_stepwise *steps, size_t setting, bool bins);

/* Evaluates them and puts them into the store; errors as bh_setting_evaluate. */
BH_CHECKED bh_code bh_stepwise_evaluate(bh_stepwise *steps, size_t setting, bool bins,
                                        bh_error *err);

/* The rows of a setting: one for each arm, in `bins` one for each bin of each arm or NULL; whole is
 * NULL before they are known.  Their effects are not kept: of no use. */
bh_setting_rows bh_stepwise_rows(const bh_stepwise *steps, size_t setting);

/* Fills totals, cautions and warnings (a list of the caller's, in *out already) once all settings
 * are known.  `said` as bh_table_new.  Texts
 * of `out` live as long as `arena`.  BH_ENOMEM. */
BH_CHECKED bh_code bh_stepwise_conclude(bh_stepwise *steps, const bh_diags *said, bh_arena *arena,
                                        bh_conclusion *out, bh_error *err);

#endif
