/* test_counted.c - what is counted under a resolution from all depths of a target. */
#include "evaluated.h"

#include "beamhours/physics/structure.h"
#include "beamhours/run/counted.h"
#include "beamhours/units/constants.h"

/* --- the spread of the beam behind matter, beam by beam --- */

enum { DEPTHS = 100, BEAMS = 801 };

/* A narrow arm and one layer across the beam. */
struct row {
    const char *particle, *material, *scatterer;
    int z, a;
    double mass, target;            /* [MeV] of the particle, of the nucleus */
    double kinetic, areal, density; /* [MeV] [g/cm2] [g/cm3] */
    double angle;                   /* [deg] */
    double spread, bite;            /* [1] rms, half */
    double below; /* [1] by which the bite is below what arrives from the middle */
};

#define MASS_C 11174.8624 /* [MeV] 12 u - 6 electrons */

static const struct row rows[] = {
    {"proton", "graphite", "12C", 6, 12, BH_MASS_PROTON, MASS_C, 30, 0.5, 2.21, 20, 0.003, 0.006,
     0},
    {"proton", "graphite", "12C", 6, 12, BH_MASS_PROTON, MASS_C, 30, 0.5, 2.21, 20, 0.003, 0.004,
     0.004},
    {"proton", "graphite", "12C", 6, 12, BH_MASS_PROTON, MASS_C, 30, 0.08, 2.21, 150, 0.006, 0.02,
     0.01},
    {"alpha", "graphite", "12C", 6, 12, BH_MASS_ALPHA, MASS_C, 60, 0.03, 2.21, 15, 0.002, 0.004, 0},
    {"electron", "liquid-hydrogen", "1H", 1, 1, BH_MASS_ELECTRON, BH_MASS_PROTON, 855, 0.708,
     0.0708, 60, 0.003, 0.005, 0},
};

/* What is scattered and lost as the program has it; what is counted is not. */
struct through {
    struct row row;
    struct evaluated e;
    bh_workspace *workspace;
    const bh_range *range;
    bh_channel channel;
};

/* Returns [MeV/c] with what momentum a particle arrives when the beam of `kinetic` [MeV] meets it
 * at share `at` of the layer. */
static double arrives(const struct through *t, double at, double kinetic)
{
    const double angle = t->row.angle * BH_DEGREE, behind = angle < BH_PI / 2 ? 1 - at : at;
    const bh_collision in = {t->row.mass, t->row.target,
                             bh_range_after(t->range, kinetic, at * t->row.areal)};
    bh_event e;
    ck_assert_int_eq(bh_kinematics_scattered(&in, angle, BH_BRANCH_FAST, &e, NULL), BH_OK);
    const double path = behind * t->row.areal / fabs(cos(angle));
    return bh_bite_momentum(t->row.mass, bh_range_after(t->range, e.scattered_kinetic, path));
}

static double weight_at(const struct through *t, double at)
{
    const double angle = t->row.angle * BH_DEGREE;
    bh_channel there = t->channel;
    double sigma, momentum;
    there.encounter.kinetic = bh_range_after(t->range, t->row.kinetic, at * t->row.areal);
    bh_channel_eval(&there, 1, &angle, &sigma, &momentum);
    return sigma;
}

static void write_plan(const struct row *r, double central, char *text, size_t size)
{
    snprintf(text, size,
             "plan: 1\nbeam: {particle: %s, kinetic_energy: %g MeV, current: 1 nA, "
             "momentum_spread: %g %%}\nmodels: {structure: point, radiative: none}\n"
             "target: {scatterer: %s, layers: [{material: %s, areal_density: %g g/cm2}]}\n"
             "arms: [{name: A, in_plane: ±0.1 mrad, out_of_plane: ±0.1 mrad, momentum_bite: ±%g "
             "%%}]\nsettings: [{name: K, angle: %g deg, time: 1 h, central_momentum: %.10g "
             "MeV/c}]\n",
             r->particle, r->kinetic, 100 * r->spread, r->scatterer, r->material, r->areal,
             100 * r->bite, r->angle, central);
}

static void make_ready(struct through *t)
{
    char text[1024];
    const struct row *r = &t->row;
    bh_error err = {.code = BH_OK};
    write_plan(r, 1, text, sizeof text);
    t->e = read_text(text);
    t->workspace = bh_workspace_new();
    const bh_setting *s = &t->e.plan->settings[0];
    const bh_substance in = {s->target->layers[0].material, r->density};
    t->range = bh_workspace_range(t->workspace, &s->beam.particle, &in, r->kinetic * 1.1, &err);
    ck_assert_msg(t->range != NULL, "%s", err.text);
    t->channel = (bh_channel){.process = bh_process_find("elastic"),
                              .encounter = {.beam = &s->beam.particle,
                                            .charge = s->beam.charge,
                                            .z = r->z,
                                            .a = r->a,
                                            .target = r->target,
                                            .kinetic = r->kinetic,
                                            .structure = bh_workspace_structure(
                                                t->workspace, "point", r->z, r->a, &err)}};
}

