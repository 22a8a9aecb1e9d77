/* electron_loss.c - Berger and Seltzer: collisions by formula, radiation by table. */
#include "beamhours/matter/electron_loss.h"

#include <math.h>

#include "beamhours/matter/heavy_loss.h"
#include "beamhours/matter/radiation_length.h"
#include "beamhours/matter/stopping_tables.h"
#include "beamhours/units/constants.h"
#include "beamhours/units/nuclide.h"

double bh_berger_seltzer(const bh_medium *medium, int charge, double kinetic)
{
    const double tau = kinetic / BH_MASS_ELECTRON;
    const double beta2 = tau * (tau + 2.0) / ((tau + 1.0) * (tau + 1.0));
    const double t = tau + 2.0;
    double f;
    if (charge < 0)
        f = (1.0 - beta2) * (1.0 + tau * tau / 8.0 - (2.0 * tau + 1.0) * log(2.0));
    else
        f = 2.0 * log(2.0) - beta2 / 12.0 * (23.0 + 14.0 / t + 10.0 / (t * t) + 4.0 / (t * t * t));
    const double number = 2.0 * log(kinetic / medium->mean_excitation) + log1p(0.5 * tau) + f -
                          bh_medium_density_effect(medium, sqrt(tau * (tau + 2.0)));
    return 0.5 * bh_bethe_constant() * medium->z_over_a / beta2 * number;
}

/* Table over energy and radiation length [1]: smooth in Z. */
static double column_scaled(int column, int row)
{
    const int z = bh_electron_radiation_column[column];
    return bh_electron_radiation[row][column] * bh_element_mass(z) /
           (bh_radiation_strength(z) * (bh_electron_radiation_energy[row] + BH_MASS_ELECTRON));
}

/* Linear in ln Z between the columns beside z; they come by rising Z, compounds last. */
static double element_scaled(int z, int row)
{
    int high = 0;
    while (bh_electron_radiation_column[high] < z)
        high++;
    if (bh_electron_radiation_column[high] == z)
        return column_scaled(high, row);
    const double low_z = bh_electron_radiation_column[high - 1];
    const double part = log(z / low_z) / log(bh_electron_radiation_column[high] / low_z);
    const double low = column_scaled(high - 1, row);
    return low + part * (column_scaled(high, row) - low);
}

static double weight(const bh_medium *medium, size_t i)
{
    return medium->elements[i].per_atom * bh_radiation_strength(medium->elements[i].z) /
           medium->mean_atomic_mass;
}

void bh_electron_photons_make(const bh_medium *medium, bh_electron_photons *out)
{
    *out = (bh_electron_photons){.strength = 0.0};
    double squares = 0.0;
    for (size_t i = 0; i < medium->count; i++) {
        const int z = medium->elements[i].z;
        out->strength += weight(medium, i);
        squares += medium->elements[i].per_atom * z * (z + 1) / medium->mean_atomic_mass;
    }
    for (int row = 0; row < BH_RADIATION_ROWS; row++) {
        double sum = 0.0;
        for (size_t i = 0; i < medium->count; i++)
            sum += weight(medium, i) * element_scaled(medium->elements[i].z, row);
        bh_log_spline_add(&out->scaled, bh_electron_radiation_energy[row], sum / out->strength);
    }
    bh_log_spline_close(&out->scaled);
    const double radius = BH_CLASSICAL_R * 1e-13; /* cm */
    const double unit = 4.0 * BH_ALPHA * radius * radius * BH_AVOGADRO;
    out->limit = 1.0 + unit * squares / (18.0 * out->strength);
    out->missing = out->limit - bh_log_spline_at(&out->scaled, 1000.0);
    const double before = out->limit - bh_log_spline_at(&out->scaled, 500.0);
    out->power = fmin(fmax(log(before / out->missing) / log(2.0), 0.2), 1.0);
}

/* Positrons over electrons: fit to Kim, Pratt, Seltzer and Berger 1986, 0.5 %; from memory. */
static double positron_ratio(int z, double kinetic)
{
    const double t = log1p(1e6 / ((double)z * z) * kinetic / BH_MASS_ELECTRON);
    const double p =
        t * (-1.2359e-1 +
             t * (6.1274e-2 +
                  t * (-3.1516e-2 +
                       t * (7.7446e-3 + t * (-1.0595e-3 + t * (7.0568e-5 - t * 1.8080e-6))))));
    return -expm1(p);
}

double bh_electron_photons_at(const bh_electron_photons *r, const bh_medium *medium, int charge,
                              double kinetic)
{
    double scaled;
    if (kinetic > 1000.0)
        scaled = r->limit - r->missing * pow(1000.0 / kinetic, r->power);
    else
        scaled = bh_log_spline_at(&r->scaled, fmax(kinetic, bh_electron_radiation_energy[0]));
    const double electrons = scaled * r->strength * (kinetic + BH_MASS_ELECTRON);
    if (charge < 0)
        return electrons;
    double ratio = 0.0;
    for (size_t i = 0; i < medium->count; i++)
        ratio += weight(medium, i) * positron_ratio(medium->elements[i].z, kinetic);
    return electrons * ratio / r->strength;
}
