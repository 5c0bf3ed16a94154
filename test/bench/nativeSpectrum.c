/*
 * The limit of the machine: the sweep of src/wave/plainSpectrum.ts in C, left to the compiler's vectors and fused multiply-add, bound to
 * no bit of ours. The work of spectrum.bench.js: 21 layers, 2048 energies, T and R. Prints ns per layer and energy for three media, then
 * for every layer its own. Built with -O3 -march=native -ffast-math by the benchmark where there is a C compiler.
 */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <time.h>

enum { LAYERS = 21, POINTS = 2048, BLOCK = 128 };
static const double C = 0.0380998211096858;
static double q[LAYERS + 2][POINTS], mu[LAYERS + 2][POINTS], T[POINTS], R[POINTS], width[LAYERS];
static int medium[LAYERS];

/* y = k/mu and z = mu/k; |q| clamped as ours. */
static void roots(int m, int first, double *restrict k, double *restrict y, double *restrict z) {
  for (int i = 0; i < BLOCK; i++) {
    double square = fmax(fabs(q[m][first + i]), 1e-200), mass = mu[m][first + i], root = sqrt(square), d = 1 / (root * mass);
    k[i] = root;
    y[i] = square * d;
    z[i] = mass * mass * d;
  }
}

static inline void closed(double x, double *c, double *s) {
  double n = floor(x * 1.4426950408889634 + 0.5), r = x - n * 0.6931471805598903 - n * 5.497923018708371e-14, a = r * r;
  double p = 0.16666666666666669 + a * (0.008333333333330065 + a * (0.00019841269863041851 + a * (2.7557268478279004e-6 + a * 2.51003767988125e-8)));
  double f = 0.041666666666666664 + a * (0.0013888888888886554 + a * (2.48015873171361e-5 + a * (2.755728298260548e-7 + a * 2.091123041977771e-9)));
  double odd = r + r * a * p, even = 1 + 0.5 * a + a * a * f;
  /* 2^(n - 1) and 2^(-n - 1): the low bits of n + 1.5 2^52 are n's. */
  union { double d; unsigned long long i; } up = { n + 6755399441055744.0 }, down = { 6755399441055744.0 - n };
  up.i = (up.i + 1022) << 52;
  down.i = (down.i + 1022) << 52;
  double h = up.d + down.d, d = up.d - down.d;
  *c = even * h + odd * d;
  *s = even * d + odd * h;
}

static inline void open(double x, double *c, double *s) {
  double n = floor(x * 0.3183098861837907 + 0.5), r = x - n * 3.1415926534682512 - n * 1.2154201013012384e-10, a = r * r;
  double p = -0.16666666666666666 + a * (0.008333333333333316 + a * (-0.00019841269841254974 + a * (2.755731921916323e-6 + a * (-2.505210761699557e-8 + a * (1.605897731242445e-10 + a * (-7.643970295533013e-13 + a * 2.7314447512062796e-15))))));
  double f = 0.04166666666666666 + a * (-0.0013888888888884767 + a * (2.4801587298913547e-5 + a * (-2.7557318573365657e-7 + a * (2.0876681558822446e-9 + a * (-1.1466252257937559e-11 + a * 4.646435932869834e-14)))));
  *s = r + r * a * p;
  *c = 1 - (0.5 * a - a * a * f);
}

static void spectrum(int distinct) {
  static double k[LAYERS + 2][BLOCK], y[LAYERS + 2][BLOCK], z[LAYERS + 2][BLOCK];
  double u1[BLOCK], v1[BLOCK], u2[BLOCK], v2[BLOCK];
  for (int first = 0; first < POINTS; first += BLOCK) {
    for (int m = 0; m < (distinct ? LAYERS + 2 : 4); m++) roots(m, first, k[m], y[m], z[m]);
    for (int i = 0; i < BLOCK; i++) {
      u1[i] = 1, v1[i] = 0, u2[i] = 0, v2[i] = y[1][i];
    }
    for (int j = LAYERS - 1; j >= 0; j--) {
      int m = medium[j], above = 0;
      double w = width[j];
      const double *restrict km = k[m], *restrict ym = y[m], *restrict zm = z[m], *restrict qm = q[m] + first;
      for (int i = 0; i < BLOCK; i++) above += qm[i] >= 0;
#define STEP(sign) \
  double a1 = c * u1[i] - zs * v1[i], b1 = sign * ys * u1[i] + c * v1[i], a2 = c * u2[i] - zs * v2[i], b2 = sign * ys * u2[i] + c * v2[i]; \
  u1[i] = a1, v1[i] = b1, u2[i] = a2, v2[i] = b2;
      if (above == BLOCK) {
        for (int i = 0; i < BLOCK; i++) {
          double c, s;
          open(km[i] * w, &c, &s);
          double ys = ym[i] * s, zs = zm[i] * s;
          STEP(+1)
        }
      } else if (above == 0) {
        for (int i = 0; i < BLOCK; i++) {
          double c, s;
          closed(km[i] * w, &c, &s);
          double ys = ym[i] * s, zs = zm[i] * s;
          STEP(-1)
        }
      } else {
        for (int i = 0; i < BLOCK; i++) {
          double c, s;
          if (qm[i] >= 0) open(km[i] * w, &c, &s);
          else closed(km[i] * w, &c, &s);
          double ys = ym[i] * s, zs = zm[i] * s, sign = qm[i] >= 0 ? 1 : -1;
          STEP(sign)
        }
      }
    }
    for (int i = 0; i < BLOCK; i++) {
      double Y = y[0][i], x = Y * u1[i], w = Y * u2[i], ar = x + v2[i], ai = w - v1[i], br = x - v2[i], bi = w + v1[i];
      double a = ar * ar + ai * ai;
      T[first + i] = 4 * Y * y[1][i] / a;
      R[first + i] = (br * br + bi * bi) / a;
    }
  }
}

static double seconds(void) {
  struct timespec t;
  clock_gettime(CLOCK_MONOTONIC, &t);
  return t.tv_sec + 1e-9 * t.tv_nsec;
}

int main(void) {
  for (int distinct = 0; distinct < 2; distinct++) {
    for (int m = 0; m < LAYERS + 2; m++) {
      double V = m < 2 ? 0 : m % 2 == 0 ? 0.3 - 0.003 * distinct * m : 0.01 + 0.0005 * distinct * m, mass = m % 2 == 0 && m > 1 ? 0.092 : 0.067;
      for (int e = 0; e < POINTS; e++) {
        q[m][e] = mass / C * (0.005 + 0.395 * e / POINTS - V);
        mu[m][e] = mass;
      }
    }
    for (int j = 0; j < LAYERS; j++) {
      medium[j] = distinct ? j + 2 : 2 + j % 2;
      width[j] = j % 2 == 0 ? 2.5 : 5;
    }
    double best = 1e9, worst = 0;
    for (int round = 0; round < 400; round++) {
      double start = seconds();
      spectrum(distinct);
      best = fmin(best, seconds() - start);
    }
    for (int e = 0; e < POINTS; e++) worst = fmax(worst, fabs(T[e] + R[e] - 1));
    if (!(worst < 1e-9)) return fprintf(stderr, "T + R - 1 reaches %g\n", worst), 1;
    printf("%g\n", best / (LAYERS * POINTS) * 1e9);
  }
  return 0;
}
