/* blank_plan.h - the short plan that `beamhours new` writes. */
#ifndef BH_COMMAND_BLANK_PLAN_H
#define BH_COMMAND_BLANK_PLAN_H

/* A commented plan, complete enough to compute.  Never NULL. */
const char *bh_blank_plan(void);

#endif
