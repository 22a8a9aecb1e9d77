/* what_if.c - counting statistics go with the root of the hours, so that most of it follows from
 * the table; another current is evaluated, and another background passes through dead time. */
#include "beamhours/run/what_if.h"

#include <math.h>
#include <stdlib.h>

#include "beamhours/rates/counting.h"

static const double less_beam = 0.4, lost_day = 24.0; /* [1], [h] */
static const double slack = 1.0 + 1e-9;               /* [1] what fits but for rounding fits */

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

/* One setting, to be put in order. */
struct candidate {
    double hours; /* [h] on full and empty target */
    size_t setting;
};

static int longer_first(const void *a, const void *b)
{
    const struct candidate *p = a, *q = b;
    if (p->hours > q->hours || p->hours < q->hours)
        return p->hours > q->hours ? -1 : 1;
    return p->setting < q->setting ? -1 : 1;
}

/* Where settings are left out, reused from one try to the next. */
struct trial {
    const struct worse *worse;
    size_t *order;
    bool *gone; /* of each setting */
    bh_setting *settings;
    bh_stretch *stretches;
};

static bool prepare_trial(const struct asking *a, const struct worse *w, struct trial *t)
{
    const size_t n = w->plan->setting_count;
    struct candidate *list = bh_arena_take(a->arena, n + 1, sizeof *list);
    *t = (struct trial){.worse = w,
                        .order = bh_arena_take(a->arena, n + 1, sizeof *t->order),
                        .gone = bh_arena_take(a->arena, n + 1, sizeof *t->gone),
                        .settings = bh_arena_take(a->arena, n + 1, sizeof *t->settings),
                        .stretches = bh_arena_take(a->arena, n + 1, sizeof *t->stretches)};
    if (!list || !t->order || !t->gone || !t->settings || !t->stretches)
        return false;
    for (size_t s = 0; s < n; s++)
        list[s] = (struct candidate){w->hours[s].full + w->hours[s].empty, s};
    qsort(list, n, sizeof *list, longer_first);
    for (size_t i = 0; i < n; i++)
        t->order[i] = list[i].setting;
    return true;
}

/* Sets hours [h] of the calendar that remain without those that are gone, their changes and tasks
 * among what is saved. */
static bh_code rest_of(const struct asking *a, const struct trial *t, double *hours, bh_error *err)
{
    bh_plan plan = *t->worse->plan;
    bh_totals totals;
    plan.settings = t->settings;
    plan.setting_count = 0;
    for (size_t s = 0; s < t->worse->plan->setting_count; s++)
        if (!t->gone[s]) {
            t->settings[plan.setting_count] = t->worse->plan->settings[s];
            t->stretches[plan.setting_count++] = t->worse->hours[s];
        }
    *hours = t->worse->days_less;
    if (plan.setting_count == 0)
        return BH_OK;
    const bh_code bad = bh_totals_from_plan(&plan, t->stretches, a->arena, &totals, err);
    if (!bad)
        *hours += totals.scheduled_hours;
    return bad;
}

/* The same without the first `gone` of the order. */
static bh_code without(const struct asking *a, const struct trial *t, size_t gone, double *hours,
                       bh_error *err)
{
    for (size_t i = 0; i < t->worse->plan->setting_count; i++)
        t->gone[t->order[i]] = i < gone;
    return rest_of(a, t, hours, err);
}

/* [h] of the calendar by which a setting that comes back makes the rest longer at least: with one
 * more between them two settings take no fewer changes and tasks. */
static double at_least(const struct worse *w, size_t setting)
{
    return (w->hours[setting].full + w->hours[setting].empty) / availability(w->plan);
}

/* Takes those back that need not go: one that stood alone between two changes may save more than
 * the longer ones before it.  The shortest comes back first. */
