/* Materials, aggregates, bases, sealants, blades, rods and practices: rows made from the text
 * tables in share/tables at build time (src/job/tables.awk). Every row has its source. Nothing an
 * answer needs is read at run time. Values are SI as in struct job. NAN = not said. */
#ifndef SLABGAP_JOB_TABLE_H
#define SLABGAP_JOB_TABLE_H

#include <stddef.h>

struct aggregate_row {
    const char *name;
    double expansion;
    const char *source;
};
struct base_row {
    const char *name;
    double low, mean, high, slip;
    const char *source;
}; /* by base.kind word */
struct interlayer_row {
    const char *name;
    double low, mean, high, slip;
    const char *source;
}; /* by interlayer word */
struct sealant_row {
    const char *name;
    double extension, compression;               /* usual class */
    double width_least, width_most;              /* m */
    double depth_ratio, depth_least, depth_most; /* depth = ratio x width, clamped; m */
    double temperature_least;                    /* degC, usual coldest to seal */
    double cure_wait_d;                          /* age of concrete, days */
    const char *words;                           /* for people: "one-part silicone" */
    const char *source;
};
struct size_row {
    const char *name;
    double size;
    const char *system;
    const char *source;
}; /* m or m3; system metric/us/both */
struct dowel_row {
    const char *practice;
    double thickness_least, thickness_most, diameter, length, spacing;
    const char *source;
};
struct practice_row {
    const char *name, *title;
    double strength;
    double air_coldest, air_hottest;
    const char *units, *source;
};

extern const struct aggregate_row aggregate_table[];
extern const size_t aggregate_count;
extern const struct base_row base_table[];
extern const size_t base_count;
extern const struct interlayer_row interlayer_table[];
extern const size_t interlayer_count;
extern const struct sealant_row sealant_table[];
extern const size_t sealant_count;
extern const struct size_row blade_table[];
extern const size_t blade_count;
extern const struct size_row rod_table[];
extern const size_t rod_count;
extern const struct size_row filler_table[];
extern const size_t filler_count;
extern const struct size_row seal_table[];
extern const size_t seal_count;
extern const struct dowel_row dowel_table[];
extern const size_t dowel_count;
extern const struct practice_row practice_table[];
extern const size_t practice_count;

#endif
