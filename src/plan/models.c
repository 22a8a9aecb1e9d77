/* models.c - which physics is computed: process, structure by nuclide, corrections. */
#include <string.h>

#include "beamhours/base/sentences.h"
#include "beamhours/physics/process.h"
#include "beamhours/physics/structure.h"
#include "beamhours/plan/making.h"
#include "beamhours/units/nuclide.h"

void bh_check_process(const bh_making *making, const bh_section *section, const bh_word *process)
{
    if (process->given && process->text && !bh_process_find(process->text))
        bh_tell(making, process->at, section, "process", BH_SAY_NOT_COMPUTED, process->text);
}

/* Whether the registry has `name` for a nucleus; complains in its words. */
static bool check_model(const bh_making *making, const bh_section *section, const char *key,
                        const bh_word *name, const bh_amount *nucleus)
{
    bh_error err = {.code = BH_OK};
    bh_structure *made = bh_structure_new(name->text, nucleus->z, nucleus->a, &err);
    if (!made)
        bh_tell(making, name->at, section, key, "%s", err.text);
    bh_structure_free(made);
    return made != NULL;
}

/* The isotope that stands for an element. */
static int usual_isotope(int z)
{
    size_t count;
    const bh_nuclide *list = bh_element_isotopes(z, &count);
    size_t best = 0;
    for (size_t i = 1; i < count; i++)
        if (list[i].abundance > list[best].abundance)
            best = i;
    return count > 0 ? list[best].a : 0;
}

static bool is_registered(const char *name)
{
    const size_t length = strcspn(name, "/");
    const bh_structure_model *model;
    for (int i = 0; (model = bh_structure_model_at(i)) != NULL; i++)
        if (strlen(model->name) == length && strncmp(model->name, name, length) == 0)
            return true;
    return strcmp(name, "default") == 0;
}

/* One name for all: it must exist, and describe what each target measures. */
static void check_one_name(const bh_making *making, const bh_word *name)
{
    const bh_section *section = &making->raw.models.section;
    const bh_amount proton = {.z = 1, .a = 1};
    if (!name->given || !name->text)
        return;
    if (!is_registered(name->text)) {
        (void)check_model(making, section, "structure", name, &proton);
        return;
    }
    for (size_t i = 0; i < making->plan.target_count; i++) {
        bh_constituent main;
        if (!bh_main_nuclide(&making->plan.targets[i], &main))
            continue;
        const bh_amount nucleus = {.z = main.z, .a = main.a};
        (void)check_model(making, section, "structure", name, &nucleus);
    }
}

static bh_code set_choices(bh_making *making)
{
    const bh_pairs *pairs = &making->raw.models.structure;
    bh_models *models = &making->plan.models;
    const bh_section section = {.node = pairs->node, .given = true};
    bh_structure_choice *choices =
        bh_arena_take(making->reading.arena, pairs->count + 1, sizeof *choices);
    if (!choices)
        return BH_ENOMEM;
    for (size_t i = 0; i < pairs->count; i++) {
        const bh_pair *pair = &pairs->items[i];
        bh_structure_choice *choice = &choices[models->choice_count];
        if (!bh_nuclide_parse(pair->name, &choice->z, &choice->a)) {
            const bh_word name = {.text = pair->name, .given = true, .at = pair->name_at};
            bh_tell_no_nuclide(making, &name, &section, pair->name, 0);
            continue;
        }
        choice->model = pair->word;
        const bh_amount nucleus = {.z = choice->z,
                                   .a = choice->a > 0 ? choice->a : usual_isotope(choice->z)};
        if (pair->word.text)
            (void)check_model(making, &section, pair->name, &pair->word, &nucleus);
        models->choice_count++;
    }
    models->by_nuclide = choices;
    return BH_OK;
}

bh_code bh_make_models(bh_making *making)
{
    const bh_raw_models *raw = &making->raw.models;
    making->plan.models = (bh_models){
        .process = raw->process,
        .structure = raw->structure.word,
        .coulomb = raw->coulomb,
        .radiative = raw->radiative,
        .energy_loss = raw->energy_loss,
    };
    if (!making->plan.models.structure.text)
        making->plan.models.structure.text = "default";
    bh_check_process(making, &raw->section, &raw->process);
    check_one_name(making, &raw->structure.word);
    return set_choices(making);
}

/* Whether the model called `name`, or its set "name/2", describes z, a. */
static bool describes(const char *name, int z, int a)
{
    const size_t length = strcspn(name, "/");
    const bh_structure_model *model;
    for (int i = 0; (model = bh_structure_model_at(i)) != NULL; i++)
        if (strlen(model->name) == length && strncmp(model->name, name, length) == 0)
            return bh_structure_sets(model, z, a) > 0;
    return false;
}

const char *bh_plan_structure(const bh_plan *plan, int z, int a)
{
    const bh_models *models = &plan->models;
    const char *element = NULL;
    for (size_t i = 0; i < models->choice_count; i++) {
        const bh_structure_choice *choice = &models->by_nuclide[i];
        if (choice->z == z && choice->a == a)
            return choice->model.text;
        if (choice->z == z && choice->a == 0)
            element = choice->model.text;
    }
    if (element)
        return element;
    /* One name is for the scatterer; windows that it cannot describe take the default. */
    return describes(models->structure.text, z, a) ? models->structure.text : "default";
}
