/* explain.h - one row of the run table, number by number, as a reviewer wants it. */
#ifndef BH_RUN_EXPLAIN_H
#define BH_RUN_EXPLAIN_H

#include "beamhours/run/table.h"

typedef enum {
    BH_LINE_SECTION, /* a heading: `name` alone */
    BH_LINE_INPUT,   /* what the plan says: value, where it stands */
    BH_LINE_DEFAULT, /* a value nobody wrote */
    BH_LINE_FACTOR,  /* a computed number: formula in words, value, source, share */
    BH_LINE_MODEL,   /* a model in use: range, uncertainty, source */
    BH_LINE_NOTE     /* a sentence */
} bh_line_kind;

/* All strings are owned by the explanation; NULL where they do not apply. */
typedef struct {
    bh_line_kind kind;
    const char *name;    /* "luminosity" */
    const char *value;   /* "4.2e+37 /cm2/s" */
    const char *formula; /* "beam per second x nuclei per cm2" */
    const char *source;  /* "Kelly, Phys. Rev. C 70 (2004) 068202", or "plan.yaml:14:12" */
    const char *remark;  /* validity, share of the total, why */
} bh_line;

typedef struct bh_explanation bh_explanation;

/* Explains the row of `setting` (name), `arm` (NULL when there is one) and `bin` (0: whole arm) of
 * `table`.  Returns NULL with the names that would do in err when there is none. */
bh_explanation *bh_explain(const bh_table *table, const char *setting, const char *arm, int bin,
                           bh_error *err);

/* Which row, as bh_explain has it. */
typedef struct {
    const char *setting, *arm;
    int bin; /* from 1; 0 for the whole arm */
} bh_explained_row;

/* The same of a plan whose table there is no need of: evaluates, as `how` says (its `bins` and
 * `enough` are not looked at), only what the row needs. */
bh_explanation *bh_explain_alone(const bh_plan *plan, const bh_explained_row *row,
                                 const bh_evaluation *how, bh_error *err);
void bh_explanation_free(bh_explanation *explanation);
size_t bh_explanation_lines(const bh_explanation *explanation);
const bh_line *bh_explanation_line(const bh_explanation *explanation, size_t i);

/* The i-th sentence on what every number assumes without being asked; NULL past the end.  Constant
 * data. */
const char *bh_assumption_at(size_t i);

#endif
