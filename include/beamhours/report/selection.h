/* selection.h - which rows and columns of a run table to show, and in what order. */
#ifndef BH_REPORT_SELECTION_H
#define BH_REPORT_SELECTION_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/run/table.h"

/* What was asked for; NULL where nothing was. */
typedef struct {
    bool bins;           /* one row a bin, not one an arm */
    const char *columns; /* "angle_deg,counts": keys of run/columns.h */
    const char *sort;    /* a key: rising; "-counts": falling; empty cells last */
    const char *only;    /* "K1,K3": settings, also all steps of a sweep by its name */
} bh_selection_request;

typedef struct {
    const bh_table *table;
    bool bins;
    size_t column_count;          /* 0: the output's own choice */
    int columns[BH_COLUMN_COUNT]; /* bh_column_id */
    size_t row_count;
    size_t *rows; /* rows of the table, in the order to show */
} bh_selection;

/* Makes a view; `table` must outlive it.  BH_EDOMAIN, with what would do, for a key or a setting
 * that there is not; BH_ENOMEM.  Free with bh_selection_free (also after a failure). */
BH_CHECKED bh_code bh_selection_new(const bh_table *table, const bh_selection_request *request,
                                    bh_selection *out, bh_error *err);
void bh_selection_free(bh_selection *view);

/* Returns [1] a cell of the view's i-th row as in bh_table_number; its text; its reason. */
double bh_selection_number(const bh_selection *view, size_t i, int column);
const char *bh_selection_text(const bh_selection *view, size_t i, int column);
const char *bh_selection_reason(const bh_selection *view, size_t i, int column);

#endif
