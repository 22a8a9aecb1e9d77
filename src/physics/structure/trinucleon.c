/* trinucleon.c - 3H and 3He as sums of Gaussians: Amroun et al., Nucl. Phys. A 579 (1994) 596. */
#include <math.h>

#include "beamhours/physics/form_factor.h"
#include "beamhours/units/constants.h"

enum { TERMS = 12 };

static const double width = 0.8; /* [fm] rms radius of each Gaussian: gamma = 0.8 sqrt(2/3) fm */

/* [fm] */
static const double radius[TERMS] = {0.1, 0.5, 0.9, 1.3, 1.6, 2.0, 2.4, 2.9, 3.4, 4.0, 4.6, 5.2};

typedef struct {
    double charge[TERMS], magnetic[TERMS];
    double moment; /* nuclear magnetons */
} trinucleon;

static const trinucleon triton = {{0.054706, 0.172505, 0.313852, 0.072056, 0.225333, 0.020849,
                                   0.097374, 0.022273, 0.011933, 0.009121},
                                  {0.075234, 0.164700, 0.273033, 0.037591, 0.252089, 0.027036,
                                   0.098445, 0.040160, 0.016696, 0.015077},
                                  BH_MOMENT_TRITON};
static const trinucleon helion = {{0.027614, 0.170847, 0.219805, 0.170486, 0.134453, 0.100953,
                                   0.074310, 0.053970, 0.023689, 0.017502, 0.002034, 0.004338},
                                  {0.059785, 0.138368, 0.281326, 0.000037, 0.289808, 0.019056,
                                   0.114825, 0.042296, 0.028345, 0.018312, 0.007843, 0.0},
                                  BH_MOMENT_HELION};

static void amroun(const bh_structure *structure, double q2, double value[BH_FACTORS_MOST])
{
    const double q = sqrt(q2) / BH_HBARC;
    value[0] = bh_gaussians_factor(&structure->shape[0], q);
    value[1] = bh_gaussians_factor(&structure->shape[1], q);
}

bh_code bh_prepare_amroun(bh_structure *structure, int set, bh_error *err)
{
    (void)set;
    (void)err;
    const trinucleon *of = structure->z == 1 ? &triton : &helion;
    structure->kind = BH_FACTORS_TRINUCLEON;
    structure->evaluate = amroun;
    structure->magnetic = of->moment * structure->mass / BH_MASS_PROTON;
    bh_gaussians_make(&structure->shape[0], &(bh_gaussians){width, TERMS, radius, of->charge});
    bh_gaussians_make(&structure->shape[1], &(bh_gaussians){width, TERMS, radius, of->magnetic});
    return BH_OK;
}
