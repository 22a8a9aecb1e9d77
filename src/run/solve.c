/* solve.c - what it would take: the value of an input that gives the wanted output. */
#include "beamhours/run/solve.h"

#include <gsl/gsl_errno.h>
#include <gsl/gsl_roots.h>
#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/run/moving.h"
#include "beamhours/run/search.h"

enum { GRID = 40, EDGE = 24, TURN = 20, BRENT = 60 };
enum { DIGITS = 6, MORE_DIGITS = 8, ALL_DIGITS = 17 };

static const double close_enough = 1e-4; /* [1] of an output, relatively */

/* --- the grid --- */

static double place_of(const bh_moving *m, double number)
{
    return m->logarithmic ? log(number) : number;
}

static double number_at(const bh_moving *m, double place)
{
    return m->logarithmic ? exp(place) : place;
}

/* How far the output at a place is from what is wanted: 0 there, with a sign. */
static double miss(bh_search *s, double place)
{
    char text[BH_SOLVE_ROOM];
    bh_moving_write(&s->moving, number_at(&s->moving, place), ALL_DIGITS, text);
    const double output = bh_search_output(s, text);
    const double wanted = s->question->wanted;
    if (!isfinite(output) || !(wanted > 0))
        return output - wanted;
    return output > 0 ? log(output / wanted) : -1e3 + output;
}

struct point {
    double place, miss;
};

static struct point point_at(bh_search *s, double place)
{
    return (struct point){place, miss(s, place)};
}

/* The last place, from `good` towards `bad`, that the plan takes. */
static struct point edge_between(bh_search *s, struct point good, double bad)
{
    for (int i = 0; i < EDGE && !s->code; i++) {
        const struct point middle = point_at(s, 0.5 * (good.place + bad));
        if (isfinite(middle.miss))
            good = middle;
        else
            bad = middle.place;
    }
    return good;
}

/* --- solutions --- */

static bool close_to(double output, double wanted)
{
    return fabs(output - wanted) <= close_enough * fabs(wanted);
}

static void add(bh_search *s, double place)
{
    bh_answer *a = s->answer;
    bh_solution found;
    int digits = DIGITS;
    do {
        bh_moving_write(&s->moving, number_at(&s->moving, place), digits, found.text);
        found.output = bh_search_output(s, found.text);
        digits += MORE_DIGITS - DIGITS;
    } while (!close_to(found.output, s->question->wanted) && digits <= MORE_DIGITS && !s->code);
    bool known = !close_to(found.output, s->question->wanted); /* a jump over it is none,
                                                                       nor what nobody could set */
    for (size_t i = 0; i < a->count; i++)
        known = known || strcmp(a->solutions[i].text, found.text) == 0;
    if (known || a->count == BH_SOLVE_MOST || s->code)
        return;
    const double far = fabs(place - place_of(&s->moving, s->moving.number));
    size_t at = a->count;
    while (at > 0 && s->far[at - 1] > far) {
        a->solutions[at] = a->solutions[at - 1];
        s->far[at] = s->far[at - 1];
        at--;
    }
    a->solutions[at] = found;
    s->far[at] = far;
    a->count++;
}

static double for_gsl(double place, void *search)
{
    return miss(search, place);
}

