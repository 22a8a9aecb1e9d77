/* test_radiative_rows.c - radiative corrections, soft photons, loops and tails against published
 * and independently computed values, row by row. */
#include "../suite.h"

#include <math.h>
#include <stdbool.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/physics/radiative.h"
#include "beamhours/physics/radiative_tail.h"
#include "beamhours/physics/soft_photons.h"
#include "beamhours/physics/vacuum_polarisation.h"
#include "beamhours/units/constants.h"

#define ROWS "tests/physics/radiative_rows.csv"

/* One row, and the event that belongs to it. */
typedef struct {
    char id[8], beam[12], quantity[40], source[160];
    double energy, degrees, cut, target;
    double value, reference, difference, tolerance;
    bh_particle particle;
    bh_event event;
    bh_soft soft;
} line;

/* The next field of a line without quotes; empty ones count. */
static char *field(char **rest)
{
    char *start = *rest, *comma = strpbrk(start, ",\n");
    *rest = comma ? comma + 1 : start + strlen(start);
    if (comma)
        *comma = '\0';
    return start;
}

static double number(char **rest)
{
    const char *text = field(rest);
    return *text ? strtod(text, NULL) : (double)NAN;
}

static void read_line(char *text, line *out)
{
    char *rest = text;
    (void)snprintf(out->id, sizeof out->id, "%s", field(&rest));
    (void)snprintf(out->beam, sizeof out->beam, "%s", field(&rest));
    out->energy = number(&rest);
    out->degrees = number(&rest);
    out->cut = number(&rest);
    out->target = number(&rest);
    (void)snprintf(out->quantity, sizeof out->quantity, "%s", field(&rest));
    out->value = number(&rest);
    out->reference = number(&rest);
    out->difference = number(&rest);
    out->tolerance = number(&rest);
    (void)snprintf(out->source, sizeof out->source, "%s", field(&rest));
}

/* Kinematics massless except in the muon's rows, as those who computed the rows had them. */
static void prepare(line *x)
{
    ck_assert(bh_particle_find(x->beam, &x->particle));
    const double m = x->id[0] == 'M' ? x->particle.mass : 0.0;
    const bh_collision in = {m, x->target, x->energy - m};
    bh_error err = {0};
    ck_assert_msg(bh_kinematics_scattered(&in, x->degrees * BH_DEGREE, BH_BRANCH_FAST, &x->event,
                                          &err) == BH_OK,
                  "%s: %s", x->id, err.text);
    x->soft = bh_soft_of(&in, &x->event, x->cut);
    x->soft.mass = x->particle.mass;
}

/* The same event with the mass kept. */
static bh_soft massive(const line *x)
{
    const bh_collision in = {x->particle.mass, x->target, x->energy - x->particle.mass};
    bh_event e;
    ck_assert(bh_kinematics_scattered(&in, x->degrees * BH_DEGREE, BH_BRANCH_FAST, &e, NULL) ==
              BH_OK);
    return bh_soft_of(&in, &e, x->cut);
}

static double electron_loop(const line *x)
{
    return bh_vacuum_lepton(BH_MASS_ELECTRON, x->event.q2);
}

/* published: all parts of a model, with the electron's loop alone */
static double total(const line *x, const char *model)
{
    const bh_encounter at = {&x->particle, x->particle.charge,           1,    1,
                             x->target,    x->energy - x->particle.mass, NULL, 0.0};
    const bh_collision in = {x->particle.mass, x->target, at.kinetic};
    bh_event e;
    ck_assert(bh_kinematics_scattered(&in, x->degrees * BH_DEGREE, BH_BRANCH_FAST, &e, NULL) ==
              BH_OK);
    const bh_radiative_parts p = bh_radiative_find(model)->parts(&at, x->cut, &e);
    return p.z0 + p.z1 + p.z2 + electron_loop(x);
}

