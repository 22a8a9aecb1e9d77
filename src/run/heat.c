/* heat.c - what the beam of a setting leaves in the layers of its target. */
#include "beamhours/run/heat.h"

#include <math.h>

#include "beamhours/matter/heating.h"
#include "beamhours/run/passage.h"
#include "beamhours/units/constants.h"

static const double usual_spot = 0.1, frame = 1; /* [cm] radii */
static const double room = 300;                  /* [K] */
static const double bare_metal = 0.1;            /* emissivity; 0.05 to 0.3 */

bh_heated_spot bh_spot_of(const bh_beam *beam)
{
    /* an even disc with the rms of the spot, or with the area of the raster */
    const double own = 2 * sqrt(beam->spot_x.value * beam->spot_y.value);
    const double swept = sqrt(beam->raster_x.value * beam->raster_y.value / BH_PI);
    const double radius = fmax(own, swept);
    return radius > 0 ? (bh_heated_spot){radius, false} : (bh_heated_spot){usual_spot, true};
}

bh_layer_heat bh_layer_heat_of(const bh_setting *setting, size_t layer, double lost)
{
    const bh_layer *l = &setting->target->layers[layer];
    const double radius = bh_spot_of(&setting->beam).radius;
    bh_layer_heat heat = {.lost = lost,
                          .power = bh_heating_power(setting->beam.particle_rate.value, lost)};
    const bh_heated_foil foil = {.power = heat.power,
                                 .spot = radius,
                                 .edge = fmax(frame, 2 * radius),
                                 .thickness = l->thickness.value,
                                 .conductivity = l->material->conductivity,
                                 .emissivity = bare_metal,
                                 .cold = room};
    if (l->material->state == BH_STATE_SOLID)
        heat.temperature = bh_heating_temperature(&foil);
    return heat;
}

double bh_target_heat(const bh_setting *setting, bh_layer_heat *heat)
{
    const bh_target *target = setting->target;
    const bh_beam *beam = &setting->beam;
    double kinetic = beam->kinetic_energy.value, sum = 0;
    for (size_t i = 0; i < target->layer_count; i++) {
        const bh_layer *l = &target->layers[i];
        const double path =
            l->areal_density.value * bh_density_left(l, beam) / cos(setting->tilt.value);
        const double lost = kinetic > 0 ? bh_heating_lost(&beam->particle, l->material,
                                                          l->density.value, kinetic, path)
                                        : 0;
        heat[i] = bh_layer_heat_of(setting, i, lost);
        kinetic -= lost;
        sum += heat[i].power;
    }
    return sum;
}
