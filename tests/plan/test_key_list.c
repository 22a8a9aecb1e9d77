/* test_key_list.c - the keys of a plan, as documentation shows them; every example reads. */
#include "../suite.h"

#include <string.h>

#include "beamhours/plan/key_list.h"
#include "beamhours/plan/raw.h"
#include "reading.h"

static const struct {
    const char *path, *found; /* found NULL: none; then `near` */
    const char *near;
} lookups[] = {
    {"plan", "plan", NULL},
    {"beam.current", "beam.current", NULL},
    {"arms.in_plane", "arms.in_plane", NULL},
    {"arms.A.in_plane", "arms.in_plane", NULL},
    {"targets.hydrogen.layers.2.thickness", "targets.layers.thickness", NULL},
    {"targets.layers.thickness", "targets.layers.thickness", NULL},
    {"settings.K1.arms.A.goal", "settings.arms.goal", NULL},
    {"settings.goal", "settings.goal", NULL},
    {"schedule.changes.energy", "schedule.changes.energy", NULL},
    {"beam.curent", NULL, "beam.current"},
    {"dead_tme", NULL, "arms.dead_time"},
    {"xyzzy", NULL, ""},
};

START_TEST(looks_up)
{
    bh_plan_key key, near;
    const bool found = bh_plan_key_find(lookups[_i].path, &key, &near);
    ck_assert_int_eq(found, lookups[_i].found != NULL);
    ck_assert_str_eq(found ? key.path : near.path, found ? lookups[_i].found : lookups[_i].near);
    ck_assert_int_eq(bh_plan_key_find(lookups[_i].path, &key, NULL), found);
}
END_TEST

static const struct {
    const char *path, *kind, *units, *group, *preset;
    bool required, built;
} rows[] = {
    {"plan", "a whole number", "", "", NULL, true, true},
    {"beam.kinetic_energy", "an energy", "MeV or MeV/u; in a setting also several",
     "exactly one of kinetic_energy | total_energy | momentum", NULL, false, true},
    {"beam.fraction", "a share", "% or ppm", "", "100 %", false, true},
    {"beam.others", "names with values", "% or ppm", "", NULL, false, true},
    {"targets.layers.thickness", "a length", "mm or cm",
     "exactly one of thickness | areal_density | areal_number", NULL, false, true},
    {"targets.layers.role", "one word", "sample | window | backing", "", "sample", false, true},
    {"targets.empty_target.share", "a share", "% or ppm | best", "", NULL, true, true},
    {"arms.name", "a name", "", "", NULL, true, true},
    {"arms.in_plane", "an angle", "deg or mrad, as ± or {from, to}", "", NULL, false, true},
    {"arms.angle_range", "an angle", "deg or mrad, as {from, to}", "", NULL, false, true},
    {"arms.edges", "an angle", "deg or mrad, a list", "at most one of bins | edges", NULL, false,
     true},
    {"arms.energy_cut", "an energy", "MeV or GeV", "", NULL, false, true},
    {"settings.goal", "a share", "% or ppm", "at most one of goal | time | charge | counts", NULL,
     false, true},
    {"settings.beam", "keys with values", "", "", NULL, false, true},
    {"schedule.tasks", "a list of keys with values", "", "", NULL, false, true},
    {"models.structure", "a name, or names by nuclide", "", "", "default", false, true},
    {"title", "a text", "", "", NULL, false, true},
};

START_TEST(describes)
{
    bh_plan_key key;
    ck_assert(bh_plan_key_find(rows[_i].path, &key, NULL));
    ck_assert_str_eq(key.kind, rows[_i].kind);
    ck_assert_str_eq(key.units, rows[_i].units);
    ck_assert_str_eq(key.group, rows[_i].group);
    ck_assert_pstr_eq(key.preset, rows[_i].preset);
    ck_assert_int_eq(key.required, rows[_i].required);
    ck_assert_int_eq(key.built, rows[_i].built);
}
END_TEST

START_TEST(every_key_has_a_meaning_and_a_place)
{
    bh_plan_key key, found;
    size_t n = 0;
    for (; bh_plan_key_at(n, &key); n++) {
        ck_assert_msg(key.meaning && strlen(key.meaning) > 5, "%s: no meaning", key.path);
        ck_assert_msg(key.example && key.example[0], "%s: no example", key.path);
        ck_assert_msg(strlen(key.path) + 1 < sizeof key.path, "%s: cut", key.path);
        ck_assert_msg(bh_plan_key_find(key.path, &found, NULL) && strcmp(found.path, key.path) == 0,
                      "%s: not found", key.path);
        int dots = 0;
        for (const char *c = key.path; *c; c++)
            dots += *c == '.';
        ck_assert_int_eq(dots, key.depth);
    }
    ck_assert_uint_eq(n, bh_plan_key_count());
    ck_assert_uint_gt(n, 100);
}
END_TEST

/* Reads `key: example` alone by the schema that holds it: nothing but missing keys may be said. */
static void read_example(const bh_schema *schema, const bh_key *key)
{
    char text[600];
    snprintf(text, sizeof text, "%s: %s\n", key->name, key->example);
    bh_diags *diags = bh_diags_new();
    bh_arena *arena = bh_arena_new();
    bh_document *document = bh_document_parse(text, strlen(text), key->name, diags);
    ck_assert_msg(document != NULL, "%s", text);
    const bh_reading reading = {.arena = arena, .diags = diags, .partial = true};
    void *out = calloc(1, schema->size);
    ck_assert_int_eq(bh_schema_read(&reading, schema, bh_document_root(document), out), BH_OK);
    ck_assert_msg(bh_diags_count(diags) == 0, "%s: %s", text,
                  bh_diags_count(diags) ? bh_diags_at(diags, 0)->text : "");
    free(out);
    bh_document_free(document);
    bh_arena_free(arena);
    bh_diags_free(diags);
}

/* Defaults and bounds are texts in the key's own notation: they must be readable too. */
static void read_bounds(const bh_key *key)
{
    const char *const bound[] = {key->least, key->above, key->most,
                                 key->kind == BH_KEY_EITHER ? NULL : key->fallback};
    const bool plain = key->kind == BH_KEY_COUNT || key->kind == BH_KEY_NUMBER ||
                       key->kind == BH_KEY_WORD || key->kind == BH_KEY_TABLE;
    for (int i = 0; i < COUNT(bound); i++) {
        bh_quantity q;
        ck_assert_msg(!bound[i] || plain ||
                          bh_quantity_parse(bound[i], key->dimension, &q, NULL) == BH_OK,
                      "%s: %s", key->name, bound[i]);
    }
}

START_TEST(every_example_reads)
{
    static const bh_schema *const all[] = {
        &bh_schema_plan, &bh_schema_beam,  &bh_schema_layer,   &bh_schema_target,
        &bh_schema_arm,  &bh_schema_aim,   &bh_schema_setting, &bh_schema_schedule,
        &bh_schema_task, &bh_schema_models};
    for (int s = 0; s < COUNT(all); s++)
        for (size_t i = 0; i < all[s]->count; i++) {
            read_example(all[s], &all[s]->keys[i]);
            read_bounds(&all[s]->keys[i]);
        }
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("key list");
    tcase_add_loop_test(tests, looks_up, 0, COUNT(lookups));
    tcase_add_loop_test(tests, describes, 0, COUNT(rows));
    tcase_add_test(tests, every_key_has_a_meaning_and_a_place);
    tcase_add_test(tests, every_example_reads);
    return run_suite("key list", tests);
}
