/* radiative_tail.c - the elastic tail: the photon's direction integrated, or put along a lepton. */
#include "beamhours/physics/radiative_tail.h"

#include <math.h>
#include <stdbool.h>

#include "beamhours/physics/dilog.h"
#include "beamhours/physics/one_photon.h"
#include "beamhours/physics/soft_photons.h"
#include "beamhours/units/constants.h"

#define ALPHA_PI (BH_ALPHA / BH_PI)
enum { POINTS = 16 };
#define PANEL 2.0 /* in the variable that flattens a peak; longer ones lose digits */

static double node_of(int i)
{
    return i < 8 ? bh_gauss16_node[i] : -bh_gauss16_node[i - 8];
}

/* Lepton in and out and all that does not depend on the photon's direction. */
typedef struct {
    const bh_structure *structure;
    double m2, M;
    double E, p;         /* beam */
    double Es, ps;       /* scattered */
    double S;            /* (k k') - m^2 */
    double hadron;       /* (u^2 - M^2) / 2, u the momentum of recoil and photon */
    double u0, u;        /* its energy and momentum */
    double at_beam;      /* [rad] direction of the beam from u */
    double at_scattered; /* [rad] of the scattered lepton from u */
} bh_emission;

static bh_emission emission_of(const bh_encounter *x, double angle, double kinetic)
{
    const double m = x->beam->mass, E = x->kinetic + m, Es = kinetic + m;
    const double p = sqrt(x->kinetic * (E + m)), ps = sqrt(kinetic * (Es + m));
    const double half = sin(0.5 * angle), lost = x->kinetic - kinetic;
    /* (k k') - m^2 without cancellation: m (T T' (T - T')^2 ...) reduces to this */
    const double straight = m * m * lost * lost / (E * Es - m * m + p * ps);
    bh_emission e = {.structure = x->structure, .m2 = m * m, .M = x->target};
    e.E = E, e.p = p, e.Es = Es, e.ps = ps;
    e.S = straight + 2.0 * p * ps * half * half;
    e.hadron = x->target * lost - e.S;
    e.u0 = lost + x->target;
    e.u = sqrt(lost * lost + 2.0 * e.S);
    e.at_beam = atan2(ps * sin(angle), p - ps * cos(angle));
    e.at_scattered = e.at_beam + angle;
    return e;
}

/* k = E - p cos(angle) of a lepton of energy E: what a photon at that angle divides by. */
static double nearness(double m2, double E, double p, double angle)
{
    const double half = sin(0.5 * angle);
    return m2 / (E + p) + 2.0 * p * half * half;
}

/* One direction of the photon, its azimuth integrated over (the letters of Mo & Tsai). */
typedef struct {
    double w;    /* photon energy */
    double a, x; /* of the scattered lepton */
    double b, y; /* of the beam */
    double q2;   /* positive */
    double flux;
} bh_direction;

static bh_direction direction_of(const bh_emission *e, double angle)
{
    bh_direction d;
    const double lost = e->E - e->Es, half = sin(0.5 * angle), turn = 2.0 * e->u * half * half;
    const double below = e->M - 2.0 * e->S / (lost + e->u) + turn; /* u0 - u cos(angle) */
    d.w = e->hadron / below;
    const double out1 = nearness(e->m2, e->Es, e->ps, angle - e->at_scattered);
    const double out2 = nearness(e->m2, e->Es, e->ps, angle + e->at_scattered);
    const double in1 = nearness(e->m2, e->E, e->p, angle - e->at_beam);
    const double in2 = nearness(e->m2, e->E, e->p, angle + e->at_beam);
    d.a = 0.5 * d.w * (out1 + out2);
    d.x = d.w * sqrt(out1 * out2);
    d.b = 0.5 * d.w * (in1 + in2);
    d.y = d.w * sqrt(in1 * in2);
    d.q2 = 2.0 * (e->S * (1.0 - 2.0 * d.w / (lost + e->u)) + d.w * turn);
    d.flux = 2.0 * e->M * d.w / (d.q2 * d.q2 * below);
    return d;
}

