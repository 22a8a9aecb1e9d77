/* passage.c - where in a target collisions happen, and what the beam has crossed before. */
#include "beamhours/run/passage.h"

#include <math.h>
#include <stdlib.h>

#include "beamhours/run/channelsum.h"
#include "beamhours/units/constants.h"

/* --- matter on a way --- */

bh_passage bh_crossed_passage(const bh_crossed *crossed, const bh_particle *particle,
                              double kinetic)
{
    static const double half_k = 0.1535375; /* [MeV cm2/mol] 2 pi N r_e^2 m c^2 */
    const bh_flight flight = bh_flight_of(particle, kinetic);
    const double charge = particle->charge / flight.beta;
    return (bh_passage){.thickness = crossed->lengths,
                        .b = crossed->lengths > 0 ? crossed->soft / crossed->lengths : 0,
                        .xi = half_k * crossed->electrons * charge * charge};
}

bh_crossed bh_crossed_add(bh_crossed sum, const bh_sheet *sheet, double path)
{
    if (!sheet->matter || !(path > 0))
        return sum;
    const double lengths = sheet->matter->length > 0 ? path / sheet->matter->length : 0;
    sum.path += path;
    sum.lengths += lengths;
    sum.soft += sheet->matter->b * lengths;
    sum.electrons += path * sheet->matter->z_over_a;
    return sum;
}

/* --- making a way --- */

size_t bh_way_sheets(const bh_target *target, const bh_arm *arm)
{
    return target->layer_count + (target->has_wall ? 1 : 0) + arm->exit_count;
}

double bh_density_left(const bh_layer *layer, const bh_beam *beam)
{
    return fmax(0, 1 - layer->density_loss.value * beam->current.value);
}

static bh_code set_sheet(bh_workspace *workspace, const bh_layer *layer, const bh_beam *beam,
                         bh_sheet *sheet, bh_error *err)
{
    *sheet = (bh_sheet){.substance = {layer->material, layer->density.value},
                        .thickness = layer->thickness.value,
                        .areal = layer->areal_density.value * bh_density_left(layer, beam)};
    if (layer->material->state == BH_STATE_VACUUM)
        return BH_OK;
    sheet->matter = bh_workspace_matter(workspace, layer->material, err);
    return sheet->matter ? BH_OK : err->code;
}

/* A loss that cannot be computed is none; the way says so. */
static bh_code find_range(bh_workspace *workspace, bh_way *way, size_t i, bh_sheet *sheet)
{
    bh_error why = {.code = BH_OK};
    if (!way->losing || !sheet->matter)
        return BH_OK;
    sheet->range = bh_workspace_range(workspace, &way->beam, &sheet->substance, way->kinetic, &why);
    if (!sheet->range && way->unslowed == way->sheet_count) {
        way->unslowed = i;
        way->why = why;
    }
    return sheet->range || why.code == BH_EDOMAIN ? BH_OK : why.code;
}

double bh_boosted_kinetic(const bh_particle *particle, double kinetic, double by)
{
    const double mass = particle->mass;
    const double p = sqrt(kinetic * (kinetic + 2 * mass)) * (1 + by);
    return p * p / (sqrt(p * p + mass * mass) + mass);
}

static double left(const bh_range *range, double kinetic, double path)
{
    return range && kinetic > 0 ? bh_range_after(range, kinetic, path) : kinetic;
}

/* Sends the beam through the layers. */
static void send(bh_way *way, bh_sheet *sheets)
{
    const double k = way->kinetic;
    double kinetic[BH_BOOSTS] = {k, bh_boosted_kinetic(&way->beam, k, -BH_STEP_MOMENTUM),
                                 bh_boosted_kinetic(&way->beam, k, BH_STEP_MOMENTUM)};
    bh_crossed before = {.path = 0};
    way->stops = way->layer_count;
    for (size_t i = 0; i < way->layer_count; i++) {
        bh_sheet *s = &sheets[i];
        s->before = before;
        before = bh_crossed_add(before, s, s->areal / way->cosine);
        for (int b = 0; b < BH_BOOSTS; b++) {
            s->entering[b] = kinetic[b];
            kinetic[b] = left(s->range, kinetic[b], s->areal / way->cosine);
        }
        if (way->stops == way->layer_count && !(kinetic[BH_BOOSTED_DOWN] > 0))
            way->stops = i;
    }
}

