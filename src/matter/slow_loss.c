/* slow_loss.c - published stopping powers, for any material. */
#include "beamhours/matter/slow_loss.h"

#include <math.h>
#include <string.h>

#include "beamhours/matter/heavy_loss.h"
#include "beamhours/matter/stopping_tables.h"
#include "beamhours/units/constants.h"
#include "beamhours/units/nuclide.h"

#define SLOW_FIT 0.5 /* MeV, where the fit to slow protons ends */
#define SPLINE_TOP                                                                \
    20.0 /* MeV, last knot of the proton spline: beyond the join, so smooth there \
          */

/* A printed table seen as one: `values` row by row. */
typedef struct {
    const int *columns;
    int count;
    const double *values;
} table;

static const table protons = {bh_proton_stopping_column, BH_PROTON_COLUMNS,
                              &bh_proton_stopping[0][0]};
static const table alphas = {bh_alpha_stopping_column, BH_ALPHA_COLUMNS, &bh_alpha_stopping[0][0]};

/* Compounds with a column of their own: atoms, and the I [MeV] that belongs to the column. */
static const struct {
    int code;
    double excitation;
    int z[4];
    double atoms[4];
} compounds[] = {
    {BH_STOPPING_AIR, 85.7e-6, {7, 8, 18, 6}, {0.78443, 0.21075, 0.00467, 0.00015}},
    {BH_STOPPING_WATER, 75.0e-6, {1, 8}, {2, 1}},
    {BH_STOPPING_POLYETHYLENE, 57.4e-6, {1, 6}, {2, 1}},
    {BH_STOPPING_MYLAR, 78.7e-6, {6, 1, 8}, {10, 8, 4}},
    {BH_STOPPING_KAPTON, 79.6e-6, {6, 1, 7, 8}, {22, 10, 2, 5}},
    {BH_STOPPING_SILICA, 139.2e-6, {8, 14}, {2, 1}},
    {BH_STOPPING_CSI, 553.1e-6, {53, 55}, {1, 1}},
};
enum { COMPOUNDS = sizeof compounds / sizeof compounds[0] };

static double share_of(const bh_medium *m, int z)
{
    for (size_t i = 0; i < m->count; i++)
        if (m->elements[i].z == z)
            return m->elements[i].per_atom;
    return 0.0;
}

/* The compound that the medium is, whatever its isotopes, or -1. */
static int compound_of(const bh_medium *m)
{
    for (int c = 0; c < COMPOUNDS; c++) {
        double all = 0.0;
        double off = 0.0;
        double covered = 0.0;
        for (int i = 0; i < 4; i++)
            all += compounds[c].atoms[i];
        for (int i = 0; i < 4 && compounds[c].z[i]; i++) {
            const double share = share_of(m, compounds[c].z[i]);
            covered += share;
            off = fmax(off, fabs(share - compounds[c].atoms[i] / all));
        }
        if (off < 2e-3 && covered > 0.998)
            return c;
    }
    return -1;
}

static int column_of(const table *t, int code)
{
    for (int i = 0; i < t->count; i++)
        if (t->columns[i] == code)
            return i;
    return -1;
}

/* [MeV cm2/mol] per mole of atoms of element z, in a column of z. */
static double tabulated(const table *t, int column, int row)
{
    return t->values[row * t->count + column] * bh_element_mass(t->columns[column]);
}

/* The elements with columns next to z, and how far z is from the lower to the upper. */
typedef struct {
    int low, high;
    double part;
} neighbours;

static neighbours neighbours_of(const table *t, int z)
{
    neighbours n = {-1, -1, 0.0};
    for (int i = 0; i < t->count; i++) {
        const int at = t->columns[i];
        if (at <= z && (n.low < 0 || at > t->columns[n.low]))
            n.low = i;
        if (at >= z && at <= 92 && (n.high < 0 || at < t->columns[n.high]))
            n.high = i;
    }
    if (n.low != n.high)
        n.part = (double)(z - t->columns[n.low]) / (t->columns[n.high] - t->columns[n.low]);
    return n;
}

/* Between the neighbours, per electron: good to some percent, as it has no shells. */
static double between(const table *t, int z, int row)
{
    const neighbours n = neighbours_of(t, z);
    const double low = tabulated(t, n.low, row) / t->columns[n.low];
    const double high = tabulated(t, n.high, row) / t->columns[n.high];
    return z * (low + n.part * (high - low));
}

