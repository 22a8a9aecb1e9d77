/* sum_key.c - what sums over channels are kept under. */
#include "beamhours/run/sum_key.h"

#include <string.h>

/* Numbers of fixed size; bytes between members are zero. */
struct key {
    const bh_process *process;
    const bh_structure *structure;
    char beam[16];
    int charge, z, a, recoil, branch, bins, cut, changes, only, shape;
    double target, kinetic, momentum_from, momentum_to;
    double shape_numbers[9], rms[3];
};

/* The room that the key is written into. */
struct writing {
    unsigned char *room;
    size_t used, size;
    bool full;
};

static void write_bytes(struct writing *w, const void *bytes, size_t size)
{
    w->full = w->full || size > w->size - w->used;
    if (w->full)
        return;
    memcpy(w->room + w->used, bytes, size);
    w->used += size;
}

/* The polynomials are the function; without them nothing says what it is. */
static void write_radiated(const bh_radiated *x, struct writing *w)
{
    const size_t size = (size_t)x->at.count * sizeof(double);
    const double *const lists[] = {x->level[0], x->level[1], x->level[2], x->tail,
                                   x->cut,      x->limit,    x->above,    x->soft,
                                   x->at.node,  x->shift[1], x->shift[2]};
    const double numbers[] = {x->signal, x->reference, x->boosted[1], x->boosted[2], x->blur};
    write_bytes(w, numbers, sizeof numbers);
    for (size_t i = 0; i < sizeof lists / sizeof lists[0]; i++)
        write_bytes(w, lists[i], size);
}

static void write_numbers(const bh_channel_request *r, struct writing *w)
{
    const bh_encounter *e = &r->channel.encounter;
    const bh_acceptance_spec *s = &r->acceptance;
    struct key k;
    memset(&k, 0, sizeof k);
    k.process = r->channel.process;
    k.structure = e->structure;
    memcpy(k.beam, e->beam->name, strlen(e->beam->name));
    k.charge = e->charge;
    k.z = e->z;
    k.a = e->a;
    k.recoil = r->channel.recoil;
    k.branch = (int)r->channel.branch;
    k.bins = r->bins ? s->bins : 0;
    k.cut = r->cut;
    k.changes = r->sensitivities + 2 * r->without_changes;
    k.only = r->radiated_only + 2 * r->trace;
    k.shape = (int)s->shape;
    k.target = e->target;
    k.kinetic = e->kinetic;
    k.momentum_from = r->momentum_from;
    k.momentum_to = r->momentum_to;
    const double numbers[] = {
        s->angle,     s->in_plane_from, s->in_plane_to, s->out_of_plane_from, s->out_of_plane_to,
        s->ring_from, s->ring_to,       s->azimuth,     s->solid_angle};
    memcpy(k.shape_numbers, numbers, sizeof numbers);
    const double rms[] = {r->rms.momentum, r->rms.energy, r->rms.beam};
    memcpy(k.rms, rms, sizeof rms);
    write_bytes(w, &k, sizeof k);
    if (r->radiated && !r->radiated->idle)
        write_radiated(r->radiated, w);
    if (s->edges && r->bins)
        write_bytes(w, s->edges, ((size_t)s->bins + 1) * sizeof(double));
}

/* What a way adds where energy is lost: the vertices, and what lies behind them. */
static void write_way(const bh_channel_request *r, const bh_leaver *leaver, struct writing *w)
{
    const bh_way *way = r->way;
    const double frame[] = {way->cosine, way->sine, way->wall_radius, (double)way->layer_count,
                            way->ring ? way->azimuth : 0};
    write_bytes(w, frame, sizeof frame);
    for (size_t i = 0; i < way->sheet_count; i++) {
        const bh_sheet *s = &way->sheets[i];
        const double size[] = {s->thickness, s->areal};
        write_bytes(w, size, sizeof size);
        write_bytes(w, &leaver->ranges[i], sizeof(const bh_range *));
    }
    for (size_t i = 0; i < r->vertex_count; i++) {
        const bh_vertex *v = &r->vertices[i];
        const double where[] = {(double)v->layer, v->depth, v->weight, v->towards};
        write_bytes(w, where, sizeof where);
        write_bytes(w, v->kinetic, sizeof v->kinetic);
    }
}

/* NOLINTNEXTLINE(readability-non-const-parameter): written through the struct */
size_t bh_sum_key(const bh_channel_request *request, const bh_leaver *leaver, unsigned char *room,
                  size_t size)
{
    struct writing w = {.room = room, .size = size};
    write_numbers(request, &w);
    if (leaver)
        write_way(request, leaver, &w);
    return w.full ? 0 : w.used;
}