static void set_frame(const bh_way_request *r, bh_way *way)
{
    const bh_arm *arm = &r->arm->arm;
    const double tilt = r->setting->tilt.value;
    *way = (bh_way){.beam = r->setting->beam.particle,
                    .kinetic = r->setting->beam.kinetic_energy.value,
                    .cosine = cos(tilt),
                    .sine = arm->side == BH_SIDE_LEFT ? -sin(tilt) : sin(tilt),
                    .losing = r->losing,
                    .ring = arm->shape == BH_SHAPE_RING,
                    .azimuth = arm->shape == BH_SHAPE_RING ? arm->azimuth.value : 0,
                    .wall_radius = r->target->has_wall ? r->target->wall_radius.value : 0,
                    .layer_count = r->target->layer_count,
                    .exit_count = arm->exit_count,
                    .sheet_count = bh_way_sheets(r->target, arm)};
    way->unslowed = way->sheet_count;
}

bh_code bh_way_make(bh_workspace *workspace, const bh_way_request *request, bh_sheet *sheets,
                    bh_way *way, bh_error *err)
{
    const bh_beam *beam = &request->setting->beam;
    const bh_target *target = request->target;
    bh_code code = BH_OK;
    size_t n = 0;
    set_frame(request, way);
    way->sheets = sheets;
    for (size_t i = 0; !code && i < way->layer_count; i++, n++) {
        code = set_sheet(workspace, &target->layers[i], beam, &sheets[n], err);
        if (!code)
            code = find_range(workspace, way, n, &sheets[n]);
    }
    if (!code && target->has_wall)
        code = set_sheet(workspace, &target->wall, beam, &sheets[n++], err);
    for (size_t i = 0; !code && i < way->exit_count; i++)
        code = set_sheet(workspace, &request->arm->arm.exit[i], beam, &sheets[n++], err);
    if (code)
        return code == BH_ENOMEM ? bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM)) : code;
    send(way, sheets);
    return BH_OK;
}

double bh_way_leaving(const bh_way *way, size_t layer)
{
    const bh_sheet *s = &way->sheets[layer];
    return left(s->range, s->entering[BH_AS_IT_IS], s->areal / way->cosine);
}

/* --- vertices --- */

/* How many depths a piece of a layer needs, from the share of the energy lost in it and its
 * thickness in radiation lengths. */
static int depths_for(double lost, double lengths)
{
    static const struct {
        double share; /* at most */
        int depths;
    } steps[] = {{1e-4, 1}, {0.01, 2}, {0.06, 3}, {0.2, 5}, {0.5, 8}};
    const double worst = fmax(lost, lengths / 20);
    for (size_t i = 0; i < sizeof steps / sizeof steps[0]; i++)
        if (worst <= steps[i].share)
            return steps[i].depths;
    return BH_MOST_DEPTHS;
}

double bh_depth_point(int i, int n, double *weight)
{
    static const double x[BH_MOST_DEPTHS + 1][BH_MOST_DEPTHS / 2] = {
        [1] = {0},
        [2] = {0.57735026918962576451},
        [3] = {0, 0.77459666924148337704},
        [5] = {0, 0.53846931010568309104, 0.90617984593866399280},
        [8] = {0.18343464249564980494, 0.52553240991632898582, 0.79666647741362673959,
               0.96028985649753623168},
        [16] = {0.09501250983763744019, 0.28160355077925891323, 0.45801677765722738634,
                0.61787624440264374845, 0.75540440835500303390, 0.86563120238783174388,
                0.94457502307323257608, 0.98940093499164993260}};
    static const double w[BH_MOST_DEPTHS + 1][BH_MOST_DEPTHS / 2] = {
        [1] = {2},
        [2] = {1},
        [3] = {0.88888888888888888889, 0.55555555555555555556},
        [5] = {0.56888888888888888889, 0.47862867049936646804, 0.23692688505618908751},
        [8] = {0.36268378337836198297, 0.31370664587788728734, 0.22238103445337447054,
               0.10122853629037625915},
        [16] = {0.18945061045506849629, 0.18260341504492358887, 0.16915651939500253819,
                0.14959598881657673208, 0.12462897125553387205, 0.09515851168249278481,
                0.06225352393864789286, 0.02715245941175409485}};
    const int from_middle = 2 * i - (n - 1); /* odd n: even numbers around 0 */
    const int k = (n % 2 ? abs(from_middle) : abs(from_middle) - 1) / 2;
    *weight = w[n][k] / 2;
    return (1 + (from_middle < 0 ? -x[n][k] : x[n][k])) / 2;
}

