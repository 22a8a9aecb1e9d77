/* whereabouts.c - where in a target an arm sees nuclei, and the way of the beam to them. */
#include <math.h>
#include <string.h>

#include "beamhours/run/yield.h"
#include "beamhours/units/constants.h"

enum { PLACES = 3 };

static size_t larger(size_t a, size_t b)
{
    return a > b ? a : b;
}

/* The most layers of a target, sheets of a way, arms of a setting and vertices of a layer. */
struct most {
    size_t layers, sheets, arms, vertices;
};

static struct most most_of(const bh_plan *plan)
{
    struct most m = {1, 1, 1, BH_MOST_DEPTHS};
    size_t exits = 0;
    for (size_t s = 0; s < plan->setting_count; s++) {
        const bh_setting *setting = &plan->settings[s];
        m.arms = larger(m.arms, setting->arm_count);
        for (size_t a = 0; a < setting->arm_count; a++) {
            exits = larger(exits, setting->arms[a].arm.exit_count);
            if (setting->arms[a].arm.shape == BH_SHAPE_RING && setting->tilt.value != 0)
                m.vertices = BH_VERTICES_PER_LAYER;
        }
    }
    for (size_t t = 0; t < plan->target_count; t++)
        m.layers = larger(m.layers, plan->targets[t].layer_count);
    m.sheets = m.layers + 1 + exits;
    return m;
}

bh_code bh_places_prepare(bh_yielder *yielder, bh_arena *arena, bh_error *err)
{
    const struct most m = most_of(yielder->plan);
    yielder->most_sheets = m.sheets;
    yielder->layers = bh_arena_take(arena, m.layers, sizeof *yielder->layers);
    yielder->spans = bh_arena_take(arena, m.layers, sizeof *yielder->spans);
    yielder->occupied = bh_arena_take(arena, m.layers, sizeof *yielder->occupied);
    yielder->vertices = bh_arena_take(arena, m.layers * m.vertices, sizeof *yielder->vertices);
    yielder->sheets = bh_arena_take(arena, (m.arms + 2) * m.sheets, sizeof *yielder->sheets);
    yielder->spare = yielder->sheets ? yielder->sheets + m.arms * m.sheets : NULL;
    yielder->dummy = yielder->sheets ? yielder->spare + m.sheets : NULL;
    yielder->ranges = bh_arena_take(arena, m.sheets, sizeof(const bh_range *));
    bool made = yielder->layers && yielder->spans && yielder->occupied && yielder->vertices &&
                yielder->sheets && yielder->ranges;
    for (int i = 0; i < PLACES; i++) {
        yielder->paths[i] = bh_arena_take(arena, m.layers, sizeof(double));
        made = made && yielder->paths[i];
    }
    return made ? BH_OK : bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
}

static bool loses(const bh_plan *plan)
{
    const char *model = plan->models.energy_loss.text;
    return !model || strcmp(model, "none") != 0;
}

/* Room for the sheets of one way; an arm that is none of the setting's is a copy being tried. */
static bh_sheet *sheets_of(const bh_yielder *yielder, const bh_view *view, const bh_target *target)
{
    if (target != view->setting->target)
        return yielder->dummy;
    for (size_t a = 0; a < view->setting->arm_count; a++)
        if (&view->setting->arms[a] == view->arm)
            return yielder->sheets + a * yielder->most_sheets;
    return yielder->spare;
}

bh_code bh_view_way(bh_yielder *yielder, const bh_view *view, const bh_target *target, bh_way *way,
                    bh_error *err)
{
    bh_sheet *sheets = sheets_of(yielder, view, target);
    const bh_way_request request = {.setting = view->setting,
                                    .arm = view->arm,
                                    .target = target,
                                    .losing = loses(yielder->plan)};
    return bh_way_make(yielder->workspace, &request, sheets, way, err);
}

/* How much of each layer is seen, by the arm as it stands and (sensitivities) moved both ways. */
bh_code bh_view_paths(bh_yielder *yielder, const bh_view *view, const bh_target *target,
                      const bh_way *way, bh_error *err)
{
    const bh_extent *seen = &view->arm->arm.target_view;
    const size_t count = target->layer_count;
    for (size_t l = 0; l < count; l++)
        yielder->layers[l] = (bh_seen_layer){.thickness = target->layers[l].thickness.value,
                                             .sample = target->layers[l].role == BH_ROLE_SAMPLE};
    static const double by[PLACES] = {0, -BH_STEP_ANGLE, BH_STEP_ANGLE};
    bh_code code = BH_OK;
    for (int i = 0; !code && i < PLACES; i++) {
        const bh_seen_view how = {.limited = seen->given,
                                  .from = seen->from,
                                  .to = seen->to,
                                  .angle = fmin(fmax(view->axis + by[i], 0), BH_PI),
                                  .tilt = view->setting->tilt.value};
        code = bh_seen_paths(&how, count, yielder->layers, yielder->paths[i], err);
        if (!code && i == 0)
            code = bh_seen_spans(&how, count, yielder->layers, yielder->spans, err);
        for (size_t l = 0; !code && l < count; l++)
            yielder->paths[i][l] *=
                l < way->stops ? bh_density_left(&target->layers[l], &view->setting->beam) : 0;
    }
    return code;
}

size_t bh_view_vertices(bh_yielder *yielder, const bh_way *way, const bh_nuclei *nuclei)
{
    for (size_t l = 0; l < way->layer_count; l++)
        yielder->occupied[l] =
            (bh_occupied){.nuclei = 0, .from = yielder->spans[l].from, .to = yielder->spans[l].to};
    for (size_t i = 0; i < nuclei->list->presence_count; i++) {
        const bh_presence *p = &nuclei->list->presences[i];
        const bool meant = p->nuclide == nuclei->nuclide &&
                           (nuclei->all || p->origin == nuclei->origin) &&
                           (!nuclei->only || p == nuclei->only);
        if (meant)
            yielder->occupied[p->layer].nuclei += p->number * yielder->paths[0][p->layer];
    }
    return bh_way_vertices(way, yielder->occupied, yielder->vertices);
}
