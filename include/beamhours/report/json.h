/* json.h - a view of the run table as JSON. */
#ifndef BH_REPORT_JSON_H
#define BH_REPORT_JSON_H

#include "beamhours/base/text.h"
#include "beamhours/report/selection.h"

/*
 * Appends {"plan", "rows", "totals", "cautions", "warnings", "version"} (docs/output.md): the plan
 * after defaults, rows with the keys of run/columns.h, an empty value null with its reason in the
 * row's "reasons".  Numbers are the shortest text that reads back.  `version` is the program's.
 * Returns BH_OK or BH_ENOMEM.
 */
BH_CHECKED bh_code bh_report_json(const bh_selection *view, const char *version, bh_text *out);

/* Appends {"before": ..., "after": ...} of two such objects. */
BH_CHECKED bh_code bh_report_json_against(const bh_selection *before, const bh_selection *after,
                                          const char *version, bh_text *out);

#endif
