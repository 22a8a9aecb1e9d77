/* test_passage.c - where collisions happen, and what beam and detected particle cross and lose. */
#include "evaluated.h"

#include <gsl/gsl_integration.h>

#include "beamhours/run/crossings.h"
#include "beamhours/run/passage.h"
#include "beamhours/units/constants.h"

enum { MOST_SHEETS = 16, MOST_VERTICES = MOST_SHEETS * BH_VERTICES_PER_LAYER };

/* A way and what it needs to live. */
struct walk {
    struct evaluated e;
    bh_workspace *workspace;
    bh_sheet sheets[MOST_SHEETS];
    bh_way way;
    const bh_range *ranges[MOST_SHEETS];
    bh_leaver leaver;
    size_t count;
    bh_vertex vertices[MOST_VERTICES];
};

#define PLAN(beam, target, arm)                                                          \
    "plan: 1\nbeam: {" beam "}\ntarget:\n" target "arms:\n  - {name: A, in_plane: ±10 " \
    "mrad, out_of_plane: ±10 mrad" arm "}\nsettings:\n  - {name: K, angle: 30 deg}\n"
#define ELECTRONS "particle: electron, kinetic_energy: 855 MeV, current: 10 uA"
#define PROTONS   "particle: proton, kinetic_energy: 20 MeV, current: 1 uA"
#define CELL                                                                    \
    "  layers:\n    - {material: aluminium, thickness: 0.1 mm, role: window}\n" \
    "    - {material: liquid-hydrogen, thickness: 50 mm}\n"                     \
    "    - {material: aluminium, thickness: 0.2 mm, role: window}\n  scatterer: H\n"
#define FOIL "  layers:\n    - {material: carbon-12, areal_density: 20 mg/cm2}\n"

/* The way in `text`, with the nuclei of the layers that are samples, all of them seen. */
static struct walk *walk_through(const char *text, bool losing)
{
    struct walk *w = calloc(1, sizeof *w);
    ck_assert_ptr_nonnull(w);
    w->e = read_text(text);
    w->workspace = bh_workspace_new();
    const bh_setting *s = &w->e.plan->settings[0];
    const bh_way_request request = {
        .setting = s, .arm = &s->arms[0], .target = s->target, .losing = losing};
    bh_error err = {.code = BH_OK};
    ck_assert_uint_le(bh_way_sheets(s->target, &s->arms[0].arm), MOST_SHEETS);
    ck_assert_msg(!bh_way_make(w->workspace, &request, w->sheets, &w->way, &err), "%s", err.text);
    bh_occupied occupied[MOST_SHEETS] = {{0}};
    for (size_t i = 0; i < s->target->layer_count; i++) {
        occupied[i].to = w->sheets[i].thickness;
        if (s->target->layers[i].role == BH_ROLE_SAMPLE)
            occupied[i].nuclei = s->target->layers[i].areal_number.value;
    }
    w->count = bh_way_vertices(&w->way, occupied, w->vertices);
    w->leaver.ranges = w->ranges;
    ck_assert(!bh_leaver_make(w->workspace, &w->way, &w->way.beam, w->way.kinetic, &w->leaver));
    return w;
}

static void leave(struct walk *w)
{
    bh_workspace_free(w->workspace);
    done(&w->e);
    free(w);
}

static double entering(const struct walk *w, size_t layer)
{
    return w->way.sheets[layer].entering[BH_AS_IT_IS];
}

START_TEST(energy_is_conserved_layer_by_layer)
{
    struct walk *w = walk_through(PLAN(ELECTRONS, CELL, ""), true);
    double kinetic = 855;
    for (size_t i = 0; i < 3; i++) {
        const bh_sheet *s = &w->way.sheets[i];
        ck_assert_relative(entering(w, i), kinetic, 1e-15, "entering");
        kinetic -= bh_range_lost(s->range, kinetic, s->areal);
        ck_assert_relative(bh_way_leaving(&w->way, i), kinetic, 1e-12, "leaving");
    }
    /* collision losses 4.3596 at 200 MeV and 4.7726 MeV cm2/g at 3 GeV (Berger and Seltzer),
     * between them straight in the logarithm */
    ck_assert_relative(entering(w, 1) - entering(w, 2), 4.581 * 5 * 0.0708, 3e-3, "in hydrogen");
    ck_assert_uint_eq(w->way.stops, 3);
    ck_assert_double_gt(w->way.sheets[2].entering[BH_BOOSTED_UP], entering(w, 2));
    ck_assert_double_lt(w->way.sheets[2].entering[BH_BOOSTED_DOWN], entering(w, 2));
    leave(w);
}
END_TEST

