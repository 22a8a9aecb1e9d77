/* latex.h - words and units as LaTeX shows them: packages booktabs, longtable, siunitx. */
#ifndef BH_REPORT_LATEX_H
#define BH_REPORT_LATEX_H

#include <stddef.h>

#include "beamhours/base/text.h"

/* Appends the packages and units that a preamble must have, `lead` before each line. */
void bh_latex_packages(bh_text *out, const char *lead);

/* Appends the same as comments, with a line that says what they are for. */
void bh_latex_needs(bh_text *out);

/* Appends `words` (UTF-8) so that just they are shown: nothing in a name is obeyed; a line's end
 * becomes a blank. */
void bh_latex_words(bh_text *out, const char *words);

/* Appends a unit as it stands in run/columns.h: "1/cm2/s" becomes
 * \si{\per\centi\metre\squared\per\second}; what is no such unit is shown as it stands. */
void bh_latex_unit(bh_text *out, const char *unit);

/* A size of letters for a table. */
typedef struct {
    const char *name; /* "\footnotesize" */
    double letter;    /* [pt] how wide one is, rather more than less */
    double gap;       /* [pt] between columns */
} bh_latex_size;

#define BH_LATEX_PAGE 480.0 /* [pt] exact; A4 in margins of 20 mm */

/* The largest with which `columns` columns of `letters` letters together fit the page; the smallest
 * where none does. */
const bh_latex_size *bh_latex_fit(size_t letters, size_t columns);

/* Returns [pt] how wide such a table is in letters of `size`. */
double bh_latex_wide(const bh_latex_size *size, size_t letters, size_t columns);

#endif
