/*
 * Cells of a stability map with LAPACK: in each, Newton's method goes from the equilibrium of the neighbouring
 * cell, and the margin is minus the largest real part of the eigenvalues (dgeev). The systems are those of
 * tests/bench/models.ts with K and e as the axes. Written for the bench as a native yardstick.
 * Usage: yardstick <3|8> <columns> <rows> <milliseconds> <start state ...>
 * Prints: milliseconds a map, and the sum of all margins.
 */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <time.h>

#define MOST 8
extern void dgeev_(const char *, const char *, const int *, double *, const int *, double *, double *, double *,
                   const int *, double *, const int *, double *, const int *, int *);

static int n;
static double K, e, attack[4][4], share[4] = {0.1, 0.2, 0.3, 0.4}, loss[4];

static void three(const double *u, double *f, double *J) {
  const double r = 1, a1 = 1.1, a2 = 0.9, h = 0.6, m1 = 0.35, m2 = 0.25;
  const double x = u[0], d = 1 / (1 + h * x), a = a1 * u[1] + a2 * u[2], eaten = x * a * d, byX = a * d * d;
  f[0] = r * x * (1 - x / K) - eaten;
  f[1] = e * eaten / 2 - m1 * u[1];
  f[2] = e * eaten / 2 - m2 * u[2];
  J[0] = r * (1 - 2 * x / K) - byX, J[1] = -x * a1 * d, J[2] = -x * a2 * d;
  for (int i = 1; i < 3; i++) J[3 * i] = e * byX / 2, J[3 * i + 1] = e * x * a1 * d / 2, J[3 * i + 2] = e * x * a2 * d / 2;
  J[4] -= m1, J[8] -= m2;
}

static void eight(const double *u, double *f, double *J) {
  const double r = 1, h = 0.6;
  double prey = 0, s[4], d[4], g[4], total = 0;
  for (int i = 0; i < 4; i++) prey += u[i];
  for (int j = 0; j < 4; j++) {
    s[j] = 0;
    for (int i = 0; i < 4; i++) s[j] += attack[i][j] * u[i];
    d[j] = 1 / (1 + h * s[j]);
    g[j] = u[4 + j] * d[j];
    total += s[j] * g[j];
  }
  for (int i = 0; i < 4; i++) {
    double lost = 0;
    for (int j = 0; j < 4; j++) lost += attack[i][j] * g[j], J[8 * i + 4 + j] = -u[i] * attack[i][j] * d[j];
    f[i] = share[i] * r * prey * (1 - prey / K) - u[i] * lost;
    for (int k = 0; k < 4; k++) {
      double saved = 0;
      for (int j = 0; j < 4; j++) saved += attack[i][j] * attack[k][j] * g[j] * h * d[j];
      J[8 * i + k] = share[i] * r * (1 - 2 * prey / K) + u[i] * saved - (i == k ? lost : 0);
    }
  }
  double byPrey[4];
  for (int k = 0; k < 4; k++) {
    byPrey[k] = 0;
    for (int j = 0; j < 4; j++) byPrey[k] += attack[k][j] * g[j] * d[j];
  }
  for (int j = 0; j < 4; j++) {
    f[4 + j] = e * total / 4 - loss[j] * u[4 + j];
    for (int k = 0; k < 4; k++) {
      J[8 * (4 + j) + k] = e * byPrey[k] / 4;
      J[8 * (4 + j) + 4 + k] = e * s[k] * d[k] / 4 - (j == k ? loss[j] : 0);
    }
  }
}

static void model(const double *u, double *f, double *J) {
  if (n == 3) three(u, f, J);
  else eight(u, f, J);
}

static int solve(double *a, double *b) {
  for (int k = 0; k < n; k++) {
    int row = k;
    for (int i = k + 1; i < n; i++)
      if (fabs(a[i * n + k]) > fabs(a[row * n + k])) row = i;
    if (!(fabs(a[row * n + k]) > 0)) return 0;
    if (row != k) {
      for (int j = k; j < n; j++) {
        const double kept = a[k * n + j];
        a[k * n + j] = a[row * n + j], a[row * n + j] = kept;
      }
      const double kept = b[k];
      b[k] = b[row], b[row] = kept;
    }
    for (int i = k + 1; i < n; i++) {
      const double factor = a[i * n + k] / a[k * n + k];
      for (int j = k + 1; j < n; j++) a[i * n + j] -= factor * a[k * n + j];
      b[i] -= factor * b[k];
    }
  }
  for (int i = n - 1; i >= 0; i--) {
    for (int j = i + 1; j < n; j++) b[i] -= a[i * n + j] * b[j];
    b[i] /= a[i * n + i];
  }
  return 1;
}

static double cell(double *u) {
  double f[MOST], J[MOST * MOST], a[MOST * MOST], re[MOST], im[MOST], work[16 * MOST];
  for (int iteration = 0; iteration < 12; iteration++) {
    double size = 0, length = 0;
    model(u, f, J);
    memcpy(a, J, sizeof(double) * n * n);
    if (!solve(a, f)) return NAN;
    for (int i = 0; i < n; i++) size = fmax(size, fabs(u[i]));
    for (int i = 0; i < n; i++) length = fmax(length, fabs(f[i]) / fmax(fabs(u[i]), 1e-9 * size)), u[i] -= f[i];
    if (length > 1e-6) continue;
    if (length > 1e-11) model(u, f, J);
    const int one = 1, room = 16 * MOST;
    int info;
    double none;
    dgeev_("N", "N", &n, J, &n, re, im, &none, &one, &none, &one, work, &room, &info);
    if (info != 0) return NAN;
    double leading = re[0];
    for (int i = 1; i < n; i++) leading = fmax(leading, re[i]);
    return -leading;
  }
  return NAN;
}

static double now(void) {
  struct timespec at;
  clock_gettime(CLOCK_MONOTONIC, &at);
  return 1e3 * at.tv_sec + 1e-6 * at.tv_nsec;
}

int main(int count, char **words) {
  if (count < 5) return 1;
  n = atoi(words[1]);
  const int columns = atoi(words[2]), rows = atoi(words[3]);
  if ((n != 3 && n != 8) || count != 5 + n) return 1;
  const double budget = atof(words[4]);
  for (int i = 0; i < 4; i++) {
    loss[i] = 0.25 + 0.05 * i;
    for (int j = 0; j < 4; j++) attack[i][j] = 0.7 + 0.05 * i + 0.08 * j;
  }
  double *states = malloc(sizeof(double) * rows * n), best = 1e300, sum = 0;
  const double began = now();
  do {
    for (int k = 0; k < rows * n; k++) states[k] = atof(words[5 + k % n]);
    const double from = now();
    sum = 0;
    for (int c = 0; c < columns; c++)
      for (int k = 0; k < rows; k++) {
        K = 3 + 2.0 * c / columns;
        e = 0.75 + 0.1 * k / rows;
        sum += cell(states + k * n);
      }
    best = fmin(best, now() - from);
  } while (now() - began < budget);
  printf("%.9g %.17g\n", best, sum);
  free(states);
  return 0;
}
