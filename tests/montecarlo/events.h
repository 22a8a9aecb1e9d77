/* events.h - single events of the Monte Carlo: what one collision adds to what an arm counts. */
#ifndef TESTS_MONTECARLO_EVENTS_H
#define TESTS_MONTECARLO_EVENTS_H

#include "beamhours/physics/inelastic.h"
#include "beamhours/physics/process.h"
#include "beamhours/physics/quasi_elastic.h"
#include "beamhours/physics/radiative.h"
#include "beamhours/physics/radiative_tail.h"
#include "throwing.h"

/* --- one kind of event: a process on a nuclide in a layer --- */

enum kind { ELASTIC, TAIL, QUASI_ELASTIC, INELASTIC };

struct part {
    enum kind kind;
    size_t layer;
    bool signal;
    bool beside; /* by another particle of the beam */
    bh_particle beam;
    double kinetic; /* MeV entering */
    double rate;    /* Hz for each ub of cross section */
    bh_encounter encounter;
    bh_structure *structure;
    bh_quasi_nucleus nucleus;
};

struct thrown {
    const struct scene *scene;
    const struct part *part;
    uint64_t seed, number;
    int bin;
};

/* What is left of one event: where it happened, what it is. */
struct event {
    bh_event at;
    double kinetic;               /* MeV scattered */
    double arrives;               /* MeV */
    struct matter before, behind; /* the target */
    double angle;
    double inside, above; /* MeV of the line over lower and upper edge */
};

static bool is_electron(const bh_particle *p)
{
    return p->mass < 1;
}

/* Loss in scattered energy [MeV] when the beam loses `lost` before. */
static double seen_behind(const bh_encounter *e, const struct event *v, double lost)
{
    if (!(lost < e->kinetic))
        return v->kinetic;
    return v->kinetic - scattered_kinetic(e->beam->mass, e->target, e->kinetic - lost, v->angle);
}

/* The hardest of the collisions of xi / loss^2, none harder than `most`. */
static double hardest(double xi, double most, double u)
{
    return xi > 0 ? 1 / (-log(u) / xi + 1 / most) : 0;
}

static double xi_of(const struct matter *m, const bh_particle *p, double kinetic)
{
    const double g = kinetic / p->mass + 1;
    return coupling * m->electrons / (1 - 1 / (g * g));
}

/* What photons beside nuclei [0] and the hardest single collisions before [1] and behind [2] take
 * [MeV], as seen in the scattered energy; returns the weight of the photons. */
static double throw_losses(const struct thrown *t, const bh_encounter *e, const struct event *v,
                           double lost[3])
{
    double u[2], w[2], weight = 1;
    lost[0] = lost[1] = lost[2] = 0;
    if (t->part->beside)
        return 1;
    even_pair(t->seed, t->number, 2, u);
    even_pair(t->seed, t->number, 3, w);
    if (is_electron(e->beam)) {
        const double a = v->before.soft, b = v->behind.soft;
        if (a > 0)
            lost[0] += seen_behind(e, v, (e->kinetic + e->beam->mass) * pow(u[0], 1 / a));
        if (b > 0)
            lost[0] += (v->kinetic + e->beam->mass) * pow(u[1], 1 / b);
        weight = 1 / (tgamma(1 + a) * tgamma(1 + b));
    }
    const double most =
        is_electron(e->beam) ? (double)INFINITY : most_given(e->beam->mass, e->kinetic);
    lost[1] = seen_behind(e, v, hardest(xi_of(&v->before, e->beam, e->kinetic), most, w[0]));
    lost[2] = hardest(xi_of(&v->behind, e->beam, v->kinetic), most, w[1]);
    return weight;
}

/* What internal radiation leaves inside `cut`, if nothing else took more. */
static double left_inside(const struct thrown *t, const bh_encounter *e, const struct event *v,
                          const double lost[3], double cut)
{
    const bh_radiative *model = bh_radiative_find(t->scene->plan->models.radiative.text);
    double factor;
    if (!(cut > 0) || lost[0] > cut || lost[1] > cut || lost[2] > cut)
        return 0;
    model->factor(e, cut, 1, &v->at, &factor);
    return factor;
}

static double line_at(const struct thrown *t, double angle)
{
    const struct scene *x = t->scene;
    const double kinetic = t->part->beside ? t->part->kinetic : x->line_kinetic;
    return scattered_kinetic(t->part->beam.mass, x->line_mass, kinetic, angle);
}

/* The share of an elastic event that the arm takes. */
static double taken(const struct thrown *t, const bh_encounter *e, struct event *v)
{
    const struct scene *x = t->scene;
    const bh_value *cut = &x->arm->arm.energy_cut;
    double lost[3];
    if (!(v->arrives > 0))
        return 0;
    v->inside = x->bite ? v->arrives - x->bite_from : (double)INFINITY;
    v->above = x->bite ? v->arrives - x->bite_to : -(double)INFINITY;
    if (e->beam->kind != BH_KIND_LEPTON || !(cut->given || x->bite))
        return v->inside >= 0 && v->above <= 0;
    if (cut->given)
        v->inside = fmin(v->inside, v->kinetic - line_at(t, v->angle) + cut->value);
    const double weight = throw_losses(t, e, v, lost);
    if (t->part->signal)
        return v->above <= 0 ? weight * left_inside(t, e, v, lost, v->inside) : 0;
    const double soft = 0.03 * (v->kinetic + e->beam->mass);
    const double kept = left_inside(t, e, v, lost, fmin(v->inside, soft)) -
                        left_inside(t, e, v, lost, fmin(v->above, soft));
    return kept * weight;
}

