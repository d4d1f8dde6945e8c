/* What must hold for every job, whatever its numbers: physics that cannot turn round, units and
 * places that do not matter, the same answer every time. Expected is common sense of mechanics, or
 * the identity itself; no value here comes from the program. */
#include "plan_help.h"

/* A job of these numbers; the same seed gives the same jobs. */
struct figures {
    double thickness_mm, coldest, hottest, sealing, shrinkage, spacing, expansion;
    const char *base, *movement;
};

static double between(uint64_t *seed, double least, double most)
{
    *seed = *seed * 6364136223846793005u + 1442695040888963407u;
    return least + (most - least) * (double)(*seed >> 33) / 2147483648.0;
}

static struct figures random_numbers(uint64_t *seed)
{
    static const char *const bases[] = {"granular", "stabilised", "asphalt", "sand", "soil"};
    struct figures n = {.thickness_mm = floor(between(seed, 80, 400)),
                        .coldest = floor(between(seed, -30, 15)),
                        .shrinkage = between(seed, 0, 600e-6),
                        .spacing = between(seed, 1, 7),
                        .expansion = between(seed, 6e-6, 13e-6)};

    n.hottest = n.coldest + floor(between(seed, 10, 50));
    n.sealing = fmax(-19, n.coldest + (n.hottest - n.coldest) * between(seed, 0.05, 0.95));
    n.base = bases[(size_t)between(seed, 0, COUNT(bases) - 0.001)];
    n.movement = between(seed, 0, 1) < 0.5 ? "friction" : "factor";
    return n;
}

static void plan_of(const struct figures *n, const char *more, struct plan *plan)
{
    struct text text = {0};

    text_format(&text,
                F "[slab]\nthickness = %.9g mm\n[base]\nkind = %s\n[concrete]\nexpansion = %.12g "
                  "/K\nshrinkage-model = typed\nshrinkage = %.12g\n[climate]\nslab-coldest = %.9g "
                  "degC\nslab-hottest = %.9g degC\n[sealing]\nmovement = %s\ntemperature = %.9g "
                  "degC\n[rules]\nspacing = %.12g m\n%s",
                n->thickness_mm, n->base, n->expansion, n->shrinkage, n->coldest, n->hottest,
                n->movement, n->sealing, n->spacing, more);
    make_plan(text_string(&text), plan);
    text_free(&text);
}

enum { ROUNDS = 200 };
/* Room for the last digit only. */
static const double tiny = 1 + 1e-12;

/* ---- mechanics that cannot turn round ---- */

/* Two plans of random numbers, the second changed; then what must hold of them. */
static void for_pairs(void (*change)(struct figures *n, uint64_t *seed),
                      void (*expect)(const struct plan *before, const struct plan *after))
{
    uint64_t seed = 20270412;

    for (int i = 0; i < ROUNDS; i++) {
        struct figures n = random_numbers(&seed);
        struct plan before, after;
        plan_of(&n, "[sealant]\nwidth = 15 mm\n", &before);
        change(&n, &seed);
        plan_of(&n, "[sealant]\nwidth = 15 mm\n", &after);
        expect(&before, &after);
        plan_free(&before);
        plan_free(&after);
    }
}

static void double_length(struct figures *n, uint64_t *seed)
{
    (void)seed;
    n->spacing *= 2;
}

static void moves_no_less(const struct plan *before, const struct plan *after)
{
    assert_true(before->movement.open_m > 0 || before->movement.close_m > 0);
    assert_true(after->movement.open_m * tiny >= before->movement.open_m);
    assert_true(after->movement.close_m * tiny >= before->movement.close_m);
    assert_true(after->movement.friction_open_m * tiny >= before->movement.friction_open_m);
    assert_true(after->movement.friction_close_m * tiny >= before->movement.friction_close_m);
    assert_true(after->seal.extension * tiny >= before->seal.extension);
    assert_true(after->seal.compression * tiny >= before->seal.compression);
}

static void test_longer_panels_move_no_less(void **state)
{
    (void)state;
    for_pairs(double_length, moves_no_less);
}

