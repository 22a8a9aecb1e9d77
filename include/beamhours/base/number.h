/* number.h - numbers to text and back, the same in every locale. */
#ifndef BH_BASE_NUMBER_H
#define BH_BASE_NUMBER_H

#include <stddef.h>

#include "beamhours/base/error.h"

/* Room that every text of this header fits into [bytes], the closing NUL included. */
enum { BH_NUMBER_SIZE = 64 };

/*
 * Writes `value` [1] with the fewest digits that read back to the same double: 855, 0.1, -2.5e-07,
 * 4.2e+37; written out from 1e-04 to 1e+16 unless that takes more than six zeros at the end. "nan",
 * "inf", "-inf" where it is no number.  Returns the length; 0, and an empty text, when `size` is
 * too small.
 */
size_t bh_number_print(double value, char *out, size_t size);

/*
 * Writes `value` [1] rounded to `digits` significant digits (1 to 17; others count as the nearest
 * of these), closing zeros kept: 3 digits give 12.3, 0.100, 1230, 4.20e+37.  A zero has no sign.
 * Rounding is of the double's exact value.  Returns as above.
 */
size_t bh_number_digits(double value, int digits, char *out, size_t size);

/*
 * Reads the decimal number that `text` begins with: sign, digits with at most one '.', exponent
 * after e or E; no blanks before it, no hexadecimal, no inf or nan, no thousands marks.  An e
 * without digits behind it is not part of the number (5eV is 5).  Sets `out` [1], correctly
 * rounded, and `end` (may be NULL) to the first character that does not belong.
 * Returns BH_EPLAN where there is no number, and BH_EDOMAIN (with `end` set) where it is too large
 * for a double or so small that only 0 would be left; `out` is then untouched.
 */
BH_CHECKED bh_code bh_number_parse(const char *text, const char **end, double *out);

#endif
