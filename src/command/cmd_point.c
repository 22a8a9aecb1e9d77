/* cmd_point.c - beamhours point: one energy and angle, without a plan. */
#include <json-c/json.h>
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include <sysexits.h>

#include "beamhours/base/number.h"
#include "beamhours/command/beam.h"
#include "beamhours/command/complain.h"
#include "beamhours/command/input.h"
#include "beamhours/command/places.h"
#include "beamhours/physics/coulomb.h"
#include "beamhours/report/text_table.h"
#include "beamhours/run/one_point.h"
#include "beamhours/units/constants.h"
#include "beamhours/units/nuclide.h"
#include "beamhours/units/quantity.h"

/* What must outlive the request. */
struct point {
    bh_single_request request;
    bh_material_library *library;
    bh_diags *diags;
};

/* Reads option `id` as a quantity into `out`, leaving it alone when the option is absent. */
static int quantity(const bh_arguments *a, bh_option_id id, bh_dimension dimension, double *out)
{
    bh_quantity q;
    bh_error err;
    if (!a->value[id])
        return 0;
    if (bh_quantity_parse(a->value[id], dimension, &q, &err))
        return bh_usage_option(a, id, err.text);
    *out = q.value;
    return 0;
}

static int energy(const bh_arguments *a, bh_single_request *r)
{
    double total = NAN, momentum = NAN;
    const char *kinetic = a->value[BH_OPT_KINETIC];
    int bad = quantity(a, BH_OPT_TOTAL, BH_DIM_ENERGY, &total);
    if (!bad)
        bad = quantity(a, BH_OPT_MOMENTUM, BH_DIM_MOMENTUM, &momentum);
    if (bad)
        return bad;
    if ((kinetic != NULL) + !isnan(total) + !isnan(momentum) > 1)
        return bh_usage(a, "give one of --kinetic-energy, --total-energy and --momentum");
    const double m = r->beam.mass;
    if (kinetic)
        return bh_beam_kinetic(a, &r->beam, &r->kinetic);
    if (!isnan(total))
        r->kinetic = total - m;
    else if (!isnan(momentum)) /* no cancellation when slow */
        r->kinetic = momentum * momentum / (sqrt(momentum * momentum + m * m) + m);
    return 0;
}

static int scatterer(const bh_arguments *a, bh_single_request *r)
{
    const char *given = a->value[BH_OPT_SCATTERER];
    if (!given)
        return bh_usage(a, "needs --scatterer, such as 1H, 12C, 208Pb");
    if (!bh_nuclide_parse(given, &r->z, &r->a))
        return bh_usage(a, "--scatterer is no nuclide; write 1H, 12C, 208Pb");
    if (r->a == 0)
        return bh_usage(a, "--scatterer needs one isotope, such as 12C or 208Pb, not an element");
    return 0;
}

static int choices(const bh_arguments *a, bh_single_request *r)
{
    const char *detects = a->value[BH_OPT_DETECTS], *coulomb = a->value[BH_OPT_COULOMB];
    r->structure = a->value[BH_OPT_STRUCTURE];
    r->process = a->value[BH_OPT_PROCESS];
    r->radiative = a->value[BH_OPT_RADIATIVE];
    if (detects && strcmp(detects, "scattered") != 0 && strcmp(detects, "recoil") != 0)
        return bh_usage(a, "--detects is scattered or recoil");
    r->recoil = detects && strcmp(detects, "recoil") == 0;
    if (coulomb && strcmp(coulomb, "default") != 0 && !bh_coulomb_find(coulomb))
        return bh_usage(a, "--coulomb is default or plane-wave");
    return 0;
}

static int cut(const bh_arguments *a, bh_single_request *r)
{
    const int bad = quantity(a, BH_OPT_ENERGY_CUT, BH_DIM_ENERGY, &r->energy_cut);
    if (!bad && a->value[BH_OPT_ENERGY_CUT] && !(r->energy_cut > 0.0))
        return bh_usage(a, "--energy-cut must be above 0 MeV");
    return bad;
}

static int rate_inputs(const bh_arguments *a, struct point *p)
{
    bh_single_request *r = &p->request;
    int bad = quantity(a, BH_OPT_CURRENT, BH_DIM_CURRENT, &r->current);
    if (!bad)
        bad = quantity(a, BH_OPT_THICKNESS, BH_DIM_LENGTH, &r->thickness);
    if (!bad)
        bad = quantity(a, BH_OPT_SOLID_ANGLE, BH_DIM_SOLID_ANGLE, &r->solid_angle);
    const char *material = a->value[BH_OPT_MATERIAL];
    if (bad || !material)
        return bad;
    char **folders = bh_places_materials(NULL);
    p->library = folders ? bh_material_library_new((const char *const *)folders) : NULL;
    p->diags = bh_diags_new();
    bh_places_free(folders);
    if (!p->library || !p->diags)
        return bh_complain(stderr, &(bh_error){.code = BH_ENOMEM});
    r->material =
        bh_material_find(p->library, material, (bh_mark){"--material", 1, 1}, "material", p->diags);
    if (r->material)
        return 0;
    char sentence[400];
    (void)snprintf(sentence, sizeof sentence, "--material: %s",
                   bh_diags_count(p->diags) ? bh_diags_at(p->diags, 0)->text : "out of memory");
    return bh_usage(a, sentence);
}

