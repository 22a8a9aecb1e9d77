/* grid.h - a small table of texts that is written as plain text, Markdown or LaTeX. */
#ifndef BH_REPORT_GRID_H
#define BH_REPORT_GRID_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/text.h"

enum { BH_MOST_GRID_COLUMNS = 64 };

typedef struct {
    const char *heading, *unit; /* unit as in run/columns.h; "" for words */
    bool number;                /* numbers stand to the right */
    bool whole;                 /* its words are not broken into lines */
} bh_grid_column;

/* Begins as {0}; cells come row by row; given back with bh_grid_free. */
typedef struct {
    size_t names; /* so many columns at the left name a row, and are repeated; 0: one */
    size_t column_count;
    bh_grid_column columns[BH_MOST_GRID_COLUMNS];
    size_t cell_count;
    bh_text cells; /* a NUL behind each */
} bh_grid;

/* Adds a column; its strings must outlive the grid.  More than there is room for are left out. */
void bh_grid_column_add(bh_grid *grid, const char *heading, const char *unit, bool number);

/* Adds a cell; the text is copied. */
void bh_grid_cell(bh_grid *grid, const char *text);
void bh_grid_free(bh_grid *grid);

enum { BH_LEAST_WIDTH = 80 }; /* terminal columns */

/* Appends it `width` terminal columns wide, at least BH_LEAST_WIDTH: two lines of headings, then
 * the rows.  Where it is wider, columns whose cells all agree are said above it, then words are
 * broken into several lines, then what has no room follows below with the names repeated. */
void bh_grid_text(const bh_grid *grid, int width, bh_text *out);

/* Appends it as a table of Markdown, an empty line behind it. */
void bh_grid_markdown(const bh_grid *grid, bh_text *out);

/* Appends it as a longtable with the rules of booktabs and the S columns of siunitx; needs what
 * bh_latex_needs (latex.h) says. */
void bh_grid_latex(const bh_grid *grid, bh_text *out);

/* Returns [pt] how wide that is, rather more than less: above BH_LATEX_PAGE (latex.h) only where
 * the smallest letters do not help. */
double bh_grid_latex_wide(const bh_grid *grid);

/* Appends `words` (UTF-8) so that Markdown shows just them: nothing in a name is obeyed; a line's
 * end becomes a blank. */
void bh_markdown_words(bh_text *out, const char *words);

/* Appends hours [h] to a hundredth, below one hour to three digits; "-" where there are none. */
void bh_hours_words(bh_text *out, double hours);

#endif
