/* heat.h - what the beam of a setting leaves in the layers of its target. */
#ifndef BH_RUN_HEAT_H
#define BH_RUN_HEAT_H

#include "beamhours/plan/plan.h"

/* The spot that the heat is spread over. */
typedef struct {
    double radius; /* [cm] of a disc as wide as beam spot and raster; 0.1 where neither is given */
    bool assumed;
} bh_heated_spot;

bh_heated_spot bh_spot_of(const bh_beam *beam);

/* One layer.  Screening estimates: mean losses, all particles taken as the named one, a foil held
 * at 300 K at 1 cm from the beam (or at twice the spot, where that is more), emissivity 0.1. */
typedef struct {
    double lost;        /* [MeV] by each particle */
    double power;       /* [W] */
    double temperature; /* [K] of a solid layer in the spot; 0 for others */
} bh_layer_heat;

/* Of layer number `layer` when each particle loses `lost` [MeV] in it. */
bh_layer_heat bh_layer_heat_of(const bh_setting *setting, size_t layer, double lost);

/* Fills `heat`, one for each layer of the setting's target, with losses as they are where each
 * layer begins; quicker than sending the beam through.  Returns [W] the sum. */
double bh_target_heat(const bh_setting *setting, bh_layer_heat *heat);

#endif
