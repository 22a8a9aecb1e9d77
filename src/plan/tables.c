/* tables.c - the plan's one table of keys: it drives reading, `keys`, dumps and documentation. */
#include <stddef.h>

#include "beamhours/plan/raw.h"

#define ROWS(keys) (keys), sizeof(keys) / sizeof(keys)[0]

#define KEY(type, member, what)     .name = #member, .kind = (what), .offset = offsetof(type, member)
#define QUANTITY(type, member, dim) KEY(type, member, BH_KEY_QUANTITY), .dimension = (dim)
#define SWEEP(type, member, dim)    KEY(type, member, BH_KEY_SWEEP), .dimension = (dim)
#define EXTENT(type, member, dim)   KEY(type, member, BH_KEY_EXTENT), .dimension = (dim)
#define RANGE(type, member, dim)    KEY(type, member, BH_KEY_RANGE), .dimension = (dim)
#define COUNT(type, member)         KEY(type, member, BH_KEY_COUNT)
#define WORD(type, member, list)    KEY(type, member, BH_KEY_WORD), .words = (list)
#define NAME(type, member)          KEY(type, member, BH_KEY_NAME)
#define TEXT(type, member)          KEY(type, member, BH_KEY_TEXT)
#define PART(type, member, schema)  KEY(type, member, BH_KEY_MAPPING), .children = &(schema)
#define LIST(type, member, schema)  KEY(type, member, BH_KEY_LIST), .children = &(schema)

/* --- beam --- */

static const bh_key spot_keys[] = {
    {QUANTITY(bh_raw_spot, x, BH_DIM_LENGTH), .least = "0 mm", .most = "1e30 m", .fallback = "0 mm",
     .flags = BH_KEY_NOT_BUILT, .meaning = "horizontal rms size", .example = "0.2 mm"},
    {QUANTITY(bh_raw_spot, y, BH_DIM_LENGTH), .least = "0 mm", .most = "1e30 m", .fallback = "0 mm",
     .flags = BH_KEY_NOT_BUILT, .meaning = "vertical rms size", .example = "0.2 mm"},
};
static const bh_schema spot_schema = {"the spot", sizeof(bh_raw_spot), ROWS(spot_keys), 0, 0};

static const bh_key raster_keys[] = {
    {QUANTITY(bh_raw_spot, x, BH_DIM_LENGTH), .least = "0 mm", .most = "1e30 m", .fallback = "0 mm",
     .flags = BH_KEY_NOT_BUILT, .meaning = "horizontal full width", .example = "2 mm"},
    {QUANTITY(bh_raw_spot, y, BH_DIM_LENGTH), .least = "0 mm", .most = "1e30 m", .fallback = "0 mm",
     .flags = BH_KEY_NOT_BUILT, .meaning = "vertical full width", .example = "2 mm"},
};
static const bh_schema raster_schema = {"the raster", sizeof(bh_raw_spot), ROWS(raster_keys), 0, 0};

static const bh_key limits_keys[] = {
    {QUANTITY(bh_raw_limits, current, BH_DIM_CURRENT), .above = "0 A", .most = "1e30 A",
     .meaning = "largest current the facility allows; past it an error", .example = "100 uA"},
    {QUANTITY(bh_raw_limits, power, BH_DIM_POWER), .above = "0 W", .most = "1e60 W",
     .meaning = "largest beam power the facility allows; past it an error", .example = "50 kW"},
};
static const bh_schema limits_schema = {"the limits", sizeof(bh_raw_limits), ROWS(limits_keys), 0,
                                        0};

