/* form_factor.h - what a family of form factors gives the registry; for src/physics/structure/
 * only.
 */
#ifndef BH_PHYSICS_FORM_FACTOR_H
#define BH_PHYSICS_FORM_FACTOR_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/error.h"
#include "beamhours/physics/structure.h"

/* Which numbers `evaluate` fills, and so how they combine to ge2 and gm2. */
typedef enum {
    BH_FACTORS_NUCLEON,   /* GE, GM */
    BH_FACTORS_CHARGE,    /* F, F(0) = 1 */
    BH_FACTORS_MOMENTS,   /* GC, GM, GQ of the deuteron, GM(0) in e hbar / 2 M of itself */
    BH_FACTORS_TRINUCLEON /* F_ch, F_m, both 1 at 0 */
} bh_factors_kind;

enum {
    BH_FACTORS_MOST = 3, /* values that `evaluate` fills at most */
    BH_TERMS_MOST = 160, /* of a sum over terms */
    BH_STEPS_MOST = 16,  /* Gaussians in a sum */
    BH_SHAPE_MOST = 8    /* numbers that describe a shape */
};

/* A density or form factor written as a sum, or by a few numbers; each family says what they are.
 */
typedef struct {
    double number[BH_SHAPE_MOST]; /* [1] in the units of the family */
    int count;
    double term[2][BH_TERMS_MOST]; /* [1] in the units of the family */
    int step[BH_STEPS_MOST];
} bh_shape;

struct bh_structure {
    const bh_structure_model *row;
    bh_factors_kind kind;
    /* Fills value [1] at q2 [MeV^2]. */
    void (*evaluate)(const bh_structure *structure, double q2, double value[BH_FACTORS_MOST]);
    /* Fills sigma [1], standard uncertainties of what `evaluate` fills, at q2 [MeV^2]; NULL: none
     * published. */
    void (*spread)(const bh_structure *structure, double q2, double sigma[BH_FACTORS_MOST]);
    int z, a;
    double mass;            /* [MeV] of the nucleus */
    double magnetic;        /* [1] GM(0) where `kind` is BH_FACTORS_TRINUCLEON */
    double lowest, highest; /* [GeV2] range of the data */
    double radius;          /* [fm] rms charge radius */
    bool flagged;
    const void *fit;   /* coefficients of the family, constant */
    bh_shape shape[2]; /* charge; magnetic where there is one */
    char name[40];
    char source[200];
    char note[300];
};

/* A row of the registry. */
typedef struct {
    bh_structure_model model;
    /* How many published sets there are for z, a; 0: it cannot describe that nucleus. */
    int (*sets)(int z, int a);
    /* Makes `structure` (z, a, mass, row's range and source filled) ready with set 1, 2, ... */
    bh_code (*prepare)(bh_structure *structure, int set, bh_error *err);
} bh_form_factor;

/* Adds a sentence to the note. */
void bh_structure_remark(bh_structure *structure, const char *sentence);

typedef enum {
    BH_SHAPE_FERMI_2P,
    BH_SHAPE_FERMI_3P,
    BH_SHAPE_GAUSS_3P,
    BH_SHAPE_OSCILLATOR,
    BH_SHAPE_FOURIER_BESSEL,
    BH_SHAPE_GAUSSIANS
} bh_shape_kind;

/* One published charge density; generated from densities.csv, which says what `value` holds. */
typedef struct {
    int z, a;
    bh_shape_kind kind;
    int count;
    const double *value; /* [fm] and powers of it */
    double rms;          /* [fm] of the set, as computed when it was copied */
    double radius;       /* [fm] Angeli & Marinova 2013 */
    double radius_sigma; /* [fm] its standard uncertainty */
    bool confirmed;      /* read in a text, not recalled */
    const char *source;
    const char *note;
} bh_density;

extern const bh_density bh_density_table[];
extern const size_t bh_density_table_size;

/* How many sets of a shape there are for z, a; the set-th (1, 2, ...) of them or NULL. */
int bh_density_sets(bh_shape_kind kind, int z, int a);
const bh_density *bh_density_find(bh_shape_kind kind, int z, int a, int set);

/* The best set for z, a: agrees with the radius of Angeli & Marinova 2013 within 1 % or twice its
 * uncertainty, Fourier-Bessel and sums of Gaussians first.  Which set of its shape it is goes to
 * `set`.  NULL when there is none. */
const bh_density *bh_density_best(int z, int a, int *set);

/* Returns [fm] the rms charge radius of z, a: Angeli & Marinova 2013, and `measured` says so; else
 * that of a uniform sphere of radius 1.2 A^(1/3) fm. */
double bh_density_radius(int z, int a, bool *measured);

/* What every charge density has in common: kind, source, remarks about spin.  `density` may be
 * NULL: a shape made to fit the radius. */
void bh_density_describe(bh_structure *structure, const bh_density *density);

