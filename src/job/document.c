/* A document as a whole: made, copied, written, freed. */
#include "job/document_lines.h"
#include <stdlib.h>
#include <string.h>

/* A copy of the bytes; false on no memory. */
static bool take_bytes(struct document *document, const char *bytes, size_t count)
{
    document->bytes = malloc(count + 1);
    if (document->bytes == NULL)
        return false;
    if (count > 0)
        memcpy(document->bytes, bytes, count);
    document->bytes[count] = '\0';
    document->count = count;
    return true;
}

static bool too_large(size_t count, struct finding_list *findings)
{
    if (count <= FILE_MOST)
        return false;
    finding_add(findings, SEVERITY_ERROR, "", "", "16 MiB", 0, 0,
                "The file has more than 16 MiB; a job file is a few thousand bytes.");
    return true;
}

enum status document_parse(const char *bytes, size_t count, struct document **out,
                           struct finding_list *findings)
{
    struct document *document = calloc(1, sizeof *document);
    bool large = too_large(count, findings);
    enum status status = STATUS_REFUSED;

    *out = NULL;
    if (document == NULL)
        return STATUS_NO_MEMORY;
    if (!take_bytes(document, bytes, large ? 0 : count))
        status = STATUS_NO_MEMORY;
    else if (!large)
        status = document_read_lines(document, findings);
    if (status == STATUS_NO_MEMORY || findings->failed) {
        document_free(document);
        return STATUS_NO_MEMORY;
    }
    *out = document;
    return status;
}

enum status document_new(struct document **out)
{
    static const char first[] = "format = 1\n";
    struct finding_list none = {0};
    enum status status = document_parse(first, sizeof first - 1, out, &none);

    finding_free(&none);
    return status;
}

enum status document_copy(const struct document *from, struct document **out)
{
    struct finding_list again = {0};
    enum status status = document_parse(from->bytes, from->count, out, &again);

    finding_free(&again);
    return status == STATUS_REFUSED ? STATUS_OK : status;
}

void document_free(struct document *document)
{
    if (document == NULL)
        return;
    free(document->bytes);
    free(document->lines);
    free(document->sections);
    text_free(&document->values);
    free(document);
}

void document_write(const struct document *document, struct text *out)
{
    text_add_bytes(out, document->bytes, document->count);
}
