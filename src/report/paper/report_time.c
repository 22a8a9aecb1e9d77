/* report_time.c - where the hours go, and what happens where there are fewer. */
#include <math.h>

#include "beamhours/base/number.h"
#include "beamhours/report/reporting.h"
#include "beamhours/units/quantity.h"

#define COUNT(list) (sizeof(list) / sizeof(list)[0])

/* --- each stretch of time --- */

static void stretch(bh_reporting *x, const char *name, double hours, const char *remark)
{
    if (!isfinite(hours))
        return;
    bh_paper_cell(&x->w, name);
    bh_paper_cell(&x->w, bh_report_hours(x, hours));
    bh_paper_cell(&x->w, remark);
}

static const char *asked_as(bh_reporting *x)
{
    const bh_schedule *s = &x->plan->schedule;
    bh_text t = {0};
    bh_text_appendf(&t, "%s d", bh_report_number(x, x->totals->asked_hours / 24.0, 3));
    bh_text_appendf(&t, " = %s shifts of ", bh_report_number(x, x->totals->shifts, 3));
    bh_text_append_number(&t, s->shift.value / 3600.0);
    bh_text_appendf(&t, " h = %s weeks of ", bh_report_number(x, x->totals->weeks, 3));
    bh_text_append_number(&t, s->week.value / 3600.0);
    bh_text_append(&t, " h");
    return bh_paper_keep(&x->w, &t);
}

static void totals(bh_reporting *x)
{
    static const bh_paper_column columns[] = {
        {"time", "", false}, {"hours", "h", true}, {"how", "", false}};
    const bh_totals *t = x->totals;
    const bh_schedule *s = &x->plan->schedule;
    bh_paper_table_open(&x->w, "Beam time asked for, line by line", columns, COUNT(columns));
    stretch(x, "data", t->data_hours, "full target");
    stretch(x, "empty target", t->empty_hours, "the target without its sample");
    stretch(x, "tasks", t->task_hours, "with beam");
    stretch(x, "beam hours", t->beam_hours, "data + empty target + tasks");
    stretch(x, "changes", t->change_hours, "start-up, changes, tasks without beam");
    stretch(x, "scheduled", t->scheduled_hours,
            bh_paper_text(&x->w, "beam hours / %s %% availability + changes",
                          bh_report_percent(x, s->availability.value)));
    stretch(x, "contingency", t->contingency_hours,
            s->contingency.value > 0.0 ? bh_paper_text(&x->w, "%s %% of scheduled",
                                                       bh_report_percent(x, s->contingency.value))
                                       : "switched off: the plan asks for none");
    stretch(x, "asked", t->asked_hours, asked_as(x));
    stretch(x, "available", t->available_hours,
            s->available_is_beam ? "hours of beam: compared with beam hours" : "calendar");
    stretch(x, "spare", t->spare_hours,
            t->spare_hours < 0.0 ? "more is asked than is available" : "available less asked");
    bh_paper_table_close(&x->w);
    if (t->note)
        bh_paper_add(&x->w, BH_BLOCK_WORDS,
                     bh_paper_text(&x->w, "Change-over times: %s.", t->note));
}

/* --- overheads and tasks --- */

static void overhead(bh_reporting *x, const char *name, const bh_value *each, double times)
{
    const double hours = each->value / 3600.0;
    if (!each->given)
        return;
    bh_paper_cell(&x->w, name);
    bh_paper_cell(&x->w, bh_report_hours(x, hours));
    bh_paper_cell(&x->w, bh_paper_text(&x->w, "%.0f", times));
    bh_paper_cell(&x->w, bh_report_hours(x, hours * times));
    bh_paper_cell(&x->w, "without beam");
}

static const char *when(bh_reporting *x, const bh_task *task)
{
    static const char *const words[] = {"once",           "each energy",  "each particle",
                                        "each target",    "each setting", "each shift begun",
                                        "each time begun"};
    if (task->every != BH_EVERY_TIME)
        return words[task->every];
    return bh_paper_text(&x->w, "each %s h begun",
                         bh_report_number(x, task->period.value / 3600.0, 3));
}

static void task(bh_reporting *x, const bh_task *t, double times)
{
    const double hours = t->time.value / 3600.0;
    bh_paper_cell(&x->w, bh_paper_text(&x->w, "task: %s", t->name.text ? t->name.text : "-"));
    bh_paper_cell(&x->w, bh_report_hours(x, hours));
    bh_paper_cell(&x->w, bh_paper_text(&x->w, "%.0f", times));
    bh_paper_cell(&x->w, bh_report_hours(x, hours * times));
    bh_paper_cell(&x->w, bh_paper_text(&x->w, "%s, %s",
                                       t->needs_beam ? "with beam" : "without beam", when(x, t)));
}

static void overheads(bh_reporting *x)
{
    static const bh_paper_column columns[] = {{"overhead or task", "", false},
                                              {"each", "h", true},
                                              {"times", "1", true},
                                              {"together", "h", true},
                                              {"when", "", false}};
    const bh_schedule *s = &x->plan->schedule;
    const bh_time_sum *sum = &x->time.sum;
    bh_paper_table_open(&x->w,
                        "Every overhead and task; changes of one setting run in parallel, so that "
                        "the longest of them counts in the sum of changes",
                        columns, COUNT(columns));
    overhead(x, "start-up", &s->start_up, 1.0);
    overhead(x, "change of energy", &s->change_energy, sum->energy_changes);
    overhead(x, "change of particle", &s->change_particle, sum->particle_changes);
    overhead(x, "change of target", &s->change_target, sum->target_changes);
    overhead(x, "change of angle", &s->change_angle, sum->angle_changes);
    for (size_t i = 0; i < s->task_count; i++)
        task(x, &s->tasks[i], x->time.times[i]);
    bh_paper_table_close(&x->w);
}

