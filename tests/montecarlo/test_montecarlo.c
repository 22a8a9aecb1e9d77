/* test_montecarlo.c - the demonstration plans counted event by event, against their run tables.
 *
 * Each event has a depth in the target, a direction in the arm, photons lost beside nuclei and a
 * hardest collision before and behind: all thrown.  Shared with the program are the plan and the
 * materials as read, constants, and what holds at one point: the elastic cross section of an event,
 * the share that internal radiation leaves inside a cut, and the spectra of quasi-elastic and
 * inelastic scattering and of the hard tail of a line.  Everything else is written down once more
 * here and beside: kinematics, losses, geometry, acceptances, bins, bites, cuts, views, nuclei.
 *
 * As the program states it: cross sections belong to the energy at the collision, before photons;
 * photons and single collisions count apart.  Left out: hard tails of the named particle's lines
 * that are background and electrons of atoms, both below 1e-4 of the counts of these plans.
 *
 * MONTE_CARLO_EVENTS: how many events of each plan and seed, 200000 without; MONTE_CARLO_PLAN: one
 * plan alone; MONTE_CARLO_TELL: print every rate. */
#include "../run/evaluated.h"

#include <gsl/gsl_cdf.h>

#include "beamhours/physics/background.h"
#include "beamhours/physics/validity.h"
#include "events.h"

static const char *const plans[] = {"alpha-gold", "hydrogen-jet", "hydrogen-separation",
                                    "lead",       "muon-rings",   "positron-electron"};
static const uint64_t seeds[] = {20240229, 271828, 1609344};

/* What the program's sums are good to, standard: of whole arms; of what lies beneath their lines,
 * computed at few angles; of bins, between which deflections
 * move events that are taken to be spread exponentially; of bins along the layers, where there are
 * none in the middle. */
static const double of_arms = 1e-4, of_beneath = 1e-3, of_bins = 1e-3, of_bins_along = 1e-2;

enum { MOST_PARTS = 128, PILOT = 32, LEAST = 64 };

/* --- what can happen --- */

struct parts {
    int count;
    struct part list[MOST_PARTS];
};

static const char *structure_for(const bh_plan *plan, const bh_encounter *e)
{
    const char *name = bh_plan_structure(plan, e->z, e->a);
    const bool outside =
        e->beam->kind != BH_KIND_LEPTON && e->kinetic < bh_validity_nuclear(e).kinetic;
    return strcmp(name, "default") == 0 && outside ? "point" : name;
}

static void add_part(struct parts *to, const struct scene *x, struct part part)
{
    struct part *p = &to->list[to->count++];
    bh_error err = {.code = BH_OK};
    ck_assert_int_le(to->count, MOST_PARTS);
    *p = part;
    p->encounter.beam = &p->beam;
    p->encounter.charge = p->beam.charge;
    p->encounter.kinetic = p->kinetic;
    if (p->kind <= TAIL) {
        const char *name = structure_for(x->plan, &p->encounter);
        p->structure = bh_structure_new(name, p->encounter.z, p->encounter.a, &err);
        p->encounter.structure = p->structure;
        ck_assert_msg(p->structure != NULL, "%s", err.text);
    } else if (p->kind == QUASI_ELASTIC &&
               bh_quasi_find(p->encounter.z, p->encounter.a, BH_QUASI_SCALING, &p->nucleus, NULL))
        to->count--; /* too light: not computed */
}

/* Of leptons: what is no line. */
static void add_spectra(struct parts *to, const struct scene *x, struct part part)
{
    part.signal = false;
    part.kind = QUASI_ELASTIC;
    if (part.encounter.a > 2)
        add_part(to, x, part);
    part.kind = INELASTIC;
    if (part.encounter.z == 1 && part.encounter.a <= 2)
        add_part(to, x, part);
}

/* Other particles of the beam, of the same momentum; the program takes them without losses. */
static void add_beside(struct parts *to, const struct scene *x, struct part part)
{
    const bh_beam *beam = &x->setting->beam;
    const double p2 = x->kinetic * (x->kinetic + 2 * beam->particle.mass);
    for (size_t i = 0; i < beam->other_count; i++) {
        struct part other = part;
        other.beside = true;
        other.signal = false;
        other.beam = beam->others[i].particle;
        other.kinetic = sqrt(p2 + other.beam.mass * other.beam.mass) - other.beam.mass;
        other.rate *= beam->others[i].share.value / beam->fraction.value;
        add_part(to, x, other);
        if (other.beam.kind != BH_KIND_LEPTON)
            continue;
        add_spectra(to, x, other);
        other.kind = TAIL;
        add_part(to, x, other);
    }
}

