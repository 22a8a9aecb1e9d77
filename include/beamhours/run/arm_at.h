/* arm_at.h - what of an arm stands at one angle. */
#ifndef BH_RUN_ARM_AT_H
#define BH_RUN_ARM_AT_H

#include "beamhours/plan/plan.h"

/* Makes `of`, a ring whose angle.value [rad] says where, the slice of the ring around that angle,
 * as wide as the bin there: a point with the slice's solid angle, which asks for no hours. */
void bh_arm_slice(bh_setting_arm *of);

/* Makes `of` a point of 1 msr at its angle.value [rad] without cuts, which asks for no hours: its
 * cross section there is that of the arm's centre, and quick. */
void bh_arm_centre(bh_setting_arm *of);

#endif
