/* angle_nodes.h - functions of a polar angle kept at a few angles, what is between by a polynomial.
 */
#ifndef BH_RUN_ANGLE_NODES_H
#define BH_RUN_ANGLE_NODES_H

#include "beamhours/rates/acceptance.h"

enum { BH_ANGLE_NODES = 16 };

/* Chebyshev points in ln(1 - cos theta), in which cross sections and corrections are smooth. */
typedef struct {
    int count;
    double angle[BH_ANGLE_NODES];  /* [rad] */
    double node[BH_ANGLE_NODES];   /* [1] ln(1 - cos angle) */
    double weight[BH_ANGLE_NODES]; /* [1] barycentric */
} bh_angle_nodes;

/* Returns [1] how many points are enough for 1e-4 of a correction over the angles `polar` [rad]. */
int bh_angle_points(bh_interval polar);

/* Fills `out` with `count` points over `polar` [rad]; one stands at its beginning. */
void bh_angle_nodes_of(bh_interval polar, int count, bh_angle_nodes *out);

/* Fills share [1], one for each point: the polynomial through values at the points is the sum of
 * share x value at polar `angle` [rad]. */
void bh_angle_shares(const bh_angle_nodes *nodes, double angle, double *share);

/* Returns [1], or in the unit of value [1], the sum of `share` [1] x `value` over the points. */
double bh_angle_between(const bh_angle_nodes *nodes, const double *share, const double *value);

#endif
