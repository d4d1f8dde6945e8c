/* The tables and the field table. Sources beside the checks. */
#include "job_help.h"
#include "job/table.h"
#include <math.h>

static bool is(double a, double b)
{
    return fabs(a - b) <= 1e-9 * fabs(b);
}

/* FHWA-HRT-12-030 (2012), Table 47, "recommended", 1e-6 per degF; the per-degC figures to two
 * decimals as they follow from x 1.8 */
static void test_aggregates(void **state)
{
    static const struct {
        const char *name;
        double per_f, per_c;
    } rows[] = {{"basalt", 4.86, 8.75},    {"chert", 6.90, 12.42},     {"diabase", 5.13, 9.23},
                {"dolomite", 5.79, 10.42}, {"gabbro", 5.28, 9.50},     {"granite", 5.71, 10.28},
                {"limestone", 5.25, 9.45}, {"quartzite", 6.18, 11.12}, {"andesite", 5.33, 9.59},
                {"sandstone", 6.33, 11.39}};

    (void)state;
    for (size_t i = 0; i < COUNT(rows); i++) {
        const struct aggregate_row *found = NULL;
        for (size_t j = 0; j < aggregate_count; j++)
            if (strcmp(aggregate_table[j].name, rows[i].name) == 0)
                found = &aggregate_table[j];
        assert_non_null(found);
        assert_true(is(found->expansion, rows[i].per_f * 1.8e-6));
        assert_true(fabs(found->expansion * 1e6 - rows[i].per_c) < 0.00501);
    }
}

/* The rows stand in the order of the words, so that an enum is an index. */
static void test_order_is_that_of_the_words(void **state)
{
    char word[CHOICE_MOST];

    (void)state;
#define SAME_ORDER(table, count, section, key)                                                     \
    for (size_t i = 0; i <= count; i++) {                                                          \
        field_choice_word(field_find(section, key), (int)i, word, sizeof word);                    \
        assert_string_equal(word, i < count ? table[i].name : "");                                 \
    }
    SAME_ORDER(base_table, base_count, "base", "kind")
    SAME_ORDER(interlayer_table, interlayer_count, "base", "interlayer")
    SAME_ORDER(sealant_table, sealant_count, "sealant", "kind")
    SAME_ORDER(practice_table, practice_count, "job", "practice")
}

static void test_sizes_rise_and_have_sources(void **state)
{
    static const struct {
        const struct size_row *rows;
        const size_t *count;
    } tables[] = {
        {blade_table, &blade_count}, {rod_table, &rod_count}, {filler_table, &filler_count}};

    (void)state;
    for (size_t t = 0; t < COUNT(tables); t++)
        for (size_t i = 0; i < *tables[t].count; i++) {
            const struct size_row *row = &tables[t].rows[i];
            struct unit_reading r =
                unit_read(row->name, strlen(row->name), QUANTITY_SMALL_LENGTH, NULL);
            assert_null(r.problem); /* the name says the size */
            assert_true(is(r.si, row->size));
            assert_true(row->source[0] != '\0');
            if (i > 0 && strcmp(row->system, tables[t].rows[i - 1].system) == 0)
                assert_true(row->size > tables[t].rows[i - 1].size);
        }
}

static const struct dowel_row *dowel_for(const char *practice, double thickness)
{
    for (size_t i = 0; i < dowel_count; i++)
        if (strcmp(dowel_table[i].practice, practice) == 0 &&
            thickness >= dowel_table[i].thickness_least - 1e-9 &&
            !(thickness >= dowel_table[i].thickness_most - 1e-9))
            return &dowel_table[i];
    return NULL;
}

/* UFC 3-260-02 (2001) Table 12-8: below 8 in 3/4 x 16 at 12; 8 to 11.5 in 1 x 16 at 12; 12 to
 * 15.5 in 1 to 1 1/4 x 20 at 15. IRC:58 by a summary sheet: 200 mm 25 x 360, 230 mm 30 x 400,
 * 250 mm 32 x 450, 300 mm 38 x 500, all at 300 mm. */
