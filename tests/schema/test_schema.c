/* test_schema.c - documents read by a table of keys: every kind, every complaint, merging. */
#include "../suite.h"

#include <math.h>
#include <stddef.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/schema/schema.h"

/* --- a schema with one key of each kind --- */

struct part {
    bh_section section;
    bh_word name;
    bh_value width;
};

struct whole {
    bh_section section;
    bh_value length, depth, number, count;
    bh_extent around, range;
    bh_word role, name, text;
    bh_either share;
    bh_sweep angle, energy;
    bh_pairs table, atoms, labels;
    bh_values edges;
    bh_words hazards, notes;
    struct part part, over;
    bh_list list;
};

static const char *const roles[] = {"sample", "window", "non-paralysable", NULL};
static const char *const best[] = {"best", NULL};

#define AT(member) .name = #member, .offset = offsetof(struct whole, member)

static const bh_key part_keys[] = {
    {.name = "name", .kind = BH_KEY_NAME, .offset = offsetof(struct part, name), .example = "A"},
    {.name = "width",
     .kind = BH_KEY_QUANTITY,
     .dimension = BH_DIM_LENGTH,
     .flags = BH_KEY_REQUIRED,
     .fallback = "3 mm",
     .offset = offsetof(struct part, width),
     .example = "1 cm"},
};
static const bh_schema part_schema = {"a part", sizeof(struct part), part_keys, 2, 0, 0};

static const bh_key keys[] = {
    {AT(length), .kind = BH_KEY_QUANTITY, .dimension = BH_DIM_LENGTH, .above = "0 mm",
     .most = "1 m", .fallback = "2 cm", .group = 1, .example = "5 mm"},
    {AT(depth), .kind = BH_KEY_QUANTITY, .dimension = BH_DIM_LENGTH, .group = 1, .example = "5 mm"},
    {AT(number), .kind = BH_KEY_NUMBER, .least = "-1", .fallback = "0.5", .example = "0.17"},
    {AT(count), .kind = BH_KEY_COUNT, .least = "1", .most = "1000", .fallback = "7",
     .example = "4"},
    {AT(around), .kind = BH_KEY_EXTENT, .dimension = BH_DIM_ANGLE, .most = "90 deg",
     .example = "±28 mrad"},
    {AT(range), .kind = BH_KEY_RANGE, .dimension = BH_DIM_SHARE, .example = "{from: 1 %, to: 2 %}"},
    {AT(role), .kind = BH_KEY_WORD, .words = roles, .fallback = "sample", .example = "window"},
    {AT(name), .kind = BH_KEY_NAME, .example = "K1"},
    {AT(text), .kind = BH_KEY_TEXT, .example = "\"words\""},
    {AT(share), .kind = BH_KEY_EITHER, .dimension = BH_DIM_SHARE, .words = best, .fallback = "best",
     .example = "10 %"},
    {AT(angle), .kind = BH_KEY_SWEEP, .dimension = BH_DIM_ANGLE, .group = 2, .example = "30 deg"},
    {AT(energy), .kind = BH_KEY_SWEEP, .dimension = BH_DIM_ENERGY_OR_PER_U, .above = "0 MeV",
     .group = 2, .example = "855 MeV"},
    {AT(table), .kind = BH_KEY_TABLE, .item = BH_KEY_QUANTITY, .dimension = BH_DIM_SHARE,
     .flags = BH_KEY_OR_WORD | BH_KEY_NOT_EMPTY, .fallback = "default", .example = "{a: 1 %}"},
    {AT(atoms), .kind = BH_KEY_TABLE, .item = BH_KEY_COUNT, .example = "{H: 2}"},
    {AT(labels), .kind = BH_KEY_TABLE, .item = BH_KEY_TEXT, .example = "{a: b}"},
    {AT(edges), .kind = BH_KEY_VALUES, .dimension = BH_DIM_ANGLE, .example = "[1 deg, 2 deg]"},
    {AT(hazards), .kind = BH_KEY_WORDS, .words = roles, .example = "[sample]"},
    {AT(notes), .kind = BH_KEY_WORDS, .example = "[a, b]"},
    {AT(part), .kind = BH_KEY_MAPPING, .children = &part_schema, .example = "{width: 1 cm}"},
    {AT(over), .kind = BH_KEY_MAPPING, .children = &part_schema, .flags = BH_KEY_OVERRIDE,
     .example = "{width: 1 cm}"},
    {AT(list), .kind = BH_KEY_LIST, .children = &part_schema, .flags = BH_KEY_UNIQUE,
     .example = "[{name: A, width: 1 cm}]"},
};
static const bh_schema schema = {"the whole", sizeof(struct whole), keys, COUNT(keys), 0, 0};

