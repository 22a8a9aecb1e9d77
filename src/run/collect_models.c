/* collect_models.c - what the models behind the rates of an arm make them uncertain by. */
#include <math.h>
#include <string.h>

#include "beamhours/physics/validity.h"
#include "beamhours/run/collecting.h"
#include "beamhours/run/model_spread.h"

/* A nuclide counts from this share of the signal, or of what is subtracted over the signal. */
static const double worth_knowing = 2e-3, worth_subtracting = 1e-4;

/* A slow hadron or ion meets all the charge from outside, where form factors do not matter. */
static bool stays_outside(const bh_encounter *e)
{
    return e->beam->kind != BH_KIND_LEPTON && e->kinetic < bh_validity_nuclear(e).kinetic &&
           strcmp(bh_structure_row(e->structure)->name, "point") == 0;
}

static bh_cause model_cause(const bh_collecting *c, bh_cause_kind kind, const bh_encounter *e)
{
    const bh_models *models = &c->yielder->plan->models;
    bh_cause cause = {
        .kind = kind, .at = models->structure.at, .key = "models.structure", .z = e->z, .a = e->a};
    if (kind == BH_CAUSE_COULOMB || kind == BH_CAUSE_SCREENING) {
        cause.at = kind == BH_CAUSE_COULOMB ? models->coulomb.at : models->process.at;
        cause.key = kind == BH_CAUSE_COULOMB ? "models.coulomb" : "models.process";
        cause.a = 0; /* isotopes have it in common */
    }
    return cause;
}

/* Sets one effect on one part, the others not known before. */
static void set_one(bh_collecting *c, const bh_cause *cause, size_t part, double effect)
{
    double *to = isnan(effect) ? NULL : bh_collect(c, cause, (double)NAN);
    if (to)
        to[part] = effect;
}

/* Adds to one effect on one part. */
static void add_one(bh_collecting *c, const bh_cause *cause, size_t part, double effect)
{
    double *to = fabs(effect) > 1e-6 ? bh_collect(c, cause, 0) : NULL;
    if (to)
        to[part] += effect;
}

static void collect_part(bh_collecting *c, const bh_encounter *e, const bh_model_spread *spread,
                         size_t part, double share)
{
    bh_cause cause = model_cause(c, BH_CAUSE_STRUCTURE, e);
    const bool known = !stays_outside(e);
    if (known && spread->fit >= 0)
        set_one(c, &cause, part, share * spread->fit);
    if (known && spread->data > 0)
        set_one(c, &cause, part, share * spread->data);
    for (int i = 0; known && i < spread->count; i++) {
        cause.model = spread->name[i];
        set_one(c, &cause, part, share * spread->off[i]);
    }
    cause = model_cause(c, BH_CAUSE_COULOMB, e);
    add_one(c, &cause, part, share * spread->coulomb);
    cause = model_cause(c, BH_CAUSE_SCREENING, e);
    add_one(c, &cause, part, share * spread->screening);
}

/* What is subtracted as computed of a nuclide over the signal. */
static double subtracted(const bh_collecting *c, const bh_share *share, size_t part)
{
    const bh_part *p = &c->arm->yield->part[part];
    const double windows =
        c->arm->empty.measured ? 0 : (p->windows - p->beside[0]) * share->windows;
    return p->signal > 0 ? (windows + (p->other - p->beside[1]) * share->other) / p->signal : 0;
}

static void collect_in_part(bh_collecting *c, const bh_channel *channel, const bh_share *share,
                            size_t part)
{
    const bh_encounter *e = &channel->encounter;
    const double over = subtracted(c, share, part);
    const bool signal = share->signal > worth_knowing;
    if (!signal && !(over > worth_subtracting))
        return;
    bh_model_spread spread;
    bh_collect_fail(c, bh_model_spread_make(c->yielder->workspace, channel,
                                            c->arm->yield->part[part].polar, &spread, c->err));
    if (c->code)
        return;
    if (signal)
        collect_part(c, e, &spread, part, share->signal);
    const bh_cause cause = model_cause(c, BH_CAUSE_BACKGROUND, e);
    if (over > worth_subtracting && !stays_outside(e))
        add_one(c, &cause, part, over * hypot(bh_model_spread_size(&spread), spread.coulomb));
}

void bh_collect_models(bh_collecting *c)
{
    const bh_view *view = &c->arm->yield->view;
    const bh_struck_list *list = view->list;
    for (size_t n = 0; !c->code && n < list->count; n++) {
        bh_channels channels;
        bh_collect_fail(c,
                        bh_view_channels(c->yielder, view, &list->nuclides[n], &channels, c->err));
        for (size_t i = 0; !c->code && i < c->parts; i++)
            collect_in_part(c, &channels.list[0], &c->nuclides[n], i);
    }
}
