/* options.h - the one list of commands and options: parsing, --help, manual and completions. */
#ifndef BH_COMMAND_OPTIONS_H
#define BH_COMMAND_OPTIONS_H

#include <stdbool.h>
#include <stddef.h>
#include <stdio.h>

/* X(id, name, what stands behind it, summary, function) */
#define BH_COMMANDS(X)                                                                             \
    X(BH_CMD_NEW, "new", "FILE", "write a short plan that already computes", bh_cmd_new)           \
    X(BH_CMD_PLANS, "plans", "[DEMO]", "list the demonstration plans, or print one", bh_cmd_plans) \
    X(BH_CMD_KEYS, "keys", "[KEY]", "what a plan file can say; columns: a run table", bh_cmd_keys) \
    X(BH_CMD_CHECK, "check", "PLAN...", "errors and warnings of plans, nothing else",              \
      bh_cmd_check)                                                                                \
    X(BH_CMD_TABLE, "table", "PLAN", "the run table", bh_cmd_table)                                \
    X(BH_CMD_EXPLAIN, "explain", "PLAN SETTING", "one row, number by number", bh_cmd_explain)      \
    X(BH_CMD_POINT, "point", "", "one point without a plan", bh_cmd_point)                         \
    X(BH_CMD_CURVE, "curve", "PLAN", "a column against angle, energy, q2 or epsilon",              \
      bh_cmd_curve)                                                                                \
    X(BH_CMD_SOLVE, "solve", "PLAN SETTING KEY=VALUE",                                             \
      "what it would take: the input that gives a wanted output", bh_cmd_solve)                    \
    X(BH_CMD_REPORT, "report", "PLAN", "the beam-time section of a proposal", bh_cmd_report)       \
    X(BH_CMD_SCHEDULE, "schedule", "PLAN",                                                         \
      "settings in run order: clock, what to dial, where to stop", bh_cmd_schedule)                \
    X(BH_CMD_COMPARE, "compare", "PLAN PLAN", "what changed: inputs, rates, hours, uncertainties", \
      bh_cmd_compare)                                                                              \
    X(BH_CMD_EDIT, "edit", "[PLAN]", "change a plan on the screen and see the run table follow",   \
      bh_cmd_edit)                                                                                 \
    X(BH_CMD_MATERIALS, "materials", "[NAME]",                                                     \
      "the library of materials; what one does to a particle", bh_cmd_materials)                   \
    X(BH_CMD_MODELS, "models", "[NAME]", "processes and models: range and source", bh_cmd_models)  \
    X(BH_CMD_HELP, "help", "[COMMAND]", "open the manual page", bh_cmd_help)

typedef enum {
#define BH_COMMAND_ID(id, name, behind, summary, run) id,
    BH_COMMANDS(BH_COMMAND_ID)
#undef BH_COMMAND_ID
        BH_COMMAND_COUNT
} bh_command_id;

#define BH_EVERY_COMMAND                                                                           \
    "new,plans,keys,check,table,explain,point,curve,solve,report,schedule,compare,edit,materials," \
    "models,"                                                                                      \
    "help"

/* X(id, short letter or 0, long name, argument or "", commands that know it, values to complete,
 * meaning).  Commands and values are lists with commas; `file` completes files. */
