/* paper_html.c - one page of HTML that is also XML: landmarks, captions, headings of rows and
 * columns; a few lines of script sort tables, and nothing is fetched from anywhere. */
#include "beamhours/report/paper.h"
#include "beamhours/report/power.h"

#include <stdio.h>
#include <stdlib.h>
#include <string.h>

/* Contrast of every pair of colours is above 7 to 1. */
static const char style[] =
    "body{font:16px/1.5 \"DejaVu Sans\",Verdana,sans-serif;color:#1a1a1a;background:#fff;"
    "max-width:72rem;margin:0 auto;padding:0 1rem}\n"
    "h1{font-size:1.7rem;line-height:1.25}h2{font-size:1.25rem;border-bottom:1px solid #555;"
    "margin-top:2.2rem}\n"
    "sup{line-height:0}a{color:#003a75}a:focus,button:focus{outline:3px solid "
    "#003a75;outline-offset:2px}\n"
    ".wide{overflow-x:auto}table{border-collapse:collapse;margin:1rem 0;font-size:.85rem;"
    "font-variant-numeric:tabular-nums}\n"
    "caption{text-align:left;font-weight:bold;padding:.3rem 0}\n"
    "th,td{padding:.2rem .6rem;text-align:left;vertical-align:top}th{font-weight:bold}\n"
    ".rows tbody th{white-space:nowrap}tbody th{font-weight:normal}.n{text-align:right}thead "
    "th{vertical-align:bottom;"
    "border-top:2px solid #1a1a1a;border-bottom:1px solid #1a1a1a}\n"
    "tbody tr:last-child>*{border-bottom:2px solid #1a1a1a}tbody tr:nth-child(even){"
    "background:#f2f2f2}\n"
    "th button{font:inherit;color:inherit;background:none;border:0;padding:0;text-align:inherit;"
    "cursor:pointer}\n"
    "th[aria-sort=ascending] button::after{content:\" \\2191\"}"
    "th[aria-sort=descending] button::after{content:\" \\2193\"}\n"
    ".caution{border-left:.4rem solid #8a1c00;background:#fff4ef;padding:.5rem 1rem}\n"
    "figure{margin:1.5rem 0}figure svg{max-width:100%;height:auto}figcaption{font-size:.9rem}\n"
    "@media print{nav{display:none}body{font-size:10pt}h2{break-after:avoid}"
    "figure,tr,.wide{break-inside:avoid}.wide{overflow:visible}"
    "th button{display:contents}}\n";

/* Buttons appear only where the script runs: without it headings are plain words. */
static const char script[] =
    "document.querySelectorAll('table').forEach(function(t){\n"
    " var body=t.tBodies[0],heads=Array.from(t.tHead.rows[0].cells);\n"
    " heads.forEach(function(h,c){\n"
    "  var b=document.createElement('button');b.type='button';b.title='sort by this column';\n"
    "  while(h.firstChild){b.appendChild(h.firstChild);}\n"
    "  h.appendChild(b);\n"
    "  b.addEventListener('click',function(){\n"
    "   var up=h.getAttribute('aria-sort')!=='ascending',number=h.className==='n';\n"
    "   var value=function(r){var d=r.cells[c],s=d.dataset.sort||d.textContent,x=parseFloat(s);\n"
    "    return number?(isNaN(x)?Infinity:x):s;};\n"
    "   var order=function(p,q){var a=value(p),b=value(q);\n"
    "    return number?(a===b?0:a-b):a.localeCompare(b,undefined,{numeric:true});};\n"
    "   Array.from(body.rows).sort(function(p,q){return up?order(p,q):order(q,p);})\n"
    "    .forEach(function(r){body.appendChild(r);});\n"
    "   heads.forEach(function(o){o.removeAttribute('aria-sort');});\n"
    "   h.setAttribute('aria-sort',up?'ascending':'descending');\n"
    "  });\n"
    " });\n"
    "});\n";

static void escaped_part(const char *s, size_t length, bh_text *out)
{
    for (const char *end = s + length; s < end; s++)
        switch (*s) {
        case '<':
            bh_text_append(out, "&lt;");
            break;
        case '>':
            bh_text_append(out, "&gt;");
            break;
        case '&':
            bh_text_append(out, "&amp;");
            break;
        case '"':
            bh_text_append(out, "&quot;");
            break;
        default:
            bh_text_append_bytes(out, s, 1);
        }
}

static void escaped(const char *s, bh_text *out)
{
    escaped_part(s, strlen(s), out);
}

static void within(const char *before, const char *text, const char *behind, bh_text *out)
{
    bh_text_append(out, before);
    escaped(text, out);
    bh_text_append(out, behind);
}

static void open_page(const bh_paper *paper, bh_page page, bh_text *out)
{
    bh_text_append(out, "<!DOCTYPE html>\n"
                        "<html lang=\"en\">\n<head>\n<meta charset=\"utf-8\"/>\n"
                        "<meta name=\"viewport\" content=\"width=device-width, "
                        "initial-scale=1\"/>\n<meta name=\"generator\" content=\"beamhours ");
    within("", paper->version, "\"/>\n", out);
    within("<title>", paper->title, "</title>\n<style>\n", out);
    bh_text_appendf(out, "%s@page{size:%s;margin:18mm}\n</style>\n</head>\n<body>\n", style,
                    page == BH_PAGE_A4 ? "A4" : "letter");
    within("<header>\n<h1>", paper->title, "</h1>\n</header>\n", out);
}

static void contents(const bh_paper *paper, bh_text *out)
{
    bh_text_append(out, "<nav aria-label=\"Contents\">\n<ol>\n");
    for (size_t i = 0; i < paper->count; i++) {
        const bh_block *b = &paper->blocks[i];
        if (b->kind != BH_BLOCK_SECTION)
            continue;
        bh_text_appendf(out, "<li><a href=\"#s%d\">", b->number);
        within("", b->text, "</a></li>\n", out);
    }
    bh_text_append(out, "</ol>\n</nav>\n<main>\n");
}

