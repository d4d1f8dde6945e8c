/* Movement of a joint by the factor formula: C L (a dT + eps). SI. */
#ifndef SLABGAP_CORE_MOVEMENT_H
#define SLABGAP_CORE_MOVEMENT_H

/* Free strain of a temperature fall (or rise) and the shrinkage to come with it, >= 0. */
double movement_strain(double expansion, double difference_k, double shrinkage);
/* C L (a dT + eps): factor C (1 = free), length of slab that works on the joint. */
double movement_joint(double factor, double length_m, double expansion, double difference_k,
                      double shrinkage);
/* Usual factors: 0.80 on granular bases, 0.65 on stabilised ones (the latter from memory). */
#define MOVEMENT_FACTOR_GRANULAR 0.80
#define MOVEMENT_FACTOR_STABILISED 0.65

#endif