struct reads {
    bh_diags *diags;
    bh_arena *arena;
    bh_document *document;
    bh_reading reading;
    struct whole w;
};

static void read_it(struct reads *r, const char *text, bool partial)
{
    memset(r, 0, sizeof *r);
    r->diags = bh_diags_new();
    r->arena = bh_arena_new();
    r->document = bh_document_parse(text, strlen(text), "x.yaml", r->diags);
    ck_assert_msg(r->document != NULL, "%s", text);
    r->reading = (bh_reading){.arena = r->arena, .diags = r->diags, .partial = partial};
    ck_assert_int_eq(bh_schema_read(&r->reading, &schema, bh_document_root(r->document), &r->w),
                     BH_OK);
    bh_diags_sort(r->diags);
}

static void done(struct reads *r)
{
    bh_document_free(r->document);
    bh_arena_free(r->arena);
    bh_diags_free(r->diags);
}

/* --- good documents --- */

START_TEST(values)
{
    struct reads r;
    read_it(&r,
            "length: 5.0 ± 0.1 mm\nnumber: −0.25\ncount: 12\naround: +- 28 mrad\n"
            "range: {from: 1 %, to: 2 %}\nrole: window\nname: K_1-a+b\ntext: any thing\n"
            "share: 10 %\ntable: {a: 1 %, b: 2 ± 1 %}\natoms: {H: 2, O: 1}\nlabels: {a: b}\n"
            "edges: [1 deg, 2 deg]\nhazards: [sample, window]\nnotes: [x, y, z]\n"
            "part: {width: 1 cm}\nover: {name: P}\nlist: [{name: A, width: 1 mm}, {width: 2 mm}]\n",
            false);
    ck_assert_uint_eq(bh_diags_count(r.diags), 0);
    ck_assert_double_eq_tol(r.w.length.value, 0.5, 1e-15);
    ck_assert_double_eq_tol(r.w.length.uncertainty, 0.01, 1e-15);
    ck_assert(r.w.length.given && r.w.length.at.line == 1 && r.w.length.at.column == 9);
    ck_assert_double_eq(r.w.number.value, -0.25);
    ck_assert_double_eq(r.w.count.value, 12.0);
    ck_assert_double_eq_tol(r.w.around.from, -0.028, 1e-15);
    ck_assert_double_eq_tol(r.w.around.to, 0.028, 1e-15);
    ck_assert_double_eq_tol(r.w.range.to, 0.02, 1e-15);
    ck_assert_str_eq(r.w.role.text, "window");
    ck_assert_str_eq(r.w.name.text, "K_1-a+b");
    ck_assert(r.w.share.value.given && !r.w.share.word.given);
    ck_assert_uint_eq(r.w.table.count, 2);
    ck_assert_str_eq(r.w.table.items[1].name, "b");
    ck_assert_double_eq_tol(r.w.table.items[1].value.value, 0.02, 1e-15);
    ck_assert_double_eq(r.w.atoms.items[0].value.value, 2.0);
    ck_assert_str_eq(r.w.labels.items[0].word.text, "b");
    ck_assert_uint_eq(r.w.edges.count, 2);
    ck_assert_str_eq(r.w.hazards.items[1].text, "window");
    ck_assert_uint_eq(r.w.notes.count, 3);
    ck_assert_double_eq_tol(r.w.part.width.value, 1.0, 1e-15);
    ck_assert(r.w.over.section.given && !r.w.over.width.given);
    const struct part *list = r.w.list.items;
    ck_assert_uint_eq(r.w.list.count, 2);
    ck_assert_double_eq_tol(list[1].width.value, 0.2, 1e-15);
    done(&r);
}
END_TEST

