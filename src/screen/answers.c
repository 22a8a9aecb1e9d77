/* answers.c - the second thread of a worker: explanations and curves. */
#include <stdlib.h>
#include <string.h>

#include "beamhours/screen/asking.h"

bh_reading_of *bh_worker_read(bh_worker *worker, int which, const char *bytes, size_t length)
{
    bh_reading_of *last = worker->last[which];
    if (last && last->length == length && memcmp(last->bytes, bytes, length) == 0)
        return bh_reading_of_share(last);
    bh_reading_of *made = bh_reading_of_new(bytes, length);
    if (!made)
        return NULL;
    made->plan = bh_plan_read(made->bytes, length, worker->name, NULL, 0, worker->libraries[which],
                              made->said);
    bh_reading_of_leave(last);
    worker->last[which] = bh_reading_of_share(made);
    return made;
}

void bh_reply_free(bh_reply *answer)
{
    if (!answer)
        return;
    bh_explanation_free(answer->explanation);
    bh_curve_free(answer->curve);
    free(answer->solved);
    bh_text_free(&answer->sentence);
    bh_table_free(answer->table);
    bh_reading_of_leave(answer->of);
    free(answer);
}

void bh_worker_drop_question(bh_own_query *question)
{
    free(question->bytes);
    free(question->setting);
    free(question->arm);
    free(question->by);
    *question = (bh_own_query){0};
}

static bool stopped(void *asker)
{
    return atomic_load(&((bh_worker *)asker)->stop);
}

static void explain(bh_worker *w, const bh_own_query *q, bh_reply *a)
{
    const bh_evaluation how = {.bins = q->question.bin > 0, .cancelled = stopped, .asker = w};
    a->table = bh_table_new(a->of->plan, &how, NULL, &a->why);
    if (a->table)
        a->explanation = bh_explain(a->table, q->setting, q->arm, q->question.bin, &a->why);
}

/* Given up when the program ends, or when another value is wanted. */
static bool overtaken(void *asker)
{
    bh_worker *w = asker;
    if (atomic_load(&w->stop))
        return true;
    (void)pthread_mutex_lock(&w->lock);
    const bool newer = w->questions[BH_ASK_SOLVE].number != 0;
    (void)pthread_mutex_unlock(&w->lock);
    return newer;
}

static void solve(bh_worker *w, const bh_own_query *q, bh_reply *a)
{
    const bh_question question = {.bytes = q->bytes,
                                  .length = q->question.length,
                                  .name = w->name,
                                  .library = w->libraries[1],
                                  .setting = q->setting,
                                  .arm = q->arm,
                                  .column = q->question.column,
                                  .wanted = q->question.wanted,
                                  .by = q->by,
                                  .cancelled = overtaken,
                                  .asker = w};
    a->solved = calloc(1, sizeof *a->solved);
    if (!a->solved) {
        bh_fail(&a->why, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
        return;
    }
    if (!bh_solve(&question, a->solved, &a->why)) {
        bh_answer_say(&question, a->solved, &a->sentence);
        return;
    }
    free(a->solved);
    a->solved = NULL;
}

static void answer(bh_worker *w, const bh_own_query *q)
{
    bh_reply *a = calloc(1, sizeof *a);
    if (!a)
        return;
    a->kind = q->question.kind;
    a->number = q->number;
    a->of = bh_worker_read(w, 1, q->bytes, q->question.length);
    if (!a->of || !a->of->plan)
        bh_fail(&a->why, BH_EPLAN, "the plan has errors: they come first");
    else if (a->kind == BH_ASK_EXPLAIN)
        explain(w, q, a);
    else if (a->kind == BH_ASK_SOLVE)
        solve(w, q, a);
    else
        a->curve = bh_curve_new(a->of->plan,
                                &(bh_curve_request){.setting = q->setting, .arm = q->arm}, &a->why);
    (void)pthread_mutex_lock(&w->lock);
    if (w->answer_count < BH_MOST_ANSWERS) {
        w->answers[w->answer_count++] = a;
        a = NULL;
    }
    (void)pthread_mutex_unlock(&w->lock);
    bh_reply_free(a);
    bh_worker_ring(w);
}

static bool take(bh_worker *w, bh_own_query *out)
{
    for (int i = 0; i < BH_ASK_KINDS; i++)
        if (w->questions[i].number) {
            *out = w->questions[i];
            w->questions[i] = (bh_own_query){0};
            return true;
        }
    return false;
}

void *bh_worker_answers(void *of)
{
    bh_worker *w = of;
    bh_own_query question;
    (void)pthread_mutex_lock(&w->lock);
    while (!atomic_load(&w->stop)) {
        if (!take(w, &question)) {
            w->working[1] = false;
            (void)pthread_cond_wait(&w->more, &w->lock);
            continue;
        }
        w->working[1] = true;
        (void)pthread_mutex_unlock(&w->lock);
        answer(w, &question);
        bh_worker_drop_question(&question);
        (void)pthread_mutex_lock(&w->lock);
    }
    (void)pthread_mutex_unlock(&w->lock);
    return NULL;
}

size_t bh_worker_ask(bh_worker *worker, const bh_query *question)
{
    bh_own_query own = {.question = *question,
                        .bytes = malloc(question->length + 1),
                        .setting = question->setting ? strdup(question->setting) : NULL,
                        .arm = question->arm ? strdup(question->arm) : NULL,
                        .by = question->by ? strdup(question->by) : NULL};
    if (!own.bytes) {
        bh_worker_drop_question(&own);
        return 0;
    }
    memcpy(own.bytes, question->bytes, question->length);
    (void)pthread_mutex_lock(&worker->lock);
    bh_own_query *place = &worker->questions[question->kind];
    bh_worker_drop_question(place);
    const size_t number = own.number = ++worker->numbers;
    *place = own;
    worker->working[1] = true;
    (void)pthread_cond_broadcast(&worker->more);
    (void)pthread_mutex_unlock(&worker->lock);
    return number;
}

bh_reply *bh_worker_answer(bh_worker *worker)
{
    (void)pthread_mutex_lock(&worker->lock);
    bh_reply *a = worker->answer_count ? worker->answers[0] : NULL;
    if (a) {
        worker->answer_count--;
        for (size_t i = 0; i < worker->answer_count; i++)
            worker->answers[i] = worker->answers[i + 1];
    }
    (void)pthread_mutex_unlock(&worker->lock);
    return a;
}
