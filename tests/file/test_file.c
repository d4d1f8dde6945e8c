/* Reading and replacing files: what may be read, and that a replaced file is at every moment the
 * old one or the new one, whole, under the same name and with the same permissions. */
#include "file/file.h"
#include <dirent.h>
#include <fcntl.h>
#include <setjmp.h>
#include <stdarg.h>
#include <stdint.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <sys/resource.h>
#include <sys/stat.h>
#include <sys/wait.h>
#include <signal.h>
#include <unistd.h>
#include <cmocka.h>

#define COUNT(a) (sizeof(a) / sizeof *(a))
enum { PATH_ROOM = 1024 };

static char folder[512];

/* A path inside the tests' own folder. The last four stay valid. */
static const char *inside(const char *name)
{
    static char paths[4][PATH_ROOM];
    static unsigned next;
    char *path = paths[next++ % 4];

    snprintf(path, PATH_ROOM, "%s/%s", folder, name);
    return path;
}

static int make_folder(void **state)
{
    const char *base = getenv("TMPDIR");

    (void)state;
    snprintf(folder, sizeof folder, "%s/slabgap-file-XXXXXX",
             base != NULL && base[0] != '\0' && strlen(base) < 400 ? base : P_tmpdir);
    umask(022);
    return mkdtemp(folder) == NULL;
}

static void empty_folder(const char *path)
{
    DIR *entries = opendir(path);
    const struct dirent *entry;
    char whole[PATH_ROOM];

    while (entries != NULL && (entry = readdir(entries)) != NULL) {
        if (strcmp(entry->d_name, ".") == 0 || strcmp(entry->d_name, "..") == 0)
            continue;
        snprintf(whole, sizeof whole, "%.500s/%.400s", path, entry->d_name);
        if (unlink(whole) != 0) {
            chmod(whole, 0700);
            empty_folder(whole);
            rmdir(whole);
        }
    }
    if (entries != NULL)
        closedir(entries);
}

static int remove_folder(void **state)
{
    (void)state;
    empty_folder(folder);
    return rmdir(folder);
}

static int clean(void **state)
{
    (void)state;
    empty_folder(folder);
    return 0;
}

static void put(const char *name, const char *text)
{
    FILE *file = fopen(inside(name), "wb");

    assert_non_null(file);
    assert_true(fputs(text, file) >= 0);
    assert_int_equal(fclose(file), 0);
}

static void expect_content(const char *name, const char *text)
{
    struct text content = {0};

    assert_int_equal(file_read(inside(name), &content), STATUS_OK);
    assert_string_equal(text_string(&content), text);
    assert_int_equal(content.length, strlen(text));
    text_free(&content);
}

/* Exactly these names are in the folder: no temporary is left. */
static void expect_names(size_t count)
{
    DIR *entries = opendir(folder);
    const struct dirent *entry;
    size_t seen = 0;

    assert_non_null(entries);
    while ((entry = readdir(entries)) != NULL) {
        seen += entry->d_name[0] != '.';
        assert_null(strstr(entry->d_name, "slabgap-new"));
    }
    closedir(entries);
    assert_int_equal(seen, count);
}

static enum status replace(const char *name, const char *text)
{
    return file_replace(inside(name), text, strlen(text));
}

static mode_t mode_of(const char *name)
{
    struct stat about;

    assert_int_equal(stat(inside(name), &about), 0);
    return about.st_mode & 07777;
}

/* ---- reading ---- */

static void test_read(void **state)
{
    (void)state;
    struct text content = {0};

    put("a", "one\r\ntwo");
    assert_int_equal(file_read(inside("a"), &content), STATUS_OK);
    assert_string_equal(text_string(&content), "one\r\ntwo");
    put("b", "");
    assert_int_equal(file_read(inside("b"), &content), STATUS_OK); /* in place of what was there */
    assert_int_equal(content.length, 0);
    text_free(&content);
}

