/* curve_words.c - what is written around curves. */
#include "beamhours/report/curve_words.h"

#include <stdarg.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/physics/coulomb.h"
#include "beamhours/physics/structure.h"
#include "beamhours/units/constants.h"
#include "beamhours/units/nuclide.h"

void bh_figure_axis_words(const bh_figure_scale *scale, char *out, size_t size)
{
    (void)snprintf(out, size, scale->unit[0] ? "%s [%s]" : "%s", scale->words, scale->unit);
}

struct writer {
    const bh_curve_picture *p;
    bh_arena *arena;
    const bh_figure *out;
    size_t planned;
};

const char *bh_curve_say(bh_arena *arena, const char *fmt, ...)
{
    va_list args, again;
    va_start(args, fmt);
    va_copy(again, args);
    const int length = vsnprintf(NULL, 0, fmt, args);
    char *text = length < 0 ? NULL : bh_arena_take(arena, (size_t)length + 1, 1);
    if (text)
        (void)vsnprintf(text, (size_t)length + 1, fmt, again);
    va_end(again);
    va_end(args);
    return text ? text : "";
}

int bh_curve_variable(bh_against against)
{
    static const int columns[] = {BH_COL_ANGLE, BH_COL_BEAM_KINETIC, BH_COL_Q2, BH_COL_EPSILON};
    return columns[against];
}

/* A structure model made ready for what the curves strike: the most abundant isotope. */
static bh_structure *structure_of(const bh_curve_picture *p, const char *name)
{
    const bh_target *t = p->curves->setting->target;
    size_t count = 0;
    int a = t->scatterer_a;
    const bh_nuclide *all = a ? NULL : bh_element_isotopes(t->scatterer_z, &count);
    double most = -1.0;
    for (size_t i = 0; i < count; i++)
        if (all[i].abundance > most) {
            most = all[i].abundance;
            a = all[i].a;
        }
    const bh_plan *plan = bh_table_plan(p->table);
    return bh_structure_new(name ? name : bh_plan_structure(plan, t->scatterer_z, a),
                            t->scatterer_z, a, NULL);
}

const char *bh_curve_own_model(const bh_curve_picture *p, bh_arena *arena)
{
    bh_structure *s = structure_of(p, NULL);
    const char *name = s ? bh_curve_say(arena, "%s", bh_structure_name(s)) : "as planned";
    bh_structure_free(s);
    return name;
}

/* "kelly-2004: Kelly, Phys. Rev. C 70 (2004) 068202", and the Coulomb model behind it. */
static const char *with_sources(const bh_structure *s, const bh_coulomb *coulomb, bh_arena *arena)
{
    if (!coulomb)
        return bh_curve_say(arena, "%s: %s", bh_structure_name(s), bh_structure_source(s));
    return bh_curve_say(arena, "%s %s: %s; %s", bh_structure_name(s), coulomb->name,
                        bh_structure_source(s), coulomb->source);
}

/* The name of a curve is a structure model, a Coulomb model, or both with a blank between them. */
const char *bh_curve_legend(const bh_curve_picture *p, size_t k, bh_arena *arena)
{
    const char *name = p->curves->name[k] ? p->curves->name[k] : "";
    const size_t n = strcspn(name, " ");
    const bh_coulomb *coulomb = name[0] ? bh_coulomb_find(name[n] ? name + n + 1 : name) : NULL;
    if (coulomb && !name[n])
        return bh_curve_say(arena, "%s: %s", name, coulomb->source);
    bh_structure *s = structure_of(p, name[0] ? bh_curve_say(arena, "%.*s", (int)n, name) : NULL);
    const char *said = s ? with_sources(s, coulomb, arena) : "as planned";
    bh_structure_free(s);
    return said;
}

static const char *short_number(const struct writer *m, double value)
{
    char digits[BH_NUMBER_SIZE];
    double rounded = value;
    (void)bh_number_digits(value, 5, digits, sizeof digits);
    if (!bh_number_parse(digits, NULL, &rounded))
        (void)bh_number_print(rounded, digits, sizeof digits);
    return bh_curve_say(m->arena, "%s", digits);
}

