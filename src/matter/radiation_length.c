/* radiation_length.c - Tsai's radiation lengths. */
#include "beamhours/matter/radiation_length.h"

#include <math.h>

#include "beamhours/units/constants.h"

/* L and L' of the light elements, where the atom is not of Thomas and Fermi: Tsai 1974, table
 * B.2. */
static const double light[][2] = {{5.31, 6.144}, {4.79, 5.621}, {4.74, 5.805}, {4.71, 5.924}};

/* Z^2 (L - f) + Z L': Tsai 1974, eq. 3.66, f after eq. 3.3 (Davies, Bethe and Maximon). */
static double tsai_d(int z)
{
    const double q = BH_ALPHA * z;
    const double q2 = q * q;
    const double coulomb =
        q2 * (1.0 / (1.0 + q2) + 0.20206 + q2 * (-0.0369 + q2 * (0.0083 - 0.002 * q2)));
    const double l = z <= 4 ? light[z - 1][0] : log(184.15 / cbrt(z));
    const double l_prime = z <= 4 ? light[z - 1][1] : log(1194.0 / pow(cbrt(z), 2));
    return z * (z * (l - coulomb) + l_prime);
}

double bh_radiation_strength(int z)
{
    if (z < 1 || z > 118)
        return 0.0;
    const double radius = BH_CLASSICAL_R * 1e-13; /* cm */
    return 4.0 * BH_ALPHA * radius * radius * BH_AVOGADRO * tsai_d(z);
}

bh_radiation_length bh_radiation_length_of(const bh_material *material)
{
    double d = 0.0;
    double squares = 0.0;
    double strength = 0.0;
    for (size_t i = 0; i < material->count; i++) {
        const int z = material->parts[i].z;
        const double share = material->parts[i].per_atom;
        if (z < 1 || z > 118)
            continue;
        d += share * tsai_d(z);
        squares += share * z * (z + 1);
        strength += share * bh_radiation_strength(z);
    }
    bh_radiation_length out = {.published = material->published_x0};
    if (!(strength > 0.0))
        return out;
    out.computed = material->mean_atomic_mass / strength;
    out.value = out.published > 0.0 ? out.published : out.computed;
    out.b = 4.0 / 3.0 + squares / (9.0 * d);
    return out;
}
