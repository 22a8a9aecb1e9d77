/* hours.c - how long a setting takes: the slowest of its arms decides. */
#include "beamhours/run/hours.h"

#include <math.h>

static const bh_setting_arm *plan_of(const bh_arm_hours *arm)
{
    return arm->yield->view.arm;
}

bh_code bh_hours_record(bh_arm_hours *arm, const bh_beam *beam, bh_error *err)
{
    const bh_arm *a = &plan_of(arm)->arm;
    const bh_part *part = arm->yield->part;
    const bh_readout readout = {.dead_time = a->dead_time.value,
                                .paralysable = a->dead_time_model == BH_DEAD_PARALYSABLE,
                                .prescale = a->prescale,
                                .rate_limit = a->rate_limit.given ? a->rate_limit.value : 0,
                                .duty_factor = beam->duty_factor.value};
    const double triggers = part->signal + part->windows + part->other + a->other_rate.value;
    const bh_code code = bh_counting_live(&readout, triggers, &arm->live, err);
    for (int i = 0; !code && i < arm->yield->view.parts; i++)
        arm->recorded[i] = (bh_recorded){.signal = part[i].signal * arm->live.live_fraction,
                                         .windows = part[i].windows * arm->live.live_fraction,
                                         .other = part[i].other * arm->live.live_fraction};
    return code;
}

static bool each_bin(const bh_arm_hours *arm)
{
    return plan_of(arm)->each_bin && arm->yield->view.parts > 1;
}

static bh_recorded_bins bins_of(const bh_arm_hours *arm)
{
    return (bh_recorded_bins){.count = (size_t)arm->yield->view.parts - 1,
                              .bins = arm->recorded + 1};
}

/* How much more the dummy cell gives than the windows; 1 for the target's own. */
static double advantage_of(const bh_arm_hours *arm)
{
    const bh_target *target = arm->yield->view.setting->target;
    const bh_part *whole = arm->yield->part;
    return target->empty_use && whole->windows > 0 ? whole->dummy / whole->windows : 1;
}

static double best_share(const bh_arm_hours *arm, double advantage)
{
    if (!each_bin(arm))
        return bh_precision_best_share(&arm->recorded[0], advantage);
    const bh_recorded_bins bins = bins_of(arm);
    return bh_precision_best_share_each(&bins, advantage);
}

/* The share of empty-target time that this arm would choose. */
static double own_share(const bh_arm_hours *arm)
{
    const bh_target *target = arm->yield->view.setting->target;
    if (target->empty == BH_EMPTY_NONE)
        return 0;
    if (target->empty == BH_EMPTY_SHARE)
        return target->empty_share.value;
    const double advantage = advantage_of(arm);
    const double share = advantage > 0 ? best_share(arm, advantage) : 0;
    return share > 0 ? share : 0;
}

static void set_empty(bh_arm_hours *arm, double share)
{
    const double advantage = advantage_of(arm);
    arm->empty =
        (bh_empty){.measured = share > 0 && advantage > 0, .share = share, .advantage = advantage};
}

double bh_hours_to_goal(const bh_arm_hours *arm, int part)
{
    if (plan_of(arm)->want != BH_WANT_GOAL)
        return (double)NAN;
    const double goal = plan_of(arm)->wanted.value;
    if (part > 0 || !each_bin(arm))
        return bh_precision_hours(&arm->recorded[part], &arm->empty, goal);
    const bh_recorded_bins bins = bins_of(arm);
    return bh_precision_hours_each(&bins, &arm->empty, goal, NULL);
}

static double wanted_hours(const bh_arm_hours *arm)
{
    const bh_setting_arm *plan = plan_of(arm);
    const double wanted = plan->wanted.value;
    switch (plan->want) {
    case BH_WANT_GOAL:
        return bh_hours_to_goal(arm, 0);
    case BH_WANT_TIME:
        return wanted / BH_SECONDS_PER_HOUR;
    case BH_WANT_CHARGE:
        return bh_counting_hours_of_charge(wanted, arm->yield->view.setting->beam.current.value);
    case BH_WANT_COUNTS:
        return bh_counting_hours_of_counts(wanted, arm->yield->part[0].signal,
                                           arm->live.live_fraction);
    default:
        return (double)NAN;
    }
}

/* The arm that takes longest with the share of empty-target time that suits it best. */
static size_t slowest(bh_setting_hours *hours)
{
    size_t slow = 0;
    for (size_t a = 0; a < hours->setting->arm_count; a++) {
        bh_arm_hours *arm = &hours->arms[a];
        set_empty(arm, own_share(arm));
        arm->wanted = wanted_hours(arm);
        const double longest = hours->arms[slow].wanted;
        const bool as_long = arm->wanted >= longest || (isnan(longest) && isnan(arm->wanted));
        if ((isnan(longest) && !isnan(arm->wanted)) || arm->wanted > longest ||
            (as_long && arm->empty.share > hours->arms[slow].empty.share))
            slow = a;
    }
    return slow;
}

void bh_hours_decide(bh_setting_hours *hours)
{
    hours->share = hours->arms[slowest(hours)].empty.share;
    hours->full = (double)NAN;
    hours->wanted = false;
    for (size_t a = 0; a < hours->setting->arm_count; a++) {
        bh_arm_hours *arm = &hours->arms[a];
        set_empty(arm, hours->share);
        arm->wanted = wanted_hours(arm);
        hours->wanted = hours->wanted || !isnan(arm->wanted);
        if (!isnan(arm->wanted) && !(hours->full >= arm->wanted))
            hours->full = arm->wanted;
    }
    if (!isfinite(hours->full))
        hours->full = (double)NAN;
}
