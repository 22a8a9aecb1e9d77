/* splice.c - one change of a document: proposed as bytes, read again, and checked. */
#include "beamhours/document/splice.h"

#include <stdlib.h>
#include <string.h>

#include "beamhours/base/sentences.h"
#include "beamhours/document/form.h"
#include "beamhours/document/layout.h"
#include "beamhours/document/source.h"
#include "beamhours/document/trail.h"

enum { SNIPPET = 48 };

bool bh_splice_in_brackets(const bh_node *node)
{
    for (; node; node = node->parent)
        if (node->kind != BH_NODE_SCALAR && node->style == BH_STYLE_FLOW)
            return true;
    return false;
}

static bool memory_lost(const bh_diags *diags)
{
    const size_t count = bh_diags_count(diags);
    return count > 0 && strcmp(bh_diags_at(diags, count - 1)->text, bh_code_text(BH_ENOMEM)) == 0;
}

static bool settles(bh_splice *s, const bh_text *proposed)
{
    bh_diags *said = bh_diags_new();
    bh_document *after = NULL;
    if (said && !proposed->failed)
        after =
            bh_document_parse(proposed->bytes, proposed->length, bh_document_name(s->before), said);
    s->lost = s->lost || !said || proposed->failed || memory_lost(said);
    if (after && bh_as_meant(bh_document_root(s->before), bh_document_root(after), &s->meant)) {
        s->after = after;
        s->said = said;
        return true;
    }
    bh_document_free(after);
    bh_diags_free(said);
    return false;
}

/* A text whose last line has no end may need one: a | text that now stands last lost its own. */
bool bh_splice_settle(bh_splice *splice, bh_text *proposed)
{
    const bh_bytes text = splice->text;
    const bool ended = text.length > 0 && text.bytes[text.length - 1] == '\n';
    bool good = settles(splice, proposed);
    if (!good && !splice->lost && !ended) {
        bh_text_append(proposed, bh_line_break(text));
        good = settles(splice, proposed);
    }
    bh_text_free(proposed);
    return good;
}

/* --- what is meant --- */

/* Each item as it was; `skip` left out, and room for a new one at `place`. */
static void mean(bh_splice *s, size_t count, size_t place)
{
    s->meant.count = count;
    s->meant.place = place;
    for (size_t i = 0; i < count; i++)
        s->from[i] = i < s->target.around->count ? i : 0;
}

static void mean_insert(bh_splice *s, size_t place)
{
    mean(s, s->target.around->count + 1, place);
    for (size_t i = place + 1; i < s->meant.count; i++)
        s->from[i] = i - 1;
}

static void mean_remove(bh_splice *s, size_t place)
{
    mean(s, s->target.around->count - 1, SIZE_MAX);
    for (size_t i = place; i < s->meant.count; i++)
        s->from[i] = i + 1;
}

static void mean_move(bh_splice *s, size_t place, size_t to)
{
    mean(s, s->target.around->count, SIZE_MAX);
    for (size_t i = place; i < to; i++)
        s->from[i] = i + 1;
    for (size_t i = place; i > to; i--)
        s->from[i] = i - 1;
    s->from[to] = place;
}

/* --- adding, taking away, moving --- */

static bh_layout layout_of(const bh_splice *s)
{
    return (bh_layout){s->text, s->target.around, s->pieces};
}

/* What a change is about, for a message. */
static const bh_node *spoken_of(const bh_splice *s)
{
    return s->target.node ? s->target.node : s->target.around;
}

static bool refuse_layout(const bh_splice *s)
{
    BH_TARGET_REFUSE(s->diags, spoken_of(s), BH_REFUSE_LAYOUT);
    return false;
}

static bool refuse_rest(const bh_splice *s)
{
    if (!s->lost)
        BH_TARGET_REFUSE(s->diags, spoken_of(s), BH_REFUSE_MORE);
    return false;
}

bool bh_splice_key(const bh_splice *s, const char *key)
{
    const bh_node *around = s->target.around;
    if (!key || !*key || strpbrk(key, "\n\t")) {
        BH_TARGET_REFUSE(s->diags, around, BH_REFUSE_NO_NAME);
        return false;
    }
    if (bh_key_find(around, key) == around->count)
        return true;
    bh_diags_add(s->diags, BH_SEVERITY_ERROR, around->at, bh_target_call(around).text,
                 BH_REFUSE_TAKEN, key);
    return false;
}

/* The place asked for, from 0, among `count`; false where there is none such. */
static bool place_of(const bh_splice *s, size_t count, size_t *place)
{
    const size_t wanted = s->change->place ? s->change->place : count;
    if (wanted > count) {
        bh_diags_add(s->diags, BH_SEVERITY_ERROR, spoken_of(s)->at,
                     bh_target_call(spoken_of(s)).text, BH_REFUSE_PLACE, wanted, count, count);
        return false;
    }
    *place = wanted - 1;
    return true;
}

