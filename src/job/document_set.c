/* PATH = VALUE in a document (docs/format.md "What set can address"). A change is made in a copy of
 * the text, which is parsed again and takes the old one's place only when everything went well. */
#include "job/document_path.h"
#include "base/utf8.h"
#include "job/value.h"
#include <stdlib.h>
#include <string.h>

struct change {
    const struct document *document;
    const struct path *path;
    struct target target;
    const char *value;
    struct finding_list *findings;
};

__attribute__((format(printf, 4, 5))) static enum status
refuse(struct finding_list *findings, const char *path, const char *limit, const char *format, ...)
{
    struct text message = {0};
    va_list arguments;

    text_format(&message, "%.80s: ", path);
    va_start(arguments, format);
    text_vformat(&message, format, arguments);
    va_end(arguments);
    finding_add(findings, SEVERITY_ERROR, path, "", limit, 0, 0, "%s", text_string(&message));
    text_free(&message);
    return STATUS_REFUSED;
}

/* ---- whether it may be changed ---- */

static bool is_row_key(const struct path *path)
{
    return section_has_row(path->kind, path->key.at, path->key.length);
}

static enum status check_name(const struct change *change)
{
    const struct path *path = change->path;
    const struct document *document = change->document;

    if (section_is_single(path->kind) || change->target.section >= 0)
        return STATUS_OK;
    if (path->kind == SECTION_EDGE && path->number < 1)
        return refuse(change->findings, path->text, "a whole number from 1",
                      "a side has a number, such as edge.3.against.");
    if ((path->kind == SECTION_OPENING || path->kind == SECTION_OBJECT) &&
        !section_name_good(path->name.at, path->name.length))
        return refuse(change->findings, path->text, "1 to 32 bytes",
                      "the name is not good: letters, digits, _ and -, 1 to 32 bytes.");
    if ((path->kind == SECTION_JOINT || path->kind == SECTION_CRACK) &&
        (size_t)path->number != document->counts[path->kind] + 1 && change->value[0] != '\0')
        return refuse(change->findings, path->text, "",
                      "there are %zu in the file; write a number from 1 to %zu, the last makes a "
                      "new one.",
                      document->counts[path->kind], document->counts[path->kind] + 1);
    if (change->value[0] != '\0' && document->counts[path->kind] >= section_most(path->kind))
        return refuse(change->findings, path->text, "", "there are already %zu, the most.",
                      document->counts[path->kind]);
    return STATUS_OK;
}

static enum status check_row(const struct change *change)
{
    const struct path *path = change->path;
    size_t most = change->target.row_count + (change->value[0] != '\0');

    if (is_row_key(path) && !path->has_row)
        return refuse(change->findings, path->text, "", "name the row, such as %s.1.", path->text);
    if (!is_row_key(path) && path->has_row)
        return refuse(change->findings, path->text, "",
                      "this key has no rows; leave out the number.");
    if (path->has_row && (path->row > most || path->row > 20000))
        return refuse(change->findings, path->text, "",
                      "there are %zu rows; write a number from 1 to %zu.", change->target.row_count,
                      most);
    return STATUS_OK;
}

/* One line of text that is UTF-8. */
static bool one_line(const char *value)
{
    size_t length = strlen(value);

    for (const char *c = value; *c != '\0'; c++)
        if (((unsigned char)*c < 0x20 && *c != '\t') || *c == 0x7F)
            return false;
    return utf8_invalid_at(value, length) == length;
}

static enum status check_value(const struct change *change)
{
    const struct path *path = change->path;
    const char *units = document_get(change->document, "job.units");
    struct value value = {.path = path->text,
                          .bytes = change->value,
                          .count = strlen(change->value),
                          .findings = change->findings};

    value.units = units != NULL && strcmp(units, "us") == 0 ? UNITS_US : UNITS_METRIC;
    if (value.count == 0)
        return STATUS_OK;
    if (!one_line(change->value))
        return refuse(change->findings, path->text, "",
                      "a value is one line of UTF-8 text without control characters.");
    return value_good(&value, path->field) ? STATUS_OK : STATUS_REFUSED;
}

static enum status check_change(const struct change *change)
{
    const struct path *path = change->path;
    enum status status;

