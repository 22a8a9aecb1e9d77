/* yield.h - what an arm counts of signal and background in one setting, whole and bin by bin. */
#ifndef BH_RUN_YIELD_H
#define BH_RUN_YIELD_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/plan/plan.h"
#include "beamhours/rates/acceptance.h"
#include "beamhours/rates/seen.h"
#include "beamhours/run/channelsum.h"
#include "beamhours/run/radiated.h"
#include "beamhours/run/remarks.h"
#include "beamhours/run/struck.h"

enum { BH_ORIGINS = BH_ORIGIN_WINDOW + 1 };

/* Nuclei of one nuclide that an arm sees. */
typedef struct {
    double of[BH_ORIGINS]; /* [1/cm2] by their origin, signal and background */
    double moved[2];       /* [1/cm2] of the signal, seen by the arm turned back and on */
    double reached;        /* [ub/cm2] what of it all lands in the whole arm */
} bh_seen_numbers;

/* What yields are computed with; one for an evaluation. */
typedef struct {
    const bh_plan *plan;
    bh_workspace *workspace;
    bool (*cancelled)(void *asker); /* polled for each nuclide of each arm; NULL: never */
    void *asker;
    bool without_changes;     /* of rates with angle and momentum: wanted only where the systematic
                                 uncertainty rests on them */
    bool explaining;          /* contributions are wanted with cross sections, not rates alone */
    bh_remarks *remarks;      /* warnings go here; NULL: they are not wanted */
    bh_struck_list *lists;    /* of each target of the plan */
    bh_seen_numbers *seen;    /* room for the nuclides of any target */
    bh_seen_layer *layers;    /* room for the layers of any target */
    double *paths[3];         /* [1] likewise: as it stands, and seen by an arm moved both ways */
    bh_seen_span *spans;      /* likewise */
    bh_occupied *occupied;    /* likewise */
    bh_vertex *vertices;      /* room for those in any target */
    size_t most_sheets;       /* of a way in this plan */
    bh_sheet *sheets;         /* room for the ways of the arms of any setting */
    bh_sheet *spare, *dummy;  /* and for one that is tried, and one in a dummy cell */
    const bh_range **ranges;  /* room for one particle leaving */
    bh_seen_span *pair_spans; /* what the second arm of a coincidence sees of each layer */
    double *pair_paths;       /* [1] likewise */
    const bh_range **pair_ranges; /* room for the particle that leaves to it */
} bh_yielder;

/* One arm of one setting. */
typedef struct {
    const bh_setting *setting;
    const bh_setting_arm *arm;
    const bh_struck_list *list;
    const bh_process *process;
    const char *beside; /* name of another particle in the beam, when it is meant; else NULL */
    bh_acceptance acceptance;
    bh_way way;           /* of the beam and out of the setting's target */
    bool blocked;         /* the beam does not come through what is to be seen of the sample */
    bool without_changes; /* per_radian and per_momentum of its parts are NAN */
    bool stuck; /* what is scattered along the arm's axis stops before it reaches the detector */
    double vertex_kinetic;         /* [MeV] of the beam, mean over the scatterer nuclei seen */
    double axis;                   /* [rad] polar angle of the arm's centre */
    double central_momentum;       /* [MeV/c] NAN where none is written and none follows */
    bool cut;                      /* a momentum bite is in force */
    double bite_from, bite_to;     /* [MeV/c] */
    const bh_radiative *radiative; /* the model */
    bh_channel line;               /* of the main nuclide, from whose elastic line a cut counts */
    bh_gate gate;                  /* energies that are taken */
    double angle_rms;              /* [rad] of measured - true angle in the arm's plane */
    double lost;  /* [MeV] by the detected particle on its way out, mean on the axis */
    double least; /* [MeV] with which an electron just comes out and is detected */
    double beam;  /* [1/s] beam particles of the named kind */
    int parts;    /* 1, or 1 + bins */
} bh_view;

/* The whole arm or one bin. */
typedef struct {
    double angle;               /* [rad] arm's centre, or mean over the bin */
    bh_interval polar;          /* [rad] the polar angles it reaches */
    double solid_angle;         /* [sr] */
    double cross_section;       /* [ub/sr] mean, per scatterer nucleus */
    double point_cross_section; /* [ub/sr] at `angle` */
    double kept;                /* [1] of the signal */
    double radiative;           /* [1] share of the kept left by radiation inside cut and bite */
    double belonging;           /* [1] kept as the true angle has it, before bins exchange events */
    double signal;              /* [Hz] before dead time */
    double windows, other;      /* [Hz] likewise, background */
    double beside[2];           /* [Hz] likewise, of them by other particles of the beam */
    double accidental;          /* [Hz] likewise, in `other`; of a coincidence */
    double dummy;               /* [Hz] of the dummy cell; equal to windows where there is none */
    double per_radian;          /* [1] relative change of the rate for a turn of the arm */
    double per_momentum;        /* [1] relative change for a relative change of beam momentum */
} bh_part;

typedef struct {
    bh_view view;
    double seen;    /* [1/cm2] scatterer nuclei seen */
    bool converged; /* all averages did */
    bh_part *part;  /* the whole arm, then its bins */
} bh_yield;

/* Makes room in `arena` and lists the nuclei of each target.  BH_ENOMEM. */
BH_CHECKED bh_code bh_yielder_prepare(bh_yielder *yielder, bh_arena *arena, bh_error *err);

/* The arm `arm` of `setting` as the yield sees it, with its bins when wanted. */
BH_CHECKED bh_code bh_view_make(bh_yielder *yielder, const bh_setting *setting,
                                const bh_setting_arm *arm, bh_view *view, bh_error *err);

enum { BH_MOST_CHANNELS = 3 };

