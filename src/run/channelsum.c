/* channelsum.c - one channel summed over an arm and its bins. */
#include "beamhours/run/channelsum.h"

#include <math.h>
#include <string.h>

#include "beamhours/rates/average.h"
#include "beamhours/rates/bite.h"
#include "beamhours/units/constants.h"

enum { BATCH = 64 };

/* What sums are kept under; bytes between members are zero. */
struct key {
    const bh_process *process;
    const bh_structure *structure;
    char beam[16];
    int charge, z, a, recoil, branch, bins, cut, sensitivities, shape;
    double target, kinetic, momentum_from, momentum_to;
    double shape_numbers[9];
    double edges[BH_MOST_BINS + 1];
};

static size_t fill_key(const bh_channel_request *r, struct key *k)
{
    const bh_encounter *e = &r->channel.encounter;
    const bh_acceptance_spec *s = &r->acceptance;
    const size_t fixed = offsetof(struct key, edges);
    memset(k, 0, fixed);
    k->process = r->channel.process;
    k->structure = e->structure;
    memcpy(k->beam, e->beam->name, strlen(e->beam->name));
    k->charge = e->charge;
    k->z = e->z;
    k->a = e->a;
    k->recoil = r->channel.recoil;
    k->branch = (int)r->channel.branch;
    k->bins = r->bins ? s->bins : 0;
    k->cut = r->cut;
    k->sensitivities = r->sensitivities;
    k->shape = (int)s->shape;
    k->target = e->target;
    k->kinetic = e->kinetic;
    k->momentum_from = r->momentum_from;
    k->momentum_to = r->momentum_to;
    const double numbers[] = {
        s->angle,     s->in_plane_from, s->in_plane_to, s->out_of_plane_from, s->out_of_plane_to,
        s->ring_from, s->ring_to,       s->azimuth,     s->solid_angle};
    memcpy(k->shape_numbers, numbers, sizeof numbers);
    if (!s->edges || !r->bins)
        return fixed;
    memcpy(k->edges, s->edges, ((size_t)s->bins + 1) * sizeof(double));
    return fixed + ((size_t)s->bins + 1) * sizeof(double);
}

static void evaluate(void *context, size_t n, const double *theta, double *value)
{
    const bh_channel *channel = context;
    double momentum[BATCH];
    for (size_t i = 0; i < n; i += BATCH)
        bh_channel_eval(channel, n - i < BATCH ? n - i : BATCH, theta + i, value + i, momentum);
}

static bh_detected detected_of(const bh_channel *channel)
{
    if (channel->recoil)
        return BH_DETECTED_RECOIL;
    return channel->branch == BH_BRANCH_SLOW ? BH_DETECTED_SLOW : BH_DETECTED_SCATTERED;
}

/* One function to be fitted, with the angles that the bite allows. */
struct task {
    bh_channel channel;
    bh_interval allowed[1];
    bh_average_request request;
};

static bh_code set_up(const bh_channel_request *r, struct task *t, bh_error *err)
{
    const bh_encounter *e = &r->channel.encounter;
    const bh_collision in = {.mass = e->beam->mass, .target = e->target, .kinetic = e->kinetic};
    const double largest = bh_channel_largest_angle(&r->channel);
    t->channel = r->channel;
    t->request = (bh_average_request){.function = evaluate,
                                      .context = &t->channel,
                                      .limit = largest < BH_PI ? largest : 0,
                                      .cut = r->cut,
                                      .allowed = t->allowed};
    const bh_bite bite = {.detected = detected_of(&r->channel),
                          .momentum_from = r->momentum_from,
                          .momentum_to = r->momentum_to};
    return r->cut ? bh_bite_angles(&in, &bite, t->allowed, &t->request.allowed_count, err) : BH_OK;
}

/* Where the arm is, and where it is moved to. */
struct places {
    bh_acceptance at, moved[2];
    bool turns; /* the arm has an axis that can be moved both ways */
    bh_interval polar;
};

static bh_code set_moved(const bh_channel_request *r, struct places *p, double *edges,
                         bh_error *err)
{
    bh_code code = BH_OK;
    for (int i = 0; !code && i < 2; i++) {
        const double by = i ? BH_STEP_ANGLE : -BH_STEP_ANGLE;
        bh_acceptance_spec spec = r->acceptance;
        double *moved = edges + (size_t)i * (BH_MOST_BINS + 1);
        spec.angle += by;
        for (int k = 0; spec.edges && k <= spec.bins; k++)
            moved[k] = spec.edges[k] + by;
        spec.edges = spec.edges ? moved : NULL;
        code = bh_acceptance_make(&spec, &p->moved[i], err);
        if (!code) {
            p->polar.from = fmin(p->polar.from, p->moved[i].whole.polar.from);
            p->polar.to = fmax(p->polar.to, p->moved[i].whole.polar.to);
        }
    }
    return code;
}

