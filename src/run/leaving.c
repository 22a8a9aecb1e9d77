/* leaving.c - the way of the detected particle out of the target, and the energy left to it. */
#include <math.h>

#include "beamhours/run/passage.h"

/* What a particle leaving a vertex is asked for in each sheet, `path` [g/cm2] of it. */
typedef void visit(void *context, size_t sheet, double path);

/* A direction, and how far [cm] the wall lets it go. */
typedef struct {
    double slant; /* [1] cosine to the normal of the layers */
    double reach; /* [cm] */
} course;

/* Through the layers to a face or as far as the reach; true when the reach came first. */
static bool leave_layers(const bh_way *way, const bh_vertex *from, course c, visit *see,
                         void *context)
{
    const bool forward = c.slant > 0;
    const double steep = fabs(c.slant);
    size_t i = from->layer;
    double part = way->sheets[i].thickness > 0 ? from->depth / way->sheets[i].thickness : 0.5;
    part = forward ? 1 - part : part;
    for (;;) {
        const bh_sheet *s = &way->sheets[i];
        const double length = part * s->thickness / steep; /* [cm] */
        const bool ends = length > c.reach;
        see(context, i, part * s->areal / steep * (ends ? c.reach / length : 1));
        if (ends || (forward ? i + 1 == way->layer_count : i == 0))
            return ends;
        c.reach -= length;
        i = forward ? i + 1 : i - 1;
        part = 1;
    }
}

static course course_of(const bh_way *way, const bh_vertex *from, double angle)
{
    static const double along = 1e-9;       /* so close to parallel never comes out */
    const double across = fabs(sin(angle)); /* sin(pi) is not quite 0 */
    const bool wall = way->wall_radius > 0;
    course c = {.slant = cos(angle) * way->cosine + across * way->sine * from->towards,
                .reach = wall && across > along ? way->wall_radius / across : HUGE_VAL};
    if (fabs(c.slant) < along)
        c.slant = copysign(along, c.slant);
    return c;
}

void bh_way_turning(const bh_way *way, const bh_vertex *vertex, double angle, double depth[2])
{
    const course c = course_of(way, vertex, angle);
    const bool forward = c.slant > 0;
    const size_t first = forward ? vertex->layer : 0;
    const size_t end = forward ? way->layer_count : vertex->layer;
    depth[0] = depth[1] = (double)NAN;
    if (!(way->wall_radius > 0))
        return;
    /* a face ahead lies this far off when it and the wall are reached together */
    depth[0] = c.reach * -c.slant + (forward ? way->sheets[vertex->layer].thickness : 0);
    depth[1] = c.reach * -c.slant;
    for (size_t i = first; i < end; i++)
        depth[1] += forward ? way->sheets[i].thickness : -way->sheets[i].thickness;
}

/* Everything behind the vertex, in the order the particle meets it. */
static void leave(const bh_way *way, const bh_vertex *from, double angle, visit *see, void *context)
{
    const double across = fabs(sin(angle));
    const bool wall = way->wall_radius > 0;
    const course c = course_of(way, from, angle);
    const bool sideways = leave_layers(way, from, c, see, context);
    if (sideways)
        see(context, way->layer_count, way->sheets[way->layer_count].areal / across);
    for (size_t i = way->layer_count + (wall ? 1 : 0); i < way->sheet_count; i++)
        see(context, i, way->sheets[i].areal);
}

/* --- what it crosses --- */

struct adding {
    const bh_way *way;
    bh_crossed sum;
};

static void add_path(void *context, size_t sheet, double path)
{
    struct adding *a = context;
    a->sum = bh_crossed_add(a->sum, &a->way->sheets[sheet], path);
}

bh_crossed bh_way_after(const bh_way *way, const bh_vertex *vertex, double angle)
{
    struct adding a = {.way = way};
    leave(way, vertex, angle, add_path, &a);
    return a.sum;
}

/* --- what it loses --- */

/* The range in one sheet, or NULL where nothing is lost or the loss cannot be computed. */
static bh_code find_range(bh_workspace *workspace, const bh_leaver *leaver, const bh_sheet *s,
                          double kinetic, const bh_range **range)
{
    bh_error why = {.code = BH_OK};
    *range = NULL;
    if (!leaver->way->losing || !s->matter || leaver->particle.charge == 0)
        return BH_OK;
    *range = bh_workspace_range(workspace, &leaver->particle, &s->substance, kinetic, &why);
    return why.code == BH_EDOMAIN ? BH_OK : why.code;
}

bh_code bh_leaver_make(bh_workspace *workspace, const bh_way *way, const bh_particle *particle,
                       double kinetic, bh_leaver *out)
{
    bh_code code = BH_OK;
    out->way = way;
    out->particle = *particle;
    for (size_t i = 0; !code && i < way->sheet_count; i++)
        code = find_range(workspace, out, &way->sheets[i], kinetic, &out->ranges[i]);
    return code;
}

struct losing {
    const bh_leaver *leaver;
    double kinetic; /* [MeV] */
};

static void lose(void *context, size_t sheet, double path)
{
    struct losing *l = context;
    const bh_range *range = l->leaver->ranges[sheet];
    if (range && l->kinetic > 0 && path > 0)
        l->kinetic = bh_range_after(range, l->kinetic, path);
}

double bh_leaver_left(const bh_leaver *leaver, const bh_vertex *vertex, double angle,
                      double kinetic)
{
    struct losing l = {.leaver = leaver, .kinetic = kinetic};
    if (leaver->way->losing)
        leave(leaver->way, vertex, angle, lose, &l);
    return l.kinetic;
}