/* ICRU 49's fit for protons up to SLOW_FIT [MeV], which has the shells. */
static double slow_fit(int z, double kinetic)
{
    const double *a = bh_proton_slow[z - 1];
    const double t = kinetic * 1e3; /* keV */
    double s;
    if (t < 10.0) {
        s = a[0] * sqrt(t);
    } else {
        const double low = a[1] * pow(t, 0.45);
        const double high = a[2] / t * log(1.0 + a[3] / t + a[4] * t);
        s = low * high / (low + high);
    }
    return s * 1e-21 * BH_AVOGADRO;
}

/* What a table is of the formula, between the neighbours: what the shell correction misses. */
static double formula_factor(int z, int row)
{
    const double kinetic = bh_proton_stopping_energy[row];
    const neighbours n = neighbours_of(&protons, z);
    const double low =
        tabulated(&protons, n.low, row) / bh_bethe_element(protons.columns[n.low], kinetic);
    const double high =
        tabulated(&protons, n.high, row) / bh_bethe_element(protons.columns[n.high], kinetic);
    return low + n.part * (high - low);
}

static int row_at(double kinetic)
{
    int row = 0;
    while (row + 1 < BH_PROTON_ROWS && bh_proton_stopping_energy[row] < kinetic)
        row++;
    return row;
}

/* An element without a column: the fit, the formula, and between them what the neighbours do. */
static double made_up(int z, int row)
{
    const double kinetic = bh_proton_stopping_energy[row];
    if (kinetic <= SLOW_FIT)
        return slow_fit(z, kinetic);
    if (kinetic >= BH_SLOW_TOP)
        return bh_bethe_element(z, kinetic) * formula_factor(z, row);
    const int first = row_at(SLOW_FIT);
    const int last = row_at(BH_SLOW_TOP);
    const double below = log(slow_fit(z, SLOW_FIT) / between(&protons, z, first));
    const double above = log(bh_bethe_element(z, BH_SLOW_TOP) * formula_factor(z, last) /
                             between(&protons, z, last));
    const double part = log(kinetic / SLOW_FIT) / log(BH_SLOW_TOP / SLOW_FIT);
    return between(&protons, z, row) * exp(below + part * (above - below));
}

static double proton_atom(int code, int z, int row)
{
    const int column = column_of(&protons, code);
    return column >= 0 ? protons.values[row * protons.count + column] * bh_element_mass(z)
                       : made_up(z, row);
}

/* How far the neighbours are off for protons of this energy: alphas of equal speed alike. */
static double shell_factor(int z, double kinetic)
{
    const int high = row_at(kinetic);
    const int low = high > 0 ? high - 1 : 0;
    const double at_low = made_up(z, low) / between(&protons, z, low);
    const double at_high = made_up(z, high) / between(&protons, z, high);
    const double part = log(kinetic / bh_proton_stopping_energy[low]) /
                        log(bh_proton_stopping_energy[high] / bh_proton_stopping_energy[low]);
    return at_low + part * (at_high - at_low);
}

static double alpha_speed(int row)
{
    return bh_alpha_stopping_energy[row] * BH_MASS_PROTON / BH_MASS_ALPHA;
}

static double alpha_atom(int z, int row)
{
    const int column = column_of(&alphas, z);
    return column >= 0 ? tabulated(&alphas, column, row)
                       : between(&alphas, z, row) * shell_factor(z, alpha_speed(row));
}

/* A column of a compound, for the medium's isotopes [MeV cm2/g]. */
static double compound_loss(const table *t, const bh_medium *m, int compound, int row)
{
    double natural = 0.0;
    for (size_t i = 0; i < m->count; i++)
        natural += m->elements[i].per_atom * bh_element_mass(m->elements[i].z);
    const int column = column_of(t, compounds[compound].code);
    return t->values[row * t->count + column] * natural / m->mean_atomic_mass;
}

typedef struct {
    const bh_medium *medium;
    int compound; /* or -1 */
    bool amorphous;
} recipe;

static double proton_loss(const recipe *r, int row)
{
    if (r->compound >= 0)
        return compound_loss(&protons, r->medium, r->compound, row);
    double sum = 0.0;
    for (size_t i = 0; i < r->medium->count; i++) {
        const int z = r->medium->elements[i].z;
        const int code = z == 6 && r->amorphous ? BH_STOPPING_AMORPHOUS : z;
        sum += r->medium->elements[i].per_atom * proton_atom(code, z, row);
    }
    return sum / r->medium->mean_atomic_mass;
}

