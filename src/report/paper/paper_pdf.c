/* paper_pdf.c - pages laid out from top to bottom; a table that does not fit goes on with its
 * headings on the next page. */
#include "beamhours/report/paper.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include <cairo-pdf.h>

#include "beamhours/report/figure_draw.h"
#include "beamhours/report/pen.h"

/* A file says when it was made; these say the same always. */
static const char pdf_date[] = "2000-01-01T00:00:00Z";

static const double margin = 54.0, foot = 30.0;           /* [pt] */
static const double body_size = 9.5, small_size = 8.5;    /* [pt] */
static const double largest_cell = 8.0, least_cell = 5.0; /* [pt] of the letters in tables */
static const double cell_gap = 7.0;                       /* [pt] between columns */

enum { MOST_COLUMNS = 64 };

struct sheet {
    const bh_paper *paper;
    cairo_surface_t *surface;
    bh_pen pen;
    double wide, high; /* [pt] of the page */
    double y;          /* [pt] where the next thing stands */
    int number;
    double size;                   /* [pt] of the letters now */
    PangoFontDescription *font[2]; /* plain, bold */
};

static double inside(const struct sheet *s)
{
    return s->wide - 2.0 * margin;
}

/* Makes the pen's text ready: `width` [pt] to break lines at, 0: never. */
static double prepare(const struct sheet *s, const char *text, bool bold, double width)
{
    PangoLayout *l = s->pen.text;
    int high = 0;
    pango_font_description_set_absolute_size(s->font[bold], s->size * PANGO_SCALE);
    pango_layout_set_font_description(l, s->font[bold]);
    pango_layout_set_width(l, width > 0.0 ? (int)ceil(width * PANGO_SCALE) : -1);
    pango_layout_set_wrap(l, PANGO_WRAP_WORD_CHAR);
    pango_layout_set_alignment(l, PANGO_ALIGN_LEFT);
    pango_layout_set_text(l, text, -1);
    pango_layout_get_size(l, NULL, &high);
    return (double)high / PANGO_SCALE;
}

static void show(const struct sheet *s, double x, double y)
{
    cairo_move_to(s->pen.to, x, y);
    pango_cairo_show_layout(s->pen.to, s->pen.text);
}

static void page_foot(struct sheet *s)
{
    char text[32];
    s->size = small_size - 1.0;
    bh_pen_grey(&s->pen, 0.25);
    (void)prepare(s, s->paper->title, false, inside(s) - 60.0);
    pango_layout_set_height(s->pen.text, -1);
    pango_layout_set_ellipsize(s->pen.text, PANGO_ELLIPSIZE_END);
    show(s, margin, s->high - foot);
    pango_layout_set_ellipsize(s->pen.text, PANGO_ELLIPSIZE_NONE);
    (void)snprintf(text, sizeof text, "page %d", s->number);
    (void)prepare(s, text, false, 0.0);
    int width = 0;
    pango_layout_get_size(s->pen.text, &width, NULL);
    show(s, s->wide - margin - (double)width / PANGO_SCALE, s->high - foot);
    bh_pen_grey(&s->pen, 0.0);
}

static void next_page(struct sheet *s)
{
    const double size = s->size;
    page_foot(s);
    cairo_show_page(s->pen.to);
    s->size = size;
    s->number++;
    s->y = margin;
}

static double room(const struct sheet *s)
{
    return s->high - margin - s->y;
}

/* Begins a page where less than `needed` [pt] is left. */
static void need(struct sheet *s, double needed)
{
    if (room(s) < needed && s->y > margin)
        next_page(s);
}

/* --- words --- */

/* A text longer than a page goes on, line by line. */
static void paragraph(struct sheet *s, const char *text, bool bold, double indent)
{
    const double high = prepare(s, text, bold, inside(s) - indent);
    const int count = pango_layout_get_line_count(s->pen.text);
    const double line = high / (double)(count > 0 ? count : 1);
    need(s, fmin(high, 3.0 * line));
    for (int i = 0; i < count; i++) {
        if (room(s) < line)
            next_page(s);
        (void)prepare(s, text, bold, inside(s) - indent);
        PangoLayoutLine *one = pango_layout_get_line_readonly(s->pen.text, i);
        cairo_move_to(s->pen.to, margin + indent, s->y + 0.8 * line);
        pango_cairo_show_layout_line(s->pen.to, one);
        s->y += line;
    }
}