/* as its sources have it, where the electron is light as well */
static double light_loop(const line *x)
{
    const double l = log(x->event.q2 / (x->soft.mass * x->soft.mass));
    return 2.0 * BH_ALPHA / BH_PI * (l / 3.0 - 5.0 / 9.0);
}

static double light_total(const line *x)
{
    return bh_soft_lepton_light(&x->soft) + light_loop(x) +
           x->particle.charge * bh_soft_interference_light(&x->soft) + bh_soft_target(&x->soft);
}

static double tail(const line *x,
                   void (*form)(const bh_encounter *, double, size_t, const double *, double *))
{
    bh_structure *dipole = bh_structure_new("dipole", 1, 1, NULL);
    ck_assert(dipole);
    const double m = x->particle.mass, kinetic = x->cut - m;
    const bh_encounter at = {&x->particle, -1, 1, 1, x->target, x->energy - m, dipole, 0.0};
    double out = -1.0;
    if (form)
        form(&at, x->degrees * BH_DEGREE, 1, &kinetic, &out);
    else
        out = bh_radiative_tail_hard(&at, x->degrees * BH_DEGREE, x->cut);
    bh_structure_free(dipole);
    return form ? 1e-4 * out : out; /* [ub] to [fm2] */
}

static double pauli(const line *x)
{
    const double r = 4.0 * x->particle.mass * x->particle.mass / x->event.q2, v = sqrt(1.0 + r);
    return BH_ALPHA / (4.0 * BH_PI) * r / v * log((v + 1.0) / (v - 1.0));
}

static double kinematic(const line *x, const char *q)
{
    if (strcmp(q, "scattered_energy") == 0)
        return x->soft.scattered_energy;
    if (strcmp(q, "q2") == 0)
        return x->event.q2;
    if (strcmp(q, "slope") == 0)
        return x->soft.slope;
    return (double)NAN;
}

static double loop(const line *x, const char *q)
{
    if (strcmp(q, "vacuum_e") == 0)
        return electron_loop(x);
    if (strcmp(q, "vacuum_mu") == 0)
        return bh_vacuum_lepton(BH_MASS_MUON, x->event.q2);
    if (strcmp(q, "vacuum_tau") == 0)
        return bh_vacuum_lepton(BH_MASS_TAU, x->event.q2);
    if (strcmp(q, "vacuum_had") == 0)
        return bh_vacuum_hadrons(x->event.q2);
    return bh_vacuum(x->event.q2) - electron_loop(x); /* mu, tau, hadrons */
}

static double light(const line *x, const char *q)
{
    if (strcmp(q, "light_z0") == 0)
        return bh_soft_lepton_light(&x->soft);
    if (strcmp(q, "light_z0_electron_loop") == 0)
        return bh_soft_lepton_light(&x->soft) + light_loop(x);
    if (strcmp(q, "mo_tsai_z0_electron_loop") == 0)
        return bh_soft_mo_tsai(&x->soft).lepton + light_loop(x);
    if (strcmp(q, "mo_tsai_z1") == 0)
        return x->particle.charge * bh_soft_mo_tsai(&x->soft).interference;
    if (strcmp(q, "mo_tsai_z2") == 0)
        return bh_soft_mo_tsai(&x->soft).target;
    return strncmp(q, "exp", 3) == 0 ? exp(light_total(x)) : light_total(x);
}

static double with_mass(const line *x, const char *q)
{
    const bh_soft in = massive(x);
    if (strcmp(q, "z0") == 0)
        return bh_soft_lepton(&in);
    if (strcmp(q, "z1") == 0)
        return x->particle.charge * bh_soft_interference(&in);
    if (strcmp(q, "z1_tsai") == 0)
        return x->particle.charge * bh_soft_interference_tsai(&in);
    if (strcmp(q, "z2") == 0)
        return bh_soft_target(&in);
    return 0.5 * bh_soft_rate(&in); /* half_rate */
}

