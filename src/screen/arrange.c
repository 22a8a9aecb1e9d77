/* arrange.c - where everything stands on a terminal of whatever size. */
#include "beamhours/screen/model.h"

enum { NARROW = 60, LEAST_PLAN = 28, MOST_PLAN = 64, READABLE = 60, CURVE_FROM = 17 };

static void share_columns(const bh_model *model, bh_arrangement *a)
{
    a->over_columns = model->columns;
    if (model->columns < NARROW) { /* the part in focus alone */
        if (model->pane == BH_PANE_PLAN)
            a->plan_columns = model->columns;
        else
            a->table_columns = model->columns;
        return;
    }
    int plan = model->columns * 36 / 100;
    plan = plan < LEAST_PLAN ? LEAST_PLAN : plan > MOST_PLAN ? MOST_PLAN : plan;
    a->plan_columns = plan;
    a->table_column = plan + 2; /* a line between them */
    a->table_columns = model->columns - plan - 2;
    if (plan >= READABLE) /* the table stays in sight, and need not be sent again */
        a->over_columns = plan;
}

static void share_rows(const bh_model *model, bh_arrangement *a)
{
    const int rows = model->rows;
    a->menu = rows - 1;
    a->caution = rows > 1 ? rows - 2 : -1;
    a->title = rows > 4 ? 0 : -1;
    a->message_rows = rows >= 46 ? 5 : rows >= 30 ? 3 : rows > 6 ? 1 : 0;
    a->message = a->message_rows ? a->caution - a->message_rows : -1;
    a->body = a->title == 0 ? 1 : 0;
    a->body_rows = (a->message >= 0 ? a->message : a->caution) - a->body;
    if (a->body_rows < 0)
        a->body_rows = 0;
}

bh_arrangement bh_arrange(const bh_model *model)
{
    bh_arrangement a = {.title = -1, .message = -1, .caution = -1};
    share_rows(model, &a);
    share_columns(model, &a);
    a.table_rows = a.body_rows - 3; /* a head, the columns, their units */
    a.curve = -1;
    if (model->curve_shown != BH_SHOW_NO_CURVE && a.body_rows >= CURVE_FROM &&
        a.table_columns >= 40) {
        a.curve_rows = a.body_rows * 2 / 5;
        a.table_rows -= a.curve_rows;
        a.curve = a.body + a.body_rows - a.curve_rows;
    }
    if (a.table_rows < 0)
        a.table_rows = 0;
    return a;
}
