/* pieces.h - the stretches of bytes that belong to the items of a list or the keys of a mapping. */
#ifndef BH_DOCUMENT_PIECES_H
#define BH_DOCUMENT_PIECES_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/text.h"
#include "beamhours/document/node.h"

/* An item, or a key and its value, with the comments that are its own.  Between pieces stand line
 * ends, blank lines, indentation and, within brackets, commas. */
typedef struct {
    size_t start;              /* its first byte, comments above it included */
    size_t at;                 /* its dash or key; of an item within brackets: its first byte */
    size_t end;                /* behind its value; where dashes and lines divide, also behind its
                                  comments */
    size_t tail_from, tail_to; /* within brackets: the comment behind its comma, blanks before it
                                  included; else both are `end` */
    bool own_line;             /* only blanks stand before `start` on its line */
} bh_piece;

/* A text, and where in it things stand.  Not NUL-terminated lines: all of the document's bytes. */
typedef struct {
    const char *bytes;
    size_t length; /* [bytes] */
} bh_bytes;

/* Finds the pieces of `around`, a list or mapping read from `text`; `pieces` has room for its
 * count.  False where they are laid out in a way that is not understood. */
bool bh_pieces_find(bh_bytes text, const bh_node *around, bh_piece *pieces);

/* The first byte of the line that `at` stands in (behind a byte order mark), and where the line
 * ends: its line end, CR included, or the end of the text; and the first byte of the next line, or
 * the end of the text. */
size_t bh_line_start(bh_bytes text, size_t at);
size_t bh_line_end(bh_bytes text, size_t at);
size_t bh_line_next(bh_bytes text, size_t at);

/* Is there nothing but blanks (true) or also line ends (`lines`) from `from` to `to`? */
bool bh_blank(bh_bytes text, size_t from, size_t to, bool lines);

/* [1] how many code points stand before `at` on its line. */
size_t bh_column(bh_bytes text, size_t at);

/* "\r\n" where the first line ends so, else "\n". */
const char *bh_line_break(bh_bytes text);

/* What is to stand in place of the bytes from `from` to `to`. */
typedef struct {
    size_t from, to; /* [bytes] */
    const char *with;
    size_t length; /* [bytes] of `with` */
} bh_cut;

/* Appends the text with `count` cuts made, which are in order and apart. */
void bh_cuts_make(bh_bytes text, const bh_cut *cuts, size_t count, bh_text *into);

#endif
