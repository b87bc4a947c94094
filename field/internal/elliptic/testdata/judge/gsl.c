/* Writes ../gsl.json: elliptic integrals and logarithms by the GNU Scientific Library, at seeded arguments exact in binary.
 *
 *   cc gsl.c -lgsl -lgslcblas -lm -o gsl && ./gsl > ../gsl.json
 *
 * Every row: the function of package elliptic (or logatan), its arguments, the value, and the library's own error estimate
 * relative to it. Circle integrals are put together from the symmetric forms where nothing cancels.
 */
#include <gsl/gsl_errno.h>
#include <gsl/gsl_sf_ellint.h>
#include <gsl/gsl_sf_log.h>
#include <math.h>
#include <stdint.h>
#include <stdio.h>

static uint64_t state = 1;

/* Uniform in [0, 1), 30 bits (splitmix64, Steele, Lea, Flood 2014). */
static double uniform(void) {
    uint64_t z = (state += 0x9e3779b97f4a7c15u);
    z = (z ^ (z >> 30)) * 0xbf58476d1ce4e5b9u;
    z = (z ^ (z >> 27)) * 0x94d049bb133111ebu;
    return (double)((z ^ (z >> 31)) >> 34) / 1073741824.0;
}

/* A number between 2^lo and 2^hi, with 30 bits. */
static double spread(int lo, int hi) {
    return ldexp(1 + uniform(), lo + (int)(uniform() * (hi - lo)));
}

static int first = 1;

static void row(const char *f, int n, const double *arg, double value, double err) {
    printf("%s{\"f\": \"%s\", \"arg\": [", first ? "[\n" : ",\n", f);
    for (int i = 0; i < n; i++) printf("%s\"%a\"", i ? ", " : "", arg[i]);
    printf("], \"value\": \"%a\", \"error\": \"%a\"}", value, fabs(err / value));
    first = 0;
}

static double rf(double x, double y, double z) { return gsl_sf_ellint_RF(x, y, z, GSL_PREC_DOUBLE); }
static double rd(double x, double y, double z) { return gsl_sf_ellint_RD(x, y, z, GSL_PREC_DOUBLE); }

int main(void) {
    const gsl_mode_t mode = GSL_PREC_DOUBLE;
    gsl_sf_result r;
    gsl_set_error_handler_off();
    for (int i = 0; i < 80; i++) {
        double x = i % 4 ? spread(-20, 10) : 0, y = spread(-20, 10), z = spread(-20, 10), p = spread(-20, 10);
        double a[] = {x, y, z, p}, b[] = {x, y}, c[] = {x, y, z};
        if (!gsl_sf_ellint_RF_e(x, y, z, mode, &r)) row("RF", 3, c, r.val, r.err);
        if (!gsl_sf_ellint_RC_e(x, y, mode, &r)) row("RC", 2, b, r.val, r.err);
        if (!gsl_sf_ellint_RD_e(x, y, z, mode, &r)) row("RD", 3, c, r.val, r.err);
        if (!gsl_sf_ellint_RJ_e(x, y, z, p, mode, &r)) row("RJ", 4, a, r.val, r.err);
    }
    for (int i = 0; i < 60; i++) { /* k with 20 bits: k^2 and 1 - k^2 are exact */
        double k = floor(uniform() * 1048576) / 1048576;
        if (i % 3 == 0) k = 1 - ldexp(floor(1 + 15 * uniform()), -20);
        double kc2 = 1 - k * k;
        if (!gsl_sf_ellint_Kcomp_e(k, mode, &r)) row("K", 1, &kc2, r.val, r.err);
        if (!gsl_sf_ellint_Ecomp_e(k, mode, &r)) row("E", 1, &kc2, r.val, r.err);
        if (!gsl_sf_ellint_Dcomp_e(k, mode, &r)) row("D", 1, &kc2, r.val, r.err);
        double n = spread(-6, 3), a[] = {sqrt(kc2), 1 + n, 1, 1}; /* Pi with the sign convention 1 + n sin^2 */
        double j = rf(0, kc2, 1) - n / 3 * gsl_sf_ellint_RJ(0, kc2, 1, 1 + n, mode);
        if (!gsl_sf_ellint_Pcomp_e(k, n, mode, &r) && fabs(j / r.val - 1) < 1e-13) row("Cel", 4, a, r.val, r.err);
    }
    for (int i = 0; i < 60; i++) { /* a, rho, z with few bits, so that gap and q1 are exact */
        double a = floor(512 + 1536 * uniform()) / 1024, rho = floor(1 + 4095 * uniform()) / 1024, z = floor(1 + 4095 * uniform()) / 1024;
        double gap = a - rho, q1 = gap * gap + z * z, sum = a + rho, q = sum * sum + z * z, k2 = q1 / q, g = gap / sum;
        double arg[] = {a, rho, z, gap, q1};
        double k = rf(0, k2, 1), d = rd(0, k2, 1) / 3, b = k2 * rd(0, 1, k2) / 3;
        double p = g ? gsl_sf_ellint_RJ(0, k2, 1, g * g, mode) / 3 : 0;
        row("U", 5, arg, 4 * a / sqrt(q) * k, 0);
        row("S3", 5, arg, 4 / (sqrt(q) * q1) * (b + k2 * d), 0);
        if (gap > 0) /* positive terms only */
            row("Omega", 5, arg, 2 * M_PI - 4 * a * z / (sum * sqrt(q)) * (k + g * (1 - g) * p), 0);
    }
    for (int i = 0; i < 60; i++) {
        double x = i % 2 ? spread(-60, 3) : -0.75 * uniform();
        if (x && !gsl_sf_log_1plusx_e(x, &r)) row("Log1pRatio", 1, &x, r.val, r.err);
    }
    printf("\n]\n");
    return 0;
}
