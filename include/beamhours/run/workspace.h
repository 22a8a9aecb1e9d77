/* workspace.h - what evaluations may share: form factors made ready, cross sections summed. */
#ifndef BH_RUN_WORKSPACE_H
#define BH_RUN_WORKSPACE_H

#include <stddef.h>

#include "beamhours/matter/range.h"
#include "beamhours/physics/structure.h"
#include "beamhours/rates/average.h"
#include "beamhours/run/table.h"

/*
 * The form factors of nucleus z, a by the model `name` ("default" too), made once and kept.
 * Returns NULL with the reason in err, BH_ENOMEM among them.  Belongs to the workspace; valid until
 * bh_workspace_trim.
 */
const bh_structure *bh_workspace_structure(bh_workspace *workspace, const char *name, int z, int a,
                                           bh_error *err);

/* What of a material matters to radiation and to single collisions, by mass. */
typedef struct {
    double length;   /* [g/cm2] radiation length */
    double b;        /* [1] of radiation_length.h */
    double z_over_a; /* [mol/g] electrons */
} bh_matter;

/* A material as a layer has it. */
typedef struct {
    const bh_material *material;
    double density; /* [g/cm3] */
} bh_substance;

/* Of `material`, worked out once; NULL when there is no memory. */
const bh_matter *bh_workspace_matter(bh_workspace *workspace, const bh_material *material,
                                     bh_error *err);

/*
 * The ranges of `particle` in a substance for energies up to `kinetic` [MeV]
 * and somewhat beyond, made once and kept; by collisions alone for electrons and positrons, whose
 * radiation belongs to the tail.  Kept by value: the material may go.  Valid until
 * bh_workspace_trim.  NULL with the reason in err: as bh_stopping_new and bh_range_new.
 */
const bh_range *bh_workspace_range(bh_workspace *workspace, const bh_particle *particle,
                                   const bh_substance *in, double kinetic, bh_error *err);

/* What was kept under the `size` [bytes] at `key`, or NULL; valid until bh_workspace_trim. */
const void *bh_workspace_recall(const bh_workspace *workspace, const void *key, size_t size);

/* Room for `room` [bytes], zeroed and aligned for any type, to be recalled by that key.  NULL
 * when there is no memory. */
void *bh_workspace_keep(bh_workspace *workspace, const void *key, size_t size, size_t room);

/* Takes back what was kept last under that key. */
void bh_workspace_drop(bh_workspace *workspace, const void *key, size_t size);

enum { BH_MOST_BINS = 1000, BH_KEY_ROOM = 32768 }; /* the first a limit of the plan format */

/* Writes a key that nothing was kept under into `key` and returns its size [bytes]. */
size_t bh_workspace_number(bh_workspace *workspace, unsigned char *key);

/* Room for the sums of one arm while they are made. */
typedef struct {
    bh_average whole, bins[BH_MOST_BINS];
    double edges[2][BH_MOST_BINS + 1]; /* [rad] of the bins of an arm moved back and on */
    double totals[BH_MOST_BINS + 1];   /* [ub/cm2] of an arm and its bins */
    unsigned char key[BH_KEY_ROOM];    /* what they are kept under */
} bh_sum_scratch;

/* Where averages are made. */
bh_average_workspace *bh_workspace_averages(bh_workspace *workspace);
bh_sum_scratch *bh_workspace_scratch(bh_workspace *workspace);

/* Forgets everything when more is kept than is worth keeping. */
void bh_workspace_trim(bh_workspace *workspace);

#endif
