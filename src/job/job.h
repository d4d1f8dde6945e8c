/* The job: the inputs in one plain struct. SI inside: m, Pa, K, s; temperatures degC, angles
 * degrees. Single fields come from fields.def (the member is the field's id). `given` says which
 * were typed. A job as read holds only what was typed (and fixed defaults); job_settle() fills in
 * every default that depends on other fields. */
#ifndef SLABGAP_JOB_JOB_H
#define SLABGAP_JOB_JOB_H

#include "base/finding.h"
#include "base/unit.h"
#include "core/weather.h"
#include <stdbool.h>
#include <stddef.h>

/* Words of the choices, in the order of the enums below them. */
#define PRACTICE_WORDS "plain us uk germany australia india"
enum practice {
    PRACTICE_PLAIN,
    PRACTICE_US,
    PRACTICE_UK,
    PRACTICE_GERMANY,
    PRACTICE_AUSTRALIA,
    PRACTICE_INDIA
};
#define USE_WORDS "yard road footway floor apron"
enum use { USE_YARD, USE_ROAD, USE_FOOTWAY, USE_FLOOR, USE_APRON };
#define BASE_WORDS "granular stabilised asphalt sand soil"
enum base_kind { BASE_GRANULAR, BASE_STABILISED, BASE_ASPHALT, BASE_SAND, BASE_SOIL };
#define INTERLAYER_WORDS "none sheet fabric sand"
enum interlayer { INTERLAYER_NONE, INTERLAYER_SHEET, INTERLAYER_FABRIC, INTERLAYER_SAND };
#define SHRINKAGE_WORDS "en1992 aci209 mc2010 typed"
enum shrinkage_model { SHRINKAGE_EN1992, SHRINKAGE_ACI209, SHRINKAGE_MC2010, SHRINKAGE_TYPED };
#define SEALANT_WORDS                                                                              \
    "silicone polyurethane polysulfide hot-pour compression-seal floor-filler none"
enum sealant_kind {
    SEALANT_SILICONE,
    SEALANT_POLYURETHANE,
    SEALANT_POLYSULFIDE,
    SEALANT_HOT_POUR,
    SEALANT_COMPRESSION_SEAL,
    SEALANT_FLOOR_FILLER,
    SEALANT_NONE
};
#define JOINING_WORDS "tied dowelled plain"
enum joining { JOINING_TIED, JOINING_DOWELLED, JOINING_PLAIN };
#define OBJECT_WORDS "column manhole drain channel post wall other"
enum object_kind {
    OBJECT_COLUMN,
    OBJECT_MANHOLE,
    OBJECT_DRAIN,
    OBJECT_CHANNEL,
    OBJECT_POST,
    OBJECT_WALL,
    OBJECT_OTHER
};
#define OPENING_AGAINST_WORDS "free wall"
#define EDGE_AGAINST_WORDS "free wall kerb slab asphalt"
enum against { AGAINST_FREE, AGAINST_WALL, AGAINST_KERB, AGAINST_SLAB, AGAINST_ASPHALT };
#define TREAT_WORDS "match isolate"
enum treat { TREAT_MATCH, TREAT_ISOLATE };
#define JOINT_KIND_WORDS "contraction construction isolation expansion"
enum joint_kind { JOINT_CONTRACTION, JOINT_CONSTRUCTION, JOINT_ISOLATION, JOINT_EXPANSION };
enum { SHAPE_RECT, SHAPE_ROUND };
enum { EXPOSURE_OPEN, EXPOSURE_HALF, EXPOSURE_SHADE, EXPOSURE_INDOOR };
enum { MOVEMENT_FRICTION, MOVEMENT_FACTOR };
enum { SEALING_NEW, SEALING_RESEAL };
enum { SEALING_AT_SEALING, SEALING_MEAN_WIDTH };
enum { WHEELS_PNEUMATIC, WHEELS_HARD };
enum { BACKING_ROD, BACKING_TAPE, BACKING_NONE };
enum { TOOL_GUN, TOOL_PUMP, TOOL_MELTER };
enum { CEMENT_N, CEMENT_S, CEMENT_R };
enum { AGENCY_NONE, AGENCY_UFC, AGENCY_SUDAS, AGENCY_ILLINOIS, AGENCY_IRC };

/* Advice rows that the user lets count (rules.counts), as bits. */
#define COUNTS_WORDS "table drag stiffness curling interlock sealant"
enum {
    COUNT_TABLE = 1,
    COUNT_DRAG = 2,
    COUNT_STIFFNESS = 4,
    COUNT_CURLING = 8,
    COUNT_INTERLOCK = 16,
    COUNT_SEALANT = 32
};

/* Types of SPECIAL fields. */
struct bar { /* BAR: dowels, ties; diameter 0 = none */
    double diameter, length, spacing;
};
struct strength {    /* STRENGTH: fck in Pa and how it was written */
    double cylinder; /* Pa */
    char typed[32];  /* "C32/40" */
};
struct aggregate { /* AGGREGATE: index into the aggregate table, -1 = unknown */
    int row;
};
struct movement_class { /* CLASS: ratios of the width at sealing */
    double extension, compression;
    char word[16]; /* "25", "100/50" */
};
enum { NUMBERS_MOST = 8 };
struct numbers { /* NUMBERS: SI, in the order typed */
    double items[NUMBERS_MOST];
    size_t count;
};
struct counts { /* COUNTS: bits */
    unsigned bits;
};
struct date { /* DATE; year 0 = none */
    int year, month, day;
};
struct time_of_day { /* TIME */
    int minutes;     /* since midnight */
};
enum { TITLE_MOST = 1024 };

