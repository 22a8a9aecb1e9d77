/* report.c - the order of the sections, and what they share. */
#include "beamhours/report/report.h"

#include <math.h>
#include <string.h>

#include "beamhours/report/input_words.h"
#include "beamhours/report/prefix.h"
#include "beamhours/report/reporting.h"

/* --- words that sections share --- */

const char *bh_report_number(bh_reporting *x, double value, int digits)
{
    char text[BH_NUMBER_SIZE];
    if (!isfinite(value))
        return "-";
    (void)bh_number_digits(value, digits, text, sizeof text);
    return bh_paper_text(&x->w, "%s", fabs(value) > 0.0 ? text : "0");
}

const char *bh_report_hours(bh_reporting *x, double hours)
{
    char text[BH_NUMBER_SIZE];
    if (!isfinite(hours))
        return "-";
    bh_hours_print(hours, text);
    return bh_paper_text(&x->w, "%s", text);
}

const char *bh_report_percent(bh_reporting *x, double share)
{
    return bh_report_number(x, 100.0 * share, 3);
}

const char *bh_report_row_name(bh_reporting *x, size_t row)
{
    const char *setting = bh_selection_text(&x->view, row, BH_COL_SETTING);
    const char *arm = bh_selection_text(&x->view, row, BH_COL_ARM);
    return x->one_arm || !arm ? setting : bh_paper_text(&x->w, "%s, %s", setting, arm);
}

static bool is_empty(const bh_selection *view, int column)
{
    for (size_t i = 0; i < view->row_count; i++)
        if (bh_selection_text(view, i, column) || isfinite(bh_selection_number(view, i, column)))
            return false;
    return true;
}

static bool left_out(const bh_selection *view, int column)
{
    const bool name = column == BH_COL_ARM || column == BH_COL_PARTICLE || column == BH_COL_TARGET;
    return (name && bh_prefix_constant(view, column)) || is_empty(view, column);
}

void bh_report_rows_of(bh_reporting *x, const bh_selection *view, const char *caption,
                       const int *columns, size_t count)
{
    bh_paper_column heads[BH_COLUMN_COUNT] = {{0}};
    bh_shown_column shown[BH_COLUMN_COUNT];
    char text[BH_CELL_SIZE];
    size_t n = 0;
    for (size_t i = 0; i < count; i++) {
        if (left_out(view, columns[i]))
            continue;
        shown[n] = bh_prefix_scale(view, NULL, columns[i]);
        heads[n] = (bh_paper_column){bh_column_at(columns[i])->heading, shown[n].unit,
                                     bh_column_at(columns[i])->kind != BH_CELL_TEXT};
        n++;
    }
    bh_paper_table_open(&x->w, caption, heads, n);
    for (size_t r = 0; r < view->row_count; r++)
        for (size_t c = 0; c < n; c++) {
            bh_prefix_print(view, r, &shown[c], text);
            bh_paper_cell(&x->w, bh_paper_text(&x->w, "%s", text));
        }
    bh_paper_table_close(&x->w);
}

void bh_report_rows(bh_reporting *x, const char *caption, const int *columns, size_t count)
{
    bh_report_rows_of(x, &x->view, caption, columns, count);
}

/* --- what they are written from --- */

/* Whether an earlier row has the same beam particle, target, arm and process. */
static bool like_an_earlier(const bh_reporting *x, size_t row)
{
    const bh_place p = bh_table_place(x->table, false, row);
    const bh_setting *s = &x->plan->settings[p.setting];
    for (size_t i = 0; i < row; i++) {
        const bh_place q = bh_table_place(x->table, false, i);
        const bh_setting *t = &x->plan->settings[q.setting];
        if (s->target == t->target && strcmp(s->beam.particle.name, t->beam.particle.name) == 0 &&
            strcmp(s->arms[p.arm].arm.name.text, t->arms[q.arm].arm.name.text) == 0)
            return true;
    }
    return false;
}

bh_explanation *bh_report_explain(const bh_reporting *x, size_t row, bh_error *err)
{
    const bh_place p = bh_table_place(x->table, false, row);
    const bh_setting *s = &x->plan->settings[p.setting];
    return bh_explain(x->table, s->name, s->arms[p.arm].arm.name.text, 0, err);
}

