#include "file/file.h"
#include <errno.h>
#include <fcntl.h>
#include <limits.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <sys/stat.h>
#include <unistd.h>

#ifndef SLABGAP_SHARE_DIR
#define SLABGAP_SHARE_DIR "/usr/local/share/slabgap"
#endif

static enum status status_of_errno(int error, enum status otherwise)
{
    switch (error) {
    case ENOENT:
    case ENOTDIR:
        return STATUS_NO_FILE;
    case EACCES:
    case EPERM:
    case EROFS:
        return STATUS_NO_PERMISSION;
    case EISDIR:
        return STATUS_NOT_A_FILE;
    case ENOMEM:
        return STATUS_NO_MEMORY;
    default:
        return otherwise;
    }
}

static enum status read_all(int fd, struct text *out)
{
    char block[65536];

    for (;;) {
        ssize_t got = read(fd, block, sizeof block);
        if (got < 0 && errno == EINTR)
            continue;
        if (got < 0)
            return STATUS_READ_FAILED;
        if (got == 0)
            return out->failed ? STATUS_NO_MEMORY : STATUS_OK;
        text_add_bytes(out, block, (size_t)got);
        if (out->length > FILE_MOST)
            return STATUS_TOO_LARGE;
    }
}

enum status file_read(const char *path, struct text *out)
{
    struct text bytes = {0};
    struct stat about;
    enum status status;
    int fd = open(path, O_RDONLY | O_CLOEXEC | O_NOCTTY | O_NONBLOCK);

    if (fd < 0)
        return status_of_errno(errno, STATUS_READ_FAILED);
    if (fstat(fd, &about) != 0)
        status = STATUS_READ_FAILED;
    else if (!S_ISREG(about.st_mode))
        status = STATUS_NOT_A_FILE;
    else if (about.st_size > FILE_MOST)
        status = STATUS_TOO_LARGE;
    else
        status = read_all(fd, &bytes);
    close(fd);
    if (status == STATUS_OK) {
        text_free(out);
        *out = bytes;
    } else {
        text_free(&bytes);
    }
    return status;
}

static bool write_all(int fd, const char *bytes, size_t count)
{
    while (count > 0) {
        ssize_t put = write(fd, bytes, count);
        if (put < 0 && errno == EINTR)
            continue;
        if (put <= 0)
            return false;
        bytes += put;
        count -= (size_t)put;
    }
    return true;
}

/* The folder must reach the disk too, or the new name may be lost with the power. */
static void sync_folder(const char *path)
{
    char folder[PATH_MAX];
    char *slash;
    int fd;

    if (snprintf(folder, sizeof folder, "%s", path) >= (int)sizeof folder)
        return;
    slash = strrchr(folder, '/');
    if (slash == NULL)
        strcpy(folder, ".");
    else
        slash[slash == folder] = '\0';
    fd = open(folder, O_RDONLY | O_DIRECTORY | O_CLOEXEC);
    if (fd >= 0) {
        (void)fsync(fd);
        close(fd);
    }
}

static enum status write_temporary(const char *temporary, mode_t mode, const char *bytes,
                                   size_t count)
{
    int fd, error = 0;

    (void)unlink(temporary); /* a stale one of an earlier crash, or somebody's link */
    fd = open(temporary, O_WRONLY | O_CREAT | O_EXCL | O_NOFOLLOW | O_CLOEXEC, 0600);
    if (fd < 0)
        return status_of_errno(errno, STATUS_WRITE_FAILED);
    if (!write_all(fd, bytes, count) || fchmod(fd, mode) != 0 || fsync(fd) != 0)
        error = errno ? errno : EIO;
    if (close(fd) != 0 && error == 0)
        error = errno;
    if (error == 0)
        return STATUS_OK;
    (void)unlink(temporary);
    return status_of_errno(error, STATUS_WRITE_FAILED);
}

/* The file a path means once links are followed; a dangling link keeps its own name. */
static bool real_target(const char *path, char *target)
{
    if (realpath(path, target) != NULL)
        return true;
    return snprintf(target, PATH_MAX, "%s", path) < PATH_MAX;
}

