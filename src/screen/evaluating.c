/* evaluating.c - a plan becomes a table: settings in view first, by all hands; an overtaken job is
 * dropped. */
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <time.h>

#include "beamhours/screen/asking.h"

static const double report_after = 0.1; /* s between outcomes of a long job */

static double now(void)
{
    struct timespec t;
    (void)clock_gettime(CLOCK_MONOTONIC, &t);
    return (double)t.tv_sec + 1e-9 * (double)t.tv_nsec;
}

struct doing {
    bh_worker *worker;
    const bh_own_job *job;
    bh_reading_of *of;
    bh_stepwise *steps;
    bool *opened; /* by setting */
    bh_arena *arena;
    size_t *due; /* settings that are not known, those in view first */
    size_t due_count, view_count;
    atomic_size_t next; /* of these */
    atomic_bool failed;
    pthread_mutex_t lock; /* of what follows, and of `steps` once hands are at work */
    size_t in_view;       /* of what is due there */
    double reported;      /* [s] */
};

static bool overtaken(void *asker)
{
    const struct doing *d = asker;
    return atomic_load(&d->worker->stop) || atomic_load(&d->worker->newest) != d->job->number;
}

static void hand_over(struct doing *d, bh_outcome *outcome)
{
    bh_worker *w = d->worker;
    (void)pthread_mutex_lock(&w->lock);
    bh_outcome *before = w->out;
    w->out = outcome;
    (void)pthread_mutex_unlock(&w->lock);
    bh_outcome_leave(before);
    bh_worker_ring(w);
}

static void copy_rows(bh_row *to, const bh_row *from, size_t count)
{
    if (!from || !count)
        return;
    memcpy(to, from, count * sizeof *to);
    for (size_t i = 0; i < count; i++)
        to[i].effects = (bh_effects){0}; /* they belong to the evaluation */
}

static bool copy_setting(const struct doing *d, bh_outcome *o, size_t s)
{
    const bh_setting_rows rows = bh_stepwise_rows(d->steps, s);
    if (!rows.whole)
        return true;
    o->known[s] = true;
    o->unknown--;
    copy_rows(o->rows + o->first_row[s], rows.whole, o->first_row[s + 1] - o->first_row[s]);
    if (!rows.bins || !d->opened[s])
        return true;
    if (!o->bins)
        o->bins = bh_arena_take(o->arena, o->bin_count + 1, sizeof *o->bins);
    if (!o->bins)
        return false;
    o->bins_known[s] = true;
    copy_rows(o->bins + o->first_bin[s], rows.bins, o->first_bin[s + 1] - o->first_bin[s]);
    return true;
}

/* What is known so far. */
static bh_outcome *snapshot(const struct doing *d)
{
    bh_outcome *o = bh_outcome_new(d->of, d->job->number);
    for (size_t s = 0; o && d->steps && s < o->setting_count; s++)
        if (!copy_setting(d, o, s)) {
            bh_outcome_leave(o);
            return NULL;
        }
    return o;
}

static void report_failure(struct doing *d, const char *why)
{
    bh_outcome *o = snapshot(d);
    if (!o)
        return;
    (void)snprintf(o->failed, sizeof o->failed, "%.*s", (int)sizeof o->failed - 1, why);
    hand_over(d, o);
}

/* Settings that are not known yet. */
static size_t unknown(const struct doing *d)
{
    size_t left = 0;
    for (size_t s = 0; s < d->of->plan->setting_count; s++)
        left += bh_stepwise_rows(d->steps, s).whole == NULL;
    return left;
}

/* Hands over what is known once all that is in view is, and now and then. */
static void report(struct doing *d, bool view)
{
    if (!view && now() - d->reported < report_after)
        return;
    d->reported = now();
    bh_outcome *o = unknown(d) ? snapshot(d) : NULL;
    if (o)
        hand_over(d, o);
}

/* What one hand does: the next setting, until none is left. */
static void take_turns(void *of, size_t hand)
{
    struct doing *d = of;
    for (;;) {
        const size_t i = atomic_fetch_add(&d->next, 1U);
        if (i >= d->due_count || atomic_load(&d->failed) || overtaken(d))
            return;
        const size_t s = d->due[i];
        const bh_step step = {.setting = s, .hand = hand, .bins = d->opened[s]};
        bh_result *result;
        bh_error err = {.code = BH_OK};
        const bh_code code = bh_stepwise_compute(d->steps, &step, &result, &err);
        (void)pthread_mutex_lock(&d->lock);
        if (!code) {
            bh_stepwise_take(d->steps, s, result);
            (void)atomic_fetch_add(&d->worker->evaluated, 1U);
            d->in_view -= i < d->view_count;
            report(d, i < d->view_count && d->in_view == 0);
        } else if (!overtaken(d) && !atomic_exchange(&d->failed, true)) {
            report_failure(d, err.text);
        }
        (void)pthread_mutex_unlock(&d->lock);
    }
}