enum field_id {
#define NUMBER(id, ...) FIELD_##id,
#define CHOICE(id, ...) FIELD_##id,
#define TEXT(id, ...) FIELD_##id,
#define DATE(id, ...) FIELD_##id,
#define TIME(id, ...) FIELD_##id,
#define NUMBERS(id, ...) FIELD_##id,
#define SPECIAL(id, ...) FIELD_##id,
#include "job/fields.def"
    FIELD_COUNT
};

/* ---- things with rows ---- */
struct row { /* a corner: `point` or `arc` */
    double x, y;
    bool arc, left; /* arc: the side arriving here turns about (cx, cy), left = anticlockwise */
    double cx, cy;
    int line; /* in the file; 0 = none */
};
struct rows {
    struct row *items;
    size_t count, capacity;
};
enum { NAME_MOST = 32 * 4 };
struct opening {
    char name[NAME_MOST + 1];
    enum against against; /* free or wall */
    struct rows rows;
    int line; /* of its header */
};
struct object {
    char name[NAME_MOST + 1];
    enum object_kind kind;
    int shape; /* SHAPE_RECT: w x d; SHAPE_ROUND: w = d = diameter */
    double x, y, w, d, angle_deg;
    bool isolate;
    bool box_at_given, box_half_given;
    double box_x, box_y, box_half;
    int line;
};
struct edge {
    int number; /* from 1 */
    enum against against;
    enum treat treat; /* settled: match for slab, else isolate, unless typed */
    bool treat_given;
    double *joints; /* m along the side from its first point */
    size_t joint_count;
    int line;
};
struct pour_line {
    double x1, y1, x2, y2;
    int line;
};
struct drawn_joint {
    enum joint_kind kind;
    double x1, y1, x2, y2;
    bool keep; /* yes: fixed; no: the solver may not draw here */
    int line;
};
struct crack {
    struct rows rows;
    int line;
};

struct job {
    bool given[FIELD_COUNT];
#define NUMBER(id, ...) double id;
#define CHOICE(id, ...) int id;
#define TEXT(id, ...) char id[TITLE_MOST];
#define DATE(id, ...) struct date id;
#define TIME(id, ...) struct time_of_day id;
#define NUMBERS(id, ...) struct numbers id;
#define SPECIAL(id, type, ...) SPECIAL_TYPE_##type id;
#define SPECIAL_TYPE_BAR struct bar
#define SPECIAL_TYPE_STRENGTH struct strength
#define SPECIAL_TYPE_AGGREGATE struct aggregate
#define SPECIAL_TYPE_CLASS struct movement_class
#define SPECIAL_TYPE_COUNTS struct counts
#include "job/fields.def"
    struct rows outline;
    struct opening *openings;
    size_t opening_count, opening_capacity;
    struct object *objects;
    size_t object_count, object_capacity;
    struct edge *edges;
    size_t edge_count, edge_capacity;
    struct pour_line *pour_lines;
    size_t pour_line_count, pour_line_capacity;
    bool has_pours; /* a [pours] section is there */
    struct drawn_joint *joints;
    size_t joint_count, joint_capacity;
    struct crack *cracks;
    size_t crack_count, crack_capacity;
    struct weather *weather; /* what climate.file holds, read by the file layer; NULL: not read */
};

/* An empty job: fixed defaults in, nothing given. */
void job_init(struct job *job);
/* Deep copy; STATUS_NO_MEMORY leaves *to = an empty job. */
enum status job_copy(struct job *to, const struct job *from);
/* Frees the rows; safe on {0} and twice. */
void job_free(struct job *job);
static inline bool job_given(const struct job *job, enum field_id id)
{
    return job->given[id];
}

/* Fills in every default that depends on other fields (by practice, base, interlayer, aggregate,
 * class, dates): after it every member of every single field that can have a value has one; those
 * that stay without one (width, spacing, slab temperatures, dates, latitude ...) keep NAN or year
 * 0. `given` is left as it was. Adds findings for fields that contradict each other or are typed
 * but unused (coldest above hottest, `shrinkage` without `typed`, 0.65 over a sheet ...). */
void job_settle(struct job *job, struct finding_list *findings);

/* Checks everything that needs no plan: outline closed and simple, openings inside and apart, arcs
 * with equal radii, objects on the slab, edges that exist, joints off the slab, date order. One
 * finding each, with field, value, limit and what to do. (job_check.c) */
void job_check(const struct job *job, struct finding_list *findings);

/* Days from 1970-01-01 of a date (proleptic Gregorian), and whether a date exists. */
long date_days(struct date date);
bool date_valid(struct date date);
struct date date_from_days(long days);
/* Day of the year from 0; 29 February counts as 28. */
int date_day_of_year(struct date date);
/* Age of the concrete at sealing in days: the dates, else 28. */
double job_sealing_age_days(const struct job *job);

#endif