static void section(struct sheet *s, const bh_block *b)
{
    bh_text head = {0};
    bh_text_appendf(&head, "%d. %s", b->number, b->text);
    s->size = 12.5;
    s->y += s->y > margin ? 12.0 : 0.0;
    const bool drawing = b + 1 < s->paper->blocks + s->paper->count && b[1].kind == BH_BLOCK_FIGURE;
    need(s, drawing ? 400.0 : 90.0);
    cairo_pdf_surface_add_outline(s->surface, CAIRO_PDF_OUTLINE_ROOT, head.bytes ? head.bytes : "",
                                  "", (cairo_pdf_outline_flags_t)0);
    paragraph(s, head.bytes ? head.bytes : "", true, 0.0);
    bh_text_free(&head);
    s->y += 4.0;
}

static void item(struct sheet *s, const char *lead, const char *text)
{
    const double indent = 18.0;
    s->size = body_size;
    need(s, 2.0 * body_size);
    (void)prepare(s, lead, false, 0.0);
    const double y = s->y;
    const int page = s->number;
    if (page == s->number)
        show(s, margin, y);
    paragraph(s, text, false, indent);
    s->y += 1.5;
}

static void caution(struct sheet *s, const char *text)
{
    s->size = body_size;
    need(s, 40.0);
    s->y += 2.0;
    paragraph(s, "Caution", true, 10.0);
    paragraph(s, text, false, 10.0);
    s->y += 5.0;
}

/* --- tables --- */

struct grid {
    const bh_paper_table *t;
    double width[MOST_COLUMNS]; /* [pt] */
    double total;               /* [pt] with the gaps */
};

static double text_width(const struct sheet *s, const char *text, bool bold)
{
    int width = 0;
    (void)prepare(s, text, bold, 0.0);
    pango_layout_get_size(s->pen.text, &width, NULL);
    return (double)width / PANGO_SCALE;
}

static const char *cell_at(const bh_paper_table *t, size_t row, size_t column)
{
    return t->cells[row * t->column_count + column];
}

/* Only the cell with the most bytes is measured: letters of one font differ less than that. */
static double natural(const struct sheet *s, const bh_paper_table *t, size_t column)
{
    double most = fmax(text_width(s, t->columns[column].heading, true),
                       text_width(s, t->columns[column].unit, false));
    size_t longest = 0;
    for (size_t r = 0; r < t->row_count; r++) {
        const size_t n = strlen(cell_at(t, r, column));
        if (n < longest || (n == longest && r > 0 && t->row_count > 100))
            continue;
        longest = n;
        most = fmax(most, text_width(s, cell_at(t, r, column), false));
    }
    return most + 0.5;
}

/* [pt] that columns of words take where none is wider than `most`. */
static double words_wide(const struct grid *g, double most)
{
    double sum = 0.0;
    for (size_t c = 0; c < g->t->column_count; c++)
        if (!g->t->columns[c].number)
            sum += fmin(g->width[c], most);
    return sum;
}

/* The widest columns of words give way until the table fits; false where they have not the room. */
static bool fit(const struct sheet *s, struct grid *g)
{
    enum { HALVINGS = 24 };
    const size_t n = g->t->column_count;
    double left = inside(s) - cell_gap * (double)(n - 1);
    for (size_t c = 0; c < n; c++) {
        g->width[c] = natural(s, g->t, c);
        left -= g->t->columns[c].number ? g->width[c] : 0.0;
    }
    double low = 0.0, most = inside(s);
    for (int i = 0; i < HALVINGS && words_wide(g, inside(s)) > left; i++) {
        const double middle = 0.5 * (low + most);
        if (words_wide(g, middle) > left)
            most = middle;
        else
            low = middle;
    }
    g->total = cell_gap * (double)(n - 1);
    for (size_t c = 0; c < n; c++) {
        if (!g->t->columns[c].number)
            g->width[c] = fmin(g->width[c], most);
        g->total += g->width[c];
    }
    return most > 60.0 && left > 0.0;
}