enum { ENERGY = 1, CURRENT = 2 };
static const bh_key beam_keys[] = {
    {TEXT(bh_raw_beam, particle), .flags = BH_KEY_REQUIRED,
     .meaning = "what the beam is made of: electron, positron, muon-, muon+, pion-, pion+, proton, "
                "deuteron, triton, helion, alpha, or a nuclide such as 12C",
     .example = "electron"},
    {COUNT(bh_raw_beam, charge), .meaning = "charge in units of e of an ion that is not bare",
     .example = "1"},
    {SWEEP(bh_raw_beam, kinetic_energy, BH_DIM_ENERGY_OR_PER_U), .group = ENERGY, .above = "0 MeV",
     .most = "1e30 MeV",
     .meaning = "kinetic energy of the whole particle; in MeV/u per mass number",
     .example = "855 MeV"},
    {SWEEP(bh_raw_beam, total_energy, BH_DIM_ENERGY_OR_PER_U), .group = ENERGY, .above = "0 MeV",
     .most = "1e30 MeV", .meaning = "energy with the rest mass, of the whole particle",
     .example = "855 MeV"},
    {SWEEP(bh_raw_beam, momentum, BH_DIM_MOMENTUM), .group = ENERGY, .above = "0 MeV/c",
     .most = "1e30 MeV/c", .meaning = "momentum of the whole particle", .example = "170 MeV/c"},
    {QUANTITY(bh_raw_beam, momentum_spread, BH_DIM_SHARE), .least = "0 %", .most = "100 %",
     .fallback = "0 %", .meaning = "rms spread of the momentum", .example = "0.02 %"},
    {SWEEP(bh_raw_beam, current, BH_DIM_CURRENT), .group = CURRENT, .above = "0 A",
     .most = "1e30 A", .meaning = "electrical current of the whole beam, mean over time",
     .example = "20 uA"},
    {QUANTITY(bh_raw_beam, particle_rate, BH_DIM_RATE), .group = CURRENT, .above = "0 /s",
     .most = "1e50 /s",
     .meaning = "particles per second of the whole beam, all kinds together, mean over time",
     .example = "3e5 /s"},
    {QUANTITY(bh_raw_beam, fraction, BH_DIM_SHARE), .above = "0 %", .most = "100 %",
     .fallback = "100 %", .meaning = "share of the whole beam that is `particle`",
     .example = "97 %"},
    {KEY(bh_raw_beam, others, BH_KEY_TABLE), .item = BH_KEY_QUANTITY, .dimension = BH_DIM_SHARE,
     .least = "0 %", .most = "100 %", .meaning = "what else is in the beam, with its share of it",
     .example = "{electron: 35 %}"},
    {QUANTITY(bh_raw_beam, duty_factor, BH_DIM_SHARE), .above = "0 %", .most = "100 %",
     .fallback = "100 %",
     .meaning = "share of time with beam in it: instantaneous rate = mean / duty_factor",
     .example = "100 %"},
    {PART(bh_raw_beam, spot, spot_schema), .meaning = "rms size of the beam on the target",
     .example = "{x: 0.2 mm, y: 0.2 mm}"},
    {PART(bh_raw_beam, raster, raster_schema), .meaning = "full widths that the beam is swept over",
     .example = "{x: 2 mm, y: 2 mm}"},
    {QUANTITY(bh_raw_beam, polarisation, BH_DIM_SHARE), .least = "-100 %", .most = "100 %",
     .fallback = "0 %", .flags = BH_KEY_NOT_BUILT, .meaning = "longitudinal polarisation",
     .example = "80 %"},
    {PART(bh_raw_beam, limits, limits_schema), .meaning = "what the facility allows",
     .example = "{current: 100 uA, power: 50 kW}"},
};
const bh_schema bh_schema_beam = {"the beam", sizeof(bh_raw_beam), ROWS(beam_keys),
                                  1U << ENERGY | 1U << CURRENT, 0};

/* --- targets --- */

const char *const bh_words_role[] = {"sample", "window", "backing", NULL};

enum { SIZE = 1 };
static const bh_key layer_keys[] = {
    {TEXT(bh_raw_layer, material), .flags = BH_KEY_REQUIRED,
     .meaning = "a name of the library, a file ending in .yaml, or vacuum",
     .example = "liquid-hydrogen"},
    {QUANTITY(bh_raw_layer, thickness, BH_DIM_LENGTH), .group = SIZE, .above = "0 mm",
     .most = "1e30 m", .meaning = "thickness along the normal of the layer", .example = "50 mm"},
    {QUANTITY(bh_raw_layer, areal_density, BH_DIM_AREAL_DENSITY), .group = SIZE, .above = "0 g/cm2",
     .most = "1e30 g/cm2", .meaning = "mass per area", .example = "20 mg/cm2"},
    {QUANTITY(bh_raw_layer, areal_number, BH_DIM_AREAL_NUMBER), .group = SIZE, .above = "0 /cm2",
     .most = "1e60 /cm2", .meaning = "atoms per area, of all elements together",
     .example = "1.6e18 /cm2"},
    {WORD(bh_raw_layer, role, bh_words_role), .fallback = "sample",
     .meaning = "sample: what is measured; window: stays when the sample is out; backing: goes "
                "with it",
     .example = "window"},
    {QUANTITY(bh_raw_layer, density, BH_DIM_DENSITY), .above = "0 g/cm3", .most = "1e30 g/cm3",
     .meaning = "density; default: the material's", .example = "0.0723 g/cm3"},
    {QUANTITY(bh_raw_layer, temperature, BH_DIM_TEMPERATURE), .above = "0 K", .most = "1e30 K",
     .meaning = "of a gas, with pressure in the place of density", .example = "293 K"},
    {QUANTITY(bh_raw_layer, pressure, BH_DIM_PRESSURE), .above = "0 Pa", .most = "1e30 Pa",
     .meaning = "of a gas, with temperature in the place of density", .example = "1 bar"},
    {QUANTITY(bh_raw_layer, density_loss, BH_DIM_SHARE_PER_CURRENT), .least = "0 %/uA",
     .most = "1e30 %/uA", .fallback = "0 %/uA",
     .meaning = "relative loss of density for each unit of current", .example = "0.02 %/uA"},
};
const bh_schema bh_schema_layer = {"a layer", sizeof(bh_raw_layer), ROWS(layer_keys), 0,
                                   1U << SIZE};

