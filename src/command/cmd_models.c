/* cmd_models.c - beamhours models [NAME]: what can be chosen, where it holds, whence it comes. */
#include <json-c/json.h>
#include <math.h>
#include <string.h>
#include <sysexits.h>

#include "beamhours/base/nearest.h"
#include "beamhours/base/number.h"
#include "beamhours/command/complain.h"
#include "beamhours/command/input.h"
#include "beamhours/command/places.h"
#include "beamhours/physics/coulomb.h"
#include "beamhours/physics/process.h"
#include "beamhours/physics/radiative.h"
#include "beamhours/physics/structure.h"
#include "beamhours/report/text_table.h"

/* One model, of whatever registry. */
struct model {
    const char *kind, *name, *summary, *source, *use;
    double lo, hi; /* [GeV2] range in Q2; NAN where there is none */
};

enum { MOST = 128 };

static const char *use_of(const bh_structure_model *m)
{
    switch (m->use) {
    case BH_FIT_CROSS_SECTION:
        return "fitted to cross sections: for counting rates";
    case BH_FIT_CORRECTED:
        return "corrected for two-photon exchange: for polarisation observables";
    case BH_FIT_NEUTRAL:
        break;
    }
    return "";
}

static size_t collect(struct model models[MOST])
{
    size_t n = 0;
    const bh_process *p = NULL;
    const bh_structure_model *s = NULL;
    const bh_coulomb *c = NULL;
    const bh_radiative *r = NULL;
    for (int i = 0; n < MOST && (p = bh_process_at(i)); i++)
        models[n++] = (struct model){"process", p->name, p->summary, p->source, "", NAN, NAN};
    for (int i = 0; n < MOST && (s = bh_structure_model_at(i)); i++)
        models[n++] = (struct model){"structure", s->name,   s->summary, s->source,
                                     use_of(s),   s->q2_min, s->q2_max};
    for (int i = 0; n < MOST && (c = bh_coulomb_at(i)); i++)
        models[n++] = (struct model){"coulomb", c->name, c->summary, c->source, "", NAN, NAN};
    for (int i = 0; n < MOST && (r = bh_radiative_at(i)); i++)
        models[n++] = (struct model){"radiative", r->name, r->summary, r->source, "", NAN, NAN};
    return n;
}

static void range_text(const struct model *m, bh_text *out)
{
    if (isnan(m->lo) || isnan(m->hi))
        return;
    bh_text_append(out, "Q2 from ");
    bh_text_append_number(out, m->lo);
    bh_text_append(out, " to ");
    bh_text_append_number(out, m->hi);
    bh_text_append(out, " GeV2");
}

static void list(const struct model *models, size_t n, bh_text *out)
{
    for (size_t i = 0; i < n; i++) {
        if (i == 0 || strcmp(models[i].kind, models[i - 1].kind) != 0)
            bh_text_appendf(out, "%s%s\n", i ? "\n" : "", models[i].kind);
        char lead[64];
        (void)snprintf(lead, sizeof lead, "  %-20s ", models[i].name);
        bh_report_wrapped(lead, models[i].summary, bh_places_width(), out);
    }
}

static void one(const struct model *m, bh_text *out)
{
    const int width = bh_places_width();
    bh_text range = {0};
    bh_text_appendf(out, "%s (%s)\n", m->name, m->kind);
    bh_report_wrapped("  ", m->summary, width, out);
    range_text(m, &range);
    if (range.bytes)
        bh_report_wrapped("  range: ", range.bytes, width, out);
    if (m->use[0])
        bh_report_wrapped("  use: ", m->use, width, out);
    bh_report_wrapped("  source: ", m->source, width, out);
    bh_text_free(&range);
}

static json_object *number(double value)
{
    char text[BH_NUMBER_SIZE];
    (void)bh_number_print(value, text, sizeof text);
    return json_object_new_double_s(value, text);
}

static json_object *as_object(const struct model *m)
{
    json_object *o = json_object_new_object();
    (void)json_object_object_add(o, "kind", json_object_new_string(m->kind));
    (void)json_object_object_add(o, "name", json_object_new_string(m->name));
    (void)json_object_object_add(o, "summary", json_object_new_string(m->summary));
    (void)json_object_object_add(o, "q2_min_GeV2", isnan(m->lo) ? NULL : number(m->lo));
    (void)json_object_object_add(o, "q2_max_GeV2", isnan(m->hi) ? NULL : number(m->hi));
    (void)json_object_object_add(o, "use", m->use[0] ? json_object_new_string(m->use) : NULL);
    (void)json_object_object_add(o, "source", json_object_new_string(m->source));
    return o;
}

static void as_json(const struct model *models, size_t n, bool single, bh_text *out)
{
    json_object *all = single ? as_object(models) : json_object_new_array();
    for (size_t i = 0; !single && i < n; i++)
        (void)json_object_array_add(all, as_object(&models[i]));
    const char *text = json_object_to_json_string_ext(all, JSON_C_TO_STRING_PRETTY |
                                                               JSON_C_TO_STRING_NOSLASHESCAPE);
    bh_text_appendf(out, "%s\n", text ? text : "");
    json_object_put(all);
}

static int no_model(const bh_arguments *a, const struct model *models, size_t n, const char *name)
{
    const char *names[MOST];
    char sentence[160];
    for (size_t i = 0; i < n; i++)
        names[i] = models[i].name;
    const char *near = bh_nearest(name, names, n);
    (void)snprintf(sentence, sizeof sentence, "no model \"%.60s\"%s%s%s", name,
                   near ? "; did you mean " : "; `beamhours models` lists them", near ? near : "",
                   near ? "?" : "");
    return bh_usage(a, sentence);
}

int bh_cmd_models(const bh_arguments *arguments)
{
    struct model models[MOST];
    const char *format = bh_arguments_format(arguments, BH_OPT_LIST_FORMAT);
    if (!format)
        return EX_USAGE;
    if (arguments->word_count > 1)
        return bh_usage(arguments, "takes one name at most");
    const char *name = arguments->word_count ? arguments->words[0] : NULL;
    size_t n = collect(models), from = 0;
    while (name && from < n && strcmp(models[from].name, name) != 0)
        from++;
    if (from == n)
        return no_model(arguments, models, n, name);
    bh_text out = {0};
    if (strcmp(format, "json") == 0)
        as_json(&models[from], n, name != NULL, &out);
    else if (name)
        one(&models[from], &out);
    else
        list(models, n, &out);
    return bh_output(&out, NULL);
}
