/* throwing.h - one arm of one setting for the Monte Carlo: where events happen, where they go, what
 * they cross and lose on their way. */
#ifndef TESTS_MONTECARLO_THROWING_H
#define TESTS_MONTECARLO_THROWING_H

#include "../counter_random.h"
#include "beamhours/physics/kinematics.h"
#include "beamhours/plan/plan.h"
#include "slowing.h"

enum { MOST_SHEETS = 8 };

/* A layer or the wall. */
struct sheet {
    struct stuff stuff;
    double begins;       /* cm along the beam; of a layer */
    double from, to;     /* cm likewise: what of it the arm sees */
    double thickness;    /* cm */
    double areal;        /* g/cm2 at the setting's current */
    struct slowing beam; /* of the particle, before and after */
};

struct scene {
    const bh_plan *plan;
    const bh_setting *setting;
    const bh_setting_arm *arm;
    bool losing;
    double kinetic;        /* MeV of the beam entering */
    double axis;           /* rad */
    size_t layers, sheets; /* the wall is the last sheet where there is one */
    struct sheet sheet[MOST_SHEETS];
    int line_z, line_a;        /* of the scatterer's most abundant isotope */
    double line_mass;          /* MeV */
    double line_kinetic;       /* MeV of the beam, mean where that isotope is */
    bool bite;                 /* a momentum bite */
    double bite_from, bite_to; /* MeV, kinetic energies on arrival */
    double blur;               /* rad, rms deflection in matter, of the scatterer's on the axis */
};

/* --- kinematics: the faster of the solutions --- */

static double scattered_kinetic(double mass, double target, double kinetic, double angle)
{
    const double e = kinetic + mass, p2 = kinetic * (kinetic + 2 * mass), s = sin(angle);
    const double root = sqrt(target * target - mass * mass * s * s);
    const double c = cos(angle);
    return ((e + target) * (target * e + mass * mass) + p2 * c * root) /
               ((e + target) * (e + target) - p2 * c * c) -
           mass;
}

/* --- ways --- */

/* Matter crossed. */
struct matter {
    double path;      /* g/cm2 */
    double lengths;   /* radiation lengths */
    double soft;      /* the same, each times its b */
    double electrons; /* mol/cm2 */
};

static void cross(struct matter *m, const struct sheet *s, double path)
{
    m->path += path;
    m->lengths += path / s->stuff.material->published_x0;
    m->soft += s->stuff.b * path / s->stuff.material->published_x0;
    m->electrons += s->stuff.z_over_a * path;
}

static double lose(const struct scene *x, const struct sheet *s, double kinetic, double path)
{
    return x->losing && kinetic > 0 && path > 0 ? slowed(&s->beam, kinetic, path) : kinetic;
}

/* rad^2: the mean square deflection in a plane of all matter crossed, by Highland's formula as in
 * the Review of Particle Physics: one logarithm for the sum, shared out over the ways before and
 * behind. */
static double deflection2(const bh_particle *p, const struct matter *before, double kinetic,
                          const struct matter *behind, double scattered)
{
    const double t[2] = {kinetic, scattered}, lengths[2] = {before->lengths, behind->lengths};
    const double all = lengths[0] + lengths[1];
    double sum = 0;
    if (!(all > 0 && all < 10)) /* along the layers: does not arrive */
        return 0;
    for (int i = 0; i < 2; i++) {
        const double e = t[i] + p->mass, p2 = t[i] * (t[i] + 2 * p->mass), beta2 = p2 / (e * e);
        const double log_term = 1 + 0.038 * log(all * p->charge * p->charge / beta2);
        sum += lengths[i] * pow(13.6 * p->charge * log_term, 2) / (beta2 * p2);
    }
    return sum;
}

/* The beam's energy at `z` cm in a layer, and what it has crossed. */
static double beam_at(const struct scene *x, size_t layer, double z, struct matter *m)
{
    double kinetic = x->kinetic;
    *m = (struct matter){.path = 0};
    for (size_t i = 0; i <= layer; i++) {
        const struct sheet *s = &x->sheet[i];
        const double share = i < layer ? 1 : (z - s->begins) / s->thickness;
        kinetic = lose(x, s, kinetic, s->areal * share);
        cross(m, s, s->areal * share);
    }
    return kinetic;
}

/* What is left of `kinetic` on the way out at polar `angle` from there, and what is crossed: to the
 * face that is ahead, or the wall where that is nearer. */
