/* choices.c - particles, materials, models, names of the plan, and keys, each with what it is. */
#include "beamhours/screen/choices.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/document/trail.h"
#include "beamhours/physics/coulomb.h"
#include "beamhours/physics/process.h"
#include "beamhours/physics/radiative.h"
#include "beamhours/physics/structure.h"
#include "beamhours/plan/key_list.h"

static const char *copy(bh_model *model, const char *text)
{
    const size_t size = text ? strlen(text) + 1 : 0;
    char *own = text ? bh_arena_take(model->chooser.arena, size, 1) : NULL;
    if (own)
        memcpy(own, text, size);
    return own;
}

void bh_choices_add(bh_model *model, const char *name, const char *about, const char *more)
{
    bh_chooser *c = &model->chooser;
    if (c->count == c->room) {
        const size_t room = c->room ? 2 * c->room : 64;
        bh_choice *list = bh_arena_take(c->arena, room, sizeof *list);
        if (!list)
            return;
        if (c->count)
            memcpy(list, c->choices, c->count * sizeof *list);
        c->choices = list;
        c->room = room;
    }
    const bh_choice made = {copy(model, name), copy(model, about ? about : ""), copy(model, more)};
    if (made.name && made.about)
        c->choices[c->count++] = made;
}

/* --- kinds of choices --- */

static void particles(bh_model *model)
{
    for (int i = 0; bh_particle_name(i); i++) {
        bh_particle p;
        char about[120];
        if (!bh_particle_find(bh_particle_name(i), &p))
            continue;
        static const char *const sorts[] = {"lepton", "hadron", "ion"};
        (void)snprintf(about, sizeof about, "%s, charge %+d, mass %.6g MeV", sorts[p.kind],
                       p.charge, p.mass);
        bh_choices_add(model, p.name, about, "any nuclide too, such as 12C: Tab, then type it");
    }
}

static void materials(bh_model *model)
{
    size_t count = 0;
    const char *const *names = model->library ? bh_material_names(model->library, &count) : NULL;
    for (size_t i = 0; names && i < count; i++)
        bh_choices_add(model, names[i], "", NULL);
}

static void range_of(const bh_structure_model *m, char *out, size_t size)
{
    out[0] = '\0';
    if (!isnan(m->q2_min) && !isnan(m->q2_max))
        (void)snprintf(out, size, "Q2 from %g to %g GeV2; ", m->q2_min, m->q2_max);
}

static void structures(bh_model *model)
{
    const bh_structure_model *s = NULL;
    bh_choices_add(model, "default", "the best founded for each nucleus", NULL);
    for (int i = 0; (s = bh_structure_model_at(i)); i++) {
        char range[80];
        bh_text more = {0};
        range_of(s, range, sizeof range);
        bh_text_appendf(&more, "%s%s", range, s->source);
        bh_choices_add(model, s->name, s->summary, more.bytes);
        bh_text_free(&more);
    }
}

static void processes(bh_model *model)
{
    const bh_process *p = NULL;
    for (int i = 0; (p = bh_process_at(i)); i++)
        bh_choices_add(model, p->name, p->summary, p->source);
}

static void coulombs(bh_model *model)
{
    const bh_coulomb *c = NULL;
    bh_choices_add(model, "default", "the best there is", NULL);
    for (int i = 0; (c = bh_coulomb_at(i)); i++) {
        bh_text more = {0};
        bh_text_appendf(&more, "%s; %s", c->range ? c->range : "", c->source);
        bh_choices_add(model, c->name, c->summary, more.bytes);
        bh_text_free(&more);
    }
}

static void radiatives(bh_model *model)
{
    const bh_radiative *r = NULL;
    bh_choices_add(model, "default", "maximon-tjon for leptons", NULL);
    bh_choices_add(model, "none", "no internal radiation", NULL);
    for (int i = 0; (r = bh_radiative_at(i)); i++)
        bh_choices_add(model, r->name, r->summary, r->source);
}

/* Names of the items of a list of the plan. */
static void names_of(bh_model *model, const char *key)
{
    const bh_node *root = bh_document_root(bh_edit_document(model->edit));
    const bh_node *list = bh_node_get(root, key);
    for (size_t i = 0; list && list->kind == BH_NODE_LIST && i < list->count; i++) {
        const char *name = bh_item_name(list->items[i]);
        char about[64];
        (void)snprintf(about, sizeof about, "%s, line %d", key, list->items[i]->at.line);
        if (name)
            bh_choices_add(model, name, about, NULL);
    }
}

static void targets(bh_model *model)
{
    names_of(model, "targets");
}

static void arms(bh_model *model)
{
    names_of(model, "arms");
}

