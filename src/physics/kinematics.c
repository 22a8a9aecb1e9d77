/* kinematics.c - two-body elastic kinematics, in forms that do not cancel. */
#include "beamhours/physics/kinematics.h"

#include <math.h>
#include <stdbool.h>

#include "beamhours/base/sentences.h"
#include "beamhours/units/constants.h"

#define T_LEAST 1e-3 /* [MeV] */
#define T_MOST  1e6  /* [MeV], per u for what is heavier than 1 u */

/* What depends on the collision alone: textbook letters, [MeV] and powers of it. */
typedef struct {
    double m, M;  /* masses of beam and target */
    double T, E;  /* beam kinetic and total energy */
    double p2, p; /* beam momentum */
    double s;     /* Mandelstam s */
    double sum;   /* E + M */
    double mix;   /* M E + m^2 */
    double split; /* (M - m)(M + m), exact also for neighbours */
    double cm;    /* s / M p^2 */
    double back;  /* (E + M) / p */
} frame;

/* What the two ways in have to find before the rest is common. */
typedef struct {
    double angle, recoil_angle;
    double recoil;      /* recoil kinetic energy */
    double p_scattered; /* momenta */
    double p_recoil;
    double transverse2;
    double slope; /* p'^2 / root: |dt / dcos(angle)| / 2M */
} found;

static frame frame_of(const bh_collision *in)
{
    const double m = in->mass, M = in->target, T = in->kinetic;
    const double E = T + m, p2 = T * (T + 2.0 * m), p = sqrt(p2);
    const double s = (m + M) * (m + M) + 2.0 * M * T;
    return (frame){.m = m,
                   .M = M,
                   .T = T,
                   .E = E,
                   .p2 = p2,
                   .p = p,
                   .s = s,
                   .sum = E + M,
                   .mix = M * E + m * m,
                   .split = (M - m) * (M + m),
                   .cm = s / (M * p2),
                   .back = (E + M) / p};
}

static void finish(const frame *f, const found *x, bh_event *out)
{
    const double m = f->m, pp2 = x->p_scattered * x->p_scattered;
    const double kinetic = m > 0.0 ? pp2 / (sqrt(pp2 + m * m) + m) : x->p_scattered;
    const double q2 = 2.0 * f->M * x->recoil, k2 = x->transverse2;
    out->scattered_angle = x->angle;
    out->scattered_kinetic = kinetic;
    out->scattered_momentum = x->p_scattered;
    out->recoil_angle = x->recoil_angle;
    out->recoil_kinetic = x->recoil;
    out->recoil_momentum = x->p_recoil;
    out->beam_energy = f->E;
    out->beam_momentum = f->p;
    out->s = f->s;
    out->t = -q2;
    out->u = (f->split * f->split - k2 * (4.0 * f->M * f->M + q2)) / f->s;
    out->q2 = q2;
    out->transverse2 = k2;
    out->epsilon = (k2 + m * m) / (k2 + 0.5 * q2);
    out->cm_per_lab = f->cm * x->slope;
    out->scattered_per_recoil =
        x->p_recoil * (x->recoil + 2.0 * f->M) / (f->back * f->M * x->slope);
}

/*
 * The scattered momentum solves D p'^2 - 2 p c (M E + m^2) p' - p^2 (M^2 - m^2) = 0 with
 * D = (E + M)^2 - p^2 c^2 = s + p^2 sin^2; its two solutions multiply to a constant, which gives
 * the smaller one without a difference.  The recoil energy is p^2 (E sin^2 + M - c root) / D.
 */
static void at_scattered(const frame *f, double angle, bh_branch branch, bh_event *out)
{
    const double m = f->m, M = f->M, c = cos(angle), sn = sin(angle), s2 = sn * sn;
    const double root2 = (M - m * sn) * (M + m * sn);
    const double root = root2 > 0.0 ? sqrt(root2) : 0.0;
    const double D = f->s + f->p2 * s2, per_D = 1.0 / D;
    const double larger = fabs(c) * f->mix + f->sum * root; /* D/p times the larger |p'| */
    found x = {.angle = angle};
    double share; /* sin^2 (angle) p^2 / (D recoil) */
    if (c > 0.0 && branch == BH_BRANCH_FAST) {
        const double loss = f->E + (M * M + m * m * c * c) / (M + c * root);
        x.recoil = f->p2 * s2 * loss * per_D;
        x.p_scattered = f->p * larger * per_D;
        share = 1.0 / loss;
    } else {
        const double loss = f->E * s2 + M + fabs(c) * root;
        x.recoil = f->p2 * loss * per_D;
        x.p_scattered = f->p * fabs(f->split) / larger;
        share = s2 / loss;
    }
    const double pp2 = x.p_scattered * x.p_scattered;
    x.p_recoil = sqrt(x.recoil * (x.recoil + 2.0 * M));
    x.recoil_angle = (double)NAN;
    x.transverse2 = pp2 * D * share / (x.recoil + 2.0 * M);
    x.slope = pp2 / root;
    finish(f, &x, out);
}

