/* quasi_elastic.c - responses of a nucleus from those of its nucleons, by Fermi gas or scaling. */
#include "beamhours/physics/quasi_elastic.h"

#include <math.h>
#include <stddef.h>

#include "beamhours/base/sentences.h"
#include "beamhours/physics/form_factor.h"
#include "beamhours/units/constants.h"
#include "beamhours/units/nuclide.h"

#define NUCLEON    (0.5 * (BH_MASS_PROTON + BH_MASS_NEUTRON)) /* [MeV] */
#define TRANSVERSE 1.65 /* R_T of the scaling model, fitted to published spectra of 12C */

typedef struct {
    double a, fermi, shift;
} gas;

/* Table I of each; a mean A where the sample was natural. */
static const gas maieron[] = {
    {6, 165, 15},  {12, 228, 20},   {24, 230, 25},    {27, 236, 18},  {40, 241, 28},
    {56, 241, 23}, {58.7, 245, 30}, {118.7, 245, 28}, {197, 245, 25}, {208, 248, 31},
};
static const gas moniz[] = {
    {6, 169, 17},  {12, 221, 25},    {24, 235, 32},  {40, 251, 28},  {58.7, 260, 36},
    {89, 254, 39}, {118.7, 260, 42}, {181, 265, 42}, {208, 265, 44},
};

bh_code bh_quasi_find(int z, int a, bh_quasi_model model, bh_quasi_nucleus *out, bh_error *err)
{
    const gas *table = model == BH_QUASI_SCALING ? maieron : moniz;
    const size_t size = model == BH_QUASI_SCALING ? sizeof maieron / sizeof maieron[0]
                                                  : sizeof moniz / sizeof moniz[0];
    if (a < 6 || z < 1 || z > a) {
        char name[8];
        return bh_fail(err, BH_EDOMAIN, BH_SAY_QUASI_NUCLEUS, bh_nuclide_name(z, a, name));
    }
    size_t i = 1;
    while (i + 1 < size && table[i].a < a)
        i++;
    const gas *lo = &table[i - 1], *hi = &table[i];
    const double s = fmin((a - lo->a) / (hi->a - lo->a), 1.0);
    *out = (bh_quasi_nucleus){
        .z = z,
        .n = a - z,
        .model = model,
        .fermi = lo->fermi + s * (hi->fermi - lo->fermi),
        .shift = lo->shift + s * (hi->shift - lo->shift),
        .interpolated = a != lo->a && a != hi->a, /* isobars share a row: only a counts */
    };
    return BH_OK;
}

/* Momentum and energy over twice the nucleon's mass, and what follows. */
typedef struct {
    double kappa, lambda, tau;
} reduced;

static reduced reduce(const bh_transfer *at, double shift)
{
    const double k = at->q / (2.0 * NUCLEON), l = (at->lost - shift) / (2.0 * NUCLEON);
    return (reduced){k, l, (k - l) * (k + l)};
}

static double fermi_energy(const bh_quasi_nucleus *nucleus) /* kinetic, over the mass */
{
    const double eta2 = nucleus->fermi * nucleus->fermi / (NUCLEON * NUCLEON);
    return eta2 / (sqrt(1.0 + eta2) + 1.0);
}

static double psi_of(const reduced *x, double xi)
{
    const double root = (1.0 + x->lambda) * x->tau + x->kappa * sqrt(x->tau * (1.0 + x->tau));
    return (x->lambda - x->tau) / sqrt(xi * root);
}

double bh_quasi_psi(const bh_quasi_nucleus *nucleus, const bh_transfer *at)
{
    const reduced x = reduce(at, nucleus->shift);
    return psi_of(&x, fermi_energy(nucleus));
}

/* The nucleons' responses, divided by kappa and without the distribution of momenta: `x` of the
 * nucleon, `deep` [1] the Fermi energy not yet used, xi (1 - psi^2). */
