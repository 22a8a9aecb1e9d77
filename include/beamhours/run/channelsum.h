/* channelsum.h - one channel summed over an arm and its bins, also a little beside where it is. */
#ifndef BH_RUN_CHANNELSUM_H
#define BH_RUN_CHANNELSUM_H

#include <stdbool.h>

#include "beamhours/rates/average.h"
#include "beamhours/rates/bite.h"
#include "beamhours/run/channel.h"
#include "beamhours/run/passage.h"
#include "beamhours/run/radiated.h"
#include "beamhours/run/workspace.h"

/* Steps of the symmetric differences behind the sensitivities: a rate with logarithmic derivatives
 * of 50 per rad and 12 keeps six digits of them. */
#define BH_STEP_ANGLE    BH_AVERAGE_TURN /* [rad] */
#define BH_STEP_MOMENTUM 1e-4            /* [1] relative; a choice; exact */

/* What to sum. */
typedef struct {
    bh_channel channel;
    bh_acceptance_spec acceptance;
    bool cut;                          /* there is a momentum bite or a threshold */
    double momentum_from, momentum_to; /* [MeV/c] of the detected particle, losses behind it */
    bh_momentum_rms rms;               /* with which that momentum is measured */
    const bh_way *way;                 /* NULL: everything happens at the channel's own energy */
    const bh_vertex *vertices;         /* where the nuclei are that are meant */
    size_t vertex_count;
    const bh_range **ranges;     /* room for the sheets of the way */
    const bh_radiated *radiated; /* NULL: as without radiation */
    bool trace;                  /* so few that 1e-3 of their sums is enough */
    bool radiated_only;          /* total and kept are not wanted, and then equal to radiated */
    bool bins;                   /* sums of the bins are wanted too */
    bool sensitivities;          /* moved and boosted belong to it: what is fitted reaches so far */
    bool without_changes;        /* but they are not wanted now, and 0 */
} bh_channel_request;

/* Over the whole acceptance or over one bin. */
typedef struct {
    double total;      /* [ub] integral of the cross section over the solid angle */
    double kept;       /* [ub] the part of it inside the bite */
    double radiated;   /* [ub] kept times what radiation leaves of it */
    double moved[2];   /* [ub] radiated with the arm BH_STEP_ANGLE back and on */
    double boosted[2]; /* [ub] radiated with the beam's momentum BH_STEP_MOMENTUM less and more */
    bool converged;
} bh_channel_sum;

/*
 * Returns 1 + bins sums, the whole arm first, valid until bh_workspace_trim; from the cache when
 * the same was asked before.  NULL when there is no memory or the acceptance meets the beam axis,
 * with the reason in err.
 */
const bh_channel_sum *bh_channel_sums(bh_workspace *workspace, const bh_channel_request *request,
                                      bh_error *err);

#endif
