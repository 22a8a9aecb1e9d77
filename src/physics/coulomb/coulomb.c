/* coulomb.c - the registry of Coulomb models; a new one is one file and one row here. */
#include "beamhours/physics/coulomb.h"

#include <stdio.h>
#include <string.h>

#include "beamhours/units/constants.h"

static void unity(const bh_encounter *encounter, size_t n, const bh_event *event, double *factor)
{
    (void)encounter;
    (void)event;
    for (size_t i = 0; i < n; i++)
        factor[i] = 1.0;
}

/* The second Born term of a light particle is at most about pi Z alpha / 4 of the first (McKinley &
 * Feshbach, Phys. Rev. 74 (1948) 1759).  Hadrons below the Coulomb barrier do not need it: the
 * exact Coulomb amplitude has the modulus of the first Born term. */
static int plane_wave_caveat(const bh_encounter *encounter, char *out, size_t size)
{
    const double second = 0.25 * BH_PI * encounter->z * BH_ALPHA;
    if (encounter->beam->kind != BH_KIND_LEPTON || !(second > 0.05))
        return 0;
    return snprintf(out, size,
                    "plane waves: the pull of charge %d on the %s is left out, up to about %.0f %% "
                    "of the cross section and more in diffraction minima",
                    encounter->z, encounter->beam->name, 100.0 * second);
}

static const bh_coulomb models[] = {
    {"plane-wave", "one photon between plane waves, no distortion by the nuclear charge",
     "Born, Z. Phys. 38 (1926) 803", "Z alpha << 1; within 5 % for Z <= 8 outside of minima", unity,
     plane_wave_caveat},
};

const bh_coulomb *bh_coulomb_at(int i)
{
    return i >= 0 && (size_t)i < sizeof models / sizeof models[0] ? &models[i] : NULL;
}

const bh_coulomb *bh_coulomb_find(const char *name)
{
    const bh_coulomb *row = &models[0];
    if (!name || strcmp(name, "default") == 0)
        return row;
    for (int i = 0; (row = bh_coulomb_at(i)) && strcmp(row->name, name) != 0; i++)
        ;
    return row;
}
