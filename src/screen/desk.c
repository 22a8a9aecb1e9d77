/* desk.c - what is due is begun, what came back is taken up. */
#include "beamhours/screen/desk.h"

#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/screen/drawing_parts.h"
#include "beamhours/screen/inquiry.h"
#include "beamhours/screen/keeper.h"

enum { MOST_VIEW = 256, MOST_OPEN = 256 };

struct bh_desk {
    bh_model model;
    bh_worker *worker;
    bh_keeper keeper;
    bh_desk_start start;
    bool over, suspends;
    bool drop;      /* unsaved work, when it is over */
    double pressed; /* [s] when a key was last pressed */
};

static bool open_text(bh_desk *d, const char *path, bh_text *bytes)
{
    d->worker = bh_worker_new(d->start.folders, path);
    return d->worker &&
           bh_model_open(&d->model, bytes->bytes ? bytes->bytes : "", bytes->length, path);
}

static void choose_beginning(bh_desk *d)
{
    d->model.beginnings = d->start.beginnings;
    d->model.beginning_count = d->start.beginning_count;
    bh_choose_plan(&d->model);
}

static bh_code open_any(bh_desk *d, bh_error *err)
{
    bh_text bytes = {0};
    if (!d->model.library)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    if (!d->start.path) {
        choose_beginning(d);
        return BH_OK;
    }
    bh_code code = bh_keeper_open(&d->keeper, d->start.path, &bytes, err);
    if (!code && !open_text(d, d->start.path, &bytes))
        code = bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    bh_text_free(&bytes);
    if (!code)
        bh_keeper_greet(&d->keeper, &d->model);
    return code;
}

bh_desk *bh_desk_open(const bh_desk_start *start, bh_error *err)
{
    bh_desk *d = calloc(1, sizeof *d);
    if (!d) {
        bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
        return NULL;
    }
    d->start = *start;
    d->drop = true;
    d->model.rows = 24;
    d->model.columns = 80;
    d->model.ascii = start->ascii;
    d->model.library = bh_material_library_new(start->folders);
    if (!open_any(d, err))
        return d;
    bh_desk_close(d);
    return NULL;
}

void bh_desk_close(bh_desk *desk)
{
    if (!desk)
        return;
    const bool drop = desk->over && desk->drop;
    if (!drop)
        bh_keeper_tell(&desk->keeper, &desk->model, 0);
    bh_keeper_close(&desk->keeper, drop);
    bh_model_close(&desk->model); /* outcomes speak of materials of the worker */
    bh_worker_free(desk->worker);
    bh_material_library_free(desk->model.library);
    free(desk);
}

/* --- what the user wished --- */

/* The file's text in the place of the one that is open, as one change that can be taken back. */
static void reload(bh_desk *d)
{
    bh_text bytes = {0};
    if (bh_keeper_read(&d->keeper, &d->model, &bytes) &&
        !bh_model_reload(&d->model, bytes.bytes ? bytes.bytes : "", bytes.length))
        bh_model_note(&d->model, true, "no memory is left to open this");
    d->keeper.version = SIZE_MAX; /* whatever is there next is another one */
    bh_text_free(&bytes);
}

/* The unsaved work becomes the text; the file's own counts as what was saved. */
static void rescue(bh_desk *d)
{
    bh_text bytes = {0};
    if (bh_keeper_rescued(&d->keeper, &d->model, &bytes)) {
        if (!bh_model_replace(&d->model, bytes.bytes ? bytes.bytes : "", bytes.length))
            bh_model_note(&d->model, true, "the unsaved work cannot be used: it stays in its file");
        else
            bh_model_note(&d->model, false, "the unsaved work is back; s saves it%s",
                          bh_keeper_adopt(&d->keeper) ? "; more is offered at the next start" : "");
    }
    bh_text_free(&bytes);
}

static void begin_plan(bh_desk *d)
{
    const bh_beginning *b = &d->start.beginnings[d->model.chosen];
    bh_text bytes = {0};
    bh_text_append(&bytes, b->bytes);
    bh_keeper_begin(&d->keeper, b->name);
    if (!open_text(d, d->keeper.path, &bytes))
        d->over = true;
    bh_text_free(&bytes);
    d->model.fresh = true;
    bh_keeper_greet(&d->keeper, &d->model);
    bh_model_note(&d->model, false, "a plan of your own: s saves it in %.150s", d->keeper.path);
}

static void grant(bh_desk *d, bh_wish wish)
{
    bh_keeper *k = &d->keeper;
    bh_model *m = &d->model;
    switch (wish) {
    case BH_WISH_NOTHING:
        break;
    case BH_WISH_SAVE:
        (void)bh_keeper_save(k, m, false);
        break;
    case BH_WISH_SAVE_OVER:
        (void)bh_keeper_save(k, m, true);
        break;
    case BH_WISH_SAVE_LEAVE:
        d->over = bh_keeper_save(k, m, false);
        break;
    case BH_WISH_SAVE_AS:
        (void)bh_keeper_save_as(k, m);
        break;
    case BH_WISH_RELOAD:
        reload(d);
        break;
    case BH_WISH_LEAVE:
        d->drop = m->question != BH_QUESTION_RESCUE && m->question != BH_QUESTION_OTHER;
        d->over = true;
        break;
    case BH_WISH_SUSPEND:
        d->suspends = true;
        break;
    case BH_WISH_RESCUE:
        rescue(d);
        break;
    case BH_WISH_RESCUE_DROP:
        bh_keeper_refuse(k, m);
        break;
    case BH_WISH_TAKE_OVER:
        bh_keeper_take_over(k, m);
        break;
    case BH_WISH_OPEN:
        begin_plan(d);
        break;
    }
}