static void test_not_read(void **state)
{
    (void)state;
    struct text content = {0};

    text_add(&content, "kept");
    assert_int_equal(file_read(inside("none"), &content), STATUS_NO_FILE);
    put("a", "x");
    assert_int_equal(file_read(inside("a/b"), &content), STATUS_NO_FILE);
    assert_int_equal(file_read("", &content), STATUS_NO_FILE);
    assert_int_equal(file_read(folder, &content), STATUS_NOT_A_FILE);
    assert_int_equal(file_read("/dev/null", &content), STATUS_NOT_A_FILE);
    assert_int_equal(mkfifo(inside("pipe"), 0600), 0);
    assert_int_equal(file_read(inside("pipe"), &content), STATUS_NOT_A_FILE); /* and no waiting */
    assert_int_equal(symlink("ring", inside("ring")), 0);
    assert_int_not_equal(file_read(inside("ring"), &content), STATUS_OK);
    if (geteuid() != 0) {
        chmod(inside("a"), 0);
        assert_int_equal(file_read(inside("a"), &content), STATUS_NO_PERMISSION);
    }
    assert_string_equal(text_string(&content), "kept"); /* untouched on every failure */
    text_free(&content);
}

static void test_read_up_to_16_mib(void **state)
{
    (void)state;
    struct text content = {0};

    put("a", "x");
    assert_int_equal(truncate(inside("a"), FILE_MOST), 0);
    assert_int_equal(file_read(inside("a"), &content), STATUS_OK);
    assert_int_equal(content.length, FILE_MOST);
    assert_int_equal(truncate(inside("a"), FILE_MOST + 1), 0);
    assert_int_equal(file_read(inside("a"), &content), STATUS_TOO_LARGE);
    text_free(&content);
}

/* ---- replacing ---- */

static void test_replace_and_make(void **state)
{
    (void)state;
    assert_int_equal(replace("a", "new"), STATUS_OK);
    expect_content("a", "new");
    assert_int_equal(mode_of("a"), 0644); /* as the mask of the user says */
    assert_int_equal(replace("a", "newer and longer"), STATUS_OK);
    expect_content("a", "newer and longer");
    assert_int_equal(replace("a", ""), STATUS_OK);
    expect_content("a", "");
    expect_names(1);
}

static void test_mode_is_kept(void **state)
{
    (void)state;
    static const mode_t modes[] = {0600, 0640, 0664, 0755};

    for (size_t i = 0; i < COUNT(modes); i++) {
        put("a", "old");
        assert_int_equal(chmod(inside("a"), modes[i]), 0);
        assert_int_equal(replace("a", "new"), STATUS_OK);
        assert_int_equal(mode_of("a"), modes[i]);
        expect_content("a", "new");
    }
}

/* Whoever has the old file open reads the old file to its end: the new one is another. */
static void test_old_readers_see_the_old_file(void **state)
{
    (void)state;
    char block[16] = "";
    int fd;
    struct stat before, after;

    put("a", "old content");
    fd = open(inside("a"), O_RDONLY);
    assert_true(fd >= 0);
    assert_int_equal(stat(inside("a"), &before), 0);
    assert_int_equal(replace("a", "new"), STATUS_OK);
    assert_int_equal(stat(inside("a"), &after), 0);
    assert_int_not_equal(before.st_ino, after.st_ino);
    assert_int_equal(read(fd, block, 11), 11);
    assert_string_equal(block, "old content");
    close(fd);
}

/* A link stays a link; what it points to is replaced, in its own folder. */
static void test_links_are_followed(void **state)
{
    (void)state;
    struct stat about;

    assert_int_equal(mkdir(inside("real"), 0755), 0);
    put("real/a", "old");
    assert_int_equal(symlink("real/a", inside("link")), 0);
    assert_int_equal(symlink("link", inside("second")), 0);
    assert_int_equal(replace("second", "new"), STATUS_OK);
    assert_int_equal(lstat(inside("link"), &about), 0);
    assert_true(S_ISLNK(about.st_mode));
    assert_int_equal(lstat(inside("second"), &about), 0);
    assert_true(S_ISLNK(about.st_mode));
    expect_content("real/a", "new");
    expect_names(3);
}

