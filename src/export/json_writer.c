#include "export/json_writer.h"
#include "base/utf8.h"
#include <math.h>
#include <string.h>

static void add_quoted(struct text *out, const char *value)
{
    size_t left = strlen(value);

    text_add_char(out, '"', 1);
    while (left > 0) {
        uint32_t code;
        size_t length = utf8_decode(value, left, &code);
        if (length == 0) { /* never in a checked job; keeps the output valid all the same */
            text_add(out, "\\ufffd");
            length = 1;
        } else if (code == '"' || code == '\\') {
            text_format(out, "\\%c", (char)code);
        } else if (code == '\n') {
            text_add(out, "\\n");
        } else if (code < 0x20 || code == 0x7f) {
            text_format(out, "\\u%04x", (unsigned)code);
        } else {
            text_add_bytes(out, value, length);
        }
        value += length;
        left -= length;
    }
    text_add_char(out, '"', 1);
}

static bool on_one_line(const struct json *json)
{
    return json->compact > 0 && json->depth >= json->compact;
}

static void begin(struct json *json, const char *key)
{
    if (json->depth > 0) {
        if (!json->first)
            text_add_char(json->out, ',', 1);
        if (!on_one_line(json)) {
            text_add_char(json->out, '\n', 1);
            text_add_char(json->out, ' ', (size_t)json->depth);
        }
    }
    json->first = false;
    if (key != NULL) {
        add_quoted(json->out, key);
        text_add_char(json->out, ':', 1);
    }
}

void json_open(struct json *json, const char *key, char bracket)
{
    begin(json, key);
    text_add_char(json->out, bracket, 1);
    json->depth++;
    json->first = true;
}

void json_close(struct json *json, char bracket)
{
    bool empty = json->first, one_line = on_one_line(json);

    json->depth--;
    if (!empty && !one_line) {
        text_add_char(json->out, '\n', 1);
        text_add_char(json->out, ' ', (size_t)json->depth);
    }
    text_add_char(json->out, bracket, 1);
    json->first = false;
    if (json->depth == 0)
        text_add_char(json->out, '\n', 1);
}

void json_string(struct json *json, const char *key, const char *value)
{
    begin(json, key);
    if (value == NULL)
        text_add(json->out, "null");
    else
        add_quoted(json->out, value);
}

void json_number(struct json *json, const char *key, double value)
{
    begin(json, key);
    if (isfinite(value))
        text_format(json->out, "%.9g", value + 0.0); /* + 0.0: no "-0" */
    else
        text_add(json->out, "null");
}

void json_coordinate(struct json *json, const char *key, double metres)
{
    begin(json, key);
    if (!isfinite(metres))
        text_add(json->out, "null");
    else if (fabs(metres) < 0.5e-6)
        text_add(json->out, "0.000000");
    else
        text_format(json->out, "%.6f", metres);
}

void json_integer(struct json *json, const char *key, long long value)
{
    begin(json, key);
    text_format(json->out, "%lld", value);
}

void json_bool(struct json *json, const char *key, bool value)
{
    begin(json, key);
    text_add(json->out, value ? "true" : "false");
}

void json_null(struct json *json, const char *key)
{
    begin(json, key);
    text_add(json->out, "null");
}