static bh_code set_places(const bh_channel_request *r, struct places *p, double *edges,
                          bh_error *err)
{
    const bh_code code = bh_acceptance_make(&r->acceptance, &p->at, err);
    if (code)
        return code;
    p->polar = p->at.whole.polar;
    p->turns = r->sensitivities && r->acceptance.shape != BH_ACCEPTANCE_RING &&
               r->acceptance.angle > BH_STEP_ANGLE && r->acceptance.angle < BH_PI - BH_STEP_ANGLE;
    return p->turns ? set_moved(r, p, edges, err) : BH_OK;
}

/* Sums being made. */
struct making {
    const bh_channel_request *request;
    bh_average_workspace *averages;
    bh_sum_scratch *scratch;
    struct places places;
    bh_channel_sum *sums;
    int parts; /* the whole arm and its bins */
};

/* Sums the fitted function over one place. */
static bh_code add_up(struct making *m, const bh_average_request *request,
                      const bh_acceptance *where, bh_error *err)
{
    bh_averages sums = {.bins = m->parts > 1 ? m->scratch->bins : NULL};
    const bh_code code = bh_average_sum(where, request, m->averages, &sums, err);
    m->scratch->whole = sums.whole;
    return code;
}

static const bh_average *part_of(const struct making *m, int part)
{
    return part ? &m->scratch->bins[part - 1] : &m->scratch->whole;
}

static bh_code sum_total(struct making *m, struct task *t, bh_error *err)
{
    bh_code code = bh_average_fit(&t->request, m->places.polar, m->averages, err);
    if (!code)
        code = add_up(m, &t->request, &m->places.at, err);
    for (int i = 0; !code && i < m->parts; i++) {
        m->sums[i].total = part_of(m, i)->total;
        m->sums[i].kept = part_of(m, i)->kept;
        m->sums[i].converged = part_of(m, i)->converged;
    }
    return code;
}

static bh_code sum_moved(struct making *m, struct task *t, bh_error *err)
{
    bh_code code = BH_OK;
    for (int k = 0; !code && k < 2; k++) {
        if (m->places.turns)
            code = add_up(m, &t->request, &m->places.moved[k], err);
        for (int i = 0; !code && i < m->parts; i++)
            m->sums[i].moved[k] = m->places.turns ? part_of(m, i)->kept : (double)NAN;
    }
    return code;
}

/* The kinetic energy of a momentum larger by the share `by`. */
static double boosted_kinetic(const bh_encounter *e, double by)
{
    const double mass = e->beam->mass;
    const double p = sqrt(e->kinetic * (e->kinetic + 2 * mass)) * (1 + by);
    return p * p / (sqrt(p * p + mass * mass) + mass);
}

static bh_code sum_boosted(struct making *m, bh_error *err)
{
    bh_code code = BH_OK;
    for (int k = 0; !code && k < 2; k++) {
        bh_channel_request r = *m->request;
        r.channel.encounter.kinetic =
            boosted_kinetic(&r.channel.encounter, k ? BH_STEP_MOMENTUM : -BH_STEP_MOMENTUM);
        struct task t;
        code = set_up(&r, &t, err);
        if (!code)
            code = bh_average_fit(&t.request, m->places.polar, m->averages, err);
        if (!code)
            code = add_up(m, &t.request, &m->places.at, err);
        for (int i = 0; !code && i < m->parts; i++)
            m->sums[i].boosted[k] = part_of(m, i)->kept;
    }
    return code;
}

static bh_code make(struct making *m, bh_error *err)
{
    struct task t;
    bh_code code = set_places(m->request, &m->places, m->scratch->edges[0], err);
    if (!code)
        code = set_up(m->request, &t, err);
    if (!code)
        code = sum_total(m, &t, err);
    if (!code && m->request->sensitivities)
        code = sum_moved(m, &t, err);
    if (!code && m->request->sensitivities)
        code = sum_boosted(m, err);
    return code;
}

const bh_channel_sum *bh_channel_sums(bh_workspace *workspace, const bh_channel_request *request,
                                      bh_error *err)
{
    struct key key;
    const size_t size = fill_key(request, &key);
    const bh_channel_sum *known = bh_workspace_recall(workspace, &key, size);
    if (known)
        return known;
    struct making m = {.request = request,
                       .averages = bh_workspace_averages(workspace),
                       .scratch = bh_workspace_scratch(workspace),
                       .parts = request->bins ? 1 + request->acceptance.bins : 1};
    m.sums = bh_workspace_keep(workspace, &key, size, (size_t)m.parts * sizeof *m.sums);
    if (!m.sums) {
        bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
        return NULL;
    }
    if (!make(&m, err))
        return m.sums;
    bh_workspace_drop(workspace, &key, size);
    return NULL;
}
