/* channelsum.c - one channel summed over an arm, its bins and the depths of a target. */
#include "beamhours/run/channelsum.h"

#include <math.h>
#include <string.h>

#include "beamhours/rates/average.h"
#include "beamhours/rates/bite.h"
#include "beamhours/run/arriving.h"
#include "beamhours/run/counted.h"
#include "beamhours/run/energies.h"
#include "beamhours/run/sampled.h"
#include "beamhours/run/sum_key.h"
#include "beamhours/run/sum_places.h"
#include "beamhours/units/constants.h"

enum { BATCH = 64 };

/* --- one function to be fitted --- */

/* With the energies it is averaged over and the angles that are kept. */
struct task {
    bh_channel channel;
    const bh_radiated *radiated; /* NULL: without radiation */
    int boost;                   /* BH_AS_IT_IS ... */
    bh_energies energies;
    bh_sampled *sampled; /* of this channel and these energies */
    bh_counted *counted; /* what is kept under a resolution, and nothing else */
    bh_interval allowed[BH_MOST_ARRIVALS];
    double kinks[BH_RADIATED_KINKS]; /* [rad] */
    bh_average_request request;
};

/* The mean cross section over the depths, as far as they differ in energy. */
static void evaluate_batch(const struct task *t, size_t n, const double *theta, double *value)
{
    double momentum[BATCH], sigma[BATCH];
    bh_channel there = t->channel;
    const double *known = bh_sampled_find(t->sampled, n, theta);
    if (known)
        memcpy(value, known, n * sizeof *value);
    for (int k = 0; !known && k < t->energies.count; k++) {
        there.encounter.kinetic = t->energies.kinetic[k];
        bh_channel_eval(&there, n, theta, sigma, momentum);
        for (size_t i = 0; i < n; i++)
            value[i] = (k ? value[i] : 0) + t->energies.weight[k] * sigma[i];
    }
    if (!known)
        bh_sampled_keep(t->sampled, n, theta, value);
    if (t->radiated)
        bh_radiated_apply(t->radiated, t->boost, n, theta, value);
}

static void evaluate(void *context, size_t n, const double *theta, double *value)
{
    for (size_t i = 0; i < n; i += BATCH)
        evaluate_batch(context, n - i < BATCH ? n - i : BATCH, theta + i, value + i);
}

static void evaluate_kept(void *context, size_t n, const double *theta, double *value)
{
    const struct task *t = context;
    bh_counted_eval(t->counted, n, theta, value);
    if (t->radiated)
        bh_radiated_apply(t->radiated, t->boost, n, theta, value);
}

/* [1] Of sums over nuclei that are a trace, and of what is background. */
static const double trace_tolerance = 1e-3, background_tolerance = 1e-5;

/* 0: the usual one. */
static double tolerance_of(const bh_channel_request *r)
{
    return r->trace ? trace_tolerance : r->radiated_only ? background_tolerance : 0;
}