static void add_nuclide(struct parts *to, const struct scene *x, size_t layer,
                        const bh_constituent *c)
{
    const bh_layer *l = &x->setting->target->layers[layer];
    const struct sheet *s = &x->sheet[layer];
    const bh_beam *beam = &x->setting->beam;
    const double nuclei = s->areal / l->material->mean_atomic_mass * BH_AVOGADRO * c->per_atom *
                          (s->to - s->from) / s->thickness;
    struct part part = {.kind = ELASTIC,
                        .layer = layer,
                        .signal = l->role == BH_ROLE_SAMPLE && is_scatterer(x->setting->target, c),
                        .beam = beam->particle,
                        .kinetic = x->kinetic,
                        .rate = beam->particle_rate.value * beam->fraction.value * nuclei * 1e-30 *
                                x->arm->arm.efficiency.value,
                        .encounter = {.z = c->z, .a = c->a, .target = c->mass}};
    if (!(part.rate > 0))
        return;
    add_part(to, x, part);
    add_beside(to, x, part);
    if (beam->particle.kind == BH_KIND_LEPTON)
        add_spectra(to, x, part);
}

static void make_parts(struct parts *to, const struct scene *x)
{
    to->count = 0;
    for (size_t i = 0; i < x->layers; i++) {
        const bh_material *m = x->setting->target->layers[i].material;
        for (size_t c = 0; c < m->count; c++)
            add_nuclide(to, x, i, &m->parts[c]);
    }
}

static void free_parts(struct parts *parts)
{
    for (int i = 0; i < parts->count; i++)
        bh_structure_free(parts->list[i].structure);
}

/* --- counting --- */

/* Events of one part: their mean [Hz] and the variance of one. */
struct tally {
    double count, mean, square;
};

static void throw_many(struct tally *to, struct thrown *t, double events)
{
    for (double k = 0; k < events; k++, t->number++) {
        const double rate = throw_one(t), off = rate - to->mean;
        to->count++;
        to->mean += off / to->count;
        to->square += off * (rate - to->mean);
    }
}

static double deviation(const struct tally *t)
{
    return sqrt(t->square / (t->count - 1));
}

/* A rate and its standard uncertainty. */
struct measured {
    double rate, sigma; /* Hz */
};

/* What a row counts: of signal, or of all else. */
static struct measured measure(const struct scene *x, const struct parts *parts, struct thrown base,
                               bool signal, double events)
{
    struct tally pilot[MOST_PARTS];
    struct measured sum = {0, 0};
    double all = 0;
    for (int pass = 0; pass < 2; pass++)
        for (int i = 0; i < parts->count; i++) {
            struct thrown t = base;
            struct tally tally = {0, 0, 0};
            if (parts->list[i].signal != signal)
                continue;
            t.scene = x;
            t.part = &parts->list[i];
            t.number += ((uint64_t)(2 * i + pass) << 32) + ((uint64_t)signal << 40);
            if (pass == 0) {
                pilot[i] = tally;
                throw_many(&pilot[i], &t, PILOT + floor(events / 1000));
                all += deviation(&pilot[i]);
                continue;
            }
            /* some for those of which the first ones hit nothing, too */
            const double own = all > 0 ? deviation(&pilot[i]) / all : 0;
            const double share = 0.8 * own + 0.2 / parts->count;
            throw_many(&tally, &t, fmax(LEAST, floor(share * events)));
            sum.rate += tally.mean;
            sum.sigma = hypot(sum.sigma, deviation(&tally) / sqrt(tally.count));
        }
    return sum;
}

/* --- a plan against its table --- */

struct comparison {
    const char *plan;
    const struct evaluated *e;
    uint64_t seed;
    double events; /* for each rate of each row */
    double chi2;
    int count;
    bool telling;
};

static void compare(struct comparison *c, const struct measured *m, double program,
                    const char *what)
{
    const double pull = (m->rate - program) / m->sigma;
    if (c->telling)
        printf("%s %s %.6g (1 +- %.2g) program %.6g %+.3f %% pull %.2f\n", c->plan, what, m->rate,
               m->sigma / m->rate, program, 100 * (program / m->rate - 1), pull);
    ck_assert_msg(fabs(pull) < 4.5 || c->telling,
                  "%s, seed %lu: %s: thrown %.6g +- %.2g Hz, computed %.6g Hz", c->plan,
                  (unsigned long)c->seed, what, m->rate, m->sigma, program);
    c->chi2 += pull * pull;
    c->count++;
}

static double good_to(const struct scene *x, int bin, bool signal)
{
    const struct span s = bin_of(x, bin);
    const bool along = s.from < BH_PI / 2 && s.to > BH_PI / 2;
    if (bin == 0 || x->arm->arm.bins == 1 || !x->losing)
        return signal ? of_arms : of_beneath;
    return along ? of_bins_along : of_bins;
}