/* Apart, as it takes as long as all the rest. */
static void add_recoil_angle(const frame *f, bh_event *e)
{
    const double sn = sin(e->scattered_angle);
    e->recoil_angle = e->recoil_kinetic > 0.0
                          ? atan2(e->scattered_momentum * sn, f->back * e->recoil_kinetic)
                          : 0.5 * BH_PI;
}

/* From the recoil's direction, cos^2 + sin^2 = 1 given apart because either may be tiny. */
static void at_recoil(const frame *f, double angle, double c2, double s2, bh_event *out)
{
    const double p2 = f->p2, M = f->M, D = f->s + p2 * s2;
    found x = {.recoil_angle = angle, .recoil = 2.0 * M * p2 * c2 / D};
    x.p_recoil = 2.0 * M * f->p * sqrt(c2) * f->sum / D;
    x.transverse2 = p2 * s2;
    const double along = f->p * (s2 * (p2 + 2.0 * M * f->sum) - f->split) / D;
    const double across = x.p_recoil * sqrt(s2);
    const double pp2 = along * along + across * across;
    x.p_scattered = sqrt(pp2);
    if (x.p_scattered > 0.0) {
        x.angle = atan2(across, along);
        x.slope = pp2 * x.p_scattered * D / (M * f->p * fabs(s2 * (p2 + 2.0 * f->mix) + f->split));
    } else {
        x.angle = 0.5 * BH_PI; /* equal masses, head on: the limit */
    }
    finish(f, &x, out);
}

static bh_code check_masses(const bh_collision *in, bh_error *err)
{
    /* Written as !(good) so that NaN is refused too. */
    if (!(in->mass >= 0.0 && in->mass <= 1e6 && in->target >= 0.1 && in->target <= 1e6))
        return bh_fail(err, BH_EDOMAIN,
                       "masses %g and %g MeV: need beam 0 to 1e6, target 0.1 to 1e6", in->mass,
                       in->target);
    return BH_OK;
}

/* [1] How far past both limits a step of a derivative may go. */
static const double beyond = 1e-3;

static double kinetic_most(const bh_collision *in)
{
    return T_MOST * fmax(1.0, in->mass / BH_MASS_U);
}

static bh_code check(const bh_collision *in, bh_error *err)
{
    const bh_code bad = check_masses(in, err);
    if (bad)
        return bad;
    if (!(in->kinetic >= T_LEAST * (1.0 - beyond) &&
          in->kinetic <= kinetic_most(in) * (1.0 + beyond)))
        return bh_fail(err, BH_EDOMAIN, BH_SAY_KINEMATICS_ENERGY, in->kinetic, T_LEAST,
                       kinetic_most(in));
    return BH_OK;
}

static bh_code check_angle(const bh_collision *in, double angle, bh_error *err)
{
    if (!(angle >= 0.0 && angle <= BH_PI))
        return bh_fail(err, BH_EDOMAIN, BH_SAY_KINEMATICS_ANGLE, angle / BH_DEGREE, 180.0);
    const double largest = bh_kinematics_largest_angle(in);
    if (angle > largest)
        return bh_fail(err, BH_EDOMAIN, BH_SAY_KINEMATICS_UNREACHABLE, angle / BH_DEGREE,
                       largest / BH_DEGREE);
    return BH_OK;
}

static bh_code check_epsilon(double epsilon, double a, double b, bh_error *err)
{
    const double least = fmin(a, b), most = fmax(a, b);
    if (!(epsilon >= least && epsilon <= most && least < most))
        return bh_fail(err, BH_EDOMAIN, BH_SAY_KINEMATICS_EPSILON, epsilon, least, most);
    return BH_OK;
}

bh_code bh_kinematics_scattered(const bh_collision *in, double angle, bh_branch branch,
                                bh_event *out, bh_error *err)
{
    bh_code bad = check(in, err);
    if (bad || (bad = check_angle(in, angle, err)))
        return bad;
    if (branch == BH_BRANCH_SLOW && !(in->mass > in->target))
        return bh_fail(err, BH_EDOMAIN, BH_SAY_KINEMATICS_ONE_BRANCH, in->mass, in->target);
    const frame f = frame_of(in);
    at_scattered(&f, angle, branch, out);
    add_recoil_angle(&f, out);
    return BH_OK;
}

