/* curves.c - one evaluation a model. */
#include "beamhours/report/curves.h"

#include <stdlib.h>
#include <string.h>

#include "beamhours/physics/coulomb.h"

enum { LONGEST_NAME = 64 };

/* The next name of a list with commas into `out`; NULL at its end. */
static const char *next_name(const char *list, char out[LONGEST_NAME])
{
    const size_t n = strcspn(list, ","), kept = n < LONGEST_NAME ? n : LONGEST_NAME - 1;
    memcpy(out, list, kept);
    out[kept] = '\0';
    return list[n] ? list + n + 1 : NULL;
}

static size_t count_names(const char *list)
{
    size_t n = 1;
    for (const char *c = list; c && *c; c++)
        n += *c == ',';
    return n;
}

static bh_code check_list(const char *list, const char *option, bh_error *err)
{
    char name[LONGEST_NAME];
    for (const char *at = list; at;) {
        at = next_name(at, name);
        if (!name[0])
            return bh_fail(err, BH_EDOMAIN, "--%s has an empty name; `beamhours models` lists them",
                           option);
        if (strcmp(option, "coulomb") == 0 && !bh_coulomb_find(name))
            return bh_fail(err, BH_EDOMAIN,
                           "no Coulomb model \"%s\"; `beamhours models` lists them", name);
    }
    return BH_OK;
}

static bh_code check(const bh_curves_request *r, bh_error *err)
{
    const bh_code bad = check_list(r->structures, "structure", err);
    if (bad)
        return bad;
    if (count_names(r->structures) > BH_MOST_CURVES)
        return bh_fail(err, BH_EDOMAIN, "--structure takes %d names at most", BH_MOST_CURVES);
    if (count_names(r->structures) * count_names(r->coulombs) > BH_MOST_CURVES)
        return bh_fail(err, BH_EDOMAIN, "--structure and --coulomb make more than %d curves",
                       BH_MOST_CURVES);
    return check_list(r->coulombs, "coulomb", err);
}

/* --- what they start from --- */

static void find(const bh_plan *plan, const bh_curves_request *r, bh_curves *out)
{
    for (size_t i = 0; i < plan->setting_count && !out->setting; i++)
        if (!r->setting || strcmp(plan->settings[i].name, r->setting) == 0)
            out->setting = &plan->settings[i];
    for (size_t i = 0; out->setting && i < out->setting->arm_count && !out->arm; i++) {
        const bh_setting_arm *arm = &out->setting->arms[i];
        if (!r->arm || (arm->arm.name.text && strcmp(arm->arm.name.text, r->arm) == 0))
            out->arm = arm;
    }
}

/* --- one of them --- */

/* A copy of the plan in which another Coulomb model is in force. */
static bh_code with_coulomb(const bh_plan *plan, const char *name, bh_curves *out, bh_error *err)
{
    bh_plan *copy = malloc(sizeof *copy);
    if (!copy)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    *copy = *plan;
    copy->models.coulomb.text = bh_coulomb_find(name)->name;
    out->changed[out->count] = copy;
    return BH_OK;
}

static bh_code add(const bh_plan *plan, const bh_curve_request *r, const char *coulomb,
                   bh_curves *out, bh_error *err)
{
    bh_text name = {0};
    if (coulomb && with_coulomb(plan, coulomb, out, err))
        return BH_ENOMEM;
    if (r->structure || coulomb) {
        bh_text_appendf(&name, "%s%s%s", r->structure ? r->structure : "",
                        r->structure && coulomb ? " " : "", coulomb ? coulomb : "");
        out->name[out->count] = bh_text_take(&name);
        if (!out->name[out->count])
            return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    }
    out->curve[out->count] = bh_curve_new(coulomb ? out->changed[out->count] : plan, r, err);
    return out->curve[out->count++] ? BH_OK : err->code;
}

/* One structure with each Coulomb model. */
static bh_code add_each(const bh_plan *plan, const bh_curve_request *one, const char *coulombs,
                        bh_curves *out, bh_error *err)
{
    char coulomb[LONGEST_NAME];
    const char *c = coulombs;
    bh_code bad = BH_OK;
    do {
        c = c ? next_name(c, coulomb) : NULL;
        bad = add(plan, one, coulombs ? coulomb : NULL, out, err);
    } while (!bad && c);
    return bad;
}

static bh_code add_all(const bh_plan *plan, const bh_curves_request *r, bh_curves *out,
                       bh_error *err)
{
    char structure[LONGEST_NAME];
    const char *s = r->structures;
    const bh_curve_request one = {.setting = r->setting,
                                  .arm = r->arm,
                                  .against = r->against,
                                  .structure = s ? structure : NULL,
                                  .points = r->points,
                                  .centre = r->centre};
    bh_code bad = BH_OK;
    do {
        s = s ? next_name(s, structure) : NULL;
        bad = add_each(plan, &one, r->coulombs, out, err);
    } while (!bad && s);
    return bad;
}

bh_code bh_curves_make(const bh_plan *plan, const bh_curves_request *request, bh_curves *out,
                       bh_error *err)
{
    bh_error unseen = {.code = BH_OK};
    err = err ? err : &unseen;
    *out = (bh_curves){.against = request->against};
    bh_code bad = check(request, err);
    if (bad)
        return bad;
    find(plan, request, out);
    bad = add_all(plan, request, out, err);
    if (bad)
        bh_curves_free(out);
    return bad;
}

void bh_curves_free(bh_curves *curves)
{
    for (size_t i = 0; i < BH_MOST_CURVES; i++) {
        bh_curve_free(curves->curve[i]);
        free(curves->name[i]);
        free(curves->changed[i]);
    }
    *curves = (bh_curves){.count = 0};
}
