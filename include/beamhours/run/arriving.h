/* arriving.h - at which angles a detected particle arrives within the momenta that an arm takes. */
#ifndef BH_RUN_ARRIVING_H
#define BH_RUN_ARRIVING_H

#include "beamhours/rates/acceptance.h"
#include "beamhours/run/channel.h"
#include "beamhours/run/passage.h"

/* Who arrives where.  The channel's own energy is not read. */
typedef struct {
    const bh_leaver *leaver;
    const bh_channel *channel;
    double from, to;           /* [MeV/c] that are taken; from 0: all that come out */
    bh_interval polar;         /* [rad] the polar angles of interest */
    int boost;                 /* BH_AS_IT_IS ... */
    const bh_acceptance *bins; /* whose bins have sums of their own; NULL: none have */
} bh_arrival;

/* Returns [MeV/c] the momentum with which the particle scattered at `vertex` to `angle` [rad]
 * arrives; 0 where there is no such event or it stops on the way. */
double bh_arrival_momentum(const bh_arrival *arrival, const bh_vertex *vertex, double angle);

typedef enum { BH_ARRIVE_NONE, BH_ARRIVE_SOME, BH_ARRIVE_ALL } bh_arriving;

/* Whether the particles from all `count` vertices arrive within the momenta at all angles, from
 * some, or from none: SOME whenever it is not plain. */
bh_arriving bh_arrival_at_a_glance(const bh_arrival *arrival, const bh_vertex *vertices,
                                   size_t count);

enum { BH_MOST_ARRIVALS = 16 };

/* Fills `out` [rad], rising, with the angles at which those from `vertex` do, and returns how many
 * intervals there are; their ends to 1e-10 rad. */
size_t bh_arrival_angles(const bh_arrival *arrival, const bh_vertex *vertex,
                         bh_interval out[BH_MOST_ARRIVALS]);

enum { BH_MOST_REFINED = 256 };

/*
 * Vertices in the place of `count` others of the same nuclei, for sums over what arrives: pieces of
 * layers are cut at the depths from which particles at either end of the polar angles, or between
 * two bins of a ring, begin or cease to, so that between cuts the sums change smoothly with the
 * depth.  Fills `out` (room for BH_MOST_REFINED) and returns how many; 0 where there would be more.
 */
size_t bh_arrival_refine(const bh_arrival *arrival, const bh_vertex *vertices, size_t count,
                         bh_vertex *out);

/* Returns [1] how far inside the momenta the particle scattered to `angle` [rad] arrives, negative
 * outside; the sign is exact. */
double bh_arrival_inside(const bh_arrival *arrival, const bh_vertex *vertex, double angle);

#endif
