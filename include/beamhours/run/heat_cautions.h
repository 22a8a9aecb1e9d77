/* heat_cautions.h - what the heat of the beam in a target should make people think of. */
#ifndef BH_RUN_HEAT_CAUTIONS_H
#define BH_RUN_HEAT_CAUTIONS_H

#include <stdbool.h>

#include "beamhours/base/text.h"
#include "beamhours/plan/plan.h"

/* The strongest beam on `target`: the setting of `plan` with the most particles per second, or NULL
 * where none uses it. */
const bh_setting *bh_heat_setting(const bh_plan *plan, const bh_target *target);

/* Appends to `text` how much heat the beam of `setting` leaves in its target, and the layer that
 * comes nearest to melting.  False, and nothing appended, below 0.1 W or without memory. */
bool bh_heat_say(const bh_setting *setting, bh_text *text);

#endif
