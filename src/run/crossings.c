/* crossings.c - the matter on both sides of collisions, depth by depth, at one angle. */
#include "beamhours/run/crossings.h"

static bool same_piece(const bh_vertex *a, const bh_vertex *b)
{
    return a->layer == b->layer && a->from == b->from && a->towards == b->towards;
}

static bh_crossing crossing_at(const bh_way *way, const bh_vertex *vertex, double angle)
{
    return (bh_crossing){.weight = vertex->weight,
                         .before = vertex->before,
                         .after = bh_way_after(way, vertex, angle)};
}

/* Points in a part of the piece that `like` is of, as many as the piece has. */
static size_t fill(const bh_way *way, const bh_vertex *like, int points, double angle,
                   bh_crossing *out)
{
    for (int i = 0; i < points; i++) {
        bh_vertex v = *like;
        double weight;
        v.depth = like->from + (like->to - like->from) * bh_depth_point(i, points, &weight);
        v.weight = like->weight * weight;
        v.before = bh_way_before(way, &v, v.depth);
        out[i] = crossing_at(way, &v, angle);
    }
    return (size_t)points;
}

/* A piece with points of its own between cuts; false, and nothing filled, where none is in it. */
static bool fill_cut(const bh_way *way, const bh_vertex *whole, int points, double angle,
                     bh_crossing *out, size_t *used)
{
    double cut[2];
    bh_vertex part = *whole;
    bool any = false;
    bh_way_turning(way, whole, angle, cut);
    if (cut[0] > cut[1]) {
        const double first = cut[1];
        cut[1] = cut[0];
        cut[0] = first;
    }
    for (int i = 0; i < 3; i++) {
        part.to = i < 2 ? cut[i] : whole->to;
        if (i < 2 && !(part.to > part.from && part.to < whole->to))
            continue;
        any = any || i < 2;
        if (!any)
            return false;
        part.weight = whole->weight * (part.to - part.from) / (whole->to - whole->from);
        *used += fill(way, &part, points, angle, out + *used);
        part.from = part.to;
    }
    return true;
}

/* Some of many. */
static size_t fill_some(const bh_way *way, const bh_vertex *vertices, size_t count, double angle,
                        bh_crossing *out)
{
    const size_t step = 1 + (count - 1) / BH_MOST_CROSSINGS;
    size_t used = 0;
    for (size_t i = 0; i < count; i += step)
        out[used++] = crossing_at(way, &vertices[i], angle);
    return used;
}

size_t bh_crossings_at(const bh_way *way, const bh_vertex *vertices, size_t count, double angle,
                       bh_crossing *out)
{
    size_t used = 0, next;
    if (count == 0)
        return 0;
    if (!(way->wall_radius > 0) || 3 * count > BH_MOST_CROSSINGS)
        return fill_some(way, vertices, count, angle, out);
    for (size_t i = 0; i < count; i = next) {
        bh_vertex whole = vertices[i];
        for (next = i + 1; next < count && same_piece(&vertices[i], &vertices[next]); next++)
            whole.weight += vertices[next].weight;
        if (!fill_cut(way, &whole, (int)(next - i), angle, out, &used))
            used += fill_some(way, &vertices[i], next - i, angle, out + used);
    }
    return used;
}
