/* hazard.c - what is dangerous in a material. */
#include "beamhours/matter/hazard.h"

#include <string.h>

#define BIT(id) (1U << BH_HAZARD_##id)

const char *const bh_hazard_words[BH_HAZARD_COUNT + 1] = {
#define HAZARD_WORD(id, word) word,
    BH_HAZARDS(HAZARD_WORD)
#undef HAZARD_WORD
        NULL};

static const char *const meanings[BH_HAZARD_COUNT] = {
    [BH_HAZARD_FLAMMABLE_GAS] = "flammable, a leak or boil-off makes an explosive mixture with air",
    [BH_HAZARD_FLAMMABLE] = "flammable, keep flames, sparks and hot surfaces away",
    [BH_HAZARD_CRYOGEN] = "so cold that it burns skin, and as it warms up pressure rises fast",
    [BH_HAZARD_OXYGEN] =
        "takes the place of oxygen in a confined space, unnoticed until people faint",
    [BH_HAZARD_OXIDISING] = "feeds fire, oil, grease and dust ignite in it",
    [BH_HAZARD_REACTIVE] =
        "reacts with water and moist air and may ignite, keep it dry and under cover gas",
    [BH_HAZARD_BERYLLIUM] =
        "dust, chips and oxide of beryllium harm the lungs for life, and thin pieces break",
    [BH_HAZARD_LEAD] = "lead is toxic as dust or on the hands, and melts early",
    [BH_HAZARD_URANIUM] =
        "uranium is radioactive, toxic, burns when finely divided, and is accounted for by law",
    [BH_HAZARD_TOXIC] = "toxic when breathed in or swallowed",
    [BH_HAZARD_RADIOACTIVE] = "radioactive before any beam has struck it",
};

const char *bh_hazard_meaning(bh_hazard hazard)
{
    return hazard < BH_HAZARD_COUNT ? meanings[hazard] : "";
}

static const double cryogen_boils = 200.0; /* [K] a liquid that boils below is a cryogen */
static const double trace = 0.01; /* [1] share of atoms below which an element is passed over */
static const double nearly_all = 0.99;   /* [1] share of atoms of a material that is one element */
static const double oxygen_of_air = 0.2; /* [1] with more than this a gas displaces no oxygen */

/* What an element brings along, whatever words the file has. */
static unsigned hazards_of_element(int z)
{
    switch (z) {
    case 4:
        return BIT(BERYLLIUM);
    case 82:
        return BIT(LEAD);
    case 92:
        return BIT(URANIUM);
    case 43:
    case 61:
        return BIT(RADIOACTIVE);
    default:
        return z >= 84 ? BIT(RADIOACTIVE) : 0U;
    }
}

/* The share of atoms that are of element z. */
static double element_share(const bh_material *material, int z)
{
    double share = 0.0;
    for (size_t i = 0; i < material->count; i++)
        if (material->parts[i].z == z)
            share += material->parts[i].per_atom;
    return share;
}

static bool is_alkali_metal(const bh_material *material)
{
    static const int alkali[] = {3, 11, 19, 37, 55, 87};
    double share = 0.0;
    for (size_t i = 0; i < sizeof alkali / sizeof alkali[0]; i++)
        share += element_share(material, alkali[i]);
    return share > nearly_all;
}

static unsigned hazards_of_state(const bh_material *material)
{
    const bool gas = material->state == BH_STATE_GAS;
    const bool liquid = material->state == BH_STATE_LIQUID;
    const bool cold = liquid && material->boiling > 0.0 && material->boiling < cryogen_boils;
    unsigned found = cold ? BIT(CRYOGEN) : 0U;
    if ((gas || liquid) && element_share(material, 1) > nearly_all)
        found |= BIT(FLAMMABLE_GAS);
    if ((gas || cold) && element_share(material, 8) < oxygen_of_air)
        found |= BIT(OXYGEN);
    return found;
}

static unsigned hazards_of_words(const bh_material *material)
{
    unsigned found = 0;
    for (size_t i = 0; i < material->hazard_count; i++)
        for (unsigned h = 0; h < BH_HAZARD_COUNT; h++)
            if (strcmp(material->hazards[i], bh_hazard_words[h]) == 0)
                found |= 1U << h;
    return found;
}

unsigned bh_material_hazards(const bh_material *material)
{
    unsigned found = hazards_of_words(material) | hazards_of_state(material);
    for (size_t i = 0; i < material->count; i++)
        if (element_share(material, material->parts[i].z) > trace)
            found |= hazards_of_element(material->parts[i].z);
    if (is_alkali_metal(material))
        found |= BIT(REACTIVE);
    if (found & BIT(URANIUM))
        found &= ~BIT(RADIOACTIVE);
    if (found & (BIT(BERYLLIUM) | BIT(LEAD) | BIT(URANIUM)))
        found &= ~BIT(TOXIC);
    return found;
}
