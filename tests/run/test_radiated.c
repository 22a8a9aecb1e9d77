/* test_radiated.c - the radiative factor over angles and cuts, and the hard tail behind it. */
#include "evaluated.h"

#include "beamhours/physics/radiative_tail.h"
#include "beamhours/run/elastic_tail.h"
#include "beamhours/run/radiated.h"
#include "beamhours/units/constants.h"

enum { MOST_SHEETS = 8, MOST_VERTICES = MOST_SHEETS * BH_VERTICES_PER_LAYER };

/* A beam on the first nuclide of a target, and the way to an arm. */
struct scene {
    struct evaluated e;
    bh_workspace *workspace;
    bh_sheet sheets[MOST_SHEETS];
    bh_way way;
    bh_vertex vertices[MOST_VERTICES];
    bh_radiated_request request;
};

#define PLAN(beam, layers)                                                        \
    "plan: 1\nbeam: {" beam "}\ntarget:\n  layers:\n" layers "arms:\n  - {name: " \
    "A, in_plane: ±10 mrad, out_of_plane: ±10 mrad}\nsettings:\n  - {name: K, angle: 30 deg}\n"
#define ELECTRONS "particle: electron, total_energy: 855 MeV, current: 10 uA"
#define POSITRONS "particle: positron, total_energy: 855 MeV, current: 10 uA"
#define MUONS     "particle: muon-, momentum: 210 MeV/c, particle_rate: 1e6 /s"
#define CELL                                                         \
    "    - {material: aluminium, thickness: 0.1 mm, role: window}\n" \
    "    - {material: liquid-hydrogen, thickness: 100 mm}\n"         \
    "    - {material: aluminium, thickness: 0.2 mm, role: window}\n  scatterer: H\n"
#define SLOW "particle: electron, total_energy: 100 MeV, current: 10 uA"
#define RADIATOR                                                \
    "    - {material: gold, thickness: 0.3 mm, role: window}\n" \
    "    - {material: carbon-12, areal_density: 1 ug/cm2}\n  scatterer: 12C\n"
#define BEHIND                                                  \
    "    - {material: hydrogen-gas, areal_density: 1 ug/cm2}\n" \
    "    - {material: gold, thickness: 0.2 mm, role: window}\n  scatterer: H\n"
#define FOIL "    - {material: carbon-12, areal_density: 1 ug/cm2}\n"

static struct scene *set_scene(const char *text, int z, int a)
{
    struct scene *s = calloc(1, sizeof *s);
    ck_assert_ptr_nonnull(s);
    s->e = read_text(text);
    s->workspace = bh_workspace_new();
    const bh_setting *setting = &s->e.plan->settings[0];
    const bh_way_request how = {
        .setting = setting, .arm = &setting->arms[0], .target = setting->target, .losing = true};
    bh_error err = {.code = BH_OK};
    ck_assert_msg(!bh_way_make(s->workspace, &how, s->sheets, &s->way, &err), "%s", err.text);
    bh_occupied occupied[MOST_SHEETS] = {{0}};
    for (size_t i = 0; i < setting->target->layer_count; i++) {
        const bh_layer *layer = &setting->target->layers[i];
        occupied[i].to = s->sheets[i].thickness;
        occupied[i].nuclei = layer->role == BH_ROLE_SAMPLE ? layer->areal_number.value : 0;
    }
    s->request.count = bh_way_vertices(&s->way, occupied, s->vertices);
    s->request.vertices = s->vertices;
    s->request.way = &s->way;
    s->request.model = bh_radiative_find("default");
    s->request.signal = true;
    double mass = 0;
    for (size_t l = 0; l < setting->target->layer_count; l++)
        for (size_t i = 0; i < setting->target->layers[l].material->count; i++) {
            const bh_constituent *part = &setting->target->layers[l].material->parts[i];
            mass = part->z == z && part->a == a ? part->mass : mass;
        }
    s->request.channel = (bh_channel){
        .process = bh_process_find("elastic"),
        .encounter = {.beam = &setting->beam.particle,
                      .charge = setting->beam.charge,
                      .z = z,
                      .a = a,
                      .target = mass,
                      .kinetic = bh_vertices_mean(s->vertices, s->request.count),
                      .structure = bh_workspace_structure(s->workspace, "default", z, a, &err)}};
    s->request.line = s->request.channel;
    s->request.gate = (bh_gate){.cut = 10, .to = HUGE_VAL, .given = true};
    s->request.polar = (bh_interval){25 * BH_DEGREE, 35 * BH_DEGREE};
    return s;
}

