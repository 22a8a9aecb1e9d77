/* worker.c - the threads beside the screen: one job at a time, questions, what comes of them. */
#include "beamhours/screen/worker.h"

#include <fcntl.h>
#include <signal.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <unistd.h>

#include "beamhours/screen/asking.h"

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
        bh_worker_evaluate(w, &job);
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

/* As many hands as there are processors, each with a workspace. */
static bool find_hands(bh_worker *w)
{
    w->crew = bh_crew_new(bh_crew_worthwhile());
    for (size_t i = 0; w->crew && i < bh_crew_hands(w->crew); i++) {
        w->workspaces[i] = bh_workspace_new();
        if (!w->workspaces[i])
            return false;
    }
    return w->crew != NULL;
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
    if (w->name && w->libraries[0] && w->libraries[1] && w->results && find_hands(w) &&
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
    bh_crew_free(w->crew);
    for (size_t i = 0; i < BH_MOST_HANDS; i++)
        bh_workspace_free(w->workspaces[i]);
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
                      .opened_count = job->opened_count,
                      .changes = job->changes};
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
