/* plan.c - bytes to a plan: document, changes, reading, completing, checking. */
#include "beamhours/plan/plan.h"

#include <stdio.h>
#include <stdlib.h>

#include "beamhours/base/sentences.h"
#include "beamhours/plan/making.h"

static void check_version(const bh_making *making)
{
    const bh_value *version = &making->raw.plan;
    char text[32];
    if (!version->given || !(version->value < 1.0 || version->value > 1.0))
        return;
    (void)snprintf(text, sizeof text, "%.0f", version->value);
    bh_tell(making, version->at, &making->raw.section, "plan", BH_SAY_VERSION, text);
}

static bh_code make(bh_making *making)
{
    making->plan.title = making->raw.title;
    making->plan.notes = making->raw.notes;
    check_version(making);
    bh_make_plan_beam(making);
    if (bh_make_targets(making) || bh_make_arms(making) || bh_make_models(making) ||
        bh_make_settings(making) || bh_make_schedule(making))
        return BH_ENOMEM;
    bh_warn_not_built(making);
    return BH_OK;
}

static void read_document(bh_making *making, const bh_change *changes, size_t change_count)
{
    for (size_t i = 0; i < change_count; i++)
        bh_apply_change(making->document, &changes[i], i, &making->reading);
    const bh_node *root = bh_document_root(making->document);
    making->plan.file = bh_document_name(making->document);
    making->plan.document = making->document;
    if (bh_schema_read(&making->reading, &bh_schema_plan, root, &making->raw))
        return; /* already noted as lost */
    if (root->kind == BH_NODE_MAPPING && make(making))
        bh_diags_lose(making->reading.diags);
}

/* NOLINTNEXTLINE(readability-function-size): the arguments are few kinds of thing */
bh_plan *bh_plan_read(const char *bytes, size_t length, const char *name, const bh_change *changes,
                      size_t change_count, bh_material_library *library, bh_diags *diags)
{
    bh_making *making = calloc(1, sizeof *making);
    bh_arena *arena = bh_arena_new();
    const size_t before = bh_diags_errors(diags);
    if (making && arena) {
        making->reading = (bh_reading){.arena = arena, .diags = diags};
        making->library = library;
        making->document = bh_document_parse(bytes, length, name, diags);
        if (making->document)
            read_document(making, changes, change_count);
    } else {
        bh_diags_lose(diags);
    }
    bh_diags_sort(diags);
    if (bh_diags_errors(diags) == before)
        return &making->plan;
    if (making)
        bh_document_free(making->document);
    bh_arena_free(arena);
    free(making);
    return NULL;
}

void bh_plan_free(bh_plan *plan)
{
    bh_making *making = (bh_making *)(void *)plan; /* its first member */
    if (!making)
        return;
    bh_document_free(making->document);
    bh_arena_free(making->reading.arena);
    free(making);
}