static void leave(struct scene *s)
{
    bh_workspace_free(s->workspace);
    done(&s->e);
    free(s);
}

static double applied(const bh_radiated *x, double angle)
{
    double value = 1;
    bh_radiated_apply(x, BH_AS_IT_IS, 1, &angle, &value);
    return value;
}

static double line_at(const struct scene *s, double angle)
{
    bh_event event;
    ck_assert(!bh_channel_event(&s->request.channel, angle, &event, NULL));
    return event.scattered_kinetic;
}

/* Polynomials against the same without them. */
START_TEST(polynomials_are_exact_enough)
{
    static const struct {
        const char *name, *plan;
        int z, a;
        double from, to;    /* [deg] */
        double cut, bottom; /* [MeV]; the second below the line at the middle */
        double tolerance;
    } rows[] = {
        {"narrow, cut", PLAN(ELECTRONS, CELL), 1, 1, 28, 32, 10, 0, 1e-6},
        {"wide, cut", PLAN(ELECTRONS, CELL), 1, 1, 15, 75, 10, 0, 2e-4},
        {"backwards", PLAN(ELECTRONS, CELL), 1, 1, 120, 179, 5, 0, 1e-4},
        {"small cut", PLAN(ELECTRONS, CELL), 1, 1, 20, 60, 0.5, 0, 1e-4},
        {"cut of most of the energy", PLAN(ELECTRONS, CELL), 1, 1, 20, 40, 300, 0, 2e-5},
        {"bite", PLAN(ELECTRONS, CELL), 1, 1, 28, 32, HUGE_VAL, 40, 1e-5},
        {"bite and cut", PLAN(ELECTRONS, CELL), 1, 1, 25, 35, 40, 45, 1e-5},
        {"muons", PLAN(MUONS, CELL), 1, 1, 20, 100, 5, 0, 1e-5},
        {"carbon", PLAN(POSITRONS, FOIL), 6, 12, 20, 80, 2, 0, 2e-5},
    };
    for (int r = 0; r < COUNT(rows); r++) {
        struct scene *s = set_scene(rows[r].plan, rows[r].z, rows[r].a);
        bh_radiated x;
        bh_radiated_detail at;
        const double from = rows[r].from * BH_DEGREE, to = rows[r].to * BH_DEGREE;
        s->request.polar = (bh_interval){from, to};
        s->request.gate.cut = rows[r].cut;
        if (rows[r].bottom > 0)
            s->request.gate.from = line_at(s, (from + to) / 2) - rows[r].bottom;
        bh_radiated_make(&s->request, &x);
        ck_assert(!x.idle);
        for (int i = 0; i <= 40; i++) {
            const double angle = from + (to - from) * i / 40;
            ck_assert(bh_radiated_at(&s->request, angle, &at));
            ck_assert_relative(applied(&x, angle), at.factor, rows[r].tolerance, rows[r].name);
            ck_assert(at.factor > 0 && at.factor < 1.1);
        }
        leave(s);
    }
}
END_TEST

