/* answers.c - the second thread of a worker: explanations, curves, what it would take. */
#include <stdlib.h>
#include <string.h>

#include "beamhours/screen/asking.h"

/* Puts number `i` of the last readings, or another in its place, before the others. */
static void put_first(bh_reading_of **last, size_t i, bh_reading_of *reading)
{
    memmove(last + 1, last, i * sizeof(bh_reading_of *));
    last[0] = reading;
}

bh_reading_of *bh_worker_read(bh_worker *worker, int which, const char *bytes, size_t length)
{
    bh_reading_of **last = worker->last[which];
    for (size_t i = 0; i < BH_READINGS_KEPT && last[i]; i++)
        if (last[i]->length == length && memcmp(last[i]->bytes, bytes, length) == 0) {
            put_first(last, i, last[i]);
            return bh_reading_of_share(last[0]);
        }
    bh_reading_of *made = bh_reading_of_new(bytes, length);
    if (!made)
        return NULL;
    made->plan = bh_plan_read(made->bytes, length, worker->name, NULL, 0, worker->libraries[which],
                              made->said);
    bh_reading_of_leave(last[BH_READINGS_KEPT - 1]);
    put_first(last, BH_READINGS_KEPT - 1, bh_reading_of_share(made));
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

/* A question while it is answered. */
struct asking {
    bh_worker *worker;
    bh_ask_kind kind;
    size_t number;
};

/* Given up when the program ends, and when it is withdrawn or asked anew; a curve, which is below
 * the table all the time, gives way to what the user is waiting for. */
static bool overtaken(void *asker)
{
    const struct asking *a = asker;
    bh_worker *w = a->worker;
    if (atomic_load(&w->stop))
        return true;
    (void)pthread_mutex_lock(&w->lock);
    bool newer = w->wanted[a->kind] != a->number;
    for (int i = 0; a->kind == BH_ASK_CURVE && i < BH_ASK_KINDS; i++)
        newer = newer || w->questions[i].number != 0;
    (void)pthread_mutex_unlock(&w->lock);
    return newer;
}

static void explain(struct asking *by, const bh_own_query *q, bh_reply *a)
{
    const bh_explained_row row = {q->setting, q->arm, q->question.bin};
    const bh_evaluation how = {.cancelled = overtaken, .asker = by};
    a->explanation = bh_explain_alone(a->of->plan, &row, &how, &a->why);
}

static void draw_curve(struct asking *by, const bh_own_query *q, bh_reply *a)
{
    const bh_curve_request request = {
        .setting = q->setting, .arm = q->arm, .cancelled = overtaken, .asker = by};
    a->curve = bh_curve_new(a->of->plan, &request, &a->why);
}

static void solve(struct asking *by, const bh_own_query *q, bh_reply *a)
{
    bh_worker *w = by->worker;
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
                                  .asker = by};
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

/* What came of it; NULL without memory. */
static bh_reply *reply_to(struct asking *by, const bh_own_query *q)
{
    bh_reply *a = calloc(1, sizeof *a);
    if (!a)
        return NULL;
    a->kind = by->kind;
    a->number = q->number;
    a->of = bh_worker_read(by->worker, 1, q->bytes, q->question.length);
    if (!a->of || !a->of->plan)
        bh_fail(&a->why, BH_EPLAN, "the plan has errors: they come first");
    else if (a->kind == BH_ASK_EXPLAIN)
        explain(by, q, a);
    else if (a->kind == BH_ASK_SOLVE)
        solve(by, q, a);
    else
        draw_curve(by, q, a);
    return a;
}

/* A curve that gave way is asked for again, unless it is of no use by now. */
static void ask_again(bh_worker *w, bh_own_query *q)
{
    if (q->question.kind != BH_ASK_CURVE || w->wanted[BH_ASK_CURVE] != q->number)
        return;
    w->questions[BH_ASK_CURVE] = *q;
    *q = (bh_own_query){0};
}

static void answer(bh_worker *w, bh_own_query *q)
{
    struct asking by = {w, q->question.kind, q->number};
    bh_reply *a = reply_to(&by, q);
    const bool done = a && (a->explanation || a->curve || a->solved || !overtaken(&by));
    (void)pthread_mutex_lock(&w->lock);
    if (done && w->answer_count < BH_MOST_ANSWERS) {
        w->answers[w->answer_count++] = a;
        a = NULL;
    } else if (!done) {
        ask_again(w, q);
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
    worker->wanted[question->kind] = number;
    *place = own;
    worker->working[1] = true;
    (void)pthread_cond_broadcast(&worker->more);
    (void)pthread_mutex_unlock(&worker->lock);
    return number;
}

void bh_worker_withdraw(bh_worker *worker, bh_ask_kind kind)
{
    (void)pthread_mutex_lock(&worker->lock);
    bh_worker_drop_question(&worker->questions[kind]);
    worker->wanted[kind] = 0;
    (void)pthread_mutex_unlock(&worker->lock);
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
