/* input.h - from a plan's name on the command line to a checked plan, and output to where it
 * belongs. */
#ifndef BH_COMMAND_INPUT_H
#define BH_COMMAND_INPUT_H

#include "beamhours/base/text.h"
#include "beamhours/command/options.h"
#include "beamhours/plan/plan.h"
#include "beamhours/run/table.h"

typedef struct {
    bh_text bytes;
    const char *name; /* as given; "-" for standard input */
    char *shown;      /* the same without what a terminal would obey */
    bh_material_library *library;
    bh_diags *diags; /* of the last bh_input_plan */
    bh_plan *plan;
    bh_table *table;
} bh_input;

/* Reads the bytes of `name` and opens the library of materials.  Returns 0 or the exit status after
 * saying why; bh_input_close is owed in any case. */
int bh_input_open(const char *name, bh_input *in);
void bh_input_close(bh_input *in);

/* The --with changes of a command line, split at their first '='; `changes` and `keys` (all NULL)
 * have room for BH_MOST_CHANGES; the caller frees the keys in any case.  Returns 0 or the exit
 * status. */
int bh_input_changes(const bh_arguments *arguments, bh_change *changes, char **keys);

/* Makes in->plan from the bytes and, unless `arguments` is NULL, its --with changes; replaces an
 * earlier plan and table.  Returns 0, or 65 after writing every error and warning. */
int bh_input_plan(bh_input *in, const bh_arguments *arguments);

/* Evaluates in->plan into in->table: with bins, without changes of rates, as `wanted` says. Returns
 * 0 or the exit status after saying why. */
int bh_input_evaluate(bh_input *in, const bh_evaluation *wanted);

/* The usual way: open, plan, evaluate. */
int bh_input_table(const char *name, const bh_arguments *arguments, const bh_evaluation *wanted,
                   bh_input *in);

/* Writes "FILE:LINE:COLUMN: [warning: ]KEY: text", one a line, to `to`. */
void bh_say_diags(FILE *to, const bh_diags *diags);

/* Writes the cautions of a table likewise: what has no room for them shows them there. */
void bh_say_cautions(FILE *to, const bh_table *table);

/* Writes `text` to file `path`, or to standard output where that is NULL, and frees it.
 * Returns 0 or the exit status after saying why. */
int bh_output(bh_text *text, const char *path);

#endif
