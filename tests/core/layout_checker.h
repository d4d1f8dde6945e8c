/* A checker of finished layouts, written apart from the solver: it reads only the rings, the joints
 * and the limits. GEOS is the oracle for areas, covering, overlap, smallest rectangle and width. */
#ifndef TESTS_CORE_LAYOUT_CHECKER_H
#define TESTS_CORE_LAYOUT_CHECKER_H

#include "core/layout.h"
#include <geos_c.h>
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

struct checker {
    GEOSContextHandle_t geos;
    const struct layout_input *in;
    const struct layout *out;
    int faults;
    char first[160]; /* the first one in words */
};

static void fault(struct checker *c, const char *rule, size_t panel, double value)
{
    if (!c->faults++)
        snprintf(c->first, sizeof c->first, "%s at %zu: %.6g", rule, panel, value);
}

static GEOSGeometry *polygon_of(struct checker *c, const struct layout_point *p, size_t n)
{
    GEOSCoordSequence *seq = GEOSCoordSeq_create_r(c->geos, (unsigned)n + 1, 2);
    for (size_t i = 0; i <= n; i++)
        GEOSCoordSeq_setXY_r(c->geos, seq, (unsigned)i, p[i % n].x, p[i % n].y);
    return GEOSGeom_createPolygon_r(c->geos, GEOSGeom_createLinearRing_r(c->geos, seq), NULL, 0);
}

static double area_of(struct checker *c, const GEOSGeometry *g)
{
    double area = 0;
    GEOSArea_r(c->geos, g, &area);
    return area;
}

/* The union of the panels, a box of isolation joints counted as no panel, against the slab. */
static void check_tiling(struct checker *c)
{
    const struct layout *out = c->out;
    GEOSGeometry *slab = polygon_of(c, out->outline, out->outline_count);
    for (size_t i = 0; i < out->opening_count; i++) {
        GEOSGeometry *hole = polygon_of(c, out->openings[i].points, out->openings[i].count);
        GEOSGeometry *less = GEOSDifference_r(c->geos, slab, hole);
        GEOSGeom_destroy_r(c->geos, hole);
        GEOSGeom_destroy_r(c->geos, slab);
        slab = less;
    }
    GEOSGeometry **all = calloc(out->panel_count + 1, sizeof *all);
    double sum = 0;
    for (size_t i = 0; i < out->panel_count; i++) {
        all[i] = polygon_of(c, out->panels[i].ring, out->panels[i].count);
        if (GEOSisValid_r(c->geos, all[i]) != 1)
            fault(c, "panel no polygon", i, 0);
        sum += area_of(c, all[i]);
        if (fabs(area_of(c, all[i]) - out->panels[i].area) > 1e-6)
            fault(c, "panel area", i, out->panels[i].area);
    }
    GEOSGeometry *list = GEOSGeom_createCollection_r(c->geos, GEOS_GEOMETRYCOLLECTION, all,
                                                     (unsigned)out->panel_count);
    GEOSGeometry *whole = GEOSUnaryUnion_r(c->geos, list);
    GEOSGeometry *extra = GEOSDifference_r(c->geos, whole, slab);
    GEOSGeometry *rest = GEOSDifference_r(c->geos, slab, whole);
    const double area = area_of(c, slab), limit = 1e-6 * area;
    if (sum - area_of(c, whole) > limit)
        fault(c, "panels overlap", 0, sum - area_of(c, whole));
    if (area_of(c, extra) > limit)
        fault(c, "panels outside", 0, area_of(c, extra));
    if (!c->in->object_count && area_of(c, rest) > limit)
        fault(c, "slab not covered", 0, area_of(c, rest));
    /* what is not covered must lie near objects: within their size and 1.5 m */
    double most = 0;
    for (size_t i = 0; i < c->in->object_count; i++)
        most += (c->in->objects[i].w + 3) * (c->in->objects[i].d + 3);
    if (area_of(c, rest) > most + limit)
        fault(c, "boxes too large", 0, area_of(c, rest));
    GEOSGeom_destroy_r(c->geos, rest);
    GEOSGeom_destroy_r(c->geos, extra);
    GEOSGeom_destroy_r(c->geos, whole);
    GEOSGeom_destroy_r(c->geos, list);
    GEOSGeom_destroy_r(c->geos, slab);
    free(all);
}

