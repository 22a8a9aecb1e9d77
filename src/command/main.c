/* main.c - one table of commands; nothing here computes anything. */
#include <gsl/gsl_errno.h>
#include <stdio.h>
#include <string.h>
#include <sysexits.h>

#include "beamhours.h"
#include "beamhours/command/complain.h"
#include "beamhours/command/options.h"

static int (*const functions[])(const bh_arguments *) = {
#define FUNCTION(id, name, behind, summary, run) run,
    BH_COMMANDS(FUNCTION)
#undef FUNCTION
};

static int introduce(void)
{
    fputs("beamhours: how many hours of beam a fixed-target scattering experiment needs, and why.\n"
          "  beamhours plans                     the demonstration plans\n"
          "  beamhours new my.yaml               a short plan of your own that already computes\n"
          "  beamhours table my.yaml             its run table\n"
          "  beamhours explain my.yaml SETTING   where each number of a row comes from\n"
          "  beamhours --help                    all commands; beamhours help: the manual\n",
          stdout);
    return EX_OK;
}

static int unknown(const char *word)
{
    const char *near = word[0] == '-' ? NULL : bh_command_suggest(word);
    bh_print(stderr, "beamhours: no %s \"%s\"%s%s%s\n", word[0] == '-' ? "option" : "command", word,
             near ? "; did you mean " : "", near ? near : "", near ? "?" : "");
    fputs("beamhours: try: beamhours --help\n", stderr);
    return EX_USAGE;
}

static int dispatch(int argc, char **argv)
{
    if (argc < 2)
        return introduce();
    if (strcmp(argv[1], "--help") == 0) {
        bh_options_help(stdout);
        return EX_OK;
    }
    if (strcmp(argv[1], "--version") == 0)
        return printf("beamhours %s\n", bh_version()) < 0 ? EX_IOERR : EX_OK;
    const int command = bh_command_find(argv[1]);
    if (command < 0)
        return unknown(argv[1]);
    bh_arguments arguments;
    const int bad = bh_arguments_read((bh_command_id)command, argc - 2, argv + 2, &arguments);
    if (bad)
        return bad;
    if (arguments.value[BH_OPT_HELP]) {
        bh_options_help_command((bh_command_id)command, stdout);
        return EX_OK;
    }
    if (arguments.value[BH_OPT_VERSION])
        return printf("beamhours %s\n", bh_version()) < 0 ? EX_IOERR : EX_OK;
    return functions[command](&arguments);
}

static int flushed(int status)
{
    if (fflush(stdout) == 0 && !ferror(stdout))
        return status;
    perror("beamhours: standard output");
    return EX_IOERR;
}

int main(int argc, char **argv)
{
    (void)gsl_set_error_handler_off(); /* called nowhere else in the program: GSL reports, never
                                          aborts */
    return flushed(dispatch(argc, argv));
}
