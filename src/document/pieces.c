/* pieces.c - the stretches of bytes that belong to the items of a list or the keys of a mapping. */
#include "beamhours/document/pieces.h"

#include <string.h>

#include "beamhours/document/scalar.h"

/* --- lines --- */

static size_t top(bh_bytes text)
{
    return text.length >= 3 && memcmp(text.bytes, "\xEF\xBB\xBF", 3) == 0 ? 3 : 0;
}

size_t bh_line_start(bh_bytes text, size_t at)
{
    const size_t first = top(text);
    while (at > first && text.bytes[at - 1] != '\n')
        at--;
    return at;
}

size_t bh_line_end(bh_bytes text, size_t at)
{
    while (at < text.length && text.bytes[at] != '\n')
        at++;
    const bool carriage = at < text.length && at > 0 && text.bytes[at - 1] == '\r';
    return carriage ? at - 1 : at;
}

size_t bh_line_next(bh_bytes text, size_t at)
{
    at = bh_line_end(text, at);
    if (at < text.length && text.bytes[at] == '\r')
        at++;
    return at < text.length ? at + 1 : at;
}

static bool is_blank(char c)
{
    return c == ' ' || c == '\t';
}

static size_t skip_blanks(bh_bytes text, size_t at)
{
    while (at < text.length && is_blank(text.bytes[at]))
        at++;
    return at;
}

bool bh_blank(bh_bytes text, size_t from, size_t to, bool lines)
{
    while (from < to && (is_blank(text.bytes[from]) || (lines && strchr("\r\n", text.bytes[from]))))
        from++;
    return from >= to;
}

size_t bh_column(bh_bytes text, size_t at)
{
    size_t n = 0;
    for (size_t i = bh_line_start(text, at); i < at; i++)
        n += ((unsigned char)text.bytes[i] & 0xC0U) != 0x80;
    return n;
}

const char *bh_line_break(bh_bytes text)
{
    const char *end = text.length ? memchr(text.bytes, '\n', text.length) : NULL;
    return end && end > text.bytes && end[-1] == '\r' ? "\r\n" : "\n";
}

void bh_cuts_make(bh_bytes text, const bh_cut *cuts, size_t count, bh_text *into)
{
    size_t done = 0;
    for (size_t i = 0; i < count; i++) {
        bh_text_append_bytes(into, text.bytes + done, cuts[i].from - done);
        bh_text_append_bytes(into, cuts[i].with, cuts[i].length);
        done = cuts[i].to;
    }
    bh_text_append_bytes(into, text.bytes + done, text.length - done);
}

/* --- comments --- */

/* Is the line that begins at `at` a comment and nothing else? */
static bool comment_line(bh_bytes text, size_t at)
{
    at = skip_blanks(text, at);
    return at < text.length && text.bytes[at] == '#';
}

/* Where the next thing stands that is no blank, line end or comment. */
static size_t skip_all(bh_bytes text, size_t at)
{
    while (at < text.length) {
        if (is_blank(text.bytes[at]) || text.bytes[at] == '\r' || text.bytes[at] == '\n')
            at++;
        else if (text.bytes[at] == '#')
            at = bh_line_end(text, at);
        else
            break;
    }
    return at;
}

/* Behind the comment that follows on the line of `end`, or `end` where there is none. */
static size_t behind_comment(bh_bytes text, size_t end)
{
    const size_t next = skip_blanks(text, end);
    return next < text.length && text.bytes[next] == '#' ? bh_line_end(text, next) : end;
}

/* Behind the full lines of comment below `end` that are indented more than `column`. */
static size_t behind_lines(bh_bytes text, size_t end, size_t column)
{
    size_t line = bh_line_next(text, end);
    while (line < text.length) {
        const size_t first = skip_blanks(text, line);
        const bool empty = bh_blank(text, line, bh_line_end(text, line), false);
        if (!empty && (!comment_line(text, line) || first - line <= column))
            break;
        if (!empty)
            end = bh_line_end(text, line);
        line = bh_line_next(text, line);
    }
    return end;
}

/* The first of the full lines of comment just above `at` that begin behind `floor`. */
static size_t above(bh_bytes text, size_t at, size_t floor)
{
    size_t line = bh_line_start(text, at), start = at;
    if (!bh_blank(text, line, at, false))
        return at;
    while (line > top(text)) {
        const size_t before = bh_line_start(text, line - 1);
        if (before < floor || !comment_line(text, before))
            break;
        line = before;
        start = skip_blanks(text, line);
    }
    return line == top(text) ? at : start;
}

/* --- pieces --- */

/* Where the value of child i ends that begins at `at`. */
static size_t value_end(bh_bytes text, const bh_node *around, size_t i, size_t at)
{
    const bh_node *value = around->items[i];
    if (!bh_node_empty(value))
        return value->to;
    if (!around->keys)
        return around->style == BH_STYLE_FLOW ? value->to : at + 1;
    const size_t colon = skip_blanks(text, around->keys[i]->to);
    return colon < text.length && text.bytes[colon] == ':' ? colon + 1 : around->keys[i]->to;
}

static bool block_pieces(bh_bytes text, const bh_node *around, bh_piece *pieces)
{
    size_t done = around->from;
    for (size_t i = 0; i < around->count; i++) {
        bh_piece *p = &pieces[i];
        p->at = skip_all(text, done);
        if (around->keys ? p->at != around->keys[i]->from
                         : p->at >= text.length || text.bytes[p->at] != '-')
            return false;
        const size_t end = value_end(text, around, i, p->at);
        p->end = behind_comment(text, end);
        if (!bh_blank(text, p->end, bh_line_end(text, p->end), false))
            return false;
        p->end = behind_lines(text, p->end, bh_column(text, p->at));
        p->start = above(text, p->at, i > 0 ? pieces[i - 1].end : 0);
        p->tail_from = p->tail_to = p->end;
        p->own_line = bh_blank(text, bh_line_start(text, p->start), p->start, false);
        done = p->end;
    }
    return true;
}

static bool flow_pieces(bh_bytes text, const bh_node *around, bh_piece *pieces)
{
    for (size_t i = 0; i < around->count; i++) {
        bh_piece *p = &pieces[i];
        p->at = around->keys ? around->keys[i]->from : around->items[i]->from;
        p->end = value_end(text, around, i, p->at);
        const size_t next = skip_all(text, p->end);
        const bool comma = next < text.length && text.bytes[next] == ',';
        if (comma && !bh_blank(text, p->end, next, true))
            return false;
        p->tail_from = comma ? next + 1 : p->end;
        p->tail_to = behind_comment(text, p->tail_from);
        p->start = above(text, p->at, i > 0 ? pieces[i - 1].tail_to : around->from);
        p->own_line = bh_blank(text, bh_line_start(text, p->start), p->start, false);
    }
    return true;
}

bool bh_pieces_find(bh_bytes text, const bh_node *around, bh_piece *pieces)
{
    return around->style == BH_STYLE_FLOW ? flow_pieces(text, around, pieces)
                                          : block_pieces(text, around, pieces);
}
