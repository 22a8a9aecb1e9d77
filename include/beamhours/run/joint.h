/* joint.h - one channel summed over the joint acceptance of two arms. */
#ifndef BH_RUN_JOINT_H
#define BH_RUN_JOINT_H

#include "beamhours/rates/coincidence.h"
#include "beamhours/run/channelsum.h"
#include "beamhours/run/taking.h"

enum { BH_ARMS = 2 };

/* Where the arms stand: the first as it is, BH_STEP_ANGLE back and on.  Must stay where it was
 * made. */
typedef struct {
    bh_acceptance first[3], second;
    double edges[2][BH_MOST_BINS + 1]; /* [rad] of the bins of the arm moved */
    bool turns;                        /* the first can be moved both ways */
} bh_standing;

/* Makes them ready.  BH_EDOMAIN as bh_acceptance_make. */
BH_CHECKED bh_code bh_stand(const bh_acceptance_spec *first, const bh_acceptance_spec *second,
                            bh_standing *out, bh_error *err);

/* The first particle of an event in the first arm, its partner in the second.  A photon takes its
 * energy from one event, which both see: of it is left what the stricter arm leaves. */
typedef struct {
    bh_channel channel[BH_ARMS]; /* the same events, as either arm detects them */
    bh_leaver leaver[BH_ARMS];   /* read where energy is lost */
    bool losing;
    bh_taking taking[BH_ARMS];
    bh_radiated radiated[BH_ARMS]; /* of either arm's particle */
    bh_interval polar[BH_ARMS];    /* [rad] where these hold */
    bool opposite;                 /* the arms stand on opposite sides of the beam */
    const bh_vertex *vertex;       /* the one at hand */
    int boost;                     /* BH_AS_IT_IS ... likewise */
    bool radiating;                /* radiation is in what is kept; likewise */
} bh_joint;

typedef struct {
    const bh_standing *standing;
    int part; /* of the first arm: 0 the whole, else a bin */
    bool sensitivities;
} bh_joint_request;

/* Begin with zeros and `converged`. */
typedef struct {
    bh_channel_sum events; /* of both arms; moved: the first arm, NAN where it cannot turn */
    double solid_angle;    /* [sr] joint, of the first particle */
} bh_joint_sum;

/* Adds what comes from joint->vertex, times its weight.  BH_EDOMAIN as bh_pair_add_up. */
BH_CHECKED bh_code bh_joint_add(bh_joint *joint, const bh_joint_request *request, bh_joint_sum *sum,
                                bh_error *err);

#endif
