/* resolution.h - what an arm's angle resolution and the deflections in matter do to its bins. */
#ifndef BH_RUN_RESOLUTION_H
#define BH_RUN_RESOLUTION_H

#include "beamhours/run/yield.h"

/*
 * Returns [rad] the rms by which the measured angle of an arm in its plane differs from the true
 * one at the collision: angle_resolution and, where energy is lost, multiple scattering of the beam
 * before and of the detected particle behind the vertex, in quadrature.  Highland's formula with
 * the thickness of both ways summed, shared out by their lengths; mean over `count` vertices of the
 * scatterer, in the yielder, at the arm's axis; from depths with more than 10 radiation lengths to
 * go, 0.  11 % as bh_highland.
 */
double bh_view_angle_rms(const bh_yielder *yielder, const bh_view *view, const bh_channel *channel,
                         size_t count);

/* Moves what belongs in each bin to where it is measured, of the sums of signal, background and
 * sensitivities in yield->part; the whole arm stays. */
void bh_resolve_bins(bh_yield *yield);

#endif