#define BH_OPTIONS(X)                                                                              \
    X(BH_OPT_WITH, 0, "with", "KEY=VALUE",                                                         \
      "check,table,explain,curve,solve,report,schedule,compare", "",                               \
      "change one value for this run only (repeatable)")                                           \
    X(BH_OPT_BINS, 0, "bins", "", "table", "", "one row a bin")                                    \
    X(BH_OPT_COLUMNS, 0, "columns", "KEY,...", "table", "", "only these columns, in this order")   \
    X(BH_OPT_SORT, 0, "sort", "KEY", "table", "", "order rows by a column; -KEY: falling")         \
    X(BH_OPT_ONLY, 0, "only", "SETTING,...", "table", "", "only these settings")                   \
    X(BH_OPT_BEFORE_AFTER, 0, "against", "", "table", "",                                          \
      "show each row before and after the changes of --with")                                      \
    X(BH_OPT_ARM, 0, "arm", "ARM", "explain,curve,solve", "",                                      \
      "the arm, where a setting has several")                                                      \
    X(BH_OPT_BIN, 0, "bin", "N", "explain", "", "a bin of the arm, counted from 1")                \
    X(BH_OPT_LIKE, 0, "like", "DEMO", "new", "", "copy this demonstration instead")                \
    X(BH_OPT_SETTING, 0, "setting", "NAME", "curve", "", "the setting to start from")              \
    X(BH_OPT_AGAINST, 0, "against", "VARIABLE", "curve", "angle,energy,q2,epsilon",                \
      "what varies: angle (default), energy, q2, epsilon")                                         \
    X(BH_OPT_SHOW, 0, "show", "KEY", "curve", "",                                                  \
      "the column to show (default: point_cross_section_ub_per_sr)")                               \
    X(BH_OPT_BY, 0, "by", "INPUT", "solve", "angle,current,energy,thickness,solid-angle",          \
      "what may move: one of these, or a path such as beam.current")                               \
    X(BH_OPT_FROM, 0, "from", "VALUE", "solve", "", "the least value of it to try")                \
    X(BH_OPT_TO, 0, "to", "VALUE", "solve", "", "the largest value of it to try")                  \
    X(BH_OPT_PARTICLE, 'p', "particle", "P", "point,materials",                                    \
      "electron,positron,muon-,muon+,pion-,pion+,proton,deuteron,triton,helion,alpha",             \
      "the beam particle, or the one that passes")                                                 \
    X(BH_OPT_SCATTERER, 0, "scatterer", "NUCLIDE", "point", "", "what is struck, such as 12C")     \
    X(BH_OPT_KINETIC, 'E', "kinetic-energy", "E", "point,materials", "", "its kinetic energy")     \
    X(BH_OPT_TOTAL, 0, "total-energy", "E", "point", "", "beam total energy")                      \
    X(BH_OPT_MOMENTUM, 0, "momentum", "P", "point", "", "beam momentum")                           \
    X(BH_OPT_ANGLE, 'a', "angle", "A", "point", "", "lab angle of the detected particle")          \
    X(BH_OPT_Q2, 0, "q2", "Q2", "point", "", "four-momentum transfer squared")                     \
    X(BH_OPT_EPSILON, 0, "epsilon", "N", "point", "", "virtual-photon polarisation")               \
    X(BH_OPT_STRUCTURE, 0, "structure", "NAME", "point,curve", "", "structure model (curve: A,B)") \
    X(BH_OPT_COULOMB, 0, "coulomb", "NAME", "point,curve", "default,plane-wave",                   \
      "Coulomb model (curve: A,B)")                                                                \
    X(BH_OPT_DATA, 0, "data", "FILE", "curve", "file", "draw published points from a CSV table")   \
    X(BH_OPT_RADIATIVE, 0, "radiative", "NAME", "point",                                           \
      "default,none,schwinger,mo-tsai,maximon-tjon", "internal radiative correction")              \
    X(BH_OPT_ENERGY_CUT, 0, "energy-cut", "E", "point", "",                                        \
      "energy that unseen photons may take, below the elastic line")                               \
    X(BH_OPT_PROCESS, 0, "process", "NAME", "point", "elastic", "process (default: elastic)")      \
    X(BH_OPT_DETECTS, 0, "detects", "WHICH", "point", "scattered,recoil",                          \
      "whose angle is meant: scattered (default) or recoil")                                       \
    X(BH_OPT_CURRENT, 0, "current", "I", "point", "", "beam current, for a rate")                  \
    X(BH_OPT_MATERIAL, 0, "material", "NAME", "point", "", "target material, for a rate")          \
    X(BH_OPT_THICKNESS, 0, "thickness", "D", "point", "", "its thickness, for a rate")             \
    X(BH_OPT_SOLID_ANGLE, 0, "solid-angle", "W", "point", "", "solid angle, for a rate")           \
    X(BH_OPT_TABLE_FORMAT, 'f', "format", "FORMAT", "table", "text,csv,json,latex,markdown",       \
      "text (default), csv, json, latex or markdown")                                              \
    X(BH_OPT_LIST_FORMAT, 'f', "format", "FORMAT", "point,materials,models", "text,json",          \
      "text (default) or json")                                                                    \
    X(BH_OPT_CURVE_FORMAT, 'f', "format", "FORMAT", "curve", "text,csv,svg,pdf,png",               \
      "text (default), csv, or a figure: svg, pdf, png")                                           \
    X(BH_OPT_START, 0, "start", "TIME", "schedule", "",                                            \
      "when beam time begins: '2026-03-01 08:00'")                                                 \
    X(BH_OPT_SCHEDULE_FORMAT, 'f', "format", "FORMAT", "schedule", "text,markdown,csv,json",       \
      "text (default), markdown, csv or json")                                                     \
    X(BH_OPT_COMPARE_FORMAT, 'f', "format", "FORMAT", "compare", "text,json,markdown",             \
      "text (default), json or markdown")                                                          \
    X(BH_OPT_OUTPUT, 'o', "output", "FILE", "table,curve,report,schedule,compare", "file",         \
      "write to FILE, whole or not at all")                                                        \
    X(BH_OPT_PAPER, 0, "paper", "SIZE", "report", "a4,letter", "a4 (default) or letter")           \
    X(BH_OPT_FRAGMENT, 0, "fragment", "", "report", "",                                            \
      "of LaTeX only what goes into another document")                                             \
    X(BH_OPT_ASCII, 0, "ascii", "", "edit", "", "draw with plain letters only")                    \
    X(BH_OPT_HELP, 0, "help", "", BH_EVERY_COMMAND, "", "what the command does and its options")   \
    X(BH_OPT_VERSION, 0, "version", "", BH_EVERY_COMMAND, "", "the edition of the program")

