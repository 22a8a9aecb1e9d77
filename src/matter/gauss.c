/* gauss.c - Gauss and Legendre's rule of sixteen points. */
#include "beamhours/matter/gauss.h"

/* The positive half; Abramowitz and Stegun, table 25.4. */
static const double node[8] = {0.09501250983763744, 0.28160355077925891, 0.45801677765722739,
                               0.61787624440264375, 0.75540440835500303, 0.86563120238783174,
                               0.94457502307323258, 0.98940093499164993};
static const double weight[8] = {0.18945061045506850, 0.18260341504492359, 0.16915651939500254,
                                 0.14959598881657673, 0.12462897125553387, 0.09515851168249278,
                                 0.06225352393864789, 0.02715245941175409};

double bh_gauss(bh_gauss_function *function, const void *context, bh_gauss_limits over)
{
    const double middle = 0.5 * (over.from + over.to);
    const double half = 0.5 * (over.to - over.from);
    double sum = 0.0;
    for (int i = 0; i < 8; i++)
        sum += weight[i] * (function(context, middle - half * node[i]) +
                            function(context, middle + half * node[i]));
    return half * sum;
}
