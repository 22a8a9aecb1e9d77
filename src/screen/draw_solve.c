/* draw_solve.c - what would it take, beside the table that shows what it does. */
#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/screen/drawing_parts.h"

enum { MOST_DIGITS = 5, LEAST_DIGITS = 3 };
enum { OUTPUT, WANTED, INPUT, SOLUTIONS, NAMES = 8, ROOMY = 14 /* rows */ };

struct page {
    const bh_model *model;
    bh_canvas *canvas;
    int row, columns;
    bool tight; /* there are few rows */
};

static void name_line(const struct page *p, int line, const char *name)
{
    const bool here = p->model->solving.line == line;
    const bh_spot spot = {p->row, 0, p->columns};
    (void)bh_canvas_put(p->canvas, spot, BH_LOOK_PLAIN, here ? ">" : " ");
    (void)bh_canvas_put(p->canvas, (bh_spot){p->row, 1, NAMES}, BH_LOOK_TITLE, name);
    if (!here)
        return;
    p->canvas->cursor_row = p->row;
    p->canvas->cursor_column = 0;
}

static void choice_line(const struct page *p, int line, const char *name, const char *choice)
{
    char text[80];
    name_line(p, line, name);
    (void)snprintf(text, sizeof text, p->model->solving.line == line ? "< %.60s >" : "%.60s",
                   choice);
    const bh_spot spot = {p->row, NAMES + 1, p->columns - NAMES - 1};
    const int used = bh_canvas_put(p->canvas, spot, BH_LOOK_PLAIN, text);
    if (p->model->solving.line == line)
        bh_canvas_paint(p->canvas, (bh_spot){p->row, NAMES + 1, used}, BH_LOOK_FOCUS);
}

/* A text over as many rows as it needs and there are. */
static int wrapped(const struct page *p, bh_look look, const char *text, int most)
{
    int rows = 0;
    for (; *text && rows < most; rows++) {
        const size_t fits = bh_text_fit(text, p->columns - 2);
        size_t n = fits;
        while (text[fits] && n > 0 && text[n] != ' ')
            n--;
        n = n ? n : fits;
        char line[512];
        (void)snprintf(line, sizeof line, "%.*s", (int)n, text);
        (void)bh_canvas_put(p->canvas, (bh_spot){p->row + rows, 1, p->columns - 2}, look, line);
        text += n;
        text += strspn(text, " ");
    }
    return rows;
}

static const char *unit_of(bh_column_id output)
{
    const char *unit = bh_column_at((int)output)->unit;
    return bh_solve_in_percent(output) ? "%" : strcmp(unit, "1") == 0 ? "" : unit;
}

/* What a value of the input gives: where there is little room, with fewer digits before the unit is
 * cut.  The sentence below has them all. */
static void say_solution(const struct page *p, size_t i, const char *mark, int room, char out[240])
{
    const bh_solving *s = &p->model->solving;
    const double scale = bh_solve_in_percent(s->output) ? 100 : 1;
    const char *unit = unit_of(s->output);
    for (int digits = MOST_DIGITS; digits >= LEAST_DIGITS; digits--) {
        char number[BH_NUMBER_SIZE];
        (void)bh_number_digits(scale * s->answer.solutions[i].output, digits, number,
                               sizeof number);
        (void)snprintf(out, 240, "%s %s gives %s%s%s", mark, s->answer.solutions[i].text, number,
                       unit[0] ? " " : "", unit);
        if (bh_text_columns(out, p->canvas->ascii) <= room)
            break;
    }
}

static void draw_solutions(struct page *p, int last)
{
    const bh_solving *s = &p->model->solving;
    for (size_t i = 0; i < s->answer.count && p->row < last; i++, p->row++) {
        char line[240];
        const bool here = s->line == SOLUTIONS + (int)i || (s->line < SOLUTIONS && i == 0);
        const bh_spot spot = {p->row, 1, p->columns - 1};
        say_solution(p, i, here ? ">" : " ", spot.width, line);
        bh_canvas_put_cut(p->canvas, spot, here ? BH_LOOK_TRIAL : BH_LOOK_PLAIN, line);
        if (s->line == SOLUTIONS + (int)i)
            bh_canvas_paint(p->canvas, spot, BH_LOOK_FOCUS);
    }
}

static void draw_answer(struct page *p, int last)
{
    const bh_solving *s = &p->model->solving;
    if (p->row >= last)
        return;
    if (s->waiting || s->due) {
        (void)bh_canvas_put(p->canvas, (bh_spot){p->row, 1, p->columns - 1}, BH_LOOK_QUIET,
                            "being looked for \u2026");
        return;
    }
    if (s->answer.count)
        draw_solutions(p, last);
    p->row += !p->tight;
    p->row += wrapped(p, s->bad ? BH_LOOK_ERROR : BH_LOOK_PLAIN, s->said, last - p->row);
    if (s->answer.count && p->row < last)
        (void)bh_canvas_put(p->canvas, (bh_spot){p->row, 1, p->columns - 1}, BH_LOOK_QUIET,
                            "Enter takes it");
}

/* What the page is, and the row of the table that it is about: in one line where rows are few.  Of
 * that line the name, which is not known without it, keeps up to two thirds. */
static void draw_heading(struct page *p)
{
    const bh_solving *s = &p->model->solving;
    char about[160];
    (void)snprintf(about, sizeof about, "%.60s%s%.60s", s->setting, s->arm[0] ? ", arm " : "",
                   s->arm);
    const int most = p->tight ? 2 * p->columns / 3 : p->columns - 1;
    const int all = bh_text_columns(about, p->canvas->ascii), width = all < most ? all : most;
    bh_spot title = {p->row++, 0, p->columns - (p->tight ? width + 1 : 0)};
    const bh_spot name = {p->tight ? title.row : p->row, p->tight ? title.width + 1 : 1, width};
    bh_canvas_put_cut(p->canvas, title, BH_LOOK_TITLE, "WHAT WOULD IT TAKE");
    bh_canvas_put_cut(p->canvas, name, BH_LOOK_PLAIN, about);
    p->row += p->tight ? 0 : 2;
}

void bh_draw_solving(const bh_model *model, const bh_arrangement *places, bh_canvas *canvas)
{
    const bh_solving *s = &model->solving;
    const bh_column *column = bh_column_at((int)s->output);
    const int columns = places->plan_columns ? places->plan_columns : canvas->columns;
    const int last = places->body + places->body_rows;
    const bool tight = places->body_rows < ROOMY; /* nothing but what is needed */
    struct page p = {model, canvas, places->body, columns, tight};
    char text[160];
    for (int r = 0; r < places->body_rows; r++)
        bh_canvas_clear(canvas, (bh_spot){places->body + r, 0, columns});
    draw_heading(&p);
    (void)snprintf(text, sizeof text, "%s %s", column->heading, unit_of(s->output));
    choice_line(&p, OUTPUT, "output", text);
    p.row++;
    name_line(&p, WANTED, "wanted");
    if (s->line == WANTED)
        bh_draw_field(canvas, (bh_spot){p.row, NAMES + 1, columns - NAMES - 2}, &s->wanted);
    else
        (void)bh_canvas_put(canvas, (bh_spot){p.row, NAMES + 1, columns - NAMES - 2}, BH_LOOK_PLAIN,
                            s->wanted.bytes);
    p.row++;
    choice_line(&p, INPUT, "by", bh_solve_input_name((bh_solve_input)s->by));
    p.row++;
    if (!tight)
        p.row += wrapped(&p, BH_LOOK_QUIET, bh_solve_input_meaning((bh_solve_input)s->by), 3) + 1;
    draw_answer(&p, last);
}
