/* The only layer that opens files: reading one, replacing one safely, finding the shipped ones. */
#ifndef SLABGAP_FILE_FILE_H
#define SLABGAP_FILE_FILE_H

#include "base/status.h"
#include "base/text.h"
#include <stdbool.h>
#include <stddef.h>

enum { FILE_MOST = 16 * 1024 * 1024 };

/* Reads a whole regular file of at most 16 MiB. STATUS_NO_FILE, _NOT_A_FILE, _NO_PERMISSION,
 * _TOO_LARGE, _READ_FAILED, _NO_MEMORY; *out is untouched then. */
enum status file_read(const char *path, struct text *out);
/* Replaces (or makes) a file so that at every moment either the old or the new content is there:
 * links followed, temporary in the same folder under one predictable name, fsync, mode kept,
 * rename, fsync of the folder. On failure the old file is as it was and the temporary is gone. */
enum status file_replace(const char *path, const char *bytes, size_t count);
/* Whether a file may be overwritten without asking: it is not there, is empty, or carries this
 * program's mark near its start or end. */
bool file_is_ours(const char *path);
/* Whether a new file could be made there: its folder is there and may be written. */
bool file_can_begin(const char *path);
/* A sentence for a status about a path: "yard.slab: there is no such file. Check the name ...". */
void file_explain(struct text *out, const char *path, enum status status);
/* Finds a shipped file ("examples/e1-service-yard.slab"): in SLABGAP_SHARE, else beside the program
 * (../share/slabgap, ../share), else where it was installed. False when there is none. */
bool file_find_shared(const char *name, struct text *path);

#endif