/* Every part by itself, at one vertex, as its own header says. */
START_TEST(the_factor_is_its_parts)
{
    struct scene *s = set_scene(PLAN(ELECTRONS, CELL), 1, 1);
    bh_radiated_detail at;
    s->request.count = 1;
    ck_assert(bh_radiated_at(&s->request, 0.5, &at));
    const bh_encounter *e = &s->request.channel.encounter;
    double internal;
    s->request.model->factor(e, 10, 1, &at.event, &internal);
    const bh_crossed after = bh_way_after(&s->way, &s->vertices[0], 0.5);
    const bh_external x = {.incident = e->kinetic + e->beam->mass,
                           .scattered = at.event.scattered_kinetic + e->beam->mass,
                           .cut = 10,
                           .before = bh_crossed_passage(&s->vertices[0].before, e->beam, 855),
                           .after = bh_crossed_passage(&after, e->beam, 700)};
    ck_assert_relative(at.internal_factor, internal, 1e-12, "internal");
    ck_assert_relative(at.external, bh_external_kept(&x), 1e-12, "external");
    ck_assert_relative(at.ionisation, bh_ionisation_kept(&x), 1e-5, "collisions");
    ck_assert_relative(at.factor, internal * at.external * at.ionisation, 1e-14, "all");
    ck_assert_relative(at.after, after.lengths, 1e-12, "radiation lengths");
    leave(s);
}
END_TEST

START_TEST(a_wider_cut_keeps_more)
{
    static const char *const plans[] = {PLAN(ELECTRONS, CELL), PLAN(POSITRONS, CELL),
                                        PLAN(MUONS, CELL)};
    for (int p = 0; p < COUNT(plans); p++) {
        struct scene *s = set_scene(plans[p], 1, 1);
        double before = 0;
        for (double cut = 0.2; cut < 90; cut *= 1.3) {
            bh_radiated x;
            s->request.gate.cut = cut;
            bh_radiated_make(&s->request, &x);
            const double now = applied(&x, 0.5);
            ck_assert_msg(now > before, "%g MeV keeps %.9g after %.9g", cut, now, before);
            before = now;
        }
        leave(s);
    }
}
END_TEST

/* The tighter of cut and bite at each angle. */
START_TEST(the_tighter_edge_counts)
{
    struct scene *s = set_scene(PLAN(ELECTRONS, CELL), 1, 1);
    bh_radiated_detail at, tight;
    s->request.gate.from = line_at(s, 0.5) - 20;
    ck_assert(bh_radiated_at(&s->request, 0.5, &at));
    ck_assert_relative(at.cut, 10, 1e-10, "cut");
    ck_assert(!at.by_bite);
    s->request.gate.cut = 30;
    ck_assert(bh_radiated_at(&s->request, 0.5, &at));
    ck_assert_relative(at.cut, 20, 1e-10, "bite");
    ck_assert(at.by_bite);
    s->request.gate = (bh_gate){.cut = 20, .to = HUGE_VAL, .given = true};
    ck_assert(bh_radiated_at(&s->request, 0.5, &tight));
    ck_assert_relative(at.factor, tight.factor, 1e-12, "the same loss allowed");
    s->request.gate.from = line_at(s, 0.5) + 1; /* the line itself is outside */
    ck_assert(bh_radiated_at(&s->request, 0.5, &at));
    ck_assert_double_eq(at.factor, 0);
    leave(s);
}
END_TEST

START_TEST(idle_where_nothing_radiates)
{
    struct scene *s = set_scene(PLAN(ELECTRONS, CELL), 1, 1);
    bh_radiated x;
    s->request.model = bh_radiative_find("none");
    bh_radiated_make(&s->request, &x);
    ck_assert(x.idle);
    ck_assert_double_eq(applied(&x, 0.5), 1);
    s->request.model = bh_radiative_find("default");
    s->request.gate.given = false;
    bh_radiated_make(&s->request, &x);
    ck_assert(x.idle);
    leave(s);
    s = set_scene(PLAN("particle: proton, kinetic_energy: 20 MeV, current: 1 uA", FOIL), 6, 12);
    bh_radiated_make(&s->request, &x);
    ck_assert(x.idle);
    ck_assert_double_eq(bh_elastic_tail(&s->request, 0.5, 0.1, 1), 0);
    leave(s);
}
END_TEST

