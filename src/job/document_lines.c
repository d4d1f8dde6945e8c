/* Sections and their names. */
#include "job/document_lines.h"
#include "base/utf8.h"
#include <string.h>

static const struct {
    const char *word;
    enum section_kind kind;
} kinds[] = {
    {"outline", SECTION_OUTLINE}, {"pours", SECTION_POURS}, {"opening", SECTION_OPENING},
    {"object", SECTION_OBJECT},   {"edge", SECTION_EDGE},   {"joint", SECTION_JOINT},
    {"crack", SECTION_CRACK},
};

static bool same(const char *bytes, size_t length, const char *word)
{
    return strlen(word) == length && memcmp(bytes, word, length) == 0;
}

enum section_kind section_kind_of(const char *word, size_t length)
{
    for (size_t i = 0; i < sizeof kinds / sizeof *kinds; i++)
        if (same(word, length, kinds[i].word))
            return kinds[i].kind;
    for (int id = 0; id < FIELD_COUNT; id++)
        if (same(word, length, field_table[id].section))
            return SECTION_ONCE;
    return SECTION_UNKNOWN;
}

size_t section_most(enum section_kind kind)
{
    switch (kind) {
    case SECTION_OPENING:
    case SECTION_CRACK:
        return 1000;
    case SECTION_OBJECT:
    case SECTION_EDGE:
    case SECTION_JOINT:
        return 5000;
    default:
        return 0;
    }
}

bool section_is_single(enum section_kind kind)
{
    return kind == SECTION_ONCE || kind == SECTION_OUTLINE || kind == SECTION_POURS;
}

bool section_is_named(enum section_kind kind)
{
    return kind == SECTION_OPENING || kind == SECTION_OBJECT || kind == SECTION_EDGE;
}

bool section_has_row(enum section_kind kind, const char *key, size_t length)
{
    if (kind == SECTION_POURS)
        return same(key, length, "line");
    if (kind != SECTION_OUTLINE && kind != SECTION_OPENING && kind != SECTION_CRACK)
        return false;
    return same(key, length, "point") || same(key, length, "arc");
}

/* Letters and digits of any script: beyond ASCII everything but the blocks of controls, blanks,
 * punctuation, symbols and private use (Unicode 15 block list). */
static bool is_name_code(uint32_t code)
{
    static const uint32_t not_letters[][2] = {
        {0x80, 0xA9},       {0xAB, 0xB4},       {0xB6, 0xB9},     {0xBB, 0xBF},
        {0xD7, 0xD7},       {0xF7, 0xF7},       {0x2000, 0x206F}, {0x20A0, 0x20CF},
        {0x2190, 0x2BFF},   {0x2E00, 0x2E7F},   {0x3000, 0x3004}, {0x3008, 0x3020},
        {0xE000, 0xF8FF},   {0xFE00, 0xFE6F},   {0xFEFF, 0xFF0F}, {0xFFE0, 0xFFFF},
        {0x1F000, 0x1FAFF}, {0xE0000, 0x10FFFF}};

    if (code < 0x80)
        return (code >= 'a' && code <= 'z') || (code >= 'A' && code <= 'Z') ||
               (code >= '0' && code <= '9') || code == '_' || code == '-';
    for (size_t i = 0; i < sizeof not_letters / sizeof *not_letters; i++)
        if (code >= not_letters[i][0] && code <= not_letters[i][1])
            return false;
    return true;
}

bool section_name_good(const char *name, size_t length)
{
    if (length < 1 || length > 32)
        return false;
    while (length > 0) {
        uint32_t code;
        size_t step = utf8_decode(name, length, &code);
        if (step == 0 || !is_name_code(code))
            return false;
        name += step;
        length -= step;
    }
    return true;
}

int section_number(const char *name, size_t length)
{
    int number = 0;

    if (length < 1 || length > 6)
        return 0;
    for (size_t i = 0; i < length; i++) {
        if (name[i] < '0' || name[i] > '9')
            return 0;
        number = number * 10 + (name[i] - '0');
    }
    return number;
}

bool span_is(const struct document *document, struct span span, const char *word)
{
    return same(document->bytes + span.at, span.length, word);
}

static bool name_matches(const struct document *document, const struct section *section,
                         const char *name, size_t length)
{
    if (section_is_single(section->kind))
        return true;
    if (section->kind == SECTION_OPENING || section->kind == SECTION_OBJECT)
        return section->name.length == length &&
               memcmp(document->bytes + section->name.at, name, length) == 0;
    return section->number == section_number(name, length);
}

int document_find_section(const struct document *document, enum section_kind kind, const char *word,
                          size_t word_length, const char *name, size_t name_length)
{
    for (size_t i = 0; i < document->section_count; i++) {
        const struct section *section = &document->sections[i];
        if (section->kind == kind && section->word.length == word_length &&
            memcmp(document->bytes + section->word.at, word, word_length) == 0 &&
            name_matches(document, section, name, name_length))
            return (int)i;
    }
    return -1;
}

int document_column(const struct document *document, const struct line *line, size_t at)
{
    int column = 1;

    for (size_t i = line->whole.at; i < at; i++)
        column += ((unsigned char)document->bytes[i] & 0xC0) != 0x80;
    return column;
}

const struct field *document_field(const struct document *document, const struct line *line)
{
    const struct section *section;
    char word[64], key[64];

    if (line->section < 0)
        return NULL;
    section = &document->sections[line->section];
    if (section->word.length >= sizeof word || line->key.length >= sizeof key)
        return NULL;
    memcpy(word, document->bytes + section->word.at, section->word.length);
    word[section->word.length] = '\0';
    memcpy(key, document->bytes + line->key.at, line->key.length);
    key[line->key.length] = '\0';
    return field_find(word, key);
}

void document_pair_path(const struct document *document, const struct line *line, struct text *out)
{
    if (line->section >= 0) {
        const struct section *section = &document->sections[line->section];
        text_add_bytes(out, document->bytes + section->word.at, section->word.length);
        text_add(out, ".");
        if (section->kind == SECTION_JOINT || section->kind == SECTION_CRACK ||
            section->kind == SECTION_EDGE)
            text_format(out, "%d.", section->number);
        else if (section->name.length > 0) {
            text_add_bytes(out, document->bytes + section->name.at, section->name.length);
            text_add(out, ".");
        }
    }
    text_add_bytes(out, document->bytes + line->key.at, line->key.length);
}
