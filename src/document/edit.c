/* edit.c - a document being changed, byte for byte the user's wherever nothing was changed. */
#include "beamhours/document/edit.h"

#include <stdlib.h>
#include <string.h>

#include "beamhours/base/sentences.h"
#include "beamhours/document/history.h"
#include "beamhours/document/note.h"
#include "beamhours/document/splice.h"
#include "beamhours/document/trail.h"

/* A text that was read. */
struct reading {
    bh_document *document;
    bh_diags *said;
};

struct bh_edit {
    struct reading now;
    bh_history history;
    bh_text saved;
    size_t version;
};

static void free_reading(struct reading *r)
{
    bh_document_free(r->document);
    bh_diags_free(r->said);
    *r = (struct reading){0};
}

static bh_bytes bytes_of(const bh_document *document)
{
    bh_bytes text = {0};
    text.bytes = bh_document_bytes(document, &text.length);
    return text;
}

static bool same_bytes(bh_bytes a, bh_bytes b)
{
    return a.length == b.length && (a.length == 0 || memcmp(a.bytes, b.bytes, a.length) == 0);
}

/* --- open and look --- */

bh_edit *bh_edit_open(const char *bytes, size_t length, const char *name, bh_diags *diags)
{
    bh_edit *edit = calloc(1, sizeof *edit);
    bh_diags *said = bh_diags_new();
    bool lost = !edit || !said;
    bh_document *document = lost ? NULL : bh_document_parse(bytes, length, name, said);
    for (size_t i = 0; said && i < bh_diags_count(said); i++) {
        const bh_diag *d = bh_diags_at(said, i);
        bh_diags_add(diags, d->severity, d->at, d->key, "%s", d->text);
    }
    if (document) {
        *edit = (bh_edit){.now = {document, said}};
        bh_text_append_bytes(&edit->saved, bytes, length);
        lost = edit->saved.failed;
        said = NULL;
    }
    bh_diags_free(said);
    if (lost)
        bh_diags_lose(diags);
    if (document && !lost)
        return edit;
    bh_edit_free(edit);
    return NULL;
}

void bh_edit_free(bh_edit *edit)
{
    if (!edit)
        return;
    free_reading(&edit->now);
    bh_history_free(&edit->history);
    bh_text_free(&edit->saved);
    free(edit);
}

const char *bh_edit_bytes(const bh_edit *edit, size_t *length)
{
    return bh_document_bytes(edit->now.document, length);
}

const bh_document *bh_edit_document(const bh_edit *edit)
{
    return edit->now.document;
}

const bh_diags *bh_edit_said(const bh_edit *edit)
{
    return edit->now.said;
}

size_t bh_edit_version(const bh_edit *edit)
{
    return edit->version;
}

/* --- changes --- */

/* Several changes, one after the other. */
struct run {
    const bh_edit *edit;
    struct reading now; /* document NULL: still the edit's own */
    bh_text note, path;
    size_t made;
    bh_diags *diags;
};

static const bh_document *current(const struct run *r)
{
    return r->now.document ? r->now.document : r->edit->now.document;
}

static void note_made(struct run *r, const bh_splice *made)
{
    bh_text further = {0};
    bh_note_change(made, r->made ? &further : &r->note, r->made ? &further : &r->path);
    bh_text_free(&further);
    r->made++;
}

/* Makes one change; returns the list item or key that it was about as it is now, NULL where it was
 * not made. */
static const bh_node *run_plain(struct run *r, const bh_edit_change *change)
{
    bh_splice made;
    if (!bh_splice_make(&made, current(r), change, r->diags))
        return NULL;
    note_made(r, &made);
    const bh_node *node = bh_note_node(&made);
    free_reading(&r->now);
    r->now = (struct reading){made.after, made.said};
    return node;
}

/* Gives the copy of a list's item its name. */
static bool name_copy(struct run *r, const bh_node *copy, const char *name)
{
    const bh_node *old = copy->kind == BH_NODE_MAPPING ? bh_node_get(copy, "name") : copy;
    bh_edit_change change = {.kind = BH_EDIT_SET, .text = name, .node = old};
    bh_text pair = {0};
    if (!old) {
        bh_text_appendf(&pair, "name: %s", name);
        change = (bh_edit_change){BH_EDIT_INSERT, NULL, pair.bytes, 1, copy};
    }
    const bh_node *named = pair.failed ? NULL : run_plain(r, &change);
    if (pair.failed)
        bh_diags_lose(r->diags);
    if (named && !r->path.failed && old != copy) {
        r->path.length = 0;
        bh_trail_of(named->parent, &r->path);
    }
    bh_text_free(&pair);
    return named != NULL;
}