static const bh_key wall_keys[] = {
    {QUANTITY(bh_raw_wall, radius, BH_DIM_LENGTH), .above = "0 mm", .most = "1e30 m",
     .flags = BH_KEY_REQUIRED, .meaning = "distance of the wall from the beam", .example = "30 mm"},
    {TEXT(bh_raw_wall, material), .flags = BH_KEY_REQUIRED, .meaning = "a name of the library",
     .example = "aluminium"},
    {QUANTITY(bh_raw_wall, thickness, BH_DIM_LENGTH), .above = "0 mm", .most = "1e30 m",
     .flags = BH_KEY_REQUIRED, .meaning = "thickness of the wall", .example = "0.13 mm"},
};
static const bh_schema wall_schema = {"the wall", sizeof(bh_raw_wall), ROWS(wall_keys), 0, 0};

static const char *const words_share[] = {"best", NULL};
static const bh_key empty_keys[] = {
    {KEY(bh_raw_empty, share, BH_KEY_EITHER), .dimension = BH_DIM_SHARE, .words = words_share,
     .above = "0 %", .most = "1000 %", .flags = BH_KEY_REQUIRED,
     .meaning = "time without sample, as a share of the full-target time and added to it; best: "
                "the optimum",
     .example = "10 %"},
    {NAME(bh_raw_empty, use),
     .meaning = "the target that stands in for the empty one: a dummy cell", .example = "dummy"},
};
static const bh_schema empty_schema = {"the empty target", sizeof(bh_raw_empty), ROWS(empty_keys),
                                       0, 0};

static const bh_key target_keys[] = {
    {NAME(bh_raw_target, name),
     .meaning = "what settings call it; default where there is one: the sample's material",
     .example = "hydrogen"},
    {LIST(bh_raw_target, layers, bh_schema_layer), .flags = BH_KEY_REQUIRED | BH_KEY_NOT_EMPTY,
     .meaning = "what the beam meets, in order",
     .example = "[{material: liquid-hydrogen, thickness: 50 mm}]"},
    {PART(bh_raw_target, wall, wall_schema),
     .meaning = "what a particle that leaves sideways crosses",
     .example = "{radius: 30 mm, material: aluminium, thickness: 0.13 mm}"},
    {TEXT(bh_raw_target, scatterer),
     .meaning = "the nuclide or element that is measured; default: the sample's element if it has "
                "only one",
     .example = "H"},
    {QUANTITY(bh_raw_target, tilt, BH_DIM_ANGLE), .least = "-89 deg", .most = "89 deg",
     .fallback = "0 deg",
     .meaning = "turns the downstream normal of the layers towards the right, seen along the beam",
     .example = "30 deg"},
    {PART(bh_raw_target, empty_target, empty_schema),
     .meaning = "measurement without the sample; absent: the background is taken as known",
     .example = "{share: 10 %}"},
};
const bh_schema bh_schema_target = {"a target", sizeof(bh_raw_target), ROWS(target_keys), 0, 0};

/* --- arms --- */

const char *const bh_words_side[] = {"right", "left", NULL};
const char *const bh_words_detects[] = {"scattered", "recoil", "either", NULL};
const char *const bh_words_dead_time_model[] = {"non-paralysable", "paralysable", NULL};

