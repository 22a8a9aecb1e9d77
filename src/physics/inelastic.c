/* inelastic.c - which fit of F2 and R stands for proton and deuteron, where, and how they join. */
#include "beamhours/physics/inelastic.h"

#include <math.h>
#include <stdbool.h>

#include "beamhours/base/sentences.h"
#include "beamhours/physics/structure_functions.h"
#include "beamhours/units/constants.h"

#define GEV2 1e6 /* [MeV^2] */
#define M    BH_MASS_PROTON

static const double meson2 = 1.151863e6;       /* [MeV^2] (M + 134.977 MeV)^2: a pi0 at rest */
static const double lowest_w2 = 1.18 * 1.18e6; /* [MeV^2] */
static const double join_from = 3.2e6, join_to = 4.0e6; /* [MeV^2] */
static const double resonances_q2 = 0.3e6, deep_q2 = 0.5e6, resonances_q2_most = 20e6;
static const double x_least = 0.006, x_most = 0.86;

double bh_inelastic_w2(const bh_transfer *at)
{
    return M * M + 2.0 * M * at->lost - at->q2;
}

static double bjorken(const bh_transfer *at)
{
    return at->q2 / (2.0 * M * at->lost);
}

/* R_T = 2 W1 and R_L = (q^2/Q2)^2 W2 - (q^2/Q2) W1 with W2 = F2 / lost. */
static double with_f2(const bh_inclusive *in, const bh_transfer *at, double f2, double r)
{
    const double w2 = f2 / at->lost, ratio = at->q * at->q / at->q2;
    const double transverse = 2.0 * w2 * ratio / (1.0 + r);
    return bh_inclusive_cross_section(in, at, 0.5 * ratio * transverse * r, transverse);
}

static double deep(int nucleons, const bh_inclusive *in, const bh_transfer *at)
{
    const double x = bjorken(at), q2 = at->q2 / GEV2;
    const double f2 = nucleons > 1 ? 2.0 * bh_f2_nmc95_deuteron(x, q2) : bh_f2_allm97(x, q2);
    return with_f2(in, at, f2, bh_r_1998(x, q2));
}

static double resonant(int nucleons, const bh_inclusive *in, const bh_transfer *at)
{
    const double w = sqrt(bh_inelastic_w2(at) / GEV2), q2 = at->q2 / GEV2;
    double f2 = bh_f2_bodek79_proton(w, q2);
    if (nucleons > 1)
        f2 += bh_f2_bodek79_neutron(w, q2);
    return with_f2(in, at, f2, 0.18);
}

double bh_inelastic_cross_section(int nucleons, const bh_inclusive *in, const bh_transfer *at)
{
    const double w2 = bh_inelastic_w2(at);
    if (!(w2 > meson2) || !(at->q2 > 0.0))
        return 0.0;
    if (w2 >= join_to)
        return deep(nucleons, in, at);
    const double low = resonant(nucleons, in, at);
    if (w2 <= join_from)
        return low;
    const double s = (w2 - join_from) / (join_to - join_from), share = s * s * (3.0 - 2.0 * s);
    return (1.0 - share) * low + share * deep(nucleons, in, at);
}

double bh_inelastic_uncertainty(int nucleons, const bh_transfer *at)
{
    if (bh_inelastic_w2(at) > join_to)
        return 0.05;
    return nucleons > 1 ? 0.20 : 0.10;
}

/* Energy loss in excess of what leaves the deuteron whole or just broken. */
static bool breaks_up(const bh_transfer *at)
{
    const double free = BH_MASS_PROTON + BH_MASS_NEUTRON, d = BH_MASS_DEUTERON;
    return 2.0 * d * at->lost - at->q2 > (free - d) * (free + d);
}

static const char *deep_outside(const bh_transfer *at)
{
    const double x = bjorken(at);
    if (at->q2 < deep_q2)
        return BH_SAY_INELASTIC_Q2;
    return x > x_most || x < x_least ? BH_SAY_INELASTIC_X : NULL;
}

const char *bh_inelastic_outside(int nucleons, const bh_transfer *at)
{
    const double w2 = bh_inelastic_w2(at);
    if (nucleons > 1 && !breaks_up(at))
        return NULL;
    if (w2 < (nucleons > 1 ? lowest_w2 : meson2))
        return nucleons > 1 ? BH_SAY_INELASTIC_BREAKUP : NULL;
    if (w2 < lowest_w2)
        return BH_SAY_INELASTIC_LOW;
    if (at->q2 < resonances_q2)
        return BH_SAY_INELASTIC_Q2;
    if (w2 < join_to && at->q2 > resonances_q2_most)
        return BH_SAY_INELASTIC_Q2_MOST;
    return w2 > join_from ? deep_outside(at) : NULL;
}

size_t bh_inelastic_edges(int nucleons, const bh_inclusive *in, double edge[BH_INELASTIC_EDGES])
{
    const double masses[] = {meson2, lowest_w2, join_from, join_to};
    const double transfers[] = {resonances_q2, deep_q2, resonances_q2_most};
    const double shares[] = {x_least, x_most};
    const double free = BH_MASS_PROTON + BH_MASS_NEUTRON, d = BH_MASS_DEUTERON;
    size_t n = 0;
    for (size_t i = 0; i < sizeof masses / sizeof masses[0]; i++)
        n += bh_inclusive_at_q2(in, M * M - masses[i], 2.0 * M, edge + n);
    for (size_t i = 0; i < sizeof transfers / sizeof transfers[0]; i++)
        n += bh_inclusive_at_q2(in, transfers[i], 0.0, edge + n);
    for (size_t i = 0; i < sizeof shares / sizeof shares[0]; i++)
        n += bh_inclusive_at_q2(in, 0.0, 2.0 * M * shares[i], edge + n);
    if (nucleons > 1)
        n += bh_inclusive_at_q2(in, (d - free) * (d + free), 2.0 * d, edge + n);
    return n;
}
