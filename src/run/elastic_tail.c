/* elastic_tail.c - the hard part of a radiative tail, integrated over the energy lost. */
#include "beamhours/run/elastic_tail.h"

#include <math.h>

#include "beamhours/physics/radiative_tail.h"
#include "beamhours/units/constants.h"

enum { POINTS = 8 };

/* Mean matter on both sides of the vertices, as bremsstrahlung.h takes it. */
struct sides {
    double before, after;       /* [1] b t */
    double xi_before, xi_after; /* [MeV] */
    double gamma;               /* [1] 1 / Gamma(1 + before + after) */
    double line;                /* [ub/sr] at the energy of the beam */
};

static struct sides sides_of(const bh_radiated_request *r, double angle)
{
    const bh_particle *beam = r->channel.encounter.beam;
    const double kinetic = r->channel.encounter.kinetic;
    struct sides s = {0};
    double weight = 0;
    for (size_t i = 0; r->way && i < r->count; i++) {
        const bh_vertex *v = &r->vertices[i];
        const bh_crossed after = bh_way_after(r->way, v, angle);
        if (!(after.lengths <= 2)) /* along the layers: nothing comes out */
            continue;
        s.before += v->weight * v->before.soft;
        s.after += v->weight * after.soft;
        s.xi_before += v->weight * bh_crossed_passage(&v->before, beam, kinetic).xi;
        s.xi_after += v->weight * bh_crossed_passage(&after, beam, kinetic).xi;
        weight += v->weight;
    }
    if (weight > 0)
        s = (struct sides){.before = s.before / weight,
                           .after = s.after / weight,
                           .xi_before = s.xi_before / weight,
                           .xi_after = s.xi_after / weight};
    s.gamma = 1 / tgamma(1 + s.before + s.after);
    return s;
}

static double sigma_at(const bh_channel *channel, double kinetic, double angle)
{
    bh_channel c = *channel;
    double sigma = 0, momentum;
    c.encounter.kinetic = kinetic;
    if (kinetic > 0)
        bh_channel_eval(&c, 1, &angle, &sigma, &momentum);
    return sigma;
}

/* Bremsstrahlung and collisions of strength bt and xi that take `lost` of `energy`. */
static double emitted(double bt, double xi, double lost, double energy)
{
    const double v = lost / energy;
    return bt * (1 - v + 0.75 * v * v) / lost + xi / (lost * lost);
}

/* Photons lost along the beam or along the scattered electron, which is light. */
struct losses {
    double energy, left; /* [MeV] total, of the beam and of what is found */
    double before;       /* [MeV] lost before, instead of behind */
    double lost;         /* [MeV] lost behind */
    double stretch;      /* [1] of energies behind to energies before */
};

static struct losses losses_of(const bh_encounter *x, double angle, double kinetic, double lost)
{
    const double half = sin(angle / 2), turn = 2 * half * half / x->target;
    struct losses l = {
        .energy = x->kinetic + x->beam->mass, .left = kinetic + x->beam->mass, .lost = lost};
    const double line = 1 - l.left * turn;
    l.before = l.energy - l.left / line;
    l.stretch = (1 + (l.energy - l.before) * turn) / line;
    return l;
}

/* What further soft photons, in the nucleus (`soft`) and beside it, leave. */
static double softened(const struct sides *s, const struct losses *l, double soft)
{
    return soft * pow(l->before / l->energy, s->before) *
           pow(l->lost / (l->left + l->lost), s->after) * s->gamma;
}

/* A tail at some energies. */
struct tail {
    const bh_radiated_request *request;
    double angle;                          /* [rad] */
    double kinetic[POINTS], lost[POINTS];  /* [MeV] of what is found; below the line */
    double internal[POINTS], soft[POINTS]; /* [ub/sr/MeV] [1] */
};

/* [ub/sr/MeV] of an electron found with kinetic[i], lost[i] below the line if lost behind the
 * vertex. */
static double electron(const struct tail *t, const struct sides *s, int i)
{
    const bh_encounter *x = &t->request->channel.encounter;
    const struct losses l = losses_of(x, t->angle, t->kinetic[i], t->lost[i]);
    if (!(l.before > 0 && l.before < l.energy))
        return 0;
    const double external = l.stretch *
                                sigma_at(&t->request->channel, x->kinetic - l.before, t->angle) *
                                emitted(s->before, s->xi_before, l.before, l.energy) +
                            s->line * emitted(s->after, s->xi_after, l.lost, l.left + l.lost);
    return (t->internal[i] + external) * softened(s, &l, t->soft[i]);
}

/* What loops and vertices change, so that the tail starts where the soft photons end. */
static double joined(const bh_radiated_request *r, const struct sides *s, double angle)
{
    const bh_encounter *x = &r->channel.encounter;
    bh_radiated_request open = *r;
    bh_radiated_detail at;
    open.gate = (bh_gate){.cut = (double)INFINITY, .to = (double)INFINITY};
    open.signal = false;
    if (!bh_radiated_at(&open, angle, &at))
        return 1;
    const double kinetic = at.event.scattered_kinetic - at.soft;
    const struct losses l = losses_of(x, angle, kinetic, at.soft);
    double soft;
    bh_radiative_tail_soft(x, angle, 1, &kinetic, &soft);
    return l.before > 0 ? at.factor / softened(s, &l, soft) : 1;
}

static bool tails(const bh_radiated_request *r)
{
    return r->channel.encounter.beam->kind == BH_KIND_LEPTON && !r->channel.recoil &&
           r->model != bh_radiative_find("none");
}

/* In ln(lost), where the tail times what is lost hardly changes. */
double bh_elastic_tail(const bh_radiated_request *request, double angle, double from, double to)
{
    static const double x[POINTS / 2] = {0.1834346424956498, 0.5255324099163290, 0.7966664774136267,
                                         0.9602898564975363};
    static const double w[POINTS / 2] = {0.3626837833783620, 0.3137066458778873, 0.2223810344533745,
                                         0.1012285362903763};
    const bool light = bh_particle_is_electron(request->channel.encounter.beam);
    bh_event event;
    if (!tails(request) || !bh_channel_has(&request->channel, angle, &event))
        return 0;
    to = fmin(to, event.scattered_kinetic * (1 - 1e-6));
    if (!(from > 0 && from < to))
        return 0;
    struct tail t = {.request = request, .angle = angle};
    const double middle = log(from * to) / 2, span = log(to / from) / 2;
    for (int i = 0; i < POINTS; i++) {
        t.lost[i] = exp(middle + span * (i % 2 ? -x[i / 2] : x[i / 2]));
        t.kinetic[i] = event.scattered_kinetic - t.lost[i];
    }
    const bh_encounter *e = &request->channel.encounter;
    (light ? bh_radiative_tail_peaking : bh_radiative_tail_exact)(e, angle, POINTS, t.kinetic,
                                                                  t.internal);
    bh_radiative_tail_soft(e, angle, POINTS, t.kinetic, t.soft);
    double sum = 0;
    struct sides s = {0};
    if (light) {
        s = sides_of(request, angle);
        s.line = sigma_at(&request->channel, e->kinetic, angle);
    }
    for (int i = 0; i < POINTS; i++)
        sum +=
            w[i / 2] * span * t.lost[i] * (light ? electron(&t, &s, i) : t.internal[i] * t.soft[i]);
    return light ? sum * joined(request, &s, angle) : sum;
}