enum { BINS = 1, RESOLUTION = 2 };
static const bh_key arm_keys[] = {
    {NAME(bh_raw_arm, name), .flags = BH_KEY_REQUIRED, .meaning = "what settings call it",
     .example = "A"},
    {WORD(bh_raw_arm, side, bh_words_side), .fallback = "right",
     .meaning = "side of the beam it stands on, seen along the beam", .example = "left"},
    {WORD(bh_raw_arm, detects, bh_words_detects), .fallback = "scattered",
     .meaning = "which of the two particles it detects", .example = "recoil"},
    {EXTENT(bh_raw_arm, in_plane, BH_DIM_ANGLE), .least = "-90 deg", .most = "90 deg",
     .meaning = "acceptance in the scattering plane, around the axis; with out_of_plane",
     .example = "±28 mrad"},
    {EXTENT(bh_raw_arm, out_of_plane, BH_DIM_ANGLE), .least = "-90 deg", .most = "90 deg",
     .meaning = "acceptance out of the scattering plane; with in_plane", .example = "±70 mrad"},
    {RANGE(bh_raw_arm, ring, BH_DIM_ANGLE), .least = "0 deg", .most = "180 deg",
     .meaning = "polar angles of a ring around the beam, in the place of in_plane",
     .example = "{from: 20 deg, to: 100 deg}"},
    {QUANTITY(bh_raw_arm, azimuth, BH_DIM_ANGLE), .above = "0 deg", .most = "360 deg",
     .fallback = "360 deg", .meaning = "how much of the ring there is", .example = "360 deg"},
    {QUANTITY(bh_raw_arm, solid_angle, BH_DIM_SOLID_ANGLE), .above = "0 sr", .most = "12.5663 sr",
     .meaning = "solid angle; alone: a point; beside a shape: the shape averages, this sets the "
                "size",
     .example = "6 msr"},
    {COUNT(bh_raw_arm, bins), .group = BINS, .least = "1", .most = "1000", .fallback = "1",
     .meaning = "equal steps of in-plane angle (ring: of polar angle)", .example = "4"},
    {KEY(bh_raw_arm, edges, BH_KEY_VALUES), .group = BINS, .dimension = BH_DIM_ANGLE,
     .least = "0 deg", .most = "180 deg", .flags = BH_KEY_NOT_EMPTY,
     .meaning = "limits of unequal bins: rising angles from the beam",
     .example = "[25 deg, 30 deg, 40 deg]"},
    {QUANTITY(bh_raw_arm, angle, BH_DIM_ANGLE), .least = "0 deg", .most = "180 deg",
     .meaning = "of a fixed arm: it takes part in every setting", .example = "30 deg"},
    {RANGE(bh_raw_arm, angle_range, BH_DIM_ANGLE), .least = "0 deg", .most = "180 deg",
     .meaning = "where it can stand", .example = "{from: 10 deg, to: 110 deg}"},
    {RANGE(bh_raw_arm, momentum_range, BH_DIM_MOMENTUM), .least = "0 MeV/c",
     .meaning = "central momenta it can be set to", .example = "{from: 0.1 GeV/c, to: 2 GeV/c}"},
    {EXTENT(bh_raw_arm, momentum_bite, BH_DIM_SHARE), .least = "-100 %", .most = "100 %",
     .meaning = "momenta accepted around the central one; absent: all", .example = "±5 %"},
    {EXTENT(bh_raw_arm, target_view, BH_DIM_LENGTH),
     .meaning = "target seen at 90 degrees; seen half-length = this / sin(angle); absent: all of "
                "it",
     .example = "±5 cm"},
    {LIST(bh_raw_arm, exit, bh_schema_layer), .meaning = "layers between target and detector",
     .example = "[{material: kapton, thickness: 0.1 mm}]"},
    {QUANTITY(bh_raw_arm, energy_cut, BH_DIM_ENERGY), .above = "0 MeV", .most = "1e30 MeV",
     .meaning = "events that lost more than this below the elastic line are not counted",
     .example = "15 MeV"},
    {QUANTITY(bh_raw_arm, angle_resolution, BH_DIM_ANGLE), .least = "0 mrad", .fallback = "0 mrad",
     .meaning = "rms resolution of the angle", .example = "3 mrad"},
    {QUANTITY(bh_raw_arm, momentum_resolution, BH_DIM_SHARE), .group = RESOLUTION, .least = "0 %",
     .fallback = "0 %", .meaning = "rms resolution of the momentum", .example = "0.01 %"},
    {QUANTITY(bh_raw_arm, energy_resolution, BH_DIM_ENERGY), .group = RESOLUTION, .least = "0 keV",
     .most = "1e30 MeV", .fallback = "0 keV", .meaning = "rms resolution of the energy",
     .example = "20 keV"},
    {QUANTITY(bh_raw_arm, threshold, BH_DIM_ENERGY), .least = "0 MeV", .most = "1e30 MeV",
     .fallback = "0 MeV", .meaning = "least kinetic energy that it detects, on arrival",
     .example = "1 MeV"},
    {QUANTITY(bh_raw_arm, pointing, BH_DIM_ANGLE), .least = "-90 deg", .most = "90 deg",
     .fallback = "0 mrad", .meaning = "how well its angle is known: the uncertainty counts",
     .example = "0 ± 0.2 mrad"},
    {QUANTITY(bh_raw_arm, efficiency, BH_DIM_SHARE), .above = "0 %", .most = "100 %",
     .fallback = "100 %", .meaning = "share of the particles in the acceptance that it detects",
     .example = "95 %"},
    {QUANTITY(bh_raw_arm, dead_time, BH_DIM_TIME), .least = "0 s", .most = "1e30 s",
     .fallback = "0 s", .meaning = "dead time for each recorded event", .example = "5 us"},
    {WORD(bh_raw_arm, dead_time_model, bh_words_dead_time_model), .fallback = "non-paralysable",
     .meaning = "whether events during the dead time prolong it", .example = "paralysable"},
    {QUANTITY(bh_raw_arm, rate_limit, BH_DIM_RATE), .above = "0 Hz", .most = "1e50 /s",
     .meaning = "what the readout records at most", .example = "4 kHz"},
    {COUNT(bh_raw_arm, prescale), .least = "1", .most = "1000000000", .fallback = "1",
     .meaning = "one of so many triggers is recorded", .example = "10"},
    {QUANTITY(bh_raw_arm, other_rate, BH_DIM_RATE), .least = "0 Hz", .most = "1e50 /s",
     .fallback = "0 Hz", .meaning = "triggers from what is not computed", .example = "100 Hz"},
};
const bh_schema bh_schema_arm = {"an arm", sizeof(bh_raw_arm), ROWS(arm_keys), 0, 0};

