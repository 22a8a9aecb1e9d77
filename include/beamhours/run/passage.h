/* passage.h - where in a target collisions happen, what lies before them and what behind. */
#ifndef BH_RUN_PASSAGE_H
#define BH_RUN_PASSAGE_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/matter/bremsstrahlung.h"
#include "beamhours/plan/plan.h"
#include "beamhours/run/workspace.h"

/*
 * The layers are slabs, as wide as the beam and the particles need, turned by the tilt; the beam is
 * a line.  It loses energy in what lies before a vertex along its way of 1 / cos(tilt); the
 * detected particle in what lies behind along its own: out through the last face or, backwards,
 * through the first, or through the wall where it reaches the wall's radius sooner; then through
 * the arm's `exit` layers, which stand across its way.  Mean losses; electrons and positrons by
 * collisions alone, for their radiation is the radiative correction's.
 * A tilted target is crossed as in the arm's plane; a ring takes a mean over its azimuth.
 */

/* Matter on a straight way, layers added up. */
typedef struct {
    double path;      /* [g/cm2] */
    double lengths;   /* [1] in radiation lengths, each layer in its own */
    double soft;      /* [1] the same, each layer times its b of radiation_length.h */
    double electrons; /* [mol/cm2] */
} bh_crossed;

/* The same as bremsstrahlung.h wants it for `particle` of `kinetic` [MeV]. */
bh_passage bh_crossed_passage(const bh_crossed *crossed, const bh_particle *particle,
                              double kinetic);

/* The beam as it is, and with BH_STEP_MOMENTUM less and more of momentum. */
enum { BH_AS_IT_IS, BH_BOOSTED_DOWN, BH_BOOSTED_UP, BH_BOOSTS };

/* A layer, the wall or an exit window as particles meet it. */
typedef struct {
    bh_substance substance;
    const bh_matter *matter;    /* NULL: vacuum */
    const bh_range *range;      /* of the beam, for a layer; NULL: nothing is lost */
    double thickness;           /* [cm] along its normal */
    double areal;               /* [g/cm2] along its normal, at the setting's current */
    bh_crossed before;          /* what the beam has crossed when it enters; of a layer */
    double entering[BH_BOOSTS]; /* [MeV] kinetic energy of the beam then; 0 stopped */
} bh_sheet;

/* A beam in a target, and the way to one arm.  Read-only once made. */
typedef struct {
    bh_particle beam;
    double kinetic;      /* [MeV] entering the target */
    double cosine, sine; /* [1] of the tilt, sine positive where the normal turns towards the arm */
    bool losing;         /* energy loss is on */
    bool ring;           /* the arm is a ring */
    double azimuth;      /* [rad] of the ring */
    double wall_radius;  /* [cm] 0: no wall */
    size_t layer_count, exit_count, sheet_count;
    const bh_sheet *sheets; /* the layers, the wall where there is one, the exit windows */
    size_t stops;           /* the layer in which the beam stops; layer_count where it does not */
    size_t unslowed;        /* a sheet whose loss cannot be computed, else sheet_count */
    bh_error why;           /* and why not */
} bh_way;

/* Returns what was crossed after `path` [g/cm2] more in a sheet. */
bh_crossed bh_crossed_add(bh_crossed sum, const bh_sheet *sheet, double path);

/* What a way is made of. */
typedef struct {
    const bh_setting *setting;
    const bh_setting_arm *arm;
    const bh_target *target; /* the setting's or a dummy cell */
    bool losing;
} bh_way_request;

/* Returns [1] how many sheets a way to this arm has. */
size_t bh_way_sheets(const bh_target *target, const bh_arm *arm);

/* Returns [1] what a current leaves of the density of a layer: 1 - density_loss x current, not
 * below 0. */
double bh_density_left(const bh_layer *layer, const bh_beam *beam);

/* Makes a way; `sheets` has room for bh_way_sheets and must outlive it, as what the request points
 * to and the workspace's ranges.  BH_ENOMEM. */
BH_CHECKED bh_code bh_way_make(bh_workspace *workspace, const bh_way_request *request,
                               bh_sheet *sheets, bh_way *way, bh_error *err);

