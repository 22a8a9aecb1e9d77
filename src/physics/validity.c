/* validity.c - nuclear forces, atomic screening and slow electrons, as warnings with numbers. */
#include "beamhours/physics/validity.h"

#include <math.h>
#include <stdarg.h>
#include <stdbool.h>
#include <stdio.h>
#include <stdlib.h>

#include "beamhours/base/sentences.h"
#include "beamhours/physics/kinematics.h"
#include "beamhours/units/constants.h"

#define BOZOIAN "Bozoian et al. 1990"
#define CLINE   "estimate: nuclear surfaces 5 fm apart, Cline 1986"
#define BARE    "no repulsion keeps the two apart"
#define PION    134.9768           /* [MeV] the lightest */
#define SLOWEST 0.01               /* [MeV] electrons */
#define FORWARD (15.0 * BH_DEGREE) /* arms of unknown angle stand behind this */

/* Kinetic energy [MeV] at which a head-on orbit of these charges, repelled, brings the nuclear
 * surfaces within 5 fm of each other. */
static double apart(const bh_encounter *encounter)
{
    const bh_particle *beam = encounter->beam;
    const double closest = 1.25 * (cbrt(beam->a) + cbrt(encounter->a)) + 5.0; /* [fm] */
    const double cm = abs(beam->charge) * encounter->z * BH_ALPHA * BH_HBARC / closest;
    return cm * (beam->mass + encounter->target) / encounter->target;
}

bh_nuclear_limit bh_validity_nuclear(const bh_encounter *encounter)
{
    const bh_particle *beam = encounter->beam;
    const int z = encounter->z;
    if (beam->kind == BH_KIND_LEPTON)
        return (bh_nuclear_limit){(double)INFINITY, NULL};
    if (beam->charge <= 0 || z <= 0)
        return (bh_nuclear_limit){0.0, BARE};
    if (beam->charge == 2)
        return (bh_nuclear_limit){0.25 * z + 0.4, BOZOIAN};
    if (beam->z == 1 && beam->a == 1 && z >= 8)
        return (bh_nuclear_limit){0.12 * z - 0.5, BOZOIAN ", unconfirmed"};
    if (beam->charge == 3)
        return (bh_nuclear_limit){0.33 * z + 1.4, BOZOIAN ", unconfirmed"};
    return (bh_nuclear_limit){apart(encounter), CLINE};
}

double bh_validity_excess(const bh_encounter *encounter, double q2)
{
    const bh_particle *beam = encounter->beam;
    const bh_collision in = {beam->mass, encounter->target, encounter->kinetic};
    const bh_nuclear_limit from = bh_validity_nuclear(encounter);
    if (beam->kind == BH_KIND_LEPTON)
        return 0.0;
    const double most = bh_kinematics_largest_q2(&in);
    const double wide = q2 > 0.0 && q2 < most ? sqrt(most / q2) : 1.0; /* 1 / sin(theta/2) */
    const double limit =
        from.kinetic > 0.0 ? from.kinetic * (wide + 1.0) : apart(encounter) * (wide - 1.0);
    return limit > 0.0 ? 2.0 * encounter->kinetic / limit : (double)INFINITY;
}

bool bh_validity_reacts(const bh_encounter *encounter)
{
    const bh_particle *beam = encounter->beam;
    const double M = encounter->target, m = beam->mass, T = encounter->kinetic;
    if (!(T > bh_validity_nuclear(encounter).kinetic))
        return false;
    const double threshold = PION * (PION + 2.0 * (m + M)) / (2.0 * M);
    return encounter->a > 1 || beam->a > 1 || T > threshold;
}

/* Classical scattering, where the electrons take a share v = V1/E of the energy off. */
static double screening_slow(double v)
{
    const double x2 = (1.0 + 0.5 * v) / sqrt(0.99) - 1.0 - v; /* (v / 2 sin(angle/2))^2 */
    const double half = x2 > 0.0 ? 0.5 * v / sqrt(x2) : 1.0;
    return half < 1.0 ? 2.0 * asin(half) : BH_PI;
}

double bh_validity_screening(const bh_encounter *encounter)
{
    const bh_particle *beam = encounter->beam;
    const double z = encounter->z, T = encounter->kinetic, charge = abs(beam->charge);
    const double p = sqrt(T * (T + 2.0 * beam->mass)), beta = p / (T + beam->mass);
    const bool classical = z * charge * BH_ALPHA > beta && beam->kind != BH_KIND_LEPTON;
    if (classical) /* 0.04873 keV: e^2 over the Thomas-Fermi length */
        return screening_slow(0.04873e-3 * z * charge *
                              sqrt(pow(charge, 2.0 / 3.0) + pow(z, 2.0 / 3.0)) / T);
    const double q = 14.1 * BH_ALPHA * BH_MASS_ELECTRON * cbrt(z) / 0.8853;
    return q < 2.0 * p ? 2.0 * asin(0.5 * q / p) : BH_PI;
}

/* Adds a sentence to those in `out`; `length` is what they would take. */
static void BH_PRINTF(4, 5) say(char *out, size_t size, int *length, const char *fmt, ...)
{
    const size_t used = (size_t)*length;
    va_list args;
    va_start(args, fmt);
    const int more =
        vsnprintf(used < size ? out + used : NULL, used < size ? size - used : 0, fmt, args);
    va_end(args);
    *length += more > 0 ? more : 0;
}

static void say_nuclear(const bh_encounter *x, char *out, size_t size, int *length)
{
    const bh_nuclear_limit from = bh_validity_nuclear(x);
    if (!from.source || !(x->kinetic > from.kinetic))
        return;
    say(out, size, length, "nuclear forces are left out: ");
    if (from.kinetic > 0.0)
        say(out, size, length, "at backward angles they matter for %s above about %.3g MeV (%s)",
            x->beam->name, from.kinetic, from.source);
    else
        say(out, size, length, "they matter for %s at every energy (%s)", x->beam->name,
            from.source);
    if (bh_validity_excess(x, 0.0) > BH_NUCLEAR_RULES)
        say(out, size, length, BH_WARN_NUCLEAR_RULES);
}

static void say_screening(const bh_encounter *x, char *out, size_t size, int *length)
{
    const double onset = x->z > 0 ? bh_validity_screening(x) : 0.0;
    if (!(onset > (x->angle > 0.0 ? x->angle : FORWARD)))
        return;
    say(out, size, length,
        "%satomic screening is left out: it lowers the cross section by more than 1 %% ",
        *length ? "; " : "");
    if (onset < BH_PI)
        say(out, size, length, "forward of about %.2g deg", onset / BH_DEGREE);
    else
        say(out, size, length, "at every angle");
}

int bh_validity_elastic(const bh_encounter *encounter, char *out, size_t size)
{
    int length = 0;
    say_nuclear(encounter, out, size, &length);
    if (encounter->beam->mass < 1.0 && encounter->kinetic < SLOWEST)
        say(out, size, &length,
            "%sbelow 10 keV plane waves of %ss give the order of magnitude at best",
            length ? "; " : "", encounter->beam->name);
    say_screening(encounter, out, size, &length);
    return length;
}
