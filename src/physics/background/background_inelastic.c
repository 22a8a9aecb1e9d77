/* background_inelastic.c - inelastic scattering on protons and deuterons as background. */
#include "beamhours/physics/inelastic.h"
#include "beamhours/physics/momentum_range.h"

static bool applies(const bh_particle *beam, int z, int a)
{
    return beam->kind == BH_KIND_LEPTON && z == 1 && (a == 1 || a == 2);
}

static void spectrum(const void *context, const bh_inclusive *in, const bh_transfer *at,
                     double *value, double *doubt)
{
    const int nucleons = *(const int *)context;
    *value =
        bh_inelastic_outside(nucleons, at) ? 0.0 : bh_inelastic_cross_section(nucleons, in, at);
    *doubt = bh_inelastic_uncertainty(nucleons, at);
}

static const char *outside(const void *context, const bh_transfer *at)
{
    return bh_inelastic_outside(*(const int *)context, at);
}

static void momentum_integral(const bh_encounter *encounter, const bh_momentum_range *range,
                              double *value, bh_background_validity *validity)
{
    if (!bh_momentum_range_good(encounter, range, value, validity))
        return;
    const bh_inclusive in = {encounter->beam->mass, encounter->kinetic, range->angle};
    const int nucleons = encounter->a;
    bh_spectrum s = {.in = &in, .context = &nucleons, .spectrum = spectrum, .outside = outside};
    s.count = bh_inelastic_edges(nucleons, &in, s.edge);
    bh_momentum_range_integral(&s, range, value, validity);
}

const bh_background bh_background_inelastic = {
    .name = "inelastic",
    .summary = "a lepton makes mesons on a proton or deuteron",
    .source =
        "W2 above 4 GeV2: ALLM97, hep-ph/9712415 (proton), NMC, Phys. Lett. B 364 (1995) 107 "
        "(deuteron), R1998, Phys. Lett. B 452 (1999) 194; below 3.2 GeV2: Bodek et al., Phys. "
        "Rev. D 20 (1979) 1471; in between from one to the other",
    .range = "W above 1.18 GeV, Q2 above 0.3 GeV2 (0.5 GeV2 from W2 = 3.2 GeV2 on), x 0.006 to "
             "0.86: 5 % above W2 = 4 GeV2, 10 % below; the deuteron below W2 = 4 GeV2 20 %, its "
             "nucleons taken at rest; nuclei beyond the deuteron not computed",
    .applies = applies,
    .momentum_integral = momentum_integral,
};
