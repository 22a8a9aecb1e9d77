/* inclusive.c - transfer of energy and momentum by a lepton, and the lepton's tensor. */
#include "beamhours/physics/inclusive.h"

#include <math.h>

#include "beamhours/units/constants.h"

double bh_inclusive_beam(const bh_inclusive *in)
{
    return sqrt(in->kinetic * (in->kinetic + 2.0 * in->mass));
}

bh_transfer bh_inclusive_transfer(const bh_inclusive *in, double momentum)
{
    const double m2 = in->mass * in->mass, p = bh_inclusive_beam(in);
    const double half = sin(0.5 * in->angle), E = in->kinetic + in->mass;
    bh_transfer out = {.momentum = momentum, .energy = sqrt(momentum * momentum + m2)};
    out.lost = (p - momentum) * (p + momentum) / (E + out.energy);
    /* q^2 and Q2 as sums of what does not cancel: the step of momentum and the turn */
    const double step = p - momentum, turn = 4.0 * p * momentum * half * half;
    const double q2 = step * step + turn;
    out.q = sqrt(q2);
    /* step^2 - lost^2, as a product whose second factor vanishes with the mass */
    const double slow = step + out.lost;
    const double slip = m2 / (E + p) + (m2 > 0.0 ? m2 / (out.energy + momentum) : 0.0);
    const double fast = step * slip / (E + out.energy);
    out.q2 = slow * fast + turn;
    return out;
}

double bh_inclusive_cross_section(const bh_inclusive *in, const bh_transfer *at,
                                  double longitudinal, double transverse)
{
    const double p = bh_inclusive_beam(in), q2 = at->q * at->q, share = at->q2 / q2;
    const double sum = in->kinetic + in->mass + at->energy, K = (sum - at->q) * (sum + at->q);
    const double lepton = BH_ALPHA / at->q2;
    const double across = 0.5 * K * share + at->q2 - 2.0 * in->mass * in->mass;
    return BH_HBARC2_UB * lepton * lepton * at->momentum / p *
           (K * share * share * longitudinal + across * transverse);
}

/* Those roots of a x^2 - 2 b x + c = 0 (a > 0) that are 0 or more. */
static size_t roots(double a, double b, double c, double x[2])
{
    const double inside = b * b - a * c;
    if (!(inside >= 0.0))
        return 0;
    const double far = b >= 0.0 ? b + sqrt(inside) : b - sqrt(inside);
    const double both[2] = {far / a, far != 0.0 ? c / far : 0.0};
    size_t count = 0;
    for (size_t i = 0; i < 2; i++)
        if (both[i] >= 0.0)
            x[count++] = both[i];
    return count;
}

size_t bh_inclusive_at_q(const bh_inclusive *in, double q, double momentum[2])
{
    const double p = bh_inclusive_beam(in);
    return roots(1.0, p * cos(in->angle), (p - q) * (p + q), momentum);
}

/* With Q2 = 2 E E' - 2 p p' cos(angle) - 2 m^2 the condition is (E + b/2) E' - p cos(angle) p' =
 * constant, squared once. */
size_t bh_inclusive_at_q2(const bh_inclusive *in, double a, double b, double momentum[2])
{
    const double p = bh_inclusive_beam(in), pc = p * cos(in->angle), m2 = in->mass * in->mass;
    const double E = in->kinetic + in->mass, slope = E + 0.5 * b;
    const double constant = 0.5 * a + 0.5 * b * E + m2;
    const double first = (slope - pc) * (slope + pc);
    double both[2];
    size_t count = 0;
    const size_t found =
        roots(first, constant * pc, slope * slope * m2 - constant * constant, both);
    for (size_t i = 0; i < found; i++)
        if (constant + pc * both[i] >= 0.0) /* else a root of the squared condition alone */
            momentum[count++] = both[i];
    return count;
}
