/* sheet.h - writing a text to read, wrapped to the terminal; for the files of this room. */
#ifndef BH_SCREEN_SHEET_H
#define BH_SCREEN_SHEET_H

#include "beamhours/screen/model.h"

typedef struct {
    bh_sheet *sheet;
    int width; /* columns */
} bh_sheet_writer;

/* Begins another sheet over everything else.  False without memory. */
bool bh_sheet_begin(bh_model *model, bh_sheet_kind kind, const char *title, bh_sheet_writer *out);

/* Adds a text, wrapped; its first line is led by `lead`, the others by as many blanks. */
void bh_sheet_add(bh_sheet_writer *writer, bh_look look, const char *lead, const char *text);

/* Adds a name and what it is about, in two columns. */
void bh_sheet_pair(bh_sheet_writer *writer, const char *name, const char *text);

/* Adds a line of an explanation. */
void bh_sheet_explained(bh_sheet_writer *writer, const bh_line *line);

#endif
