/* radiated.c - what radiation leaves of elastic events inside a cut, angle by angle. */
#include "beamhours/run/radiated.h"

#include <math.h>

#include "beamhours/run/channelsum.h"
#include "beamhours/run/crossings.h"
#include "beamhours/units/constants.h"

static const double soft_share = 0.03, most_lengths = 0.5;

double bh_channel_kinetic(const bh_channel *channel, const bh_event *event)
{
    return channel->recoil ? event->recoil_kinetic : event->scattered_kinetic;
}

double bh_gate_from(const bh_gate *gate, const bh_channel *line, double angle)
{
    bh_event event;
    if (!(gate->cut < (double)INFINITY))
        return gate->from;
    if (!bh_channel_has(line, angle, &event))
        return (double)INFINITY;
    return fmax(gate->from, bh_channel_kinetic(line, &event) - gate->cut);
}

/* --- one angle --- */

/* Matter before and after, depth by depth. */
struct matter {
    const bh_radiated_request *request;
    const bh_radiated_detail *at;
    size_t count;
    bh_crossing crossed[BH_MOST_CROSSINGS]; /* 14 kB: only `count` of them are set */
};

static void set_matter(const bh_radiated_request *r, double angle, struct matter *m)
{
    m->request = r;
    m->count = r->way ? bh_crossings_at(r->way, r->vertices, r->count, angle, m->crossed) : 0;
    for (size_t i = 0; i < m->count; i++) /* along the layers: nothing comes out */
        if (!(m->crossed[i].after.lengths <= most_lengths))
            m->crossed[i].after =
                (bh_crossed){.lengths = most_lengths, .soft = most_lengths * BH_PI / 2};
}

static bool is_electron(const bh_encounter *e)
{
    return bh_particle_is_electron(e->beam);
}

static bh_external external_of(const struct matter *m, size_t i, double cut)
{
    const bh_encounter *e = &m->request->channel.encounter;
    const bh_event *event = &m->at->event;
    bh_external x = {.incident = e->kinetic + e->beam->mass,
                     .scattered = event->scattered_kinetic + e->beam->mass,
                     .cut = cut};
    x.before = bh_crossed_passage(&m->crossed[i].before, e->beam, e->kinetic);
    x.after = bh_crossed_passage(&m->crossed[i].after, e->beam, event->scattered_kinetic);
    if (!is_electron(e)) /* heavier by 207: their bremsstrahlung is 43000 times rarer */
        x.before.thickness = x.after.thickness = 0;
    return x;
}

static double mean_external(const struct matter *m, double cut)
{
    double sum = 0, weight = 0;
    for (size_t i = 0; i < m->count; i++) {
        const bh_external x = external_of(m, i, cut);
        const double w = m->crossed[i].weight;
        sum += w * bh_external_kept(&x);
        weight += w;
    }
    return weight > 0 ? sum / weight : 1;
}

/* How much a muon's single collisions can take at most; electrons lose any amount. */
static double most_transfer(const bh_encounter *e, double kinetic)
{
    return is_electron(e) ? (double)INFINITY : bh_flight_of(e->beam, kinetic).transfer;
}

/* Mean of xi before, scaled to what it does to the scattered energy, and after [MeV]. */
static double mean_tail(const struct matter *m)
{
    double sum = 0, weight = 0;
    for (size_t i = 0; i < m->count; i++) {
        const bh_external x = external_of(m, i, 1);
        const double eta = x.incident / x.scattered;
        const double w = m->crossed[i].weight;
        sum += w * (x.before.xi / (eta * eta) + x.after.xi);
        weight += w;
    }
    return weight > 0 ? sum / weight : 0;
}

static double collisions_kept(double tail, double cut, double most)
{
    return cut > 0 ? fmax(0, 1 - tail * fmax(0, 1 / cut - 1 / most)) : 0;
}

static void set_lengths(const struct matter *m, bh_radiated_detail *out)
{
    double weight = 0;
    out->before = out->after = 0;
    for (size_t i = 0; i < m->count; i++) {
        const bh_crossing *c = &m->crossed[i];
        out->before += c->weight * c->before.lengths;
        out->after += c->weight * c->after.lengths;
        weight += c->weight;
    }
    out->before /= weight > 0 ? weight : 1;
    out->after /= weight > 0 ? weight : 1;
}

