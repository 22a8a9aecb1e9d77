/* test_kinematics_checks.c - elastic events and cross sections, each quantity against a computation
 * of its own in 30 digits: kinematics_checks.csv. */
#include "../suite.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/physics/one_photon.h"
#include "beamhours/physics/structure.h"
#include "beamhours/units/constants.h"

#define ROWS "tests/physics/kinematics_checks.csv"

typedef struct {
    double mass, target, beam, degrees; /* MeV, deg */
    char given[16], quantity[64], unit[16], how[16];
    int charges;
    double value;
} check;

typedef struct {
    bh_collision in;
    bh_event event;
    int charges;
    double angle;
} collision;

static collision collide(const check *row)
{
    const double m = row->mass, b = row->beam;
    const bool momentum = strcmp(row->given, "momentum") == 0;
    collision x = {.in = {m, row->target, momentum ? b * b / (sqrt(b * b + m * m) + m) : b - m},
                   .charges = row->charges,
                   .angle = row->degrees * BH_DEGREE};
    bh_error err;
    ck_assert_msg(bh_kinematics_scattered(&x.in, x.angle, BH_BRANCH_FAST, &x.event, &err) == BH_OK,
                  "%s", err.text);
    return x;
}

static double tau_of(const collision *x)
{
    return x->event.q2 / (4.0 * x->in.target * x->in.target);
}

/* What the event alone gives, in the units of the file; NAN for what needs form factors. */
static double of_event(const collision *x, const char *quantity)
{
    const bh_event *e = &x->event;
    const bh_collision massless = {0.0, x->in.target, e->beam_energy};
    const struct {
        const char *name;
        double value;
    } known[] = {
        {"E", e->beam_energy * 1e-3},
        {"Eprime", (e->scattered_kinetic + x->in.mass) * 1e-3},
        {"Q2", e->q2 * 1e-6},
        {"tau", tau_of(x)},
        {"epsilon", e->epsilon},
        {"T_recoil", e->recoil_kinetic * 1e-3},
        {"p_recoil", e->recoil_momentum * 1e-3},
        {"theta_recoil", e->recoil_angle / BH_DEGREE},
        {"mott", bh_mott(&x->in, e, x->charges) * 1e3},
    };
    for (int i = 0; i < COUNT(known); i++)
        if (strcmp(known[i].name, quantity) == 0)
            return known[i].value;
    if (strcmp(quantity, "ratio_to_massless_same_E") != 0)
        return (double)NAN;
    bh_event light;
    bh_error err;
    ck_assert_int_eq(bh_kinematics_scattered(&massless, x->angle, BH_BRANCH_FAST, &light, &err),
                     BH_OK);
    bh_structure *fit = bh_structure_new("kelly-2004", 1, 1, &err);
    bh_vertex here, there;
    bh_structure_eval(fit, 1, &e->q2, &here.ge2, &here.gm2);
    bh_structure_eval(fit, 1, &light.q2, &there.ge2, &there.gm2);
    bh_structure_free(fit);
    const bh_vertex lepton = {1.0, 1.0};
    return bh_one_photon(&x->in, e, lepton, here) / bh_one_photon(&massless, &light, lepton, there);
}

/* "sigma_kelly-2004", "GE_dipole", "A_abbott-2000-i". */
static double of_structure(const collision *x, const char *quantity)
{
    const char *name = strchr(quantity, '_') + 1;
    const int a = x->in.target > 1000.0 ? 2 : 1;
    const double q2 = x->event.q2, tau = tau_of(x);
    bh_error err;
    bh_structure *fit = bh_structure_new(name, 1, a, &err);
    ck_assert_msg(fit != NULL, "%s: %s", quantity, err.text);
    bh_vertex vertex;
    const char *names[4];
    double values[4], got = (double)NAN;
    bh_structure_eval(fit, 1, &q2, &vertex.ge2, &vertex.gm2);
    const int n = bh_structure_factors(fit, q2, 4, names, values);
    for (int i = 0; i < n; i++)
        if (strncmp(names[i], quantity, 2) == 0)
            got = values[i];
    if (quantity[0] == 's')
        got = 1e3 * bh_one_photon(&x->in, &x->event, (bh_vertex){1.0, 1.0}, vertex);
    else if (quantity[0] == 'A')
        got = (vertex.ge2 + tau * vertex.gm2) / (1.0 + tau);
    else if (quantity[0] == 'B')
        got = 2.0 * tau * vertex.gm2;
    bh_structure_free(fit);
    return got;
}

/* Digits of the file: 12; theta_recoil and cancelling zeros of form factors lose one or two. */
START_TEST(every_row)
{
    FILE *file = fopen(ROWS, "r");
    ck_assert_msg(file != NULL, "run from the top of the tree: " ROWS);
    char line[256];
    int rows = 0;
    while (fgets(line, sizeof line, file)) {
        check row;
        if (sscanf(line, "%lf,%lf,%15[^,],%lf,%lf,%d,%63[^,],%lf,%15[^,],%15s", &row.mass,
                   &row.target, row.given, &row.beam, &row.degrees, &row.charges, row.quantity,
                   &row.value, row.unit, row.how) != 10)
            continue;
        const collision x = collide(&row);
        double got = of_event(&x, row.quantity);
        if (isnan(got))
            got = of_structure(&x, row.quantity);
        ck_assert_msg(fabs(got / row.value - 1.0) < 2e-11, "%s%s: got %.13g (%s)", line,
                      row.quantity, got,
                      strcmp(row.how, "spinor") == 0 ? "explicit Dirac spinor sum"
                                                     : "closed form at 30 digits");
        rows++;
    }
    (void)fclose(file);
    ck_assert_int_eq(rows, 148);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("kinematics checks");
    tcase_add_test(tests, every_row);
    return run_suite("physics/kinematics_checks", tests);
}