/* The lepton's two structure functions of eq. B.5, times what the target has in their place. */
static double contracted(const bh_emission *e, const bh_direction *d, double ge2, double gm2)
{
    const double tau = 0.25 * d->q2 / (e->M * e->M), m2 = e->m2, sp = e->S + m2, q2 = -d->q2;
    const double w2 = (ge2 + tau * gm2) / (1.0 + tau), w1 = tau * gm2;
    const double E = e->E, Es = e->Es, w = d->w, rx = 1.0 / d->x, ry = 1.0 / d->y;
    const double x3 = d->a * m2 * rx * rx * rx, y3 = d->b * m2 * ry * ry * ry;
    const double both = (d->a + d->b) * rx * ry / (d->x + d->y); /* nu (1/x - 1/y) */
    const double l2 = -x3 * (2.0 * E * (Es + w) + 0.5 * q2) - y3 * (2.0 * Es * (E - w) + 0.5 * q2) -
                      2.0 +
                      2.0 * both * (m2 * (sp - w * w) + sp * (2.0 * E * Es - sp + w * (E - Es))) +
                      rx * (2.0 * (E * Es + E * w + Es * Es) + 0.5 * q2 - sp - m2) -
                      ry * (2.0 * (E * Es - Es * w + E * E) + 0.5 * q2 - sp - m2);
    const double l1 = (x3 + y3) * (2.0 * m2 + q2) + 4.0 + 4.0 * both * sp * (sp - 2.0 * m2) +
                      (rx - ry) * (2.0 * sp + 2.0 * m2 - q2);
    return w2 * l2 + w1 * l1;
}

/* One stretch of the photon's angle, from the peak at `from` to `to`. */
typedef struct {
    double from, to; /* [rad] */
    double width;    /* [rad] of the peak */
} bh_stretch;

/* With angle = from +- width sinh(t) the peak has the width 1 in t. */
static double stretch_sum(const bh_emission *e, const bh_stretch *s)
{
    const double span = asinh(fabs(s->to - s->from) / s->width);
    const double way = s->to < s->from ? -s->width : s->width;
    const int panels = 1 + (int)(span / PANEL);
    const double step = 0.5 * span / panels;
    double sum = 0.0;
    for (int k = 0; k < panels; k++) {
        bh_direction d[POINTS];
        double weight[POINTS], q2[POINTS], ge2[POINTS], gm2[POINTS];
        for (int i = 0; i < POINTS; i++) {
            const double t = step * (2 * k + 1 + node_of(i));
            const double angle = s->from + way * sinh(t);
            d[i] = direction_of(e, angle);
            q2[i] = d[i].q2;
            weight[i] =
                bh_gauss16_weight[i % 8] * step * s->width * cosh(t) * sin(angle) * d[i].flux;
        }
        bh_structure_eval(e->structure, POINTS, q2, ge2, gm2);
        for (int i = 0; i < POINTS; i++)
            sum += weight[i] * contracted(e, &d[i], ge2[i], gm2[i]);
    }
    return sum;
}

static double exact(const bh_encounter *x, double angle, double kinetic)
{
    const bh_emission e = emission_of(x, angle, kinetic);
    const double m = x->beam->mass, middle = 0.5 * (e.at_beam + e.at_scattered);
    const double before = m / e.E, after = m / e.Es;
    /* along u the nucleus takes the least momentum, and 1/q2^2 has a peak of its own */
    const bh_direction along = direction_of(&e, 0.0);
    const double least = fmin(1.0, sqrt(along.q2 / (along.w * e.u)));
    const bh_stretch stretch[] = {{0.0, 0.5 * e.at_beam, least},
                                  {e.at_beam, 0.5 * e.at_beam, before},
                                  {e.at_beam, middle, before},
                                  {e.at_scattered, middle, after},
                                  {e.at_scattered, BH_PI, after}};
    double sum = 0.0;
    for (int i = 0; i < (int)(sizeof stretch / sizeof stretch[0]); i++)
        sum += stretch_sum(&e, &stretch[i]);
    return BH_ALPHA * BH_ALPHA * BH_ALPHA * BH_HBARC2_UB / (2.0 * BH_PI) * e.ps / e.p * sum;
}

static bool radiates(const bh_encounter *x)
{
    return x->beam->kind == BH_KIND_LEPTON;
}

static bh_event peak_of(const bh_encounter *x, double angle)
{
    const bh_collision in = {x->beam->mass, x->target, x->kinetic};
    bh_event e = {0};
    bh_kinematics_batch(&in, 1, &angle, BH_BRANCH_FAST, &e);
    return e;
}

void bh_radiative_tail_exact(const bh_encounter *encounter, double angle, size_t n,
                             const double *kinetic, double *tail)
{
    const double top = peak_of(encounter, angle).scattered_kinetic;
    for (size_t i = 0; i < n; i++) {
        const double T = kinetic[i];
        if (T > 0.0 && T < top && radiates(encounter))
            tail[i] = exact(encounter, angle, T);
        else
            tail[i] = isnan(T) ? T : 0.0;
    }
}

/* The elastic cross section of a massless lepton of energy `energy`. */
static double elastic(const bh_encounter *x, double energy, double angle)
{
    const bh_collision in = {0.0, x->target, energy};
    bh_event e;
    double ge2, gm2;
    bh_kinematics_batch(&in, 1, &angle, BH_BRANCH_FAST, &e);
    bh_structure_eval(x->structure, 1, &e.q2, &ge2, &gm2);
    return bh_one_photon(&in, &e, (bh_vertex){1.0, 1.0}, (bh_vertex){ge2, gm2});
}