static void colder(struct figures *n, uint64_t *seed)
{
    n->coldest -= between(seed, 0, 20);
}

static void opens_no_less(const struct plan *before, const struct plan *after)
{
    assert_true(after->movement.open_m * tiny >= before->movement.open_m);
    assert_true(after->seal.extension * tiny >= before->seal.extension);
    assert_true(after->movement.close_m == before->movement.close_m);
    for (size_t i = 0; i < after->working_count; i++)
        assert_true(after->working[i].open_m * tiny >= before->working[i].open_m);
}

static void test_colder_never_opens_less(void **state)
{
    (void)state;
    for_pairs(colder, opens_no_less);
}

static void hotter(struct figures *n, uint64_t *seed)
{
    n->hottest += between(seed, 0, 6);
}

static void closes_no_less(const struct plan *before, const struct plan *after)
{
    assert_true(after->movement.close_m * tiny >= before->movement.close_m);
    assert_true(after->seal.compression * tiny >= before->seal.compression);
    assert_true(after->movement.open_m == before->movement.open_m);
}

static void test_hotter_never_closes_less(void **state)
{
    (void)state;
    for_pairs(hotter, closes_no_less);
}

static void drier(struct figures *n, uint64_t *seed)
{
    n->shrinkage += between(seed, 0, 400e-6);
}

static void test_drying_never_opens_less(void **state)
{
    (void)state;
    for_pairs(drier, opens_no_less);
}

/* No joint moves more than its panels do free, and friction holds back. */
static void test_never_more_than_free(void **state)
{
    (void)state;
    uint64_t seed = 7;

    for (int i = 0; i < ROUNDS; i++) {
        struct figures n = random_numbers(&seed);
        struct plan plan;
        double open, close;
        plan_of(&n, "", &plan);
        open = n.spacing * (n.expansion * (n.sealing - n.coldest) + n.shrinkage);
        close = n.spacing * n.expansion * (n.hottest - n.sealing);
        assert_true(plan.movement.open_m <= open * (1 + 1e-9));
        assert_true(plan.movement.close_m <= close * (1 + 1e-9));
        assert_true(plan.movement.open_m >= 0.05 * open);
        plan_free(&plan);
    }
}

/* A wider joint stretches and is squeezed less: movement over width. */
static void test_wider_stretches_less(void **state)
{
    (void)state;
    uint64_t seed = 11;

    for (int i = 0; i < ROUNDS / 4; i++) {
        struct figures n = random_numbers(&seed);
        double last = INFINITY;
        for (int width = 6; width <= 40; width += 2) {
            struct plan plan;
            char more[64];
            snprintf(more, sizeof more, "[sealant]\nwidth = %d mm\n", width);
            plan_of(&n, more, &plan);
            assert_true(plan.seal.extension < last);
            assert_true(
                same_number(plan.seal.extension * width / 1000, plan.movement.open_m, 1e-9));
            last = plan.seal.extension;
            plan_free(&plan);
        }
    }
}

/* A width that the program chooses holds; the next narrower blade does not, or has less to spare
 * than a tenth. */
static void test_a_chosen_width_holds(void **state)
{
    (void)state;
    uint64_t seed = 13;

    for (int i = 0; i < ROUNDS; i++) {
        struct figures n = random_numbers(&seed);
        struct plan plan;
        plan_of(&n, "", &plan);
        if (isfinite(plan.seal.width_m) && plan.seal.verdict != VERDICT_FAILS) {
            assert_true(plan.seal.extension <= plan.seal.extension_capacity * (1 + 1e-9));
            assert_true(plan.seal.compression <= plan.seal.compression_capacity * (1 + 1e-9));
            assert_true(plan.seal.width_m >= plan.seal.least_width_m * (1 - 1e-9));
        } else {
            assert_int_equal(plan_exit_status(&plan), 1);
        }
        plan_free(&plan);
    }
}