static void compare_row(struct comparison *c, bool bins, size_t row)
{
    static const bh_column_id rates[] = {BH_COL_BACKGROUND, BH_COL_SIGNAL};
    const bh_place place = bh_table_place(c->e->table, bins, row);
    const bh_setting *setting = &c->e->plan->settings[place.setting];
    struct scene *x = malloc(sizeof *x);
    struct parts *parts = malloc(sizeof *parts);
    ck_assert(x && parts);
    scene_make(x, c->e->plan, setting, &setting->arms[place.arm]);
    make_parts(parts, x);
    for (int signal = 0; signal < 2; signal++) {
        char what[128];
        const struct thrown base = {
            .seed = c->seed, .number = ((uint64_t)(row * 2 + bins)) << 44, .bin = place.bin};
        struct measured m = measure(x, parts, base, signal, c->events);
        const double program = bh_table_number(c->e->table, bins, row, rates[signal]);
        snprintf(what, sizeof what, "%s, %s, bin %d, %s", setting->name, x->arm->arm.name.text,
                 place.bin, signal ? "signal" : "background");
        m.sigma = hypot(m.sigma, good_to(x, place.bin, signal) * m.rate);
        if (m.sigma > 0)
            compare(c, &m, program, what);
        else
            ck_assert_msg(program == m.rate, "%s: %.6g, computed %.6g Hz", what, m.rate, program);
    }
    free_parts(parts);
    free(parts);
    free(x);
}

static char *read_plan(const char *name)
{
    enum { SIZE = 65536 };
    char path[64], *text = calloc(1, SIZE);
    snprintf(path, sizeof path, "plans/%s.yaml", name);
    FILE *f = fopen(path, "rb");
    ck_assert_msg(f && text, "%s", path);
    ck_assert(fread(text, 1, SIZE - 1, f) > 0);
    fclose(f);
    return text;
}

START_TEST(thrown_and_computed)
{
    const char *wanted = getenv("MONTE_CARLO_EVENTS"), *alone = getenv("MONTE_CARLO_PLAN");
    if (alone && strcmp(alone, plans[_i / COUNT(seeds)]) != 0)
        return;
    char *text = read_plan(plans[_i / COUNT(seeds)]);
    struct evaluated e = evaluate(text);
    const size_t rows = bh_table_rows(e.table, false), bins = bh_table_rows(e.table, true);
    struct comparison c = {.plan = plans[_i / COUNT(seeds)],
                           .e = &e,
                           .seed = seeds[_i % COUNT(seeds)],
                           .events = (wanted ? atof(wanted) : 2e5) / (double)(2 * (rows + bins)),
                           .telling = getenv("MONTE_CARLO_TELL") != NULL};
    for (size_t r = 0; r < rows; r++)
        compare_row(&c, false, r);
    for (size_t r = 0; r < bins; r++)
        compare_row(&c, true, r);
    const double p = gsl_cdf_chisq_Q(c.chi2, c.count);
    if (c.telling)
        printf("%s: chi2 %.1f for %d rates, p %.3g\n", c.plan, c.chi2, c.count, p);
    ck_assert_msg(p > 0.001, "%s, seed %lu: chi2 %.1f for %d rates, p %.2g", c.plan,
                  (unsigned long)c.seed, c.chi2, c.count, p);
    done(&e);
    free(text);
}
END_TEST

/* The generator's known answers: Salmon et al., Random123 1.09, kat_vectors. */
START_TEST(generator)
{
    static const struct {
        philox_block counter;
        uint64_t key;
        philox_block answer;
    } rows[] = {
        {{{0, 0, 0, 0}}, 0, {{0x6627e8d5, 0xe169c58d, 0xbc57ac4c, 0x9b00dbd8}}},
        {{{0xffffffff, 0xffffffff, 0xffffffff, 0xffffffff}},
         0xffffffffffffffff,
         {{0x408f276d, 0x41c83b0e, 0xa20bc7c6, 0x6d5451fd}}},
        {{{0x243f6a88, 0x85a308d3, 0x13198a2e, 0x03707344}},
         0x299f31d0a4093822,
         {{0xd16cfe09, 0x94fdcceb, 0x5001e420, 0x24126ea1}}},
    };
    const philox_block got = philox(rows[_i].counter, rows[_i].key);
    for (int k = 0; k < 4; k++)
        ck_assert_uint_eq(got.word[k], rows[_i].answer.word[k]);
}
END_TEST

int main(void)
{
    TCase *t = tcase_create("montecarlo");
    tcase_set_timeout(t, 36000);
    tcase_add_loop_test(t, generator, 0, 3);
    tcase_add_loop_test(t, thrown_and_computed, 0, COUNT(plans) * COUNT(seeds));
    return run_suite("monte carlo", t);
}
