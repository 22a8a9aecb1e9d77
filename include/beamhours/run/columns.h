/* columns.h - the one list of what a run table says; every output draws from it. */
#ifndef BH_RUN_COLUMNS_H
#define BH_RUN_COLUMNS_H

/* X(id, key, kind, heading, unit shown, digits, meaning).  The unit of the value is in its key.
 * kind: BH_CELL_TEXT, BH_CELL_COUNT (an integer), BH_CELL_NUMBER.  digits: significant ones in
 * text output. */
#define BH_COLUMNS(X)                                                                              \
    X(BH_COL_SETTING, "setting", BH_CELL_TEXT, "setting", "", 0, "name of the setting")            \
    X(BH_COL_ARM, "arm", BH_CELL_TEXT, "arm", "", 0, "name of the arm")                            \
    X(BH_COL_BIN, "bin", BH_CELL_COUNT, "bin", "", 0, "bin of the arm, counted from 1")            \
    X(BH_COL_PARTICLE, "particle", BH_CELL_TEXT, "particle", "", 0, "beam particle")               \
    X(BH_COL_TARGET, "target", BH_CELL_TEXT, "target", "", 0, "name of the target")                \
    X(BH_COL_SCATTERER, "scatterer", BH_CELL_TEXT, "scatterer", "", 0, "what is struck")           \
    X(BH_COL_BEAM_KINETIC, "beam_kinetic_MeV", BH_CELL_NUMBER, "energy", "MeV", 5,                 \
      "beam kinetic energy entering the target")                                                   \
    X(BH_COL_VERTEX_KINETIC, "vertex_kinetic_MeV", BH_CELL_NUMBER, "vertex", "MeV", 5,             \
      "mean beam kinetic energy at the scattering point")                                          \
    X(BH_COL_ANGLE, "angle_deg", BH_CELL_NUMBER, "angle", "deg", 4,                                \
      "lab polar angle of the detected particle: the arm's centre; for a bin the mean over it")    \
    X(BH_COL_SCATTERED_ANGLE, "scattered_angle_deg", BH_CELL_NUMBER, "scattered", "deg", 4,        \
      "lab angle of the scattered beam particle in the event detected at angle_deg")               \
    X(BH_COL_SCATTERED_KINETIC, "scattered_kinetic_MeV", BH_CELL_NUMBER, "T'", "MeV", 5,           \
      "its kinetic energy at the vertex")                                                          \
    X(BH_COL_SCATTERED_MOMENTUM, "scattered_momentum_MeV_per_c", BH_CELL_NUMBER, "p'", "MeV/c", 5, \
      "its momentum at the vertex")                                                                \
    X(BH_COL_RECOIL_KINETIC, "recoil_kinetic_MeV", BH_CELL_NUMBER, "T recoil", "MeV", 4,           \
      "kinetic energy of the struck particle, same event")                                         \
    X(BH_COL_RECOIL_ANGLE, "recoil_angle_deg", BH_CELL_NUMBER, "recoil", "deg", 4,                 \
      "lab angle of the struck particle, same event")                                              \
    X(BH_COL_CENTRAL_MOMENTUM, "central_momentum_MeV_per_c", BH_CELL_NUMBER, "central", "MeV/c",   \
      5, "momentum the arm is set to")                                                             \
    X(BH_COL_Q2, "q2_GeV2", BH_CELL_NUMBER, "Q2", "GeV2", 4,                                       \
      "four-momentum transfer squared, positive")                                                  \
    X(BH_COL_Q, "q_per_fm", BH_CELL_NUMBER, "q", "1/fm", 4, "three-momentum transfer, lab")        \
    X(BH_COL_EPSILON, "epsilon", BH_CELL_NUMBER, "epsilon", "1", 4,                                \
      "virtual-photon polarisation with the lepton mass; may exceed 1")                            \
    X(BH_COL_POINT_CROSS_SECTION, "point_cross_section_ub_per_sr", BH_CELL_NUMBER, "at angle",     \
      "ub/sr", 4,                                                                                  \
      "lab cross section per nucleus at angle_deg, per solid angle of the detected particle; no "  \
      "average, no radiation")                                                                     \
    X(BH_COL_CROSS_SECTION, "cross_section_ub_per_sr", BH_CELL_NUMBER, "sigma", "ub/sr", 4,        \
      "mean over the row's acceptance and depth, per nucleus")                                     \
    X(BH_COL_SOLID_ANGLE, "solid_angle_msr", BH_CELL_NUMBER, "solid", "msr", 4,                    \
      "solid angle of the row")                                                                    \
    X(BH_COL_BEAM, "beam_per_s", BH_CELL_NUMBER, "beam", "1/s", 4,                                 \
      "beam particles of the named kind per second, mean")                                         \
    X(BH_COL_SEEN, "seen_per_cm2", BH_CELL_NUMBER, "nuclei", "1/cm2", 4,                           \
      "scatterer nuclei seen by the arm per cm2")                                                  \
    X(BH_COL_LUMINOSITY, "luminosity_per_cm2_s", BH_CELL_NUMBER, "luminosity", "1/cm2/s", 4,       \
      "beam_per_s times seen_per_cm2: per nucleus, never per nucleon")                             \
    X(BH_COL_RADIATIVE, "radiative_factor", BH_CELL_NUMBER, "radiative", "1", 4,                   \
      "share left by radiation inside the cut")                                                    \
    X(BH_COL_KEPT, "kept_fraction", BH_CELL_NUMBER, "kept", "1", 4,                                \
      "share inside momentum bite and resolution")                                                 \
    X(BH_COL_EFFICIENCY, "efficiency", BH_CELL_NUMBER, "eff", "1", 4, "the arm's efficiency")      \
    X(BH_COL_SIGNAL, "signal_rate_Hz", BH_CELL_NUMBER, "signal", "Hz", 4,                          \
      "signal rate before dead time")                                                              \
    X(BH_COL_BACKGROUND, "background_rate_Hz", BH_CELL_NUMBER, "bkg", "Hz", 3,                     \
      "background rate before dead time, from windows and other nuclides")                         \
    X(BH_COL_LIVE, "live_fraction", BH_CELL_NUMBER, "live", "1", 4,                                \
      "share of events recorded after dead time, prescale and rate limit")                         \
    X(BH_COL_HOURS, "hours", BH_CELL_NUMBER, "hours", "h", 4, "hours with full target")            \
    X(BH_COL_EMPTY_HOURS, "empty_hours", BH_CELL_NUMBER, "empty", "h", 3,                          \
      "hours with empty target")                                                                   \
    X(BH_COL_CHARGE, "charge_mC", BH_CELL_NUMBER, "charge", "mC", 4,                               \
      "beam charge on the full target in those hours")                                             \
    X(BH_COL_COUNTS, "counts", BH_CELL_NUMBER, "counts", "1", 4,                                   \
      "signal counts recorded in `hours`")                                                         \
    X(BH_COL_STATISTICAL, "statistical_uncertainty", BH_CELL_NUMBER, "stat", "1", 3,               \
      "relative, of the background-subtracted signal")                                             \
    X(BH_COL_SYSTEMATIC, "systematic_uncertainty", BH_CELL_NUMBER, "syst", "1", 3,                 \
      "relative, of the signal rate")                                                              \
    X(BH_COL_HOURS_TO_GOAL, "hours_to_goal", BH_CELL_NUMBER, "to goal", "h", 4,                    \
      "full-target hours that reach the goal; empty where there is no goal")                       \
    X(BH_COL_PER_MRAD, "rate_change_per_mrad", BH_CELL_NUMBER, "dR/mrad", "1", 3,                  \
      "relative change of the rate for +1 mrad of the arm's angle")                                \
    X(BH_COL_PER_PERMILLE, "rate_change_per_permille_momentum", BH_CELL_NUMBER, "dR/0.1%p", "1",   \
      3, "relative change of the rate for +0.1 % of beam momentum at fixed arm")

typedef enum { BH_CELL_TEXT, BH_CELL_COUNT, BH_CELL_NUMBER } bh_cell_kind;

typedef enum {
#define BH_COLUMN_ID(id, key, kind, heading, unit, digits, meaning) id,
    BH_COLUMNS(BH_COLUMN_ID)
#undef BH_COLUMN_ID
        BH_COLUMN_COUNT
} bh_column_id;

typedef struct {
    const char *key, *heading, *unit, *meaning;
    bh_cell_kind kind;
    int digits;
} bh_column;

/* The column, or NULL for a number that is none.  Constant data. */
const bh_column *bh_column_at(int id);

/* Its id from the key, or -1; the nearest key to a misspelt one, or NULL. */
int bh_column_find(const char *key);
const char *bh_column_suggest(const char *key);

#endif
