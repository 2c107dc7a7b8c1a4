// |Z| at one bus over hoisted tables: levels × corners × orders as a plain C loop.
// Input: orders m, levels L, corners K; counts[L]; per corner Y0 re[m], Y0 im[m], stage re[m], stage im[m].
// Output: |Z| corner after corner, level after level, L·m each.
#include "twin.h"
#include <math.h>

static void corner_into(long m, long levels, const double *counts, const double *table, double *abc, double *out) {
  const double *g0 = table, *b0 = table + m, *g = table + 2 * m, *b = table + 3 * m;
  double *restrict qa = abc, *restrict qb = abc + m, *restrict qc = abc + 2 * m;
  for (long i = 0; i < m; i++) {
    qa[i] = g0[i] * g0[i] + b0[i] * b0[i];
    qb[i] = 2 * (g0[i] * g[i] + b0[i] * b[i]);
    qc[i] = g[i] * g[i] + b[i] * b[i];
  }
  for (long level = 0; level < levels; level++) {
    double n = counts[level];
    double *restrict z = out + level * m;
    for (long i = 0; i < m; i++) z[i] = 1 / sqrt(qa[i] + n * (qb[i] + n * qc[i]));
  }
}

int main(int argc, char **argv) {
  if (argc != 4) return 2;
  long numbers;
  double *in = read_numbers(argv[1], &numbers);
  long m = (long)in[0], levels = (long)in[1], corners = (long)in[2];
  const double *counts = in + 3, *tables = counts + levels;
  double *abc = malloc((size_t)(3 * m) * sizeof(double));
  double *out = malloc((size_t)(corners * levels * m) * sizeof(double));
  int runs = atoi(argv[3]);
  double *times = malloc((size_t)runs * sizeof(double));
  for (int run = 0; run < runs; run++) {
    double from = now_ns();
    for (long k = 0; k < corners; k++) corner_into(m, levels, counts, tables + 4 * m * k, abc, out + k * levels * m);
    times[run] = now_ns() - from;
  }
  write_numbers(argv[2], out, corners * levels * m);
  print_median(times, runs);
  return 0;
}
