/* explain_background.c - what the background of a row is made of, item by item. */
#include <math.h>

#include "beamhours/run/beneath.h"
#include "beamhours/run/explaining.h"
#include "beamhours/units/nuclide.h"

/* What gives less of the background is not listed by itself. */
static const double worth_a_line = 1e-4;

enum { ELASTIC = BH_BENEATH_TAIL - 2 }; /* beside what may lie beneath the lines */

/* One line to be. */
struct item {
    double rate; /* [Hz] */
    const char *name, *formula, *source, *remark;
    bool window;
    const void *cited; /* said of the first such item alone: formula, source and remark */
};

struct items {
    bh_explaining *x;
    size_t count;
    struct item *list;
};

const char *bh_explain_place(bh_explaining *x, const bh_contribution *c)
{
    char nuclide[8];
    const bh_layer *l = &x->setting->target->layers[c->presence->layer];
    return bh_explain_text(x, "%s in layer %zu (%s)",
                           bh_nuclide_name(c->struck->z, c->struck->a, nuclide),
                           c->presence->layer + 1, l->material->name);
}

static void add(struct items *items, const struct item *item)
{
    if (item->rate > 0)
        items->list[items->count++] = *item;
}

/* [Hz] from [ub/cm2]. */
static double rate_of(const bh_explaining *x, double ub)
{
    const bh_view *v = &x->arm->yield->view;
    return v->beam * ub * 1e-30 * v->arm->arm.efficiency.value;
}

/* --- by the named particle --- */

static void add_elastic(struct items *items, const bh_contribution *c)
{
    bh_explaining *x = items->x;
    if (c->presence->origin == BH_ORIGIN_SIGNAL)
        return;
    add(items, &(struct item){.rate = c->rate,
                              .name = bh_explain_place(x, c),
                              .formula = bh_explain_text(x, "by %s: %s ub/sr x %s /cm2, kept %s",
                                                         bh_structure_name(c->structure),
                                                         bh_explain_number(x, c->cross_section, ""),
                                                         bh_explain_number(x, c->seen, ""),
                                                         bh_explain_number(x, c->kept, "")),
                              .source = bh_explain_text(x, "%s", bh_structure_source(c->structure)),
                              .window = c->presence->origin == BH_ORIGIN_WINDOW});
}

/* What it is: of a row of background.h, of the hard tail, or elastic events. */
static void describe(const bh_view *view, int which, struct item *item)
{
    static const char tail[] = "hard tail", elastic[] = "elastic";
    const bh_background *row = bh_background_at(which);
    item->cited = row ? (const void *)row : which == ELASTIC ? elastic : tail;
    if (row) {
        item->formula = row->summary;
        item->source = row->source;
        item->remark = row->range;
    } else if (which == ELASTIC) {
        item->formula = "at the momentum of the beam, losing nothing in the target";
        item->source = view->process->source;
    } else {
        item->formula = "electrons that lost more than 3 % to radiation on it";
        item->source = "Mo & Tsai, Rev. Mod. Phys. 41 (1969) 205: peaking";
    }
}

static const char *process_name(int which)
{
    const bh_background *row = bh_background_at(which);
    return row ? row->name : which == ELASTIC ? "elastic" : "hard radiative tail";
}

/* What each nucleus in a place gives of something that is not elastic [ub]. */
static double beneath(bh_explaining *x, const bh_view *view, const bh_beneath_wanted *wanted)
{
    double *total = bh_workspace_scratch(x->evaluator.yielder.workspace)->totals;
    bh_error ignored;
    if (bh_beneath_presence(&x->evaluator.yielder, view, wanted, total, &ignored)) {
        x->failed = true; /* it worked when the row was made */
        return 0;
    }
    return total[x->bin];
}

static void add_beneath(struct items *items, const bh_presence *p, int which)
{
    bh_explaining *x = items->x;
    char nuclide[8];
    const bh_view *v = &x->arm->yield->view;
    const bh_struck *s = &v->list->nuclides[p->nuclide];
    const double each = beneath(x, v, &(bh_beneath_wanted){p, which});
    struct item item = {.rate =
                            rate_of(x, p->number * x->evaluator.yielder.paths[0][p->layer] * each),
                        .window = p->origin == BH_ORIGIN_WINDOW};
    if (!(item.rate > 0))
        return;
    item.name = bh_explain_text(x, "%s on %s in layer %zu", process_name(which),
                                bh_nuclide_name(s->z, s->a, nuclide), p->layer + 1);
    describe(v, which, &item);
    add(items, &item);
}

/* --- by other particles of the beam --- */

/* What each nucleus gives of elastic events with another particle [ub]. */
static double elastic_beside(bh_explaining *x, const bh_beside *b, const bh_struck *struck)
{
    double *total = bh_workspace_scratch(x->evaluator.yielder.workspace)->totals;
    bh_error ignored;
    if (bh_beside_elastic(&x->evaluator.yielder, b, struck, total, &ignored)) {
        x->failed = true;
        return 0;
    }
    return total[x->bin];
}

/* One process on the nuclei of one kind, in windows or in all else, whatever the layer. */
static void add_beside(struct items *items, const bh_beside *b, const bh_presence *like, int which)
{
    bh_explaining *x = items->x;
    char nuclide[8];
    const bh_struck_list *list = b->view.list;
    const bh_struck *s = &list->nuclides[like->nuclide];
    const bool window = like->origin == BH_ORIGIN_WINDOW;
    double number = 0;
    for (size_t i = 0; i < list->presence_count; i++) {
        const bh_presence *p = &list->presences[i];
        if (p->nuclide == like->nuclide && (p->origin == BH_ORIGIN_WINDOW) == window)
            number += p->number * x->evaluator.yielder.paths[0][p->layer];
    }
    const double each = which == ELASTIC ? elastic_beside(x, b, s)
                                         : beneath(x, &b->view, &(bh_beneath_wanted){like, which});
    struct item item = {.rate = rate_of(x, b->share * number * each), .window = window};
    if (!(item.rate > 0))
        return;
    item.name = bh_explain_text(x, "%s: %s on %s %s", b->view.beside, process_name(which),
                                bh_nuclide_name(s->z, s->a, nuclide),
                                window ? "in windows" : "outside windows");
    describe(&b->view, which, &item);
    add(items, &item);
}

