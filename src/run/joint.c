/* joint.c - one channel summed over the joint acceptance of two arms. */
#include "beamhours/run/joint.h"

#include <math.h>

#include "beamhours/units/constants.h"

enum { BATCH = 32 };

/* --- events --- */

static bh_collision collision_of(const bh_joint *j)
{
    const bh_encounter *e = &j->channel[0].encounter;
    return (bh_collision){
        .mass = e->beam->mass, .target = e->target, .kinetic = j->vertex->kinetic[j->boost]};
}

/* Probability that the particle which arm k detects of an event is counted. */
static double share_of(const bh_joint *j, int k, const bh_event *e)
{
    const bool recoil = j->channel[k].recoil;
    const double angle = recoil ? e->recoil_angle : e->scattered_angle;
    const double kinetic = recoil ? e->recoil_kinetic : e->scattered_kinetic;
    if (j->taking[k].rms.beam > 0 && j->taking[k].cut) {
        const bh_taken taken = {.channel = &j->channel[k],
                                .leaver = j->losing ? &j->leaver[k] : NULL,
                                .taking = &j->taking[k],
                                .boost = j->boost};
        return bh_taken_share(&taken, j->vertex, angle);
    }
    const bh_arriver arriver = {
        .kinetic = j->losing ? bh_leaver_left(&j->leaver[k], j->vertex, angle, kinetic) : kinetic};
    return bh_taking_share(&j->taking[k], &arriver);
}

/* Takes what radiation leaves of the events of a batch, at `theta` of the first arm's particle. */
static void radiate(const bh_joint *j, size_t n, const double *theta, bh_pair_value *value)
{
    for (size_t i = 0; i < n; i++) {
        const double angle[BH_ARMS] = {theta[i], value[i].partner};
        double left = 1;
        for (int k = 0; k < BH_ARMS && value[i].kept > 0; k++) {
            const double near = fmax(j->polar[k].from, fmin(j->polar[k].to, angle[k]));
            double factor = 1;
            bh_radiated_apply(&j->radiated[k], j->boost, 1, &near, &factor);
            left = fmin(left, factor);
        }
        value[i].kept *= left;
    }
}

static void evaluate_batch(const bh_joint *j, size_t n, const double *theta, bh_pair_value *value)
{
    bh_channel there = j->channel[0];
    there.encounter.kinetic = j->vertex->kinetic[j->boost];
    const double largest = bh_channel_largest_angle(&there);
    bh_event event[BATCH];
    double sigma[BATCH];
    size_t place[BATCH] = {0}, m = 0;
    for (size_t i = 0; i < n; i++) {
        value[i] = (bh_pair_value){.partner = (double)NAN};
        if (theta[i] <= largest && !bh_channel_event(&there, theta[i], &event[m], NULL))
            place[m++] = i;
    }
    there.process->cross_section(&there.encounter, m, event, sigma);
    for (size_t k = 0; k < m; k++) {
        const bh_event *e = &event[k];
        const double total = sigma[k] * (there.recoil ? e->scattered_per_recoil : 1);
        value[place[k]] =
            (bh_pair_value){.total = total,
                            .kept = total * share_of(j, 0, e) * share_of(j, 1, e),
                            .partner = there.recoil ? e->scattered_angle : e->recoil_angle};
    }
    if (j->radiating)
        radiate(j, n, theta, value);
}

static void evaluate(void *context, size_t n, const double *theta, bh_pair_value *value)
{
    for (size_t i = 0; i < n; i += BATCH)
        evaluate_batch(context, n - i < BATCH ? n - i : BATCH, theta + i, value + i);
}

/* Where a bite without resolution begins and ends is a step of what is kept. */
static int add_bites(const bh_joint *j, const bh_collision *in, double *breaks, int count)
{
    for (int k = 0; k < BH_ARMS; k++) {
        bh_bite bite = j->taking[k].bite;
        bh_interval angles;
        size_t n = 0;
        bite.detected = bh_channel_as_detected(&j->channel[k]);
        if (!j->taking[k].cut || bh_bite_angles(in, &bite, &angles, &n, NULL) || n == 0)
            continue;
        const double ends[] = {angles.from, angles.to};
        for (int i = 0; i < 2; i++)
            breaks[count++] = k ? bh_pair_partner(in, bite.detected, ends[i]) : ends[i];
    }
    return count;
}

