/* point.c - no structure: a Dirac particle, or a point charge. */
#include "beamhours/physics/form_factor.h"

static void dirac(const bh_structure *structure, double q2, double value[BH_FACTORS_MOST])
{
    (void)q2;
    value[0] = value[1] = structure->z;
}

static void charge(const bh_structure *structure, double q2, double value[BH_FACTORS_MOST])
{
    (void)structure;
    (void)q2;
    value[0] = 1.0;
}

bh_code bh_prepare_point(bh_structure *structure, int set, bh_error *err)
{
    (void)set;
    (void)err;
    if (structure->a == 1) {
        structure->kind = BH_FACTORS_NUCLEON;
        structure->evaluate = dirac;
        bh_structure_remark(structure, "a Dirac particle, without anomalous magnetic moment");
        return BH_OK;
    }
    structure->kind = BH_FACTORS_CHARGE;
    structure->evaluate = charge;
    bh_structure_remark(structure, "a point charge without spin");
    return BH_OK;
}
