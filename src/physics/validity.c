/* validity.c - nuclear forces, atomic screening and slow electrons, as warnings with numbers. */
#include "beamhours/physics/validity.h"

#include <math.h>
#include <stdarg.h>
#include <stdbool.h>
#include <stdio.h>
#include <stdlib.h>

#include "beamhours/units/constants.h"

#define BOZOIAN "Bozoian et al. 1990"
#define CLINE   "estimate: nuclear surfaces 5 fm apart, Cline 1986"
#define BARE    "no repulsion keeps the two apart"
#define SLOWEST 0.01               /* [MeV] electrons */
#define FORWARD (15.0 * BH_DEGREE) /* arms of unknown angle stand behind this */

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
    const double closest = 1.25 * (cbrt(beam->a) + cbrt(encounter->a)) + 5.0; /* [fm] */
    const double cm = beam->charge * z * BH_ALPHA * BH_HBARC / closest;
    return (bh_nuclear_limit){cm * (beam->mass + encounter->target) / encounter->target, CLINE};
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

int bh_validity_elastic(const bh_encounter *encounter, char *out, size_t size)
{
    int length = 0;
    const char *name = encounter->beam->name;
    const bh_nuclear_limit nuclear = bh_validity_nuclear(encounter);
    if (nuclear.source && encounter->kinetic > nuclear.kinetic)
        say(out, size, &length,
            nuclear.kinetic > 0.0
                ? "nuclear forces are left out: at backward angles they matter for %s above about "
                  "%.3g MeV (%s)"
                : "nuclear forces are left out: they matter for %s above %.0f MeV (%s)",
            name, nuclear.kinetic, nuclear.source);
    if (encounter->beam->mass < 1.0 && encounter->kinetic < SLOWEST)
        say(out, size, &length,
            "%sbelow 10 keV plane waves of %ss give the order of magnitude at best",
            length ? "; " : "", name);
    const double angle = encounter->z > 0 ? bh_validity_screening(encounter) : 0.0;
    if (angle >= BH_PI)
        say(out, size, &length,
            "%satomic screening is left out: it lowers the cross section by more than 1 %% at "
            "every angle",
            length ? "; " : "");
    else if (angle > (encounter->angle > 0.0 ? encounter->angle : FORWARD))
        say(out, size, &length,
            "%satomic screening is left out: it lowers the cross section by more than 1 %% forward "
            "of about %.2g deg",
            length ? "; " : "", angle / BH_DEGREE);
    return length;
}
