/* range.c - range against energy as a table, and back. */
#include "beamhours/matter/range.h"

#include <math.h>
#include <stdlib.h>

#include "beamhours/base/sentences.h"
#include "beamhours/units/constants.h"

#define LOWEST  1e-3   /* MeV per proton mass, or of an electron: the root begins */
#define HIGHEST 1e7    /* MeV */
#define STEP    0.0313 /* in the logarithm of the energy: the slope of the cubic is good to 2e-6 */

/* At the logarithm u of the energy: range, and its derivative by u. */
typedef struct {
    double u, range, slope;
} knot;

struct bh_range {
    const bh_stopping *stopping;
    bh_losing losing;
    double top; /* MeV */
    size_t count;
    knot knots[];
};

static double inverse_slope(const bh_stopping *stopping, bh_losing losing, double u)
{
    const double kinetic = exp(u);
    const bh_loss loss = bh_stopping_at(stopping, kinetic);
    return kinetic / (losing == BH_LOSE_ALL ? loss.collision + loss.radiative : loss.collision);
}

/* The energies [ln MeV] that must be knots: both ends, and the breaks between. */
typedef struct {
    size_t count;
    double u[BH_STOPPING_BREAKS + 2];
} corners;

static corners corners_of(const bh_stopping *stopping, double lowest, double top)
{
    double breaks[BH_STOPPING_BREAKS];
    const size_t n = bh_stopping_breaks(stopping, breaks);
    corners c = {1, {log(lowest)}};
    for (size_t i = 0; i < n; i++)
        if (breaks[i] > lowest * 1.001 && breaks[i] < top * 0.999 &&
            log(breaks[i]) > c.u[c.count - 1] + 1e-6)
            c.u[c.count++] = log(breaks[i]);
    c.u[c.count++] = log(top);
    return c;
}

static size_t steps_between(double from, double to)
{
    return (size_t)ceil((to - from) / STEP);
}

/* Simpson's rule over one step; the slope is known at the ends. */
static void advance(bh_range *r, double to)
{
    const knot *last = &r->knots[r->count - 1];
    const double middle = inverse_slope(r->stopping, r->losing, 0.5 * (last->u + to));
    knot next = {.u = to, .slope = inverse_slope(r->stopping, r->losing, to)};
    next.range = last->range + (to - last->u) / 6.0 * (last->slope + 4.0 * middle + next.slope);
    r->knots[r->count++] = next;
}

bh_code bh_range_new(const bh_stopping *stopping, bh_losing losing, double kinetic, bh_range **out,
                     bh_error *err)
{
    const bh_particle *p = bh_stopping_particle(stopping);
    const double lowest = bh_particle_is_electron(p) ? LOWEST : LOWEST * p->mass / BH_MASS_PROTON;
    if (!(kinetic > lowest) || !(kinetic <= HIGHEST))
        return bh_fail(err, BH_EDOMAIN, BH_SAY_STOPPING_ENERGY, kinetic, p->name);
    const corners c = corners_of(stopping, lowest, kinetic);
    size_t count = 1;
    for (size_t i = 0; i + 1 < c.count; i++)
        count += steps_between(c.u[i], c.u[i + 1]);
    bh_range *r = malloc(sizeof *r + count * sizeof r->knots[0]);
    if (!r)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    *r = (bh_range){.stopping = stopping, .losing = losing, .top = kinetic, .count = 1};
    /* Loss as the root of the energy: the range there is twice energy over loss. */
    const double first = inverse_slope(stopping, losing, c.u[0]);
    r->knots[0] = (knot){c.u[0], 2.0 * first, first};
    for (size_t i = 0; i + 1 < c.count; i++) {
        const size_t n = steps_between(c.u[i], c.u[i + 1]);
        for (size_t k = 1; k <= n; k++)
            advance(r,
                    k == n ? c.u[i + 1] : c.u[i] + (c.u[i + 1] - c.u[i]) * (double)k / (double)n);
    }
    *out = r;
    return BH_OK;
}

void bh_range_free(bh_range *range)
{
    free(range);
}

const bh_stopping *bh_range_stopping(const bh_range *range)
{
    return range->stopping;
}

double bh_range_top(const bh_range *range)
{
    return range->top;
}

/* The cubic between two knots, its value and derivative at `part` of the way. */
typedef struct {
    double value, slope;
} point;

