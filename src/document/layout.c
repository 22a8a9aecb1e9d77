/* layout.c - items and keys put in, taken out and moved in the bytes of a document. */
#include "beamhours/document/layout.h"

#include <string.h>

static bool in_brackets(const bh_layout *l)
{
    return l->around->style == BH_STYLE_FLOW;
}

static bool has_comment(bh_bytes text, size_t from, size_t to)
{
    return to > from && memchr(text.bytes + from, '#', to - from) != NULL;
}

static void append_blanks(bh_text *into, size_t count)
{
    for (; count > 0; count--)
        bh_text_append(into, " ");
}

static bool cut(const bh_layout *l, bh_cut one, bh_text *into)
{
    bh_cuts_make(l->text, &one, 1, into);
    return true;
}

/* --- putting in --- */

/* How many line ends stand between pieces `i` and i + 1; 0 where there is more than blanks. */
static size_t breaks_behind(const bh_layout *l, size_t i)
{
    const size_t from = l->pieces[i].end, to = l->pieces[i + 1].start;
    size_t n = 0;
    if (!bh_blank(l->text, from, to, true))
        return 0;
    for (size_t at = from; at < to; at++)
        n += l->text.bytes[at] == '\n';
    return n;
}

/* How many line ends are to stand before a new piece at `place`. */
static size_t breaks_wanted(const bh_layout *l, size_t place)
{
    size_t n = 0;
    if (place < l->around->count)
        n = breaks_behind(l, place - 1);
    else if (place > 1)
        n = breaks_behind(l, place - 2);
    return n > 0 ? n : 1;
}

static void append_unit(const bh_layout *l, const bh_unit *unit, bh_text *into)
{
    if (l->around->kind == BH_NODE_LIST && !unit->dashed && !in_brackets(l))
        bh_text_append(into, "- ");
    bh_text_append_bytes(into, unit->bytes, unit->length);
}

static void insert_lines(const bh_layout *l, size_t place, const bh_unit *unit, bh_text *with)
{
    const size_t indent = bh_column(l->text, l->pieces[0].at);
    for (size_t i = breaks_wanted(l, place); i > 0; i--)
        bh_text_append(with, bh_line_break(l->text));
    append_blanks(with, indent);
    append_unit(l, unit, with);
}

/* Before the first piece. */
static size_t insert_first(const bh_layout *l, const bh_unit *unit, bh_text *with)
{
    const bh_piece *first = &l->pieces[0];
    const size_t indent = bh_column(l->text, first->at);
    if (first->own_line)
        append_blanks(with, indent);
    append_unit(l, unit, with);
    bh_text_append(with, bh_line_break(l->text));
    if (first->own_line)
        return bh_line_start(l->text, first->start);
    append_blanks(with, indent);
    return first->start;
}

static bool insert_block(const bh_layout *l, size_t place, const bh_unit *unit, bh_text *into)
{
    bh_text with = {0};
    size_t at = 0;
    if (place == 0) {
        at = insert_first(l, unit, &with);
    } else {
        insert_lines(l, place, unit, &with);
        at = l->pieces[place - 1].end;
    }
    into->failed = into->failed || with.failed;
    if (!with.failed)
        (void)cut(l, (bh_cut){at, at, with.bytes, with.length}, into);
    bh_text_free(&with);
    return true;
}

static void append_tail(const bh_unit *unit, bh_text *with)
{
    if (unit->tail)
        bh_text_append_bytes(with, unit->tail, unit->tail_length);
}

static void append_line(const bh_layout *l, size_t indent, bh_text *with)
{
    bh_text_append(with, bh_line_break(l->text));
    append_blanks(with, indent);
}

/* Behind the last piece, which may have a comma and a comment behind it. */
static void insert_last(const bh_layout *l, const bh_unit *unit, bool lines, bh_text *into)
{
    const bh_piece *last = &l->pieces[l->around->count - 1];
    const bool comma = bh_column(l->text, last->tail_from) > 0 &&
                       l->text.bytes[last->tail_from - 1] == ',' && last->tail_from > last->end;
    bh_text with = {0};
    if (lines)
        append_line(l, bh_column(l->text, last->at), &with);
    else
        bh_text_append(&with, " ");
    append_unit(l, unit, &with);
    if (comma)
        bh_text_append(&with, ",");
    append_tail(unit, &with);
    const bh_cut cuts[] = {{last->end, last->end, ",", comma ? 0 : 1},
                           {last->tail_to, last->tail_to, with.bytes, with.length}};
    into->failed = into->failed || with.failed;
    if (!with.failed)
        bh_cuts_make(l->text, cuts, 2, into);
    bh_text_free(&with);
}

static void insert_before(const bh_layout *l, size_t place, const bh_unit *unit, bh_text *into)
{
    const bh_piece *next = &l->pieces[place];
    bh_text with = {0};
    append_unit(l, unit, &with);
    bh_text_append(&with, ",");
    append_tail(unit, &with);
    if (next->own_line)
        append_line(l, bh_column(l->text, next->start), &with);
    else
        bh_text_append(&with, " ");
    into->failed = into->failed || with.failed;
    if (!with.failed)
        (void)cut(l, (bh_cut){next->start, next->start, with.bytes, with.length}, into);
    bh_text_free(&with);
}

static bool insert_flow(const bh_layout *l, size_t place, const bh_unit *unit, bh_text *into)
{
    const size_t count = l->around->count;
    if (count == 0) {
        const size_t at = l->around->from + 1;
        return cut(l, (bh_cut){at, at, unit->bytes, unit->length}, into);
    }
    const bh_piece *last = &l->pieces[count - 1];
    const bool lines = last->own_line && bh_column(l->text, last->at) > 0;
    if (unit->tail && unit->tail_length > 0 && !last->own_line)
        return false; /* the comment would swallow what follows */
    if (place == count)
        insert_last(l, unit, lines || last->tail_to > last->tail_from, into);
    else
        insert_before(l, place, unit, into);
    return true;
}

