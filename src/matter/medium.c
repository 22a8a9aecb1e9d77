/* medium.c - electrons of a material: how many, how bound, how they screen. */
#include "beamhours/matter/medium.h"

#include <math.h>

#include "beamhours/base/sentences.h"
#include "beamhours/units/constants.h"

static const double ln10 = 2.30258509299404568402;

/* [eV], Z = 1 .. 92 */
static const double excitation[] = {
    19.2, 41.8, 40,  63.7, 76,  78,  82,  95,  115, 137, 149, 156, 166, 173, 173, 180,
    174,  188,  190, 191,  216, 233, 245, 257, 272, 286, 297, 311, 322, 330, 334, 350,
    347,  348,  343, 352,  363, 366, 379, 393, 417, 424, 428, 441, 449, 470, 470, 469,
    488,  488,  487, 485,  491, 482, 488, 491, 501, 523, 535, 546, 560, 574, 580, 591,
    614,  628,  650, 658,  674, 684, 694, 705, 718, 727, 736, 746, 757, 790, 790, 800,
    810,  823,  823, 830,  825, 794, 827, 826, 841, 847, 878, 890};
enum { ELEMENTS = sizeof excitation / sizeof excitation[0] };

double bh_element_excitation(int z)
{
    return z >= 1 && z <= ELEMENTS ? excitation[z - 1] * 1e-6 : 0.0;
}

bool bh_particle_is_electron(const bh_particle *particle)
{
    return particle->kind == BH_KIND_LEPTON && particle->mass < 1.0;
}

bh_flight bh_flight_of(const bh_particle *particle, double kinetic)
{
    const double m = particle->mass;
    const double me = BH_MASS_ELECTRON;
    bh_flight f = {.gamma = 1.0 + kinetic / m};
    f.momentum = sqrt(kinetic * (kinetic + 2.0 * m));
    f.beta_gamma = f.momentum / m;
    f.beta = f.momentum / (kinetic + m);
    if (bh_particle_is_electron(particle))
        f.transfer = particle->charge < 0 ? 0.5 * kinetic : kinetic;
    else
        f.transfer = 2.0 * me * f.beta_gamma * f.beta_gamma /
                     (1.0 + 2.0 * f.gamma * me / m + (me / m) * (me / m));
    return f;
}

double bh_medium_density_effect(const bh_medium *medium, double beta_gamma)
{
    const bh_density_effect *e = &medium->effect;
    const double x = log10(beta_gamma);
    const double limit = 2.0 * ln10 * x - e->c;
    if (x >= e->x1)
        return limit;
    if (x >= e->x0)
        return limit + e->a * pow(e->x1 - x, e->k);
    return e->delta0 > 0.0 ? e->delta0 * pow(10.0, 2.0 * (x - e->x0)) : 0.0;
}

static bh_code add_element(bh_medium *out, const bh_constituent *part, bh_error *err)
{
    for (size_t i = 0; i < out->count; i++)
        if (out->elements[i].z == part->z) {
            out->elements[i].per_atom += part->per_atom;
            return BH_OK;
        }
    if (part->z < 1 || part->z > ELEMENTS)
        return bh_fail(err, BH_EDOMAIN, BH_SAY_STOPPING_ELEMENT, part->z, ELEMENTS);
    if (out->count == BH_MEDIUM_ELEMENTS)
        return bh_fail(err, BH_EDOMAIN, BH_SAY_STOPPING_ELEMENTS, BH_MEDIUM_ELEMENTS);
    out->elements[out->count++] = (bh_medium_element){part->z, part->per_atom};
    return BH_OK;
}

/* Bragg: the logarithm of I, weighted with the electrons. */
static double additive_excitation(const bh_medium *m)
{
    double electrons = 0.0;
    double sum = 0.0;
    for (size_t i = 0; i < m->count; i++) {
        const double share = m->elements[i].per_atom * m->elements[i].z;
        electrons += share;
        sum += share * log(bh_element_excitation(m->elements[i].z));
    }
    return exp(sum / electrons);
}

static double gas_x0(double c)
{
    static const double steps[][2] = {{10.0, 1.6}, {10.5, 1.7}, {11.0, 1.8}, {11.5, 1.9}};
    for (int i = 0; i < 4; i++)
        if (c < steps[i][0])
            return steps[i][1];
    return c < 13.804 ? 2.0 : 0.326 * c - 2.5;
}

/* The general rule of Sternheimer and Peierls 1971 at `density` [g/cm3]. */
static bh_density_effect general_set(const bh_medium *m, bool gas, double density)
{
    const double plasma = 28.816e-6 * sqrt(density * m->z_over_a);
    bh_density_effect e = {.mean_excitation = m->mean_excitation, .k = 3.0, .density = density};
    e.c = 2.0 * log(m->mean_excitation / plasma) + 1.0;
    if (gas) {
        e.x0 = gas_x0(e.c);
        e.x1 = e.c < 12.25 ? 4.0 : 5.0;
    } else {
        const bool light = m->mean_excitation < 100e-6;
        e.x1 = light ? 2.0 : 3.0;
        e.x0 = e.c < (light ? 3.681 : 5.215) ? 0.2 : 0.326 * e.c - (light ? 1.0 : 1.5);
    }
    e.a = (e.c - 2.0 * ln10 * e.x0) / pow(e.x1 - e.x0, e.k);
    return e;
}

static void choose_set(const bh_material *material, bh_medium *out)
{
    out->mean_excitation = material->effect.mean_excitation;
    if (!(out->mean_excitation > 0.0))
        out->mean_excitation = additive_excitation(out);
    out->effect = material->effect;
    out->set_published = material->effect.density > 0.0;
    if (!out->set_published)
        out->effect = general_set(out, material->state == BH_STATE_GAS,
                                  material->density > 0.0 ? material->density : out->density);
    const double r = log10(out->effect.density / out->density);
    out->effect.c += ln10 * r;
    out->effect.x0 += 0.5 * r;
    out->effect.x1 += 0.5 * r;
}

bh_code bh_medium_of(const bh_material *material, double density, bh_medium *out, bh_error *err)
{
    bh_medium m = {.mean_atomic_mass = material->mean_atomic_mass};
    m.density = density != 0.0 ? density : material->density;
    if (material->state == BH_STATE_VACUUM || material->count == 0)
        return bh_fail(err, BH_EDOMAIN, BH_SAY_STOPPING_VACUUM);
    if (!(m.density > 0.0))
        return bh_fail(err, BH_EDOMAIN, BH_SAY_STOPPING_DENSITY, material->name);
    for (size_t i = 0; i < material->count; i++) {
        const bh_code code = add_element(&m, &material->parts[i], err);
        if (code != BH_OK)
            return code;
        m.z_over_a += material->parts[i].per_atom * material->parts[i].z / m.mean_atomic_mass;
    }
    choose_set(material, &m);
    *out = m;
    return BH_OK;
}