static double alpha_loss(const recipe *r, int row)
{
    if (r->compound >= 0)
        return compound_loss(&alphas, r->medium, r->compound, row);
    double sum = 0.0;
    for (size_t i = 0; i < r->medium->count; i++)
        sum += r->medium->elements[i].per_atom * alpha_atom(r->medium->elements[i].z, row);
    return sum / r->medium->mean_atomic_mass;
}

/* The medium that the tables are of: their I, the density of the set. */
static bh_medium printed_medium(const bh_material *material, const recipe *r)
{
    bh_medium printed = *r->medium;
    bh_medium of_set;
    if (bh_medium_of(material, material->effect.density, &of_set, NULL) == BH_OK)
        printed = of_set;
    double electrons = 0.0;
    double sum = 0.0;
    for (size_t i = 0; i < printed.count; i++) {
        const double share = printed.elements[i].per_atom * printed.elements[i].z;
        electrons += share;
        sum += share * log(bh_element_excitation(printed.elements[i].z));
    }
    printed.mean_excitation =
        r->compound >= 0 ? compounds[r->compound].excitation : exp(sum / electrons);
    return printed;
}

static void make_factor(const bh_material *material, const recipe *r, bh_log_spline *factor)
{
    const bh_medium printed = printed_medium(material, r);
    const bh_particle proton = bh_proton();
    for (int row = row_at(BH_SLOW_TOP); bh_proton_stopping_energy[row] <= 100.0; row++) {
        const double kinetic = bh_proton_stopping_energy[row];
        bh_log_spline_add(factor, kinetic,
                          proton_loss(r, row) / bh_bethe(&proton, &printed, kinetic));
    }
    bh_log_spline_add(factor, 0.5 * BH_SLOW_CALIB, 1.0);
    bh_log_spline_add(factor, BH_SLOW_CALIB, 1.0);
    bh_log_spline_close(factor);
}

/* Fades from 1 to `full` between the fit's end and the formula's beginning. */
static double faded(double full, double kinetic)
{
    const double part = log(kinetic / SLOW_FIT) / log(BH_SLOW_TOP / SLOW_FIT);
    return pow(full, fmin(fmax(part, 0.0), 1.0));
}

void bh_slow_loss_make(const bh_material *material, const bh_medium *medium, bh_slow_loss *out)
{
    const recipe r = {medium, compound_of(medium),
                      strncmp(material->name, "amorphous", strlen("amorphous")) == 0};
    *out = (bh_slow_loss){.alpha_top = alpha_speed(BH_ALPHA_ROWS - 1)};
    make_factor(material, &r, &out->factor);
    /* An I of its own must not make a step where table and formula meet. */
    const bh_particle proton = bh_proton();
    const double join = bh_bethe(&proton, medium, BH_SLOW_TOP) *
                        bh_log_spline_at(&out->factor, BH_SLOW_TOP) /
                        proton_loss(&r, row_at(BH_SLOW_TOP));
    for (int row = 0; row < BH_PROTON_ROWS && bh_proton_stopping_energy[row] <= SPLINE_TOP; row++)
        bh_log_spline_add(&out->proton, bh_proton_stopping_energy[row],
                          proton_loss(&r, row) * faded(join, bh_proton_stopping_energy[row]));
    for (int row = 0; row < BH_ALPHA_ROWS; row++)
        bh_log_spline_add(&out->alpha, alpha_speed(row),
                          alpha_loss(&r, row) * faded(join, alpha_speed(row)));
    bh_log_spline_close(&out->proton);
    bh_log_spline_close(&out->alpha);
}

/* Below the first point as the speed. */
static double from_spline(const bh_log_spline *s, double kinetic)
{
    const double first = exp(s->x[0]);
    return kinetic < first ? exp(s->y[0]) * sqrt(kinetic / first) : bh_log_spline_at(s, kinetic);
}

double bh_slow_proton(const bh_slow_loss *slow, double kinetic)
{
    return from_spline(&slow->proton, kinetic);
}

double bh_slow_alpha(const bh_slow_loss *slow, double kinetic)
{
    return from_spline(&slow->alpha, kinetic);
}
