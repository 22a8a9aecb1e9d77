/* remarks.h - warnings of an evaluation, each said once however many settings it concerns. */
#ifndef BH_RUN_REMARKS_H
#define BH_RUN_REMARKS_H

#include <stdbool.h>

#include "beamhours/base/diag.h"

typedef enum {
    BH_REMARK_RANGE,         /* low, high [GeV2] needed; from, to [GeV2] of the model's data */
    BH_REMARK_FLAGGED,       /* a structure that had to assume something: `what` */
    BH_REMARK_CAVEAT,        /* a process outside its validity: `what` */
    BH_REMARK_COULOMB,       /* high [1]: Z alpha of plane waves on a heavy nucleus */
    BH_REMARK_NOT_COMPUTED,  /* background of nuclide `who`: `what` is left out; low, high [MeV]: so
                                far  below the line it begins, 0 not known */
    BH_REMARK_WIDE_CUT,      /* low, high [%] of the scattered energy: too wide to be soft */
    BH_REMARK_NO_CUT,        /* leptons counted with neither cut nor bite */
    BH_REMARK_RECOIL_CUT,    /* the factor is of a lepton that is not seen */
    BH_REMARK_OTHERS,        /* another particle `who` outside its validity: `what` */
    BH_REMARK_RADIATION,     /* radiative correction outside its validity: `what` */
    BH_REMARK_NO_EMPTY,      /* windows, and no time on an empty target */
    BH_REMARK_LIMIT,         /* high [1/s]: recorded rate over `from` [1/s], the limit */
    BH_REMARK_DEAD,          /* low [%]: live share after dead time alone, far below 100 % */
    BH_REMARK_BIN_TOO_SLOW,  /* high [h]: need of bin `what`; from [h]: what is available */
    BH_REMARK_NOT_CONVERGED, /* an average over an acceptance */
    BH_REMARK_NO_SIGNAL,     /* nothing of the signal lands in the acceptance */
    BH_REMARK_BEAM_STOPS,    /* in a layer `what`, before the end of the sample */
    BH_REMARK_STOPS_BEHIND,  /* likewise, behind it */
    BH_REMARK_STAYS_INSIDE,  /* what is to be detected stops on the axis of the arm */
    BH_REMARK_NOT_SLOWED,    /* energy loss is not computed in a layer: `what` */
    BH_REMARK_LIQUID         /* high [uA]: current on a liquid `what` without density_loss */
} bh_remark_kind;

typedef struct {
    bh_remark_kind kind;
    bh_mark at;
    const char *key;     /* of models: its path; of others the key alone, its path is added */
    const char *who;     /* nuclide, arm or target */
    const char *what;    /* model, caveat or bin */
    const char *setting; /* the first it concerns */
    double low, high;    /* [1] as the kind says, in the unit named there */
    double from, to;     /* [1] likewise */
} bh_remark;

/* Growing list.  One thread at a time. */
typedef struct bh_remarks bh_remarks;

/* An empty list, or NULL when there is no memory.  The caller owns it; NULL may be freed. */
bh_remarks *bh_remarks_new(void);
void bh_remarks_free(bh_remarks *remarks);

/* Notes `remark`; texts are copied.  One of the same kind about the same who and what at the same
 * line is widened (lowest low, highest high) and counted instead.  Those up to BH_REMARK_DEAD,
 * which concern the whole plan, are joined whatever the line when `from` is the same, and those
 * on structure models and backgrounds for all nuclides together. */
void bh_remarks_note(bh_remarks *remarks, const bh_remark *remark);

/* Notes all of `from`, in their order, as if they had been noted here; `file` is the name that
 * marks in the plan bear from now on. */
void bh_remarks_add(bh_remarks *remarks, const bh_remarks *from, const char *file);

/* Those that stand in lines `from` to `to` of the plan stand `by` lines further down; each moves
 * once until bh_remarks_moved. */
void bh_remarks_move(bh_remarks *remarks, int from, int to, int by);
void bh_remarks_moved(bh_remarks *remarks);

/* Adds them all to `diags` as warnings, in the words of base/sentences.h.  False when memory had
 * run out and some are missing. */
bool bh_remarks_say(const bh_remarks *remarks, bh_diags *diags);

#endif