    if (path->kind == SECTION_UNKNOWN)
        return refuse(change->findings, path->text, "", "there is no section of that name.");
    if (path->key.length == 0)
        return change->value[0] == '\0' ? STATUS_OK
                                        : refuse(change->findings, path->text, "",
                                                 "name a key after it, such as slab.thickness.");
    if (path->field == NULL && (change->value[0] != '\0' || change->target.line < 0))
        return refuse(change->findings, path->text, "",
                      "there is no such key; the command fields lists them all.");
    status = check_name(change);
    if (status == STATUS_OK)
        status = check_row(change);
    return status == STATUS_OK ? check_value(change) : status;
}

/* ---- the new text ---- */

static void add_range(struct text *out, const struct document *document, size_t from, size_t to)
{
    if (to > from)
        text_add_bytes(out, document->bytes + from, to - from);
}

static size_t line_end(const struct line *line)
{
    return line->whole.at + line->whole.length + line->end_length;
}

static const char *usual_end(const struct document *document)
{
    return document->line_count > 0 && document->lines[0].end_length == 2 ? "\r\n" : "\n";
}

/* Index of the line behind which a new pair of the section goes: its last pair, else its header. */
static size_t last_line_of(const struct document *document, int section)
{
    size_t last = 0;

    for (size_t i = 0; i < document->line_count; i++)
        if (document->lines[i].section == section &&
            (document->lines[i].kind == LINE_PAIR || document->lines[i].kind == LINE_BAD ||
             (int)i == document->sections[section].header_line))
            last = i;
    return last;
}

static void add_pair(struct text *out, const struct change *change)
{
    const struct path *path = change->path;

    text_add_bytes(out, path->key.at, path->key.length);
    text_format(out, " = %s%s", change->value, usual_end(change->document));
}

static void put_new_section(struct text *out, const struct change *change)
{
    const struct document *document = change->document;
    const struct path *path = change->path;

    add_range(out, document, 0, document->count);
    if (document->line_count > 0 && document->lines[document->line_count - 1].end_length == 0)
        text_add(out, usual_end(document));
    text_add(out, "[");
    text_add_bytes(out, path->word.at, path->word.length);
    if (path->kind == SECTION_EDGE)
        text_format(out, " %d", path->number);
    else if (path->kind == SECTION_OPENING || path->kind == SECTION_OBJECT) {
        text_add(out, " ");
        text_add_bytes(out, path->name.at, path->name.length);
    }
    text_format(out, "]%s", usual_end(document));
    add_pair(out, change);
}

static void put_new_pair(struct text *out, const struct change *change)
{
    const struct document *document = change->document;
    const struct line *after = &document->lines[last_line_of(document, change->target.section)];

    add_range(out, document, 0, line_end(after));
    if (after->end_length == 0)
        text_add(out, usual_end(document));
    add_pair(out, change);
    add_range(out, document, line_end(after), document->count);
}

/* Only the value changes; a row may also change between point and arc. */
static void put_value(struct text *out, const struct change *change)
{
    const struct document *document = change->document;
    const struct line *line = &document->lines[change->target.line];
    size_t key_end = line->key.at + line->key.length;
    size_t value_end = line->value.at + line->value.length;

    add_range(out, document, 0, line->key.at);
    text_add_bytes(out, change->path->key.at, change->path->key.length);
    add_range(out, document, key_end, line->value.at);
    if (line->value.length == 0)
        text_add(out, " ");
    text_add(out, change->value);
    if (line->value.length == 0 && value_end < document->count && document->bytes[value_end] == '#')
        text_add(out, " ");
    add_range(out, document, value_end, document->count);
}

static void cut_line(struct text *out, const struct change *change)
{
    const struct document *document = change->document;
    const struct line *line = &document->lines[change->target.line];

    add_range(out, document, 0, line->whole.at);
    add_range(out, document, line_end(line), document->count);
}

/* A section goes from its header to its last pair, in all its parts; what stands behind the last
 * pair (blank lines and comments before the next header) stays. */
static void cut_section(struct text *out, const struct change *change)
{
    const struct document *document = change->document;
    size_t from = 0, keep_from = 0;
    bool inside = false;

    for (size_t i = 0; i < document->line_count; i++) {
        const struct line *line = &document->lines[i];
        bool header = line->kind == LINE_HEADER;
        if (header)
            inside = line->section == change->target.section;
        if (!inside || (!header && line->kind == LINE_EMPTY))
            continue;
        /* comments between the header and this pair go with it */
        add_range(out, document, from, header ? line->whole.at : keep_from);
        from = keep_from = line_end(line);
    }
    add_range(out, document, from, document->count);
}

