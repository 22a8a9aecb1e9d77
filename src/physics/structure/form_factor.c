/* form_factor.c - the registry of structure models: a row each. */
#include "beamhours/physics/form_factor.h"

#include <string.h>

int bh_sets_nucleons(int z, int a)
{
    return a == 1 && z >= 0;
}

int bh_sets_proton(int z, int a)
{
    return z == 1 && a == 1;
}

int bh_sets_neutron(int z, int a)
{
    return z == 0 && a == 1;
}

int bh_sets_deuteron(int z, int a)
{
    return z == 1 && a == 2;
}

int bh_sets_three(int z, int a)
{
    return a == 3 && (z == 1 || z == 2);
}

int bh_sets_nuclei(int z, int a)
{
    return z >= 1 && a >= 2;
}

int bh_sets_all(int z, int a)
{
    return z >= 0 && a >= 1;
}

static int sets_oscillator(int z, int a)
{
    return bh_density_sets(BH_SHAPE_OSCILLATOR, z, a);
}

/* The published ones, and one that is fitted to the radius. */
static int sets_fermi_2p(int z, int a)
{
    return bh_sets_nuclei(z, a) ? 1 + bh_density_sets(BH_SHAPE_FERMI_2P, z, a) : 0;
}

static int sets_fermi_3p(int z, int a)
{
    return bh_density_sets(BH_SHAPE_FERMI_3P, z, a);
}

static int sets_gauss_3p(int z, int a)
{
    return bh_density_sets(BH_SHAPE_GAUSS_3P, z, a);
}

static int sets_fourier_bessel(int z, int a)
{
    return bh_density_sets(BH_SHAPE_FOURIER_BESSEL, z, a);
}

static int sets_gaussians(int z, int a)
{
    return bh_density_sets(BH_SHAPE_GAUSSIANS, z, a);
}

#define TABLES                                                    \
    "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; " \
    "de Vries et al., ibid. 36 (1987) 495"
#define RADII "Angeli & Marinova, At. Data Nucl. Data Tables 99 (2013) 69 (radii)"

/* name, summary, source; use; range [GeV2]; whom; how.
 * Proton fits reach the highest cross section they describe, 31.2 GeV2 (Sill et al. 1993; chi^2 per
 * point 0.2 to 0.7), though GE was measured below 9 GeV2 only.  The tables of densities that were
 * read do not give the range of their data: 2.5/fm is assumed for shapes of few parameters, 4/fm
 * for the others, and no more than a Fourier-Bessel series resolves. */