void bh_report_time(bh_reporting *x)
{
    static const int columns[] = {BH_COL_SETTING,     BH_COL_ARM,          BH_COL_HOURS,
                                  BH_COL_EMPTY_HOURS, BH_COL_CHARGE,       BH_COL_COUNTS,
                                  BH_COL_STATISTICAL, BH_COL_HOURS_TO_GOAL};
    bh_paper_add(&x->w, BH_BLOCK_SECTION, "Beam time");
    totals(x);
    overheads(x);
    bh_report_rows(x,
                   "Hours of each setting on full and empty target (they repeat for each of its "
                   "arms), charge and counts in them, hours that its goal takes",
                   columns, COUNT(columns));
}

/* --- what if --- */

static const char *dropped(bh_reporting *x, const bh_what_if *w)
{
    enum { SHOWN = 6 };
    bh_text t = {0};
    if (!w->drop_count)
        return "nothing";
    for (size_t i = 0; i < w->drop_count && i < SHOWN; i++)
        bh_text_appendf(&t, "%s%s", i ? ", " : "", x->plan->settings[w->drop[i]].name);
    if (w->drop_count > SHOWN)
        bh_text_appendf(&t, " and %zu more", w->drop_count - SHOWN);
    return bh_paper_keep(&x->w, &t);
}

static void cases(bh_reporting *x)
{
    static const bh_paper_column columns[] = {{"if", "", false},
                                              {"asked to keep all", "h", true},
                                              {"data left", "%", true},
                                              {"missing", "h", true},
                                              {"dropped first", "", false}};
    bh_paper_table_open(&x->w,
                        "What would be asked to keep every goal; what share of the planned hours "
                        "of data fits into the time granted; what is missing to keep every goal "
                        "once the contingency is used up; which settings save that together with "
                        "their changes and tasks, the longest first",
                        columns, COUNT(columns));
    for (int i = 0; i < BH_IF_COUNT; i++) {
        const bh_what_if *w = &x->what_if[i];
        bh_paper_cell(&x->w, bh_what_if_words((bh_if)i));
        bh_paper_cell(&x->w, bh_report_hours(x, w->asked_hours));
        bh_paper_cell(&x->w, bh_report_percent(x, w->data_left));
        bh_paper_cell(&x->w, bh_report_hours(x, w->missing_hours));
        bh_paper_cell(&x->w, dropped(x, w));
    }
    bh_paper_table_close(&x->w);
}

/* Where all that is asked is granted, what is planned fits, and has no column of its own. */
static int first_case(const bh_reporting *x)
{
    return x->what_if[BH_IF_AS_PLANNED].data_left < 1.0 ? BH_IF_AS_PLANNED : BH_IF_HALF_CURRENT;
}

static void precisions(bh_reporting *x)
{
    const bh_paper_column columns[] = {{"setting", "", false},
                                       {"all hours asked", "%", true},
                                       {"as planned", "%", true},
                                       {"half the current", "%", true},
                                       {"twice the background", "%", true},
                                       {"beam 40 % of the time", "%", true},
                                       {"a day lost", "%", true}};
    const int from = first_case(x);
    bh_paper_column chosen[COUNT(columns)] = {columns[0], columns[1]};
    for (int i = from; i < BH_IF_COUNT; i++)
        chosen[2 + i - from] = columns[2 + i];
    bh_paper_table_open(&x->w,
                        "The statistical uncertainty with all hours that are asked, and what of it "
                        "survives in the time granted where nothing is dropped and all settings "
                        "are cut alike (relative, of the background-subtracted signal; -: no time "
                        "is left for data)",
                        chosen, (size_t)(2 + BH_IF_COUNT - from));
    for (size_t r = 0; r < x->view.row_count; r++) {
        bh_paper_cell(&x->w, bh_report_row_name(x, r));
        bh_paper_cell(&x->w,
                      bh_report_percent(x, bh_selection_number(&x->view, r, BH_COL_STATISTICAL)));
        for (int i = from; i < BH_IF_COUNT; i++)
            bh_paper_cell(&x->w, bh_report_percent(x, x->what_if[i].uncertainty[r]));
    }
    bh_paper_table_close(&x->w);
}

void bh_report_what_if(bh_reporting *x)
{
    const bh_schedule *s = &x->plan->schedule;
    bh_paper_add(&x->w, BH_BLOCK_SECTION, "What if");
    bh_paper_add(
        &x->w, BH_BLOCK_WORDS,
        bh_paper_text(&x->w,
                      "The time granted is what is asked, or what is available where that is less: "
                      "here %s h of the calendar%s. Half the current is evaluated anew; twice the "
                      "background, and twice whatever else triggers, pass through dead time; "
                      "contingency is used up before data are cut.",
                      bh_report_hours(x, bh_what_if_granted(x->plan, x->totals)),
                      s->available.given && s->available_is_beam
                          ? " (available hours of beam / availability + changes)"
                          : ""));
    cases(x);
    precisions(x);
}
