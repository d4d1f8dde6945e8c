/* libFuzzer target of weather files: whatever the bytes, either a record whose every hour is a
 * number or a finding; and the slab's surface stands every hour of it. clang
 * -fsanitize=fuzzer,address,undefined ... tests/fuzz/fuzz_weather.c */
#include "core/conduction.h"
#include "core/weather.h"
#include <math.h>
#include <stdint.h>
#include <stdlib.h>

int LLVMFuzzerTestOneInput(const uint8_t *data, size_t size);

static void stop_unless(int good)
{
    if (!good)
        abort();
}

static void check_record(const struct weather *weather)
{
    static struct climate_hour hours[CLIMATE_HOURS];
    struct climate_range usual = {.wind_m_s = 2, .cloud = 0.5, .humidity = 0.7, .sun_share = 1};
    struct conduction_slab slab;

    usual.latitude_deg = NAN;
    conduction_slab_default(0.2, &slab);
    stop_unless(weather->years >= 1 && weather->years <= WEATHER_YEARS_MOST);
    for (int y = 0; y < weather->years; y++) {
        weather_year(weather, y, &usual, hours);
        for (int h = 0; h < CLIMATE_HOURS; h++) {
            stop_unless(hours[h].air_c >= weather->coldest_c - 1e-6 &&
                        hours[h].air_c <= weather->hottest_c + 1e-6);
            stop_unless(hours[h].cloud >= 0 && hours[h].cloud <= 1 && hours[h].sun_w_m2 >= 0);
            stop_unless(hours[h].dew_c <= hours[h].air_c);
            stop_unless(isfinite(conduction_surface_flux(&slab, &hours[h], 10)));
        }
    }
}

/* Most inputs are refused soon; a whole year is made by repeating the last line under new dates
 * when the input begins with '!'. */
static char *make_year(const uint8_t *data, size_t size, size_t *count)
{
    static const int days[] = {31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31};
    size_t head = 0, used, tail;
    char *text;

    while (head < size && data[head] != '\n')
        head++;
    head += head < size;
    tail = size - head > 80 ? 80 : size - head;
    text = malloc(size + 366 * (tail + 16));
    stop_unless(text != NULL);
    for (used = 0; used < head; used++)
        text[used] = (char)data[used];
    for (int m = 0; m < 12; m++)
        for (int d = 1; d <= days[m]; d++) {
            const char date[] = {'2',
                                 '0',
                                 '1',
                                 '5',
                                 '-',
                                 (char)('0' + (m + 1) / 10),
                                 (char)('0' + (m + 1) % 10),
                                 '-',
                                 (char)('0' + d / 10),
                                 (char)('0' + d % 10)};
            for (size_t i = 0; i < sizeof date; i++)
                text[used++] = date[i];
            for (size_t i = 0; i < tail && data[head + i] != '\n'; i++)
                text[used++] = (char)data[head + i];
            text[used++] = '\n';
        }
    *count = used;
    return text;
}

static void read_one(const char *bytes, size_t count)
{
    struct finding_list findings = {0};
    struct weather *weather;
    enum status status = weather_parse(bytes, count, &weather, &findings);

    stop_unless((status == STATUS_OK) == (weather != NULL));
    stop_unless(finding_has_error(&findings) == (weather == NULL));
    if (weather != NULL)
        check_record(weather);
    weather_release(weather);
    finding_free(&findings);
}

int LLVMFuzzerTestOneInput(const uint8_t *data, size_t size)
{
    read_one((const char *)data, size);
    if (size > 1 && data[0] == '!') {
        size_t count;
        char *text = make_year(data + 1, size - 1, &count);
        read_one(text, count);
        free(text);
    }
    return 0;
}
