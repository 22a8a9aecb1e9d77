/* soft_photons.c - integrals over soft photons, closed but for the smallest momentum transfers. */
#include "beamhours/physics/soft_photons.h"

#include <math.h>

#include "beamhours/physics/dilog.h"
#include "beamhours/units/constants.h"

#define ALPHA_PI (BH_ALPHA / BH_PI)
/* Rapidity between the two momenta below which the closed form of their integral has cancelled too
 * far, and 16 points are exact. */
#define SMALL    0.5

/* A momentum in the rest frame of the recoil, where the cut is a sphere. */
typedef struct {
    double mass, energy, momentum;
} bh_ray;

bh_soft bh_soft_of(const bh_collision *in, const bh_event *e, double cut)
{
    const double E3 = e->scattered_kinetic + in->mass;
    const double turn = e->beam_momentum * E3 * cos(e->scattered_angle) / e->scattered_momentum;
    return (bh_soft){.mass = in->mass,
                     .target = in->target,
                     .beam_energy = e->beam_energy,
                     .scattered_energy = E3,
                     .beam_momentum = e->beam_momentum,
                     .scattered_momentum = e->scattered_momentum,
                     .angle = e->scattered_angle,
                     .q2 = e->q2,
                     .slope = 1.0 + (e->beam_energy - turn) / in->target,
                     .cut = cut};
}

/* (E/P) ln((E + P)/m): an energy logarithm of a photon along one momentum. */
static double along(const bh_ray *a)
{
    const double w = a->momentum / a->mass;
    return w > 0.0 ? a->energy / a->momentum * asinh(w) : 1.0;
}

/* 't Hooft & Veltman's bracket at one end. */
static double bracket(const bh_ray *a, double v)
{
    const double sum = a->energy + a->momentum, l = log(a->mass / sum);
    return l * l + bh_dilog(1.0 - sum / v) + bh_dilog(1.0 - a->mass * a->mass / (sum * v));
}

/* (pa pb) int dx / px^2 (E/2P) ln((E + P)/(E - P)), px between `a` and `b`; `product` = pa pb and
 * `root` = sqrt(product^2 - ma^2 mb^2) > 0. */
static double energies(const bh_ray *a, const bh_ray *b, double product, double root)
{
    const double stretch = (product + root) / (a->mass * a->mass);
    const double v = root * stretch / (stretch * a->energy - b->energy);
    const bh_ray far = {stretch * a->mass, stretch * a->energy, stretch * a->momentum};
    return 0.5 * product / root * (bracket(b, v) - bracket(&far, v));
}

/* The same for equal masses a small rapidity `chi` apart, as an integral over the rapidity. */
static double energies_near(const bh_ray *a, const bh_ray *b, double chi)
{
    const double scale = 1.0 / (a->mass * sinh(chi));
    double sum = 0.0;
    for (int i = 0; i < 16; i++) {
        const double node = i < 8 ? bh_gauss16_node[i] : -bh_gauss16_node[i - 8];
        const double x = 0.5 * chi * (1.0 + node);
        const double e = scale * (a->energy * sinh(x) + b->energy * sinh(chi - x));
        const bh_ray between = {1.0, e, sqrt(fmax((e - 1.0) * (e + 1.0), 0.0))};
        sum += bh_gauss16_weight[i % 8] * along(&between);
    }
    return 0.5 * chi * sum / tanh(chi);
}

/* The rapidity between the momenta of a particle of mass `m` before and after. */
static double rapidity(double m, double q2)
{
    return 2.0 * asinh(0.5 * sqrt(q2) / m);
}

/* int x coth x dx from 0 to `chi`: what `energies` is, over product / root, where one of the two is
 * at rest and the other `chi` away in rapidity. */
static double from_rest(double chi)
{
    const double x2 = chi * chi;
    if (chi < 0.02)
        return chi * (1.0 + x2 * (1.0 / 9.0 - x2 * (1.0 / 225.0 - x2 * (2.0 / 6615.0))));
    const double e = exp(-2.0 * chi);
    return 0.5 * x2 + chi * log1p(-e) + 0.5 * (BH_PI * BH_PI / 6.0 - bh_dilog(e));
}

/* I_aa + I_bb - 2 I_ab of one particle before and after: the photon mass its own mass, `photon` the
 * energy that photons may take, `between` the integral of energies. */
static double leg(double chi, double photon, double mass, double alone, double between)
{
    return 2.0 * log(2.0 * photon / mass) * (1.0 - chi / tanh(chi)) - alone + 2.0 * between;
}