START_TEST(vertices_share_the_nuclei_and_lie_in_the_sample)
{
    struct walk *w = walk_through(PLAN(ELECTRONS, CELL, ""), true);
    double weight = 0;
    for (size_t i = 0; i < w->count; i++) {
        const bh_vertex *v = &w->vertices[i];
        ck_assert_uint_eq(v->layer, 1);
        ck_assert(v->depth > 0 && v->depth < 5);
        ck_assert(v->kinetic[0] < entering(w, 1) && v->kinetic[0] > entering(w, 2));
        ck_assert_relative(v->before.path, 0.02699 + v->depth * w->way.sheets[1].areal / 5, 1e-3,
                           "crossed before");
        weight += v->weight;
    }
    ck_assert_relative(weight, 1, 1e-14, "all weights");
    ck_assert_relative(bh_vertices_mean(w->vertices, w->count),
                       (entering(w, 1) + entering(w, 2)) / 2, 1e-7, "mean");
    leave(w);
}
END_TEST

START_TEST(without_loss_nothing_is_lost)
{
    struct walk *w = walk_through(PLAN(ELECTRONS, CELL, ""), false);
    ck_assert_double_eq(entering(w, 2), 855);
    for (size_t i = 0; i < w->count; i++) {
        ck_assert_double_eq(w->vertices[i].kinetic[BH_AS_IT_IS], 855);
        ck_assert_double_eq(bh_leaver_left(&w->leaver, &w->vertices[i], 0.5, 700), 700);
        ck_assert_double_gt(w->vertices[i].before.lengths, 0);
    }
    leave(w);
}
END_TEST

/* Paths behind a vertex, in closed form. */
START_TEST(the_way_out)
{
    static const struct {
        const char *name, *plan;
        double angle;      /* [deg] */
        double slant;      /* path / areal density of the layer's rest */
        bool through_last; /* leaves through the last face */
    } rows[] = {
        {"forward", PLAN(PROTONS, FOIL, ""), 30, 1 / 0.8660254037844386, true},
        {"straight back", PLAN(PROTONS, FOIL, ""), 180, 1, false},
        {"backward", PLAN(PROTONS, FOIL, ""), 120, 2, false},
        {"tilted towards", PLAN(PROTONS, FOIL "  tilt: 30 deg\n", ""), 30, 1, true},
        {"tilted towards, past it", PLAN(PROTONS, FOIL "  tilt: 30 deg\n", ""), 90, 2, true},
        {"tilted away", PLAN(PROTONS, FOIL "  tilt: 30 deg\n", ", side: left"), 30, 2, true},
        {"tilted away, back", PLAN(PROTONS, FOIL "  tilt: 30 deg\n", ", side: left"), 90, 2, false},
    };
    for (int r = 0; r < COUNT(rows); r++) {
        struct walk *w = walk_through(rows[r].plan, true);
        for (size_t i = 0; i < w->count; i++) {
            const bh_vertex *v = &w->vertices[i];
            const double share = v->depth / w->way.sheets[0].thickness;
            const double rest = rows[r].through_last ? 1 - share : share;
            const bh_crossed after = bh_way_after(&w->way, v, rows[r].angle * BH_DEGREE);
            ck_assert_relative(after.path, 0.02 * rest * rows[r].slant, 1e-12, rows[r].name);
            ck_assert_relative(after.lengths * w->way.sheets[0].matter->length, after.path, 1e-12,
                               rows[r].name);
            const double left = bh_leaver_left(&w->leaver, v, rows[r].angle * BH_DEGREE, 15);
            ck_assert_relative(left, bh_range_after(w->ranges[0], 15, after.path), 1e-12,
                               rows[r].name);
        }
        leave(w);
    }
}
END_TEST

START_TEST(along_the_layers_nothing_comes_out)
{
    struct walk *w = walk_through(PLAN(PROTONS, FOIL, ""), true);
    ck_assert_double_eq(bh_leaver_left(&w->leaver, w->vertices, BH_PI / 2, 15), 0);
    leave(w);
}
END_TEST

#define WALL   "  wall: {radius: 30 mm, material: aluminium, thickness: 0.13 mm}\n"
#define WINDOW ", exit: [{material: kapton, thickness: 0.1 mm}, {material: air, thickness: 20 cm}]"

