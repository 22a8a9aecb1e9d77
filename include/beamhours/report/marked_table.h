/* marked_table.h - the run table as Markdown and as a part of a LaTeX document. */
#ifndef BH_REPORT_MARKED_TABLE_H
#define BH_REPORT_MARKED_TABLE_H

#include "beamhours/base/text.h"
#include "beamhours/report/grid.h"
#include "beamhours/report/selection.h"

/* Appends inputs, rows, totals, notes and cautions.  Columns and digits are those of the text table
 * in 80 columns, or the chosen ones.  `before` is NULL, or the same view before a change: a first
 * column `state` then tells "before" from "after". */
void bh_report_markdown(const bh_selection *before, const bh_selection *view, bh_text *out);

/* The same to be read with \input; needs booktabs, longtable and siunitx, as its first lines say.
 */
void bh_report_latex(const bh_selection *before, const bh_selection *view, bh_text *out);

/* Returns [pt] how wide its rows are, as bh_grid_latex_wide. */
double bh_report_latex_wide(const bh_selection *before, const bh_selection *view);

/* The parts: fills an empty grid with the sums of time, `before` them (or NULL) those before a
 * change; notes and cautions as Markdown. */
void bh_totals_grid(const bh_totals *before, const bh_totals *now, bh_grid *grid);
void bh_report_markdown_below(const bh_table *table, bh_text *out);

#endif
