/* rational.c - nucleon form factors fitted by ratios of polynomials, and the dipole. */
#include "beamhours/physics/form_factor.h"
#include "beamhours/units/constants.h"

enum { ORDER = 6 };

static const double per_gev2 = 1e-6; /* GeV2 for each MeV^2 */

/* (1 + a1 x + a2 x^2 + ...) / (1 + b1 x + b2 x^2 + ...) */
typedef struct {
    double a[ORDER], b[ORDER];
} ratio;

typedef enum { X_TAU, X_GEV2 } argument; /* x: q2 / 4 Mp^2, or q2 in GeV2 */

typedef struct {
    argument x;
    ratio ge, gm; /* gm: over the moment */
} rational_fit;

/* Kelly, Phys. Rev. C 70 (2004) 068202, Table I. */
static const rational_fit kelly = {
    X_TAU, {{-0.24}, {10.98, 12.82, 21.97}}, {{0.12}, {10.97, 18.86, 6.55}}};
static const ratio kelly_neutron_gm = {{2.33}, {14.72, 24.2, 84.1}};
static const double kelly_neutron_a = 1.70, kelly_neutron_b = 3.30;

/* Arrington, Phys. Rev. C 69 (2004) 022201, fit to Rosenbluth separations. */
static const rational_fit arrington = {X_GEV2,
                                       {{0}, {3.226, 1.508, -0.3773, 0.611, -0.1853, 0.01596}},
                                       {{0}, {3.19, 1.355, 0.151, -0.0114, 0.000533, -9e-06}}};

/* Arrington, Melnitchouk, Tjon, Phys. Rev. C 76 (2007) 035205: corrected for two-photon exchange,
 * and the effective fit that leaves it inside. */
static const rational_fit amt = {X_TAU,
                                 {{3.439, -1.602, 0.068}, {15.055, 48.061, 99.304, 0.012, 8.650}},
                                 {{-1.465, 1.260, 0.262}, {9.627, 0.0, 0.0, 11.179, 13.245}}};
static const rational_fit amt_effective = {
    X_TAU,
    {{-1.651, 1.287, -0.185}, {9.531, 0.591, 0.0, 0.0, 4.994}},
    {{-2.151, 4.261, 0.159}, {8.647, 0.001, 5.245, 82.817, 14.191}}};

/* Venkat, Arrington, Miller, Zhan, Phys. Rev. C 83 (2011) 015203. */
static const rational_fit venkat = {
    X_TAU,
    {{2.90966, -1.11542229, 0.03866171}, {14.5187212, 40.88333, 99.999998, 4.579e-05, 10.3580447}},
    {{-1.43573, 1.19052066, 0.25455841}, {9.70703681, 0.00037357, 6e-08, 9.9527277, 12.7977739}}};

/* Xiong et al., Nature 575 (2019) 147: coefficients in GeV2, refitted to its 71 published points
 * (chi2 88 for 67 degrees of freedom, r = 0.8307 fm; the paper says 0.831 fm). */
static const ratio prad_ge = {{-0.0719}, {2.881}};

static double at(const ratio *of, double x)
{
    double up = 0.0, down = 0.0;
    for (int i = ORDER - 1; i >= 0; i--) {
        up = (up + of->a[i]) * x;
        down = (down + of->b[i]) * x;
    }
    return (1.0 + up) / (1.0 + down);
}

/* Kelly's G_Mn too is a fit in the tau of the proton. */
static double proton_tau(double q2)
{
    return q2 / (4.0 * BH_MASS_PROTON * BH_MASS_PROTON);
}

double bh_dipole(double q2)
{
    const double x = 1.0 + q2 * per_gev2 / 0.71;
    return 1.0 / (x * x);
}

static void dipole_proton(const bh_structure *structure, double q2, double value[BH_FACTORS_MOST])
{
    (void)structure;
    value[0] = bh_dipole(q2);
    value[1] = BH_MOMENT_PROTON * value[0];
}

static void dipole_neutron(const bh_structure *structure, double q2, double value[BH_FACTORS_MOST])
{
    (void)structure;
    value[0] = 0.0;
    value[1] = BH_MOMENT_NEUTRON * bh_dipole(q2);
}

static void rational(const bh_structure *structure, double q2, double value[BH_FACTORS_MOST])
{
    const rational_fit *fit = structure->fit;
    const double x = fit->x == X_TAU ? proton_tau(q2) : q2 * per_gev2;
    value[0] = at(&fit->ge, x);
    value[1] = BH_MOMENT_PROTON * at(&fit->gm, x);
}

void bh_kelly_proton(const bh_structure *structure, double q2, double value[BH_FACTORS_MOST])
{
    (void)structure;
    const double tau = proton_tau(q2);
    value[0] = at(&kelly.ge, tau);
    value[1] = BH_MOMENT_PROTON * at(&kelly.gm, tau);
}

void bh_kelly_neutron(const bh_structure *structure, double q2, double value[BH_FACTORS_MOST])
{
    (void)structure;
    const double tau = proton_tau(q2);
    value[0] = kelly_neutron_a * tau / (1.0 + kelly_neutron_b * tau) * bh_dipole(q2);
    value[1] = BH_MOMENT_NEUTRON * at(&kelly_neutron_gm, tau);
}

static void prad(const bh_structure *structure, double q2, double value[BH_FACTORS_MOST])
{
    bh_kelly_proton(structure, q2, value);
    value[0] = at(&prad_ge, q2 * per_gev2);
}

static bh_code prepare(bh_structure *structure, const rational_fit *fit)
{
    structure->kind = BH_FACTORS_NUCLEON;
    structure->fit = fit;
    structure->evaluate = rational;
    return BH_OK;
}

bh_code bh_prepare_dipole(bh_structure *structure, int set, bh_error *err)
{
    (void)set;
    (void)err;
    structure->kind = BH_FACTORS_NUCLEON;
    structure->evaluate = structure->z ? dipole_proton : dipole_neutron;
    return BH_OK;
}

bh_code bh_prepare_kelly(bh_structure *structure, int set, bh_error *err)
{
    (void)set;
    (void)err;
    structure->kind = BH_FACTORS_NUCLEON;
    structure->evaluate = structure->z ? bh_kelly_proton : bh_kelly_neutron;
    return BH_OK;
}

bh_code bh_prepare_arrington(bh_structure *structure, int set, bh_error *err)
{
    (void)set;
    (void)err;
    return prepare(structure, &arrington);
}

bh_code bh_prepare_amt(bh_structure *structure, int set, bh_error *err)
{
    (void)set;
    (void)err;
    return prepare(structure, &amt);
}

bh_code bh_prepare_amt_effective(bh_structure *structure, int set, bh_error *err)
{
    (void)set;
    (void)err;
    return prepare(structure, &amt_effective);
}

bh_code bh_prepare_venkat(bh_structure *structure, int set, bh_error *err)
{
    (void)set;
    (void)err;
    return prepare(structure, &venkat);
}

bh_code bh_prepare_prad(bh_structure *structure, int set, bh_error *err)
{
    (void)set;
    (void)err;
    structure->kind = BH_FACTORS_NUCLEON;
    structure->evaluate = prad;
    bh_structure_remark(structure, "magnetic form factor of Kelly 2004");
    return BH_OK;
}
