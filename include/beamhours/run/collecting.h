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

enum { BH_CAUSE_KEY = 256 }; /* room for the name of a key */

/* "beam.current" or, where a setting has its own, "settings.K1.beam.current"; "arms.A.efficiency";
 * "settings.K1.angle".  Each returns `key`. */
const char *bh_collect_beam_key(const bh_collecting *c, bh_mark at, const char *member,
                                char key[BH_CAUSE_KEY]);
const char *bh_collect_arm_key(const bh_collecting *c, const char *member, char key[BH_CAUSE_KEY]);
const char *bh_collect_setting_key(const bh_collecting *c, const char *member,
                                   char key[BH_CAUSE_KEY]);

/* A cause in the plan. */
bh_cause bh_collect_cause(bh_cause_kind kind, bh_mark at, const char *key);

/* Returns [1] the relative standard uncertainty of a value; 0 for a value of 0. */
double bh_collect_relative(const bh_value *v);

/* A cause whose effect is a sensitivity of each part, the member of bh_part at `sensitivity`
 * [bytes], times `by` [1], in its unit. */
void bh_collect_sensitive(bh_collecting *c, const bh_cause *cause, ptrdiff_t sensitivity,
                          double by);

/* A copy of a setting and its arm, in which one value is moved. */
typedef struct {
    bh_setting setting;
    bh_setting_arm arm;
    bh_value *value; /* in one of them */
} bh_moved;

/* A cause whose effect is found by evaluating the arm on both sides of the value, but not
 * below least [1], in its unit. */
void bh_collect_moved(bh_collecting *c, const bh_cause *cause, bh_moved *moved, double least);

/* Fills what each layer gives of the background by other particles in the beam [Hz], on the whole
 * arm; the yielder's paths are of the setting's target. */
void bh_collect_beside(bh_collecting *c);

/* The steps. */
void bh_collect_beam(bh_collecting *c);
void bh_collect_target(bh_collecting *c);
void bh_collect_arm(bh_collecting *c);
void bh_collect_readout(bh_collecting *c);
void bh_collect_models(bh_collecting *c);
void bh_collect_beside_models(bh_collecting *c); /* shares and cross sections of other particles */

#endif
