/* material_file.c - one file of the library of materials, read and checked. */
#include "beamhours/matter/material_file.h"

#include <math.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/base/sentences.h"
#include "beamhours/document/node.h"
#include "beamhours/matter/composition.h"
#include "beamhours/matter/material_keys.h"

/* Constant while one file is read. */
typedef struct {
    bh_reading reading;
    const bh_material_written *from;
    bh_material *to;
} task;

/* `before` and `text` as one string of the arena; NULL without memory. */
static const char *join(bh_arena *arena, const char *before, const char *text)
{
    const size_t head = strlen(before);
    const size_t size = strlen(text) + 1;
    char *out = bh_arena_take(arena, head + size, 1);
    if (out) {
        memcpy(out, before, head + 1);
        memcpy(out + head, text, size);
    }
    return out;
}

static void say_missing(const task *t, const char *name)
{
    const bh_key *key = bh_schema_find(&bh_material_schema, name);
    bh_say(&t->reading, t->from->section.at, &t->from->section, name, BH_SAY_MISSING_KEY,
           bh_material_schema.name, name, key->example);
}

/* Composition and density: all but vacuum must have them, vacuum must not. */
static void check_matter(const task *t)
{
    const bh_material_written *m = t->from;
    const bool composed = m->formula.given || m->atoms.given || m->weights.given;
    if (t->to->state != BH_STATE_VACUUM) {
        if (!composed)
            bh_say(&t->reading, m->section.at, &m->section, NULL, BH_SAY_MISSING_GROUP,
                   bh_material_schema.name, "formula, atoms and weights");
        if (!m->density.given)
            say_missing(t, "density");
        return;
    }
    if (composed)
        bh_say(&t->reading, m->state.at, &m->section, "state", BH_SAY_VACUUM_HAS, "composition");
    if (m->density.given)
        bh_say(&t->reading, m->density.at, &m->section, "density", BH_SAY_VACUUM_HAS, "density");
}

/* What a gas needs and nothing else may have. */
static void check_gas(const task *t)
{
    static const char *const names[] = {"temperature", "pressure", "molecule"};
    for (size_t i = 0; i < sizeof names / sizeof names[0]; i++) {
        const bh_key *key = bh_schema_find(&bh_material_schema, names[i]);
        const bool given = bh_schema_given(key, t->from);
        if (t->to->state == BH_STATE_GAS && !given)
            say_missing(t, names[i]);
        if (t->to->state != BH_STATE_GAS && given)
            bh_say(&t->reading, bh_schema_mark(key, t->from), &t->from->section, names[i],
                   BH_SAY_ONLY_GAS, names[i]);
    }
}

static bh_code fill_composition(const task *t)
{
    const bh_material_written *m = t->from;
    const bh_shares shares =
        m->formula.given ? (bh_shares){"formula", BH_SHARES_FORMULA, &m->formula}
        : m->atoms.given ? (bh_shares){"atoms", BH_SHARES_ATOMS, &m->atoms}
                         : (bh_shares){"weights", BH_SHARES_WEIGHTS, &m->weights};
    bh_composition found;
    const bh_code code = bh_composition_read(&t->reading, &m->section, &shares, &found);
    if (code)
        return code;
    t->to->count = found.count;
    t->to->parts = found.parts;
    t->to->mean_atomic_mass = found.mean_atomic_mass;
    return BH_OK;
}

static void fill_values(const task *t)
{
    const bh_material_written *m = t->from;
    bh_material *to = t->to;
    to->density = m->density.value;
    to->temperature = m->temperature.value;
    to->pressure = m->pressure.value;
    to->molecule = m->molecule.value;
    to->molar_mass = to->molecule * to->mean_atomic_mass;
    to->published_x0 = m->radiation_length.value;
    to->melting = m->melting.value;
    to->boiling = m->boiling.value;
    to->conductivity = m->conductivity.value;
    to->effect = (bh_density_effect){.mean_excitation = m->mean_excitation.value,
                                     .c = m->density_effect.c.value,
                                     .x0 = m->density_effect.x0.value,
                                     .x1 = m->density_effect.x1.value,
                                     .a = m->density_effect.a.value,
                                     .k = m->density_effect.k.value,
                                     .delta0 = m->density_effect.delta0.value,
                                     .density = m->density_effect.density.value};
}

static bh_code fill_hazards(const task *t)
{
    const bh_words *words = &t->from->hazards;
    const char **list = bh_arena_take(t->reading.arena, words->count + 1, sizeof *list);
    if (!list)
        return BH_ENOMEM;
    for (size_t i = 0; i < words->count; i++)
        if (words->items[i].text)
            list[t->to->hazard_count++] = words->items[i].text;
    t->to->hazards = list;
    return BH_OK;
}

/* "density: from memory", in the order of the keys. */
static bh_code fill_sources(const task *t)
{
    static const char *const heads[] = {
#define SOURCE_HEAD(key) #key ": ",
        BH_MATERIAL_SOURCED(SOURCE_HEAD)
#undef SOURCE_HEAD
    };
    const bh_sources_written *from = &t->from->sources;
    const bh_word *const words[] = {
#define SOURCE_WORD(key) &from->key,
        BH_MATERIAL_SOURCED(SOURCE_WORD)
#undef SOURCE_WORD
    };
    const size_t all = sizeof words / sizeof words[0];
    const char **list = bh_arena_take(t->reading.arena, all, sizeof *list);
    if (!list)
        return BH_ENOMEM;
    for (size_t i = 0; i < all; i++) {
        if (!words[i]->text)
            continue;
        list[t->to->source_count] = join(t->reading.arena, heads[i], words[i]->text);
        if (!list[t->to->source_count++])
            return BH_ENOMEM;
    }
    t->to->sources = list;
    return BH_OK;
}

