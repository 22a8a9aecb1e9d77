/* taking.c - with what probability an arm takes a particle. */
#include "beamhours/run/taking.h"

#include <math.h>

#include "beamhours/run/channelsum.h"

/* A normal error of this share of all momenta in the acceptance changes nothing. */
static const double fine = 1e-4;

static const double surely = 1e-9;

static const double far = 6.5; /* [1] standard deviations that nothing comes from */

bh_momentum_rms bh_taking_rms(const bh_arm *arm, const bh_beam *beam)
{
    return (bh_momentum_rms){.momentum = arm->momentum_resolution.value,
                             .energy = arm->energy_resolution.value,
                             .beam = beam->momentum_spread.value};
}

static double sigma_of(const bh_taking *t, const bh_arriver *a)
{
    const double p = bh_bite_momentum(t->mass, a->kinetic);
    return bh_bite_sigma(&t->rms, t->mass, p, a->per_beam);
}

double bh_taking_share(const bh_taking *t, const bh_arriver *a)
{
    if (!(a->kinetic > 0))
        return 0;
    if (!t->cut)
        return 1;
    return bh_bite_share(&t->bite, bh_bite_momentum(t->mass, a->kinetic), sigma_of(t, a));
}

double bh_taken_fineness(const bh_taking *t)
{
    const double end = isfinite(t->bite.momentum_to) ? t->bite.momentum_to : t->bite.momentum_from;
    const double sigma = bh_bite_sigma(&t->rms, t->mass, end, end * (t->rms.beam > 0));
    return end > 0 ? fmax(sigma / end, 1e-5) : 1;
}

/* Kinetic energy and momentum of the detected particle as it is scattered; false for no event. */
static bool scattered(const bh_taken *t, double kinetic, double angle, bh_event *event)
{
    bh_channel there = *t->channel;
    there.encounter.kinetic = kinetic;
    return bh_channel_has(&there, angle, event);
}

static double momentum_at(const bh_taken *t, double kinetic, double angle)
{
    bh_event event;
    if (!scattered(t, kinetic, angle, &event))
        return (double)NAN;
    return t->channel->recoil ? event.recoil_momentum : event.scattered_momentum;
}

/* At the edge of what is reached, where one of the two has no event, the spread does nothing. */
double bh_taken_per_beam(const bh_taken *t, const bh_vertex *v, double angle)
{
    if (!(t->taking->rms.beam > 0))
        return 0;
    const double less = momentum_at(t, v->kinetic[BH_BOOSTED_DOWN], angle);
    const double more = momentum_at(t, v->kinetic[BH_BOOSTED_UP], angle);
    const double slope = (more - less) / (2 * BH_STEP_MOMENTUM);
    return isnan(slope) ? 0 : slope;
}

/* The slower of two particles loses more: what their momenta differ by grows on the way out. */
bh_arriver bh_taken_arriver(const bh_taken *t, const bh_vertex *v, double angle, double kinetic,
                            double per_beam)
{
    static const double step = 2e-4; /* [1] of the energy */
    const double mass = t->taking->mass, above = kinetic * (1 + step);
    bh_arriver a = {.kinetic = kinetic, .per_beam = per_beam};
    if (!t->leaver)
        return a;
    a.kinetic = bh_leaver_left(t->leaver, v, angle, kinetic);
    if (per_beam == 0 || !(a.kinetic > 0) || !t->leaver->way->losing)
        return a;
    const double left = bh_leaver_left(t->leaver, v, angle, above);
    const double apart = bh_bite_momentum(mass, left) - bh_bite_momentum(mass, a.kinetic);
    if (left > 0) /* else the ranges end here */
        a.per_beam *= apart / (bh_bite_momentum(mass, above) - bh_bite_momentum(mass, kinetic));
    return a;
}

static bh_arriver arriver_at(const bh_taken *t, const bh_vertex *v, double angle)
{
    bh_event event;
    if (!scattered(t, v->kinetic[t->boost], angle, &event))
        return (bh_arriver){.kinetic = 0};
    const double kinetic = t->channel->recoil ? event.recoil_kinetic : event.scattered_kinetic;
    return bh_taken_arriver(t, v, angle, kinetic, bh_taken_per_beam(t, v, angle));
}

double bh_taken_share(const bh_taken *taken, const bh_vertex *vertex, double angle)
{
    const bh_arriver arriver = arriver_at(taken, vertex, angle);
    return bh_taking_share(taken->taking, &arriver);
}

double bh_taken_width(const bh_taken *taken, const bh_vertex *vertex, double angle)
{
    static const double step = 1e-6; /* [rad] */
    const bh_arriver here = arriver_at(taken, vertex, angle);
    const bh_arriver back = arriver_at(taken, vertex, angle - step);
    const bh_arriver on = arriver_at(taken, vertex, angle + step);
    const double mass = taken->taking->mass;
    const double slope =
        (bh_bite_momentum(mass, on.kinetic) - bh_bite_momentum(mass, back.kinetic)) / (2 * step);
    const double width = sigma_of(taken->taking, &here) / fabs(slope);
    return here.kinetic > 0 && back.kinetic > 0 && on.kinetic > 0 ? width : (double)INFINITY;
}

double bh_taken_apart(const bh_taken *taken, const bh_vertex ends[2], double angle)
{
    const double mass = taken->taking->mass;
    const bh_arriver one = arriver_at(taken, &ends[0], angle);
    const bh_arriver other = arriver_at(taken, &ends[1], angle);
    const double sigma = fmax(sigma_of(taken->taking, &one), sigma_of(taken->taking, &other));
    const double off = bh_bite_momentum(mass, one.kinetic) - bh_bite_momentum(mass, other.kinetic);
    return sigma > 0 ? fabs(off) / sigma : 0;
}

/* What the outermost vertices send to both ends and the middle. */
struct glance {
    double least, most, sigma; /* [MeV/c] */
    double share;              /* [1] the least */
};

static void look(const bh_taken *t, const bh_vertex *v, double angle, struct glance *g)
{
    const bh_arriver a = arriver_at(t, v, angle);
    const double p = bh_bite_momentum(t->taking->mass, a.kinetic);
    g->least = fmin(g->least, p);
    g->most = fmax(g->most, p);
    g->sigma = fmax(g->sigma, sigma_of(t->taking, &a));
    g->share = fmin(g->share, bh_taking_share(t->taking, &a));
}

bh_smearing bh_taken_smearing(const bh_taken *taken, const bh_vertex *vertices, size_t count,
                              bh_interval polar)
{
    const bh_momentum_rms *rms = &taken->taking->rms;
    struct glance g = {.least = (double)INFINITY, .share = 1};
    if (!taken->taking->cut || count == 0 ||
        !(rms->momentum > 0 || rms->energy > 0 || rms->beam > 0))
        return BH_SMEARED_NOTHING;
    for (int i = 0; i < 3; i++) {
        const double angle = polar.from + (polar.to - polar.from) * i / 2;
        look(taken, &vertices[0], angle, &g);
        look(taken, &vertices[count - 1], angle, &g);
    }
    /* momenta between those looked at lie between them, the ends of a bite outside all of them */
    if (g.share > 1 - surely)
        return BH_SMEARED_ALL;
    const bh_bite *bite = &taken->taking->bite;
    const double reach = far * g.sigma;
    if (g.most + reach < bite->momentum_from || g.least - reach > bite->momentum_to)
        return BH_SMEARED_NOTHING; /* all are outside */
    return g.sigma < fine * (g.most - g.least) ? BH_SMEARED_NOTHING : BH_SMEARED_SOME;
}