/* A temporary left by a crash, even a link planted under its name, does no harm. */
static void test_stale_temporary(void **state)
{
    (void)state;
    put("a", "old");
    put("victim", "untouched");
    assert_int_equal(symlink("victim", inside("a.slabgap-new")), 0);
    assert_int_equal(replace("a", "new"), STATUS_OK);
    expect_content("a", "new");
    expect_content("victim", "untouched");
    expect_names(2);
}

static void test_not_replaced(void **state)
{
    (void)state;
    assert_int_equal(mkdir(inside("sub"), 0755), 0);
    assert_int_equal(replace("sub", "x"), STATUS_NOT_A_FILE);
    assert_int_equal(replace("none/a", "x"), STATUS_NO_FILE);
    put("a", "old");
    assert_int_equal(replace("a/b", "x"), STATUS_NO_FILE);
    assert_int_not_equal(file_replace("", "x", 1), STATUS_OK);
    assert_int_equal(file_replace("/dev/full", "x", 1), STATUS_NOT_A_FILE);
    expect_content("a", "old");
    expect_names(2);
}

/* A path longer than any the system takes is refused, not cut. */
static void test_too_long_a_path(void **state)
{
    (void)state;
    char *path = malloc(8192);

    assert_non_null(path);
    memset(path, 'x', 8191);
    path[8191] = '\0';
    memcpy(path, folder, strlen(folder));
    path[strlen(folder)] = '/';
    assert_int_not_equal(file_replace(path, "x", 1), STATUS_OK);
    free(path);
    expect_names(0);
}

/* Tries it as an ordinary user: where the tests run as root, which nothing is closed to, a child
 * gives up its rights first. */
static enum status replace_as_user(const char *name)
{
    enum { NOBODY = 65534, NO_USER = 100 };
    int ended;
    pid_t child = fork();

    if (child == 0) {
        if (geteuid() == 0 && (setgid(NOBODY) != 0 || setuid(NOBODY) != 0))
            _exit(NO_USER);
        _exit((int)replace(name, "new"));
    }
    assert_int_equal(waitpid(child, &ended, 0), child);
    assert_true(WIFEXITED(ended));
    return (enum status)WEXITSTATUS(ended);
}

static void test_closed_to_us(void **state)
{
    (void)state;
    assert_int_equal(chmod(folder, 0755), 0);
    assert_int_equal(mkdir(inside("sub"), 0755), 0);
    put("sub/a", "old");
    assert_int_equal(chmod(inside("sub"), 0777), 0);
    assert_int_equal(chmod(inside("sub/a"), 0444), 0);
    assert_int_equal(replace_as_user("sub/a"), STATUS_NO_PERMISSION); /* the file */
    assert_int_equal(chmod(inside("sub/a"), 0666), 0);
    assert_int_equal(chmod(inside("sub"), 0555), 0);
    assert_int_equal(replace_as_user("sub/a"), STATUS_NO_PERMISSION); /* the folder */
    assert_int_equal(replace_as_user("sub/b"), STATUS_NO_PERMISSION);
    expect_content("sub/a", "old");
    assert_int_equal(chmod(inside("sub"), 0777), 0);
    assert_int_equal(replace_as_user("sub/a"), STATUS_OK); /* neither */
    expect_content("sub/a", "new");
}

/* The disk fills at every byte: the old file stays whole and nothing else is left. */
static void test_full_at_every_byte(void **state)
{
    (void)state;
    static const char text[] = "a job of a few lines\n";
    struct rlimit old, limit;
    void (*handler)(int) = signal(SIGXFSZ, SIG_IGN);

    assert_int_equal(getrlimit(RLIMIT_FSIZE, &old), 0);
    for (size_t room = 0; room <= sizeof text - 1; room++) {
        enum status status;
        put("a", "old");
        limit = (struct rlimit){.rlim_cur = room, .rlim_max = old.rlim_max};
        assert_int_equal(setrlimit(RLIMIT_FSIZE, &limit), 0);
        status = replace("a", text);
        assert_int_equal(setrlimit(RLIMIT_FSIZE, &old), 0);
        assert_int_equal(status, room < sizeof text - 1 ? STATUS_WRITE_FAILED : STATUS_OK);
        expect_content("a", room < sizeof text - 1 ? "old" : text);
        expect_names(1);
    }
    signal(SIGXFSZ, handler);
}