static void rule(const struct sheet *s, double long_, double thick)
{
    bh_pen_stroke(&s->pen, &(bh_stroke){margin, s->y, margin + long_, s->y, thick});
}

/* What stands in a row: cells, headings or units. */
static const char *in_row(const bh_paper_table *t, long row, size_t column)
{
    if (row >= 0)
        return cell_at(t, (size_t)row, column);
    return row == -2 ? t->columns[column].heading : t->columns[column].unit;
}

static double row_height(const struct sheet *s, const struct grid *g, long row)
{
    double most = 0.0;
    for (size_t c = 0; c < g->t->column_count; c++) {
        const bool wraps = !g->t->columns[c].number;
        const char *text = in_row(g->t, row, c);
        if (wraps || c == 0)
            most = fmax(
                most, prepare(s, text[0] ? text : "x", row == -2, wraps ? g->width[c] + 0.1 : 0.0));
    }
    return most + 1.5;
}

static void draw_row(struct sheet *s, const struct grid *g, long row)
{
    double x = margin;
    const double high = row_height(s, g, row);
    for (size_t c = 0; c < g->t->column_count; c++) {
        const bool number = g->t->columns[c].number;
        const char *text = in_row(g->t, row, c);
        (void)prepare(s, text, row == -2, number ? 0.0 : g->width[c] + 0.1);
        int width = 0;
        pango_layout_get_size(s->pen.text, &width, NULL);
        show(s, number ? x + g->width[c] - (double)width / PANGO_SCALE : x, s->y);
        x += g->width[c] + cell_gap;
    }
    s->y += high;
}

static bool has_units(const bh_paper_table *t)
{
    for (size_t c = 0; c < t->column_count; c++)
        if (t->columns[c].unit[0])
            return true;
    return false;
}

static void headings(struct sheet *s, const struct grid *g)
{
    rule(s, g->total, 1.0);
    s->y += 2.0;
    draw_row(s, g, -2);
    if (has_units(g->t))
        draw_row(s, g, -1);
    s->y += 1.0;
    rule(s, g->total, 0.5);
    s->y += 2.0;
}

static void rows(struct sheet *s, const struct grid *g)
{
    for (size_t r = 0; r < g->t->row_count; r++) {
        if (room(s) < row_height(s, g, (long)r)) {
            rule(s, g->total, 0.5);
            next_page(s);
            headings(s, g);
        }
        draw_row(s, g, (long)r);
    }
    rule(s, g->total, 1.0);
}

static void table(struct sheet *s, const bh_block *b)
{
    struct grid g = {.t = b->table};
    bh_text caption = {0};
    if (b->table->column_count > MOST_COLUMNS)
        return;
    bh_text_appendf(&caption, "Table %d. %s", b->number, b->text);
    s->size = largest_cell;
    while (!fit(s, &g) && s->size > least_cell)
        s->size -= 0.25;
    const double size = s->size;
    s->y += 4.0;
    need(s, 100.0);
    s->size = small_size;
    paragraph(s, caption.bytes ? caption.bytes : "", true, 0.0);
    bh_text_free(&caption);
    s->y += 3.0;
    s->size = size;
    headings(s, &g);
    rows(s, &g);
    s->y += 10.0;
}

/* --- figures --- */

static bh_code figure(struct sheet *s, const bh_block *b, bh_error *err)
{
    double wide = 0.0, high = 0.0;
    bh_code bad = bh_figure_size(b->figure, &wide, &high, err);
    if (bad)
        return bad;
    const double scale = fmin(0.88, inside(s) / wide); /* two on a page, with their captions */
    need(s, scale * high + 30.0);
    cairo_save(s->pen.to);
    cairo_translate(s->pen.to, margin, s->y);
    cairo_scale(s->pen.to, scale, scale);
    bad = bh_figure_draw(b->figure, s->pen.to, err);
    cairo_restore(s->pen.to);
    bh_pen_grey(&s->pen, 0.0);
    s->y += scale * high + 3.0;
    bh_text caption = {0};
    bh_text_appendf(&caption, "Figure %d. %s", b->number, b->text);
    s->size = small_size;
    paragraph(s, caption.bytes ? caption.bytes : "", true, 0.0);
    bh_text_free(&caption);
    s->y += 10.0;
    return bad;
}

