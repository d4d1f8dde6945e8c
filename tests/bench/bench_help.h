/* Clock, medians, and GEOS as the reference of the bench. */
#ifndef SLABGAP_TESTS_BENCH_HELP_H
#define SLABGAP_TESTS_BENCH_HELP_H

#include "core/layout.h"
#include <geos_c.h>
#include <stdio.h>
#include <stdlib.h>
#include <time.h>

static double now_ms(void)
{
    struct timespec t;

    clock_gettime(CLOCK_MONOTONIC, &t);
    return 1000.0 * (double)t.tv_sec + (double)t.tv_nsec / 1e6;
}

static int less(const void *a, const void *b)
{
    double x = *(const double *)a, y = *(const double *)b;

    return (x > y) - (x < y);
}

static double median(double *values, size_t count)
{
    qsort(values, count, sizeof *values, less);
    return values[count / 2];
}

static void row(const char *what, double ms, const char *reference, double reference_ms)
{
    printf("%-38s %9.3f ms   %-22s %9.3f ms   ratio %.3f\n", what, ms, reference, reference_ms,
           reference_ms > 0 ? ms / reference_ms : 0.0);
}

static GEOSGeometry *line(GEOSContextHandle_t geos, double x1, double y1, double x2, double y2)
{
    GEOSCoordSequence *points = GEOSCoordSeq_create_r(geos, 2, 2);

    GEOSCoordSeq_setXY_r(geos, points, 0, x1, y1);
    GEOSCoordSeq_setXY_r(geos, points, 1, x2, y2);
    return GEOSGeom_createLineString_r(geos, points);
}

/* Union (nodes the lines) and polygonise. */
static double polygonise_ms(GEOSContextHandle_t geos, const struct layout *layout, int *panels)
{
    size_t count = 0, n = layout->outline_count;
    GEOSGeometry **lines = calloc(layout->joint_count + n, sizeof *lines);
    GEOSGeometry *all, *noded, *made;
    double begin, end;

    for (size_t i = 0; i < n; i++)
        lines[count++] = line(geos, layout->outline[i].x, layout->outline[i].y,
                              layout->outline[(i + 1) % n].x, layout->outline[(i + 1) % n].y);
    for (size_t i = 0; i < layout->joint_count; i++)
        if (layout->joints[i].edge < 0 && layout->joints[i].opening < 0)
            lines[count++] = line(geos, layout->joints[i].x1, layout->joints[i].y1,
                                  layout->joints[i].x2, layout->joints[i].y2);
    begin = now_ms();
    all = GEOSGeom_createCollection_r(geos, GEOS_MULTILINESTRING, lines, (unsigned)count);
    noded = GEOSUnaryUnion_r(geos, all);
    made = GEOSPolygonize_r(geos, (const GEOSGeometry *const *)&noded, 1);
    *panels = GEOSGetNumGeometries_r(geos, made);
    end = now_ms();
    GEOSGeom_destroy_r(geos, made);
    GEOSGeom_destroy_r(geos, noded);
    GEOSGeom_destroy_r(geos, all);
    free(lines);
    return end - begin;
}

#endif
