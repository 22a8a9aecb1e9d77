/* inquiry.c - questions are asked when they are due, and withdrawn when nobody looks at them. */
#include "beamhours/screen/inquiry.h"

/* Questions that may take long are asked once typing pauses. */
static const double pause_first = 0.12; /* s */

void bh_inquire_put_off(bh_model *model, bh_worker *worker)
{
    if (!model->curve_asked || (model->curve && model->curve->number == model->curve_asked))
        return;
    bh_worker_withdraw(worker, BH_ASK_CURVE);
    model->curve_asked = 0;
    model->curve_due = true;
}

static size_t ask_about_row(bh_model *model, bh_worker *worker, bh_ask_kind kind)
{
    const bh_table_row *row = bh_table_here(model);
    bh_query q = {.kind = kind};
    q.bytes = bh_model_bytes(model, &q.length);
    if (!row)
        return 0;
    const bh_setting *setting = bh_table_setting(model, row);
    q.setting = setting->name;
    q.arm = setting->arms[row->now->arm].arm.name.text;
    q.bin = row->bin ? row->now->bin : 0;
    return bh_worker_ask(worker, &q);
}

static void ask_to_solve(bh_model *model, bh_worker *worker)
{
    bh_solving *s = &model->solving;
    bh_query q = {.kind = BH_ASK_SOLVE,
                  .setting = s->setting,
                  .arm = s->arm[0] ? s->arm : NULL,
                  .column = s->output,
                  .wanted = s->value,
                  .by = bh_solve_input_name((bh_solve_input)s->by)};
    q.bytes = bh_model_bytes(model, &q.length);
    s->due = false;
    s->asked = model->solve_asked = bh_worker_ask(worker, &q);
    s->waiting = s->asked != 0;
}

/* What was asked for a part of the screen that was closed since. */
static void withdraw(bh_model *model, bh_worker *worker)
{
    const bool explains = model->over == BH_OVER_SHEET && model->sheet.kind == BH_SHEET_EXPLAIN;
    if (model->explain_asked && (!explains || model->explain_due)) {
        bh_worker_withdraw(worker, BH_ASK_EXPLAIN);
        model->explain_asked = 0;
    }
    if (model->solve_asked && model->over != BH_OVER_SOLVE) {
        bh_worker_withdraw(worker, BH_ASK_SOLVE);
        model->solve_asked = 0;
    }
}

/* The curve is asked for once typing pauses. */
static double mind_curve(bh_model *model, bh_worker *worker, double idle)
{
    if (!model->curve_due || bh_arrange(model).curve < 0 || !bh_model_current(model) ||
        !bh_table_here(model))
        return -1;
    if (idle < pause_first)
        return pause_first - idle;
    model->curve_due = false;
    model->curve_asked = ask_about_row(model, worker, BH_ASK_CURVE);
    return -1;
}

double bh_inquire(bh_model *model, bh_worker *worker, double idle)
{
    if (!worker)
        return -1;
    withdraw(model, worker);
    if (model->over == BH_OVER_SOLVE && model->solving.due)
        ask_to_solve(model, worker);
    if (model->explain_due && bh_table_here(model)) {
        model->explain_due = false;
        model->explain_asked = ask_about_row(model, worker, BH_ASK_EXPLAIN);
    }
    return mind_curve(model, worker, idle);
}
