/* channelsum.c - one channel summed over an arm, its bins and the depths of a target. */
#include "beamhours/run/channelsum.h"

#include <math.h>
#include <string.h>

#include "beamhours/rates/average.h"
#include "beamhours/rates/bite.h"
#include "beamhours/run/arriving.h"
#include "beamhours/run/energies.h"
#include "beamhours/run/sum_key.h"
#include "beamhours/run/sum_places.h"
#include "beamhours/run/taking.h"
#include "beamhours/units/constants.h"

enum { BATCH = 64 };

/* The share of events that is never lost, and then is: a logarithm is fitted. */
#define BARELY 1e-9
/* --- one function to be fitted --- */

/* With the energies it is averaged over and the angles that are kept. */
struct task {
    bh_channel channel;
    const bh_radiated *radiated; /* NULL: without radiation */
    int boost;                   /* BH_AS_IT_IS ... */
    bh_energies energies;
    const struct smeared *smeared; /* what is kept under a resolution, and nothing else */
    const bh_vertex *vertex;       /* from there */
    bh_interval allowed[BH_MOST_ARRIVALS];
    bh_average_request request;
};

/* The mean cross section over the depths, as far as they differ in energy. */
static void evaluate_batch(const struct task *t, size_t n, const double *theta, double *value)
{
    double momentum[BATCH], sigma[BATCH];
    bh_channel there = t->channel;
    for (int k = 0; k < t->energies.count; k++) {
        there.encounter.kinetic = t->energies.kinetic[k];
        bh_channel_eval(&there, n, theta, sigma, momentum);
        for (size_t i = 0; i < n; i++)
            value[i] = (k ? value[i] : 0) + t->energies.weight[k] * sigma[i];
    }
    if (!t->radiated)
        return;
    bh_radiated_apply(t->radiated, t->boost, n, theta, value);
}

static void evaluate(void *context, size_t n, const double *theta, double *value)
{
    for (size_t i = 0; i < n; i += BATCH)
        evaluate_batch(context, n - i < BATCH ? n - i : BATCH, theta + i, value + i);
}

/* Depths, and the probability that a particle from there is counted. */
struct smeared {
    bh_taking taking;
    bh_taken taken;
    const bh_vertex *vertices;
    size_t count;
    bh_vertex alone;  /* where nothing is lost, the only one */
    double tolerance; /* [1] of sums */
};

/* What is kept of the events at one depth; never quite nothing, for a logarithm is fitted. */
static void evaluate_kept(void *context, size_t n, const double *theta, double *value)
{
    const struct task *t = context;
    bh_channel there = t->channel;
    bh_taken taken = t->smeared->taken;
    double momentum[BATCH];
    taken.boost = t->boost;
    there.encounter.kinetic = t->vertex->kinetic[t->boost];
    for (size_t i = 0; i < n; i += BATCH)
        bh_channel_eval(&there, n - i < BATCH ? n - i : BATCH, theta + i, value + i, momentum);
    for (size_t i = 0; i < n; i++)
        value[i] *= value[i] > 0 ? bh_taken_share(&taken, t->vertex, theta[i]) + BARELY : 0;
    if (t->radiated)
        bh_radiated_apply(t->radiated, t->boost, n, theta, value);
}

static bh_detected detected_of(const bh_channel *channel)
{
    if (channel->recoil)
        return BH_DETECTED_RECOIL;
    return channel->branch == BH_BRANCH_SLOW ? BH_DETECTED_SLOW : BH_DETECTED_SCATTERED;
}

/* All but the energies and what is kept. */
static void set_function(const bh_channel_request *r, struct task *t)
{
    const double largest = bh_channel_largest_angle(&r->channel);
    t->channel = r->channel;
    t->radiated = NULL;
    t->boost = BH_AS_IT_IS;
    t->smeared = NULL;
    t->request = (bh_average_request){.function = evaluate,
                                      .context = t,
                                      .limit = largest < BH_PI ? largest : 0,
                                      .allowed = t->allowed};
}

/* Where nothing is lost: one energy, and the bite in closed form. */
static bh_code set_up_lossless(const bh_channel_request *r, int boost, struct task *t,
                               bh_error *err)
{
    static const double by[BH_BOOSTS] = {0, -BH_STEP_MOMENTUM, BH_STEP_MOMENTUM};
    const bh_encounter *e = &r->channel.encounter;
    const double kinetic = boost ? bh_boosted_kinetic(e->beam, e->kinetic, by[boost]) : e->kinetic;
    const bh_collision in = {.mass = e->beam->mass, .target = e->target, .kinetic = kinetic};
    const bh_bite bite = {.detected = detected_of(&r->channel),
                          .momentum_from = r->momentum_from,
                          .momentum_to = r->momentum_to};
    t->energies = (bh_energies){.count = 1, .kinetic = {kinetic}, .weight = {1}};
    t->request.cut = r->cut;
    t->request.allowed_count = 0;
    return r->cut && r->momentum_to > r->momentum_from
               ? bh_bite_angles(&in, &bite, t->allowed, &t->request.allowed_count, err)
               : BH_OK;
}