static void test_dowels(void **state)
{
    static const struct {
        const char *practice;
        double thickness, diameter, length, spacing;
    } rows[] = {
        {"us", 7.5 * .0254, .75 * .0254, 16 * .0254, 12 * .0254},
        {"us", 8 * .0254, 1 * .0254, 16 * .0254, 12 * .0254},
        {"us", 11.5 * .0254, 1 * .0254, 16 * .0254, 12 * .0254},
        {"us", 15.5 * .0254, 1.25 * .0254, 20 * .0254, 15 * .0254},
        {"us", 30 * .0254, 3 * .0254, 30 * .0254, 18 * .0254},
        {"india", .2, .025, .36, .3},
        {"india", .23, .03, .4, .3},
        {"india", .25, .032, .45, .3},
        {"india", .3, .038, .5, .3},
    };

    (void)state;
    for (size_t i = 0; i < COUNT(rows); i++) {
        const struct dowel_row *row = dowel_for(rows[i].practice, rows[i].thickness);
        assert_non_null(row);
        assert_true(is(row->diameter, rows[i].diameter) && is(row->length, rows[i].length) &&
                    is(row->spacing, rows[i].spacing));
    }
    assert_null(dowel_for("india", 0.15)); /* none at 150 mm */
    assert_null(dowel_for("us", 0.15));
}

/* ---- the field table ---- */

static void test_field_table_is_whole(void **state)
{
    (void)state;
    for (int id = 0; id < FIELD_COUNT; id++) {
        const struct field *field = &field_table[id];

        assert_int_equal(field_id_of(field->section, field->key), id); /* no key twice */
        assert_true(field->label[0] != '\0' && field->help[0] != '\0');
        assert_true(field->offset < sizeof(struct job));
        assert_false(field->repeat);
        if (field->type == FIELD_NUMBER) {
            assert_true(field->least < field->most);
            assert_true(isnan(field->initial)
                            ? field->words[0] != '\0'
                            : field->initial >= field->least && field->initial <= field->most);
        }
        if (field->type == FIELD_CHOICE) {
            char word[CHOICE_MOST];
            field_choice_word(field, (int)field->initial, word, sizeof word);
            assert_true(word[0] != '\0');
            assert_int_equal(field_choice_index(field, word, strlen(word)), (int)field->initial);
            assert_int_equal(field_choice_index(field, "no such", 7), -1);
        }
    }
    for (size_t i = 0; i < repeated_field_count; i++) {
        assert_ptr_equal(field_find(repeated_field_table[i].section, repeated_field_table[i].key),
                         &repeated_field_table[i]);
        assert_true(repeated_field_table[i].repeat);
    }
    assert_null(field_find("slab", "nothing"));
}

static void test_field_show(void **state)
{
    struct loaded l;
    struct text out = {0};

    (void)state;
    load(&l, "format = 1\n[slab]\nthickness = 6 in\ndowels = 32 x 450 mm at 300 mm\n[concrete]\n"
             "strength = C32/40\n[takeoff]\npackages = 600 ml, 19 l\n");
    field_show(&out, &l.job, FIELD_slab_thickness, UNITS_US);
    text_add(&out, "|");
    field_show(&out, &l.job, FIELD_slab_dowels, UNITS_METRIC);
    text_add(&out, "|");
    field_show(&out, &l.job, FIELD_concrete_strength, UNITS_METRIC);
    text_add(&out, "|");
    field_show(&out, &l.job, FIELD_takeoff_packages, UNITS_METRIC);
    text_add(&out, "|");
    field_show(&out, &l.job, FIELD_rules_expansion_every, UNITS_METRIC);
    assert_string_equal(text_string(&out),
                        "6 in|32 mm x 450 mm at 300 mm|C32/40|600 ml, 19 l|none");
    text_free(&out);
    unload(&l);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(test_aggregates),
        cmocka_unit_test(test_order_is_that_of_the_words),
        cmocka_unit_test(test_sizes_rise_and_have_sources),
        cmocka_unit_test(test_dowels),
        cmocka_unit_test(test_field_table_is_whole),
        cmocka_unit_test(test_field_show),
    };

    return cmocka_run_group_tests(tests, NULL, NULL);
}
