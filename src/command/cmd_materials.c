/* cmd_materials.c - beamhours materials [NAME]: the library, one of its materials, or what that
 * does to a particle. */
#include <json-c/json.h>
#include <math.h>
#include <string.h>
#include <sysexits.h>

#include "beamhours/base/number.h"
#include "beamhours/command/beam.h"
#include "beamhours/command/complain.h"
#include "beamhours/command/input.h"
#include "beamhours/command/losses.h"
#include "beamhours/command/places.h"
#include "beamhours/matter/radiation_length.h"
#include "beamhours/report/text_table.h"
#include "beamhours/units/nuclide.h"

static const char *const states[] = {"solid", "liquid", "gas", "vacuum"};

/* A number of a material: 0 stands for "not known" in all but a few. */
struct fact {
    const char *key, *unit;
    double value;
};

enum { FACTS = 14 };

static size_t facts_of(const bh_material *m, struct fact facts[FACTS])
{
    const bh_radiation_length length = bh_radiation_length_of(m);
    const struct fact known[] = {
        {"density_g_per_cm3", "g/cm3", m->density},
        {"temperature_K", "K", m->temperature},
        {"pressure_Pa", "Pa", m->pressure},
        {"mean_atomic_mass_g_per_mol", "g/mol", m->mean_atomic_mass},
        {"mean_excitation_energy_eV", "eV", m->effect.mean_excitation * 1e6},
        {"radiation_length_g_per_cm2", "g/cm2", length.value},
        {"radiation_length_computed_g_per_cm2", "g/cm2", length.computed},
        {"melting_point_K", "K", m->melting},
        {"boiling_point_K", "K", m->boiling},
        {"thermal_conductivity_W_per_cm_K", "W/cm/K", m->conductivity},
        {"density_effect_density_g_per_cm3", "g/cm3", m->effect.density},
    };
    size_t n = 0;
    for (size_t i = 0; i < sizeof known / sizeof known[0]; i++)
        if (known[i].value > 0.0)
            facts[n++] = known[i];
    return n;
}

static void effect_text(const bh_material *m, bh_text *out)
{
    const bh_density_effect *e = &m->effect;
    if (!(e->density > 0.0))
        return;
    const double v[] = {e->c, e->x0, e->x1, e->a, e->k, e->delta0};
    static const char *const names[] = {"C", "x0", "x1", "a", "k", "delta0"};
    bh_text_appendf(out, "  %-36s", "density effect");
    for (size_t i = 0; i < sizeof v / sizeof v[0]; i++) {
        bh_text_appendf(out, " %s ", names[i]);
        bh_text_append_number(out, v[i]);
    }
    bh_text_append(out, "\n");
}

static void composition_text(const bh_material *m, bh_text *out)
{
    char name[8], digits[BH_NUMBER_SIZE];
    bh_text_append(out, "  composition, share of atoms\n");
    for (size_t i = 0; i < m->count; i++) {
        (void)bh_number_digits(m->parts[i].per_atom * 100.0, 6, digits, sizeof digits);
        bh_text_appendf(out, "    %-6s %10s %%%s\n",
                        bh_nuclide_name(m->parts[i].z, m->parts[i].a, name), digits,
                        m->parts[i].natural ? "  (as in nature)" : "");
    }
}

static void as_text(const bh_material *m, bh_text *out)
{
    struct fact facts[FACTS];
    const size_t n = facts_of(m, facts);
    const int width = bh_places_width();
    bh_text_appendf(out, "%s (%s)\n", m->name, states[m->state]);
    if (m->summary)
        bh_report_wrapped("  ", m->summary, width, out);
    for (size_t i = 0; i < n; i++) {
        bh_text_appendf(out, "  %-36s ", facts[i].key);
        bh_text_append_number(out, facts[i].value);
        bh_text_appendf(out, " %s\n", facts[i].unit);
    }
    effect_text(m, out);
    composition_text(m, out);
    for (size_t i = 0; i < m->hazard_count; i++)
        bh_text_appendf(out, "%s%s", i ? ", " : "  hazards: ", m->hazards[i]);
    bh_text_append(out, m->hazard_count ? "\n" : "");
    for (size_t i = 0; i < m->source_count; i++)
        bh_report_wrapped("  source: ", m->sources[i], width, out);
    bh_report_wrapped("  file: ", m->file ? m->file : "-", width, out);
}

