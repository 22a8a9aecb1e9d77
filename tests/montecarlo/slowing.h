/* slowing.h - how particles slow down, for the Monte Carlo alone: published formulas written down
 * once more, ranges by plain summing. */
#ifndef TESTS_MONTECARLO_SLOWING_H
#define TESTS_MONTECARLO_SLOWING_H

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/matter/material.h"
#include "beamhours/units/constants.h"
#include "beamhours/units/particle.h"

static const double coupling = 0.1535375; /* MeV cm2/mol: 2 pi N r_e^2 m c^2 */

/* A material as a layer has it. */
struct stuff {
    const bh_material *material;
    double density;  /* g/cm3 */
    double z_over_a; /* mol/g */
    double b;        /* of external bremsstrahlung */
};

/* b = 4/3 + (Z^2 + Z) / 9 D of Tsai, Rev. Mod. Phys. 46 (1974) 815, table B.2 for light elements,
 * without his f(Z), which is 1 % of D in lead. */
static double b_of(int z)
{
    static const double light[][2] = {{5.31, 6.144}, {4.79, 5.621}, {4.74, 5.805}, {4.71, 5.924}};
    const double l = z <= 4 ? light[z - 1][0] : log(184.15 * pow(z, -1.0 / 3));
    const double l2 = z <= 4 ? light[z - 1][1] : log(1194 * pow(z, -2.0 / 3));
    const double a2 = pow(z * BH_ALPHA, 2);
    const double f = a2 * (1 / (1 + a2) + 0.20206 - 0.0369 * a2 + 0.0083 * a2 * a2);
    return 4.0 / 3 + (z * z + z) / (9 * (z * z * (l - f) + z * l2));
}

static struct stuff stuff_of(const bh_material *material, double density)
{
    struct stuff s = {.material = material, .density = density};
    double weight = 0;
    for (size_t i = 0; i < material->count; i++) {
        const bh_constituent *c = &material->parts[i];
        const double radiates = c->per_atom * c->z * (c->z + 1);
        s.z_over_a += c->per_atom * c->z / material->mean_atomic_mass;
        s.b += radiates * b_of(c->z);
        weight += radiates;
    }
    s.b /= weight;
    return s;
}

/* Density effect of Sternheimer, Berger & Seltzer, At. Data Nucl. Data Tables 30 (1984) 261. */
static double density_effect(const struct stuff *s, double beta_gamma)
{
    const bh_density_effect *e = &s->material->effect;
    const double x = log10(beta_gamma), shift = log(e->density / s->density);
    const double x0 = e->x0 + shift / log(100), x1 = e->x1 + shift / log(100);
    const double high = log(100) * x - (e->c + shift);
    if (x >= x1)
        return high;
    return x >= x0 ? high + e->a * pow(x1 - x, e->k) : e->delta0 * pow(10, 2 * (x - x0));
}

/* MeV cm2/g of electrons and positrons: Berger & Seltzer, NBSIR 82-2550 (1982). */
static double loss_of_electron(const struct stuff *s, int charge, double kinetic)
{
    const double t = kinetic / BH_MASS_ELECTRON, g = t + 1, beta2 = t * (t + 2) / (g * g);
    const double i = s->material->effect.mean_excitation / BH_MASS_ELECTRON, u = t + 2;
    const double f = charge < 0
                         ? 1 - beta2 + (t * t / 8 - (2 * t + 1) * log(2)) / (g * g)
                         : log(4) - beta2 / 12 * (23 + 14 / u + 10 / (u * u) + 4 / (u * u * u));
    return coupling * s->z_over_a / beta2 *
           (log(t * t * (t + 2) / (2 * i * i)) + f - density_effect(s, sqrt(t * (t + 2))));
}

/* MeV, the most that an electron at rest can be given. */
static double most_given(double mass, double kinetic)
{
    const double g = kinetic / mass + 1, r = BH_MASS_ELECTRON / mass;
    return 2 * BH_MASS_ELECTRON * (g * g - 1) / (1 + 2 * g * r + r * r);
}