/* Colder at sealing: more closing to come and less opening; the sealing table falls that way. */
static void test_sealing_table_falls(void **state)
{
    (void)state;
    uint64_t seed = 17;

    for (int i = 0; i < ROUNDS; i++) {
        struct figures n = random_numbers(&seed);
        struct plan plan;
        plan_of(&n, "[sealant]\nwidth = 15 mm\n", &plan);
        assert_true(plan.table_count >= 3);
        for (size_t r = 1; r < plan.table_count; r++) {
            const struct plan_table_row *cold = &plan.table[r - 1], *warm = &plan.table[r];
            assert_true(cold->slab_c < warm->slab_c);
            assert_true(cold->gap_m * tiny >= warm->gap_m);
            assert_true(cold->extension <= warm->extension * tiny);
            assert_true(cold->compression * tiny >= warm->compression);
        }
        plan_free(&plan);
    }
}

/* ---- units do not matter ---- */

static void test_feet_and_metres(void **state)
{
    (void)state;
    /* 1 ft = 0.3048 m, 1 in = 25.4 mm, 9 degF = 5 K: exact by definition */
    static const char *const pairs[][2] = {
        {F "[slab]\nthickness = 6 in\n[rules]\nspacing = 12 ft\nleast-side = 2 ft\n[concrete]\n"
           "expansion = 5.4e-6 /degF\n[climate]\nslab-coldest = 14 degF\nslab-hottest = 104 degF\n"
           "[sealing]\ntemperature = 59 degF\n[sealant]\nwidth = 0.5 in\nrecess = 0.25 in\n"
           "[outline]\npoint = 0, 0 ft\npoint = 60, 0 ft\npoint = 60, 40 ft\npoint = 0, 40 ft\n"
           "[object C1]\nkind = column\nat = 30, 20 ft\nsize = 12 x 12 in\n[edge 1]\nagainst = "
           "wall\n",
         F "[slab]\nthickness = 152.4 mm\n[rules]\nspacing = 3.6576 m\nleast-side = 0.6096 m\n"
           "[concrete]\nexpansion = 9.72e-6 /K\n[climate]\nslab-coldest = -10 degC\nslab-hottest "
           "= 40 degC\n[sealing]\ntemperature = 15 degC\n[sealant]\nwidth = 12.7 mm\nrecess = "
           "6.35 mm\n[outline]\npoint = 0, 0 m\npoint = 18.288, 0 m\npoint = 18.288, 12.192 m\n"
           "point = 0, 12.192 m\n[object C1]\nkind = column\nat = 9.144, 6.096 m\nsize = 0.3048 x "
           "0.3048 m\n[edge 1]\nagainst = wall\n"},
        {F "[slab]\nthickness = 0.5 ft\n", F "[slab]\nthickness = 15.24 cm\n"},
        {F "[climate]\nair-coldest = 23 degF\nair-hottest = 86 degF\nwind = 9 km/h\n[slab]\n"
           "dowels = 1 in x 18 in at 12 in\n",
         F "[climate]\nair-coldest = -5 degC\nair-hottest = 303.15 K\nwind = 2.5 m/s\n[slab]\n"
           "dowels = 25.4 x 457.2 mm at 304.8 mm\n"},
        {F "[base]\nsubgrade-modulus = 55 MPa/m\n[concrete]\nstrength = 40 MPa\nshrinkage = 200 "
           "microstrain\nshrinkage-model = typed\n",
         F "[base]\nsubgrade-modulus = 55000 kN/m3\n[concrete]\nstrength = 40 N/mm2\nshrinkage = "
           "200e-6\nshrinkage-model = typed\n"},
    };

    for (size_t i = 0; i < COUNT(pairs); i++) {
        struct plan one, other;
        make_plan(pairs[i][0], &one);
        make_plan(pairs[i][1], &other);
        expect_same("feet and metres", &one, &other, 1e-9);
        plan_free(&one);
        plan_free(&other);
    }
}