START_TEST(absent_keys)
{
    struct reads r;
    read_it(&r, "name: K\n", false);
    ck_assert_uint_eq(bh_diags_count(r.diags), 0);
    ck_assert(!r.w.length.given && r.w.length.at.line == 1);
    ck_assert_double_eq_tol(r.w.length.value, 2.0, 1e-15);
    ck_assert_double_eq(r.w.number.value, 0.5);
    ck_assert_double_eq(r.w.count.value, 7.0);
    ck_assert_str_eq(r.w.role.text, "sample");
    ck_assert_str_eq(r.w.share.word.text, "best");
    ck_assert_str_eq(r.w.table.word.text, "default");
    ck_assert_double_eq_tol(r.w.part.width.value, 0.3, 1e-15); /* defaults of an absent part */
    ck_assert(!r.w.part.section.given && r.w.part.section.at.line == 1);
    ck_assert(!r.w.text.given && r.w.text.text == NULL && !r.w.around.given);
    done(&r);
    read_it(&r, "name: K\n", true);
    ck_assert(r.w.role.text == NULL && r.w.length.value == 0.0 && r.w.share.word.text == NULL);
    done(&r);
}
END_TEST

/* --- sweeps --- */

static const struct {
    const char *text;
    size_t count;
    double first, last; /* deg, or MeV where per_u */
    bool swept, per_u;
} sweeps[] = {
    {"angle: 30 deg", 1, 30.0, 30.0, false, false},
    {"angle: [30 deg]", 1, 30.0, 30.0, true, false},
    {"angle: [20 deg, 25 deg, 24 deg]", 3, 20.0, 24.0, true, false},
    {"angle: {from: 20 deg, to: 60 deg, step: 5 deg}", 9, 20.0, 60.0, true, false},
    {"angle: {from: 20 deg, to: 60 deg, count: 9}", 9, 20.0, 60.0, true, false},
    {"angle: {from: 60 deg, to: 20 deg, step: -10 deg}", 5, 60.0, 20.0, true, false},
    {"angle: {from: 0.1 deg, to: 0.7 deg, step: 0.2 deg}", 4, 0.1, 0.7, true, false},
    {"angle: {from: 0 deg, to: 100 deg, step: 0.01 deg}", 0, 0.0, 0.0, true, false},
    {"energy: {from: 100 MeV/u, to: 200 MeV/u, count: 2}", 2, 100.0, 200.0, true, true},
    {"energy: 100 MeV/u", 1, 100.0, 100.0, false, true},
};

START_TEST(swept)
{
    struct reads r;
    read_it(&r, sweeps[_i].text, false);
    const bh_sweep *s = r.w.angle.given ? &r.w.angle : &r.w.energy;
    const double unit = r.w.angle.given ? 3.14159265358979323846 / 180.0 : 1.0;
    ck_assert_uint_eq(s->count, sweeps[_i].count);
    ck_assert_int_eq(s->swept, sweeps[_i].swept);
    if (s->count > 0) {
        ck_assert_double_eq(s->values[0].value, sweeps[_i].first * unit);
        ck_assert_double_eq(s->values[s->count - 1].value, sweeps[_i].last * unit);
        ck_assert_int_eq(s->values[0].per_u, sweeps[_i].per_u);
    } else {
        ck_assert_uint_eq(bh_diags_errors(r.diags), 1);
    }
    done(&r);
}
END_TEST

/* Steps that are decimals in the unit of the sweep are these decimals to the last bit, as if each
 * had been written; others stay where the ends put them. */
static const struct {
    const char *sweep;
    size_t place;
    const char *written;
} steps[] = {
    {"angle: {from: 10 deg, to: 40.7 deg, count: 308}", 123, "22.3 deg"},
    {"angle: {from: 10 deg, to: 40.7 deg, count: 308}", 306, "40.6 deg"},
    {"angle: {from: 100 mrad, to: 0.4 rad, step: 1 mrad}", 37, "137 mrad"},
    {"angle: {from: 0.1\u00B0, to: 0.7\u00B0, step: 0.1\u00B0}", 2, "0.3 deg"},
    {"angle: {from: 10 \u00B1 0.1 deg, to: 11 \u00B1 0.1 deg, step: 0.1 deg}", 3, "10.3 deg"},
    {"angle: {from: -1 deg, to: 1 deg, step: 0.2 deg}", 5, "0 deg"},
    {"energy: {from: 0.1 GeV, to: 1.3 GeV, step: 0.1 GeV}", 2, "300 MeV"},
    {"energy: {from: 100 MeV/u, to: 101 MeV/u, step: 0.1 MeV/u}", 7, "100.7 MeV/u"},
};

