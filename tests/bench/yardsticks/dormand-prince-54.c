/*
 * Dormand-Prince 5(4) with the step control of Hairer, Norsett & Wanner I, sect. II.4 and II.5, for the
 * systems of tests/bench/models.ts. Written for the bench as a native yardstick.
 * Usage: yardstick <3|8> <tolerance> <end> <milliseconds>
 * Prints: milliseconds a run, accepted steps, and the state at the end.
 */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <time.h>

#define MOST 8
static int n;
static double attack[4][4], share[4] = {0.1, 0.2, 0.3, 0.4}, loss[4];

static void three(const double *u, double *f) {
  const double r = 1, K = 4, a1 = 1.1, a2 = 0.9, h = 0.6, e = 0.8, m1 = 0.35, m2 = 0.25;
  const double x = u[0], eaten = x * (a1 * u[1] + a2 * u[2]) / (1 + h * x);
  f[0] = r * x * (1 - x / K) - eaten;
  f[1] = e * eaten / 2 - m1 * u[1];
  f[2] = e * eaten / 2 - m2 * u[2];
}

static void eight(const double *u, double *f) {
  const double r = 1, K = 4, h = 0.6, e = 0.8;
  double prey = 0, grazed[4], total = 0;
  for (int i = 0; i < 4; i++) prey += u[i];
  for (int j = 0; j < 4; j++) {
    double s = 0;
    for (int i = 0; i < 4; i++) s += attack[i][j] * u[i];
    grazed[j] = u[4 + j] / (1 + h * s);
    total += s * grazed[j];
  }
  for (int i = 0; i < 4; i++) {
    double s = 0;
    for (int j = 0; j < 4; j++) s += attack[i][j] * grazed[j];
    f[i] = share[i] * r * prey * (1 - prey / K) - u[i] * s;
  }
  for (int j = 0; j < 4; j++) f[4 + j] = e * total / 4 - loss[j] * u[4 + j];
}

static void rhs(const double *u, double *f) {
  if (n == 3) three(u, f);
  else eight(u, f);
}

static const double A[7][6] = {
  {0},
  {1.0 / 5},
  {3.0 / 40, 9.0 / 40},
  {44.0 / 45, -56.0 / 15, 32.0 / 9},
  {19372.0 / 6561, -25360.0 / 2187, 64448.0 / 6561, -212.0 / 729},
  {9017.0 / 3168, -355.0 / 33, 46732.0 / 5247, 49.0 / 176, -5103.0 / 18656},
  {35.0 / 384, 0, 500.0 / 1113, 125.0 / 192, -2187.0 / 6784, 11.0 / 84},
};
static const double E[7] = {71.0 / 57600, 0, -71.0 / 16695, 71.0 / 1920, -17253.0 / 339200, 22.0 / 525, -1.0 / 40};

static int integrate(double *u, double tolerance, double end) {
  double k[7][MOST], v[MOST], t = 0, h = 1e-3, last = 1e-4;
  int steps = 0, rejected = 0;
  rhs(u, k[0]);
  while (t < end) {
    if (t + 1.01 * h >= end) h = end - t;
    for (int s = 1; s < 7; s++) {
      for (int i = 0; i < n; i++) {
        double sum = 0;
        for (int j = 0; j < s; j++) sum += A[s][j] * k[j][i];
        v[i] = u[i] + h * sum;
      }
      rhs(v, k[s]);
    }
    double error = 0;
    for (int i = 0; i < n; i++) {
      double sum = 0;
      for (int j = 0; j < 7; j++) sum += E[j] * k[j][i];
      const double size = fmax(fabs(u[i]), fabs(v[i]));
      const double ratio = h * sum / (1e-12 + tolerance * size);
      error += ratio * ratio;
    }
    error = sqrt(error / n);
    if (error <= 1) {
      double factor = 0.9 * pow(fmax(error, 1e-14), -(0.2 - 0.03)) * pow(last, 0.04);
      factor = fmin(10, fmax(0.2, factor));
      if (rejected) factor = fmin(1, factor);
      last = fmax(error, 1e-4);
      t += h;
      h *= factor;
      memcpy(u, v, sizeof(double) * n);
      memcpy(k[0], k[6], sizeof(double) * n);
      steps++;
      rejected = 0;
    } else {
      h *= fmax(0.2, 0.9 * pow(error, -0.2));
      rejected = 1;
    }
  }
  return steps;
}

static double now(void) {
  struct timespec at;
  clock_gettime(CLOCK_MONOTONIC, &at);
  return 1e3 * at.tv_sec + 1e-6 * at.tv_nsec;
}

int main(int count, char **words) {
  if (count != 5) return 1;
  n = atoi(words[1]);
  const double tolerance = atof(words[2]), end = atof(words[3]), budget = atof(words[4]);
  for (int i = 0; i < 4; i++) {
    loss[i] = 0.25 + 0.05 * i;
    for (int j = 0; j < 4; j++) attack[i][j] = 0.7 + 0.05 * i + 0.08 * j;
  }
  const double start3[3] = {0.5, 0.25, 0.25};
  const double start8[8] = {0.1, 0.1, 0.15, 0.15, 0.1, 0.1, 0.15, 0.15};
  double u[MOST], best = 1e300;
  int steps = 0;
  const double began = now();
  do {
    memcpy(u, n == 3 ? start3 : start8, sizeof(double) * n);
    const double from = now();
    steps = integrate(u, tolerance, end);
    const double spent = now() - from;
    if (spent < best) best = spent;
  } while (now() - began < budget);
  printf("%.9g %d", best, steps);
  for (int i = 0; i < n; i++) printf(" %.17g", u[i]);
  printf("\n");
  return 0;
}
