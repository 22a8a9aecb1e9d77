/* collect_beside.c - what other particles in the beam make the signal of an arm uncertain by: their
 * rates are subtracted as computed where no empty target measures them. */
#include <math.h>
#include <stdio.h>

#include "beamhours/physics/validity.h"
#include "beamhours/run/beneath.h"
#include "beamhours/run/collecting.h"
#include "beamhours/run/model_spread.h"

static const double worth_subtracting = 1e-4; /* over the signal */

/* How many of them there are for a named particle. */
static size_t count_of(const bh_collecting *c)
{
    const bh_beam *beam = &c->setting->beam;
    const bh_part *whole = c->arm->yield->part;
    const bool pair = c->plan->first;
    const double all = whole->beside[1] + (c->arm->empty.measured ? 0 : whole->beside[0]);
    return !pair && all > worth_subtracting * whole->signal ? beam->other_count : 0;
}

/* Elastic events on nuclide number `n` of each nucleus [ub], over the whole arm. */
static double elastic_on(bh_collecting *c, const bh_beside *b, size_t n)
{
    double *total = bh_workspace_scratch(c->yielder->workspace)->totals;
    if (!c->code)
        bh_collect_fail(
            c, bh_beside_elastic(c->yielder, b, &b->view.list->nuclides[n], total, c->err));
    return c->code ? 0 : b->share * total[0];
}

static bool make(bh_collecting *c, size_t other, bh_beside *b)
{
    if (!c->code)
        bh_collect_fail(c, bh_beside_make(c->yielder, &c->arm->yield->view, other, b, c->err));
    return !c->code;
}

/* Nuclei of a nuclide that are seen in windows, or in all else. */
static double number_of(const bh_collecting *c, size_t nuclide, bool windows)
{
    const bh_struck_list *list = c->arm->yield->view.list;
    double sum = 0;
    for (size_t i = 0; i < list->presence_count; i++) {
        const bh_presence *p = &list->presences[i];
        if (p->nuclide == nuclide && (p->origin == BH_ORIGIN_WINDOW) == windows)
            sum += p->number * c->yielder->paths[0][p->layer];
    }
    return sum;
}

void bh_collect_beside(bh_collecting *c)
{
    const bh_struck_list *list = c->arm->yield->view.list;
    bh_beside b;
    for (size_t k = 0; k < count_of(c) && make(c, k, &b); k++)
        for (size_t i = 0; i < list->presence_count; i++) {
            const bh_presence *p = &list->presences[i];
            c->layers[p->layer].beside[p->origin == BH_ORIGIN_WINDOW ? 0 : 1] +=
                p->number * c->yielder->paths[0][p->layer] * elastic_on(c, &b, p->nuclide);
        }
}

/* --- causes --- */

/* What one kind of particle gives, nuclide by nuclide, over what all of them give. */
struct shares {
    double sum[2]; /* [ub/cm2] by all, from windows and from all else */
};

static struct shares sum_up(bh_collecting *c)
{
    const bh_struck_list *list = c->arm->yield->view.list;
    struct shares s = {{0, 0}};
    bh_beside b;
    for (size_t k = 0; k < count_of(c) && make(c, k, &b); k++)
        for (size_t n = 0; n < list->count; n++) {
            const double each = elastic_on(c, &b, n);
            s.sum[0] += number_of(c, n, true) * each;
            s.sum[1] += number_of(c, n, false) * each;
        }
    return s;
}

/* One nuclide struck by one kind of particle. */
struct struck_by {
    const bh_beside *beside;
    const bh_value *value;
    size_t nuclide;
    double share[2]; /* [1] of what all of them give, from windows and from all else */
};

/* What is subtracted of it as computed, over the signal. */
static double subtracted(const bh_collecting *c, const struct struck_by *of, size_t part)
{
    const bh_part *p = &c->arm->yield->part[part];
    const double windows = c->arm->empty.measured ? 0 : p->beside[0] * of->share[0];
    return p->signal > 0 ? (windows + p->beside[1] * of->share[1]) / p->signal : 0;
}

/* How uncertain the cross section is: form factors and plane waves; where nuclear forces are left
 * out, all of it. */
static double size_of(bh_collecting *c, const struct struck_by *of, size_t part)
{
    const bh_struck *struck = &of->beside->view.list->nuclides[of->nuclide];
    bh_channels channels = {.count = 0};
    bh_model_spread spread;
    bh_collect_fail(c, bh_view_channels(c->yielder, &of->beside->view, struck, &channels, c->err));
    if (c->code)
        return 0;
    const bh_encounter *e = &channels.list[0].encounter;
    if (e->beam->kind != BH_KIND_LEPTON)
        return e->kinetic > bh_validity_nuclear(e).kinetic ? 1 : 0;
    bh_collect_fail(c, bh_model_spread_make(c->yielder->workspace, &channels.list[0],
                                            c->arm->yield->part[part].polar, &spread, c->err));
    return c->code ? 0 : hypot(bh_model_spread_size(&spread), spread.coulomb);
}

static bh_cause cause_of(const bh_collecting *c, bh_cause_kind kind, const struct struck_by *of,
                         char key[BH_CAUSE_KEY])
{
    char member[32];
    snprintf(member, sizeof member, "others.%s", of->beside->view.beside);
    return bh_collect_cause(kind, of->value->at,
                            bh_collect_beam_key(c, of->value->at, member, key));
}

static void add(bh_collecting *c, const bh_cause *cause, size_t part, double effect)
{
    double *to = fabs(effect) > 1e-6 ? bh_collect(c, cause, 0) : NULL;
    if (to)
        to[part] += effect;
}

static void collect_one(bh_collecting *c, const struct struck_by *of)
{
    const bh_struck *struck = &of->beside->view.list->nuclides[of->nuclide];
    char key[BH_CAUSE_KEY];
    for (size_t i = 0; i < c->parts && !c->code; i++) {
        const double over = subtracted(c, of, i);
        bh_cause cause = cause_of(c, BH_CAUSE_OTHERS, of, key);
        add(c, &cause, i, over * bh_collect_relative(of->value));
        if (!(over > worth_subtracting))
            continue;
        cause = cause_of(c, BH_CAUSE_BACKGROUND, of, key);
        cause.z = struck->z;
        cause.a = struck->a;
        add(c, &cause, i, over * size_of(c, of, i));
    }
}

void bh_collect_beside_models(bh_collecting *c)
{
    const bh_view *view = &c->arm->yield->view;
    if (c->code || count_of(c) == 0)
        return;
    bh_collect_fail(c, bh_view_paths(c->yielder, view, view->list->target, &view->way, c->err));
    const struct shares all = sum_up(c);
    bh_beside b;
    for (size_t k = 0; k < count_of(c) && make(c, k, &b); k++)
        for (size_t n = 0; n < view->list->count; n++) {
            struct struck_by of = {
                .beside = &b, .value = &c->setting->beam.others[k].share, .nuclide = n};
            const double each = elastic_on(c, &b, n);
            for (int w = 0; w < 2; w++)
                of.share[w] = all.sum[w] > 0 ? number_of(c, n, w == 0) * each / all.sum[w] : 0;
            collect_one(c, &of);
        }
}
