/* passing.h - what the tests of passing particles share: materials, particles, rows of a table. */
#ifndef TESTS_MATTER_PASSING_H
#define TESTS_MATTER_PASSING_H

#include "../suite.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/matter/stopping.h"

static bh_material_library *library;
static bh_diags *diags;

static inline void open_library(void)
{
    static const char *const folders[] = {"materials", NULL};
    library = bh_material_library_new(folders);
    diags = bh_diags_new();
    ck_assert(library && diags);
}

static inline void close_library(void)
{
    bh_material_library_free(library);
    bh_diags_free(diags);
}

static inline bh_material material_of(const char *name)
{
    const bh_material *m = bh_material_find(library, name, (bh_mark){0}, "material", diags);
    ck_assert_msg(m != NULL, "no %s; run the tests in the top folder", name);
    return *m;
}

static inline bh_medium medium_of(const char *name)
{
    const bh_material m = material_of(name);
    bh_medium out;
    ck_assert_int_eq(bh_medium_of(&m, 0.0, &out, NULL), BH_OK);
    return out;
}

static inline bh_particle particle_of(const char *name)
{
    bh_particle p;
    ck_assert_msg(bh_particle_find(name, &p), "%s", name);
    return p;
}

static inline bh_stopping *stopping_of(const char *particle, const char *material)
{
    const bh_particle p = particle_of(particle);
    const bh_material m = material_of(material);
    bh_stopping *s = NULL;
    ck_assert_int_eq(bh_stopping_new(&p, &m, 0.0, &s, NULL), BH_OK);
    return s;
}

/* Splits a line at its commas, in place; a missing field is empty. */
static inline void split(char *line, char *fields[], int count)
{
    line[strcspn(line, "\r\n")] = '\0';
    for (int i = 0; i < count; i++) {
        fields[i] = line;
        char *comma = strchr(line, ',');
        if (comma && i + 1 < count)
            *comma++ = '\0';
        line = comma ? comma : line + strlen(line);
    }
}

/* Calls `row` with each line of data of a .csv file: after comments and one line of names. */
static inline int each_row(const char *path, void (*row)(char *fields[]), int count)
{
    FILE *f = fopen(path, "r");
    ck_assert_msg(f != NULL, "%s; run the tests in the top folder", path);
    char line[500];
    char *fields[16];
    int rows = -1;
    while (fgets(line, sizeof line, f)) {
        if (line[0] == '#')
            continue;
        if (rows++ < 0)
            continue;
        split(line, fields, count);
        row(fields);
    }
    fclose(f);
    return rows;
}

/* Within `tolerance` of `want`, relative. */
#define NEAR(got, want, tolerance, ...)                                                            \
    do {                                                                                           \
        const double got_ = (got), want_ = (want);                                                 \
        char what_[300];                                                                           \
        (void)snprintf(what_, sizeof what_, __VA_ARGS__);                                          \
        ck_assert_msg(fabs(got_ - want_) <= (tolerance)*fabs(want_), "%s: %.9g, not %.9g (%+.2e)", \
                      what_, got_, want_, got_ / want_ - 1.0);                                     \
    } while (0)

#endif
