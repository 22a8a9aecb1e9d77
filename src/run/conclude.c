/* conclude.c - warnings and cautions of an evaluated plan. */
#include "beamhours/run/conclude.h"

#include "beamhours/base/number.h"
#include "beamhours/base/sentences.h"
#include "beamhours/run/cautions.h"

/* The plan asks for more than the facility grants. */
static void find_shortage(const bh_plan *plan, const bh_totals *t, bh_diags *diags)
{
    if (!(t->spare_hours < 0))
        return;
    char asked[BH_NUMBER_SIZE], granted[BH_NUMBER_SIZE];
    const bh_schedule *schedule = &plan->schedule;
    bh_number_digits(t->available_hours - t->spare_hours, 3, asked, sizeof asked);
    bh_number_print(t->available_hours, granted, sizeof granted);
    bh_diags_add(diags, BH_SEVERITY_WARNING, schedule->available.at, "schedule.available",
                 BH_WARN_SHORTAGE, asked, schedule->available_is_beam ? "with beam " : "", granted);
}

static void copy_diags(bh_diags *to, const bh_diags *from)
{
    for (size_t i = 0; from && i < bh_diags_count(from); i++) {
        const bh_diag *d = bh_diags_at(from, i);
        bh_diags_add(to, d->severity, d->at, d->key, "%s", d->text);
    }
}

bh_code bh_conclude(const bh_plan *plan, const bh_remarks *remarks, const bh_diags *said,
                    bh_arena *arena, bh_conclusion *out)
{
    copy_diags(out->warnings, said);
    const bool complete = bh_remarks_say(remarks, out->warnings);
    find_shortage(plan, &out->totals, out->warnings);
    bh_diags_sort(out->warnings);
    out->cautions = bh_cautions_from_plan(plan, arena, &out->caution_count);
    return complete && out->cautions ? BH_OK : BH_ENOMEM;
}
