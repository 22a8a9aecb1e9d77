/* background_quasi.c - quasi-elastic scattering as background. */
#include <math.h>

#include "beamhours/base/sentences.h"
#include "beamhours/physics/momentum_range.h"
#include "beamhours/physics/quasi_elastic.h"

static bool applies(const bh_particle *beam, int z, int a)
{
    return beam->kind == BH_KIND_LEPTON && z > 0 && a > 2;
}

static void spectrum(const void *context, const bh_inclusive *in, const bh_transfer *at,
                     double *value, double *doubt)
{
    *value = bh_quasi_cross_section(context, in, at);
    *doubt = *value > 0.0 ? bh_quasi_uncertainty(context, bh_quasi_psi(context, at)) : 0.0;
}

static const char *outside(const void *context, const bh_transfer *at)
{
    return bh_quasi_outside(context, at);
}

/* The momentum [MeV/c] between lo and hi at which psi' (falling with it) is `psi` [1]; an end
 * where it is not in between. */
static double at_psi(const bh_quasi_nucleus *nucleus, const bh_inclusive *in, double psi, double hi)
{
    double lo = 0.0;
    for (int i = 0; i < 50; i++) {
        const double middle = 0.5 * (lo + hi);
        const bh_transfer at = bh_inclusive_transfer(in, middle);
        *(bh_quasi_psi(nucleus, &at) > psi ? &lo : &hi) = middle;
    }
    return lo;
}

static void momentum_integral(const bh_encounter *encounter, const bh_momentum_range *range,
                              double *value, bh_background_validity *validity)
{
    if (!bh_momentum_range_good(encounter, range, value, validity))
        return;
    bh_quasi_nucleus nucleus;
    if (bh_quasi_find(encounter->z, encounter->a, BH_QUASI_SCALING, &nucleus, NULL) != BH_OK) {
        *value = 0.0;
        *validity = (bh_background_validity){BH_NOT_COMPUTED, 0.0, 0.0, BH_SAY_QUASI_LIGHT};
        return;
    }
    const double mass = encounter->beam->mass;
    const bh_inclusive in = {mass, encounter->kinetic, range->angle};
    bh_spectrum s = {.in = &in, .context = &nucleus, .spectrum = spectrum, .outside = outside};
    s.count = bh_inclusive_at_q(&in, BH_QUASI_Q_LEAST, s.edge);
    s.count += bh_inclusive_at_q(&in, BH_QUASI_Q_MOST, s.edge + s.count);
    const double left = encounter->kinetic - nucleus.shift;
    if (left > 0.0) {
        const double first = sqrt(left * (left + 2.0 * mass));
        const double psi[] = {BH_QUASI_PSI_MOST, 0.4, -0.4, -1.0}; /* the outer two last */
        s.edge[s.count++] = first;
        for (size_t i = 0; i < sizeof psi / sizeof psi[0]; i++)
            s.edge[s.count++] = at_psi(&nucleus, &in, psi[i], first);
    }
    bh_momentum_range_integral(&s, range, value, validity);
}

const bh_background bh_background_quasi_elastic = {
    .name = "quasi-elastic",
    .summary = "a lepton knocks one nucleon out of a nucleus heavier than the deuteron",
    .source = "scaling function of Maieron et al., Phys. Rev. C 80 (2009) 035504, Fermi momenta of "
              "Maieron, Donnelly & Sick, Phys. Rev. C 65 (2002) 025502, suppression of Tsai, Rev. "
              "Mod. Phys. 46 (1974) 815, nucleons of Kelly, Phys. Rev. C 70 (2004) 068202; R_T "
              "times 1.65, our own calibration on published spectra of 12C",
    .range = "momentum transfer 200 to 1400 MeV/c and psi' up to 0.8: 12C 5 % at the peak, 15 % "
             "beside it; other nuclei untested, 20 %; 50 % far below the peak; levels and giant "
             "resonances of the nucleus, Coulomb distortion and nuclei lighter than 6Li left out",
    .applies = applies,
    .momentum_integral = momentum_integral,
};
