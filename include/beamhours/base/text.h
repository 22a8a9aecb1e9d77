/* text.h - a text that grows at its end. */
#ifndef BH_BASE_TEXT_H
#define BH_BASE_TEXT_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/error.h"

/* Begins as {0} and is given back with bh_text_free.  May hold any bytes.  When memory runs out
 * the text keeps what it has, remembers the failure and takes nothing more: check once at the end.
 */
typedef struct {
    char *bytes;   /* NUL-terminated; NULL while nothing was appended */
    size_t length; /* [bytes] without the NUL */
    size_t room;   /* [bytes] allocated */
    bool failed;   /* memory ran out: the text is incomplete */
} bh_text;

/* Appends a string; `length` bytes; what printf would print. */
void bh_text_append(bh_text *text, const char *string);
void bh_text_append_bytes(bh_text *text, const void *bytes, size_t length);
void bh_text_appendf(bh_text *text, const char *fmt, ...) BH_PRINTF(2, 3);

/* Appends `value` [1] with the fewest digits that read back (base/number.h). */
void bh_text_append_number(bh_text *text, double value);

/* Where `length` more bytes may be written, or NULL; add to text->length (and close with a NUL by
 * appending "") what was written. */
char *bh_text_reserve(bh_text *text, size_t length);

/* The text as a string of its own that the caller free()s, leaving an empty text; NULL, with the
 * failure forgotten, when memory had run out. */
char *bh_text_take(bh_text *text);

void bh_text_free(bh_text *text);

#endif