/* What background leaves between two edges, and what is far below both. */
START_TEST(between_two_edges)
{
    struct scene *s = set_scene(PLAN(ELECTRONS, CELL), 1, 1);
    bh_radiated x, wide, narrow;
    const double line = line_at(s, 0.5);
    s->request.polar = (bh_interval){0.49, 0.51};
    s->request.signal = false;
    s->request.gate.cut = HUGE_VAL;
    s->request.gate.from = line - 18;
    bh_radiated_make(&s->request, &wide);
    s->request.gate.from = line - 8;
    bh_radiated_make(&s->request, &narrow);
    s->request.gate.from = line - 18;
    s->request.gate.to = line - 8;
    bh_radiated_make(&s->request, &x);
    ck_assert_relative(applied(&x, 0.5), applied(&wide, 0.5) - applied(&narrow, 0.5), 1e-6,
                       "between");
    s->request.gate.from = line - 300;
    s->request.gate.to = line - 200;
    bh_radiated_make(&s->request, &x);
    ck_assert_double_eq(applied(&x, 0.5), 0); /* the hard tail's */
    leave(s);
}
END_TEST

/* The hard tail goes on where the soft photons end: photons of the nucleus, and most of all those
 * from the matter before it. */
START_TEST(soft_and_hard_tail_meet)
{
    static const struct {
        const char *plan;
        int z, a;
        double low, high; /* [MeV] lost, soft and hard */
        double tolerance;
    } rows[] = {{PLAN(ELECTRONS, CELL), 1, 1, 6, 7, 0.05},
                {PLAN(ELECTRONS, FOIL), 6, 12, 6, 7, 0.08},
                {PLAN(SLOW, RADIATOR), 6, 12, 1.5, 1.8, 0.05}};
    for (int r = 0; r < COUNT(rows); r++) {
        struct scene *s = set_scene(rows[r].plan, rows[r].z, rows[r].a);
        const double angle = 30 * BH_DEGREE, low = rows[r].low, high = rows[r].high;
        double sigma, momentum;
        bh_radiated_detail below, above;
        s->request.gate.cut = low;
        ck_assert(bh_radiated_at(&s->request, angle, &below));
        s->request.gate.cut = high;
        ck_assert(bh_radiated_at(&s->request, angle, &above));
        bh_channel_eval(&s->request.channel, 1, &angle, &sigma, &momentum);
        ck_assert_relative(bh_elastic_tail(&s->request, angle, low, high),
                           sigma * (above.factor - below.factor), rows[r].tolerance,
                           "where they meet");
        leave(s);
    }
}
END_TEST

/* Matter behind adds photons of its own, of the whole range of energies: with complete screening
 * b t (1 - v + 3 v^2 / 4) dk / k of an electron that has k / v before, times v^(b t) / Gamma(1 + b
 * t) for further ones (Tsai, Rev. Mod. Phys. 46 (1974) 815); loops as below. */
START_TEST(matter_behind_radiates)
{
    static const double share[] = {0.05, 0.2, 0.4, 0.6};
    struct scene *s = set_scene(PLAN(ELECTRONS, BEHIND), 1, 1);
    const double angle = 30 * BH_DEGREE, line = line_at(s, angle);
    double sigma, momentum, soft;
    bh_channel_eval(&s->request.channel, 1, &angle, &sigma, &momentum);
    for (int i = 0; i < COUNT(share); i++) {
        const double v = share[i], lost = v * line, kinetic = line - lost;
        const double thick = bh_way_after(&s->way, &s->vertices[0], angle).soft;
        s->request.count = 1;
        const double with = bh_elastic_tail(&s->request, angle, lost, lost * 1.001);
        s->request.count = 0;
        const double without = bh_elastic_tail(&s->request, angle, lost, lost * 1.001);
        bh_radiative_tail_soft(&s->request.channel.encounter, angle, 1, &kinetic, &soft);
        const double added = sigma * soft * thick * (1 - v + 0.75 * v * v) * 0.001;
        ck_assert_double_gt(added, 0.25 * without);
        const double further = pow(v, thick) / tgamma(1 + thick);
        ck_assert_relative(with, 1.035 * (without + added) * further, 0.04, "photons behind");
    }
    leave(s);
}
END_TEST

