/* explain_text.c - name, value and place on one line; how and whence below it, indented. */
#include "beamhours/report/explain_text.h"

#include <stdio.h>
#include <string.h>

#include "beamhours/report/text_table.h"

enum { NAME = 34, VALUE = 22 };

static void below(const char *lead, const char *text, int width, bh_text *out)
{
    if (text && text[0])
        bh_report_wrapped(lead, text, width, out);
}

/* "line 14, column 12" of "plan.yaml:14:12": the heading names the file; "--with 2" of a change. */
static const char *place(const char *source, char *out, size_t size)
{
    const char *column = strrchr(source, ':'), *line = column;
    while (line && line > source && line[-1] != ':')
        line--;
    if (strncmp(source, "--with", 6) == 0)
        (void)snprintf(out, size, "%.*s", (int)strcspn(source, ":"), source);
    else if (column && line > source)
        (void)snprintf(out, size, "line %.*s, column %s", (int)(column - line), line, column + 1);
    else
        (void)snprintf(out, size, "%s", source);
    return out;
}

static int cells_wide(const char *text)
{
    int n = 0;
    for (; *text; text++)
        n += ((unsigned char)*text & 0xC0) != 0x80;
    return n;
}

static bool stands_in_plan(const bh_line *line)
{
    return line->source && (line->kind == BH_LINE_INPUT || line->kind == BH_LINE_DEFAULT);
}

static void named(const bh_line *line, int width, bh_text *out)
{
    const char *value = line->value ? line->value : "", *source = line->source;
    char lead[NAME + 8];
    const bool wide = strlen(line->name) >= NAME;
    (void)snprintf(lead, sizeof lead, wide ? "  " : "  %-*s ", NAME, line->name);
    bh_text first = {0};
    if (wide)
        bh_text_appendf(&first, "%s  %s", line->name, value);
    else
        bh_text_append(&first, value);
    if (stands_in_plan(line)) {
        char where[160];
        const int blanks = VALUE - cells_wide(value);
        bh_text_appendf(&first, "%*s%s", blanks > 2 ? blanks : 2, "",
                        place(source, where, sizeof where));
        source = NULL;
    } else if (source && !line->formula && !line->remark) {
        bh_text_appendf(&first, "  %s", source);
        source = NULL;
    }
    if (first.length)
        bh_report_wrapped(lead, first.bytes, width, out);
    else
        bh_text_appendf(out, "%s\n", lead);
    out->failed |= first.failed;
    bh_text_free(&first);
    below("      = ", line->formula, width, out);
    below("      ", line->remark, width, out);
    below("      source: ", source, width, out);
}

void bh_report_explanation(const bh_explanation *explanation, int width, bh_text *out)
{
    const int wide = width > 80 ? width : 80;
    for (size_t i = 0; i < bh_explanation_lines(explanation); i++) {
        const bh_line *line = bh_explanation_line(explanation, i);
        if (line->kind == BH_LINE_SECTION)
            bh_text_appendf(out, "%s%s\n", i ? "\n" : "", line->name);
        else if (line->kind == BH_LINE_NOTE)
            below("  ", line->remark ? line->remark : line->name, wide, out);
        else
            named(line, wide, out);
    }
}
