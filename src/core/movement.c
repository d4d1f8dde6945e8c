#include "core/movement.h"

#include <math.h>

double movement_strain(double expansion, double difference_k, double shrinkage)
{
    return fmax(expansion * difference_k + shrinkage, 0);
}

/* dL = C L (a dT + eps): AASHTO Guide for Design of Pavement Structures (1993), joint opening; C
 * 0.80 granular, 0.65 stabilised (Darter and Barenberg). An average for ordinary pavements, no
 * bound: measured openings exceed it. */
double movement_joint(double factor, double length_m, double expansion, double difference_k,
                      double shrinkage)
{
    return factor * length_m * movement_strain(expansion, difference_k, shrinkage);
}
