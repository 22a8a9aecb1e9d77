/* json_parts.h - pieces of JSON that several outputs share; each belongs to the caller. */
#ifndef BH_REPORT_JSON_PARTS_H
#define BH_REPORT_JSON_PARTS_H

#include "beamhours/base/text.h"
#include "beamhours/run/table.h"

struct json_object;

/* `value` [1] with the fewest digits that read back; NULL, which is null, where it is none. */
struct json_object *bh_json_number(double value);

/* A plan after defaults, in the keys' own names; its sums of time. */
struct json_object *bh_json_plan(const bh_plan *plan);
struct json_object *bh_json_totals(const bh_totals *totals);

/* Adds "cautions", "warnings" and "version" to an object. */
void bh_json_said(struct json_object *to, const bh_table *table, const char *version);

/* Appends the object, which is given back in any case.  BH_ENOMEM. */
BH_CHECKED bh_code bh_json_finish(struct json_object *object, bh_text *out);

#endif