/* [g/cm2] along the beam from the first face of a layer to a depth [cm]. */
static double path_to(const bh_way *way, const bh_sheet *s, double depth)
{
    const double share = s->thickness > 0 ? depth / s->thickness : 0.5;
    return share * s->areal / way->cosine;
}

bh_crossed bh_way_before(const bh_way *way, const bh_vertex *vertex, double depth)
{
    const bh_sheet *s = &way->sheets[vertex->layer];
    return bh_crossed_add(s->before, s, path_to(way, s, depth));
}

bh_vertex bh_way_vertex(const bh_way *way, const bh_vertex *like, double depth)
{
    const bh_sheet *s = &way->sheets[like->layer];
    const double path = path_to(way, s, depth);
    bh_vertex v = *like;
    v.depth = depth;
    v.weight = 0;
    v.before = bh_crossed_add(s->before, s, path);
    for (int b = 0; b < BH_BOOSTS; b++)
        v.kinetic[b] = left(s->range, s->entering[b], path);
    return v;
}

/* A ring about a tilted target meets it at every slant; the mean is over half of it, as the two
 * halves are alike. */
static size_t turn_around(const bh_way *way, const bh_vertex *vertex, bh_vertex *out)
{
    if (!way->ring || way->sine == 0) {
        *out = *vertex;
        return 1;
    }
    for (int i = 0; i < BH_AZIMUTHS; i++) {
        out[i] = *vertex;
        out[i].weight /= BH_AZIMUTHS;
        out[i].towards = cos((i + 0.5) / BH_AZIMUTHS * way->azimuth / 2);
    }
    return BH_AZIMUTHS;
}

static size_t fill_layer(const bh_way *way, size_t layer, const bh_occupied *o, bh_vertex *out)
{
    const bh_vertex like = {.layer = layer, .from = o->from, .to = o->to, .towards = 1};
    const bh_vertex first = bh_way_vertex(way, &like, o->from),
                    last = bh_way_vertex(way, &like, o->to);
    const double lost = 1 - last.kinetic[BH_AS_IT_IS] / first.kinetic[BH_AS_IT_IS];
    const int n = depths_for(lost, last.before.lengths - first.before.lengths);
    size_t count = 0;
    for (int i = 0; i < n; i++) {
        double weight;
        const double at = bh_depth_point(i, n, &weight);
        bh_vertex v = bh_way_vertex(way, &like, o->from + at * (o->to - o->from));
        v.weight = weight * o->nuclei;
        count += turn_around(way, &v, out + count);
    }
    return count;
}

size_t bh_way_vertices(const bh_way *way, const bh_occupied *occupied, bh_vertex *vertices)
{
    size_t count = 0;
    double nuclei = 0;
    for (size_t i = 0; i < way->stops; i++) {
        if (!(occupied[i].nuclei > 0))
            continue;
        nuclei += occupied[i].nuclei;
        count += fill_layer(way, i, &occupied[i], vertices + count);
    }
    for (size_t i = 0; i < count; i++)
        vertices[i].weight /= nuclei;
    return count;
}

double bh_vertices_mean(const bh_vertex *vertices, size_t count)
{
    double sum = 0, weight = 0;
    for (size_t i = 0; i < count; i++) {
        sum += vertices[i].weight * vertices[i].kinetic[BH_AS_IT_IS];
        weight += vertices[i].weight;
    }
    return sum / weight;
}
