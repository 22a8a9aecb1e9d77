/* power.h - numbers with a power of ten, as they are set in print: 1.2e+13 becomes 1.2 x 10^13. */
#ifndef BH_REPORT_POWER_H
#define BH_REPORT_POWER_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/text.h"

/* Where one stands in a text. */
typedef struct {
    const char *at;
    size_t factor; /* [bytes] of what stands before the e */
    size_t length; /* [bytes] of all */
    int power;     /* [1] of ten */
} bh_power;

/* Finds the first number with a power of ten that stands by itself: blanks, brackets, commas or the
 * ends of `text` on both sides.  False where there is none; a command, which is to be typed as it
 * stands, has none. */
bool bh_power_find(const char *text, bh_power *out);

/* How a format appends what stands around such a number, and the number; `length` [bytes]. */
typedef struct {
    void (*words)(const char *text, size_t length, bh_text *out);
    void (*power)(const char *factor, size_t length, int power, bh_text *out);
} bh_power_style;

/* Appends `text`, its powers of ten set in this style. */
void bh_power_set(const char *text, const bh_power_style *style, bh_text *out);

/* Appends `text` with raised digits of Unicode, as 10² has, and blanks at which no line is broken.
 */
void bh_power_raise(const char *text, bh_text *out);

#endif
