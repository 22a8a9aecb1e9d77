/* muon_loss.c - radiative losses of muons. */
#include "beamhours/matter/muon_loss.h"

#include <math.h>

#include "beamhours/matter/gauss.h"
#include "beamhours/units/constants.h"
#include "beamhours/units/nuclide.h"

static const double root_e = 1.64872127070012814685;

typedef struct {
    int z;
    double a;      /* u */
    double energy; /* MeV */
    double nu;     /* share of the energy that a pair takes, while its asymmetry is summed over */
} target;

/* N r_e^2, cm2/mol */
static double area(void)
{
    return BH_AVOGADRO * BH_CLASSICAL_R * BH_CLASSICAL_R * 1e-26;
}

/* ---- bremsstrahlung ---- */

/* nu^2 dsigma/dnu, u = ln nu, without the factors in front. */
static double photon_spectrum(const void *context, double u)
{
    const target *t = context;
    const double nu = exp(u);
    const double me = BH_MASS_ELECTRON;
    const double mu = BH_MASS_MUON;
    const double third = cbrt(t->z);
    const double delta = mu * mu * nu / (2.0 * t->energy * (1.0 - nu));
    const double b = (t->z == 1 ? 202.4 : 182.7) / third;
    const double d = 1.54 * pow(t->a, 0.27);
    const double whole = log(b * mu / me / (1.0 + delta * root_e * b / me));
    const double size = t->z == 1 ? 0.0 : log(d / (1.0 + delta * (d * root_e - 2.0) / mu));
    const double b_in = (t->z == 1 ? 446.0 : 1429.0) / (third * third);
    const double inner =
        log(mu / delta / (mu * delta / (me * me) + root_e)) - log1p(me / (delta * b_in * root_e));
    const double nu_in = 1.0 / (1.0 + mu * mu / (2.0 * me * t->energy));
    const double number = t->z * fmax(whole - size, 0.0) + (nu < nu_in ? fmax(inner, 0.0) : 0.0);
    return nu * (4.0 / 3.0 * (1.0 - nu) + nu * nu) * t->z * number;
}

double bh_muon_photons(int z, double energy)
{
    if (!(energy > BH_MASS_MUON))
        return 0.0;
    const target t = {.z = z, .a = bh_element_mass(z), .energy = energy};
    const double highest = 1.0 - 0.75 * root_e * BH_MASS_MUON / energy * cbrt(z);
    const double top = fmax(highest, 1.0 - BH_MASS_MUON / energy);
    double sum = 0.0;
    const bh_gauss_limits cuts[] = {{-14.0, -5.0}, {-5.0, -1.5}, {-1.5, log(top)}};
    for (int i = 0; i < 3; i++)
        if (cuts[i].to > cuts[i].from)
            sum += bh_gauss(photon_spectrum, &t, cuts[i]);
    const double ratio = BH_MASS_ELECTRON / BH_MASS_MUON;
    return 4.0 * BH_ALPHA * area() * ratio * ratio * energy * sum;
}

/* ---- pairs ---- */

typedef struct {
    double nu, rho2, xi, beta;
} pair;

static double electron_part(const target *t, const pair *p)
{
    const double third = cbrt(t->z);
    const double me = BH_MASS_ELECTRON;
    const double r = p->rho2;
    const double b = ((2.0 + r) * (1.0 + p->beta) + p->xi * (3.0 + r)) * log1p(1.0 / p->xi) +
                     (1.0 - r - p->beta) / (1.0 + p->xi) - (3.0 + r);
    const double y =
        (5.0 - r + 4.0 * p->beta * (1.0 + r)) /
        (2.0 * (1.0 + 3.0 * p->beta) * log(3.0 + 1.0 / p->xi) - r - 2.0 * p->beta * (2.0 - r));
    const double w = (1.0 + p->xi) * (1.0 + y);
    const double screened = 183.0 / third;
    const double small = 1.5 * me / BH_MASS_MUON * third;
    const double l =
        log(screened * sqrt(w) /
            (1.0 + 2.0 * me * root_e * screened * w / (t->energy * p->nu * (1.0 - r)))) -
        0.5 * log1p(small * small * w);
    return b * fmax(l, 0.0);
}

