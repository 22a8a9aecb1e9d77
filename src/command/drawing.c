/* drawing.c - in the program, what draws is loaded from beamhours-draw.so once it is needed. */
#include "beamhours/report/drawing.h"

#include <dlfcn.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/command/places.h"

static const bh_drawing *offered_by(void *module)
{
    bh_drawing_offer *offer = NULL;
    const void *symbol = dlsym(module, BH_DRAWING_OFFER);
    if (!symbol)
        return NULL;
    memcpy(&offer, &symbol, sizeof offer); /* POSIX: a function through an object pointer */
    const bh_drawing *d = offer();
    const bool ours = d->figure == sizeof(bh_figure) && d->paper == sizeof(bh_paper);
    return ours ? d : NULL;
}

/* It stays loaded.  NULL with the reason in err. */
static const bh_drawing *load(bh_error *err)
{
    char *path = bh_places_drawing();
    void *module = path ? dlopen(path, RTLD_NOW | RTLD_LOCAL) : NULL;
    const char *why = path && !module ? dlerror() : NULL;
    const bh_drawing *d = module ? offered_by(module) : NULL;
    if (!path)
        bh_fail(err, BH_EABSENT,
                "beamhours-draw.so, which draws, is not where the program is: "
                "install beamhours again");
    else if (!d)
        bh_fail(err, BH_EIO, "%s, which draws, cannot be used (%s): install beamhours again", path,
                why ? why : "it belongs to another version");
    free(path);
    return d;
}

static bh_code failed(const bh_error *why, bh_error *err)
{
    if (err)
        *err = *why;
    return why->code;
}

bh_code bh_figure_write(const bh_figure *figure, bh_figure_format format, bh_text *out,
                        bh_error *err)
{
    bh_error why = {.code = BH_EIO};
    const bh_drawing *d = load(&why);
    return d ? d->write(figure, format, out, err) : failed(&why, err);
}

bh_code bh_figure_inline(const bh_figure *figure, const char *id, bh_text *out, bh_error *err)
{
    bh_error why = {.code = BH_EIO};
    const bh_drawing *d = load(&why);
    return d ? d->inline_svg(figure, id, out, err) : failed(&why, err);
}

bh_code bh_paper_pdf(const bh_paper *paper, bh_page page, bh_text *out, bh_error *err)
{
    bh_error why = {.code = BH_EIO};
    const bh_drawing *d = load(&why);
    return d ? d->pdf(paper, page, out, err) : failed(&why, err);
}
