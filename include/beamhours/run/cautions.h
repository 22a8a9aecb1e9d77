/* cautions.h - what a plan should make people think of before the beam is on. */
#ifndef BH_RUN_CAUTIONS_H
#define BH_RUN_CAUTIONS_H

#include <stddef.h>

#include "beamhours/base/arena.h"
#include "beamhours/run/table.h"

/*
 * The cautions that follow from `plan`: beam power or a sealed source, secondary beams, hazards of
 * the materials of targets and exits (their own hazard words and, for a material without them, its
 * composition), pressure behind thin windows, magnets.  Each names the plan line it follows from
 * and ends by deferring to the facility.  None says that anything is harmless, and none has a
 * figure for shielding or dose.  There is always at least one: every plan has a beam.
 *
 * The list and all its strings belong to `arena`; marks point into the plan.  Sets `count`.
 * Returns NULL (and a count of 0) when there is no memory.  Thread-safe for different arenas.
 */
const bh_caution *bh_cautions_from_plan(const bh_plan *plan, bh_arena *arena, size_t *count);

#endif