void bh_kinematics_batch(const bh_collision *in, size_t n, const double *angle, bh_branch branch,
                         bh_event *out)
{
    const frame f = frame_of(in);
    for (size_t i = 0; i < n; i++)
        at_scattered(&f, angle[i], branch, &out[i]);
}

bool bh_kinematics_in_range(const bh_collision *in)
{
    return !check(in, NULL);
}

bh_code bh_kinematics_recoil(const bh_collision *in, double angle, bh_event *out, bh_error *err)
{
    const bh_code bad = check(in, err);
    if (bad)
        return bad;
    if (!(angle >= 0.0 && angle <= 0.5 * BH_PI))
        return bh_fail(err, BH_EDOMAIN, BH_SAY_KINEMATICS_RECOIL, angle / BH_DEGREE);
    const frame f = frame_of(in);
    const double c = cos(angle), sn = sin(angle);
    at_recoil(&f, angle, c * c, sn * sn, out);
    return BH_OK;
}

/* From q2: p^2 sin^2 = s (q2_max - q2) / (4 M^2 + q2) of the recoil angle. */
static void at_q2(const frame *f, double q2, double missing, bh_event *out)
{
    const double scale = 1.0 / (f->p2 * (4.0 * f->M * f->M + q2));
    const double c2 = fmin(q2 * f->sum * f->sum * scale, 1.0);
    const double s2 = fmin(f->s * missing * scale, 1.0);
    at_recoil(f, atan2(sqrt(s2), sqrt(c2)), c2, s2, out);
}

bh_code bh_kinematics_q2(const bh_collision *in, double q2, bh_event *out, bh_error *err)
{
    const bh_code bad = check(in, err);
    if (bad)
        return bad;
    const double largest = bh_kinematics_largest_q2(in);
    if (!(q2 >= 0.0 && q2 <= largest))
        return bh_fail(err, BH_EDOMAIN, BH_SAY_KINEMATICS_Q2, q2 * 1e-6, largest * 1e-6);
    const frame f = frame_of(in);
    at_q2(&f, q2, largest - q2, out);
    return BH_OK;
}

/* The solution of a x^2 + 2 b x = c that is positive; the smaller one if both are. */
static double positive_root(double a, double b, double c)
{
    const double root = sqrt(fmax(b * b + a * c, 0.0));
    if (b >= 0.0)
        return c / (b + root);
    return c >= 0.0 ? (root - b) / a : c / (b - root);
}

/*
 * transverse2 + m^2 = epsilon (transverse2 + q2/2) is a quadratic in q2.  Between the values of
 * epsilon forward and head on, exactly one of its solutions can be reached.
 */
bh_code bh_kinematics_epsilon(const bh_collision *in, double epsilon, bh_event *out, bh_error *err)
{
    bh_code bad = check(in, err);
    if (bad)
        return bad;
    const frame f = frame_of(in);
    const double m2 = f.m * f.m, M2 = f.M * f.M, q2_most = bh_kinematics_largest_q2(in);
    const double forward = 1.0 + m2 / f.p2;
    if ((bad = check_epsilon(epsilon, 2.0 * m2 / q2_most, forward, err)))
        return bad;
    const double b = 0.5 * (f.s * (1.0 - epsilon) - m2 + 2.0 * epsilon * M2);
    const double c = 4.0 * M2 * f.p2 * (forward - epsilon);
    const double q2 = fmin(positive_root(0.5 * epsilon, b, c), q2_most);
    at_q2(&f, q2, q2_most - q2, out);
    return BH_OK;
}

double bh_kinematics_largest_angle(const bh_collision *in)
{
    if (in->mass > in->target)
        return asin(in->target / in->mass);
    return in->mass < in->target ? BH_PI : 0.5 * BH_PI;
}

double bh_kinematics_largest_q2(const bh_collision *in)
{
    const frame f = frame_of(in);
    return 4.0 * f.M * f.M * f.p2 / f.s;
}

int bh_kinematics_branches(const bh_collision *in, double angle)
{
    const double largest = bh_kinematics_largest_angle(in);
    if (!(angle >= 0.0 && angle <= largest))
        return 0;
    return in->mass > in->target && angle < largest ? 2 : 1;
}