/* --- models --- */

static const char *const words_process[] = {"elastic",         "moller",         "bhabha",
                                            "atomic-electron", "muon-pair",      "two-photon",
                                            "quasi-elastic",   "deep-inelastic", NULL};
static const char *const words_coulomb[] = {"default", "plane-wave", "second-born", "partial-wave",
                                            NULL};
static const char *const words_radiative[] = {"default", "none",         "schwinger",
                                              "mo-tsai", "maximon-tjon", NULL};
static const char *const words_loss[] = {"full", "none", NULL};

static const bh_key models_keys[] = {
    {WORD(bh_raw_models, process, words_process), .fallback = "elastic",
     .meaning = "what happens between beam particle and scatterer", .example = "elastic"},
    {KEY(bh_raw_models, structure, BH_KEY_TABLE), .item = BH_KEY_TEXT, .flags = BH_KEY_OR_WORD,
     .fallback = "default",
     .meaning = "form factor or density: one name, or by nuclide; point switches it off; "
                "`beamhours models` lists the names",
     .example = "{1H: kelly-2004, 12C: fourier-bessel}"},
    {WORD(bh_raw_models, coulomb, words_coulomb), .fallback = "default",
     .meaning = "distortion by the Coulomb field", .example = "plane-wave"},
    {WORD(bh_raw_models, radiative, words_radiative), .fallback = "default",
     .meaning = "internal radiative correction", .example = "none"},
    {WORD(bh_raw_models, energy_loss, words_loss), .fallback = "full",
     .meaning = "energy loss of beam and detected particle in the layers", .example = "none"},
};
const bh_schema bh_schema_models = {"the models", sizeof(bh_raw_models), ROWS(models_keys), 0, 0};

/* --- settings --- */

static const char *const words_goal_for[] = {"acceptance", "each-bin", NULL};

enum { PLACE = 1, WANT = 2, WHO = 3 };

const char *const bh_words_angle[] = {"conjugate", NULL};

/* The same rows for a setting of one arm and for each arm of a setting; `at` leads to the member.
 */
#define AIM(type, member, at, what) \
    .name = #member, .kind = (what), .offset = offsetof(type, at member)
