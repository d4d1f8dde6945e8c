/* Reading paths and finding what they name. */
#include "job/document_path.h"
#include <string.h>

/* ---- cutting a path up ---- */

enum { PARTS_MOST = 4 };

static size_t split(const char *text, const char *parts[PARTS_MOST + 1],
                    size_t lengths[PARTS_MOST + 1])
{
    size_t count = 0;

    while (count <= PARTS_MOST) {
        size_t n = strcspn(text, ".");
        parts[count] = text;
        lengths[count++] = n;
        if (text[n] == '\0')
            break;
        text += n + 1;
    }
    return count;
}

/* Fills in the path from its parts; false when it has too many or too few. */
static bool assign_parts(struct path *path, const char **parts, const size_t *lengths, size_t count)
{
    size_t next = 1;

    path->word.at = parts[0];
    path->word.length = lengths[0];
    path->kind = section_kind_of(parts[0], lengths[0]);
    if (!section_is_single(path->kind) && path->kind != SECTION_UNKNOWN) {
        if (count < 2)
            return false;
        path->name.at = parts[1];
        path->name.length = lengths[1];
        path->number = section_number(parts[1], lengths[1]);
        next = 2;
    }
    if (count > next) {
        path->key.at = parts[next];
        path->key.length = lengths[next];
        next++;
    }
    if (count > next) {
        path->has_row = true;
        path->row = (size_t)section_number(parts[next], lengths[next]);
        next++;
    }
    return count == next && (!path->has_row || path->row > 0);
}

static const struct field *field_of(const struct path *path)
{
    char word[64], key[64];

    if (path->word.length >= sizeof word || path->key.length >= sizeof key)
        return NULL;
    memcpy(word, path->word.at, path->word.length);
    word[path->word.length] = '\0';
    memcpy(key, path->key.at, path->key.length);
    key[path->key.length] = '\0';
    return field_find(word, key);
}

bool path_read(const char *text, struct path *path)
{
    const char *parts[PARTS_MOST + 1];
    size_t lengths[PARTS_MOST + 1], count = split(text, parts, lengths);

    *path = (struct path){.text = text};
    path->name.at = path->key.at = "";
    if (text[0] == '\0' || count > PARTS_MOST || !assign_parts(path, parts, lengths, count))
        return false;
    path->field = field_of(path);
    return true;
}

/* ---- finding it ---- */

static bool line_is_row(const struct document *document, const struct line *line)
{
    return line->kind == LINE_PAIR && line->value.length > 0 &&
           section_has_row(document->sections[line->section].kind, document->bytes + line->key.at,
                           line->key.length);
}

struct target path_find(const struct document *document, const struct path *path)
{
    struct target target = {-1, -1, 0};

    target.section = document_find_section(document, path->kind, path->word.at, path->word.length,
                                           path->name.at, path->name.length);
    if (path->kind == SECTION_UNKNOWN)
        target.section = -1;
    if (target.section < 0)
        return target;
    for (size_t i = 0; i < document->line_count; i++) {
        const struct line *line = &document->lines[i];
        if (line->section != target.section || line->kind != LINE_PAIR)
            continue;
        if (line_is_row(document, line)) {
            if (++target.row_count == path->row)
                target.line = (int)i;
        } else if (!path->has_row && line->key.length == path->key.length &&
                   memcmp(document->bytes + line->key.at, path->key.at, path->key.length) == 0) {
            target.line = (int)i;
        }
    }
    return target;
}

const char *document_get(const struct document *document, const char *text)
{
    struct path path;
    struct target target;
    const struct line *line;

    if (!path_read(text, &path) || path.key.length == 0)
        return NULL;
    target = path_find(document, &path);
    if (target.line < 0)
        return NULL;
    line = &document->lines[target.line];
    if (line->value.length == 0 ||
        (path.has_row && (line->key.length != path.key.length ||
                          memcmp(document->bytes + line->key.at, path.key.at, path.key.length))))
        return NULL;
    return document->values.bytes + line->text_at;
}

void document_place(const struct document *document, struct finding_list *findings)
{
    for (size_t i = 0; i < findings->count; i++) {
        struct finding *finding = &findings->items[i];
        struct path path;
        struct target target;
        if (finding->line > 0 || !path_read(finding->field, &path) || path.key.length == 0)
            continue;
        target = path_find(document, &path);
        if (target.line < 0)
            continue;
        finding->line = target.line + 1;
        finding->column = document_column(document, &document->lines[target.line],
                                          document->lines[target.line].value.at);
    }
}
