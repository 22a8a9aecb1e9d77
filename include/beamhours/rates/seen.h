/* seen.h - how much of each target layer an arm sees. */
#ifndef BH_RATES_SEEN_H
#define BH_RATES_SEEN_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/error.h"

/* A layer of the target, in the order the beam meets them. */
typedef struct {
    double thickness; /* [cm] along the layer's normal, >= 0 */
    bool sample;      /* role sample: the view is centred on the middle of the sample layers */
} bh_seen_layer;

/* What the arm looks at. */
typedef struct {
    bool limited; /* false: all of the target is seen */
    double from;  /* [cm] target view at 90 degrees from the centre, downstream positive */
    double to;    /* [cm] above from */
    double angle; /* [rad] polar angle of the arm's axis; seen length = view / sin(angle) */
    double tilt;  /* [rad] of the layers, |tilt| < pi/2: the beam's path is 1 / cos(tilt) longer */
} bh_seen_view;

/*
 * Fills path [1], one for each of `count` layers: (seen share of the layer) / cos(tilt).  Seen
 * nuclei per cm2 of a layer = path x its areal number along the normal.  Positions are along the
 * beam; the centre is the middle between entering the first and leaving the last sample layer (of
 * all layers when there is no sample).  A layer of no thickness is seen or not as a whole.  At
 * angle 0 or pi everything is seen.  A ring has no axis: give its mean polar angle.
 * BH_EDOMAIN for NaN, from >= to, |tilt| >= pi/2, a negative thickness.
 * Source: plan format, `target_view`: seen half-length = view / sin(angle).
 */
BH_CHECKED bh_code bh_seen_paths(const bh_seen_view *view, size_t count,
                                 const bh_seen_layer *layers, double *path, bh_error *err);

/* What of a layer is seen, along its normal from its first face. */
typedef struct {
    double from, to; /* [cm] 0 .. thickness; equal where nothing is seen */
} bh_seen_span;

/* Fills span, one for each layer, of what bh_seen_paths counts; errors as there. */
BH_CHECKED bh_code bh_seen_spans(const bh_seen_view *view, size_t count,
                                 const bh_seen_layer *layers, bh_seen_span *span, bh_error *err);

/* Returns [cm] the length along the beam that is seen of the sample layers, all of them when not
 * limited; NAN where bh_seen_paths would refuse. */
double bh_seen_length(const bh_seen_view *view, size_t count, const bh_seen_layer *layers);

#endif