#define AIM_ROWS(type, at)                                                                        \
    {AIM(type, angle, at, BH_KEY_SWEEP),                                                          \
     .dimension = BH_DIM_ANGLE,                                                                   \
     .group = PLACE,                                                                              \
     .least = "0 deg",                                                                            \
     .most = "180 deg",                                                                           \
     .words = bh_words_angle,                                                                     \
     .meaning = "of the arm's axis from the beam; left out for a ring and a fixed arm; "          \
                "conjugate: where the partner of the particle in the middle of the other "        \
                "arm goes",                                                                       \
     .example = "30 deg"},                                                                        \
        {AIM(type, q2, at, BH_KEY_SWEEP),                                                         \
         .dimension = BH_DIM_Q2,                                                                  \
         .group = PLACE,                                                                          \
         .above = "0 GeV2",                                                                       \
         .meaning = "four-momentum transfer squared that the angle follows from",                 \
         .example = "0.6 GeV2"},                                                                  \
        {AIM(type, central_momentum, at, BH_KEY_QUANTITY),                                        \
         .dimension = BH_DIM_MOMENTUM,                                                            \
         .above = "0 MeV/c",                                                                      \
         .most = "1e30 MeV/c",                                                                    \
         .meaning = "that the arm is set to; default: the detected particle's at the central "    \
                    "angle, after losses",                                                        \
         .example = "700 MeV/c"},                                                                 \
        {AIM(type, goal, at, BH_KEY_QUANTITY),                                                    \
         .dimension = BH_DIM_SHARE,                                                               \
         .group = WANT,                                                                           \
         .above = "0 %",                                                                          \
         .most = "100 %",                                                                         \
         .meaning = "relative statistical uncertainty of the signal that is wanted",              \
         .example = "1 %"},                                                                       \
        {AIM(type, time, at, BH_KEY_QUANTITY),                                                    \
         .dimension = BH_DIM_TIME,                                                                \
         .group = WANT,                                                                           \
         .above = "0 s",                                                                          \
         .most = "1e30 s",                                                                        \
         .meaning = "time with full target",                                                      \
         .example = "2 h"},                                                                       \
        {AIM(type, charge, at, BH_KEY_QUANTITY),                                                  \
         .dimension = BH_DIM_CHARGE,                                                              \
         .group = WANT,                                                                           \
         .above = "0 C",                                                                          \
         .most = "1e30 C",                                                                        \
         .meaning = "beam charge on the full target",                                             \
         .example = "20 mC"},                                                                     \
        {AIM(type, counts, at, BH_KEY_COUNT), .group = WANT, .least = "1",                        \
         .meaning = "signal counts wanted", .example = "10000"},                                  \
        {AIM(type, goal_for, at, BH_KEY_WORD), .words = words_goal_for, .fallback = "acceptance", \
         .meaning = "what the goal holds for: the whole acceptance, or each-bin: the worst bin "  \
                    "reaches it",                                                                 \
         .example = "each-bin"},                                                                  \
    {                                                                                             \
        AIM(type, prescale, at, BH_KEY_COUNT), .least = "1", .most = "1000000000",                \
                                               .meaning = "in the place of the arm's own",        \
                                               .example = "10"                                    \
    }

static const bh_key aim_keys[] = {
    {AIM(bh_raw_aim, arm, , BH_KEY_NAME),
     .meaning = "which arm; may be left out where there is one", .example = "A"},
    AIM_ROWS(bh_raw_aim, ),
};
const bh_schema bh_schema_aim = {"an arm of a setting", sizeof(bh_raw_aim), ROWS(aim_keys), 0, 0};

static const bh_key coincidence_keys[] = {
    {KEY(bh_raw_coincidence, arms, BH_KEY_WORDS), .flags = BH_KEY_REQUIRED | BH_KEY_NOT_EMPTY,
     .meaning = "the two arms; bins are those of the first", .example = "[A, B]"},
    {QUANTITY(bh_raw_coincidence, window, BH_DIM_TIME), .flags = BH_KEY_REQUIRED, .above = "0 s",
     .meaning = "time by which the two may differ, from the earliest to the latest",
     .example = "30 ns"},
};
const bh_schema bh_schema_coincidence = {"a coincidence", sizeof(bh_raw_coincidence),
                                         ROWS(coincidence_keys), 0, 0};

