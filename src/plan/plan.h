/* The plan: one read-only value made from a job by the whole chain. NAN in a double = there is no
 * such result (printed as null or "none"). SI: m, s, Pa, ratios; temperatures degC. */
#ifndef SLABGAP_PLAN_PLAN_H
#define SLABGAP_PLAN_PLAN_H

#include "core/climate.h"
#include "core/conduction.h"
#include "core/layout.h"
#include "job/job.h"

enum verdict { VERDICT_HOLDS, VERDICT_TIGHT, VERDICT_FAILS, VERDICT_NONE };
enum applies { APPLIES_GOVERNS, APPLIES_ADVICE, APPLIES_NO };

struct plan_limit {   /* one row of the spacing rules */
    const char *rule; /* typed thickness cap table drag stiffness curling interlock sealant */
    double limit_m;
    char words[96]; /* "24 x thickness", "at most 15 ft below 10 in" */
    const char *source;
    bool counts;
    enum applies applies;
};
struct plan_working {
    int n;
    double open_m, close_m, extension, compression, capacity;
    enum verdict verdict;
};
struct plan_table_row {
    double slab_c, gap_m, extension, compression;
    double least_m; /* narrowest joint that may be sealed then, measured then, tolerance in */
    enum verdict verdict;
    bool too_cold;
};
struct plan_isolation {
    char where[NAME_MOST + 32]; /* "edge 1", "C1", "opening pit", "expansion joint J3" */
    double length_m, run_m, from_c, expansion_m, filler_m, least_filler_m, extension, compression,
        opening_m;
    enum verdict verdict;
};
struct plan_check {
    char id[48];
    char label[96]; /* for people */
    double demand, capacity;
    const char *unit; /* "ratio", "m", "count" ... */
    bool binding;
    enum verdict verdict;
    char source[128];
    char remedy[160];
};
struct plan_joint { /* one per layout joint, same order */
    bool tied;
    double length_m, open_m, close_m, width_m, extension, compression; /* NAN: none */
    double left_m, right_m; /* bars on either side, 0 = none; run_m: their mean */
    double run_m;
    enum verdict verdict;
};
struct plan_package {
    double size_m3;
    int count;
};
struct plan_rod {
    double diameter_m, length_m;
};

enum { WORK_MOST = 4, WIDTH_MOST = 12, BOARD_MOST = 12 };
struct plan_work { /* one operation of the sealing crew */
    const char *name;
    double length_m, pace_m_s, tools, hours;
    bool slowest;
};
struct plan_width { /* the same joints at another width */
    double width_m, depth_m, extension, compression, rod_m, order_m3, hours;
    int packs;
    enum verdict verdict, when_n3; /* when_n3: if only one cut in three works */
    bool now;                      /* the job's own */
};
struct plan_board { /* soft board of one thickness */
    double thickness_m, length_m, area_m2;
};

enum { CHOICE_KINDS = 8 };
struct plan_choice { /* one kind of sealant */
    int kind_index;
    const char *kind;
    bool fits, now;
    double width_m, depth_m, extension, compression; /* narrowest that holds; NAN none */
    char reason[320];                                /* why not */
    char remark[200];                                /* what to mind all the same */
};

struct plan_pour { /* what is placed at once */
    int number, panels;
    int turn; /* 1: placed first, 2: the strips between */
    int trucks;
    double area_m2, volume_m3, x, y, hours; /* hours: NAN without a rate */
};
/* ---- the day of pouring; clock times in h from midnight of that day ---- */
struct early_history;
struct plan_cut { /* one line of one pour, in the order of sawing */
    char line[12];
    int pour, order, saw, joint_line;
    int part; /* 0: across the way the concrete comes, else 1, 2 ... of a line along it */
    double length_m, start_h, end_h, ready_h, deadline_h, spare_h; /* deadline INFINITY: none */
    char start[20], not_before[20], not_after[20];                 /* 17:08, 12 Apr ... */
    bool late;
};
struct plan_stop { /* the plant stops after this truck */
    int pour, truck;
    double volume_m3, front_m;
    char joint[12]; /* nearest planned joint to stop at; "" none */
    int joint_line;
    double joint_m, more_m3; /* what it takes to get there; below 0: too much is there */
};
enum { CRACK_PANELS = 16 };
struct plan_crack_panel {
    int panel;
    double length_m;
};
struct plan_crack { /* one per [crack] */
    int number;
    double length_m;
    struct plan_crack_panel panels[CRACK_PANELS]; /* those it crosses, in its own order */
    size_t panel_count;
    int panels_crossed; /* the same, for the table */
    int joint;          /* contraction joint it runs beside, -1 = none */
    char beside[48];    /* its id */
    double distance_m;  /* mean distance from it */
};

