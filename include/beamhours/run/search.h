/* search.h - the output of a plan again and again, while one input moves. */
#ifndef BH_RUN_SEARCH_H
#define BH_RUN_SEARCH_H

#include <stdbool.h>

#include "beamhours/run/moving.h"
#include "beamhours/run/solve.h"

typedef struct {
    const bh_question *question;
    bh_answer *answer; /* least, most and refused are kept up to date */
    bh_error *err;
    bh_code code; /* not BH_OK: the search is over */
    bh_moving moving;
    double far[BH_SOLVE_MOST + 1]; /* [1] from the present value, of each solution */
    double least_at, most_at;      /* [1] the least and largest value that the plan took */
    bh_workspace *workspace, *own;
    bh_change *changes;                               /* those of the question and one more */
    char setting[BH_SOLVE_ROOM], base[BH_SOLVE_ROOM]; /* "K3.2", and "K3" once its sweep is gone */
} bh_search;

/* Evaluates the plan as it is and finds what moves; false with a code. */
bool bh_search_begin(bh_search *search);
void bh_search_end(bh_search *search);

/* Returns [1] the output, in the unit of its column, with the moving input written as `text`; NAN
 * where the plan does not take it, the cell is empty, or the search is over. */
double bh_search_output(bh_search *search, const char *text);

#endif