/* Sides of GEOS's smallest rotated rectangle: its area; the ratio from its first two sides. */
static void check_size(struct checker *c, size_t i)
{
    const struct layout_panel *p = &c->out->panels[i];
    GEOSGeometry *g = polygon_of(c, p->ring, p->count);
    GEOSGeometry *box = GEOSMinimumRotatedRectangle_r(c->geos, g);
    GEOSGeometry *line = GEOSMinimumWidth_r(c->geos, g);
    double width = 0, side[2] = {0, 0}, x[3], y[3];
    GEOSLength_r(c->geos, line, &width);
    const GEOSGeometry *ring = GEOSGetExteriorRing_r(c->geos, box);
    const GEOSCoordSequence *seq = GEOSGeom_getCoordSeq_r(c->geos, ring);
    for (unsigned k = 0; k < 3; k++)
        GEOSCoordSeq_getXY_r(c->geos, seq, k, &x[k], &y[k]);
    side[0] = hypot(x[1] - x[0], y[1] - y[0]);
    side[1] = hypot(x[2] - x[1], y[2] - y[1]);
    const double length = fmax(side[0], side[1]), across = fmin(side[0], side[1]);
    const double limit = fmax(c->in->max_side_x, c->in->max_side_y);
    /* the smaller of two rectangles of equal area may be either: compare areas, then the rules */
    if (p->length * p->width > length * across * (1 + 1e-6) + 1e-9)
        fault(c, "rectangle not the smallest", i, p->length * p->width - length * across);
    if (p->length > limit * 1.002)
        fault(c, "side too long", i, p->length);
    if (p->length / p->width > c->in->max_aspect * 1.002)
        fault(c, "too long for its width", i, p->length / p->width);
    if (width < c->in->min_side * 0.998)
        fault(c, "too narrow", i, width);
    GEOSGeom_destroy_r(c->geos, line);
    GEOSGeom_destroy_r(c->geos, box);
    GEOSGeom_destroy_r(c->geos, g);
}

static bool is_slab_corner(const struct layout *out, struct layout_point p)
{
    for (size_t i = 0; i < out->outline_count; i++)
        if (hypot(out->outline[i].x - p.x, out->outline[i].y - p.y) < 1e-3)
            return true;
    for (size_t k = 0; k < out->opening_count; k++)
        for (size_t i = 0; i < out->openings[k].count; i++)
            if (hypot(out->openings[k].points[i].x - p.x, out->openings[k].points[i].y - p.y) <
                1e-3)
                return true;
    return false;
}

/* No inside corner but an arc's of 15 degrees; no corner sharper than the limit but the slab's. */
static void check_shape(struct checker *c, size_t i)
{
    const struct layout_panel *p = &c->out->panels[i];
    for (size_t k = 0; k < p->count; k++) {
        const struct layout_point a = p->ring[(k + p->count - 1) % p->count], b = p->ring[k];
        const struct layout_point d = p->ring[(k + 1) % p->count];
        const double in = atan2(b.y - a.y, b.x - a.x), way = atan2(d.y - b.y, d.x - b.x);
        double turn = (way - in) * 180 / 3.14159265358979323846;
        turn -= 360 * floor((turn + 180) / 360);
        const bool own = is_slab_corner(c->out, b);
        if (turn < -0.5 && !(own && turn > -15.1))
            fault(c, "inside corner", i, turn);
        if (180 - turn < c->in->min_angle_deg - 0.5 && !own)
            fault(c, "sharp corner", i, 180 - turn);
    }
}

static double off_segment(double x1, double y1, double x2, double y2, double x, double y)
{
    const double l = hypot(x2 - x1, y2 - y1);
    double t = l > 0 ? ((x - x1) * (x2 - x1) + (y - y1) * (y2 - y1)) / l / l : 0;
    t = t < 0 ? 0 : t > 1 ? 1 : t;
    return hypot(x - x1 - t * (x2 - x1), y - y1 - t * (y2 - y1));
}

static bool on_rings(const struct layout *out, double x, double y)
{
    for (size_t i = 0; i < out->outline_count; i++) {
        const struct layout_point a = out->outline[i],
                                  b = out->outline[(i + 1) % out->outline_count];
        if (off_segment(a.x, a.y, b.x, b.y, x, y) < 2e-3)
            return true;
    }
    for (size_t k = 0; k < out->opening_count; k++)
        for (size_t i = 0; i < out->openings[k].count; i++) {
            const struct layout_point a = out->openings[k].points[i],
                                      b = out->openings[k].points[(i + 1) % out->openings[k].count];
            if (off_segment(a.x, a.y, b.x, b.y, x, y) < 2e-3)
                return true;
        }
    return false;
}

/* A joint stops at an edge, an isolation or a construction joint, or is taken on with a bend of 30
 * degrees at most. */