static point cubic(const knot *k, double part)
{
    const double h = k[1].u - k[0].u;
    const double rise = k[1].range - k[0].range;
    const double left = h * k[0].slope;
    const double right = h * k[1].slope;
    const double square = 3.0 * rise - 2.0 * left - right;
    const double cube = left + right - 2.0 * rise;
    return (point){k[0].range + part * (left + part * (square + part * cube)),
                   left + part * (2.0 * square + 3.0 * part * cube)};
}

/* Steps are nearly alike: from where the piece would be if they were, a few pieces on. */
static size_t piece_of_energy(const bh_range *r, double u)
{
    const size_t last = r->count - 2;
    const double at = (u - r->knots[0].u) / STEP;
    size_t i = at > 0.0 ? (size_t)at : 0;
    i = i < last ? i : last;
    while (i < last && u >= r->knots[i + 1].u)
        i++;
    return i;
}

static size_t piece_of_range(const bh_range *r, double range)
{
    size_t low = 0;
    size_t high = r->count - 1;
    while (high - low > 1) {
        const size_t middle = (low + high) / 2;
        if (range < r->knots[middle].range)
            high = middle;
        else
            low = middle;
    }
    return low;
}

/* The same from the piece of a larger range, often not far. */
static size_t piece_below(const bh_range *r, double range, size_t piece)
{
    for (int i = 0; i < 4 && piece > 0; i++, piece--)
        if (range >= r->knots[piece].range)
            return piece;
    return piece_of_range(r, range);
}

/* From the logarithm of an energy within the table. */
static double range_at(const bh_range *r, double u)
{
    const knot *first = &r->knots[0];
    if (u <= first->u)
        return first->range * exp(0.5 * (u - first->u));
    const knot *k = &r->knots[piece_of_energy(r, u)];
    return cubic(k, (u - k[0].u) / (k[1].u - k[0].u)).value;
}

/* And back, for 0 < range, at most the last one, in a piece at most `piece`.  Newton from the
 * chord: the cubic is close to straight over a step. */
static double logarithm_below(const bh_range *r, double range, size_t piece)
{
    const knot *first = &r->knots[0];
    if (range <= first->range)
        return first->u + 2.0 * log(range / first->range);
    const knot *k = &r->knots[piece_below(r, range, piece)];
    double part = (range - k[0].range) / (k[1].range - k[0].range);
    for (int i = 0; i < 8; i++) {
        const point p = cubic(k, part);
        const double step = (range - p.value) / p.slope;
        part += step;
        if (fabs(step) < 1e-15)
            break;
    }
    return k[0].u + part * (k[1].u - k[0].u);
}

static double logarithm_at(const bh_range *r, double range)
{
    return logarithm_below(r, range, piece_of_range(r, range));
}

static double full_range(const bh_range *r)
{
    return r->knots[r->count - 1].range;
}

double bh_range_of(const bh_range *range, double kinetic)
{
    if (!(kinetic >= 0.0) || !(kinetic <= range->top))
        return (double)NAN;
    return kinetic > 0.0 ? range_at(range, log(kinetic)) : 0.0;
}

double bh_range_energy(const bh_range *range, double path)
{
    if (!(path <= full_range(range) * (1.0 + 1e-14)))
        return (double)NAN;
    return path > 0.0 ? fmin(exp(logarithm_at(range, path)), range->top) : 0.0;
}

double bh_range_after(const bh_range *range, double kinetic, double path)
{
    if (path == 0.0 && kinetic >= 0.0 && kinetic <= range->top)
        return kinetic;
    const double left = bh_range_of(range, kinetic) - path;
    if (!(path > 0.0) || !(left > 0.0))
        return bh_range_energy(range, left);
    return exp(logarithm_below(range, left, piece_of_energy(range, log(kinetic))));
}

double bh_range_lost(const bh_range *range, double kinetic, double path)
{
    if (path == 0.0 || kinetic == 0.0)
        return 0.0;
    const double left = bh_range_of(range, kinetic) - path;
    if (!(path > 0.0) || isnan(left))
        return (double)NAN;
    if (!(left > 0.0))
        return kinetic;
    /* Differences of logarithms keep the digits that energies would lose. */
    const double here = log(kinetic);
    return -kinetic * expm1(logarithm_at(range, left) - here);
}
