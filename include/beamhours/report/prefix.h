/* prefix.h - a column of a view as text people read: one unit prefix a column, few digits. */
#ifndef BH_REPORT_PREFIX_H
#define BH_REPORT_PREFIX_H

#include "beamhours/report/selection.h"

enum { BH_CELL_SIZE = 64 };

typedef struct {
    int column;       /* bh_column_id */
    int digits;       /* significant ones */
    double scale;     /* [1] the number shown is the cell's times this */
    const char *unit; /* of the number shown: "nb/sr", "%"; "" for a name */
} bh_shown_column;

/* Chooses unit and scale so that the column's largest value reads well; over all rows of `view`
 * and, where it is not NULL, of `other` too. */
bh_shown_column bh_prefix_scale(const bh_selection *view, const bh_selection *other, int column);

/* Writes the cell of the view's i-th row into `out` (BH_CELL_SIZE bytes); "-" when it is empty. */
void bh_prefix_print(const bh_selection *view, size_t i, const bh_shown_column *column, char *out);

/* Whether all rows say the same in `column`. */
bool bh_prefix_constant(const bh_selection *view, int column);

#endif
