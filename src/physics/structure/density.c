/* density.c - which charge densities are published, and which of them is best. */
#include <math.h>
#include <stdio.h>

#include "beamhours/physics/form_factor.h"
#include "beamhours/units/nuclide.h"

const bh_density *bh_density_find(bh_shape_kind kind, int z, int a, int set)
{
    for (size_t i = 0; i < bh_density_table_size; i++) {
        const bh_density *at = &bh_density_table[i];
        if (at->kind == kind && at->z == z && at->a == a && --set == 0)
            return at;
    }
    return NULL;
}

int bh_density_sets(bh_shape_kind kind, int z, int a)
{
    int sets = 0;
    while (bh_density_find(kind, z, a, sets + 1))
        sets++;
    return sets;
}

static bool agrees(const bh_density *density)
{
    const double off = fabs(density->rms - density->radius);
    return density->confirmed && off <= fmax(0.01 * density->radius, 2.0 * density->radius_sigma);
}

const bh_density *bh_density_best(int z, int a, int *set)
{
    static const bh_shape_kind order[] = {BH_SHAPE_GAUSSIANS, BH_SHAPE_FOURIER_BESSEL,
                                          BH_SHAPE_FERMI_3P,  BH_SHAPE_GAUSS_3P,
                                          BH_SHAPE_FERMI_2P,  BH_SHAPE_OSCILLATOR};
    for (size_t i = 0; i < sizeof order / sizeof order[0]; i++) {
        const bh_density *at;
        for (*set = 1; (at = bh_density_find(order[i], z, a, *set)) != NULL; ++*set)
            if (agrees(at))
                return at;
    }
    return NULL;
}

double bh_density_radius(int z, int a, bool *measured)
{
    const bh_nuclide *nuclide = bh_nuclide_find(z, a);
    *measured = nuclide && nuclide->radius > 0.0;
    return *measured ? nuclide->radius : sqrt(0.6) * 1.2 * cbrt(a);
}

void bh_density_describe(bh_structure *structure, const bh_density *density)
{
    const bh_nuclide *nuclide = bh_nuclide_find(structure->z, structure->a);
    structure->kind = BH_FACTORS_CHARGE;
    if (nuclide && nuclide->twice_spin > 0) {
        bh_structure_remark(structure, "charge alone: no magnetic form factor");
        structure->flagged = true;
    }
    if (density) {
        (void)snprintf(structure->source, sizeof structure->source, "%s", density->source);
        if (density->note[0])
            bh_structure_remark(structure, density->note);
        if (!agrees(density))
            bh_structure_remark(structure, "misses the radius of Angeli & Marinova 2013");
        return;
    }
    bool measured;
    (void)bh_density_radius(structure->z, structure->a, &measured);
    if (!measured)
        structure->flagged = true;
    bh_structure_remark(structure, measured ? "radius from Angeli & Marinova 2013"
                                            : "radius 1.2 A^(1/3) fm: none is published");
}
