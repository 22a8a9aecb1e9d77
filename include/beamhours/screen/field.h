/* field.h - one line of text being typed. */
#ifndef BH_SCREEN_FIELD_H
#define BH_SCREEN_FIELD_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/screen/press.h"

enum { BH_FIELD_SIZE = 2048 };

typedef struct {
    char bytes[BH_FIELD_SIZE]; /* UTF-8, NUL-terminated */
    size_t length, cursor;     /* [bytes] */
} bh_field;

/* Puts `text` into it, the cursor behind it.  False where it is too long. */
bool bh_field_set(bh_field *field, const char *text);

/* What a key does to it.  False where the key is none of the field's. */
bool bh_field_press(bh_field *field, const bh_press *press);

/* Steps the number that the cursor stands in or behind by one of the digit before the cursor, up
 * (+1) or down (-1): 20 uA becomes 21 uA.  False where there is no number. */
bool bh_field_step(bh_field *field, int direction);

#endif
