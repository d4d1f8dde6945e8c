/* Reading the grammar: lines, headers, pairs (docs/format.md). Values are read in document_job.c.
 */
#include "job/document_lines.h"
#include "base/array.h"
#include "base/utf8.h"
#include <stdlib.h>
#include <string.h>

/* What is being parsed. */
struct parser {
    struct document *document;
    struct finding_list *findings;
    size_t errors;   /* said so far */
    int section;     /* the one the next pair belongs to, -1 none */
    bool any_pair;   /* a pair was seen */
    bool any_header; /* a header was seen */
    bool no_memory;
};

__attribute__((format(printf, 5, 6))) static void
complain(struct parser *p, size_t line, size_t at, const char *limit, const char *format, ...)
{
    const struct document *document = p->document;
    const struct line *l = line < document->line_count ? &document->lines[line] : NULL;
    struct text message = {0};
    va_list arguments;

    if (p->errors++ > FINDINGS_MOST)
        return;
    if (p->errors > FINDINGS_MOST) {
        finding_add(p->findings, SEVERITY_ERROR, "", "", "", (int)line + 1, 1,
                    "There are more errors than %d; these are the first.", FINDINGS_MOST);
        return;
    }
    va_start(arguments, format);
    text_vformat(&message, format, arguments);
    va_end(arguments);
    finding_add(p->findings, SEVERITY_ERROR, "", "", limit, (int)line + 1,
                l != NULL ? document_column(document, l, at) : 1, "%s", text_string(&message));
    text_free(&message);
}

__attribute__((format(printf, 6, 7))) static void complain_at(struct parser *p, size_t line,
                                                              size_t at, const char *path,
                                                              const char *limit, const char *format,
                                                              ...)
{
    struct text message = {0};
    va_list arguments;
    size_t before = p->findings->count;

    va_start(arguments, format);
    text_vformat(&message, format, arguments);
    va_end(arguments);
    complain(p, line, at, limit, "%s", text_string(&message));
    if (p->findings->count > before && path[0] != '\0' && p->errors <= FINDINGS_MOST) {
        char *field = strdup(path);
        if (field != NULL) {
            free(p->findings->items[before].field);
            p->findings->items[before].field = field;
        }
    }
    text_free(&message);
}

static void note(struct parser *p, size_t line, const char *path, const char *words)
{
    if (p->errors <= FINDINGS_MOST && p->findings->count < (size_t)FINDINGS_MOST * 4)
        finding_add(p->findings, SEVERITY_NOTE, path, "", "", (int)line + 1,
                    document_column(p->document, &p->document->lines[line],
                                    p->document->lines[line].key.at),
                    "%s: %s", path, words);
}

/* ---- lines ---- */

static bool cut_lines(struct document *document)
{
    size_t at = 0;

    if (document->count >= 3 && memcmp(document->bytes, "\xEF\xBB\xBF", 3) == 0)
        at = 3;
    while (at < document->count) {
        const char *feed = memchr(document->bytes + at, '\n', document->count - at);
        size_t end = feed != NULL ? (size_t)(feed - document->bytes) : document->count;
        struct line line = {.whole = {at, end - at}, .section = -1, .previous_key = -1};

        line.end_length = feed != NULL;
        if (feed != NULL && end > at && document->bytes[end - 1] == '\r') {
            line.whole.length--;
            line.end_length = 2;
        }
        if (!array_reserve((void **)&document->lines, &document->line_capacity,
                           document->line_count + 1, sizeof *document->lines))
            return false;
        document->lines[document->line_count++] = line;
        at = line.whole.at + line.whole.length + line.end_length;
    }
    return true;
}

static bool is_blank(char c)
{
    return c == ' ' || c == '\t';
}

static size_t skip_blanks(const char *bytes, size_t at, size_t end)
{
    while (at < end && is_blank(bytes[at]))
        at++;
    return at;
}

/* Where a comment begins, or `end`: a # first on the line or after a blank, outside quotes. A
 * value is quoted when it begins with a quotation mark. */
static size_t comment_start(const char *bytes, size_t from, size_t end, bool first)
{
    size_t at = from;

    if (at < end && bytes[at] == '"') {
        for (at++; at < end && bytes[at] != '"'; at++)
            if (bytes[at] == '\\' && at + 1 < end)
                at++;
    }
    for (; at < end; at++)
        if (bytes[at] == '#' && ((first && at == from) || (at > 0 && is_blank(bytes[at - 1]))))
            return at;
    return end;
}