static bool make_remove(bh_splice *s)
{
    const bh_layout layout = layout_of(s);
    const size_t place = s->target.index;
    bh_text proposed = {0};
    if (!s->target.around->parent && s->target.around->count == 1) {
        BH_TARGET_REFUSE(s->diags, s->target.node, BH_REFUSE_ALONE);
        return false;
    }
    if (!bh_layout_remove(&layout, place, &proposed)) {
        bh_text_free(&proposed);
        return refuse_layout(s);
    }
    mean_remove(s, place);
    return bh_splice_settle(s, &proposed) || refuse_rest(s);
}

static bool make_move(bh_splice *s)
{
    const bh_layout layout = layout_of(s);
    size_t to = 0;
    bh_text proposed = {0};
    if (s->target.around->count < 2) {
        BH_TARGET_REFUSE(s->diags, s->target.node, BH_REFUSE_NO_LIKE);
        return false;
    }
    if (!place_of(s, s->target.around->count, &to))
        return false;
    mean_move(s, s->target.index, to);
    (void)bh_layout_move(&layout, s->target.index, to, &proposed);
    if (!bh_splice_settle(s, &proposed))
        return refuse_rest(s);
    s->meant.place = to;
    return true;
}

/* Appends the piece again, a key called by its new name. */
static void append_copy(const bh_splice *s, const bh_piece *p, bh_text *into)
{
    const bh_node *around = s->target.around;
    const char *bytes = s->text.bytes;
    if (!around->keys) {
        bh_text_append_bytes(into, bytes + p->start, p->end - p->start);
        return;
    }
    const bh_node *key = around->keys[s->target.index];
    bh_text_append_bytes(into, bytes + p->start, key->from - p->start);
    bh_form_append(bh_form_choose(s->change->text, bh_splice_in_brackets(around)), s->change->text,
                   into);
    bh_text_append_bytes(into, bytes + key->to, p->end - key->to);
}

static bool make_copy(bh_splice *s)
{
    const bh_layout layout = layout_of(s);
    const size_t place = s->target.index + 1;
    const bh_piece *p = &s->pieces[s->target.index];
    bh_text copy = {0}, proposed = {0};
    if (s->target.around->keys && !bh_splice_key(s, s->change->text))
        return false;
    append_copy(s, p, &copy);
    const bh_unit unit = {copy.bytes, copy.length, s->text.bytes + p->tail_from,
                          p->tail_to - p->tail_from, true};
    const bool done = !copy.failed && bh_layout_insert(&layout, place, &unit, &proposed);
    proposed.failed = proposed.failed || copy.failed;
    s->lost = s->lost || copy.failed;
    bh_text_free(&copy);
    if (!done && !s->lost) {
        bh_text_free(&proposed);
        return refuse_layout(s);
    }
    mean_insert(s, place);
    s->from[place] = s->target.index;
    s->meant.key = s->change->text;
    return bh_splice_settle(s, &proposed) || refuse_rest(s);
}

/* --- one change --- */

static bool text_is_clean(const bh_splice *s)
{
    const char *text = s->change->text ? s->change->text : "";
    uint32_t point = 0;
    for (size_t left = strlen(text), width = 0; left > 0; left -= width, text += width) {
        width = bh_utf8_read(text, left, &point);
        if (width > 0 && !bh_utf8_hidden(point) && !bh_utf8_line_end(point))
            continue;
        point = width > 0 ? point : (unsigned char)*text;
        bh_diags_add(s->diags, BH_SEVERITY_ERROR, spoken_of(s)->at,
                     bh_target_call(spoken_of(s)).text, BH_REFUSE_HIDDEN, (unsigned)point);
        return false;
    }
    return true;
}

static bool prepare(bh_splice *s)
{
    const size_t room = s->target.around->count + 2;
    s->pieces = calloc(room, sizeof *s->pieces);
    s->from = calloc(room, sizeof *s->from);
    s->lost = !s->pieces || !s->from;
    if (s->lost)
        return false;
    s->meant = (bh_meant){.around = s->target.around, .from = s->from};
    mean(s, s->target.around->count, s->target.index);
    s->laid_out = bh_pieces_find(s->text, s->target.around, s->pieces);
    return text_is_clean(s);
}

static bool make_one(bh_splice *s)
{
    const bool in_place =
        s->change->kind == BH_EDIT_RENAME || (s->change->kind == BH_EDIT_SET && s->target.node);
    if (!s->laid_out && !in_place)
        return refuse_layout(s);
    switch (s->change->kind) {
    case BH_EDIT_RENAME:
        return bh_splice_rename(s);
    case BH_EDIT_DUPLICATE:
        return make_copy(s);
    case BH_EDIT_REMOVE:
        return make_remove(s);
    case BH_EDIT_MOVE:
        return make_move(s);
    default:
        return bh_splice_set(s);
    }
}

bool bh_splice_make(bh_splice *splice, const bh_document *before, const bh_edit_change *change,
                    bh_diags *diags)
{
    bh_splice s = {.before = before, .change = change, .diags = diags};
    s.text.bytes = bh_document_bytes(before, &s.text.length);
    bool done = bh_target_find(before, change, &s.target, diags) && prepare(&s) && make_one(&s);
    if (s.lost && !done)
        bh_diags_lose(diags);
    free(s.pieces);
    free(s.from);
    s.pieces = NULL;
    s.from = NULL;
    *splice = s;
    return done;
}
