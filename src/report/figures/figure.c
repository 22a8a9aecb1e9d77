/* figure.c - the three kinds of file.  What cairo would take from the clock or from what was drawn
 * before is set or taken out again, so that equal figures are equal bytes. */
#include "beamhours/report/figure.h"

#include <stdio.h>
#include <string.h>

#include <cairo-pdf.h>
#include <cairo-svg.h>

#include "beamhours/report/figure_draw.h"

/* A file says when it was made; these say the same always. */
static const char pdf_date[] = "2000-01-01T00:00:00Z";

static cairo_status_t collect(void *closure, const unsigned char *data, unsigned int length)
{
    bh_text *out = closure;
    bh_text_append_bytes(out, data, length);
    return out->failed ? CAIRO_STATUS_NO_MEMORY : CAIRO_STATUS_SUCCESS;
}

static bh_code no_memory(bh_error *err)
{
    return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
}

/* Draws on `surface`, finishes and releases it. */
static bh_code draw(const bh_figure *figure, cairo_surface_t *surface, double scale, bh_error *err)
{
    cairo_t *to = cairo_create(surface);
    cairo_scale(to, scale, scale);
    cairo_set_source_rgb(to, 1.0, 1.0, 1.0);
    cairo_paint(to);
    bh_code bad = bh_figure_draw(figure, to, err);
    if (!bad) {
        cairo_show_page(to);
        bad = cairo_status(to) ? no_memory(err) : BH_OK;
    }
    cairo_destroy(to);
    return bad;
}

static bh_code finish(cairo_surface_t *surface, bh_code bad, bh_error *err)
{
    cairo_surface_finish(surface);
    if (!bad && cairo_surface_status(surface))
        bad = no_memory(err);
    cairo_surface_destroy(surface);
    return bad;
}

/* --- PDF, PNG --- */

static bh_code to_pdf(const bh_figure *figure, double wide, double high, bh_text *out,
                      bh_error *err)
{
    cairo_surface_t *s = cairo_pdf_surface_create_for_stream(collect, out, wide, high);
    cairo_pdf_surface_restrict_to_version(s, CAIRO_PDF_VERSION_1_5);
    cairo_pdf_surface_set_metadata(s, CAIRO_PDF_METADATA_CREATE_DATE, pdf_date);
    cairo_pdf_surface_set_metadata(s, CAIRO_PDF_METADATA_CREATOR, "beamhours");
    cairo_pdf_surface_set_metadata(s, CAIRO_PDF_METADATA_TITLE, figure->title);
    cairo_pdf_surface_set_metadata(s, CAIRO_PDF_METADATA_SUBJECT, figure->description);
    return finish(s, draw(figure, s, 1.0, err), err);
}

static bh_code to_png(const bh_figure *figure, double wide, double high, bh_text *out,
                      bh_error *err)
{
    cairo_surface_t *s =
        cairo_image_surface_create(CAIRO_FORMAT_RGB24, (int)(wide * BH_PNG_DOTS_PER_POINT + 0.5),
                                   (int)(high * BH_PNG_DOTS_PER_POINT + 0.5));
    bh_code bad = draw(figure, s, BH_PNG_DOTS_PER_POINT, err);
    if (!bad && cairo_surface_write_to_png_stream(s, collect, out))
        bad = no_memory(err);
    return finish(s, bad, err);
}

/* --- SVG --- */

static void escaped(const char *text, bh_text *out)
{
    for (const char *c = text; *c; c++) {
        if (*c == '<')
            bh_text_append(out, "&lt;");
        else if (*c == '&')
            bh_text_append(out, "&amp;");
        else if (*c == '>')
            bh_text_append(out, "&gt;");
        else
            bh_text_append_bytes(out, c, 1);
    }
}

/* Whether the text at `s` begins with `word`. */
static bool begins(const char *s, const char *word)
{
    return strncmp(s, word, strlen(word)) == 0;
}