/* How numbers are shown changes no width that was typed and no movement. */
static void test_shown_units_change_no_movement(void **state)
{
    (void)state;
    uint64_t seed = 23;

    for (int i = 0; i < ROUNDS / 4; i++) {
        struct figures n = random_numbers(&seed);
        struct plan metric, us;
        plan_of(&n, "[sealant]\nwidth = 15 mm\ndepth = 10 mm\n", &metric);
        plan_of(&n, "[sealant]\nwidth = 15 mm\ndepth = 10 mm\n[job]\nunits = us\n", &us);
        assert_true(metric.movement.open_m == us.movement.open_m);
        assert_true(metric.movement.close_m == us.movement.close_m);
        assert_true(metric.seal.extension == us.seal.extension);
        assert_int_equal(metric.seal.verdict, us.seal.verdict);
        plan_free(&metric);
        plan_free(&us);
    }
}

/* ---- the place on the map does not matter ---- */

/* A drawing turned by `quarters` right angles and shifted by whole metres. */
struct drawn {
    const char *name;
    double corners[12][2];
    size_t corner_count;
    double column[2]; /* 0, 0: none */
};
static const struct drawn drawings[] = {
    {"rectangle", {{0, 0}, {17, 0}, {17, 11}, {0, 11}}, 4, {0, 0}},
    {"L", {{0, 0}, {36, 0}, {36, 12}, {24, 12}, {24, 24}, {0, 24}}, 6, {0, 0}},
    {"T", {{0, 0}, {20, 0}, {20, 6}, {13, 6}, {13, 15}, {7, 15}, {7, 6}, {0, 6}}, 8, {0, 0}},
    {"rectangle with a column", {{0, 0}, {16, 0}, {16, 12}, {0, 12}}, 4, {8, 4}},
};

static void turn(double at[2], int quarters, double dx, double dy)
{
    double x = at[0], y = at[1];

    for (int i = 0; i < quarters; i++) {
        double turned = -y;
        y = x;
        x = turned;
    }
    at[0] = x + dx;
    at[1] = y + dy;
}

static void plan_drawing(const struct drawn *drawn, int quarters, double dx, double dy,
                         struct plan *plan)
{
    struct text text = {0};

    text_add(&text, F "[rules]\nspacing = 4 m\n[outline]\n");
    for (size_t i = 0; i < drawn->corner_count; i++) {
        double at[2] = {drawn->corners[i][0], drawn->corners[i][1]};
        turn(at, quarters, dx, dy);
        text_format(&text, "point = %.9g, %.9g m\n", at[0], at[1]);
    }
    if (drawn->column[0] > 0) {
        double at[2] = {drawn->column[0], drawn->column[1]};
        turn(at, quarters, dx, dy);
        text_format(&text, "[object C1]\nkind = column\nat = %.9g, %.9g m\nsize = 0.4 x 0.4 m\n",
                    at[0], at[1]);
    }
    make_plan(text_string(&text), plan);
    text_free(&text);
}

static void expect_same_sums(const char *name, const struct plan *a, const struct plan *b)
{
    if (a->layout.panel_count != b->layout.panel_count)
        fail_msg("%s: %zu and %zu panels", name, a->layout.panel_count, b->layout.panel_count);
    assert_int_equal(a->layout.violations, b->layout.violations);
    assert_int_equal(a->layout.bound_panels, b->layout.bound_panels);
    assert_true(same_number(a->layout.area, b->layout.area, 1e-9));
    assert_true(same_number(a->quantities.contraction_m, b->quantities.contraction_m, 1e-9));
    assert_true(same_number(a->quantities.isolation_m, b->quantities.isolation_m, 1e-9));
    assert_true(same_number(a->quantities.sealant_order_m3, b->quantities.sealant_order_m3, 1e-9));
    assert_true(same_number(a->quantities.area_m2, b->quantities.area_m2, 1e-9));
    assert_true(same_number(a->movement.open_m, b->movement.open_m, 1e-9));
    assert_int_equal(plan_exit_status(a), plan_exit_status(b));
}

static void test_turning_and_shifting_keep_sums(void **state)
{
    (void)state;
    static const double shifts[][2] = {{0, 0}, {1000, -500}, {-37, 4123}};

    for (size_t d = 0; d < COUNT(drawings); d++) {
        struct plan first;
        plan_drawing(&drawings[d], 0, 0, 0, &first);
        for (int quarters = 0; quarters < 4; quarters++)
            for (size_t s = 0; s < COUNT(shifts); s++) {
                struct plan other;
                plan_drawing(&drawings[d], quarters, shifts[s][0], shifts[s][1], &other);
                expect_same_sums(drawings[d].name, &first, &other);
                plan_free(&other);
            }
        plan_free(&first);
    }
}

