/* material.h - what a layer is made of. */
#ifndef BH_MATTER_MATERIAL_H
#define BH_MATTER_MATERIAL_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/diag.h"

typedef enum { BH_STATE_SOLID, BH_STATE_LIQUID, BH_STATE_GAS, BH_STATE_VACUUM } bh_state;

/* One nuclide of a material, isotopes of natural elements written out. */
typedef struct {
    int z, a;
    double mass;     /* [MeV] bare nucleus */
    double per_atom; /* [1] share of all atoms of the material; all shares add to 1 */
    bool natural;    /* one of several isotopes that a natural element brought along */
} bh_constituent;

typedef struct {
    double mean_excitation; /* [MeV] I; 0 where none is given */
    double c, x0, x1;       /* [1] Sternheimer-Berger-Seltzer parameters C-bar, x0, x1 */
    double a, k, delta0;    /* [1] a, m (here k), delta0 */
    double density; /* [g/cm3] the density these parameters belong to; 0 when there is no set */
} bh_density_effect;

/* Everything the library knows of one material.  Read-only once loaded. */
typedef struct {
    const char *name;    /* as in a plan: "liquid-hydrogen" */
    const char *summary; /* one line */
    const char *file;    /* where it was read */
    bh_state state;
    size_t count;                 /* constituents */
    const bh_constituent *parts;  /* by falling share of atoms of the element, then by rising a */
    double mean_atomic_mass;      /* [g/mol] per atom, all elements together */
    double density;               /* [g/cm3] nominal; of a gas at `temperature` and `pressure` */
    double temperature, pressure; /* [K] [Pa] of the nominal density; 0 where it does not matter */
    double molecule;              /* [1] atoms in a molecule of a gas; 0 for others */
    double molar_mass;            /* [g/mol] of a molecule of a gas; else 0 */
    double published_x0;          /* [g/cm2] radiation length; 0 where none is published */
    double melting, boiling;      /* [K] 0 where not known */
    double conductivity;          /* [W/cm/K] thermal; 0 where not known */
    bh_density_effect effect;
    size_t hazard_count;
    const char *const *hazards; /* words such as "flammable-gas", "cryogen", "oxygen-displacing",
                                   "beryllium", "lead", "uranium", "toxic", "radioactive" */
    size_t source_count;
    const char *const *sources; /* "density: PDG 2022 ..." or "... from memory" */
} bh_material;

/* Materials already read, and the folders to look in (in order).  One thread at a time. */
typedef struct bh_material_library bh_material_library;

/* `folders` is NULL-terminated; copied.  NULL when there is no memory. */
bh_material_library *bh_material_library_new(const char *const *folders);
void bh_material_library_free(bh_material_library *library);

/*
 * Finds `name` ("aluminium", American spelling accepted; "vacuum") or reads the file it names when
 * it ends in .yaml (relative to the first folder).  Each is read once.  The result belongs to the
 * library.  Returns NULL after complaining in `diags` at `at` under `key`: no such material (with
 * the nearest names), or what is wrong inside its file, with that file's own marks.
 */
const bh_material *bh_material_find(bh_material_library *library, const char *name, bh_mark at,
                                    const char *key, bh_diags *diags);

/* Returns [g/cm3] of a gas at `temperature` [K] and `pressure` [Pa] as an ideal gas; 0 when it is
 * no gas or an argument is not positive. */
double bh_material_gas_density(const bh_material *material, double temperature, double pressure);

/* All names found in the folders, sorted, without repeats; fills `count`.  Belongs to the library.
 */
const char *const *bh_material_names(bh_material_library *library, size_t *count);

#endif
