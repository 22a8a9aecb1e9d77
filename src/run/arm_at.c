/* arm_at.c - a slice takes the share of the ring's solid angle between its two cones. */
#include "beamhours/run/arm_at.h"

#include <math.h>

#include "beamhours/units/constants.h"

/* [1] of 2 pi, between two polar angles [rad]. */
static double between(double from, double to)
{
    return cos(fmax(from, 0.0)) - cos(fmin(to, BH_PI));
}

static double bin_width(const bh_arm *arm, double angle)
{
    int bin = 0;
    if (!arm->edges)
        return (arm->ring.to - arm->ring.from) / arm->bins;
    while (bin + 1 < arm->bins && arm->edges[bin + 1] <= angle)
        bin++;
    return arm->edges[bin + 1] - arm->edges[bin];
}

static void make_point(bh_setting_arm *of, double solid_angle)
{
    of->arm.shape = BH_SHAPE_POINT;
    of->arm.solid_angle = (bh_value){.value = solid_angle, .given = true};
    of->arm.bins = 1;
    of->arm.edges = NULL;
    of->arm.ring.given = false;
    of->want = BH_WANT_NOTHING;
    of->each_bin = false;
}

void bh_arm_slice(bh_setting_arm *of)
{
    const bh_arm *arm = &of->arm;
    const double angle = of->angle.value, half = bin_width(arm, angle) / 2.0;
    const double share = between(angle - half, angle + half);
    const double all = between(arm->ring.from, arm->ring.to);
    const double solid_angle =
        arm->solid_angle.given ? arm->solid_angle.value * share / all : arm->azimuth.value * share;
    make_point(of, solid_angle);
}

void bh_arm_centre(bh_setting_arm *of)
{
    make_point(of, 1e-3);
    of->arm.momentum_bite.given = false;
    of->arm.energy_cut.given = false;
}
