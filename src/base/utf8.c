#include "base/utf8.h"
#include <string.h>

size_t utf8_decode(const char *bytes, size_t count, uint32_t *code)
{
    const unsigned char *b = (const unsigned char *)bytes;
    static const uint32_t least[] = {0, 0, 0x80, 0x800, 0x10000};
    size_t length;
    uint32_t value;

    if (count == 0)
        return 0;
    if (b[0] < 0x80) {
        *code = b[0];
        return 1;
    }
    if (b[0] < 0xC2 || b[0] > 0xF4)
        return 0;
    length = b[0] < 0xE0 ? 2 : b[0] < 0xF0 ? 3 : 4;
    if (length > count)
        return 0;
    value = b[0] & (0xFFU >> (length + 1));
    for (size_t i = 1; i < length; i++) {
        if ((b[i] & 0xC0) != 0x80)
            return 0;
        value = value << 6 | (b[i] & 0x3FU);
    }
    if (value < least[length] || value > 0x10FFFF || (value >= 0xD800 && value <= 0xDFFF))
        return 0;
    *code = value;
    return length;
}

size_t utf8_encode(uint32_t code, char *out)
{
    if (code < 0x80) {
        out[0] = (char)code;
        return 1;
    }
    if (code < 0x800) {
        out[0] = (char)(0xC0 | code >> 6);
        out[1] = (char)(0x80 | (code & 0x3F));
        return 2;
    }
    if (code < 0x10000) {
        if (code >= 0xD800 && code <= 0xDFFF)
            return 0;
        out[0] = (char)(0xE0 | code >> 12);
        out[1] = (char)(0x80 | (code >> 6 & 0x3F));
        out[2] = (char)(0x80 | (code & 0x3F));
        return 3;
    }
    if (code > 0x10FFFF)
        return 0;
    out[0] = (char)(0xF0 | code >> 18);
    out[1] = (char)(0x80 | (code >> 12 & 0x3F));
    out[2] = (char)(0x80 | (code >> 6 & 0x3F));
    out[3] = (char)(0x80 | (code & 0x3F));
    return 4;
}

size_t utf8_invalid_at(const char *bytes, size_t count)
{
    size_t at = 0;

    while (at < count) {
        uint32_t code;
        size_t length = utf8_decode(bytes + at, count - at, &code);
        if (length == 0)
            return at;
        at += length;
    }
    return count;
}

struct range {
    uint32_t first, last;
};

static bool in_ranges(uint32_t code, const struct range *ranges, size_t count)
{
    for (size_t i = 0; i < count; i++)
        if (code >= ranges[i].first && code <= ranges[i].last)
            return true;
    return false;
}

/* Blocks of combining marks and of wide East Asian characters (Unicode 15, EastAsianWidth W and F).
 */
static const struct range combining[] = {
    {0x0300, 0x036F}, {0x0483, 0x0489}, {0x0591, 0x05BD}, {0x064B, 0x065F},
    {0x0E31, 0x0E31}, {0x0E34, 0x0E3A}, {0x0E47, 0x0E4E}, {0x1AB0, 0x1AFF},
    {0x1DC0, 0x1DFF}, {0x200B, 0x200F}, {0x2028, 0x202E}, {0x2060, 0x2064},
    {0x20D0, 0x20FF}, {0xFE00, 0xFE0F}, {0xFE20, 0xFE2F}, {0xFEFF, 0xFEFF},
};
static const struct range wide[] = {
    {0x1100, 0x115F}, {0x2E80, 0x303E},   {0x3041, 0x33FF},   {0x3400, 0x4DBF},   {0x4E00, 0x9FFF},
    {0xA000, 0xA4CF}, {0xAC00, 0xD7A3},   {0xF900, 0xFAFF},   {0xFE30, 0xFE4F},   {0xFF00, 0xFF60},
    {0xFFE0, 0xFFE6}, {0x1F300, 0x1F64F}, {0x1F900, 0x1F9FF}, {0x20000, 0x3FFFD},
};

int utf8_width(uint32_t code)
{
    if (code < 0x20 || (code >= 0x7F && code < 0xA0))
        return 0;
    if (in_ranges(code, combining, sizeof combining / sizeof *combining))
        return 0;
    return in_ranges(code, wide, sizeof wide / sizeof *wide) ? 2 : 1;
}

int utf8_columns(const char *string)
{
    size_t left = strlen(string);
    int columns = 0;

    while (left > 0) {
        uint32_t code = '?';
        size_t length = utf8_decode(string, left, &code);
        if (length == 0)
            length = 1;
        columns += utf8_width(code);
        string += length;
        left -= length;
    }
    return columns;
}