/* Where the line is between the edges. */
static bool set_line(const bh_radiated_request *r, double angle, bh_radiated_detail *out)
{
    const bh_encounter *e = &r->channel.encounter;
    if (!bh_channel_has(&r->channel, angle, &out->event))
        return false;
    const double kinetic = bh_channel_kinetic(&r->channel, &out->event);
    const bh_gate by_cut = {.cut = r->gate.cut};
    const double by_bite =
        r->gate.from > 0 ? bh_gate_blurred(kinetic - r->gate.from, r->gate.blur) : (double)INFINITY;
    out->cut = fmin(by_bite, r->gate.cut < (double)INFINITY
                                 ? kinetic - bh_gate_from(&by_cut, &r->line, angle)
                                 : (double)INFINITY);
    out->by_bite = out->cut >= by_bite;
    out->above = r->gate.to < (double)INFINITY ? kinetic - r->gate.to : -(double)INFINITY;
    out->soft = out->event.scattered_kinetic;
    if (!r->signal)
        out->soft = fmin(out->soft, soft_share * (out->event.scattered_kinetic + e->beam->mass));
    return true;
}

bool bh_radiated_at(const bh_radiated_request *request, double angle, bh_radiated_detail *out)
{
    struct matter m;
    m.at = out;
    const bh_encounter *e = &request->channel.encounter;
    *out = (bh_radiated_detail){.factor = 0};
    if (!set_line(request, angle, out))
        return false;
    set_matter(request, angle, &m);
    set_lengths(&m, out);
    const double cut = fmin(out->cut, out->soft);
    if (!(cut > 0))
        return true;
    out->internal = request->model->parts(e, cut, &out->event);
    out->internal_factor = bh_radiative_combine(&out->internal, e->z);
    out->external = mean_external(&m, cut);
    out->ionisation = collisions_kept(mean_tail(&m), cut, most_transfer(e, e->kinetic));
    out->factor = out->internal_factor * out->external * out->ionisation;
    return true;
}

/* --- making --- */

enum { CUTS = 3 };

static double strength(const bh_passage *p)
{
    return p->thickness > 0 ? p->b * p->thickness : 0;
}

/* Fills mean with what is kept of it at three cuts, each half of the one before. */
static void mean_externals(const struct matter *m, double top, double mean[CUTS])
{
    double sum[CUTS] = {0}, weight = 0;
    for (size_t i = 0; i < m->count; i++) {
        const bh_external x = external_of(m, i, top);
        const double w = m->crossed[i].weight, l = bh_external_logarithm(&x);
        const double fall = log(2.0) * (strength(&x.before) + strength(&x.after));
        for (int k = 0; k < CUTS; k++)
            sum[k] += w * exp(fmin(0, l - k * fall));
        weight += w;
    }
    for (int k = 0; k < CUTS; k++)
        mean[k] = weight > 0 ? sum[k] / weight : 1;
}

/* Second degree in ln cut through three cuts. */
static void set_levels(const struct matter *m, double top, bh_radiated *out, int i)
{
    const bh_encounter *e = &m->request->channel.encounter;
    const bh_radiative *model = m->request->model;
    double value[CUTS], external[CUTS];
    const bh_radiative_parts high = model->parts(e, top, &m->at->event);
    const bh_radiative_parts rate = model->rate(e, top, &m->at->event);
    const double l = log(2.0), shift = log(top / out->reference);
    const double internal = log(bh_radiative_combine(&high, e->z));
    const double fall = l * (rate.z0 + e->z * (rate.z1 + e->z * rate.z2));
    mean_externals(m, top, external);
    for (int k = 0; k < CUTS; k++)
        value[k] = internal - k * fall + log(external[k]);
    const double curve = (value[0] - 2 * value[1] + value[2]) / (2 * l * l);
    const double slope = (value[0] - value[1]) / l + curve * l; /* at the top */
    out->level[2][i] = curve;
    out->level[1][i] = slope - 2 * curve * shift;
    out->level[0][i] = value[0] - slope * shift + curve * shift * shift;
}

static void boost_channel(bh_channel *channel, int boost)
{
    static const double by[BH_BOOSTS] = {0, -BH_STEP_MOMENTUM, BH_STEP_MOMENTUM};
    bh_encounter *e = &channel->encounter;
    e->kinetic = bh_boosted_kinetic(e->beam, e->kinetic, by[boost]);
}

/* How far the line of the signal moves with the momentum of the beam. */
static void set_shift(const bh_radiated_request *r, double angle, double kinetic, bh_radiated *out,
                      int i)
{
    for (int b = 0; b < BH_BOOSTS; b++) {
        bh_channel there = r->channel;
        bh_event event;
        boost_channel(&there, b);
        out->shift[b][i] = b && r->signal && !r->unboosted && bh_channel_has(&there, angle, &event)
                               ? bh_channel_kinetic(&there, &event) - kinetic
                               : 0;
    }
}

