/* cmd_curve.c - beamhours curve PLAN: a column against what varies, listed or drawn. */
#include <string.h>
#include <sysexits.h>
#include <unistd.h>

#include "beamhours.h"
#include "beamhours/base/file.h"
#include "beamhours/command/complain.h"
#include "beamhours/command/input.h"
#include "beamhours/command/places.h"
#include "beamhours/report/curve_figure.h"

enum { LONGEST_DATA = 1 << 20, DRAWN_POINTS = 181 };

/* What was asked for, and what came of it. */
struct job {
    const bh_arguments *a;
    const char *format;
    int shown;
    bh_curves_request request;
    bh_curves curves;
    bh_input in;
    bh_arena *arena;
    bh_text data; /* of --data */
    bh_measured measured;
};

static bool is_drawn(const char *format)
{
    return strcmp(format, "text") != 0 && strcmp(format, "csv") != 0;
}

static int variable(const bh_arguments *a, bh_against *out)
{
    static const char *const names[] = {"angle", "energy", "q2", "epsilon"};
    const char *given = a->value[BH_OPT_AGAINST];
    *out = BH_AGAINST_ANGLE;
    if (!given)
        return 0;
    for (int i = 0; i < 4; i++)
        if (strcmp(names[i], given) == 0) {
            *out = (bh_against)i;
            return 0;
        }
    return bh_usage(a, "--against is angle, energy, q2 or epsilon");
}

static int column(const bh_arguments *a, int *out)
{
    const char *given = a->value[BH_OPT_SHOW];
    char sentence[160];
    *out = given ? bh_shown_find(given) : BH_COL_POINT_CROSS_SECTION;
    if (*out >= 0)
        return 0;
    const char *near = bh_shown_suggest(given);
    (void)snprintf(sentence, sizeof sentence, "--show: no column \"%.60s\" with numbers%s%s%s",
                   given, near ? "; did you mean " : "", near ? near : "", near ? "?" : "");
    return bh_usage(a, sentence);
}

/* A terminal shows no picture, and a figure needs its name where it is not piped. */
static int destination(const struct job *job)
{
    if (job->a->value[BH_OPT_DATA] && !is_drawn(job->format))
        return bh_usage(job->a, "--data is drawn: it needs --format svg, pdf or png");
    if ((strcmp(job->format, "pdf") == 0 || strcmp(job->format, "png") == 0) &&
        !job->a->value[BH_OPT_OUTPUT] && isatty(STDOUT_FILENO))
        return bh_usage(job->a, "a terminal shows no figure; write it with --output FILE");
    return 0;
}

static int wrong(const struct job *job, const bh_error *err)
{
    return err->code == BH_EDOMAIN ? bh_usage(job->a, err->text) : bh_complain(stderr, err);
}

/* --- drawn --- */

static int read_data(struct job *job)
{
    const char *path = job->a->value[BH_OPT_DATA];
    bh_error err = {.code = BH_OK};
    if (bh_file_read(path, LONGEST_DATA, &job->data, &err))
        return bh_complain(stderr, &err);
    bh_code bad = BH_OK;
    if (job->data.length > LONGEST_DATA) {
        bad = bh_fail(&err, BH_EPLAN, "the file is longer than 1 MiB; draw fewer points");
        (void)bh_fail_at(&err, bad, (bh_mark){path, 0, 0});
    } else {
        const bh_measured_request r = {job->data.bytes ? job->data.bytes : "", job->data.length,
                                       path, bh_curve_key(job->curves.against),
                                       bh_shown_key(job->shown)};
        bad = bh_measured_read(&r, job->arena, &job->measured, &err);
    }
    return bad ? bh_complain(stderr, &err) : 0;
}

