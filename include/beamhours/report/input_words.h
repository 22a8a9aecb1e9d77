/* input_words.h - beam, targets and arms of a plan in one line each, and hours as people write
 * them.
 */
#ifndef BH_REPORT_INPUT_WORDS_H
#define BH_REPORT_INPUT_WORDS_H

#include "beamhours/base/number.h"
#include "beamhours/base/text.h"
#include "beamhours/plan/plan.h"

/* Appends "electron, 900 MeV to 2.6 GeV kinetic, 2 uA to 10 uA": what the settings have. */
void bh_say_beam(const bh_plan *plan, bh_text *to);

/* Appends "hydrogen: aluminium 100 um (window), ...; scatterer H". */
void bh_say_target(const bh_target *target, bh_text *to);

/* Appends "east: right, detects scattered, in_plane ±20 mrad, ...". */
void bh_say_arm(const bh_arm *arm, bh_text *to);

/* Writes hours [h] with two decimals, half a minute; below one hour with three digits. */
void bh_hours_print(double hours, char out[BH_NUMBER_SIZE]);

#endif
