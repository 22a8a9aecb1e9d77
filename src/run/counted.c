/* counted.c - events that are counted under a resolution, from all depths, angle by angle. */
#include "beamhours/run/counted.h"

#include <math.h>
#include <stdint.h>
#include <string.h>

enum { BATCH = 32 };

/* [1] Standard deviations by which the momenta from both faces of a layer may differ: where they
 * differ by more, as along the layers, a resolution adds less than 1 % to the width of what
 * arrives, and sharp ends depth by depth are the better sum. */
static const double widest = 12;

/* --- depths --- */

static bh_taken taken_of(const bh_counted *c)
{
    return (bh_taken){
        .channel = &c->channel, .leaver = c->leaver, .taking = &c->taking, .boost = c->boost};
}

/* How many depths a piece of a layer needs, whose ends differ by so many standard deviations. */
static int depths_for(double apart, int are)
{
    static const struct {
        double apart; /* [1] at most */
        int depths;
    } steps[] = {{0.3, 2}, {1, 3}, {2, 5}, {5, 8}};
    for (size_t i = 0; i < sizeof steps / sizeof steps[0]; i++)
        if (apart <= steps[i].apart)
            return steps[i].depths > are ? steps[i].depths : are;
    return BH_MOST_DEPTHS;
}

/* How far apart, in standard deviations, the momenta from both ends of a piece arrive. */
static double ends_apart(const bh_counted *c, const bh_vertex *like, bh_interval polar)
{
    const bh_taken taken = taken_of(c);
    const bh_vertex ends[2] = {bh_way_vertex(c->leaver->way, like, like->from),
                               bh_way_vertex(c->leaver->way, like, like->to)};
    double most = 0;
    for (int i = 0; i < 2; i++)
        most = fmax(most, bh_taken_apart(&taken, ends, i ? polar.to : polar.from));
    return most;
}

static bool same_piece(const bh_vertex *a, const bh_vertex *b)
{
    return a->layer == b->layer && a->towards == b->towards && a->from == b->from;
}

/* The piece of vertex number `first`, with enough depths. */
static void add_piece(bh_counted *c, const bh_channel_request *r, size_t first, bh_interval polar)
{
    const bh_vertex *like = &r->vertices[first];
    double weight = 0;
    int are = 0;
    for (size_t i = 0; i < r->vertex_count; i++) {
        const bool same = same_piece(&r->vertices[i], like);
        if (same && i < first)
            return; /* it has been added */
        weight += same ? r->vertices[i].weight : 0;
        are += same;
    }
    const double apart = ends_apart(c, like, polar);
    const int n = depths_for(apart, are);
    if (apart > widest)
        c->smearing = BH_SMEARED_NOTHING;
    for (int i = 0; i < n && c->count < BH_MOST_REFINED; i++) {
        double share;
        const double at = bh_depth_point(i, n, &share);
        bh_vertex *v = &c->vertices[c->count++];
        *v = bh_way_vertex(c->leaver->way, like, like->from + at * (like->to - like->from));
        v->weight = share * weight;
    }
}

static void set_vertices(bh_counted *c, const bh_channel_request *r, bh_interval polar)
{
    const bh_encounter *e = &r->channel.encounter;
    c->count = 0;
    if (!c->leaver) {
        c->vertices[c->count++] = (bh_vertex){
            .weight = 1,
            .kinetic = {e->kinetic, bh_boosted_kinetic(e->beam, e->kinetic, -BH_STEP_MOMENTUM),
                        bh_boosted_kinetic(e->beam, e->kinetic, BH_STEP_MOMENTUM)}};
        return;
    }
    const bool room = r->vertex_count * BH_MOST_DEPTHS <= BH_MOST_REFINED;
    for (size_t i = 0; i < r->vertex_count && room; i++)
        add_piece(c, r, i, polar);
    for (size_t i = 0; i < r->vertex_count && i < BH_MOST_REFINED && !room; i++)
        c->vertices[c->count++] = r->vertices[i];
}