typedef enum {
#define BH_OPTION_ID(id, letter, name, argument, commands, values, meaning) id,
    BH_OPTIONS(BH_OPTION_ID)
#undef BH_OPTION_ID
        BH_OPTION_COUNT
} bh_option_id;

enum { BH_MOST_CHANGES = 64 };

/* A command line taken apart; strings are argv's. */
typedef struct {
    bh_command_id command;
    const char
        *value[BH_OPTION_COUNT];       /* what was given; "" for an option without argument; NULL */
    const char *with[BH_MOST_CHANGES]; /* every --with, in order */
    int with_count;
    char **words; /* what is no option, in order */
    int word_count;
} bh_arguments;

/* Takes argv[1..] of `command` apart (argv is reordered).  Returns 0, or 64 after saying on
 * standard error what is wrong and what would do. */
int bh_arguments_read(bh_command_id command, int argc, char **argv, bh_arguments *out);

/* The value chosen with a --format option, "text" where none was; NULL after saying on standard
 * error which formats this option has. */
const char *bh_arguments_format(const bh_arguments *arguments, bh_option_id id);

/* Says what is wrong with the use of a command, and how to learn more.  Returns 64. */
int bh_usage(const bh_arguments *arguments, const char *sentence);

/* The same of one option's value. */
int bh_usage_option(const bh_arguments *arguments, bh_option_id id, const char *sentence);

/* Writes the list of commands, or the options of one. */
void bh_options_help(FILE *to);
void bh_options_help_command(bh_command_id command, FILE *to);

/* Name of a command; its id from the name, or -1; the nearest name or NULL. */
const char *bh_command_name(bh_command_id id);
int bh_command_find(const char *name);
const char *bh_command_suggest(const char *name);

/* The commands: each returns the exit status (docs/beamhours.1). */
#define BH_COMMAND_FUNCTION(id, name, behind, summary, run) int run(const bh_arguments *arguments);
BH_COMMANDS(BH_COMMAND_FUNCTION)
#undef BH_COMMAND_FUNCTION

#endif
