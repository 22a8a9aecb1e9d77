/* collect_common.c - what collecting uncertainties has in common. */
#include <math.h>

#include "beamhours/run/collecting.h"

double bh_collect_relative(const bh_value *v)
{
    return v->value != 0 ? v->uncertainty / fabs(v->value) : 0;
}

static bool same_place(bh_mark a, bh_mark b)
{
    return a.line == b.line && a.column == b.column;
}

/* The words in one, cut where there is no more room; made for every value of every arm. */
static const char *joined(const char *const *words, char key[BH_CAUSE_KEY])
{
    size_t used = 0;
    for (; *words; words++)
        for (const char *c = *words; *c && used < BH_CAUSE_KEY - 1; c++)
            key[used++] = *c;
    key[used] = '\0';
    return key;
}

const char *bh_collect_beam_key(const bh_collecting *c, bh_mark at, const char *member,
                                char key[BH_CAUSE_KEY])
{
    const bh_beam *all = &c->yielder->plan->beam;
    const bh_mark marks[] = {all->current.at,  all->particle_rate.at,   all->energy_written.at,
                             all->fraction.at, all->momentum_spread.at, all->duty_factor.at};
    bool common = false;
    for (size_t i = 0; i < sizeof marks / sizeof marks[0]; i++)
        common = common || same_place(marks[i], at);
    for (size_t i = 0; i < all->other_count; i++)
        common = common || same_place(all->others[i].share.at, at);
    return common ? joined((const char *[]){"beam.", member, NULL}, key)
                  : joined((const char *[]){"settings.", c->setting->name, ".beam.", member, NULL},
                           key);
}

const char *bh_collect_arm_key(const bh_collecting *c, const char *member, char key[BH_CAUSE_KEY])
{
    const char *name = c->plan->arm.name.text;
    return joined((const char *[]){"arms.", name ? name : "", ".", member, NULL}, key);
}

const char *bh_collect_setting_key(const bh_collecting *c, const char *member,
                                   char key[BH_CAUSE_KEY])
{
    return joined((const char *[]){"settings.", c->setting->name, ".", member, NULL}, key);
}

bh_cause bh_collect_cause(bh_cause_kind kind, bh_mark at, const char *key)
{
    return (bh_cause){.kind = kind, .at = at, .key = key};
}

void bh_collect_sensitive(bh_collecting *c, const bh_cause *cause, ptrdiff_t sensitivity, double by)
{
    const bh_part *part = c->arm->yield->part;
    double *to = by != 0 && isfinite(by) ? bh_collect(c, cause, 0) : NULL;
    for (size_t i = 0; to && i < c->parts; i++) {
        const double slope =
            *(const double *)(const void *)((const unsigned char *)&part[i] + sensitivity);
        to[i] += isfinite(slope) ? slope * by : 0;
    }
}

void bh_collect_moved(bh_collecting *c, const bh_cause *cause, bh_moved *m, double least)
{
    const double at = m->value->value, sigma = m->value->uncertainty;
    const double low = fmax(at - sigma, least), high = at + sigma;
    double *const *signal = c->with->signals;
    m->value->value = low;
    bh_collect_signals(c, &m->setting, &m->arm, signal[0]);
    m->value->value = high;
    bh_collect_signals(c, &m->setting, &m->arm, signal[1]);
    double *to = bh_collect(c, cause, 0);
    for (size_t i = 0; to && i < c->parts; i++) {
        const double usual = c->arm->yield->part[i].signal;
        to[i] += usual > 0 ? (signal[1][i] - signal[0][i]) / usual * sigma / (high - low) : 0;
    }
}

/* Thicker or thinner, a layer slows the beam down more or less. */
static bool layers_uncertain(const bh_target *target)
{
    for (size_t i = 0; i < target->layer_count; i++) {
        const bh_layer *l = &target->layers[i];
        const bh_value *values[] = {&l->areal_number, &l->density, &l->temperature, &l->pressure,
                                    &l->density_loss};
        for (size_t k = 0; k < sizeof values / sizeof values[0]; k++)
            if (values[k]->uncertainty > 0)
                return true;
    }
    return false;
}

bool bh_rests_on_changes(const bh_setting *setting, const bh_setting_arm *arm)
{
    return setting->beam.kinetic_energy.uncertainty > 0 || arm->angle.uncertainty > 0 ||
           arm->q2.uncertainty > 0 || arm->arm.pointing.uncertainty > 0 ||
           layers_uncertain(setting->target);
}
