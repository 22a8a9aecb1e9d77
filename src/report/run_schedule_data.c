/* run_schedule_data.c - the schedule for other programs: CSV and JSON. */
#include <json-c/json.h>
#include <math.h>

#include "beamhours/report/csv.h"
#include "beamhours/report/json_parts.h"
#include "beamhours/report/run_schedule.h"
#include "beamhours/report/wall_clock.h"

static bool on_target(const bh_run_line *line)
{
    return line->span->kind == BH_SPAN_DATA || line->span->kind == BH_SPAN_EMPTY;
}

/* --- CSV --- */

struct csv {
    const bh_run_schedule *s;
    bh_text *out;
};

static void number(bh_text *out, double value)
{
    bh_text_append(out, ",");
    if (isfinite(value))
        bh_text_append_number(out, value);
}

static void word(bh_text *out, const char *text)
{
    bh_text_append(out, ",");
    bh_csv_field(out, text ? text : "");
}

static void csv_line(void *to, const bh_run_line *line)
{
    const struct csv *c = to;
    const bh_run_values v = bh_run_values_of(c->s, line);
    char wall[BH_WALL_SIZE] = "";
    bh_text words = {0};
    if (c->s->has_start)
        bh_wall_print(c->s->start, line->span->begin, wall);
    bh_run_words(c->s, line, &words);
    bh_text_append(c->out, wall);
    number(c->out, line->span->begin);
    word(c->out, bh_span_name(line->span->kind));
    word(c->out, words.bytes);
    word(c->out, line->setting ? line->setting->name : "");
    word(c->out, line->setting ? line->setting->beam.particle.name : "");
    number(c->out, v.energy);
    number(c->out, v.current);
    word(c->out, line->setting ? line->setting->target->name.text : "");
    word(c->out, on_target(line) ? bh_table_text(c->s->table, false, line->row, BH_COL_ARM) : "");
    number(c->out, v.angle);
    number(c->out, v.momentum);
    number(c->out, v.prescale > 0 ? v.prescale : (double)NAN);
    number(c->out, line->span->hours);
    number(c->out, line->span->clock);
    number(c->out, v.charge);
    number(c->out, v.counts);
    bh_text_append(c->out, "\r\n");
    c->out->failed |= words.failed;
    bh_text_free(&words);
}

void bh_run_schedule_csv(const bh_run_schedule *s, bh_text *out)
{
    struct csv c = {s, out};
    bh_text_append(out, "begins,begin_h,kind,to_do,setting,particle,beam_kinetic_MeV,current_uA,"
                        "target,arm,angle_deg,"
                        "central_momentum_MeV_per_c,prescale,hours,clock_hours,charge_mC,"
                        "counts\r\n");
    bh_run_lines(s, csv_line, &c);
}

/* --- JSON --- */

struct json {
    const bh_run_schedule *s;
    json_object *spans, *span, *arms; /* all; the one being filled, and its arms */
};

static void put(json_object *to, const char *key, json_object *value)
{
    (void)json_object_object_add(to, key, value);
}

static json_object *text_or_null(const char *text)
{
    return text ? json_object_new_string(text) : NULL;
}

static void begin_span(struct json *j, const bh_run_line *line)
{
    bh_text words = {0};
    j->span = json_object_new_object();
    j->arms = json_object_new_array();
    if (j->s->has_start) {
        char wall[BH_WALL_SIZE];
        bh_wall_print(j->s->start, line->span->begin, wall);
        put(j->span, "begins", json_object_new_string(wall));
    }
    bh_run_words(j->s, line, &words);
    put(j->span, "begin_h", bh_json_number(line->span->begin));
    put(j->span, "kind", text_or_null(bh_span_name(line->span->kind)));
    put(j->span, "to_do", text_or_null(words.bytes));
    put(j->span, "setting", text_or_null(line->setting ? line->setting->name : NULL));
    put(j->span, "particle",
        text_or_null(line->setting ? line->setting->beam.particle.name : NULL));
    put(j->span, "beam_kinetic_MeV", bh_json_number(bh_run_values_of(j->s, line).energy));
    put(j->span, "current_uA", bh_json_number(bh_run_values_of(j->s, line).current));
    put(j->span, "target", text_or_null(line->setting ? line->setting->target->name.text : NULL));
    put(j->span, "hours", bh_json_number(line->span->hours));
    put(j->span, "clock_hours", bh_json_number(line->span->clock));
    put(j->span, "arms", j->arms);
    (void)json_object_array_add(j->spans, j->span);
    bh_text_free(&words);
}

static void json_line(void *to, const bh_run_line *line)
{
    struct json *j = to;
    if (line->first)
        begin_span(j, line);
    if (!on_target(line))
        return;
    const bh_run_values v = bh_run_values_of(j->s, line);
    json_object *arm = json_object_new_object();
    put(arm, "arm", text_or_null(bh_table_text(j->s->table, false, line->row, BH_COL_ARM)));
    put(arm, "angle_deg", bh_json_number(v.angle));
    put(arm, "central_momentum_MeV_per_c", bh_json_number(v.momentum));
    put(arm, "prescale", v.prescale > 0 ? json_object_new_int(v.prescale) : NULL);
    put(arm, "charge_mC", bh_json_number(v.charge));
    put(arm, "counts", bh_json_number(v.counts));
    (void)json_object_array_add(j->arms, arm);
}

bh_code bh_run_schedule_json(const bh_run_schedule *s, bh_text *out)
{
    json_object *object = json_object_new_object();
    struct json j = {.s = s, .spans = json_object_new_array()};
    bh_run_lines(s, json_line, &j);
    put(object, "schedule", j.spans);
    put(object, "totals", bh_json_totals(bh_table_totals(s->table)));
    bh_json_said(object, s->table, s->version);
    return bh_json_finish(object, out);
}
