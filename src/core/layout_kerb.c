/* Kerb returns (design 4): a tangent arc between two sides square to each other is taken for the
 * sharp inside corner, laid out, and put back: both prolongations run on through the corner and
 * bend towards the arc's centre, so that they meet the kerb along the radius. */
#include "core/layout_shape.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>

enum { MOST_RETURNS = 16 };
static const double pi = 3.14159265358979323846;

struct kerb {
    struct layout_point corner, centre, end[2]; /* ends: where the arc touches the sides */
    struct layout_point bend[2];                /* on the prolongations */
    double radius;
};
struct kerbs {
    struct kerb list[MOST_RETURNS];
    size_t count;
    struct layout_corner *outline; /* with sharp corners */
    size_t corner_count;
};

static double far(struct layout_point a, struct layout_point b)
{
    return hypot(b.x - a.x, b.y - a.y);
}

static double turn_at(const struct layout *out, size_t i, double sign)
{
    const size_t n = out->outline_count;
    const struct layout_point a = out->outline[(i + n - 1) % n], b = out->outline[i],
                              c = out->outline[(i + 1) % n];
    const double x1 = b.x - a.x, y1 = b.y - a.y, x2 = c.x - b.x, y2 = c.y - b.y;
    return sign * atan2(x1 * y2 - y1 * x2, x1 * x2 + y1 * y2) * 180 / pi;
}

/* The arc from vertex i to k between straight sides: true when it is a return of a quarter circle.
 */
static bool make_return(const struct layout *out, size_t i, size_t k, struct kerb *r)
{
    const size_t n = out->outline_count;
    const struct layout_point before = out->outline[(i + n - 1) % n], a = out->outline[i],
                              b = out->outline[k], after = out->outline[(k + 1) % n];
    const double la = far(before, a), lb = far(b, after);
    const double ux = (a.x - before.x) / la, uy = (a.y - before.y) / la;
    const double vx = (after.x - b.x) / lb, vy = (after.y - b.y) / lb;
    if (fabs(ux * vx + uy * vy) > 1e-3)
        return false;
    const double along = (b.x - a.x) * ux + (b.y - a.y) * uy;
    const double across = (b.x - a.x) * vx + (b.y - a.y) * vy;
    if (along < 0.5 || fabs(along - across) > 1e-2 * along)
        return false;
    r->radius = along;
    r->corner = (struct layout_point){a.x + along * ux, a.y + along * uy};
    r->centre = (struct layout_point){a.x + across * vx, a.y + across * vy};
    r->end[0] = a;
    r->end[1] = b;
    return true;
}

/* Where a prolongation leaves its line: the radial piece turns by 60 degrees at most and is half a
 * metre long at least. */
static void set_bends(struct kerb *r)
{
    double phi = pi / 6;
    if (r->radius * (1 / cos(phi) - 1) < 0.5)
        phi = fmin(acos(r->radius / (r->radius + 0.5)), 50 * pi / 180);
    for (int k = 0; k < 2; k++) {
        const double f = tan(phi); /* from the touching point towards the corner, in radii */
        r->bend[k] = (struct layout_point){r->end[k].x + f * (r->corner.x - r->end[k].x),
                                           r->end[k].y + f * (r->corner.y - r->end[k].y)};
    }
}

