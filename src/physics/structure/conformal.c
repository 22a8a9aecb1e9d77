/* conformal.c - nucleon form factors fitted by a polynomial in the conformal variable z.
 *
 * Ye, Arrington, Hill, Lee, Phys. Lett. B 777 (2018) 8 and its supplement: the form factors and
 * the parametrised uncertainties. */
#include <math.h>

#include "beamhours/physics/form_factor.h"
#include "beamhours/units/constants.h"

enum { ORDER = 13, MIDDLE = 15 };

/* log10 of the uncertainty over |G(0)| x dipole, as a function of log10 of Q2 / GeV2 */
typedef struct {
    double low[2], middle[MIDDLE], high[3];
} band;

typedef struct {
    double c[ORDER];
    double scale; /* G(0): 1 for GEn */
    band error;
} series;

/* clang-format off */
static const series form_factors[2][2] = {
    {
        {{0.048919981379, -0.064525053912, -0.240825897382, 0.392108744873, 0.300445258602,
           -0.661888687179, -0.175639769687, 0.624691724461, -0.077684299367, -0.236003975259,
           0.09040197347, 0.0, 0.0},
         1.0,
         {{-2.02311829, 1.00066282},
          {-2.07194073, 1.13809127, 1.01431277, -0.31330138, -0.273293676,
           0.257350595, -0.206042113, -0.168497332, 0.137784515, 0.0757591964,
           -0.0267511301, -0.0172573088, 0.0007035815, 0.00147962095, 0.000197375221},
          {0.4553596, 1.95063341, 0.32421279}}},
        {{0.257758326959, -1.079540642058, 1.182183812195, 0.711015085833, -1.348080936796,
           -1.662444025208, 2.624354426029, 1.751234494568, -4.922300878888, 3.197892727312,
           -0.712072389946, 0.0, 0.0},
         BH_MOMENT_NEUTRON,
         {{-0.20765505, 0.99767103},
          {-2.06920873, 0.06431564, -0.355593786, 0.41489766, 1.95746824,
           0.2705257, -1.52685784, -0.443527359, 0.516884065, 0.207915837,
           -0.0748665703, -0.0425411431, 0.00154965016, 0.00325322279, 0.000420819518},
          {0.50859057, 1.96863291, 0.2321395}}},
    },
    {
        {{0.239163298067, -1.10985857441, 1.44438081306, 0.479569465603, -2.28689474187,
           1.12663298498, 1.25061984354, -3.63102047159, 4.08221702379, 0.504097346499,
           -5.08512046051, 3.96774254395, -0.981529071103},
         1.0,
         {{-0.97775297, 0.99685273},
          {-1.97750308, -0.446566998, 0.294508717, 1.54467525, 0.905268347,
           -0.600008111, -1.10732394, -0.0985982716, 0.463035988, 0.137729116,
           -0.0782991627, -0.0363056932, 0.00264219326, 0.00313261383, 0.000389593858},
          {0.78584754, 1.89052183, -0.4104746}}},
        {{0.264142994136, -1.09530612212, 1.21855378178, 0.661136493537, -1.40567892503,
           -1.35641843888, 1.44702915534, 4.2356697359, -5.33404565341, -2.91630052096,
           8.70740306757, -5.70699994375, 1.28081437589},
         BH_MOMENT_PROTON,
         {{-0.68452707, 0.99709151},
          {-1.76549673, 0.167218457, -1.20542733, -0.472244127, 1.41548871,
           0.661320779, -0.816422909, -0.373804477, 0.262223992, 0.128886639,
           -0.039090151, -0.0244995181, 0.000834270064, 0.00188226433, 0.000243073327},
          {0.80374002, 1.98005828, -0.69700928}}},
    },
};
/* clang-format on */

static const double per_gev2 = 1e-6;               /* GeV2 for each MeV^2 */
static const double cut = 4.0 * 0.13957 * 0.13957; /* [GeV2] two-pion threshold */
static const double centre = 0.7;                  /* [GeV2] -t where z = 0 */

static double polynomial(const double *c, int n, double x)
{
    double sum = 0.0;
    while (n-- > 0)
        sum = sum * x + c[n];
    return sum;
}

static void ye(const bh_structure *structure, double q2, double value[BH_FACTORS_MOST])
{
    const series *fit = structure->fit;
    const double near = sqrt(cut + q2 * per_gev2), far = sqrt(cut + centre);
    const double z = (near - far) / (near + far);
    value[0] = fit[0].scale * polynomial(fit[0].c, ORDER, z);
    value[1] = fit[1].scale * polynomial(fit[1].c, ORDER, z);
}

/* The three pieces of the published band meet at 1e-3 and 100 GeV2. */
static double log_error(const band *of, double gev2)
{
    const double x = log10(gev2);
    if (gev2 < 1e-3)
        return of->low[0] + of->low[1] * x;
    if (gev2 <= 100.0)
        return polynomial(of->middle, MIDDLE, x);
    return of->high[0] * sqrt(x - of->high[1]) + of->high[2];
}

static void ye_spread(const bh_structure *structure, double q2, double sigma[BH_FACTORS_MOST])
{
    const series *fit = structure->fit;
    const double dipole = bh_dipole(q2);
    for (int i = 0; i < 2; i++) {
        sigma[i] = 0.0;
        if (q2 > 0.0)
            sigma[i] =
                fabs(fit[i].scale) * dipole * pow(10.0, log_error(&fit[i].error, q2 * per_gev2));
    }
}

bh_code bh_prepare_ye(bh_structure *structure, int set, bh_error *err)
{
    (void)set;
    (void)err;
    structure->kind = BH_FACTORS_NUCLEON;
    structure->fit = form_factors[structure->z];
    structure->evaluate = ye;
    structure->spread = ye_spread;
    return BH_OK;
}
