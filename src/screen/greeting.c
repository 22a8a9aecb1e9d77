/* greeting.c - before work begins: others who have the plan open, work of sessions that ended. */
#include <stdio.h>

#include "beamhours/screen/keeper.h"

/* Of a mark that nothing here can tell to be stale. */
static const char lost_there[] =
    "If it failed: remove the hidden file ending in .open beside the plan.";

/* --- others --- */

/* Its number says which recovery file is this session's own. */
static void own_rescue(bh_keeper *keeper, bh_model *model, const bh_error *err)
{
    const int number = keeper->mark ? bh_presence_number(keeper->mark) : 0;
    keeper->rescue = number ? bh_rescue_new(keeper->path, number) : NULL;
    if (!keeper->rescue)
        bh_model_note(model, true, "unsaved work cannot be kept: %.160s", err->text);
}

bool bh_keeper_others(bh_keeper *keeper, bh_model *model)
{
    bh_other other = {.process = 0};
    bh_error err = {.code = BH_OK, .text = "no memory is left"};
    bh_presence_close(keeper->mark);
    bh_rescue_free(keeper->rescue);
    keeper->mark = NULL;
    keeper->rescue = NULL;
    const bh_presence_state state =
        bh_presence_open(keeper->path, keeper->insists, &keeper->mark, &other, &err);
    if (state != BH_PRESENCE_OTHER) {
        own_rescue(keeper, model, &err);
        return false;
    }
    (void)snprintf(model->question_text[0], sizeof *model->question_text,
                   "Someone else has this plan open%s%.60s.", other.host[0] ? ": on " : "",
                   other.host);
    (void)snprintf(model->question_text[1], sizeof *model->question_text,
                   "Process %ld. Whoever saves last is asked about the other's changes.",
                   other.process);
    (void)snprintf(model->question_text[2], sizeof *model->question_text, "%s",
                   other.here || !other.host[0] ? "" : lost_there);
    bh_ask(model, BH_QUESTION_OTHER);
    return true;
}

/* --- unsaved work of sessions that ended --- */

void bh_keeper_leave_offer(bh_keeper *keeper)
{
    bh_rescue_free(keeper->offered);
    bh_presence_close(keeper->offered_mark);
    keeper->offered = NULL;
    keeper->offered_mark = NULL;
}

/* The newest that is there; NULL: none. */
static bh_rescue *newest(const bh_keeper *keeper, int *number)
{
    bh_rescue *best = NULL;
    int64_t at = 0, best_at = 0;
    for (int n = 1; n <= BH_MOST_SESSIONS; n++) {
        if (keeper->passed >> (n - 1) & 1U ||
            (keeper->mark && n == bh_presence_number(keeper->mark)))
            continue;
        bh_rescue *r = bh_rescue_new(keeper->path, n);
        if (r && bh_rescue_there(r, &at) && (!best || at >= best_at) &&
            !bh_presence_held(keeper->path, n)) {
            bh_rescue *worse = best;
            best = r;
            best_at = at;
            *number = n;
            r = worse;
        }
        bh_rescue_free(r);
    }
    return best;
}

static void since(double seconds, char out[64])
{
    if (seconds < 120)
        (void)snprintf(out, 64, "%.0f seconds", seconds);
    else if (seconds < 7200)
        (void)snprintf(out, 64, "%.0f minutes", seconds / 60);
    else if (seconds < 172800)
        (void)snprintf(out, 64, "%.0f hours", seconds / 3600);
    else
        (void)snprintf(out, 64, "%.0f days", seconds / 86400);
}

static void ask_rescue(const bh_keeper *keeper, bh_model *model, const bh_rescue_found *found)
{
    char age[64];
    since(found->age, age);
    (void)snprintf(model->question_text[0], sizeof *model->question_text,
                   "Unsaved work is there, %s old: %d %s not in the file.", age, found->lines,
                   found->lines == 1 ? "line of it is" : "lines of it are");
    (void)snprintf(model->question_text[1], sizeof *model->question_text, "%s",
                   !found->whole      ? "It is damaged: what can be read of it would be used."
                   : found->same_base ? "The file is as it was when that work began."
                                      : "The file was changed since that work began.");
    (void)snprintf(model->question_text[2], sizeof *model->question_text, "Kept in %.200s",
                   bh_rescue_path(keeper->offered));
    bh_ask(model, BH_QUESTION_RESCUE);
}

/* Asks about what is offered; false where it is of no use. */
static bool offer(bh_keeper *keeper, bh_model *model)
{
    bh_rescue_found found = {.there = false};
    bh_error err = {.code = BH_OK};
    size_t length = 0;
    const char *bytes = bh_model_bytes(model, &length);
    bh_text now = {0};
    bh_text_append_bytes(&now, bytes, length);
    const bh_code bad = bh_rescue_find(keeper->offered, &now, NULL, &found, &err);
    const bool fails = now.failed;
    bh_text_free(&now);
    if (bad || fails || !found.there)
        return false;
    if (found.differs)
        ask_rescue(keeper, model, &found);
    else if (found.whole) /* all of it is in the file */
        (void)!bh_rescue_discard(keeper->offered, NULL);
    return found.differs;
}

/* While it is asked about, its mark is ours: no other session is offered the same. */
static void offer_next(bh_keeper *keeper, bh_model *model)
{
    int number = 0;
    bh_keeper_leave_offer(keeper);
    while ((keeper->offered = newest(keeper, &number))) {
        keeper->passed |= 1U << (number - 1);
        if (bh_presence_take(keeper->path, number, &keeper->offered_mark, NULL) !=
                BH_PRESENCE_OTHER &&
            offer(keeper, model))
            return;
        bh_keeper_leave_offer(keeper);
    }
}

void bh_keeper_greet(bh_keeper *keeper, bh_model *model)
{
    if (!bh_keeper_others(keeper, model))
        offer_next(keeper, model);
}

void bh_keeper_take_over(bh_keeper *keeper, bh_model *model)
{
    keeper->insists = true;
    bh_keeper_greet(keeper, model);
}

bool bh_keeper_rescued(bh_keeper *keeper, bh_model *model, bh_text *into)
{
    bh_rescue_found found;
    bh_error err = {.code = BH_OK};
    if (keeper->offered && !bh_rescue_find(keeper->offered, &(bh_text){0}, into, &found, &err) &&
        !into->failed)
        return true;
    bh_model_note(model, true, "the unsaved work cannot be read: %.160s", err.text);
    return false;
}

/* This session goes on under the number of the one that ended. */
static void go_on_as_offered(bh_keeper *keeper)
{
    if (!keeper->offered || !keeper->offered_mark)
        return;
    bh_rescue_free(keeper->rescue);
    bh_presence_close(keeper->mark);
    keeper->rescue = keeper->offered;
    keeper->mark = keeper->offered_mark;
    keeper->offered = NULL;
    keeper->offered_mark = NULL;
}

bool bh_keeper_adopt(bh_keeper *keeper)
{
    int number = 0;
    go_on_as_offered(keeper);
    bh_rescue *more = newest(keeper, &number);
    bh_rescue_free(more);
    return more != NULL;
}

void bh_keeper_refuse(bh_keeper *keeper, bh_model *model)
{
    bh_error err = {.code = BH_OK};
    if (keeper->offered && bh_rescue_discard(keeper->offered, &err))
        bh_model_note(model, true, "the unsaved work %.160s", err.text);
    else
        go_on_as_offered(keeper);
    offer_next(keeper, model);
}
