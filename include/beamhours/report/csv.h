/* csv.h - a view of the run table as comma-separated values (RFC 4180), header first. */
#ifndef BH_REPORT_CSV_H
#define BH_REPORT_CSV_H

#include "beamhours/base/text.h"
#include "beamhours/report/selection.h"

/* Appends header and rows of `view`; without chosen columns all of them, bin only with bins. */
void bh_report_csv(const bh_selection *view, bh_text *out);

/* Before and after a change: the same with a first column `state` ("before", "after"). */
void bh_report_csv_against(const bh_selection *before, const bh_selection *after, bh_text *out);

/* Appends `field`, in quotes where RFC 4180 asks for them. */
void bh_csv_field(bh_text *out, const char *field);

#endif