static int draw(struct job *job)
{
    static const char *const formats[] = {"svg", "pdf", "png"};
    const char *path = job->a->value[BH_OPT_DATA];
    int format = BH_FIGURE_SVG;
    for (int i = 0; i < 3; i++)
        if (strcmp(formats[i], job->format) == 0)
            format = i;
    const bh_curve_picture picture = {.table = job->in.table,
                                      .curves = &job->curves,
                                      .shown = job->shown,
                                      .measured = path ? &job->measured : NULL,
                                      .measured_name = path,
                                      .version = bh_version()};
    bh_figure figure;
    bh_text out = {0};
    bh_error err = {.code = BH_OK};
    bh_code bad = bh_curve_figure(&picture, job->arena, &figure, &err);
    if (!bad)
        bad = bh_figure_write(&figure, (bh_figure_format)format, &out, &err);
    if (!bad)
        return bh_output(&out, job->a->value[BH_OPT_OUTPUT]);
    bh_text_free(&out);
    return wrong(job, &err);
}

static int drawn(struct job *job)
{
    job->arena = bh_arena_new();
    if (!job->arena)
        return bh_complain(stderr, &(bh_error){.code = BH_ENOMEM});
    int status = job->a->value[BH_OPT_DATA] ? read_data(job) : 0;
    if (status == 0)
        status = bh_input_evaluate(&job->in, &(bh_evaluation){.bins = true});
    if (status == 0)
        bh_say_cautions(stderr, job->in.table);
    return status == 0 ? draw(job) : status;
}

/* --- listed --- */

static int listed(const struct job *job)
{
    bh_text out = {0};
    if (strcmp(job->format, "csv") == 0)
        bh_curves_csv(&job->curves, job->shown, &out);
    else
        bh_curves_text(&job->curves, job->shown, bh_places_width(), &out);
    return bh_output(&out, job->a->value[BH_OPT_OUTPUT]);
}

/* --- all of it --- */

/* A model beyond the data it was fitted to. */
static void say_ranges(const struct job *job)
{
    const char *plan = job->in.shown ? job->in.shown : job->in.name;
    for (size_t k = 0; k < job->curves.count; k++) {
        const bh_curve *c = job->curves.curve[k];
        const bh_curve_model m = bh_curve_structure(c);
        size_t beyond = 0;
        for (size_t i = 0; i < bh_curve_count(c); i++)
            beyond += !bh_curve_inside(c, i);
        if (beyond)
            bh_print(stderr,
                     "%s: warning: models.structure: %s is fitted to data from Q2 %g to %g GeV2; "
                     "%zu of %zu points of its curve lie outside\n",
                     plan, m.name, m.low, m.high, beyond, bh_curve_count(c));
    }
}

static int run(struct job *job)
{
    bh_error err = {.code = BH_OK};
    bh_say_diags(stderr, job->in.diags);
    if (bh_curves_make(job->in.plan, &job->request, &job->curves, &err))
        return wrong(job, &err);
    say_ranges(job);
    return is_drawn(job->format) ? drawn(job) : listed(job);
}

int bh_cmd_curve(const bh_arguments *arguments)
{
    struct job job = {.a = arguments,
                      .format = bh_arguments_format(arguments, BH_OPT_CURVE_FORMAT)};
    if (!job.format)
        return EX_USAGE;
    if (arguments->word_count != 1)
        return bh_usage(arguments, "needs one plan (or - for standard input)");
    job.request = (bh_curves_request){.setting = arguments->value[BH_OPT_SETTING],
                                      .arm = arguments->value[BH_OPT_ARM],
                                      .structures = arguments->value[BH_OPT_STRUCTURE],
                                      .coulombs = arguments->value[BH_OPT_COULOMB],
                                      .points = is_drawn(job.format) ? DRAWN_POINTS : 0};
    int status = variable(arguments, &job.request.against);
    status = status ? status : column(arguments, &job.shown);
    status = status ? status : destination(&job);
    if (status)
        return status;
    status = bh_input_open(arguments->words[0], &job.in);
    status = status ? status : bh_input_plan(&job.in, arguments);
    status = status ? status : run(&job);
    bh_curves_free(&job.curves);
    bh_arena_free(job.arena);
    bh_text_free(&job.data);
    bh_input_close(&job.in);
    return status;
}
