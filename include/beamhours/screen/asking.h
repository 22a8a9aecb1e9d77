/* asking.h - the threads of a worker and what they share; for worker.c, evaluating.c and answers.c
 * only. */
#ifndef BH_SCREEN_ASKING_H
#define BH_SCREEN_ASKING_H

#include <pthread.h>
#include <stdatomic.h>

#include "beamhours/base/crew.h"
#include "beamhours/run/stepwise.h"
#include "beamhours/screen/worker.h"

/* A job with copies of its own. */
typedef struct {
    size_t number;
    char *bytes;
    size_t length; /* [bytes] */
    size_t *first, *opened;
    size_t first_count, opened_count;
    bool changes;
} bh_own_job;

typedef struct {
    size_t number; /* 0: none waits */
    bh_query question;
    char *bytes, *setting, *arm, *by;
} bh_own_query;

enum { BH_MOST_ANSWERS = 16, BH_READINGS_KEPT = 4 };

struct bh_worker {
    pthread_mutex_t lock;
    pthread_cond_t more;
    pthread_t threads[2];
    int started;
    int wake[2]; /* a pipe */
    char *name;
    bh_material_library *libraries[2];
    atomic_bool stop;
    atomic_size_t newest; /* number of the newest job */
    atomic_size_t evaluated;
    size_t numbers;
    bool working[2];
    bh_own_job waiting; /* number 0: none */
    bh_outcome *out;
    bh_own_query questions[BH_ASK_KINDS];
    size_t wanted[BH_ASK_KINDS]; /* number of the last question of each kind; 0: withdrawn */
    bh_reply *answers[BH_MOST_ANSWERS];
    size_t answer_count;
    bh_results *results;                      /* of the first thread */
    bh_crew *crew;                            /* it evaluates for the first thread */
    bh_workspace *workspaces[BH_MOST_HANDS];  /* of each of its hands */
    bh_reading_of *last[2][BH_READINGS_KEPT]; /* of each thread, the newest first */
};

/* The text read by thread `which`, again only where it is none of the last ones: with one more
 * user.  NULL without memory. */
bh_reading_of *bh_worker_read(bh_worker *worker, int which, const char *bytes, size_t length);

/* Makes whoever waits for the worker look. */
void bh_worker_ring(bh_worker *worker);

/* What the first thread does with a job: outcomes are handed over until it is done or overtaken. */
void bh_worker_evaluate(bh_worker *worker, const bh_own_job *job);

/* The second thread. */
void *bh_worker_answers(void *of);
void bh_worker_drop_question(bh_own_query *question);

#endif
