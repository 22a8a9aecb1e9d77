/* setting_key.c - the text that a setting follows from, in one number. */
#include "beamhours/run/setting_key.h"

#include <string.h>

/* Two different sums of the same bytes: FNV-1a, and a multiplicative one after Knuth. */
static void feed(bh_setting_key *key, const void *bytes, size_t length)
{
    const unsigned char *b = bytes;
    for (size_t i = 0; i < length; i++) {
        key->word[0] = (key->word[0] ^ b[i]) * 1099511628211u;
        key->word[1] = (key->word[1] + b[i] + 1) * 6364136223846793005u + 1442695040888963407u;
    }
}

static void feed_size(bh_setting_key *key, size_t number)
{
    feed(key, &number, sizeof number);
}

static const bh_setting_key empty = {{14695981039346656037u, 1}};

/* A node; false where it has no bytes of its own. */
static bool feed_node(bh_setting_key *key, const bh_plan *plan, const bh_node *node)
{
    size_t length = 0;
    const char *bytes = bh_document_bytes(plan->document, &length);
    if (!node) {
        feed(key, "-", 1);
        return true;
    }
    if (node->to <= node->from || node->to > length)
        return false;
    feed_size(key, (size_t)node->at.column);
    feed_size(key, node->to - node->from);
    feed(key, bytes + node->from, node->to - node->from);
    return true;
}

static bh_lines lines_of(const bh_plan *plan, const bh_node *node)
{
    size_t length = 0;
    const char *bytes = bh_document_bytes(plan->document, &length);
    bh_lines lines = {0, 0};
    if (!node)
        return lines;
    lines.from = lines.to = node->at.line;
    size_t to = node->to < length ? node->to : length; /* of block text: past the blank lines */
    while (to > node->from && (bytes[to - 1] == '\n' || bytes[to - 1] == ' '))
        to--;
    for (size_t i = node->from; i < to; i++)
        lines.to += bytes[i] == '\n';
    return lines;
}

/* The item of a list, or the mapping itself, that stands at `at`. */
static const bh_node *node_at(const bh_node *list, bh_mark at, size_t *hint)
{
    for (size_t n = 0; list && list->kind == BH_NODE_LIST && n < list->count; n++) {
        const size_t i = (*hint + n) % list->count;
        if (list->items[i]->at.line == at.line && list->items[i]->at.column == at.column) {
            *hint = i;
            return list->items[i];
        }
    }
    return list && list->at.line == at.line && list->at.column == at.column ? list : NULL;
}

enum { SHARED = 4 };

/* A target or an arm. */
struct part {
    bh_setting_key key; /* zero: none */
    bh_lines lines;
};

struct sources {
    const bh_plan *plan;
    const bh_node *targets, *arms, *settings;
    bh_setting_key common; /* of what all settings share */
    bh_lines common_lines[SHARED];
    struct part *of[2]; /* each target, each arm */
};

static void digest(const struct sources *x, const bh_node *list, bh_mark at, struct part *out)
{
    size_t hint = 0;
    const bh_node *node = node_at(list, at, &hint);
    out->key = empty;
    out->lines = lines_of(x->plan, node);
    if (!node || !feed_node(&out->key, x->plan, node))
        out->key = (bh_setting_key){{0, 0}};
}

static void digest_common(struct sources *x, const bh_node *root)
{
    static const char *const shared[SHARED] = {"plan", "beam", "models", "every_setting"};
    bool whole = true;
    x->common = empty;
    for (size_t i = 0; i < SHARED; i++) {
        const bh_node *node = bh_node_get(root, shared[i]);
        whole = feed_node(&x->common, x->plan, node) && whole;
        x->common_lines[i] = lines_of(x->plan, node);
    }
    feed(&x->common, &x->plan->schedule.available.value, sizeof(double)); /* a warning compares */
    feed_size(&x->common, x->plan->schedule.available.given);
    if (!whole)
        x->common = (bh_setting_key){{0, 0}};
}

static bool prepare(struct sources *x, bh_arena *arena)
{
    const bh_plan *plan = x->plan;
    const bh_node *root = bh_document_root(plan->document);
    x->targets = bh_node_get(root, "targets");
    x->targets = x->targets ? x->targets : bh_node_get(root, "target");
    x->arms = bh_node_get(root, "arms");
    x->settings = bh_node_get(root, "settings");
    digest_common(x, root);
    x->of[0] = bh_arena_take(arena, plan->target_count + 1, sizeof **x->of);
    x->of[1] = bh_arena_take(arena, plan->arm_count + 1, sizeof **x->of);
    if (!x->of[0] || !x->of[1])
        return false;
    for (size_t t = 0; t < plan->target_count; t++)
        digest(x, x->targets, plan->targets[t].at, &x->of[0][t]);
    for (size_t a = 0; a < plan->arm_count; a++)
        digest(x, x->arms, plan->arms[a].at, &x->of[1][a]);
    return true;
}

/* Adds one of the parts; false when it is none. */
static bool add(bh_setting_source *source, const struct part *part)
{
    feed(&source->key, &part->key, sizeof part->key);
    source->lines[source->count++] = part->lines;
    return part->key.word[0] || part->key.word[1];
}

static bool add_target(const struct sources *x, const bh_target *target, bh_setting_source *source)
{
    const size_t t = target ? (size_t)(target - x->plan->targets) : x->plan->target_count;
    return t < x->plan->target_count && add(source, &x->of[0][t]);
}

static bool add_arm(const struct sources *x, const bh_arm *arm, bh_setting_source *source)
{
    for (size_t a = 0; a < x->plan->arm_count; a++)
        if (x->plan->arms[a].at.line == arm->at.line &&
            x->plan->arms[a].at.column == arm->at.column)
            return add(source, &x->of[1][a]);
    return false;
}

/* What all share goes first, the setting itself, then what it refers to. */
static bool trace(const struct sources *x, const bh_setting *s, const bh_node *node,
                  bh_setting_source *source)
{
    source->key = empty;
    bool whole =
        node && feed_node(&source->key, x->plan, node) && (x->common.word[0] || x->common.word[1]);
    feed(&source->key, &x->common, sizeof x->common);
    for (size_t i = 0; i < SHARED; i++)
        source->lines[source->count++] = x->common_lines[i];
    source->lines[source->count++] = lines_of(x->plan, node);
    whole = whole && add_target(x, s->target, source);
    if (whole && s->target->empty_use)
        whole = add_target(x, s->target->empty_use, source);
    for (size_t a = 0; whole && a < s->arm_count; a++)
        whole = add_arm(x, &s->arms[a].arm, source);
    feed(&source->key, s->name, strlen(s->name) + 1); /* tells the steps of a sweep apart */
    return whole;
}

bool bh_setting_sources(const bh_plan *plan, bh_arena *arena, bh_setting_source *sources)
{
    struct sources x = {.plan = plan};
    size_t hint = 0;
    if (!prepare(&x, arena))
        return false;
    for (size_t s = 0; s < plan->setting_count; s++) {
        const bh_setting *setting = &plan->settings[s];
        const bh_node *node = node_at(x.settings, setting->at, &hint);
        sources[s] = (bh_setting_source){.count = 0};
        sources[s].lines =
            bh_arena_take(arena, SHARED + 3 + setting->arm_count, sizeof *sources[s].lines);
        if (!sources[s].lines)
            return false;
        if (!trace(&x, setting, node, &sources[s]))
            sources[s].key = (bh_setting_key){{0, 0}};
    }
    return true;
}
