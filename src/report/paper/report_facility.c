/* report_facility.c - what the forms of a facility ask for, and what should be thought of. */
#include <math.h>
#include <string.h>

#include "beamhours/matter/radiation_length.h"
#include "beamhours/rates/counting.h"
#include "beamhours/report/reporting.h"
#include "beamhours/run/beam_power.h"

#define COUNT(list) (sizeof(list) / sizeof(list)[0])

static bool same_beam(const bh_setting *a, const bh_setting *b)
{
    return strcmp(a->beam.particle.name, b->beam.particle.name) == 0 && a->target == b->target &&
           !(fabs(a->beam.kinetic_energy.value - b->beam.kinetic_energy.value) > 0.0) &&
           !(fabs(a->beam.current.value - b->beam.current.value) > 0.0);
}

/* One line for each particle, energy, current and target, its hours summed; false where an earlier
 * setting has said it. */
static bool beam(bh_reporting *x, size_t setting)
{
    const bh_setting *s = &x->plan->settings[setting];
    double hours = 0.0;
    for (size_t i = 0; i < x->plan->setting_count; i++) {
        if (!same_beam(s, &x->plan->settings[i]))
            continue;
        if (i < setting)
            return false;
        hours += x->hours[i].full + x->hours[i].empty;
    }
    bh_text power = {0};
    bh_power_append(&power, bh_beam_power(&s->beam));
    bh_paper_cell(&x->w, s->beam.particle.name);
    bh_paper_cell(&x->w, bh_report_number(x, s->beam.kinetic_energy.value, 5));
    bh_paper_cell(&x->w, bh_report_number(x, s->beam.current.value * 1e6, 4));
    bh_paper_cell(&x->w, bh_report_number(x, s->beam.particle_rate.value, 4));
    bh_paper_cell(&x->w, bh_paper_keep(&x->w, &power));
    bh_paper_cell(&x->w, s->target->name.text ? s->target->name.text : "-");
    bh_paper_cell(&x->w, bh_report_hours(x, hours));
    bh_paper_cell(&x->w,
                  bh_report_number(x, bh_counting_charge(s->beam.current.value, hours) * 1e3, 4));
    return true;
}

static void beams(bh_reporting *x)
{
    static const bh_paper_column columns[] = {
        {"particle", "", false},      {"kinetic energy", "MeV", true},
        {"current", "uA", true},      {"particles", "1/s", true},
        {"power", "", false},         {"target", "", false},
        {"hours of data", "h", true}, {"charge", "mC", true}};
    bh_paper_table_open(&x->w,
                        "Beams: mean electrical current and particles of all kinds; hours on full "
                        "and empty target, tasks with beam not among them",
                        columns, COUNT(columns));
    for (size_t i = 0; i < x->plan->setting_count; i++)
        (void)beam(x, i);
    bh_paper_table_close(&x->w);
}

static bool loses_density(const bh_plan *plan)
{
    for (size_t i = 0; i < plan->target_count; i++)
        for (size_t k = 0; k < plan->targets[i].layer_count; k++)
            if (plan->targets[i].layers[k].density_loss.value > 0.0)
                return true;
    return false;
}

static void layer(bh_reporting *x, const char *target, const bh_layer *l, const char *role)
{
    const double areal = l->areal_density.value;
    const bool matter = areal > 0.0;
    const double length = matter ? bh_radiation_length_of(l->material).value : (double)NAN;
    bh_paper_cell(&x->w, target);
    bh_paper_cell(&x->w, l->material->name);
    bh_paper_cell(&x->w, role);
    bh_paper_cell(&x->w, bh_report_number(x, l->thickness.value * 10.0, 4));
    bh_paper_cell(&x->w, matter ? bh_report_number(x, l->density.value, 4) : "-");
    bh_paper_cell(&x->w, matter ? bh_report_number(x, areal * 1e3, 4) : "-");
    bh_paper_cell(&x->w, matter ? bh_report_percent(x, areal / length) : "-");
    if (loses_density(x->plan))
        bh_paper_cell(&x->w, bh_report_number(x, l->density_loss.value * 100.0 / 1e6, 3));
    bh_text hazards = {0};
    for (size_t i = 0; i < l->material->hazard_count; i++)
        bh_text_appendf(&hazards, "%s%s", i ? ", " : "", l->material->hazards[i]);
    bh_paper_cell(&x->w, bh_paper_keep(&x->w, &hazards));
}

static void targets(bh_reporting *x)
{
    static const bh_paper_column columns[] = {{"target", "", false},
                                              {"material", "", false},
                                              {"role", "", false},
                                              {"thickness", "mm", true},
                                              {"density", "g/cm3", true},
                                              {"areal density", "mg/cm2", true},
                                              {"radiation lengths", "%", true},
                                              {"density lost", "%/uA", true},
                                              {"hazards noted", "", false}};
    bh_paper_column chosen[COUNT(columns)];
    size_t n = 0;
    for (size_t c = 0; c < COUNT(columns); c++)
        if (strcmp(columns[c].heading, "density lost") != 0 || loses_density(x->plan))
            chosen[n++] = columns[c];
    static const char *const roles[] = {"sample", "window", "backing"};
    bh_paper_table_open(&x->w,
                        "Targets: layers in the order the beam meets them, along the beam at no "
                        "tilt, without beam; rates have the density that the beam leaves",
                        chosen, n);
    for (size_t i = 0; i < x->plan->target_count; i++) {
        const bh_target *t = &x->plan->targets[i];
        const char *name = t->name.text ? t->name.text : "-";
        for (size_t k = 0; k < t->layer_count; k++)
            layer(x, name, &t->layers[k], roles[t->layers[k].role]);
        if (t->has_wall)
            layer(x, name, &t->wall, "wall");
    }
    bh_paper_table_close(&x->w);
}

void bh_report_facility(bh_reporting *x)
{
    bh_paper_add(&x->w, BH_BLOCK_SECTION, "Beam and radiation inputs");
    bh_paper_add(&x->w, BH_BLOCK_WORDS,
                 "What forms of a facility ask for. No shielding, dose or activation is computed "
                 "here: the facility's radiation-protection group, its rules and licensed practice "
                 "decide.");
    beams(x);
    targets(x);
}

void bh_report_cautions(bh_reporting *x)
{
    const bh_diags *said = bh_table_warnings(x->table);
    bh_paper_add(&x->w, BH_BLOCK_SECTION, "Cautions and warnings");
    for (size_t i = 0; i < bh_table_cautions(x->table); i++)
        bh_paper_add(&x->w, BH_BLOCK_CAUTION, bh_table_caution(x->table, i)->text);
    for (size_t i = 0; i < bh_diags_count(said); i++) {
        const bh_diag *d = bh_diags_at(said, i);
        bh_paper_add(&x->w, BH_BLOCK_ITEM,
                     bh_paper_text(&x->w, "%s (line %d): %s", d->key, d->at.line, d->text));
    }
}
