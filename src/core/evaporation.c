#include "core/evaporation.h"
#include <math.h>

double evaporation_uno(double concrete_c, double air_c, double humidity, double wind_km_h)
{
    const double wet = pow(fmax(0, concrete_c + 18), 2.5), dry = pow(fmax(0, air_c + 18), 2.5);

    return fmax(0, 5 * (wet - humidity * dry) * (wind_km_h + 4) * 1e-6);
}

double evaporation_uno_us(double concrete_f, double air_f, double humidity, double wind_mph)
{
    const double wet = pow(fmax(0, concrete_f), 2.5), dry = pow(fmax(0, air_f), 2.5);

    return fmax(0, (wet - humidity * dry) * (1 + 0.4 * wind_mph) * 1e-6);
}