static const bh_form_factor registry[] = {
    {{"point", "no structure: point charge or Dirac particle", "definition", BH_FIT_NEUTRAL, 0.0,
      1e6},
     bh_sets_all,
     bh_prepare_point},
    {{"dipole", "GE = GM / moment = (1 + Q2 / 0.71 GeV2)^-2, good to 10 % below 1 GeV2",
      "definition", BH_FIT_NEUTRAL, 0.0, 1.0},
     bh_sets_nucleons,
     bh_prepare_dipole},
    {{"kelly-2004", "four-parameter fit of all four nucleon form factors, polarisation data in it",
      "Kelly, Phys. Rev. C 70 (2004) 068202", BH_FIT_CORRECTED, 0.0, 31.2},
     bh_sets_nucleons,
     bh_prepare_kelly},
    {{"arrington-2004", "proton, from cross sections alone",
      "Arrington, Phys. Rev. C 69 (2004) 022201", BH_FIT_CROSS_SECTION, 0.0, 31.2},
     bh_sets_proton,
     bh_prepare_arrington},
    {{"amt-2007", "proton, corrected for two-photon exchange",
      "Arrington, Melnitchouk & Tjon, Phys. Rev. C 76 (2007) 035205", BH_FIT_CORRECTED, 0.0, 31.2},
     bh_sets_proton,
     bh_prepare_amt},
    {{"amt-2007-effective", "proton, two-photon exchange left inside: describes cross sections",
      "Arrington, Melnitchouk & Tjon, Phys. Rev. C 76 (2007) 035205", BH_FIT_CROSS_SECTION, 0.0,
      31.2},
     bh_sets_proton,
     bh_prepare_amt_effective},
    {{"venkat-2011", "proton, corrected for two-photon exchange",
      "Venkat, Arrington, Miller & Zhan, Phys. Rev. C 83 (2011) 015203", BH_FIT_CORRECTED, 0.0,
      31.2},
     bh_sets_proton,
     bh_prepare_venkat},
    {{"ye-2018", "all four nucleon form factors with uncertainties, conformal expansion",
      "Ye, Arrington, Hill & Lee, Phys. Lett. B 777 (2018) 8", BH_FIT_CORRECTED, 0.0, 30.0},
     bh_sets_nucleons,
     bh_prepare_ye},
    {{"a1-2014", "proton, spline fit to cross sections of one laboratory",
      "Bernauer et al. (A1), Phys. Rev. C 90 (2014) 015206", BH_FIT_CORRECTED, 0.0, 0.977},
     bh_sets_proton,
     bh_prepare_a1},
    {{"prad-2019", "proton at the lowest momentum transfers",
      "Xiong et al., Nature 575 (2019) 147; refitted to its points", BH_FIT_CORRECTED, 0.0, 0.06},
     bh_sets_proton,
     bh_prepare_prad},
    {{"galster-1971", "neutron, electric", "Galster et al., Nucl. Phys. B 32 (1971) 221",
      BH_FIT_NEUTRAL, 0.0, 0.6},
     bh_sets_neutron,
     bh_prepare_galster},
    {{"riordan-2010", "neutron, electric, from polarisation",
      "attributed to Riordan et al., Phys. Rev. Lett. 105 (2010) 262302", BH_FIT_CORRECTED, 0.0,
      3.4},
     bh_sets_neutron,
     bh_prepare_riordan},
    {{"abbott-2000-i", "deuteron, rational functions",
      "Abbott et al., Eur. Phys. J. A 7 (2000) 421, parametrisation I", BH_FIT_NEUTRAL, 0.0, 2.0},
     bh_sets_deuteron,
     bh_prepare_abbott_i},
    {{"abbott-2000-ii", "deuteron, sums of poles of helicity amplitudes",
      "Abbott et al., Eur. Phys. J. A 7 (2000) 421, parametrisation II", BH_FIT_NEUTRAL, 0.0, 6.0},
     bh_sets_deuteron,
     bh_prepare_abbott_ii},
    {{"amroun-1994", "3H and 3He, charge and magnetic, sums of Gaussians",
      "Amroun et al., Nucl. Phys. A 579 (1994) 596", BH_FIT_NEUTRAL, 0.0, 1.2},
     bh_sets_three,
     bh_prepare_amroun},
    {{"uniform", "uniform sphere with the measured radius; within 5 % of a real surface in range",
      RADII, BH_FIT_NEUTRAL, 0.0, 0.0035},
     bh_sets_nuclei,
     bh_prepare_uniform},
    {{"helm", "sphere with a soft surface of 0.9 fm and the measured radius",
      "Helm, Phys. Rev. 104 (1956) 1466; " RADII, BH_FIT_NEUTRAL, 0.0, 0.06},
     bh_sets_nuclei,
     bh_prepare_helm},
    {{"oscillator", "harmonic-oscillator density of light nuclei", TABLES, BH_FIT_NEUTRAL, 0.0,
      0.24},
     sets_oscillator,
     bh_prepare_oscillator},
    {{"fermi-2p", "two-parameter Fermi density; the last set is fitted to the measured radius",
      TABLES "; " RADII, BH_FIT_NEUTRAL, 0.0, 0.24},
     sets_fermi_2p,
     bh_prepare_fermi_2p},
    {{"fermi-3p", "three-parameter Fermi density", TABLES, BH_FIT_NEUTRAL, 0.0, 0.24},
     sets_fermi_3p,
     bh_prepare_fermi_3p},
    {{"gauss-3p", "three-parameter Gaussian density", TABLES, BH_FIT_NEUTRAL, 0.0, 0.24},
     sets_gauss_3p,
     bh_prepare_gauss_3p},
    {{"fourier-bessel", "charge density as a Fourier-Bessel series", TABLES, BH_FIT_NEUTRAL, 0.0,
      0.62},
     sets_fourier_bessel,
     bh_prepare_fourier_bessel},
    {{"sum-of-gaussians", "charge density as a sum of Gaussians", TABLES, BH_FIT_NEUTRAL, 0.0,
      0.62},
     sets_gaussians,
     bh_prepare_gaussians},
};

enum { ROWS = sizeof registry / sizeof registry[0] };

const bh_form_factor *bh_form_factor_at(int i)
{
    return i >= 0 && i < (int)ROWS ? &registry[i] : NULL;
}

const bh_form_factor *bh_form_factor_find(const char *name, size_t length)
{
    for (int i = 0; i < (int)ROWS; i++) {
        const char *own = registry[i].model.name;
        if (strlen(own) == length && memcmp(own, name, length) == 0)
            return &registry[i];
    }
    return NULL;
}

static const bh_form_factor *named(const char *name)
{
    return bh_form_factor_find(name, strlen(name));
}

static const char *const shape_name[] = {
    [BH_SHAPE_FERMI_2P] = "fermi-2p",
    [BH_SHAPE_FERMI_3P] = "fermi-3p",
    [BH_SHAPE_GAUSS_3P] = "gauss-3p",
    [BH_SHAPE_OSCILLATOR] = "oscillator",
    [BH_SHAPE_FOURIER_BESSEL] = "fourier-bessel",
    [BH_SHAPE_GAUSSIANS] = "sum-of-gaussians",
};

const bh_form_factor *bh_form_factor_default(int z, int a, int *set)
{
    *set = 1;
    if (bh_sets_proton(z, a))
        return named("amt-2007-effective");
    if (bh_sets_neutron(z, a))
        return named("kelly-2004");
    if (bh_sets_deuteron(
            z, a)) /* as good as I (3.65 and 3.48 per point of A), and holds above 2 GeV2 */
        return named("abbott-2000-ii");
    if (bh_sets_three(z, a))
        return named("amroun-1994");
    const bh_density *density = bh_density_best(z, a, set);
    if (density)
        return named(shape_name[density->kind]);
    *set = sets_fermi_2p(z, a);
    return named("fermi-2p");
}