/* All but the energies and what is kept. */
static void set_function(const bh_channel_request *r, bh_sampled *sampled, struct task *t)
{
    const double largest = bh_channel_largest_angle(&r->channel);
    t->channel = r->channel;
    t->radiated = NULL;
    t->boost = BH_AS_IT_IS;
    t->counted = NULL;
    t->sampled = sampled;
    t->request = (bh_average_request){.function = evaluate,
                                      .context = t,
                                      .limit = largest < BH_PI ? largest : 0,
                                      .tolerance = tolerance_of(r),
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
    const bh_bite bite = {.detected = bh_channel_as_detected(&r->channel),
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
    bh_counted *counted;
    bh_sampled sampled;
    double common; /* [ub/sr] as averages want it: of all events */
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
    if (x && !x->idle) { /* it ends in a step, and where there is little all of it is enough */
        const bh_code code =
            m->common > 0 ? BH_OK : bh_average_fit(&t->request, m->places.polar, m->averages, err);
        if (code)
            return code;
        m->common = m->common > 0 ? m->common : bh_average_top(m->averages);
        out->request.common = m->common;
        out->request.kept_only = true; /* totals are those without radiation */
        out->request.kink_count = bh_radiated_kinks(x, boost, m->places.polar, out->kinks);
        out->request.kinks = out->kinks;
        out->radiated = x;
        out->boost = boost;
    }
    return bh_average_fit(&out->request, m->places.polar, m->averages, err);
}

/* The sums of a task count with `weight`: 1, or the share of one depth. */
static bh_code sum_total(struct making *m, const struct task *t, double weight, bh_error *err)
{
    bh_code code = bh_average_fit(&t->request, m->places.polar, m->averages, err);
    if (!code && !(m->common > 0)) /* what fit_radiated would fit again to know */
        m->common = bh_average_top(m->averages);
    if (!code)
        code = add_up(m, &t->request, &m->places.at, err);
    for (int i = 0; !code && i < m->parts; i++) {
        m->sums[i].total += t->counted ? 0 : weight * part_of(m, i)->total;
        m->sums[i].kept += weight * part_of(m, i)->kept;
        m->sums[i].converged = m->sums[i].converged && part_of(m, i)->converged;
    }
    return code;
}

static bool changes(const bh_channel_request *r)
{
    return r->sensitivities && !r->without_changes;
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

/* Of the function fitted last: with radiation where there is any. */
static bh_code sum_moved(struct making *m, const struct task *t, double weight, bh_error *err)
{
    bh_code code = BH_OK;
    bh_average_request request = t->request;
    request.kept_only = true;
    if (!is_idle(m->request))
        request.common = m->common;
    for (int k = 0; !code && k < 2; k++) {
        if (m->places.turns)
            code = add_up(m, &request, &m->places.moved[k], err);
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
    m->sampled.count = 0;
    if (boost)
        return sum_boosted(m, t, weight, boost, err);
    const bool only = m->request->radiated_only && !is_idle(m->request);
    bh_code code = only ? BH_OK : sum_total(m, t, weight, err);
    if (!code)
        code = sum_radiated(m, t, weight, err);
    if (!code && changes(m->request))
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
                        .bins = m->parts > 1 ? &m->places.at : NULL,
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

/* One fit for all events, one for those that are counted. */
static bh_code sum_counted(struct making *m, struct task *t, int boost, bh_error *err)
{
    bh_counted *c = m->counted;
    bh_code code = BH_OK;
    if (!boost) {
        bh_energies_of(c->vertices, c->count, boost, &t->energies);
        t->request.cut = true; /* nothing is kept of it */
        t->request.allowed_count = 0;
        m->sampled.count = 0;
        code = sum_total(m, t, 1, err);
        m->common = bh_average_top(m->averages);
    }
    bh_counted_boost(c, boost);
    t->counted = c;
    t->boost = boost;
    t->request.function = evaluate_kept;
    t->request.tolerance = fmax(tolerance_of(m->request), c->tolerance);
    t->request.common = m->common;
    t->request.cut = t->request.kept_only = true;
    t->request.allowed_count = bh_counted_pieces(c, m->places.polar, t->allowed);
    if (!code)
        code = sum_task(m, t, 1, boost, err);
    for (int i = 0; !boost && i < m->parts; i++) /* what the floor under the logarithm gave */
        if (m->sums[i].kept < 2 * BH_COUNTED_LEAST * m->sums[i].total)
            m->sums[i].kept = m->sums[i].radiated = 0;
    return code;
}

static bh_code sum_boost(struct making *m, bh_arriving arriving, int boost, bh_error *err)
{
    struct task t;
    set_function(m->request, &m->sampled, &t);
    if (m->counted->smearing == BH_SMEARED_SOME)
        return sum_counted(m, &t, boost, err);
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

static bh_code make(struct making *m, bh_error *err)
{
    const bh_channel_request *r = m->request;
    bh_arriving arriving = BH_ARRIVE_ALL;
    bh_code code = bh_sum_places_of(r, &m->places, m->scratch->edges[0], err);
    if (code)
        return code;
    bh_counted_make(r, m->leaver, m->places.polar, m->counted);
    const bool all = m->counted->smearing == BH_SMEARED_ALL;
    if (all) {
        m->all = *r;
        m->all.cut = false;
        m->request = &m->all;
    }
    if (m->leaver && !all) {
        const bh_arrival arrival = arrival_of(m, BH_AS_IT_IS);
        arriving = bh_arrival_at_a_glance(&arrival, r->vertices, r->vertex_count);
    }
    for (int i = 0; i < m->parts; i++)
        m->sums[i].converged = true;
    for (int boost = 0; !code && boost < (changes(r) ? BH_BOOSTS : 1); boost++)
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
    bh_counted counted; /* large, and filled where it is read */
    m.counted = &counted;
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
