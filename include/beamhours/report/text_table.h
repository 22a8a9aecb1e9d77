/* text_table.h - the run table as text for a terminal: inputs above, totals and cautions below. */
#ifndef BH_REPORT_TEXT_TABLE_H
#define BH_REPORT_TEXT_TABLE_H

#include "beamhours/base/text.h"
#include "beamhours/report/prefix.h"
#include "beamhours/report/selection.h"

/* Appends the whole of it, at most `width` columns wide (at least 80 are used); the table itself
 * may be wider where its names are long or columns were chosen. */
void bh_report_text(const bh_selection *view, int width, bh_text *out);

/* The table with each row before and after a change, and by how much signal and hours moved. */
void bh_report_text_against(const bh_selection *before, const bh_selection *after, int width,
                            bh_text *out);

/* The columns that a table so wide shows, into `out` (room for BH_COLUMN_COUNT); scales fit the
 * rows of `before` too where it is not NULL.  Returns how many. */
size_t bh_report_text_columns(const bh_selection *before, const bh_selection *view, int width,
                              bh_shown_column *out);

/* Appends `sentence` wrapped to `width`, the first line led by `lead`, others by as many blanks. */
void bh_report_wrapped(const char *lead, const char *sentence, int width, bh_text *out);

/* The parts: what stands above; time; notes and cautions. */
void bh_report_text_inputs(const bh_selection *view, int width, bh_text *out);
void bh_report_text_totals(const bh_table *table, int width, bh_text *out);
void bh_report_text_cautions(const bh_table *table, int width, bh_text *out);

#endif