/* Without matter, against the lowest order exactly (Mo & Tsai 1969) times the same soft photons;
 * loops and vertices make up for the 5 % more. */
START_TEST(hard_tail_against_the_exact_one)
{
    static const double share[][2] = {{0.97, 0.9}, {0.9, 0.75}, {0.7, 0.5}};
    static const struct {
        const char *plan;
        int z, a;
        double angle; /* [deg] */
    } rows[] = {{PLAN(ELECTRONS, FOIL), 6, 12, 10},
                {PLAN(ELECTRONS, FOIL), 6, 12, 20},
                {PLAN(ELECTRONS, CELL), 1, 1, 30}};
    for (int k = 0; k < COUNT(rows) * COUNT(share); k++) {
        const int r = k / COUNT(share);
        struct scene *s = set_scene(rows[r].plan, rows[r].z, rows[r].a);
        const double angle = rows[r].angle * BH_DEGREE, line = line_at(s, angle);
        const double low = line * share[k % 3][1], high = line * share[k % 3][0];
        double sum = 0;
        for (int i = 0; i < 400; i++) {
            const double kinetic = low + (high - low) * (i + 0.5) / 400;
            double tail, soft;
            bh_radiative_tail_exact(&s->request.channel.encounter, angle, 1, &kinetic, &tail);
            bh_radiative_tail_soft(&s->request.channel.encounter, angle, 1, &kinetic, &soft);
            sum += tail * soft * (high - low) / 400;
        }
        s->request.count = 0;
        ck_assert_relative(bh_elastic_tail(&s->request, angle, line - high, line - low),
                           1.035 * sum, 0.04, "hard tail");
        leave(s);
    }
}
END_TEST

START_TEST(muon_tail_is_the_exact_one)
{
    struct scene *s = set_scene(PLAN(MUONS, CELL), 1, 1);
    const double angle = 50 * BH_DEGREE, line = line_at(s, angle);
    double sum = 0;
    for (int i = 0; i < 400; i++) {
        const double kinetic = line - 10 - 20 * (i + 0.5) / 400;
        double tail, soft;
        bh_radiative_tail_exact(&s->request.channel.encounter, angle, 1, &kinetic, &tail);
        bh_radiative_tail_soft(&s->request.channel.encounter, angle, 1, &kinetic, &soft);
        sum += tail * soft * 20 / 400;
    }
    ck_assert_relative(bh_elastic_tail(&s->request, angle, 10, 30), sum, 1e-3, "muons");
    leave(s);
}
END_TEST

int main(void)
{
    TCase *t = tcase_create("radiated");
    tcase_add_test(t, polynomials_are_exact_enough);
    tcase_add_test(t, the_factor_is_its_parts);
    tcase_add_test(t, a_wider_cut_keeps_more);
    tcase_add_test(t, the_tighter_edge_counts);
    tcase_add_test(t, idle_where_nothing_radiates);
    tcase_add_test(t, between_two_edges);
    tcase_add_test(t, soft_and_hard_tail_meet);
    tcase_add_test(t, matter_behind_radiates);
    tcase_add_test(t, hard_tail_against_the_exact_one);
    tcase_add_test(t, muon_tail_is_the_exact_one);
    return run_suite("radiated", t);
}
