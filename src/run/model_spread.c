/* model_spread.c - how well a cross section is known: other descriptions of the nucleus, the field
 * that bends the waves, the electrons around it. */
#include "beamhours/run/model_spread.h"

#include <math.h>
#include <stdbool.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/units/constants.h"

/* The grid of momentum transfers: q = scale sinh(step i), 0.01/fm apart where nuclei have structure
 * and wider above. */
enum { BLOCK = 64, BLOCKS = 64, MOST_NODES = BLOCK * BLOCKS, MOST_SETS = 16 };
static const double scale = 10, step = 1e-3; /* [1/fm] [1] */

enum { MOST_PAIRS = 7 };
static const double apart = 0.05; /* [1/fm] between angles */

/* GE^2 and GM^2, or what stands in their place. */
struct squares {
    double ge2, gm2;
};

/* Nodes of the grid; of each the model in use and the others. */
struct block {
    bool filled[BLOCK];
    struct squares value[];
};

/* All descriptions of one nucleus. */
struct family {
    const bh_structure *own;
    int count; /* of the others */
    const bh_structure *other[BH_MOST_OTHERS];
    const char *name[BH_MOST_OTHERS];
    struct block *blocks[BLOCKS];
};

/* Things kept under the address of the structure in use. */
struct key {
    char what[24];
    const bh_structure *own;
    size_t number;
};

static struct key key_of(const char *what, const bh_structure *own, size_t number)
{
    struct key key;
    memset(&key, 0, sizeof key);
    snprintf(key.what, sizeof key.what, "%s", what);
    key.own = own;
    key.number = number;
    return key;
}

/* --- the family --- */

static void add_other(bh_workspace *workspace, const bh_encounter *e, const char *name,
                      struct family *f)
{
    bh_error ignored;
    const bh_structure *s = bh_workspace_structure(workspace, name, e->z, e->a, &ignored);
    if (!s || f->count == BH_MOST_OTHERS ||
        strcmp(bh_structure_name(s), bh_structure_name(f->own)) == 0)
        return;
    f->name[f->count] = bh_structure_name(s);
    f->other[f->count++] = s;
}

static void list_others(bh_workspace *workspace, const bh_encounter *e, struct family *f)
{
    const bh_structure_model *m;
    for (int i = 0; (m = bh_structure_model_at(i)); i++) {
        const int sets = bh_structure_sets(m, e->z, e->a);
        for (int k = 1; k <= sets && k <= MOST_SETS; k++) {
            char name[48];
            snprintf(name, sizeof name, k > 1 ? "%s/%d" : "%s", m->name, k);
            if (bh_structure_compares(m, k, e->z, e->a))
                add_other(workspace, e, name, f);
        }
    }
}

/* The family of the structure in use, made once; NULL when there is no memory. */
static struct family *family_of(bh_workspace *workspace, const bh_encounter *e)
{
    const struct key key = key_of("family", e->structure, 0);
    const struct key place = key_of("family at", e->structure, 0);
    struct family *const *known = bh_workspace_recall(workspace, &place, sizeof place);
    if (known)
        return *known;
    struct family *f = bh_workspace_keep(workspace, &key, sizeof key, sizeof *f);
    struct family **at =
        f ? bh_workspace_keep(workspace, &place, sizeof place, sizeof(void *)) : NULL;
    if (!at)
        return NULL;
    f->own = e->structure;
    list_others(workspace, e, f);
    *at = f;
    return f;
}

/* --- form factors on the grid --- */

static void fill_node(const struct family *f, size_t node, struct squares *value)
{
    const double q = scale * sinh(step * (double)node) * BH_HBARC;
    const double q2 = q * q;
    bh_structure_eval(f->own, 1, &q2, &value[0].ge2, &value[0].gm2);
    for (int i = 0; i < f->count; i++)
        bh_structure_eval(f->other[i], 1, &q2, &value[1 + i].ge2, &value[1 + i].gm2);
}