/* --- sums --- */

bh_code bh_stand(const bh_acceptance_spec *first, const bh_acceptance_spec *second,
                 bh_standing *out, bh_error *err)
{
    static const double by[3] = {0, -BH_STEP_ANGLE, BH_STEP_ANGLE};
    bh_code code = bh_acceptance_make(second, &out->second, err);
    out->turns = first->shape != BH_ACCEPTANCE_RING && first->angle > BH_STEP_ANGLE &&
                 first->angle < BH_PI - BH_STEP_ANGLE;
    for (int i = 0; !code && i < (out->turns ? 3 : 1); i++) {
        bh_acceptance_spec moved = *first;
        moved.angle += by[i];
        for (int k = 0; i && first->edges && k <= first->bins; k++)
            out->edges[i - 1][k] = first->edges[k] + by[i];
        if (i && first->edges)
            moved.edges = out->edges[i - 1];
        code = bh_acceptance_make(&moved, &out->first[i], err);
    }
    return code;
}

/* Where one of the sums is taken: which place of the first arm, which beam. */
struct where {
    const bh_joint_request *request;
    int place, boost;
};

static bh_code add_up(bh_joint *j, struct where where, bh_pair_sum *sum, bh_error *err)
{
    const bh_standing *s = where.request->standing;
    bh_acceptance_part one;
    double breaks[BH_PAIR_MOST_BREAKS];
    j->boost = where.boost;
    const bh_collision in = collision_of(j);
    const bh_detected detected = bh_channel_as_detected(&j->channel[0]);
    const bool recoil = detected == BH_DETECTED_RECOIL;
    bh_acceptance_part_of(&s->first[where.place], where.request->part, &one);
    const int count =
        add_bites(j, &in, breaks, bh_pair_breaks(&in, detected, &s->second.whole, breaks));
    const bh_pair_request request = {.shape = {&one, &s->second.whole, j->opposite},
                                     .function = evaluate,
                                     .context = j,
                                     .limit = recoil ? BH_PI / 2 : bh_kinematics_largest_angle(&in),
                                     .break_count = count,
                                     .breaks = breaks};
    return bh_pair_add_up(&request, sum, err);
}

/* The sensitivities, with radiation. */
static bh_code add_changes(bh_joint *joint, const bh_joint_request *request, bh_joint_sum *out,
                           bh_error *err)
{
    const double weight = joint->vertex->weight;
    const bool turns = request->standing->turns;
    bh_pair_sum sum;
    bh_code code = BH_OK;
    for (int k = 0; !code && k < 2; k++) {
        if (turns)
            code = add_up(joint, (struct where){request, 1 + k, BH_AS_IT_IS}, &sum, err);
        out->events.moved[k] += turns && !code ? weight * sum.kept : (double)NAN;
        const int boost = k ? BH_BOOSTED_UP : BH_BOOSTED_DOWN;
        if (!code)
            code = add_up(joint, (struct where){request, 0, boost}, &sum, err);
        out->events.boosted[k] += code ? (double)NAN : weight * sum.kept;
    }
    return code;
}

bh_code bh_joint_add(bh_joint *joint, const bh_joint_request *request, bh_joint_sum *out,
                     bh_error *err)
{
    const double weight = joint->vertex->weight;
    const bool idle = joint->radiated[0].idle && joint->radiated[1].idle;
    bh_pair_sum sum;
    joint->radiating = false;
    bh_code code = add_up(joint, (struct where){request, 0, BH_AS_IT_IS}, &sum, err);
    if (code)
        return code;
    out->events.total += weight * sum.total;
    out->events.kept += weight * sum.kept;
    out->solid_angle += weight * sum.solid_angle;
    out->events.converged = out->events.converged && sum.converged;
    joint->radiating = !idle;
    if (!idle)
        code = add_up(joint, (struct where){request, 0, BH_AS_IT_IS}, &sum, err);
    if (code)
        return code;
    out->events.radiated += weight * sum.kept;
    return request->sensitivities ? add_changes(joint, request, out, err) : BH_OK;
}