/* Sums being made. */
struct making {
    const bh_channel_request *request;
    const bh_leaver *leaver; /* NULL: nothing is lost */
    bh_average_workspace *averages;
    bh_sum_scratch *scratch;
    bh_sum_places places;
    bh_channel_sum *sums;
    int parts;              /* the whole arm and its bins */
    bh_channel_request all; /* the same where the resolution lets everything through */
    struct smeared smeared;
    bool is_smeared;
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

/* The task with radiation, where there is any, fitted. */
static bh_code fit_radiated(struct making *m, const struct task *t, int boost, struct task *out,
                            bh_error *err)
{
    const bh_radiated *x = m->request->radiated;
    *out = *t;
    out->request.context = out;
    out->request.allowed = out->allowed;
    if (x && !x->idle) {
        out->radiated = x;
        out->boost = boost;
    }
    return bh_average_fit(&out->request, m->places.polar, m->averages, err);
}

/* The sums of a task count with `weight`: 1, or the share of one depth. */
static bh_code sum_total(struct making *m, const struct task *t, double weight, bh_error *err)
{
    bh_code code = bh_average_fit(&t->request, m->places.polar, m->averages, err);
    if (!code)
        code = add_up(m, &t->request, &m->places.at, err);
    for (int i = 0; !code && i < m->parts; i++) {
        m->sums[i].total += t->smeared ? 0 : weight * part_of(m, i)->total;
        m->sums[i].kept += weight * part_of(m, i)->kept;
        m->sums[i].converged = m->sums[i].converged && part_of(m, i)->converged;
    }
    return code;
}

static bool is_idle(const bh_channel_request *r)
{
    return !r->radiated || r->radiated->idle;
}

static bh_code sum_radiated(struct making *m, const struct task *t, double weight, bh_error *err)
{
    const bool only = m->request->radiated_only;
    bh_code code = BH_OK;
    struct task with;
    if (!is_idle(m->request)) {
        code = fit_radiated(m, t, BH_AS_IT_IS, &with, err);
        if (!code)
            code = add_up(m, &with.request, &m->places.at, err);
    }
    for (int i = 0; !code && i < m->parts; i++) {
        m->sums[i].radiated += weight * part_of(m, i)->kept;
        if (!only || is_idle(m->request))
            continue;
        m->sums[i].total = m->sums[i].kept = m->sums[i].radiated;
        m->sums[i].converged = m->sums[i].converged && part_of(m, i)->converged;
    }
    return code;
}

static bh_code sum_moved(struct making *m, const struct task *t, double weight, bh_error *err)
{
    bh_code code = BH_OK;
    for (int k = 0; !code && k < 2; k++) {
        if (m->places.turns)
            code = add_up(m, &t->request, &m->places.moved[k], err);
        for (int i = 0; !code && i < m->parts; i++)
            m->sums[i].moved[k] += m->places.turns ? weight * part_of(m, i)->kept : (double)NAN;
    }
    return code;
}

static bh_code sum_boosted(struct making *m, const struct task *t, double weight, int boost,
                           bh_error *err)
{
    struct task with;
    bh_code code = fit_radiated(m, t, boost, &with, err);
    if (!code)
        code = add_up(m, &with.request, &m->places.at, err);
    for (int i = 0; !code && i < m->parts; i++)
        m->sums[i].boosted[boost - BH_BOOSTED_DOWN] += weight * part_of(m, i)->kept;
    return code;
}

static bh_code sum_task(struct making *m, const struct task *t, double weight, int boost,
                        bh_error *err)
{
    if (boost)
        return sum_boosted(m, t, weight, boost, err);
    const bool only = m->request->radiated_only && !is_idle(m->request);
    bh_code code = only ? BH_OK : sum_total(m, t, weight, err);
    if (!code)
        code = sum_radiated(m, t, weight, err);
    if (!code && m->request->sensitivities)
        code = sum_moved(m, t, weight, err);
    return code;
}

static bh_arrival arrival_of(const struct making *m, int boost)
{
    return (bh_arrival){.leaver = m->leaver,
                        .channel = &m->request->channel,
                        .from = m->request->cut ? m->request->momentum_from : 0,
                        .to = m->request->cut ? m->request->momentum_to : (double)INFINITY,
                        .polar = m->places.polar,
                        .boost = boost};
}

/* Each depth with the angles at which its particles arrive within the bite. */
static bh_code sum_depths(struct making *m, struct task *t, int boost, bh_error *err)
{
    const bh_channel_request *r = m->request;
    const bh_arrival arrival = arrival_of(m, boost);
    bh_code code = BH_OK;
    t->request.cut = true;
    bh_vertex refined[BH_MOST_REFINED];
    const size_t more = bh_arrival_refine(&arrival, r->vertices, r->vertex_count, refined);
    const bh_vertex *vertices = more > 0 ? refined : r->vertices;
    const size_t count = more > 0 ? more : r->vertex_count;
    for (size_t i = 0; !code && i < count; i++) {
        const bh_vertex *v = &vertices[i];
        t->energies = (bh_energies){.count = 1, .kinetic = {v->kinetic[boost]}, .weight = {1}};
        t->request.allowed_count = bh_arrival_angles(&arrival, v, t->allowed);
        code = sum_task(m, t, v->weight, boost, err);
    }
    return code;
}

/* Where the bite without resolution begins and ends at the depth of a task. */
static bh_code set_sharp(const struct making *m, struct task *t, bh_error *err)
{
    const bh_channel_request *r = m->request;
    const bh_encounter *e = &r->channel.encounter;
    if (m->leaver) {
        const bh_arrival arrival = arrival_of(m, t->boost);
        t->request.allowed_count = bh_arrival_angles(&arrival, t->vertex, t->allowed);
        return BH_OK;
    }
    const bh_collision in = {
        .mass = e->beam->mass, .target = e->target, .kinetic = t->vertex->kinetic[t->boost]};
    const bh_bite bite = {.detected = detected_of(&r->channel),
                          .momentum_from = r->momentum_from,
                          .momentum_to = r->momentum_to};
    return bh_bite_angles(&in, &bite, t->allowed, &t->request.allowed_count, err);
}

/* Splits the polar angles about each end of the bite, where what is kept changes within a few
 * standard deviations: sums over whole pieces are sums of smooth functions. */
static bh_code set_pieces(const struct making *m, struct task *t, bh_error *err)
{
    enum { MOST = 5 }; /* ends that fit */
    static const double wide = 7;
    const bh_interval polar = m->places.polar;
    const bh_code code = set_sharp(m, t, err);
    if (code)
        return code;
    bh_taken taken = t->smeared->taken;
    taken.boost = t->boost;
    double at[3 * MOST + 1];
    size_t n = 0;
    for (size_t i = 0; i < 2 * t->request.allowed_count && n < 3 * MOST; i++) {
        const double end = i % 2 ? t->allowed[i / 2].to : t->allowed[i / 2].from;
        if (!(end > polar.from && end < polar.to))
            continue;
        const double width = wide * bh_taken_width(&taken, t->vertex, end);
        const double before = n ? at[n - 1] : polar.from;
        at[n] = fmin(fmax(end - width, before), end);
        at[n + 1] = fmax(end, before);
        at[n + 2] = fmax(at[n + 1], fmin(end + width, polar.to));
        n += 3;
    }
    at[n] = (double)INFINITY;
    t->request.allowed_count = 0;
    for (size_t i = 0; i <= n; i++) {
        const double from = i ? at[i - 1] : 0;
        if (at[i] > from)
            t->allowed[t->request.allowed_count++] = (bh_interval){from, at[i]};
    }
    return BH_OK;
}

/* One fit for all events, one for those that are counted. */
static bh_code sum_smeared(struct making *m, struct task *t, int boost, bh_error *err)
{
    const struct smeared *s = &m->smeared;
    bh_code code = BH_OK;
    if (!boost) {
        bh_energies_of(s->vertices, s->count, boost, &t->energies);
        t->request.cut = true; /* nothing is kept of it */
        t->request.allowed_count = 0;
        code = sum_total(m, t, 1, err);
    }
    t->smeared = s;
    t->boost = boost;
    t->request.function = evaluate_kept;
    t->request.tolerance = s->tolerance;
    t->request.cut = true;
    for (size_t i = 0; !code && i < s->count; i++) {
        t->vertex = &s->vertices[i];
        code = set_pieces(m, t, err);
        if (!code)
            code = sum_task(m, t, t->vertex->weight, boost, err);
    }
    for (int i = 0; !boost && i < m->parts; i++) /* what the floor under the logarithm gave */
        if (m->sums[i].kept < 2 * BARELY * m->sums[i].total)
            m->sums[i].kept = m->sums[i].radiated = 0;
    return code;
}

static bh_code sum_boost(struct making *m, bh_arriving arriving, int boost, bh_error *err)
{
    struct task t;
    set_function(m->request, &t);
    if (m->is_smeared)
        return sum_smeared(m, &t, boost, err);
    if (!m->leaver) {
        const bh_code code = set_up_lossless(m->request, boost, &t, err);
        return code ? code : sum_task(m, &t, 1, boost, err);
    }
    if (arriving == BH_ARRIVE_SOME)
        return sum_depths(m, &t, boost, err);
    bh_energies_of(m->request->vertices, m->request->vertex_count, boost, &t.energies);
    t.request.cut = arriving == BH_ARRIVE_NONE;
    t.request.allowed_count = 0;
    return sum_task(m, &t, 1, boost, err);
}

/* How the momentum resolution acts; true where it takes care that all are counted. */
static bool set_smearing(struct making *m)
{
    const bh_channel_request *r = m->request;
    const bh_encounter *e = &r->channel.encounter;
    struct smeared *s = &m->smeared;
    const bh_particle detected = bh_channel_detected(&r->channel);
    s->taking =
        (bh_taking){.cut = r->cut,
                    .bite = {.momentum_from = r->momentum_from, .momentum_to = r->momentum_to},
                    .rms = r->rms,
                    .mass = detected.mass};
    s->taken = (bh_taken){.channel = &r->channel, .leaver = m->leaver, .taking = &s->taking};
    s->alone = (bh_vertex){.weight = 1,
                           .kinetic = {e->kinetic,
                                       bh_boosted_kinetic(e->beam, e->kinetic, -BH_STEP_MOMENTUM),
                                       bh_boosted_kinetic(e->beam, e->kinetic, BH_STEP_MOMENTUM)}};
    s->vertices = m->leaver ? r->vertices : &s->alone;
    s->count = m->leaver ? r->vertex_count : 1;
    const bh_smearing how = bh_taken_smearing(&s->taken, s->vertices, s->count, m->places.polar);
    m->is_smeared = how == BH_SMEARED_SOME;
    s->tolerance = fmin(1e-4, fmax(2e-7, 1e-9 / bh_taken_fineness(&s->taking)));
    return how == BH_SMEARED_ALL;
}

static bh_code make(struct making *m, bh_error *err)
{
    const bh_channel_request *r = m->request;
    bh_arriving arriving = BH_ARRIVE_ALL;
    bh_code code = bh_sum_places_of(r, &m->places, m->scratch->edges[0], err);
    const bool all = !code && set_smearing(m);
    if (all) {
        m->all = *r;
        m->all.cut = false;
        m->request = &m->all;
    }
    if (!code && m->leaver && !all) {
        const bh_arrival arrival = arrival_of(m, BH_AS_IT_IS);
        arriving = bh_arrival_at_a_glance(&arrival, r->vertices, r->vertex_count);
    }
    for (int i = 0; i < m->parts; i++)
        m->sums[i].converged = true;
    for (int boost = 0; !code && boost < (r->sensitivities ? BH_BOOSTS : 1); boost++)
        code = sum_boost(m, arriving, boost, err);
    return code;
}

const bh_channel_sum *bh_channel_sums(bh_workspace *workspace, const bh_channel_request *request,
                                      bh_error *err)
{
    struct making m = {.request = request,
                       .averages = bh_workspace_averages(workspace),
                       .scratch = bh_workspace_scratch(workspace),
                       .parts = request->bins ? 1 + request->acceptance.bins : 1};
    bh_leaver leaver = {.ranges = request->ranges};
    if (request->way && request->way->losing) {
        const bh_particle detected = bh_channel_detected(&request->channel);
        const bh_code code =
            bh_leaver_make(workspace, request->way, &detected, request->way->kinetic, &leaver);
        if (code) {
            bh_fail(err, code, "%s", bh_code_text(code));
            return NULL;
        }
        m.leaver = &leaver;
    }
    unsigned char *const key = m.scratch->key;
    size_t size = bh_sum_key(request, m.leaver, key, sizeof m.scratch->key);
    if (!size) /* too long to be compared: known by a number that nothing else has */
        size = bh_workspace_number(workspace, key);
    const bh_channel_sum *known = bh_workspace_recall(workspace, key, size);
    if (known)
        return known;
    m.sums = bh_workspace_keep(workspace, key, size, (size_t)m.parts * sizeof *m.sums);
    if (!m.sums) {
        bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
        return NULL;
    }
    if (!make(&m, err))
        return m.sums;
    bh_workspace_drop(workspace, key, size);
    return NULL;
}
