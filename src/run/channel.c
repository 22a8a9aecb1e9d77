/* channel.c - cross section and momentum of the detected particle against its angle. */
#include "beamhours/run/channel.h"

#include "beamhours/units/constants.h"
#include "beamhours/units/nuclide.h"

enum { BATCH = 32 };

static bh_collision collision_of(const bh_channel *channel)
{
    const bh_encounter *e = &channel->encounter;
    return (bh_collision){.mass = e->beam->mass, .target = e->target, .kinetic = e->kinetic};
}

bh_particle bh_channel_detected(const bh_channel *channel)
{
    const bh_encounter *e = &channel->encounter;
    bh_particle particle = *e->beam;
    char name[8];
    if (channel->recoil && !bh_particle_find(bh_nuclide_name(e->z, e->a, name), &particle))
        particle = (bh_particle){.kind = BH_KIND_ION,
                                 .charge = e->z,
                                 .twice_spin = -1,
                                 .z = e->z,
                                 .a = e->a,
                                 .mass = e->target};
    return particle;
}

bh_detected bh_channel_as_detected(const bh_channel *channel)
{
    if (channel->recoil)
        return BH_DETECTED_RECOIL;
    return channel->branch == BH_BRANCH_SLOW ? BH_DETECTED_SLOW : BH_DETECTED_SCATTERED;
}

double bh_channel_largest_angle(const bh_channel *channel)
{
    const bh_collision in = collision_of(channel);
    return channel->recoil ? BH_PI / 2 : bh_kinematics_largest_angle(&in);
}

bh_code bh_channel_event(const bh_channel *channel, double angle, bh_event *event, bh_error *err)
{
    const bh_collision in = collision_of(channel);
    return channel->recoil ? bh_kinematics_recoil(&in, angle, event, err)
                           : bh_kinematics_scattered(&in, angle, channel->branch, event, err);
}

bool bh_channel_has(const bh_channel *channel, double angle, bh_event *event)
{
    const bh_collision in = collision_of(channel);
    if (!(angle <= bh_channel_largest_angle(channel)))
        return false;
    if (channel->recoil || !(angle >= 0) || !bh_kinematics_in_range(&in) ||
        (channel->branch == BH_BRANCH_SLOW && !(in.mass > in.target)))
        return !bh_channel_event(channel, angle, event, NULL);
    bh_kinematics_batch(&in, 1, &angle, channel->branch, event);
    return true;
}

/* Fills the events that exist, and where each stands; returns how many there are. */
static size_t events_of(const bh_channel *channel, size_t n, const double *angle, bh_event *event,
                        size_t *place)
{
    const bh_collision in = collision_of(channel);
    const double largest = bh_channel_largest_angle(channel);
    bool all = !channel->recoil && bh_kinematics_in_range(&in) &&
               (channel->branch == BH_BRANCH_FAST || in.mass > in.target);
    size_t m = 0;
    for (size_t i = 0; i < n; i++)
        all = all && angle[i] >= 0 && angle[i] <= largest;
    if (all)
        bh_kinematics_batch(&in, n, angle, channel->branch, event);
    for (size_t i = 0; i < n; i++)
        if (all || (angle[i] <= largest && !bh_channel_event(channel, angle[i], &event[m], NULL)))
            place[m++] = i;
    return m;
}

static void eval_batch(const bh_channel *channel, size_t n, const double *angle, double *sigma,
                       double *momentum)
{
    bh_event event[BATCH];
    double computed[BATCH];
    size_t place[BATCH];
    const size_t m = events_of(channel, n, angle, event, place);
    for (size_t i = 0; i < n; i++)
        sigma[i] = momentum[i] = 0;
    channel->process->cross_section(&channel->encounter, m, event, computed);
    for (size_t k = 0; k < m; k++) {
        const bh_event *e = &event[k];
        sigma[place[k]] = computed[k] * (channel->recoil ? e->scattered_per_recoil : 1);
        momentum[place[k]] = channel->recoil ? e->recoil_momentum : e->scattered_momentum;
    }
}

void bh_channel_eval(const bh_channel *channel, size_t n, const double *angle, double *sigma,
                     double *momentum)
{
    for (size_t i = 0; i < n; i += BATCH)
        eval_batch(channel, n - i < BATCH ? n - i : BATCH, angle + i, sigma + i, momentum + i);
}
