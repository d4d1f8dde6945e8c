/* Running the built program as a user does: words in, exit status and both outputs out. Jobs are
 * written into a folder of their own, made before the tests and removed after them. */
#ifndef SLABGAP_TESTS_CMD_HELP_H
#define SLABGAP_TESTS_CMD_HELP_H

#include <dirent.h>
#include <errno.h>
#include <fcntl.h>
#include <setjmp.h>
#include <spawn.h>
#include <stdarg.h>
#include <stdbool.h>
#include <stddef.h>
#include <stdint.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <sys/stat.h>
#include <sys/wait.h>
#include <unistd.h>
#include <cmocka.h>

#define COUNT(a) (sizeof(a) / sizeof *(a))
enum { WORDS_MOST = 12, PATH_ROOM = 512 };

/* A rectangle of 12 x 8 m: the outline of most cases. */
#define F "format = 1\n"
#define RECTANGLE "[outline]\npoint = 0, 0 m\npoint = 12, 0 m\npoint = 12, 8 m\npoint = 0, 8 m\n"

extern char **environ;

static char folder[PATH_ROOM];

/* A path inside the tests' own folder. The last four stay valid. */
static inline const char *inside(const char *name)
{
    static char paths[4][2 * PATH_ROOM];
    static unsigned next;
    char *path = paths[next++ % 4];

    snprintf(path, sizeof paths[0], "%s/%s", folder, name);
    return path;
}

static inline int make_folder(void **state)
{
    (void)state;
    const char *base = getenv("TMPDIR");
    snprintf(folder, sizeof folder, "%s/slabgap-test-XXXXXX",
             base != NULL && base[0] != '\0' && strlen(base) < 400 ? base : P_tmpdir);
    return mkdtemp(folder) == NULL;
}

static inline int remove_folder(void **state)
{
    (void)state;
    DIR *entries = opendir(folder);
    const struct dirent *entry;

    while (entries != NULL && (entry = readdir(entries)) != NULL) {
        if (strcmp(entry->d_name, ".") == 0 || strcmp(entry->d_name, "..") == 0)
            continue;
        if (unlink(inside(entry->d_name)) != 0) {
            chmod(inside(entry->d_name), 0700);
            rmdir(inside(entry->d_name));
        }
    }
    if (entries != NULL)
        closedir(entries);
    return rmdir(folder);
}

static inline void write_bytes(const char *name, const char *bytes, size_t count)
{
    FILE *file = fopen(inside(name), "wb");

    assert_non_null(file);
    assert_int_equal(fwrite(bytes, 1, count, file), count);
    assert_int_equal(fclose(file), 0);
}

static inline void write_text(const char *name, const char *text)
{
    write_bytes(name, text, strlen(text));
}

/* The whole of a file, NUL-terminated; the caller frees it. */
static inline char *read_whole(const char *path)
{
    FILE *file = fopen(path, "rb");
    char *text = NULL;
    size_t count = 0, got;
    char block[4096];

    assert_non_null(file);
    while ((got = fread(block, 1, sizeof block, file)) > 0) {
        text = realloc(text, count + got + 1);
        assert_non_null(text);
        memcpy(text + count, block, got);
        count += got;
    }
    fclose(file);
    if (text == NULL)
        text = malloc(1);
    assert_non_null(text);
    text[count] = '\0';
    return text;
}

static inline void assert_file(const char *name, const char *text)
{
    char *content = read_whole(inside(name));

    assert_string_equal(content, text);
    free(content);
}

struct run {
    int status; /* exit status; 128 + signal when it died */
    char *out, *err;
};

static inline void run_free(struct run *run)
{
    free(run->out);
    free(run->err);
    *run = (struct run){0};
}

/* Runs the program; "@" among the words stands for job.slab in the folder, a word beginning with
 * "@/" for that file there. Output to `out` (NULL: a file in the folder, read back). */
static inline void run_words_to(struct run *run, const char *const *words, const char *out)
{
    char arguments[WORDS_MOST + 1][2 * PATH_ROOM];
    char *vector[WORDS_MOST + 2] = {(char[]){"slabgap"}};
    posix_spawn_file_actions_t actions;
    pid_t child;
    int status;

    for (size_t i = 0; i < WORDS_MOST && words[i] != NULL; i++) {
        const char *word = words[i];
        if (strcmp(word, "@") == 0)
            word = inside("job.slab");
        else if (strncmp(word, "@/", 2) == 0)
            word = inside(word + 2);
        snprintf(arguments[i], sizeof arguments[i], "%s", word);
        vector[i + 1] = arguments[i];
    }
    posix_spawn_file_actions_init(&actions);
    posix_spawn_file_actions_addopen(&actions, 0, "/dev/null", O_RDONLY, 0);
    posix_spawn_file_actions_addopen(&actions, 1, out != NULL ? out : inside("stdout"),
                                     O_WRONLY | O_CREAT | O_TRUNC, 0600);
    posix_spawn_file_actions_addopen(&actions, 2, inside("stderr"), O_WRONLY | O_CREAT | O_TRUNC,
                                     0600);
    assert_int_equal(posix_spawn(&child, SLABGAP_BINARY, &actions, NULL, vector, environ), 0);
    posix_spawn_file_actions_destroy(&actions);
    while (waitpid(child, &status, 0) < 0)
        assert_int_equal(errno, EINTR);
    run->status = WIFEXITED(status) ? WEXITSTATUS(status) : 128 + WTERMSIG(status);
    run->out = out != NULL ? strdup("") : read_whole(inside("stdout"));
    run->err = read_whole(inside("stderr"));
}

static inline void run_words(struct run *run, const char *const *words)
{
    run_words_to(run, words, NULL);
}

#define RUN(run, ...) run_words(run, (const char *const[]){__VA_ARGS__, NULL})

/* Says which case it was before failing. */
static inline void expect_part(const char *name, const char *what, const char *text,
                               const char *part)
{
    if (part != NULL && strstr(text, part) == NULL)
        fail_msg("%s: %s lacks '%s':\n%s", name, what, part, text);
}

static inline void expect_status(const char *name, const struct run *run, int status)
{
    if (run->status != status)
        fail_msg("%s: exit %d instead of %d:\n%s%s", name, run->status, status, run->out, run->err);
}

/* Every message is one line that ends as a sentence does. */
static inline void expect_sentences(const char *name, const char *err)
{
    for (const char *line = err; *line != '\0';) {
        const char *end = strchr(line, '\n');
        if (end == NULL || end == line || strchr(".)?", end[-1]) == NULL)
            fail_msg("%s: no sentence on a line of its own:\n%s", name, err);
        else
            line = end + 1;
    }
}

#endif
