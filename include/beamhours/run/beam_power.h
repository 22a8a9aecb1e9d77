/* beam_power.h - the power of a beam, and how it is written. */
#ifndef BH_RUN_BEAM_POWER_H
#define BH_RUN_BEAM_POWER_H

#include "beamhours/base/text.h"
#include "beamhours/plan/plan.h"

/* Returns [W] what the named particle and its companions carry, all taken at its energy. */
double bh_beam_power(const bh_beam *beam);

/* Appends `watts` [W] with three digits and the prefix that reads best: "17.1 kW". */
void bh_power_append(bh_text *text, double watts);

#endif