static const bh_key setting_keys[] = {
    {NAME(bh_raw_setting, name), .meaning = "what tables call it; default: its number",
     .example = "K1"},
    {AIM(bh_raw_setting, arm, aim., BH_KEY_NAME), .group = WHO,
     .meaning = "which arm; may be left out where there is one", .example = "A"},
    AIM_ROWS(bh_raw_setting, aim.),
    {LIST(bh_raw_setting, arms, bh_schema_aim), .group = WHO, .flags = BH_KEY_NOT_EMPTY,
     .meaning = "several arms at once: a row each, the same hours; the slowest goal decides",
     .example = "[{arm: A, angle: 40 deg, goal: 1 %}, {arm: B, angle: 25 deg}]"},
    {PART(bh_raw_setting, coincidence, bh_schema_coincidence),
     .meaning = "both particles of an event in two of its arms: a row more, which goal, time, "
                "charge or counts of the setting are then for",
     .example = "{arms: [A, B], window: 30 ns}"},
    {NAME(bh_raw_setting, target), .meaning = "which target; may be left out where there is one",
     .example = "hydrogen"},
    {QUANTITY(bh_raw_setting, tilt, BH_DIM_ANGLE), .least = "-89 deg", .most = "89 deg",
     .meaning = "in the place of the target's own", .example = "30 deg"},
    {PART(bh_raw_setting, beam, bh_schema_beam), .flags = BH_KEY_OVERRIDE,
     .meaning = "any key of the beam, in the place of the plan's; one of an exactly-one-of group "
                "replaces the others",
     .example = "{total_energy: 600 MeV, current: 10 uA}"},
    {WORD(bh_raw_setting, process, words_process), .meaning = "in the place of the models'",
     .example = "elastic"},
};
const bh_schema bh_schema_setting = {"a setting", sizeof(bh_raw_setting), ROWS(setting_keys), 0, 0};

/* --- schedule --- */

static const bh_key changes_keys[] = {
    {QUANTITY(bh_raw_changes, energy, BH_DIM_TIME), .least = "0 s", .most = "1e30 s",
     .fallback = "0 s", .meaning = "to change the beam energy", .example = "8 h"},
    {QUANTITY(bh_raw_changes, particle, BH_DIM_TIME), .least = "0 s", .most = "1e30 s",
     .fallback = "0 s", .meaning = "to change the beam particle", .example = "6 h"},
    {QUANTITY(bh_raw_changes, target, BH_DIM_TIME), .least = "0 s", .most = "1e30 s",
     .fallback = "0 s", .meaning = "to change the target", .example = "20 min"},
    {QUANTITY(bh_raw_changes, angle, BH_DIM_TIME), .least = "0 s", .most = "1e30 s",
     .fallback = "0 s", .meaning = "to move arms", .example = "30 min"},
};
static const bh_schema changes_schema = {"the changes", sizeof(bh_raw_changes), ROWS(changes_keys),
                                         0, 0};

static const char *const words_beam[] = {"needed", "none", NULL};
const char *const bh_words_every[] = {"once",    "energy", "particle", "target",
                                      "setting", "shift",  NULL};
static const bh_key task_keys[] = {
    {TEXT(bh_raw_task, name), .flags = BH_KEY_REQUIRED, .meaning = "what totals call it",
     .example = "optics"},
    {QUANTITY(bh_raw_task, time, BH_DIM_TIME), .flags = BH_KEY_REQUIRED, .least = "0 s",
     .most = "1e30 s", .meaning = "how long it takes each time", .example = "8 h"},
    {KEY(bh_raw_task, every, BH_KEY_EITHER), .dimension = BH_DIM_TIME, .words = bh_words_every,
     .above = "0 s", .fallback = "once",
     .meaning = "when it is due: once, at each new energy, particle, target, setting or shift, or "
                "after a time",
     .example = "energy"},
    {WORD(bh_raw_task, beam, words_beam), .fallback = "needed", .meaning = "whether it needs beam",
     .example = "none"},
};
const bh_schema bh_schema_task = {"a task", sizeof(bh_raw_task), ROWS(task_keys), 0, 0};

