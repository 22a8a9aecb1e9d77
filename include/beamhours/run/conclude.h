/* conclude.h - what is said of a plan once all its settings are evaluated. */
#ifndef BH_RUN_CONCLUDE_H
#define BH_RUN_CONCLUDE_H

#include "beamhours/base/arena.h"
#include "beamhours/run/remarks.h"
#include "beamhours/run/table.h"

/* What there is to say; `warnings` must exist already, totals be filled. */
typedef struct {
    bh_totals totals;
    size_t caution_count;
    const bh_caution *cautions; /* of the arena */
    bh_diags *warnings;         /* sorted */
} bh_conclusion;

/* Fills cautions, and adds to the warnings those in `said` (may be NULL), the remarks of the
 * evaluation, and a shortage of time.  BH_ENOMEM. */
BH_CHECKED bh_code bh_conclude(const bh_plan *plan, const bh_remarks *remarks, const bh_diags *said,
                               bh_arena *arena, bh_conclusion *out);

#endif
