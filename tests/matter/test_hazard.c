/* test_hazard.c - hazards that a file names, and those that follow from what it is made of. */
#include "../suite.h"

#include "beamhours/matter/hazard.h"

#define BIT(id) (1U << BH_HAZARD_##id)

/* At most three elements. */
typedef struct {
    const char *what;
    bh_state state;
    double boiling; /* [K] */
    bh_constituent parts[3];
    const char *word;
    unsigned want;
} row;

static const row rows[] = {
    {"gold", BH_STATE_SOLID, 3129, {{.z = 79, .per_atom = 1}}, NULL, 0},
    {"hydrogen gas",
     BH_STATE_GAS,
     0,
     {{.z = 1, .a = 1, .per_atom = 0.9}, {.z = 1, .a = 2, .per_atom = 0.1}},
     NULL,
     BIT(FLAMMABLE_GAS) | BIT(OXYGEN)},
    {"liquid deuterium",
     BH_STATE_LIQUID,
     23.6,
     {{.z = 1, .per_atom = 1}},
     NULL,
     BIT(FLAMMABLE_GAS) | BIT(CRYOGEN) | BIT(OXYGEN)},
    {"water",
     BH_STATE_LIQUID,
     373,
     {{.z = 1, .per_atom = 0.667}, {.z = 8, .per_atom = 0.333}},
     NULL,
     0},
    {"air", BH_STATE_GAS, 0, {{.z = 7, .per_atom = 0.78}, {.z = 8, .per_atom = 0.21}}, NULL, 0},
    {"argon", BH_STATE_GAS, 87, {{.z = 18, .per_atom = 1}}, NULL, BIT(OXYGEN)},
    {"liquid oxygen",
     BH_STATE_LIQUID,
     90,
     {{.z = 8, .per_atom = 1}},
     "oxidising",
     BIT(CRYOGEN) | BIT(OXIDISING)},
    {"beryllium", BH_STATE_SOLID, 0, {{.z = 4, .per_atom = 1}}, "toxic", BIT(BERYLLIUM)},
    {"alloy with a trace",
     BH_STATE_SOLID,
     0,
     {{.z = 27, .per_atom = 0.997}, {.z = 4, .per_atom = 0.003}},
     NULL,
     0},
    {"lead, two isotopes",
     BH_STATE_SOLID,
     0,
     {{.z = 82, .a = 206, .per_atom = 0.4}, {.z = 82, .a = 208, .per_atom = 0.6}},
     "toxic",
     BIT(LEAD)},
    {"uranium", BH_STATE_SOLID, 0, {{.z = 92, .per_atom = 1}}, "radioactive", BIT(URANIUM)},
    {"thorium",
     BH_STATE_SOLID,
     0,
     {{.z = 90, .per_atom = 1}},
     "toxic",
     BIT(RADIOACTIVE) | BIT(TOXIC)},
    {"technetium", BH_STATE_SOLID, 0, {{.z = 43, .per_atom = 1}}, NULL, BIT(RADIOACTIVE)},
    {"lithium", BH_STATE_SOLID, 0, {{.z = 3, .per_atom = 1}}, NULL, BIT(REACTIVE)},
    {"lithium fluoride",
     BH_STATE_SOLID,
     0,
     {{.z = 3, .per_atom = 0.5}, {.z = 9, .per_atom = 0.5}},
     NULL,
     0},
    {"butanol", BH_STATE_SOLID, 0, {{.z = 6, .per_atom = 1}}, "flammable", BIT(FLAMMABLE)},
    {"vacuum", BH_STATE_VACUUM, 0, {{0}}, NULL, 0},
};

START_TEST(hazards_of_a_material)
{
    const row *r = &rows[_i];
    bh_material m = {.state = r->state, .boiling = r->boiling, .parts = r->parts};
    while (m.count < 3 && r->parts[m.count].z > 0)
        m.count++;
    m.hazards = &r->word;
    m.hazard_count = r->word ? 1 : 0;
    ck_assert_msg(bh_material_hazards(&m) == r->want, "%s: %x, not %x", r->what,
                  bh_material_hazards(&m), r->want);
}
END_TEST

START_TEST(the_list_of_words_ends)
{
    for (int h = 0; h < BH_HAZARD_COUNT; h++)
        ck_assert_ptr_nonnull(bh_hazard_words[h]);
    ck_assert_ptr_null(bh_hazard_words[BH_HAZARD_COUNT]);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("hazard");
    tcase_add_loop_test(tests, hazards_of_a_material, 0, COUNT(rows));
    tcase_add_test(tests, the_list_of_words_ends);
    return run_suite("hazard", tests);
}
