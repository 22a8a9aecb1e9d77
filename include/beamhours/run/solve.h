/* solve.h - what it would take: the value of an input that gives the wanted output. */
#ifndef BH_RUN_SOLVE_H
#define BH_RUN_SOLVE_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/text.h"
#include "beamhours/plan/plan.h"
#include "beamhours/run/table.h"

/* The inputs that have a name: X(id, name, meaning).  Any other is meant by its dotted path. */
#define BH_SOLVE_INPUTS(X)                                                                 \
    X(BH_BY_ANGLE, "angle", "the arm's angle in this setting")                             \
    X(BH_BY_CURRENT, "current", "the beam current in this setting")                        \
    X(BH_BY_ENERGY, "energy", "the beam energy or momentum in this setting")               \
    X(BH_BY_THICKNESS, "thickness", "the sample's thickness, wherever its target is used") \
    X(BH_BY_SOLID_ANGLE, "solid-angle", "the arm's solid angle, in every setting")

typedef enum {
#define BH_SOLVE_INPUT_ID(id, name, meaning) id,
    BH_SOLVE_INPUTS(BH_SOLVE_INPUT_ID)
#undef BH_SOLVE_INPUT_ID
        BH_BY_COUNT
} bh_solve_input;

/* Its name and meaning. */
const char *bh_solve_input_name(bh_solve_input input);
const char *bh_solve_input_meaning(bh_solve_input input);

/* Whose output, which, and what may move.  Texts and bytes are the caller's. */
typedef struct {
    const char *bytes;
    size_t length;            /* [bytes] of the plan */
    const char *name;         /* of the plan, in messages */
    const bh_change *changes; /* made first, as with --with; may be NULL */
    size_t change_count;      /* of them */
    bh_material_library *library;
    const char *setting;   /* as the run table calls it */
    const char *arm;       /* likewise; NULL where the setting has one row */
    bh_column_id column;   /* of numbers */
    double wanted;         /* [1] in the unit that the column's key names */
    const char *by;        /* the name of an input, or a dotted path to a quantity */
    const char *from, *to; /* the least and the largest value tried, "20 deg"; NULL: the arm's
                              angle_range (else 0 to 180 deg); for the others a hundredth of and a
                              hundred times the present value; what the plan refuses is left out */
    bool (*cancelled)(void *asker); /* polled at least each 5 ms; NULL: never */
    void *asker;
    bh_workspace *workspace; /* the caller's; NULL: one for this alone */
} bh_question;

enum { BH_SOLVE_ROOM = 160, BH_SOLVE_MOST = 8 /* solutions told, at most */ };

typedef struct {
    char text[BH_SOLVE_ROOM]; /* what to write at the path: six or eight digits,
                                 "27.1834 deg" */
    double output;            /* [1] the output with exactly that, in the column's unit */
} bh_solution;

typedef struct {
    char path[BH_SOLVE_ROOM];    /* what moves: "settings.K1.angle" */
    char present[BH_SOLVE_ROOM]; /* its present value as written; "" where it follows from others */
    double output;               /* [1] the present output; NAN where it is empty */
    char from[BH_SOLVE_ROOM], to[BH_SOLVE_ROOM]; /* the least and largest value that the plan takes,
                                                    of those tried; "" where it takes none */
    double least, most; /* [1] the smallest and largest output seen; NAN where there is none */
    char at_least[BH_SOLVE_ROOM], at_most[BH_SOLVE_ROOM]; /* with these values */
    size_t count; /* solutions, nearest to the present value first; 0: none in that range */
    bh_solution solutions[BH_SOLVE_MOST];
    char refused[512]; /* why the plan does not take the values it refuses; "" where it takes all */
} bh_answer;

/*
 * Looks for all values of the input that give the wanted output, by evaluating the setting itself
 * on a grid over the range and closing in between its points (Brent's method); two values between
 * neighbouring points of the grid may be missed where the output only just turns between them.
 * Each solution's output is within 1e-4 of what is wanted, relatively, with eight digits of
 * the input at most; a jump over it is none.
 * Returns BH_OK also where there is no solution: then `answer` says what can be reached.  BH_EPLAN
 * where the plan has errors, BH_EDOMAIN where the question makes no sense, with what would do in
 * err; BH_ENOCONV when cancelled, BH_ENOMEM.
 */
BH_CHECKED bh_code bh_solve(const bh_question *question, bh_answer *answer, bh_error *err);

/* A share that people write, and tables show, in %: an uncertainty, a change of a rate. */
bool bh_solve_in_percent(bh_column_id column);

/* One sentence that says what came of it, "27.1834 deg gives ...", into `out`. */
void bh_answer_say(const bh_question *question, const bh_answer *answer, bh_text *out);

/* Reads "0.6 GeV2", "2 h", "0.5 %", or a bare number, into `wanted` [1] in the unit of the column's
 * key.  BH_EDOMAIN with what would do in err. */
BH_CHECKED bh_code bh_solve_wanted(bh_column_id column, const char *text, double *wanted,
                                   bh_error *err);

/* The column of numbers meant by `key`: its key, the key without its unit ("q2", "charge"), or
 * "rate", "uncertainty", "time".  BH_COLUMN_COUNT where there is none; `near` (may be NULL) is then
 * the nearest key or NULL. */
bh_column_id bh_solve_column(const char *key, const char **near);

#endif