/* MeV cm2/g of muons: Bethe as in the Review of Particle Physics. */
static double loss_of_muon(const struct stuff *s, double kinetic)
{
    const double g = kinetic / BH_MASS_MUON + 1, bg2 = g * g - 1, beta2 = bg2 / (g * g);
    const double i = s->material->effect.mean_excitation;
    return 2 * coupling * s->z_over_a / beta2 *
           (log(2 * BH_MASS_ELECTRON * bg2 * most_given(BH_MASS_MUON, kinetic) / (i * i)) / 2 -
            beta2 - density_effect(s, sqrt(bg2)) / 2);
}

/* MeV cm2/g of alphas in gold: ICRU Report 49 (1993) as in ASTAR, log-log between its rows. */
static double loss_of_alpha_in_gold(double kinetic)
{
    static const double row[][2] = {{0.1, 164.7},  {0.2, 239.5}, {0.3, 291.5},  {0.4, 328.5},
                                    {0.5, 354.3},  {0.6, 371.5}, {0.8, 387.8},  {1, 388.7},
                                    {1.25, 384.4}, {1.5, 375.7}, {1.75, 362.6}, {2, 346.8},
                                    {2.5, 316.4},  {3, 293.0},   {3.5, 274.1},  {4, 258.4},
                                    {4.5, 245.0},  {5, 233.4},   {5.5, 223.1},  {6, 214.0}};
    size_t i = 0;
    while (i + 2 < sizeof row / sizeof row[0] && kinetic > row[i + 1][0])
        i++;
    const double part = log(kinetic / row[i][0]) / log(row[i + 1][0] / row[i][0]);
    return row[i][1] * pow(row[i + 1][1] / row[i][1], part);
}

static double loss_of(const struct stuff *s, const bh_particle *particle, double kinetic)
{
    if (particle->mass < 1)
        return loss_of_electron(s, particle->charge, kinetic);
    return particle->kind == BH_KIND_LEPTON ? loss_of_muon(s, kinetic)
                                            : loss_of_alpha_in_gold(kinetic);
}

/* --- ranges --- */

enum { STEPS = 4000 };

/* g/cm2 that a particle goes on its way from one energy to another; steps equal in ln T. */
struct slowing {
    double low, step;        /* ln MeV */
    double range[STEPS + 1]; /* g/cm2 down to the lowest energy */
};

static void slowing_make(struct slowing *w, const struct stuff *s, const bh_particle *particle,
                         double from, double to)
{
    w->low = log(from);
    w->step = log(to / from) / STEPS;
    w->range[0] = 0;
    for (int i = 0; i < STEPS; i++) {
        const double a = exp(w->low + i * w->step), b = a * exp(w->step);
        const double middle = a * exp(w->step / 2);
        w->range[i + 1] = w->range[i] + w->step / 6 *
                                            (a / loss_of(s, particle, a) +
                                             4 * middle / loss_of(s, particle, middle) +
                                             b / loss_of(s, particle, b));
    }
}

/* MeV left after `path` g/cm2 of it; 0 where it stops. */
static double slowed(const struct slowing *w, double kinetic, double path)
{
    const double x = (log(kinetic) - w->low) / w->step;
    int i = x < 0 ? 0 : x >= STEPS ? STEPS - 1 : (int)x;
    const double wanted = w->range[i] + (x - i) * (w->range[i + 1] - w->range[i]) - path;
    if (!(wanted > 0))
        return 0;
    int below = 0;
    for (int far = 1; i > 0 && w->range[i] > wanted; far *= 2) /* gallop, then halve */
        i = i > far ? i - far : 0;
    below = i;
    int above = STEPS;
    while (above - below > 1) {
        const int middle = (above + below) / 2;
        if (w->range[middle] > wanted)
            above = middle;
        else
            below = middle;
    }
    const double part = (wanted - w->range[below]) / (w->range[below + 1] - w->range[below]);
    return exp(w->low + (below + part) * w->step);
}

#endif
