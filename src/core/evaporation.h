/* Water that leaves the face of fresh concrete. */
#ifndef SLABGAP_CORE_EVAPORATION_H
#define SLABGAP_CORE_EVAPORATION_H

/* Above it plastic shrinkage cracks are likely: 0.2 lb/(ft2 h), ACI 305; usually written so. */
#define EVAPORATION_LIMIT_KG_M2_H 1.0
/* kg/(m2 h), at least 0. Uno, ACI Materials Journal 95-M34 (1998), SI form: concrete and air degC,
 * humidity a ratio, wind km/h half a metre above the face. Good to about 40 % (Hover 2020). */
double evaporation_uno(double concrete_c, double air_c, double humidity, double wind_km_h);
/* lb/(ft2 h): the US form of ACI 305.1-14 (degF, mph), about 4 % above the SI form. */
double evaporation_uno_us(double concrete_f, double air_f, double humidity, double wind_mph);

#endif
