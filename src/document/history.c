/* history.c - the steps of an edit, each a splice that can be undone. */
#include "beamhours/document/history.h"

#include <stdlib.h>
#include <string.h>

enum { FIRST_ROOM = 16 };

static void free_step(bh_step *step)
{
    bh_text_free(&step->was);
    bh_text_free(&step->is);
    bh_text_free(&step->note);
    bh_text_free(&step->path);
}

void bh_history_free(bh_history *history)
{
    for (size_t i = 0; i < history->count; i++)
        free_step(&history->steps[i]);
    free(history->steps);
    *history = (bh_history){0};
}

static size_t common_head(bh_bytes a, bh_bytes b, size_t most)
{
    size_t n = 0;
    while (n < most && a.bytes[n] == b.bytes[n])
        n++;
    return n;
}

static size_t common_tail(bh_bytes a, bh_bytes b, size_t most)
{
    size_t n = 0;
    while (n < most && a.bytes[a.length - 1 - n] == b.bytes[b.length - 1 - n])
        n++;
    return n;
}

bh_edit_range bh_bytes_differ(bh_bytes before, bh_bytes after)
{
    const size_t most = before.length < after.length ? before.length : after.length;
    const size_t head = common_head(before, after, most);
    return (bh_edit_range){head, after.length - common_tail(before, after, most - head)};
}

static int lines_in(bh_bytes text, size_t from, size_t to)
{
    int n = 0;
    for (size_t i = from; i < to; i++)
        n += text.bytes[i] == '\n';
    return n;
}

static void describe(bh_step *s, bh_bytes before, size_t from, size_t to)
{
    const bh_bytes is = {s->is.bytes, s->is.length};
    s->shown = (bh_edit_step){.text = s->note.bytes,
                              .path = s->path.bytes,
                              .line = 1 + lines_in(before, 0, from),
                              .lines_before = 1 + lines_in(before, from, to),
                              .lines_after = 1 + lines_in(is, 0, is.length)};
}

static bool grow(bh_history *h)
{
    if (h->done < h->room)
        return true;
    const size_t room = h->room ? 2 * h->room : FIRST_ROOM;
    bh_step *grown = realloc(h->steps, room * sizeof *grown);
    if (!grown)
        return false;
    h->steps = grown;
    h->room = room;
    return true;
}

bool bh_history_add(bh_history *history, bh_bytes before, bh_bytes after, bh_text *note,
                    bh_text *path)
{
    const bh_edit_range r = bh_bytes_differ(before, after);
    const size_t end = before.length - (after.length - r.to);
    bh_step s = {.at = r.from, .note = *note, .path = *path};
    *note = *path = (bh_text){0};
    bh_text_append_bytes(&s.was, before.bytes + r.from, end - r.from);
    bh_text_append_bytes(&s.is, after.bytes + r.from, r.to - r.from);
    if (s.was.failed || s.is.failed || s.note.failed || s.path.failed || !grow(history)) {
        free_step(&s);
        return false;
    }
    describe(&s, before, r.from, end);
    while (history->count > history->done)
        free_step(&history->steps[--history->count]);
    if (history->saved > history->done) {
        history->aside += history->saved - history->done;
        history->saved = history->done;
    }
    history->steps[history->count++] = s;
    history->done++;
    return true;
}

void bh_history_turn(const bh_step *step, bh_bytes text, bool again, bh_text *into)
{
    const bh_text *from = again ? &step->was : &step->is, *to = again ? &step->is : &step->was;
    const bh_cut cut = {step->at, step->at + from->length, to->bytes, to->length};
    bh_cuts_make(text, &cut, 1, into);
}

size_t bh_history_distance(const bh_history *h)
{
    return (h->done > h->saved ? h->done - h->saved : h->saved - h->done) + h->aside;
}

/* --- what changed since it was saved --- */

struct ranges {
    bh_edit_range *all;
    size_t count, room;
};

/* A place in the old text, in the new one. */
static size_t shifted(size_t at, bh_edit_range old, size_t length)
{
    if (at <= old.from)
        return at;
    return at >= old.to ? at - (old.to - old.from) + length : old.from;
}

/* Joins range i with the one behind it while they touch. */
static void join(struct ranges *r, size_t i)
{
    while (i + 1 < r->count && r->all[i + 1].from <= r->all[i].to) {
        if (r->all[i + 1].to > r->all[i].to)
            r->all[i].to = r->all[i + 1].to;
        memmove(&r->all[i + 1], &r->all[i + 2], (r->count - i - 2) * sizeof *r->all);
        r->count--;
    }
}

/* The bytes `old` of the text became `length` others. */
static void change(struct ranges *r, bh_edit_range old, size_t length)
{
    size_t place = 0;
    for (size_t i = 0; i < r->count; i++) {
        const bh_edit_range was = r->all[i];
        r->all[i].from = shifted(was.from, old, length);
        r->all[i].to =
            was.to > old.from && was.to < old.to ? old.from + length : shifted(was.to, old, length);
        place += was.from < old.from;
    }
    const bh_edit_range now = {old.from, old.from + length};
    if (r->count == r->room) { /* one less: the last two are joined */
        r->all[r->count - 2].to = r->all[r->count - 1].to;
        r->count--;
        place = place > r->count ? r->count : place;
    }
    memmove(&r->all[place + 1], &r->all[place], (r->count - place) * sizeof *r->all);
    r->all[place] = now;
    r->count++;
    for (size_t i = 0; i < r->count; i++)
        join(r, i);
}

bool bh_history_changed(const bh_history *history, bh_edit_range *ranges, size_t room,
                        size_t *count)
{
    struct ranges r = {ranges, 0, room};
    if (history->aside > 0 || room < 2)
        return false;
    for (size_t i = history->saved; i < history->done; i++) {
        const bh_step *s = &history->steps[i];
        change(&r, (bh_edit_range){s->at, s->at + s->was.length}, s->is.length);
    }
    for (size_t i = history->saved; i > history->done; i--) {
        const bh_step *s = &history->steps[i - 1];
        change(&r, (bh_edit_range){s->at, s->at + s->is.length}, s->was.length);
    }
    *count = r.count;
    return true;
}
