/* bremsstrahlung.c - fractions kept inside a cut. */
#include "beamhours/matter/bremsstrahlung.h"

#include <math.h>

#include "beamhours/units/constants.h"

static bool makes_sense(const bh_external *x)
{
    return x->incident > 0.0 && x->scattered > 0.0 && x->cut > 0.0 && x->before.thickness >= 0.0 &&
           x->after.thickness >= 0.0 && x->before.xi >= 0.0 && x->after.xi >= 0.0;
}

double bh_external_logarithm(const bh_external *x)
{
    if (!makes_sense(x))
        return (double)NAN;
    const double eta = x->incident / x->scattered;
    const double before = x->before.thickness > 0.0 ? x->before.b * x->before.thickness : 0.0;
    const double after = x->after.thickness > 0.0 ? x->after.b * x->after.thickness : 0.0;
    const double gamma = tgamma(1.0 + before + after); /* lgamma writes a variable of all threads */
    return before * log(eta * eta * x->cut / x->incident) + after * log(x->cut / x->scattered) -
           log(gamma);
}

double bh_external_kept(const bh_external *x)
{
    const double l = bh_external_logarithm(x);
    return l < 0.0 || isnan(l) ? exp(l) : 1.0;
}

double bh_ionisation_kept(const bh_external *x)
{
    if (!makes_sense(x))
        return (double)NAN;
    const double eta = x->incident / x->scattered;
    return fmax(1.0 - x->before.xi / (eta * eta * x->cut) - x->after.xi / x->cut, 0.0);
}

double bh_mo_tsai_xi(int z, double thickness)
{
    const double l = log(184.15 / cbrt(z));
    const double eta = log(1194.0 / pow(cbrt(z), 2)) / l;
    return BH_PI * BH_MASS_ELECTRON / (2.0 * BH_ALPHA) * thickness / ((z + eta) * l);
}