void bh_desk_press(bh_desk *desk, const bh_press *press, double now)
{
    if (!desk->model.edit || !bh_keeper_look(&desk->keeper, &desk->model, now))
        bh_model_press(&desk->model, press);
    desk->pressed = now;
    const bh_wish wish = desk->model.wish;
    desk->model.wish = BH_WISH_NOTHING;
    grant(desk, wish);
}

void bh_desk_resize(bh_desk *desk, int rows, int columns)
{
    bh_model_resize(&desk->model, rows, columns);
}

static void begin_job(bh_desk *d)
{
    size_t first[MOST_VIEW], opened[MOST_OPEN];
    bh_job job = {.first = first, .opened = opened, .changes = d->model.changes};
    bh_inquire_put_off(&d->model, d->worker);
    job.bytes = bh_model_text(&d->model, &job.length);
    job.first_count = bh_model_in_view(&d->model, first, MOST_VIEW);
    job.opened_count = bh_model_opened(&d->model, opened, MOST_OPEN);
    const size_t number = bh_worker_begin(d->worker, &job);
    if (number) {
        d->model.job = number;
        d->model.job_due = false;
    }
}

static void mind_job(bh_desk *d)
{
    bh_model *m = &d->model;
    if (m->abandon && d->worker)
        bh_worker_abandon(d->worker);
    m->abandon = false;
    if (m->job_due && m->edit && d->worker)
        begin_job(d);
}

double bh_desk_tend(bh_desk *desk, double now)
{
    bh_model *m = &desk->model;
    const double wait = bh_keeper_tend(&desk->keeper, m, now);
    mind_job(desk);
    const double curve = bh_inquire(m, desk->worker, now - desk->pressed);
    return wait < 0 || (curve >= 0 && curve < wait) ? curve : wait;
}

int bh_desk_wake(const bh_desk *desk)
{
    return desk->worker ? bh_worker_wake(desk->worker) : -1;
}

bool bh_desk_news(bh_desk *desk)
{
    bh_outcome *outcome = desk->worker ? bh_worker_take(desk->worker) : NULL;
    bh_reply *answer = NULL;
    bool some = outcome != NULL;
    bh_model_adopt(&desk->model, outcome);
    while (desk->worker && (answer = bh_worker_answer(desk->worker))) {
        bh_model_answer(&desk->model, answer);
        some = true;
    }
    return some;
}

bool bh_desk_settled(bh_desk *desk)
{
    const bh_model *m = &desk->model;
    const size_t rows = (size_t)bh_arrange(m).table_rows;
    if (!m->edit || bh_model_current(m))
        return true;
    if (m->job_due || !m->now || m->now->job != m->job)
        return false;
    for (size_t i = m->table.top; i < m->table.count && i < m->table.top + rows; i++)
        if (m->table.rows[i].stale)
            return false;
    return m->table.count > 0;
}

bool bh_desk_quiet(bh_desk *desk)
{
    const bh_model *m = &desk->model;
    const bool curve = m->curve_due && bh_arrange(m).curve >= 0 && bh_table_here(m);
    return (!m->edit || bh_model_current(m)) && !m->explain_due && !curve && !m->solving.due &&
           !(desk->worker && bh_worker_busy(desk->worker));
}

void bh_desk_draw(const bh_desk *desk, bh_canvas *canvas)
{
    bh_draw(&desk->model, canvas);
}

bool bh_desk_over(const bh_desk *desk)
{
    return desk->over;
}

bool bh_desk_suspends(bh_desk *desk)
{
    const bool yes = desk->suspends;
    desk->suspends = false;
    return yes;
}

bh_kept bh_desk_secure(bh_desk *desk, double now)
{
    bh_keeper *k = &desk->keeper;
    bh_keeper_tell(k, &desk->model, now);
    if (!k->rescue || bh_model_unsaved(&desk->model) == 0)
        return BH_KEPT_NOTHING;
    return bh_keeper_write(k, &desk->model) ? BH_KEPT : BH_KEPT_NOT;
}

void bh_desk_awake(bh_desk *desk, double now)
{
    desk->keeper.looked = -1e9;
    if (desk->model.edit)
        (void)bh_keeper_look(&desk->keeper, &desk->model, now);
}

bool bh_desk_spoke(bh_desk *desk)
{
    const bool yes = desk->model.spoke;
    desk->model.spoke = false;
    return yes;
}

void bh_desk_say(bh_desk *desk, const char *text)
{
    bh_model_note(&desk->model, false, "%s", text);
}

size_t bh_desk_evaluated(bh_desk *desk)
{
    return desk->worker ? bh_worker_evaluated(desk->worker) : 0;
}

bh_rescue *bh_desk_rescue(bh_desk *desk)
{
    return desk->keeper.rescue;
}

const char *bh_desk_mark(const bh_desk *desk)
{
    const bh_presence *mark = desk->keeper.mark;
    return mark && bh_presence_ours(mark) ? bh_presence_path(mark) : NULL;
}
