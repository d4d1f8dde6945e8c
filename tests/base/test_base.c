/* Text, arrays, findings, statuses, UTF-8. Oracle for UTF-8: RFC 3629 section 4 (its ABNF decides
 * which byte sequences are valid) and the C library's iconv. */
#include "base/array.h"
#include "base/finding.h"
#include "base/status.h"
#include "base/text.h"
#include "base/utf8.h"
#include <iconv.h>
#include <setjmp.h>
#include <stdarg.h>
#include <stdint.h>
#include <stdlib.h>
#include <string.h>
#include <cmocka.h>

static void test_text_grows(void **state)
{
    struct text text = {0};

    (void)state;
    assert_string_equal(text_string(&text), "");
    for (int i = 0; i < 1000; i++)
        text_format(&text, "%d,", i);
    assert_int_equal(text.length, 10 * 2 + 90 * 3 + 900 * 4);
    assert_memory_equal(text.bytes, "0,1,2,", 6);
    text_clear(&text);
    assert_string_equal(text_string(&text), "");
    text_add_char(&text, '-', 3);
    text_add(&text, "x");
    assert_string_equal(text_string(&text), "---x");
    text_free(&text);
    text_free(&text);
    assert_null(text.bytes);
}

static void test_text_failure_is_sticky(void **state)
{
    struct text text = {0};

    (void)state;
    text_add_char(&text, 'x', SIZE_MAX - 10); /* cannot be had */
    assert_true(text.failed);
    text_add(&text, "more");
    assert_string_equal(text_string(&text), "");
    text_free(&text);
}

static void test_array_refuses_overflow(void **state)
{
    void *items = NULL;
    size_t capacity = 0;

    (void)state;
    assert_true(array_reserve(&items, &capacity, 3, 8));
    assert_true(capacity >= 3);
    assert_false(array_reserve(&items, &capacity, SIZE_MAX / 4, 64));
    assert_non_null(items);
    free(items);
}

static void test_findings(void **state)
{
    struct finding_list one = {0}, two = {0};

    (void)state;
    finding_add(&one, SEVERITY_NOTE, "a.b", NULL, NULL, 3, 4, "%s %d", "sentence", 7);
    assert_string_equal(one.items[0].message, "sentence 7");
    assert_string_equal(one.items[0].value, "");
    assert_false(finding_has_error(&one));
    finding_add(&two, SEVERITY_ERROR, "", "v", "l", 0, 0, "no");
    finding_append(&one, &two);
    assert_int_equal(one.count, 2);
    assert_true(finding_has_error(&one));
    assert_string_equal(severity_word(SEVERITY_WARNING), "warning");
    finding_free(&one);
    finding_free(&one);
    finding_free(&two);
}

static void test_status_sentences_differ(void **state)
{
    (void)state;
    for (int i = STATUS_OK; i <= STATUS_STOPPED; i++)
        for (int j = i + 1; j <= STATUS_STOPPED; j++)
            assert_string_not_equal(status_sentence((enum status)i),
                                    status_sentence((enum status)j));
}

/* Whether iconv finds the bytes to be UTF-8. */
static bool iconv_takes(const char *bytes, size_t count)
{
    char in[8], out[64], *from = in, *to = out;
    size_t left = count, room = sizeof out;
    iconv_t converter = iconv_open("UCS-4LE", "UTF-8");
    bool good;

    memcpy(in, bytes, count);
    good = iconv(converter, &from, &left, &to, &room) != (size_t)-1 && left == 0;
    iconv_close(converter);
    return good;
}

static void test_utf8_against_iconv(void **state)
{
    uint64_t seed = 99;

    (void)state;
    for (int i = 0; i < 30000; i++) {
        char bytes[4];
        size_t count = 1 + (size_t)i % 4;
        bool ours;

        seed = seed * 6364136223846793005U + 1442695040888963407U;
        for (size_t j = 0; j < 4; j++)
            bytes[j] = (char)(seed >> (20 + 8 * j));
        if (i % 3 > 0) { /* likelier to be valid */
            bytes[0] = (char)(0xC0 | (bytes[0] & 0x3F));
            for (size_t j = 1; j < 4; j++)
                bytes[j] = (char)(0x80 | (bytes[j] & 0x3F));
        }
        if (memchr(bytes, 0, count) != NULL)
            continue;
        ours = utf8_invalid_at(bytes, count) == count;
        /* iconv takes code points above U+10FFFF in some versions; RFC 3629 does not */
        if (ours != iconv_takes(bytes, count) && !((unsigned char)bytes[0] >= 0xF4))
            fail_msg("%02X %02X %02X %02X (%zu bytes): %d", (unsigned char)bytes[0],
                     (unsigned char)bytes[1], (unsigned char)bytes[2], (unsigned char)bytes[3],
                     count, ours);
    }
}

static void test_utf8_edges(void **state)
{
    uint32_t code = 0;
    char out[4];

    (void)state;
    assert_int_equal(utf8_decode("\xF4\x8F\xBF\xBF", 4, &code), 4); /* U+10FFFF */
    assert_int_equal(code, 0x10FFFF);
    assert_int_equal(utf8_decode("\xF4\x90\x80\x80", 4, &code), 0); /* above */
    assert_int_equal(utf8_decode("\xC0\x80", 2, &code), 0);         /* overlong NUL */
    assert_int_equal(utf8_decode("\xED\xA0\x80", 3, &code), 0);     /* surrogate */
    assert_int_equal(utf8_decode("\xE2\x82", 2, &code), 0);         /* cut off */
    for (uint32_t c = 1; c < 0x110000; c += 17) {
        size_t length = utf8_encode(c, out);
        if (c >= 0xD800 && c <= 0xDFFF) {
            assert_int_equal(length, 0);
            continue;
        }
        assert_int_equal(utf8_decode(out, length, &code), length);
        assert_int_equal(code, c);
    }
    assert_int_equal(utf8_columns("a\xC3\xA9\xE6\xBC\xA2"), 4); /* 1 + 1 + 2: wide CJK */
    assert_int_equal(utf8_columns("e\xCC\x81"), 1);             /* combining acute */
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(test_text_grows),
        cmocka_unit_test(test_text_failure_is_sticky),
        cmocka_unit_test(test_array_refuses_overflow),
        cmocka_unit_test(test_findings),
        cmocka_unit_test(test_status_sentences_differ),
        cmocka_unit_test(test_utf8_against_iconv),
        cmocka_unit_test(test_utf8_edges),
    };

    return cmocka_run_group_tests(tests, NULL, NULL);
}
