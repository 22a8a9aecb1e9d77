/* table.h - the run table: a plan evaluated.  Immutable once made. */
#ifndef BH_RUN_TABLE_H
#define BH_RUN_TABLE_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/diag.h"
#include "beamhours/base/progress.h"
#include "beamhours/plan/plan.h"
#include "beamhours/run/cause.h"
#include "beamhours/run/columns.h"

typedef struct bh_table bh_table;

/* [h] each; NAN where the plan cannot say (available and spare without `available`). */
typedef struct {
    double data_hours, empty_hours, task_hours, change_hours; /* [h] */
    double beam_hours, scheduled_hours, contingency_hours;    /* [h] */
    double asked_hours, available_hours, spare_hours;         /* [h] */
    double shifts, weeks; /* [1] asked, in the facility's units */
    const char *note; /* "no change-over times given", what the totals lack; NULL when nothing */
} bh_totals;

/* Derived from the plan, shown wherever a beam is shown; ends in deference to the facility. */
typedef struct {
    bh_mark at;       /* the plan line it follows from */
    const char *key;  /* "beam.current" */
    const char *text; /* one or two sentences */
} bh_caution;

/* What evaluations may share: form factors made ready, cross sections sampled.  It makes the next
 * evaluation faster and changes no number.  One thread at a time. */
typedef struct bh_workspace bh_workspace;

/* An empty one, or NULL when there is no memory.  The caller owns it; NULL may be freed. */
bh_workspace *bh_workspace_new(void);
void bh_workspace_free(bh_workspace *workspace);

typedef struct {
    bool bins;                      /* rows of bins are wanted too */
    bool (*cancelled)(void *asker); /* polled at least each 5 ms; NULL: never */
    void *asker;
    const bh_progress *progress; /* told after each setting; NULL: not */
    bh_workspace *workspace;     /* kept by the caller; NULL: one for this evaluation alone */
    bool without_changes; /* rate_change_per_mrad and rate_change_per_permille_momentum are not
                             wanted: they stay empty, every other number is the same */
    size_t enough; /* 0: all rows; else the table ends with the setting that makes it so many rows
                      with a systematic uncertainty, and has no totals */
} bh_evaluation;

/*
 * Evaluates `plan`, which must outlive the table.  Warnings of evaluation are added to the table's
 * own list, after those in `said` (copied; may be NULL).
 * Returns NULL when there was no memory or it was cancelled, with the reason in err.
 */
bh_table *bh_table_new(const bh_plan *plan, const bh_evaluation *how, const bh_diags *said,
                       bh_error *err);
void bh_table_free(bh_table *table);

const bh_plan *bh_table_plan(const bh_table *table);

/* Rows: one for each arm of each setting, in plan order (bin 0), and where bins were asked for, one
 * for each bin of each such row. */
size_t bh_table_rows(const bh_table *table, bool bins);

/* Returns [1] the number, in the unit that the column key names, in a cell; NAN when empty or text.
 */
double bh_table_number(const bh_table *table, bool bins, size_t row, bh_column_id column);

/* Text of a text column; NULL for others or when empty. */
const char *bh_table_text(const bh_table *table, bool bins, size_t row, bh_column_id column);

/* Why a cell is empty; NULL when it is not. */
const char *bh_table_reason(const bh_table *table, bool bins, size_t row, bh_column_id column);

/* Where a row stands in the plan. */
typedef struct {
    size_t setting, arm; /* numbers from 0: of the setting, and of the arm among those of it */
    int bin;             /* from 1; 0 for the whole arm */
} bh_place;

bh_place bh_table_place(const bh_table *table, bool bins, size_t row);

/* What the signal rates are uncertain by: every cause once, and what each does to a row. */
const bh_causes *bh_table_causes(const bh_table *table);
bh_effects bh_table_effects(const bh_table *table, bool bins, size_t row);

/* The i-th sentence on what these numbers leave out (radiation, energy loss); NULL past the end. */
const char *bh_table_note(const bh_table *table, size_t i);

const bh_totals *bh_table_totals(const bh_table *table);
size_t bh_table_cautions(const bh_table *table);
const bh_caution *bh_table_caution(const bh_table *table, size_t i);
const bh_diags *bh_table_warnings(const bh_table *table); /* sorted */

#endif
