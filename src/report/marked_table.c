/* marked_table.c - what stands around and in the run table, in the words of the text table. */
#include "beamhours/report/marked_table.h"

#include <math.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/report/grid.h"
#include "beamhours/report/latex.h"
#include "beamhours/report/prefix.h"
#include "beamhours/report/text_table.h"
#include "beamhours/units/quantity.h"

enum { UNWRAPPED = 1000000, NARROW = 80, LEAD = 8, SECONDS = 3600 };

struct format {
    void (*words)(bh_text *out, const char *words);
    void (*grid)(const bh_grid *grid, bh_text *out);
    const char *title[2], *list[2], *item[3], *caution[2]; /* before and behind */
};

static const struct format markdown = {.words = bh_markdown_words,
                                       .grid = bh_grid_markdown,
                                       .title = {"# ", "\n\n"},
                                       .list = {"", "\n"},
                                       .item = {"- **", "** ", "\n"},
                                       .caution = {"> **Caution.** ", "\n\n"}};

static const struct format latex = {.words = bh_latex_words,
                                    .grid = bh_grid_latex,
                                    .title = {"\\paragraph{", "}\n"},
                                    .list = {"\\begin{description}\n", "\\end{description}\n"},
                                    .item = {"\\item[", "] ", "\n"},
                                    .caution = {"\\par\\noindent\\textbf{Caution.} ", "\n"}};

static void item(const struct format *f, const char *lead, const char *words, bh_text *out)
{
    bh_text_append(out, f->item[0]);
    f->words(out, lead);
    bh_text_append(out, f->item[1]);
    f->words(out, words);
    bh_text_append(out, f->item[2]);
}

/* --- inputs --- */

static void title(const struct format *f, const bh_plan *plan, bh_text *out)
{
    bh_text_append(out, f->title[0]);
    f->words(out, plan->title.text ? plan->title.text : "Run table");
    bh_text_append(out, f->title[1]);
}

/* One line of the text table's inputs, "beam    electron, ..." */
static void input_line(const struct format *f, char *line, bh_text *out)
{
    char lead[LEAD + 1] = "";
    if (strlen(line) <= LEAD)
        return;
    memcpy(lead, line, LEAD);
    lead[strcspn(lead, " ")] = '\0';
    item(f, lead, line + LEAD, out);
}

static void inputs(const struct format *f, const bh_selection *view, bh_text *out)
{
    bh_text all = {0}, above = {0};
    const bh_plan *plan = bh_table_plan(view->table);
    if (plan->title.text)
        bh_report_wrapped("", plan->title.text, UNWRAPPED, &above);
    bh_report_text_inputs(view, UNWRAPPED, &all);
    out->failed |= all.failed || above.failed;
    if (!out->failed) {
        bh_text_append(out, f->list[0]);
        for (char *line = all.bytes + above.length; *line;) {
            char *end = line + strcspn(line, "\n");
            const bool last = *end == '\0';
            *end = '\0';
            input_line(f, line, out);
            line = last ? end : end + 1;
        }
        bh_text_append(out, f->list[1]);
    }
    bh_text_free(&all);
    bh_text_free(&above);
}

/* --- rows --- */

static void rows(const bh_selection *view, const bh_shown_column *shown, const char *state,
                 bh_grid *grid)
{
    const size_t count = grid->column_count - (state[0] ? 1 : 0);
    char text[BH_CELL_SIZE];
    for (size_t i = 0; i < view->row_count; i++) {
        if (state[0])
            bh_grid_cell(grid, state);
        for (size_t c = 0; c < count; c++) {
            bh_prefix_print(view, i, &shown[c], text);
            bh_grid_cell(grid, text);
        }
    }
}

static void fill(const bh_selection *before, const bh_selection *view, bh_grid *grid)
{
    bh_shown_column shown[BH_COLUMN_COUNT];
    const size_t count = bh_report_text_columns(before, view, NARROW, shown);
    if (before)
        bh_grid_column_add(grid, "state", "", false);
    for (size_t c = 0; c < count; c++) {
        const bh_column *column = bh_column_at(shown[c].column);
        bh_grid_column_add(grid, column->heading, shown[c].unit, column->kind != BH_CELL_TEXT);
    }
    if (before)
        rows(before, shown, "before", grid);
    rows(view, shown, before ? "after" : "", grid);
}

static void table(const struct format *f, const bh_selection *before, const bh_selection *view,
                  bh_text *out)
{
    bh_grid grid = {0};
    fill(before, view, &grid);
    f->grid(&grid, out);
    bh_grid_free(&grid);
}

/* --- time --- */

static void hours_cell(bh_grid *grid, double hours)
{
    bh_text number = {0};
    bh_hours_words(&number, hours);
    bh_grid_cell(grid, number.bytes ? number.bytes : "");
    grid->cells.failed |= number.failed;
    bh_text_free(&number);
}

