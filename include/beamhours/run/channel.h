/* channel.h - one way for a particle to reach the detector: who was struck, which of the two it is.
 */
#ifndef BH_RUN_CHANNEL_H
#define BH_RUN_CHANNEL_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/physics/kinematics.h"
#include "beamhours/physics/process.h"
#include "beamhours/rates/bite.h"

/* A nucleus, the beam on it, and the detected one of the two after the collision. */
typedef struct {
    const bh_process *process;
    bh_encounter encounter;
    bool recoil;      /* the struck particle is detected, not the scattered one */
    bh_branch branch; /* of a scattered particle */
} bh_channel;

/* The particle that is detected. */
bh_particle bh_channel_detected(const bh_channel *channel);

/* What momentum bites call that particle. */
bh_detected bh_channel_as_detected(const bh_channel *channel);

/* Returns [rad] the largest lab angle at which the detected particle can appear. */
double bh_channel_largest_angle(const bh_channel *channel);

/* The event whose detected particle is at `angle` [rad].  BH_EDOMAIN where there is none. */
BH_CHECKED bh_code bh_channel_event(const bh_channel *channel, double angle, bh_event *event,
                                    bh_error *err);

/* The same event for `angle` [rad], false where there is none; the recoil's angle may be NAN.  A
 * third faster. */
bool bh_channel_has(const bh_channel *channel, double angle, bh_event *event);

/*
 * Fills sigma [ub/sr], lab, per solid angle of the detected particle, and momentum [MeV/c] of that
 * particle, for n values of angle [rad]; both 0 where there is no such event.  No allocation.
 */
void bh_channel_eval(const bh_channel *channel, size_t n, const double *angle, double *sigma,
                     double *momentum);

#endif
