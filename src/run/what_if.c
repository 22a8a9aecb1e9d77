/* what_if.c - counting statistics go with the root of the hours, so that most of it follows from
 * the table; only another current is evaluated. */
#include "beamhours/run/what_if.h"

#include <math.h>

#include "beamhours/run/totals.h"

static const double less_beam = 0.4, lost_day = 24.0; /* [1], [h] */

/* What all cases are made from. */
struct asking {
    const bh_table *table;
    const bh_plan *plan;
    bh_arena *arena;
    bh_stretch *hours;
    size_t rows;
    double granted; /* [h] of the calendar */
};

static bh_code no_memory(bh_error *err)
{
    return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
}

static double cell(const bh_table *table, size_t row, bh_column_id column)
{
    return bh_table_number(table, false, row, column);
}

static double availability(const bh_plan *plan)
{
    return plan->schedule.availability.value > 0.0 ? plan->schedule.availability.value : 1.0;
}

/* --- what is dropped --- */

/* A plan made worse, and the hours that its settings then take. */
struct worse {
    const bh_plan *plan;
    const bh_stretch *hours;
    double days_less; /* [h] of the calendar */
};

static double length(const bh_stretch *h)
{
    return h->full + h->empty;
}

static size_t longest_left(const struct worse *w, const bool *gone)
{
    const size_t n = w->plan->setting_count;
    size_t longest = n;
    for (size_t s = 0; s < n; s++)
        if (!gone[s] && (longest == n || length(&w->hours[s]) > length(&w->hours[longest])))
            longest = s;
    return longest;
}

/* Sets hours [h] of the calendar that remain without the settings that are gone, their changes and
 * tasks among what is saved. */
static bh_code without(const struct asking *a, const struct worse *w, const bool *gone,
                       double *hours, bh_error *err)
{
    bh_plan plan = *w->plan;
    bh_totals t;
    bh_setting *settings = bh_arena_take(a->arena, plan.setting_count + 1, sizeof *settings);
    bh_stretch *stretches = bh_arena_take(a->arena, plan.setting_count + 1, sizeof *stretches);
    if (!settings || !stretches)
        return no_memory(err);
    plan.settings = settings;
    plan.setting_count = 0;
    for (size_t s = 0; s < w->plan->setting_count; s++)
        if (!gone[s]) {
            settings[plan.setting_count] = w->plan->settings[s];
            stretches[plan.setting_count++] = w->hours[s];
        }
    *hours = w->days_less;
    if (plan.setting_count == 0)
        return BH_OK;
    const bh_code bad = bh_totals_from_plan(&plan, stretches, a->arena, &t, err);
    if (!bad)
        *hours += t.scheduled_hours;
    return bad;
}

/* The longest settings first, until the rest fits. */
static bh_code drop(const struct asking *a, const struct worse *w, bh_what_if *out, bh_error *err)
{
    const size_t n = w->plan->setting_count;
    const double granted = a->granted * (1.0 + 1e-9);
    size_t *list = bh_arena_take(a->arena, n + 1, sizeof *list);
    bool *gone = bh_arena_take(a->arena, n + 1, sizeof *gone);
    double hours = 0.0;
    if (!list || !gone)
        return no_memory(err);
    out->drop = list;
    bh_code bad = without(a, w, gone, &hours, err);
    out->missing_hours = hours > granted ? hours - a->granted : 0.0;
    while (!bad && hours > granted && out->drop_count < n) {
        const size_t longest = longest_left(w, gone);
        gone[longest] = true;
        list[out->drop_count++] = longest;
        bad = without(a, w, gone, &hours, err);
    }
    return bad;
}

/* --- the cases --- */

static double *uncertainties(const struct asking *a, bh_what_if *out)
{
    double *u = bh_arena_take(a->arena, a->rows + 1, sizeof *u);
    for (size_t i = 0; u && i < a->rows; i++)
        u[i] = cell(a->table, i, BH_COL_STATISTICAL);
    out->uncertainty = u;
    return u;
}

/* Fewer hours of the calendar, or fewer of them with beam. */
static bh_code shorter(const struct asking *a, double days_less, double share, bh_what_if *out,
                       bh_error *err)
{
    double *u = uncertainties(a, out);
    bh_plan changed = *a->plan;
    bh_totals t;
    changed.schedule.availability.value = share;
    changed.schedule.availability.given = true;
    if (!u)
        return no_memory(err);
    const bh_code bad = bh_totals_from_plan(&changed, a->hours, a->arena, &t, err);
    if (bad)
        return bad;
    const double planned = t.data_hours + t.empty_hours;
    const double beam = (a->granted - days_less - t.change_hours) * share - t.task_hours;
    out->data_left = planned > 0.0 ? fmin(1.0, fmax(0.0, beam / planned)) : 1.0;
    for (size_t i = 0; i < a->rows; i++)
        u[i] = out->data_left > 0.0 ? u[i] / sqrt(out->data_left) : (double)NAN;
    out->asked_hours = t.asked_hours + days_less;
    return drop(a, &(struct worse){&changed, a->hours, days_less}, out, err);
}