static int request_of(const bh_arguments *a, struct point *p)
{
    bh_single_request *r = &p->request;
    *r = (bh_single_request){.kinetic = NAN, .angle = NAN, .q2 = NAN, .epsilon = NAN};
    if (a->word_count)
        return bh_usage(a, "takes options only, such as -E 855MeV -a 25deg");
    int bad = bh_beam_particle(a, &r->beam);
    if (!bad)
        bad = scatterer(a, r);
    if (!bad)
        bad = energy(a, r);
    if (!bad)
        bad = quantity(a, BH_OPT_ANGLE, BH_DIM_ANGLE, &r->angle);
    if (!bad)
        bad = quantity(a, BH_OPT_Q2, BH_DIM_Q2, &r->q2);
    if (!bad)
        bad = choices(a, r);
    if (!bad)
        bad = cut(a, r);
    const char *epsilon = a->value[BH_OPT_EPSILON], *end = NULL;
    if (!bad && epsilon && (bh_number_parse(epsilon, &end, &r->epsilon) || *end))
        bad = bh_usage(a, "--epsilon needs a bare number, such as 0.6");
    return bad ? bad : rate_inputs(a, p);
}

static void as_text(const bh_single *s, bh_text *out)
{
    char number[BH_NUMBER_SIZE];
    for (size_t i = 0; i < s->count; i++) {
        const bh_single_value *v = &s->values[i];
        if (v->text)
            bh_text_appendf(out, "%-38s %s\n", v->key, v->text);
        else if (bh_number_digits(v->value, 8, number, sizeof number))
            bh_text_appendf(out, "%-38s %s\n", v->key, isfinite(v->value) ? number : "-");
    }
    const int width = bh_places_width();
    bh_report_wrapped("formula    ", s->formula, width, out);
    bh_report_wrapped("source     ", s->source, width, out);
    bh_report_wrapped("structure  ", s->structure_source, width, out);
}

static int as_json(const bh_single *s, bh_text *out)
{
    json_object *object = json_object_new_object();
    char number[BH_NUMBER_SIZE];
    for (size_t i = 0; i < s->count; i++) {
        const bh_single_value *v = &s->values[i];
        json_object *value = NULL;
        if (v->text)
            value = json_object_new_string(v->text);
        else if (isfinite(v->value) && bh_number_print(v->value, number, sizeof number))
            value = json_object_new_double_s(v->value, number);
        (void)json_object_object_add(object, v->key, value);
    }
    const char *text = json_object_to_json_string_ext(object, JSON_C_TO_STRING_PRETTY);
    bh_text_appendf(out, "%s\n", text ? text : "");
    json_object_put(object);
    return text ? 0 : bh_complain(stderr, &(bh_error){.code = BH_ENOMEM});
}

static int answer(const bh_arguments *a, const char *format, const bh_single_request *r)
{
    bh_single s;
    bh_error err = {.code = BH_OK};
    bh_text out = {0};
    const bh_code bad = bh_single_compute(r, &s, &err);
    if (bad)
        return bad == BH_EDOMAIN || bad == BH_EPLAN ? bh_usage(a, err.text)
                                                    : bh_complain(stderr, &err);
    for (size_t i = 0; i < sizeof s.warning / sizeof s.warning[0]; i++)
        if (s.warning[i][0])
            bh_print(stderr, "beamhours: %s: warning: %s\n", bh_command_name(a->command),
                     s.warning[i]);
    int status = 0;
    if (strcmp(format, "json") == 0)
        status = as_json(&s, &out);
    else
        as_text(&s, &out);
    return status ? status : bh_output(&out, NULL);
}

int bh_cmd_point(const bh_arguments *arguments)
{
    const char *format = bh_arguments_format(arguments, BH_OPT_LIST_FORMAT);
    struct point p = {.library = NULL};
    if (!format)
        return EX_USAGE;
    int status = request_of(arguments, &p);
    if (status == 0)
        status = answer(arguments, format, &p.request);
    bh_diags_free(p.diags);
    bh_material_library_free(p.library);
    return status;
}
