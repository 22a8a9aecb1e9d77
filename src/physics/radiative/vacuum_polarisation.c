/* vacuum_polarisation.c - loops of leptons exactly, of hadrons by a fit to data. */
#include "beamhours/physics/vacuum_polarisation.h"

#include <math.h>
#include <stddef.h>

#include "beamhours/units/constants.h"

#define SERIES_BELOW 0.1 /* q2/m^2: there the closed form has lost as many digits as terms left */

double bh_vacuum_lepton(double mass, double q2)
{
    static const double inverse[] = {30.0,     280.0,     1890.0,    11088.0,   60060.0,
                                     308880.0, 1531530.0, 7390240.0, 34918884.0};
    const double y = q2 / (mass * mass);
    if (y < SERIES_BELOW) {
        double sum = 0.0;
        for (int i = (int)(sizeof inverse / sizeof inverse[0]) - 1; i >= 0; i--)
            sum = 1.0 / inverse[i] - y * sum;
        return 4.0 * BH_ALPHA / BH_PI * y * sum;
    }
    const double r = 1.0 / y, v = sqrt(1.0 + 4.0 * r), chi = 2.0 * asinh(0.5 * sqrt(y));
    return 2.0 * BH_ALPHA / (3.0 * BH_PI) * (4.0 * r - 5.0 / 3.0 + (1.0 - 2.0 * r) * v * chi);
}

double bh_vacuum_hadrons(double q2)
{
    static const struct {
        double below; /* [GeV2] */
        double a, b, c;
    } piece[] = {
        {0.7 * 0.7, 0.0, 0.0023092, 3.9925370},   {2.0 * 2.0, 0.0, 0.0022333, 4.2191779},
        {4.0 * 4.0, 0.0, 0.0024402, 3.2496684},   {10.0 * 10.0, 0.0, 0.0027340, 2.0995092},
        {91.2 * 91.2, 0.0010485, 0.0029431, 1.0}, {(double)INFINITY, 0.0012234, 0.0029237, 1.0},
    };
    const double s = 1e-6 * q2;
    size_t i = 0;
    while (i + 1 < sizeof piece / sizeof piece[0] && s >= piece[i].below)
        i++;
    return 2.0 * (piece[i].a + piece[i].b * log1p(piece[i].c * s));
}

double bh_vacuum(double q2)
{
    return bh_vacuum_lepton(BH_MASS_ELECTRON, q2) + bh_vacuum_lepton(BH_MASS_MUON, q2) +
           bh_vacuum_lepton(BH_MASS_TAU, q2) + bh_vacuum_hadrons(q2);
}
