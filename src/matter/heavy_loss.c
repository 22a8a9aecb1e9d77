/* heavy_loss.c - Bethe's formula and its corrections. */
#include "beamhours/matter/heavy_loss.h"

#include <math.h>
#include <stdlib.h>

#include "beamhours/units/constants.h"

double bh_bethe_constant(void)
{
    const double radius = BH_CLASSICAL_R * 1e-13; /* cm */
    return 4.0 * BH_PI * BH_AVOGADRO * radius * radius * BH_MASS_ELECTRON;
}

bh_particle bh_proton(void)
{
    return (bh_particle){.name = "proton",
                         .kind = BH_KIND_HADRON,
                         .charge = 1,
                         .twice_spin = 1,
                         .z = 1,
                         .a = 1,
                         .mass = BH_MASS_PROTON,
                         .magnetic = BH_MOMENT_PROTON};
}

double bh_effective_charge(int charge, double beta)
{
    if (charge <= 2)
        return 1.0;
    return -expm1(-125.0 * beta / pow(cbrt(charge), 2));
}

/* C / Z: Barkas and Berger 1964; I in eV.  The fit holds from beta gamma 0.13 on. */
static double shell(int z, double beta_gamma)
{
    const double i = bh_element_excitation(z) * 1e6;
    const double bg = fmax(beta_gamma, 0.13);
    const double w = 1.0 / (bg * bg);
    const double square = w * (0.422377 + w * (0.0304043 - w * 0.00038106));
    const double cube = w * (3.850190 + w * (-0.1667989 + w * 0.00157955));
    return i * i * (square * 1e-6 + i * cube * 1e-9) / z;
}

/* The term odd in the charge, for charge 1: Lindhard 1976, the logarithm as in Bethe's. */
static double barkas(int z, double beta)
{
    const double i = bh_element_excitation(z);
    const double log_term = log(2.0 * BH_MASS_ELECTRON * beta * beta / i);
    return log_term > 0.0
               ? 1.5 * BH_PI * BH_ALPHA * i / (BH_MASS_ELECTRON * pow(beta, 3)) * log_term
               : 0.0;
}

/* Bloch's term, as in ICRU Report 49. */
static double bloch(double y)
{
    const double y2 = y * y;
    return -y2 * (1.20206 - y2 * (1.042 - y2 * (0.8549 - 0.343 * y2)));
}

/* Without what depends on the element. */
static double bethe_number(const bh_particle *p, const bh_flight *f, double excitation)
{
    const double b2 = f->beta * f->beta;
    double l = 0.5 * log(2.0 * BH_MASS_ELECTRON * f->beta_gamma * f->beta_gamma * f->transfer /
                         (excitation * excitation)) -
               b2 + bloch(p->charge * BH_ALPHA / f->beta);
    if (p->twice_spin == 1) {
        const double part = f->transfer / (f->gamma * p->mass);
        l += part * part / 8.0;
    }
    return l;
}

/* Photons from the electrons that muons set moving: Groom et al. 2001, eq. 8. */
static double radiating_electrons(const bh_particle *p, const bh_medium *m, const bh_flight *f)
{
    if (p->kind != BH_KIND_LEPTON)
        return 0.0;
    const double l = log(2.0 * f->transfer / BH_MASS_ELECTRON);
    const double bracket = log(2.0 * f->gamma) - l / 3.0;
    return l > 0.0 && bracket > 0.0
               ? bh_bethe_constant() / (4.0 * BH_PI) * m->z_over_a * BH_ALPHA * bracket * l * l
               : 0.0;
}

double bh_bethe(const bh_particle *p, const bh_medium *m, double kinetic)
{
    const bh_flight f = bh_flight_of(p, kinetic);
    double l =
        bethe_number(p, &f, m->mean_excitation) - 0.5 * bh_medium_density_effect(m, f.beta_gamma);
    for (size_t i = 0; i < m->count; i++) {
        const int z = m->elements[i].z;
        const double share = m->elements[i].per_atom * z / (m->mean_atomic_mass * m->z_over_a);
        l += share * (p->charge * barkas(z, f.beta) - shell(z, f.beta_gamma));
    }
    return bh_bethe_constant() * m->z_over_a * p->charge * p->charge / (f.beta * f.beta) * l +
           radiating_electrons(p, m, &f);
}

double bh_bethe_element(int z, double kinetic)
{
    const bh_particle p = bh_proton();
    const bh_flight f = bh_flight_of(&p, kinetic);
    const double l =
        bethe_number(&p, &f, bh_element_excitation(z)) + barkas(z, f.beta) - shell(z, f.beta_gamma);
    return bh_bethe_constant() * z / (f.beta * f.beta) * l;
}