/* Whether it is measured in the bin that is looked at: as the program states it, deflected as on
 * the arm's axis. */
static bool measured(const struct thrown *t, const struct direction *d)
{
    const double off = t->scene->blur * normal_deviate(t->seed, t->number, 4);
    return measured_in(t->scene, t->bin, d->in_bins + off);
}

/* ub */
static double throw_elastic(const struct thrown *t, double z, const struct direction *d)
{
    const struct part *p = t->part;
    bh_encounter e = p->encounter;
    struct event v = {.angle = d->angle};
    double sigma;
    e.kinetic = p->beside ? p->kinetic : beam_at(t->scene, p->layer, z, &v.before);
    e.beam = &p->beam;
    v.kinetic = scattered_kinetic(p->beam.mass, e.target, e.kinetic, d->angle);
    if (!measured(t, d))
        return 0;
    v.arrives = v.kinetic;
    if (!p->beside)
        v.arrives = leaving(t->scene, p->layer, z, d->angle, v.kinetic, &v.behind);
    const bh_collision in = {p->beam.mass, e.target, e.kinetic};
    bh_kinematics_batch(&in, 1, &d->angle, BH_BRANCH_FAST, &v.at);
    bh_process_elastic.cross_section(&e, 1, &v.at, &sigma);
    return sigma * taken(t, &e, &v);
}

/* Energies [MeV] at the collision that may be taken. */
static struct span energies(const struct thrown *t, size_t layer, double z, double angle,
                            double most)
{
    const struct scene *x = t->scene;
    struct span s = {0, most};
    struct matter ignored;
    if (x->arm->arm.energy_cut.given)
        s.from = fmax(0, line_at(t, angle) - x->arm->arm.energy_cut.value);
    if (!x->bite)
        return s;
    s.from = fmax(s.from, x->bite_from);
    /* none that loses enough to fit starts above this */
    const double lost = x->bite_to - leaving(x, layer, z, angle, x->bite_to, &ignored);
    s.to = fmin(most, x->bite_to + 1.2 * lost + 0.1);
    return s;
}

/* ub/sr/MeV */
static double spectrum(const struct part *p, const bh_inclusive *in, double kinetic)
{
    const double momentum = sqrt(kinetic * (kinetic + 2 * in->mass));
    const bh_transfer at = bh_inclusive_transfer(in, momentum);
    const int a = p->encounter.a;
    double tail, soft;
    if (p->kind == TAIL) {
        bh_radiative_tail_exact(&p->encounter, in->angle, 1, &kinetic, &tail);
        bh_radiative_tail_soft(&p->encounter, in->angle, 1, &kinetic, &soft);
        return tail * soft;
    }
    if (p->kind == QUASI_ELASTIC)
        return bh_quasi_outside(&p->nucleus, &at) ? 0
                                                  : bh_quasi_cross_section(&p->nucleus, in, &at);
    return bh_inelastic_outside(a, &at) ? 0 : bh_inelastic_cross_section(a, in, &at);
}

/* ub: one energy of a spectrum */
static double throw_inclusive(const struct thrown *t, double z, const struct direction *d)
{
    const struct scene *x = t->scene;
    const struct part *p = t->part;
    struct matter ignored;
    double u[2];
    const bh_inclusive in = {p->beam.mass,
                             p->beside ? p->kinetic : beam_at(x, p->layer, z, &ignored), d->angle};
    double most = in.kinetic;
    if (p->kind == TAIL) {
        const double line = scattered_kinetic(in.mass, p->encounter.target, most, d->angle);
        most = line - 0.03 * (line + in.mass);
    }
    const struct span s = energies(t, p->layer, z, d->angle, most);
    even_pair(t->seed, t->number, 2, u);
    const double kinetic = s.from + (s.to - s.from) * u[0];
    if (!(s.to > s.from) || !measured(t, d))
        return 0;
    const double arrives =
        p->beside ? kinetic : leaving(x, p->layer, z, d->angle, kinetic, &ignored);
    if (!(arrives > 0) || (x->bite && (arrives < x->bite_from || arrives > x->bite_to)))
        return 0;
    return (s.to - s.from) * spectrum(p, &in, kinetic);
}

/* Hz */
static double throw_one(const struct thrown *t)
{
    const struct sheet *s = &t->scene->sheet[t->part->layer];
    double u[2], w[2];
    even_pair(t->seed, t->number, 0, u);
    even_pair(t->seed, t->number, 1, w);
    const struct direction d = direction_of(t->scene, t->bin, u);
    const double z = s->from + (s->to - s->from) * w[0];
    const double ub =
        t->part->kind == ELASTIC ? throw_elastic(t, z, &d) : throw_inclusive(t, z, &d);
    return t->part->rate * d.solid_angle * ub;
}

#endif
