#include "base/finding.h"
#include "base/array.h"
#include "base/text.h"
#include <stdarg.h>
#include <stdlib.h>
#include <string.h>

static char *copy(const char *string)
{
    return strdup(string != NULL ? string : "");
}

static void free_finding(struct finding *finding)
{
    free(finding->field);
    free(finding->value);
    free(finding->limit);
    free(finding->message);
}

/* Takes the finding over; frees it when there is no room or a part is missing. */
static void take(struct finding_list *list, struct finding finding)
{
    if (finding.field == NULL || finding.value == NULL || finding.limit == NULL ||
        finding.message == NULL ||
        !array_reserve((void **)&list->items, &list->capacity, list->count + 1,
                       sizeof *list->items)) {
        free_finding(&finding);
        list->failed = true;
        return;
    }
    list->items[list->count++] = finding;
}

void finding_add(struct finding_list *list, enum severity severity, const char *field,
                 const char *value, const char *limit, int line, int column, const char *format,
                 ...)
{
    struct text message = {0};
    va_list arguments;

    va_start(arguments, format);
    text_vformat(&message, format, arguments);
    va_end(arguments);
    take(list, (struct finding){severity, copy(field), copy(value), copy(limit),
                                message.failed ? NULL : copy(text_string(&message)), line, column});
    text_free(&message);
}

void finding_append(struct finding_list *to, const struct finding_list *from)
{
    for (size_t i = 0; i < from->count; i++) {
        const struct finding *f = &from->items[i];
        take(to, (struct finding){f->severity, copy(f->field), copy(f->value), copy(f->limit),
                                  copy(f->message), f->line, f->column});
    }
    to->failed = to->failed || from->failed;
}

bool finding_has_error(const struct finding_list *list)
{
    for (size_t i = 0; i < list->count; i++)
        if (list->items[i].severity == SEVERITY_ERROR)
            return true;
    return list->failed;
}

const char *severity_word(enum severity severity)
{
    static const char *const words[] = {"note", "warning", "error"};

    return words[severity];
}

void finding_free(struct finding_list *list)
{
    for (size_t i = 0; i < list->count; i++)
        free_finding(&list->items[i]);
    free(list->items);
    *list = (struct finding_list){0};
}