/* K(pa, pb) of one particle before and after, the photon mass its own mass. */
static double vertex(double chi)
{
    const double e = exp(-chi);
    return (0.5 * chi * chi + 2.0 * chi * log1p(e) - BH_PI * BH_PI / 6.0 - 2.0 * bh_dilog(-e)) /
           tanh(chi);
}

double bh_soft_lepton(const bh_soft *in)
{
    if (in->q2 == 0.0)
        return 0.0;
    const double chi = rapidity(in->mass, in->q2);
    /* in that frame beam and scattered exchange their energies */
    const bh_ray before = {in->mass, in->scattered_energy, in->scattered_momentum};
    const bh_ray after = {in->mass, in->beam_energy, in->beam_momentum};
    const double m2 = in->mass * in->mass;
    const double between = chi < SMALL
                               ? energies_near(&before, &after, chi)
                               : energies(&before, &after, m2 + 0.5 * in->q2, m2 * sinh(chi));
    const double real =
        leg(chi, in->slope * in->cut, in->mass, along(&before) + along(&after), between);
    const double t = tanh(0.5 * chi);
    const double f1 = (1.0 / t + 0.5 * t) * chi - 2.0 - vertex(chi);
    return ALPHA_PI * (f1 - real);
}

static double recoil_momentum(const bh_soft *in)
{
    return sqrt(in->q2 * (1.0 + 0.25 * in->q2 / (in->target * in->target)));
}

double bh_soft_target(const bh_soft *in)
{
    if (in->q2 == 0.0)
        return 0.0;
    const double M = in->target, chi = rapidity(M, in->q2);
    const double ratio = 1.0 / tanh(chi); /* E4 / p4 */
    const double real = leg(chi, in->slope * in->cut, M, ratio * chi + 1.0, ratio * from_rest(chi));
    return -ALPHA_PI * (real + vertex(chi));
}

static double rate_of(double mass, double q2)
{
    if (q2 == 0.0)
        return 0.0;
    const double chi = rapidity(mass, q2);
    return 2.0 * ALPHA_PI * (chi / tanh(chi) - 1.0);
}

double bh_soft_rate(const bh_soft *in)
{
    return rate_of(in->mass, in->q2);
}

double bh_soft_target_rate(const bh_soft *in)
{
    return rate_of(in->target, in->q2);
}

/* The four pairs of lepton and target, without the logarithm of the photon's energy. */
static double pairs(const bh_soft *in)
{
    const double M = in->target, E1 = in->beam_energy, E3 = in->scattered_energy;
    const double p1 = in->beam_momentum, p3 = in->scattered_momentum;
    const bh_ray before = {in->mass, E3, p3}, after = {in->mass, E1, p1};
    const bh_ray struck = {M, M + 0.5 * in->q2 / M, recoil_momentum(in)};
    return energies(&before, &struck, M * E1, M * p1) + E1 / p1 * from_rest(asinh(p1 / in->mass)) -
           energies(&after, &struck, M * E3, M * p3) - E3 / p3 * from_rest(asinh(p3 / in->mass));
}

/* (p1 p2) int dx / px^2 - (p1 p4) int dx / px^2 */
static double infrared(const bh_soft *in)
{
    return in->beam_energy / in->beam_momentum * asinh(in->beam_momentum / in->mass) -
           in->scattered_energy / in->scattered_momentum * asinh(in->scattered_momentum / in->mass);
}

double bh_soft_interference(const bh_soft *in)
{
    if (in->q2 == 0.0)
        return 0.0;
    const double l = 2.0 * log(2.0 * in->slope * in->cut / sqrt(in->q2));
    return 2.0 * ALPHA_PI * (pairs(in) - infrared(in) * l);
}

double bh_soft_interference_rate(const bh_soft *in)
{
    return in->q2 == 0.0 ? 0.0 : -4.0 * ALPHA_PI * infrared(in);
}

/* K of lepton and target with the lepton's energy `e` and momentum `p`, photon mass the lepton's */
static double box(const bh_soft *in, double e, double p)
{
    const double m = in->mass, M = in->target, up = (e + p) / m, chi = asinh(p / m);
    const double a = M - m / up, c = (M - m * up) / a;
    return e / p *
           (2.0 * chi * log(2.0 * M * p / (m * a)) - chi * chi - bh_dilog(c / (up * up)) +
            bh_dilog(c));
}

double bh_soft_interference_tsai(const bh_soft *in)
{
    if (in->q2 == 0.0)
        return 0.0;
    const double l = 2.0 * log(2.0 * in->slope * in->cut / in->mass);
    return 2.0 * ALPHA_PI *
           (pairs(in) - infrared(in) * l + box(in, in->beam_energy, in->beam_momentum) -
            box(in, in->scattered_energy, in->scattered_momentum));
}
