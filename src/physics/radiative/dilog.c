/* dilog.c - the dilogarithm: mapped into -1 .. 1/2, where the Bernoulli series converges fast. */
#include "beamhours/physics/dilog.h"

#include <math.h>

#include "beamhours/units/constants.h"

#define ZETA2 (BH_PI * BH_PI / 6.0)

const double bh_gauss16_node[8] = {
    0.0950125098376374402, 0.281603550779258913, 0.458016777657227386, 0.617876244402643748,
    0.755404408355003034,  0.865631202387831744, 0.944575023073232576, 0.989400934991649933};
const double bh_gauss16_weight[8] = {
    0.189450610455068496, 0.182603415044923589,  0.169156519395002538,  0.149595988816576733,
    0.124628971255533872, 0.0951585116824927848, 0.0622535239386478929, 0.0271524594117540949};

/* -1 <= x <= 1/2; the coefficients are B(2k) / (2k + 1)!, and u = -ln(1 - x) stays below 0.7. */
static double series(double x)
{
    static const double c[] = {2.777777777777777778e-2,  -2.777777777777777778e-4,
                               4.724111866969009826e-6,  -9.185773074661963551e-8,
                               1.897886998897099907e-9,  -4.064761645144225527e-11,
                               8.921691020456452555e-13, -1.993929586072107569e-14};
    const double u = -log1p(-x), u2 = u * u;
    double sum = 0.0;
    for (int k = (int)(sizeof c / sizeof c[0]) - 1; k >= 0; k--)
        sum = sum * u2 + c[k];
    return u - 0.25 * u2 + u * u2 * sum;
}

double bh_dilog(double x)
{
    if (x < -1.0) {
        const double l = log(-x);
        return -ZETA2 - 0.5 * l * l - series(1.0 / x);
    }
    if (!(x > 0.5)) /* NaN too */
        return series(x);
    if (x < 1.0)
        return ZETA2 - log(x) * log1p(-x) - series(1.0 - x);
    if (x == 1.0)
        return ZETA2;
    if (x <= 2.0)
        return ZETA2 - log(x) * log(x - 1.0) - series(1.0 - x);
    const double l = log(x);
    return 2.0 * ZETA2 - 0.5 * l * l - series(1.0 / x);
}
