/* explain.c - one row of the run table, number by number. */
#include "beamhours/run/explain.h"

#include <math.h>
#include <stdarg.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/base/text.h"
#include "beamhours/run/explaining.h"

enum { FIRST_ROOM = 64, DIGITS = 6 };

struct bh_explanation {
    bh_arena *arena;
    bh_line *lines;
    size_t count;
};

const char *bh_explain_text(bh_explaining *x, const char *fmt, ...)
{
    char text[1024];
    va_list args;
    va_start(args, fmt);
    const int length = vsnprintf(text, sizeof text, fmt, args);
    va_end(args);
    const size_t size = length < 0 ? 1 : strlen(text) + 1;
    char *copy = bh_arena_take(x->arena, size, 1);
    x->failed = x->failed || !copy;
    return copy && size > 1 ? memcpy(copy, text, size) : copy;
}

const char *bh_explain_number(bh_explaining *x, double value, const char *unit)
{
    char digits[BH_NUMBER_SIZE];
    double rounded = value;
    if (!isfinite(value))
        return "-";
    bh_number_digits(value, DIGITS, digits, sizeof digits);
    if (!bh_number_parse(digits, NULL, &rounded)) /* without closing zeros */
        bh_number_print(rounded, digits, sizeof digits);
    return *unit ? bh_explain_text(x, "%s %s", digits, unit) : bh_explain_text(x, "%s", digits);
}

const char *bh_explain_mark(bh_explaining *x, bh_mark at)
{
    return at.file ? bh_explain_text(x, "%s:%d:%d", at.file, at.line, at.column) : NULL;
}

static bool grow(bh_explaining *x)
{
    if (x->count < x->room)
        return true;
    const size_t room = x->room ? 2 * x->room : FIRST_ROOM;
    bh_line *lines = bh_arena_take(x->arena, room, sizeof *lines);
    if (!lines)
        return false;
    if (x->count)
        memcpy(lines, x->lines, x->count * sizeof *lines);
    x->lines = lines;
    x->room = room;
    return true;
}

const char *bh_explain_percent(bh_explaining *x, double share)
{
    char digits[BH_NUMBER_SIZE];
    bh_number_digits(100 * share, 3, digits, sizeof digits);
    return bh_explain_text(x, "%s %%", digits);
}

void bh_explain_add(bh_explaining *x, bh_line line)
{
    if (grow(x))
        x->lines[x->count++] = line;
    else
        x->failed = true;
}

void bh_explain_section(bh_explaining *x, const char *name)
{
    bh_explain_add(x, (bh_line){.kind = BH_LINE_SECTION, .name = name});
}

/* The names that would have done, for a message. */
static void list_names(bh_text *names, const char *name)
{
    if (names->length > 200) /* enough to see the pattern */
        return;
    bh_text_append(names, names->length ? ", " : "");
    bh_text_append(names, name);
}

static bh_code no_setting(const bh_plan *plan, const char *wanted, bh_error *err)
{
    bh_text names = {0};
    for (size_t s = 0; s < plan->setting_count; s++)
        list_names(&names, plan->settings[s].name);
    const bh_code code = bh_fail(err, BH_EPLAN, "no setting is called %s; there are %s", wanted,
                                 names.bytes ? names.bytes : "none");
    bh_text_free(&names);
    return code;
}

static bh_code find_setting(const bh_plan *plan, const char *name, size_t *setting, bh_error *err)
{
    for (size_t s = 0; s < plan->setting_count; s++)
        if (strcmp(plan->settings[s].name, name) == 0) {
            *setting = s;
            return BH_OK;
        }
    return no_setting(plan, name, err);
}

static bh_code find_arm(const bh_setting *setting, const char *name, size_t *arm, bh_error *err)
{
    for (size_t a = 0; a < setting->arm_count; a++)
        if (name ? strcmp(setting->arms[a].arm.name.text, name) == 0 : setting->arm_count == 1) {
            *arm = a;
            return BH_OK;
        }
    bh_text names = {0};
    for (size_t a = 0; a < setting->arm_count; a++)
        list_names(&names, setting->arms[a].arm.name.text);
    const bh_code code = name ? bh_fail(err, BH_EPLAN, "setting %s has no arm %s; there are %s",
                                        setting->name, name, names.bytes ? names.bytes : "none")
                              : bh_fail(err, BH_EPLAN, "setting %s has several arms; say which: %s",
                                        setting->name, names.bytes ? names.bytes : "none");
    bh_text_free(&names);
    return code;
}

static bh_code find_bin(const bh_setting_arm *arm, int bin, bh_error *err)
{
    if (bin >= 0 && bin <= arm->arm.bins)
        return BH_OK;
    return bh_fail(err, BH_EPLAN, "arm %s has no bin %d; its bins are 1 to %d", arm->arm.name.text,
                   bin, arm->arm.bins);
}

