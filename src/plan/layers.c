/* layers.c - layers: material, size in every unit, density. */
#include <math.h>

#include "beamhours/base/sentences.h"
#include "beamhours/plan/making.h"
#include "beamhours/schema/reading.h"
#include "beamhours/units/constants.h"

/* Beyond this a density is worth a warning [1]. */
#define DENSITY_APART 0.10

static double gas_density(const bh_making *making, const bh_raw_layer *raw,
                          const bh_material *material)
{
    const bool warm = raw->temperature.given;
    const bh_value *given = warm ? &raw->temperature : &raw->pressure;
    const char *name = warm ? "temperature" : "pressure";
    if (material->state != BH_STATE_GAS) {
        bh_tell(making, given->at, &raw->section, name, BH_SAY_NOT_A_GAS, name, material->name);
        return NAN;
    }
    if (raw->temperature.given != raw->pressure.given) {
        bh_tell(making, given->at, &raw->section, name, BH_SAY_GAS_HALF, name,
                warm ? "pressure" : "temperature");
        return NAN;
    }
    if (isnan(raw->temperature.value) || isnan(raw->pressure.value))
        return NAN; /* unreadable: the reader has said so */
    return bh_material_gas_density(material, raw->temperature.value, raw->pressure.value);
}

/* Far from the library's; gases are what they are pumped to. */
static void warn_density(const bh_making *making, const bh_raw_layer *raw,
                         const bh_material *material)
{
    const double apart = raw->density.value / material->density - 1.0;
    char given[BH_QUANTITY_SIZE], share[BH_QUANTITY_SIZE], usual[BH_QUANTITY_SIZE];
    if (material->state == BH_STATE_GAS || !(material->density > 0.0) ||
        !(fabs(apart) > DENSITY_APART))
        return;
    bh_warn(&making->reading, raw->density.at, &raw->section, "density", BH_WARN_DENSITY,
            bh_quantity_text(raw->density.value, BH_DIM_DENSITY, given),
            bh_quantity_text(round(fabs(apart) * 1e3) / 1e3, BH_DIM_SHARE, share),
            bh_quantity_text(material->density, BH_DIM_DENSITY, usual), material->name);
}

static void set_density(const bh_making *making, const bh_raw_layer *raw, bh_layer *layer)
{
    const bh_material *material = layer->material;
    layer->density = (bh_value){.value = material->density, .at = raw->material.at};
    if (raw->density.given && (raw->temperature.given || raw->pressure.given)) {
        const bool warm = raw->temperature.given;
        const bh_value *second = warm ? &raw->temperature : &raw->pressure;
        const char *name = warm ? "temperature" : "pressure";
        bh_tell(making, second->at, &raw->section, name, BH_SAY_TWO_OF_GROUP, "density", name);
    } else if (raw->density.given) {
        layer->density = raw->density;
        warn_density(making, raw, material);
    } else if (raw->temperature.given || raw->pressure.given) {
        layer->density.value = gas_density(making, raw, material);
    }
}

/* One of thickness, areal density and areal number gives the others. */
static void set_size(const bh_raw_layer *raw, bh_layer *layer)
{
    const double density = layer->density.value; /* [g/cm3] */
    const double per_gram = BH_AVOGADRO / layer->material->mean_atomic_mass;
    bh_value size = raw->thickness;
    double areal = size.value * density; /* [g/cm2] */
    const char *key = "thickness";
    if (raw->areal_density.given) {
        key = "areal_density";
        size = raw->areal_density;
        areal = size.value;
    } else if (raw->areal_number.given) {
        key = "areal_number";
        size = raw->areal_number;
        areal = size.value / per_gram;
    }
    const double relative = size.uncertainty / size.value;
    layer->size_key = (bh_word){.text = key, .given = size.given, .at = size.at};
    layer->thickness = layer->areal_density = layer->areal_number =
        (bh_value){.given = false, .at = size.at};
    layer->thickness.value = areal / density;
    layer->areal_density.value = areal;
    layer->areal_number.value = areal * per_gram;
    layer->thickness.uncertainty = relative * areal / density;
    layer->areal_density.uncertainty = relative * areal;
    layer->areal_number.uncertainty = relative * areal * per_gram;
    if (raw->areal_density.given)
        layer->areal_density = size;
    else if (raw->areal_number.given)
        layer->areal_number = size;
    else
        layer->thickness = size;
}

static void set_vacuum(const bh_making *making, const bh_raw_layer *raw, bh_layer *layer)
{
    static const char *const name[] = {"areal_density", "areal_number", "density", "temperature",
                                       "pressure"};
    const bh_value *const value[] = {&raw->areal_density, &raw->areal_number, &raw->density,
                                     &raw->temperature, &raw->pressure};
    for (size_t i = 0; i < sizeof value / sizeof value[0]; i++)
        if (value[i]->given)
            bh_tell(making, value[i]->at, &raw->section, name[i], BH_SAY_VACUUM, name[i]);
    layer->size_key =
        (bh_word){.text = "thickness", .given = raw->thickness.given, .at = raw->thickness.at};
    layer->thickness = raw->thickness;
}

static void make_layer(const bh_making *making, const bh_raw_layer *raw, bh_layer *layer)
{
    *layer = (bh_layer){
        .role = (bh_role)bh_schema_choice(raw->role.text, bh_words_role),
        .temperature = raw->temperature,
        .pressure = raw->pressure,
        .density_loss = raw->density_loss,
        .density = {.at = raw->section.at},
        .at = raw->section.at,
    };
    if (raw->material.text) {
        char path[BH_PATH_SIZE];
        bh_node_path(raw->section.node, "material", path);
        layer->material = bh_material_find(making->library, raw->material.text, raw->material.at,
                                           path, making->reading.diags);
    }
    const bool sized = raw->thickness.given || raw->areal_density.given || raw->areal_number.given;
    if (layer->material && layer->material->state == BH_STATE_VACUUM) {
        set_vacuum(making, raw, layer);
        return;
    }
    if (!sized && raw->section.node)
        bh_tell(making, raw->section.at, &raw->section, "thickness", BH_SAY_MISSING_GROUP,
                bh_schema_layer.name, "thickness, areal_density or areal_number");
    if (!layer->material)
        return;
    set_density(making, raw, layer);
    set_size(raw, layer);
}

bh_code bh_make_layers(const bh_making *making, const bh_list *raw, bh_layer **out, size_t *count)
{
    const bh_raw_layer *items = raw->items;
    *out = bh_arena_take(making->reading.arena, raw->count + 1, sizeof **out);
    if (!*out)
        return BH_ENOMEM;
    for (size_t i = 0; i < raw->count; i++)
        make_layer(making, &items[i], &(*out)[i]);
    *count = raw->count;
    return BH_OK;
}
