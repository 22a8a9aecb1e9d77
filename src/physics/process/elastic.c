/* elastic.c - elastic scattering by one photon: leptons, hadrons and ions on nuclei. */
#include <math.h>
#include <stdbool.h>

#include "beamhours/physics/one_photon.h"
#include "beamhours/physics/process.h"
#include "beamhours/physics/validity.h"
#include "beamhours/units/constants.h"
#include "beamhours/units/nuclide.h"

enum { BLOCK = 64 }; /* events at a time, so that the form factors need no allocation */

static bool identical(const bh_encounter *x)
{
    return x->beam->a > 0 && x->beam->z == x->z && x->beam->a == x->a;
}

static bool spin_half_hadron(const bh_particle *beam)
{
    return beam->twice_spin == 1 && beam->magnetic != 0.0;
}

/* A lepton is a Dirac particle, a proton or 3He has its charge and its moment in one point, all
 * others are charges: the spin of heavier ions is worth q2/4m^2, under 1 % where the nuclear force
 * is absent. */
static bh_vertex beam_vertex(const bh_particle *beam, double q2)
{
    const double z2 = (double)beam->charge * beam->charge;
    if (beam->kind == BH_KIND_LEPTON)
        return (bh_vertex){z2, z2};
    if (spin_half_hadron(beam))
        return (bh_vertex){z2, beam->magnetic * beam->magnetic};
    return (bh_vertex){z2 * (1.0 + 0.25 * q2 / (beam->mass * beam->mass)), 0.0};
}

static void direct(const bh_encounter *x, size_t n, const bh_event *event, double *cross_section)
{
    const bh_collision in = {x->beam->mass, x->target, x->kinetic};
    double q2[BLOCK] = {0.0}, ge2[BLOCK], gm2[BLOCK];
    for (size_t i = 0; i < n; i++)
        q2[i] = event[i].q2;
    bh_structure_eval(x->structure, n, q2, ge2, gm2);
    for (size_t i = 0; i < n; i++)
        cross_section[i] =
            bh_one_photon(&in, &event[i], beam_vertex(x->beam, q2[i]), (bh_vertex){ge2[i], gm2[i]});
}

/* The event with the two particles exchanged: q2 becomes -u, that is q2_max - q2. */
static bh_event exchanged(const bh_event *e, double target)
{
    bh_event out = *e;
    const double M4 = 4.0 * target * target;
    out.q2 = e->transverse2 * (M4 + e->q2) / e->s;
    out.t = -out.q2;
    out.u = e->t;
    out.transverse2 = e->s * e->q2 / (M4 + out.q2);
    return out;
}

/* Mott 1930: both may be seen, and their waves interfere; the phase is the nonrelativistic one,
 * the relative velocity in it the relativistic one. */
static void add_exchange(const bh_encounter *x, size_t n, const bh_event *event,
                         double *cross_section)
{
    bh_event other[BLOCK] = {{0}};
    double exchange[BLOCK];
    for (size_t i = 0; i < n; i++)
        other[i] = exchanged(&event[i], x->target);
    direct(x, n, other, exchange);
    const int spin2 = x->beam->twice_spin;
    const double share = spin2 < 0 ? 0.0 : (spin2 % 2 ? -2.0 : 2.0) / (spin2 + 1);
    for (size_t i = 0; i < n; i++) {
        const double eta = x->z * x->z * BH_ALPHA * event[i].beam_energy / event[i].beam_momentum;
        const double wave = cos(eta * log(event[i].q2 / other[i].q2));
        const double both = cross_section[i] + exchange[i];
        cross_section[i] = both + share * sqrt(cross_section[i] * exchange[i]) * wave;
    }
}

static void cross_section(const bh_encounter *encounter, size_t n, const bh_event *event,
                          double *out)
{
    const bool twice = identical(encounter);
    for (size_t done = 0; done < n; done += BLOCK) {
        const size_t now = n - done < BLOCK ? n - done : BLOCK;
        direct(encounter, now, event + done, out + done);
        if (twice)
            add_exchange(encounter, now, event + done, out + done);
    }
}

static const char *formula(const bh_encounter *x)
{
    if (identical(x))
        return "relativistic Coulomb scattering of two identical point charges, times the form "
               "factors, with exchange (Mott 1930)";
    if (x->beam->kind != BH_KIND_LEPTON)
        return spin_half_hadron(x->beam)
                   ? "relativistic Coulomb scattering of a point with charge and magnetic moment, "
                     "both masses exact, times the target's form factors; slow: Rutherford"
                   : "relativistic Coulomb scattering of a point charge, both masses exact, times "
                     "the target's charge form factor squared; slow: Rutherford";
    const bh_nuclide *nuclide = bh_nuclide_find(x->z, x->a);
    if (x->z == 1 && x->a == 2)
        return "A(Q2) and B(Q2) of the deuteron with the lepton mass exact, one photon";
    if (x->a > 1 && nuclide && nuclide->twice_spin == 0)
        return "Mott with recoil and the lepton mass exact, times Z^2 F(q)^2, one photon";
    return "Rosenbluth with the lepton mass exact, one photon: epsilon GE^2 + tau GM^2";
}

const bh_process bh_process_elastic = {
    .name = "elastic",
    .summary = "elastic scattering on a nucleus by one photon, both masses exact",
    .source = "Rosenbluth, Phys. Rev. 79 (1950) 615; lepton mass: Preedom & Tegen, Phys. Rev. C 36 "
              "(1987) 2466; identical particles: Mott, Proc. R. Soc. A 126 (1930) 259",
    .cross_section = cross_section,
    .formula = formula,
    .caveat = bh_validity_elastic,
};
