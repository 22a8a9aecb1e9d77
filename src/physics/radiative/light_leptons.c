/* light_leptons.c - the published forms for leptons far lighter than their momentum transfer. */
#include <math.h>

#include "beamhours/physics/dilog.h"
#include "beamhours/physics/soft_photons.h"
#include "beamhours/units/constants.h"

#define ALPHA_PI (BH_ALPHA / BH_PI)

double bh_soft_lepton_light(const bh_soft *in)
{
    const double E1 = in->beam_energy, E3 = in->scattered_energy, eta = in->slope;
    const double L = log(in->q2 / (in->mass * in->mass)), lost = 2.0 * eta * in->cut;
    const double cosine = cos(0.5 * in->angle), turn = log(eta);
    return ALPHA_PI * (1.5 * L - 2.0 - (L - 1.0) * log(4.0 * E1 * E3 / (lost * lost)) -
                       0.5 * turn * turn + bh_dilog(cosine * cosine) - BH_PI * BH_PI / 6.0);
}

double bh_soft_interference_light(const bh_soft *in)
{
    const double M4 = 4.0 * in->target * in->target, eta = in->slope;
    const double Q = sqrt(in->q2), x = (Q + sqrt(in->q2 + M4)) * (Q + sqrt(in->q2 + M4)) / M4;
    const double lost = 2.0 * eta * in->cut;
    return 2.0 * ALPHA_PI *
           (log(eta) * log(in->q2 * x / (lost * lost)) - bh_dilog(1.0 - eta / x) +
            bh_dilog(1.0 - 1.0 / (eta * x)));
}

/* l ln|a/b| where either may vanish together with l; the limit is 0. */
static double log_times(double a, double b, double l)
{
    return l == 0.0 || a == 0.0 || b == 0.0 ? 0.0 : l * log(fabs(a / b));
}

/* One pair of II.6 with the struck particle on the other side: `e` the lepton's energy on this
 * side, `other` on the other, E4 the recoil's.  Where d vanishes its terms go together to a finite
 * limit.
 */
static double crossed(double M, double E4, double e, double other)
{
    const double exact = 2.0 * e * E4 - M * other, least = 1e-9 * M * other, gap = E4 - other;
    const double d = fabs(exact) > least ? exact : least;
    return bh_dilog(-gap / other) - bh_dilog(M * gap / d) + bh_dilog(2.0 * e * gap / d) +
           log_times(d, other * (M - 2.0 * e), log(0.5 * M / e));
}

/* A pair with the target at rest. */
static double straight(double M, double e)
{
    const double gap = M - e;
    return bh_dilog(-gap / e) - bh_dilog(gap / e) + bh_dilog(2.0 * gap / M) +
           log_times(M, 2.0 * e - M, log(0.5 * M / e));
}

/* The terms of Z^2; their sum vanishes with q2, and so below 1e-8 of the rest mass. */
static double struck(const bh_soft *in)
{
    const double M = in->target, kinetic = 0.5 * in->q2 / M, E4 = M + kinetic;
    if (kinetic < 1e-8 * M)
        return 0.0;
    const double velocity = sqrt(kinetic * (E4 + M)) / E4, chi = 2.0 * atanh(velocity);
    const double half = sqrt(kinetic / (E4 + M)), up = exp(0.5 * chi); /* half = tanh(chi/4) */
    const double dilogs =
        bh_dilog(half / up) - bh_dilog(-half * up) + bh_dilog(-half) - bh_dilog(half);
    return -log(E4 / M) + log(M / (in->slope * in->cut)) * (chi / velocity - 2.0) +
           (0.5 * chi * log(0.5 * (E4 + M) / M) + dilogs) / velocity;
}

bh_soft_parts bh_soft_mo_tsai(const bh_soft *in)
{
    const double E1 = in->beam_energy, E3 = in->scattered_energy, M = in->target;
    const double E4 = M + 0.5 * in->q2 / M, L = log(in->q2 / (in->mass * in->mass));
    const double lost = 2.0 * log(E1 / in->cut) - 3.0 * log(in->slope);
    const double dilogs = bh_dilog((E3 - E1) / E3) + bh_dilog((E1 - E3) / E1);
    const double interference = 2.0 * log(in->slope) * lost + crossed(M, E4, E3, E1) -
                                crossed(M, E4, E1, E3) - straight(M, E1) + straight(M, E3);
    /* -28/9 + 13/6 L there has the electron's vacuum polarisation, -10/9 + 2/3 L, inside */
    return (bh_soft_parts){.lepton = ALPHA_PI * (1.5 * L - 2.0 - (L - 1.0) * lost + dilogs),
                           .interference = ALPHA_PI * interference,
                           .target = -ALPHA_PI * struck(in)};
}