void bh_counted_make(const bh_channel_request *request, const bh_leaver *leaver, bh_interval polar,
                     bh_counted *out)
{
    const bh_particle detected = bh_channel_detected(&request->channel);
    const bh_bite bite = {.momentum_from = request->momentum_from,
                          .momentum_to = request->momentum_to};
    out->channel = request->channel;
    out->taking =
        (bh_taking){.cut = request->cut, .bite = bite, .rms = request->rms, .mass = detected.mass};
    out->leaver = leaver;
    out->boost = BH_AS_IT_IS;
    out->count = 0;
    const bh_taken taken = taken_of(out);
    const bh_encounter *e = &request->channel.encounter;
    const bh_vertex alone = {
        .weight = 1,
        .kinetic = {e->kinetic, bh_boosted_kinetic(e->beam, e->kinetic, -BH_STEP_MOMENTUM),
                    bh_boosted_kinetic(e->beam, e->kinetic, BH_STEP_MOMENTUM)}};
    out->smearing = leaver
                        ? bh_taken_smearing(&taken, request->vertices, request->vertex_count, polar)
                        : bh_taken_smearing(&taken, &alone, 1, polar);
    if (out->smearing != BH_SMEARED_SOME)
        return;
    set_vertices(out, request, polar);
    if (out->smearing != BH_SMEARED_SOME)
        return;
    out->tolerance = fmin(1e-4, fmax(2e-7, 1e-9 / bh_taken_fineness(&out->taking)));
    bh_counted_boost(out, BH_AS_IT_IS);
}

/* --- values --- */

void bh_counted_boost(bh_counted *counted, int boost)
{
    counted->boost = boost;
    for (int i = 0; i < BH_COUNTED_KEPT; i++)
        counted->kept[i].angle = (double)NAN;
}

static bh_counted_value *place_of(bh_counted *c, double angle)
{
    uint64_t bits;
    memcpy(&bits, &angle, sizeof bits);
    return &c->kept[(bits * 0x9e3779b97f4a7c15u >> 40) % BH_COUNTED_KEPT];
}

/* How the momentum follows the beam's at the outermost depths; between them, as loss and scattering
 * do, by a power of the beam's energy. */
struct following {
    double first, power; /* [MeV/c] [1] */
    double kinetic;      /* [MeV] of the first */
};

static void set_following(const bh_counted *c, double angle, struct following *f)
{
    const bh_taken taken = taken_of(c);
    const bh_vertex *first = &c->vertices[0], *last = &c->vertices[c->count - 1];
    const double change = log(last->kinetic[c->boost] / first->kinetic[c->boost]);
    *f = (struct following){.kinetic = first->kinetic[c->boost]};
    if (!(c->taking.rms.beam > 0))
        return;
    f->first = bh_taken_per_beam(&taken, first, angle);
    const double ratio = bh_taken_per_beam(&taken, last, angle) / f->first;
    if (change != 0 && f->first > 0 && ratio > 0)
        f->power = log(ratio) / change;
}

/* Kinetic energy of a particle of `mass` and `momentum`. */
static double kinetic_of(double mass, double momentum)
{
    return momentum * momentum / (hypot(momentum, mass) + mass);
}

/* Angles that are not known yet. */
struct batch {
    size_t n;
    const double *theta; /* [rad] */
    struct following f[BATCH];
    double *value; /* [ub/sr] */
};

static void add_vertex(const bh_counted *c, const bh_vertex *v, const struct batch *b)
{
    const bh_taken taken = taken_of(c);
    double sigma[BATCH], momentum[BATCH];
    bh_channel there = c->channel;
    there.encounter.kinetic = v->kinetic[c->boost];
    bh_channel_eval(&there, b->n, b->theta, sigma, momentum);
    for (size_t i = 0; i < b->n; i++) {
        if (!(sigma[i] > 0))
            continue;
        const double kinetic = kinetic_of(c->taking.mass, momentum[i]);
        const struct following *f = &b->f[i];
        const double grown = f->power != 0 ? pow(v->kinetic[c->boost] / f->kinetic, f->power) : 1;
        const bh_arriver arriver =
            bh_taken_arriver(&taken, v, b->theta[i], kinetic, f->first * grown);
        b->value[i] +=
            v->weight * sigma[i] * (bh_taking_share(&c->taking, &arriver) + BH_COUNTED_LEAST);
    }
}

static void eval_new(bh_counted *c, size_t n, const double *theta, double *value)
{
    struct batch b = {.n = n, .theta = theta, .value = value};
    for (size_t i = 0; i < n; i++) {
        value[i] = 0;
        set_following(c, theta[i], &b.f[i]);
    }
    for (size_t k = 0; k < c->count; k++)
        add_vertex(c, &c->vertices[k], &b);
    for (size_t i = 0; i < n; i++)
        *place_of(c, theta[i]) = (bh_counted_value){theta[i], value[i]};
}

