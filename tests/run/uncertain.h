/* uncertain.h - plans with changes, and pieces of the uncertainty of a row, for tests. */
#ifndef TESTS_RUN_UNCERTAIN_H
#define TESTS_RUN_UNCERTAIN_H

#include "evaluated.h"

#include "beamhours/run/cause.h"

/* Reads a plan with changes and evaluates it. */
static inline struct evaluated with(const char *text, const bh_change *changes, size_t count,
                                    bool bins)
{
    static const char *const folders[] = {"materials", NULL};
    struct evaluated e = {.library = bh_material_library_new(folders), .diags = bh_diags_new()};
    e.plan = bh_plan_read(text, strlen(text), "plan.yaml", changes, count, e.library, e.diags);
    if (!e.plan)
        print_diags(e.diags);
    ck_assert_ptr_nonnull(e.plan);
    e.table = bh_table_new(e.plan, &(bh_evaluation){.bins = bins}, e.diags, NULL);
    ck_assert_ptr_nonnull(e.table);
    return e;
}

/* The uncertainty of a row from one kind of cause. */
static inline double from(const struct evaluated *e, size_t row, bh_cause_kind kind)
{
    const bh_effects effects = bh_table_effects(e->table, false, row);
    return bh_effects_of(bh_table_causes(e->table), &effects, kind);
}

#define BEAM_500 "plan: 1\nbeam: {particle: electron, kinetic_energy: 500 MeV, current: 10 uA}\n"
#define HYDROGEN                                                                       \
    "target: {name: t, scatterer: H, layers: [{material: liquid-hydrogen, thickness: " \
    "50 mm}]}\n"
#define ARM "arms: [{name: A, in_plane: ±20 mrad, out_of_plane: ±40 mrad}]\n"

#endif
