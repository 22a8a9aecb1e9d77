/* test_plan_faults.c - whichever call for memory fails, reading a plan ends in an error. */
#include "../suite.h"

#include "../faults.h"
#include "reading.h"

static const char plan[] =
    "plan: 1\n"
    "beam: {particle: muon-, momentum: 170 MeV/c, particle_rate: 3e5 /s, fraction: 60 %,\n"
    "       others: {electron: 30 %}}\n"
    "targets:\n"
    "  - name: full\n"
    "    layers: [{material: graphite, thickness: 1 mm}]\n"
    "    empty_target: {share: 10 %, use: hole}\n"
    "  - {name: hole, layers: [{material: aluminium, thickness: 1 mm}]}\n"
    "arms:\n"
    "  - {name: A, in_plane: ±20 mrad, out_of_plane: ±20 mrad, edges: [29 deg, 30 deg, 31 deg],\n"
    "     exit: [{material: air, thickness: 1 m}]}\n"
    "  - {name: M, solid_angle: 1 msr, angle: 40 deg}\n"
    "models: {structure: {12C: helm}}\n"
    "settings:\n"
    "  - {target: full, angle: [30 deg, 30.1 deg], beam: {fraction: 65 %}}\n"
    "  - {target: hole, arms: [{arm: A, q2: 0.0077 GeV2}], tilt: 3 deg}\n"
    "schedule: {tasks: [{name: optics, time: 8 h}]}\n";

START_TEST(memory_runs_out)
{
    const bh_change change = {"beam.fraction", "61 %"};
    long k = 0;
    bool hit = true;
    while (hit) {
        bh_diags *diags = bh_diags_new();
        static const char *const folders[] = {"materials", NULL};
        bh_material_library *library = bh_material_library_new(folders);
        fail_at(++k, false);
        bh_plan *made =
            bh_plan_read(plan, sizeof plan - 1, "plan.yaml", &change, 1, library, diags);
        hit = fault_hit;
        fail_at(0, false);
        const bool refused = made == NULL && bh_diags_errors(diags) > 0;
        ck_assert_msg(hit ? refused : made != NULL, "call %ld: %s", k,
                      made ? "a plan all the same" : "refused without a failure");
        bh_plan_free(made);
        bh_material_library_free(library);
        bh_diags_free(diags);
    }
    ck_assert_int_gt(k, 50);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("plan faults");
    tcase_set_timeout(tests, 120);
    tcase_add_test(tests, memory_runs_out);
    return run_suite("plan faults", tests);
}