/* Whether no presence before number i is of the same nuclide, and in windows or not alike. */
static bool is_first(const bh_struck_list *list, size_t i)
{
    const bh_presence *p = &list->presences[i];
    for (size_t k = 0; k < i; k++) {
        const bh_presence *q = &list->presences[k];
        if (q->nuclide == p->nuclide &&
            (q->origin == BH_ORIGIN_WINDOW) == (p->origin == BH_ORIGIN_WINDOW))
            return false;
    }
    return true;
}

static void add_others(struct items *items)
{
    bh_explaining *x = items->x;
    const bh_view *view = &x->arm->yield->view;
    const bh_struck_list *list = view->list;
    for (size_t k = 0; k < x->setting->beam.other_count; k++) {
        bh_beside b;
        bh_error ignored;
        if (!(x->setting->beam.fraction.value > 0))
            return;
        if (bh_beside_make(&x->evaluator.yielder, view, k, &b, &ignored)) {
            x->failed = true;
            return;
        }
        for (size_t i = 0; i < list->presence_count; i++) {
            if (!is_first(list, i))
                continue;
            add_beside(items, &b, &list->presences[i], ELASTIC);
            for (int w = BH_BENEATH_TAIL; w < 0 || bh_background_at(w); w++)
                add_beside(items, &b, &list->presences[i], w);
        }
    }
}

/* --- lines --- */

/* Whether an item that is shown before says what the items of its kind are. */
static bool is_cited(const struct items *items, size_t i, double least)
{
    for (size_t k = 0; k < i; k++)
        if (items->list[k].rate >= least && items->list[k].cited == items->list[i].cited)
            return items->list[i].cited;
    return false;
}

static void show(const struct items *items, size_t i, double least)
{
    bh_explaining *x = items->x;
    const struct item *item = &items->list[i];
    const bh_part *p = x->part;
    const bool again = is_cited(items, i, least);
    const double all = p->signal + p->windows + p->other;
    const char *share = bh_explain_number(x, 100 * item->rate / all, "%");
    bh_explain_add(
        x, (bh_line){.kind = BH_LINE_FACTOR,
                     .name = item->name,
                     .value = bh_explain_number(x, item->rate, "Hz"),
                     .formula = again ? NULL : item->formula,
                     .source = again ? NULL : item->source,
                     .remark = bh_explain_text(x, "%s of all events; %s%s%s", share,
                                               item->window ? "stays when the sample is out"
                                                            : "leaves with the sample",
                                               !again && item->remark ? "; " : "",
                                               !again && item->remark ? item->remark : "")});
}

/* Shows what is large, and the rest as one. */
static void show_all(const struct items *items)
{
    bh_explaining *x = items->x;
    const double all = x->part->windows + x->part->other, least = worth_a_line * all;
    double sum = 0, small = 0;
    size_t few = 0;
    for (size_t i = 0; i < items->count; i++) {
        const double rate = items->list[i].rate;
        sum += rate;
        few += rate < least;
        small += rate < least ? rate : 0;
        if (rate >= least)
            show(items, i, least);
    }
    if (few > 0)
        bh_explain_add(x, (bh_line){.kind = BH_LINE_FACTOR,
                                    .name = bh_explain_text(x, "and %zu smaller one%s", few,
                                                            few > 1 ? "s" : ""),
                                    .value = bh_explain_number(x, small, "Hz"),
                                    .formula = "each less than 0.01 % of the background"});
    if (x->bin && x->arm->yield->view.angle_rms > 0)
        bh_explain_add(x, (bh_line){.kind = BH_LINE_FACTOR,
                                    .name = "exchanged with other bins",
                                    .value = bh_explain_number(x, all - sum, "Hz"),
                                    .formula = "measured here less measured elsewhere: the angle "
                                               "is not known better"});
}

void bh_explain_background(bh_explaining *x, const bh_contribution *all, size_t count)
{
    const bh_view *view = &x->arm->yield->view;
    size_t rows = 2; /* elastic events and their tails */
    while (bh_background_at((int)rows - 2))
        rows++;
    const size_t room = count * rows * (1 + x->setting->beam.other_count);
    struct items items = {.x = x};
    items.list = bh_arena_take(x->arena, room + 1, sizeof *items.list);
    bh_explain_section(x, "Background");
    if (!items.list) {
        x->failed = true;
        return;
    }
    for (size_t i = 0; i < count && !view->blocked; i++)
        add_elastic(&items, &all[i]);
    for (size_t i = 0; i < count && !view->blocked; i++)
        for (int w = BH_BENEATH_TAIL; w < 0 || bh_background_at(w); w++)
            add_beneath(&items, &view->list->presences[i], w);
    if (!view->blocked)
        add_others(&items);
    show_all(&items);
    bh_explain_add(x,
                   (bh_line){.kind = BH_LINE_FACTOR,
                             .name = "background rate",
                             .value = bh_explain_number(x, x->part->windows + x->part->other, "Hz"),
                             .formula = "sum of these: all that lands between the edges of the "
                                        "arm and is not the signal"});
}
