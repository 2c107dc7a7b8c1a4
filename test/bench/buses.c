// 1/|Z|² at every bus of a network: the nodal admittance matrix with the bank in it is factorised at every corner, level and
// order, and one column solved for a bus.
// Input: orders m, levels L, corners K, nodes n, buses B, bank's node, node per bus[B], counts[L]; per corner
// Y[m][n][n] re, im in turn, stage re[m], im[m].
// Output: 1/|Z|² corner after corner, bus after bus, level after level, m each.
#include "twin.h"
#include <complex.h>
#include <string.h>

#define MOST_NODES 16

// Without the care for infinities that a compiler adds to a product of complex numbers.
static inline double complex mul(double complex x, double complex y) {
  return CMPLX(creal(x) * creal(y) - cimag(x) * cimag(y), creal(x) * cimag(y) + cimag(x) * creal(y));
}

static inline double size2(double complex x) { return creal(x) * creal(x) + cimag(x) * cimag(x); }

// Rows exchanged for the greatest pivot; the inverse of each pivot stands on the diagonal.
static void factorise(long n, double complex *restrict a, long *restrict row) {
  for (long k = 0; k < n; k++) {
    long best = k;
    for (long r = k + 1; r < n; r++)
      if (size2(a[r * n + k]) > size2(a[best * n + k])) best = r;
    row[k] = best;
    if (best != k)
      for (long c = 0; c < n; c++) {
        double complex kept = a[k * n + c];
        a[k * n + c] = a[best * n + c];
        a[best * n + c] = kept;
      }
    double square = size2(a[k * n + k]);
    double complex inverse = CMPLX(creal(a[k * n + k]) / square, -cimag(a[k * n + k]) / square);
    a[k * n + k] = inverse;
    for (long r = k + 1; r < n; r++) {
      double complex f = mul(a[r * n + k], inverse);
      a[r * n + k] = f;
      for (long c = k + 1; c < n; c++) a[r * n + c] -= mul(f, a[k * n + c]);
    }
  }
}

// Entry `at` of the solution for a unit current at `at`: back substitution need go no further.
static double complex own(long n, const double complex *restrict a, const long *restrict row, long at) {
  double complex x[MOST_NODES] = {0};
  x[at] = 1;
  for (long k = 0; k < n; k++) {
    double complex kept = x[row[k]];
    x[row[k]] = x[k];
    x[k] = kept;
  }
  for (long r = 1; r < n; r++)
    for (long c = 0; c < r; c++) x[r] -= mul(a[r * n + c], x[c]);
  for (long r = n - 1; r >= at; r--) {
    for (long c = r + 1; c < n; c++) x[r] -= mul(a[r * n + c], x[c]);
    x[r] = mul(x[r], a[r * n + r]);
  }
  return x[at];
}

int main(int argc, char **argv) {
  if (argc != 4) return 2;
  long numbers;
  double *in = read_numbers(argv[1], &numbers);
  long m = (long)in[0], levels = (long)in[1], corners = (long)in[2], n = (long)in[3], buses = (long)in[4];
  long bank = (long)in[5];
  if (n > MOST_NODES) return 2;
  const double *bus_node = in + 6, *counts = bus_node + buses, *tables = counts + levels;
  double *out = malloc((size_t)(corners * buses * levels * m) * sizeof(double));
  int runs = atoi(argv[3]);
  double *times = malloc((size_t)runs * sizeof(double));
  double complex a[MOST_NODES * MOST_NODES];
  long row[MOST_NODES];
  for (int run = 0; run < runs; run++) {
    double from = now_ns();
    for (long k = 0; k < corners; k++) {
      const double *y = tables + k * (2 * m * n * n + 2 * m);
      const double *re = y + 2 * m * n * n, *im = re + m;
      for (long level = 0; level < levels; level++)
        for (long i = 0; i < m; i++) {
          memcpy(a, y + 2 * i * n * n, (size_t)(n * n) * sizeof *a);
          a[bank * n + bank] += CMPLX(counts[level] * re[i], counts[level] * im[i]);
          factorise(n, a, row);
          for (long b = 0; b < buses; b++)
            out[((k * buses + b) * levels + level) * m + i] = 1 / size2(own(n, a, row, (long)bus_node[b]));
        }
    }
    times[run] = now_ns() - from;
  }
  write_numbers(argv[2], out, corners * buses * levels * m);
  print_median(times, runs);
  return 0;
}
