/* energies.c - the few beam energies that stand for all depths at which collisions happen. */
#include "beamhours/run/energies.h"

#include <math.h>

static const double narrow = 1e-4, moderate = 0.01; /* of the energy */

enum { INTERVALS = BH_MOST_ENERGIES / 2 };

/* The vertices between two energies. */
struct some {
    const bh_vertex *vertices;
    size_t count;
    int boost;
    double from, to; /* [MeV] to not among them */
};

static bool among(const struct some *s, size_t i)
{
    const double kinetic = s->vertices[i].kinetic[s->boost];
    return kinetic >= s->from && kinetic < s->to;
}

/* Weight, mean, and second and third moments about it. */
struct moments {
    double weight, mean, second, third;
};

static struct moments moments_of(const struct some *s)
{
    struct moments m = {0};
    for (size_t i = 0; i < s->count; i++)
        if (among(s, i)) {
            m.weight += s->vertices[i].weight;
            m.mean += s->vertices[i].weight * s->vertices[i].kinetic[s->boost];
        }
    if (!(m.weight > 0))
        return m;
    m.mean /= m.weight;
    for (size_t i = 0; i < s->count; i++)
        if (among(s, i)) {
            const double off = s->vertices[i].kinetic[s->boost] - m.mean;
            m.second += s->vertices[i].weight / m.weight * off * off;
            m.third += s->vertices[i].weight / m.weight * off * off * off;
        }
    return m;
}

static void put(bh_energies *out, double kinetic, double weight)
{
    out->kinetic[out->count] = kinetic;
    out->weight[out->count] = weight;
    out->count++;
}

/* Two points with the first four moments right: roots of x^2 - (third / second) x - second. */
static void put_two(const struct some *s, bh_energies *out)
{
    const struct moments m = moments_of(s);
    if (!(m.weight > 0))
        return;
    if (!(m.second > 1e-24 * m.mean * m.mean)) {
        put(out, m.mean, m.weight);
        return;
    }
    const double half = m.third / m.second / 2;
    const double root = sqrt(half * half + m.second);
    const double low = half - root, high = half + root;
    put(out, m.mean + low, m.weight * high / (high - low));
    put(out, m.mean + high, -m.weight * low / (high - low));
}

/* As they stand, equal neighbours (one depth of a ring) together; false: too many. */
static bool put_all(const struct some *s, bh_energies *out)
{
    for (size_t i = 0; i < s->count; i++) {
        const double kinetic = s->vertices[i].kinetic[s->boost];
        if (out->count > 0 && out->kinetic[out->count - 1] == kinetic) {
            out->weight[out->count - 1] += s->vertices[i].weight;
        } else if (out->count == BH_MOST_ENERGIES) {
            out->count = 0;
            return false;
        } else {
            put(out, kinetic, s->vertices[i].weight);
        }
    }
    return true;
}

void bh_energies_of(const bh_vertex *vertices, size_t count, int boost, bh_energies *out)
{
    struct some s = {.vertices = vertices,
                     .count = count,
                     .boost = boost,
                     .from = (double)INFINITY,
                     .to = -(double)INFINITY};
    for (size_t i = 0; i < count; i++) {
        s.from = fmin(s.from, vertices[i].kinetic[boost]);
        s.to = fmax(s.to, vertices[i].kinetic[boost]);
    }
    const double low = s.from, high = s.to, spread = high / low - 1;
    out->count = 0;
    s.to = (double)INFINITY;
    if (spread == 0)
        put(out, low, 1);
    else if (spread <= narrow)
        put(out, moments_of(&s).mean, 1);
    else if (spread <= moderate)
        put_two(&s, out);
    else if (!put_all(&s, out))
        for (int i = 0; i < INTERVALS; i++) {
            s.from = low + (high - low) * i / INTERVALS;
            s.to = i + 1 < INTERVALS ? low + (high - low) * (i + 1) / INTERVALS : (double)INFINITY;
            put_two(&s, out);
        }
}