/* Closes in on the solution between two points on either side of what is wanted. */
static void close_in(bh_search *s, struct point a, struct point b)
{
    gsl_function f = {for_gsl, s};
    gsl_root_fsolver *solver = gsl_root_fsolver_alloc(gsl_root_fsolver_brent);
    if (!solver) {
        s->code = bh_fail(s->err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
        return;
    }
    int status = gsl_root_fsolver_set(solver, &f, a.place, b.place);
    for (int i = 0; i < BRENT && status == GSL_SUCCESS && !s->code; i++) {
        status = gsl_root_fsolver_iterate(solver);
        if (gsl_root_test_interval(gsl_root_fsolver_x_lower(solver),
                                   gsl_root_fsolver_x_upper(solver), 0, 1e-10) == GSL_SUCCESS)
            break;
    }
    if (status == GSL_SUCCESS && !s->code)
        add(s, gsl_root_fsolver_root(solver));
    gsl_root_fsolver_free(solver);
}

/* Three points on one side of what is wanted, the middle one nearest to it. */
struct turn {
    struct point a, b, c;
};

/* What is wanted between a point and the last one towards `bad` that the plan takes. */
static void look_before_edge(bh_search *s, struct point good, double bad)
{
    const struct point edge = edge_between(s, good, bad);
    if (s->code || edge.miss * good.miss > 0)
        return;
    close_in(s, good.place < edge.place ? good : edge, good.place < edge.place ? edge : good);
}

/* Looks once between them, by golden section.  False where the search for a turn is over. */
static bool narrow(bh_search *s, struct turn *t)
{
    const double golden = 0.5 * (3 - sqrt(5.0));
    const bool right = t->c.place - t->b.place > t->b.place - t->a.place;
    struct point *far = right ? &t->c : &t->a, *near = right ? &t->a : &t->c;
    const struct point x = point_at(s, t->b.place + golden * (far->place - t->b.place));
    if (!isfinite(x.miss)) { /* a gap: towards it the output may pass what is wanted */
        look_before_edge(s, t->b, x.place);
        look_before_edge(s, *far, x.place);
        return false;
    }
    if (x.miss * t->b.miss <= 0) { /* it passes what is wanted, and comes back */
        close_in(s, right ? t->b : x, right ? x : t->b);
        close_in(s, right ? x : *far, right ? *far : x);
        return false;
    }
    if (fabs(x.miss) < fabs(t->b.miss)) {
        *near = t->b;
        t->b = x;
    } else {
        *far = x;
    }
    return true;
}

static void look_at_turn(bh_search *s, const struct point p[3])
{
    struct turn t = {p[0], p[1], p[2]};
    int i = 0;
    while (i < TURN && !s->code && narrow(s, &t))
        i++;
    if (i == TURN && fabs(t.b.miss) < close_enough)
        add(s, t.b.place);
}

/* --- the search --- */

/* Is point 1 of three on the side of the others, and clearly nearer to what is wanted? */
static bool turns(const struct point p[3])
{
    const double near = fabs(p[1].miss) * (1 + 1e-9);
    return p[0].miss * p[1].miss > 0 && p[2].miss * p[1].miss > 0 && near < fabs(p[0].miss) &&
           near < fabs(p[2].miss);
}

/* A stretch of points that the plan takes, in order. */
static void search_points(bh_search *s, const struct point *p, size_t count)
{
    for (size_t i = 0; i < count && !s->code; i++) {
        if (!(fabs(p[i].miss) > 0))
            add(s, p[i].place);
        else if (i > 0 && p[i].miss * p[i - 1].miss < 0)
            close_in(s, p[i - 1], p[i]);
        else if (i > 0 && i + 1 < count && turns(p + i - 1))
            look_at_turn(s, p + i - 1);
    }
}

/* The grid, with the present value on it, and the edges of what the plan takes between its points.
 * Returns how many; those that it does not take have no number for a miss. */
static size_t make_points(bh_search *s, struct point p[3 * GRID])
{
    const bh_moving *m = &s->moving;
    const double from = place_of(m, m->from), to = place_of(m, m->to);
    const double now = place_of(m, m->number);
    bool placed = !(now > from && now < to);
    double last = from;
    size_t n = 0;
    for (int i = 0; i <= GRID && !s->code;) {
        double place = from + (to - from) * i / GRID;
        const bool present = !placed && now <= place;
        placed = placed || present;
        place = present ? now : place;
        i += !present;
        const struct point next = point_at(s, place);
        if (n > 0 && isfinite(next.miss) && !isfinite(p[n - 1].miss)) {
            p[n] = edge_between(s, next, last);
            n++;
        } else if (n > 0 && !isfinite(next.miss) && isfinite(p[n - 1].miss)) {
            p[n] = edge_between(s, p[n - 1], place);
            n++;
        }
        p[n++] = next;
        last = place;
    }
    return n;
}

static void search(bh_search *s)
{
    struct point p[3 * GRID];
    const size_t count = make_points(s, p);
    size_t start = 0;
    for (size_t i = 0; i <= count; i++)
        if (i == count || !isfinite(p[i].miss)) {
            search_points(s, p + start, i - start);
            start = i + 1;
        }
}

bh_code bh_solve(const bh_question *question, bh_answer *answer, bh_error *err)
{
    bh_search s = {.question = question, .answer = answer, .err = err};
    *answer = (bh_answer){.output = NAN, .least = NAN, .most = NAN};
    if (bh_search_begin(&s))
        search(&s);
    bh_search_end(&s);
    return s.code;
}
