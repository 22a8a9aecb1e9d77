/* cmd_report.c - beamhours report PLAN --output FILE: the beam-time section of a proposal. */
#include <ctype.h>
#include <string.h>
#include <strings.h>
#include <sysexits.h>

#include "beamhours.h"
#include "beamhours/base/file.h"
#include "beamhours/base/sha256.h"
#include "beamhours/command/complain.h"
#include "beamhours/command/input.h"
#include "beamhours/command/waiting.h"
#include "beamhours/report/report.h"

enum { LONGEST_MATERIAL = 1 << 20, MOST_FILES = 256 };

static const char *const endings[] = {".html", ".pdf", ".tex", ".md"};
enum kind { KIND_HTML, KIND_PDF, KIND_TEX, KIND_MD, KINDS };

/* What was asked for. */
struct job {
    const bh_arguments *a;
    enum kind kind;
    bh_page page;
    bool fragment;
    bh_input in;
    bh_text command;
    size_t count;
    bh_report_file files[MOST_FILES];
    char digests[MOST_FILES][BH_SHA256_SIZE];
    bh_text folder, base; /* "out/" and "report": of figures that are files of their own */
};

static int choose(struct job *job)
{
    const char *path = job->a->value[BH_OPT_OUTPUT], *page = job->a->value[BH_OPT_PAPER];
    if (!path)
        return bh_usage(job->a, "needs --output FILE, which ends in .html, .pdf, .tex or .md");
    const char *dot = strrchr(path, '.');
    while (job->kind < KINDS && (!dot || strcasecmp(dot, endings[job->kind]) != 0))
        job->kind++;
    if (job->kind == KINDS)
        return bh_usage_option(job->a, BH_OPT_OUTPUT, "FILE ends in .html, .pdf, .tex or .md");
    job->page = page && strcmp(page, "letter") == 0 ? BH_PAGE_LETTER : BH_PAGE_A4;
    if (page && strcmp(page, "letter") != 0 && strcmp(page, "a4") != 0)
        return bh_usage_option(job->a, BH_OPT_PAPER, "is a4 or letter");
    job->fragment = job->a->value[BH_OPT_FRAGMENT] != NULL;
    if (job->fragment && job->kind != KIND_TEX)
        return bh_usage_option(job->a, BH_OPT_FRAGMENT, "is for FILE.tex");
    return 0;
}

/* --- what a reader can check --- */

static void add_file(struct job *job, const char *name, const bh_text *bytes)
{
    if (job->count == MOST_FILES)
        return;
    bh_sha256(bytes->bytes ? bytes->bytes : "", bytes->length, job->digests[job->count]);
    job->files[job->count] = (bh_report_file){name, job->digests[job->count]};
    job->count++;
}

/* Once for each file that a layer's material was read from. */
static int add_material(struct job *job, const bh_material *material)
{
    bh_error err = {.code = BH_OK};
    bh_text bytes = {0};
    if (!material || !material->file)
        return 0;
    for (size_t i = 0; i < job->count; i++)
        if (strcmp(job->files[i].file, material->name) == 0)
            return 0;
    const bh_code bad = bh_file_read(material->file, LONGEST_MATERIAL, &bytes, &err);
    if (!bad)
        add_file(job, material->name, &bytes);
    bh_text_free(&bytes);
    return bad ? bh_complain(stderr, &err) : 0;
}

static int add_layers(struct job *job, const bh_layer *layers, size_t count)
{
    int status = 0;
    for (size_t i = 0; status == 0 && i < count; i++)
        status = add_material(job, layers[i].material);
    return status;
}

static int add_files(struct job *job)
{
    const bh_plan *plan = job->in.plan;
    int status = 0;
    add_file(job, job->in.shown ? job->in.shown : job->in.name, &job->in.bytes);
    for (size_t i = 0; status == 0 && i < plan->target_count; i++) {
        const bh_target *t = &plan->targets[i];
        status = add_layers(job, t->layers, t->layer_count);
        if (status == 0 && t->has_wall)
            status = add_material(job, t->wall.material);
    }
    for (size_t i = 0; status == 0 && i < plan->arm_count; i++)
        status = add_layers(job, plan->arms[i].exit, plan->arms[i].exit_count);
    return status;
}

/* Words with anything that a shell would read stand in quotes. */
static void add_word(struct job *job, const char *word)
{
    static const char plain[] =
        "abcdefghijklmnopqrstuvwxyzABCDEFGHIJKLMNOPQRSTUVWXYZ0123456789_-./=+:,%@";
    if (word[0] && word[strspn(word, plain)] == '\0') {
        bh_text_appendf(&job->command, " %s", word);
        return;
    }
    bh_text_append(&job->command, " '");
    for (const char *c = word; *c; c++)
        bh_text_append_bytes(&job->command, *c == '\'' ? "'\\''" : c, *c == '\'' ? 4 : 1);
    bh_text_append(&job->command, "'");
}

