/* crossings.c - the matter on both sides of collisions, depth by depth, at one angle. */
#include "beamhours/run/crossings.h"

/* Where particles go. */
struct going {
    const bh_way *way;
    double angle; /* [rad] */
};

static bool same_piece(const bh_vertex *a, const bh_vertex *b)
{
    return a->layer == b->layer && a->from == b->from && a->towards == b->towards;
}

static bh_crossing crossing_at(const struct going *g, const bh_vertex *vertex)
{
    return (bh_crossing){.weight = vertex->weight,
                         .before = vertex->before,
                         .after = bh_way_after(g->way, vertex, g->angle)};
}

/* Points in a part of the piece that `like` is of, as many as the piece has. */
static size_t fill(const struct going *g, const bh_vertex *like, int points, bh_crossing *out)
{
    for (int i = 0; i < points; i++) {
        bh_vertex v = *like;
        double weight;
        v.depth = like->from + (like->to - like->from) * bh_depth_point(i, points, &weight);
        v.weight = like->weight * weight;
        v.before = bh_way_before(g->way, &v, v.depth);
        out[i] = crossing_at(g, &v);
    }
    return (size_t)points;
}

/* Where a piece is to be cut [cm], rising; returns how many times. */
static int cuts_of(const struct going *g, const bh_vertex *whole, double cut[2])
{
    double at[2];
    int count = 0;
    bh_way_turning(g->way, whole, g->angle, at);
    const int first = at[1] < at[0];
    for (int i = 0; i < 2; i++) {
        const double depth = at[i ? !first : first];
        if (depth > whole->from && depth < whole->to)
            cut[count++] = depth;
    }
    return count;
}

/* A piece with points of its own between cuts; 0 where none is in it. */
static size_t fill_cut(const struct going *g, const bh_vertex *whole, int points, bh_crossing *out)
{
    double cut[2];
    const int count = cuts_of(g, whole, cut);
    bh_vertex part = *whole;
    size_t used = 0;
    for (int i = 0; count > 0 && i <= count; i++) {
        part.to = i < count ? cut[i] : whole->to;
        part.weight = whole->weight * (part.to - part.from) / (whole->to - whole->from);
        used += fill(g, &part, points, out + used);
        part.from = part.to;
    }
    return used;
}

/* Some of many. */
static size_t fill_some(const struct going *g, const bh_vertex *vertices, size_t count,
                        bh_crossing *out)
{
    const size_t step = 1 + (count - 1) / BH_MOST_CROSSINGS;
    size_t used = 0;
    for (size_t i = 0; i < count; i += step)
        out[used++] = crossing_at(g, &vertices[i]);
    return used;
}

size_t bh_crossings_at(const bh_way *way, const bh_vertex *vertices, size_t count, double angle,
                       bh_crossing *out)
{
    const struct going g = {way, angle};
    size_t used = 0, next;
    if (count == 0)
        return 0;
    if (!(way->wall_radius > 0) || 3 * count > BH_MOST_CROSSINGS)
        return fill_some(&g, vertices, count, out);
    for (size_t i = 0; i < count; i = next) {
        bh_vertex whole = vertices[i];
        for (next = i + 1; next < count && same_piece(&vertices[i], &vertices[next]); next++)
            whole.weight += vertices[next].weight;
        const size_t cut = fill_cut(&g, &whole, (int)(next - i), out + used);
        used += cut > 0 ? cut : fill_some(&g, &vertices[i], next - i, out + used);
    }
    return used;
}