/* Makes `shape` a sum of Gaussians of rms radius `width` [fm], `count` radii `at` [fm] and
 * fractions `share` [1]; renormalised.  The radii rise and are multiples of 0.1 fm, at most 1.5 fm
 * apart. */
typedef struct {
    double width; /* [fm] */
    int count;
    const double *at;    /* [fm] */
    const double *share; /* [1] */
} bh_gaussians;
void bh_gaussians_make(bh_shape *shape, const bh_gaussians *in);

/* Returns [1] the form factor of a sum of Gaussians at q [1/fm]. */
double bh_gaussians_factor(const bh_shape *shape, double q);

/* Makes `shape` a Fourier-Bessel series of radius `edge` [fm] with `count` coefficients
 * `coefficient` [1]; renormalised. */
void bh_fourier_bessel_make(bh_shape *shape, double edge, int count, const double *coefficient);

/* Returns [1] its form factor at q [1/fm]. */
double bh_fourier_bessel_factor(const bh_shape *shape, double q);

enum { BH_A1_ROWS = 1000 };

/* [1] the A1 spline fit: GE, GM over its moment, their uncertainties; at Q = 0, 1, 2, ... MeV/c. */
extern const double bh_a1_spline[BH_A1_ROWS][4];

/* The registry: the i-th row, NULL past the end; the row for a name (without "/2"); the default for
 * z, a, and which set of it. */
const bh_form_factor *bh_form_factor_at(int i);
const bh_form_factor *bh_form_factor_find(const char *name, size_t length);
const bh_form_factor *bh_form_factor_default(int z, int a, int *set);

/* Who can be described: the nucleons; the proton; the neutron; deuteron; 3H and 3He; nuclei from
 * 2H on; all. */
int bh_sets_nucleons(int z, int a);
int bh_sets_proton(int z, int a);
int bh_sets_neutron(int z, int a);
int bh_sets_deuteron(int z, int a);
int bh_sets_three(int z, int a);
int bh_sets_nuclei(int z, int a);
int bh_sets_all(int z, int a);

/* point.c, rational.c, conformal.c, spline.c, neutron.c, deuteron.c, trinucleon.c */
bh_code bh_prepare_point(bh_structure *structure, int set, bh_error *err);
bh_code bh_prepare_dipole(bh_structure *structure, int set, bh_error *err);
bh_code bh_prepare_kelly(bh_structure *structure, int set, bh_error *err);
bh_code bh_prepare_arrington(bh_structure *structure, int set, bh_error *err);
bh_code bh_prepare_amt(bh_structure *structure, int set, bh_error *err);
bh_code bh_prepare_amt_effective(bh_structure *structure, int set, bh_error *err);
bh_code bh_prepare_venkat(bh_structure *structure, int set, bh_error *err);
bh_code bh_prepare_prad(bh_structure *structure, int set, bh_error *err);
bh_code bh_prepare_ye(bh_structure *structure, int set, bh_error *err);
bh_code bh_prepare_a1(bh_structure *structure, int set, bh_error *err);
bh_code bh_prepare_galster(bh_structure *structure, int set, bh_error *err);
bh_code bh_prepare_riordan(bh_structure *structure, int set, bh_error *err);
bh_code bh_prepare_abbott_i(bh_structure *structure, int set, bh_error *err);
bh_code bh_prepare_abbott_ii(bh_structure *structure, int set, bh_error *err);
bh_code bh_prepare_amroun(bh_structure *structure, int set, bh_error *err);

/* sphere.c, oscillator.c, fermi.c, gauss_3p.c, fourier_bessel.c, gaussians.c */
bh_code bh_prepare_uniform(bh_structure *structure, int set, bh_error *err);
bh_code bh_prepare_helm(bh_structure *structure, int set, bh_error *err);
bh_code bh_prepare_oscillator(bh_structure *structure, int set, bh_error *err);
bh_code bh_prepare_fermi_2p(bh_structure *structure, int set, bh_error *err);
bh_code bh_prepare_fermi_3p(bh_structure *structure, int set, bh_error *err);
bh_code bh_prepare_gauss_3p(bh_structure *structure, int set, bh_error *err);
bh_code bh_prepare_fourier_bessel(bh_structure *structure, int set, bh_error *err);
bh_code bh_prepare_gaussians(bh_structure *structure, int set, bh_error *err);

/* The dipole at q2 [MeV^2].  Returns [1] (1 + q2 / 0.71 GeV2)^-2. */
double bh_dipole(double q2);

/* Fill value [1] with GE, GM of Kelly 2004 at q2 [MeV^2]. */
void bh_kelly_proton(const bh_structure *structure, double q2, double value[BH_FACTORS_MOST]);

/* Fill value [1] with GE, GM of Kelly 2004 at q2 [MeV^2]. */
void bh_kelly_neutron(const bh_structure *structure, double q2, double value[BH_FACTORS_MOST]);

#endif