/* Copies a number without the decimals that nobody sees: a thousandth of a point is kept. */
static const char *number(const char *s, bh_text *out)
{
    enum { KEPT = 4 }; /* the point and three digits */
    size_t n = strspn(s, "0123456789");
    if (s[n] == '.') {
        const size_t decimals = 1 + strspn(s + n + 1, "0123456789");
        bh_text_append_bytes(out, s, n + (decimals < KEPT ? decimals : KEPT));
        return s + n + decimals;
    }
    bh_text_append_bytes(out, s, n);
    return s + n;
}

/* Copies cairo's drawing, all ids led by `id`; groups named after a count of all surfaces that the
 * program ever made lose that name. */
static void rename_ids(const char *s, const char *id, bh_text *out)
{
    static const char *const before[] = {"id=\"", "xlink:href=\"#", "url(#", NULL};
    while (*s) {
        if (begins(s, " id=\"surface")) {
            s = strchr(s + strlen(" id=\""), '"') + 1;
            continue;
        }
        int i = 0;
        while (before[i] && !begins(s, before[i]))
            i++;
        if (before[i]) {
            bh_text_appendf(out, "%s%s", before[i], id);
            s += strlen(before[i]);
            continue;
        }
        if (*s >= '0' && *s <= '9') {
            s = number(s, out);
            continue;
        }
        size_t plain = 1;
        while (s[plain] && !strchr("ixu 0123456789", s[plain]))
            plain++;
        bh_text_append_bytes(out, s, plain);
        s += plain;
    }
}

/* Our own opening, for cairo's own says nothing to who cannot see. */
static void open_svg(const bh_figure *figure, const char *id, double wide, double high,
                     bh_text *out)
{
    bh_text_append(out, "<svg xmlns=\"http://www.w3.org/2000/svg\" "
                        "xmlns:xlink=\"http://www.w3.org/1999/xlink\" ");
    bh_text_appendf(out,
                    "width=\"%gpt\" height=\"%gpt\" viewBox=\"0 0 %g %g\" version=\"1.1\" "
                    "role=\"img\" aria-labelledby=\"%stitle %sdesc\">\n",
                    wide, high, wide, high, id, id);
    bh_text_appendf(out, "<title id=\"%stitle\">", id);
    escaped(figure->title[0] ? figure->title : figure->y.words, out);
    bh_text_appendf(out, "</title>\n<desc id=\"%sdesc\">", id);
    escaped(figure->description, out);
    bh_text_append(out, "</desc>\n");
}

static bh_code to_svg(const bh_figure *figure, const char *id, bh_text *out, bh_error *err)
{
    double wide = 0.0, high = 0.0;
    bh_text drawn = {0};
    bh_code bad = bh_figure_size(figure, &wide, &high, err);
    if (bad)
        return bad;
    cairo_surface_t *s = cairo_svg_surface_create_for_stream(collect, &drawn, wide, high);
    cairo_svg_surface_restrict_to_version(s, CAIRO_SVG_VERSION_1_1);
    bad = finish(s, draw(figure, s, 1.0, err), err);
    /* behind <?xml ...?> and <svg ...> */
    const char *body = bad || !drawn.bytes ? NULL : strstr(drawn.bytes, "<svg");
    body = body ? strchr(body, '>') : NULL;
    if (!bad && !body)
        bad = no_memory(err);
    if (!bad && body) {
        open_svg(figure, id, wide, high, out);
        rename_ids(body + 1 + (body[1] == '\n'), id, out);
        bad = out->failed ? no_memory(err) : BH_OK;
    }
    bh_text_free(&drawn);
    return bad;
}

bh_code bh_figure_inline(const bh_figure *figure, const char *id, bh_text *out, bh_error *err)
{
    return to_svg(figure, id, out, err);
}

bh_code bh_figure_write(const bh_figure *figure, bh_figure_format format, bh_text *out,
                        bh_error *err)
{
    double wide = 0.0, high = 0.0;
    if (format == BH_FIGURE_SVG) {
        bh_text_append(out, "<?xml version=\"1.0\" encoding=\"UTF-8\"?>\n");
        return to_svg(figure, "", out, err);
    }
    const bh_code bad = bh_figure_size(figure, &wide, &high, err);
    if (bad)
        return bad;
    return format == BH_FIGURE_PDF ? to_pdf(figure, wide, high, out, err)
                                   : to_png(figure, wide, high, out, err);
}
