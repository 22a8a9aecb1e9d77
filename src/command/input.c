/* input.c - reading is done once; changes and evaluation may be asked for again. */
#include "beamhours/command/input.h"

#include <stdlib.h>
#include <string.h>
#include <sysexits.h>

#include "beamhours/base/file.h"
#include "beamhours/command/complain.h"
#include "beamhours/command/places.h"
#include "beamhours/command/waiting.h"

enum { MOST_BYTES = 1024 * 1024 };

static int no_memory(void)
{
    const bh_error err = {.code = BH_ENOMEM};
    return bh_complain(stderr, &err);
}

int bh_input_open(const char *name, bh_input *in)
{
    bh_error err = {.code = BH_OK};
    *in = (bh_input){.name = name, .shown = bh_plain(name)};
    const bh_code bad = strcmp(name, "-") == 0 ? bh_file_read_stream(stdin, "standard input",
                                                                     MOST_BYTES, &in->bytes, &err)
                                               : bh_file_read(name, MOST_BYTES, &in->bytes, &err);
    if (bad)
        return bh_complain(stderr, &err);
    char **folders = bh_places_materials(name);
    in->library = folders ? bh_material_library_new((const char *const *)folders) : NULL;
    bh_places_free(folders);
    return in->library ? 0 : no_memory();
}

void bh_input_close(bh_input *in)
{
    bh_table_free(in->table);
    bh_plan_free(in->plan);
    bh_diags_free(in->diags);
    bh_material_library_free(in->library);
    bh_text_free(&in->bytes);
    free(in->shown);
    *in = (bh_input){0};
}

void bh_say_diags(FILE *to, const bh_diags *diags)
{
    for (size_t i = 0; i < bh_diags_count(diags); i++) {
        const bh_diag *d = bh_diags_at(diags, i);
        const char *kind = d->severity == BH_SEVERITY_WARNING ? "warning: " : "";
        if (d->at.line > 0)
            bh_print(to, "%s:%d:%d: %s%s: %s\n", d->at.file, d->at.line, d->at.column, kind, d->key,
                     d->text);
        else
            bh_print(to, "%s: %s%s: %s\n", d->at.file ? d->at.file : "-", kind, d->key, d->text);
    }
}

int bh_input_changes(const bh_arguments *arguments, bh_change *changes, char **keys)
{
    for (int i = 0; i < arguments->with_count; i++) {
        const char *equals = strchr(arguments->with[i], '=');
        keys[i] = strndup(arguments->with[i], (size_t)(equals - arguments->with[i]));
        if (!keys[i])
            return no_memory();
        changes[i] = (bh_change){keys[i], equals + 1};
    }
    return 0;
}

int bh_input_plan(bh_input *in, const bh_arguments *arguments)
{
    bh_change changes[BH_MOST_CHANGES];
    char *keys[BH_MOST_CHANGES] = {NULL};
    const size_t count = arguments ? (size_t)arguments->with_count : 0;
    int status = arguments ? bh_input_changes(arguments, changes, keys) : 0;
    bh_table_free(in->table);
    in->table = NULL;
    bh_plan_free(in->plan);
    in->plan = NULL;
    bh_diags_free(in->diags);
    in->diags = bh_diags_new();
    if (status == 0 && !in->diags)
        status = no_memory();
    if (status == 0) {
        in->plan =
            bh_plan_read(in->bytes.bytes ? in->bytes.bytes : "", in->bytes.length,
                         in->shown ? in->shown : in->name, changes, count, in->library, in->diags);
        if (!in->plan) {
            bh_say_diags(stderr, in->diags);
            status = bh_diags_count(in->diags) ? EX_DATAERR : no_memory();
        }
    }
    for (size_t i = 0; i < count; i++)
        free(keys[i]);
    return status;
}

int bh_input_evaluate(bh_input *in, const bh_evaluation *wanted)
{
    bh_error err = {.code = BH_OK};
    bh_waiting waiting;
    bh_waiting_begin(&waiting, stderr);
    const bh_evaluation how = {.bins = wanted->bins,
                               .without_changes = wanted->without_changes,
                               .progress = &waiting.progress};
    in->table = bh_table_new(in->plan, &how, in->diags, &err);
    bh_waiting_end(&waiting);
    return in->table ? 0 : bh_complain(stderr, &err);
}

int bh_input_table(const char *name, const bh_arguments *arguments, const bh_evaluation *wanted,
                   bh_input *in)
{
    int status = bh_input_open(name, in);
    if (status == 0)
        status = bh_input_plan(in, arguments);
    return status == 0 ? bh_input_evaluate(in, wanted) : status;
}

void bh_say_cautions(FILE *to, const bh_table *table)
{
    for (size_t i = 0; i < bh_table_cautions(table); i++) {
        const bh_caution *c = bh_table_caution(table, i);
        bh_print(to, "%s:%d:%d: caution: %s: %s\n", c->at.file ? c->at.file : "-", c->at.line,
                 c->at.column, c->key, c->text);
    }
}

static int to_stdout(const bh_text *text)
{
    if (text->length && fwrite(text->bytes, 1, text->length, stdout) != text->length)
        return EX_IOERR;
    return 0; /* main flushes, and says what went wrong */
}

int bh_output(bh_text *text, const char *path)
{
    bh_error err = {.code = BH_OK};
    int status = 0;
    if (text->failed)
        status = no_memory();
    else if (!path)
        status = to_stdout(text);
    else if (bh_file_write(path, text->bytes ? text->bytes : "", text->length, &err))
        status = bh_complain(stderr, &err);
    bh_text_free(text);
    return status;
}
