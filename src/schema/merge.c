/* merge.c - one struct of a schema laid upon another. */
#include <string.h>

#include "beamhours/schema/schema.h"

static size_t size_of(const bh_key *key)
{
    switch (key->kind) {
    case BH_KEY_QUANTITY:
    case BH_KEY_NUMBER:
    case BH_KEY_COUNT:
        return sizeof(bh_value);
    case BH_KEY_EXTENT:
    case BH_KEY_RANGE:
        return sizeof(bh_extent);
    case BH_KEY_WORD:
    case BH_KEY_NAME:
    case BH_KEY_TEXT:
        return sizeof(bh_word);
    case BH_KEY_EITHER:
        return sizeof(bh_either);
    case BH_KEY_SWEEP:
        return sizeof(bh_sweep);
    case BH_KEY_TABLE:
        return sizeof(bh_pairs);
    case BH_KEY_VALUES:
        return sizeof(bh_values);
    case BH_KEY_WORDS:
        return sizeof(bh_words);
    case BH_KEY_LIST:
        return sizeof(bh_list);
    case BH_KEY_MAPPING:
        break;
    }
    return key->children->size;
}

bool bh_schema_given(const bh_key *key, const void *in)
{
    const void *member = (const unsigned char *)in + key->offset;
    switch (key->kind) {
    case BH_KEY_QUANTITY:
    case BH_KEY_NUMBER:
    case BH_KEY_COUNT:
        return ((const bh_value *)member)->given;
    case BH_KEY_EXTENT:
    case BH_KEY_RANGE:
        return ((const bh_extent *)member)->given;
    case BH_KEY_WORD:
    case BH_KEY_NAME:
    case BH_KEY_TEXT:
        return ((const bh_word *)member)->given;
    case BH_KEY_EITHER:
        return ((const bh_either *)member)->value.given || ((const bh_either *)member)->word.given;
    case BH_KEY_SWEEP:
        return ((const bh_sweep *)member)->given;
    case BH_KEY_TABLE:
        return ((const bh_pairs *)member)->given;
    case BH_KEY_VALUES:
        return ((const bh_values *)member)->given;
    case BH_KEY_WORDS:
        return ((const bh_words *)member)->given;
    case BH_KEY_LIST:
        return ((const bh_list *)member)->given;
    case BH_KEY_MAPPING:
        break;
    }
    return ((const bh_section *)member)->given;
}

bh_mark bh_schema_mark(const bh_key *key, const void *in)
{
    const void *member = (const unsigned char *)in + key->offset;
    switch (key->kind) {
    case BH_KEY_QUANTITY:
    case BH_KEY_NUMBER:
    case BH_KEY_COUNT:
        return ((const bh_value *)member)->at;
    case BH_KEY_EXTENT:
    case BH_KEY_RANGE:
        return ((const bh_extent *)member)->at;
    case BH_KEY_WORD:
    case BH_KEY_NAME:
    case BH_KEY_TEXT:
        return ((const bh_word *)member)->at;
    case BH_KEY_EITHER:
        return ((const bh_either *)member)->value.at;
    case BH_KEY_SWEEP:
        return ((const bh_sweep *)member)->at;
    case BH_KEY_TABLE:
        return ((const bh_pairs *)member)->at;
    case BH_KEY_VALUES:
        return ((const bh_values *)member)->at;
    case BH_KEY_WORDS:
        return ((const bh_words *)member)->at;
    case BH_KEY_LIST:
        return ((const bh_list *)member)->at;
    case BH_KEY_MAPPING:
        break;
    }
    return ((const bh_section *)member)->at;
}

/* The others of the group that `key` belongs to become absent. */
static void clear_group(const bh_schema *schema, const bh_key *key, unsigned char *out)
{
    for (size_t i = 0; i < schema->count; i++) {
        const bh_key *other = &schema->keys[i];
        if (key->group == 0 || other == key || other->group != key->group)
            continue;
        const bh_mark at = ((const bh_section *)(const void *)out)->at;
        memset(out + other->offset, 0, size_of(other));
        if (other->kind == BH_KEY_MAPPING)
            ((bh_section *)(void *)(out + other->offset))->at = at;
    }
}

/* NOLINTNEXTLINE(misc-no-recursion): as deep as the tables of keys are, five levels */
void bh_schema_merge(const bh_schema *schema, const void *base, const void *over, void *out)
{
    const unsigned char *top = over;
    unsigned char *to = out;
    if (out != base)
        memcpy(out, base, schema->size);
    const bh_section *section = over;
    if (section->given)
        *(bh_section *)out = *section;
    for (size_t i = 0; i < schema->count; i++) {
        const bh_key *key = &schema->keys[i];
        if (!bh_schema_given(key, over))
            continue;
        clear_group(schema, key, to);
        if (key->kind == BH_KEY_MAPPING)
            bh_schema_merge(key->children, to + key->offset, top + key->offset, to + key->offset);
        else
            memcpy(to + key->offset, top + key->offset, size_of(key));
    }
}
