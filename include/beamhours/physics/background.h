/* background.h - the registry of what else a beam does that an elastic arm would count. */
#ifndef BH_PHYSICS_BACKGROUND_H
#define BH_PHYSICS_BACKGROUND_H

#include <stdbool.h>

#include "beamhours/physics/process.h"

/* What an arm accepts at one angle. */
typedef struct {
    double angle;                      /* [rad] 0 < angle <= pi */
    double momentum_from, momentum_to; /* [MeV/c] 0 <= from < to; to may be INFINITY */
} bh_momentum_range;

typedef enum {
    BH_COMPUTED,      /* all of the range; also where nothing can happen: then the value is 0 */
    BH_COMPUTED_PART, /* the value is that of a part of the range: a lower limit */
    BH_NOT_COMPUTED   /* nothing of it; the value is 0 */
} bh_computed;

typedef struct {
    bh_computed state;
    double share;       /* [1] of the momenta of the range, up to that of the beam, computed */
    double uncertainty; /* [1] relative standard, of the value (all of it wrong by one factor);
                           0 where the value is 0 */
    const char *reason; /* what is not computed and where, constant, to stand behind "not computed:
                           "; "" where all is */
} bh_background_validity;

/* One registry row.  Constant data; functions are pure, thread safe and do not allocate. */
typedef struct {
    const char *name;    /* "quasi-elastic" */
    const char *summary; /* one line */
    const char *source;
    const char *range; /* where it holds and how well tested, in words */
    bool recoil;       /* the particle counted is an electron out of the atom, not the beam's */
    bool sharp;        /* at each angle one momentum (muons two): the value jumps with the angle
                          where that leaves the range; bh_kinematics with the electron as target
                          knows where */
    /* Whether such a beam does that to nucleus (or the atom of) z, a at all. */
    bool (*applies)(const bh_particle *beam, int z, int a);
    /*
     * Fills value [ub/sr], per nucleus, the rate of particles at range->angle with momenta in the
     * range: the integral of d2sigma / dOmega dE'.  Of `encounter` beam, z, a and kinetic are read.
     * Only where applies says so.  Quadrature 2e-5.  Input that is no number or out of range: value
     * 0 and BH_NOT_COMPUTED, saying so.
     */
    void (*momentum_integral)(const bh_encounter *encounter, const bh_momentum_range *range,
                              double *value, bh_background_validity *validity);
} bh_background;

/* The rows. */
extern const bh_background bh_background_quasi_elastic;
extern const bh_background bh_background_inelastic;
extern const bh_background bh_background_atomic;   /* the beam lepton scattered by an electron */
extern const bh_background bh_background_knock_on; /* that electron */

/* By name; NULL when it is not in the registry.  The i-th; NULL past the end. */
const bh_background *bh_background_find(const char *name);
const bh_background *bh_background_at(int i);

#endif
