/* bench_report.c - a report of 200 settings, from the plan's text to the bytes of its file. */
#include <math.h>
#include <string.h>

#include "beamhours/report/report.h"
#include "bench.h"

enum { SETTINGS = 200, ROUNDS = 3 };

static const char head[] =
    "plan: 1\nbeam: {particle: electron, kinetic_energy: 900 MeV, current: 2 uA}\n"
    "target:\n  name: cell\n  layers:\n"
    "    - {material: aluminium, thickness: 0.1 mm, role: window}\n"
    "    - {material: liquid-hydrogen, thickness: 90 mm}\n"
    "    - {material: aluminium, thickness: 0.1 mm, role: window}\n"
    "  scatterer: H\n  empty_target: {share: 10 %}\n"
    "arms:\n  - {name: A, in_plane: ±20 mrad, out_of_plane: ±30 mrad, momentum_bite: ±5 %,\n"
    "     energy_cut: 15 MeV, bins: 4, dead_time: 10 us}\n"
    "every_setting: {goal: 1 %}\nsettings:\n";

static void write_plan(bh_text *text)
{
    bh_text_append(text, head);
    for (int i = 0; i < SETTINGS; i++)
        bh_text_appendf(text, "  - {name: K%d, q2: %.4f GeV2, beam: {kinetic_energy: %d MeV}}\n", i,
                        0.3 + 0.004 * i, 1300 + 5 * i);
    bh_text_append(text, "schedule: {start_up: 8 h, changes: {energy: 1 h, angle: 10 min}}\n");
}

/* Seconds of all of it, and the bytes made; below 0 when it fails. */
static double one_round(const bh_text *plan_text, bool pdf, size_t *length)
{
    static const char *const folders[] = {"materials", NULL};
    const double start = bench_now();
    bh_material_library *library = bh_material_library_new(folders);
    bh_diags *said = bh_diags_new();
    bh_plan *plan =
        bh_plan_read(plan_text->bytes, plan_text->length, "plan.yaml", NULL, 0, library, said);
    bh_table *table = plan ? bh_table_new(plan, &(bh_evaluation){.bins = true}, said, NULL) : NULL;
    bh_report report = {.arena = NULL};
    bh_text out = {0};
    bool made = false;
    const bh_report_request request = {.table = table, .version = "1", .command = "bench"};
    if (table && !bh_report_make(&request, &report, NULL))
        made = pdf ? !bh_paper_pdf(&report.paper, BH_PAGE_A4, &out, NULL)
                   : !bh_paper_html(&report.paper, BH_PAGE_A4, &out, NULL);
    *length = out.length;
    const double took = bench_now() - start;
    bh_text_free(&out);
    bh_report_free(&report);
    bh_table_free(table);
    bh_plan_free(plan);
    bh_diags_free(said);
    bh_material_library_free(library);
    return made ? took : -1.0;
}

static bool goal(const bh_text *plan, bool pdf, const char *what)
{
    size_t length = 0;
    double best = HUGE_VAL;
    for (int i = 0; i < ROUNDS && best >= 0.0; i++) {
        const double took = one_round(plan, pdf, &length);
        best = took < 0.0 ? -1.0 : fmin(best, took);
    }
    printf("      %s: %zu bytes\n", what, length);
    return bench_goal(what, best, 1.0, "s") && (pdf || length < 2u << 20);
}

int main(void)
{
    bh_text plan = {0};
    write_plan(&plan);
    bool met = goal(&plan, false, "200 settings with figures as HTML");
    met &= goal(&plan, true, "200 settings with figures as PDF");
    bh_text_free(&plan);
    return bench_end(met);
}
