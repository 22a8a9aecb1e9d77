/* bench_table.c - 1,000 settings of 20 bins, point-like physics and everything on; growth; an edit.
 */
#include <string.h>
#include <sys/resource.h>

#include "beamhours/physics/process.h"
#include "beamhours/run/stepwise.h"
#include "bench.h"

/* What the run table promises on a machine of two ordinary cores, one of them used. */
static const double most_seconds = 0.5, most_plain = 0.25, most_edit = 2e-3;
static const double most_mib = 64, most_growth = 1.25;

enum { REPEATS = 3, LAYERS = 32 };

/* More of the arm, the beam and the models than the plan has by itself. */
struct extras {
    const char *arm, *beam, *models;
};

static const struct extras plain = {", momentum_bite: ±10 %", "",
                                    "energy_loss: none, radiative: none"};
static const struct extras full = {
    ", momentum_bite: ±10 %, energy_cut: 15 MeV, angle_resolution: 3 mrad, "
    "momentum_resolution: 0.1 %",
    ", momentum_spread: 0.02 %", "energy_loss: full"};

/* A bite that ends inside the acceptance in most settings. */
static const struct extras tight = {", energy_cut: 15 MeV, momentum_bite: ±1 %", "",
                                    "energy_loss: full"};

struct size {
    int settings, bins, windows;
    const struct extras *with;
};

static double peak_mib(void)
{
    struct rusage usage;
    getrusage(RUSAGE_SELF, &usage);
    return (double)usage.ru_maxrss / 1024;
}

static void write_plan(char *text, size_t room, struct size size)
{
    size_t n = (size_t)snprintf(
        text, room,
        "plan: 1\nbeam: {particle: electron, kinetic_energy: 855 MeV, current: 10 uA%s}\nmodels: "
        "{%s}\n"
        "target:\n  name: cell\n  scatterer: H\n  empty_target: {share: 10 %%}\n  layers:\n"
        "    - {material: liquid-hydrogen, thickness: 50 mm}\n",
        size.with->beam, size.with->models);
    for (int i = 0; i < size.windows; i++)
        n += (size_t)snprintf(text + n, room - n,
                              "    - {material: aluminium, thickness: 0.1 mm, role: window}\n");
    snprintf(text + n, room - n,
             "arms:\n  - {name: A, in_plane: ±28 mrad, out_of_plane: ±70 mrad, bins: %d,\n"
             "     dead_time: 5 us%s}\n"
             "settings:\n"
             "  - {name: K, angle: {from: 15 deg, to: 95 deg, count: %d}, goal: 1 %%}\n",
             size.bins, size.with->arm, size.settings);
}

static bh_plan *read_plan(struct size size, bh_material_library *library)
{
    char text[16384];
    write_plan(text, sizeof text, size);
    bh_diags *diags = bh_diags_new();
    bh_plan *plan = bh_plan_read(text, strlen(text), "bench", NULL, 0, library, diags);
    for (size_t i = 0; !plan && i < bh_diags_count(diags); i++)
        fprintf(stderr, "%s\n", bh_diags_at(diags, i)->text);
    bh_diags_free(diags);
    return plan;
}

/* Seconds of the fastest of some evaluations; -1 when there is none. */
static double seconds(struct size size, bh_material_library *library)
{
    bh_plan *plan = read_plan(size, library);
    double best = -1;
    for (int i = 0; plan && i < REPEATS; i++) {
        const double start = bench_now();
        bh_table *table = bh_table_new(plan, &(bh_evaluation){.bins = true}, NULL, NULL);
        const double took = bench_now() - start;
        if (!table)
            break;
        bh_table_free(table);
        best = best < 0 || took < best ? took : best;
    }
    bh_plan_free(plan);
    return best;
}

/* Mean seconds of one setting among many that is evaluated alone, as after an edit; what a target
 * and its particles need is ready. */
static double edit_with(bh_stepwise *steps)
{
    enum { FIRST = 300, EDITS = 20 };
    double start = bench_now();
    for (size_t i = 0; i <= EDITS; i++) {
        if (i == 1)
            start = bench_now();
        if (bh_stepwise_evaluate(steps, FIRST + 10 * i, true, NULL))
            return -1;
    }
    return (bench_now() - start) / EDITS;
}

