/* json_systematic.h - what signal rates are uncertain by, as JSON; for json.c only. */
#ifndef BH_REPORT_JSON_SYSTEMATIC_H
#define BH_REPORT_JSON_SYSTEMATIC_H

#include "beamhours/report/selection.h"

struct json_object;

/* {source: relative standard uncertainty} of the i-th row of `view`; what acts on counts is left
 * out.  The caller owns it. */
struct json_object *bh_json_sources(const bh_selection *view, size_t i);

/* [{cause, key, file, line, column, acts_on, rows, effects}], those that act on some row shown;
 * `rows` are places in the list of rows as shown, from 0.  The caller owns
 * it.  NULL when there is no memory. */
struct json_object *bh_json_causes(const bh_selection *view);

#endif