START_TEST(steps_are_decimals)
{
    struct reads r;
    bh_quantity wanted;
    read_it(&r, steps[_i].sweep, false);
    const bool angle = r.w.angle.given;
    const bh_sweep *s = angle ? &r.w.angle : &r.w.energy;
    ck_assert(!bh_quantity_parse(steps[_i].written, angle ? BH_DIM_ANGLE : BH_DIM_ENERGY_OR_PER_U,
                                 &wanted, NULL));
    ck_assert_uint_gt(s->count, steps[_i].place);
    ck_assert_double_eq(s->values[steps[_i].place].value, wanted.value);
    done(&r);
}
END_TEST

START_TEST(steps_between_decimals)
{
    struct reads r;
    read_it(&r, "angle: {from: 10 deg, to: 11 deg, count: 4}", false);
    const double deg = 3.14159265358979323846 / 180.0;
    ck_assert_uint_eq(r.w.angle.count, 4);
    ck_assert_double_eq_tol(r.w.angle.values[1].value, (10 + 1 / 3.0) * deg, 1e-16);
    done(&r);
}
END_TEST

/* --- complaints: line:column key: words --- */

static const struct {
    const char *text, *said;
} bad[] = {
    {"lenght: 5 mm", "1:1 lenght: did you mean length?"},
    {"LENGTH: 5 mm", "1:1 LENGTH: did you mean length?"},
    {"rho: 5", "1:1 rho: the keys there are"},
    {"polarization: 3", "1:1 polarization: the keys there are"},
    {"theta: 30 deg", "1:1 theta: did you mean angle?"},
    {"length: 5", "1:9 length: no unit"},
    {"length: 0 mm", "1:9 length: more than 0 mm"},
    {"length: 2 m", "1:9 length: 1 m or less"},
    {"length: [5 mm]", "1:9 length: a list where one value"},
    {"length:", "1:8 length: nothing is written"},
    {"length: {a: 5 mm}", "1:9 length: keys with values where one value"},
    {"length: 5 mm\ndepth: 5 mm", "2:1 depth: length and depth exclude"},
    {"depth: 5 mm\nlength: 5 mm", "2:1 length: depth and length exclude"},
    {"number: two", "1:9 number: not a number"},
    {"number: 0x10", "1:9 number: not a number"},
    {"number: 1 MeV", "1:9 number: not a number"},
    {"number: --1", "1:9 number: not a number"},
    {"number: -2", "1:9 number: -1 or more"},
    {"number: []", "1:9 number: a list where one value"},
    {"count: 1.5", "1:8 count: whole number"},
    {"count: 1e3", "1:8 count: whole number"},
    {"count: +4", "1:8 count: whole number"},
    {"count: −4", "1:8 count: 1 or more"},
    {"count: 1001", "1:8 count: 1000 or less"},
    {"count: 99999999999999999999999", "1:8 count: 9007199254740992 or less"},
    {"count: yes", "1:8 count: whole number"},
    {"around: 28 mrad", "1:9 around: half or full?"},
    {"around: 28", "1:9 around: no unit"},
    {"around: ±28", "1:9 around: no unit"},
    {"around: ±0 mrad", "1:9 around: more than 0"},
    {"around: ±-3 mrad", "1:9 around: more than 0"},
    {"around: ±100 deg", "1:9 around: 90 deg or less"},
    {"around: [1 deg]", "1:9 around: a list where one value"},
    {"around: {from: 2 deg}", "1:9 around.to: missing"},
    {"around: {from: 2 deg, too: 3 deg}", "1:23 around.too: did you mean to?"},
    {"around: {from: 3 deg, to: 2 deg}", "1:9 around: does not rise"},
    {"around: {from: 3 deg, to: 3 deg}", "1:9 around: does not rise"},
    {"around: {from: 3 deg, to: x}", "1:27 around.to: does not begin with a number"},
    {"range: ±3 %", "1:8 range: two limits"},
    {"role: windw", "1:7 role: did you mean window?"},
    {"role: nothing", "1:7 role: one of sample, window or non-paralysable"},
    {"name: a b", "1:7 name: cannot be a name"},
    {"name: é", "1:7 name: cannot be a name"},
    {"name: \"\"", "1:7 name: nothing is written"},
    {"text: [a]", "1:7 text: a list where one value"},
    {"share: bst", "1:8 share: did you mean best?"},
    {"share: worst of all", "1:8 share: one of best"},
    {"share: 10", "1:8 share: no unit"},
    {"share: [a]", "1:8 share: a list where one value"},
    {"angle: []", "1:8 angle: an empty list"},
    {"angle: [1 deg, 2 mm]", "1:16 angle.2: is a length"},
    {"angle: {from: 1 deg, to: 2 deg}", "1:8 angle.step: a sweep has none of step or count"},
    {"angle: {from: 1 deg, step: 2 deg}", "1:8 angle.to: missing in a sweep"},
    {"angle: {from: 1 deg, to: 4 deg, step: 2 deg}",
     "1:39 angle.step: 3 deg and 5 deg but not 4 deg"},
    {"angle: {from: 1 deg, to: 4 deg, step: -1 deg}", "1:39 angle.step: does not lead from"},
    {"angle: {from: 1 deg, to: 4 deg, step: 0 deg}", "1:39 angle.step: does not lead from"},
    {"angle: {from: 1 deg, to: 4 deg, step: 1 deg, count: 4}",
     "1:46 angle.count: step and count exclude"},
    {"angle: {from: 1 deg, to: 4 deg, count: 1}", "1:40 angle.count: 2 or more"},
    {"angle: {from: 1 deg, to: 4 deg, count: 10001}", "1:40 angle.count: 10000 or less"},
    {"angle: {from: 0 deg, to: 60 deg, step: 1 urad}", "1:8 angle: more than 10000 values"},
    {"energy: {from: 1 MeV/u, to: 4 MeV, count: 4}", "1:29 energy.to: do not mix"},
    {"energy: -1 MeV", "1:9 energy: more than 0 MeV"},
    {"angle: 1 deg\nenergy: 1 MeV", "2:1 energy: angle and energy exclude"},
    {"table: {a: 5}", "1:12 table.a: no unit"},
    {"table: [a]", "1:8 table: a list where keys"},
    {"table: {}", "1:8 table: an empty list"},
    {"atoms: {H: two}", "1:12 atoms.H: whole number"},
    {"atoms: H2O", "1:8 atoms: H2O where keys with values"},
    {"labels: {a: [b]}", "1:13 labels.a: a list where one value"},
    {"edges: 1 deg", "1:8 edges: 1 deg where a list"},
    {"edges: [1 deg, x]", "1:16 edges.2: does not begin with a number"},
    {"hazards: [sampel]", "1:11 hazards.1: did you mean sample?"},
    {"hazards: sample", "1:10 hazards: sample where a list"},
    {"part: 3", "1:7 part: 3 where keys with values"},
    {"part: {}", "1:7 part.width: missing in a part; add for example width: 1 cm"},
    {"part: {name: A}", "1:7 part.width: missing in a part"},
    {"part: {width: 1 mm, high: 3}", "1:21 part.high: no such key in a part"},
    {"over: {width: x}", "1:15 over.width: does not begin with a number"},
    {"list: {name: A}", "1:7 list: keys with values where a list"},
    {"list: [x]", "1:8 list.1: x where keys with values"},
    {"list: [{name: A, width: 1 mm}, {name: B}]", "1:32 list.B.width: missing"},
    {"list: [{name: A, width: 1 mm}, {name: A, width: 1 mm}]",
     "1:39 list.A.name: A is also the name in line 1"},
    {"- a", "1:1 plan: a list where keys with values"},
    {"alone", "1:1 plan: alone where keys with values"},
};

