/* unbuilt.c - warnings for what was written and would change a number, but is not computed yet. */
#include <math.h>
#include <string.h>

#include "beamhours/base/sentences.h"
#include "beamhours/plan/making.h"

static void warn(const bh_making *making, const bh_key *key, const void *in)
{
    const bh_section *section = in;
    bh_warn(&making->reading, bh_schema_mark(key, in), section, key->name, BH_WARN_NOT_BUILT);
}

/* Whether what was written differs from the default. */
static bool matters(const bh_key *key, const void *in)
{
    const void *member = (const unsigned char *)in + key->offset;
    bh_quantity usual = {.value = NAN};
    switch (key->kind) {
    case BH_KEY_QUANTITY:
        if (key->fallback && bh_quantity_parse(key->fallback, key->dimension, &usual, NULL))
            return true;
        return ((const bh_value *)member)->value != usual.value ||
               ((const bh_value *)member)->uncertainty != 0.0;
    case BH_KEY_LIST:
        return ((const bh_list *)member)->count > 0;
    case BH_KEY_TABLE:
        return ((const bh_pairs *)member)->count > 0;
    default:
        return true;
    }
}

/* NOLINTNEXTLINE(misc-no-recursion): as deep as the tables of keys are, five levels */
static void visit(const bh_making *making, const bh_schema *schema, const void *in)
{
    for (size_t i = 0; i < schema->count; i++) {
        const bh_key *key = &schema->keys[i];
        const unsigned char *member = (const unsigned char *)in + key->offset;
        if (!bh_schema_given(key, in))
            continue;
        if (key->flags & BH_KEY_NOT_BUILT) {
            if (matters(key, in))
                warn(making, key, in);
        } else if (key->kind == BH_KEY_MAPPING) {
            visit(making, key->children, member);
        } else if (key->kind == BH_KEY_LIST) {
            const bh_list *list = (const void *)member;
            const unsigned char *items = list->items;
            for (size_t k = 0; k < list->count; k++)
                visit(making, key->children, items + k * key->children->size);
        }
    }
}

/* Models: the built one, and `default` where nothing was written, say nothing. */
static void warn_model(const bh_making *making, const bh_word *word, const char *name,
                       const char *built)
{
    if (!word->given || !word->text || strcmp(word->text, built) == 0 ||
        strcmp(word->text, "default") == 0)
        return;
    bh_warn(&making->reading, word->at, &making->raw.models.section, name, BH_WARN_NOT_BUILT);
}

void bh_warn_not_built(const bh_making *making)
{
    const bh_raw_models *models = &making->raw.models;
    visit(making, &bh_schema_plan, &making->raw);
    warn_model(making, &models->coulomb, "coulomb", "plane-wave");
}