static const char *const words_as[] = {"calendar", "beam", NULL};
static const bh_key schedule_keys[] = {
    {QUANTITY(bh_raw_schedule, available, BH_DIM_TIME), .above = "0 s", .most = "1e30 s",
     .meaning = "time that is granted or asked for", .example = "14 d"},
    {WORD(bh_raw_schedule, available_as, words_as), .fallback = "calendar",
     .meaning = "what `available` counts: scheduled time, or beam time alone", .example = "beam"},
    {QUANTITY(bh_raw_schedule, availability, BH_DIM_SHARE), .above = "0 %", .most = "100 %",
     .fallback = "100 %", .meaning = "usable beam per scheduled time", .example = "60 %"},
    {QUANTITY(bh_raw_schedule, shift, BH_DIM_TIME), .above = "0 s", .most = "1e30 s",
     .fallback = "8 h", .meaning = "length of a shift", .example = "8 h"},
    {QUANTITY(bh_raw_schedule, week, BH_DIM_TIME), .above = "0 s", .most = "168 h",
     .fallback = "168 h", .meaning = "scheduled hours that the facility counts as a week",
     .example = "125 h"},
    {QUANTITY(bh_raw_schedule, start_up, BH_DIM_TIME), .least = "0 s", .most = "1e30 s",
     .fallback = "0 s", .meaning = "time before the first setting", .example = "16 h"},
    {PART(bh_raw_schedule, changes, changes_schema), .meaning = "times between settings",
     .example = "{energy: 8 h, angle: 30 min}"},
    {LIST(bh_raw_schedule, tasks, bh_schema_task), .flags = BH_KEY_UNIQUE,
     .meaning = "what else takes time", .example = "[{name: optics, time: 8 h, every: energy}]"},
    {QUANTITY(bh_raw_schedule, contingency, BH_DIM_SHARE), .least = "0 %", .most = "1000 %",
     .fallback = "0 %", .meaning = "reserve, as a share of the scheduled time; on its own line",
     .example = "10 %"},
};
const bh_schema bh_schema_schedule = {"the schedule", sizeof(bh_raw_schedule), ROWS(schedule_keys),
                                      0, 0};

/* --- the plan --- */

enum { TARGETS = 1 };
static const bh_key plan_keys[] = {
    {COUNT(bh_raw_plan, plan), .flags = BH_KEY_REQUIRED, .meaning = "version of the format",
     .example = "1"},
    {TEXT(bh_raw_plan, title), .meaning = "one line above tables and reports",
     .example = "\"Proton form factors, first pass\""},
    {TEXT(bh_raw_plan, notes), .meaning = "free text, carried into the report",
     .example = "\"Energies as agreed in March\""},
    {PART(bh_raw_plan, beam, bh_schema_beam), .flags = BH_KEY_REQUIRED,
     .meaning = "what hits the target",
     .example = "{particle: electron, kinetic_energy: 855 MeV, current: 20 uA}"},
    {LIST(bh_raw_plan, targets, bh_schema_target), .group = TARGETS,
     .flags = BH_KEY_UNIQUE | BH_KEY_NOT_EMPTY, .meaning = "all targets",
     .example = "[{name: carbon, layers: [{material: graphite, thickness: 1 mm}]}]"},
    {PART(bh_raw_plan, target, bh_schema_target), .group = TARGETS,
     .meaning = "the target where there is one",
     .example = "{layers: [{material: graphite, thickness: 1 mm}]}"},
    {LIST(bh_raw_plan, arms, bh_schema_arm),
     .flags = BH_KEY_REQUIRED | BH_KEY_UNIQUE | BH_KEY_NOT_EMPTY,
     .meaning = "spectrometers and detectors",
     .example = "[{name: A, in_plane: ±28 mrad, out_of_plane: ±70 mrad}]"},
    {PART(bh_raw_plan, models, bh_schema_models), .meaning = "which physics is computed, and how",
     .example = "{structure: kelly-2004}"},
    {PART(bh_raw_plan, every_setting, bh_schema_setting),
     .meaning = "what settings need not repeat: any key of a setting but its name",
     .example = "{arm: A, goal: 0.5 %}"},
    {LIST(bh_raw_plan, settings, bh_schema_setting),
     .flags = BH_KEY_REQUIRED | BH_KEY_UNIQUE | BH_KEY_NOT_EMPTY,
     .meaning = "what machine and arms are set to, one after the other",
     .example = "[{name: K1, angle: 25 deg}]"},
    {PART(bh_raw_plan, schedule, bh_schema_schedule), .meaning = "beam time and all around it",
     .example = "{available: 14 d}"},
};
const bh_schema bh_schema_plan = {"the plan", sizeof(bh_raw_plan), ROWS(plan_keys), 1U << TARGETS,
                                  0};