static void heading_cell(const bh_paper_column *c, bh_text *out)
{
    bh_text_appendf(out, "<th scope=\"col\"%s>", c->number ? " class=\"n\"" : "");
    escaped(c->heading, out);
    if (c->unit[0])
        within("<br/>(", c->unit, ")", out);
    bh_text_append(out, "</th>");
}

static void raised(const char *factor, size_t length, int power, bh_text *out)
{
    escaped_part(factor, length, out);
    bh_text_appendf(out, "&#160;×&#160;10<sup>%s%d</sup>", power < 0 ? "−" : "", abs(power));
}

/* A cell is sorted by what it says, or by its number where that is set with a power of ten. */
static void cell(const bh_paper_column *c, const char *text, const char *tag, bh_text *out)
{
    static const bh_power_style in_print = {escaped_part, raised};
    bh_power power;
    bh_text_appendf(out, "<%s%s", tag, c->number ? " class=\"n\"" : "");
    if (c->number && bh_power_find(text, &power))
        within(" data-sort=\"", text, "\"", out);
    bh_text_append(out, ">");
    bh_power_set(text, &in_print, out);
}

static void row(const bh_paper_table *t, size_t r, bh_text *out)
{
    bh_text_append(out, "<tr>");
    for (size_t c = 0; c < t->column_count; c++) {
        cell(&t->columns[c], t->cells[r * t->column_count + c], c ? "td" : "th scope=\"row\"", out);
        bh_text_append(out, c ? "</td>" : "</th>");
    }
    bh_text_append(out, "</tr>\n");
}

static void table(const bh_block *b, bh_text *out)
{
    const bh_paper_table *t = b->table;
    bh_text_appendf(out,
                    "<div class=\"wide\" role=\"region\" tabindex=\"0\" aria-label=\"Table %d\">\n"
                    "<table%s>\n<caption>Table %d. ",
                    b->number,
                    strcmp(t->columns[0].heading, "setting") == 0 ? " class=\"rows\"" : "",
                    b->number);
    within("", b->text, "</caption>\n<thead>\n<tr>", out);
    for (size_t c = 0; c < t->column_count; c++)
        heading_cell(&t->columns[c], out);
    bh_text_append(out, "</tr>\n</thead>\n<tbody>\n");
    for (size_t r = 0; r < t->row_count; r++)
        row(t, r, out);
    bh_text_append(out, "</tbody>\n</table>\n</div>\n");
}

static bh_code figure(const bh_block *b, bh_text *out, bh_error *err)
{
    char id[16];
    (void)snprintf(id, sizeof id, "f%d", b->number);
    bh_text_append(out, "<figure>\n");
    const bh_code bad = bh_figure_inline(b->figure, id, out, err);
    bh_text_appendf(out, "\n<figcaption>Figure %d. ", b->number);
    within("", b->text, "</figcaption>\n</figure>\n", out);
    return bad;
}

/* Lists are opened and closed where their kind begins and ends. */
static void list_edges(const bh_paper *paper, size_t i, bool before, bh_text *out)
{
    const bh_block_kind kind = paper->blocks[i].kind;
    const bool edge = before ? i == 0 || paper->blocks[i - 1].kind != kind
                             : i + 1 == paper->count || paper->blocks[i + 1].kind != kind;
    if (edge && kind == BH_BLOCK_ITEM)
        bh_text_append(out, before ? "<ul>\n" : "</ul>\n");
    if (edge && kind == BH_BLOCK_REFERENCE)
        bh_text_append(out, before ? "<ol>\n" : "</ol>\n");
}

static void section(const bh_block *b, bh_text *out)
{
    bh_text_appendf(out, "%s<section aria-labelledby=\"s%d\">\n<h2 id=\"s%d\">%d. ",
                    b->number > 1 ? "</section>\n" : "", b->number, b->number, b->number);
    within("", b->text, "</h2>\n", out);
}

static bh_code block(const bh_block *b, bh_text *out, bh_error *err)
{
    switch (b->kind) {
    case BH_BLOCK_SECTION:
        section(b, out);
        break;
    case BH_BLOCK_WORDS:
        within("<p>", b->text, "</p>\n", out);
        break;
    case BH_BLOCK_ITEM:
        within("<li>", b->text, "</li>\n", out);
        break;
    case BH_BLOCK_CAUTION:
        within("<p class=\"caution\"><strong>Caution.</strong> ", b->text, "</p>\n", out);
        break;
    case BH_BLOCK_TABLE:
        table(b, out);
        break;
    case BH_BLOCK_FIGURE:
        return figure(b, out, err);
    case BH_BLOCK_REFERENCE:
        bh_text_appendf(out, "<li id=\"r%d\">", b->number);
        within("", b->text, "</li>\n", out);
        break;
    }
    return BH_OK;
}

bh_code bh_paper_html(const bh_paper *paper, bh_page page, bh_text *out, bh_error *err)
{
    bh_code bad = BH_OK;
    open_page(paper, page, out);
    contents(paper, out);
    for (size_t i = 0; !bad && i < paper->count; i++) {
        list_edges(paper, i, true, out);
        bad = block(&paper->blocks[i], out, err);
        list_edges(paper, i, false, out);
    }
    within("</section>\n</main>\n<footer>\n<p>Made by beamhours ", paper->version,
           ". Everything needed to show this page is in it.</p>\n</footer>\n<script>\n", out);
    bh_text_appendf(out, "%s</script>\n</body>\n</html>\n", script);
    if (!bad && out->failed)
        bad = bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    return bad;
}
