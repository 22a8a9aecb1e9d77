/* test_material_names.c - short forms, symbols, American spellings, slips of the pen. */
#include "../suite.h"

#include <string.h>

#include "beamhours/matter/material.h"
#include "beamhours/matter/material_names.h"

START_TEST(british_spelling)
{
    static const char *const rows[][2] = {{"aluminum", "aluminium"},
                                          {"aluminum-6061", "aluminium-6061"},
                                          {"sulfur", "sulphur"},
                                          {"cesium-iodide", "caesium-iodide"},
                                          {"carbon-fiber", "carbon-fibre"},
                                          {"gold", "gold"},
                                          {"", ""}};
    char out[BH_MATERIAL_NAME_SIZE];
    for (int i = 0; i < COUNT(rows); i++)
        ck_assert_str_eq(bh_material_british(rows[i][0], out), rows[i][1]);
    char much[200];
    memset(much, 'x', sizeof much);
    memcpy(much + 150, "aluminum", 9);
    ck_assert_ptr_eq(bh_material_british(much, out), much);
}
END_TEST

START_TEST(what_was_meant)
{
    static const char *const rows[][2] = {
        {"LH2", "liquid-hydrogen"},   {"lh2", "liquid-hydrogen"}, {"LD2", "liquid-deuterium"},
        {"H2", "hydrogen-gas"},       {"Al", "aluminium"},        {"Co", "cobalt"},
        {"CO2", "carbon-dioxide"},    {"CH2", "polyethylene"},    {"He", "helium-gas"},
        {"3He", "helium-3-gas"},      {"208Pb", "lead-208"},      {"Pb208", "lead-208"},
        {"12C", "carbon-12"},         {"48Ca", "calcium-48"},     {"hydrogen", "liquid-hydrogen"},
        {"steel", "stainless-steel"}, {"Gold", "gold"},           {"aluminiun", "aluminium"},
        {"tungstn", "tungsten"}};
    const char *const folders[] = {"materials", NULL};
    bh_material_library *library = bh_material_library_new(folders);
    size_t count;
    const char *const *names = bh_material_names(library, &count);
    for (int i = 0; i < COUNT(rows); i++) {
        const char *meant = bh_material_meant(rows[i][0], names, count);
        ck_assert_msg(meant && strcmp(meant, rows[i][1]) == 0, "%s: %s", rows[i][0],
                      meant ? meant : "nothing");
    }
    ck_assert_ptr_null(bh_material_meant("209Pb", names, 0));
    ck_assert_ptr_null(bh_material_meant("qqqqqqqq", names, count));
    bh_material_library_free(library);
}
END_TEST

/* A symbol leads to a material that consists of that element. */
START_TEST(short_forms_lead_to_files)
{
    static const char *const symbols[] = {
        "H",     "D",    "Li",    "Be",    "B",   "C",   "N",     "O",    "Ne",
        "Na",    "Mg",   "Al",    "Si",    "S",   "Ar",  "K",     "Ca",   "Sc",
        "Ti",    "V",    "Cr",    "Mn",    "Fe",  "Ni",  "Cu",    "Zn",   "Ge",
        "Kr",    "Zr",   "Nb",    "Mo",    "Pd",  "Ag",  "Cd",    "In",   "Sn",
        "Sb",    "Te",   "Xe",    "Cs",    "Ta",  "W",   "Re",    "Ir",   "Pt",
        "Au",    "Hg",   "Pb",    "Bi",    "Th",  "U",   "LAr",   "LXe",  "LHe",
        "LN2",   "D2O",  "CD2",   "NH3",   "ND3", "LiH", "LiD",   "LiF",  "CaF2",
        "CaCO3", "SiO2", "Si3N4", "Al2O3", "B4C", "BN",  "CsI",   "NaI",  "PbWO4",
        "PET",   "PE",   "PTFE",  "PMMA",  "CH",  "CH4", "glass", "none", "scintillator"};
    const char *const folders[] = {"materials", NULL};
    bh_material_library *library = bh_material_library_new(folders);
    size_t count;
    const char *const *names = bh_material_names(library, &count);
    for (int i = 0; i < COUNT(symbols); i++) {
        const char *meant = bh_material_meant(symbols[i], names, count);
        ck_assert_msg(meant && strlen(meant) > 2 && strcmp(meant, symbols[i]) != 0, "%s: %s",
                      symbols[i], meant ? meant : "nothing");
    }
    bh_material_library_free(library);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("material_names");
    tcase_set_timeout(tests, 60);
    tcase_add_test(tests, british_spelling);
    tcase_add_test(tests, what_was_meant);
    tcase_add_test(tests, short_forms_lead_to_files);
    return run_suite("material_names", tests);
}
