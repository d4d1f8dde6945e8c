/* Text in at most `columns` columns: words wrapped, following lines indented. */
#ifndef SLABGAP_EXPORT_WRAP_H
#define SLABGAP_EXPORT_WRAP_H

#include "base/text.h"

/* Adds `first` (a label, padded to `indent` columns), then `words` wrapped, then a line end. */
void wrap_add(struct text *out, const char *first, int indent, const char *words, int columns);

#endif