static double leaving(const struct scene *x, size_t layer, double z, double angle, double kinetic,
                      struct matter *m)
{
    const double slant = cos(angle), across = sin(angle);
    const bool wall = x->sheets > x->layers;
    double reach = wall ? x->setting->target->wall_radius.value / across : (double)INFINITY;
    *m = (struct matter){.path = 0};
    for (int i = (int)layer; i >= 0 && i<(int)x->layers; i += slant> 0 ? 1 : -1) {
        const struct sheet *s = &x->sheet[i];
        double ahead = s->thickness;
        if (i == (int)layer)
            ahead = slant > 0 ? s->begins + s->thickness - z : z - s->begins;
        const double length = fmin(ahead / fabs(slant), reach);
        const double path = s->areal * length / s->thickness;
        kinetic = lose(x, s, kinetic, path);
        cross(m, s, path);
        reach -= length;
        if (!(reach > 0)) {
            const struct sheet *w = &x->sheet[x->layers];
            cross(m, w, w->areal / across);
            return lose(x, w, kinetic, w->areal / across);
        }
    }
    return kinetic;
}

/* --- making a scene --- */

static void scene_sheet(struct scene *x, const bh_layer *layer, double begins)
{
    const bh_beam *beam = &x->setting->beam;
    struct sheet *s = &x->sheet[x->sheets++];
    const double slowest = beam->particle.mass < 1 ? x->kinetic / 20 : 0.1;
    *s = (struct sheet){.stuff = stuff_of(layer->material, layer->density.value),
                        .begins = begins,
                        .thickness = layer->thickness.value,
                        .areal = layer->areal_density.value *
                                 (1 - layer->density_loss.value * beam->current.value)};
    if (x->losing)
        slowing_make(&s->beam, &s->stuff, &beam->particle, slowest, x->kinetic * 1.001);
}

/* What the arm sees, along the beam from the middle of the sample: its view over the sine of its
 * angle. */
static void scene_view(struct scene *x)
{
    const bh_extent *view = &x->arm->arm.target_view;
    double first = (double)INFINITY, last = 0;
    for (size_t i = 0; i < x->layers; i++)
        if (x->setting->target->layers[i].role == BH_ROLE_SAMPLE) {
            first = fmin(first, x->sheet[i].begins);
            last = fmax(last, x->sheet[i].begins + x->sheet[i].thickness);
        }
    for (size_t i = 0; i < x->layers; i++) {
        struct sheet *s = &x->sheet[i];
        s->from = s->begins;
        s->to = s->begins + s->thickness;
        if (!view->given)
            continue;
        s->from = fmax(s->from, (first + last) / 2 + view->from / sin(x->axis));
        s->to = fmax(s->from, fmin(s->to, (first + last) / 2 + view->to / sin(x->axis)));
    }
}

static bool is_scatterer(const bh_target *target, const bh_constituent *c)
{
    return c->z == target->scatterer_z && (!target->scatterer_a || c->a == target->scatterer_a);
}

/* The isotope that cuts are counted from, the beam's energy where it is, and the momentum the arm
 * is set to: what arrives on its axis, mean over the depths. */
static void scene_line(struct scene *x)
{
    enum { DEPTHS = 2000 };
    const bh_target *target = x->setting->target;
    double most = 0, energy = 0, momentum = 0, weight = 0;
    for (size_t i = 0; i < x->layers; i++)
        for (size_t c = 0; c < target->layers[i].material->count; c++) {
            const bh_constituent *part = &target->layers[i].material->parts[c];
            if (target->layers[i].role == BH_ROLE_SAMPLE && is_scatterer(target, part) &&
                part->per_atom > most) {
                most = part->per_atom;
                x->line_z = part->z;
                x->line_a = part->a;
                x->line_mass = part->mass;
            }
        }
    const double mass = x->setting->beam.particle.mass;
    x->blur = 0;
    for (size_t i = 0; i < x->layers; i++)
        for (int k = 0; target->layers[i].role == BH_ROLE_SAMPLE && k < DEPTHS; k++) {
            const struct sheet *s = &x->sheet[i];
            const double z = s->from + (s->to - s->from) * (k + 0.5) / DEPTHS;
            const double w = s->areal * (s->to - s->from);
            struct matter before, behind;
            const double t = beam_at(x, i, z, &before);
            const double t2 = scattered_kinetic(mass, x->line_mass, t, x->axis);
            const double out = leaving(x, i, z, x->axis, t2, &behind);
            x->blur += w * deflection2(&x->setting->beam.particle, &before, t, &behind, t2);
            energy += w * t;
            momentum += w * sqrt(out * (out + 2 * mass));
            weight += w;
        }
    x->line_kinetic = energy / weight;
    x->blur = x->losing ? sqrt(x->blur / weight) : 0;
    const bh_extent *bite = &x->arm->arm.momentum_bite;
    x->bite = bite->given;
    const double from = momentum / weight * (1 + bite->from),
                 to = momentum / weight * (1 + bite->to);
    x->bite_from = hypot(from, mass) - mass;
    x->bite_to = hypot(to, mass) - mass;
}