enum status file_replace(const char *path, const char *bytes, size_t count)
{
    char target[PATH_MAX], temporary[PATH_MAX];
    struct stat about;
    mode_t mask, mode;
    enum status status;

    if (!real_target(path, target) ||
        snprintf(temporary, sizeof temporary, "%s.slabgap-new", target) >= (int)sizeof temporary)
        return STATUS_WRITE_FAILED;
    if (stat(target, &about) == 0) {
        if (!S_ISREG(about.st_mode))
            return STATUS_NOT_A_FILE;
        if (access(target, W_OK) != 0)
            return STATUS_NO_PERMISSION;
        mode = about.st_mode & 07777;
    } else {
        mask = umask(0);
        umask(mask);
        mode = 0666 & ~mask;
    }
    status = write_temporary(temporary, mode, bytes, count);
    if (status != STATUS_OK)
        return status;
    if (rename(temporary, target) != 0) {
        status = status_of_errno(errno, STATUS_WRITE_FAILED);
        (void)unlink(temporary);
        return status;
    }
    sync_folder(target);
    return STATUS_OK;
}

/* Drawings carry the mark in their last line, other papers in their first. */
static bool has_mark(const struct text *content)
{
    enum { NEAR = 512 };
    static const char mark[] = "by slabgap ";
    size_t near = content->length < NEAR ? content->length : NEAR;

    return memmem(content->bytes, near, mark, sizeof mark - 1) != NULL ||
           memmem(content->bytes + content->length - near, near, mark, sizeof mark - 1) != NULL;
}

bool file_is_ours(const char *path)
{
    struct stat about;
    struct text content = {0};
    bool ours;

    if (stat(path, &about) != 0)
        return errno == ENOENT;
    if (!S_ISREG(about.st_mode))
        return false;
    if (about.st_size == 0)
        return true;
    if (file_read(path, &content) != STATUS_OK)
        return false;
    ours = content.length == 0 || has_mark(&content);
    text_free(&content);
    return ours;
}

bool file_can_begin(const char *path)
{
    const char *slash = strrchr(path, '/');
    char *folder =
        slash != NULL ? strndup(path, slash == path ? 1 : (size_t)(slash - path)) : strdup(".");
    bool can = folder != NULL && path[0] != '\0' && (slash == NULL || slash[1] != '\0') &&
               access(folder, W_OK | X_OK) == 0;

    free(folder);
    return can;
}

static const char *advice(enum status status)
{
    switch (status) {
    case STATUS_NO_FILE:
        return "check the name and the folder";
    case STATUS_NOT_A_FILE:
        return "name a file, not a folder or a device";
    case STATUS_NO_PERMISSION:
        return "choose another place, or ask whoever owns it";
    case STATUS_TOO_LARGE:
        return "a job is a few kilobytes of text; this is something else";
    case STATUS_WRITE_FAILED:
        return "check that the disk is not full, or save elsewhere";
    default:
        return "try again";
    }
}

void file_explain(struct text *out, const char *path, enum status status)
{
    text_format(out, "%s: %s; %s.", path, status_sentence(status), advice(status));
}

static bool readable(const char *folder, const char *name, struct text *path)
{
    text_clear(path);
    text_format(path, "%s/%s", folder, name);
    return !path->failed && access(text_string(path), R_OK) == 0;
}

bool file_find_shared(const char *name, struct text *path)
{
    const char *typed = getenv("SLABGAP_SHARE");
    char self[PATH_MAX], folder[PATH_MAX + 32];
    ssize_t length;
    char *slash;

    if (typed != NULL && typed[0] != '\0')
        return readable(typed, name, path);
    length = readlink("/proc/self/exe", self, sizeof self - 1);
    if (length > 0) {
        self[length] = '\0';
        slash = strrchr(self, '/');
        if (slash != NULL) {
            *slash = '\0';
            snprintf(folder, sizeof folder, "%s/../share/slabgap", self);
            if (readable(folder, name, path))
                return true;
            snprintf(folder, sizeof folder, "%s/../share", self);
            if (readable(folder, name, path))
                return true;
        }
    }
    return readable(SLABGAP_SHARE_DIR, name, path);
}
