/* run_schedule.c - the layout of time with what to dial and where to stop. */
#include "beamhours/report/run_schedule.h"

#include <math.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/report/grid.h"
#include "beamhours/report/marked_table.h"
#include "beamhours/report/text_table.h"
#include "beamhours/report/wall_clock.h"
#include "beamhours/run/totals.h"

bh_code bh_run_schedule_make(const bh_table *table, bh_arena *arena, bh_run_schedule *out,
                             bh_error *err)
{
    const bh_plan *plan = bh_table_plan(table);
    bh_stretch *hours = bh_arena_take(arena, plan->setting_count + 1, sizeof *hours);
    size_t *row = bh_arena_take(arena, plan->setting_count + 1, sizeof *row);
    if (!hours || !row)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    bh_stretches_of(table, hours);
    for (size_t s = 0; s < plan->setting_count; s++)
        row[s + 1] = row[s] + plan->settings[s].arm_count;
    out->table = table;
    out->row = row;
    return bh_time_layout_of_plan(plan, hours, arena, &out->layout, err);
}

/* --- lines --- */

static bool on_target(bh_span_kind kind)
{
    return kind == BH_SPAN_DATA || kind == BH_SPAN_EMPTY;
}

void bh_run_lines(const bh_run_schedule *s, void (*each)(void *to, const bh_run_line *line),
                  void *to)
{
    const bh_plan *plan = bh_table_plan(s->table);
    for (size_t i = 0; i < s->layout.count; i++) {
        const bh_time_span *span = &s->layout.spans[i];
        const bool set = on_target(span->kind) || span->kind == BH_SPAN_CHANGE;
        bh_run_line line = {
            .span = span, .setting = set ? &plan->settings[span->step] : NULL, .first = true};
        size_t lines = 1;
        if (on_target(span->kind)) {
            line.row = s->row[span->step];
            lines = s->row[span->step + 1] - line.row;
        }
        for (size_t k = 0; k < lines; k++) {
            each(to, &line);
            line.row++;
            line.first = false;
        }
    }
}

const char *bh_span_name(bh_span_kind kind)
{
    static const char *const names[] = {
        [BH_SPAN_START_UP] = "start-up",  [BH_SPAN_CHANGE] = "change",
        [BH_SPAN_TASK] = "task",          [BH_SPAN_DATA] = "data",
        [BH_SPAN_EMPTY] = "empty target", [BH_SPAN_CONTINGENCY] = "contingency"};
    return names[kind];
}

/* "change: energy, angle" */
static void change_words(unsigned changes, bh_text *out)
{
    static const struct {
        unsigned bit;
        const char *name;
    } parts[] = {{BH_MISSING_ENERGY, "energy"},
                 {BH_MISSING_PARTICLE, "particle"},
                 {BH_MISSING_TARGET, "target"},
                 {BH_MISSING_ANGLE, "angle"}};
    const char *lead = "change: ";
    for (size_t i = 0; i < sizeof parts / sizeof parts[0]; i++) {
        if (!(changes & parts[i].bit))
            continue;
        bh_text_appendf(out, "%s%s", lead, parts[i].name);
        lead = ", ";
    }
}

void bh_run_words(const bh_run_schedule *s, const bh_run_line *line, bh_text *out)
{
    const bh_time_span *span = line->span;
    if (span->kind == BH_SPAN_CHANGE) {
        change_words(span->changes, out);
    } else if (span->kind == BH_SPAN_TASK) {
        const bh_task *task = &bh_table_plan(s->table)->schedule.tasks[span->task];
        bh_text_appendf(out, "task: %s", task->name.text);
        if (span->times > 1)
            bh_text_appendf(out, ", %d times", span->times);
    } else if (on_target(span->kind)) {
        bh_text_append(out, line->setting->name);
        bh_text_append(out, span->kind == BH_SPAN_EMPTY ? ", empty target" : "");
    } else {
        bh_text_append(out, bh_span_name(span->kind));
    }
}