static void eval_batch(bh_counted *c, size_t n, const double *theta, double *value)
{
    double angle[BATCH], found[BATCH];
    size_t place[BATCH] = {0}, m = 0;
    for (size_t i = 0; i < n; i++) {
        const bh_counted_value *known = place_of(c, theta[i]);
        if (known->angle == theta[i]) {
            value[i] = known->value;
            continue;
        }
        place[m] = i;
        angle[m++] = theta[i];
    }
    eval_new(c, m, angle, found);
    for (size_t k = 0; k < m; k++)
        value[place[k]] = found[k];
}

void bh_counted_eval(bh_counted *counted, size_t n, const double *theta, double *value)
{
    for (size_t i = 0; i < n; i += BATCH)
        eval_batch(counted, n - i < BATCH ? n - i : BATCH, theta + i, value + i);
}

/* --- pieces --- */

/* Where the bite without resolution begins and ends for one vertex. */
static size_t sharp(const bh_counted *c, const bh_vertex *v, bh_interval polar,
                    bh_interval out[BH_MOST_ARRIVALS])
{
    const bh_encounter *e = &c->channel.encounter;
    bh_bite bite = c->taking.bite;
    size_t count = 0;
    if (c->leaver) {
        const bh_arrival arrival = {.leaver = c->leaver,
                                    .channel = &c->channel,
                                    .from = bite.momentum_from,
                                    .to = bite.momentum_to,
                                    .polar = polar,
                                    .boost = c->boost};
        return bh_arrival_angles(&arrival, v, out);
    }
    const bh_collision in = {
        .mass = e->beam->mass, .target = e->target, .kinetic = v->kinetic[c->boost]};
    bite.detected = bh_channel_as_detected(&c->channel);
    return bh_bite_angles(&in, &bite, out, &count, NULL) ? 0 : count;
}

/* A stretch over which the function changes. */
struct change {
    double from, to; /* [rad] */
};

/* Keeps stretches in order and apart. */
static int add_change(struct change *changes, int count, int most, struct change x)
{
    int i = count;
    for (; i > 0 && changes[i - 1].from > x.from; i--)
        changes[i] = changes[i - 1];
    changes[i] = x;
    count++;
    int kept = 0;
    for (int k = 1; k < count; k++) {
        if (changes[k].from <= changes[kept].to || kept + 1 == most)
            changes[kept].to = fmax(changes[kept].to, changes[k].to);
        else
            changes[++kept] = changes[k];
    }
    return kept + 1;
}

static int changes_of(const bh_counted *c, const bh_vertex *v, bh_interval polar,
                      struct change *changes, int count)
{
    enum { MOST = BH_COUNTED_PIECES / 2 - 1 };
    static const double wide = 7;
    const bh_taken taken = taken_of(c);
    bh_interval allowed[BH_MOST_ARRIVALS];
    const size_t n = sharp(c, v, polar, allowed);
    for (size_t i = 0; i < 2 * n; i++) {
        const double end = i % 2 ? allowed[i / 2].to : allowed[i / 2].from;
        if (!(end > polar.from && end < polar.to))
            continue;
        const double width = fmin(wide * bh_taken_width(&taken, v, end), polar.to - polar.from);
        count = add_change(changes, count, MOST, (struct change){end - width, end + width});
    }
    return count;
}

size_t bh_counted_pieces(const bh_counted *counted, bh_interval polar,
                         bh_interval pieces[BH_COUNTED_PIECES])
{
    struct change changes[BH_COUNTED_PIECES / 2];
    int count = changes_of(counted, &counted->vertices[0], polar, changes, 0);
    if (counted->count > 1)
        count = changes_of(counted, &counted->vertices[counted->count - 1], polar, changes, count);
    size_t n = 0;
    double at = 0;
    for (int i = 0; i < count; i++) {
        const double ends[2] = {fmin(fmax(changes[i].from, polar.from), polar.to),
                                fmin(changes[i].to, polar.to)};
        for (int k = 0; k < 2; k++) {
            if (!(ends[k] > at))
                continue;
            pieces[n++] = (bh_interval){at, ends[k]};
            at = ends[k];
        }
    }
    pieces[n++] = (bh_interval){at, (double)INFINITY};
    return n;
}