bool bh_layout_insert(const bh_layout *layout, size_t place, const bh_unit *unit, bh_text *into)
{
    return in_brackets(layout) ? insert_flow(layout, place, unit, into)
                               : insert_block(layout, place, unit, into);
}

/* --- taking out --- */

static bool blank_line_before(bh_bytes text, size_t line)
{
    return line == 0 ||
           bh_blank(text, bh_line_start(text, line - 1), bh_line_end(text, line - 1), false);
}

/* The full lines from `start` to `end`, and a blank line too many. */
static bh_cut full_lines(const bh_layout *l, size_t start, size_t end)
{
    bh_cut c = {bh_line_start(l->text, start), bh_line_next(l->text, end), "", 0};
    const bool blanks_before = c.from > 0 && blank_line_before(l->text, c.from);
    while (blanks_before && c.to < l->text.length &&
           bh_blank(l->text, c.to, bh_line_end(l->text, c.to), false))
        c.to = bh_line_next(l->text, c.to);
    const bool unended = l->text.length > 0 && l->text.bytes[l->text.length - 1] != '\n';
    if (unended && c.to == l->text.length && c.from > 0) { /* then the line above ends the text */
        c.from--;
        c.from -= c.from > 0 && l->text.bytes[c.from - 1] == '\r';
    }
    return c;
}

/* What is left of a list or mapping by lines that loses its last piece. */
static bool remove_only(const bh_layout *l, bh_text *into)
{
    const bh_node *around = l->around, *outer = around->parent;
    const bh_piece *p = &l->pieces[0];
    const char *none = around->kind == BH_NODE_LIST ? "[]" : "{}";
    if (!outer)
        return false;
    const bool below = bh_line_start(l->text, p->at) != bh_line_start(l->text, outer->from) &&
                       p->own_line && outer->keys;
    if (!below)
        return cut(l, (bh_cut){p->start, p->end, none, 2}, into);
    const bh_node *key = outer->keys[0];
    for (size_t i = 0; i < outer->count; i++)
        key = outer->items[i] == around ? outer->keys[i] : key;
    const char *colon = memchr(l->text.bytes + key->to, ':', p->start - key->to);
    if (!colon)
        return false;
    const size_t at = (size_t)(colon - l->text.bytes) + 1;
    bh_text with = {0};
    bh_text_appendf(&with, " %s", none);
    bh_cut cuts[] = {{at, at, with.bytes, with.length}, full_lines(l, p->start, p->end)};
    into->failed = into->failed || with.failed;
    if (cuts[1].from < at)
        cuts[1].from = at;
    if (!with.failed)
        bh_cuts_make(l->text, cuts, 2, into);
    bh_text_free(&with);
    return true;
}

static bool remove_block(const bh_layout *l, size_t i, bh_text *into)
{
    const bh_piece *p = &l->pieces[i];
    if (l->around->count == 1)
        return remove_only(l, into);
    if (p->own_line)
        return cut(l, full_lines(l, p->start, p->end), into);
    if (i + 1 == l->around->count)
        return false; /* several on one line, which dashes and lines do not do */
    const bool keep = has_comment(l->text, p->end, l->pieces[i + 1].start);
    return cut(l, (bh_cut){p->start, keep ? p->end : l->pieces[i + 1].start, "", 0}, into);
}

static bool remove_flow(const bh_layout *l, size_t i, bh_text *into)
{
    const bh_piece *p = &l->pieces[i];
    const size_t count = l->around->count;
    if (p->own_line && bh_blank(l->text, p->tail_to, bh_line_end(l->text, p->tail_to), false))
        return cut(l, full_lines(l, p->start, p->tail_to), into);
    if (p->tail_to > p->tail_from)
        return false; /* a comment that may speak of more than this item */
    if (i + 1 < count)
        return !has_comment(l->text, p->tail_to, l->pieces[i + 1].start) &&
               cut(l, (bh_cut){p->start, l->pieces[i + 1].start, "", 0}, into);
    if (count == 1)
        return cut(l, (bh_cut){p->start, p->tail_from, "", 0}, into);
    return !has_comment(l->text, p[-1].end, p->start) &&
           cut(l, (bh_cut){p[-1].end, p->end, "", 0}, into);
}

bool bh_layout_remove(const bh_layout *layout, size_t place, bh_text *into)
{
    return in_brackets(layout) ? remove_flow(layout, place, into)
                               : remove_block(layout, place, into);
}

/* --- moving --- */

bool bh_layout_move(const bh_layout *layout, size_t place, size_t to, bh_text *into)
{
    const bh_piece *p = layout->pieces;
    const char *bytes = layout->text.bytes;
    const size_t first = place < to ? place : to, last = place < to ? to : place;
    bh_text_append_bytes(into, bytes, p[first].start);
    for (size_t i = first; i <= last; i++) {
        size_t from = place < to ? i + 1 : i - 1; /* who comes to stand at i */
        if (i == to)
            from = place;
        const bh_piece *q = &p[from];
        bh_text_append_bytes(into, bytes + q->start, q->end - q->start);
        bh_text_append_bytes(into, bytes + p[i].end, p[i].tail_from - p[i].end);
        bh_text_append_bytes(into, bytes + q->tail_from, q->tail_to - q->tail_from);
        const size_t next = i < last ? p[i + 1].start : layout->text.length;
        bh_text_append_bytes(into, bytes + p[i].tail_to, next - p[i].tail_to);
    }
    return true;
}