/* Depth by depth and beam by beam; the spread changes with what momentum particles arrive, not how
 * many. */
static double kept(const struct through *t, double central)
{
    const double mass = t->row.mass, p = bh_bite_momentum(mass, t->row.kinetic);
    double sum = 0, all = 0;
    for (int i = 0; i < DEPTHS; i++) {
        const double at = (i + 0.5) / DEPTHS, sigma = weight_at(t, at);
        double inside = 0, normal = 0;
        for (int k = 0; k < BEAMS; k++) {
            const double x = 12.0 * k / (BEAMS - 1) - 6, beam = p * (1 + x * t->row.spread);
            const double kinetic = beam * beam / (sqrt(beam * beam + mass * mass) + mass);
            const double off = arrives(t, at, kinetic) / central - 1;
            inside += fabs(off) < t->row.bite ? exp(-x * x / 2) : 0;
            normal += exp(-x * x / 2);
        }
        sum += sigma * inside / normal;
        all += sigma;
    }
    return sum / all;
}

START_TEST(a_spread_is_carried_through_matter)
{
    struct through t = {.row = rows[_i]};
    char text[1024];
    make_ready(&t);
    const double central = arrives(&t, 0.5, t.row.kinetic) * (1 - t.row.below);
    write_plan(&t.row, central, text, sizeof text);
    struct evaluated e = evaluate(text);
    ck_assert_relative(cell(&e, 0, BH_COL_KEPT), kept(&t, central), 1e-3, rows[_i].particle);
    done(&e);
    bh_workspace_free(t.workspace);
    done(&t.e);
}
END_TEST

/* --- where what is counted changes --- */

/* A foil with an arm on both sides of its plane: from either of two depths particles come into the
 * bite and leave it twice, which is one change more than there is room for. */
START_TEST(pieces_fit_into_their_room)
{
    static const char text[] =
        "plan: 1\nbeam: {particle: proton, kinetic_energy: 20 MeV, current: 1 nA}\n"
        "target: {scatterer: 197Au, layers: [{material: gold, areal_density: 500 mg/cm2}]}\n"
        "arms: [{name: A, in_plane: ±1 mrad, out_of_plane: ±1 mrad}]\n"
        "settings: [{name: K, angle: 30 deg}]\n";
    static bh_counted counted; /* large */
    struct evaluated e = read_text(text);
    bh_workspace *workspace = bh_workspace_new();
    bh_error err = {.code = BH_OK};
    bh_sheet sheets[4];
    const bh_range *ranges[4];
    bh_vertex vertices[BH_VERTICES_PER_LAYER];
    bh_way way;
    bh_leaver leaver = {.ranges = ranges};
    const bh_setting *s = &e.plan->settings[0];
    const bh_way_request how = {
        .setting = s, .arm = &s->arms[0], .target = s->target, .losing = true};
    ck_assert(!bh_way_make(workspace, &how, sheets, &way, &err));
    ck_assert(!bh_leaver_make(workspace, &way, &s->beam.particle, 21, &leaver));
    const bh_occupied all = {1, 0, sheets[0].thickness};
    ck_assert_uint_gt(bh_way_vertices(&way, &all, vertices), 0);
    counted.channel = (bh_channel){
        .process = bh_process_find("elastic"),
        .encounter = {.beam = &s->beam.particle,
                      .charge = 1,
                      .z = 79,
                      .a = 197,
                      .target = 183432.9,
                      .kinetic = 20,
                      .structure = bh_workspace_structure(workspace, "point", 79, 197, &err)}};
    counted.leaver = &leaver;
    counted.taking = (bh_taking){.cut = true, .mass = BH_MASS_PROTON, .rms = {.momentum = 1e-5}};
    counted.taking.bite = (bh_bite){.momentum_from = bh_bite_momentum(BH_MASS_PROTON, 6),
                                    .momentum_to = bh_bite_momentum(BH_MASS_PROTON, 10)};
    for (int k = 0; k < 2; k++)
        counted.vertices[counted.count++] =
            bh_way_vertex(&way, &vertices[0], sheets[0].thickness * (k ? 0.6 : 0.4));
    bh_interval pieces[2 * BH_COUNTED_PIECES];
    const bh_interval polar = {10 * BH_DEGREE, 170 * BH_DEGREE};
    const size_t n = bh_counted_pieces(&counted, polar, pieces);
    ck_assert_uint_gt(n, 13); /* seven changes and what lies between them */
    ck_assert_uint_le(n, BH_COUNTED_PIECES);
    for (size_t i = 0; i < n; i++) {
        ck_assert_double_lt(pieces[i].from, pieces[i].to);
        ck_assert_double_eq(pieces[i].from, i ? pieces[i - 1].to : 0);
    }
    ck_assert(isinf(pieces[n - 1].to));
    bh_workspace_free(workspace);
    done(&e);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("counted");
    tcase_set_timeout(tests, 60);
    tcase_add_loop_test(tests, a_spread_is_carried_through_matter, 0, COUNT(rows));
    tcase_add_test(tests, pieces_fit_into_their_room);
    return run_suite("counted", tests);
}