static bh_code take_back(const struct asking *a, const struct trial *t, bh_what_if *out,
                         bh_error *err)
{
    const double granted = a->granted * slack;
    double without_it = 0.0, with_it = 0.0;
    size_t kept = 0;
    bh_code bad = without(a, t, out->drop_count, &without_it, err);
    for (size_t i = out->drop_count; !bad && i-- > 0;) {
        const size_t setting = t->order[i];
        if (without_it + at_least(t->worse, setting) > granted * slack)
            continue;
        t->gone[setting] = false;
        bad = rest_of(a, t, &with_it, err);
        t->gone[setting] = with_it > granted;
        without_it = t->gone[setting] ? without_it : with_it;
    }
    for (size_t i = 0; i < out->drop_count; i++)
        if (t->gone[t->order[i]])
            t->order[kept++] = t->order[i];
    out->drop_count = kept;
    return bad;
}

/* The longest settings first, as many as make the rest fit: their number lies between `fewest` and
 * `most`, which are halved. */
static bh_code drop(const struct asking *a, const struct worse *w, bh_what_if *out, bh_error *err)
{
    const double granted = a->granted * slack;
    struct trial t;
    double hours = 0.0;
    if (!prepare_trial(a, w, &t))
        return no_memory(err);
    out->drop = t.order;
    bh_code bad = without(a, &t, 0, &hours, err);
    if (bad || hours <= granted)
        return bad;
    out->missing_hours = hours - a->granted;
    size_t fewest = 0, most = w->plan->setting_count;
    while (!bad && most - fewest > 1) {
        const size_t middle = fewest + (most - fewest) / 2;
        bad = without(a, &t, middle, &hours, err);
        if (hours > granted)
            fewest = middle;
        else
            most = middle;
    }
    out->drop_count = most;
    return bad ? bad : take_back(a, &t, out, err);
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

/* Sets what share of the planned hours of data fits into what is granted where things are worse,
 * cuts the statistics `u` to it, and says what would be asked. */
static bh_code fit(const struct asking *a, const struct worse *w, bh_what_if *out, double *u,
                   bh_error *err)
{
    bh_totals t;
    const bh_code bad = bh_totals_from_plan(w->plan, a->hours, a->arena, &t, err);
    if (bad)
        return bad;
    const double planned = t.data_hours + t.empty_hours;
    const double beam =
        (a->granted - w->days_less - t.change_hours) * availability(w->plan) - t.task_hours;
    const bool all = !(planned > 0.0) || beam * slack >= planned;
    out->data_left = all ? 1.0 : fmax(0.0, beam / planned);
    for (size_t i = 0; i < a->rows; i++)
        u[i] = out->data_left > 0.0 ? u[i] / sqrt(out->data_left) : (double)NAN;
    out->asked_hours = t.asked_hours + w->days_less;
    return BH_OK;
}

/* Fewer hours of the calendar, or fewer of them with beam. */
static bh_code shorter(const struct asking *a, double days_less, double share, bh_what_if *out,
                       bh_error *err)
{
    double *u = uncertainties(a, out);
    bh_plan changed = *a->plan;
    changed.schedule.availability.value = share;
    changed.schedule.availability.given = true;
    const struct worse worse = {&changed, a->hours, days_less};
    if (!u)
        return no_memory(err);
    const bh_code bad = fit(a, &worse, out, u, err);
    return bad ? bad : drop(a, &worse, out, err);
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
    const bh_evaluation how = {.without_changes = true};
    if (!u || !plan)
        return no_memory(err);
    bh_table *half = bh_table_new(plan, &how, NULL, err);
    if (!half)
        return err ? err->code : BH_ENOMEM;
    for (size_t i = 0; i < a->rows; i++)
        u[i] = cell(half, i, BH_COL_STATISTICAL) *
               sqrt(cell(half, i, BH_COL_HOURS) / cell(a->table, i, BH_COL_HOURS));
    bh_stretch *longer = bh_arena_take(a->arena, plan->setting_count + 1, sizeof *longer);
    bh_code bad =
        longer ? fit(a, &(struct worse){plan, a->hours, 0.0}, out, u, err) : no_memory(err);
    if (longer)
        bh_stretches_of(half, longer);
    out->asked_hours = bh_table_totals(half)->asked_hours;
    bh_table_free(half);
    return bad ? bad : drop(a, &(struct worse){plan, longer, 0.0}, out, err);
}

/* --- twice the background --- */

/* What an arm's readout leaves [1] of its own row with all but the signal `times` [1] as much. */
static double live_of(const struct asking *a, size_t row, double times)
{
    const bh_place p = bh_table_place(a->table, false, row);
    const bh_setting *setting = &a->plan->settings[p.setting];
    const bh_arm *arm = &setting->arms[p.arm].arm;
    const bh_readout readout = {.dead_time = arm->dead_time.value,
                                .paralysable = arm->dead_time_model == BH_DEAD_PARALYSABLE,
                                .prescale = arm->prescale,
                                .rate_limit = arm->rate_limit.given ? arm->rate_limit.value : 0,
                                .duty_factor = setting->beam.duty_factor.value};
    const double beside = cell(a->table, row, BH_COL_BACKGROUND) + arm->other_rate.value;
    bh_live live;
    return bh_counting_live(&readout, cell(a->table, row, BH_COL_SIGNAL) + times * beside, &live,
                            NULL)
               ? (double)NAN
               : live.live_fraction;
}

/* The live fraction [1] with twice the background in units of the planned one; of a coincidence
 * both arms have theirs. */
static double live_left(const struct asking *a, size_t row)
{
    const bh_place p = bh_table_place(a->table, false, row);
    const bh_setting *setting = &a->plan->settings[p.setting];
    const bh_setting_arm *pair = &setting->arms[p.arm];
    if (!pair->first)
        return live_of(a, row, 2.0) / live_of(a, row, 1.0);
    double left = 1.0;
    for (size_t i = 0; i < a->rows; i++) {
        const bh_place q = bh_table_place(a->table, false, i);
        const bh_setting_arm *arm = &setting->arms[q.arm];
        if (q.setting == p.setting && (arm == pair->first || arm == pair->second))
            left *= live_of(a, i, 2.0) / live_of(a, i, 1.0);
    }
    return left;
}

/* sigma^2 = 1/N + background / N^2, both backgrounds of it in the second term.  Doubled, with
 * `left` of the live fraction, it is (2 sigma^2 - 1/N) / left.  Settings with goals take longer,
 * others as long as they did. */
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
        u[i] = sqrt(fmax(was * was, 2.0 * was * was - 1.0 / counts) / live_left(a, i));
        const double factor = u[i] * u[i] / (was * was);
        const double share = a->hours[s].empty / a->hours[s].full;
        if (to_goal * factor > longer[s].full)
            longer[s] = (bh_stretch){to_goal * factor, to_goal * factor * share};
    }
    bh_code bad = fit(a, &(struct worse){a->plan, a->hours, 0.0}, out, u, err);
    bad = bad ? bad : bh_totals_from_plan(a->plan, longer, a->arena, &t, err);
    if (bad)
        return bad;
    out->asked_hours = t.asked_hours;
    return drop(a, &(struct worse){a->plan, longer, 0.0}, out, err);
}

double bh_what_if_granted(const bh_plan *plan, const bh_totals *t)
{
    const double available = plan->schedule.available_is_beam
                                 ? t->available_hours / availability(plan) + t->change_hours
                                 : t->available_hours;
    return isfinite(available) ? fmin(available, t->asked_hours) : t->asked_hours;
}

bh_code bh_what_if_make(const bh_table *table, bh_arena *arena, bh_what_if out[BH_IF_COUNT],
                        bh_error *err)
{
    bh_error unseen = {.code = BH_OK};
    err = err ? err : &unseen;
    const bh_plan *plan = bh_table_plan(table);
    struct asking a = {.table = table,
                       .plan = plan,
                       .arena = arena,
                       .hours = bh_arena_take(arena, plan->setting_count + 1, sizeof *a.hours),
                       .rows = bh_table_rows(table, false),
                       .granted = bh_what_if_granted(plan, bh_table_totals(table))};
    if (!a.hours)
        return no_memory(err);
    bh_stretches_of(table, a.hours);
    for (int i = 0; i < BH_IF_COUNT; i++)
        out[i] = (bh_what_if){.data_left = 1.0};
    bh_code bad = shorter(&a, 0.0, availability(plan), &out[BH_IF_AS_PLANNED], err);
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
