/* beneath.h - what an arm counts beside elastic events: the hard tails of their lines, nucleons
 * knocked out, mesons made, electrons of atoms. */
#ifndef BH_RUN_BENEATH_H
#define BH_RUN_BENEATH_H

#include "beamhours/physics/background.h"
#include "beamhours/run/radiated.h"
#include "beamhours/run/yield.h"

/* [ub/cm2/sr] nuclei times cross sections at a few angles, what is between them by polynomials:
 * 1e-3 of backgrounds that are smooth in angle. */
typedef struct {
    bh_interval polar;            /* [rad] of the arm */
    bh_angle_nodes at;            /* no angles where nothing of it can be */
    double value[BH_ANGLE_NODES]; /* [ub/cm2/sr] */
} bh_beneath;

/* What may be asked for: the hard tail, or a row of physics/background.h. */
enum { BH_BENEATH_ALL = -2, BH_BENEATH_TAIL = -1 };

/* Nuclei of one kind in the way of the beam. */
typedef struct {
    const bh_radiated_request *radiated; /* of the scattered particle on them */
    const bh_struck_list *list;          /* of their target, whose numbers are in yielder->seen */
    const bh_struck *struck;
    double nuclei; /* [1/cm2] seen */
    int which;     /* BH_BENEATH_ALL, BH_BENEATH_TAIL, or the number of a row */
} bh_beneath_of;

/* An empty sum over the arm of `view`. */
void bh_beneath_begin(const bh_view *view, bh_beneath *sum);

/*
 * Adds everything that is smooth in angle, or what of->which says.  Notes in the yielder's remarks
 * what cannot be computed, for nuclides that are a hundredth of what is seen or more. Quasi-elastic
 * and inelastic spectra as they are without radiation.
 */
void bh_beneath_add(bh_yielder *yielder, const bh_view *view, const bh_beneath_of *of,
                    bh_beneath *sum);

/* Adds the sum over the solid angle to total [ub/cm2], one for each part of the view, the whole arm
 * first.  BH_EDOMAIN as bh_average_over. */
BH_CHECKED bh_code bh_beneath_sum(bh_yielder *yielder, const bh_view *view, const bh_beneath *sum,
                                  double *total, bh_error *err);

/* Adds to total [ub/cm2] likewise what atomic electrons give (rows of background.h that are sharp,
 * or `which` alone), of which each angle has one energy.  Nothing where the arm has neither
 * threshold, bite nor cut: then nobody says which of these slow electrons count. */
BH_CHECKED bh_code bh_beneath_atomic(bh_yielder *yielder, const bh_view *view,
                                     const bh_beneath_of *of, double *total, bh_error *err);

/*
 * Adds all of it to the parts of `yield`: to windows or other, or, for a target that is not the
 * setting's own, to dummy.  The yielder's paths and seen are of that target, `way` the way in it.
 */
BH_CHECKED bh_code bh_beneath_yield(bh_yielder *yielder, bh_yield *yield,
                                    const bh_struck_list *list, const bh_way *way, bh_error *err);

/* What explain asks for: nuclei of one kind in one layer. */
typedef struct {
    const bh_presence *presence;
    int which; /* as above */
} bh_beneath_wanted;

/* Fills total [ub], one for each part of the view, with what each nucleus gives of what is wanted;
 * the yielder's paths are of the setting's target. */
BH_CHECKED bh_code bh_beneath_presence(bh_yielder *yielder, const bh_view *view,
                                       const bh_beneath_wanted *wanted, double *total,
                                       bh_error *err);

/* The same arm in a beam of another particle, as bh_view has it; not to be copied. */
typedef struct {
    bh_setting setting;
    bh_view view;
    double share; /* [1] of it for each particle of the named kind */
} bh_beside;

/* Makes number `other` of the others in the beam of `view`.  As bh_view_channels. */
BH_CHECKED bh_code bh_beside_make(bh_yielder *yielder, const bh_view *view, size_t other,
                                  bh_beside *out, bh_error *err);

/* Fills total [ub] likewise with elastic events of a particle beside, on each nucleus. */
BH_CHECKED bh_code bh_beside_elastic(bh_yielder *yielder, const bh_beside *beside,
                                     const bh_struck *struck, double *total, bh_error *err);

/*
 * Adds likewise what else is in the beam does: elastic events and, of leptons, all of the above, at
 * the same momentum as the named particle, without losses in the target; a cut counts from their
 * own line.  Hadrons scatter by their charge alone.
 */
BH_CHECKED bh_code bh_others_yield(bh_yielder *yielder, bh_yield *yield, const bh_struck_list *list,
                                   bh_error *err);

/* All nuclei of one origin. */
typedef struct {
    const bh_view *view;
    const bh_struck_list *list;
    const bh_way *way; /* NULL: nothing is lost, and nothing is signal */
    int origin;        /* BH_ORIGIN_OTHER: the scatterer's own among them; BH_ORIGINS: any */
} bh_beneath_group;

/* Fills total [ub/cm2] likewise with what they give beside elastic events. */
BH_CHECKED bh_code bh_beneath_group_sum(bh_yielder *yielder, const bh_beneath_group *group,
                                        double *total, bh_error *err);

#endif