START_TEST(complains)
{
    struct reads r;
    char said[600] = "nothing";
    read_it(&r, bad[_i].text, false);
    ck_assert_uint_eq(bh_diags_errors(r.diags), 1);
    const bh_diag *d = bh_diags_at(r.diags, 0);
    snprintf(said, sizeof said, "%d:%d %s: %s", d->at.line, d->at.column, d->key, d->text);
    const char *words = strstr(bad[_i].said, ": ") + 2;
    const size_t head = (size_t)(words - bad[_i].said);
    ck_assert_msg(strncmp(said, bad[_i].said, head) == 0 && strstr(d->text, words) != NULL,
                  "%s\n  says   %s\n  wanted %s", bad[_i].text, said, bad[_i].said);
    done(&r);
}
END_TEST

START_TEST(all_at_once)
{
    struct reads r;
    read_it(&r, "lenght: 5 mm\ncount: 0\nrole: wndow\nangle: 5\npart: {width: -}\n", false);
    ck_assert_uint_eq(bh_diags_errors(r.diags), 5);
    for (size_t i = 0; i < 5; i++)
        ck_assert_int_eq(bh_diags_at(r.diags, i)->at.line, (int)i + 1);
    /* what could not be read is marked so */
    ck_assert(r.w.count.given && isnan(r.w.count.value));
    ck_assert(r.w.role.given && r.w.role.text == NULL);
    ck_assert(r.w.angle.given && r.w.angle.count == 0);
    ck_assert(r.w.length.given && isnan(r.w.length.value)); /* was meant */
    done(&r);
}
END_TEST