static bool run_change(struct run *r, const bh_edit_change *change)
{
    const bool first = r->made == 0;
    const bh_node *node = run_plain(r, change);
    const bool item = node && node->parent && node->parent->kind == BH_NODE_LIST;
    if (!item || change->kind != BH_EDIT_DUPLICATE || !change->text)
        return node != NULL;
    if (first)
        bh_text_appendf(&r->note, " as %s", change->text);
    return name_copy(r, node, change->text);
}

static void end_run(struct run *r)
{
    free_reading(&r->now);
    bh_text_free(&r->note);
    bh_text_free(&r->path);
}

/* Makes them all; false, and ended, where one cannot be made. */
static bool run_all(struct run *r, const bh_edit_change *changes, size_t count)
{
    for (size_t i = 0; i < count; i++)
        if (!run_change(r, &changes[i])) {
            end_run(r);
            return false;
        }
    if (count > 1)
        bh_text_appendf(&r->note, ", and %zu more", count - 1);
    return true;
}

/* What was read becomes the text, as one step unless it is the same. */
static bool add_step(bh_edit *edit, struct reading *next, bh_text *note, bh_text *path)
{
    const bh_bytes before = bytes_of(edit->now.document), after = bytes_of(next->document);
    if (same_bytes(before, after))
        return true;
    if (!bh_history_add(&edit->history, before, after, note, path))
        return false;
    free_reading(&edit->now);
    edit->now = *next;
    *next = (struct reading){0};
    edit->version++;
    return true;
}

bool bh_edit_apply(bh_edit *edit, const bh_edit_change *changes, size_t count, bh_diags *diags)
{
    struct run r = {.edit = edit, .diags = diags};
    if (!run_all(&r, changes, count))
        return false;
    const bool good = !r.now.document || add_step(edit, &r.now, &r.note, &r.path);
    if (!good)
        bh_diags_lose(diags);
    end_run(&r);
    return good;
}

bool bh_edit_replace(bh_edit *edit, const char *bytes, size_t length, const char *note)
{
    struct reading next = {NULL, bh_diags_new()};
    bh_text said = {0}, path = {0};
    bh_text_append(&said, note);
    bh_text_append(&path, "");
    if (next.said)
        next.document =
            bh_document_parse(bytes, length, bh_document_name(edit->now.document), next.said);
    const bool good = next.document && add_step(edit, &next, &said, &path) && bh_edit_saved(edit);
    free_reading(&next);
    bh_text_free(&said);
    bh_text_free(&path);
    return good;
}

bool bh_edit_try(const bh_edit *edit, const bh_edit_change *changes, size_t count, bh_text *into,
                 bh_diags *diags)
{
    struct run r = {.edit = edit, .diags = diags};
    if (!run_all(&r, changes, count))
        return false;
    const bh_bytes after = bytes_of(current(&r));
    bh_text_append_bytes(into, after.bytes, after.length);
    end_run(&r);
    if (into->failed)
        bh_diags_lose(diags);
    return !into->failed;
}

bool bh_edit_set(bh_edit *edit, const char *path, const char *text, bh_diags *diags)
{
    const bh_edit_change change = {.kind = BH_EDIT_SET, .path = path, .text = text};
    return bh_edit_apply(edit, &change, 1, diags);
}

bool bh_edit_field(const bh_edit *edit, const bh_node *node, bh_text *into)
{
    const bh_bytes text = bytes_of(edit->now.document);
    if (node->kind == BH_NODE_SCALAR)
        bh_text_append_bytes(into, node->text, node->length);
    else if (node->style == BH_STYLE_FLOW)
        bh_text_append_bytes(into, text.bytes + node->from, node->to - node->from);
    else
        return false;
    return true;
}