/* The whole line is text without a comment, NUL and with good UTF-8; says what is not. */
static bool line_sound(struct parser *p, size_t index)
{
    const struct line *line = &p->document->lines[index];
    const char *bytes = p->document->bytes + line->whole.at;
    const char *nul = memchr(bytes, '\0', line->whole.length);
    size_t bad = utf8_invalid_at(bytes, line->whole.length);

    if (line->whole.length > LINE_MOST) {
        complain(p, index, line->whole.at + LINE_MOST, "4096 bytes",
                 "The line has %zu bytes; at most 4096 are read. Break it up.", line->whole.length);
        return false;
    }
    if (nul != NULL) {
        complain(p, index, (size_t)(nul - p->document->bytes), "",
                 "The line holds a NUL byte; is this a job file? Save it as plain text.");
        return false;
    }
    if (bad < line->whole.length) {
        complain(p, index, line->whole.at + bad, "UTF-8",
                 "The line is not UTF-8 (byte %02X); save the file as UTF-8.",
                 (unsigned)(unsigned char)bytes[bad]);
        return false;
    }
    return true;
}

/* ---- headers ---- */

static size_t skip_word(const char *bytes, size_t at, size_t end)
{
    if (at >= end || bytes[at] < 'a' || bytes[at] > 'z')
        return at;
    while (at < end && ((bytes[at] >= 'a' && bytes[at] <= 'z') || bytes[at] == '-'))
        at++;
    return at;
}

/* "[" section [ name ] "]"; false when it is none. */
static bool split_header(const struct document *document, struct line *line, size_t from,
                         size_t end, struct span *name)
{
    const char *bytes = document->bytes;
    size_t at = skip_blanks(bytes, from + 1, end), start;

    start = at;
    at = skip_word(bytes, at, end);
    line->key = (struct span){start, at - start};
    if (at == start)
        return false;
    start = skip_blanks(bytes, at, end);
    if (start > at) {
        at = start;
        while (at < end && bytes[at] != ']' && !is_blank(bytes[at]))
            at++;
        *name = (struct span){start, at - start};
        at = skip_blanks(bytes, at, end);
    }
    if (at >= end || bytes[at] != ']')
        return false;
    at = skip_blanks(bytes, at + 1, end);
    return at == end || comment_start(bytes, at, end, is_blank(bytes[at - 1])) == at;
}

/* A new section is added; its index, or -1 on no memory. */
static int add_section(struct parser *p, struct section section)
{
    struct document *document = p->document;

    if (!array_reserve((void **)&document->sections, &document->section_capacity,
                       document->section_count + 1, sizeof *document->sections)) {
        p->no_memory = true;
        return -1;
    }
    document->sections[document->section_count] = section;
    return (int)document->section_count++;
}

/* Whether the name fits the kind; says what is wrong. */
static bool name_fits(struct parser *p, size_t index, const struct section *section)
{
    const char *bytes = p->document->bytes;
    const char *word = bytes + section->word.at, *name = bytes + section->name.at;
    int length = (int)section->word.length;

    if (section->kind == SECTION_EDGE && section->number < 1) {
        complain(p, index, section->name.length > 0 ? section->name.at : section->word.at,
                 "a whole number from 1",
                 "[%.*s] needs the number of a side, such as [edge 3] for the side from row 3 to "
                 "the next.",
                 length, word);
        return false;
    }
    if (section_is_named(section->kind) && section->name.length == 0) {
        complain(p, index, section->word.at, "1 to 32 bytes",
                 "[%.*s] needs a name, such as [%.*s C1].", length, word, length, word);
        return false;
    }
    if (section->name.length > 0 && !section_name_good(name, section->name.length)) {
        complain(p, index, section->name.at, "1 to 32 bytes",
                 "The name '%.*s' is not good: letters, digits, _ and -, 1 to 32 bytes.",
                 (int)(section->name.length > 40 ? 40 : section->name.length), name);
        return false;
    }
    if (section->name.length > 0 && !section_is_named(section->kind) &&
        section->kind != SECTION_UNKNOWN) {
        complain(p, index, section->name.at, "", "[%.*s] takes no name; write [%.*s].", length,
                 word, length, word);
        return false;
    }
    return true;
}

