/* refining.c - depths between which sums over what arrives change smoothly. */
#include <math.h>

#include "beamhours/run/arriving.h"

enum { STEPS = 8, CUTS = 8, HALVINGS = 40, LEAST_DEPTHS = 2, MOST_EDGES = 64 };

/* A piece of a layer, and the depths [cm] at which it is cut. */
struct piece {
    const bh_arrival *arrival;
    const bh_vertex *like; /* one of its vertices */
    double weight;         /* [1] of all of them */
    int depths;            /* how many they are */
    int count;
    double cuts[CUTS];
};

static double at(const struct piece *p, double depth, double angle)
{
    const bh_vertex v = bh_way_vertex(p->arrival->leaver->way, p->like, depth);
    return bh_arrival_inside(p->arrival, &v, angle);
}

/* The depth between two at which the sign changes. */
static double cut_between(const struct piece *p, double angle, double from, double to)
{
    const bool inside = at(p, from, angle) >= 0;
    for (int i = 0; i < HALVINGS && to - from > 1e-12 * to; i++) {
        const double middle = (from + to) / 2;
        if ((at(p, middle, angle) >= 0) == inside)
            from = middle;
        else
            to = middle;
    }
    return (from + to) / 2;
}

static void add_cut(struct piece *p, double depth)
{
    if (p->count == CUTS)
        return;
    int i = p->count++;
    for (; i > 0 && p->cuts[i - 1] > depth; i--)
        p->cuts[i] = p->cuts[i - 1];
    p->cuts[i] = depth;
}

static void find_cuts(struct piece *p, double angle)
{
    const double length = p->like->to - p->like->from;
    double before = p->like->from;
    bool was_inside = at(p, before, angle) >= 0;
    for (int i = 1; i <= STEPS; i++) {
        const double next = p->like->from + length * i / STEPS;
        const bool inside = at(p, next, angle) >= 0;
        if (inside != was_inside)
            add_cut(p, cut_between(p, angle, before, next));
        before = next;
        was_inside = inside;
    }
}

/* Where particles between two bins of a ring begin or cease to arrive; the bins of a rectangle have
 * no such sharp angle. */
static void find_cuts_between(struct piece *p, const bh_acceptance *bins)
{
    if (!bins || bins->spec.shape != BH_ACCEPTANCE_RING || bins->bins > MOST_EDGES)
        return;
    for (int i = 1; i < bins->bins; i++)
        find_cuts(p, bh_acceptance_edge(bins, i));
}

static bool same_piece(const bh_vertex *a, const bh_vertex *b)
{
    return a->layer == b->layer && a->towards == b->towards;
}

/* The piece that vertex number `first` is the first of; false when it is not. */
static bool piece_from(const bh_vertex *vertices, size_t count, size_t first, struct piece *p)
{
    for (size_t i = 0; i < first; i++)
        if (same_piece(&vertices[i], &vertices[first]))
            return false;
    p->like = &vertices[first];
    p->weight = 0;
    p->depths = p->count = 0;
    for (size_t i = first; i < count; i++)
        if (same_piece(&vertices[i], p->like)) {
            p->weight += vertices[i].weight;
            p->depths++;
        }
    return true;
}

/* Points between two cuts. */
static size_t fill(const struct piece *p, double from, double to, bh_vertex *out)
{
    const double length = p->like->to - p->like->from;
    if (length > 0 && !(to > from))
        return 0;
    for (int i = 0; i < p->depths; i++) {
        double weight;
        const double depth = from + (to - from) * bh_depth_point(i, p->depths, &weight);
        out[i] = bh_way_vertex(p->arrival->leaver->way, p->like, depth);
        out[i].weight = p->weight * weight * (length > 0 ? (to - from) / length : 1);
    }
    return (size_t)p->depths;
}

static size_t fill_piece(struct piece *p, bh_vertex *out)
{
    size_t count = 0;
    if (p->count > 0 && p->depths < LEAST_DEPTHS)
        p->depths = LEAST_DEPTHS;
    double from = p->like->from;
    for (int i = 0; i <= p->count; i++) {
        const double to = i < p->count ? p->cuts[i] : p->like->to;
        count += fill(p, from, to, out + count);
        from = to;
    }
    return count;
}

size_t bh_arrival_refine(const bh_arrival *arrival, const bh_vertex *vertices, size_t count,
                         bh_vertex *out)
{
    size_t used = 0;
    struct piece p = {.arrival = arrival};
    for (size_t i = 0; i < count; i++) {
        if (!piece_from(vertices, count, i, &p))
            continue;
        find_cuts(&p, arrival->polar.from);
        if (arrival->polar.to > arrival->polar.from)
            find_cuts(&p, arrival->polar.to);
        find_cuts_between(&p, arrival->bins);
        if (used + (size_t)((p.depths + 1) * (p.count + 1)) > BH_MOST_REFINED)
            return 0;
        used += fill_piece(&p, out + used);
    }
    return used;
}
