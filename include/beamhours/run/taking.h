/* taking.h - with what probability an arm takes a particle: momentum bite, threshold, resolution.
 */
#ifndef BH_RUN_TAKING_H
#define BH_RUN_TAKING_H

#include <stdbool.h>

#include "beamhours/plan/plan.h"
#include "beamhours/rates/bite.h"
#include "beamhours/run/channel.h"
#include "beamhours/run/passage.h"

/* The momentum with which a particle arrives is measured with a normal error, and counts when what
 * is measured lies in the bite and above the threshold. */
typedef struct {
    bool cut;            /* false: every particle that comes out is taken */
    bh_bite bite;        /* [MeV/c] of arriving particles, the threshold in it */
    bh_momentum_rms rms; /* of the arm and the beam */
    double mass;         /* [MeV] of the particle */
} bh_taking;

/* The resolution of an arm and the spread of the beam. */
bh_momentum_rms bh_taking_rms(const bh_arm *arm, const bh_beam *beam);

/* A particle that arrives. */
typedef struct {
    double kinetic;  /* [MeV] at the detector; 0: it has stopped */
    double per_beam; /* [MeV/c] p_beam dp/dp_beam of its momentum at this angle, as it arrives */
} bh_arriver;

/* Returns [1] the probability that it is counted. */
double bh_taking_share(const bh_taking *taking, const bh_arriver *arriver);

/* Returns [1] the standard deviation at the ends of the bite, relative, of the arm alone: what is
 * kept is as smooth as that.  1e-5 where it is finer. */
double bh_taken_fineness(const bh_taking *taking);

/* Who comes from where. */
typedef struct {
    const bh_channel *channel;
    const bh_leaver *leaver; /* NULL: nothing is lost */
    const bh_taking *taking;
    int boost; /* BH_AS_IT_IS ... of the beam */
} bh_taken;

/* Returns [1] the probability that the particle scattered at `vertex` to angle [rad] is counted;
 * 0 where there is no such event. */
double bh_taken_share(const bh_taken *taken, const bh_vertex *vertex, double angle);

/* Returns [MeV/c] per_beam of the particle as it is scattered at `vertex` to angle [rad]; 0 where
 * the beam has no spread or there is no such event. */
double bh_taken_per_beam(const bh_taken *taken, const bh_vertex *vertex, double angle);

/* Returns the particle that leaves `vertex` at angle [rad] with kinetic [MeV] and per_beam [MeV/c],
 * as it arrives; per_beam [MeV/c] to 1e-3. */
bh_arriver bh_taken_arriver(const bh_taken *taken, const bh_vertex *vertex, double angle,
                            double kinetic, double per_beam);

/* Returns [1] how many standard deviations the momenta from two vertices arrive apart at
 * angle [rad]. */
double bh_taken_apart(const bh_taken *taken, const bh_vertex ends[2], double angle);

/* Returns [rad] over how much of the angle [rad] the momentum changes by one standard deviation
 * there; INFINITY where it does not change. */
double bh_taken_width(const bh_taken *taken, const bh_vertex *vertex, double angle);

typedef enum { BH_SMEARED_NOTHING, BH_SMEARED_ALL, BH_SMEARED_SOME } bh_smearing;

/* Whether the resolution matters between the polar angles `polar`: ALL are taken from all `count`
 * vertices whatever the resolution does (to 1e-9); NOTHING: it is too fine to tell, the sharp bite
 * will do (to 1e-6 of the counts), or there is none. */
bh_smearing bh_taken_smearing(const bh_taken *taken, const bh_vertex *vertices, size_t count,
                              bh_interval polar);

#endif