static void say_command(struct job *job)
{
    bh_text_append(&job->command, "beamhours report");
    add_word(job, job->in.shown ? job->in.shown : job->in.name);
    for (int i = 0; i < job->a->with_count; i++) {
        bh_text_append(&job->command, " --with");
        add_word(job, job->a->with[i]);
    }
    if (job->page == BH_PAGE_LETTER)
        bh_text_append(&job->command, " --paper letter");
    if (job->fragment)
        bh_text_append(&job->command, " --fragment");
    bh_text_appendf(&job->command, " --output FILE%s", endings[job->kind]);
}

/* --- figures beside it --- */

/* Of "out/my plan.tex" "out/" and "my-plan": what LaTeX or Markdown would read becomes a dash. */
static void name_figures(struct job *job)
{
    const char *path = job->a->value[BH_OPT_OUTPUT], *slash = strrchr(path, '/');
    const char *name = slash ? slash + 1 : path, *dot = strrchr(name, '.');
    bh_text_append_bytes(&job->folder, path, (size_t)(name - path));
    for (const char *c = name; c < dot; c++)
        bh_text_append_bytes(&job->base, isalnum((unsigned char)*c) || *c == '_' ? c : "-", 1);
}

static int write_figure(const struct job *job, const bh_block *b)
{
    const bool tex = job->kind == KIND_TEX;
    bh_text out = {0}, path = {0};
    bh_error err = {.code = BH_OK};
    bh_text_appendf(&path, "%s%s-%d.%s", job->folder.bytes ? job->folder.bytes : "",
                    job->base.bytes ? job->base.bytes : "", b->number, tex ? "pdf" : "svg");
    bh_code bad = path.failed ? BH_ENOMEM : BH_OK;
    if (!bad)
        bad = bh_figure_write(b->figure, tex ? BH_FIGURE_PDF : BH_FIGURE_SVG, &out, &err);
    const int status = bad ? bh_complain(stderr, &err) : bh_output(&out, path.bytes);
    if (bad)
        bh_text_free(&out);
    bh_text_free(&path);
    return status;
}

/* Before the text: it names no figure that is not there. */
static int write_figures(const struct job *job, const bh_paper *paper)
{
    int status = 0;
    for (size_t i = 0; status == 0 && i < paper->count; i++)
        if (paper->blocks[i].kind == BH_BLOCK_FIGURE &&
            (job->kind == KIND_TEX || job->kind == KIND_MD))
            status = write_figure(job, &paper->blocks[i]);
    return status;
}

/* --- the file --- */

static bh_code write_as(const struct job *job, const bh_paper *paper, bh_text *out, bh_error *err)
{
    switch (job->kind) {
    case KIND_HTML:
        return bh_paper_html(paper, job->page, out, err);
    case KIND_PDF:
        return bh_paper_pdf(paper, job->page, out, err);
    case KIND_TEX:
        return bh_paper_latex(paper, &(bh_latex_form){job->page, job->fragment, job->base.bytes},
                              out, err);
    default:
        return bh_paper_markdown(paper, job->base.bytes, out, err);
    }
}

static int make(struct job *job)
{
    bh_report report;
    bh_text out = {0};
    bh_error err = {.code = BH_OK};
    bh_waiting waiting;
    bh_waiting_begin(&waiting, stderr);
    say_command(job);
    name_figures(job);
    const bh_report_request request = {.table = job->in.table,
                                       .version = bh_version(),
                                       .command = job->command.bytes ? job->command.bytes : "",
                                       .file_count = job->count,
                                       .files = job->files,
                                       .progress = &waiting.progress};
    bh_code bad = bh_report_make(&request, &report, &err);
    bh_progress_tell(&waiting.progress, "pages", 0, 0);
    if (!bad)
        bad = write_as(job, &report.paper, &out, &err);
    bh_waiting_end(&waiting);
    int status = bad ? bh_complain(stderr, &err) : write_figures(job, &report.paper);
    bh_report_free(&report);
    if (status == 0)
        return bh_output(&out, job->a->value[BH_OPT_OUTPUT]);
    bh_text_free(&out);
    return status;
}

static int run(struct job *job)
{
    bh_error err = {.code = BH_OK};
    int status = choose(job);
    if (status)
        return status;
    if (bh_file_may_write(job->a->value[BH_OPT_OUTPUT], &err)) /* before its figures are */
        return bh_complain(stderr, &err);
    status = bh_input_table(job->a->words[0], job->a, &(bh_evaluation){.bins = true}, &job->in);
    if (status)
        return status;
    bh_say_diags(stderr, bh_table_warnings(job->in.table));
    bh_say_cautions(stderr, job->in.table);
    status = add_files(job);
    return status ? status : make(job);
}

int bh_cmd_report(const bh_arguments *arguments)
{
    if (arguments->word_count != 1)
        return bh_usage(arguments, "needs one plan (or - for standard input)");
    struct job job = {.a = arguments};
    const int status = run(&job);
    bh_input_close(&job.in);
    bh_text_free(&job.command);
    bh_text_free(&job.folder);
    bh_text_free(&job.base);
    return status;
}