bh_run_values bh_run_values_of(const bh_run_schedule *s, const bh_run_line *line)
{
    bh_run_values v = {NAN, NAN, NAN, NAN, 0, NAN, NAN};
    if (line->setting) {
        v.energy = line->setting->beam.kinetic_energy.value;
        v.current = line->setting->beam.current.value * 1e6;
    }
    if (!line->setting || !on_target(line->span->kind))
        return v;
    const bh_setting_arm *arm =
        &line->setting->arms[bh_table_place(s->table, false, line->row).arm];
    const double hours = bh_table_number(s->table, false, line->row, BH_COL_HOURS);
    const double share = line->span->done / hours;
    v.angle = bh_table_number(s->table, false, line->row, BH_COL_ANGLE);
    v.momentum = bh_table_number(s->table, false, line->row, BH_COL_CENTRAL_MOMENTUM);
    v.prescale = arm->first ? 0 : arm->arm.prescale;
    v.charge = share * bh_table_number(s->table, false, line->row, BH_COL_CHARGE);
    if (line->span->kind == BH_SPAN_DATA)
        v.counts = share * bh_table_number(s->table, false, line->row, BH_COL_COUNTS);
    return v;
}

/* --- text and Markdown --- */

enum { DIALLED = 6 }; /* digits */

struct filling {
    const bh_run_schedule *s;
    bh_grid *grid;
    bool particles, targets; /* there are several */
};

static void cell(bh_grid *grid, bh_text *text)
{
    bh_grid_cell(grid, text->bytes ? text->bytes : "");
    grid->cells.failed |= text->failed;
    bh_text_free(text);
}

static void number_cell(bh_grid *grid, double value, int digits)
{
    char text[BH_NUMBER_SIZE] = "-";
    if (isfinite(value))
        (void)bh_number_digits(value, digits, text, sizeof text);
    bh_grid_cell(grid, fabs(value) > 0.0 || isnan(value) ? text : "0");
}

/* What is dialled is mostly a round number: its closing zeros say nothing. */
static void plain_cell(bh_grid *grid, double value)
{
    bh_text text = {0};
    if (isfinite(value)) {
        char digits[BH_NUMBER_SIZE];
        double rounded = value;
        (void)bh_number_digits(value, DIALLED, digits, sizeof digits);
        if (!bh_number_parse(digits, NULL, &rounded))
            bh_text_append_number(&text, rounded);
    } else {
        bh_text_append(&text, "-");
    }
    cell(grid, &text);
}

static void begin_cell(const bh_run_schedule *s, double hours, bh_grid *grid)
{
    bh_text text = {0};
    if (s->has_start) {
        char wall[BH_WALL_SIZE];
        bh_wall_print(s->start, hours, wall);
        bh_text_append(&text, wall);
    } else {
        bh_hours_words(&text, hours);
    }
    cell(grid, &text);
}

static void line_cells(void *to, const bh_run_line *line)
{
    const struct filling *f = to;
    const bh_run_values v = bh_run_values_of(f->s, line);
    const bool dialled = line->setting && on_target(line->span->kind);
    bh_text words = {0}, hours = {0};
    if (line->first) {
        begin_cell(f->s, line->span->begin, f->grid);
        bh_run_words(f->s, line, &words);
        bh_hours_words(&hours, line->span->hours);
    } else {
        bh_grid_cell(f->grid, "");
    }
    cell(f->grid, &words);
    if (f->particles)
        bh_grid_cell(f->grid, line->setting ? line->setting->beam.particle.name : "-");
    plain_cell(f->grid, v.energy);
    plain_cell(f->grid, v.current);
    if (f->targets)
        bh_grid_cell(f->grid, line->setting ? line->setting->target->name.text : "-");
    bh_grid_cell(f->grid, dialled ? bh_table_text(f->s->table, false, line->row, BH_COL_ARM) : "-");
    number_cell(f->grid, v.angle, 4);
    number_cell(f->grid, v.momentum, 5);
    plain_cell(f->grid, v.prescale > 0 ? v.prescale : (double)NAN);
    cell(f->grid, &hours);
    number_cell(f->grid, v.charge, 4);
    number_cell(f->grid, v.counts, 4);
}