/* Photon energies lost along the beam and along the scattered lepton, massless. */
typedef struct {
    double before, after; /* [MeV] */
    double log1;          /* ln(q2/m^2) - 1 of the leptons as seen */
    double stretch;       /* dE'/dE of the elastic line at the lowered beam energy, inverse */
} bh_peaks;

static bh_peaks peaks_of(const bh_encounter *x, double angle, double kinetic)
{
    const double m = x->beam->mass, E = x->kinetic + m, Es = kinetic + m, M = x->target;
    const double sine = sin(0.5 * angle), s2 = sine * sine, line = 1.0 - 2.0 * Es / M * s2;
    bh_peaks k;
    k.before = E - Es / line;
    k.after = E / (1.0 + 2.0 * E / M * s2) - Es;
    k.log1 = log(4.0 * E * Es * s2 / (m * m)) - 1.0;
    k.stretch = (M + 2.0 * (E - k.before) * s2) / (M * line);
    return k;
}

/* The spectrum of photons times their energy over alpha/pi, for the share `v` lost. */
typedef double shape_function(double log1, double v);

static double almost_real(double log1, double v)
{
    const double x = 1.0 - v;
    return 0.5 * (1.0 + x * x) * (log1 + 1.0) - x;
}

static double radiator(double log1, double v)
{
    return log1 * (1.0 - v + 0.75 * v * v);
}

/* `line`: the elastic cross section at the energy of the beam, the same for all of a tail. */
static double peaked(shape_function *shape, const bh_encounter *x, double angle, double line,
                     double kinetic)
{
    if (kinetic <= 0.0 || !radiates(x))
        return 0.0;
    const bh_peaks k = peaks_of(x, angle, kinetic);
    const double E = x->kinetic + x->beam->mass, Es = kinetic + x->beam->mass;
    if (k.after <= 0.0 || k.before <= 0.0)
        return 0.0;
    const double first =
        k.stretch * elastic(x, E - k.before, angle) * shape(k.log1, k.before / E) / k.before;
    const double second = line * shape(k.log1, k.after / (Es + k.after)) / k.after;
    return ALPHA_PI * (first + second);
}

static double line_of(const bh_encounter *x, double angle)
{
    return elastic(x, x->kinetic + x->beam->mass, angle);
}

void bh_radiative_tail_peaking(const bh_encounter *encounter, double angle, size_t n,
                               const double *kinetic, double *tail)
{
    const double line = n ? line_of(encounter, angle) : 0.0;
    for (size_t i = 0; i < n; i++)
        tail[i] = peaked(almost_real, encounter, angle, line, kinetic[i]);
}

void bh_radiative_tail_equivalent(const bh_encounter *encounter, double angle, size_t n,
                                  const double *kinetic, double *tail)
{
    const double line = n ? line_of(encounter, angle) : 0.0;
    for (size_t i = 0; i < n; i++)
        tail[i] = peaked(radiator, encounter, angle, line, kinetic[i]);
}

void bh_radiative_tail_soft(const bh_encounter *encounter, double angle, size_t n,
                            const double *kinetic, double *factor)
{
    const double m = encounter->beam->mass, E = encounter->kinetic + m;
    for (size_t i = 0; i < n; i++) {
        const bh_peaks k = peaks_of(encounter, angle, kinetic[i]);
        const double shares = k.before / E * k.after / (kinetic[i] + m + k.after);
        const bool peak = k.before <= 0.0 || k.after <= 0.0;
        const bool outside = peak || kinetic[i] <= 0.0 || !radiates(encounter);
        factor[i] = outside ? 0.0 : pow(shares, ALPHA_PI * (k.log1 < 0.0 ? 0.0 : k.log1));
    }
}

double bh_radiative_tail_hard(const bh_encounter *encounter, double angle, double cut)
{
    if (!radiates(encounter))
        return 0.0;
    const bh_collision in = {encounter->beam->mass, encounter->target, encounter->kinetic};
    const bh_event e = peak_of(encounter, angle);
    if (!(cut > 0.0 && cut <= e.scattered_kinetic))
        return (double)NAN;
    double ge2, gm2, sum = 0.0;
    bh_structure_eval(encounter->structure, 1, &e.q2, &ge2, &gm2);
    const double sigma = bh_one_photon(&in, &e, (bh_vertex){1.0, 1.0}, (bh_vertex){ge2, gm2});
    const bh_soft soft = bh_soft_of(&in, &e, cut);
    const double rate = bh_soft_rate(&soft);
    for (int i = 0; i < POINTS; i++) {
        const double lost = 0.5 * cut * (1.0 + node_of(i));
        const double tail = exact(encounter, angle, e.scattered_kinetic - lost);
        sum += bh_gauss16_weight[i % 8] * (tail / sigma - rate / lost);
    }
    return 0.5 * cut * sum;
}