/* Finds the returns and makes the outline with sharp corners. False = no memory. */
static bool find_returns(const struct layout *out, struct kerbs *all)
{
    const size_t n = out->outline_count;
    double area = 0;
    for (size_t i = 0; i < n; i++)
        area += out->outline[i].x * out->outline[(i + 1) % n].y -
                out->outline[(i + 1) % n].x * out->outline[i].y;
    const double sign = area < 0 ? -1 : 1;
    size_t start = 0;
    while (start < n && fabs(turn_at(out, start, sign)) < 15.1)
        start++;
    all->outline = calloc(n + 1, sizeof *all->outline);
    if (!all->outline)
        return false;
    for (size_t m = 0; m < n;) {
        const size_t i = (start + m) % n;
        size_t length = 0;
        double turned = 0;
        while (length < n - m) {
            const double turn = turn_at(out, (i + length) % n, sign);
            if (turn > -0.3 || turn < -7.6)
                break;
            turned += turn;
            length++;
        }
        struct kerb r;
        if (length > 2 && turned < -80 && turned > -100 && all->count < MOST_RETURNS &&
            make_return(out, i, (i + length - 1) % n, &r)) {
            set_bends(&r);
            all->list[all->count++] = r;
            all->outline[all->corner_count++] =
                (struct layout_corner){.x = r.corner.x, .y = r.corner.y};
            m += length;
        } else {
            all->outline[all->corner_count++] =
                (struct layout_corner){.x = out->outline[i].x, .y = out->outline[i].y};
            m++;
        }
    }
    return true;
}

/* The slab's sides keep their numbers only where no arc was replaced: neighbours are left to the
 * other ways. */
static bool is_free(const struct layout_input *in)
{
    for (size_t i = 0; i < in->edge_count; i++)
        if (in->edges[i].kind == LAYOUT_EDGE_EXISTING && !in->edges[i].isolate &&
            in->edges[i].joint_count)
            return false;
    return true;
}

/* Short pieces of the lines that must be there: both prolongations, and a line across at each bend.
 */
static size_t must_lines(const struct kerbs *all, struct layout_drawn *list)
{
    size_t n = 0;
    for (size_t i = 0; i < all->count; i++) {
        const struct kerb *r = &all->list[i];
        for (int k = 0; k < 2; k++) {
            /* from the corner away from the end k; and from the bend away from the centre */
            const double ux = (r->corner.x - r->end[k].x) / r->radius,
                         uy = (r->corner.y - r->end[k].y) / r->radius;
            const double vx = (r->end[k].x - r->centre.x) / r->radius,
                         vy = (r->end[k].y - r->centre.y) / r->radius;
            list[n++] = (struct layout_drawn){
                .keep = true,
                .at = {r->corner.x, r->corner.y, r->corner.x + 0.3 * ux, r->corner.y + 0.3 * uy}};
            list[n++] =
                (struct layout_drawn){.keep = true,
                                      .at = {r->bend[k].x, r->bend[k].y, r->bend[k].x + 0.3 * vx,
                                             r->bend[k].y + 0.3 * vy}};
        }
    }
    return n;
}

static enum status solve_sharp(const struct work *w, const struct kerbs *all, struct layout *sharp)
{
    const struct layout_input *in = w->input;
    struct layout_input input = *in;
    struct layout_drawn *drawn = calloc(in->drawn_count + 4 * all->count + 1, sizeof *drawn);
    if (!drawn)
        return STATUS_NO_MEMORY;
    const size_t n = must_lines(all, drawn);
    if (in->drawn_count)
        memcpy(drawn + n, in->drawn, in->drawn_count * sizeof *drawn);
    input.outline = (struct layout_ring){all->outline, all->corner_count};
    input.drawn = drawn;
    input.drawn_count = n + in->drawn_count;
    input.edge_count = 0;
    const enum status status = layout_solve(&input, sharp);
    free(drawn);
    return status;
}

/* The four tips of a box from its four sides. */
static bool take_boxes(const struct layout *sharp, struct plane *plane)
{
    plane->boxes = calloc(sharp->box_count + 1, sizeof *plane->boxes);
    for (size_t i = 0; plane->boxes && i < sharp->box_count; i++) {
        const struct layout_box *b = &sharp->boxes[i];
        struct plane_box *box = &plane->boxes[plane->box_count];
        int n = 0;
        *box = (struct plane_box){.object = b->object, .centre = {b->x, b->y}, .half = b->half};
        for (size_t k = 0; k < sharp->joint_count && n < 4; k++)
            if (sharp->joints[k].object == b->object)
                box->tip[n++] = (struct layout_point){sharp->joints[k].x1, sharp->joints[k].y1};
        for (int k = 0; k < n; k++) /* by their direction from the middle */
            for (int m = k + 1; m < n; m++)
                if (atan2(box->tip[m].y - b->y, box->tip[m].x - b->x) <
                    atan2(box->tip[k].y - b->y, box->tip[k].x - b->x)) {
                    const struct layout_point t = box->tip[k];
                    box->tip[k] = box->tip[m];
                    box->tip[m] = t;
                }
        plane->box_count += n == 4;
    }
    return plane->boxes != NULL;
}