START_TEST(meant_keys_are_not_missing)
{
    static const char *const text[] = {"part: {widht: 1 mm}",
                                       "lenth: 1 mm\ndepth: 2 mm",
                                       "arond: 1 deg",
                                       "rol: window",
                                       "angel: 1 deg",
                                       "tabel: {a: 1 %}",
                                       "shar: 3 %",
                                       "lst: []",
                                       "prt: {}"};
    for (int i = 0; i < COUNT(text); i++) {
        struct reads r;
        read_it(&r, text[i], false);
        ck_assert_uint_eq(bh_diags_errors(r.diags), 1);
        done(&r);
    }
}
END_TEST

START_TEST(both_spellings)
{
    static const bh_key one[] = {{.name = "polarisation",
                                  .kind = BH_KEY_QUANTITY,
                                  .dimension = BH_DIM_SHARE,
                                  .offset = offsetof(struct part, width),
                                  .example = "80 %"}};
    static const bh_schema small = {"the beam", sizeof(struct part), one, 1, 0, 0};
    static const char text[] = "polarization: 80 %\npolarisation: 70 %\n";
    struct part out;
    bh_diags *diags = bh_diags_new();
    bh_arena *arena = bh_arena_new();
    bh_document *d = bh_document_parse(text, sizeof text - 1, "x.yaml", diags);
    const bh_reading reading = {.arena = arena, .diags = diags};
    ck_assert_int_eq(bh_schema_read(&reading, &small, bh_document_root(d), &out), BH_OK);
    ck_assert_uint_eq(bh_diags_errors(diags), 1);
    ck_assert_double_eq_tol(out.width.value, 0.8, 1e-15);
    ck_assert_ptr_eq(bh_schema_find(&small, "polarization"), &one[0]);
    ck_assert_ptr_null(bh_schema_find(&small, "spin"));
    bh_document_free(d);
    bh_arena_free(arena);
    bh_diags_free(diags);
}
END_TEST

/* --- merging --- */

