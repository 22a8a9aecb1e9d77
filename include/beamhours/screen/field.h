/* field.h - a text being typed, of one line or several. */
#ifndef BH_SCREEN_FIELD_H
#define BH_SCREEN_FIELD_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/screen/press.h"

enum { BH_FIELD_SIZE = 8192 };

typedef struct {
    char bytes[BH_FIELD_SIZE]; /* UTF-8, NUL-terminated */
    size_t length, cursor;     /* [bytes] */
    int width;                 /* [columns] of the rows of a text of several lines; 0: it has one */
} bh_field;

/* Puts `text` into it, the cursor behind it.  False where it is too long. */
bool bh_field_set(bh_field *field, const char *text);

/* The row of a text of several lines that begins at byte `from`: lines that are wider than the
 * field go on in the next row.  Puts its bytes into `length`; returns [bytes] where the next one
 * begins, BH_FIELD_SIZE behind the last. */
size_t bh_field_row(const bh_field *field, size_t from, size_t *length);

/* Where the row begins [bytes] in which the cursor is. */
size_t bh_field_at(const bh_field *field);

/* What a key does to it.  False where the key is none of the field's. */
bool bh_field_press(bh_field *field, const bh_press *press);

/* Steps the number that the cursor stands in or behind by one of the digit before the cursor, up
 * (+1) or down (-1): 20 uA becomes 21 uA.  False where there is no number. */
bool bh_field_step(bh_field *field, int direction);

#endif