/* The section of a header: the old one when its parts are joined, else a new one. */
static int enter_section(struct parser *p, size_t index, struct section *section)
{
    struct document *document = p->document;
    const char *bytes = document->bytes;
    enum section_kind kind = section->kind;
    int found = -1;

    if (kind != SECTION_UNKNOWN && kind != SECTION_JOINT && kind != SECTION_CRACK)
        found =
            document_find_section(document, kind, bytes + section->word.at, section->word.length,
                                  bytes + section->name.at, section->name.length);
    if (found >= 0 && section_is_single(kind))
        return found;
    if (found >= 0) {
        complain(p, index, section->name.at, "",
                 "[%.*s %.*s] is already on line %d; a name stands once. Give it another name.",
                 (int)section->word.length, bytes + section->word.at, (int)section->name.length,
                 bytes + section->name.at, document->sections[found].header_line + 1);
        return -1;
    }
    if (section_most(kind) > 0 && document->counts[kind] >= section_most(kind)) {
        complain(p, index, section->word.at, "",
                 "There are more than %zu [%.*s] sections; that is more than this program takes.",
                 section_most(kind), (int)section->word.length, bytes + section->word.at);
        return -1;
    }
    document->counts[kind]++;
    if (kind == SECTION_JOINT || kind == SECTION_CRACK)
        section->number = (int)document->counts[kind];
    return add_section(p, *section);
}

static void read_header(struct parser *p, size_t index, size_t from, size_t end)
{
    struct document *document = p->document;
    struct line *line = &document->lines[index];
    struct section section = {.header_line = (int)index, .last_key = -1};

    p->any_header = true;
    p->section = -2; /* pairs behind a bad header belong nowhere */
    line->kind = LINE_BAD;
    if (!split_header(document, line, from, end, &section.name)) {
        complain(p, index, from, "", "This is no header; write [slab] or [object C1].");
        return;
    }
    section.word = line->key;
    section.kind = section_kind_of(document->bytes + section.word.at, section.word.length);
    if (section.kind == SECTION_EDGE)
        section.number = section_number(document->bytes + section.name.at, section.name.length);
    if (!name_fits(p, index, &section))
        return;
    line->section = enter_section(p, index, &section);
    if (line->section < 0)
        return;
    line->kind = LINE_HEADER;
    p->section = line->section;
    if (section.kind == SECTION_UNKNOWN) {
        struct text word = {0};
        text_add_bytes(&word, document->bytes + section.word.at, section.word.length);
        note(p, index, text_string(&word), "no such section; it is kept as it is and not used.");
        text_free(&word);
    }
}

/* ---- pairs ---- */

static size_t skip_key(const char *bytes, size_t at, size_t end)
{
    if (at >= end || bytes[at] < 'a' || bytes[at] > 'z')
        return at;
    while (at < end && ((bytes[at] >= 'a' && bytes[at] <= 'z') || bytes[at] == '-' ||
                        (bytes[at] >= '0' && bytes[at] <= '9')))
        at++;
    return at;
}

/* key "=" [ value ] [ comment ]; false when it is none. */
static bool split_pair(const struct document *document, struct line *line, size_t from, size_t end)
{
    const char *bytes = document->bytes;
    size_t at = skip_key(bytes, from, end);

    line->key = (struct span){from, at - from};
    if (at == from)
        return false;
    at = skip_blanks(bytes, at, end);
    if (at >= end || bytes[at] != '=')
        return false;
    from = skip_blanks(bytes, at + 1, end);
    end = comment_start(bytes, from, end, false);
    while (end > from && is_blank(bytes[end - 1]))
        end--;
    if (end <= from)
        from = end = at + 1;
    line->value = (struct span){from, end - from};
    return true;
}

static bool check_format_line(struct parser *p, size_t index)
{
    const struct document *document = p->document;
    const struct line *line = &document->lines[index];

    if (!span_is(document, line->key, "format") || p->any_header) {
        complain_at(p, index, line->key.at, "format", "format = 1",
                    "The file does not begin with format = 1; put that on its first line.");
        return false;
    }
    if (!span_is(document, line->value, "1")) {
        complain_at(p, index, line->value.at, "format", "1",
                    "format: '%.*s' is not known; this program reads format = 1.",
                    (int)(line->value.length > 40 ? 40 : line->value.length),
                    document->bytes + line->value.at);
        return false;
    }
    return true;
}