static double computed(const line *x)
{
    const char *q = x->quantity;
    if (strcmp(q, "total_electron_loop") == 0)
        return total(x, "maximon-tjon");
    if (strcmp(q, "mo_tsai_total_electron_loop") == 0)
        return total(x, "mo-tsai");
    if (strncmp(q, "vacuum", 6) == 0)
        return loop(x, q);
    if (strncmp(q, "tail_p", 6) == 0)
        return tail(x, bh_radiative_tail_peaking);
    if (strncmp(q, "tail_e", 6) == 0)
        return tail(x, bh_radiative_tail_equivalent);
    if (strcmp(q, "hard") == 0)
        return tail(x, NULL);
    if (strcmp(q, "pauli") == 0)
        return pauli(x);
    if (q[0] == 'z' || q[0] == 'h')
        return with_mass(x, q);
    return isnan(kinematic(x, q)) ? light(x, q) : kinematic(x, q);
}

/* What a row allows: see the head of the file. */
static double allowed(const line *x)
{
    if (x->id[0] == 'P')
        return x->tolerance;
    const double relative = x->tolerance * fabs(x->value);
    if (strcmp(x->quantity, "half_rate") == 0) /* of a light electron */
        return relative + fabs(x->value) * 3.0 * x->soft.mass * x->soft.mass / x->event.q2;
    const bool light_form = x->id[0] == 'K' && isfinite(x->difference);
    return relative + (light_form ? 1.1 * fabs(x->difference) : 0.0);
}

static int rows_of(char kind)
{
    FILE *file = fopen(ROWS, "r");
    ck_assert_msg(file, "no %s", ROWS);
    char text[512];
    int n = 0;
    while (fgets(text, sizeof text, file)) {
        if (text[0] != kind)
            continue;
        line x = {0};
        read_line(text, &x);
        prepare(&x);
        const double got = computed(&x);
        ck_assert_msg(fabs(got - x.value) <= allowed(&x), "%s %s: %.10g, not %.10g +- %.2g (%s)",
                      x.id, x.quantity, got, x.value, allowed(&x), x.source);
        n++;
    }
    ck_assert(fclose(file) == 0);
    return n;
}

START_TEST(published)
{
    ck_assert_int_eq(rows_of('P'), 3 * 32 + 11);
}
END_TEST

START_TEST(electrons_of_negligible_mass)
{
    ck_assert_int_eq(rows_of('K'), 12 * 18);
}
END_TEST

START_TEST(muons)
{
    ck_assert_int_eq(rows_of('M'), 5 * 10);
}
END_TEST

START_TEST(tails)
{
    ck_assert_int_eq(rows_of('T'), 2 * 8);
}
END_TEST

/* The reference of a tail row is the exact tail, its difference the ratio of peaking to it. */
START_TEST(exact_tails)
{
    FILE *file = fopen(ROWS, "r");
    ck_assert(file);
    char text[512];
    int n = 0;
    while (fgets(text, sizeof text, file)) {
        line x = {0};
        if (text[0] != 'T')
            continue;
        read_line(text, &x);
        prepare(&x);
        const double got = tail(&x, bh_radiative_tail_exact);
        ck_assert_msg(fabs(computed(&x) / got - x.difference) < 1.5e-4,
                      "%s %s over exact: %.5f, not %.4f (%s)", x.id, x.quantity, computed(&x) / got,
                      x.difference, x.source);
        if (isnan(x.reference))
            continue;
        ck_assert_msg(fabs(got / x.reference - 1.0) < 1e-8, "%s exact: %.12g, not %.12g (%s)", x.id,
                      got, x.reference, x.source);
        n++;
    }
    ck_assert(fclose(file) == 0);
    ck_assert_int_eq(n, 8);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("rows");
    tcase_add_test(tests, published);
    tcase_add_test(tests, electrons_of_negligible_mass);
    tcase_add_test(tests, muons);
    tcase_add_test(tests, tails);
    tcase_add_test(tests, exact_tails);
    return run_suite("radiative_rows", tests);
}
