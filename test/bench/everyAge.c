/*
 * The yardstick: a plain solver that keeps every age, in C. Each boundary of the age-ranked storage takes one midpoint step per time
 * step; selection functions from tables in sqrt(S/(S+c)); one tracer. Reads "n J Q E C" rows, prints seconds and the last day's shares.
 * Build: cc -O3 -o everyAge everyAge.c -lm
 */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <time.h>
#define M 4096
static double TQ[M + 2], TE[M + 2];
static double gammaP(double a, double x) {
  if (x <= 0) return 0;
  if (x < a + 1) {
    double term = 1 / a, sum = term;
    for (int n = 1; n < 1000 && term > sum * 1e-16; n++) sum += term *= x / (a + n);
    return sum * exp(-x + a * log(x) - lgamma(a));
  }
  double b = x + 1 - a, c = 1e300, d = 1 / b, h = d;
  for (int i = 1; i < 1000; i++) {
    double an = -i * (i - a);
    b += 2;
    d = 1 / (an * d + b);
    c = b + an / c;
    h *= d * c;
    if (fabs(d * c - 1) < 1e-16) break;
  }
  return 1 - exp(-x + a * log(x) - lgamma(a)) * h;
}
int main(void) {
  int n;
  double S0, pre;
  if (scanf("%d %lf %lf", &n, &S0, &pre) != 3) return 1;
  double *J = malloc(8 * n), *Q = malloc(8 * n), *E = malloc(8 * n), *C = malloc(8 * n), *out = malloc(8 * n);
  for (int k = 0; k < n; k++)
    if (scanf("%lf %lf %lf %lf", J + k, Q + k, E + k, C + k) != 4) return 1;
  double *S = malloc(8 * (n + 1)), *conc = malloc(8 * (n + 1));
  double best = 1e30, share[4] = {0}, median = 0;
  for (int repeat = 0; repeat < 3; repeat++) {
    struct timespec t0, t1;
    clock_gettime(CLOCK_PROCESS_CPUTIME_ID, &t0);
    double c = 150;
    for (int i = 0; i <= M; i++) {
      double z = (double)i / M, x = i < M ? c * z * z / (1 - z * z) : INFINITY;
      TQ[i] = i < M ? gammaP(0.6, x / 400) : 1;
      TE[i] = i < M ? 1 - exp(-x / 60) : 1;
    }
    TQ[M + 1] = TE[M + 1] = 1;
    /* S[j]: boundary below the water of step j, oldest first */
    for (int k = 0; k < n; k++) {
      S[k] = 0;
      conc[k] = C[k];
      double mass = 0, above = 0, total = 0;
      int seven = k - 6, ages[4] = {k - 6, k - 29, k - 89, k - 364};
      (void)seven;
      double atAge[4] = {0}, half = -1;
      for (int j = k; j >= 0; j--) {
        double s = S[j];
        double z = sqrt(s / (s + c)) * M;
        int i = (int)z;
        double f = z - i;
        double mid = s + 0.5 * (J[k] - Q[k] * (TQ[i] + f * (TQ[i + 1] - TQ[i])) - E[k] * (TE[i] + f * (TE[i + 1] - TE[i])));
        if (mid < 0) mid = 0;
        z = sqrt(mid / (mid + c)) * M;
        i = (int)z;
        f = z - i;
        double q = Q[k] * (TQ[i] + f * (TQ[i + 1] - TQ[i])), e = E[k] * (TE[i] + f * (TE[i + 1] - TE[i]));
        s += J[k] - q - e;
        S[j] = s > 0 ? s : 0;
        mass += (q - above) * conc[j];
        above = q;
        for (int a = 0; a < 4; a++)
          if (j == ages[a]) atAge[a] = q;
        if (half < 0 && q >= 0.5 * Q[k]) half = k + 1 - j;
      }
      (void)total;
      out[k] = (mass + (Q[k] - above) * pre) / Q[k];
      for (int a = 0; a < 4; a++) share[a] = atAge[a] / Q[k];
      median = half;
    }
    clock_gettime(CLOCK_PROCESS_CPUTIME_ID, &t1);
    double seconds = (t1.tv_sec - t0.tv_sec) + 1e-9 * (t1.tv_nsec - t0.tv_nsec);
    if (seconds < best) best = seconds;
  }
  printf("%.6f %.9f %.9f %.9f %.9f %.1f %.9f\n", best, share[0], share[1], share[2], share[3], median, out[n - 1]);
  return 0;
}
