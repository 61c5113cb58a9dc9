// Yardstick for lattice.mjs: real periods of y² = 4x³ − 4x + 1 by certified roots and two real means, and ℘ alone at a complex point, by ball
// arithmetic. Prints microseconds of processor time, the best of eight groups, for each number of digits.
//     cc -O2 lattice-yardstick.c -lflint-arb -lflint -lm
#include <stdio.h>
#include <stdlib.h>
#include <time.h>
#include <arb.h>
#include <acb.h>
#include <acb_elliptic.h>
#include <arb_fmpz_poly.h>
static double now(void) {
  struct timespec t;
  clock_gettime(CLOCK_PROCESS_CPUTIME_ID, &t);
  return t.tv_sec * 1e6 + t.tv_nsec * 1e-3;
}

static slong prec;
static fmpz_poly_t cubic;
static acb_ptr roots;
static arb_t w1, w2, a, b, c, d;
static acb_t z, tau, p;

static void periods(void) {
  slong wp = prec + 10;
  arb_fmpz_poly_complex_roots(roots, cubic, 0, wp);
  /* Real roots come in ascending order. */
  arb_sub(a, acb_realref(roots + 2), acb_realref(roots), wp);
  arb_sqrt(a, a, wp);
  arb_sub(b, acb_realref(roots + 2), acb_realref(roots + 1), wp);
  arb_sqrt(b, b, wp);
  arb_sub(c, acb_realref(roots + 1), acb_realref(roots), wp);
  arb_sqrt(c, c, wp);
  arb_agm(w1, a, b, wp);
  arb_agm(w2, a, c, wp);
  arb_const_pi(d, wp);
  arb_div(w1, d, w1, prec);
  arb_div(w2, d, w2, prec);
}

static void function(void) { acb_elliptic_p(p, z, tau, prec); }

static double timed(void (*f)(void)) {
  double t = now(), best = 1e300;
  int runs = 0;
  while (now() - t < 200000 || runs < 3) {
    f();
    runs++;
  }
  int size = runs / 10 < 1 ? 1 : runs / 10;
  for (int k = 0; k < 8; k++) {
    t = now();
    for (int i = 0; i < size; i++) f();
    double x = (now() - t) / size;
    if (x < best) best = x;
  }
  return best;
}

int main(int n, char **v) {
  fmpz_poly_init(cubic);
  fmpz_poly_set_str(cubic, "4  1 -4 0 4");
  roots = _acb_vec_init(3);
  arb_init(w1);
  arb_init(w2);
  arb_init(a);
  arb_init(b);
  arb_init(c);
  arb_init(d);
  acb_init(z);
  acb_init(tau);
  acb_init(p);
  for (int i = 1; i < n; i++) {
    prec = (slong)(atoi(v[i]) * 3.3219281) + 8;
    periods();
    arb_set_str(acb_realref(z), "0.41", prec + 30);
    arb_set_str(acb_imagref(z), "0.27", prec + 30);
    acb_div_arb(z, z, w1, prec + 30);
    arb_zero(acb_realref(tau));
    arb_div(acb_imagref(tau), w2, w1, prec + 10);
    double first = timed(periods);
    printf("%g %g\n", first, timed(function));
  }
  return 0;
}