static void end_cells(const bh_run_schedule *s, bh_grid *grid)
{
    const double asked = s->layout.sum.asked;
    begin_cell(s, asked, grid);
    bh_grid_cell(grid, "end");
    for (size_t c = 2; c < grid->column_count; c++)
        bh_grid_cell(grid, "-");
}

static void fill(const bh_run_schedule *s, bh_grid *grid)
{
    static const struct {
        const char *heading, *unit;
        bool number;
    } columns[] = {{"arm", "", false},      {"angle", "deg", true}, {"central", "MeV/c", true},
                   {"prescale", "1", true}, {"hours", "h", true},   {"charge", "mC", true},
                   {"counts", "1", true}};
    const bh_plan *plan = bh_table_plan(s->table);
    struct filling f = {s, grid, false, plan->target_count > 1};
    for (size_t i = 1; i < plan->setting_count; i++)
        f.particles = f.particles || strcmp(plan->settings[i].beam.particle.name,
                                            plan->settings[0].beam.particle.name) != 0;
    grid->names = 2;
    bh_grid_column_add(grid, "begins", s->has_start ? "" : "h", !s->has_start);
    grid->columns[0].whole = true;
    bh_grid_column_add(grid, "to do", "", false);
    if (f.particles)
        bh_grid_column_add(grid, "beam", "", false);
    bh_grid_column_add(grid, "energy", "MeV", true);
    bh_grid_column_add(grid, "current", "uA", true);
    if (f.targets)
        bh_grid_column_add(grid, "target", "", false);
    for (size_t i = 0; i < sizeof columns / sizeof columns[0]; i++)
        bh_grid_column_add(grid, columns[i].heading, columns[i].unit, columns[i].number);
    bh_run_lines(s, line_cells, &f);
    end_cells(s, grid);
}

#define CLOCK                                                                                    \
    "begins: calendar time without change of clocks; hours with beam take hours / availability " \
    "of it, as the plan gives it: no forecast."
#define STOP                                                                                       \
    "charge and counts: where to stop, counted since the setting began on this target; hours are " \
    "of beam, or of the change."
#define DIAL                                                                                     \
    "angle: of the arm's axis; energy: kinetic, entering the target; central: momentum the arm " \
    "is "                                                                                        \
    "set to."

static const char *const remarks[] = {CLOCK, STOP, DIAL};

enum { REMARKS = sizeof remarks / sizeof remarks[0] };

void bh_run_schedule_text(const bh_run_schedule *s, int width, bh_text *out)
{
    const bh_plan *plan = bh_table_plan(s->table);
    bh_grid grid = {0};
    if (plan->title.text) {
        bh_report_wrapped("", plan->title.text, width, out);
        bh_text_append(out, "\n");
    }
    fill(s, &grid);
    bh_grid_text(&grid, width, out);
    bh_grid_free(&grid);
    bh_text_append(out, "\n");
    for (size_t i = 0; i < REMARKS; i++)
        bh_report_wrapped("  ", remarks[i], width, out);
    bh_text_append(out, "\n");
    bh_report_text_totals(s->table, width, out);
    bh_report_text_cautions(s->table, width, out);
}

void bh_run_schedule_markdown(const bh_run_schedule *s, bh_text *out)
{
    const bh_plan *plan = bh_table_plan(s->table);
    bh_grid lines = {0}, totals = {0};
    bh_text_append(out, "# ");
    bh_markdown_words(out, plan->title.text ? plan->title.text : "Schedule");
    bh_text_append(out, "\n\n");
    fill(s, &lines);
    bh_grid_markdown(&lines, out);
    bh_grid_free(&lines);
    for (size_t i = 0; i < REMARKS; i++) {
        bh_text_append(out, "- ");
        bh_markdown_words(out, remarks[i]);
        bh_text_append(out, "\n");
    }
    bh_text_append(out, "\n");
    bh_totals_grid(NULL, bh_table_totals(s->table), &totals);
    bh_grid_markdown(&totals, out);
    bh_grid_free(&totals);
    bh_report_markdown_below(s->table, out);
}
