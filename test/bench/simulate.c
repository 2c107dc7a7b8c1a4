// The year's switching as a plain C loop.
// Input: n, band, smallest, most switchings, reconnection delay, classes; per class kvar and count; wanted[n], begin[n].
// Output: connected[n], switchings[stages], classes largest first.
#include "bank.h"

int main(int argc, char **argv) {
  if (argc != 4) return 2;
  long numbers;
  double *in = read_numbers(argv[1], &numbers);
  Bank b = {.n = (long)in[0], .band = in[1], .smallest = in[2], .most = in[3], .delay = in[4], .classes = (int)in[5]};
  double *next = in + 6;
  for (int c = 0; c < b.classes; c++) {
    b.kvar[c] = *next++;
    b.count[c] = (int)*next++;
    b.first[c] = b.stages;
    b.stages += b.count[c];
  }
  const double *wanted = next, *begin = next + b.n;
  double *out = malloc((size_t)(b.n + b.stages) * sizeof(double));
  int runs = atoi(argv[3]);
  double *times = malloc((size_t)runs * sizeof(double));
  for (int run = 0; run < runs; run++) {
    double from = now_ns(), level = 0;
    start(&b);
    for (long i = 0; i < b.n; i++) {
      double d = wanted[i] - level;
      if (d > b.band || d < -b.band) level = decide(&b, begin[i], wanted[i]);
      out[i] = level;
    }
    times[run] = now_ns() - from;
  }
  for (int s = 0; s < b.stages; s++) out[b.n + s] = b.switchings[s];
  write_numbers(argv[2], out, b.n + b.stages);
  print_median(times, runs);
  return 0;
}
