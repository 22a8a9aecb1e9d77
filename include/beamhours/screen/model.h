/* model.h - all that the screen knows and does, without a terminal; for the files of this room. */
#ifndef BH_SCREEN_MODEL_H
#define BH_SCREEN_MODEL_H

#include "beamhours/base/arena.h"
#include "beamhours/document/edit.h"
#include "beamhours/screen/canvas.h"
#include "beamhours/screen/desk.h"
#include "beamhours/screen/field.h"
#include "beamhours/screen/outcome.h"
#include "beamhours/screen/press.h"
#include "beamhours/screen/worker.h"

typedef enum { BH_PANE_PLAN, BH_PANE_TABLE } bh_pane;

/* --- the plan --- */

/* One line of the plan as it is shown. */
typedef struct {
    const bh_node *node; /* of the document */
    const char *label;   /* the key; NULL for an item of a list */
    int depth;
    bool folded, folds; /* it has lines below it that are hidden; that can be hidden */
} bh_plan_line;

typedef struct {
    bh_arena *arena; /* of lines and texts */
    bh_plan_line *lines;
    size_t count, room;
    size_t at, top; /* the line in focus; the first in view */
    char **turned;  /* paths of what was opened or closed by hand */
    size_t turned_count;
    size_t version; /* of the edit, when the lines were made */
} bh_plan_view;

/* --- the table --- */

enum { BH_MOST_SHOWN = 64 };

/* A column as it is shown: one prefix for all rows. */
typedef struct {
    int column;   /* bh_column_id; BH_COLUMN_COUNT: what the compared one was */
    double scale; /* [1] what is shown is the cell's times this */
    const char *unit;
    int digits, width;
} bh_table_column;

/* A row of the table: of an arm, or of one of its bins. */
typedef struct {
    size_t row; /* of the outcome's rows, or bins */
    bool bin;
    bool stale;                 /* its numbers are of before */
    double change;              /* [1] relative, of the column in focus; 0 where there is none */
    const bh_row *now, *before; /* what is shown; what it is compared with, or NULL */
} bh_table_row;

typedef struct {
    bh_table_column columns[BH_MOST_SHOWN];
    int column_count;
    bh_table_row *rows;
    size_t count, room;
    size_t at, top;
    int column, first; /* in focus; the first in view behind the name */
    int order;         /* bh_column_id, -1: as in the plan */
    bool falling;
    char here[160]; /* the row in focus: its setting, arm and bin */
    size_t here_arm;
    int here_bin;
    int widths[BH_COLUMN_COUNT]; /* the widest cell that was in view */
    int compared;                /* bh_column_id: the column of which the old value is shown */
    double most_change;          /* [1] relative, of the column in focus */
    char **opened;               /* names of settings whose bins are open */
    size_t opened_count;
} bh_table_view;

/* --- what lies over them --- */

typedef enum {
    BH_OVER_NOTHING,
    BH_OVER_FIELD,  /* a value is being typed in the plan */
    BH_OVER_SHEET,  /* a text to read */
    BH_OVER_CHOOSE, /* a list to choose from */
    BH_OVER_ASK,    /* a question */
    BH_OVER_SOLVE,  /* what it would take */
    BH_OVER_FIND,   /* a word is looked for */
    BH_OVER_NAME    /* a file name is typed */
} bh_over;

typedef struct {
    bh_look look;
    const char *text; /* of the sheet's arena */
} bh_sheet_line;

typedef enum {
    BH_SHEET_HELP,
    BH_SHEET_MESSAGES,
    BH_SHEET_CAUTIONS,
    BH_SHEET_EXPLAIN,
    BH_SHEET_ABOUT,
    BH_SHEET_HISTORY
} bh_sheet_kind;

typedef struct {
    bh_sheet_kind kind;
    bh_arena *arena;
    const char *title;
    bh_sheet_line *lines;
    size_t count, room, top;
} bh_sheet;

typedef enum { BH_CHOOSE_VALUE, BH_CHOOSE_KEY, BH_CHOOSE_PLAN } bh_choose_kind;

typedef struct {
    const char *name, *about, *more; /* of the chooser's arena; more: range and source, or NULL */
} bh_choice;

