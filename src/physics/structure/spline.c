/* spline.c - the spline fit of the proton by the A1 collaboration, from its table. */
#include <math.h>

#include "beamhours/physics/form_factor.h"
#include "beamhours/units/constants.h"

static const double edge = 999.0; /* [MeV/c] last row of the table */

/* A form factor over the dipole in row i; the table is even in Q. */
static double row(int i, int column)
{
    const int at = i < 0 ? -i : i;
    return bh_a1_spline[at][column] / bh_dipole((double)at * at);
}

/* Cubic through the four nearest rows: the ratio to the dipole changes by 1e-3 a row at most. */
static double ratio(double q, int column)
{
    int first = (int)q - 1;
    if (first > BH_A1_ROWS - 4)
        first = BH_A1_ROWS - 4;
    const double x = q - first;
    const double a = x, b = x - 1.0, c = x - 2.0, d = x - 3.0;
    return b * c * d / -6.0 * row(first, column) + a * c * d / 2.0 * row(first + 1, column) +
           a * b * d / -2.0 * row(first + 2, column) + a * b * c / 6.0 * row(first + 3, column);
}

/* Past the table the ratio to the dipole stays as it was in the last row. */
static void spline(const bh_structure *structure, double q2, double value[BH_FACTORS_MOST])
{
    (void)structure;
    const double q = fmin(sqrt(q2), edge), dipole = bh_dipole(q2);
    value[0] = ratio(q, 0) * dipole;
    value[1] = BH_MOMENT_PROTON * ratio(q, 1) * dipole;
}

static void spread(const bh_structure *structure, double q2, double sigma[BH_FACTORS_MOST])
{
    (void)structure;
    const double q = fmin(sqrt(q2), edge), dipole = bh_dipole(q2);
    sigma[0] = ratio(q, 2) * dipole;
    sigma[1] = BH_MOMENT_PROTON * ratio(q, 3) * dipole;
}

bh_code bh_prepare_a1(bh_structure *structure, int set, bh_error *err)
{
    (void)set;
    (void)err;
    structure->kind = BH_FACTORS_NUCLEON;
    structure->evaluate = spline;
    structure->spread = spread;
    return BH_OK;
}
