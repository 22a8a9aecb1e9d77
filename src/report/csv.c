/* csv.c - numbers as the shortest text that reads back; an empty value is an empty field. */
#include "beamhours/report/csv.h"

#include <math.h>
#include <string.h>

void bh_csv_field(bh_text *out, const char *field)
{
    if (field[strcspn(field, ",\"\r\n")] == '\0') {
        bh_text_append(out, field);
        return;
    }
    bh_text_append(out, "\"");
    for (const char *c = field; *c; c++)
        bh_text_append_bytes(out, *c == '"' ? "\"\"" : c, *c == '"' ? 2 : 1);
    bh_text_append(out, "\"");
}

static void cell(const bh_selection *view, size_t i, int column, bh_text *out)
{
    const char *text = bh_selection_text(view, i, column);
    const double number = bh_selection_number(view, i, column);
    if (text)
        bh_csv_field(out, text);
    else if (isfinite(number))
        bh_text_append_number(out, number);
}

static bool shown(const bh_selection *view, int column)
{
    return column != BH_COL_BIN || view->bins;
}

/* The columns to write, in order: the chosen ones, else all. */
static size_t columns_of(const bh_selection *view, int ids[BH_COLUMN_COUNT])
{
    size_t n = view->column_count;
    memcpy(ids, view->columns, n * sizeof *ids);
    for (int id = 0; id < BH_COLUMN_COUNT && view->column_count == 0; id++)
        if (shown(view, id))
            ids[n++] = id;
    return n;
}

static void header(const bh_selection *view, const char *first, bh_text *out)
{
    int ids[BH_COLUMN_COUNT];
    const size_t n = columns_of(view, ids);
    bh_text_append(out, first);
    for (size_t i = 0; i < n; i++)
        bh_text_appendf(out, "%s%s", i || first[0] ? "," : "", bh_column_at(ids[i])->key);
    bh_text_append(out, "\r\n");
}

static void rows(const bh_selection *view, const char *first, bh_text *out)
{
    int ids[BH_COLUMN_COUNT];
    const size_t n = columns_of(view, ids);
    for (size_t row = 0; row < view->row_count; row++) {
        bh_text_append(out, first);
        for (size_t i = 0; i < n; i++) {
            bh_text_append(out, i || first[0] ? "," : "");
            cell(view, row, ids[i], out);
        }
        bh_text_append(out, "\r\n");
    }
}

void bh_report_csv(const bh_selection *view, bh_text *out)
{
    header(view, "", out);
    rows(view, "", out);
}

void bh_report_csv_against(const bh_selection *before, const bh_selection *after, bh_text *out)
{
    header(before, "state", out);
    rows(before, "before", out);
    rows(after, "after", out);
}