/* The 1 + count values at a node; NULL when there is no memory. */
static const struct squares *node_at(bh_workspace *workspace, struct family *f, size_t node)
{
    const size_t b = node / BLOCK, i = node % BLOCK, all = (size_t)f->count + 1;
    if (!f->blocks[b]) {
        const struct key key = key_of("block", f->own, b);
        f->blocks[b] =
            bh_workspace_keep(workspace, &key, sizeof key,
                              sizeof(struct block) + BLOCK * all * sizeof(struct squares));
    }
    struct block *block = f->blocks[b];
    if (!block)
        return NULL;
    if (!block->filled[i])
        fill_node(f, node, &block->value[i * all]);
    block->filled[i] = true;
    return &block->value[i * all];
}

/* Values at q [1/fm]: between two nodes. */
struct between {
    const struct squares *low, *high;
    double part;
};

static bool look_up(bh_workspace *workspace, struct family *f, double q, struct between *at)
{
    const double x = fmin(asinh(q / scale) / step, MOST_NODES - 2);
    const size_t node = (size_t)x;
    at->part = x - (double)node;
    at->low = node_at(workspace, f, node);
    at->high = at->low ? node_at(workspace, f, node + 1) : NULL;
    return at->high;
}

/* --- sums over the angles of a row --- */

/* The reduced cross section epsilon GE^2 + tau GM^2. */
struct weights {
    double epsilon, tau;
};

static double reduced(const struct between *at, int model, const struct weights *w)
{
    const struct squares *a = &at->low[model], *b = &at->high[model];
    return w->epsilon * (a->ge2 + (b->ge2 - a->ge2) * at->part) +
           w->tau * (a->gm2 + (b->gm2 - a->gm2) * at->part);
}

struct sums {
    double own, deeper; /* deeper: own at the momentum transfer inside */
    double last_q2;     /* [MeV^2] of the last angle; 0 where it has no event */
    double other[BH_MOST_OTHERS];
    double point, screened; /* own weighted with corrections */
};

/* What the potential inside the nucleus adds to a momentum transfer, relative. */
static double deepening(const bh_encounter *e, const bh_event *event)
{
    const double radius = sqrt(5.0 / 3.0) * bh_structure_radius(e->structure);
    if (e->beam->kind != BH_KIND_LEPTON || e->z < 2 || !(radius > 0))
        return 0;
    const double potential = 0.8 * 1.5 * e->z * BH_ALPHA * BH_HBARC / radius;
    return (e->charge < 0 ? 1 : -1) * potential / event->beam_energy;
}

static double second_born(const bh_encounter *e, const bh_event *event)
{
    if (e->beam->kind != BH_KIND_LEPTON || e->z < 2)
        return 0;
    const double beta = event->beam_momentum / event->beam_energy;
    const double s = sin(event->scattered_angle / 2);
    return (e->charge < 0 ? 1 : -1) * BH_PI * e->z * BH_ALPHA * beta * s * (1 - s) /
           (1 - beta * beta * s * s);
}

/* Relative change of the cross section by atomic electrons; the regimes are those of
 * bh_validity_screening. */
static double screening(const bh_encounter *e, const bh_event *event)
{
    const double z = e->z, charge = abs(e->beam->charge);
    const double beta = event->beam_momentum / event->beam_energy;
    if (e->beam->kind != BH_KIND_LEPTON && z * charge * BH_ALPHA > beta) {
        const double v =
            0.04873e-3 * z * charge * sqrt(pow(charge, 2.0 / 3.0) + pow(z, 2.0 / 3.0)) / e->kinetic;
        const double half = v / 2 / sin(event->scattered_angle / 2);
        const double top = 1 + v / 2, bottom = 1 + v + half * half;
        return top * top / (bottom * bottom) - 1;
    }
    const double length = 0.8853 / (BH_ALPHA * BH_MASS_ELECTRON * cbrt(z)); /* [1/MeV] */
    const double form = 1 / (1 + event->q2 * length * length);
    return form * (form - 2);
}