/* Returns [MeV] the kinetic energy of a particle of `kinetic` [MeV] at a momentum larger by the
 * share `by` [1]. */
double bh_boosted_kinetic(const bh_particle *particle, double kinetic, double by);

/* Returns [MeV] the kinetic energy of the beam when it leaves layer number `layer`. */
double bh_way_leaving(const bh_way *way, size_t layer);

/* One point at which collisions are taken to happen. */
typedef struct {
    size_t layer;
    double depth;              /* [cm] in the layer, along its normal from the first face */
    double from, to;           /* [cm] the piece of the layer that it is one point of, likewise */
    double weight;             /* [1] share of the nuclei; all weights add to 1 */
    double kinetic[BH_BOOSTS]; /* [MeV] of the beam there */
    double towards;            /* [1] cosine of the azimuth to the arm's plane: 1 but for rings */
    bh_crossed before;         /* what the beam has crossed */
} bh_vertex;

/* Nuclei of a kind in one layer, and the part of the layer that is seen. */
typedef struct {
    double nuclei;   /* [1/cm2] seen along the beam; 0: none */
    double from, to; /* [cm] along the normal from the layer's first face */
} bh_occupied;

enum { BH_MOST_DEPTHS = 16, BH_AZIMUTHS = 6, BH_VERTICES_PER_LAYER = BH_MOST_DEPTHS * BH_AZIMUTHS };

/*
 * Fills `vertices` (room for BH_VERTICES_PER_LAYER for each layer) with Gauss and Legendre's points
 * in depth, as many in each layer as it takes for 1e-6 of a cross section that falls with the
 * twelfth power of the energy, and returns how many.  `occupied`: one for each layer.  Layers in
 * and behind which the beam stops have none.
 */
size_t bh_way_vertices(const bh_way *way, const bh_occupied *occupied, bh_vertex *vertices);

/* A vertex of weight 0 at `depth` [cm] in the piece of a layer that `like` is of. */
bh_vertex bh_way_vertex(const bh_way *way, const bh_vertex *like, double depth);

/* Returns [1] point number i of n of Gauss and Legendre's rule on 0 .. 1 and fills `weight` [1]; n
 * is 1, 2, 3, 5, 8 or BH_MOST_DEPTHS. */
double bh_depth_point(int i, int n, double *weight);

/* Returns [MeV] the mean kinetic energy of the beam over the vertices. */
double bh_vertices_mean(const bh_vertex *vertices, size_t count);

/* What lies behind `vertex` for a particle that leaves it at polar `angle` [rad]; path
 * infinite where it goes along the layers for ever. */
bh_crossed bh_way_after(const bh_way *way, const bh_vertex *vertex, double angle);

/* What the beam has crossed at `depth` [cm] of the layer of `vertex`. */
bh_crossed bh_way_before(const bh_way *way, const bh_vertex *vertex, double depth);

/* Fills depth [cm] in the layer of `vertex`: from its one side particles at polar `angle` [rad]
 * come to the wall inside that layer, from the other outside it [0]; inside the target, or to a
 * face first [1].  Outside the layer where it is the same from everywhere, NAN without a wall. */
void bh_way_turning(const bh_way *way, const bh_vertex *vertex, double angle, double depth[2]);

/* A particle on its way out: its ranges in each sheet. */
typedef struct {
    const bh_way *way;
    bh_particle particle;
    const bh_range **ranges; /* one for each sheet; NULL: nothing is lost */
} bh_leaver;

/* Makes `particle` of at most `kinetic` [MeV] ready to leave; `ranges` has room for the way's
 * sheets.  Where its loss in a sheet cannot be computed none is taken, as the way says of the beam.
 * BH_ENOMEM. */
BH_CHECKED bh_code bh_leaver_make(bh_workspace *workspace, const bh_way *way,
                                  const bh_particle *particle, double kinetic, bh_leaver *out);

/* Returns [MeV] the kinetic energy left to the particle that leaves `vertex` at polar `angle` [rad]
 * with `kinetic` [MeV], when it reaches the detector; 0 where it stops before. */
double bh_leaver_left(const bh_leaver *leaver, const bh_vertex *vertex, double angle,
                      double kinetic);

#endif
