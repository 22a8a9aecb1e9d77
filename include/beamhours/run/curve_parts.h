/* curve_parts.h - what a curve is made of; for the files that make it. */
#ifndef BH_RUN_CURVE_PARTS_H
#define BH_RUN_CURVE_PARTS_H

#include "beamhours/physics/kinematics.h"
#include "beamhours/run/curve.h"
#include "beamhours/units/nuclide.h"

enum { BH_CURVE_MOST = 481, BH_CURVE_NAME = 64 };

struct bh_curve {
    char model[BH_CURVE_NAME];  /* "": no structure of one nuclide */
    double known[2];            /* [GeV2] */
    bh_structure_choice choice; /* of the struck nuclide, where the caller names a model */
    bool slices;                /* of a ring */
    size_t count;
    double x[BH_CURVE_MOST]; /* [1] what varies, in the unit of its key */
    char *marks[BH_CURVE_MOST];
    bh_setting settings[BH_CURVE_MOST];
    bh_setting_arm arms[BH_CURVE_MOST];
    bh_plan plan;
    bh_table *table;
};

/* What the points start from. */
typedef struct {
    const bh_setting *setting;
    const bh_setting_arm *arm;
    const bh_nuclide *nuclide;
    bh_collision collision;
    double q2;   /* [MeV^2] at the arm's angle; NAN where there is none */
    bool recoil; /* the arm detects the recoil */
    bool slices; /* of a ring */
    bool centre; /* of the arm alone */
    bh_against against;
} bh_curve_origin;

/* Names at each point the settings of `plan` that lie there: fills curve->marks.  False without
 * memory. */
bool bh_curve_mark(bh_curve *curve, const bh_plan *plan, const bh_curve_origin *origin);

#endif
