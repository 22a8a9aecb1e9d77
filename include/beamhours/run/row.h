/* row.h - the cells of one row of the run table, and why some of them are empty. */
#ifndef BH_RUN_ROW_H
#define BH_RUN_ROW_H

#include <stddef.h>

#include "beamhours/run/cause.h"
#include "beamhours/run/columns.h"

/* Every reason a cell can be empty for: X(id, sentence). */
#define BH_REASONS(X)                                                                     \
    X(BH_WHY_WHOLE_ARM, "the row is the whole arm")                                       \
    X(BH_WHY_NOT_LEPTON, "defined for lepton beams only")                                 \
    X(BH_WHY_NOT_BUILT, "not computed by this version")                                   \
    X(BH_WHY_UNREACHED, "no event sends the detected particle to the centre of the row")  \
    X(BH_WHY_EMPTY_BIN, "the bin lies outside the acceptance")                            \
    X(BH_WHY_RING, "a ring around the beam has no angle to turn")                         \
    X(BH_WHY_NO_EVENTS, "no signal lands in the acceptance and the bite")                 \
    X(BH_WHY_STOPPED, "the beam stops before it has come through the sample")             \
    X(BH_WHY_STAYS_INSIDE, "what is scattered along the arm's axis stops on its way")     \
    X(BH_WHY_NUCLEAR, "nuclear forces, left out, may change this by orders of magnitude") \
    X(BH_WHY_NO_WANT, "the setting asks for no goal, time, charge or counts")             \
    X(BH_WHY_NO_GOAL, "this arm has no goal")                                             \
    X(BH_WHY_NOT_ASKED, "not asked for here")                                             \
    X(BH_WHY_NO_SIGNAL, "no signal would be recorded")

typedef enum {
    BH_WHY_NOTHING,
#define BH_WHY_ID(id, sentence) id,
    BH_REASONS(BH_WHY_ID)
#undef BH_WHY_ID
        BH_WHY_COUNT
} bh_why;

/* One row.  Text columns follow from where it stands in the plan. */
typedef struct {
    size_t setting, arm;                /* numbers from 0 in the plan */
    int bin;                            /* from 1; 0 for the whole arm */
    double number[BH_COLUMN_COUNT];     /* [1] in the unit of the column's key; NAN: empty */
    unsigned char why[BH_COLUMN_COUNT]; /* a bh_why where number is NAN */
    bh_effects effects;                 /* what the signal rate is uncertain by */
} bh_row;

/* The sentence; NULL for BH_WHY_NOTHING. */
const char *bh_why_text(bh_why why);

/* Puts `value` [1], in the unit of the column's key, or when it is not finite nothing and why. */
void bh_row_put(bh_row *row, bh_column_id column, double value, bh_why why);

#endif
