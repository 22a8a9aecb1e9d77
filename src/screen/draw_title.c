/* draw_title.c - the first row: the plan's file, what its beam meets, whether it is saved. */
#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/schema/reading.h"
#include "beamhours/screen/drawing_parts.h"

static void append_quantity(bh_text *into, double value, bh_dimension dimension)
{
    char written[BH_QUANTITY_SIZE];
    bh_text_append(into, bh_quantity_text(value, dimension, written));
}

/* What the settings have of a quantity: one value, or the smallest and the largest. */
static void append_range(bh_text *into, const bh_plan *plan, double (*get)(const bh_beam *),
                         bh_dimension dimension)
{
    double low = INFINITY, high = -INFINITY;
    for (size_t i = 0; i < plan->setting_count; i++) {
        const double value = get(&plan->settings[i].beam);
        low = fmin(low, value);
        high = fmax(high, value);
    }
    append_quantity(into, low, dimension);
    if (high > low * (1 + 1e-9)) {
        bh_text_append(into, " to ");
        append_quantity(into, high, dimension);
    }
}

static double written_energy(const bh_beam *b)
{
    return b->energy_written.value;
}

static double kinetic_energy(const bh_beam *b)
{
    return b->kinetic_energy.value;
}

static double particle_rate(const bh_beam *b)
{
    return b->particle_rate.value;
}

static double current(const bh_beam *b)
{
    return b->current.value;
}

/* As written where all settings are written alike, else the kinetic energy. */
static void append_energy(bh_text *into, const bh_plan *plan)
{
    const char *key = plan->settings[0].beam.energy_key.text;
    for (size_t i = 1; key && i < plan->setting_count; i++) {
        const char *other = plan->settings[i].beam.energy_key.text;
        key = other && strcmp(other, key) == 0 ? key : NULL;
    }
    const bool momentum = key && strcmp(key, "momentum") == 0;
    append_range(into, plan, key ? written_energy : kinetic_energy,
                 momentum ? BH_DIM_MOMENTUM : BH_DIM_ENERGY);
    if (key && strcmp(key, "total_energy") == 0)
        bh_text_append(into, " total");
}

/* The layer's size under the key it was written with. */
static void append_layer(bh_text *into, const bh_layer *layer)
{
    const char *key = layer->size_key.text ? layer->size_key.text : "";
    bh_text_append(into, " on ");
    if (strcmp(key, "areal_density") == 0)
        append_quantity(into, layer->areal_density.value, BH_DIM_AREAL_DENSITY);
    else if (strcmp(key, "areal_number") == 0)
        append_quantity(into, layer->areal_number.value, BH_DIM_AREAL_NUMBER);
    else
        append_quantity(into, layer->thickness.value, BH_DIM_LENGTH);
    bh_text_appendf(into, " %s", layer->material->name);
}

/* electron 855 MeV, 20 uA on 5 cm liquid-hydrogen */
static void append_summary(const bh_plan *plan, bh_text *into)
{
    if (!plan->setting_count)
        return;
    const bool rate = plan->settings[0].beam.rate_written;
    bh_text_appendf(into, "%s ", plan->settings[0].beam.particle.name);
    append_energy(into, plan);
    bh_text_append(into, ", ");
    append_range(into, plan, rate ? particle_rate : current, rate ? BH_DIM_RATE : BH_DIM_CURRENT);
    for (size_t i = 0; plan->target_count && i < plan->targets[0].layer_count; i++) {
        const bh_layer *layer = &plan->targets[0].layers[i];
        if (layer->role != BH_ROLE_SAMPLE || layer->material->state == BH_STATE_VACUUM)
            continue;
        append_layer(into, layer);
        break;
    }
}

static const char *base_name(const char *path)
{
    const char *slash = strrchr(path, '/');
    return slash && slash[1] ? slash + 1 : path;
}

void bh_draw_title(const bh_model *model, const bh_arrangement *places, bh_canvas *canvas)
{
    char right[40];
    const size_t unsaved = bh_model_unsaved(model);
    const bh_outcome *o = model->now && model->now->of->plan ? model->now : model->kept;
    bh_spot spot = {places->title, 0, canvas->columns};
    if (unsaved)
        (void)snprintf(right, sizeof right, " %zu unsaved", unsaved);
    else
        (void)snprintf(right, sizeof right, " %s",
                       !model->edit   ? "shown only"
                       : model->fresh ? "new"
                                      : "saved");
    const int used = bh_text_columns(right, canvas->ascii);
    spot.width -= used;
    const int name = bh_canvas_put(canvas, spot, BH_LOOK_TITLE, base_name(model->file));
    bh_text text = {0};
    if (o && o->of->plan)
        append_summary(o->of->plan, &text);
    if (text.bytes)
        bh_canvas_put_cut(canvas, (bh_spot){places->title, name + 3, spot.width - name - 3},
                          model->trying ? BH_LOOK_TRIAL : BH_LOOK_PLAIN, text.bytes);
    bh_text_free(&text);
    (void)bh_canvas_put(canvas, (bh_spot){places->title, canvas->columns - used, used},
                        unsaved ? BH_LOOK_WARNING : BH_LOOK_QUIET, right);
}