/* The ways from one nuclide to an arm: fast, slow, recoil, as far as they exist; at least one. */
typedef struct {
    size_t count;
    bh_channel list[BH_MOST_CHANNELS];
} bh_channels;

/* The channels of the beam on `struck` to this arm.  BH_ENOMEM, or why there is no such structure.
 */
BH_CHECKED bh_code bh_view_channels(bh_yielder *yielder, const bh_view *view,
                                    const bh_struck *struck, bh_channels *channels, bh_error *err);

/* Fills view->gate, lost and least; `count` vertices of the scatterer are in the yielder.
 * BH_ENOMEM. */
BH_CHECKED bh_code bh_view_gate(bh_yielder *yielder, bh_view *view, size_t count);

/* Fills `gate` with the view's as it is for particles from `count` vertices in the yielder, in the
 * target of `way`, which lose more or less on their way out than the scatterer's.  BH_ENOMEM. */
BH_CHECKED bh_code bh_gate_there(bh_yielder *yielder, const bh_view *view, const bh_way *way,
                                 size_t count, bh_gate *gate);

/* The radiation of the particles of `channel` that come from `count` vertices in the yielder, in
 * the target of `way`; `signal`: they are the scatterer's. */
bh_radiated_request bh_view_radiated(const bh_yielder *yielder, const bh_view *view,
                                     const bh_channel *channel, const bh_way *way, size_t count);

/* Fills the parts of `yield`, whose view is made and whose `part` has room for view.parts. */
BH_CHECKED bh_code bh_yield_make(bh_yielder *yielder, bh_yield *yield, bh_error *err);

/* Adds up in yielder->seen [1/cm2] what of each nuclide stands in the layers, by the paths that
 * yielder->paths has. */
void bh_seen_set(bh_yielder *yielder, const bh_struck_list *list);

/* Adds the events on nuclei of one origin.  While sums are made, cross_section, kept and radiative
 * hold nuclei times their integrals [ub/cm2], the sensitivities differences of such. */
void bh_part_add(bh_part *to, const bh_channel_sum *sum, const bh_seen_numbers *seen,
                 bh_origin origin);

/* From the sums in `part` to means and rates. */
void bh_yield_finish(const bh_yield *yield, bh_part *part);

/* Warns of what the numbers of `yield` rest on: models outside their range, plane waves on heavy
 * nuclei, formulas outside their validity.  While yielder->seen is of this yield. */
BH_CHECKED bh_code bh_findings(bh_yielder *yielder, const bh_yield *yield, bh_error *err);

/* Warns of what the radiative factor rests on. */
void bh_find_radiation(bh_yielder *yielder, const bh_yield *yield);

/* One nuclide in one layer, for explain. */
typedef struct {
    const bh_presence *presence;
    const bh_struck *struck;
    const bh_structure *structure;
    double seen;          /* [1/cm2] nuclei seen */
    double cross_section; /* [ub/sr] mean over the part */
    double kept;          /* [1] */
    double radiative;     /* [1] share of the kept that radiation leaves; background: of all */
    double rate;          /* [Hz] before dead time */
} bh_contribution;

/* Fills contributions (room for the presences of the view's list) to part number `part` of a yield
 * that is made. */
BH_CHECKED bh_code bh_yield_contributions(bh_yielder *yielder, const bh_yield *yield, int part,
                                          bh_contribution *contributions, bh_error *err);

/* The sums that a view wants of a channel on the nuclei at yielder->vertices, `count` of them, in
 * the target of `way`; without sensitivities. */
bh_channel_request bh_view_request(const bh_yielder *yielder, const bh_view *view,
                                   const bh_channel *channel, const bh_way *way, size_t count);

/* Elastic events of one channel on the nuclei at `count` vertices in the yielder, in the target of
 * `way`. */
typedef struct {
    const bh_channel *channel;
    const bh_way *way;
    size_t count;
    bool signal;  /* nuclei of the scatterer in the sample */
    bool whole;   /* the cross section without radiation is wanted, for explain */
    bool trace;   /* so few nuclei that 1e-3 of their rate is enough, and no sensitivity */
    bool binless; /* the sums of bins are not wanted */
} bh_elastic_of;

/* Their sums over the arm of `view`, radiation among them: of the signal what is inside the bite,
 * of background whatever of the line and its soft tail is between the edges.  As bh_channel_sums.
 */
const bh_channel_sum *bh_elastic_sums(bh_yielder *yielder, const bh_view *view,
                                      const bh_elastic_of *of, bh_error *err);

/* Makes room, in `arena`, for where collisions happen.  BH_ENOMEM. */
BH_CHECKED bh_code bh_places_prepare(bh_yielder *yielder, bh_arena *arena, bh_error *err);

/* How much of each layer of `target` the arm sees, into yielder->paths (thinned by the current, 0
 * where the beam does not come through) and yielder->spans. */
BH_CHECKED bh_code bh_view_paths(bh_yielder *yielder, const bh_view *view, const bh_target *target,
                                 const bh_way *way, bh_error *err);

/* Which nuclei. */
typedef struct {
    const bh_struck_list *list; /* of the target whose paths are in the yielder */
    size_t nuclide;
    bool all;                /* whatever their origin */
    bh_origin origin;        /* else these */
    const bh_presence *only; /* of these, in one layer; NULL: in all */
} bh_nuclei;

/* Fills yielder->vertices and returns how many; the yielder's paths are of this target. */
size_t bh_view_vertices(bh_yielder *yielder, const bh_way *way, const bh_nuclei *nuclei);

/* Makes the beam's way in `target`, the setting's or a dummy cell. */
BH_CHECKED bh_code bh_view_way(bh_yielder *yielder, const bh_view *view, const bh_target *target,
                               bh_way *way, bh_error *err);

#endif