static double muon_part(const target *t, const pair *p)
{
    const double third = cbrt(t->z);
    const double me = BH_MASS_ELECTRON;
    const double r = p->rho2;
    const double b =
        ((1.0 + r) * (1.0 + 1.5 * p->beta) - (1.0 + 2.0 * p->beta) * (1.0 - r) / p->xi) *
            log1p(p->xi) +
        p->xi * (1.0 - r - p->beta) / (1.0 + p->xi) + (1.0 + 2.0 * p->beta) * (1.0 - r);
    const double y = (4.0 + r + 3.0 * p->beta * (1.0 + r)) /
                     ((1.0 + r) * (1.5 + 2.0 * p->beta) * log(3.0 + p->xi) + 1.0 - 1.5 * r);
    const double w = (1.0 + 1.0 / p->xi) * (1.0 + y);
    const double screened = 183.0 / third;
    const double l = log(BH_MASS_MUON / me * screened * sqrt(w) /
                         (1.0 + 2.0 * me * root_e * screened * (1.0 + p->xi) * (1.0 + y) /
                                    (t->energy * p->nu * (1.0 - r)))) -
                     log(1.5 * third * sqrt(w));
    const double ratio = me / BH_MASS_MUON;
    return ratio * ratio * b * fmax(l, 0.0);
}

/* u = ln(1 - rho). */
static double over_asymmetry(const void *context, double u)
{
    const target *t = context;
    const double nu = t->nu;
    const double left = exp(u);
    const double rho = 1.0 - left;
    pair p = {.nu = nu, .rho2 = rho * rho, .beta = nu * nu / (2.0 * (1.0 - nu))};
    const double m = BH_MASS_MUON * nu / (2.0 * BH_MASS_ELECTRON);
    p.xi = m * m * (1.0 - p.rho2) / (1.0 - nu);
    return left * (electron_part(t, &p) + muon_part(t, &p));
}

/* nu^2 dsigma/dnu, u = ln nu. */
static double pair_spectrum(const void *context, double u)
{
    target t = *(const target *)context;
    const double nu = exp(u);
    t.nu = nu;
    const double mass = BH_MASS_MUON / t.energy;
    const double small = 4.0 * BH_MASS_ELECTRON / (t.energy * nu);
    const double largest = (1.0 - 6.0 * mass * mass / (1.0 - nu)) * sqrt(fmax(1.0 - small, 0.0));
    if (!(largest > 0.0))
        return 0.0;
    const bh_gauss_limits over = {log1p(-largest), 0.0};
    return nu * (1.0 - nu) * bh_gauss(over_asymmetry, &t, over);
}

/* Pairs on the electrons of the atom add as much as `zeta` protons. */
static double pair_electrons(int z, double energy)
{
    const double gamma = energy / BH_MASS_MUON;
    const double third = cbrt(z);
    const double g1 = z == 1 ? 4.4e-5 : 1.95e-5;
    const double g2 = z == 1 ? 4.8e-5 : 5.30e-5;
    const double up = 0.073 * log(gamma / (1.0 + g1 * third * third * gamma)) - 0.26;
    const double down = 0.058 * log(gamma / (1.0 + g2 * third * gamma)) - 0.14;
    return gamma > 35.0 && up > 0.0 && down > 0.0 ? up / down : 0.0;
}

double bh_muon_pairs(int z, double energy)
{
    const double lowest = 4.0 * BH_MASS_ELECTRON / energy;
    const double highest = 1.0 - 0.75 * root_e * BH_MASS_MUON / energy * cbrt(z);
    if (!(highest > lowest))
        return 0.0;
    const target t = {.z = z, .a = bh_element_mass(z), .energy = energy};
    const double step = log(highest / lowest) / 3.0;
    double sum = 0.0;
    for (int i = 0; i < 3; i++)
        sum += bh_gauss(pair_spectrum, &t,
                        (bh_gauss_limits){log(lowest) + i * step, log(lowest) + (i + 1) * step});
    return 4.0 / (3.0 * BH_PI) * z * (z + pair_electrons(z, energy)) * area() * BH_ALPHA *
           BH_ALPHA * energy * sum;
}

void bh_muon_radiation_make(const bh_medium *medium, bh_log_spline *out)
{
    *out = (bh_log_spline){.count = 0};
    for (int i = 0; i <= 18; i++) {
        const double kinetic = pow(10.0, 1.0 + i / 3.0);
        const double energy = kinetic + BH_MASS_MUON;
        double sum = 0.0;
        for (size_t j = 0; j < medium->count; j++) {
            const int z = medium->elements[j].z;
            sum += medium->elements[j].per_atom *
                   (bh_muon_photons(z, energy) + bh_muon_pairs(z, energy));
        }
        const double nuclear = 0.4e-6 * fmax(energy - 300.0, 0.0);
        bh_log_spline_add(out, kinetic, sum / medium->mean_atomic_mass + nuclear);
    }
    bh_log_spline_close(out);
}