static double edit(bh_material_library *library)
{
    bh_plan *plan = read_plan((struct size){1000, 20, 2, &full}, library);
    bh_workspace *workspace = bh_workspace_new();
    bh_results *results = bh_results_new();
    bh_stepwise *steps =
        plan && workspace && results
            ? bh_stepwise_new(plan, &(bh_evaluation){.workspace = workspace}, results, NULL)
            : NULL;
    const double took = steps ? edit_with(steps) : -1;
    bh_stepwise_free(steps);
    bh_results_free(results);
    bh_workspace_free(workspace);
    bh_plan_free(plan);
    return took;
}

/* Twice as many of one thing may take twice as long, and a little. */
static bool growth(const char *what, struct size small, struct size large,
                   bh_material_library *library)
{
    char line[64];
    snprintf(line, sizeof line, "twice the %s", what);
    return bench_goal(line, seconds(large, library) / seconds(small, library), 2 * most_growth,
                      "times as long");
}

/* Seconds of one evaluation of kinematics and cross section, many at once: what a sum cannot do
 * without. */
static double bare_evaluation(void)
{
    enum { BATCH = 15, ROUNDS = 4000 };
    bh_particle electron;
    bh_structure *proton = bh_structure_new("default", 1, 1, NULL);
    if (!proton || !bh_particle_find("electron", &electron))
        return -1;
    const bh_collision in = {electron.mass, 938.272, 855};
    const bh_encounter x = {&electron, -1, 1, 1, in.target, in.kinetic, proton, 0};
    const bh_process *elastic = bh_process_find("elastic");
    double angle[BATCH], sigma[BATCH], sum = 0, best = 1;
    bh_event event[BATCH];
    for (int i = 0; i < BATCH; i++)
        angle[i] = 0.6 + 0.01 * i;
    for (int repeat = 0; repeat < REPEATS; repeat++) {
        const double start = bench_now();
        for (int r = 0; r < ROUNDS; r++) {
            angle[r % BATCH] += 1e-9;
            bh_kinematics_batch(&in, BATCH, angle, BH_BRANCH_FAST, event);
            elastic->cross_section(&x, BATCH, event, sigma);
            sum += sigma[r % BATCH];
        }
        const double took = (bench_now() - start) / BATCH / ROUNDS;
        best = took < best ? took : best;
    }
    bh_structure_free(proton);
    return sum > 0 ? best : -1;
}

/* A bin of the large plan needs six sums (the signal where the arm stands, moved both ways, with
 * more and with less momentum; the windows), and a sum over a rectangle 5 x 3 points. */
enum { SUMS = 6, POINTS = 15 };

int main(void)
{
    static const char *const folders[] = {"materials", NULL};
    bh_material_library *library = bh_material_library_new(folders);
    const struct size large = {1000, 20, 2, &plain};
    const double took = seconds(large, library), call = bare_evaluation();
    const double all = seconds((struct size){1000, 20, 2, &full}, library), mib = peak_mib();
    const double bins = (double)large.settings * large.bins;
    printf("      a bin %.2f us; an evaluation %.0f ns, 6 sums of 15 points %.2f us\n",
           took * 1e6 / bins, call * 1e9, SUMS * POINTS * call * 1e6);
    bool met = bench_goal("time per bin over that of the calls it needs",
                          took / bins / (SUMS * POINTS * call), 4, "");
    met &= bench_goal("1,000 settings of 20 bins, 2 windows, background, sensitivities", took,
                      most_plain, "s");
    met &= bench_goal("the same with losses, radiation, resolutions", all, most_seconds, "s");
    met &= bench_goal("the same, largest memory", mib, most_mib, "MiB");
    met &= bench_goal("one setting of it edited", edit(library), most_edit, "s");
    met &= growth("settings", (struct size){200, 20, 2, &full}, (struct size){400, 20, 2, &full},
                  library);
    met &= growth("bins", (struct size){200, 100, 2, &full}, (struct size){200, 200, 2, &full},
                  library);
    met &= growth("layers", (struct size){200, 20, LAYERS, &full},
                  (struct size){200, 20, 2 * LAYERS, &full}, library);
    met &= bench_goal("one setting whose bite cuts through the acceptance",
                      seconds((struct size){200, 20, 2, &tight}, library) / 200, most_edit, "s");
    bh_material_library_free(library);
    return bench_end(met);
}