/* Returns the radiation lengths behind, mean. */
static double set_node(const bh_radiated_request *r, double angle, bh_radiated *out, int i)
{
    static const double far = 1e30; /* of an edge that is not there */
    const double infinite = (double)INFINITY;
    bh_radiated_detail at = {.factor = 0};
    struct matter m;
    m.at = &at;
    bh_event event;
    (void)set_line(r, angle, &at); /* inside the largest angle there is always one */
    set_matter(r, angle, &m);
    const double kinetic = bh_channel_kinetic(&r->channel, &at.event);
    out->cut[i] = r->gate.from > 0 ? kinetic - r->gate.from : far;
    out->above[i] = r->gate.to < infinite ? at.above : -far;
    out->soft[i] = at.soft;
    out->limit[i] = far;
    if (r->gate.cut < infinite)
        out->limit[i] = bh_channel_has(&r->line, angle, &event)
                            ? kinetic - bh_channel_kinetic(&r->line, &event) + r->gate.cut
                            : -kinetic;
    const double most = most_transfer(&r->channel.encounter, r->channel.encounter.kinetic);
    set_shift(r, angle, kinetic, out, i);
    out->tail[i] = mean_tail(&m) * fmax(0, 1 - out->reference / most);
    set_levels(&m, fmin(out->reference, at.soft), out, i);
    set_lengths(&m, &at);
    return at.after;
}

/* Whether the way out changes so much between these nodes that they do not show it. */
static bool set_nodes(const bh_radiated_request *r, bh_interval polar, int count, bh_radiated *out)
{
    static const double much = 1.3, some = 0.002; /* [1] and radiation lengths */
    double least = (double)INFINITY, most = 0;
    bh_angle_nodes_of(polar, count, &out->at);
    for (int i = 0; i < count; i++) {
        const double after = set_node(r, out->at.angle[i], out, i);
        least = fmin(least, after);
        most = fmax(most, after);
    }
    return most > much * least + some;
}

static bool works(const bh_radiated_request *r)
{
    return r->gate.given && r->channel.encounter.beam->kind == BH_KIND_LEPTON &&
           r->model != bh_radiative_find("none") && r->polar.to > 0;
}

/* The cut in the middle of the angles, or what stands for it. */
static double reference_for(const bh_radiated_request *r, double angle)
{
    bh_radiated_detail at = {.factor = 0};
    if (!set_line(r, angle, &at))
        return 0;
    const double cut = at.cut < (double)INFINITY ? at.cut : at.soft;
    return fmin(fmax(cut, 1e-3 * at.event.scattered_kinetic), at.soft);
}

/* The same cut at slightly other momenta of the beam. */
static void set_boosted(const bh_radiated_request *r, double angle, bh_radiated *out)
{
    bh_radiated_request same = *r;
    bh_radiated_detail here, there;
    for (int b = 0; b < BH_BOOSTS; b++)
        out->boosted[b] = 1;
    same.line = r->channel; /* the reference lies below the nuclide's own line */
    same.gate = (bh_gate){.cut = out->reference, .to = (double)INFINITY, .given = true};
    if (!r->signal || r->unboosted || !bh_radiated_at(&same, angle, &here) || !(here.factor > 0))
        return;
    for (int b = BH_BOOSTED_DOWN; b < BH_BOOSTS; b++) {
        bh_radiated_request boosted = same;
        boost_channel(&boosted.channel, b);
        boost_channel(&boosted.line, b);
        if (bh_radiated_at(&boosted, angle, &there))
            out->boosted[b] = there.factor / here.factor;
    }
}

void bh_radiated_make(const bh_radiated_request *request, bh_radiated *out)
{
    enum { FEW = 2 }; /* 1e-3 of what they describe */
    static const double inside = 1 - 1e-9;
    bh_interval polar = request->polar;
    out->idle = !works(request);
    out->at.count = 0;
    if (out->idle)
        return;
    out->signal = request->signal;
    out->blur = request->gate.blur;
    out->largest = bh_channel_largest_angle(&request->channel) * inside;
    polar.to = fmin(polar.to, out->largest);
    polar.from = fmin(fmax(polar.from, 1e-6), polar.to);
    out->reference = reference_for(request, (polar.from + polar.to) / 2);
    if (!(out->reference > 0)) {
        out->idle = true;
        return;
    }
    const int nodes = bh_angle_points(polar);
    if (set_nodes(request, polar, request->trace && nodes > FEW ? FEW : nodes, out))
        (void)set_nodes(request, polar, BH_ANGLE_NODES, out);
    set_boosted(request, (polar.from + polar.to) / 2, out);
}