static void scene_make(struct scene *x, const bh_plan *plan, const bh_setting *setting,
                       const bh_setting_arm *arm)
{
    const bh_target *target = setting->target;
    double z = 0;
    x->plan = plan;
    x->setting = setting;
    x->arm = arm;
    x->losing = strcmp(plan->models.energy_loss.text, "none") != 0;
    x->kinetic = setting->beam.kinetic_energy.value;
    x->axis = arm->arm.shape == BH_SHAPE_RING ? (arm->arm.ring.from + arm->arm.ring.to) / 2
                                              : arm->angle.value;
    x->layers = target->layer_count;
    x->sheets = 0;
    for (size_t i = 0; i < x->layers; i++) {
        scene_sheet(x, &target->layers[i], z);
        z += target->layers[i].thickness.value;
    }
    if (target->has_wall)
        scene_sheet(x, &target->wall, 0);
    scene_view(x);
    scene_line(x);
}

/* --- directions --- */

/* A direction, and the solid angle that it stands for, over all directions thrown their mean. */
struct direction {
    double angle;       /* rad */
    double in_bins;     /* rad: what bins sort, polar angle or angle in the plane */
    double solid_angle; /* sr */
};

/* Part of an arm, of what bins sort. */
struct span {
    double from, to; /* rad */
};

static struct span aperture(const struct scene *x)
{
    const bh_arm *a = &x->arm->arm;
    if (a->shape == BH_SHAPE_RING)
        return (struct span){a->ring.from, a->ring.to};
    return (struct span){x->axis + a->in_plane.from, x->axis + a->in_plane.to};
}

static struct span bin_of(const struct scene *x, int bin)
{
    const bh_arm *a = &x->arm->arm;
    struct span all = aperture(x);
    const double width = (all.to - all.from) / a->bins;
    if (bin == 0)
        return all;
    if (a->edges)
        return (struct span){a->edges[bin - 1], a->edges[bin]};
    return (struct span){all.from + width * (bin - 1), all.from + width * bin};
}

/* Whence events may be measured in a bin. */
static struct span about(const struct scene *x, int bin)
{
    const struct span all = aperture(x), here = bin_of(x, bin);
    const double far = 5.5 * x->blur;
    return (struct span){fmax(all.from, here.from - far), fmin(all.to, here.to + far)};
}

/* The outermost bins have what is measured beyond them. */
static bool measured_in(const struct scene *x, int bin, double measured)
{
    const struct span here = bin_of(x, bin);
    return bin == 0 ||
           ((bin == 1 || measured >= here.from) && (bin == x->arm->arm.bins || measured < here.to));
}

static struct direction direction_of(const struct scene *x, int bin, const double u[2])
{
    const bh_arm *a = &x->arm->arm;
    if (a->shape == BH_SHAPE_POINT)
        return (struct direction){x->axis, x->axis, a->solid_angle.value};
    const struct span s = about(x, bin);
    if (a->shape == BH_SHAPE_RING) { /* as 1 / (1 - cos theta)^2, about as cross sections fall */
        const double first = 1 / (1 - cos(s.from)), last = 1 / (1 - cos(s.to));
        const double at = 1 / (first + (last - first) * u[0]), angle = acos(1 - at);
        return (struct direction){angle, angle, a->azimuth.value * (first - last) * at * at};
    }
    const double low = sin(a->out_of_plane.from), high = sin(a->out_of_plane.to);
    const double phi = s.from + (s.to - s.from) * u[0], sine = low + (high - low) * u[1];
    return (struct direction){acos(sqrt(1 - sine * sine) * cos(phi)), phi,
                              (s.to - s.from) * (high - low)};
}

#endif
