/* worker.c - one job at a time, settings in view first; overtaken jobs are dropped. */
#include "beamhours/screen/worker.h"

#include <fcntl.h>
#include <signal.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <time.h>
#include <unistd.h>

#include "beamhours/screen/asking.h"

static const double report_after = 0.1; /* s between outcomes of a long job */

static double now(void)
{
    struct timespec t;
    (void)clock_gettime(CLOCK_MONOTONIC, &t);
    return (double)t.tv_sec + 1e-9 * (double)t.tv_nsec;
}

static void drop_job(bh_own_job *job)
{
    free(job->bytes);
    free(job->first);
    free(job->opened);
    *job = (bh_own_job){0};
}

void bh_worker_ring(bh_worker *worker)
{
    const char bell = 1;
    const ssize_t written = write(worker->wake[1], &bell, 1); /* a full pipe rings already */
    (void)written;
}

/* --- the first thread: tables --- */

struct doing {
    bh_worker *worker;
    const bh_own_job *job;
    bh_reading_of *of;
    bh_stepwise *steps;
    bool *opened; /* by setting */
    bh_arena *arena;
    double reported;
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

/* Evaluates one setting unless it is known; false when the job is over. */
static bool one(struct doing *d, size_t s)
{
    bh_error err = {.code = BH_OK};
    const bh_setting_rows rows = bh_stepwise_rows(d->steps, s);
    if (rows.whole && (rows.bins || !d->opened[s]))
        return true;
    if (overtaken(d))
        return false;
    if (bh_stepwise_evaluate(d->steps, s, d->opened[s], &err)) {
        if (!overtaken(d))
            report_failure(d, err.text);
        return false;
    }
    (void)atomic_fetch_add(&d->worker->evaluated, 1U);
    if (now() - d->reported < report_after)
        return true;
    d->reported = now();
    bh_outcome *o = snapshot(d);
    if (o)
        hand_over(d, o);
    return true;
}

/* Settings that are not known yet. */
static size_t unknown(const struct doing *d)
{
    size_t left = 0;
    for (size_t s = 0; s < d->of->plan->setting_count; s++)
        left += bh_stepwise_rows(d->steps, s).whole == NULL;
    return left;
}

/* What need not be evaluated, what is in view, the rest. */
static bool in_order(struct doing *d)
{
    const size_t count = d->of->plan->setting_count;
    for (size_t s = 0; s < count; s++)
        (void)bh_stepwise_recall(d->steps, s, d->opened[s]);
    for (size_t i = 0; i < d->job->first_count; i++)
        if (d->job->first[i] < count && !one(d, d->job->first[i]))
            return false;
    bh_outcome *o = unknown(d) ? snapshot(d) : NULL;
    if (o)
        hand_over(d, o);
    for (size_t s = 0; s < count; s++)
        if (!one(d, s))
            return false;
    return true;
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

static void evaluate(struct doing *d)
{
    bh_error err = {.code = BH_OK};
    const size_t count = d->of->plan->setting_count;
    const bh_evaluation how = {
        .cancelled = overtaken, .asker = d, .workspace = d->worker->workspace};
    d->opened = bh_arena_take(d->arena, count + 1, sizeof *d->opened);
    d->steps = d->opened ? bh_stepwise_new(d->of->plan, &how, d->worker->results, &err) : NULL;
    if (!d->steps) {
        report_failure(d, "no memory is left to evaluate the plan");
        return;
    }
    for (size_t i = 0; i < d->job->opened_count; i++)
        if (d->job->opened[i] < count)
            d->opened[d->job->opened[i]] = true;
    d->reported = now();
    if (in_order(d))
        conclude(d);
    bh_stepwise_free(d->steps);
}

static void do_job(bh_worker *w, const bh_own_job *job)
{
    struct doing d = {.worker = w, .job = job, .arena = bh_arena_new()};
    d.of = d.arena ? bh_worker_read(w, 0, job->bytes, job->length) : NULL;
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

static void *tables(void *of)
{
    bh_worker *w = of;
    (void)pthread_mutex_lock(&w->lock);
    while (!atomic_load(&w->stop)) {
        if (!w->waiting.number) {
            w->working[0] = false;
            (void)pthread_cond_wait(&w->more, &w->lock);
            continue;
        }
        bh_own_job job = w->waiting;
        w->waiting = (bh_own_job){0};
        w->working[0] = true;
        (void)pthread_mutex_unlock(&w->lock);
        do_job(w, &job);
        drop_job(&job);
        (void)pthread_mutex_lock(&w->lock);
        w->working[0] = w->waiting.number != 0;
        bh_worker_ring(w);
    }
    (void)pthread_mutex_unlock(&w->lock);
    return NULL;
}

/* --- beginning and end --- */

/* Signals are for the thread that draws. */
static bool start(bh_worker *w)
{
    void *(*const run[])(void *) = {tables, bh_worker_answers};
    sigset_t all, before;
    (void)sigfillset(&all);
    (void)pthread_sigmask(SIG_SETMASK, &all, &before);
    while (w->started < 2 && !pthread_create(&w->threads[w->started], NULL, run[w->started], w))
        w->started++;
    (void)pthread_sigmask(SIG_SETMASK, &before, NULL);
    return w->started == 2;
}

static bool make_pipe(bh_worker *w)
{
    if (pipe(w->wake))
        return false;
    for (int i = 0; i < 2; i++)
        if (fcntl(w->wake[i], F_SETFL, O_NONBLOCK) || fcntl(w->wake[i], F_SETFD, FD_CLOEXEC))
            return false;
    return true;
}

bh_worker *bh_worker_new(const char *const *folders, const char *name)
{
    bh_worker *w = calloc(1, sizeof *w);
    if (!w)
        return NULL;
    w->wake[0] = w->wake[1] = -1;
    (void)pthread_mutex_init(&w->lock, NULL);
    (void)pthread_cond_init(&w->more, NULL);
    w->name = strdup(name);
    w->libraries[0] = bh_material_library_new(folders);
    w->libraries[1] = bh_material_library_new(folders);
    w->results = bh_results_new();
    w->workspace = bh_workspace_new();
    if (w->name && w->libraries[0] && w->libraries[1] && w->results && w->workspace &&
        make_pipe(w) && start(w))
        return w;
    bh_worker_free(w);
    return NULL;
}

static void free_all(bh_worker *w)
{
    drop_job(&w->waiting);
    bh_outcome_leave(w->out);
    for (int i = 0; i < BH_ASK_KINDS; i++)
        bh_worker_drop_question(&w->questions[i]);
    for (size_t i = 0; i < w->answer_count; i++)
        bh_reply_free(w->answers[i]);
    for (int i = 0; i < 2; i++) {
        for (size_t k = 0; k < BH_READINGS_KEPT; k++)
            bh_reading_of_leave(w->last[i][k]);
        if (w->wake[i] >= 0)
            (void)close(w->wake[i]);
    }
    bh_results_free(w->results);
    bh_workspace_free(w->workspace);
    for (int i = 0; i < 2; i++)
        bh_material_library_free(w->libraries[i]);
    free(w->name);
}

void bh_worker_free(bh_worker *worker)
{
    if (!worker)
        return;
    atomic_store(&worker->stop, true);
    (void)pthread_mutex_lock(&worker->lock);
    (void)pthread_cond_broadcast(&worker->more);
    (void)pthread_mutex_unlock(&worker->lock);
    for (int i = 0; i < worker->started; i++)
        (void)pthread_join(worker->threads[i], NULL);
    free_all(worker);
    (void)pthread_cond_destroy(&worker->more);
    (void)pthread_mutex_destroy(&worker->lock);
    free(worker);
}

/* --- what the screen calls --- */

static size_t *copy_of(const size_t *from, size_t count)
{
    size_t *to = malloc((count + 1) * sizeof *to);
    if (to && count)
        memcpy(to, from, count * sizeof *to);
    return to;
}

size_t bh_worker_begin(bh_worker *worker, const bh_job *job)
{
    bh_own_job own = {.bytes = malloc(job->length + 1),
                      .length = job->length,
                      .first = copy_of(job->first, job->first_count),
                      .opened = copy_of(job->opened, job->opened_count),
                      .first_count = job->first_count,
                      .opened_count = job->opened_count};
    if (!own.bytes || !own.first || !own.opened) {
        drop_job(&own);
        return 0;
    }
    memcpy(own.bytes, job->bytes, job->length);
    (void)pthread_mutex_lock(&worker->lock);
    drop_job(&worker->waiting);
    const size_t number = own.number = ++worker->numbers;
    worker->waiting = own;
    worker->working[0] = true;
    atomic_store(&worker->newest, number);
    (void)pthread_cond_broadcast(&worker->more);
    (void)pthread_mutex_unlock(&worker->lock);
    return number;
}

void bh_worker_abandon(bh_worker *worker)
{
    (void)pthread_mutex_lock(&worker->lock);
    drop_job(&worker->waiting);
    atomic_store(&worker->newest, ++worker->numbers);
    (void)pthread_mutex_unlock(&worker->lock);
}

int bh_worker_wake(const bh_worker *worker)
{
    return worker->wake[0];
}

bh_outcome *bh_worker_take(bh_worker *worker)
{
    char bells[256];
    while (read(worker->wake[0], bells, sizeof bells) > 0)
        ;
    (void)pthread_mutex_lock(&worker->lock);
    bh_outcome *out = worker->out;
    worker->out = NULL;
    (void)pthread_mutex_unlock(&worker->lock);
    return out;
}

bool bh_worker_busy(bh_worker *worker)
{
    (void)pthread_mutex_lock(&worker->lock);
    const bool busy = worker->working[0] || worker->working[1];
    (void)pthread_mutex_unlock(&worker->lock);
    return busy;
}

size_t bh_worker_evaluated(bh_worker *worker)
{
    return atomic_load(&worker->evaluated);
}