static void check_joint_ends(struct checker *c)
{
    const struct layout *out = c->out;
    for (size_t i = 0; i < 2 * out->joint_count; i++) {
        const struct layout_joint *j = &out->joints[i / 2];
        const double x = i % 2 ? j->x2 : j->x1, y = i % 2 ? j->y2 : j->y1;
        const double ux = (x - (i % 2 ? j->x1 : j->x2)), uy = (y - (i % 2 ? j->y1 : j->y2));
        bool good = j->kind == LAYOUT_ISOLATION || on_rings(out, x, y);
        for (size_t k = 0; k < out->joint_count && !good; k++) {
            const struct layout_joint *o = &out->joints[k];
            if (k == i / 2 || off_segment(o->x1, o->y1, o->x2, o->y2, x, y) > 2e-3)
                continue;
            const double vx = o->x2 - o->x1, vy = o->y2 - o->y1;
            const double bend = fabs(atan2(ux * vy - uy * vx, ux * vx + uy * vy));
            good = o->kind != LAYOUT_CONTRACTION || bend < 0.533 || bend > 2.61;
            /* a dog-leg: a short piece turned by 60 degrees at most that ends on the edge, along
             * the radius of a kerb return (pavement guides, "joint layout") */
            if (hypot(vx, vy) < fmax(1.5, 0.35 * c->in->max_side_x) &&
                (bend < 1.056 || bend > 2.085))
                good |= on_rings(out, o->x1, o->y1) || on_rings(out, o->x2, o->y2);
        }
        if (!good)
            fault(c, "joint ends in a panel's side", i / 2, x);
    }
}

static bool in_ring(const struct layout_point *r, size_t n, double x, double y)
{
    int winding = 0;
    for (size_t i = 0; i < n; i++) {
        const struct layout_point a = r[i], b = r[(i + 1) % n];
        const double side = (b.x - a.x) * (y - a.y) - (x - a.x) * (b.y - a.y);
        if (a.y <= y && b.y > y && side > 0)
            winding++;
        if (a.y > y && b.y <= y && side < 0)
            winding--;
    }
    return winding != 0;
}

/* No panel holds a point of an object that must stand free. */
static void check_objects_free(struct checker *c)
{
    for (size_t i = 0; i < c->in->object_count; i++) {
        const struct layout_object *o = &c->in->objects[i];
        for (size_t k = 0; k < c->out->panel_count; k++)
            for (int m = 0; m < 9; m++) {
                const double dx = (m % 3 - 1) * o->w * 0.35, dy = (m / 3 - 1) * o->d * 0.35;
                const double a = o->angle_deg * 3.14159265358979323846 / 180;
                const double x = o->x + dx * cos(a) - dy * sin(a),
                             y = o->y + dx * sin(a) + dy * cos(a);
                if (in_ring(c->out->panels[k].ring, c->out->panels[k].count, x, y))
                    fault(c, "object in a panel", k, (double)i);
            }
    }
}

/* Old joints met, walls isolated over their length. */
static void check_sides(struct checker *c)
{
    const struct layout *out = c->out;
    for (size_t i = 0; i < out->edge_count; i++) {
        const struct layout_edge_out *e = &out->edges[i];
        const struct layout_point a = out->outline[e->index],
                                  b = out->outline[(e->index + 1) % out->outline_count];
        const double length = hypot(b.x - a.x, b.y - a.y);
        double covered = 0;
        for (size_t k = 0; k < out->joint_count; k++) {
            const struct layout_joint *j = &out->joints[k];
            if (j->kind == LAYOUT_ISOLATION &&
                off_segment(a.x, a.y, b.x, b.y, j->x1, j->y1) < 1e-3 &&
                off_segment(a.x, a.y, b.x, b.y, j->x2, j->y2) < 1e-3)
                covered += hypot(j->x2 - j->x1, j->y2 - j->y1);
        }
        for (size_t k = 0; k < out->box_count; k++) /* a box on the side takes part of it */
            if (off_segment(a.x, a.y, b.x, b.y, out->boxes[k].x, out->boxes[k].y) < 1e-3)
                covered += 4;
        if (e->isolate && covered < length - 0.01)
            fault(c, "side not isolated", e->edge, covered);
        for (size_t n = 0; n < e->joint_count && !e->isolate; n++) {
            const double x = a.x + (b.x - a.x) * e->joints[n] / length;
            const double y = a.y + (b.y - a.y) * e->joints[n] / length;
            bool met = false;
            for (size_t k = 0; k < out->joint_count; k++)
                met |= out->joints[k].kind != LAYOUT_ISOLATION &&
                       (hypot(out->joints[k].x1 - x, out->joints[k].y1 - y) < 2e-3 ||
                        hypot(out->joints[k].x2 - x, out->joints[k].y2 - y) < 2e-3);
            if (!met)
                fault(c, "old joint not met", e->edge, e->joints[n]);
        }
    }
}

/* Number of faults; `light` leaves out what takes long on tens of thousands of panels. */
static int checker_run(struct checker *c, bool light)
{
    c->faults = 0;
    c->first[0] = 0;
    if (!light)
        check_tiling(c);
    for (size_t i = 0; i < c->out->panel_count; i++) {
        if (!light || i % 37 == 0)
            check_size(c, i);
        check_shape(c, i);
    }
    check_joint_ends(c);
    check_objects_free(c);
    check_sides(c);
    return c->faults;
}

#endif