static bh_code block(struct sheet *s, const bh_block *b, bh_error *err)
{
    char lead[16] = "\xE2\x80\xA2"; /* a bullet */
    s->size = body_size;
    switch (b->kind) {
    case BH_BLOCK_SECTION:
        section(s, b);
        break;
    case BH_BLOCK_WORDS:
        paragraph(s, b->text, false, 0.0);
        s->y += 5.0;
        break;
    case BH_BLOCK_REFERENCE:
        (void)snprintf(lead, sizeof lead, "%d.", b->number);
        item(s, lead, b->text);
        break;
    case BH_BLOCK_ITEM:
        item(s, lead, b->text);
        break;
    case BH_BLOCK_CAUTION:
        caution(s, b->text);
        break;
    case BH_BLOCK_TABLE:
        table(s, b);
        break;
    case BH_BLOCK_FIGURE:
        return figure(s, b, err);
    }
    return BH_OK;
}

/* --- the file --- */

static cairo_status_t collect(void *closure, const unsigned char *data, unsigned int length)
{
    bh_text *out = closure;
    bh_text_append_bytes(out, data, length);
    return out->failed ? CAIRO_STATUS_NO_MEMORY : CAIRO_STATUS_SUCCESS;
}

static bh_code draw(struct sheet *s, bh_error *err)
{
    bh_code bad = BH_OK;
    s->y = margin;
    s->number = 1;
    s->size = 16.0;
    paragraph(s, s->paper->title, true, 0.0);
    s->y += 6.0;
    for (size_t i = 0; !bad && i < s->paper->count; i++)
        bad = block(s, &s->paper->blocks[i], err);
    page_foot(s);
    cairo_show_page(s->pen.to);
    return bad;
}

static bh_code with_pen(struct sheet *s, cairo_t *to, bh_error *err)
{
    bh_code bad = bh_pen_open(to, &s->pen, err);
    for (int i = 0; i < 2; i++) {
        s->font[i] = pango_font_description_from_string("DejaVu Sans");
        pango_font_description_set_weight(s->font[i], i ? PANGO_WEIGHT_BOLD : PANGO_WEIGHT_NORMAL);
    }
    if (!bad)
        bad = draw(s, err);
    for (int i = 0; i < 2; i++)
        pango_font_description_free(s->font[i]);
    bh_pen_close(&s->pen);
    if (!bad && cairo_status(to))
        bad = bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    return bad;
}

bh_code bh_paper_pdf(const bh_paper *paper, bh_page page, bh_text *out, bh_error *err)
{
    struct sheet s = {.paper = paper,
                      .wide = page == BH_PAGE_A4 ? 595.276 : 612.0,
                      .high = page == BH_PAGE_A4 ? 841.890 : 792.0};
    s.surface = cairo_pdf_surface_create_for_stream(collect, out, s.wide, s.high);
    cairo_pdf_surface_restrict_to_version(s.surface, CAIRO_PDF_VERSION_1_5);
    cairo_pdf_surface_set_metadata(s.surface, CAIRO_PDF_METADATA_CREATE_DATE, pdf_date);
    cairo_pdf_surface_set_metadata(s.surface, CAIRO_PDF_METADATA_CREATOR, "beamhours");
    cairo_pdf_surface_set_metadata(s.surface, CAIRO_PDF_METADATA_TITLE, paper->title);
    cairo_t *to = cairo_create(s.surface);
    bh_code bad = with_pen(&s, to, err);
    cairo_destroy(to);
    cairo_surface_finish(s.surface);
    if (!bad && (cairo_surface_status(s.surface) || out->failed))
        bad = bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    cairo_surface_destroy(s.surface);
    return bad;
}
