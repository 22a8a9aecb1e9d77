/* neutron.c - fits of the electric form factor of the neutron alone. */
#include "beamhours/physics/form_factor.h"
#include "beamhours/units/constants.h"

static double neutron_tau(double q2)
{
    return q2 / (4.0 * BH_MASS_NEUTRON * BH_MASS_NEUTRON);
}

/* Galster et al., Nucl. Phys. B 32 (1971) 221, eq. of its fit with eta = 5.6; GMn the dipole, as
 * there. */
static void galster(const bh_structure *structure, double q2, double value[BH_FACTORS_MOST])
{
    (void)structure;
    const double tau = neutron_tau(q2), dipole = bh_dipole(q2);
    value[0] = -BH_MOMENT_NEUTRON * tau / (1.0 + 5.6 * tau) * dipole;
    value[1] = BH_MOMENT_NEUTRON * dipole;
}

/* Attributed to Riordan et al., Phys. Rev. Lett. 105 (2010) 262302. */
static void riordan(const bh_structure *structure, double q2, double value[BH_FACTORS_MOST])
{
    bh_kelly_neutron(structure, q2, value);
    const double tau = neutron_tau(q2);
    const double up = tau * (1.52 + tau * (2.629 + tau * 3.055));
    const double down = 1.0 + tau * (5.222 + tau * (0.04 + tau * 11.438));
    value[0] = up / down * bh_dipole(q2);
}

bh_code bh_prepare_galster(bh_structure *structure, int set, bh_error *err)
{
    (void)set;
    (void)err;
    structure->kind = BH_FACTORS_NUCLEON;
    structure->evaluate = galster;
    bh_structure_remark(structure, "magnetic form factor: dipole");
    return BH_OK;
}

bh_code bh_prepare_riordan(bh_structure *structure, int set, bh_error *err)
{
    (void)set;
    (void)err;
    structure->kind = BH_FACTORS_NUCLEON;
    structure->evaluate = riordan;
    bh_structure_remark(structure, "magnetic form factor of Kelly 2004");
    return BH_OK;
}
