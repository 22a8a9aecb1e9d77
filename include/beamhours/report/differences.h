/* differences.h - what two plans do not have in common: inputs and what follows from them. */
#ifndef BH_REPORT_DIFFERENCES_H
#define BH_REPORT_DIFFERENCES_H

#include <stddef.h>

#include "beamhours/base/arena.h"
#include "beamhours/base/text.h"
#include "beamhours/plan/plan.h"
#include "beamhours/run/table.h"

/* One input.  A list's item is named by its name, or by number from 1. */
typedef struct {
    const char *path;           /* "beam.current" */
    const char *before, *after; /* NULL: not there; of a whole item of a list "present" */
    size_t more;                /* further settings with just this change, for their own part */
} bh_difference;

typedef struct {
    size_t count;
    bh_difference *items;
} bh_differences;

/* Compares the values of two plans after defaults.  Not told: what settings take over from the
 * beam or an arm that changed likewise; the angle that a written q2 asks for; what belongs to an
 * item that only one plan has.  Texts belong to `arena`.  BH_ENOMEM. */
BH_CHECKED bh_code bh_differences_find(const bh_plan *before, const bh_plan *after, bh_arena *arena,
                                       bh_differences *out, bh_error *err);

/* Two evaluated plans, and what differs in their inputs. */
typedef struct {
    const bh_table *before, *after;
    const bh_differences *inputs;
    const char *version; /* of the program, for JSON */
} bh_comparison;

/* Append it: inputs as "path: old -> new", then signal rate, hours and uncertainties of every row,
 * then sums of time, notes and cautions of the second plan. */
void bh_comparison_text(const bh_comparison *c, int width, bh_text *out);
void bh_comparison_markdown(const bh_comparison *c, bh_text *out);
BH_CHECKED bh_code bh_comparison_json(const bh_comparison *c, bh_text *out);

#endif
