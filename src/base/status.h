/* What a function can return. One list, a sentence each. Results come through a pointer, untouched
 * on failure. A wrong input is a finding (finding.h), not an error code of its own. */
#ifndef SLABGAP_BASE_STATUS_H
#define SLABGAP_BASE_STATUS_H

#define STATUS_LIST(X)                                                                             \
    X(STATUS_OK, "done")                                                                           \
    X(STATUS_NO_MEMORY, "not enough memory; close other programs and try again")                   \
    X(STATUS_REFUSED, "the input was refused; the findings say why")                               \
    X(STATUS_NO_FILE, "there is no such file")                                                     \
    X(STATUS_NOT_A_FILE, "that is not a regular file")                                             \
    X(STATUS_NO_PERMISSION, "no permission for that file or folder")                               \
    X(STATUS_TOO_LARGE, "the file is larger than 16 MiB")                                          \
    X(STATUS_READ_FAILED, "the file could not be read")                                            \
    X(STATUS_WRITE_FAILED, "the file could not be written; nothing was changed")                   \
    X(STATUS_STOPPED, "stopped on request")

enum status {
#define STATUS_ENUM(name, sentence) name,
    STATUS_LIST(STATUS_ENUM)
#undef STATUS_ENUM
};

/* The sentence of a status, without a final stop. Never NULL. */
const char *status_sentence(enum status status);

#endif
