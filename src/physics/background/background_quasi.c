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

/* psi' falls with the momentum; `above` and `below` [1] are what it exceeds the wanted one by at
 * the ends [MeV/c], `side` which of them stayed last. */
typedef struct {
    double lo, hi, above, below;
    int side;
} bracket;

/* Illinois' rule: an end that stays twice counts half. */
static void narrow(bracket *b, double momentum, double off)
{
    if (off > 0.0) {
        b->lo = momentum;
        b->above = off;
        b->below *= b->side > 0 ? 0.5 : 1.0;
        b->side = 1;
    } else {
        b->hi = momentum;
        b->below = off;
        b->above *= b->side < 0 ? 0.5 : 1.0;
        b->side = -1;
    }
}

static double exceeds(const bh_quasi_nucleus *nucleus, const bh_inclusive *in, double momentum)
{
    const bh_transfer at = bh_inclusive_transfer(in, momentum);
    return bh_quasi_psi(nucleus, &at) - BH_QUASI_PSI_MOST;
}

/* The momentum [MeV/c] below `hi` at which psi' reaches its most; 0 where it never does. */
static double at_psi_most(const bh_quasi_nucleus *nucleus, const bh_inclusive *in, double hi)
{
    bracket b = {0.0, hi, exceeds(nucleus, in, 0.0), exceeds(nucleus, in, hi), 0};
    if (!(b.above > 0.0 && b.below < 0.0))
        return 0.0;
    double now = 0.0, before = hi;
    for (int i = 0; i < 60 && fabs(now - before) > 1e-10 * hi; i++) {
        before = now;
        now = b.lo + (b.hi - b.lo) * b.above / (b.above - b.below);
        narrow(&b, now, exceeds(nucleus, in, now));
    }
    return now;
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
        s.fastest = sqrt(left * (left + 2.0 * mass));
        s.edge[s.count++] = at_psi_most(&nucleus, &in, s.fastest);
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