START_TEST(a_wall_is_met_where_it_is_nearer_than_the_face)
{
    struct walk *w = walk_through(PLAN(ELECTRONS, CELL WALL, WINDOW), true);
    const double hydrogen = w->way.sheets[1].areal / 5; /* g/cm3 */
    const double exits = w->way.sheets[4].areal + w->way.sheets[5].areal;
    const double angles[] = {10, 30, 60, 90, 120, 170};
    for (int a = 0; a < COUNT(angles); a++)
        for (size_t i = 0; i < w->count; i++) {
            const bh_vertex *v = &w->vertices[i];
            const double angle = angles[a] * BH_DEGREE, across = sin(angle), slant = cos(angle);
            const double to_face = slant > 0 ? (5 - v->depth) / slant : -v->depth / slant;
            const double to_wall = 3 / across;
            const double face = w->way.sheets[slant > 0 ? 2 : 0].areal / fabs(slant);
            const double inside = fmin(to_wall, to_face) * hydrogen;
            const double aluminium = to_wall < to_face ? w->way.sheets[3].areal / across : face;
            const bh_crossed after = bh_way_after(&w->way, v, angle);
            /* just behind the face the wall may still take a piece of the window away */
            if (fabs(to_wall - to_face) > 0.1)
                ck_assert_relative(after.path, inside + aluminium + exits, 1e-12, "path");
        }
    leave(w);
}
END_TEST

START_TEST(splitting_a_layer_changes_nothing)
{
    static const char whole[] = PLAN(PROTONS, FOIL, "");
    static const char split[] =
        PLAN(PROTONS,
             "  layers:\n    - {material: carbon-12, areal_density: 5 mg/cm2}\n"
             "    - {material: carbon-12, areal_density: 15 mg/cm2}\n",
             "");
    struct walk *one = walk_through(whole, true), *two = walk_through(split, true);
    ck_assert_relative(bh_way_leaving(&two->way, 1), bh_way_leaving(&one->way, 0), 1e-9, "beam");
    ck_assert_relative(bh_vertices_mean(two->vertices, two->count),
                       bh_vertices_mean(one->vertices, one->count), 1e-9, "mean");
    double left[2] = {0};
    for (int k = 0; k < 2; k++) {
        const struct walk *w = k ? two : one;
        for (size_t i = 0; i < w->count; i++)
            left[k] += w->vertices[i].weight *
                       bh_leaver_left(&w->leaver, &w->vertices[i], 140 * BH_DEGREE, 12);
    }
    ck_assert_relative(left[1], left[0], 1e-8, "left");
    leave(one);
    leave(two);
}
END_TEST

START_TEST(the_layer_a_beam_stops_in)
{
    struct walk *w = walk_through(
        PLAN("particle: alpha, kinetic_energy: 5 MeV, particle_rate: 1e6 /s",
             "  layers:\n    - {material: kapton, thickness: 10 um, role: window}\n"
             "    - {material: gold, areal_density: 50 mg/cm2}\n    - {material: gold, "
             "areal_density: 1 mg/cm2}\n",
             ""),
        true);
    ck_assert_uint_eq(w->way.stops, 1);
    ck_assert_uint_eq(w->count, 0);
    ck_assert_double_eq(bh_way_leaving(&w->way, 1), 0);
    leave(w);
}
END_TEST

START_TEST(current_thins_a_liquid)
{
    struct walk *w = walk_through(
        PLAN(ELECTRONS,
             "  layers:\n    - {material: liquid-hydrogen, thickness: 50 mm, density_loss: 1 "
             "%/uA}\n",
             ""),
        true);
    const bh_layer *l = &w->e.plan->settings[0].target->layers[0];
    ck_assert_relative(w->way.sheets[0].areal, 0.9 * l->areal_density.value, 1e-14, "density");
    leave(w);
}
END_TEST

START_TEST(a_ring_meets_a_tilted_target_all_around)
{
    static const char plan[] = "plan: 1\nbeam: {" PROTONS "}\ntarget:\n" FOIL
                               "  tilt: 30 deg\narms:\n  - {name: A, ring: {from: 20 deg, to: 40 "
                               "deg}}\nsettings:\n  - {name: K}\n";
    struct walk *w = walk_through(plan, true);
    double towards = 0, square = 0;
    for (size_t i = 0; i < w->count; i++) {
        towards += w->vertices[i].weight * w->vertices[i].towards;
        square += w->vertices[i].weight * w->vertices[i].towards * w->vertices[i].towards;
    }
    ck_assert_double_lt(fabs(towards), 1e-14);
    ck_assert_relative(square, 0.5, 1e-12, "mean square of a cosine");
    leave(w);
}
END_TEST

/* In the words of bremsstrahlung.h: PDG radiation lengths of aluminium and hydrogen, 24.01 and
 * 63.04 g/cm2 (Review of Particle Physics 2022). */
START_TEST(thickness_in_radiation_lengths)
{
    struct walk *w = walk_through(PLAN(ELECTRONS, CELL, ""), true);
    const bh_vertex *v = &w->vertices[w->count - 1];
    const bh_passage p = bh_crossed_passage(&v->before, &w->way.beam, 855);
    const double hydrogen = v->depth * w->way.sheets[1].areal / 5;
    ck_assert_relative(p.thickness, 0.02699 / 24.01 + hydrogen / 63.04, 1e-3, "radiation lengths");
    ck_assert(p.b > 1.33 && p.b < 1.43);
    ck_assert_relative(p.xi, 0.1535375 * (0.02699 * 13 / 26.98 + hydrogen / 1.00794), 1e-3, "xi");
    leave(w);
}
END_TEST

