/* angle_nodes.c - polynomials through a few angles. */
#include "beamhours/run/angle_nodes.h"

#include <math.h>
#include <stddef.h>

#include "beamhours/units/constants.h"

static double variable_of(double angle)
{
    const double s = sin(angle / 2);
    return log(fmax(2 * s * s, 1e-30));
}

int bh_angle_points(bh_interval polar)
{
    static const struct {
        double span; /* [1] at most, of ln(1 - cos theta) */
        int points;
    } steps[] = {{0, 1}, {0.06, 2}, {0.25, 3}, {0.7, 4}, {1.4, 6}, {2, 8}, {4, 13}};
    const double span = variable_of(polar.to) - variable_of(polar.from);
    for (size_t i = 0; i < sizeof steps / sizeof steps[0]; i++)
        if (span <= steps[i].span)
            return steps[i].points;
    return BH_ANGLE_NODES;
}

void bh_angle_nodes_of(bh_interval polar, int count, bh_angle_nodes *out)
{
    const double from = variable_of(polar.from), to = variable_of(polar.to);
    out->count = count;
    for (int i = 0; i < count; i++) {
        const double turn = BH_PI * (2 * i + 1) / (2 * count);
        out->node[i] = (from + to) / 2 - (to - from) / 2 * cos(turn);
        out->weight[i] = (i % 2 ? -1 : 1) * sin(turn);
        const double half = exp(out->node[i]) / 2; /* sin^2 of half the angle */
        const double angle = 2 * asin(fmin(1, sqrt(half)));
        out->angle[i] = count == 1 ? polar.from : fmin(fmax(angle, polar.from), polar.to);
    }
}

void bh_angle_shares(const bh_angle_nodes *nodes, double angle, double *share)
{
    const double u = variable_of(angle);
    double sum = 0;
    int on = -1;
    for (int i = 0; i < nodes->count; i++) {
        const double off = u - nodes->node[i];
        on = off == 0 || nodes->count == 1 ? i : on;
        share[i] = nodes->weight[i] / off;
        sum += share[i];
    }
    for (int i = 0; i < nodes->count; i++)
        share[i] = on < 0 ? share[i] / sum : (double)(i == on);
}

double bh_angle_between(const bh_angle_nodes *nodes, const double *share, const double *value)
{
    double sum = 0;
    for (int i = 0; i < nodes->count; i++)
        sum += share[i] * value[i];
    return sum;
}
