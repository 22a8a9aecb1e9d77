/* arriving.c - at which angles a detected particle arrives within the momenta that an arm takes. */
#include "beamhours/run/arriving.h"

#include <math.h>
#include <stdlib.h>

#include "beamhours/units/constants.h"

enum { STEPS = 8, LONGEST = 80 };

static const double close = 1e-10; /* [rad] of the ends */

double bh_arrival_momentum(const bh_arrival *arrival, const bh_vertex *vertex, double angle)
{
    bh_channel there = *arrival->channel;
    bh_event event;
    there.encounter.kinetic = vertex->kinetic[arrival->boost];
    if (!bh_channel_has(&there, angle, &event))
        return 0;
    const double kinetic = there.recoil ? event.recoil_kinetic : event.scattered_kinetic;
    const double left = bh_leaver_left(arrival->leaver, vertex, angle, kinetic);
    return sqrt(left * (left + 2 * arrival->leaver->particle.mass));
}

/* The polar angles at which there is anything. */
static bh_interval reached(const bh_arrival *a)
{
    const double largest = bh_channel_largest_angle(a->channel);
    return (bh_interval){fmin(a->polar.from, largest), fmin(a->polar.to, largest)};
}

/* Returns [rad] the angle at which the particle leaves along the layers and its way out is longest;
 * on either side its momentum changes in one sense or slowly. */
static double grazing(const bh_arrival *a, const bh_vertex *vertex)
{
    const bh_way *way = a->leaver->way;
    return atan2(way->cosine, -way->sine * vertex->towards);
}

static bool within(double angle, bh_interval polar)
{
    return angle > polar.from && angle < polar.to;
}

/* --- at a glance --- */

/* The momenta from several depths at several angles. */
struct glance {
    const bh_arrival *arrival;
    double least, most, apart; /* [MeV/c] apart: depths at one angle */
};

/* From both ends of the pieces of layers that two vertices are of. */
static void look(struct glance *g, const bh_vertex ends[2], double angle)
{
    const double one = bh_arrival_momentum(g->arrival, &ends[0], angle);
    const double other = bh_arrival_momentum(g->arrival, &ends[1], angle);
    g->least = fmin(g->least, fmin(one, other));
    g->most = fmax(g->most, fmax(one, other));
    g->apart = fmax(g->apart, fabs(one - other));
}

static void look_around(struct glance *g, const bh_vertex ends[2])
{
    const bh_interval polar = reached(g->arrival);
    const double longest = grazing(g->arrival, ends);
    for (int i = 0; i < 3; i++)
        look(g, ends, polar.from + (polar.to - polar.from) * i / 2);
    if (within(longest, polar))
        look(g, ends, longest);
}

bh_arriving bh_arrival_at_a_glance(const bh_arrival *arrival, const bh_vertex *vertices,
                                   size_t count)
{
    const bh_way *way = arrival->leaver->way;
    const bool around = way->ring && way->sine != 0; /* neighbours lie at other azimuths */
    struct glance g = {.arrival = arrival, .least = (double)INFINITY};
    for (size_t i = 0; i < (around ? count : 1); i++) {
        const bh_vertex *last = &vertices[around ? i : count - 1];
        const bh_vertex ends[2] = {bh_way_vertex(way, &vertices[i], vertices[i].from),
                                   bh_way_vertex(way, last, last->to)};
        look_around(&g, ends);
    }
    /* Depths between the outermost lose more than both only where some leave by the wall; the
     * rest is for boosts and the angles between these. */
    const double margin = (way->wall_radius > 0 ? 3 : 0) * g.apart + 2e-3 * g.most;
    if (g.least > fmax(arrival->from, 0) + margin && g.most < arrival->to - margin)
        return BH_ARRIVE_ALL;
    if (g.most < arrival->from - margin || (g.least > arrival->to + margin))
        return BH_ARRIVE_NONE;
    return BH_ARRIVE_SOME;
}

/* --- angle by angle --- */

double bh_arrival_inside(const bh_arrival *a, const bh_vertex *v, double angle)
{
    const double p = bh_arrival_momentum(a, v, angle);
    if (!(p > 0))
        return -1;
    const double above = a->from > 0 ? (p - a->from) / a->from : 1;
    const double below = isinf(a->to) ? 1 : (a->to - p) / a->to;
    return fmin(above, below);
}

/* One end of a bracket. */
struct side {
    double x, f; /* [rad] [1] */
};

/* Where momenta come inside, between two angles. */
struct bracket {
    struct side one, other; /* one is inside, one outside */
    int stayed;             /* how often in a row `other` has, negative for `one` */
};

/* Puts x in the place of the end that is like it; the value of an end that stays twice is halved
 * (false position after the Illinois rule). */
static void narrow(struct bracket *b, struct side x)
{
    if ((x.f < 0) == (b->one.f < 0)) {
        b->one = x;
        b->stayed = b->stayed > 0 ? b->stayed + 1 : 1;
        if (b->stayed > 1)
            b->other.f /= 2;
    } else {
        b->other = x;
        b->stayed = b->stayed < 0 ? b->stayed - 1 : -1;
        if (b->stayed < -1)
            b->one.f /= 2;
    }
}

static double end_between(const bh_arrival *a, const bh_vertex *v, struct side one,
                          struct side other)
{
    struct bracket b = {one, other, 0};
    struct side x = one;
    for (int i = 0; i < LONGEST && b.other.x - b.one.x > close; i++) {
        const double part = abs(b.stayed) > 3 ? 0.5 : b.one.f / (b.one.f - b.other.f);
        const double before = x.x;
        x.x = b.one.x + (b.other.x - b.one.x) * part;
        x.f = bh_arrival_inside(a, v, x.x);
        if (fabs(x.x - before) < close && fabs(x.f) < close)
            break;
        narrow(&b, x);
    }
    return x.x;
}

/* Angle number i of those that are looked at: closer steps where the way out is longest. */
static double step_to(bh_interval polar, double middle, int i)
{
    if (i <= STEPS)
        return polar.from + (middle - polar.from) * i / STEPS;
    return middle + (polar.to - middle) * (i - STEPS) / STEPS;
}

size_t bh_arrival_angles(const bh_arrival *arrival, const bh_vertex *vertex,
                         bh_interval out[BH_MOST_ARRIVALS])
{
    const bh_interval polar = reached(arrival);
    const double middle = grazing(arrival, vertex);
    const int steps = within(middle, polar) ? 2 * STEPS : STEPS;
    size_t count = 0;
    struct side here = {polar.from, bh_arrival_inside(arrival, vertex, polar.from)};
    double begin = 0;
    for (int i = 1; i <= steps; i++) {
        const double x = step_to(polar, steps > STEPS ? middle : polar.to, i);
        const struct side next = {x, bh_arrival_inside(arrival, vertex, x)};
        if ((here.f < 0) != (next.f < 0)) {
            const double end = end_between(arrival, vertex, here, next);
            if (here.f < 0)
                begin = end;
            else
                out[count++] = (bh_interval){begin, end};
        }
        here = next;
    }
    if (here.f >= 0)
        out[count++] = (bh_interval){begin, (double)INFINITY};
    return count;
}
