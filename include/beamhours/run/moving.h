/* moving.h - the input of a plan that moves while a wanted output is looked for. */
#ifndef BH_RUN_MOVING_H
#define BH_RUN_MOVING_H

#include <stdbool.h>

#include "beamhours/base/number.h"
#include "beamhours/run/solve.h"

enum { BH_MOVING_REST = BH_SOLVE_ROOM - BH_NUMBER_SIZE };

/* Where it stands in the plan, how it is written, and between which values it moves. */
typedef struct {
    char path[BH_SOLVE_ROOM], present[BH_SOLVE_ROOM]; /* as in bh_answer */
    char rest[BH_MOVING_REST]; /* what follows the number, its unit and maybe a ±: " uA" */
    double number;             /* [1] the present value, of that unit; NAN where it is not known */
    double from, to;           /* [1] likewise */
    bool logarithmic;          /* it moves by factors */
} bh_moving;

/* Whose output is looked at, in the plan as it is. */
typedef struct {
    const bh_plan *plan;
    const bh_setting *setting;
    const bh_setting_arm *arm;
    double solid_angle; /* [sr] of the row; NAN where it has none */
} bh_moving_row;

/* Finds what moves.  BH_EDOMAIN, with what would do in err. */
BH_CHECKED bh_code bh_moving_find(const bh_question *question, const bh_moving_row *row,
                                  bh_moving *moving, bh_error *err);

/* Writes the value `number` [1] with `digits` [1] significant digits as it goes into the plan. */
void bh_moving_write(const bh_moving *moving, double number, int digits, char out[BH_SOLVE_ROOM]);

#endif
