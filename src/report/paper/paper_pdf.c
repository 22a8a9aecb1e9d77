/* paper_pdf.c - pages laid out from top to bottom; a table that does not fit goes on with its
 * headings on the next page. */
#include "beamhours/report/paper.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include <cairo-pdf.h>

#include "beamhours/report/figure_draw.h"
#include "beamhours/report/paper_leaf.h"

/* A file says when it was made; these say the same always. */
static const char pdf_date[] = "2000-01-01T00:00:00Z";

static const double foot = 30.0;                       /* [pt] */
static const double body_size = 9.5, small_size = 8.5; /* [pt] */

double bh_leaf_inside(const bh_leaf *s)
{
    return s->wide - 2.0 * BH_LEAF_MARGIN;
}

/* Makes the pen's text ready: `width` [pt] to break lines at, 0: never. */
double bh_leaf_prepare(const bh_leaf *s, const char *text, bool bold, double width)
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

void bh_leaf_show(const bh_leaf *s, double x, double y)
{
    cairo_move_to(s->pen.to, x, y);
    pango_cairo_show_layout(s->pen.to, s->pen.text);
}

static void page_foot(bh_leaf *s)
{
    char text[32];
    s->size = small_size - 1.0;
    bh_pen_grey(&s->pen, 0.25);
    (void)bh_leaf_prepare(s, s->paper->title, false, bh_leaf_inside(s) - 60.0);
    pango_layout_set_height(s->pen.text, -1);
    pango_layout_set_ellipsize(s->pen.text, PANGO_ELLIPSIZE_END);
    bh_leaf_show(s, BH_LEAF_MARGIN, s->high - foot);
    pango_layout_set_ellipsize(s->pen.text, PANGO_ELLIPSIZE_NONE);
    (void)snprintf(text, sizeof text, "page %d", s->number);
    (void)bh_leaf_prepare(s, text, false, 0.0);
    int width = 0;
    pango_layout_get_size(s->pen.text, &width, NULL);
    bh_leaf_show(s, s->wide - BH_LEAF_MARGIN - (double)width / PANGO_SCALE, s->high - foot);
    bh_pen_grey(&s->pen, 0.0);
}

void bh_leaf_next_page(bh_leaf *s)
{
    const double size = s->size;
    page_foot(s);
    cairo_show_page(s->pen.to);
    s->size = size;
    s->number++;
    s->y = BH_LEAF_MARGIN;
}

double bh_leaf_room(const bh_leaf *s)
{
    return s->high - BH_LEAF_MARGIN - s->y;
}

/* Begins a page where less than `needed` [pt] is left. */
void bh_leaf_need(bh_leaf *s, double needed)
{
    if (bh_leaf_room(s) < needed && s->y > BH_LEAF_MARGIN)
        bh_leaf_next_page(s);
}

/* --- words --- */

/* A text longer than a page goes on, line by line. */
void bh_leaf_paragraph(bh_leaf *s, const char *text, bool bold, double indent)
{
    const double high = bh_leaf_prepare(s, text, bold, bh_leaf_inside(s) - indent);
    const int count = pango_layout_get_line_count(s->pen.text);
    const double line = high / (double)(count > 0 ? count : 1);
    bh_leaf_need(s, fmin(high, 3.0 * line));
    for (int i = 0; i < count; i++) {
        if (bh_leaf_room(s) < line)
            bh_leaf_next_page(s);
        (void)bh_leaf_prepare(s, text, bold, bh_leaf_inside(s) - indent);
        PangoLayoutLine *one = pango_layout_get_line_readonly(s->pen.text, i);
        cairo_move_to(s->pen.to, BH_LEAF_MARGIN + indent, s->y + 0.8 * line);
        pango_cairo_show_layout_line(s->pen.to, one);
        s->y += line;
    }
}

static void section(bh_leaf *s, const bh_block *b)
{
    bh_text head = {0};
    bh_text_appendf(&head, "%d. %s", b->number, b->text);
    s->size = 12.5;
    s->y += s->y > BH_LEAF_MARGIN ? 12.0 : 0.0;
    const bool drawing = b + 1 < s->paper->blocks + s->paper->count && b[1].kind == BH_BLOCK_FIGURE;
    bh_leaf_need(s, drawing ? 400.0 : 90.0);
    cairo_pdf_surface_add_outline(s->surface, CAIRO_PDF_OUTLINE_ROOT, head.bytes ? head.bytes : "",
                                  "", (cairo_pdf_outline_flags_t)0);
    bh_leaf_paragraph(s, head.bytes ? head.bytes : "", true, 0.0);
    bh_text_free(&head);
    s->y += 4.0;
}

static void item(bh_leaf *s, const char *lead, const char *text)
{
    const double indent = 18.0;
    s->size = body_size;
    bh_leaf_need(s, 2.0 * body_size);
    (void)bh_leaf_prepare(s, lead, false, 0.0);
    bh_leaf_show(s, BH_LEAF_MARGIN, s->y);
    bh_leaf_paragraph(s, text, false, indent);
    s->y += 1.5;
}

static void caution(bh_leaf *s, const char *text)
{
    s->size = body_size;
    bh_leaf_need(s, 40.0);
    s->y += 2.0;
    bh_leaf_paragraph(s, "Caution", true, 10.0);
    bh_leaf_paragraph(s, text, false, 10.0);
    s->y += 5.0;
}

/* --- figures --- */

static bh_code figure(bh_leaf *s, const bh_block *b, bh_error *err)
{
    double wide = 0.0, high = 0.0;
    bh_code bad = bh_figure_size(b->figure, &wide, &high, err);
    if (bad)
        return bad;
    const double scale =
        fmin(0.76, bh_leaf_inside(s) / wide); /* two on a page, with their captions */
    bh_leaf_need(s, scale * high + 30.0);
    cairo_save(s->pen.to);
    cairo_translate(s->pen.to, BH_LEAF_MARGIN, s->y);
    cairo_scale(s->pen.to, scale, scale);
    bad = bh_figure_draw(b->figure, s->pen.to, err);
    cairo_restore(s->pen.to);
    bh_pen_grey(&s->pen, 0.0);
    s->y += scale * high + 3.0;
    bh_text caption = {0};
    bh_text_appendf(&caption, "Figure %d. %s", b->number, b->text);
    s->size = small_size;
    bh_leaf_paragraph(s, caption.bytes ? caption.bytes : "", true, 0.0);
    bh_text_free(&caption);
    s->y += 10.0;
    return bad;
}

static bh_code block(bh_leaf *s, const bh_block *b, bh_error *err)
{
    char lead[16] = "\xE2\x80\xA2"; /* a bullet */
    s->size = body_size;
    switch (b->kind) {
    case BH_BLOCK_SECTION:
        section(s, b);
        break;
    case BH_BLOCK_WORDS:
        bh_leaf_paragraph(s, b->text, false, 0.0);
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
        if (!bh_leaf_table(s, b))
            return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
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

static bh_code draw(bh_leaf *s, bh_error *err)
{
    bh_code bad = BH_OK;
    s->y = BH_LEAF_MARGIN;
    s->number = 1;
    s->size = 16.0;
    bh_leaf_paragraph(s, s->paper->title, true, 0.0);
    s->y += 6.0;
    for (size_t i = 0; !bad && i < s->paper->count; i++)
        bad = block(s, &s->paper->blocks[i], err);
    page_foot(s);
    cairo_show_page(s->pen.to);
    return bad;
}

static bh_code with_pen(bh_leaf *s, cairo_t *to, bh_error *err)
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
    bh_leaf s = {.paper = paper,
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
