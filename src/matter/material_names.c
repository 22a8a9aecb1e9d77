/* material_names.c - what people call materials, and what the library calls them. */
#include "beamhours/matter/material_names.h"

#include <stdio.h>
#include <string.h>
#include <strings.h>

#include "beamhours/base/nearest.h"
#include "beamhours/units/nuclide.h"

typedef struct {
    const char *said, *name;
} alias;

static const alias spellings[] = {
    {"aluminum", "aluminium"}, {"sulfur", "sulphur"}, {"cesium", "caesium"}, {"fiber", "fibre"}};

/* Compared without regard to case, but where two differ in case alone the exact one wins. */
static const alias short_forms[] = {
    {"LH2", "liquid-hydrogen"},
    {"LH", "liquid-hydrogen"},
    {"GH2", "hydrogen-gas"},
    {"H2", "hydrogen-gas"},
    {"H", "hydrogen-gas"},
    {"hydrogen", "liquid-hydrogen"},
    {"LD2", "liquid-deuterium"},
    {"D2", "deuterium-gas"},
    {"GD2", "deuterium-gas"},
    {"D", "deuterium-gas"},
    {"2H", "deuterium-gas"},
    {"deuterium", "liquid-deuterium"},
    {"He", "helium-gas"},
    {"LHe", "liquid-helium"},
    {"He3", "helium-3-gas"},
    {"3He", "helium-3-gas"},
    {"He4", "helium-4-gas"},
    {"4He", "helium-4-gas"},
    {"helium", "helium-gas"},
    {"helium-3", "helium-3-gas"},
    {"helium-4", "helium-4-gas"},
    {"Li", "lithium"},
    {"Be", "beryllium"},
    {"B", "boron"},
    {"C", "graphite"},
    {"carbon", "graphite"},
    {"N", "nitrogen"},
    {"N2", "nitrogen"},
    {"LN2", "liquid-nitrogen"},
    {"O", "oxygen"},
    {"O2", "oxygen"},
    {"Ne", "neon"},
    {"Na", "sodium"},
    {"Mg", "magnesium"},
    {"Al", "aluminium"},
    {"Si", "silicon"},
    {"S", "sulphur"},
    {"Ar", "argon"},
    {"LAr", "liquid-argon"},
    {"K", "potassium"},
    {"Ca", "calcium"},
    {"Sc", "scandium"},
    {"Ti", "titanium"},
    {"V", "vanadium"},
    {"Cr", "chromium"},
    {"Mn", "manganese"},
    {"Fe", "iron"},
    {"Co", "cobalt"},
    {"Ni", "nickel"},
    {"Cu", "copper"},
    {"Zn", "zinc"},
    {"Ge", "germanium"},
    {"Kr", "krypton"},
    {"Zr", "zirconium"},
    {"Nb", "niobium"},
    {"Mo", "molybdenum"},
    {"Pd", "palladium"},
    {"Ag", "silver"},
    {"Cd", "cadmium"},
    {"In", "indium"},
    {"Sn", "tin"},
    {"Sb", "antimony"},
    {"Te", "tellurium"},
    {"Xe", "xenon"},
    {"LXe", "liquid-xenon"},
    {"Cs", "caesium"},
    {"Ta", "tantalum"},
    {"W", "tungsten"},
    {"Re", "rhenium"},
    {"Ir", "iridium"},
    {"Pt", "platinum"},
    {"Au", "gold"},
    {"Hg", "mercury"},
    {"Pb", "lead"},
    {"Bi", "bismuth"},
    {"Th", "thorium"},
    {"U", "uranium"},
    {"H2O", "water"},
    {"D2O", "heavy-water"},
    {"CH2", "polyethylene"},
    {"CD2", "deuterated-polyethylene"},
    {"CH", "polystyrene"},
    {"CH4", "methane"},
    {"CO2", "carbon-dioxide"},
    {"NH3", "ammonia"},
    {"ND3", "deuterated-ammonia"},
    {"LiH", "lithium-hydride"},
    {"LiD", "lithium-deuteride"},
    {"LiF", "lithium-fluoride"},
    {"CaF2", "calcium-fluoride"},
    {"CaCO3", "calcium-carbonate"},
    {"SiO2", "fused-silica"},
    {"Si3N4", "silicon-nitride"},
    {"Al2O3", "alumina"},
    {"B4C", "boron-carbide"},
    {"BN", "boron-nitride"},
    {"CsI", "caesium-iodide"},
    {"NaI", "sodium-iodide"},
    {"PbWO4", "lead-tungstate"},
    {"steel", "stainless-steel"},
    {"scintillator", "plastic-scintillator"},
    {"polyimide", "kapton"},
    {"PET", "mylar"},
    {"PE", "polyethylene"},
    {"PTFE", "teflon"},
    {"PMMA", "acrylic"},
    {"glass", "borosilicate-glass"},
    {"none", "vacuum"},
};

enum { SHORT_FORMS = sizeof short_forms / sizeof short_forms[0] };

const char *bh_material_british(const char *name, char out[BH_MATERIAL_NAME_SIZE])
{
    for (size_t i = 0; i < sizeof spellings / sizeof spellings[0]; i++) {
        const alias *s = &spellings[i];
        const char *at = strstr(name, s->said);
        if (!at || strlen(name) - strlen(s->said) + strlen(s->name) >= BH_MATERIAL_NAME_SIZE)
            continue;
        (void)snprintf(out, BH_MATERIAL_NAME_SIZE, "%.*s%s%s", (int)(at - name), name, s->name,
                       at + strlen(s->said));
        return out;
    }
    return name;
}

static const char *short_form(const char *name)
{
    for (size_t i = 0; i < SHORT_FORMS; i++)
        if (strcmp(name, short_forms[i].said) == 0)
            return short_forms[i].name;
    for (size_t i = 0; i < SHORT_FORMS; i++)
        if (strcasecmp(name, short_forms[i].said) == 0)
            return short_forms[i].name;
    return NULL;
}

static const char *known(const char *name, const char *const *names, size_t count)
{
    for (size_t i = 0; name && i < count; i++)
        if (strcmp(names[i], name) == 0)
            return names[i];
    return NULL;
}

/* The one of `names` that is an isotope: "lead-208" for "208Pb" or "Pb208"; else NULL. */
static const char *isotope(const char *name, const char *const *names, size_t count)
{
    char full[BH_MATERIAL_NAME_SIZE];
    int z;
    int a;
    const bh_nuclide *nuclide = bh_nuclide_suggest(name);
    if (bh_nuclide_parse(name, &z, &a))
        nuclide = a > 0 ? bh_nuclide_find(z, a) : NULL;
    const char *symbol = nuclide ? bh_element_symbol(nuclide->z) : NULL;
    const char *element = symbol ? short_form(symbol) : NULL;
    if (!element)
        return NULL;
    (void)snprintf(full, sizeof full, "%s-%d", nuclide->z == 6 ? "carbon" : element, nuclide->a);
    return known(full, names, count);
}

const char *bh_material_meant(const char *name, const char *const *names, size_t count)
{
    const char *found = known(short_form(name), names, count);
    if (!found)
        found = isotope(name, names, count);
    return found ? found : bh_nearest(name, names, count);
}