typedef struct {
    bh_choose_kind kind;
    bh_arena *arena;
    const char *title;
    bh_choice *choices;
    size_t count, room;
    size_t *shown; /* those that the typed text leaves */
    size_t shown_count, at, top;
    bh_field typed;
} bh_chooser;

/* What would it take: an output, its wanted value, the input that may move. */
typedef struct {
    char setting[160], arm[320]; /* of a coincidence: A+B */
    int line;                    /* in focus: output, wanted, input, then the solutions */
    bh_column_id output;
    int by; /* bh_solve_input */
    bh_field wanted;
    bool due, waiting, enter; /* to be asked; asked; to be taken as soon as it is there */
    size_t asked;             /* number of the question */
    double value;             /* [1] wanted, in the unit of the output's key */
    bh_answer answer;         /* of no use with a count of 0 */
    char said[512];           /* what came of it, or why nothing did */
    bool bad;
} bh_solving;

/* Everything the user can be asked; the answers are in asks.c. */
typedef enum {
    BH_QUESTION_LEAVE,   /* with unsaved changes */
    BH_QUESTION_CHANGED, /* the file changed on disk, and is to be saved */
    BH_QUESTION_GONE,
    BH_QUESTION_RESCUE, /* unsaved work of an earlier day was found */
    BH_QUESTION_OTHER   /* someone else has the file open */
} bh_question_kind;

/* What the screen wants done that is not its own. */
typedef enum {
    BH_WISH_NOTHING,
    BH_WISH_SAVE,
    BH_WISH_SAVE_OVER,  /* though the file is another one than was read */
    BH_WISH_SAVE_LEAVE, /* save, then leave */
    BH_WISH_SAVE_AS,    /* under the name in `name` */
    BH_WISH_RELOAD,     /* drop the changes, read the file again */
    BH_WISH_LEAVE,
    BH_WISH_SUSPEND,
    BH_WISH_RESCUE,      /* take up the unsaved work that was found */
    BH_WISH_RESCUE_DROP, /* throw it away */
    BH_WISH_TAKE_OVER,   /* go on although someone else has the file */
    BH_WISH_OPEN         /* the plan chosen from the list: number in `chosen` */
} bh_wish;

typedef enum {
    BH_SHOW_CROSS_SECTION,
    BH_SHOW_RATE,
    BH_SHOW_COUNTS,
    BH_SHOW_NO_CURVE,
    BH_SHOW_COUNT
} bh_curve_shown;

typedef struct {
    int rows, columns; /* of the terminal */
    bh_pane pane;
    bh_over over;
    bool ascii;
    bool rescued; /* the text is not that of the file, though it was not changed here */
    bool fresh;   /* there is no file yet */
    bool job_due; /* a job is to begin */
    bool changes; /* of rates with angle and momentum came into view, and are computed since */
    bool spoke;   /* a note came that is not drawn yet */
    bool abandon; /* the job that was begun is of no use any more */
    bool trying;  /* trial is what the text would become */
    bool curve_due, explain_due, note_bad;
    char file[512]; /* its name, for the title */

    bh_edit *edit;    /* NULL: the text cannot be read as a document, or there is none yet */
    bh_text unread;   /* then the text */
    bh_edit *dropped; /* for a text that cannot be read; NULL: none */
    bh_diags *said;   /* and why */
    bh_plan_view plan;
    bh_table_view table;

    bh_outcome *now;  /* of the text that is shown, as far as it is known */
    bh_outcome *kept; /* complete, of the text without what is being typed */
    bh_outcome *pin;
    size_t job;    /* that was begun last */
    int menu_from; /* so many actions are left out of the menu line, which was turned over */
    size_t pasted; /* [1] characters of what is being pasted */

    bh_field field;            /* a value, a word to find, a name */
    char field_path[512];      /* of what is edited */
    const bh_node *field_node; /* or NULL where it is not there yet */
    char was[160];             /* the old value */
    bh_text trial;
    char why[512]; /* what is wrong with what is typed; else empty */

    bh_sheet sheet;
    bh_chooser chooser;
    bh_solving solving;
    bh_question_kind question;
    char question_text[3][240];
    int answer; /* in focus */

    bh_curve_shown curve_shown;
    bh_reply *curve;
    size_t curve_asked, explain_asked, solve_asked; /* numbers; 0: nothing is asked */

    bh_material_library *library;
    const bh_beginning *beginnings;
    size_t beginning_count, chosen;
    bh_wish wish;
    char note[240]; /* what just happened, until the next key */
} bh_model;

