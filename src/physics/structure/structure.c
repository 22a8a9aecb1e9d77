/* structure.c - structure models by name, made ready for a nucleus, and evaluated. */
#include "beamhours/physics/structure.h"

#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/base/nearest.h"
#include "beamhours/base/sentences.h"
#include "beamhours/physics/form_factor.h"
#include "beamhours/units/constants.h"
#include "beamhours/units/nuclide.h"

enum { MODELS_MOST = 64 };

void bh_structure_remark(bh_structure *structure, const char *sentence)
{
    const size_t used = strlen(structure->note);
    (void)snprintf(structure->note + used, sizeof structure->note - used, "%s%s", used ? "; " : "",
                   sentence);
}

const bh_structure_model *bh_structure_model_at(int i)
{
    const bh_form_factor *row = bh_form_factor_at(i);
    return row ? &row->model : NULL;
}

int bh_structure_sets(const bh_structure_model *model, int z, int a)
{
    const bh_form_factor *row = bh_form_factor_find(model->name, strlen(model->name));
    return row ? row->sets(z, a) : 0;
}

const char *bh_structure_suggest(const char *name)
{
    const char *words[MODELS_MOST] = {"default"};
    size_t count = 1;
    const bh_structure_model *model;
    for (int i = 0; count < MODELS_MOST && (model = bh_structure_model_at(i)) != NULL; i++)
        words[count++] = model->name;
    return bh_nearest(name, words, count);
}

/* Writes the names of all models that can describe z, a. */
static void list_fitting(int z, int a, char *out, size_t size)
{
    const bh_form_factor *row;
    size_t used = 0;
    out[0] = '\0';
    for (int i = 0; (row = bh_form_factor_at(i)) != NULL && used < size; i++)
        if (row->sets(z, a) > 0)
            used += (size_t)snprintf(out + used, size - used, "%s%s", used ? ", " : "",
                                     row->model.name);
}

static bh_code refuse_name(const char *name, bh_error *err)
{
    const char *near = bh_structure_suggest(name);
    return bh_fail(err, BH_EPLAN, BH_SAY_STRUCTURE_UNKNOWN, name, near ? near : "default");
}

static bh_code refuse_nucleus(const char *name, const bh_structure *of, bh_error *err)
{
    char nucleus[8], fitting[400];
    list_fitting(of->z, of->a, fitting, sizeof fitting);
    return bh_fail(err, BH_EPLAN, BH_SAY_STRUCTURE_NUCLEUS, name,
                   bh_nuclide_name(of->z, of->a, nucleus), fitting);
}

/* "fourier-bessel/2" -> its row, 2; refused where there is no such row, nucleus or set. */
static bh_code choose(const char *name, const bh_structure *of, const bh_form_factor **row,
                      int *set, bh_error *err)
{
    if (!name || strcmp(name, "default") == 0) {
        *row = bh_form_factor_default(of->z, of->a, set);
        return BH_OK;
    }
    const size_t length = strcspn(name, "/");
    const char *suffix = name + length;
    *row = bh_form_factor_find(name, length);
    *set = 1;
    if (!*row)
        return refuse_name(name, err);
    if (*suffix) {
        if (strspn(suffix + 1, "0123456789") != strlen(suffix + 1) || strlen(suffix) > 4)
            return refuse_name(name, err);
        *set = atoi(suffix + 1); /* NOLINT(cert-err34-c): at most three digits */
    }
    const int sets = (*row)->sets(of->z, of->a);
    if (sets == 0)
        return refuse_nucleus(name, of, err);
    if (*set < 1 || *set > sets) {
        char nucleus[8];
        return bh_fail(err, BH_EPLAN, BH_SAY_STRUCTURE_SET, name, (*row)->model.name,
                       bh_nuclide_name(of->z, of->a, nucleus), sets);
    }
    return BH_OK;
}

static double mass_of(int z, int a)
{
    const bh_nuclide *nuclide = bh_nuclide_find(z, a);
    return nuclide ? nuclide->mass : a * BH_MASS_U - z * BH_MASS_ELECTRON;
}

/* 6 (1 - F) / q^2 at a small q [1/fm]. */
static double slope(const bh_structure *structure, double q2)
{
    double value[BH_FACTORS_MOST], zero[BH_FACTORS_MOST];
    structure->evaluate(structure, q2 * BH_HBARC * BH_HBARC, value);
    structure->evaluate(structure, 0.0, zero);
    return 6.0 * (1.0 - value[0] / zero[0]) / q2;
}

/* The charge radius from the slope at three small momenta, extrapolated to none; good to 1e-6. */
static double charge_radius(const bh_structure *structure)
{
    if (structure->z == 0)
        return 0.0;
    bool measured;
    const double size = bh_density_radius(structure->z, structure->a, &measured);
    const double h = 0.01 / (size * size);
    const double s1 = slope(structure, h), s2 = slope(structure, 2.0 * h),
                 s4 = slope(structure, 4.0 * h);
    const double square = (8.0 * s1 - 6.0 * s2 + s4) / 3.0;
    return square > 0.0 ? sqrt(square) : 0.0;
}