enum { LIMIT_MOST = 16, WORKING_MOST = 4, TABLE_MOST = 24, PACKAGE_KINDS = 8 };

struct plan {
    struct job job; /* settled copy */
    enum field_id assumed[FIELD_COUNT];
    size_t assumed_count; /* defaults used */
    enum field_id overrides[FIELD_COUNT];
    size_t override_count; /* typed and ruling over a rule */
    struct finding_list findings;
    bool has_outline;

    struct {
        double limit_m, across_limit_m;
        const char *governed_by;
        double
            rule_limit_m; /* what the rules alone would give (for "24 x thickness would be 4.8") */
        char rule_words[96];
        struct plan_limit rows[LIMIT_MOST];
        size_t count;
    } spacing;
    struct {
        double fck_pa, fcm_pa, modulus_pa, tensile_pa, rupture_pa, expansion_k;
        double stiffness_radius_m; /* radius of relative stiffness */
    } concrete;
    struct {
        double coldest_c, hottest_c, sealing_c, zero_stress_c /* for isolation, runs */,
            crack_zero_c /* for crack opening */, cut_c /* when the wide cut was made */;
        double deck_coldest_c, deck_hottest_c;         /* EN 1991-1-5, comparison only */
        double estimate_coldest_c, estimate_hottest_c; /* air and Barber, comparison only */
        double day_k, night_k; /* top hotter, top colder than bottom, sizes; for curling */
        const char *basis;     /* typed | estimate (indoors: the air) | simulation */
    } temperature;
    struct {
        double after_sealing, before_sealing, end_years;
        const char *basis;
    } shrinkage;
    struct {
        double open_m, close_m, panel_m;
        double left_m, right_m; /* bars beside that joint; 0 = none there */
        const char *basis;      /* factor | friction */
        double factor, factor_open_m, factor_close_m, friction_open_m, friction_close_m;
    } movement;
    struct plan_working working[WORKING_MOST];
    size_t working_count;
    struct {
        double width_m, least_width_m, tolerance_m, depth_m, recess_m, extension, compression;
        double extension_capacity, compression_capacity, bead_strain, rod_m, bulge_m;
        double cold_squeeze;                  /* compression seal: squeeze left at the coldest */
        double follow_open_m, follow_close_m; /* compression seal: how far it can follow */
        double cut_depth_m;                   /* depth of the wide cut: recess + depth + rod */
        double next_down_m, next_down_extension, next_down_compression, next_up_m,
            next_up_extension, next_up_compression;
        double holds_when_n3_m; /* narrowest blade that takes n = 3, NAN none */
        double window_coldest_c,
            window_hottest_c; /* slab temperatures at which the joint as cut may be sealed */
        enum verdict verdict;
        const char *basis; /* width-and-movement */
        bool chosen;       /* width chosen by the program */
        bool sealed;       /* a sealant with a capacity: false for none, floor-filler */
    } seal;
    struct plan_table_row table[TABLE_MOST];
    size_t table_count;
    struct plan_choice choices[CHOICE_KINDS];
    size_t choice_count;
    struct plan_isolation *isolation;
    size_t isolation_count;
    struct {
        double least_m, most_m, set_m;
    } cut;
    struct plan_check *checks;
    size_t check_count, check_capacity;
    struct {
        double contraction_m, construction_m, isolation_m, expansion_m, saw_m, sealed_m;
        double sealant_net_m3, sealant_cusps_m3, sealant_order_m3;
        struct plan_package packages[PACKAGE_KINDS];
        size_t package_count;
        struct plan_rod rods[PACKAGE_KINDS];
        size_t rod_count;
        bool length_typed;
        double filler_m2, area_m2, volume_m3;
        int boxes;                      /* of takeoff.box packs, for the first package */
        double board_m, board_order_m3; /* sealant over soft board: its length, waste in; extra */
        double strip_m;                 /* compression seal to order, spare in */
        double wide_cut_m, tape_m, primer_m2; /* primer: both faces, if the sealant wants one */
        double loss_m3;                       /* of all days, in sealant_order */
        double pot_life_s, batch_most_m3, batch_m; /* two-part: at the sealing temperature */
        double hours, days, cost; /* of the slowest operation; cost: NAN, no price */
        struct plan_work works[WORK_MOST];
        size_t work_count;
        struct plan_width widths[WIDTH_MOST];
        size_t width_count;
        struct plan_board boards[BOARD_MOST];
        size_t board_count;
    } quantities;
    struct {
        double dowel_diameter_m, dowel_length_m, dowel_spacing_m;
        int dowel_count;
        double tie_spacing_m, tie_length_m, tie_diameter_m;
        double drag_steel_m2_per_m;
    } steel;
    struct {
        double night_edge_pa; /* of the night alone; edge_pa: the worse of day and night */
        double bradbury_x, bradbury_y, edge_pa, interior_pa, lift_m, settlement_m;
        double locked_pa, locked_both_pa; /* locked slab at hottest - zero stress */
        double lift_off_hinge_k, lift_off_continuous_k, rise_left_k; /* blow-up */
    } restraint;
    struct plan_pour *pours; /* one when nothing parts the slab */
    size_t pour_count;
    int *panel_pour; /* index in pours of every panel, -1 beyond those listed */
    struct {
        struct early_history *histories; /* of the first and the last concrete; NULL: no start */
        double speed;                    /* what trial cuts moved: ages are multiplied by it */
        double start_h, pour_h;          /* clock of the first concrete; hours it comes */
        double set_h, set_c;             /* age and mean temperature at final set */
        double warmest_c, warmest_h;     /* of the mean, and its age */
        double earliest_h, latest_h;     /* clock, first concrete, longest strip */
        double end_h, late_m, least_spare_h;
        double strip_m;             /* the longest strip of the first pour, uncut */
        double evaporation;         /* kg/(m2 h), the worst of the hours of placing */
        double sunrise_h, sunset_h; /* NAN: not known, or none that day */
        int saws_enough;            /* 0: no number of saws */
        char first_trial[20], no_later[20], last_cut[20], sunset[20];
        const char *policy; /* as placed | by deadline | relief | searched */
        struct plan_cut *cuts;
        size_t cut_count, cut_capacity;
        struct plan_stop *stops;
        size_t stop_count;
    } saw;
    struct plan_crack *cracks;
    size_t crack_count;
    struct plan_joint *joints; /* layout.joint_count of them */
    size_t
        governing_joint; /* index of the contraction joint `movement` describes; SIZE_MAX = none */
    struct layout layout;
};