static const struct {
    const char *last; /* part of the path */
    const char *inside;
    void (*fill)(bh_model *);
} kinds[] = {{"particle", "", particles},         {"material", "", materials},
             {"structure", "models", structures}, {"coulomb", "models", coulombs},
             {"radiative", "models", radiatives}, {"process", "", processes},
             {"target", "settings", targets},     {"target", "every_setting", targets},
             {"use", "targets", targets},         {"arm", "settings", arms},
             {"arm", "every_setting", arms}};

/* "right | left": the words of a key, where it takes nothing else. */
static bool words(bh_model *model, const char *path)
{
    bh_plan_key key;
    if (!bh_plan_key_find(path, &key, NULL) || strcmp(key.kind, "one word") != 0)
        return false;
    for (char *word = key.units; word;) {
        char *next = strstr(word, " | ");
        if (next)
            *next = '\0';
        if (*word)
            bh_choices_add(model, word,
                           key.preset && strcmp(key.preset, word) == 0 ? "the default" : "", NULL);
        word = next ? next + 3 : NULL;
    }
    return model->chooser.count > 0;
}

bool bh_choices_for(bh_model *model, const char *path)
{
    const char *dot = strrchr(path, '.'), *last = dot ? dot + 1 : path;
    for (size_t i = 0; i < sizeof kinds / sizeof kinds[0]; i++)
        if (strcmp(last, kinds[i].last) == 0 &&
            strncmp(path, kinds[i].inside, strlen(kinds[i].inside)) == 0) {
            kinds[i].fill(model);
            return model->chooser.count > 0;
        }
    return words(model, path);
}

/* --- keys that may be added --- */

/* `path` of the plan without names and numbers of list items, as the list of keys has it. */
static void key_path(const char *path, char out[160])
{
    bh_plan_key key;
    out[0] = '\0';
    if (!path[0])
        return;
    if (bh_plan_key_find(path, &key, NULL)) {
        (void)snprintf(out, 160, "%s", key.path);
        return;
    }
    char shorter[512]; /* an item of a list */
    (void)snprintf(shorter, sizeof shorter, "%s", path);
    char *dot = strrchr(shorter, '.');
    if (dot)
        *dot = '\0';
    if (dot && bh_plan_key_find(shorter, &key, NULL))
        (void)snprintf(out, 160, "%s", key.path);
}

void bh_choices_of_keys(bh_model *model, const char *path)
{
    char prefix[160];
    const bh_node *mapping = bh_document_find(bh_edit_document(model->edit), path);
    bh_plan_key key;
    key_path(path, prefix);
    const char *last = strrchr(prefix, '.');
    if (last && strcmp(last, ".beam") == 0) /* of a setting: the keys of the plan's */
        (void)snprintf(prefix, sizeof prefix, "beam");
    const size_t n = strlen(prefix);
    for (size_t i = 0; mapping && bh_plan_key_at(i, &key); i++) {
        const char *rest = key.path + (n ? n + 1 : 0);
        if (strncmp(key.path, prefix, n) != 0 || (n && key.path[n] != '.') || strchr(rest, '.') ||
            bh_node_get(mapping, rest))
            continue;
        const char *example = key.example;
        const size_t name = strlen(rest);
        if (example && strncmp(example, rest, name) == 0 && example[name] == ':')
            example += name + 1 + (example[name + 1] == ' ');
        bh_choices_add(model, rest, key.meaning, example);
    }
}

/* --- more --- */

static void describe_material(const bh_material *m, bh_text *out)
{
    static const char *const states[] = {"solid", "liquid", "gas", "vacuum"};
    bh_text_appendf(out, "%s; %s, %.4g g/cm3", m->summary ? m->summary : "", states[m->state],
                    m->density);
    for (size_t i = 0; i < m->source_count; i++)
        bh_text_appendf(out, "; %s", m->sources[i]);
}

void bh_choices_more(const bh_model *model, const bh_choice *choice, bh_text *out)
{
    const char *dot = strrchr(model->field_path, '.');
    if (model->chooser.kind == BH_CHOOSE_VALUE && dot && strcmp(dot, ".material") == 0) {
        bh_diags *diags = bh_diags_new();
        const bh_material *m = diags ? bh_material_find(model->library, choice->name,
                                                        (bh_mark){NULL, 0, 0}, "material", diags)
                                     : NULL;
        if (m)
            describe_material(m, out);
        bh_diags_free(diags);
        return;
    }
    bh_text_append(out, choice->about);
    if (choice->more && model->chooser.kind == BH_CHOOSE_KEY)
        bh_text_appendf(out, "; for example %s: %s", choice->name, choice->more);
    else if (choice->more)
        bh_text_appendf(out, "%s%s", out->length ? "; " : "", choice->more);
}
