/* canvas.h - a grid of characters with looks: what is drawn before a terminal shows it. */
#ifndef BH_SCREEN_CANVAS_H
#define BH_SCREEN_CANVAS_H

#include <stdbool.h>
#include <stddef.h>
#include <stdint.h>

#include "beamhours/base/text.h"

/* What a character is, not which colour it has: the terminal chooses that. */
typedef enum {
    BH_LOOK_PLAIN,
    BH_LOOK_TITLE,   /* heads of parts and columns */
    BH_LOOK_QUIET,   /* units, defaults, what matters less */
    BH_LOOK_FOCUS,   /* where keys go */
    BH_LOOK_CURSOR,  /* the same place of a part that has not the focus */
    BH_LOOK_FIELD,   /* being typed */
    BH_LOOK_TRIAL,   /* provisional: not kept yet */
    BH_LOOK_CHANGED, /* differs from the pin */
    BH_LOOK_STALE,   /* of before: the new one is being computed */
    BH_LOOK_WARNING,
    BH_LOOK_ERROR,
    BH_LOOK_CAUTION,
    BH_LOOK_KEY, /* the name of a key */
    BH_LOOK_COUNT
} bh_look;

/* One cell; `point` 0 is the right half of a wide character. */
typedef struct {
    uint32_t point;
    uint32_t mark; /* a combining character on it; 0: none */
    bh_look look;
} bh_cell;

typedef struct {
    int rows, columns;
    bool ascii; /* the terminal shows nothing else */
    bh_cell *cells;
    int cursor_row, cursor_column; /* where the terminal's cursor belongs */
    size_t room;
} bh_canvas;

/* Makes it rows x columns blank cells; begins as {0}.  False without memory. */
bool bh_canvas_size(bh_canvas *canvas, int rows, int columns);
void bh_canvas_free(bh_canvas *canvas);

/* Where text goes: at most `width` columns of a row. */
typedef struct {
    int row, column, width;
} bh_spot;

/* Writes UTF-8 text, cut where the spot or the canvas ends; control characters become `?`.
 * Returns the columns used. */
int bh_canvas_put(bh_canvas *canvas, bh_spot spot, bh_look look, const char *text);

/* The same; what does not fit ends in an ellipsis. */
void bh_canvas_put_cut(bh_canvas *canvas, bh_spot spot, bh_look look, const char *text);

/* The same at the right end of the spot. */
int bh_canvas_put_right(bh_canvas *canvas, bh_spot spot, bh_look look, const char *text);

/* Gives all cells of the spot a look, keeping what is in them. */
void bh_canvas_paint(bh_canvas *canvas, bh_spot spot, bh_look look);

/* Makes the spot blank. */
void bh_canvas_clear(bh_canvas *canvas, bh_spot spot);

bool bh_cell_same(const bh_cell *a, const bh_cell *b);
bh_cell *bh_canvas_at(const bh_canvas *canvas, int row, int column);

/* Columns that a text takes; the bytes of it that take at most `columns`. */
int bh_text_columns(const char *text, bool ascii);
size_t bh_text_fit(const char *text, int columns);

/* Blanks take the look of what stands before them where neither look shows on a blank (`blank`): a
 * terminal is told of fewer changes of look, and the user sees the same. */
void bh_canvas_join_words(bh_canvas *canvas, const bool blank[BH_LOOK_COUNT]);

/* Appends the canvas as text, a line a row, blanks at the ends left out. */
void bh_canvas_print(const bh_canvas *canvas, bh_text *into);

#endif
