/* search.c - the output of a plan again and again, while one input moves. */
#include "beamhours/run/search.h"

#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/base/text.h"

enum { MSR_PER_SR = 1000 };

/* --- one evaluation --- */

/* A plan that was read, and the row that is looked at. */
struct one {
    bh_plan *plan;
    const bh_setting *setting;
    size_t arm;
    bh_table *table;
};

static void free_one(struct one *o)
{
    bh_table_free(o->table);
    bh_plan_free(o->plan);
}

static const bh_setting *setting_called(const bh_plan *plan, const char *name)
{
    for (size_t i = 0; i < plan->setting_count; i++)
        if (strcmp(plan->settings[i].name, name) == 0)
            return &plan->settings[i];
    return NULL;
}

static bool arm_called(const bh_setting *setting, const char *name, size_t *arm)
{
    for (size_t i = 0; i < setting->arm_count; i++)
        if (!name || strcmp(setting->arms[i].arm.name.text, name) == 0) {
            *arm = i;
            return name || setting->arm_count == 1;
        }
    return false;
}

/* Names, for a message. */
static void name_all(const bh_plan *plan, const bh_setting *setting, bh_text *names)
{
    const size_t count = setting ? setting->arm_count : plan->setting_count;
    for (size_t i = 0; i < count && names->length < 200; i++)
        bh_text_appendf(names, "%s%s", i ? ", " : "",
                        setting ? setting->arms[i].arm.name.text : plan->settings[i].name);
    bh_text_append(names, "");
}

static bh_code find_row(const bh_search *s, struct one *o)
{
    const char *arm = s->question->arm;
    bh_text names = {0};
    o->setting = setting_called(o->plan, s->setting);
    if (!o->setting)
        o->setting = setting_called(o->plan, s->base);
    if (o->setting && arm_called(o->setting, arm, &o->arm))
        return BH_OK;
    name_all(o->plan, o->setting, &names);
    const char *there = names.failed ? "others" : names.bytes;
    if (!o->setting)
        (void)bh_fail(s->err, BH_EDOMAIN, "no setting \"%s\"; there are %s", s->question->setting,
                      there);
    else if (arm)
        (void)bh_fail(s->err, BH_EDOMAIN, "setting %s has no arm \"%s\"; there is %s",
                      s->question->setting, arm, there);
    else
        (void)bh_fail(s->err, BH_EDOMAIN, "setting %s has several arms; name one of %s",
                      s->question->setting, there);
    bh_text_free(&names);
    return BH_EDOMAIN;
}

/* The setting alone, evaluated. */
static bh_code evaluate(const bh_search *s, struct one *o)
{
    bh_plan alone = *o->plan;
    const bh_evaluation how = {.cancelled = s->question->cancelled,
                               .asker = s->question->asker,
                               .workspace = s->workspace,
                               .without_changes = s->question->column != BH_COL_PER_MRAD &&
                                                  s->question->column != BH_COL_PER_PERMILLE};
    bh_error why = {.code = BH_OK};
    alone.settings = o->setting;
    alone.setting_count = 1;
    bh_table *table = bh_table_new(&alone, &how, NULL, &why);
    if (!table)
        return bh_fail(s->err, why.code, "%s", why.text);
    o->table = table;
    return BH_OK;
}

static double number_of(const struct one *o, bh_column_id column)
{
    return bh_table_number(o->table, false, o->arm, column);
}

/* What the plan says against a value, kept once. */
static void keep_refusal(bh_search *s, const bh_diags *diags)
{
    for (size_t i = 0; i < bh_diags_count(diags) && !s->answer->refused[0]; i++) {
        const bh_diag *d = bh_diags_at(diags, i);
        if (d->severity == BH_SEVERITY_ERROR)
            (void)snprintf(s->answer->refused, sizeof s->answer->refused, "%s: %s", d->key,
                           d->text);
    }
}

/* --- the search --- */

static void keep_extremes(bh_search *s, const char *text, double output)
{
    bh_answer *a = s->answer;
    double number = 0;
    if (!isfinite(output) || bh_number_parse(text, NULL, &number) != BH_OK)
        return;
    if (!(output >= a->least)) {
        a->least = output;
        bh_moving_write(&s->moving, number, 6, a->at_least);
    }
    if (!(output <= a->most)) {
        a->most = output;
        bh_moving_write(&s->moving, number, 6, a->at_most);
    }
    if (!(number >= s->least_at)) {
        s->least_at = number;
        bh_moving_write(&s->moving, number, 6, a->from);
    }
    if (!(number <= s->most_at)) {
        s->most_at = number;
        bh_moving_write(&s->moving, number, 6, a->to);
    }
}

