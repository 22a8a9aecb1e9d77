/* fuzz_quantity.c - whatever the text and the dimension: refused with a sentence, or finite and
 * printed so that it reads back. */
#include <math.h>
#include <stdint.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/units/nuclide.h"
#include "beamhours/units/particle.h"
#include "beamhours/units/quantity.h"

int LLVMFuzzerTestOneInput(const uint8_t *data, size_t size);

static void demand(bool held)
{
    if (!held)
        abort();
}

static void must_read_back(const bh_quantity *q, bh_dimension dimension)
{
    char out[256], again[256];
    bh_quantity read;
    const int n = bh_quantity_print(q, dimension, out, sizeof out);
    demand(n > 0 && (size_t)n < sizeof out && strlen(out) == (size_t)n);
    demand(bh_quantity_parse(out, dimension, &read, NULL) == BH_OK);
    demand(read.value == q->value && read.uncertainty == q->uncertainty);
    demand(read.uncertain == q->uncertain && read.per_u == q->per_u);
    (void)bh_quantity_print(&read, dimension, again, sizeof again);
    demand(strcmp(out, again) == 0);
}

static void one_quantity(const char *text, bh_dimension dimension)
{
    bh_quantity q;
    bh_error err = {.code = BH_OK};
    if (bh_quantity_parse(text, dimension, &q, &err) != BH_OK) {
        demand(err.code == BH_EPLAN && err.text[0] != '\0' && !strchr(err.text, '\n'));
        return;
    }
    demand(isfinite(q.value) && isfinite(q.uncertainty) && q.uncertainty >= 0.0);
    must_read_back(&q, dimension);
}

static void one_name(const char *text)
{
    bh_particle particle;
    char name[8];
    int z, a;
    const char *meant = bh_particle_suggest(text);
    if (meant)
        demand(bh_particle_find(meant, &particle));
    if (bh_particle_find(text, &particle))
        demand(particle.mass > 0.0 && particle.charge != 0);
    if (bh_nuclide_parse(text, &z, &a))
        demand(strcmp(bh_nuclide_name(z, a, name), text) == 0);
}

int LLVMFuzzerTestOneInput(const uint8_t *data, size_t size)
{
    char text[512];
    if (size < 1 || size > sizeof text)
        return 0;
    memcpy(text, data + 1, size - 1);
    text[size - 1] = '\0';
    const double value = bh_unit_size(text, (bh_dimension)(data[0] % BH_DIM_COUNT));
    demand(isfinite(value) && value >= 0.0);
    one_quantity(text, (bh_dimension)(data[0] % BH_DIM_COUNT));
    one_name(text);
    return 0;
}
