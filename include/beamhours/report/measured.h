/* measured.h - published points from a table of comma-separated values, to be drawn over a curve.
 */
#ifndef BH_REPORT_MEASURED_H
#define BH_REPORT_MEASURED_H

#include <stddef.h>

#include "beamhours/base/arena.h"
#include "beamhours/base/error.h"

enum { BH_MOST_MEASURED = 20000, BH_MOST_SOURCES = 8 };

typedef struct {
    double x, y;        /* [1] in the units of the keys asked for */
    double uncertainty; /* [1] one standard deviation, in the unit of y; 0 where none is given */
    size_t source;      /* number of its source */
} bh_measured_point;

typedef struct {
    size_t count, source_count;
    const bh_measured_point *point; /* in the order of the file */
    const char *const *source;      /* in the order they appear; "" where the table has none */
} bh_measured;

/* A table, and what to look for in it. */
typedef struct {
    const char *text;          /* may hold any bytes */
    size_t length;             /* [bytes] */
    const char *file;          /* its name in messages */
    const char *x_key, *y_key; /* headings of the two columns: "angle_deg" */
} bh_measured_request;

/*
 * Reads the table (docs/output.md, Published points): RFC 4180, UTF-8, a header, the columns x_key
 * and y_key, at will `uncertainty` (in the unit of y_key) or `relative_uncertainty`, and `source`.
 * Other columns that the run table has are let by.  Texts live in `arena`.
 * BH_EPLAN with file, line and column of what is wrong and what would do; BH_ENOMEM.
 */
BH_CHECKED bh_code bh_measured_read(const bh_measured_request *request, bh_arena *arena,
                                    bh_measured *out, bh_error *err);

#endif