/* The beam kinetic energy from e = E - recoil/2, of which e^2 - m^2 is `excess`. */
static bh_code beam_energy(const bh_collision *in, double excess, double recoil, double *kinetic,
                           bh_error *err)
{
    const double m = in->mass;
    const double T = 0.5 * recoil + (m > 0.0 ? excess / (sqrt(excess + m * m) + m) : sqrt(excess));
    if (!(T >= T_LEAST && T <= kinetic_most(in)))
        return bh_fail(err, BH_EDOMAIN, BH_SAY_KINEMATICS_ENERGY, T, T_LEAST, kinetic_most(in));
    *kinetic = T;
    return BH_OK;
}

/* q2 fixes the recoil energy v, so that E E' - m^2 solves
 * (w - q2/2)^2 = cos^2 (w^2 - m^2 v^2); and e^2 - m^2 = w + v^2/4. */
bh_code bh_kinematics_energy(const bh_collision *in, double q2, double angle, double *kinetic,
                             bh_error *err)
{
    bh_code bad = check_masses(in, err);
    if (bad || (bad = check_angle(in, angle, err)))
        return bad;
    if (!(q2 > 0.0 && q2 <= 1e18 && angle > 0.0))
        return bh_fail(err, BH_EDOMAIN, BH_SAY_KINEMATICS_NO_ENERGY, q2 * 1e-6, angle / BH_DEGREE);
    const double m = in->mass, M = in->target, c = cos(angle), sn = sin(angle);
    const double root2 = (M - m * sn) * (M + m * sn);
    const double root = root2 > 0.0 ? sqrt(root2) : 0.0;
    const double part =
        c > 0.0 ? (M + c * root) / (sn * sn) : (M * M + m * m * c * c) / (M - c * root);
    const double recoil = 0.5 * q2 / M;
    return beam_energy(in, recoil * part + 0.25 * recoil * recoil, recoil, kinetic, err);
}

/* epsilon and q2 fix transverse2 + m^2, and (2e)^2 = (1 + tau)(4 (transverse2 + m^2) + q2). */
bh_code bh_kinematics_energy_epsilon(const bh_collision *in, double q2, double epsilon,
                                     double *kinetic, bh_error *err)
{
    const bh_code bad = check_masses(in, err);
    if (bad)
        return bad;
    if (!(q2 > 0.0 && q2 <= 1e18))
        return bh_fail(err, BH_EDOMAIN, BH_SAY_KINEMATICS_NO_ENERGY, q2 * 1e-6, 0.0);
    const double m2 = in->mass * in->mass, limit = 2.0 * m2 / q2; /* epsilon head on */
    const double transverse2 = 0.5 * (epsilon * q2 - 2.0 * m2) / (1.0 - epsilon);
    if (!(epsilon >= 0.0 && transverse2 >= 0.0 && transverse2 <= 1e18))
        return bh_fail(err, BH_EDOMAIN, BH_SAY_KINEMATICS_EPSILON, epsilon, fmin(limit, 1.0),
                       fmax(limit, 1.0));
    const double recoil = 0.5 * q2 / in->target, tau = 0.5 * recoil / in->target;
    const double excess = transverse2 + tau * (transverse2 + m2) + 0.25 * q2 * (1.0 + tau);
    return beam_energy(in, excess, recoil, kinetic, err);
}

static double epsilon_at(const bh_collision *in, double kinetic, double angle)
{
    bh_event e;
    const bh_collision at = {in->mass, in->target, kinetic};
    bh_kinematics_batch(&at, 1, &angle, BH_BRANCH_FAST, &e);
    return e.epsilon;
}

/* epsilon falls with the energy at a fixed angle: halve the range of log T. */
bh_code bh_kinematics_energy_angle_epsilon(const bh_collision *in, double angle, double epsilon,
                                           double *kinetic, bh_error *err)
{
    bh_code bad = check_masses(in, err);
    if (bad || (bad = check_angle(in, angle, err)))
        return bad;
    if (in->mass > in->target)
        return bh_fail(err, BH_EDOMAIN, BH_SAY_KINEMATICS_HEAVY, in->mass, in->target);
    const double most = kinetic_most(in);
    bad = check_epsilon(epsilon, epsilon_at(in, T_LEAST, angle), epsilon_at(in, most, angle), err);
    if (bad)
        return bad;
    double lo = log(T_LEAST), hi = log(most);
    for (int i = 0; i < 60; i++) {
        const double mid = 0.5 * (lo + hi);
        *(epsilon_at(in, exp(mid), angle) > epsilon ? &lo : &hi) = mid;
    }
    *kinetic = exp(0.5 * (lo + hi));
    return BH_OK;
}
