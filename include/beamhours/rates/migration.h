/* migration.h - events that a finite resolution moves out of the bin they belong to into others. */
#ifndef BH_RATES_MIGRATION_H
#define BH_RATES_MIGRATION_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/error.h"

/*
 * An acceptance is an aperture: it admits true angles.  Bins sort measured ones: true angle plus a
 * normal deviate of zero mean.  A cell is a bin, or what the aperture has beside its bins.  What is
 * measured before the first or behind the last cell is counted in that cell: the aperture has let
 * it through, so no event is lost or won, and the sum over the cells stays what it was.
 * Within a cell the events are taken to be spread like exp(slope x angle), the slope from the
 * neighbouring cells.  Of what crosses an edge that is right to a few 1e-3 while the counts of
 * neighbours differ by less than twice; a momentum bite that ends inside a cell is smeared over it.
 */
typedef struct {
    int cells;           /* >= 1 */
    const double *edges; /* [rad] cells + 1, rising */
    double sigma;        /* [rad] rms of measured - true angle, >= 0 */
} bh_migration;

/* BH_EDOMAIN for NaN, no cells, edges that do not rise, a negative sigma. */
BH_CHECKED bh_code bh_migration_check(const bh_migration *migration, bh_error *err);

/* Fills slope [1/rad], one for each cell, from true counts [1] >= 0 in each: the logarithmic
 * derivative of the density of events; 0 where there are no neighbours with events. */
void bh_migration_slopes(const bh_migration *migration, const double *counts, double *slope);

/* Fills share [1], one for each cell: of the events that belong in cell `from` (from 0), spread
 * with slope [1/rad], what is measured in each; a column of the migration matrix.  All >= 0; they
 * add to 1 to rounding. */
void bh_migration_shares(const bh_migration *migration, int from, double slope, double *share);

/* Cells that lie together, and the share [1] measured in each. */
typedef struct {
    int first, count;
    double *share; /* [1] as many as count; room for all cells */
} bh_migration_column;

enum { BH_MIGRATION_SLOPES = 4, BH_MIGRATION_FAR = 128 };

/* What is measured below the edges beside a cell, where all cells are equal: the same for each but
 * for its slope, between few of which it is a polynomial. */
typedef struct {
    bool alike;                        /* false: of no use, cells or their slopes differ too much */
    int reach;                         /* [1] cells on either side */
    double slope[BH_MIGRATION_SLOPES]; /* [1/rad] */
    double below[2 * BH_MIGRATION_FAR + 2][BH_MIGRATION_SLOPES]; /* [1] share; from the edge `reach`
                                                                     before the cell's own */
} bh_migration_likeness;

/* Fills `likeness` for `count` values of slope [1/rad] that cells may have; shares from it are the
 * same to 1e-8. */
void bh_migration_compare(const bh_migration *migration, size_t count, const double *slope,
                          bh_migration_likeness *likeness);

/* The same without the zeros: fills first, count and share (whose room is the caller's) with the
 * cells within reach of `from`, spread with slope [1/rad]; `likeness` of these cells, slope among
 * those that it was made for, or NULL. */
void bh_migration_reach(const bh_migration *migration, const bh_migration_likeness *likeness,
                        int from, double slope, bh_migration_column *column);

#endif
