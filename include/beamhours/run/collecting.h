/* collecting.h - the uncertainties of one arm while they are collected. */
#ifndef BH_RUN_COLLECTING_H
#define BH_RUN_COLLECTING_H

#include "beamhours/run/systematic.h"

typedef struct {
    bh_systematics *with;
    bh_yielder *yielder;
    const bh_arm_hours *arm;
    const bh_setting *setting;
    const bh_setting_arm *plan;
    size_t parts;
    bh_share *layers, *nuclides; /* of the target */
    size_t count;                /* of causes, in `with` */
    bh_code code;                /* the first failure; later steps then do nothing */
    bh_error *err;
} bh_collecting;

/* Returns [1] the effects of a cause on the parts, all missing [1] at first.  NULL after a failure;
 * valid until the next call. */
double *bh_collect(bh_collecting *c, const bh_cause *cause, double missing);

/* A cause with the same effect [1] on all parts; nothing where it is 0 or not finite. */
void bh_collect_same(bh_collecting *c, const bh_cause *cause, double effect);

/* Notes a failure. */
void bh_collect_fail(bh_collecting *c, bh_code code);

/* The signal rates with `setting` and `arm` instead of the plan's, into signal [Hz]; no warnings.
 */
void bh_collect_signals(bh_collecting *c, const bh_setting *setting, const bh_setting_arm *arm,
                        double *signal);

/* The steps. */
void bh_collect_beam(bh_collecting *c);
void bh_collect_target(bh_collecting *c);
void bh_collect_arm(bh_collecting *c);
void bh_collect_readout(bh_collecting *c);
void bh_collect_models(bh_collecting *c);

#endif
