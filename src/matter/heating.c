/* heating.c - heat that a beam leaves in a layer, and how hot a foil may get. */
#include "beamhours/matter/heating.h"

#include <math.h>
#include <stdlib.h>

#include "beamhours/matter/electron_loss.h"
#include "beamhours/matter/heavy_loss.h"
#include "beamhours/matter/stopping.h"
#include "beamhours/units/constants.h"

static const double stefan_boltzmann = 5.670374419e-12; /* W/cm2/K4, CODATA 2022 */

double bh_heating_power(double rate, double lost)
{
    return rate * lost * 1e6 * BH_ELEMENTARY;
}

/* MeV cm2/g; what is quick where it holds, else all that stopping.h knows. */
static double loss_of(const bh_particle *particle, const bh_material *material, double density,
                      double kinetic)
{
    bh_medium medium;
    bh_stopping *stopping = NULL;
    const bool fast = kinetic > 8.0 * particle->mass / BH_MASS_PROTON; /* of heavy_loss.h */
    if (bh_medium_of(material, density, &medium, NULL) || particle->charge == 0)
        return 0.0;
    if (bh_particle_is_electron(particle))
        return bh_berger_seltzer(&medium, particle->charge, kinetic);
    if (fast && abs(particle->charge) == 1)
        return bh_bethe(particle, &medium, kinetic);
    if (bh_stopping_new(particle, material, density, &stopping, NULL))
        return 0.0;
    const double loss = bh_stopping_at(stopping, kinetic).collision;
    bh_stopping_free(stopping);
    return loss;
}

double bh_heating_lost(const bh_particle *particle, const bh_material *material, double density,
                       double kinetic, double path)
{
    return fmin(kinetic, loss_of(particle, material, density, kinetic) * path);
}

double bh_heating_conduction(const bh_heated_foil *foil)
{
    if (!(foil->conductivity > 0.0))
        return (double)INFINITY;
    return foil->power / (4.0 * BH_PI * foil->conductivity * foil->thickness) *
           (1.0 + 2.0 * log(foil->edge / foil->spot));
}

double bh_heating_radiation(const bh_heated_foil *foil)
{
    const double faces = 2.0 * BH_PI * foil->spot * foil->spot;
    return pow(pow(foil->cold, 4.0) + foil->power / (faces * foil->emissivity * stefan_boltzmann),
               0.25);
}

double bh_heating_temperature(const bh_heated_foil *foil)
{
    return fmin(foil->cold + bh_heating_conduction(foil), bh_heating_radiation(foil));
}
