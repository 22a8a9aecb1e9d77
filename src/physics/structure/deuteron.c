/* deuteron.c - the two parametrisations I and II of Abbott et al., Eur. Phys. J. A 7 (2000) 421. */
#include "beamhours/physics/form_factor.h"
#include "beamhours/units/constants.h"

enum { ORDER = 5, POLES = 4 };

/* g0 (1 - Q2/Q0^2) / (1 + a1 Q2 + a2 Q2^2 + ...), Q in 1/fm */
typedef struct {
    double g0, node, a[ORDER];
} form_i;

static const form_i charge = {1.0, 4.21, {0.674, 0.02246, 0.009806, -0.0002709, 3.793e-06}};
static const form_i magnetic = {1.714, 7.37, {0.5804, 0.08701, -0.003624, 0.0003448, -2.818e-06}};
static const form_i quadrupole = {25.83, 8.1, {0.8796, -0.05656, 0.01933, -0.0006734, 9.438e-06}};

/* Sum of residue / (pole + Q2), Q in 1/fm */
typedef struct {
    double residue[POLES], pole[POLES];
} poles;

static const poles helicity_0 = {{1.57057, 12.23792, -42.04576, 27.92014},
                                 {1.52501, 8.75139, 15.97777, 23.20415}};
static const poles helicity_1 = {{0.07043, 0.14443, -0.27343, 0.05856},
                                 {43.67795, 30.05435, 16.43075, 2.80716}};
static const poles helicity_2 = {{-0.16577, 0.27557, -0.05382, -0.05598},
                                 {1.87055, 14.95683, 28.04312, 41.1294}};
static const double delta = 0.89852; /* [GeV] */

static const double per_fm2 = 1.0 / (BH_HBARC * BH_HBARC); /* 1/fm^2 for each MeV^2 */

static double rational(const form_i *of, double q2)
{
    double down = 0.0;
    for (int i = ORDER - 1; i >= 0; i--)
        down = (down + of->a[i]) * q2;
    return of->g0 * (1.0 - q2 / (of->node * of->node)) / (1.0 + down);
}

static void abbott_i(const bh_structure *structure, double q2, double value[BH_FACTORS_MOST])
{
    (void)structure;
    const double x = q2 * per_fm2;
    value[0] = rational(&charge, x);
    value[1] = rational(&magnetic, x);
    value[2] = rational(&quadrupole, x);
}

static double sum(const poles *of, double q2)
{
    double total = 0.0;
    for (int i = 0; i < POLES; i++)
        total += of->residue[i] / (of->pole[i] + q2);
    return total;
}

/* The published g1 = Q sum, g2 = Q2 sum are divided by roots and powers of eta = Q2/4M^2; written
 * with the sums alone nothing is 0/0 at Q = 0.  root2m is sqrt(2) M in 1/fm. */
static void abbott_ii(const bh_structure *structure, double q2, double value[BH_FACTORS_MOST])
{
    const double x = q2 * per_fm2, mass2 = structure->mass * structure->mass;
    const double eta = q2 / (4.0 * mass2), root2m = structure->shape[0].number[0];
    const double dipole = 1.0 + q2 * 1e-6 / (4.0 * delta * delta), dipole2 = dipole * dipole;
    const double front = 1.0 / (dipole2 * dipole2 * (1.0 + 2.0 * eta));
    const double g0 = sum(&helicity_0, x), g2 = x * sum(&helicity_2, x);
    const double g1_over = root2m * sum(&helicity_1, x);                /* g1 / sqrt(2 eta) */
    const double g2_over = 2.0 * root2m * root2m * sum(&helicity_2, x); /* g2 / eta */
    value[0] = front * ((1.0 - 2.0 / 3.0 * eta) * g0 + 16.0 / 3.0 * eta * g1_over +
                        2.0 / 3.0 * (2.0 * eta - 1.0) * g2);
    value[1] = front * (2.0 * g0 + 2.0 * (2.0 * eta - 1.0) * g1_over - 2.0 * g2);
    value[2] = front * (-g0 + 2.0 * g1_over - g2 - g2_over);
}

bh_code bh_prepare_abbott_i(bh_structure *structure, int set, bh_error *err)
{
    (void)set;
    (void)err;
    structure->kind = BH_FACTORS_MOMENTS;
    structure->evaluate = abbott_i;
    return BH_OK;
}

bh_code bh_prepare_abbott_ii(bh_structure *structure, int set, bh_error *err)
{
    (void)set;
    (void)err;
    structure->kind = BH_FACTORS_MOMENTS;
    structure->evaluate = abbott_ii;
    structure->shape[0].number[0] = 1.41421356237309504880 * structure->mass / BH_HBARC;
    return BH_OK;
}