/* The weight of an angle: Mott's 1/q2^2 without what varies little, and the ring it stands for. */
static bool add_angle(bh_workspace *workspace, struct family *f, const bh_channel *channel,
                      double angle, struct sums *sums)
{
    bh_event event;
    sums->last_q2 = 0;
    if (bh_channel_event(channel, angle, &event, NULL) || !(event.q2 > 0))
        return true;
    sums->last_q2 = event.q2;
    const bh_encounter *e = &channel->encounter;
    const struct weights w = {.epsilon = isfinite(event.epsilon) ? event.epsilon : 1,
                              .tau = event.q2 / (4 * e->target * e->target)};
    const double q = sqrt(event.q2) / BH_HBARC;
    struct between at, inside;
    if (!look_up(workspace, f, q, &at) ||
        !look_up(workspace, f, q * fabs(1 + deepening(e, &event)), &inside))
        return false;
    const double ring = sin(angle) / (event.q2 * event.q2 * w.epsilon * (1 + w.tau));
    const double own = ring * reduced(&at, 0, &w);
    sums->own += own;
    sums->deeper += ring * reduced(&inside, 0, &w);
    sums->point += own * second_born(e, &event);
    sums->screened += own * screening(e, &event);
    for (int i = 0; i < f->count; i++)
        sums->other[i] += ring * reduced(&at, 1 + i, &w);
    return true;
}

/* As many angles as the change of momentum transfer needs, at most p dtheta; odd, so that one is in
 * the middle. */
static int angles_for(const bh_encounter *e, bh_interval where)
{
    const double p = sqrt(e->kinetic * (e->kinetic + 2 * e->beam->mass)) / BH_HBARC; /* [1/fm] */
    const double pairs = p * (where.to - where.from) / apart / 2;
    return 1 + 2 * (int)fmin(fmax(pairs, 0), MOST_PAIRS);
}

static bool is_within(const bh_structure *s, double q2)
{
    double low, high;
    bh_structure_range(s, &low, &high);
    return q2 * 1e-6 >= low && q2 * 1e-6 <= high;
}

/* Hides those without data at q2 [MeV^2], unless that would leave none. */
static void set_others(const struct family *f, const struct sums *sums, double q2,
                       bh_model_spread *out)
{
    int valid = 0;
    for (int i = 0; i < f->count; i++)
        valid += is_within(f->other[i], q2);
    out->count = f->count;
    out->name = f->name;
    for (int i = 0; i < f->count; i++)
        out->off[i] =
            valid == 0 || is_within(f->other[i], q2) ? sums->other[i] / sums->own - 1 : (double)NAN;
}

bh_code bh_model_spread_make(bh_workspace *workspace, const bh_channel *channel, bh_interval where,
                             bh_model_spread *out, bh_error *err)
{
    *out = (bh_model_spread){.fit = -1};
    struct family *f = family_of(workspace, &channel->encounter);
    bool enough = f;
    const double largest = bh_channel_largest_angle(channel);
    where.from = fmin(where.from, largest);
    where.to = fmin(where.to, largest);
    const int angles = angles_for(&channel->encounter, where);
    struct sums sums = {.own = 0};
    double middle = 0; /* [MeV^2] */
    for (int i = 0; enough && i < angles; i++) {
        enough = add_angle(workspace, f, channel,
                           where.from + (where.to - where.from) * (i + 0.5) / angles, &sums);
        middle = i == angles / 2 ? sums.last_q2 : middle;
    }
    if (!enough)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    if (!(sums.own > 0) || !(middle > 0))
        return BH_OK;
    out->coulomb = sums.point / sums.own + sums.deeper / sums.own - 1;
    out->screening = sums.screened / sums.own;
    if (is_within(f->own, middle))
        out->fit = bh_structure_uncertainty(f->own, middle);
    if (out->fit >= 0)
        return BH_OK;
    set_others(f, &sums, middle, out);
    out->data = bh_structure_data_uncertainty(f->own, middle);
    return BH_OK;
}

double bh_model_spread_size(const bh_model_spread *spread)
{
    if (spread->fit >= 0)
        return spread->fit;
    double low = 0, high = 0;
    for (int i = 0; i < spread->count; i++) {
        low = fmin(low, spread->off[i]); /* fmin, fmax pass NAN over */
        high = fmax(high, spread->off[i]);
    }
    return hypot((high - low) / 2, spread->data);
}