/* A gas whose density is far from the ideal one: most likely a slip of units. */
static void doubt_gas(const task *t)
{
    const bh_material *m = t->to;
    const double ideal = bh_material_gas_density(m, m->temperature, m->pressure);
    if (m->state != BH_STATE_GAS || fabs(m->density - ideal) <= 0.05 * ideal)
        return;
    char number[BH_NUMBER_SIZE];
    bh_number_digits(ideal, 4, number, sizeof number);
    bh_warn(&t->reading, t->from->density.at, &t->from->section, "density", BH_WARN_GAS_DENSITY,
            number);
}

/* [1] Z / A of all atoms together, with A in g/mol. */
static double z_over_a(const bh_material *m)
{
    double z = 0.0;
    for (size_t i = 0; i < m->count; i++)
        z += m->parts[i].per_atom * m->parts[i].z;
    return z / m->mean_atomic_mass;
}

/* A published set obeys C = 2 ln(I / plasma energy) + 1 and joins delta0 at x0 (Sternheimer, Berger
 * and Seltzer 1984): what does not has a slip or a lost sign in it. */
static void doubt_effect(const task *t)
{
    const bh_density_effect *e = &t->to->effect;
    if (!(e->density > 0.0) || !(e->mean_excitation > 0.0))
        return;
    const double plasma = 28.816e-6 * sqrt(e->density * z_over_a(t->to)); /* [MeV] */
    const double c = 2.0 * log(e->mean_excitation / plasma) + 1.0;
    const double a = (e->c + e->delta0 - 2.0 * log(10.0) * e->x0) / pow(e->x1 - e->x0, e->k);
    char number[BH_NUMBER_SIZE];
    if (fabs(c - e->c) > 0.05) {
        bh_number_digits(c, 5, number, sizeof number);
        bh_warn(&t->reading, t->from->density_effect.c.at, &t->from->density_effect.section, "c",
                BH_WARN_EFFECT_C, number);
    }
    if (!(fabs(a - e->a) <= 0.005 * a)) {
        bh_number_digits(a, 4, number, sizeof number);
        bh_warn(&t->reading, t->from->density_effect.a.at, &t->from->density_effect.section, "a",
                BH_WARN_EFFECT_JOIN, number);
    }
}

static bh_code fill(const task *t)
{
    t->to->state = (bh_state)bh_schema_choice(t->from->state.text, bh_material_states);
    t->to->summary = join(t->reading.arena, "", t->from->summary.text ? t->from->summary.text : "");
    if (t->from->state.text) {
        check_matter(t);
        check_gas(t);
    }
    bh_code code = fill_composition(t);
    fill_values(t);
    if (!code)
        code = fill_hazards(t);
    if (!code)
        code = fill_sources(t);
    return code || t->to->summary ? code : BH_ENOMEM;
}

bh_code bh_material_read(const bh_material_source *source, bh_arena *arena, bh_diags *diags,
                         bh_material *out)
{
    const size_t before = bh_diags_errors(diags);
    bh_document *document = bh_document_parse(source->bytes, source->length, source->file, diags);
    if (!document)
        return BH_EPLAN;
    bh_material_written written = {0};
    const task t = {{.arena = arena, .diags = diags}, &written, out};
    *out =
        (bh_material){.name = join(arena, "", source->name), .file = join(arena, "", source->file)};
    bh_code code = out->name && out->file ? BH_OK : BH_ENOMEM;
    if (!code)
        code =
            bh_schema_read(&t.reading, &bh_material_schema, bh_document_root(document), &written);
    if (!code)
        code = fill(&t);
    if (code == BH_ENOMEM)
        bh_diags_lose(diags);
    else if (bh_diags_errors(diags) > before)
        code = BH_EPLAN;
    if (!code && out->count > 0) {
        doubt_gas(&t);
        doubt_effect(&t);
    }
    bh_document_free(document);
    return code;
}

/* The first character behind blanks, at most `end`. */
static const char *skip_blanks(const char *p, const char *end)
{
    while (p < end && (*p == ' ' || *p == '\r'))
        p++;
    return p;
}

/* Behind comments and empty lines. */
static const char *skip_comments(const char *p, const char *end)
{
    p = skip_blanks(p, end);
    while (p < end && (*p == '#' || *p == '\n')) {
        const char *line = memchr(p, '\n', (size_t)(end - p));
        p = skip_blanks(line ? line + 1 : end, end);
    }
    return p;
}

bool bh_material_is_file(const char *bytes, size_t length)
{
    static const char key[] = "material";
    static const char mark[] = "\xef\xbb\xbf"; /* a byte order mark */
    const size_t size = sizeof key - 1;
    const char *end = bytes + length;
    const bool marked = length >= sizeof mark - 1 && memcmp(bytes, mark, sizeof mark - 1) == 0;
    const char *p = skip_comments(marked ? bytes + sizeof mark - 1 : bytes, end);
    if ((size_t)(end - p) < size || memcmp(p, key, size) != 0)
        return false;
    p = skip_blanks(p + size, end);
    return p < end && *p == ':';
}
