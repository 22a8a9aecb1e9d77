/* kinematics.h - exact relativistic elastic scattering of any two masses, the target at rest. */
#ifndef BH_PHYSICS_KINEMATICS_H
#define BH_PHYSICS_KINEMATICS_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/error.h"

typedef struct {
    double mass;    /* [MeV] of the beam particle, 0 .. 1e6 */
    double target;  /* [MeV] mass of the struck particle, 0.1 .. 1e6 */
    double kinetic; /* [MeV] beam kinetic energy of the whole particle, 1e-3 .. 1e6, for beam
                       particles heavier than 1 u up to 1e6 per u; 0.1 % past either
                       limit is let by */
} bh_collision;

/* One elastic event, every quantity in the laboratory unless it says otherwise. */
typedef struct {
    double scattered_angle;    /* [rad] 0 .. pi */
    double scattered_kinetic;  /* [MeV] */
    double scattered_momentum; /* [MeV/c] */
    double recoil_angle;       /* [rad] 0 .. pi/2, on the other side of the beam */
    double recoil_kinetic;     /* [MeV] the primary quantity: exact also where the scattered loses
                                  little */
    double recoil_momentum;    /* [MeV/c] = three-momentum transfer */
    double beam_energy;        /* [MeV] total */
    double beam_momentum;      /* [MeV/c] */
    double s, t, u;            /* [MeV^2] Mandelstam */
    double q2;                 /* [MeV^2] = -t */
    double transverse2; /* [MeV^2] square of the beam momentum across the momentum transfer, free of
                           cancellation: (s - u)^2 = 4 (4 M^2 + q2) (transverse2 + m^2 + q2 / 4) */
    double epsilon;     /* [1] virtual-photon polarisation with the beam mass; may exceed 1:
                           (transverse2 + m^2) / (transverse2 + q2 / 2) */
    double cm_per_lab;  /* [1] dOmega*_cm / dOmega_lab of the scattered particle, >= 0; infinite at
                           the largest angle where mass > target */
    double scattered_per_recoil; /* [1] dOmega_scattered / dOmega_recoil, >= 0; infinite for a
                                    head-on collision of equal masses */
} bh_event;

/* Which of two solutions where the beam is heavier than the target: the more energetic scattered
 * particle, or the less energetic one. */
typedef enum { BH_BRANCH_FAST, BH_BRANCH_SLOW } bh_branch;

/*
 * The event with the scattered particle at `angle` [rad].  At angle 0 nothing happens (q2 = 0) but
 * the recoil angle has its limit, pi/2.  Outputs are untouched on failure, here and below; `err`
 * may be NULL; everything is thread safe.
 * BH_EDOMAIN where an input is out of range or the angle cannot be reached; the message names the
 * largest angle.  BH_BRANCH_SLOW exists only for mass > target (and mass == target: refused).
 * Accuracy: 1e-12 times the condition number, against a table made in extended precision.
 */
BH_CHECKED bh_code bh_kinematics_scattered(const bh_collision *in, double angle, bh_branch branch,
                                           bh_event *out, bh_error *err);

/* The event with the recoil at `angle` [rad], 0 <= angle <= pi/2 (one solution always). */
BH_CHECKED bh_code bh_kinematics_recoil(const bh_collision *in, double angle, bh_event *out,
                                        bh_error *err);

/* The event with momentum transfer squared `q2` [MeV^2]; message names the largest possible. */
BH_CHECKED bh_code bh_kinematics_q2(const bh_collision *in, double q2, bh_event *out,
                                    bh_error *err);

/* Events for n values of `angle` [rad] of one collision, without any check: angles 0 to the
 * largest, BH_BRANCH_SLOW only for mass > target.  For inner loops; equal to those of
 * bh_kinematics_scattered bit for bit, but for recoil_angle, which is NAN: it would take as long as
 * all the rest. */
void bh_kinematics_batch(const bh_collision *in, size_t n, const double *angle, bh_branch branch,
                         bh_event *out);

/* Whether masses and kinetic energy are in range. */
bool bh_kinematics_in_range(const bh_collision *in);

/* The event at virtual-photon polarisation `epsilon` [1]; the message names the range that the
 * energy allows, from head on to forward. */
BH_CHECKED bh_code bh_kinematics_epsilon(const bh_collision *in, double epsilon, bh_event *out,
                                         bh_error *err);

/* Returns [rad] the largest angle a scattered particle can reach: pi unless mass >= target. */
double bh_kinematics_largest_angle(const bh_collision *in);

/* Returns [MeV^2] the largest q2, that of head-on collision. */
double bh_kinematics_largest_q2(const bh_collision *in);

/* How many solutions there are at scattered angle `angle` [rad]: 0, 1 or 2. */
int bh_kinematics_branches(const bh_collision *in, double angle);

/* The beam kinetic energy `kinetic` [MeV] that gives `q2` [MeV^2] at scattered angle `angle` [rad]
 * (in->kinetic is not read); for mass > target the one of BH_BRANCH_FAST. */
BH_CHECKED bh_code bh_kinematics_energy(const bh_collision *in, double q2, double angle,
                                        double *kinetic, bh_error *err);

/* The beam kinetic energy `kinetic` [MeV] that gives `q2` [MeV^2] with `epsilon` [1]
 * (in->kinetic is not read); the angle follows from bh_kinematics_q2. */
BH_CHECKED bh_code bh_kinematics_energy_epsilon(const bh_collision *in, double q2, double epsilon,
                                                double *kinetic, bh_error *err);

/* The beam kinetic energy `kinetic` [MeV] that gives `epsilon` [1] at scattered `angle` [rad], for
 * mass <= target (in->kinetic is not read).  By iteration, to 1e-13 times the condition
 * number. */
BH_CHECKED bh_code bh_kinematics_energy_angle_epsilon(const bh_collision *in, double angle,
                                                      double epsilon, double *kinetic,
                                                      bh_error *err);

#endif
