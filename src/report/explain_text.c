/* explain_text.c - name and value on one line; how and whence below it, indented. */
#include "beamhours/report/explain_text.h"

#include <string.h>

#include "beamhours/report/text_table.h"

enum { NAME = 30 };

static void below(const char *lead, const char *text, int width, bh_text *out)
{
    if (text && text[0])
        bh_report_wrapped(lead, text, width, out);
}

static void named(const bh_line *line, int width, bh_text *out)
{
    const char *value = line->value ? line->value : "";
    if (strlen(line->name) < NAME)
        bh_text_appendf(out, "  %-*s %s\n", NAME, line->name, value);
    else
        bh_text_appendf(out, "  %s  %s\n", line->name, value);
    below("      = ", line->formula, width, out);
    below("      ", line->remark, width, out);
    below(line->kind == BH_LINE_INPUT ? "      at " : "      source: ", line->source, width, out);
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