/* A model of the text `bytes`; `library` is for choosers and outlives it.  False without memory. */
bool bh_model_open(bh_model *model, const char *bytes, size_t length, const char *file);
void bh_model_close(bh_model *model);

/* Makes `bytes` the text, what was opened still counting as what is saved.  False where it cannot
 * be read as a document. */
bool bh_model_replace(bh_model *model, const char *bytes, size_t length);

/* The file was read again: its `bytes` take the place of the text, which can be brought back. False
 * without memory. */
bool bh_model_reload(bh_model *model, const char *bytes, size_t length);

/* What a key does. */
void bh_model_press(bh_model *model, const bh_press *press);

/* Leaves, or asks first. */
void bh_leave(bh_model *model);

/* The terminal has another size. */
void bh_model_resize(bh_model *model, int rows, int columns);

/* The text that the table should show: with what is being typed where that can be read. */
const char *bh_model_text(const bh_model *model, size_t *length);

/* The text without it, which would be saved. */
const char *bh_model_bytes(const bh_model *model, size_t *length);
size_t bh_model_unsaved(const bh_model *model);
void bh_model_saved(bh_model *model); /* it is in the file now */

/* What the worker handed back; the model takes it. */
void bh_model_adopt(bh_model *model, bh_outcome *outcome);
void bh_model_answer(bh_model *model, bh_reply *answer);

/* Settings in view, and those whose bins are open, for the next job.  Fills at most `room`. */
size_t bh_model_in_view(const bh_model *model, size_t *settings, size_t room);
size_t bh_model_opened(const bh_model *model, size_t *settings, size_t room);

/* Is the table that of the text? */
bool bh_model_current(const bh_model *model);

/* The newest outcome with totals and cautions, or NULL. */
const bh_outcome *bh_model_concluded(const bh_model *model);

/* Says what happened, in the line of messages. */
void bh_model_note(bh_model *model, bool bad, const char *fmt, ...) BH_PRINTF(3, 4);

/* --- planlines.c --- */
void bh_plan_lines_make(bh_model *model);
void bh_plan_lines_free(bh_plan_view *view);
void bh_plan_go(bh_model *model,
                const char *path);               /* to the line of `path`, opening what hides it */
void bh_plan_go_line(bh_model *model, int line); /* of the file */
void bh_plan_turn(bh_model *model, size_t line); /* opens or closes it */
void bh_plan_value(const bh_model *model, const bh_plan_line *line, bh_text *into);
const bh_plan_line *bh_plan_here(const bh_model *model); /* NULL where there is none */
bool bh_plan_press(bh_model *model, const bh_press *press);
void bh_plan_keep_in_view(bh_model *model);

/* --- typing.c --- */
void bh_value_begin(bh_model *model, const bh_press *typed); /* NULL: with the old value */
void bh_value_begin_key(bh_model *model, const char *path, const char *example);
bool bh_value_press(bh_model *model, const bh_press *press);
void bh_value_attempt(bh_model *model, const char *text); /* what it would make of the plan */
void bh_value_leave(bh_model *model);                     /* leaves everything as it was */
bool bh_value_keep(bh_model *model, const char *text);
int bh_field_width(const bh_model *model); /* [columns] of a text of several lines */

/* --- changing.c --- */
void bh_change_add(bh_model *model);
void bh_change_double(bh_model *model);
void bh_change_remove(bh_model *model);
void bh_change_earlier(bh_model *model);
void bh_change_later(bh_model *model);
void bh_change_back(bh_model *model);
void bh_change_again(bh_model *model);
void bh_change_done(bh_model *model); /* after every change of the text */

