#include "file/weather_file.h"
#include "base/text.h"
#include "file/file.h"
#include <string.h>

static void place_of(const char *job_path, const char *name, struct text *path)
{
    const char *slash = job_path != NULL && name[0] != '/' ? strrchr(job_path, '/') : NULL;

    if (slash != NULL)
        text_add_bytes(path, job_path, (size_t)(slash - job_path) + 1);
    text_add(path, name);
}

enum status weather_file_read(const char *job_path, const char *name, struct weather **weather,
                              struct finding_list *findings)
{
    struct text path = {0}, bytes = {0}, words = {0};
    enum status status;

    *weather = NULL;
    place_of(job_path, name, &path);
    status = path.failed ? STATUS_NO_MEMORY : file_read(text_string(&path), &bytes);
    if (status == STATUS_OK) {
        status = weather_parse(text_string(&bytes), bytes.length, weather, findings);
    } else if (status != STATUS_NO_MEMORY) {
        file_explain(&words, text_string(&path), status);
        finding_add(findings, SEVERITY_ERROR, "climate.file", name, "", 0, 0, "climate.file: %s",
                    text_string(&words));
        status = STATUS_REFUSED;
    }
    text_free(&path);
    text_free(&bytes);
    text_free(&words);
    return status;
}