/* --- where particles leave by the wall from some depths, by a face from others --- */

#define WALLED CELL "  wall: {radius: 15 mm, material: aluminium, thickness: 0.3 mm}\n"

struct depth {
    const struct walk *walk;
    double angle;
};

/* What is crossed behind a depth of the sample, bent so that the mean of it is not that of a
 * straight line. */
static double bent(double depth, void *context)
{
    const struct depth *d = context;
    bh_vertex v = d->walk->vertices[0];
    v.depth = depth;
    return exp(-5 * bh_way_after(&d->walk->way, &v, d->angle).lengths);
}

START_TEST(crossings_are_cut_where_the_wall_begins)
{
    static const double angles[] = {10, 17.5, 20, 30, 45, 80, 91, 110, 150, 160, 175};
    struct walk *w = walk_through(PLAN(ELECTRONS, WALLED, ""), true);
    gsl_integration_workspace *points = gsl_integration_workspace_alloc(200);
    bh_crossing out[BH_MOST_CROSSINGS];
    for (int i = 0; i < COUNT(angles); i++) {
        struct depth d = {w, angles[i] * BH_DEGREE};
        gsl_function f = {bent, &d};
        double mean, error, sum = 0, weight = 0, before = 0;
        ck_assert(
            !gsl_integration_qag(&f, 0, 5, 0, 1e-8, 200, GSL_INTEG_GAUSS15, points, &mean, &error));
        const size_t count = bh_crossings_at(&w->way, w->vertices, w->count, d.angle, out);
        for (size_t k = 0; k < count; k++) {
            sum += out[k].weight * exp(-5 * out[k].after.lengths);
            before += out[k].weight * out[k].before.path;
            weight += out[k].weight;
        }
        ck_assert_relative(weight, 1, 1e-12, "weights");
        ck_assert_msg(fabs(sum - mean / 5) < 1e-6, "%g deg: %.9g, wanted %.9g", angles[i], sum,
                      mean / 5);
        ck_assert_relative(before, 0.1 * 0.2699 + 2.5 * 0.0708, 1e-9, "crossed before");
    }
    gsl_integration_workspace_free(points);
    leave(w);
}
END_TEST

START_TEST(the_wall_begins_at_a_depth)
{
    struct walk *w = walk_through(PLAN(ELECTRONS, WALLED, ""), true);
    /* 1.5 cm to the wall at 30 deg is 2.598 cm along the beam: 5 cm of sample, 0.02 of window */
    double depth[2];
    const double far = 1.5 / tan(30 * BH_DEGREE);
    bh_way_turning(&w->way, &w->vertices[0], 30 * BH_DEGREE, depth);
    ck_assert_double_eq_tol(depth[0], 5 - far, 1e-9);
    ck_assert_double_eq_tol(depth[1], 5 + 0.02 - far, 1e-9);
    bh_way_turning(&w->way, &w->vertices[0], 150 * BH_DEGREE, depth);
    ck_assert_double_eq_tol(depth[0], far, 1e-9);
    ck_assert_double_eq_tol(depth[1], far - 0.01, 1e-9);
    leave(w);
    w = walk_through(PLAN(ELECTRONS, CELL, ""), true);
    bh_way_turning(&w->way, &w->vertices[0], 0.5, depth);
    ck_assert(isnan(depth[0]) && isnan(depth[1]));
    leave(w);
}
END_TEST

int main(void)
{
    TCase *t = tcase_create("passage");
    tcase_add_test(t, energy_is_conserved_layer_by_layer);
    tcase_add_test(t, crossings_are_cut_where_the_wall_begins);
    tcase_add_test(t, the_wall_begins_at_a_depth);
    tcase_add_test(t, vertices_share_the_nuclei_and_lie_in_the_sample);
    tcase_add_test(t, without_loss_nothing_is_lost);
    tcase_add_test(t, the_way_out);
    tcase_add_test(t, along_the_layers_nothing_comes_out);
    tcase_add_test(t, a_wall_is_met_where_it_is_nearer_than_the_face);
    tcase_add_test(t, splitting_a_layer_changes_nothing);
    tcase_add_test(t, the_layer_a_beam_stops_in);
    tcase_add_test(t, current_thins_a_liquid);
    tcase_add_test(t, a_ring_meets_a_tilted_target_all_around);
    tcase_add_test(t, thickness_in_radiation_lengths);
    return run_suite("passage", t);
}