static bh_plan *with_half_current(const struct asking *a)
{
    bh_plan *plan = bh_arena_take(a->arena, 1, sizeof *plan);
    bh_setting *settings = bh_arena_take(a->arena, a->plan->setting_count + 1, sizeof *settings);
    if (!plan || !settings)
        return NULL;
    *plan = *a->plan;
    plan->settings = settings;
    for (size_t s = 0; s < plan->setting_count; s++) {
        settings[s] = a->plan->settings[s];
        settings[s].beam.current.value *= 0.5;
        settings[s].beam.particle_rate.value *= 0.5;
    }
    return plan;
}

/* With the planned hours: what the half current gives in its own, by the root of the hours. */
static bh_code half_current(const struct asking *a, bh_what_if *out, bh_error *err)
{
    double *u = uncertainties(a, out);
    const bh_plan *plan = with_half_current(a);
    const bh_evaluation how = {.bins = false};
    if (!u || !plan)
        return no_memory(err);
    bh_table *half = bh_table_new(plan, &how, NULL, err);
    if (!half)
        return err ? err->code : BH_ENOMEM;
    for (size_t i = 0; i < a->rows; i++)
        u[i] = cell(half, i, BH_COL_STATISTICAL) *
               sqrt(cell(half, i, BH_COL_HOURS) / cell(a->table, i, BH_COL_HOURS));
    bh_stretch *longer = bh_arena_take(a->arena, plan->setting_count + 1, sizeof *longer);
    if (longer)
        bh_stretches_of(half, longer);
    out->asked_hours = bh_table_totals(half)->asked_hours;
    bh_table_free(half);
    return longer ? drop(a, &(struct worse){plan, longer, 0.0}, out, err) : no_memory(err);
}

/* sigma^2 = 1/N + background / N^2, both backgrounds of it in the second term: doubled, it is
 * 2 sigma^2 - 1/N.  Settings with goals take longer, others as long as they did. */
static bh_code double_background(const struct asking *a, bh_what_if *out, bh_error *err)
{
    double *u = uncertainties(a, out);
    bh_stretch *longer = bh_arena_take(a->arena, a->plan->setting_count + 1, sizeof *longer);
    bh_totals t;
    if (!u || !longer)
        return no_memory(err);
    for (size_t s = 0; s < a->plan->setting_count; s++)
        longer[s] = a->hours[s];
    for (size_t i = 0; i < a->rows; i++) {
        const double was = u[i], counts = cell(a->table, i, BH_COL_COUNTS);
        const double to_goal = cell(a->table, i, BH_COL_HOURS_TO_GOAL);
        const size_t s = bh_table_place(a->table, false, i).setting;
        u[i] = sqrt(fmax(was * was, 2.0 * was * was - 1.0 / counts));
        const double factor = u[i] * u[i] / (was * was);
        const double share = a->hours[s].empty / a->hours[s].full;
        if (to_goal * factor > longer[s].full)
            longer[s] = (bh_stretch){to_goal * factor, to_goal * factor * share};
    }
    const bh_code bad = bh_totals_from_plan(a->plan, longer, a->arena, &t, err);
    if (bad)
        return bad;
    out->asked_hours = t.asked_hours;
    return drop(a, &(struct worse){a->plan, longer, 0.0}, out, err);
}

bh_code bh_what_if_make(const bh_table *table, bh_arena *arena, bh_what_if out[BH_IF_COUNT],
                        bh_error *err)
{
    bh_error unseen = {.code = BH_OK};
    err = err ? err : &unseen;
    const bh_totals *t = bh_table_totals(table);
    const bh_plan *plan = bh_table_plan(table);
    const bool calendar = isfinite(t->available_hours) && !plan->schedule.available_is_beam;
    struct asking a = {.table = table,
                       .plan = plan,
                       .arena = arena,
                       .hours = bh_arena_take(arena, plan->setting_count + 1, sizeof *a.hours),
                       .rows = bh_table_rows(table, false),
                       .granted =
                           calendar ? fmin(t->available_hours, t->asked_hours) : t->asked_hours};
    if (!a.hours)
        return no_memory(err);
    bh_stretches_of(table, a.hours);
    for (int i = 0; i < BH_IF_COUNT; i++)
        out[i] = (bh_what_if){.data_left = 1.0};
    bh_what_if *planned = &out[BH_IF_AS_PLANNED];
    if (!uncertainties(&a, planned))
        return no_memory(err);
    planned->asked_hours = t->asked_hours;
    bh_code bad = drop(&a, &(struct worse){plan, a.hours, 0.0}, planned, err);
    bad = bad ? bad : half_current(&a, &out[BH_IF_HALF_CURRENT], err);
    bad = bad ? bad : double_background(&a, &out[BH_IF_DOUBLE_BACKGROUND], err);
    bad = bad ? bad : shorter(&a, 0.0, less_beam, &out[BH_IF_LESS_BEAM], err);
    return bad ? bad : shorter(&a, lost_day, availability(plan), &out[BH_IF_LOST_DAY], err);
}

const char *bh_what_if_words(bh_if which)
{
    static const char *const words[BH_IF_COUNT] = {
        "as planned", "half the beam current", "twice the background",
        "beam in 40 % of the scheduled time", "a day lost"};
    return (unsigned)which < BH_IF_COUNT ? words[which] : "";
}