/* Computes the setting anew, keeping what the table forgot. */
static bh_code measure(bh_explaining *x, size_t setting, size_t arm, bh_error *err)
{
    const bh_plan *plan = bh_table_plan(x->table);
    x->evaluator.systematics.causes = bh_causes_copy(bh_table_causes(x->table), x->arena);
    if (!x->evaluator.systematics.causes)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    bh_code code = bh_evaluator_prepare(&x->evaluator, plan, x->arena, err);
    if (!code)
        code = bh_setting_measure(&x->evaluator, setting, x->bin > 0, &x->hours, err);
    if (code)
        return code;
    x->setting = &plan->settings[setting];
    x->arm = &x->hours.arms[arm];
    x->part = &x->arm->yield->part[x->bin];
    bh_channels channels;
    const bh_view *view = &x->arm->yield->view;
    code = bh_view_channels(&x->evaluator.yielder, view, &view->list->nuclides[view->list->main],
                            &channels, err);
    if (code)
        return code;
    x->channel = channels.list[0];
    x->reached = x->part->angle <= bh_channel_largest_angle(&x->channel) &&
                 !bh_channel_event(&x->channel, x->part->angle, &x->event, NULL);
    return BH_OK;
}

/* Which row this is, and of what. */
static void write_title(bh_explaining *x)
{
    const bh_plan *plan = bh_table_plan(x->table);
    const bh_arm *arm = &x->arm->yield->view.arm->arm;
    const char *part =
        x->bin ? bh_explain_text(x, "bin %d of %d", x->bin, arm->bins) : "the whole acceptance";
    bh_explain_section(x, bh_explain_text(x, "%s: setting %s, arm %s, %s",
                                          plan->file ? plan->file : "plan", x->setting->name,
                                          arm->name.text ? arm->name.text : "-", part));
    if (plan->title.text)
        bh_explain_add(x, (bh_line){.kind = BH_LINE_NOTE,
                                    .remark = bh_explain_text(x, "%s", plan->title.text)});
}

static bh_code write_all(bh_explaining *x, bh_error *err)
{
    write_title(x);
    bh_explain_inputs(x);
    bh_explain_target(x);
    if (x->reached)
        bh_explain_cross_section(x);
    bh_explain_rates(x);
    bh_explain_time(x);
    bh_explain_systematic(x);
    bh_explain_assumptions(x);
    return x->failed ? bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM)) : BH_OK;
}

static bh_code explain(bh_explaining *x, const char *setting, const char *arm, bh_error *err)
{
    const bh_plan *plan = bh_table_plan(x->table);
    size_t s = 0, a = 0;
    bh_code code = find_setting(plan, setting, &s, err);
    if (!code)
        code = find_arm(&plan->settings[s], arm, &a, err);
    if (!code)
        code = find_bin(&plan->settings[s].arms[a], x->bin, err);
    if (!code)
        code = measure(x, s, a, err);
    return code ? code : write_all(x, err);
}

/* Which row, and as what evaluation. */
struct asked {
    const bh_table *table;
    const bh_evaluation *how; /* NULL: of its own */
    bh_explained_row row;
};

static bh_code begin(bh_explaining *x, const struct asked *asked, bh_workspace *workspace,
                     bh_error *err)
{
    x->table = asked->table;
    x->bin = asked->row.bin;
    x->evaluator.yielder.workspace = workspace;
    x->evaluator.yielder.explaining = true;
    if (asked->how) {
        x->evaluator.yielder.cancelled = asked->how->cancelled;
        x->evaluator.yielder.asker = asked->how->asker;
    }
    return explain(x, asked->row.setting, asked->row.arm, err);
}

static bh_explanation *make(const struct asked *asked, bh_error *err)
{
    bh_explanation *made = calloc(1, sizeof *made);
    bh_arena *arena = bh_arena_new();
    bh_workspace *own = bh_workspace_new();
    bh_workspace *workspace = asked->how && asked->how->workspace ? asked->how->workspace : own;
    bh_explaining *x = arena ? bh_arena_take(arena, 1, sizeof *x) : NULL;
    bh_error why = {.code = BH_OK};
    bh_code code = BH_ENOMEM;
    if (made && workspace && x) {
        x->arena = arena;
        code = begin(x, asked, workspace, &why);
    } else {
        bh_fail(&why, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    }
    bh_workspace_free(own);
    if (!code) {
        *made = (bh_explanation){.arena = arena, .lines = x->lines, .count = x->count};
        return made;
    }
    if (err)
        *err = why;
    bh_arena_free(arena);
    free(made);
    return NULL;
}

bh_explanation *bh_explain(const bh_table *table, const char *setting, const char *arm, int bin,
                           bh_error *err)
{
    const struct asked asked = {.table = table, .row = {setting, arm, bin}};
    return make(&asked, err);
}

bh_explanation *bh_explain_alone(const bh_plan *plan, const bh_explained_row *row,
                                 const bh_evaluation *how, bh_error *err)
{
    bh_evaluation few = *how;
    few.bins = false;
    few.enough = row->bin > 0 ? 1 : BH_EXPLAIN_RATIOS + 1; /* one may be the row itself */
    bh_table *table = bh_table_new(plan, &few, NULL, err);
    const struct asked asked = {table, how, *row};
    bh_explanation *made = table ? make(&asked, err) : NULL;
    bh_table_free(table);
    return made;
}

void bh_explanation_free(bh_explanation *explanation)
{
    if (explanation)
        bh_arena_free(explanation->arena);
    free(explanation);
}

size_t bh_explanation_lines(const bh_explanation *explanation)
{
    return explanation->count;
}

const bh_line *bh_explanation_line(const bh_explanation *explanation, size_t i)
{
    return &explanation->lines[i];
}
