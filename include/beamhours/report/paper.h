/* paper.h - a document as data: sections, sentences, tables, figures, numbered references; every
 * format is written from it, so that all say the same. */
#ifndef BH_REPORT_PAPER_H
#define BH_REPORT_PAPER_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/arena.h"
#include "beamhours/base/error.h"
#include "beamhours/report/figure.h"

/* All texts are UTF-8 and belong to the arena of who wrote the paper. */

/* One column.  Numbers stand to the right; the unit is "" for a bare number and for words. */
typedef struct {
    const char *heading, *unit;
    bool number;
} bh_paper_column;

typedef struct {
    const char *caption;
    size_t column_count, row_count;
    const bh_paper_column *columns;
    const char *const *cells; /* row by row; the first of a row names it */
} bh_paper_table;

typedef enum {
    BH_BLOCK_SECTION,
    BH_BLOCK_WORDS,    /* a paragraph */
    BH_BLOCK_ITEM,     /* of a list; items that follow each other are one */
    BH_BLOCK_CAUTION,  /* a paragraph that must not be missed */
    BH_BLOCK_TABLE,    /* `text` is its caption */
    BH_BLOCK_FIGURE,   /* likewise */
    BH_BLOCK_REFERENCE /* of the numbered list at the end, from 1, in order */
} bh_block_kind;

typedef struct {
    bh_block_kind kind;
    int number; /* of its kind, from 1; of sections, tables, figures, references */
    const char *text;
    const bh_paper_table *table;
    const bh_figure *figure;
} bh_block;

typedef struct {
    const char *title, *version;
    size_t count;
    const bh_block *blocks;
} bh_paper;

typedef enum { BH_PAGE_A4, BH_PAGE_LETTER } bh_page;

/* Each appends a file.  The same paper gives the same bytes.  BH_ENOMEM; BH_EDOMAIN for a figure
 * whose axis is none.  HTML and PDF need nothing from outside. */
BH_CHECKED bh_code bh_paper_html(const bh_paper *paper, bh_page page, bh_text *out, bh_error *err);
BH_CHECKED bh_code bh_paper_pdf(const bh_paper *paper, bh_page page, bh_text *out, bh_error *err);

/* How a paper becomes LaTeX. */
typedef struct {
    bh_page page;
    bool fragment; /* only what stands between \begin{document} and \end{document}; comments say
                      what it needs */
    const char *figures; /* "report": figure 1 is in the file report-1.pdf beside it; NULL: it is
                            described in words */
} bh_latex_form;

/* LaTeX with booktabs, longtable, graphicx and siunitx (version 2 or 3); Markdown, whose figure 1
 * would be in report-1.svg.  The files of figures are the caller's to write: bh_figure_write. */
BH_CHECKED bh_code bh_paper_latex(const bh_paper *paper, const bh_latex_form *form, bh_text *out,
                                  bh_error *err);
BH_CHECKED bh_code bh_paper_markdown(const bh_paper *paper, const char *figures, bh_text *out,
                                     bh_error *err);

/* --- writing one --- */

/* Begins as {.arena = ...}.  When memory runs out it remembers that and takes nothing more. */
typedef struct {
    bh_arena *arena;
    bh_block *blocks;
    size_t count, room;
    int numbers[BH_BLOCK_REFERENCE + 1]; /* [1] so far, of each kind */
    const char **sources;                /* cited, in the order of their numbers */
    size_t source_count, source_room;
    bh_paper_table *open; /* being filled */
    const char **cells;   /* of it */
    size_t cell_count, cell_room;
    bool failed; /* memory ran out */
} bh_paper_writing;

/* A text that lives as long as the arena; "" (and failed) when memory runs out. */
const char *bh_paper_text(bh_paper_writing *w, const char *fmt, ...) BH_PRINTF(2, 3);

/* The same from a text that grew, which is freed. */
const char *bh_paper_keep(bh_paper_writing *w, bh_text *text);

/* Adds a block of words of this kind. */
void bh_paper_add(bh_paper_writing *w, bh_block_kind kind, const char *text);
void bh_paper_figure(bh_paper_writing *w, const char *caption, const bh_figure *figure);

/* The number of a source in the list of references, which it joins when it is new. */
int bh_paper_cite(bh_paper_writing *w, const char *source);

/* Opens a table of `count` columns (copied); then comes cell after cell, row by row; a table
 * without a row is left out. */
void bh_paper_table_open(bh_paper_writing *w, const char *caption, const bh_paper_column *columns,
                         size_t count);
void bh_paper_cell(bh_paper_writing *w, const char *text);
void bh_paper_table_close(bh_paper_writing *w);

/* Adds the references as blocks of their own. */
void bh_paper_references(bh_paper_writing *w);

#endif