/* What a plan remembers for the next one: the slab's year and the layout's zones. May be NULL
 * everywhere; a plan made with it equals a plan made without. Starts as {0}; plan_cache_free. */
struct plan_cache {
    bool has_year;
    struct climate_range range;
    struct conduction_slab slab;
    uint64_t weather_mark; /* of the weather record; 0: none */
    double coldest_c, hottest_c, day_k, night_k;
    int coldest_hour, hottest_hour; /* of the year, from 0 */
    int coldest_year, hottest_year; /* of the record, from 0 */
    struct layout_cache layout;
};
void plan_cache_free(struct plan_cache *cache);
struct plan_progress {
    bool (*go_on)(void *context, double share);
    void *context;
};

/* The whole chain. On STATUS_REFUSED the plan holds only findings (some are errors). Always free
 * it. */
enum status plan_make(const struct job *job, struct plan_cache *cache,
                      const struct plan_progress *progress, struct plan *plan);
void plan_free(struct plan *plan); /* safe on {0} and twice */
/* 0, 1 by the binding checks and layout.violations; 2 when there is no plan. */
int plan_exit_status(const struct plan *plan);
const char *verdict_word(enum verdict verdict); /* holds tight fails; "" for none (file, JSON) */
const char *verdict_screen_word(enum verdict verdict); /* HOLDS, JUST HOLDS, FAILS */
/* fails when demand > capacity (1 + 1e-9); tight above 0.9 capacity */
enum verdict verdict_of(double demand, double capacity);

#endif