/* Is it still to be evaluated?  Taken from the store where it was not asked for yet. */
static bool is_due(struct doing *d, size_t s)
{
    const bh_setting_rows rows = bh_stepwise_rows(d->steps, s);
    return !rows.whole || (d->opened[s] && !rows.bins);
}

/* Lists what is to be evaluated: what is in view, then the rest. */
static bool list_due(struct doing *d)
{
    const size_t count = d->of->plan->setting_count;
    bool *listed = bh_arena_take(d->arena, count + 1, sizeof *listed);
    d->due = bh_arena_take(d->arena, count + 1, sizeof *d->due);
    if (!listed || !d->due)
        return false;
    for (size_t s = 0; s < count; s++)
        (void)bh_stepwise_recall(d->steps, s, d->opened[s]);
    for (size_t i = 0; i < d->job->first_count + count; i++) {
        const size_t s = i < d->job->first_count ? d->job->first[i] : i - d->job->first_count;
        if (s >= count || listed[s] || !is_due(d, s))
            continue;
        listed[s] = true;
        d->due[d->due_count++] = s;
        d->view_count += i < d->job->first_count;
    }
    d->in_view = d->view_count;
    return true;
}

/* False when it failed or was overtaken. */
static bool all_due(struct doing *d)
{
    if (d->due_count && !d->in_view)
        report(d, true);
    (void)pthread_mutex_init(&d->lock, NULL);
    if (d->due_count < 2)
        take_turns(d, 0);
    else
        bh_crew_work(d->worker->crew, take_turns, d);
    (void)pthread_mutex_destroy(&d->lock);
    return !atomic_load(&d->failed) && !overtaken(d);
}

static void conclude(struct doing *d)
{
    bh_error err = {.code = BH_OK};
    bh_outcome *o = snapshot(d);
    if (!o)
        return;
    if (bh_stepwise_conclude(d->steps, d->of->said, o->arena, &o->end, &err))
        (void)snprintf(o->failed, sizeof o->failed, "%.*s", (int)sizeof o->failed - 1, err.text);
    else
        o->complete = true;
    hand_over(d, o);
}

static bool prepare(struct doing *d, bh_error *err)
{
    const size_t count = d->of->plan->setting_count;
    bh_worker *w = d->worker;
    const bh_evaluation how = {.cancelled = overtaken,
                               .asker = d,
                               .workspace = w->workspaces[0],
                               .without_changes = !d->job->changes};
    d->opened = bh_arena_take(d->arena, count + 1, sizeof *d->opened);
    d->steps = d->opened ? bh_stepwise_new(d->of->plan, &how, w->results, err) : NULL;
    for (size_t i = 0; d->steps && i < d->job->opened_count; i++)
        if (d->job->opened[i] < count)
            d->opened[d->job->opened[i]] = true;
    return d->steps && list_due(d) &&
           (d->due_count < 2 ||
            !bh_stepwise_hands(d->steps, w->workspaces, bh_crew_hands(w->crew), err));
}

static void evaluate(struct doing *d)
{
    bh_error err = {.code = BH_OK};
    if (!prepare(d, &err)) {
        report_failure(d, "no memory is left to evaluate the plan");
    } else {
        d->reported = now();
        if (all_due(d))
            conclude(d);
    }
    bh_stepwise_free(d->steps);
}

void bh_worker_evaluate(bh_worker *worker, const bh_own_job *job)
{
    struct doing d = {.worker = worker, .job = job, .arena = bh_arena_new()};
    d.of = d.arena ? bh_worker_read(worker, 0, job->bytes, job->length) : NULL;
    if (d.of && d.of->plan && !overtaken(&d)) {
        evaluate(&d);
    } else if (d.of && !d.of->plan) {
        bh_outcome *o = snapshot(&d);
        if (o)
            hand_over(&d, o);
    }
    bh_reading_of_leave(d.of);
    bh_arena_free(d.arena);
}