START_TEST(merges)
{
    struct reads base, over;
    read_it(&base,
            "length: 5 mm\nangle: 30 deg\nname: K\npart: {width: 1 mm, name: P}\n"
            "list: [{width: 1 mm}]\ntable: {a: 1 %}\nedges: [1 deg]\n",
            false);
    read_it(&over,
            "depth: 7 mm\nenergy: 3 MeV\nover: {width: 4 mm}\npart: {width: 9 mm}\nlist: []\n"
            "share: best\nnotes: [a]\naround: ±1 deg\n",
            true);
    struct whole w;
    bh_schema_merge(&schema, &base.w, &over.w, &w);
    ck_assert(!w.length.given && w.depth.given && !w.angle.given && w.energy.given);
    ck_assert_str_eq(w.name.text, "K");
    ck_assert_double_eq_tol(w.part.width.value, 0.9, 1e-15);
    ck_assert_str_eq(w.part.name.text, "P");
    ck_assert_double_eq_tol(w.over.width.value, 0.4, 1e-15);
    ck_assert_uint_eq(w.list.count, 0);
    ck_assert_uint_eq(w.table.count, 1);
    ck_assert_uint_eq(w.notes.count, 1);
    ck_assert(w.share.word.given && w.around.given && w.edges.given);
    ck_assert_ptr_eq(w.section.node, over.w.section.node);
    for (int i = 0; i < COUNT(keys); i++) { /* what is given has a place */
        const bh_mark at = bh_schema_mark(&keys[i], &w);
        ck_assert(!bh_schema_given(&keys[i], &w) || at.line > 0);
    }
    done(&base);
    done(&over);
}
END_TEST

START_TEST(choices)
{
    ck_assert_int_eq(bh_schema_choice("window", roles), 1);
    ck_assert_int_eq(bh_schema_choice("sample", roles), 0);
    ck_assert_int_eq(bh_schema_choice(NULL, roles), 0);
    ck_assert_int_eq(bh_schema_choice("other", roles), 0);
}
END_TEST

/* --- paths --- */

START_TEST(paths)
{
    struct reads r;
    char path[BH_PATH_SIZE];
    read_it(&r, "list: [{name: A, width: 1 mm}, {width: 1 mm}]\n", false);
    const bh_node *root = bh_document_root(r.document);
    const bh_node *list = bh_node_get(root, "list");
    ck_assert_str_eq(bh_node_path(root, NULL, path), "plan");
    ck_assert_str_eq(bh_node_path(root, "list", path), "list");
    ck_assert_str_eq(bh_node_path(list, NULL, path), "list");
    ck_assert_str_eq(bh_node_path(list->items[0], "width", path), "list.A.width");
    ck_assert_str_eq(bh_node_path(list->items[1], NULL, path), "list.2");
    ck_assert_str_eq(bh_node_path(NULL, "x", path), "x");
    bh_warn(&r.reading, list->at, &((struct part *)r.w.list.items)->section, "width", "%s", "hm");
    ck_assert_uint_eq(bh_diags_count(r.diags), 1);
    ck_assert_str_eq(bh_diags_at(r.diags, 0)->key, "list.A.width");
    ck_assert_int_eq(bh_diags_at(r.diags, 0)->severity, BH_SEVERITY_WARNING);
    done(&r);
}
END_TEST

START_TEST(long_names_are_cut)
{
    char text[700], path[BH_PATH_SIZE];
    struct reads r;
    memset(text, 'x', sizeof text);
    memcpy(text, "table: {", 8);
    snprintf(text + 300, 20, ": 5}\n");
    read_it(&r, text, false);
    ck_assert_uint_eq(bh_diags_errors(r.diags), 1);
    const bh_node *table = bh_node_get(bh_document_root(r.document), "table");
    ck_assert_uint_lt(strlen(bh_node_path(table->items[0], NULL, path)), BH_PATH_SIZE);
    done(&r);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("schema");
    tcase_add_test(tests, values);
    tcase_add_test(tests, absent_keys);
    tcase_add_loop_test(tests, swept, 0, COUNT(sweeps));
    tcase_add_loop_test(tests, steps_are_decimals, 0, COUNT(steps));
    tcase_add_test(tests, steps_between_decimals);
    tcase_add_loop_test(tests, complains, 0, COUNT(bad));
    tcase_add_test(tests, all_at_once);
    tcase_add_test(tests, meant_keys_are_not_missing);
    tcase_add_test(tests, both_spellings);
    tcase_add_test(tests, merges);
    tcase_add_test(tests, choices);
    tcase_add_test(tests, paths);
    tcase_add_test(tests, long_names_are_cut);
    return run_suite("schema", tests);
}
