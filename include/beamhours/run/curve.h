/* curve.h - a setting evaluated again and again while one quantity varies. */
#ifndef BH_RUN_CURVE_H
#define BH_RUN_CURVE_H

#include "beamhours/run/table.h"

typedef enum {
    BH_AGAINST_ANGLE,  /* at the setting's energy */
    BH_AGAINST_ENERGY, /* beam kinetic energy at the setting's angle */
    BH_AGAINST_Q2,     /* at the setting's energy */
    BH_AGAINST_EPSILON /* at the setting's Q2: energy and angle both move */
} bh_against;

typedef struct {
    const char *setting; /* name; NULL: the first */
    const char *arm;     /* name; NULL where the setting has one */
    bh_against against;
    const char *structure; /* of the struck nuclide, instead of the plan's; NULL: the plan's */
    bool centre; /* the arm is a point without cuts: quick, for cross sections at its centre */
    int points;  /* of the grid, 2 to 481; below 2: 61 */
    bool (*cancelled)(void *asker); /* as bh_evaluation has it */
    void *asker;
} bh_curve_request;

typedef struct bh_curve bh_curve;

/*
 * Evaluates the curve on a grid over all that the arm and the kinematics allow: angles from the
 * arm's angle_range (else 5 to 175 deg), energies from a quarter to four times the setting's,
 * logarithmic.  Of a ring, against angle or Q2, each point is a slice of it around that angle, as
 * wide as the bin there, and what belongs to the readout and the hours of the whole ring is empty:
 * live fraction, hours, charge, counts, uncertainty of counting.
 * `plan` must outlive it.  NULL with what would do in err.
 */
bh_curve *bh_curve_new(const bh_plan *plan, const bh_curve_request *request, bh_error *err);
void bh_curve_free(bh_curve *curve);

size_t bh_curve_count(const bh_curve *curve);

/* Returns [1] what varies, at point i: degrees, MeV, GeV2 or a bare number. */
double bh_curve_x(const bh_curve *curve, size_t i);

/* Returns [1] the column at point i, in the unit of its key; NAN where it is empty. */
double bh_curve_y(const bh_curve *curve, size_t i, bh_column_id column);

/* Names of the plan's settings that lie on the curve (same particle, and same energy; angle; or Q2,
 * whichever the curve keeps) at point i, or whose acceptance covers it where the angle varies; ""
 * for none. */
const char *bh_curve_marks(const bh_curve *curve, size_t i);

/* The structure model of the struck nuclide, and the range of the data behind it. */
typedef struct {
    const char *name; /* "" for several nuclides, and for hadrons and ions */
    double low, high; /* [GeV2] */
} bh_curve_model;

/* It belongs to the curve. */
bh_curve_model bh_curve_structure(const bh_curve *curve);

/* Whether point i lies in that range; beyond it the model is continued, not known. */
bool bh_curve_inside(const bh_curve *curve, size_t i);

/* The key and unit of what varies ("angle_deg"). */
const char *bh_curve_key(bh_against against);

#endif