static json_object *strings(const char *const *list, size_t n)
{
    json_object *array = json_object_new_array();
    for (size_t i = 0; i < n; i++)
        (void)json_object_array_add(array, json_object_new_string(list[i]));
    return array;
}

static json_object *number(double value)
{
    char text[BH_NUMBER_SIZE];
    (void)bh_number_print(value, text, sizeof text);
    return json_object_new_double_s(value, text);
}

static json_object *as_object(const bh_material *m)
{
    struct fact facts[FACTS];
    const size_t n = facts_of(m, facts);
    json_object *o = json_object_new_object(), *parts = json_object_new_array();
    (void)json_object_object_add(o, "name", json_object_new_string(m->name));
    (void)json_object_object_add(o, "summary",
                                 m->summary ? json_object_new_string(m->summary) : NULL);
    (void)json_object_object_add(o, "state", json_object_new_string(states[m->state]));
    for (size_t i = 0; i < n; i++)
        (void)json_object_object_add(o, facts[i].key, number(facts[i].value));
    for (size_t i = 0; i < m->count; i++) {
        char name[8];
        json_object *part = json_object_new_object();
        (void)json_object_object_add(
            part, "nuclide",
            json_object_new_string(bh_nuclide_name(m->parts[i].z, m->parts[i].a, name)));
        (void)json_object_object_add(part, "share_of_atoms", number(m->parts[i].per_atom));
        (void)json_object_array_add(parts, part);
    }
    (void)json_object_object_add(o, "composition", parts);
    (void)json_object_object_add(o, "hazards", strings(m->hazards, m->hazard_count));
    (void)json_object_object_add(o, "sources", strings(m->sources, m->source_count));
    return o;
}

static void finish(json_object *o, bh_text *out)
{
    const char *text =
        json_object_to_json_string_ext(o, JSON_C_TO_STRING_PRETTY | JSON_C_TO_STRING_NOSLASHESCAPE);
    bh_text_appendf(out, "%s\n", text ? text : "");
    json_object_put(o);
}

/* Complaints of a material file stand in `diags`. */
static const bh_material *load(bh_material_library *library, const char *name, bh_diags *diags)
{
    return bh_material_find(library, name, (bh_mark){"materials", 1, 1}, name, diags);
}

static int all(bh_material_library *library, bool json, bh_diags *diags, bh_text *out)
{
    size_t count = 0;
    const char *const *names = bh_material_names(library, &count);
    json_object *array = json ? json_object_new_array() : NULL;
    for (size_t i = 0; i < count; i++) {
        const bh_material *m = load(library, names[i], diags);
        if (!m)
            continue;
        char lead[64];
        (void)snprintf(lead, sizeof lead, "%-26s ", m->name);
        if (json)
            (void)json_object_array_add(array, as_object(m));
        else
            bh_report_wrapped(lead, m->summary ? m->summary : "", bh_places_width(), out);
    }
    if (json)
        finish(array, out);
    bh_say_diags(stderr, diags);
    if (count == 0) {
        bh_print(stderr, "beamhours: materials: no library found beside the program; name its "
                         "folder in BEAMHOURS_MATERIALS\n");
        return EX_NOINPUT;
    }
    return bh_diags_errors(diags) ? EX_DATAERR : 0;
}

/* A name that is none is a wrong use; what a file has wrong is said with its place. */
static int complain(const bh_arguments *a, const bh_diags *diags)
{
    const bh_diag *first = bh_diags_count(diags) ? bh_diags_at(diags, 0) : NULL;
    if (first && first->at.file && strcmp(first->at.file, "materials") == 0)
        return bh_usage(a, first->text);
    bh_say_diags(stderr, diags);
    return first ? EX_DATAERR : bh_complain(stderr, &(bh_error){.code = BH_ENOMEM});
}

