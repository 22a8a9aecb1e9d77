/* text_totals.c - the sum of time, line by line, and the cautions. */
#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/report/input_words.h"
#include "beamhours/report/text_table.h"
#include "beamhours/units/quantity.h"

enum { NAME = 14, VALUE = 6, BEHIND = 3 };

/* "74.19", "0.576": two decimals of an hour are half a minute, and nobody plans finer. */
void bh_hours_print(double hours, char out[BH_NUMBER_SIZE])
{
    double whole = 0.0;
    const double part = fabs(modf(round(hours * 100.0) / 100.0, &whole));
    if (hours > 0.0 && hours < 1.0)
        (void)bh_number_digits(hours, 3, out, BH_NUMBER_SIZE);
    else
        (void)snprintf(out, BH_NUMBER_SIZE, "%s%.0f.%02d", hours < 0.0 && !(whole < 0.0) ? "-" : "",
                       fabs(whole) > 0.0 ? whole : 0.0, (int)lround(part * 100.0));
}

/* Decimal points stand below each other. */
static void row(const char *name, double hours, const char *remark, int width, bh_text *out)
{
    char number[BH_NUMBER_SIZE];
    bh_text lead = {0};
    if (!isfinite(hours))
        return;
    bh_hours_print(hours, number);
    const int before = (int)strcspn(number, ".");
    bh_text_appendf(&lead, "  %-*s%*.*s%s", NAME, name, VALUE, before, number, number + before);
    if (remark[0]) {
        const int behind = (int)strlen(number) - before;
        bh_text_appendf(&lead, "%*s", behind > BEHIND + 1 ? 2 : BEHIND + 3 - behind, "");
        bh_report_wrapped(lead.bytes ? lead.bytes : "", remark, width, out);
    } else {
        bh_text_appendf(out, "%s\n", lead.bytes ? lead.bytes : "");
    }
    out->failed |= lead.failed;
    bh_text_free(&lead);
}

static void share(bh_text *to, const char *lead, double value)
{
    char word[64];
    const bh_quantity q = {value, 0.0, false, false};
    if (bh_quantity_print(&q, BH_DIM_SHARE, word, sizeof word) > 0)
        bh_text_appendf(to, "%s%s", lead, word);
}

static void asked_remark(const bh_table *table, bh_text *to)
{
    const bh_totals *t = bh_table_totals(table);
    const bh_schedule *s = &bh_table_plan(table)->schedule;
    char number[BH_NUMBER_SIZE];
    (void)bh_number_digits(t->asked_hours / 24.0, 3, number, sizeof number);
    bh_text_appendf(to, "= %s d", number);
    (void)bh_number_digits(t->shifts, 3, number, sizeof number);
    bh_text_appendf(to, " = %s shifts of ", number);
    bh_text_append_number(to, s->shift.value / 3600.0);
    (void)bh_number_digits(t->weeks, 3, number, sizeof number);
    bh_text_appendf(to, " h = %s weeks of ", number);
    bh_text_append_number(to, s->week.value / 3600.0);
    bh_text_append(to, " h");
}

static void with_remark(const char *name, double hours, bh_text *remark, int width, bh_text *out)
{
    row(name, hours, remark->bytes ? remark->bytes : "", width, out);
    out->failed |= remark->failed;
    bh_text_free(remark);
}

void bh_report_text_totals(const bh_table *table, int width, bh_text *out)
{
    const bh_totals *t = bh_table_totals(table);
    const bh_schedule *s = &bh_table_plan(table)->schedule;
    bh_text remark = {0};
    bh_text_appendf(out, "time%*s\n", NAME + VALUE - 2, "h");
    row("data", t->data_hours, "full target", width, out);
    row("empty target", t->empty_hours, "", width, out);
    row("tasks", t->task_hours, "with beam", width, out);
    row("beam hours", t->beam_hours, "", width, out);
    row("changes", t->change_hours, "start-up, changes, tasks without beam", width, out);
    share(&remark, "= beam hours / ", s->availability.value);
    bh_text_append(&remark, " + changes");
    with_remark("scheduled", t->scheduled_hours, &remark, width, out);
    share(&remark, "", s->contingency.value);
    bh_text_append(&remark, " of scheduled");
    with_remark("contingency", t->contingency_hours, &remark, width, out);
    asked_remark(table, &remark);
    with_remark("asked", t->asked_hours, &remark, width, out);
    row("available", t->available_hours,
        s->available_is_beam ? "hours of beam: compared with beam hours" : "calendar", width, out);
    row("spare", t->spare_hours, t->spare_hours < 0.0 ? "more is asked than is available" : "",
        width, out);
    if (t->note)
        bh_report_wrapped("  ", t->note, width, out);
}

/* Where its lead leaves no room a sentence gets so many cells: lines are then too long. */
enum { LEAST_ROOM = 20 };

/* The length of the piece of `s` that fits into `room` cells, cut at a blank where there is one. */
static size_t fitting(const char *s, int room)
{
    size_t i = 0, blank = 0;
    int cells = 0;
    for (; s[i] && s[i] != '\n'; i++) {
        if (s[i] == ' ')
            blank = i;
        if (((unsigned char)s[i] & 0xC0) != 0x80 && ++cells > room)
            return blank ? blank : i;
    }
    return i;
}

void bh_report_wrapped(const char *lead, const char *sentence, int width, bh_text *out)
{
    const int indent = (int)strlen(lead);
    bh_text_append(out, lead);
    for (const char *s = sentence; *s;) {
        const size_t n = fitting(s, width > indent ? width - indent : LEAST_ROOM);
        bh_text_append_bytes(out, s, n);
        bh_text_append(out, "\n");
        s += n;
        while (*s == ' ' || *s == '\n')
            s++;
        if (*s)
            bh_text_appendf(out, "%*s", indent, "");
    }
}

void bh_report_text_cautions(const bh_table *table, int width, bh_text *out)
{
    const char *note = NULL;
    for (size_t i = 0; (note = bh_table_note(table, i)); i++) {
        if (i == 0)
            bh_text_append(out, "\n");
        bh_report_wrapped("note    ", note, width, out);
    }
    for (size_t i = 0; i < bh_table_cautions(table); i++) {
        if (i == 0)
            bh_text_append(out, "\n");
        bh_report_wrapped("CAUTION ", bh_table_caution(table, i)->text, width, out);
    }
}