static void write_change(struct text *out, const struct change *change)
{
    if (change->value[0] == '\0') {
        if (change->path->key.length == 0)
            cut_section(out, change);
        else
            cut_line(out, change);
    } else if (change->target.line >= 0) {
        put_value(out, change);
    } else if (change->target.section >= 0) {
        put_new_pair(out, change);
    } else {
        put_new_section(out, change);
    }
}

/* Whether a line of the new document became too long, or the file too large. */
static enum status check_size(const struct change *change, const struct document *made)
{
    for (size_t i = 0; i < made->line_count; i++)
        if (made->lines[i].whole.length > LINE_MOST)
            return refuse(change->findings, change->path->text, "4096 bytes",
                          "the line would be longer than 4096 bytes; write less.");
    return STATUS_OK;
}

/* Parses the changed text and lets it take the document's place. */
static enum status take_over(struct document *document, const struct change *change,
                             const struct text *text)
{
    struct finding_list again = {0};
    struct document *made, old;
    enum status status;

    if (text->failed)
        return STATUS_NO_MEMORY;
    if (text->length > FILE_MOST)
        return refuse(change->findings, change->path->text, "16 MiB",
                      "the file would be too large.");
    status = document_parse(text_string(text), text->length, &made, &again);
    finding_free(&again);
    if (status == STATUS_NO_MEMORY)
        return status;
    status = check_size(change, made);
    if (status == STATUS_OK) {
        old = *document;
        *document = *made;
        *made = old;
    }
    document_free(made);
    return status;
}

/* ---- texts are quoted when they must be ---- */

static bool is_good_quoted(const char *value)
{
    size_t i = 1;

    if (value[0] != '"')
        return false;
    while (value[i] != '\0' && value[i] != '"')
        i += value[i] == '\\' && value[i + 1] != '\0' ? 2 : 1;
    return value[i] == '"' && value[i + 1] == '\0';
}

static bool needs_quotes(const char *value)
{
    size_t length = strlen(value);

    if (value[0] == '"' || value[0] == '#' || strchr(" \t", value[0]) != NULL ||
        strchr(" \t", value[length - 1]) != NULL)
        return true;
    return strstr(value, " #") != NULL || strstr(value, "\t#") != NULL;
}

/* The value as it is written: a text with quotes where the file needs them, all else trimmed. */
static void prepare_value(struct text *out, const struct path *path, const char *value)
{
    size_t length = strlen(value);
    bool blank = strspn(value, " \t") == length;

    if (path->field != NULL && path->field->type == FIELD_TEXT && !blank &&
        !is_good_quoted(value) && needs_quotes(value)) {
        text_add(out, "\"");
        for (const char *c = value; *c != '\0'; c++) {
            if (*c == '"' || *c == '\\')
                text_add(out, "\\");
            text_add_char(out, *c, 1);
        }
        text_add(out, "\"");
        return;
    }
    while (length > 0 && strchr(" \t", value[length - 1]) != NULL)
        length--;
    while (length > 0 && strchr(" \t", value[0]) != NULL) {
        value++;
        length--;
    }
    text_add_bytes(out, value, length);
}

static bool nothing_to_do(const struct change *change)
{
    if (change->value[0] != '\0')
        return false;
    return change->path->key.length == 0 ? change->target.section < 0 : change->target.line < 0;
}

enum status document_set(struct document *document, const char *text, const char *value,
                         struct finding_list *findings)
{
    struct path path;
    struct text prepared = {0}, made = {0};
    struct change change = {.document = document, .path = &path, .findings = findings};
    enum status status;

    if (!path_read(text, &path))
        return refuse(findings, text, "",
                      "this is no path; write section.key, object.C1.at, outline.point.2 or "
                      "joint.1.from.");
    prepare_value(&prepared, &path, value);
    change.value = text_string(&prepared);
    change.target = path_find(document, &path);
    status = prepared.failed ? STATUS_NO_MEMORY : check_change(&change);
    if (status == STATUS_OK && !nothing_to_do(&change)) {
        write_change(&made, &change);
        status = take_over(document, &change, &made);
    }
    text_free(&prepared);
    text_free(&made);
    return findings->failed ? STATUS_NO_MEMORY : status;
}