static void passage_text(const bh_passage_facts *facts, bh_text *out)
{
    char digits[BH_NUMBER_SIZE];
    for (size_t i = 0; i < facts->count; i++) {
        (void)bh_number_digits(facts->facts[i].value, 5, digits, sizeof digits);
        bh_text_appendf(out, "  %-52s %s %s\n", facts->facts[i].key, digits, facts->facts[i].unit);
    }
}

/* What --particle and --kinetic-energy ask for; nothing when neither is given. */
static int passing(const bh_arguments *a, const bh_material *m, bh_passage_facts *out)
{
    bh_particle particle;
    bh_error err;
    double kinetic = NAN;
    out->count = 0;
    if (!a->value[BH_OPT_PARTICLE] && !a->value[BH_OPT_KINETIC])
        return 0;
    int bad = bh_beam_particle(a, &particle);
    if (!bad && !a->value[BH_OPT_KINETIC])
        bad = bh_usage(a, "needs --kinetic-energy beside --particle");
    if (!bad)
        bad = bh_beam_kinetic(a, &particle, &kinetic);
    if (bad)
        return bad;
    const bh_code code = bh_passage_of(&particle, m, kinetic, out, &err);
    if (code == BH_EDOMAIN)
        return bh_usage(a, err.text);
    return code ? bh_complain(stderr, &err) : 0;
}

/* Numbers of the passage stand beside those of the material. */
static json_object *with_passage(const bh_material *m, const bh_passage_facts *facts)
{
    json_object *o = as_object(m);
    for (size_t i = 0; i < facts->count; i++)
        (void)json_object_object_add(o, facts->facts[i].key, number(facts->facts[i].value));
    return o;
}

static int named(const bh_arguments *a, bh_material_library *library, bool json, bh_diags *diags)
{
    bh_text out = {0};
    bh_passage_facts facts;
    const bh_material *m = load(library, a->words[0], diags);
    if (!m)
        return complain(a, diags);
    const int bad = passing(a, m, &facts);
    if (bad)
        return bad;
    if (json) {
        finish(with_passage(m, &facts), &out);
    } else if (facts.count) {
        bh_text_appendf(&out, "%s of %s in %s\n", a->value[BH_OPT_PARTICLE],
                        a->value[BH_OPT_KINETIC], m->name);
        passage_text(&facts, &out);
    } else {
        as_text(m, &out);
    }
    return bh_output(&out, NULL);
}

int bh_cmd_materials(const bh_arguments *arguments)
{
    const char *format = bh_arguments_format(arguments, BH_OPT_LIST_FORMAT);
    if (!format)
        return EX_USAGE;
    if (arguments->word_count > 1)
        return bh_usage(arguments, "takes one name at most");
    if (!arguments->word_count &&
        (arguments->value[BH_OPT_PARTICLE] || arguments->value[BH_OPT_KINETIC]))
        return bh_usage(arguments, "needs the name of a material that the particle passes");
    const bool json = strcmp(format, "json") == 0;
    char **folders = bh_places_materials(NULL);
    bh_material_library *library =
        folders ? bh_material_library_new((const char *const *)folders) : NULL;
    bh_diags *diags = bh_diags_new();
    bh_text out = {0};
    int status = 0;
    if (!library || !diags) {
        status = bh_complain(stderr, &(bh_error){.code = BH_ENOMEM});
    } else if (arguments->word_count) {
        status = named(arguments, library, json, diags);
    } else {
        status = all(library, json, diags, &out);
        if (status == 0)
            status = bh_output(&out, NULL);
    }
    bh_text_free(&out);
    bh_diags_free(diags);
    bh_material_library_free(library);
    bh_places_free(folders);
    return status;
}