/* ---- whose a file is ---- */

static void test_ours(void **state)
{
    (void)state;
    char far[4096];

    assert_true(file_is_ours(inside("none")));
    put("a", "");
    assert_true(file_is_ours(inside("a")));
    put("a", "A plan\n\nDrawn by slabgap 0.1.0.\n");
    assert_true(file_is_ours(inside("a")));
    memset(far, 'x', sizeof far);
    snprintf(far + 2000, sizeof far - 2000, "\nDrawn by slabgap 0.1.0.\n");
    put("a", far);
    assert_true(file_is_ours(inside("a"))); /* at the end of a long one */
    put("a", "A letter.\n");
    assert_false(file_is_ours(inside("a")));
    put("a", "How to use slabgap on site: notes.\n");
    assert_false(file_is_ours(inside("a")));
    assert_false(file_is_ours(folder));
    assert_false(file_is_ours("/dev/null"));
}

/* ---- words ---- */

static void test_explained(void **state)
{
    (void)state;
    static const enum status statuses[] = {STATUS_NO_FILE,       STATUS_NOT_A_FILE,
                                           STATUS_NO_PERMISSION, STATUS_TOO_LARGE,
                                           STATUS_READ_FAILED,   STATUS_WRITE_FAILED};

    for (size_t i = 0; i < COUNT(statuses); i++) {
        struct text words = {0};
        file_explain(&words, "yard.slab", statuses[i]);
        assert_int_equal(strncmp(text_string(&words), "yard.slab: ", 11), 0);
        assert_non_null(strstr(text_string(&words), status_sentence(statuses[i])));
        assert_non_null(strstr(text_string(&words), "; ")); /* and what to do */
        assert_int_equal(text_string(&words)[words.length - 1], '.');
        text_free(&words);
    }
}

/* A folder typed by the user is the only one looked in. */
static void test_shared_files(void **state)
{
    (void)state;
    struct text path = {0};

    assert_int_equal(mkdir(inside("examples"), 0755), 0);
    put("examples/e.slab", "format = 1\n");
    assert_int_equal(setenv("SLABGAP_SHARE", folder, 1), 0);
    assert_true(file_find_shared("examples/e.slab", &path));
    assert_string_equal(text_string(&path), inside("examples/e.slab"));
    assert_false(file_find_shared("examples/e1-service-yard.slab", &path));
    unsetenv("SLABGAP_SHARE");
    assert_false(file_find_shared("examples/no-such-job.slab", &path));
    text_free(&path);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test_teardown(test_read, clean),
        cmocka_unit_test_teardown(test_not_read, clean),
        cmocka_unit_test_teardown(test_read_up_to_16_mib, clean),
        cmocka_unit_test_teardown(test_replace_and_make, clean),
        cmocka_unit_test_teardown(test_mode_is_kept, clean),
        cmocka_unit_test_teardown(test_old_readers_see_the_old_file, clean),
        cmocka_unit_test_teardown(test_links_are_followed, clean),
        cmocka_unit_test_teardown(test_stale_temporary, clean),
        cmocka_unit_test_teardown(test_not_replaced, clean),
        cmocka_unit_test_teardown(test_too_long_a_path, clean),
        cmocka_unit_test_teardown(test_closed_to_us, clean),
        cmocka_unit_test_teardown(test_full_at_every_byte, clean),
        cmocka_unit_test_teardown(test_ours, clean),
        cmocka_unit_test_teardown(test_explained, clean),
        cmocka_unit_test_teardown(test_shared_files, clean),
    };

    return cmocka_run_group_tests_name("files", tests, make_folder, remove_folder);
}