void bh_totals_grid(const bh_totals *before, const bh_totals *now, bh_grid *grid)
{
    const bh_totals *old = before ? before : now;
    const struct {
        const char *name;
        double was, is;
    } lines[] = {{"data, full target", old->data_hours, now->data_hours},
                 {"empty target", old->empty_hours, now->empty_hours},
                 {"tasks with beam", old->task_hours, now->task_hours},
                 {"beam hours", old->beam_hours, now->beam_hours},
                 {"start-up, changes, tasks without beam", old->change_hours, now->change_hours},
                 {"scheduled", old->scheduled_hours, now->scheduled_hours},
                 {"contingency", old->contingency_hours, now->contingency_hours},
                 {"asked", old->asked_hours, now->asked_hours},
                 {"available", old->available_hours, now->available_hours},
                 {"spare", old->spare_hours, now->spare_hours}};
    bh_grid_column_add(grid, "time", "", false);
    if (before)
        bh_grid_column_add(grid, "before", "h", true);
    bh_grid_column_add(grid, before ? "after" : "hours", "h", true);
    for (size_t i = 0; i < sizeof lines / sizeof lines[0]; i++) {
        bh_grid_cell(grid, lines[i].name);
        if (before)
            hours_cell(grid, lines[i].was);
        hours_cell(grid, lines[i].is);
    }
}

static void totals(const struct format *f, const bh_selection *before, const bh_selection *view,
                   bh_text *out)
{
    bh_grid grid = {0};
    bh_totals_grid(before ? bh_table_totals(before->table) : NULL, bh_table_totals(view->table),
                   &grid);
    f->grid(&grid, out);
    bh_grid_free(&grid);
}

static void add_share(bh_text *to, const char *lead, double share, const char *behind)
{
    char word[64];
    const bh_quantity q = {.value = share};
    (void)bh_quantity_print(&q, BH_DIM_SHARE, word, sizeof word);
    bh_text_appendf(to, "%s%s%s", lead, word, behind);
}

static void add_units(bh_text *to, double count, const char *unit, double length)
{
    char number[BH_NUMBER_SIZE];
    (void)bh_number_digits(count, 3, number, sizeof number);
    bh_text_appendf(to, " = %s %s of ", number, unit);
    bh_text_append_number(to, length / SECONDS);
    bh_text_append(to, " h");
}

/* How the hours follow from each other. */
static void sum_words(const bh_table *of, bh_text *to)
{
    const bh_totals *t = bh_table_totals(of);
    const bh_schedule *s = &bh_table_plan(of)->schedule;
    add_share(to, "scheduled = beam hours / ", s->availability.value, " + changes; ");
    add_share(to, "contingency = ", s->contingency.value, " of scheduled; asked = ");
    bh_hours_words(to, t->asked_hours);
    bh_text_append(to, " h");
    add_units(to, t->shifts, "shifts", s->shift.value);
    add_units(to, t->weeks, "weeks", s->week.value);
    if (s->available_is_beam)
        bh_text_append(to, "; available are hours of beam, compared with beam hours");
    bh_text_appendf(to, "%s%s", t->note ? "; " : "", t->note ? t->note : "");
}

/* --- below --- */

static void notes(const struct format *f, const bh_table *of, bh_text *out)
{
    const char *note = NULL;
    bh_text sum = {0};
    sum_words(of, &sum);
    bh_text_append(out, f->list[0]);
    item(f, "time", sum.bytes ? sum.bytes : "", out);
    item(f, "per", "cross sections and luminosity are per nucleus of the scatterer", out);
    for (size_t i = 0; (note = bh_table_note(of, i)); i++)
        item(f, "note", note, out);
    bh_text_append(out, f->list[1]);
    out->failed |= sum.failed;
    bh_text_free(&sum);
    for (size_t i = 0; i < bh_table_cautions(of); i++) {
        bh_text_append(out, f->caution[0]);
        f->words(out, bh_table_caution(of, i)->text);
        bh_text_append(out, f->caution[1]);
    }
}

static void whole(const struct format *f, const bh_selection *before, const bh_selection *view,
                  bh_text *out)
{
    title(f, bh_table_plan(view->table), out);
    inputs(f, view, out);
    table(f, before, view, out);
    totals(f, before, view, out);
    notes(f, view->table, out);
}

void bh_report_markdown_below(const bh_table *table, bh_text *out)
{
    notes(&markdown, table, out);
}

void bh_report_markdown(const bh_selection *before, const bh_selection *view, bh_text *out)
{
    whole(&markdown, before, view, out);
}

void bh_report_latex(const bh_selection *before, const bh_selection *view, bh_text *out)
{
    bh_latex_needs(out);
    whole(&latex, before, view, out);
}

double bh_report_latex_wide(const bh_selection *before, const bh_selection *view)
{
    bh_grid grid = {0};
    fill(before, view, &grid);
    const double wide = bh_grid_latex_wide(&grid);
    bh_grid_free(&grid);
    return wide;
}
