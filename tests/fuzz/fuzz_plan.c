/* fuzz_plan.c - no bytes crash the reader, and a plan that it accepts is whole. */
#include <math.h>
#include <stdint.h>
#include <stdlib.h>

#include "beamhours/plan/dump.h"
#include "beamhours/plan/plan.h"

int LLVMFuzzerTestOneInput(const uint8_t *data, size_t size);

static void ignore(void *to, const char *key)
{
    (void)to;
    (void)key;
}

static void ignore_end(void *to)
{
    (void)to;
}

static void ignore_text(void *to, const char *key, const char *text)
{
    (void)to;
    (void)key;
    (void)text;
}

static void ignore_integer(void *to, const char *key, long value)
{
    (void)to;
    (void)key;
    (void)value;
}

/* What readers of a plan rely on without asking. */
static void demand(const bh_plan *plan)
{
    for (size_t i = 0; i < plan->setting_count; i++) {
        const bh_setting *s = &plan->settings[i];
        if (!s->name || !s->target || !(s->beam.kinetic_energy.value > 0.0) ||
            !(s->beam.particle_rate.value > 0.0))
            abort();
        for (size_t k = 0; k < s->arm_count; k++)
            if (isnan(s->arms[k].angle.value) || s->arms[k].arm.bins < 1)
                abort();
    }
}

int LLVMFuzzerTestOneInput(const uint8_t *data, size_t size)
{
    static const char *const folders[] = {"materials", NULL};
    const bh_dump_sink sink = {ignore, ignore, ignore_end, ignore_text, ignore_integer};
    bh_material_library *library = bh_material_library_new(folders);
    bh_diags *diags = bh_diags_new();
    bh_plan *plan = bh_plan_read((const char *)data, size, "fuzz.yaml", NULL, 0, library, diags);
    if (plan) {
        demand(plan);
        bh_plan_dump(plan, &sink, NULL);
    } else if (bh_diags_errors(diags) == 0) {
        abort();
    }
    bh_plan_free(plan);
    bh_diags_free(diags);
    bh_material_library_free(library);
    return 0;
}