/* A change like the one that might be made. */
static bool trial(bh_edit_kind kind, const bh_node *node, bh_text *text, bh_edit_change *change)
{
    const bool list = node->kind == BH_NODE_LIST;
    const bool keyed = node->parent && node->parent->kind == BH_NODE_MAPPING;
    *change = (bh_edit_change){.kind = kind, .node = node};
    if (kind == BH_EDIT_MOVE)
        change->place = node->parent && bh_node_place(node) == 0 ? 2 : 1;
    else if (kind == BH_EDIT_INSERT)
        bh_text_append(text, list ? "x" : "x-x-x: x");
    else if (kind == BH_EDIT_RENAME || (kind == BH_EDIT_DUPLICATE && keyed))
        bh_text_append(text, "x-x-x");
    change->text = text->bytes;
    return !text->failed;
}

bool bh_edit_allows(const bh_edit *edit, bh_edit_kind kind, const bh_node *node, bh_diags *diags)
{
    bh_text text = {0}, into = {0};
    bh_edit_change change;
    bool good = true;
    if (kind == BH_EDIT_SET && !bh_edit_field(edit, node, &text)) {
        BH_TARGET_REFUSE(diags, node, BH_REFUSE_PARTS);
        return false;
    }
    if (kind == BH_EDIT_SET && !text.bytes)
        bh_text_append(&text, "");
    if (!trial(kind, node, &text, &change) || text.failed)
        bh_diags_lose(diags);
    good = !text.failed && bh_edit_try(edit, &change, 1, &into, diags);
    bh_text_free(&text);
    bh_text_free(&into);
    return good;
}

/* --- history --- */

size_t bh_edit_steps(const bh_edit *edit)
{
    return edit->history.count;
}

size_t bh_edit_done(const bh_edit *edit)
{
    return edit->history.done;
}

const bh_edit_step *bh_edit_step_at(const bh_edit *edit, size_t i)
{
    return i < edit->history.count ? &edit->history.steps[i].shown : NULL;
}

static bool turn(bh_edit *edit, const bh_step *step, bool again, bh_diags *diags)
{
    bh_text text = {0};
    bh_diags *said = bh_diags_new();
    bh_document *document = NULL;
    bh_history_turn(step, bytes_of(edit->now.document), again, &text);
    if (said && !text.failed)
        document =
            bh_document_parse(text.bytes, text.length, bh_document_name(edit->now.document), said);
    bh_text_free(&text);
    if (!document) { /* this text was read before: only memory can fail */
        bh_diags_free(said);
        bh_diags_lose(diags);
        return false;
    }
    free_reading(&edit->now);
    edit->now = (struct reading){document, said};
    edit->version++;
    return true;
}

bool bh_edit_undo(bh_edit *edit, bh_diags *diags)
{
    bh_history *h = &edit->history;
    if (h->done == 0 || !turn(edit, &h->steps[h->done - 1], false, diags))
        return false;
    h->done--;
    return true;
}

bool bh_edit_redo(bh_edit *edit, bh_diags *diags)
{
    bh_history *h = &edit->history;
    if (h->done == h->count || !turn(edit, &h->steps[h->done], true, diags))
        return false;
    h->done++;
    return true;
}

/* --- what is not saved --- */

bool bh_edit_saved(bh_edit *edit)
{
    const bh_bytes now = bytes_of(edit->now.document);
    bh_text copy = {0};
    bh_text_append_bytes(&copy, now.bytes, now.length);
    if (copy.failed) {
        bh_text_free(&copy);
        return false;
    }
    bh_text_free(&edit->saved);
    edit->saved = copy;
    edit->history.saved = edit->history.done;
    edit->history.aside = 0;
    return true;
}

size_t bh_edit_unsaved(const bh_edit *edit)
{
    const bh_bytes saved = {edit->saved.bytes, edit->saved.length};
    if (same_bytes(saved, bytes_of(edit->now.document)))
        return 0;
    const size_t distance = bh_history_distance(&edit->history);
    return distance ? distance : 1;
}

size_t bh_edit_changed(const bh_edit *edit, bh_edit_range *ranges, size_t room)
{
    const bh_bytes saved = {edit->saved.bytes, edit->saved.length};
    const bh_bytes now = bytes_of(edit->now.document);
    size_t count = 0;
    if (room == 0 || same_bytes(saved, now))
        return 0;
    if (bh_history_changed(&edit->history, ranges, room, &count))
        return count;
    ranges[0] = bh_bytes_differ(saved, now);
    return 1;
}
