/* reporting.h - a report while it is written; for the files that write its sections. */
#ifndef BH_REPORT_REPORTING_H
#define BH_REPORT_REPORTING_H

#include "beamhours/report/report.h"
#include "beamhours/report/selection.h"
#include "beamhours/run/explain.h"
#include "beamhours/run/totals.h"
#include "beamhours/run/what_if.h"

enum { BH_MOST_TOLD = 24 };

typedef struct {
    bh_paper_writing w;
    const bh_report_request *request;
    bh_report *report;
    const bh_table *table;
    const bh_plan *plan;
    const bh_totals *totals;
    bh_selection view; /* arms, in plan order */
    bh_selection bins; /* of the arms that have several */
    bool one_arm;      /* all rows are of the same */
    bh_stretch *hours; /* of each setting */
    bh_time_detail time;
    bh_what_if what_if[BH_IF_COUNT];
    size_t told_count; /* rows explained: all where there are few, else one of each kind */
    size_t told_row[BH_MOST_TOLD];
    bh_explanation *told[BH_MOST_TOLD];
} bh_reporting;

/* The sections, in their order. */
void bh_report_summary(bh_reporting *x);
void bh_report_kinematics(bh_reporting *x);
void bh_report_rates(bh_reporting *x);
BH_CHECKED bh_code bh_report_backgrounds(bh_reporting *x, bh_error *err);
void bh_report_time(bh_reporting *x);
void bh_report_uncertainty(bh_reporting *x);
void bh_report_sensitivities(bh_reporting *x);
void bh_report_what_if(bh_reporting *x);
BH_CHECKED bh_code bh_report_figures(bh_reporting *x, bh_error *err);
void bh_report_facility(bh_reporting *x);
void bh_report_assumptions(bh_reporting *x);
void bh_report_models(bh_reporting *x);
void bh_report_cautions(bh_reporting *x);
void bh_report_again(bh_reporting *x);

/* One row explained; free with bh_explanation_free.  NULL with `err` filled. */
bh_explanation *bh_report_explain(const bh_reporting *x, size_t row, bh_error *err);

/* A table of these columns of the run table; names that all rows share are left out, and columns
 * that are empty throughout. */
void bh_report_rows(bh_reporting *x, const char *caption, const int *columns, size_t count);

/* The same of another view, such as the bins. */
void bh_report_rows_of(bh_reporting *x, const bh_selection *view, const char *caption,
                       const int *columns, size_t count);

/* "K1" or "K1, A" where arms have to be told apart. */
const char *bh_report_row_name(bh_reporting *x, size_t row);

/* The value [1] with so many digits; "-" where it is none. */
const char *bh_report_number(bh_reporting *x, double value, int digits);

/* The hours [h] with two decimals; "-" where there are none. */
const char *bh_report_hours(bh_reporting *x, double hours);

/* The share [1] in per cent with three digits, without its unit. */
const char *bh_report_percent(bh_reporting *x, double share);

#endif