/* Panels cover the slab once: their areas add up to it, less openings and boxes. */
static double ring_area(const struct layout_point *ring, size_t count)
{
    double twice = 0;

    for (size_t i = 0; i < count; i++) {
        const struct layout_point *a = &ring[i], *b = &ring[(i + 1) % count];
        twice += a->x * b->y - b->x * a->y;
    }
    return fabs(twice) / 2;
}

static void test_panel_areas_add_up(void **state)
{
    (void)state;
    for (size_t i = 0; i < COUNT(examples); i++) {
        struct text text = {0};
        struct plan plan;
        double whole, sum = 0, boxes = 0;
        read_example(examples[i], &text);
        make_plan(text_string(&text), &plan);
        whole = ring_area(plan.layout.outline, plan.layout.outline_count);
        for (size_t o = 0; o < plan.layout.opening_count; o++)
            whole -= ring_area(plan.layout.openings[o].points, plan.layout.openings[o].count);
        for (size_t b = 0; b < plan.layout.box_count; b++) /* a square on its corner */
            boxes += 2 * plan.layout.boxes[b].half * plan.layout.boxes[b].half;
        for (size_t p = 0; p < plan.layout.panel_count; p++)
            sum += ring_area(plan.layout.panels[p].ring, plan.layout.panels[p].count);
        if (!same_number(sum, whole - boxes, 1e-6))
            fail_msg("%s: panels %.6f, slab %.6f, boxes %.6f", examples[i], sum, whole, boxes);
        plan_free(&plan);
        text_free(&text);
    }
}

/* ---- the same answer every time ---- */

static void test_twice_is_bit_identical(void **state)
{
    (void)state;
    for (size_t i = 0; i < COUNT(examples); i++) {
        struct text text = {0};
        struct plan one, two;
        read_example(examples[i], &text);
        make_plan(text_string(&text), &one);
        make_plan(text_string(&text), &two);
        expect_same(examples[i], &one, &two, 0);
        plan_free(&one);
        plan_free(&two);
        plan_free(&two);
        text_free(&text);
    }
}

/* parse(write(job)) == job: what is written reads as the same plan. */
static void test_written_and_read_again(void **state)
{
    (void)state;
    for (size_t i = 0; i < COUNT(examples); i++) {
        struct text text = {0}, again = {0};
        struct document *document;
        struct finding_list findings = {0};
        struct plan one, two;
        read_example(examples[i], &text);
        assert_int_equal(document_parse(text_string(&text), text.length, &document, &findings), 0);
        assert_int_equal(document_set(document, "job.reason", "a # b", &findings), 0);
        assert_int_equal(document_set(document, "job.reason", "", &findings), 0);
        document_write(document, &again);
        make_plan(text_string(&text), &one);
        make_plan(text_string(&again), &two);
        expect_same(examples[i], &one, &two, 0);
        plan_free(&one);
        plan_free(&two);
        document_free(document);
        finding_free(&findings);
        text_free(&again);
        text_free(&text);
    }
}