/* Evaluates at a value that is tried.  One where nothing can be computed, such as an acceptance
 * that all but touches the beam, is no more than a value that does not do. */
static bh_code try_out(bh_search *s, struct one *o)
{
    const bh_code code = evaluate(s, o);
    if (code != BH_EDOMAIN)
        return code;
    if (!s->answer->refused[0])
        (void)snprintf(s->answer->refused, sizeof s->answer->refused, "%.*s",
                       (int)sizeof s->answer->refused - 1, s->err->text);
    *s->err = (bh_error){.code = BH_OK};
    return BH_OK;
}

static double no_output(bh_search *s, bh_code code)
{
    s->code = code;
    return NAN;
}

double bh_search_output(bh_search *search, const char *text)
{
    const bh_question *q = search->question;
    bh_diags *diags = bh_diags_new();
    struct one o = {0};
    double output = NAN;
    if (search->code || (q->cancelled && q->cancelled(q->asker))) {
        bh_diags_free(diags);
        return no_output(search, search->code ? search->code : BH_ENOCONV);
    }
    search->changes[q->change_count] = (bh_change){search->moving.path, text};
    if (diags)
        o.plan = bh_plan_read(q->bytes, q->length, q->name, search->changes, q->change_count + 1,
                              q->library, diags);
    if (o.plan)
        search->code = find_row(search, &o);
    if (o.plan && !search->code)
        search->code = try_out(search, &o);
    if (o.table)
        output = number_of(&o, q->column);
    else if (diags && !o.plan)
        keep_refusal(search, diags);
    else if (!diags)
        search->code = bh_fail(search->err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    free_one(&o);
    bh_diags_free(diags);
    keep_extremes(search, text, output);
    return output;
}

/* The plan as it is: its row, and what moves in it. */
static bh_code look(bh_search *s)
{
    const bh_question *q = s->question;
    bh_diags *diags = bh_diags_new();
    struct one o = {0};
    bh_code code = BH_ENOMEM;
    if (diags)
        o.plan = bh_plan_read(q->bytes, q->length, q->name, q->changes, q->change_count, q->library,
                              diags);
    if (!o.plan) {
        if (diags)
            keep_refusal(s, diags);
        code = bh_fail(s->err, diags ? BH_EPLAN : BH_ENOMEM, "%s",
                       s->answer->refused[0] ? s->answer->refused : bh_code_text(BH_ENOMEM));
        bh_diags_free(diags);
        return code;
    }
    bh_diags_free(diags);
    code = find_row(s, &o);
    if (!code)
        code = evaluate(s, &o);
    if (!code) {
        const bh_moving_row row = {o.plan, o.setting, &o.setting->arms[o.arm],
                                   number_of(&o, BH_COL_SOLID_ANGLE) / MSR_PER_SR};
        s->answer->output = number_of(&o, q->column);
        code = bh_moving_find(q, &row, &s->moving, s->err);
    }
    free_one(&o);
    return code;
}

bool bh_search_begin(bh_search *search)
{
    const bh_question *q = search->question;
    const char *dot = strrchr(q->setting, '.');
    (void)snprintf(search->setting, sizeof search->setting, "%s", q->setting);
    (void)snprintf(search->base, sizeof search->base, "%.*s",
                   dot ? (int)(dot - q->setting) : (int)strlen(q->setting), q->setting);
    search->least_at = search->most_at = NAN;
    search->own = q->workspace ? NULL : bh_workspace_new();
    search->workspace = q->workspace ? q->workspace : search->own;
    search->changes = calloc(q->change_count + 1, sizeof *search->changes);
    if (!search->workspace || !search->changes) {
        search->code = bh_fail(search->err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
        return false;
    }
    for (size_t i = 0; i < q->change_count; i++)
        search->changes[i] = q->changes[i];
    search->code = look(search);
    if (search->code)
        return false;
    (void)snprintf(search->answer->path, BH_SOLVE_ROOM, "%s", search->moving.path);
    (void)snprintf(search->answer->present, BH_SOLVE_ROOM, "%s", search->moving.present);
    return true;
}

void bh_search_end(bh_search *search)
{
    free(search->changes);
    bh_workspace_free(search->own);
}
