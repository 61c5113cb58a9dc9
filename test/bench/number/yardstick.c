/* Times of Arb (Debian's libflint-arb-dev) for the inputs of number.mjs. Prints one line an operation: digits, name, ns a call.
   cc -O2 -o yardstick yardstick.c -lflint-arb -lflint -lgmp */
#include <arb.h>
#include <acb.h>
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <time.h>

static arb_t x, y, r, s;
static acb_t z, w, t;
static slong prec;

static void run_mul(void) { arb_mul(r, x, y, prec); }
static void run_div(void) { arb_div(r, x, y, prec); }
static void run_sqrt(void) { arb_sqrt(r, x, prec); }
static void run_cmul(void) { acb_mul(t, z, w, prec); }
static void run_exp(void) { arb_exp(r, x, prec); }
static void run_cexp(void) { acb_exp(t, z, prec); }
static void run_sincos(void) { arb_sin_cos(r, s, x, prec); }
static void run_ln(void) { arb_log(r, x, prec); }
static void run_agm(void) { arb_agm(r, x, y, prec); }
static void run_cagm(void) { acb_agm(t, z, w, prec); }

typedef struct { const char *name; void (*run)(void); } operation;
static operation operations[] = {
    {"mul", run_mul}, {"div", run_div}, {"sqrt", run_sqrt}, {"complex mul", run_cmul}, {"exp", run_exp},
    {"complex exp", run_cexp}, {"sin+cos", run_sincos}, {"ln", run_ln}, {"agm", run_agm}, {"complex agm", run_cagm},
};

static double now(void)
{
    struct timespec at;
    clock_gettime(CLOCK_PROCESS_CPUTIME_ID, &at);
    return at.tv_sec + 1e-9 * at.tv_nsec;
}

static double measure(void (*run)(void), double budget)
{
    double best = 1e99, spent = 0;
    long count = 1;
    run();
    while (spent < budget) {
        double start = now();
        for (long k = 0; k < count; k++) run();
        double took = now() - start;
        spent += took;
        if (took / count < best) best = took / count;
        if (took < budget / 20) count *= 2;
    }
    return best * 1e9;
}

int main(int argc, char **argv)
{
    char *list = strdup(argv[1]);
    double budget = argc > 2 ? atof(argv[2]) : 0.1;
    arb_init(x); arb_init(y); arb_init(r); arb_init(s);
    acb_init(z); acb_init(w); acb_init(t);
    for (char *part = strtok(list, ","); part; part = strtok(NULL, ",")) {
        long digits = atol(part);
        prec = (slong) (digits * 3.3219280948873626) + 1;
        arb_set_si(x, 22); arb_div_si(x, x, 27, prec);
        arb_set_si(y, 7); arb_div_si(y, y, 9, prec);
        arb_set_si(r, 5); arb_div_si(r, r, 11, prec);
        acb_set_arb_arb(z, x, y);
        acb_set_arb_arb(w, y, r);
        for (size_t k = 0; k < sizeof operations / sizeof operations[0]; k++) {
            printf("%ld\t%s\t%.0f\n", digits, operations[k].name, measure(operations[k].run, budget));
            fflush(stdout);
        }
    }
    return 0;
}
