/* curves.h - one column along a variable, for one or several models: what is listed or drawn. */
#ifndef BH_REPORT_CURVES_H
#define BH_REPORT_CURVES_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/text.h"
#include "beamhours/report/shown.h"

enum { BH_MOST_CURVES = 8 };

/* NULL where nothing was asked for. */
typedef struct {
    const char *setting; /* name; NULL: the first */
    const char *arm;     /* name; NULL: the setting's first */
    bh_against against;
    const char *structures; /* "kelly-2004,ye-2018": of the struck nuclide */
    const char *coulombs;   /* "plane-wave,default"; with several of both: each with each */
    int points;             /* as in bh_curve_request */
    bool centre;            /* likewise */
} bh_curves_request;

/* All have the same points.  Free with bh_curves_free. */
typedef struct {
    bh_against against;
    size_t count;
    const bh_setting *setting; /* the plan's */
    const bh_setting_arm *arm; /* the plan's */
    bh_curve *curve[BH_MOST_CURVES];
    char *name[BH_MOST_CURVES];       /* "kelly-2004", "kelly-2004 plane-wave"; NULL: the plan's
                                         own models */
    bh_plan *changed[BH_MOST_CURVES]; /* copies with another Coulomb model, or NULL */
} bh_curves;

/* Evaluates them; `plan` must outlive them.  BH_EDOMAIN with what would do (no such setting, arm or
 * model, an empty name, more than eight), BH_ENOMEM; `out` is then empty. */
BH_CHECKED bh_code bh_curves_make(const bh_plan *plan, const bh_curves_request *request,
                                  bh_curves *out, bh_error *err);
void bh_curves_free(bh_curves *curves);

/* As CSV: what varies, a column a curve, the settings that stand there. */
void bh_curves_csv(const bh_curves *curves, int shown, bh_text *out);

/* As text `width` terminal columns wide, with a plot of characters. */
void bh_curves_text(const bh_curves *curves, int shown, int width, bh_text *out);

#endif
