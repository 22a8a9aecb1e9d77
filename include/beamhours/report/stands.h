/* stands.h - which settings lie on a curve, and what they cover of what varies. */
#ifndef BH_REPORT_STANDS_H
#define BH_REPORT_STANDS_H

#include <stdbool.h>

#include "beamhours/plan/plan.h"
#include "beamhours/rates/acceptance.h"
#include "beamhours/run/curve.h"

enum { BH_MOST_EDGES = 64 };

/* A setting's arm along the curve's variable, in the unit of its key. */
typedef struct {
    double at;                  /* [1] its centre; NAN of a ring where the angle varies */
    double from, to;            /* [1] what it covers; both `at` where its size does not matter */
    int edges;                  /* between bins; 0 where they are not along what varies */
    double edge[BH_MOST_EDGES]; /* [1] rising or falling */
} bh_stand;

/* What a curve starts from. */
typedef struct {
    const bh_setting *setting;
    const bh_setting_arm *arm;
    bh_against against;
} bh_stand_origin;

/* Whether arm `arm` of `setting` lies on the curve that starts from `origin`: the same particle,
 * the same target, the same name of the arm, and what the curve keeps - energy, angle or Q2 - equal
 * to 1e-6.  If so fills `out`. */
bool bh_stand_on(const bh_stand_origin *origin, const bh_setting *setting,
                 const bh_setting_arm *arm, bh_stand *out);

#endif
