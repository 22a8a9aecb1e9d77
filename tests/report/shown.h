/* shown.h - plans that make interesting tables, and views of them. */
#ifndef TESTS_REPORT_SHOWN_H
#define TESTS_REPORT_SHOWN_H

#include "../run/evaluated.h"

#include "beamhours/report/selection.h"

#define BEAM                                                 \
    "plan: 1\ntitle: \"Two arms, \\\"both\\\" on carbon\"\n" \
    "beam: {particle: electron, kinetic_energy: 400 MeV, current: 10 uA}\n"
#define TARGET "target:\n  name: foil\n  layers: [{material: carbon-12, thickness: 1 mm}]\n"
#define ARMS                                                                        \
    "arms:\n  - {name: A, in_plane: ±28 mrad, out_of_plane: ±70 mrad, bins: 2}\n" \
    "  - {name: M, side: left, angle: 30 deg, solid_angle: 2 msr, dead_time: 1 us}\n"

/* Settings without a wish, swept, of another energy; arms that move and one that stands. */
static const char *const two_arms =
    BEAM TARGET ARMS "settings:\n"
                     "  - {name: K1, arm: A, angle: 30 deg, goal: 1 %}\n"
                     "  - {name: K2, arm: A, angle: [40 deg, 50 deg], time: 2 h}\n"
                     "  - {name: K3, arm: A, angle: 35 deg, beam: {kinetic_energy: 380 MeV}}\n"
                     "schedule: {available: 2 d, availability: 50 %, start_up: 1 h}\n";

/* One arm, one energy: nothing of it needs a column. */
static const char *const one_arm =
    BEAM TARGET "arms: [{name: A, solid_angle: 5 msr}]\n"
                "settings: [{name: K, angle: [40 deg, 60 deg], counts: 10000}]\n";

/* The view of a table, which fails the test when it cannot be made. */
static inline bh_selection view_of(const struct evaluated *e, const bh_selection_request *request)
{
    bh_selection view;
    bh_error err = {.code = BH_OK};
    const bh_code bad = bh_selection_new(e->table, request, &view, &err);
    ck_assert_msg(!bad, "%s", err.text);
    return view;
}

#endif
