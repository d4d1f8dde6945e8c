#include "core/hydration.h"
#include <math.h>

void hydration_binder_default(struct hydration_binder *binder)
{
    *binder = (struct hydration_binder){.c3s = 0.55,
                                        .c2s = 0.18,
                                        .c3a = 0.08,
                                        .c4af = 0.10,
                                        .so3 = 0.03,
                                        .free_lime = 0.01,
                                        .magnesia = 0.02,
                                        .fineness_m2_kg = 380,
                                        .ash_lime = 0.08,
                                        .water = 0.45,
                                        .content_kg_m3 = 350};
}

struct hydration hydration_of(const struct hydration_binder *b)
{
    const double cement = 1 - b->slag - b->ash;
    struct hydration h;

    h.ultimate = fmin(1, 1.031 * b->water / (0.194 + b->water) + 0.50 * b->ash + 0.30 * b->slag);
    h.tau_h = 66.78 * pow(b->c3a, -0.154) * pow(b->c3s, -0.401) * pow(b->fineness_m2_kg, -0.804) *
              pow(b->so3, -0.758) * exp(2.187 * b->slag + 9.50 * b->ash * b->ash_lime);
    h.beta = 181.4 * pow(b->c3a, 0.146) * pow(b->c3s, 0.227) * pow(b->fineness_m2_kg, -0.535) *
             pow(b->so3, 0.558) * exp(-0.647 * b->slag);
    h.cement_heat_j_kg = 1000 * (500 * b->c3s + 260 * b->c2s + 866 * b->c3a + 420 * b->c4af +
                                 624 * b->so3 + 1186 * b->free_lime + 850 * b->magnesia);
    h.heat_j_m3 = b->content_kg_m3 * (h.cement_heat_j_kg * cement +
                                      1000 * (461 * b->slag + 1800 * b->ash_lime * b->ash));
    h.set = 0.26 * b->water;
    return h;
}

double hydration_degree(const struct hydration *h, double te_h)
{
    return te_h > 0 ? h->ultimate * exp(-pow(h->tau_h / te_h, h->beta)) : 0;
}

double hydration_age(const struct hydration *h, double degree)
{
    if (degree <= 0)
        return 0;
    return degree < h->ultimate ? h->tau_h * pow(-log(degree / h->ultimate), -1 / h->beta)
                                : INFINITY;
}

double hydration_strength(const struct hydration *h, double degree)
{
    const double month_h = 672;

    return fmax(0, (degree - h->set) / (hydration_degree(h, month_h) - h->set));
}

double maturity_rate(enum maturity maturity, double temperature_c)
{
    return maturity == MATURITY_EN1992 ? exp(13.65 - 4000 / (273 + temperature_c))
                                       : exp(-5000 * (1 / (temperature_c + 273.15) - 1 / 293.15));
}

double maturity_factor(const double *temperature_c, const double *hours, size_t count,
                       double datum_c)
{
    double sum = 0;

    for (size_t i = 0; i < count; i++)
        sum += fmax(0, temperature_c[i] - datum_c) * hours[i];
    return sum;
}
