/* The jobs of functions.mjs in a C library of ball arithmetic: processor time in microseconds a call, one line a job.
   Arguments: digits, seconds for each job. Build: cc -O2 jobs.c -lflint-arb -lflint -lm (or -larb). */
#include <stdio.h>
#include <stdlib.h>
#include <time.h>
#include "acb_elliptic.h"
#include "acb_modular.h"

static slong prec;
static double budget;
static acb_t a, b, c, d, za, zb, zc, m, n, phi, u, w, tau, s, pi_w;
static acb_struct t[4];

static void rational(acb_t x, slong p, slong q) { acb_set_si(x, p); acb_div_si(x, x, q, prec + 30); }
static void pair(acb_t x, slong p, slong q, slong r, slong k) {
  acb_t y; acb_init(y); rational(x, p, q); rational(y, r, k); acb_mul_onei(y, y); acb_add(x, x, y, prec + 30); acb_clear(y);
}
static void rf_real(void) { acb_elliptic_rf(s, a, b, c, 0, prec); }
static void rf_complex(void) { acb_elliptic_rf(s, za, zb, zc, 0, prec); }
static void rd(void) { acb_elliptic_rj(s, a, b, c, c, 0, prec); }
static void rg(void) { acb_elliptic_rg(s, a, b, c, 0, prec); }
static void rj_real(void) { acb_elliptic_rj(s, a, b, c, d, 0, prec); }
static void rj_complex(void) { acb_elliptic_rj(s, za, zb, zc, d, 0, prec); }
static void k(void) { acb_elliptic_k(s, m, prec); }
static void e(void) { acb_elliptic_e(s, m, prec); }
static void f(void) { acb_elliptic_f(s, phi, m, 0, prec); }
static void ei(void) { acb_elliptic_e_inc(s, phi, m, 0, prec); }
static void pii(void) { acb_elliptic_pi_inc(s, n, phi, m, 0, prec); }
static void theta(void) { acb_modular_theta(t, t + 1, t + 2, t + 3, w, tau, prec); }
static void eta(void) { acb_modular_eta(s, tau, prec); }
static void j(void) { acb_modular_j(s, tau, prec); }
static void lambda(void) { acb_modular_lambda(s, tau, prec); }
static void e4(void) { acb_modular_eisenstein(t, tau, 2, prec); }
/* The library has no Jacobi functions: K, K', tau and the four theta functions at u/2K. */
static void jacobi(acb_t at) {
  acb_t K, K1, x;
  acb_init(K); acb_init(K1); acb_init(x);
  acb_elliptic_k(K, m, prec + 10);
  acb_sub_ui(x, m, 1, prec + 10); acb_neg(x, x);
  acb_elliptic_k(K1, x, prec + 10);
  acb_div(x, K1, K, prec + 10); acb_mul_onei(x, x);
  acb_mul_2exp_si(K, K, 1); acb_div(K1, at, K, prec + 10);
  acb_modular_theta(t, t + 1, t + 2, t + 3, K1, x, prec + 10);
  acb_div(s, t, t + 3, prec); acb_div(s, t + 1, t + 3, prec); acb_div(s, t + 2, t + 3, prec);
  acb_zero(K1);
  acb_modular_theta(t, t + 1, t + 2, t + 3, K1, x, prec + 10);
  acb_clear(K); acb_clear(K1); acb_clear(x);
}
static void jacobi_real(void) { jacobi(u); }
static void jacobi_complex(void) { jacobi(w); }

static void run(const char *name, void (*job)(void)) {
  double start, used;
  long runs = 0;
  job();
  start = clock();
  do { job(); runs++; used = (clock() - start) / CLOCKS_PER_SEC; } while (runs < 2 || used < budget);
  printf("%s\t%f\n", name, used / runs * 1e6);
}

int main(int argc, char **argv) {
  int i;
  if (argc < 3) return 2;
  prec = (slong) (atol(argv[1]) * 3.3219281) + 8;
  budget = atof(argv[2]);
  acb_init(a); acb_init(b); acb_init(c); acb_init(d); acb_init(za); acb_init(zb); acb_init(zc);
  acb_init(m); acb_init(n); acb_init(phi); acb_init(u); acb_init(w); acb_init(tau); acb_init(s); acb_init(pi_w);
  for (i = 0; i < 4; i++) acb_init(t + i);
  rational(a, 11, 10); rational(b, 23, 10); rational(c, 37, 10); rational(d, 5, 1);
  pair(za, 11, 10, 37, 10); pair(zb, 23, 10, -11, 10); pair(zc, 37, 10, 23, 10);
  rational(m, 3, 10); rational(n, 1, 10); rational(phi, 7, 10); rational(u, 7, 10);
  pair(w, 41, 100, 27, 100); pair(tau, 1, 7, 9, 10);
  run("RF real", rf_real); run("RF complex", rf_complex); run("RD real", rd); run("RG real", rg);
  run("RJ real", rj_real); run("RJ complex", rj_complex); run("K(m)", k); run("E(m)", e);
  run("F(phi|m)", f); run("E(phi|m)", ei); run("Pi(n; phi|m)", pii);
  run("sn, cn, dn real u", jacobi_real); run("sn, cn, dn complex u", jacobi_complex);
  run("theta3 complex v", theta); run("eta(tau)", eta); run("j(tau)", j); run("lambda(tau)", lambda); run("E4(tau)", e4);
  return 0;
}