/* The order of sections is free: the single ones from last to first give the same plan. */
static void test_order_of_sections(void **state)
{
    (void)state;
    for (size_t i = 0; i < COUNT(examples); i++) {
        struct text text = {0}, turned = {0}, end = {0};
        struct plan one, two;
        const char *sections[64], *at;
        size_t count = 0;
        read_example(examples[i], &text);
        for (at = strstr(text_string(&text), "\n["); at != NULL; at = strstr(at + 1, "\n["))
            sections[count++] = at + 1;
        assert_true(count > 5 && count < COUNT(sections));
        text_add(&turned, F);
        for (size_t s = count; s-- > 0;) {
            const char *stop = s + 1 < count ? sections[s + 1] : text.bytes + text.length;
            bool many =
                strncmp(sections[s], "[object", 7) == 0 || strncmp(sections[s], "[joint", 6) == 0;
            if (many) /* their order is theirs: kept, at the end */
                continue;
            text_add_bytes(&turned, sections[s], (size_t)(stop - sections[s]));
        }
        for (size_t s = 0; s < count; s++) {
            const char *stop = s + 1 < count ? sections[s + 1] : text.bytes + text.length;
            if (strncmp(sections[s], "[object", 7) == 0 || strncmp(sections[s], "[joint", 6) == 0)
                text_add_bytes(&end, sections[s], (size_t)(stop - sections[s]));
        }
        text_add(&turned, text_string(&end));
        make_plan(text_string(&text), &one);
        make_plan(text_string(&turned), &two);
        for (size_t r = 0; r < result_count; r++)
            if (!same_cell(result_table[r].type, (const char *)&one + result_table[r].offset,
                           (const char *)&two + result_table[r].offset, 1e-12))
                fail_msg("%s: %s differs", examples[i], result_table[r].path);
        assert_int_equal(plan_exit_status(&one), plan_exit_status(&two));
        plan_free(&one);
        plan_free(&two);
        text_free(&text);
        text_free(&turned);
        text_free(&end);
    }
}

/* A default typed is a default: writing what is assumed changes no result. */
static void test_typing_a_default_changes_nothing(void **state)
{
    (void)state;
    static const char outline[] = "[outline]\npoint = 0, 0 m\npoint = 12, 0 m\npoint = 12, 8 m\n"
                                  "point = 0, 8 m\n";
    static const char typed[] =
        "[slab]\nuse = yard\nthickness = 150 mm\nreinforced = no\n[base]\nkind = granular\n"
        "interlayer = none\nslip = 0.5 mm\nsubgrade-modulus = 55 MPa/m\nfriction = 1.5\n"
        "[concrete]\nstrength = 32 MPa\nexpansion = 10e-6 /K\nshrinkage-model = en1992\ncement = "
        "N\ncuring = 7 d\n[climate]\nair-coldest = -10 degC\nair-hottest = 32 degC\nhumidity = 70 "
        "%\n[pour]\nplacing-temperature = 15 degC\n[sealing]\nmovement = friction\nworking = 1\n"
        "tolerance = 0 mm\n[sealant]\nkind = silicone\nclass = 25\nrecess = 4 mm\n[rules]\naxis = "
        "0 deg\naspect = 1.5\nleast-side = 0.6 m\nleast-angle = 60 deg\nround-to = 0 mm\n"
        "[takeoff]\nwaste = 10 %\nrod-cusps = yes\npackages = 600 ml\nbox = 1\n";
    struct text one_text = {0}, two_text = {0};
    struct plan one, two;

    text_format(&one_text, F "%s", outline);
    text_format(&two_text, F "%s%s", typed, outline);
    make_plan(text_string(&one_text), &one);
    make_plan(text_string(&two_text), &two);
    expect_same("defaults", &one, &two, 0);
    plan_free(&one);
    plan_free(&two);
    text_free(&one_text);
    text_free(&two_text);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(test_longer_panels_move_no_less),
        cmocka_unit_test(test_colder_never_opens_less),
        cmocka_unit_test(test_hotter_never_closes_less),
        cmocka_unit_test(test_drying_never_opens_less),
        cmocka_unit_test(test_never_more_than_free),
        cmocka_unit_test(test_wider_stretches_less),
        cmocka_unit_test(test_a_chosen_width_holds),
        cmocka_unit_test(test_sealing_table_falls),
        cmocka_unit_test(test_feet_and_metres),
        cmocka_unit_test(test_shown_units_change_no_movement),
        cmocka_unit_test(test_turning_and_shifting_keep_sums),
        cmocka_unit_test(test_panel_areas_add_up),
        cmocka_unit_test(test_twice_is_bit_identical),
        cmocka_unit_test(test_written_and_read_again),
        cmocka_unit_test(test_order_of_sections),
        cmocka_unit_test(test_typing_a_default_changes_nothing),
    };

    return cmocka_run_group_tests_name("properties", tests, NULL, NULL);
}
