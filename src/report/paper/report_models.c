/* report_models.c - what was assumed, which models were in use, and how to make the report again.
 */
#include <string.h>

#include "beamhours/physics/coulomb.h"
#include "beamhours/report/reporting.h"

#define COUNT(list) (sizeof(list) / sizeof(list)[0])

/* "with kelly-2004 instead" */
static bool is_other(const bh_line *l)
{
    return l->name && strncmp(l->name, "with ", 5) == 0;
}

/* "12C in layer 1 (kapton)": elastic events of background, each by its form factors. */
static bool is_in_layer(const bh_line *l)
{
    return l->kind == BH_LINE_FACTOR && l->source && l->name && strstr(l->name, " in layer ") &&
           !strstr(l->name, " on ");
}

/* Whether two lines say the same; values of factors differ from row to row, and form factors of
 * background are told once a source. */
static bool same_line(const bh_line *a, const bh_line *b)
{
    if (is_in_layer(a) && is_in_layer(b))
        return strcmp(a->source, b->source) == 0;
    const char *va = a->value ? a->value : "", *vb = b->value ? b->value : "";
    return a->kind == b->kind && strcmp(a->name ? a->name : "", b->name ? b->name : "") == 0 &&
           (a->kind == BH_LINE_FACTOR || is_other(a) || strcmp(va, vb) == 0) &&
           strcmp(a->source ? a->source : "", b->source ? b->source : "") == 0;
}

static bool told_before(const bh_reporting *x, size_t told, size_t line)
{
    const bh_line *l = bh_explanation_line(x->told[told], line);
    for (size_t t = 0; t <= told; t++)
        for (size_t i = 0; i < (t < told ? bh_explanation_lines(x->told[t]) : line); i++)
            if (same_line(l, bh_explanation_line(x->told[t], i)))
                return true;
    return false;
}

/* "default: amt-2007-effective", where another line says what the default comes down to. */
static const char *default_value(bh_reporting *x, size_t told, const bh_line *l)
{
    static const char *const pairs[][2] = {{"models.structure", "structure model"},
                                           {"models.radiative", "internal radiation"}};
    const char *value = l->value ? l->value : "-", *means = NULL;
    if (strcmp(l->name, "models.coulomb") == 0 && bh_coulomb_find(value))
        means = bh_coulomb_find(value)->name;
    for (size_t p = 0; p < COUNT(pairs); p++)
        for (size_t i = 0;
             strcmp(l->name, pairs[p][0]) == 0 && !means && i < bh_explanation_lines(x->told[told]);
             i++) {
            const bh_line *other = bh_explanation_line(x->told[told], i);
            if (other->kind == BH_LINE_MODEL && strcmp(other->name, pairs[p][1]) == 0)
                means = other->value;
        }
    return means && strcmp(means, value) != 0 ? bh_paper_text(&x->w, "%s: %s", value, means)
                                              : bh_paper_text(&x->w, "%s", value);
}

static void defaults(bh_reporting *x)
{
    static const bh_paper_column columns[] = {{"key", "", false}, {"value", "", false}};
    bh_paper_table_open(&x->w, "Defaults in force: values that the plan does not write", columns,
                        COUNT(columns));
    for (size_t t = 0; t < x->told_count; t++)
        for (size_t i = 0; i < bh_explanation_lines(x->told[t]); i++) {
            const bh_line *l = bh_explanation_line(x->told[t], i);
            if (l->kind != BH_LINE_DEFAULT || told_before(x, t, i))
                continue;
            bh_paper_cell(&x->w, bh_paper_text(&x->w, "%s", l->name));
            bh_paper_cell(&x->w, default_value(x, t, l));
        }
    bh_paper_table_close(&x->w);
}

void bh_report_assumptions(bh_reporting *x)
{
    const char *sentence = NULL;
    bh_paper_add(&x->w, BH_BLOCK_SECTION, "Assumptions and defaults");
    for (size_t i = 0; (sentence = bh_assumption_at(i)); i++)
        bh_paper_add(&x->w, BH_BLOCK_ITEM, sentence);
    for (size_t i = 0; (sentence = bh_table_note(x->table, i)); i++)
        bh_paper_add(&x->w, BH_BLOCK_ITEM, sentence);
    defaults(x);
}

/* "plan.yaml:14:12" is a place, not a publication. */
static bool is_place(const char *source)
{
    const size_t n = strlen(source);
    size_t i = n;
    int colons = 0;
    while (i > 0 && strchr("0123456789:", source[i - 1]))
        colons += source[--i] == ':';
    return colons >= 2;
}

static bool is_model(const bh_line *l)
{
    return (l->kind == BH_LINE_MODEL || l->kind == BH_LINE_FACTOR) && l->source &&
           !is_place(l->source);
}

/* Of a model its name, of a formula what it gives. */
static const char *used_for(bh_reporting *x, const bh_line *l)
{
    return l->kind == BH_LINE_MODEL && l->value
               ? bh_paper_text(&x->w, "%s: %s", l->name, l->value)
               : bh_paper_text(&x->w, "%s", l->name ? l->name : "");
}

static void model(bh_reporting *x, size_t told, const bh_line *l)
{
    bh_paper_cell(&x->w, used_for(x, l));
    bh_paper_cell(&x->w,
                  bh_paper_text(&x->w, "%s%s%s", l->formula ? l->formula : "",
                                l->formula && l->remark && l->kind == BH_LINE_MODEL ? "; " : "",
                                l->remark && l->kind == BH_LINE_MODEL ? l->remark : ""));
    bh_paper_cell(&x->w, bh_report_row_name(x, x->told_row[told]));
    bh_paper_cell(&x->w, bh_paper_text(&x->w, "[%d]", bh_paper_cite(&x->w, l->source)));
}

void bh_report_models(bh_reporting *x)
{
    static const bh_paper_column columns[] = {{"model or formula", "", false},
                                              {"range, and what it says", "", false},
                                              {"first in", "", false},
                                              {"source", "", false}};
    bh_paper_add(&x->w, BH_BLOCK_SECTION, "Models");
    bh_paper_table_open(&x->w,
                        "Models and formulas in use, with their range where it is known, and "
                        "others that were compared with them; percentages belong to the setting "
                        "named",
                        columns, COUNT(columns));
    for (size_t t = 0; t < x->told_count; t++)
        for (size_t i = 0; i < bh_explanation_lines(x->told[t]); i++)
            if (is_model(bh_explanation_line(x->told[t], i)) && !told_before(x, t, i))
                model(x, t, bh_explanation_line(x->told[t], i));
    bh_paper_table_close(&x->w);
    bh_paper_add(&x->w, BH_BLOCK_SECTION, "References");
    bh_paper_references(&x->w);
}

void bh_report_again(bh_reporting *x)
{
    static const bh_paper_column columns[] = {{"what", "", false}, {"which", "", false}};
    bh_paper_add(&x->w, BH_BLOCK_SECTION, "How to make this report again");
    bh_paper_table_open(&x->w, "Program, command, and SHA-256 digests of what it read", columns,
                        COUNT(columns));
    bh_paper_cell(&x->w, "program");
    bh_paper_cell(&x->w, bh_paper_text(&x->w, "beamhours %s", x->request->version));
    bh_paper_cell(&x->w, "command");
    bh_paper_cell(&x->w, x->request->command);
    for (size_t i = 0; i < x->request->file_count; i++) {
        bh_paper_cell(&x->w, x->request->files[i].file);
        bh_paper_cell(&x->w, x->request->files[i].digest);
    }
    bh_paper_table_close(&x->w);
}
