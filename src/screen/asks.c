/* asks.c - questions with a few answers; Escape is always the one that changes nothing. */
#include <string.h>

#include "beamhours/screen/model.h"

struct answer {
    char key;
    const char *words;
    bh_wish wish;
};

enum { MOST_ANSWERS = 4 };

static const struct answer answers[][MOST_ANSWERS] = {
    [BH_QUESTION_LEAVE] = {{'s', "save and leave", BH_WISH_SAVE_LEAVE},
                           {'w', "leave without saving", BH_WISH_LEAVE},
                           {'k', "keep working", BH_WISH_NOTHING}},
    [BH_QUESTION_CHANGED] = {{'k', "keep working, save nothing", BH_WISH_NOTHING},
                             {'o', "save mine over it", BH_WISH_SAVE_OVER},
                             {'r', "read the file, drop mine", BH_WISH_RELOAD}},
    [BH_QUESTION_GONE] = {{'s', "save it again", BH_WISH_SAVE_OVER},
                          {'k', "keep working, save nothing", BH_WISH_NOTHING}},
    [BH_QUESTION_RESCUE] = {{'u', "use the unsaved work", BH_WISH_RESCUE},
                            {'f', "keep to the file, throw it away", BH_WISH_RESCUE_DROP},
                            {'l', "leave both as they are, and end", BH_WISH_LEAVE}},
    [BH_QUESTION_OTHER] = {{'l', "leave", BH_WISH_LEAVE},
                           {'g', "go on all the same", BH_WISH_TAKE_OVER}},
};

int bh_ask_answers(bh_question_kind kind)
{
    int n = 0;
    while (n < MOST_ANSWERS && answers[kind][n].words)
        n++;
    return n;
}

const char *bh_ask_answer(bh_question_kind kind, int i, char *key)
{
    *key = answers[kind][i].key;
    return answers[kind][i].words;
}

void bh_ask(bh_model *model, bh_question_kind kind)
{
    if (model->over == BH_OVER_FIELD || model->over == BH_OVER_CHOOSE)
        bh_value_leave(model);
    model->over = BH_OVER_ASK;
    model->question = kind;
    model->answer = 0;
}

static void choose(bh_model *model, int i)
{
    model->over = BH_OVER_NOTHING;
    model->wish = answers[model->question][i].wish;
}

/* The answer that changes nothing, for Escape. */
static void refuse(bh_model *model)
{
    const int n = bh_ask_answers(model->question);
    for (int i = 0; i < n; i++)
        if (answers[model->question][i].wish == BH_WISH_NOTHING) {
            choose(model, i);
            return;
        }
    if (model->question == BH_QUESTION_OTHER || model->question == BH_QUESTION_RESCUE)
        choose(model, model->question == BH_QUESTION_OTHER ? 0 : 2);
}

static void click(bh_model *model, const bh_press *press)
{
    const int row = press->row - bh_ask_row(model);
    if (row >= 0 && row < bh_ask_answers(model->question))
        choose(model, row);
}

bool bh_ask_press(bh_model *model, const bh_press *press)
{
    const int n = bh_ask_answers(model->question);
    switch (press->kind) {
    case BH_PRESS_UP:
    case BH_PRESS_BACK_TAB:
        model->answer = model->answer > 0 ? model->answer - 1 : n - 1;
        return true;
    case BH_PRESS_DOWN:
    case BH_PRESS_TAB:
        model->answer = model->answer + 1 < n ? model->answer + 1 : 0;
        return true;
    case BH_PRESS_ENTER:
        choose(model, model->answer);
        return true;
    case BH_PRESS_ESCAPE:
        refuse(model);
        return true;
    case BH_PRESS_CLICK:
        click(model, press);
        return true;
    case BH_PRESS_POINT:
        for (int i = 0; i < n; i++)
            if (press->point == (uint32_t)answers[model->question][i].key) {
                choose(model, i);
                break;
            }
        return true;
    default:
        return true;
    }
}
