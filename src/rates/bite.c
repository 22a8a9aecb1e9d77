/* bite.c - the polar angles at which the detected particle's momentum is inside a momentum bite. */
#include "beamhours/rates/bite.h"

#include <math.h>
#include <stdbool.h>

#include "beamhours/units/constants.h"

/* Momentum transfers squared [MeV^2]. */
typedef struct {
    double from, to; /* [MeV^2] */
} q2_range;

/* Kinetic energy [MeV] of a mass [MeV] at momentum p [MeV/c], without cancellation. */
static double kinetic_of(double mass, double p)
{
    if (p == 0 || isinf(p))
        return p;
    return p * p / (sqrt(p * p + mass * mass) + mass);
}

/* What the momenta allow; the recoil's energy is q2 / 2 M. */
static q2_range allowed_by(const bh_collision *in, const bh_bite *bite)
{
    if (bite->detected == BH_DETECTED_RECOIL)
        return (q2_range){2 * in->target * kinetic_of(in->target, bite->momentum_from),
                          2 * in->target * kinetic_of(in->target, bite->momentum_to)};
    return (q2_range){2 * in->target * (in->kinetic - kinetic_of(in->mass, bite->momentum_to)),
                      2 * in->target * (in->kinetic - kinetic_of(in->mass, bite->momentum_from))};
}

/* What the branch can reach.  Where the beam is heavier, fast and slow solution meet at the largest
 * angle, sin = M / m: there E' = (E + M) m^2 / (m^2 + E M), the root of E' being 0. */
static q2_range reachable(const bh_collision *in, bh_detected detected)
{
    const double largest = bh_kinematics_largest_q2(in);
    if (detected == BH_DETECTED_RECOIL || in->mass <= in->target)
        return (q2_range){0, largest};
    const double energy = in->kinetic + in->mass;
    const double momentum2 = in->kinetic * (in->kinetic + 2 * in->mass);
    const double turning =
        2 * in->target * in->target * momentum2 / (in->mass * in->mass + energy * in->target);
    return detected == BH_DETECTED_SLOW ? (q2_range){turning, largest} : (q2_range){0, turning};
}

/* Polar angle [rad] of the detected particle at either end of its range, exactly. */
static double angle_at_end(const bh_collision *in, bh_detected detected, bool least)
{
    if (detected == BH_DETECTED_RECOIL)
        return least ? BH_PI / 2 : 0;
    if (detected == BH_DETECTED_SLOW)
        return least ? bh_kinematics_largest_angle(in) : 0;
    return least ? 0 : bh_kinematics_largest_angle(in);
}

static bh_code angle_at(const bh_collision *in, bh_detected detected, double q2, double *angle,
                        bh_error *err)
{
    const q2_range reach = reachable(in, detected);
    if (q2 <= reach.from || q2 >= reach.to) {
        *angle = angle_at_end(in, detected, q2 <= reach.from);
        return BH_OK;
    }
    bh_event event;
    const bh_code code = bh_kinematics_q2(in, q2, &event, err);
    if (code == BH_OK)
        *angle = detected == BH_DETECTED_RECOIL ? event.recoil_angle : event.scattered_angle;
    return code;
}

static bh_code check(const bh_collision *in, const bh_bite *bite, bh_error *err)
{
    if (!(in->mass >= 0 && in->target > 0 && in->kinetic > 0))
        return bh_fail(err, BH_EDOMAIN,
                       "a beam of mass %g MeV and kinetic energy %g MeV on a mass of %g MeV makes "
                       "no collision",
                       in->mass, in->kinetic, in->target);
    if (!(bite->momentum_from >= 0 && bite->momentum_from < bite->momentum_to))
        return bh_fail(err, BH_EDOMAIN, "momenta from %g to %g MeV/c are no interval",
                       bite->momentum_from, bite->momentum_to);
    if (bite->detected == BH_DETECTED_SLOW && !(in->mass > in->target))
        return bh_fail(err, BH_EDOMAIN,
                       "a beam that is not heavier than what it strikes has no slow solution");
    return BH_OK;
}

bh_code bh_bite_angles(const bh_collision *in, const bh_bite *bite, bh_interval *out, size_t *count,
                       bh_error *err)
{
    bh_code code = check(in, bite, err);
    if (code != BH_OK)
        return code;
    const q2_range allowed = allowed_by(in, bite);
    const q2_range reach = reachable(in, bite->detected);
    if (allowed.to < reach.from || allowed.from > reach.to) {
        *count = 0;
        return BH_OK;
    }
    double one = 0;
    double other = 0;
    code = angle_at(in, bite->detected, allowed.from, &one, err);
    if (code == BH_OK)
        code = angle_at(in, bite->detected, allowed.to, &other, err);
    if (code != BH_OK)
        return code;
    *out = one < other ? (bh_interval){one, other} : (bh_interval){other, one};
    *count = 1;
    return BH_OK;
}

/* Probability that a standard normal deviate exceeds x. */
static double above(double x)
{
    return 0.5 * erfc(x / sqrt(2));
}

double bh_bite_share(const bh_bite *bite, double p, double sigma)
{
    if (!(sigma > 0))
        return p >= bite->momentum_from && p <= bite->momentum_to ? 1 : 0;
    const double over = bite->momentum_from > 0 ? above((bite->momentum_from - p) / sigma) : 1;
    return over - above((bite->momentum_to - p) / sigma);
}

double bh_bite_momentum(double mass, double kinetic)
{
    return sqrt(kinetic * (kinetic + 2 * mass));
}

void bh_bite_from_threshold(bh_bite *bite, double mass, double threshold)
{
    bite->momentum_from = fmax(bite->momentum_from, bh_bite_momentum(mass, threshold));
    if (!(bite->momentum_to > bite->momentum_from))
        bite->momentum_to = nextafter(bite->momentum_from, (double)INFINITY);
}

double bh_bite_sigma(const bh_momentum_rms *rms, double mass, double p, double per_beam)
{
    const double per_energy = p > 0 ? sqrt(p * p + mass * mass) / p : 0;
    return sqrt(pow(rms->momentum * p, 2) + pow(rms->energy * per_energy, 2) +
                pow(rms->beam * per_beam, 2));
}
