/* source.h - the bytes of a document: is it plain text, and where in it is line 3, column 7. */
#ifndef BH_DOCUMENT_SOURCE_H
#define BH_DOCUMENT_SOURCE_H

#include <stdbool.h>
#include <stddef.h>
#include <stdint.h>

#include "beamhours/base/diag.h"

/* A place that is moved through a text; the text belongs to the caller. */
typedef struct {
    const char *bytes;
    size_t length; /* [bytes] */
    size_t byte;   /* where the place is, 0 <= byte <= length */
    bh_mark at;    /* the same as name, line and column, in code points from 1 */
} bh_cursor;

/* The first place of a text called `name`: behind a byte order mark where it has one. */
bh_cursor bh_cursor_start(const char *bytes, size_t length, const char *name);

/* Moves to a line and column counted from 0, or to the nearest place before it that exists.
 * Forward moves cost what they pass; a move back begins again at the first place. */
void bh_cursor_go(bh_cursor *cursor, size_t line, size_t column);

/* The bytes of the code point that `bytes` (of which `left` remain) begin with, 1 to 4, and the
 * code point itself; 0 where they are not UTF-8. */
size_t bh_utf8_read(const char *bytes, size_t left, uint32_t *point);

/* Can the code point not be seen in an editor (controls but for tab and LF; marks of order;
 * marks of no width or of direction, which could show a line as another)?
 * Is it one that ends a line only for some programs? */
bool bh_utf8_hidden(uint32_t point);
bool bh_utf8_line_end(uint32_t point);

/* Demands UTF-8 without hidden characters and odd line ends; says the first fault, of the mapping
 * `key`, and returns false where there is one. */
bool bh_source_check(bh_cursor start, const char *key, bh_diags *diags);

/* Copies into `out` (`size` bytes, at least 8) what stands at `from`, at most to the end of the
 * line or to byte `to`, without blanks at the end, whole code points only; "..." marks a cut. */
void bh_source_excerpt(const bh_cursor *cursor, size_t from, size_t to, char *out, size_t size);

#endif