static bh_code tell(bh_reporting *x, bh_error *err)
{
    const bool all = x->view.row_count <= BH_MOST_TOLD / 2;
    for (size_t i = 0; i < x->view.row_count && x->told_count < BH_MOST_TOLD; i++) {
        if (!all && like_an_earlier(x, i))
            continue;
        bh_progress_tell(x->request->progress, "rows", i, x->view.row_count);
        bh_explanation *e = bh_report_explain(x, i, err);
        if (!e)
            return err->code;
        x->told_row[x->told_count] = i;
        x->told[x->told_count++] = e;
    }
    return BH_OK;
}

/* The bins of arms that have several. */
static bh_code find_bins(bh_reporting *x, bh_error *err)
{
    const bh_selection_request each = {.bins = true};
    const bh_code bad = bh_selection_new(x->table, &each, &x->bins, err);
    size_t kept = 0;
    for (size_t i = 0; !bad && i < x->bins.row_count; i++) {
        const bh_place p = bh_table_place(x->table, true, x->bins.rows[i]);
        if (x->plan->settings[p.setting].arms[p.arm].arm.bins > 1)
            x->bins.rows[kept++] = x->bins.rows[i];
    }
    x->bins.row_count = kept;
    return bad;
}

static bh_code prepare(bh_reporting *x, bh_error *err)
{
    const bh_selection_request all = {.bins = false};
    bh_code bad = bh_selection_new(x->table, &all, &x->view, err);
    bad = bad ? bad : find_bins(x, err);
    x->one_arm = !bad && bh_prefix_constant(&x->view, BH_COL_ARM);
    x->hours = bh_arena_take(x->w.arena, x->plan->setting_count + 1, sizeof *x->hours);
    if (!bad && !x->hours)
        bad = bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    if (bad)
        return bad;
    bh_stretches_of(x->table, x->hours);
    bad = bh_time_of_plan(x->plan, x->hours, x->w.arena, &x->time, err);
    bh_progress_tell(x->request->progress, "what if", 0, 0);
    bad = bad ? bad : bh_what_if_make(x->table, x->w.arena, x->what_if, err);
    return bad ? bad : tell(x, err);
}

static bh_code write_all(bh_reporting *x, bh_error *err)
{
    bh_report_summary(x);
    bh_report_kinematics(x);
    bh_report_rates(x);
    bh_code bad = bh_report_backgrounds(x, err);
    if (bad)
        return bad;
    bh_report_time(x);
    bh_report_uncertainty(x);
    bh_report_sensitivities(x);
    bh_report_what_if(x);
    bad = bh_report_figures(x, err);
    if (bad)
        return bad;
    bh_report_facility(x);
    bh_report_assumptions(x);
    bh_report_models(x);
    bh_report_cautions(x);
    bh_report_again(x);
    return x->w.failed ? bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM)) : BH_OK;
}

bh_code bh_report_make(const bh_report_request *request, bh_report *out, bh_error *err)
{
    bh_error unseen = {.code = BH_OK};
    err = err ? err : &unseen;
    *out = (bh_report){.arena = bh_arena_new()};
    bh_reporting *x = out->arena ? bh_arena_take(out->arena, 1, sizeof *x) : NULL;
    if (!x)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    x->w.arena = out->arena;
    x->request = request;
    x->report = out;
    x->table = request->table;
    x->plan = bh_table_plan(request->table);
    x->totals = bh_table_totals(request->table);
    bh_code bad = prepare(x, err);
    bad = bad ? bad : write_all(x, err);
    bh_selection_free(&x->view);
    bh_selection_free(&x->bins);
    for (size_t i = 0; i < x->told_count; i++)
        bh_explanation_free(x->told[i]);
    out->paper = (bh_paper){
        .title = x->plan->title.text && x->plan->title.text[0] ? x->plan->title.text : "Beam time",
        .version = request->version,
        .count = x->w.count,
        .blocks = x->w.blocks};
    return bad;
}

void bh_report_free(bh_report *report)
{
    for (size_t i = 0; i < BH_MOST_REPORT_CURVES; i++) {
        bh_curves_free(&report->curves[i]);
        bh_curves_free(&report->models[i]);
    }
    bh_arena_free(report->arena);
    *report = (bh_report){.arena = NULL};
}
