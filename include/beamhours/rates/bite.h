/* bite.h - the polar angles at which the detected particle's momentum is inside a momentum bite. */
#ifndef BH_RATES_BITE_H
#define BH_RATES_BITE_H

#include <stddef.h>

#include "beamhours/base/error.h"
#include "beamhours/physics/kinematics.h"
#include "beamhours/rates/acceptance.h"

typedef enum {
    BH_DETECTED_SCATTERED, /* the scattered particle, of the two solutions the fast one */
    BH_DETECTED_SLOW,      /* the scattered particle, slow solution (mass > target only) */
    BH_DETECTED_RECOIL     /* the struck particle */
} bh_detected;

/* momentum_from .. momentum_to [MeV/c] at the scattering point. */
typedef struct {
    bh_detected detected;
    double momentum_from, momentum_to; /* [MeV/c] 0 <= from < to; to may be INFINITY */
} bh_bite;

/*
 * Elastic momentum is monotonic in angle on each branch, so there is at most one interval: momentum
 * -> energy -> momentum transfer -> angle, each in closed form.  Fills `out` [rad] and returns in
 * `count` 0 (no angle has such a momentum) or 1.  Accuracy as bh_kinematics_q2.
 * BH_EDOMAIN for a bite that is no interval, or the slow solution of a beam not heavier than the
 * target.
 */
BH_CHECKED bh_code bh_bite_angles(const bh_collision *in, const bh_bite *bite, bh_interval *out,
                                  size_t *count, bh_error *err);

/* Returns [1] the probability that a particle of momentum p [MeV/c], measured with standard
 * deviation sigma [MeV/c] >= 0 (normal), is found inside the bite; sigma 0: 1 or 0.  A bite from 0
 * has no lower edge. */
double bh_bite_share(const bh_bite *bite, double p, double sigma);

/* Returns [MeV/c] the momentum of `mass` [MeV] at `kinetic` [MeV] >= 0. */
double bh_bite_momentum(double mass, double kinetic);

/* Cuts the bite off below `threshold` [MeV], the least kinetic energy that counts of a particle of
 * `mass` [MeV].  A bite that lies below it keeps nothing: its momenta become those from the
 * threshold to the next larger number. */
void bh_bite_from_threshold(bh_bite *bite, double mass, double threshold);

/* How well a momentum is known. */
typedef struct {
    double momentum; /* [1] rms, relative: momentum_resolution */
    double energy;   /* [MeV] rms of the kinetic energy: energy_resolution */
    double beam;     /* [1] rms, relative, of the beam's momentum: momentum_spread */
} bh_momentum_rms;

/* Returns [MeV/c] the standard deviation of the measured momentum p [MeV/c] of a particle of
 * mass [MeV], its contributions in quadrature: momentum x p, energy / beta, beam x per_beam, where
 * per_beam [MeV/c] is how the momentum at one angle follows the relative momentum of the beam,
 * p_beam dp/dp_beam. */
double bh_bite_sigma(const bh_momentum_rms *rms, double mass, double p, double per_beam);

#endif
