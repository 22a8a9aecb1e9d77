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

/* Makes room for `count` [1] threads (up to BH_MOST_HANDS of crew.h) to evaluate side by side, each
 * with a workspace of its own in `workspaces`, which the caller keeps: hands number 0 to count - 1.
 * Without it there is the one hand of bh_stepwise_new.  BH_ENOMEM. */
BH_CHECKED bh_code bh_stepwise_hands(bh_stepwise *steps, bh_workspace *const *workspaces,
                                     size_t count, bh_error *err);

/* Takes the rows of setting number `setting` from the store; false when they are not in it, or not
 * with the rows of bins that are wanted. */
bool bh_stepwise_recall(bh_stepwise *steps, size_t setting, bool bins);

/* The rows of one setting, evaluated and not in the store yet. */
typedef struct bh_result bh_result;

/* What to evaluate, and by which hand. */
typedef struct {
    size_t setting, hand; /* [1] numbers from 0 */
    bool bins;
} bh_step;

/* Evaluates into `out` (NULL on errors: as bh_setting_evaluate).  Threads may do so side by side,
 * each with its own hand; the numbers are the same whoever does it. */
BH_CHECKED bh_code bh_stepwise_compute(const bh_stepwise *steps, const bh_step *step,
                                       bh_result **out, bh_error *err);

/* Puts it into the store, which takes it.  One thread at a time, and none that asks for rows. */
void bh_stepwise_take(bh_stepwise *steps, size_t setting, bh_result *result);

/* Evaluates with hand 0 and puts it into the store; errors as bh_setting_evaluate. */
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
