/* Many columns and openings on no common lines: no rule is broken, by the solver's own check and by
 * the checker with GEOS; the answer comes within a number of evaluations that is no accident. */
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>
/* cmocka.h needs the headers above */
#include "crowded_check.h"

static void a_thousand_panels(void **state)
{
    (void)state;
    static const struct yard_case plain = {150, 130, 30, 0, 4e6, 0},
                                  holes = {150, 130, 30, 2, 1e7, 0};
    struct checker c = {.geos = GEOS_init_r()};
    for (enum yard_order order = YARD_GRID; order <= YARD_ANYWHERE; order++) {
        yard_check(&c, &plain, order, 1);
        yard_check(&c, &holes, order, 2);
    }
    GEOS_finish_r(c.geos);
}

static void ten_thousand_panels(void **state)
{
    (void)state;
    static const struct yard_case ten = {480, 400, 100, 5, 3e7, 0};
    struct checker c = {.geos = GEOS_init_r()};
    yard_check(&c, &ten, YARD_ANYWHERE, 3);
    GEOS_finish_r(c.geos);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_thousand_panels),
        cmocka_unit_test(ten_thousand_panels),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