/* Refuses a key that its section already has. */
static bool key_is_new(struct parser *p, size_t index)
{
    struct document *document = p->document;
    struct line *line = &document->lines[index];
    struct section *section = &document->sections[line->section];
    struct text path = {0};

    for (int i = section->last_key; i >= 0; i = document->lines[i].previous_key) {
        const struct line *other = &document->lines[i];
        if (other->key.length != line->key.length ||
            memcmp(document->bytes + other->key.at, document->bytes + line->key.at,
                   line->key.length) != 0)
            continue;
        document_pair_path(document, line, &path);
        complain_at(p, index, line->key.at, text_string(&path), "",
                    "%s stands on line %d and again on line %zu; take one of them out.",
                    text_string(&path), i + 1, index + 1);
        text_free(&path);
        return false;
    }
    if (section->key_count >= KEYS_MOST) {
        complain(p, index, line->key.at, "500", "The section has more than 500 keys.");
        return false;
    }
    section->key_count++;
    line->previous_key = section->last_key;
    section->last_key = (int)index;
    return true;
}

static void enter_pair(struct parser *p, size_t index)
{
    struct document *document = p->document;
    struct line *line = &document->lines[index];
    struct section *section = &document->sections[p->section];
    struct text path = {0};

    line->section = p->section;
    if (section->kind == SECTION_UNKNOWN)
        return;
    if (section_has_row(section->kind, document->bytes + line->key.at, line->key.length)) {
        if (line->value.length > 0 && ++section->row_count == 20001)
            complain(p, index, line->key.at, "20000", "The section has more than 20000 rows.");
        return;
    }
    if (line->value.length > 0 && !key_is_new(p, index)) {
        line->kind = LINE_BAD;
        return;
    }
    if (document_field(document, line) == NULL) {
        document_pair_path(document, line, &path);
        note(p, index, text_string(&path), "no such key; it is kept as it is and not used.");
        text_free(&path);
    }
}

static void read_pair(struct parser *p, size_t index, size_t from, size_t end)
{
    struct document *document = p->document;
    struct line *line = &document->lines[index];
    bool first = !p->any_pair;

    line->kind = LINE_BAD;
    if (!split_pair(document, line, from, end)) {
        complain(p, index, from, "",
                 "This is neither a [section] nor a pair such as thickness = 200 mm.");
        return;
    }
    p->any_pair = true;
    if (first && !check_format_line(p, index) && span_is(document, line->key, "format"))
        return;
    line->kind = LINE_PAIR;
    line->text_at = document->values.length;
    text_add_bytes(&document->values, document->bytes + line->value.at, line->value.length);
    text_add_char(&document->values, '\0', 1);
    if (p->section >= 0) {
        enter_pair(p, index);
    } else if (p->section == -2) {
        line->kind = LINE_BAD;
    } else if (!first && span_is(document, line->key, "format")) {
        complain_at(p, index, line->key.at, "format", "",
                    "format stands on an earlier line and again on line %zu; take one out.",
                    index + 1);
    } else if (!first) {
        note(p, index, "", "this pair stands before any [section]; it is kept and not used.");
    }
}

static void read_line(struct parser *p, size_t index)
{
    struct document *document = p->document;
    struct line *line = &document->lines[index];
    const char *bytes = document->bytes;
    size_t end = line->whole.at + line->whole.length, at;

    if (!line_sound(p, index)) {
        line->kind = LINE_BAD;
        return;
    }
    at = skip_blanks(bytes, line->whole.at, end);
    line->key = (struct span){at, 0};
    if (at == end || bytes[at] == '#')
        line->kind = LINE_EMPTY;
    else if (bytes[at] == '[')
        read_header(p, index, at, end);
    else
        read_pair(p, index, at, end);
}

enum status document_read_lines(struct document *document, struct finding_list *findings)
{
    struct parser p = {.document = document, .findings = findings, .section = -1};

    if (!cut_lines(document))
        return STATUS_NO_MEMORY;
    for (size_t i = 0; i < document->line_count; i++)
        read_line(&p, i);
    if (p.no_memory || document->values.failed || findings->failed)
        return STATUS_NO_MEMORY;
    if (!p.any_pair)
        finding_add(findings, SEVERITY_ERROR, "format", "", "format = 1", 1, 1,
                    "The file does not begin with format = 1; put that on its first line.");
    return p.errors > 0 || !p.any_pair ? STATUS_REFUSED : STATUS_OK;
}
