/* acceptance.h - what part of all directions an arm covers, as a weight over the polar angle. */
#ifndef BH_RATES_ACCEPTANCE_H
#define BH_RATES_ACCEPTANCE_H

#include <stdbool.h>

#include "beamhours/base/error.h"

/*
 * An unpolarised cross section depends on the polar angle theta alone, so every shape reduces
 * without approximation to  dOmega = weight(theta) dtheta,  weight = sin(theta) x the azimuth that
 * lies inside.
 *
 * Rectangle: a direction stands at in-plane angle phi from the arm's axis, then at out-of-plane
 * angle psi from that plane: cos theta = cos psi cos(angle + phi), dOmega = cos psi dpsi dphi.
 * With the azimuth alpha from the in-plane direction, sin psi = sin theta sin alpha and
 * tan(angle + phi) = tan theta cos alpha: the azimuth inside is a difference of two arcs in each
 * quarter of the sphere.  Any extent is allowed, also across the beam axis, 90 or 180 degrees.
 */
typedef enum {
    BH_ACCEPTANCE_RECTANGLE,
    BH_ACCEPTANCE_RING,
    BH_ACCEPTANCE_POINT
} bh_acceptance_shape;

/* What is asked for; members of the other shapes are not read. */
typedef struct {
    bh_acceptance_shape shape;
    double angle; /* [rad] rectangle, point: polar angle of the arm's axis, 0 .. pi */
    double in_plane_from, in_plane_to;         /* [rad] around the axis; from < to, at most 2 pi */
    double out_of_plane_from, out_of_plane_to; /* [rad] -pi/2 <= from < to <= pi/2 */
    double ring_from, ring_to;                 /* [rad] polar angles, 0 <= from < to <= pi */
    double azimuth;      /* [rad] of a ring, above 0, at most 2 pi; 0 means all of it, 2 pi */
    double solid_angle;  /* [sr] point: its size; beside a shape: what the shape is scaled to, 0:
                            as it is */
    int bins;            /* >= 1; 0 means 1.  A point has one */
    const double *edges; /* [rad] bins + 1 rising: ring, polar angles; rectangle, in-plane lab
                            angles (angle + phi); NULL: equal steps.  Must outlive the acceptance.
                            What lies outside the shape is cut off */
} bh_acceptance_spec;

/* A polar interval. */
typedef struct {
    double from, to; /* [rad] */
} bh_interval;

/* One quarter-sphere piece of a rectangle: in-plane lab angle in_from .. in_to within 0 .. pi and
 * out-of-plane angle out_from .. out_to within 0 .. pi/2; `times` of them by symmetry. */
typedef struct {
    double in_from, in_to;   /* [rad] */
    double out_from, out_to; /* [rad] */
    int times;
} bh_patch;

enum { BH_PATCHES = 8, BH_KINKS = 4 * BH_PATCHES };

/* A shape or one bin of it, ready for use.  Plain value. */
typedef struct {
    double in_from, in_to;   /* [rad] rectangle: in-plane lab angles; ring: polar angles */
    double out_from, out_to; /* [rad] rectangle: out-of-plane angles */
    double azimuth;          /* [rad] ring */
    double scale;            /* [1] written solid angle / that of the shape; 1 when none written */
    double solid_angle;      /* [sr] scaled; 0 for a bin outside the shape */
    bh_interval polar;       /* the polar angles it reaches; from == to for a point */
    int patch_count;         /* rectangle; else 0 */
    bh_patch patches[BH_PATCHES];
} bh_acceptance_part;

/* Plain value, read-only after bh_acceptance_make; thread safe. */
typedef struct {
    bh_acceptance_spec spec;
    int bins; /* >= 1 */
    bh_acceptance_part whole;
} bh_acceptance;

/* Checks and prepares.  BH_EDOMAIN (NaN, empty or reversed extent, falling edges, out of the
 * ranges above) with a sentence in err; out untouched on failure. */
BH_CHECKED bh_code bh_acceptance_make(const bh_acceptance_spec *spec, bh_acceptance *out,
                                      bh_error *err);

/* Bin `bin` (1 .. bins), or the whole for 0, into `out`.  Its solid angle is in closed form
 * (rectangle: dphi (sin psi2 - sin psi1)); a written solid angle scales bins and whole alike. */
void bh_acceptance_part_of(const bh_acceptance *acceptance, int bin, bh_acceptance_part *out);

/* Returns [rad] edge number i (0 .. bins) of the bins: polar angle for a ring, in-plane lab angle
 * for a rectangle, the axis for a point; not cut to the shape. */
double bh_acceptance_edge(const bh_acceptance *acceptance, int i);

/* Returns [rad] the mean polar angle of a part over its solid angle, to 1e-6 (measured 1e-8). */
double bh_acceptance_mean_angle(const bh_acceptance_part *part);

/* Returns [rad] the azimuth inside `part` at polar angle theta [rad]; unscaled.  A point has none:
 * 0.  Accuracy 1e-14. */
double bh_acceptance_azimuth(const bh_acceptance_part *part, double theta);

/* Returns [sr/rad] the weight at polar angle theta [rad]: scale x sin(theta) x azimuth inside. */
double bh_acceptance_weight(const bh_acceptance_part *part, double theta);

/* Fills kinks [rad] (room for BH_KINKS), rising, without repeats: the polar angles where the
 * weight is not smooth, both ends of its range among them; on either side it may start like a
 * square root.  Returns how many; a point has none. */
int bh_acceptance_kinks(const bh_acceptance_part *part, double *kinks);

/* True when the beam's own direction (polar angle 0) lies in the part or on its edge. */
bool bh_acceptance_meets_beam(const bh_acceptance_part *part);

#endif