/* An end on the sharp corner's sides, beyond the bend, runs on to the kerb. */
static void run_on(const struct kerbs *all, struct layout_segment *s, bool second)
{
    double *x = second ? &s->x2 : &s->x1, *y = second ? &s->y2 : &s->y1;
    const double ox = second ? s->x1 : s->x2, oy = second ? s->y1 : s->y2;
    const double length = hypot(*x - ox, *y - oy);
    for (size_t i = 0; i < all->count; i++)
        for (int k = 0; k < 2; k++) {
            const struct kerb *r = &all->list[i];
            const double ux = (r->corner.x - r->end[k].x) / r->radius,
                         uy = (r->corner.y - r->end[k].y) / r->radius;
            const double along = (*x - r->end[k].x) * ux + (*y - r->end[k].y) * uy;
            const double off = fabs((*x - r->end[k].x) * uy - (*y - r->end[k].y) * ux);
            const double bend = far(r->bend[k], r->end[k]);
            if (off > 2e-3 || along < 1e-3 || along > bend - 2e-3)
                continue;
            *x += (*x - ox) / length * 0.3 * r->radius;
            *y += (*y - oy) / length * 0.3 * r->radius;
            return;
        }
}

static bool put_back(const struct kerbs *all, const struct layout *sharp, struct plane *plane)
{
    int line = 0;
    bool fine = true;
    for (size_t i = 0; fine && i < sharp->joint_count; i++) {
        const struct layout_joint *j = &sharp->joints[i];
        struct plane_line p = {.at = {j->x1, j->y1, j->x2, j->y2},
                               .line = j->line,
                               .kind = j->kind,
                               .expansion = j->expansion,
                               .along_pour = j->along_pour};
        if (j->object >= 0 || j->edge >= 0 || j->opening >= 0)
            continue;
        run_on(all, &p.at, false);
        run_on(all, &p.at, true);
        line = j->line > line ? j->line : line;
        fine = plane_add(plane, p);
    }
    for (size_t i = 0; fine && i < all->count; i++)
        for (int k = 0; fine && k < 2; k++) {
            const struct kerb *r = &all->list[i];
            const double to = far(r->bend[k], r->centre), f = (to - 0.9 * r->radius) / to;
            const struct layout_point kerb = {r->bend[k].x + f * (r->centre.x - r->bend[k].x),
                                              r->bend[k].y + f * (r->centre.y - r->bend[k].y)};
            struct plane_line p = {.at = {r->corner.x, r->corner.y, r->bend[k].x, r->bend[k].y},
                                   .line = ++line};
            fine = plane_add(plane, p);
            p.at = (struct layout_segment){r->bend[k].x, r->bend[k].y, kerb.x, kerb.y};
            fine = fine && plane_add(plane, p);
        }
    return fine;
}

enum status shape_kerb(struct trials *t)
{
    struct kerbs all = {.count = 0};
    struct layout sharp = {0};
    struct plane plane = {0};
    if (!is_free(t->w->input))
        return STATUS_OK;
    enum status status = find_returns(t->w->out, &all) ? STATUS_OK : STATUS_NO_MEMORY;
    if (!status && all.count) {
        status = solve_sharp(t->w, &all, &sharp);
        if (!status && !(take_boxes(&sharp, &plane) && put_back(&all, &sharp, &plane)))
            status = STATUS_NO_MEMORY;
        if (!status && plane.box_count == sharp.box_count)
            status = trials_run(t, &plane);
        status = status == STATUS_REFUSED ? STATUS_OK : status;
    }
    plane_free(&plane);
    layout_free(&sharp);
    free(all.outline);
    return status;
}