bh_structure *bh_structure_new(const char *name, int z, int a, bh_error *err)
{
    if (!(a >= 1 && z >= 0 && z <= a && (z > 0 || a == 1))) {
        (void)bh_fail(err, BH_EDOMAIN, "Z = %d, A = %d is no nucleus", z, a);
        return NULL;
    }
    bh_structure *structure = calloc(1, sizeof *structure);
    if (!structure) {
        (void)bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
        return NULL;
    }
    const bh_form_factor *row = NULL;
    int set = 1;
    structure->z = z;
    structure->a = a;
    structure->mass = mass_of(z, a);
    if (choose(name, structure, &row, &set, err) != BH_OK) {
        free(structure);
        return NULL;
    }
    structure->row = &row->model;
    structure->lowest = row->model.q2_min;
    structure->highest = row->model.q2_max;
    (void)snprintf(structure->source, sizeof structure->source, "%s", row->model.source);
    (void)snprintf(structure->name, sizeof structure->name, set > 1 ? "%s/%d" : "%s",
                   row->model.name, set);
    if (row->prepare(structure, set, err) != BH_OK) {
        free(structure);
        return NULL;
    }
    structure->radius = charge_radius(structure);
    return structure;
}

void bh_structure_free(bh_structure *structure)
{
    free(structure);
}

/* What stands in the place of GE^2 and GM^2, from the factors of this kind of nucleus. */
static void combine(const bh_structure *structure, double q2, const double *value, double *squares)
{
    const double tau = q2 / (4.0 * structure->mass * structure->mass);
    const double z = structure->z;
    double ge = value[0], gm = 0.0;
    switch (structure->kind) {
    case BH_FACTORS_NUCLEON:
        gm = value[1];
        break;
    case BH_FACTORS_TRINUCLEON:
        ge = z * value[0];
        gm = structure->magnetic * value[1];
        break;
    case BH_FACTORS_CHARGE:
        squares[0] = (1.0 + tau) * z * z * ge * ge;
        squares[1] = 0.0;
        return;
    case BH_FACTORS_MOMENTS:
        squares[0] = (1.0 + tau) * (ge * ge + 8.0 / 9.0 * tau * tau * value[2] * value[2]);
        squares[1] = 2.0 / 3.0 * (1.0 + tau) * value[1] * value[1];
        return;
    }
    squares[0] = ge * ge;
    squares[1] = gm * gm;
}

void bh_structure_eval(const bh_structure *structure, size_t n, const double *q2, double *ge2,
                       double *gm2)
{
    for (size_t i = 0; i < n; i++) {
        double value[BH_FACTORS_MOST] = {0}, squares[2];
        structure->evaluate(structure, q2[i], value);
        combine(structure, q2[i], value, squares);
        ge2[i] = squares[0];
        gm2[i] = squares[1];
    }
}

double bh_structure_uncertainty(const bh_structure *structure, double q2)
{
    if (!structure->spread)
        return -1.0;
    double value[BH_FACTORS_MOST] = {0}, sigma[BH_FACTORS_MOST] = {0};
    structure->evaluate(structure, q2, value);
    structure->spread(structure, q2, sigma);
    const double tau = q2 / (4.0 * structure->mass * structure->mass);
    const double magnetic = 2.0 * fabs(sigma[1] / value[1]);
    const double sum = value[0] * value[0] + tau * value[1] * value[1];
    const double forward =
        sum > 0.0 ? 2.0 * hypot(value[0] * sigma[0], tau * value[1] * sigma[1]) / sum : 0.0;
    return fmax(magnetic, forward);
}

const bh_structure_model *bh_structure_row(const bh_structure *structure)
{
    return structure->row;
}

const char *bh_structure_name(const bh_structure *structure)
{
    return structure->name;
}

const char *bh_structure_source(const bh_structure *structure)
{
    return structure->source;
}

const char *bh_structure_note(const bh_structure *structure)
{
    return structure->note;
}

bool bh_structure_flagged(const bh_structure *structure)
{
    return structure->flagged;
}

void bh_structure_range(const bh_structure *structure, double *lo, double *hi)
{
    *lo = structure->lowest;
    *hi = structure->highest;
}

double bh_structure_radius(const bh_structure *structure)
{
    return structure->radius;
}

int bh_structure_factors(const bh_structure *structure, double q2, int room, const char **names,
                         double *values)
{
    static const char *const name[][BH_FACTORS_MOST] = {
        [BH_FACTORS_NUCLEON] = {"GE", "GM", NULL},
        [BH_FACTORS_CHARGE] = {"F", NULL, NULL},
        [BH_FACTORS_MOMENTS] = {"GC", "GM", "GQ"},
        [BH_FACTORS_TRINUCLEON] = {"F_ch", "F_m", NULL},
    };
    double value[BH_FACTORS_MOST] = {0};
    structure->evaluate(structure, q2, value);
    int count = 0;
    for (int i = 0; i < BH_FACTORS_MOST && name[structure->kind][i] && count < room; i++) {
        names[count] = name[structure->kind][i];
        values[count++] = value[i];
    }
    return count;
}