static void nucleons(const bh_quasi_nucleus *nucleus, const reduced *x, double deep, double g[2])
{
    double p[BH_FACTORS_MOST], n[BH_FACTORS_MOST];
    const double q2 = 4.0 * NUCLEON * NUCLEON * x->tau, t = x->tau, k = x->kappa;
    bh_kelly_proton(NULL, q2, p);
    bh_kelly_neutron(NULL, q2, n);
    const double ge2 = nucleus->z * p[0] * p[0] + nucleus->n * n[0] * n[0];
    const double gm2 = nucleus->z * p[1] * p[1] + nucleus->n * n[1] * n[1];
    const double w2 = (ge2 + t * gm2) / (1.0 + t);
    const double motion = deep * (sqrt(t * (1.0 + t)) / k + deep * t / (3.0 * k * k));
    g[0] = k / (2.0 * t) * (ge2 + w2 * motion);
    g[1] = (2.0 * t * gm2 + w2 * motion) / (2.0 * k);
}

static void fermi_gas(const bh_quasi_nucleus *nucleus, const bh_transfer *at, double response[2])
{
    const reduced x = reduce(at, nucleus->shift);
    const double xi = fermi_energy(nucleus), psi = psi_of(&x, xi), inside = 1.0 - psi * psi;
    response[0] = response[1] = 0.0;
    if (!(inside > 0.0))
        return;
    const double eta = nucleus->fermi / NUCLEON;
    const double weight = 1.5 * xi * inside / (NUCLEON * eta * eta * eta);
    nucleons(nucleus, &x, xi * inside, response);
    response[0] *= weight;
    response[1] *= weight;
}

static double maieron_f(double psi)
{
    const double y = 1.9438 * (psi + 0.6731);
    return 2.9883 / ((1.0 + y * y) * (1.0 + exp(-3.8538 * psi)));
}

static double tsai_suppression(double q, double fermi)
{
    const double r = q / fermi;
    return r < 2.0 ? 0.75 * r * (1.0 - r * r / 12.0) : 1.0;
}

/* The shift enters psi' alone; what the nucleons answer is taken at the unshifted energy. */
static void scaling(const bh_quasi_nucleus *nucleus, const bh_transfer *at, double response[2])
{
    const reduced x = reduce(at, 0.0);
    const double xi = fermi_energy(nucleus), psi = psi_of(&x, xi);
    const double f = maieron_f(bh_quasi_psi(nucleus, at)) / nucleus->fermi;
    const double weight =
        f * tsai_suppression(at->q, nucleus->fermi) / (1.0 + 0.5 * xi * (1.0 + psi * psi));
    nucleons(nucleus, &x, xi * (1.0 - psi * psi), response);
    response[0] *= weight;
    response[1] *= weight * TRANSVERSE;
}

void bh_quasi_responses(const bh_quasi_nucleus *nucleus, const bh_transfer *at,
                        double *longitudinal, double *transverse)
{
    double response[2] = {0.0, 0.0};
    if (at->lost > nucleus->shift && at->q2 > 0.0)
        (nucleus->model == BH_QUASI_SCALING ? scaling : fermi_gas)(nucleus, at, response);
    *longitudinal = response[0] > 0.0 ? response[0] : 0.0;
    *transverse = response[1] > 0.0 ? response[1] : 0.0;
}

double bh_quasi_cross_section(const bh_quasi_nucleus *nucleus, const bh_inclusive *in,
                              const bh_transfer *at)
{
    double longitudinal, transverse;
    if (!(at->lost > nucleus->shift) || !(at->q2 > 0.0))
        return 0.0;
    bh_quasi_responses(nucleus, at, &longitudinal, &transverse);
    return bh_inclusive_cross_section(in, at, longitudinal, transverse);
}

double bh_quasi_uncertainty(const bh_quasi_nucleus *nucleus, double psi)
{
    if (psi < -1.0)
        return 0.50;
    if (nucleus->z != 6 || nucleus->n != 6)
        return 0.20;
    return fabs(psi) < 0.4 ? 0.05 : 0.15;
}

const char *bh_quasi_outside(const bh_quasi_nucleus *nucleus, const bh_transfer *at)
{
    if (!(at->lost > nucleus->shift))
        return NULL; /* nothing to compute: no nucleon comes out */
    if (at->q < BH_QUASI_Q_LEAST)
        return BH_SAY_QUASI_SLOW;
    if (at->q > BH_QUASI_Q_MOST)
        return BH_SAY_QUASI_FAST;
    return bh_quasi_psi(nucleus, at) > BH_QUASI_PSI_MOST ? BH_SAY_QUASI_DEEP : NULL;
}
