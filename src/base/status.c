#include "base/status.h"

const char *status_sentence(enum status status)
{
    switch (status) {
#define STATUS_CASE(name, sentence)                                                                \
    case name:                                                                                     \
        return sentence;
        STATUS_LIST(STATUS_CASE)
#undef STATUS_CASE
    }
    return "unknown status";
}
