/* cmd_help.c - beamhours help: the manual page, or, where it cannot be opened, the options. */
#include <stdlib.h>
#include <string.h>
#include <sys/wait.h>
#include <unistd.h>

#include "beamhours/base/text.h"
#include "beamhours/command/options.h"
#include "beamhours/command/places.h"

/* The page beside the program: share/man of an installation, docs of the source tree. */
static bool find_page(bh_text *path)
{
    static const char *const where[] = {"../man/man1/beamhours.1", "docs/beamhours.1"};
    char *data = bh_places_data();
    bool found = false;
    for (size_t i = 0; data && !found && i < sizeof where / sizeof where[0]; i++) {
        path->length = 0;
        bh_text_appendf(path, "%s/%s", data, where[i]);
        found = !path->failed && access(path->bytes, R_OK) == 0;
    }
    free(data);
    return found;
}

static bool show_page(const char *path)
{
    (void)fflush(stdout);
    const pid_t child = fork();
    if (child == 0) {
        (void)execlp("man", "man", path, (char *)NULL);
        _exit(127);
    }
    int status = 0;
    if (child < 0 || waitpid(child, &status, 0) < 0)
        return false;
    return WIFEXITED(status) && WEXITSTATUS(status) == 0;
}

static int no_command(const bh_arguments *arguments)
{
    char sentence[200];
    const char *word = arguments->words[0], *near = bh_command_suggest(word);
    (void)snprintf(sentence, sizeof sentence, "no command \"%.60s\"; %s%s%s", word,
                   near ? "did you mean " : "`beamhours --help` lists them", near ? near : "",
                   near ? "?" : "");
    return bh_usage(arguments, sentence);
}

int bh_cmd_help(const bh_arguments *arguments)
{
    if (arguments->word_count > 1)
        return bh_usage(arguments, "takes one command at most");
    int about = -1;
    if (arguments->word_count) {
        about = bh_command_find(arguments->words[0]);
        if (about < 0)
            return no_command(arguments);
    }
    bh_text path = {0};
    const bool shown = isatty(STDOUT_FILENO) && find_page(&path) && show_page(path.bytes);
    bh_text_free(&path);
    if (shown)
        return 0;
    if (about >= 0)
        bh_options_help_command((bh_command_id)about, stdout);
    else
        bh_options_help(stdout);
    return 0;
}
