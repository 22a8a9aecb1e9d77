/* losses.c - losses, range and deflection of one particle in one material. */
#include "beamhours/command/losses.h"

#include "beamhours/matter/multiple_scattering.h"
#include "beamhours/matter/radiation_length.h"
#include "beamhours/matter/range.h"

static void add(bh_passage_facts *to, const char *key, const char *unit, double value)
{
    to->facts[to->count++] = (bh_passage_fact){key, unit, value};
}

static void fill(const bh_range *range, const bh_material *material, double kinetic,
                 bh_passage_facts *out)
{
    const bh_stopping *stopping = bh_range_stopping(range);
    const bh_loss loss = bh_stopping_at(stopping, kinetic);
    const double density = bh_stopping_medium(stopping)->density;
    const double path = bh_range_of(range, kinetic);
    const bh_radiation_length length = bh_radiation_length_of(material);
    out->count = 0;
    add(out, "collision_MeV_cm2_per_g", "MeV cm2/g", loss.collision);
    add(out, "radiative_MeV_cm2_per_g", "MeV cm2/g", loss.radiative);
    add(out, "range_g_per_cm2", "g/cm2", path);
    add(out, "range_cm", "cm", path / density);
    add(out, "radiation_length_g_per_cm2", "g/cm2", length.value);
    add(out, "radiation_length_computed_g_per_cm2", "g/cm2", length.computed);
    add(out, "density_g_per_cm3", "g/cm3", density);
    add(out, "scattering_in_1_percent_of_a_radiation_length_mrad", "mrad",
        1e3 * bh_highland(bh_stopping_particle(stopping), kinetic, 0.01));
}

bh_code bh_passage_of(const bh_particle *particle, const bh_material *material, double kinetic,
                      bh_passage_facts *out, bh_error *err)
{
    bh_stopping *stopping = NULL;
    bh_range *range = NULL;
    bh_code code = bh_stopping_new(particle, material, 0.0, &stopping, err);
    if (code == BH_OK)
        code = bh_range_new(stopping, BH_LOSE_ALL, kinetic, &range, err);
    if (code == BH_OK)
        fill(range, material, kinetic, out);
    bh_range_free(range);
    bh_stopping_free(stopping);
    return code;
}