/* What the curve keeps, behind the particle: ", 855 MeV", " at 30 deg", " at Q² 0.55 GeV²". */
static const char *kept(const struct writer *m)
{
    const bh_curves *c = m->p->curves;
    const bh_table *t = m->p->table;
    if (c->against == BH_AGAINST_ANGLE || c->against == BH_AGAINST_Q2)
        return bh_curve_say(m->arena, ", %s MeV",
                            short_number(m, c->setting->beam.kinetic_energy.value));
    if (c->against == BH_AGAINST_ENERGY)
        return c->arm->arm.shape == BH_SHAPE_RING
                   ? ""
                   : bh_curve_say(m->arena, ", %s deg",
                                  short_number(m, c->arm->angle.value / BH_DEGREE));
    if (c->arm->q2.given)
        return bh_curve_say(m->arena, ", Q² %.4g GeV²", c->arm->q2.value * 1e-6);
    for (size_t row = 0; row < bh_table_rows(t, false); row++) {
        const bh_place at = bh_table_place(t, false, row);
        const bh_setting *s = &bh_table_plan(t)->settings[at.setting];
        if (s == c->setting && &s->arms[at.arm] == c->arm)
            return bh_curve_say(m->arena, ", Q² %.4g GeV²",
                                bh_table_number(t, false, row, BH_COL_Q2));
    }
    return "";
}

/* "electron, 855 MeV on H, target cell; arm A; setting K1". */
static const char *subtitle(const struct writer *m)
{
    const bh_curves *c = m->p->curves;
    const bh_target *t = c->setting->target;
    const char *named = t->name.text ? t->name.text : t->scatterer.text;
    const bool other = strcmp(named, t->scatterer.text) != 0;
    return bh_curve_say(m->arena, "%s%s on %s%s%s; arm %s; setting %s",
                        c->setting->beam.particle.name, kept(m), t->scatterer.text,
                        other ? ", target " : "", other ? named : "",
                        c->arm->arm.name.text ? c->arm->arm.name.text : "", c->setting->name);
}

/* What is drawn, for who cannot see it. */
static const char *description(const struct writer *m)
{
    const bh_figure *f = m->out;
    char x[200], y[200];
    bh_text lines = {0};
    bh_figure_axis_words(&f->x, x, sizeof x);
    bh_figure_axis_words(&f->y, y, sizeof y);
    for (size_t s = 0; s < f->series_count; s++)
        if (f->series[s].kind == BH_SERIES_LINE)
            bh_text_appendf(&lines, "%s%s", lines.length ? "; " : "; curves: ", f->series[s].name);
    const char *below = f->below
                            ? bh_curve_say(m->arena, "; below it the %s, from %s to %s",
                                           f->below->title, short_number(m, f->below->y.axis.from),
                                           short_number(m, f->below->y.axis.to))
                            : "";
    const char *said = bh_curve_say(
        m->arena, "%s against %s, from %s to %s%s; %zu planned and %zu published points%s. %s.", y,
        x, short_number(m, f->x.axis.from), short_number(m, f->x.axis.to),
        lines.bytes ? lines.bytes : "", m->planned,
        m->p->measured ? m->p->measured->count : (size_t)0, below, f->subtitle);
    bh_text_free(&lines);
    return said;
}

/* Whether a curve over the first ends where its model is no longer known. */
static bool some_end(const bh_curves *curves)
{
    for (size_t k = 1; k < curves->count; k++)
        for (size_t i = 0; i < bh_curve_count(curves->curve[k]); i++)
            if (!bh_curve_inside(curves->curve[k], i))
                return true;
    return false;
}

void bh_curve_words(const bh_curve_picture *picture, size_t planned, bh_arena *arena,
                    bh_figure *out)
{
    const struct writer m = {picture, arena, out, planned};
    const bh_plan *plan = bh_table_plan(picture->table);
    const char *meaning = picture->shown == BH_SHOWN_MERIT ? bh_shown_words(picture->shown)
                                                           : bh_column_at(picture->shown)->meaning;
    out->title = plan->title.text ? plan->title.text : "";
    out->subtitle = subtitle(&m);
    out->foot =
        picture->version
            ? bh_curve_say(arena, "%s: %s.%s beamhours %s", bh_shown_key(picture->shown), meaning,
                           some_end(picture->curves)
                               ? " Curves over the first end where the data of their "
                                 "model do."
                               : "",
                           picture->version)
            : "";
    out->description = description(&m);
}