/* --- tableview.c --- */
void bh_table_refresh(bh_model *model); /* rows and columns from the outcomes */
void bh_table_free_view(bh_table_view *view);
bool bh_table_press(bh_model *model, const bh_press *press);
enum { BH_CELL_ROOM = 64 };
void bh_table_cell(const bh_model *model, const bh_table_row *row, const bh_table_column *column,
                   bool before, char out[BH_CELL_ROOM]);
/* Is another number shown than before? */
bool bh_table_changed(const bh_model *model, const bh_table_row *row,
                      const bh_table_column *column);
void bh_table_order(bh_model *model);
void bh_table_pin(bh_model *model);
void bh_table_open_bins(bh_model *model);
const bh_table_row *bh_table_here(const bh_model *model);
const bh_setting *bh_table_setting(const bh_model *model, const bh_table_row *row);
void bh_table_keep_in_view(bh_model *model);

void bh_table_go(bh_model *model, long by);

/* --- tablecells.c --- */
void bh_table_columns(bh_model *model);

/* --- sheets.c --- */
void bh_sheet_show(bh_model *model, bh_sheet_kind kind);
void bh_sheet_close(bh_sheet *sheet);
void bh_sheet_resized(bh_model *model); /* wrapped anew, at about the same place */
bool bh_sheet_press(bh_model *model, const bh_press *press);
void bh_sheet_explain(bh_model *model, const bh_reply *answer);

/* --- chooser.c --- */
bool bh_choose_value(bh_model *model); /* for the line in focus; false: nothing to choose from */
void bh_choose_key(bh_model *model, const char *mapping);
void bh_choose_plan(bh_model *model);
void bh_choose_close(bh_chooser *chooser);
bool bh_choose_press(bh_model *model, const bh_press *press);

/* --- solving.c --- */
void bh_solving_begin(bh_model *model, const bh_press *typed);
bool bh_solving_press(bh_model *model, const bh_press *press);
void bh_solving_answered(bh_model *model, const bh_reply *reply);

/* --- asks.c --- */
void bh_ask(bh_model *model, bh_question_kind kind);
bool bh_ask_press(bh_model *model, const bh_press *press);
int bh_ask_answers(bh_question_kind kind);
const char *bh_ask_answer(bh_question_kind kind, int i, char *key);
int bh_ask_row(const bh_model *model); /* of the terminal: that of the first answer */

/* --- actions.c --- */
typedef struct {
    const char *key, *word, *help;
    unsigned where; /* bits: 1 plan, 2 table */
    void (*run)(bh_model *model);
} bh_action;
const bh_action *bh_action_at(size_t i);
bool bh_action_press(bh_model *model, const bh_press *press);
bool bh_action_means(const bh_model *model, const bh_action *action);
enum { BH_MOST_MENU = 40 };
typedef struct {
    const bh_action *action;
    int column; /* of the terminal */
} bh_menu_place;

/* What stands in the menu line, and where; returns how many, `turn` of them give way to others when
 * the line is turned over. */
int bh_menu_places(const bh_model *model, bh_menu_place out[BH_MOST_MENU], int *turn);
void bh_menu_click(bh_model *model, int column);

/* --- finding.c --- */
void bh_find_begin(bh_model *model);
bool bh_find_press(bh_model *model, const bh_press *press);

/* --- arrange.c: where everything is --- */
typedef struct {
    int title, message, message_rows, caution, menu;            /* rows; -1: none */
    int body, body_rows;                                        /* the first, how many */
    int plan_column, plan_columns, table_column, table_columns; /* 0 columns: hidden */
    int over_columns; /* of a text to read: over the plan alone where that is wide enough */
    int table_rows;   /* of body, without the heads; the curve has the rest */
    int curve, curve_rows;
} bh_arrangement;
bh_arrangement bh_arrange(const bh_model *model);

/* Which columns stand where: those of the view from the left, the first always. */
typedef struct {
    int count;
    int index[BH_MOST_SHOWN];  /* of the view's columns; -1: what the compared one was */
    int column[BH_MOST_SHOWN]; /* of the terminal */
    int width[BH_MOST_SHOWN];
} bh_column_places;
void bh_place_columns(const bh_model *model, const bh_arrangement *places, bh_column_places *out);
int bh_table_column_at(const bh_model *model, int column); /* -1: none */

#endif
