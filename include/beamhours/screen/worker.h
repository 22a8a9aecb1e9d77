/* worker.h - evaluates plans beside the screen, so that no key has to wait. */
#ifndef BH_SCREEN_WORKER_H
#define BH_SCREEN_WORKER_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/run/curve.h"
#include "beamhours/run/explain.h"
#include "beamhours/run/solve.h"
#include "beamhours/screen/outcome.h"

/* Two threads: one for the table, abandoned as soon as a newer text is there; one for questions
 * that may take longer. */
typedef struct bh_worker bh_worker;

/* Materials are looked up in `folders` (NULL-terminated), plans are called `name` in messages.
 * NULL when there is no memory or no thread. */
bh_worker *bh_worker_new(const char *const *folders, const char *name);
void bh_worker_free(bh_worker *worker);

/* What is to be evaluated.  `first`: settings that are in view, which come before the others;
 * `opened`: settings whose bins are wanted.  All is copied. */
typedef struct {
    const char *bytes;
    size_t length; /* [bytes] */
    const size_t *first, *opened;
    size_t first_count, opened_count;
    bool changes; /* of rates with angle and momentum are wanted too */
} bh_job;

/* Begins it, abandoning the one before.  Returns its number, 0 when there is no memory. */
size_t bh_worker_begin(bh_worker *worker, const bh_job *job);

/* Gives up the job it works on; none follows. */
void bh_worker_abandon(bh_worker *worker);

/* A file descriptor that can be read when something has been handed back. */
int bh_worker_wake(const bh_worker *worker);

/* The newest outcome that was not taken yet, or NULL; the caller leaves it.  Of one job there may
 * come several, the last one complete, or with errors, or failed. */
bh_outcome *bh_worker_take(bh_worker *worker);

/* Whether it still works on a job, or on a question. */
bool bh_worker_busy(bh_worker *worker);

/* Settings evaluated so far, not taken from before. */
size_t bh_worker_evaluated(bh_worker *worker);

typedef enum { BH_ASK_EXPLAIN, BH_ASK_SOLVE, BH_ASK_CURVE, BH_ASK_KINDS } bh_ask_kind;

/* A question on the text `bytes`.  Texts are copied. */
typedef struct {
    bh_ask_kind kind;
    const char *bytes;
    size_t length; /* [bytes] */
    const char *setting, *arm;
    int bin;             /* explain */
    bh_column_id column; /* solve: which output */
    double wanted;       /* [1] in the unit of the column's key */
    const char *by;      /* the name of an input */
} bh_query;

/* What came of it.  Belongs to who took it. */
typedef struct {
    bh_ask_kind kind;
    size_t number;
    bh_reading_of *of;
    bh_explanation *explanation;
    bh_curve *curve;
    bh_answer *solved;
    bh_text sentence; /* what came of it */
    bh_error why;     /* where there is none */
} bh_reply;

/* Asks; a question of the same kind that waits is replaced.  Returns its number, or 0. */
size_t bh_worker_ask(bh_worker *worker, const bh_query *question);

/* Drops the question of this kind that waits, gives up the one that is being answered. */
void bh_worker_withdraw(bh_worker *worker, bh_ask_kind kind);

/* An answer that was not taken yet, or NULL. */
bh_reply *bh_worker_answer(bh_worker *worker);
void bh_reply_free(bh_reply *answer);

#endif
