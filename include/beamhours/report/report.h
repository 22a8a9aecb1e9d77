/* report.h - the beam-time section of a proposal: a run table as a paper. */
#ifndef BH_REPORT_REPORT_H
#define BH_REPORT_REPORT_H

#include "beamhours/report/curves.h"
#include "beamhours/report/paper.h"
#include "beamhours/run/table.h"

/* What a reader can check that files are the same by. */
typedef struct {
    const char *file, *digest;
} bh_report_file;

typedef struct {
    const bh_table *table; /* with bins; it and its plan must outlive the report */
    const char *version;   /* of the program */
    const char *command;   /* that makes the report again */
    size_t file_count;
    const bh_report_file *files; /* the plan first, then the materials in use */
    const bh_progress *progress; /* told what is being written; NULL: not */
} bh_report_request;

enum { BH_MOST_REPORT_CURVES = 6 };

/* Free with bh_report_free, also after a failure. */
typedef struct {
    bh_paper paper;
    bh_arena *arena;
    bh_curves curves[BH_MOST_REPORT_CURVES]; /* behind its figures */
    bh_curves models[BH_MOST_REPORT_CURVES]; /* likewise, one a model */
} bh_report;

/* Makes the paper.  BH_ENOMEM, and as bh_explain. */
BH_CHECKED bh_code bh_report_make(const bh_report_request *request, bh_report *out, bh_error *err);
void bh_report_free(bh_report *report);

#endif
